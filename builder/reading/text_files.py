"""Bytes of a file to text: UTF-8 only, of bounded size."""

from __future__ import annotations

from pathlib import Path

from builder.problems import Problem, Severity

MAX_BYTES = 5_000_000
"""Largest file read; a record has a few kilobytes, so a larger file is a mistake."""

VISIBLE = (
    r" -~\xa0-\xac\xae-\u200a\u200c\u200d\u2010-\u2027\u202f-\u205f"
    r"\u2070-\ud7ff\ue000-\ufefe\uff00-\ufffd\U00010000-\U0010ffff"
)
"""
Characters a record may hold, as part of a pattern. Left out: control characters, line breaks that
editors do not show as such, marks that reorder a line, and letters of no width, which make two equal
names differ.
"""

_BYTE_ORDER_MARK = "\ufeff"


def read_text(path: Path, file: str) -> str | Problem:
    """
    Return the text of the file at `path`, without a byte order mark, or the problem that stops it.

    `file` is the name shown in the problem. Line ends are kept as they are.
    """
    try:
        with path.open("rb") as stream:
            content = stream.read(MAX_BYTES + 1)
    except OSError as error:
        return _problem(file, "unreadable-file", f"cannot be read: {error.strerror or 'unknown reason'}")
    return decode(content, file)


def decode(content: bytes, file: str) -> str | Problem:
    """Return the bytes as text, without a byte order mark, or a problem (too large, not UTF-8)."""
    if len(content) > MAX_BYTES:
        return _problem(file, "file-too-large", f"is larger than {MAX_BYTES // 1_000_000} MB")
    try:
        text = content.decode("utf-8")
    except UnicodeDecodeError as error:
        before = content[: error.start]
        line = before.count(b"\n") + 1
        column = len(before.rpartition(b"\n")[2].decode("utf-8", "replace")) + 1
        return _problem(
            file,
            "not-utf-8",
            f"byte 0x{content[error.start]:02x} is no UTF-8 text",
            line=line,
            column=column,
            hint="save the file as UTF-8",
        )
    return text.removeprefix(_BYTE_ORDER_MARK)


def _problem(
    file: str, rule: str, message: str, *, line: int = 0, column: int = 0, hint: str = ""
) -> Problem:
    return Problem(file, line, column, "", Severity.ERROR, rule, message, hint)
