"""The fixed numbers of a plan, each with its ground. Numbers a lab may choose live in its settings."""

from __future__ import annotations

FIRST_LOOK_FRACTION = 0.8
"""First look at this part of the earliest clearing time (common practice, no source)."""

TIMED_RATIO = 1.25
"""Latest over earliest clearing time up to which a timer alone is trusted (common practice, no source)."""

UNTESTED_LIMIT_S = 600.0
"""A limit printed as a rate, with no tested time on record, supports nothing beyond this time, s."""

GOOD_MARGIN = 2.0
"""Allowed over worst-case loss from which a margin counts as good when options are put in order."""

RUN_SPAN = (0.5, 2.0)
"""A value asked for outside these multiples of what the runs covered is flagged."""

CLEAR_GAIN = 5.0
"""Growth beyond this many standard uncertainties of the loss is no scatter (common practice, no source)."""

TEMPERATURE_MATCH_K = 3.0
"""A published row counts for a bath within this many kelvin of its own temperature."""

ROOM_TEMPERATURE_K = (291.15, 298.15)
"""What "room" means in a published table: 18 to 25 degrees Celsius."""

ISOTROPIC_UNDERCUT = 1.0
"""Least sideways etch per depth of an isotropic etch with nothing on record (common practice, no source)."""

REFERENCE_CONFIDENCE = 0.90
"""Conflicts are judged at this confidence whatever is asked, so that asking for more never hides one."""

TWO_FACES = 2.0
"""A film wet on both faces loses from both."""

TWO_EDGES = 2.0
"""A line loses its footing from two edges."""
