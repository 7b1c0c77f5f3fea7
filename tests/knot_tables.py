"""The published tables of knots and links, read when tests run, as frozen rows.

The tables are those of the package ``database-knotinfo`` (C. Livingston, A. H. Moore, KnotInfo
and LinkInfo). Nothing is copied from it here, and where it is not installed the tests that ask
for it are skipped.
"""

from __future__ import annotations

import re
from collections.abc import Iterator, Mapping
from dataclasses import dataclass, field
from functools import cache, cached_property

import pytest

from braidsearch.words import Braid
from tests.polynomial_text import parse_polynomial

Polynomial = list[list[int]]


@dataclass(frozen=True)
class TableRow:
    """One knot, or one orientation of a link, of the tables.

    ``braids`` are all the words that the row gives for it; ``braid`` is the first. Polynomials
    are in the form that certificates use; they are read from the row when asked for.
    """

    name: str
    crossings: int
    braids: tuple[Braid, ...]
    is_knot: bool
    columns: Mapping[str, str] = field(repr=False, compare=False)

    @property
    def braid(self) -> Braid:
        return self.braids[0]

    @property
    def signature(self) -> int:
        """With the right-handed trefoil at -2."""
        return int(self.columns["signature"])

    @property
    def determinant(self) -> int:
        return int(self.columns["determinant"])

    @cached_property
    def jones(self) -> Polynomial:
        """Exponents count half powers of t: the table's t for knots, its x for links."""
        text = self.columns["jones_polynomial"]
        if not self.is_knot:
            return parse_polynomial(text, ("x",))
        return [[2 * exponent, c] for exponent, c in parse_polynomial(text, ("t",))]

    @cached_property
    def homfly(self) -> Polynomial:
        """Exponents of v, then of z."""
        column = "homfly_polynomial" if self.is_knot else "homflypt_polynomial"
        return parse_polynomial(re.sub(r"[{}]", "", self.columns[column]), ("v", "z"))

    @cached_property
    def conway(self) -> Polynomial:
        return parse_polynomial(self.columns["conway_polynomial"], ("z",))

    @cached_property
    def alexander(self) -> Polynomial:
        """Lowest exponent 0, lowest coefficient positive; of links, from the Conway polynomial."""
        if not self.is_knot:
            return alexander_from_conway(self.conway)
        return _without_units(parse_polynomial(self.columns["alexander_polynomial"], ("t",)))


def iter_knots(max_crossings: int) -> Iterator[TableRow]:
    """The prime knots of 3 to ``max_crossings`` crossings (13 at most).

    The unknot's row is left out: its word and HOMFLY-PT polynomial are empty there.
    """
    for row in _rows(is_knot=True):
        if 3 <= row.crossings <= max_crossings:
            yield row


def iter_links(max_crossings: int) -> Iterator[TableRow]:
    """The prime links of two and more components to ``max_crossings`` crossings (11 at most).

    One row for each orientation that has a name of its own.
    """
    for row in _rows(is_knot=False):
        if row.crossings <= max_crossings:
            yield row


def alexander_from_conway(conway: Polynomial) -> Polynomial:
    """The Alexander polynomial by z = t^(1/2) - t^(-1/2), up to units."""
    terms: dict[int, int] = {}  # exponents of t^(1/2)
    for degree, c in conway:
        for exponent, d in _binomial_power(degree):
            terms[exponent] = terms.get(exponent, 0) + c * d
    lowest = min(terms, default=0)
    return _without_units(sorted([(e - lowest) // 2, c] for e, c in terms.items() if c))


def _binomial_power(degree: int) -> Iterator[tuple[int, int]]:
    """The terms of (s - 1/s)^degree."""
    coefficient = 1
    for place in range(degree + 1):
        yield degree - 2 * place, -coefficient if place % 2 else coefficient
        coefficient = coefficient * (degree - place) // (place + 1)


def _without_units(polynomial: Polynomial) -> Polynomial:
    if not polynomial:
        return []
    lowest, c = polynomial[0]
    return [[exponent - lowest, d if c > 0 else -d] for exponent, d in polynomial]


@cache
def _rows(is_knot: bool) -> tuple[TableRow, ...]:
    tables = pytest.importorskip("database_knotinfo")
    records = tables.link_list() if is_knot else tables.link_list(proper_links=True)
    read = _knot_row if is_knot else _link_row
    return tuple(read(record) for record in records[1:])  # the first row holds titles


def _knot_row(record: Mapping[str, str]) -> TableRow:
    words = [_integers(part) for part in re.split(r"\]\s*,", record["braid_notation"])]
    braids = tuple(Braid(word) for word in words)
    return TableRow(record["name"], int(record["crossing_number"]), braids, True, record)


def _link_row(record: Mapping[str, str]) -> TableRow:
    braids = []
    for column in ("braid_notation", "braid_notation_old"):
        numbers = _integers(record[column])
        if numbers:
            braids.append(Braid(numbers[1:], strands=numbers[0]))
    crossings = int(record["crossing_number"])
    return TableRow(record["name"], crossings, tuple(braids), False, record)


def _integers(text: str) -> list[int]:
    return [int(number) for number in re.findall(r"-?[0-9]+", text)]
