"""A bound on the number of Kauffman states, hence on coefficients of the Alexander polynomial."""

from math import prod

from braidsearch.words.braid import Braid


def state_count_bound(braid: Braid) -> int:
    """At least the sum of the absolute values of the coefficients of the Alexander polynomial.

    ``braid`` must be a factor as ``closure_pieces`` gives them: its diagram is connected.

    The Alexander polynomial is a sum over the states of the diagram, each adding plus or minus a
    power of t, and the states are as many as the spanning trees of either checkerboard graph
    (Kauffman, Formal Knot Theory, 1983). Rooted at a vertex, a spanning tree gives each other
    vertex its first edge towards the root, and these edges are the tree; so there are at most as
    many as the product of the degrees of the vertices other than the root.
    """
    bounds = []
    for colour in (0, 1):
        degrees = sorted(_region_degrees(braid, colour))
        bounds.append(prod(degrees[:-1]))
    return min(bounds)


def _region_degrees(braid: Braid, colour: int) -> list[int]:
    """The number of crossings at each region in the columns congruent to ``colour`` mod 2.

    Column i lies between the strand positions i and i+1; its regions run from one letter of
    sigma_i to the next, around the closure. Columns 0 and n are one region each.
    """
    degrees: list[int] = []
    beside = [0] * (braid.strands + 1)
    before_first = [-1] * (braid.strands + 1)
    for letter in braid.word:
        column = abs(letter)
        if column % 2 != colour:
            beside[column - 1] += 1
            beside[column + 1] += 1
        elif before_first[column] < 0:
            before_first[column], beside[column] = beside[column], 0
        else:
            degrees.append(beside[column] + 2)
            beside[column] = 0
    for column in range(colour, braid.strands + 1, 2):
        inner = 0 < column < braid.strands
        degrees.append(beside[column] + (before_first[column] + 2 if inner else 0))
    return degrees
