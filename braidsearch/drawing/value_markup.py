"""Values of invariants as HTML: powers are raised, minus signs are long."""

from __future__ import annotations

import re
from html import escape

_POWER = re.compile(r"\^(?:\((-?\d+/\d+)\)|(-?\d+))")


def value_markup(text: str) -> str:
    """The text of a value, as ``show_value`` writes it, with exponents raised."""
    marked = _POWER.sub(lambda match: f"<sup>{match[1] or match[2]}</sup>", escape(text))
    return marked.replace("-", "\N{MINUS SIGN}")
