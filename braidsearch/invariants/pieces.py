"""Split unions and connected sums that a word shows: the closure cut into smaller closures."""

from dataclasses import dataclass
from functools import lru_cache
from itertools import pairwise

from braidsearch.words.braid import Braid
from braidsearch.words.reduction import cyclic_reduce


@dataclass(frozen=True)
class ClosurePieces:
    """A closed braid as a split union of connected sums of ``factors``.

    ``factors`` are cyclically reduced braids on at least two strands in which each generator has
    at least two letters (so their diagrams are connected); unknotted factors are left out.
    ``splits`` is the number of split unions: every polynomial of the closure is the product over
    the factors times its value for a circle set apart, once for each split.
    """

    factors: tuple[Braid, ...]
    splits: int


@lru_cache(maxsize=64)
def closure_pieces(braid: Braid) -> ClosurePieces:
    """Cut a closed braid at every generator that has no letter or one.

    A generator sigma_i without a letter parts the closure into the closures of the letters below
    i and above i, side by side; with one letter it joins these two by a single band, and the
    closure is their connected sum. Cyclic reduction of what is left can bare further cuts.
    """
    factors: list[Braid] = []
    splits = 0
    waiting = [braid]
    while waiting:
        piece = cyclic_reduce(waiting.pop())[0]
        counts = _letter_counts(piece)
        cuts = [index for index in range(1, piece.strands) if counts[index] < 2]
        splits += sum(1 for index in cuts if counts[index] == 0)
        if cuts:
            waiting.extend(reversed(_segments(piece, cuts)))
        elif piece.strands > 1:
            factors.append(piece)
    return ClosurePieces(tuple(factors), splits)


def _letter_counts(braid: Braid) -> list[int]:
    counts = [0] * (braid.strands + 1)
    for letter in braid.word:
        counts[abs(letter)] += 1
    return counts


def _segments(braid: Braid, cuts: list[int]) -> list[Braid]:
    """The braids on the strands between neighbouring cuts, single strands left out."""
    borders = [0, *cuts, braid.strands]
    segment_of = [-1] * (braid.strands + 1)
    for number, (low, high) in enumerate(pairwise(borders)):
        segment_of[low + 1 : high] = [number] * (high - low - 1)
    words: list[list[int]] = [[] for _ in borders[1:]]
    for letter in braid.word:
        number = segment_of[abs(letter)]
        if number >= 0:
            shift = borders[number]
            words[number].append(letter - shift if letter > 0 else letter + shift)
    return [
        Braid.trusted(tuple(word), high - low)
        for word, (low, high) in zip(words, pairwise(borders), strict=True)
        if high - low > 1
    ]
