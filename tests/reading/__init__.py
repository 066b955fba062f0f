"""Tests of the package `builder.reading`."""
