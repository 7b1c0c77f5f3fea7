"""The diagram that a closed braid draws by itself."""

from __future__ import annotations

from braidsearch.diagrams.link_diagram import Crossing, LinkDiagram
from braidsearch.words import Braid


def closed_braid_diagram(braid: Braid) -> LinkDiagram:
    """The diagram of the closure: a crossing for each letter, in order; strands run downwards.

    Letter k, counted from 0, has below it arc 2 k on the left and arc 2 k + 1 on the right. A
    strand that no letter meets is a component without crossings. sigma_i is a positive crossing:
    the strand that comes from the right passes over.
    """
    strands: list[int | None] = [None] * braid.strands
    for number, letter in enumerate(braid.word):
        strands[abs(letter) - 1 : abs(letter) + 1] = 2 * number, 2 * number + 1
    # The closure: what leaves at the bottom is what arrives at the top.
    current = [-1 if arc is None else arc for arc in strands]
    crossings = []
    for number, letter in enumerate(braid.word):
        index = abs(letter)
        upper_left, upper_right = current[index - 1 : index + 1]
        lower_left, lower_right = 2 * number, 2 * number + 1
        current[index - 1 : index + 1] = lower_left, lower_right
        if letter > 0:
            crossings.append(Crossing((upper_left, lower_left, lower_right, upper_right), 1))
        else:
            crossings.append(Crossing((upper_right, upper_left, lower_left, lower_right), -1))
    return LinkDiagram(tuple(crossings), strands.count(None))
