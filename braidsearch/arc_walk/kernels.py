"""The inner loops of the walk over arc presentations.

A presentation of N columns is held in ``cells``, four sections of equal capacity one after the
other: the row that each column leaves, the row that it enters, the column in which each row is
left, the column in which it is entered. Sections 0 and 2 are inverse permutations, and so are 1
and 3. Columns and rows therefore obey the same code: an axis begins at its first section
(``base`` 0 for columns, twice the capacity for rows), and the other axis is the rest.

Every position is cyclic, the last column or row being followed by number 0, so no rotation is
ever needed. Random numbers come from a multiply-with-carry generator (Marsaglia, Random number
generators, 2003) whose state stays below 2^62: the same walk from the same seed, compiled or not.
"""

# ruff: noqa: PLR0913, PLR0917 - loose arguments, since compiled loops take no objects of ours

from typing import Any

from braidsearch.compiling import compiled

Cells = Any  # an array of integers for the compiled loops, a list of them for the plain ones

# The entries of ``numbers``, which a walk reads and updates.
SIZE, STRANDS, RANDOM, ACCEPTED, MERGES, SPLITS = range(6)
NUMBERS = 6

# The columns of a plan: a phase a row.
TRIES, PHASE_SPLITS, MERGE_RATE, EXCHANGE_RATE = range(4)

RATE_ONE = 256
_MULTIPLIER = 698769069
_LOW = 0xFFFFFFFF
_CELL = 0x7FFF


@compiled
def shape_after_merge(
    cells: Cells, capacity: int, size: int, base: int, p: int, q: int
) -> tuple[int, int]:
    """How the neighbours p and q of an axis would merge: (kind, strands lost).

    Kind 0: nothing to merge; 1: p's second end is q's first; 2: p's first end is q's second.
    """
    first, second = cells[base + p], cells[base + capacity + p]
    third, fourth = cells[base + q], cells[base + capacity + q]
    if (second == third) == (first == fourth):
        return 0, 0
    kind = 1 if second == third else 2
    if base == 0:
        return kind, kind - 1
    # Rows: the part entered first runs to the common column, the other on from there. Together
    # they are longer than the circle when its entry is met again before the other's exit.
    if kind == 2:
        common, entry, leaving = first, second, third
    else:
        common, entry, leaving = second, fourth, first
    return kind, 1 if (entry - common) % size < (leaving - common) % size else 0


@compiled
def relink(cells: Cells, capacity: int, size: int, base: int) -> None:
    """Recompute the sections of the other axis from those of this one."""
    other = 2 * capacity - base
    for p in range(size):
        cells[other + cells[base + p]] = p
        cells[other + capacity + cells[base + capacity + p]] = p


@compiled
def apply_merge(
    cells: Cells, capacity: int, size: int, base: int, p: int, q: int, kind: int
) -> None:
    """Merge neighbours that ``shape_after_merge`` found: one column and one row fewer."""
    if kind == 1:
        first, second = cells[base + p], cells[base + capacity + q]
        gone = cells[base + q]
    else:
        first, second = cells[base + q], cells[base + capacity + p]
        gone = cells[base + p]
    cells[base + p], cells[base + capacity + p] = first, second
    for i in range(q, size - 1):
        cells[base + i] = cells[base + i + 1]
        cells[base + capacity + i] = cells[base + capacity + i + 1]
    for i in range(size - 1):
        if cells[base + i] > gone:
            cells[base + i] -= 1
        if cells[base + capacity + i] > gone:
            cells[base + capacity + i] -= 1
    relink(cells, capacity, size - 1, base)


@compiled
def apply_split(
    cells: Cells, capacity: int, size: int, base: int, p: int, new: int, kind: int
) -> int:
    """Split p of an axis at the new place ``new`` of the other one; return the strands gained.

    The result is what a merge of the same ``kind`` (1 or 2) takes back.
    """
    for i in range(size):
        if cells[base + i] >= new:
            cells[base + i] += 1
        if cells[base + capacity + i] >= new:
            cells[base + capacity + i] += 1
    for i in range(size, p, -1):
        cells[base + i] = cells[base + i - 1]
        cells[base + capacity + i] = cells[base + capacity + i - 1]
    if kind == 1:
        cells[base + capacity + p] = new
        cells[base + p + 1] = new
    else:
        cells[base + p] = new
        cells[base + capacity + p + 1] = new
    relink(cells, capacity, size + 1, base)
    _, gained = shape_after_merge(cells, capacity, size + 1, base, p, p + 1)
    return gained


@compiled
def sweep_merges(cells: Cells, capacity: int, numbers: Cells, trace: Cells) -> None:
    """Merge until no neighbours merge, first of all those whose merge takes a strand away."""
    wanted = 1
    while wanted >= 0:
        found = False
        for place in range(2 * numbers[SIZE]):
            size = numbers[SIZE]
            axis = 0 if place < size else 1
            p = place - axis * size
            if p >= size:
                break
            q = p + 1 if p + 1 < size else 0
            kind, lost = shape_after_merge(cells, capacity, size, axis * 2 * capacity, p, q)
            if kind and lost >= wanted:
                merge_and_count(cells, capacity, numbers, trace, axis, p, q, kind, lost)
                found = True
        wanted = 1 if found else wanted - 1


@compiled
def record(numbers: Cells, trace: Cells, code: int, position: int, new: int) -> None:
    """Count an accepted move, and write it down where the trace has room."""
    count = numbers[ACCEPTED]
    if 3 * count + 2 < len(trace):
        trace[3 * count] = code
        trace[3 * count + 1] = position
        trace[3 * count + 2] = new
    numbers[ACCEPTED] = count + 1


@compiled
def merge_and_count(
    cells: Cells,
    capacity: int,
    numbers: Cells,
    trace: Cells,
    axis: int,
    p: int,
    q: int,
    kind: int,
    lost: int,
) -> None:
    """Merge, and keep the counts and the trace."""
    apply_merge(cells, capacity, numbers[SIZE], axis * 2 * capacity, p, q, kind)
    numbers[SIZE] -= 1
    numbers[STRANDS] -= lost
    numbers[MERGES] += 1
    record(numbers, trace, 2 + axis, p, 0)


@compiled
def split_at_random(cells: Cells, capacity: int, numbers: Cells, trace: Cells) -> None:
    """Split a random column or row, in either way, at a random place, while there is room."""
    size = numbers[SIZE]
    if size >= capacity:
        return
    state = numbers[RANDOM]
    state = _MULTIPLIER * (state & _LOW) + (state >> 32)
    place = ((state & _LOW) * (4 * size)) >> 32
    state = _MULTIPLIER * (state & _LOW) + (state >> 32)
    new = ((state & _LOW) * size) >> 32
    numbers[RANDOM] = state
    way, p = place // size, place % size
    axis, kind = way // 2, 1 + way % 2
    gained = apply_split(cells, capacity, size, axis * 2 * capacity, p, new, kind)
    numbers[SIZE] = size + 1
    numbers[STRANDS] += gained
    numbers[SPLITS] += 1
    record(numbers, trace, 4 + 2 * axis + kind - 1, p, new)


@compiled
def try_moves(
    cells: Cells,
    capacity: int,
    numbers: Cells,
    trace: Cells,
    tries: int,
    merge_rate: int,
    exchange_rate: int,
) -> None:
    """Propose random neighbours: swap them where they do not cross, merge them where they may.

    ``merge_rate`` in 256 of the merges seen that keep the strand count are made, and all that
    take a strand away unless the rate is 0; ``exchange_rate`` in 256 of the swaps that are
    exchange moves of the closed braid are made.
    """
    size = numbers[SIZE]
    state = numbers[RANDOM]
    rows = 2 * capacity
    recording = len(trace) > 0
    accepted = 0
    for _ in range(tries):
        state = _MULTIPLIER * (state & _LOW) + (state >> 32)
        p = ((state & _LOW) * (2 * size)) >> 32
        base = 0
        if p >= size:
            base = rows
            p -= size
        q = p + 1
        if q == size:
            q = 0
        first = cells[base + p] & _CELL
        second = cells[base + capacity + p] & _CELL
        third = cells[base + q] & _CELL
        fourth = cells[base + capacity + q] & _CELL
        # Positive: the chords (first, second) and (third, fourth) have no common end and do not
        # interleave; negative: they interleave; zero: a common end.
        side = (first - third) * (first - fourth) * (second - third) * (second - fourth)
        if side > 0:
            if base and exchange_rate < RATE_ONE:
                # The rows cover the circle: from the upper one's entry (second), the lower one
                # is left (third) before it is entered (fourth) before the upper one is left.
                leaving = third - second + (size if third < second else 0)
                entry = fourth - second + (size if fourth < second else 0)
                end = first - second + (size if first < second else 0)
                if leaving < entry < end and (state >> 40) & 255 >= exchange_rate:
                    continue
            cells[base + p] = third
            cells[base + capacity + p] = fourth
            cells[base + q] = first
            cells[base + capacity + q] = second
            other = rows - base
            cells[other + third] = p
            cells[other + capacity + fourth] = p
            cells[other + first] = q
            cells[other + capacity + second] = q
            if recording:
                record(numbers, trace, base // rows, p, 0)
            else:
                accepted += 1  # in a register: twice the speed of counting in memory
        elif side == 0 and merge_rate:
            kind, lost = shape_after_merge(cells, capacity, size, base, p, q)
            if kind and (lost or (state >> 40) & 255 < merge_rate):
                merge_and_count(cells, capacity, numbers, trace, base // rows, p, q, kind, lost)
                size = numbers[SIZE]
    numbers[RANDOM] = state
    numbers[ACCEPTED] += accepted


@compiled
def walk(cells: Cells, capacity: int, numbers: Cells, plan: Cells, trace: Cells) -> None:
    """Carry out the phases of ``plan``: their splits spread evenly, their merges swept up."""
    for phase in range(len(plan) // 4):
        tries = plan[4 * phase + TRIES]
        splits = plan[4 * phase + PHASE_SPLITS]
        merge_rate = plan[4 * phase + MERGE_RATE]
        exchange_rate = plan[4 * phase + EXCHANGE_RATE]
        part = tries // (splits + 1)
        for _ in range(splits):
            split_at_random(cells, capacity, numbers, trace)
            try_moves(cells, capacity, numbers, trace, part, merge_rate, exchange_rate)
        left = tries - splits * part
        try_moves(cells, capacity, numbers, trace, left, merge_rate, exchange_rate)
        if merge_rate:
            sweep_merges(cells, capacity, numbers, trace)
