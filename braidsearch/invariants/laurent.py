"""Laurent polynomials in the form that certificates use, their mirror images and their display."""

from collections.abc import Iterable
from typing import Any

from braidsearch.errors import InputError

Polynomial = list[list[int]]
"""Terms [exponent, ..., coefficient], sorted, no zero coefficients; [] is zero."""

_VARIABLES = {"alexander": ("t",), "jones": ("t",), "homfly": ("v", "z")}
_DENOMINATORS = {"jones": 2}


def polynomial_from_coefficients(coefficients: Iterable[int], lowest: int = 0) -> Polynomial:
    """The polynomial in one variable with these coefficients, from exponent ``lowest`` upwards."""
    return [[lowest + place, int(c)] for place, c in enumerate(coefficients) if c]


def polynomial_from_terms(terms: dict[tuple[int, ...], int]) -> Polynomial:
    """The polynomial whose coefficients ``terms`` holds by tuples of exponents."""
    return sorted(
        [*exponents, coefficient] for exponents, coefficient in terms.items() if coefficient
    )


def multiply(left: Polynomial, right: Polynomial) -> Polynomial:
    """The product of two polynomials in the same variables."""
    terms: dict[tuple[int, ...], int] = {}
    for *left_exponents, left_coefficient in left:
        for *right_exponents, right_coefficient in right:
            exponents = tuple(map(int.__add__, left_exponents, right_exponents))
            product = left_coefficient * right_coefficient
            terms[exponents] = terms.get(exponents, 0) + product
    return polynomial_from_terms(terms)


def product(factors: Iterable[Polynomial], variables: int = 1) -> Polynomial:
    """The product of polynomials in so many variables; 1 for none."""
    result = [[0] * variables + [1]]
    for factor in factors:
        result = multiply(result, factor)
    return result


def normalise_units(polynomial: Polynomial) -> Polynomial:
    """The polynomial times plus or minus a power: lowest exponent 0, its coefficient positive."""
    if not polynomial:
        return []
    lowest = polynomial[0][0]
    sign = 1 if polynomial[0][1] > 0 else -1
    return [[exponent - lowest, sign * coefficient] for exponent, coefficient in polynomial]


def mirror_image(name: str, value: Any) -> Any:
    """The value that the named invariant takes on the mirror image of a link with ``value``.

    Jones: t to 1/t. HOMFLY-PT: v to 1/v and z to -z. Signature, linking numbers and their
    sums change sign; components, Alexander polynomial and determinant stay.
    """
    if name == "jones":
        return sorted([-exponent, coefficient] for exponent, coefficient in value)
    if name == "homfly":
        return sorted([-v, z, -c if z % 2 else c] for v, z, c in value)
    if name == "signature":
        return -value
    if name in ("linking-numbers", "linking-sums"):
        return sorted(-number for number in value)
    if name in ("components", "alexander", "determinant"):
        return value
    raise InputError(f"invariant {name!r}: expected one whose mirror image is known")


def format_polynomial(name: str, value: Any) -> str:
    """The value of the named invariant as a reader writes it: ``t + t^3 - t^4``.

    Exponents of the Jones polynomial, held in half powers, come out as ``t^(1/2)``; terms of the
    HOMFLY-PT polynomial go by their powers of z first. Values that are not polynomials are
    written as they are, an empty list of them as ``none``.
    """
    if name not in _VARIABLES:
        return ", ".join(map(str, value)) or "none" if isinstance(value, list) else str(value)
    text = ""
    for *exponents, coefficient in sorted(value, key=lambda term: term[-2::-1]):
        powers = [
            _format_power(variable, exponent, _DENOMINATORS.get(name, 1))
            for variable, exponent in zip(_VARIABLES[name], exponents, strict=True)
            if exponent
        ]
        size = [str(abs(coefficient))] if abs(coefficient) != 1 or not powers else []
        joint = (" - " if coefficient < 0 else " + ") if text else ("-" if coefficient < 0 else "")
        text += joint + " ".join(size + powers)
    return text or "0"


def _format_power(variable: str, numerator: int, denominator: int) -> str:
    if numerator % denominator:
        return f"{variable}^({numerator}/{denominator})"
    exponent = numerator // denominator
    if exponent == 1:
        return variable
    return f"{variable}^{exponent}" if exponent > 0 else f"{variable}^({exponent})"


def sympy_expression(name: str, value: Polynomial) -> Any:
    """The polynomial as a sympy expression in the variables t, or v and z, for further algebra.

    Raises InputError for an invariant that is not a polynomial.
    """
    if name not in _VARIABLES:
        raise InputError(f"invariant {name!r}: expected one of {', '.join(_VARIABLES)}")
    # Here, not above: sympy takes longer to load than a comparison takes.
    from sympy import Add, Integer, Mul, Pow, Rational, Symbol  # noqa: PLC0415

    symbols = [Symbol(variable) for variable in _VARIABLES[name]]
    denominator = _DENOMINATORS.get(name, 1)
    terms = []
    for *exponents, coefficient in value:
        powers = [
            Pow(symbol, Rational(exponent, denominator))
            for symbol, exponent in zip(symbols, exponents, strict=True)
        ]
        terms.append(Mul(Integer(coefficient), *powers))
    return Add(*terms)
