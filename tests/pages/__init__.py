"""Tests of builder/pages."""
