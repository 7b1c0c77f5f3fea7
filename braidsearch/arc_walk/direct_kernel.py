"""The inner loops that find the shortest way among the presentations that walks have visited.

As in the kernels of walks, all integers stay below 2^62, so that the loops hold plain too. A zero
is added to what is read from arrays of narrow integers: it is a wide one then, and each loop is
compiled for one type alone.
"""

# ruff: noqa: PLR0913, PLR0917 - loose arguments, since compiled loops take no objects of ours

from braidsearch.arc_walk.kernels import Cells, apply_merge, apply_split, shape_after_merge
from braidsearch.compiling import compiled

PRIME = 2147483647  # 2^31 - 1
FIRST, SECOND = 1220703125, 742938285

_MERGE, _SPLIT = 2, 4  # the least codes of these kinds of moves; below are swaps


@compiled
def mark_of_column(column: int, start: int, end: int, multiplier: int) -> int:
    """A number that looks random, the same for the same column from row start to row end."""
    mark = (column * multiplier + start) % PRIME
    mark = (mark * multiplier + end) % PRIME
    mark ^= mark >> 15
    mark = mark * multiplier % PRIME
    mark ^= mark >> 13
    return mark * multiplier % PRIME


@compiled
def mark_of_all(cells: Cells, capacity: int, size: int, multiplier: int) -> int:
    """The mark of a presentation: the sum of the marks of its columns."""
    total = 0
    for column in range(size):
        start, end = 0 + cells[column], 0 + cells[capacity + column]
        total += mark_of_column(column, start, end, multiplier)
    return total % PRIME


@compiled
def mark_of_two(cells: Cells, capacity: int, base: int, p: int, q: int, multiplier: int) -> int:
    """The part of the mark that a swap of the neighbours p and q of an axis changes."""
    first, second = 0 + p, 0 + q
    third = fourth = -1
    if base:
        first, second = 0 + cells[base + p], 0 + cells[base + capacity + p]
        third, fourth = 0 + cells[base + q], 0 + cells[base + capacity + q]
    total = 0
    for column in (first, second, third, fourth):
        if column >= 0:
            start, end = 0 + cells[column], 0 + cells[capacity + column]
            total += mark_of_column(column, start, end, multiplier)
    # No column joins two rows that are swapped: those have no common end.
    return total


@compiled
def swap(cells: Cells, capacity: int, base: int, p: int, q: int) -> None:
    """Exchange the neighbours p and q of an axis."""
    other = 2 * capacity - base
    for section in (0, capacity):
        first, second = cells[base + section + p], cells[base + section + q]
        cells[base + section + p], cells[base + section + q] = second, first
        cells[other + section + second], cells[other + section + first] = p, q


@compiled
def mark_visits(
    cells: Cells, capacity: int, size: int, trace: Cells, count: int, marks: Cells
) -> None:
    """Make the recorded moves again; ``marks`` gets a number for each presentation on the way.

    Equal presentations have equal numbers, and different ones different numbers but for a chance
    of one in 2^61.
    """
    first = mark_of_all(cells, capacity, size, FIRST)
    second = mark_of_all(cells, capacity, size, SECOND)
    marks[0] = first * (PRIME + 1) + second
    for i in range(count):
        code, p, new = 0 + trace[3 * i], 0 + trace[3 * i + 1], 0 + trace[3 * i + 2]
        axis = code % 2 if code < _SPLIT else (code - _SPLIT) // 2
        base = axis * 2 * capacity
        q = p + 1 if p + 1 < size else 0
        if code < _MERGE:
            first -= mark_of_two(cells, capacity, base, p, q, FIRST)
            second -= mark_of_two(cells, capacity, base, p, q, SECOND)
            swap(cells, capacity, base, p, q)
            first += mark_of_two(cells, capacity, base, p, q, FIRST)
            second += mark_of_two(cells, capacity, base, p, q, SECOND)
            first, second = first % PRIME, second % PRIME
        else:
            if code < _SPLIT:
                kind, _ = shape_after_merge(cells, capacity, size, base, p, q)
                apply_merge(cells, capacity, size, base, p, q, kind)
                size -= 1
            else:
                apply_split(cells, capacity, size, base, p, new, 1 + (code - _SPLIT) % 2)
                size += 1
            first = mark_of_all(cells, capacity, size, FIRST)
            second = mark_of_all(cells, capacity, size, SECOND)
        marks[i + 1] = first * (PRIME + 1) + second


@compiled
def find_way(
    nodes: Cells, trace: Cells, count: int, begins: Cells, edges: Cells, came: Cells, queue: Cells
) -> int:
    """Breadth-first from the first node to the last along recorded moves; the length of the way.

    Move number i leads from ``nodes[i]`` to the next one, and a swap back as well. ``queue`` holds
    the numbers of the moves of the way at the end, the last one first. The other arguments are
    room: ``begins`` has a place for each node and two more, ``edges`` two for each move, ``came``
    one for each node; all zeros.
    """
    for i in range(count):
        begins[nodes[i] + 2] += 1
        if trace[3 * i] < _MERGE:
            begins[nodes[i + 1] + 2] += 1
    for node in range(len(begins) - 1):
        begins[node + 1] += begins[node]
    for i in range(count):
        edges[begins[nodes[i] + 1]] = 2 * i
        begins[nodes[i] + 1] += 1
        if trace[3 * i] < _MERGE:
            edges[begins[nodes[i + 1] + 1]] = 2 * i + 1
            begins[nodes[i + 1] + 1] += 1
    start, end = nodes[0], nodes[count]
    queue[0] = start
    came[start] = 1
    head, tail = 0, 1
    while came[end] == 0:
        node = queue[head]
        head += 1
        for place in range(begins[node], begins[node + 1]):
            edge = edges[place]
            there = nodes[edge // 2 + 1 - edge % 2]
            if came[there] == 0:
                came[there] = edge + 2
                queue[tail] = there
                tail += 1
    length = 0
    node = end
    while node != start:
        edge = came[node] - 2
        queue[length] = edge // 2
        length += 1
        node = nodes[edge // 2 + edge % 2]
    return length
