"""Handle reduction, written out in single relations."""

from __future__ import annotations

from itertools import pairwise

from braidsearch.moves.elementary_relations import RelationChain, is_far


def reduce_chain_handles(chain: RelationChain, direction: int, most: int, first: int = 0) -> bool:
    """Reduce handles until none is left; False when ``most`` relations did not suffice.

    A handle is sigma_i^e v sigma_i^-e where v has no sigma_i and no sigma_(i-d), and
    sigma_(i+d) in one sign only, d = ``direction`` (1, or -1 for the word turned over). Handles
    that end at the letter ``first`` or behind it go first, with those alone that they hold.
    Without handles, a word for the trivial braid is empty, and every order comes to an end
    (Dehornoy, A fast method for comparing braids, 1997).
    """
    for begin in sorted({first, 0}, reverse=True):
        end = begin
        while end < len(chain.letters):
            start = _frame_start(chain.letters, end, direction)
            if start is None:
                end += 1
                continue
            _reduce_frame(chain, start, end, direction, most)
            if len(chain.relations) > most:
                return False
            end = start
    return True


def _frame_start(letters: list[int], end: int, direction: int) -> int | None:
    """The place of the letter that makes, with the one at ``end``, the ends of a frame.

    A frame is a handle, but that sigma_(i+d) may stand in it in both signs: it holds handles then.
    """
    letter = letters[end]
    index = abs(letter)
    barred = index - direction
    for place in range(end - 1, -1, -1):
        other = abs(letters[place])
        if other == index:
            return place if letters[place] == -letter else None
        if other == barred:
            return None
    return None


def _reduce_frame(chain: RelationChain, start: int, end: int, direction: int, most: int) -> None:
    """Reduce the handles inside, then the handle that is left; gives up beyond ``most``."""
    letters = chain.letters
    following = abs(letters[start]) + direction
    while len(chain.relations) <= most:
        places = [k for k in range(start + 1, end) if abs(letters[k]) == following]
        inner = next(
            ((one, other) for one, other in pairwise(places) if letters[one] == -letters[other]),
            None,
        )
        if inner is None:
            _reduce_handle(chain, start, end, places)
            return
        length = len(letters)
        _reduce_frame(chain, *inner, direction, most)
        end += len(letters) - length


def _reduce_handle(chain: RelationChain, start: int, end: int, places: list[int]) -> None:
    """Push the first letter a through all that the handle encloses, until it cancels.

    ``places`` are those of the letters b with the next index: a b a^-1 is changed by the braid
    relation; where a^-1 does not follow yet, a^-1 a is inserted first.
    """
    letters = chain.letters
    if not places:
        chain.carry(start, end - 1)
        chain.cancel(end - 1)
        return
    at, closing = start, end
    for number in range(1, len(places) + 1):
        while is_far(letters[at], letters[at + 1]):
            chain.commute(at)
            at += 1
        if number < len(places):
            chain.insert(at + 2, -letters[at])
            closing += 2
        else:
            chain.carry(closing, at + 2)
        chain.braid(at)
        at += 3
