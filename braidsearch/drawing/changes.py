"""Which letters a move acts on, and which it has made; and whose colour each strand keeps."""

from __future__ import annotations

from collections.abc import Sequence

from braidsearch.moves import Conjugate, Destabilize, Move, Rewrite, Stabilize
from braidsearch.words import Braid

Span = tuple[int, int]
"""Letters from the first number up to but without the second; empty where both are equal."""

Word = tuple[int, ...]


def changed_letters(before: Word, move: Move) -> tuple[Span, Span]:
    """The letters that a move acts on, in the word before it, and those it made, in the word after.

    A stabilization makes the last letter, a destabilization takes it. Of a conjugation that turns
    the word as a cycle this is what goes from one end to the other, the shorter of the two ways;
    of everything else what remains between the letters that both words have in common at their
    beginnings and at their ends.
    """
    after = move.word
    if isinstance(move, Stabilize):
        return (0, 0), (len(after) - 1, len(after))
    if isinstance(move, Destabilize):
        return (len(before) - 1, len(before)), (0, 0)
    if isinstance(move, Conjugate):
        turned = _turned_letters(before, move)
        if turned is not None:
            return turned
    return _differing_letters(before, after)


def carried_components(components: Sequence[int], before: Braid, move: Move) -> list[int] | None:
    """For each start position after the move the component that it had before.

    ``components`` are those of the start positions before. The strand that begins at position p of
    g^-1 b g runs through g^-1 first and meets b where that leads; a strand added by stabilization
    belongs to the last one. None where the move does not keep components, so that it is no move.
    """
    carried = list(components)
    if isinstance(move, Conjugate):
        ends = Braid(move.by, before.strands).inverse().permutation
        carried = [components[end] for end in ends]
    elif isinstance(move, Stabilize):
        carried.append(carried[-1])
    elif isinstance(move, Destabilize):
        carried.pop()
    strands = before.strands if isinstance(move, Rewrite | Conjugate) else move.strands
    cycles = Braid(move.word, strands).component_cycles
    if len(carried) != strands:
        return None
    found = [{carried[position] for position in cycle} for cycle in cycles]
    is_kept = all(len(each) == 1 for each in found) and len(found) == len(set(components))
    return carried if is_kept and len(set().union(*found)) == len(found) else None


def _turned_letters(before: Word, move: Conjugate) -> tuple[Span, Span] | None:
    """The letters that go from one end to the other, where the word turns as a cycle."""
    count, after = len(before), move.word
    if len(after) != count or after == before:
        return None
    first = len(move.by)  # the turn that the conjugator says, where that fits: b b a -> b a b
    for turn in (first, count - first, *range(1, count)):
        if 0 < turn < count and before[turn:] + before[:turn] == after:
            if 2 * turn <= count:
                return (0, turn), (count - turn, count)
            return (turn, count), (0, count - turn)
    return None


def _differing_letters(before: Word, after: Word) -> tuple[Span, Span]:
    shorter = min(len(before), len(after))
    start = next((k for k in range(shorter) if before[k] != after[k]), shorter)
    most = shorter - start
    end = next((k for k in range(most) if before[-1 - k] != after[-1 - k]), most)
    return (start, len(before) - end), (start, len(after) - end)
