"""Handle reduction, written out in single relations."""

from __future__ import annotations

from braidsearch.moves.elementary_relations import RelationChain, is_far


def reduce_chain_handles(chain: RelationChain, direction: int, most: int) -> bool:
    """Reduce handles until none is left; False when ``most`` relations did not suffice.

    A handle is sigma_i^e v sigma_i^-e where v has no sigma_i and no sigma_(i-d), and
    sigma_(i+d) in one sign only, d = ``direction`` (1, or -1 for the word turned over). The handle
    that ends first holds no other. Without handles, a word for the trivial braid is empty
    (Dehornoy, A fast method for comparing braids, 1997).
    """
    end = 0
    while end < len(chain.letters):
        start = _handle_start(chain.letters, end, direction)
        if start is None:
            end += 1
            continue
        _reduce_handle(chain, start, end, direction)
        if len(chain.relations) > most:
            return False
        end = start
    return True


def _handle_start(letters: list[int], end: int, direction: int) -> int | None:
    """The place of the letter with which the one at ``end`` closes a handle, if it closes one."""
    letter = letters[end]
    index = abs(letter)
    neighbour = 0
    for place in range(end - 1, -1, -1):
        other = letters[place]
        if other == -letter:
            return place
        if other == letter or abs(other) == index - direction:
            return None
        if abs(other) == index + direction:
            if neighbour == -other:
                return None
            neighbour = other
    return None


def _reduce_handle(chain: RelationChain, start: int, end: int, direction: int) -> None:
    """Push the first letter of the handle through all that it encloses, until it cancels.

    a b a^-1 becomes b^-(e) a^(f) b^(e) by the braid relation; where a^-1 is not there yet, a^-1 a
    is inserted first.
    """
    letters = chain.letters
    index = abs(letters[start])
    places = [k for k in range(start + 1, end) if abs(letters[k]) == index + direction]
    if not places:
        chain.carry(start, end - 1)
        chain.cancel(end - 1)
        return
    at, closing = start, end
    for number, _ in enumerate(places):
        while is_far(letters[at], letters[at + 1]):
            chain.commute(at)
            at += 1
        if number < len(places) - 1:
            chain.insert(at + 2, -letters[at])
            closing += 2
        else:
            chain.carry(closing, at + 2)
        chain.braid(at)
        at += 3
