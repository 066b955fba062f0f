"""Tests of builder/findings."""
