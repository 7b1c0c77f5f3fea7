"""Handle reduction: a fast way to a short word for the same element of the braid group."""

from __future__ import annotations

from braidsearch.words.braid import Braid
from braidsearch.words.half_twist import flip_letters
from braidsearch.words.reduction import free_reduce_letters

_ROUNDS_PER_LETTER = 50
_GROWTH = 4


def reduce_handles(braid: Braid) -> Braid:
    """A word for the same element without handles; mostly a short one.

    A handle is sigma_j^e v sigma_j^-e where v has no sigma_(j-1) and no sigma_j, and sigma_(j+1)
    in one sign only; pushing the strand across takes both sigma_j away. Dehornoy, A fast method
    for comparing braids, 1997. When the word grows beyond four times its length, or the count of
    rounds runs out, the shortest word met is returned.
    """
    word = free_reduce_letters(braid.word)
    best = word
    for _ in range(_ROUNDS_PER_LETTER * (len(word) + 1)):
        handle = _first_handle(word)
        if handle is None:
            break
        word = free_reduce_letters(_without_handle(word, *handle))
        if len(word) > _GROWTH * (len(best) + 8):
            break
        if len(word) <= len(best):
            best = word
    return Braid.trusted(tuple(best), braid.strands)


def reduce_handles_turned(braid: Braid) -> Braid:
    """The same with the word turned over: handles of the last generator go first."""
    strands = braid.strands
    turned = reduce_handles(Braid.trusted(flip_letters(braid.word, strands), strands))
    return Braid.trusted(flip_letters(turned.word, strands), strands)


def _first_handle(word: list[int]) -> tuple[int, int] | None:
    """The places (first, last) of the handle that ends first; it holds no other handle."""
    last_place: dict[int, int] = {}
    for place, letter in enumerate(word):
        index = abs(letter)
        start = last_place.get(index)
        if start is not None and word[start] == -letter and _is_handle(word, start, place):
            return start, place
        last_place[index] = place
    return None


def _is_handle(word: list[int], start: int, place: int) -> bool:
    index = abs(word[place])
    signs = set()
    for letter in word[start + 1 : place]:
        if abs(letter) == index - 1:
            return False
        if abs(letter) == index + 1:
            signs.add(letter > 0)
    return len(signs) < 2


def _without_handle(word: list[int], start: int, place: int) -> list[int]:
    index, sign = abs(word[start]), 1 if word[start] > 0 else -1
    above = index + 1
    inside: list[int] = []
    for letter in word[start + 1 : place]:
        if abs(letter) == above:
            middle = index if letter > 0 else -index
            inside.extend((-sign * above, middle, sign * above))
        else:
            inside.append(letter)
    return word[:start] + inside + word[place + 1 :]
