"""Text without what only its authors read: a page crosses bad lines on its first visit."""

from __future__ import annotations

import re

_INDENT = re.compile(r"\n\s+")
_CSS_COMMENT = re.compile(r"/\*.*?\*/\s*", re.DOTALL)


def lean_html(html: str) -> str:
    """Return HTML without the indents of its lines and empty lines; for pages without preformatted text."""
    return _INDENT.sub("\n", html)


def lean_css(css: str) -> str:
    """Return a style sheet without comments and indents; for sheets with neither in a quoted text."""
    return _INDENT.sub("\n", _CSS_COMMENT.sub("", css))
