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
    reversed_chain,
)
from braidsearch.moves.elementary_search import search_relations
from braidsearch.moves.elementary_shortening import shorten_relations
from braidsearch.moves.elementary_vertices import iter_blocks

_MOST_WORDS = 120
"""How many words the direct search sees before handles are reduced instead."""


def rewrite_relations(word: Letters, target: Letters) -> list[Relation]:
    """Single relations that lead from ``word`` to ``target``, as few as the routes below find.

    Where both words pass through the same element they are cut, and each pair of pieces is joined
    by itself: by a direct search, or by handle reduction. Raises InputError when they are not the
    same element, CapacityError for more relations than a certificate can hold.
    """
    blocks = list(iter_blocks(word, target))
    try:
        relations = _join_blocks(blocks)
    except InputError:
        if len(blocks) == 1:
            raise
        relations = _join_blocks([(word, target)])  # prefixes that only look equal were taken
    return shorten_relations(word, relations)


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
    found = search_relations(word, target, _MOST_WORDS)
    if found is None:
        routes = list(_iter_routes(word, target))
        if not routes:
            raise InputError(f"{list(word)} and {list(target)}: expected words for one braid")
        found = min(routes, key=len)
    return postpone_commutations(word, found, target)


def _iter_routes(word: Letters, target: Letters) -> Iterator[list[Relation]]:
    """Ways by handle reduction, from both ends of the generators."""
    for direction in (1, -1):
        there, back = RelationChain(word), RelationChain(target)
        reduce_chain_handles(there, direction, MAX_RELATIONS)
        reduce_chain_handles(back, direction, MAX_RELATIONS)
        if there.letters == back.letters:
            yield there.relations + reversed_chain(back.relations)
            continue
        middle = _through_quotient(tuple(there.letters), tuple(back.letters), direction)
        if middle is not None:
            yield there.relations + middle + reversed_chain(back.relations)


def _through_quotient(word: Letters, target: Letters, direction: int) -> list[Relation] | None:
    """Insert target^-1 target behind the word, then reduce word target^-1, which is trivial.

    None when it is not: the words are two elements.
    """
    inserted = RelationChain(word)
    for place, letter in enumerate(reversed(target)):
        inserted.insert(len(word) + place, -letter)
    quotient = RelationChain(inserted.letters[: len(word) + len(target)])
    reduce_chain_handles(quotient, direction, MAX_RELATIONS)
    return None if quotient.letters else inserted.relations + quotient.relations
