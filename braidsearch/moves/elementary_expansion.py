"""Chains of moves written out in elementary steps, which are moves of a certificate again."""

from __future__ import annotations

from collections.abc import Iterable, Iterator

from braidsearch.errors import CapacityError, InputError
from braidsearch.moves.elementary_conjugation import Part, conjugate_parts
from braidsearch.moves.elementary_relations import Letters, apply_relation, check_capacity
from braidsearch.moves.elementary_rewriting import rewrite_relations
from braidsearch.moves.elementary_steps import (
    CONJUGATION,
    DESTABILIZATION,
    STABILIZATION,
    ElementaryStep,
    step_of_relation,
)
from braidsearch.moves.markov import Conjugate, Move, Rewrite, Stabilize, stated_result
from braidsearch.words import MAX_LETTERS, Braid

Stage = tuple[ElementaryStep, Move]
"""An elementary step, and the same step as a move, which states its result."""


def expand_moves(start: Braid, moves: Iterable[Move]) -> list[Stage]:
    """The moves, which the caller knows to be true, written out in elementary steps.

    Every rewriting becomes single relations, every conjugation conjugations by one letter and
    single relations; stages between which the chain comes back to the same word are left out.
    Raises InputError where two words are not the same element, CapacityError for more steps than a
    certificate can hold, or longer words.
    """
    stages: list[Stage] = []
    braid, letters = start, 0
    for number, move in enumerate(moves, 1):
        added = _expand_move(braid, move, number)
        stages += added
        letters += sum(len(reached.word) for _, reached in added)
        check_capacity(len(stages), letters)
        braid = stated_result(braid, move)
    return _without_detours(start, stages)


def _expand_move(braid: Braid, move: Move, number: int) -> list[Stage]:
    word = braid.word
    if isinstance(move, Rewrite):
        return _stages(word, move.word, rewrite_relations(word, move.word), number)
    if isinstance(move, Conjugate):
        parts = conjugate_parts(word, move.by, move.word, braid.strands)
        return _stages(word, move.word, parts, number)
    if isinstance(move, Stabilize):
        step = ElementaryStep(STABILIZATION, len(word) + 1, (), move.word[-1:], number)
    else:
        step = ElementaryStep(DESTABILIZATION, len(word), word[-1:], (), number)
    return [(step, move)]


def _stages(word: Letters, target: Letters, parts: Iterable[Part], number: int) -> list[Stage]:
    stages: list[Stage] = []
    letters = 0
    for part in parts:
        move: Move
        if isinstance(part, int):
            word = (-part, *word, part)
            step = ElementaryStep(CONJUGATION, 1, (), (-part, part), number)
            move = Conjugate((part,), word)
        else:
            word = apply_relation(word, part)
            step, move = step_of_relation(part, number), Rewrite(word)
        if len(word) > MAX_LETTERS:
            raise CapacityError(f"a word of {len(word)} letters: expected {MAX_LETTERS} at most")
        letters += len(word)
        check_capacity(len(stages) + 1, letters)
        stages.append((step, move))
    if word != target:
        raise InputError(f"steps to {list(word)}: expected them to lead to {list(target)}")
    return stages


def _without_detours(start: Braid, stages: list[Stage]) -> list[Stage]:
    """The chain without what leads back to a braid where it has been, or to one next to it.

    Next to a braid are those that it becomes by conjugation with one letter.
    """
    braids = [start]
    for _, move in stages:
        braids.append(stated_result(braids[-1], move))
    last = {braid: place for place, braid in enumerate(braids)}
    kept: list[Stage] = []
    place = last[start]
    while place < len(stages):
        step, move = stages[place]
        following = last[braids[place + 1]]
        for letter in _letters_of(braids[place]):
            conjugate = (-letter, *braids[place].word, letter)
            reached = last.get(Braid.trusted(conjugate, braids[place].strands), 0)
            if reached > following:
                following = reached
                step = ElementaryStep(CONJUGATION, 1, (), (-letter, letter), step.move)
                move = Conjugate((letter,), conjugate)
        kept.append((step, move))
        place = following
    return kept


def _letters_of(braid: Braid) -> Iterator[int]:
    for index in range(1, braid.strands):
        yield from (index, -index)
