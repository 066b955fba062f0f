"""Measurements and generators that are kept but not shipped."""
