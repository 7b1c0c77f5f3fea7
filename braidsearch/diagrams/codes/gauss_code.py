"""Gauss codes: along each component the crossings that it passes, over or under."""

from __future__ import annotations

import re
from collections.abc import Iterable, Sequence

from braidsearch.diagrams.codes.groups import checked_groups, read_integer, shown, split_groups
from braidsearch.diagrams.codes.passages import (
    Passage,
    diagram_from_passages,
    passages_of_diagram,
    planar_signs,
)
from braidsearch.diagrams.link_diagram import LinkDiagram
from braidsearch.errors import InputError

_EXPECTED = "passages such as O1+ U2+ O3+ U1+ O2+ U3+, or 1 -2 3 -1 2 -3 without signs"
_SIGNED = re.compile(r"([OoUu])([0-9]{1,12})([+-])")
_GLUED = re.compile(r"(?<=[+-])(?=[OoUu])")


def parse_gauss_code(text: str) -> LinkDiagram:
    """Read a Gauss code from text, with crossing signs or without.

    With them a passage is O (over) or U (under), the number of the crossing and its sign:
    ``O1+ U2+ O3+ U1+ O2+ U3+``, blanks between passages as you like. Without them it is an
    integer, positive for over: ``1 -2 3 -1 2 -3``; see ``gauss_code`` for what this forgets.
    Components are lists in brackets of any kind, or lines.
    """
    groups = [
        [part for token in group for part in _GLUED.split(token)]
        for group in split_groups(text, _EXPECTED)
    ]
    if not any(token[:1].upper() in ("O", "U") for group in groups for token in group):
        return gauss_code([[read_integer(t, _EXPECTED) for t in group] for group in groups])
    signs: dict[int, int] = {}
    components = [[_read_signed(token, signs) for token in group] for group in groups]
    return gauss_code(components, signs)


def has_crossing_signs(text: str) -> bool:
    """Whether the text of a Gauss code tells the signs of the crossings."""
    return _SIGNED.search(text) is not None


def format_gauss_code(diagram: LinkDiagram) -> str:
    """Write the code with crossing signs; crossings count from 1 as the diagram lists them.

    A component starts at its least arc. Several components stand in brackets each, those without
    crossings as empty ones at the end.
    """
    components = [
        " ".join(
            f"{'O' if is_over else 'U'}{crossing + 1}"
            f"{'+' if diagram.crossings[crossing].sign > 0 else '-'}"
            for crossing, is_over in passages
        )
        for passages in passages_of_diagram(diagram)
    ]
    if len(components) == 1 and components[0]:
        return components[0]
    return " ".join(f"[{passages}]" for passages in components)


def gauss_code(
    components: Iterable[Iterable[int]], signs: dict[int, int] | Sequence[int] | None = None
) -> LinkDiagram:
    """The diagram with this Gauss code: +k passes over crossing k, -k under it.

    ``signs`` has the sign of each crossing, by its number or in ascending order of the numbers.
    Without signs the planar diagram is drawn in some way; its first crossing is then positive.
    Such a code forgets the mirror image of the drawing plane, which turns every sign and leaves
    over and under, and with it which of two mirror images is meant: of the whole, and of every
    summand of a composite link and every split part by itself. A component without passages has
    no crossings.

    Raises InputError for 0, for a crossing that is not passed over once and under once, for
    signs that do not match, and for a code that is not planar.
    """
    lists = checked_groups(components, _EXPECTED, entries_per_crossing=2)
    _check_passages([label for passages in lists for label in passages])
    numbers = sorted({abs(label) for passages in lists for label in passages})
    number_of = {label: place for place, label in enumerate(numbers)}
    passages: list[list[Passage]] = [
        [(number_of[abs(label)], label > 0) for label in component] for component in lists
    ]
    if signs is None:
        return diagram_from_passages(passages, planar_signs(passages, len(numbers)))
    if not isinstance(signs, dict):
        if len(signs) != len(numbers):
            raise InputError(f"{len(signs)} signs: expected {len(numbers)}, one for each crossing")
        signs = dict(zip(numbers, signs, strict=True))
    missing = [label for label in numbers if signs.get(label) not in (1, -1)]
    if missing:
        raise InputError(f"crossing {missing[0]}: expected its sign, 1 or -1, among the signs")
    return diagram_from_passages(passages, [signs[label] for label in numbers])


def _read_signed(token: str, signs: dict[int, int]) -> int:
    match = _SIGNED.fullmatch(token)
    if match is None:
        raise InputError(f"{shown(token)}: expected {_EXPECTED}")
    number = int(match[2])
    sign = 1 if match[3] == "+" else -1
    if signs.setdefault(number, sign) != sign:
        raise InputError(f"{shown(token)}: expected the same sign at both passages of {number}")
    return number if match[1] in "Oo" else -number


def _check_passages(labels: Sequence[int]) -> None:
    seen: set[int] = set()
    for label in labels:
        if label == 0:
            raise InputError("crossing 0: expected crossings numbered from 1 upwards")
        if label in seen:
            raise InputError(
                f"crossing {abs(label)} passed {'over' if label > 0 else 'under'} twice: "
                "expected every crossing once over and once under"
            )
        seen.add(label)
    for label in labels:
        if -label not in seen:
            raise InputError(
                f"crossing {abs(label)} passed {'over' if label > 0 else 'under'} only: "
                "expected every crossing once over and once under"
            )
