"""Tests of the package `builder.checking`."""
