"""From the path of a search to a checked and shortened chain of moves."""

from __future__ import annotations

from collections.abc import Iterable
from itertools import groupby

from braidsearch.moves import Conjugate, Move, MoveChain, Rewrite
from braidsearch.normal_form import are_equal
from braidsearch.normal_form.conjugacy import ClassKey, conjugacy_class, find_conjugator
from braidsearch.words import Braid
from braidsearch.words.handles import reduce_handles

_SHORTCUT_CAP = 200
_LONGEST_SHORTENED = 400


def checked_chain(start: Braid, moves: Iterable[Move], end: Braid) -> MoveChain:
    """The moves replayed with every step checked, shortened; the chain ends literally at ``end``.

    Raises InputError for a false step: a mistake of the search, never of the user.
    """
    chain = MoveChain(start)
    chain.extend(merged_moves(start, [*moves, Rewrite(end.word)]))
    if len(chain) <= _LONGEST_SHORTENED:
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
    shortest = reduce_handles(Braid.trusted(by, current.strands)).word
    if not shortest or are_equal(current, Braid.trusted(word, current.strands)):
        return [Rewrite(word)]
    return [Conjugate(shortest, word)]


def without_detours(chain: MoveChain) -> MoveChain:
    """A chain from the same start to the same end that skips what lies between conjugate stages."""
    keys = [conjugacy_class(braid, _SHORTCUT_CAP).key for braid in chain.braids]
    last_place: dict[ClassKey, int] = {key: place for place, key in enumerate(keys)}
    shorter = MoveChain(chain.start)
    place = 0
    while place < len(chain):
        far = last_place[keys[place]]
        if far > place + 1:
            by = find_conjugator(chain.braids[place], chain.braids[far], _SHORTCUT_CAP)
            if by is not None:
                shorter.extend(_one_move(chain.braids[place], by, chain.braids[far].word))
                place = far
                continue
        shorter.append(chain.moves[place])
        place += 1
    return shorter if len(shorter) < len(chain) else chain
