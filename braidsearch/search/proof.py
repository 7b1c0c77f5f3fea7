"""From the path of a search to a checked and shortened chain of moves."""

from __future__ import annotations

from collections.abc import Iterable
from itertools import groupby

from braidsearch.moves import Conjugate, Move, MoveChain, Rewrite
from braidsearch.normal_form import are_equal
from braidsearch.normal_form.conjugators import short_conjugator
from braidsearch.search.visits import visit
from braidsearch.words import Braid
from braidsearch.words.handles import reduce_handles
from braidsearch.words.reduction import free_reduce_letters

_LONGEST_SHORTENED = 3_000  # moves up to which a chain is searched for detours
_LONGEST_HANDLES = 1_500  # letters up to which handles are worth reducing
_LARGEST_SPELLING = 5_000  # letters times strands up to which a normal form is worth its time


def checked_chain(
    start: Braid, moves: Iterable[Move], end: Braid, is_short: bool = False
) -> MoveChain:
    """The moves replayed with every step checked, shortened; the chain ends literally at ``end``.

    ``is_short`` says that no detour need be looked for. Raises InputError for a false step: a
    mistake of the search, never of the user.
    """
    chain = MoveChain(start)
    chain.extend(merged_moves(start, [*moves, Rewrite(end.word)]))
    if not is_short and len(chain) <= _LONGEST_SHORTENED:
        chain = without_detours(chain)
    return chain


def merged_moves(start: Braid, moves: Iterable[Move]) -> list[Move]:
    """The moves with every run of rewrites and conjugations made one move, or none."""
    merged: list[Move] = []
    draft = MoveChain(start, is_checked=False)
    for stays, group in groupby(moves, key=lambda move: isinstance(move, Rewrite | Conjugate)):
        run = list(group)
        if stays:
            by = tuple(g for move in run if isinstance(move, Conjugate) for g in move.by)
            merged.extend(_one_move(draft.current, by, run[-1].word))
        else:
            merged.extend(run)
        draft.extend(run)
    return merged


def _one_move(current: Braid, by: tuple[int, ...], word: tuple[int, ...]) -> list[Move]:
    if current.word == word:
        return []
    shortest = _shortest_spelling(by, current.strands)
    if not shortest or are_equal(current, Braid.trusted(word, current.strands)):
        return [Rewrite(word)]
    return [Conjugate(shortest, word)]


def _shortest_spelling(by: tuple[int, ...], strands: int) -> tuple[int, ...]:
    """A short word that conjugates as ``by`` does, by handles or by the normal form."""
    reduced = tuple(free_reduce_letters(by))
    if len(reduced) <= _LONGEST_HANDLES:
        reduced = reduce_handles(Braid.trusted(reduced, strands)).word
    if len(reduced) * strands > _LARGEST_SPELLING:
        return reduced
    return min(reduced, short_conjugator(reduced, strands), key=len)


def without_detours(chain: MoveChain) -> MoveChain:
    """A chain from the same start to the same end that skips what lies between conjugate stages."""
    if len(chain) < 2:
        return chain
    visits = [visit(braid) for braid in chain.braids]
    last_place = {visit.key: place for place, visit in enumerate(visits)}
    shorter = MoveChain(chain.start)
    place = 0
    while place < len(chain):
        far = last_place[visits[place].key]
        if far > place + 1:
            by = visits[place].conjugator_to(visits[far])
            shorter.extend(_one_move(chain.braids[place], by, chain.braids[far].word))
            place = far
        else:
            shorter.append(chain.moves[place])
            place += 1
    return shorter if len(shorter) < len(chain) else chain
