"""The single relations between braid words, and chains of them on one word."""

from __future__ import annotations

from collections.abc import Iterable, Iterator, Sequence
from typing import NamedTuple

from braidsearch.errors import CapacityError, InputError

Letters = tuple[int, ...]

MAX_RELATIONS = 100_000
"""The longest chain of relations: a certificate holds no more moves."""


MAX_LETTERS_IN_ALL = 16_000_000 // 3
"""The most letters of all words of a chain together.

A certificate file has 16,000,000 bytes at most, and each letter takes three or more of them.
"""


class Relation(NamedTuple):
    """One relation where it acts: from index ``at`` (from 0), ``before`` becomes ``after``.

    Four shapes: () and x x^-1 (insertion); x x^-1 and () (cancellation); x y and y x with indices
    that differ by more than 1 (far commutation); and i^e j^f i^g with |i - j| = 1, which becomes
    j^g i^f j^e (the braid relation). For one sign that is the relation i j i = j i j of Artin
    (Theory of braids, 1947). For other signs, unless e = g = -f, it follows from it, as in
    i j i^-1 = j^-1 (j i j) i^-1 = j^-1 (i j i) i^-1 = j^-1 i j.
    """

    at: int
    before: Letters
    after: Letters

    def reversed(self) -> Relation:
        """The same relation, read from right to left."""
        return Relation(self.at, self.after, self.before)

    def shifted(self, places: int) -> Relation:
        """The same relation so many places to the right."""
        return Relation(self.at + places, self.before, self.after)


def is_far(one: int, other: int) -> bool:
    """Whether two letters commute by a relation: their indices differ by more than 1."""
    return abs(abs(one) - abs(other)) > 1


def braid_relation(first: int, middle: int, last: int) -> Letters | None:
    """What the braid relation makes of three letters; None where it does not apply."""
    if abs(first) != abs(last) or abs(abs(first) - abs(middle)) != 1:
        return None
    if (first > 0) == (last > 0) != (middle > 0):
        return None
    outer, inner = abs(first), abs(middle)
    return (
        inner if last > 0 else -inner,
        outer if middle > 0 else -outer,
        inner if first > 0 else -inner,
    )


def check_capacity(steps: int, letters: int) -> None:
    """Raise CapacityError for more steps, or letters in all, than a certificate can hold."""
    for count, most, name in (
        (steps, MAX_RELATIONS, "elementary steps"),
        (letters, MAX_LETTERS_IN_ALL, "letters in all elementary steps"),
    ):
        if count > most:
            raise CapacityError(
                f"more than {most} {name}: expected no more than a certificate holds"
            )


def is_relation(relation: Relation) -> bool:
    """Whether the letters before and after are those of a single relation."""
    _, before, after = relation
    if len(before) == 3:
        return braid_relation(*before) == after
    if len(before) == 2 and after:
        return after == before[::-1] and is_far(*before)
    pair = before or after
    return len(before) + len(after) == 2 and len(pair) == 2 and pair[0] == -pair[1]


def apply_relation(word: Letters, relation: Relation) -> Letters:
    """The word after the relation. Raises InputError where it does not apply."""
    at, before, after = relation
    end = at + len(before)
    if not is_relation(relation) or not 0 <= at <= len(word) or word[at:end] != before:
        raise InputError(f"{relation}: expected a relation that applies to {list(word)}")
    return word[:at] + after + word[end:]


def iter_relations(word: Letters) -> Iterator[Relation]:
    """All relations that apply to the word, insertions left out."""
    for at in range(len(word) - 1):
        first, second = word[at], word[at + 1]
        if first == -second:
            yield Relation(at, (first, second), ())
        elif is_far(first, second):
            yield Relation(at, (first, second), (second, first))
        elif first != second and at + 2 < len(word):
            after = braid_relation(first, second, word[at + 2])
            if after is not None:
                yield Relation(at, word[at : at + 3], after)


def count_essential(relations: Iterable[Relation]) -> int:
    """How many of the relations are no far commutations."""
    return sum(len(before) != 2 or not after for _, before, after in relations)


def count_letters(word: Letters, relations: Iterable[Relation]) -> int:
    """How many letters all words have together that the relations lead to."""
    letters, length = 0, len(word)
    for _, before, after in relations:
        length += len(after) - len(before)
        letters += length
    return letters


def reversed_chain(relations: Sequence[Relation]) -> list[Relation]:
    """The relations that lead back, last one first."""
    return [relation.reversed() for relation in reversed(relations)]


def backwards_chain(word: Letters, relations: Iterable[Relation]) -> list[Relation]:
    """The chain that acts on ``word`` read from right to left as the relations act on ``word``.

    Every relation read backwards is a relation again.
    """
    chain = []
    length = len(word)
    for at, before, after in relations:
        chain.append(Relation(length - at - len(before), before[::-1], after[::-1]))
        length += len(after) - len(before)
    return chain


class RelationChain:
    """Letters that change by one relation after another, and the relations made so far.

    Raises CapacityError for more relations than a certificate can hold.
    """

    def __init__(self, letters: Iterable[int]) -> None:
        self.letters = list(letters)
        self.relations: list[Relation] = []

    def _replace(self, at: int, length: int, after: Letters) -> None:
        if len(self.relations) >= MAX_RELATIONS:
            check_capacity(len(self.relations) + 1, 0)
        before = tuple(self.letters[at : at + length])
        self.relations.append(Relation(at, before, after))
        self.letters[at : at + length] = after

    def insert(self, at: int, letter: int) -> None:
        """Insert the letter and its inverse."""
        self._replace(at, 0, (letter, -letter))

    def cancel(self, at: int) -> None:
        """Take two inverse letters away, which stand at ``at`` and behind it."""
        self._replace(at, 2, ())

    def commute(self, at: int) -> None:
        """Exchange two letters with distant indices."""
        self._replace(at, 2, (self.letters[at + 1], self.letters[at]))

    def braid(self, at: int) -> None:
        """Apply the braid relation to three letters. Raises InputError where there is none."""
        after = braid_relation(*self.letters[at : at + 3])
        if after is None:
            raise InputError(f"{self.letters[at : at + 3]}: expected letters of a braid relation")
        self._replace(at, 3, after)

    def carry(self, start: int, end: int) -> None:
        """Move the letter at ``start`` to ``end`` past letters that commute with it."""
        for at in range(start, end):
            self.commute(at)
        for at in range(start - 1, end - 1, -1):
            self.commute(at)
