"""Formulas in the hand-written pages, LaTeX to MathML, which browsers draw without a script."""

from __future__ import annotations

import re

_BLOCK = re.compile(r"\$\$(.+?)\$\$", re.DOTALL)
_INLINE = re.compile(r"\$([^$\n]+)\$")


def with_formulas(markdown: str) -> str:
    """Return the Markdown with `$$ ... $$` as a block of MathML and `$ ... $` within the line."""
    if "$" not in markdown:
        return markdown
    # Imported here: only pages with formulas pay for it.
    from latex2mathml.converter import convert  # noqa: PLC0415

    def block(match: re.Match[str]) -> str:
        mathml = convert(match[1].strip(), display="block")
        return f'<div class="ew-formula" role="group" aria-label="formula" tabindex="0">{mathml}</div>'

    def inline(match: re.Match[str]) -> str:
        # The span keeps Markdown from taking a formula at the start of a line for a block of its own.
        return f"<span>{convert(match[1].strip())}</span>"

    return _INLINE.sub(inline, _BLOCK.sub(block, markdown))
