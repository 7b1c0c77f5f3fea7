"""Words up to far commutation: their names, the relations between them, the commutations inside.

Two words are equal by far commutations alone exactly if, for each i, the letters of index i and i+1
stand in the same order in both (Cartier and Foata, Problemes combinatoires de commutation et
rearrangements, 1969).
"""

from __future__ import annotations

from collections import defaultdict
from collections.abc import Iterator
from typing import NamedTuple

from braidsearch.moves.elementary_relations import Letters, Relation, RelationChain, braid_relation

TraceName = tuple[tuple[int, Letters], ...]


class Link(NamedTuple):
    """A cancellation or braid relation on letters that meet after far commutations.

    ``places`` are the indices of the letters in ``before``, and ``after`` is the word that results
    when all letters between the first and the middle one have gone to the left, and all between
    the middle and the last one to the right.
    """

    before: Letters
    places: tuple[int, ...]
    after: Letters

    def relations(self) -> list[Relation]:
        """The commutations that bring the letters together, and the relation itself."""
        chain = RelationChain(self.before)
        middle = self.places[1]
        chain.carry(self.places[0], middle - 1)
        if len(self.places) == 2:
            chain.cancel(middle - 1)
        else:
            chain.carry(self.places[2], middle + 1)
            chain.braid(middle - 1)
        return chain.relations


def trace_name(word: Letters) -> TraceName:
    """What all words that are equal by far commutations have in common, and no other word has."""
    parts: defaultdict[int, list[int]] = defaultdict(list)
    for letter in word:
        index = abs(letter)
        parts[index - 1].append(letter)
        parts[index].append(letter)
    return tuple((index, tuple(parts[index])) for index in sorted(parts))


def iter_links(word: Letters) -> Iterator[Link]:
    """All cancellations and braid relations that apply after far commutations.

    Letters of index i, and of i and i+-1, meet exactly if none of index i-1, i, i+1 stands between
    them: all others between the outer two commute with these.
    """
    for first, letter in enumerate(word):
        index = abs(letter)
        second = _next_near(word, first + 1, index)
        if second is None:
            continue
        other = word[second]
        if other == -letter:
            after = word[:first] + word[first + 1 : second] + word[second + 1 :]
            yield Link(word, (first, second), after)
        elif abs(other) != index:
            third = _next_near(word, second + 1, index)
            changed = None if third is None else braid_relation(letter, other, word[third])
            if third is not None and changed is not None:
                left, right = word[first + 1 : second], word[second + 1 : third]
                after = word[:first] + left + changed + right + word[third + 1 :]
                yield Link(word, (first, second, third), after)


def _next_near(word: Letters, start: int, index: int) -> int | None:
    """The first place from ``start`` on of a letter that does not commute with ``index``."""
    for place in range(start, len(word)):
        if -1 <= abs(word[place]) - index <= 1:
            return place
    return None


def commutations_between(word: Letters, target: Letters) -> list[Relation]:
    """The fewest far commutations from a word to another that is equal by them.

    Letters of one index keep their order, so it is known where each has to go; an exchange of
    neighbours takes away one inversion.
    """
    goals: defaultdict[int, list[int]] = defaultdict(list)
    for place in range(len(target) - 1, -1, -1):
        goals[abs(target[place])].append(place)
    ranks = [goals[abs(letter)].pop() for letter in word]
    chain = RelationChain(word)
    sort_by_commutations(chain, ranks, 0)
    return chain.relations


def sort_by_commutations(chain: RelationChain, ranks: list[int], start: int) -> None:
    """Sort the letters from ``start`` on by their ranks, by exchanges of neighbours."""
    for end in range(1, len(ranks)):
        place = end
        while place and ranks[place - 1] > ranks[place]:
            ranks[place - 1], ranks[place] = ranks[place], ranks[place - 1]
            chain.commute(start + place - 1)
            place -= 1
