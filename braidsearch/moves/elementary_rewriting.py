"""From one word to another for the same element of the braid group, by single relations."""

from __future__ import annotations

from collections.abc import Sequence
from itertools import product

from braidsearch.errors import InputError
from braidsearch.moves.elementary_handles import reduce_chain_handles
from braidsearch.moves.elementary_order import postpone_commutations
from braidsearch.moves.elementary_relations import (
    MAX_RELATIONS,
    Letters,
    Relation,
    RelationChain,
    backwards_chain,
    check_capacity,
    count_letters,
    reversed_chain,
)
from braidsearch.moves.elementary_search import search_relations, shorten_chain
from braidsearch.moves.elementary_vertices import iter_blocks

_MOST_WORDS = 60
"""How many words the direct search sees before handles are reduced instead."""

_LONG = 200
"""Beyond so many letters in both words together, one route has to do."""

_SHORT = 40
"""The most relations of a chain in whose neighbourhood a shorter one is looked for."""


def rewrite_relations(word: Letters, target: Letters) -> list[Relation]:
    """Single relations that lead from ``word`` to ``target``, as few as the routes below find.

    Where both words pass through the same element they are cut, and each pair of pieces is joined
    by itself: by a direct search, or by handle reduction. Raises InputError when they are not the
    same element, CapacityError for more relations than a certificate can hold.
    """
    blocks = list(iter_blocks(word, target))
    try:
        return _join_blocks(blocks)
    except InputError:
        if len(blocks) == 1:
            raise
        return _join(word, target)  # prefixes that only look equal were taken for equal


def _join_blocks(blocks: Sequence[tuple[Letters, Letters]]) -> list[Relation]:
    """Work from left to right: what stands on the left of a block is its part of the target."""
    relations: list[Relation] = []
    done = 0
    for before, after in blocks:
        if before != after:
            relations += [relation.shifted(done) for relation in _join(before, after)]
        done += len(after)
    return relations


def _join(word: Letters, target: Letters) -> list[Relation]:
    found = None
    if len(word) + len(target) <= _LONG:
        found = search_relations(word, target, _MOST_WORDS)
    if found is None:
        found = _shortest_route(word, target)
        if found is None:
            raise InputError(f"{list(word)} and {list(target)}: expected words for one braid")
        # Commutations that are put off make the chain shorter, hardly to less than a half.
        check_capacity(0, count_letters(word, found) // 2)
        found = postpone_commutations(word, found, target)
        if len(found) <= _SHORT:
            found = shorten_chain(word, found, 1)
    return postpone_commutations(word, found, target)


def _shortest_route(word: Letters, target: Letters) -> list[Relation] | None:
    """The best way by handle reduction, with generators and words read from either end.

    None where the words are two elements. A route is given up when it is longer than the best.
    """
    if len(word) + len(target) > _LONG:
        return _reduce_quotient(word, target, 1, MAX_RELATIONS)
    best: list[Relation] | None = None
    for route, direction, is_backwards in product(_ROUTES, (1, -1), (False, True)):
        most = MAX_RELATIONS if best is None else len(best) - 1
        if is_backwards:
            found = route(word[::-1], target[::-1], direction, most)
            found = None if found is None else backwards_chain(word[::-1], found)
        else:
            found = route(word, target, direction, most)
        if best is None and found is None:
            return None
        if found is not None and (best is None or len(found) < len(best)):
            best = found
    return best


def _reduce_quotient(
    word: Letters, target: Letters, direction: int, most: int
) -> list[Relation] | None:
    """Insert target^-1 target behind the word, then reduce word target^-1, which is trivial.

    None when it is not, since the words are two elements; and beyond ``most`` relations.
    """
    inserted = RelationChain(word)
    for place, letter in enumerate(reversed(target)):
        inserted.insert(len(word) + place, -letter)
    quotient = RelationChain(inserted.letters[: len(word) + len(target)])
    reduce_chain_handles(quotient, direction, most - len(target), len(word))
    return None if quotient.letters else inserted.relations + quotient.relations


def _reduce_other_quotient(
    word: Letters, target: Letters, direction: int, most: int
) -> list[Relation] | None:
    """The same from the target, read back."""
    back = _reduce_quotient(target, word, direction, most)
    return None if back is None else reversed_chain(back)


def _reduce_both(
    word: Letters, target: Letters, direction: int, most: int
) -> list[Relation] | None:
    """Reduce the handles of both words first, then what still parts them."""
    there, back = RelationChain(word), RelationChain(target)
    for chain in (there, back):
        if not reduce_chain_handles(chain, direction, most):
            return None
    middle: list[Relation] | None = []
    if there.letters != back.letters:
        room = most - len(there.relations) - len(back.relations)
        middle = _reduce_quotient(tuple(there.letters), tuple(back.letters), direction, room)
    return None if middle is None else there.relations + middle + reversed_chain(back.relations)


_ROUTES = (_reduce_quotient, _reduce_other_quotient, _reduce_both)
