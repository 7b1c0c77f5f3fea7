"""From one word to another for a conjugate braid: letters around, relations inside."""

from __future__ import annotations

from collections.abc import Iterator
from functools import partial

from braidsearch.errors import CapacityError, InputError
from braidsearch.moves.elementary_handles import reduce_chain_handles
from braidsearch.moves.elementary_relations import (
    Letters,
    Relation,
    RelationChain,
    check_capacity,
    count_essential,
    is_far,
)
from braidsearch.moves.elementary_rewriting import rewrite_relations
from braidsearch.moves.elementary_search import words_of_chain
from braidsearch.moves.elementary_traces import iter_links
from braidsearch.normal_form import left_normal_form
from braidsearch.words import Braid
from braidsearch.words.handles import reduce_handles, reduce_handles_turned
from braidsearch.words.reduction import find_rotation

_LETTER_COST = 2
"""How many relations it may cost to make the word one letter shorter, in the middle of the way."""

_MOST_RELATIONS = 60
"""The most relations that are tried to make the word shorter, far commutations included."""

_MOST_LETTERS_FOR_BOTH = 60
"""Up to so many letters in both words and the conjugator, both directions are tried."""

_LONG = 300
"""Beyond so many letters in a word and its conjugator, letters go as they stand."""

_LONGEST_CONJUGATOR = 2_000
"""Beyond so many letters in a word and its conjugator, no shorter conjugator is looked for."""

_MOST_GROWTH = 60
"""By so many letters a word may grow before a shorter one for the same element is looked for."""

_MANY_PARTS = 2_000
"""Beyond so many, keeping words shorter is tried too, and what has fewer letters is taken."""

_WORTH_IT = 0.6
"""The part of its length to which the other must come down to be taken."""

_MOST_STRANDS_TO_TWIST = 12
"""A full twist on n strands has n (n - 1) letters: on more strands it makes nothing shorter."""

Part = Relation | int
"""A relation, or the letter a by which the whole word is conjugated: a^-1 in front, a behind."""


def conjugate_parts(word: Letters, by: Letters, target: Letters, strands: int) -> list[Part]:
    """Relations and conjugations by letters that lead from ``word`` to ``target``.

    The caller knows that target = by^-1 word by; any conjugator that does the same will do. For
    small words both directions are tried, since the words between may be longer in one of them.
    """
    rotation = find_rotation(Braid.trusted(word, strands), Braid.trusted(target, strands))
    if rotation is not None:
        return _rotate(word, rotation)
    if len(word) + len(by) > _LONG:
        return _conjugate_by_long(word, by, target, strands)
    waiting = _short_conjugator(word, by, strands)
    there = _conjugate_by_letters(word, waiting, target, strands, _MOST_GROWTH)
    if len(there) > _MANY_PARTS:
        closer = _conjugate_by_letters(word, waiting, target, strands, _MOST_GROWTH // 4)
        return min(there, closer, key=partial(_count_letters, word))
    if len(word) + len(waiting) + len(target) > _MOST_LETTERS_FOR_BOTH:
        return there
    back = _conjugate_by_letters(target, _inverse(waiting), word, strands, _MOST_GROWTH)
    return there if len(there) <= len(back) else _reversed_parts(back, len(word))


def _conjugate_by_long(word: Letters, by: Letters, target: Letters, strands: int) -> list[Part]:
    """The same for a long conjugator, as it stands or as the shortest: what has fewer letters.

    Raises CapacityError where neither fits into a certificate.
    """
    found, failure = [], None
    for waiting in dict.fromkeys((by, _shortest_conjugator(word, by, strands))):
        for growth in (_MOST_GROWTH, _MOST_GROWTH // 4):
            try:
                found.append(_conjugate_by_letters(word, waiting, target, strands, growth))
            except CapacityError as error:
                failure = error
    if failure is not None and not found:
        raise failure
    return min(found, key=partial(_count_letters, word))


def _count_letters(word: Letters, parts: list[Part]) -> int:
    """How many letters all words have together that the parts lead to."""
    letters, length = 0, len(word)
    for part in parts:
        length += 2 if isinstance(part, int) else len(part.after) - len(part.before)
        letters += length
    return letters


def _conjugate_by_letters(
    word: Letters, waiting: Letters, target: Letters, strands: int, growth: int
) -> list[Part]:
    """Conjugate by one letter after the other, taking away between them what cancels cheaply.

    A word that has grown by more letters than ``growth`` is exchanged for the shortest that is seen
    for its element, since every later step is one on all its letters.
    """
    parts: list[Part] = []
    letters = 0
    bound = max(len(word), len(target)) + growth
    while waiting:
        letters += len(word)
        check_capacity(len(parts), letters)
        place, reduced = _best_letter(word, waiting)
        letter = waiting[place]
        waiting = waiting[:place] + waiting[place + 1 :]
        parts.append(letter)
        parts += reduced
        word = words_of_chain((-letter, *word, letter), reduced)[-1]
        if bound < len(word) <= _LONG:
            shorter = _shorter_word(word, strands)
            if len(shorter) < _WORTH_IT * len(word):
                parts += rewrite_relations(word, shorter)
                word = shorter
            bound = len(word) + growth
    return parts + rewrite_relations(word, target)


def _shorter_word(word: Letters, strands: int) -> Letters:
    """The shortest word that is seen for the same element."""
    braid = Braid.trusted(word, strands)
    candidates = [reduce_handles(braid), reduce_handles_turned(braid)]
    normal = left_normal_form(braid).to_braid()
    candidates += [normal, reduce_handles(normal), reduce_handles_turned(normal)]
    return min((candidate.word for candidate in candidates), key=len)


def _reversed_parts(parts: list[Part], length: int) -> list[Part]:
    """The way back. To undo a conjugation by a, conjugate by a^-1 and cancel at both ends.

    ``length`` is that of the word to which the parts lead.
    """
    back: list[Part] = []
    for part in reversed(parts):
        if isinstance(part, int):
            length -= 2
            back += [-part, Relation(0, (part, -part), ()), Relation(length, (part, -part), ())]
        else:
            length += len(part.before) - len(part.after)
            back.append(part.reversed())
    return back


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
    """The shortest of the words seen for a conjugator that does the same as ``by``."""
    fronts = _commuting_words(word, strands)
    candidates = [reduce_handles(Braid.trusted(front + by, strands)).word for front in fronts]
    return min((by, *candidates), key=len)


def _shortest_conjugator(word: Letters, by: Letters, strands: int) -> Letters:
    """The same for long ones: one power after the other, as long as the conjugator gets shorter."""
    if len(word) + len(by) > _LONGEST_CONJUGATOR:
        return by
    fronts = _commuting_words(word, strands)
    shortest = by
    while True:
        found = min((_shorter_word(front + shortest, strands) for front in fronts), key=len)
        if len(found) >= len(shortest):
            return shortest
        shortest = found


def _commuting_words(word: Letters, strands: int) -> list[Letters]:
    """What commutes with the braid and may stand in front: its own powers, and full twists."""
    twist = tuple(range(1, strands)) * strands if strands <= _MOST_STRANDS_TO_TWIST else ()
    twists = dict.fromkeys(((), twist, _inverse(twist)))
    return [front + turns for front in ((), word, _inverse(word)) for turns in twists]


def _best_letter(word: Letters, waiting: Letters) -> tuple[int, list[Relation]]:
    """The letter of the conjugator to go first, of those that can, and what then cancels."""
    if len(word) + len(waiting) > _LONG:
        return 0, _cancel_ends(word, waiting[0])
    best: tuple[int, int, list[Relation]] | None = None
    for place in _iter_front(waiting):
        letter = waiting[place]
        relations = _reduce((-letter, *word, letter))
        growth = sum(len(after) - len(before) for _, before, after in relations)
        cost = _LETTER_COST * growth + count_essential(relations)
        if best is None or cost < best[0]:
            best = cost, place, relations
    if best is None:
        raise InputError("the empty conjugator: expected a letter")
    return best[1], best[2]


def _cancel_ends(word: Letters, letter: int) -> list[Relation]:
    """What cancels at once when the word is conjugated by the letter."""
    relations = []
    length = len(word) + 2
    if word and word[0] == letter:
        relations.append(Relation(0, (-letter, letter), ()))
        length -= 2
    if len(word) > len(relations) and word[-1] == -letter:
        relations.append(Relation(length - 2, (-letter, letter), ()))
    return relations


def _iter_front(word: Letters) -> Iterator[int]:
    """The places of the letters that far commutations can bring to the front."""
    for place, letter in enumerate(word):
        if all(is_far(letter, other) for other in word[:place]):
            yield place


def _reduce(word: Letters) -> list[Relation]:
    """Cancellations after far commutations; handle reduction too, where that pays."""
    relations: list[Relation] = []
    while True:
        link = next((link for link in iter_links(word) if len(link.places) == 2), None)
        if link is None:
            break
        relations += link.relations()
        word = link.after
    best: list[Relation] = []
    cost = _LETTER_COST * len(word)
    for direction in (1, -1):
        chain = RelationChain(word)
        if reduce_chain_handles(chain, direction, _MOST_RELATIONS):
            found = _LETTER_COST * len(chain.letters) + count_essential(chain.relations)
            if found < cost:
                best, cost = chain.relations, found
    return relations + best


def _inverse(word: Letters) -> Letters:
    return tuple(-letter for letter in reversed(word))
