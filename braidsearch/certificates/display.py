"""The values of invariants as people write them; no heavy library, since every report needs it."""

from __future__ import annotations

from collections.abc import Sequence
from typing import Any

VARIABLES: dict[str, tuple[tuple[str, int], ...]] = {
    "alexander": (("t", 1),),
    "jones": (("t", 2),),
    "homfly": (("v", 1), ("z", 1)),
}
"""For each polynomial its variables, with the denominator in which their exponents are counted."""

_LONGEST = 400


def show_value(invariant: str, value: Any) -> str:
    """The value for people: polynomials written out, lists without brackets, long ones cut."""
    if invariant in VARIABLES:
        text = _show_polynomial(value, VARIABLES[invariant])
    elif isinstance(value, (list, tuple)):
        text = ", ".join(_show_entry(entry) for entry in value) or "none"
    else:
        text = str(value)
    return text if len(text) <= _LONGEST else text[: _LONGEST - 4] + " ..."


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
