"""Chains of relations made shorter: loops cut out, short cuts taken piece by piece."""

from __future__ import annotations

from collections.abc import Sequence

from braidsearch.moves.elementary_order import postpone_commutations
from braidsearch.moves.elementary_relations import Letters, Relation
from braidsearch.moves.elementary_search import shorten_chain, words_of_chain

_WINDOW = 24
_MOST_PASSES = 4


def shorten_relations(word: Letters, relations: Sequence[Relation]) -> list[Relation]:
    """A chain between the same words that is not longer."""
    shorter = cut_loops(word, relations)
    for number in range(_MOST_PASSES):
        before = len(shorter)
        shorter = cut_loops(word, _shorten_windows(word, shorter, number % 2 * _WINDOW // 2))
        if len(shorter) > before - 2 and number:
            break
    return shorter


def cut_loops(word: Letters, relations: Sequence[Relation]) -> list[Relation]:
    """The chain without the parts that lead back to a word where it has been."""
    words = words_of_chain(word, relations)
    last = {letters: place for place, letters in enumerate(words)}
    kept: list[Relation] = []
    place = last[word]
    while place < len(relations):
        kept.append(relations[place])
        place = last[words[place + 1]]
    return kept


def _shorten_windows(word: Letters, relations: list[Relation], offset: int) -> list[Relation]:
    """Short cuts within runs of relations, each run seen on the letters alone that it touches."""
    words = words_of_chain(word, relations)
    made: list[Relation] = relations[:offset]
    for start in range(offset, len(relations), _WINDOW):
        run = relations[start : start + _WINDOW]
        made += _shorten_run(words[start : start + len(run) + 1], run)
    return made


def _shorten_run(words: Sequence[Letters], run: list[Relation]) -> list[Relation]:
    left = min(relation.at for relation in run)
    right = min(
        len(letters) - relation.at - len(relation.before)
        for letters, relation in zip(words, run, strict=False)
    )
    first, last = (letters[left : len(letters) - right] for letters in (words[0], words[-1]))
    found = shorten_chain(first, [relation.shifted(-left) for relation in run], 1)
    found = postpone_commutations(first, found, last)
    return [relation.shifted(left) for relation in found] if len(found) < len(run) else run
