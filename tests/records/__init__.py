"""Tests of the package `builder.records`."""
