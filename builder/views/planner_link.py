"""The part of an address that opens a sample in the planner: the twin of docs/assets/planner/address.js."""

from __future__ import annotations

import base64
import json

from builder.records.samples import Sample

VERSION = "s1"
"""Form of the address; the page says so where it does not know a form."""


def planner_link(sample: Sample) -> str:
    """Return the fragment, with its `#`, that makes the planner restore a sample."""
    text = json.dumps(json.loads(sample.json_text), ensure_ascii=False, separators=(",", ":"))
    return f"#{VERSION}={base64.urlsafe_b64encode(text.encode()).decode().rstrip('=')}"
