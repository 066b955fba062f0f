"""Tests of builder/views."""
