"""Legs written out as certificate moves, each checked as it is made."""

from __future__ import annotations

from collections.abc import Iterable, Sequence

from braidsearch.diagrams.arc_moves import ArcMove
from braidsearch.diagrams.arc_presentation import ArcPresentation
from braidsearch.errors import InputError
from braidsearch.moves.arcs.legs import Conjugation, Leg, Stabilization, composed
from braidsearch.moves.arcs.translation import legs_from_arc_moves
from braidsearch.moves.chain import MoveChain
from braidsearch.normal_form.conjugators import short_conjugator


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
