"""Checks of the data: the shape of each record, and rules between records."""
