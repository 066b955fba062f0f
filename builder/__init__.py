"""Etchwright: a site and a planner from a lab's etch records."""
