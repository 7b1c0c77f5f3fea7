"""One elementary step of a proof: what happens, where, and to which letters."""

from __future__ import annotations

from dataclasses import dataclass

from braidsearch.moves.elementary_relations import Letters, Relation

INSERTION = "insertion"
CANCELLATION = "cancellation"
FAR_COMMUTATION = "far commutation"
BRAID_RELATION = "braid relation"
MIXED_BRAID_RELATION = "mixed braid relation"
CONJUGATION = "conjugation"
STABILIZATION = "stabilization"
DESTABILIZATION = "destabilization"

KINDS: tuple[str, ...] = (
    INSERTION,
    CANCELLATION,
    FAR_COMMUTATION,
    BRAID_RELATION,
    MIXED_BRAID_RELATION,
    CONJUGATION,
    STABILIZATION,
    DESTABILIZATION,
)
"""The kinds of elementary steps; the first five keep the element of the braid group."""


@dataclass(frozen=True, slots=True)
class ElementaryStep:
    """One step: at letter ``place`` (counted from 1) the letters ``before`` become ``after``.

    ``kind`` is one of KINDS. An insertion's place is that of its first letter. A conjugation by a
    puts a^-1 in front of the word and a behind it: its place is 1, nothing is ``before``, and
    ``after`` holds both. A (de)stabilization acts on the last letter. ``move`` is the number, from
    1, of the move of the certificate that the step is part of.
    """

    kind: str
    place: int
    before: Letters
    after: Letters
    move: int


def step_of_relation(relation: Relation, move: int) -> ElementaryStep:
    """The step that a single relation is."""
    at, before, after = relation
    return ElementaryStep(relation_kind(relation), at + 1, before, after, move)


def relation_kind(relation: Relation) -> str:
    """The name of the relation, by the letters that it acts on."""
    _, before, after = relation
    if not before:
        return INSERTION
    if not after:
        return CANCELLATION
    if len(before) == 2:
        return FAR_COMMUTATION
    is_of_one_sign = len({letter > 0 for letter in before}) == 1
    return BRAID_RELATION if is_of_one_sign else MIXED_BRAID_RELATION
