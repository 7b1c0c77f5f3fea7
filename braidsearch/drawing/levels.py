"""Which crossings stand side by side: the levels of a braid picture."""

from __future__ import annotations

from collections.abc import Collection, Sequence

from braidsearch.errors import CapacityError
from braidsearch.words import Braid

MAX_CROSSINGS = 2_000
MAX_STRANDS = 60

Level = tuple[int, ...]
"""The numbers of the letters that stand side by side, from the left."""


def check_size(braid: Braid) -> None:
    """Raise CapacityError for a braid that is too large for a picture."""
    if len(braid) > MAX_CROSSINGS:
        raise CapacityError(
            f"a picture of {len(braid)} crossings: expected at most {MAX_CROSSINGS}"
        )
    if braid.strands > MAX_STRANDS:
        raise CapacityError(f"a picture of {braid.strands} strands: expected at most {MAX_STRANDS}")


def arrange_levels(word: Sequence[int], breaks: Collection[int] = ()) -> tuple[Level, ...]:
    """The letters of the word, by number from 0, in levels; each level begins at a letter.

    A letter stands beside the one before it where its index is larger by at least two, so that
    both crossings have strands of their own. Read from top to bottom and each level from left to
    right, the picture therefore gives back the word itself, and not only a word that is equal to
    it by far commutation. A letter whose number is among ``breaks`` begins a level.
    """
    levels: list[list[int]] = []
    for number, letter in enumerate(word):
        is_beside = number > 0 and abs(letter) >= abs(word[number - 1]) + 2
        if is_beside and number not in breaks:
            levels[-1].append(number)
        else:
            levels.append([number])
    return tuple(map(tuple, levels))
