"""What commands and actions on a ledger have in common: listings, and mistaken names."""

from __future__ import annotations

from collections.abc import Mapping


def list_choices(choices: Mapping[str, str]) -> str:
    """Every name with its summary, one a line."""
    width = max(map(len, choices))
    return "\n".join(f"  {name:<{width}}  {summary}" for name, summary in choices.items())


def unknown_choice(name: str, noun: str, choices: Mapping[str, str]) -> str:
    """What is said of a name that is none of them, with the one that is written most like it."""
    import difflib  # noqa: PLC0415 - only for this mistake

    close = difflib.get_close_matches(name, choices, n=1)
    meant = f" (did you mean {close[0]}?)" if close else ""
    return f"{name!r}: expected {noun}, one of {', '.join(choices)}{meant}"
