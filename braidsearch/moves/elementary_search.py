"""Short chains of relations between two words: a search from both, and short cuts in a chain."""

from __future__ import annotations

from collections.abc import Iterable, Sequence
from typing import TypeAlias

from braidsearch.moves.elementary_relations import (
    Letters,
    Relation,
    apply_relation,
    reversed_chain,
)
from braidsearch.moves.elementary_traces import (
    Link,
    TraceName,
    commutations_between,
    iter_links,
    trace_name,
)

Step: TypeAlias = "tuple[Link, bool]"
"""A link, and whether it is passed forwards (from ``before`` to ``after``)."""


def search_relations(word: Letters, target: Letters, most_words: int) -> list[Relation] | None:
    """Relations from ``word`` to ``target`` without an insertion before a cancellation.

    Words that are equal by far commutations count as one; the search goes out from both ends by
    cancellations and braid relations, by turns, and sees ``most_words`` of them at most. None
    where it does not meet.
    """
    sides = [_Side(word), _Side(target)]
    if trace_name(word) in sides[1].found:
        return commutations_between(word, target)
    seen = 0
    while seen < most_words and (sides[0].edge or sides[1].edge):
        side = min((s for s in sides if s.edge), key=lambda s: len(s.edge))
        other = sides[1] if side is sides[0] else sides[0]
        meeting = side.widen(other)
        if meeting is not None:
            there, back = sides[0].relations_to(meeting), sides[1].relations_to(meeting)
            middle = commutations_between(sides[0].words[meeting], sides[1].words[meeting])
            return there + middle + reversed_chain(back)
        seen = len(sides[0].found) + len(sides[1].found)
    return None


class _Side:
    """What one end of the search has found: for each name a word, and the link that led there."""

    def __init__(self, start: Letters) -> None:
        name = trace_name(start)
        self.start = start
        self.words: dict[TraceName, Letters] = {name: start}
        self.found: dict[TraceName, tuple[TraceName, Link] | None] = {name: None}
        self.edge = [name]

    def widen(self, other: _Side) -> TraceName | None:
        """One link further everywhere; the name where the other side is met, if it is."""
        wider = []
        for name in self.edge:
            for link in iter_links(self.words[name]):
                reached = trace_name(link.after)
                if reached in self.found:
                    continue
                self.words[reached] = link.after
                self.found[reached] = (name, link)
                if reached in other.found:
                    return reached
                wider.append(reached)
        self.edge = wider
        return None

    def relations_to(self, name: TraceName) -> list[Relation]:
        """From the start to the word that was found under this name."""
        links = []
        while (step := self.found[name]) is not None:
            name, link = step
            links.append(link)
        return [relation for link in reversed(links) for relation in link.relations()]


def shorten_chain(word: Letters, relations: Sequence[Relation], radius: int) -> list[Relation]:
    """A chain with the fewest cancellations, insertions and braid relations near the given one.

    Near are the words that so many links lead to from a word of the chain.
    """
    words_along = words_of_chain(word, relations)
    words = {trace_name(letters): letters for letters in words_along}
    start, end = trace_name(words_along[0]), trace_name(words_along[-1])
    links: dict[TraceName, list[tuple[TraceName, Link, bool]]] = {name: [] for name in words}
    edge: Iterable[TraceName] = list(words)
    for distance in range(radius + 1):
        wider = []
        for name in edge:
            for link in iter_links(words[name]):
                reached = trace_name(link.after)
                if reached not in words:
                    if distance == radius:
                        continue
                    words[reached] = link.after
                    links[reached] = []
                    wider.append(reached)
                links[name].append((reached, link, True))
                links[reached].append((name, link, False))
        edge = wider
    return _joined(words_along[0], _shortest(links, start, end), words_along[-1])


def words_of_chain(word: Letters, relations: Iterable[Relation]) -> list[Letters]:
    """The word, and the words that the relations lead to, one after the other."""
    words = [word]
    for relation in relations:
        words.append(apply_relation(words[-1], relation))
    return words


def _shortest(
    links: dict[TraceName, list[tuple[TraceName, Link, bool]]], start: TraceName, end: TraceName
) -> list[Step]:
    """The fewest links from ``start`` to ``end``, breadth first."""
    came: dict[TraceName, tuple[TraceName, Link, bool] | None] = {start: None}
    edge = [start]
    while end not in came:
        wider = []
        for name in edge:
            for reached, link, is_forward in links[name]:
                if reached not in came:
                    came[reached] = (name, link, is_forward)
                    wider.append(reached)
        edge = wider
    steps: list[Step] = []
    while (step := came[end]) is not None:
        end, link, is_forward = step
        steps.append((link, is_forward))
    return steps[::-1]


def _joined(word: Letters, steps: Iterable[Step], target: Letters) -> list[Relation]:
    """The relations of the links, with the commutations that lead from each to the next."""
    relations: list[Relation] = []
    for link, is_forward in steps:
        if is_forward:
            relations += commutations_between(word, link.before) + link.relations()
            word = link.after
        else:
            relations += commutations_between(word, link.after)
            relations += reversed_chain(link.relations())
            word = link.before
    return relations + commutations_between(word, target)
