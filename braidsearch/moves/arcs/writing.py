"""Legs written out as certificate moves, each checked as it is made."""

from __future__ import annotations

from collections.abc import Iterable, Sequence

from braidsearch.diagrams.arc_moves import ArcMove
from braidsearch.diagrams.arc_presentation import ArcPresentation
from braidsearch.errors import InputError
from braidsearch.moves.arcs.legs import Conjugation, Leg, Letters, Stabilization, composed
from braidsearch.moves.arcs.translation import legs_from_arc_moves
from braidsearch.moves.chain import MoveChain
from braidsearch.normal_form import NormalForm, left_normal_form
from braidsearch.words import Braid


def write_arc_moves(chain: MoveChain, arcs: ArcPresentation, moves: Iterable[ArcMove]) -> None:
    """Continue a chain that is at the word of ``arcs`` to the word that the moves reach.

    Raises InputError when a step is false, which would be a mistake in the translation.
    """
    write_legs(chain, legs_from_arc_moves(arcs, moves))


def write_legs(chain: MoveChain, legs: Sequence[Leg]) -> None:
    """Continue a chain by legs, the first of which begins at the chain's current word.

    Neighbouring conjugations become one, those at the ends of an exchange included. Raises
    InputError when a leg is false, or does not begin where the chain is.
    """
    for leg in composed(legs, exchanges=False):
        if leg.source != chain.current:
            raise InputError(f"a leg from {leg.source}: expected one from {chain.current}")
        if isinstance(leg, Conjugation):
            by = short_conjugator(leg.by, leg.source.strands)
            chain.conjugate(by, leg.target.word)
        elif isinstance(leg, Stabilization):
            chain.stabilize(leg.sign)
        else:
            chain.destabilize()


def short_conjugator(by: Letters, strands: int) -> Letters:
    """A short word that conjugates as ``by`` does: full twists are central and dropped.

    The candidates are ``by`` and the normal form with every power of delta of one parity, since
    the negative powers are worked into the factors.
    """
    form = left_normal_form(Braid.trusted(tuple(by), strands))
    parity = form.infimum % 2
    candidates = [tuple(by)]
    for infimum in range(-len(form.factors) - 1, 2):
        if infimum % 2 == parity:
            turned = NormalForm(strands, infimum, form.factors)
            candidates.append(turned.to_braid().word)
    return min(candidates, key=len)
