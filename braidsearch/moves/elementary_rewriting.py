"""From one word to another for the same element of the braid group, by single relations."""

from __future__ import annotations

from collections.abc import Iterator, Sequence

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
        routes = list(_iter_routes(word, target))
        if not routes:
            raise InputError(f"{list(word)} and {list(target)}: expected words for one braid")
        found = min(routes, key=len)
        # Commutations that are put off make the chain shorter, hardly to less than a half.
        check_capacity(0, count_letters(word, found) // 2)
        found = postpone_commutations(word, found, target)
        if len(found) <= _SHORT:
            found = shorten_chain(word, found, 1)
    return postpone_commutations(word, found, target)


def _iter_routes(word: Letters, target: Letters) -> Iterator[list[Relation]]:
    """Ways by handle reduction, with generators and with words read from either end."""
    if len(word) + len(target) > _LONG:
        relations = _through_quotient(word, target, 1)
        if relations is not None:
            yield relations
        return
    backwards, target_backwards = word[::-1], target[::-1]
    for direction in (1, -1):
        yield from _iter_reductions(word, target, direction)
        for route in _iter_reductions(backwards, target_backwards, direction):
            yield backwards_chain(backwards, route)


def _iter_reductions(word: Letters, target: Letters, direction: int) -> Iterator[list[Relation]]:
    """Reduce both words, and what then parts them; or what parts them from the start."""
    there, back = RelationChain(word), RelationChain(target)
    for chain in (there, back):
        reduce_chain_handles(chain, direction, MAX_RELATIONS)
    middle: list[Relation] | None = []
    if there.letters != back.letters:
        middle = _through_quotient(tuple(there.letters), tuple(back.letters), direction)
    if middle is None:
        return
    yield there.relations + middle + reversed_chain(back.relations)
    forth = _through_quotient(word, target, direction)
    if forth is not None:
        yield forth
    back_again = _through_quotient(target, word, direction)
    if back_again is not None:
        yield reversed_chain(back_again)


def _through_quotient(word: Letters, target: Letters, direction: int) -> list[Relation] | None:
    """Insert target^-1 target behind the word, then reduce word target^-1, which is trivial.

    None when it is not: the words are two elements.
    """
    inserted = RelationChain(word)
    for place, letter in enumerate(reversed(target)):
        inserted.insert(len(word) + place, -letter)
    quotient = RelationChain(inserted.letters[: len(word) + len(target)])
    reduce_chain_handles(quotient, direction, MAX_RELATIONS, len(word))
    return None if quotient.letters else inserted.relations + quotient.relations
