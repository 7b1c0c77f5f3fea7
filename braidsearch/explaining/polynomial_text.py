"""Two polynomials one under the other, terms of one exponent in one column."""

from __future__ import annotations

from collections.abc import Iterator, Sequence

from braidsearch.explaining.values import Exponents, Polynomials


def polynomial_lines(
    polynomials: Polynomials, names: Sequence[str], indent: str, width: int
) -> Iterator[str]:
    """Three lines for as many columns as fit, then three more: both polynomials, and marks.

    A mark stands under each term whose coefficients differ.
    """
    head = max(map(len, names)) + 1
    columns = [_column(polynomials, number) for number in range(len(polynomials.terms))]
    if not columns:
        columns = [("0", "0", "")]
    start = 0
    while start < len(columns):
        end, used = start, len(indent) + head
        while end < len(columns) and (end == start or used + 1 + len(columns[end][0]) <= width):
            used += 1 + len(columns[end][0])
            end += 1
        for name, row in zip((*names, ""), zip(*columns[start:end], strict=True), strict=True):
            label = name + ":" if name else ""
            yield f"{indent}{label:<{head}} {' '.join(row)}".rstrip()
        start = end


def _column(polynomials: Polynomials, number: int) -> tuple[str, str, str]:
    exponents, left, right = polynomials.terms[number]
    power = format_power(polynomials, exponents)
    one, other = (_term(coefficient, power, number == 0) for coefficient in (left, right))
    size = max(len(one), len(other))
    mark = "^" * size if left != right else ""
    return f"{one:>{size}}", f"{other:>{size}}", f"{mark:>{size}}"


def _term(coefficient: int, power: str, is_first: bool) -> str:
    """``+ 3 t^2``; a dot where the coefficient is 0."""
    if not coefficient:
        return "."
    size = abs(coefficient)
    sign = "-" if coefficient < 0 else " " if is_first else "+"
    factor = "" if size == 1 and power else str(size)
    return f"{sign} {' '.join(part for part in (factor, power) if part)}"


def format_power(polynomials: Polynomials, exponents: Exponents) -> str:
    """The monomial: ``t^(3/2)``, ``v^2 z``; nothing for 1."""
    powers = []
    for (name, denominator), exponent in zip(polynomials.variables, exponents, strict=True):
        if exponent % denominator:
            powers.append(f"{name}^({exponent}/{denominator})")
        elif exponent:
            power = exponent // denominator
            powers.append(name if power == 1 else f"{name}^{power}")
    return " ".join(powers)
