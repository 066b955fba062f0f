"""Checked records as frozen dataclasses, and the units they are written in."""
