"""From one word to another for a conjugate braid: single letters around, single relations inside."""

from __future__ import annotations

from collections.abc import Iterator

from braidsearch.moves.elementary_handles import reduce_chain_handles
from braidsearch.moves.elementary_relations import (
    MAX_RELATIONS,
    Letters,
    Relation,
    RelationChain,
    is_far,
    reversed_chain,
)
from braidsearch.moves.elementary_rewriting import rewrite_relations
from braidsearch.moves.elementary_search import words_of_chain
from braidsearch.moves.elementary_traces import iter_links
from braidsearch.words import Braid
from braidsearch.words.handles import reduce_handles, reduce_handles_turned
from braidsearch.words.reduction import find_rotation, free_reduce_letters

Part = Relation | int
"""A relation, or the letter a by which the whole word is conjugated: a^-1 in front, a behind."""


def conjugate_parts(word: Letters, by: Letters, target: Letters, strands: int) -> list[Part]:
    """Relations and conjugations by letters that lead from ``word`` to ``target``.

    The caller knows that target = by^-1 word by; any conjugator that does the same will do.
    """
    rotation = find_rotation(Braid.trusted(word, strands), Braid.trusted(target, strands))
    if rotation is not None:
        return _rotate(word, rotation)
    parts: list[Part] = []
    current = word
    waiting = _short_conjugator(word, by, strands)
    while waiting:
        place, reduced = _best_letter(current, waiting, strands)
        letter = waiting[place]
        waiting = waiting[:place] + waiting[place + 1 :]
        parts.append(letter)
        parts += reduced
        current = words_of_chain((-letter, *current, letter), reduced)[-1]
    return parts + rewrite_relations(current, target)


def _rotate(word: Letters, rotation: int) -> list[Part]:
    """Move so many letters from the front to the end, or the others from the end to the front."""
    parts: list[Part] = []
    length = len(word)
    if rotation <= length - rotation:
        for letter in word[:rotation]:
            parts += [letter, Relation(0, (-letter, letter), ())]
    else:
        for letter in reversed(word[rotation:]):
            parts += [-letter, Relation(length, (letter, -letter), ())]
    return parts


def _short_conjugator(word: Letters, by: Letters, strands: int) -> Letters:
    """The shortest of the words seen for a conjugator that does the same as ``by``.

    What commutes with the braid may stand in front: its own powers, and full twists.
    """
    twist = tuple(range(1, strands)) * strands
    inverse_twist, inverse = _inverse(twist), _inverse(word)
    candidates = [by]
    for front in ((), word, inverse, word * 2, inverse * 2):
        for turns in ((), twist, inverse_twist):
            braid = Braid.trusted(front + turns + by, strands)
            candidates += [reduce_handles(braid).word, reduce_handles_turned(braid).word]
    return min(candidates, key=len)


def _best_letter(word: Letters, waiting: Letters, strands: int) -> tuple[int, list[Relation]]:
    """Which letter of the conjugator goes first, of those that can, and what it lets cancel."""
    best: tuple[int, int, int, list[Relation]] | None = None
    for place in _iter_front(waiting):
        letter = waiting[place]
        start = (-letter, *word, letter)
        relations = _reduce(start)
        length = len(start) + sum(len(r.after) - len(r.before) for r in relations)
        found = (length, len(relations), place, relations)
        if best is None or found[:3] < best[:3]:
            best = found
    assert best is not None
    return best[2], best[3]


def _iter_front(word: Letters) -> Iterator[int]:
    """The places of the letters that far commutations can bring to the front."""
    for place, letter in enumerate(word):
        if all(is_far(letter, other) for other in word[:place]):
            yield place


def _reduce(word: Letters) -> list[Relation]:
    """Cancellations after far commutations; handle reduction where that gives a shorter word."""
    relations: list[Relation] = []
    while True:
        link = next((link for link in iter_links(word) if len(link.places) == 2), None)
        if link is None:
            break
        relations += link.relations()
        word = link.after
    chains = []
    for direction in (1, -1):
        chain = RelationChain(word)
        if reduce_chain_handles(chain, direction, 200) and len(chain.letters) < len(word):
            chains.append(chain)
    if not chains:
        return relations
    best = min(chains, key=lambda chain: (len(chain.letters), len(chain.relations)))
    return relations + best.relations


def _inverse(word: Letters) -> Letters:
    return tuple(-letter for letter in reversed(word))
