"""Tests of builder/cli."""
