"""The values of invariants as people write them; no heavy library, since every report needs it."""

from __future__ import annotations

from collections.abc import Mapping, Sequence
from typing import Any

VARIABLES: dict[str, tuple[tuple[str, int], ...]] = {
    "alexander": (("t", 1),),
    "jones": (("t", 2),),
    "homfly": (("v", 1), ("z", 1)),
}
"""For each polynomial its variables, with the denominator in which their exponents are counted."""

_LONGEST = 400


def show_value(invariant: str, value: Any, parameters: Mapping[str, Any] | None = None) -> str:
    """The value for people: polynomials written out, lists without brackets, long ones cut."""
    text = _show_whole(invariant, value, parameters or {})
    return text if len(text) <= _LONGEST else text[: _LONGEST - 4] + " ..."


def show_permutation(images: Sequence[int]) -> str:
    """The permutation with these images of 1, 2, ..., as cycles; the identity is "1"."""
    text, seen = "", set()
    for start in range(1, len(images) + 1):
        cycle = []
        while start not in seen:
            seen.add(start)
            cycle.append(str(start))
            start = images[start - 1]  # noqa: PLW2901 - on to the next point of the cycle
        if len(cycle) > 1:
            text += f"({' '.join(cycle)})"
    return text or "1"


def _show_whole(invariant: str, value: Any, parameters: Mapping[str, Any]) -> str:
    if invariant == "sublinks":
        inner = str(parameters["invariant"])
        return "; ".join(_show_whole(inner, item, parameters) for item in value) or "none"
    if invariant == "colouring" and _are_longitudes(value, _degree(parameters)):
        return _show_colourings(value, _degree(parameters))
    if invariant == "alexander-module":
        factors = [[[power, c] for power, c in enumerate(item) if c] for item in value]
        return "; ".join(_show_polynomial(terms, (("t", 1),)) for terms in factors) or "trivial"
    if invariant == "three-braid":
        return "; ".join(_show_class(*entry) for entry in value if entry) or "none"
    if invariant in VARIABLES:
        return _show_polynomial(value, VARIABLES[invariant])
    if isinstance(value, (list, tuple)):
        return ", ".join(_show_entry(entry) for entry in value) or "none"
    return str(value)


def _show_class(exponent_sum: int, *letters: int) -> str:
    """A conjugacy class of 3-braids: exponent sum, and cyclic word in PSL(2, Z) = <a, b>."""
    names = {0: "a", 1: "b", -1: "b^-1"}
    word = " ".join(names.get(letter, str(letter)) for letter in letters) or "1"
    return f"exponent sum {exponent_sum}, cyclic word {word}"


def _degree(parameters: Mapping[str, Any]) -> int:
    return len(parameters["meridians"][0])


def _are_longitudes(value: Any, degree: int) -> bool:
    """Whether each entry has, for each component, a label and images, and a count at its end.

    What was read from a file has not been verified, and is shown all the same.
    """
    points = set(range(1, degree + 1))
    return all(
        len(entry) % (degree + 1) == 1
        and all(
            set(entry[at + 1 : at + degree + 1]) == points
            for at in range(0, len(entry) - 1, degree + 1)
        )
        for entry in value
    )


def _show_colourings(value: Sequence[Sequence[int]], degree: int) -> str:
    """How many colourings there are, and how many have which longitudes, one for each component.

    A longitude stands behind the number of the class of its meridian, where there are several.
    """
    entries = []
    many = any(label != 1 for *labels, _ in value for label in labels[:: degree + 1])
    for *classes, count in value:
        pairs = [classes[at : at + degree + 1] for at in range(0, len(classes), degree + 1)]
        longitudes = [
            (f"{label}: " if many else "") + show_permutation(images) for label, *images in pairs
        ]
        entries.append(f"{count} with {' and '.join(longitudes)}")
    total = sum(entry[-1] for entry in value)
    return f"{total} colourings" + (f"; by longitude {', '.join(entries)}" if entries else "")


def _show_entry(entry: Any) -> str:
    if isinstance(entry, (list, tuple)):
        return "(" + ", ".join(_show_entry(item) for item in entry) + ")"
    return str(entry)


def _show_polynomial(terms: Sequence[Sequence[int]], variables: Sequence[tuple[str, int]]) -> str:
    text = ""
    for *exponents, coefficient in terms:
        sign = "-" if coefficient < 0 else "+"
        text += f" {sign} " if text else sign.replace("+", "")
        text += _show_term(abs(coefficient), exponents, variables)
    return text or "0"


def _show_term(
    coefficient: int, exponents: Sequence[int], variables: Sequence[tuple[str, int]]
) -> str:
    powers = [
        _show_power(name, exponent, denominator)
        for (name, denominator), exponent in zip(variables, exponents, strict=True)
        if exponent
    ]
    return " ".join(powers if coefficient == 1 and powers else [str(coefficient), *powers])


def _show_power(name: str, exponent: int, denominator: int) -> str:
    if exponent % denominator:
        return f"{name}^({exponent}/{denominator})"
    power = exponent // denominator
    return name if power == 1 else f"{name}^{power}"
