"""Two values of an invariant set side by side, entry by entry, so that the difference is seen."""

from __future__ import annotations

from collections import Counter
from collections.abc import Mapping, Sequence
from dataclasses import dataclass
from typing import Any

from braidsearch.certificates.display import VARIABLES, show_permutation, show_value

Exponents = tuple[int, ...]


@dataclass(frozen=True, slots=True)
class Entry:
    """One line of a table: what is counted or named, and what it is on the left and the right."""

    label: str
    left: str
    right: str

    @property
    def differs(self) -> bool:
        """Whether the two sides are not the same here."""
        return self.left != self.right


@dataclass(frozen=True, slots=True)
class Table:
    """Values as a table; ``heading`` says what the labels are."""

    heading: str
    entries: tuple[Entry, ...]


@dataclass(frozen=True, slots=True)
class Polynomials:
    """Two polynomials term by term: for all exponents of either one, both coefficients.

    ``variables`` are names with the denominators in which their exponents are counted.
    """

    variables: tuple[tuple[str, int], ...]
    terms: tuple[tuple[Exponents, int, int], ...]


Comparison = Table | Polynomials


def compare_values(
    invariant: str, left: Any, right: Any, parameters: Mapping[str, Any]
) -> Comparison:
    """Both values of the invariant, in the form that a certificate holds, side by side.

    Lists in which the order has no meaning are compared by how often each entry occurs.
    """
    if invariant in VARIABLES:
        return _compare_polynomials(VARIABLES[invariant], left, right)
    if invariant == "colouring" and _are_colourings((*left, *right), parameters):
        return _compare_colourings(left, right, parameters)
    if invariant == "levine-tristram":
        names = ("signature", "nullity")
        return _table("", zip(names, map(str, left), map(str, right), strict=True))
    if invariant == "alexander-module":
        return _compare_factors(left, right)
    if invariant == "three-braid":
        return _compare_counts("conjugacy class of 3-braids", invariant, left, right, parameters)
    if invariant == "sublinks":
        heading, inner = "value for a sublink", str(parameters["invariant"])
        return _compare_counts(heading, inner, left, right, parameters, is_whole=True)
    if isinstance(left, tuple):
        heading = "linking number" if invariant == "linking-numbers" else "entry"
        return _compare_counts(heading, invariant, left, right, parameters)
    return _table("", [("value", str(left), str(right))])


def _table(heading: str, rows: Any) -> Table:
    return Table(heading, tuple(Entry(*row) for row in rows))


def _compare_polynomials(
    variables: tuple[tuple[str, int], ...],
    left: Sequence[Sequence[int]],
    right: Sequence[Sequence[int]],
) -> Polynomials:
    one, other = ({tuple(exponents): c for *exponents, c in value} for value in (left, right))
    terms = [(key, one.get(key, 0), other.get(key, 0)) for key in sorted({*one, *other})]
    return Polynomials(variables, tuple(terms))


def _are_colourings(value: Sequence[Sequence[int]], parameters: Mapping[str, Any]) -> bool:
    """Whether each entry holds a label and images for each component, and a count at its end.

    A verified value does; what was only read may not, and is shown as it stands.
    """
    size = len(parameters["meridians"][0]) + 1
    points = list(range(1, size))
    return all(
        len(entry) % size == 1
        and all(
            sorted(entry[at + 1 : at + size]) == points for at in range(0, len(entry) - 1, size)
        )
        for entry in value
    )


def _compare_colourings(
    left: Sequence[Sequence[int]], right: Sequence[Sequence[int]], parameters: Mapping[str, Any]
) -> Table:
    """How many colourings have which longitudes, one for each component; and how many there are."""
    size = len(parameters["meridians"][0]) + 1
    is_one_class = len(parameters["meridians"]) == 1
    one, other = ({tuple(classes): n for *classes, n in value} for value in (left, right))
    rows = []
    for key in sorted({*one, *other}):
        images = [key[at : at + size] for at in range(0, len(key), size)]
        shown = [
            ("" if is_one_class else f"{label}: ") + show_permutation(permutation)
            for label, *permutation in images
        ]
        rows.append((" and ".join(shown), str(one.get(key, 0)), str(other.get(key, 0))))
    rows.append(("all", str(sum(one.values())), str(sum(other.values()))))
    return _table("image of the longitude" + ("s" if size < _longest(one, other) else ""), rows)


def _longest(one: Mapping[Exponents, int], other: Mapping[Exponents, int]) -> int:
    return max(map(len, [*one, *other]), default=0)


def _compare_factors(left: Sequence[Sequence[int]], right: Sequence[Sequence[int]]) -> Table:
    """Invariant factors from the largest on, since each divides the next; none is a unit."""
    rows = []
    for place in range(max(len(left), len(right))):
        sides = [
            show_value("alexander-module", [value[-1 - place]]) if place < len(value) else "1"
            for value in (left, right)
        ]
        rows.append((f"number {place + 1} from the largest", *sides))
    return _table("invariant factor", rows or [("none", "1", "1")])


def _compare_counts(  # noqa: PLR0913, PLR0917 - a value, how it is shown, and its two sides
    heading: str,
    invariant: str,
    left: Sequence[Any],
    right: Sequence[Any],
    parameters: Mapping[str, Any],
    is_whole: bool = False,
) -> Table:
    """How often each entry occurs; ``is_whole`` says that an entry is a value by itself."""
    one, other = Counter(left), Counter(right)
    rows = [
        (
            show_value(invariant, entry if is_whole else (entry,), parameters),
            str(one[entry]),
            str(other[entry]),
        )
        for entry in sorted({*one, *other})
    ]
    return _table(heading, rows or [("none", "0", "0")])
