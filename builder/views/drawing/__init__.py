"""Geometry of the drawings: sections, interval bars and charts, in the units of their SVG."""
