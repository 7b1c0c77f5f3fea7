"""The options that bound a search, for every command that searches."""

from __future__ import annotations

from argparse import Namespace
from typing import TYPE_CHECKING

from braidsearch.command_line.arguments import CommandParser, read_seconds

if TYPE_CHECKING:
    from braidsearch.search.limits import SearchLimits

_BOUNDS = ("seconds", "nodes", "max_strands")


def add_limits(parser: CommandParser) -> None:
    """The options --seconds, --nodes and --max-strands."""
    parser.add_number(
        "--seconds", read_seconds, "seconds or none", "stop after so many seconds (60)"
    )
    parser.add_number("--nodes", int, "a count or none", "stop after so many conjugacy classes")
    parser.add_number(
        "--max-strands",
        int,
        "a count or none",
        "most strands of a class on the way (two more than the larger word has)",
    )


def read_limits(given: Namespace) -> SearchLimits:
    """The limits given, the others by default. Raises InputError for one that cannot be kept."""
    from braidsearch.search.limits import SearchLimits  # noqa: PLC0415 - help and mistakes come faster

    return SearchLimits(**{name: getattr(given, name) for name in _BOUNDS if hasattr(given, name)})
