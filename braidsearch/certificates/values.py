"""What a certificate says: the claim about two closed braids, and its proof, as frozen values."""

from __future__ import annotations

import operator
from collections.abc import Iterable, Mapping
from dataclasses import dataclass
from os import PathLike
from typing import TypeAlias

from braidsearch.certificates.writing import write_certificate
from braidsearch.errors import InputError
from braidsearch.moves import Move
from braidsearch.words import SYMMETRIES, Braid

Value: TypeAlias = "int | str | tuple[Value, ...]"
"""The value of an invariant: integers and names, nested in tuples."""


@dataclass(frozen=True, slots=True, init=False)
class Distinction:
    """One invariant by which closure(left) is not symmetry(closure(right)).

    ``left_moves`` and ``right_moves`` carry the braids of the claim to handier ones first;
    ``left`` and ``right`` are the values of the invariant there, the symmetry applied to the right
    one. Polynomials are sorted tuples of (exponents..., coefficient). ``parameters`` may be given
    as a mapping and is kept as sorted pairs; values may be given as lists and are kept as tuples.

    Raises InputError for an unknown symmetry and for values that are neither integers, names nor
    sequences of them.
    """

    symmetry: str
    invariant: str
    parameters: tuple[tuple[str, Value], ...]
    left_moves: tuple[Move, ...]
    right_moves: tuple[Move, ...]
    left: Value
    right: Value

    def __init__(  # noqa: PLR0913, PLR0917 - the seven keys of a distinction in the file
        self,
        symmetry: str,
        invariant: str,
        parameters: Mapping[str, object] | Iterable[tuple[str, object]],
        left_moves: Iterable[Move],
        right_moves: Iterable[Move],
        left: object,
        right: object,
    ) -> None:
        _check_symmetry(symmetry)
        pairs = ((name, freeze_value(value)) for name, value in dict(parameters).items())
        object.__setattr__(self, "symmetry", symmetry)
        object.__setattr__(self, "invariant", invariant)
        object.__setattr__(self, "parameters", tuple(sorted(pairs)))
        object.__setattr__(self, "left_moves", tuple(left_moves))
        object.__setattr__(self, "right_moves", tuple(right_moves))
        object.__setattr__(self, "left", freeze_value(left))
        object.__setattr__(self, "right", freeze_value(right))

    def _repr_latex_(self) -> str | None:
        """Both polynomials, for a notebook; None for an invariant that is none."""
        from braidsearch.drawing.notebook import (  # noqa: PLC0415 - upwards, see the test of imports
            distinction_latex,
        )

        return distinction_latex(self)


@dataclass(frozen=True, slots=True)
class Certificate:
    """A claim about the closures of two braids, with all that is needed to check it.

    ``same`` claims that closure(left) is ``symmetry``(closure(right)): ``moves`` lead from left
    to exactly the letters of symmetry(right). ``different`` claims that closure(left) is none of
    the images of closure(right) that ``distinctions`` name; ``symmetry`` is then None.

    The constructor checks the shape alone. Whether the claim holds, the verifier says.
    Raises InputError for a shape that is neither of the two.
    """

    left: Braid
    right: Braid
    verdict: str
    symmetry: str | None
    moves: tuple[Move, ...] = ()
    distinctions: tuple[Distinction, ...] = ()

    def __post_init__(self) -> None:
        if self.verdict == "same":
            _check_symmetry(self.symmetry)
            if self.distinctions:
                raise InputError("distinctions in a certificate of sameness: expected none")
        elif self.verdict == "different":
            if self.symmetry is not None or self.moves or not self.distinctions:
                raise InputError("a certificate of difference: expected distinctions alone")
            symmetries = [distinction.symmetry for distinction in self.distinctions]
            if len(set(symmetries)) < len(symmetries):
                raise InputError("distinctions: expected each symmetry at most once")
        else:
            raise InputError(f"verdict {self.verdict!r}: expected same or different")

    @classmethod
    def same(cls, left: Braid, right: Braid, symmetry: str, moves: Iterable[Move]) -> Certificate:
        """The claim that closure(left) is symmetry(closure(right)), with moves that prove it."""
        return cls(left, right, "same", symmetry, moves=tuple(moves))

    @classmethod
    def different(
        cls, left: Braid, right: Braid, distinctions: Iterable[Distinction]
    ) -> Certificate:
        """The claim that closure(left) is none of the named images of closure(right)."""
        return cls(left, right, "different", None, distinctions=tuple(distinctions))

    @property
    def chains(self) -> tuple[tuple[Move, ...], ...]:
        """All chains of moves: that of a sameness, then those of both sides of distinctions."""
        sides = ((item.left_moves, item.right_moves) for item in self.distinctions)
        return (self.moves, *(moves for pair in sides for moves in pair))

    def save(self, path: str | PathLike[str]) -> None:
        """Write the certificate file. Raises InputError when it cannot be written there."""
        write_certificate(self, path)

    def _repr_html_(self) -> str:
        """The claim with its pictures, and the proof in words, for a notebook."""
        from braidsearch.drawing.notebook import (  # noqa: PLC0415 - upwards, see the test of imports
            certificate_html,
        )

        return certificate_html(self)


def freeze_value(value: object) -> Value:
    """The value with tuples for lists. Raises InputError for what a certificate cannot hold."""
    if isinstance(value, str):
        return value
    if isinstance(value, (list, tuple)):
        return tuple(freeze_value(item) for item in value)
    try:
        if not isinstance(value, bool):
            return operator.index(value)  # type: ignore[arg-type]
    except TypeError:
        pass
    raise InputError(f"{value!r} in a value: expected integers, names and lists of them")


def _check_symmetry(symmetry: object) -> None:
    if symmetry not in SYMMETRIES:
        raise InputError(f"symmetry {symmetry!r}: expected one of {', '.join(SYMMETRIES)}")
