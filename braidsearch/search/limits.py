"""Bounds of a search, and the named ways in which it can end."""

from __future__ import annotations

import math
import time
from collections.abc import Callable
from dataclasses import dataclass
from enum import Enum

from braidsearch.errors import InputError
from braidsearch.words import MAX_LETTERS, MAX_STRANDS


class Ending(Enum):
    """How a search ended; only FOUND says anything about the links."""

    FOUND = "found"
    NODE_LIMIT = "node limit"
    TIME_LIMIT = "time limit"
    INTERRUPTED = "interrupted"
    TOO_LARGE = "too large"
    NOT_SEARCHED = "not searched"
    NOT_ACCEPTED = "certificate not accepted"


@dataclass(frozen=True)
class SearchLimits:
    """Where a search stops.

    ``nodes`` counts the conjugacy classes entered; a search bounded by nodes alone gives the same
    certificate whenever it is repeated. ``seconds`` bounds the whole query (None: no bound).
    ``max_strands`` bounds the strands of every braid on the way (None: two more than the larger
    side has), ``max_letters`` the letters of the words stabilized. Raises InputError for a bound
    that no search can keep.
    """

    seconds: float | None = 60.0
    nodes: int | None = 200_000
    max_strands: int | None = None
    max_letters: int = 2_000

    def __post_init__(self) -> None:
        if self.seconds is not None and not (0 <= self.seconds < math.inf):
            raise InputError(f"seconds {self.seconds!r}: expected a number of at least 0")
        _check_count("nodes", self.nodes, 0, None)
        _check_count("max_strands", self.max_strands, 1, MAX_STRANDS)
        _check_count("max_letters", self.max_letters, 1, MAX_LETTERS)


def _check_count(name: str, value: object, least: int, most: int | None) -> None:
    if value is None and name != "max_letters":
        return
    is_count = isinstance(value, int) and not isinstance(value, bool)
    if not is_count or value < least or (most is not None and value > most):  # type: ignore[operator]
        until = "" if most is None else f" to {most}"
        raise InputError(f"{name} {value!r}: expected an integer from {least}{until}")


@dataclass(frozen=True)
class Progress:
    """What a running search tells: seconds and nodes so far, fewest strands, what it does."""

    seconds: float
    nodes: int
    strands: int
    doing: str


class Budget:
    """The limits of one query, with what has been spent of them."""

    def __init__(
        self, limits: SearchLimits, report: Callable[[Progress], None] | None = None
    ) -> None:
        self.limits = limits
        self.nodes = 0
        self._report = report
        self._start = time.monotonic()

    @property
    def seconds(self) -> float:
        """Seconds since the query began."""
        return time.monotonic() - self._start

    @property
    def seconds_left(self) -> float:
        """Seconds until the limit, infinite without one."""
        if self.limits.seconds is None:
            return math.inf
        return self.limits.seconds - self.seconds

    def is_out_of_time(self) -> bool:
        """Whether the seconds are used up: long walks ask this between steps."""
        return self.seconds_left <= 0

    def ending(self, share: float = 1.0) -> Ending | None:
        """The limit that has been reached, if any; ``share`` is the part of them to use."""
        limits = self.limits
        if limits.nodes is not None and self.nodes >= limits.nodes * share:
            return Ending.NODE_LIMIT
        if limits.seconds is not None and self.seconds >= limits.seconds * share:
            return Ending.TIME_LIMIT
        return None

    def tell(self, strands: int, doing: str) -> None:
        """Report progress to whoever listens."""
        if self._report is not None:
            self._report(Progress(self.seconds, self.nodes, strands, doing))
