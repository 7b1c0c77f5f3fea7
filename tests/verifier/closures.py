"""The verifier's invariants as functions of braids, in the form in which it compares them."""

from __future__ import annotations

from collections import Counter
from typing import Any

from braidsearch.verifier import verify
from braidsearch.words import Braid

FINER = ("colouring", "sublinks", "levine-tristram", "alexander-module", "three-braid")
NAMES = tuple(name for name in verify.INVARIANTS if name not in FINER)


def invariant(name: str, braid: Braid, **parameters: Any) -> Any:
    """The value for the closure; the word is not reduced first, so that all its letters count."""
    compute = verify.INVARIANTS[name].compute
    return compute(verify.Braid(braid.strands, braid.word), verify.Work(), **parameters)


def terms(value: Any) -> Counter[tuple[int, ...]]:
    """A polynomial as a mapping from exponents to coefficients."""
    return Counter({tuple(entry[:-1]): entry[-1] for entry in value})


def combination(*parts: tuple[int, tuple[int, ...], Any]) -> dict[tuple[int, ...], int]:
    """The sum of polynomials, each multiplied by a coefficient and a monomial."""
    total: Counter[tuple[int, ...]] = Counter()
    for coefficient, shift, value in parts:
        for exponents, c in terms(value).items():
            total[tuple(map(sum, zip(exponents, shift, strict=True)))] += coefficient * c
    return {exponents: c for exponents, c in total.items() if c}


def product(one: Any, two: Any) -> dict[tuple[int, ...], int]:
    """The product of two polynomials."""
    return combination(*((c, exponents, two) for exponents, c in terms(one).items()))
