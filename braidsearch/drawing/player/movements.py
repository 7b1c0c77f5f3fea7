"""What is seen to move in one step of a proof: single relations, turns, strands that come or go."""

from __future__ import annotations

from collections.abc import Sequence
from dataclasses import dataclass
from typing import Any

from braidsearch.errors import BraidsearchError
from braidsearch.moves import Conjugate, Destabilize, Move, Stabilize
from braidsearch.moves.elementary_expansion import expand_moves
from braidsearch.moves.elementary_steps import CANCELLATION, CONJUGATION, ElementaryStep
from braidsearch.words import Braid
from braidsearch.words.reduction import find_rotation

MOST_PARTS = 240
"""A step that takes more single relations is shown as one change."""

MOST_PARTS_OF_PAGE = 20_000
LONGEST_EXPANDED = 160
"""Words with more letters are not written out in relations."""

Part = list[Any]
"""What the page plays: its kind, then the letters and places that it needs."""


@dataclass
class Budget:
    """How many more parts a page may have, so that no proof makes it endless."""

    parts: int = MOST_PARTS_OF_PAGE


def movement_parts(
    braid: Braid, move: Move, components: Sequence[int], budget: Budget
) -> list[Part]:
    """The parts of a step, in order: each leads from one braid word to the next.

    ``components`` are those of the start positions after the step; a part that is one change for
    many relations brings them along, since no rule of the page could tell.
    """
    if isinstance(move, Stabilize):
        return [["stabilization", move.word[-1]]]
    if isinstance(move, Destabilize):
        return [["destabilization", braid.word[-1]]]
    if move.word == braid.word:
        return [["stay", list(components)]]
    parts = _turn(braid, move) or _written_out(braid, move, budget)
    if parts is None:
        parts = [["rewriting", list(move.word), list(components)]]
    budget.parts -= len(parts)
    return parts


def _turn(braid: Braid, move: Move) -> list[Part]:
    if not isinstance(move, Conjugate) or len(move.word) != len(braid):
        return []
    rotation = find_rotation(braid, Braid.trusted(move.word, braid.strands))
    if not rotation:
        return []
    is_front = 2 * rotation <= len(braid)
    return [["turn", rotation if is_front else rotation - len(braid)]]


def _written_out(braid: Braid, move: Move, budget: Budget) -> list[Part] | None:
    """The step in single relations; None where they are too many, or the step does not hold."""
    letters = len(braid) + len(move.word) + (len(move.by) if isinstance(move, Conjugate) else 0)
    if letters > LONGEST_EXPANDED or budget.parts <= 0:
        return None
    try:
        stages = expand_moves(braid, [move])
    except BraidsearchError:
        return None
    words = [braid.word, *(each.word for _, each in stages)]
    if words[-1] != move.word:
        return None
    parts = _with_turns([step for step, _ in stages], words)
    return parts if len(parts) <= min(MOST_PARTS, budget.parts) else None


def _with_turns(steps: Sequence[ElementaryStep], words: Sequence[tuple[int, ...]]) -> list[Part]:
    """A conjugation that cancels at once turns the word; turns in a row are one."""
    parts: list[Part] = []
    place = 0
    while place < len(steps):
        step = steps[place]
        turn = 0
        if step.kind == CONJUGATION and place + 1 < len(steps):
            turn = _turned(words[place], steps[place + 1], words[place + 2])
        if turn:
            if (
                parts
                and parts[-1][0] == "turn"
                and 0 < (parts[-1][1] + turn) * turn < len(words[place])
            ):
                parts[-1][1] += turn
            else:
                parts.append(["turn", turn])
        elif step.kind == CONJUGATION:
            parts.append(["conjugation", step.after[1]])
        else:
            parts.append(["relation", step.place - 1, list(step.before), list(step.after)])
        place += 2 if turn else 1
    return parts


def _turned(word: tuple[int, ...], following: ElementaryStep, result: tuple[int, ...]) -> int:
    """1 where the first letter went to the end, -1 where the last went to the front, else 0."""
    if following.kind != CANCELLATION or len(word) < 2:
        return 0
    if following.place == 1 and result == (*word[1:], word[0]):
        return 1
    is_at_end = following.place == len(word) + 1
    return -1 if is_at_end and result == (word[-1], *word[:-1]) else 0
