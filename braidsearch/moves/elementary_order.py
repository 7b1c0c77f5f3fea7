"""A chain of relations with its far commutations put off until they are needed."""

from __future__ import annotations

from collections.abc import Sequence

from braidsearch.moves.elementary_relations import Letters, Relation, RelationChain, is_far
from braidsearch.moves.elementary_traces import commutations_between, sort_by_commutations


def postpone_commutations(
    word: Letters, relations: Sequence[Relation], target: Letters
) -> list[Relation]:
    """Relations from ``word`` to ``target``, the same ones but for the far commutations.

    Letters are followed by name: ``given`` is their order in the chain that is given, ``made``
    that in the chain that is made, which is equal to it by far commutations at all times. A
    relation of the first becomes one of the second after the fewest commutations that bring its
    letters together.
    """
    order = _Order(word)
    for relation in relations:
        order.follow(relation)
    made = order.chain
    made.relations += commutations_between(tuple(made.letters), target)
    return made.relations


class _Order:
    def __init__(self, word: Letters) -> None:
        self.chain = RelationChain(word)
        self.given = list(range(len(word)))
        self.made = list(range(len(word)))
        self.unused = len(word)

    def follow(self, relation: Relation) -> None:
        at, before, after = relation
        if len(before) == 2 and after:
            self.given[at], self.given[at + 1] = self.given[at + 1], self.given[at]
            return
        names = self.given[at : at + len(before)]
        place = self._gather(names, at) if names else self._place_to_insert(at, after[0])
        fresh = list(range(self.unused, self.unused + len(after)))
        self.unused += len(after)
        self.given[at : at + len(before)] = fresh
        self.made[place : place + len(before)] = fresh
        if not before:
            self.chain.insert(place, after[0])
        elif not after:
            self.chain.cancel(place)
        else:
            self.chain.braid(place)

    def _gather(self, names: list[int], at: int) -> int:
        """Bring the letters with these names together; the place where the first then stands."""
        places = [self.made.index(name) for name in names]
        start, end = places[0], places[-1] + 1
        if end - start == len(names):
            return start
        segment = self.made[start:end]
        inner = [place - start for place in places]
        letters = self.chain.letters[start:end]
        left = set(self.given[:at])
        choices = [
            [1 if k in inner else 0 if segment[k] in left else 2 for k in range(end - start)],
            _sides(letters, inner, forwards=True),
            _sides(letters, inner, forwards=False),
        ]
        self._sort(start, min(choices, key=_inversions))
        return self.made.index(names[0])

    def _place_to_insert(self, at: int, letter: int) -> int:
        """A place that all letters left and right of the given one can keep, without commuting."""
        left = set(self.given[:at])
        lowest, highest = 0, len(self.made)
        near = [k for k, other in enumerate(self.chain.letters) if not is_far(letter, other)]
        before = [k for k in near if self.made[k] in left]
        behind = [k for k in near if self.made[k] not in left]
        if before:
            lowest = before[-1] + 1
        if behind:
            highest = behind[0]
        if lowest > highest:
            self._sort(highest, [0 if name in left else 2 for name in self.made[highest:lowest]])
            return highest + sum(name in left for name in self.made[highest:lowest])
        if at:
            wanted = self.made.index(self.given[at - 1]) + 1
            return min(max(wanted, lowest), highest)
        return lowest

    def _sort(self, start: int, ranks: list[int]) -> None:
        names = self.made[start : start + len(ranks)]
        order = sorted(range(len(ranks)), key=ranks.__getitem__)
        self.made[start : start + len(ranks)] = [names[k] for k in order]
        sort_by_commutations(self.chain, ranks, start)


def _sides(letters: list[int], inner: list[int], forwards: bool) -> list[int]:
    """0 for letters that go left, 1 for the inner ones, 2 for those that go right.

    Forwards, all go left that can: that commute with the inner letters and those bound for the
    right before them. Backwards, all go right that can.
    """
    places = range(len(letters)) if forwards else range(len(letters) - 1, -1, -1)
    free, bound = (0, 2) if forwards else (2, 0)
    sides = [free] * len(letters)
    passed: list[int] = []
    for place in places:
        if place in inner:
            sides[place] = 1
        elif any(not is_far(letters[place], other) for other in passed):
            sides[place] = bound
        else:
            continue
        passed.append(letters[place])
    return sides


def _inversions(ranks: list[int]) -> int:
    return sum(ranks[i] > ranks[k] for k in range(1, len(ranks)) for i in range(k))
