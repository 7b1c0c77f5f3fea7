"""Colourings of closed braids by conjugacy classes, counted by their longitudes."""

from __future__ import annotations

import importlib
from collections import Counter
from collections.abc import Iterator
from functools import cache, lru_cache
from types import ModuleType

import numpy as np
from numpy.typing import NDArray

from braidsearch.errors import CapacityError
from braidsearch.invariants.colourings.class_tables import (
    ClassTables,
    IntegerArray,
    class_tables,
)
from braidsearch.invariants.colourings.classes import class_sizes
from braidsearch.invariants.colourings.colours import Colours
from braidsearch.invariants.colourings.permutations import from_images, order
from braidsearch.invariants.colourings.planning import colouring_plan
from braidsearch.invariants.colourings.plans import Plan
from braidsearch.words.braid import Braid

LARGEST_COST = 1_000.0

_NODES_AT_ONCE = 2_000_000
_MOST_LEAVES = 2_000_000  # some seconds of them; links with many loose components have more
_SECONDS_PER_STEP = 7e-8
_SECONDS_PER_TABLE_PLACE = 3e-8
_VERIFIER_SECONDS_PER_STEP = 1e-6
_VERIFIER_SECONDS_PER_TABLE_PLACE = 1e-6


def count_colourings(braid: Braid, colours: Colours) -> list[list[int]]:
    """The colourings of the closure, counted by the longitudes of its components; sorted.

    A colouring is a homomorphism of the link's group that sends every meridian into one of the
    classes. Each component has the entry [j, images of y], 1 + degree integers: its meridian is
    in class j, y is its longitude conjugated by what takes the meridian to the given one, and of
    the conjugates of y by the centraliser of that meridian the least. A row of the value is the
    entries of all components, sorted and joined, followed by the number of colourings that have
    these entries, all conjugates counted.

    The value depends on the oriented link alone: the meridian and the longitude of a component,
    which commute, are determined up to conjugation by one common element, and the order of the
    components is forgotten (R. Riley, Homomorphisms of knot groups on finite groups, 1971;
    M. Eisermann, Knot colouring polynomials, 2007). Automorphisms of the group are not divided
    out, for both sides of a comparison use the same group and the same meridians.

    Raises CapacityError for colours that are too many for tables, where ``estimated_cost`` exceeds
    LARGEST_COST, and for more than two million colourings up to conjugation.
    """
    if estimated_cost(braid, colours) > LARGEST_COST:
        raise CapacityError(
            f"{braid.strands} strands, {len(braid)} letters: more seeds than "
            f"colourings by {colours.name} can be counted for"
        )
    tables = class_tables(colours)
    counts: Counter[tuple[int, ...]] = Counter()
    for entries, weights in _iter_leaves(colouring_plan(braid), tables):
        rows, places = np.unique(entries, axis=0, return_inverse=True)
        sums = np.zeros(len(rows), dtype=np.int64)
        np.add.at(sums, places.reshape(-1), weights)
        counts.update(dict(zip(map(tuple, rows.tolist()), sums.tolist(), strict=True)))
    return sorted(
        [integer for entry in row for integer in tables.entries[entry]] + [count]
        for row, count in counts.items()
    )


def estimated_cost(braid: Braid, colours: Colours) -> float:
    """Seconds that ``count_colourings`` takes, to within a factor of a few.

    It follows from the seeds that were found and the number of colours, never from a clock.
    Raises CapacityError for colours that are too many for tables.
    """
    widths = colouring_plan(braid).iter_widths(*_sizes(colours))
    places = sum(class_sizes(colours)) ** 2
    return 2e-4 + _SECONDS_PER_TABLE_PLACE * places + _SECONDS_PER_STEP * sum(widths)


def is_applicable(braid: Braid, colours: Colours) -> bool:
    """Whether ``count_colourings`` answers for this braid and these colours."""
    try:
        return estimated_cost(braid, colours) <= LARGEST_COST
    except CapacityError:
        return False


def verification_seconds(braid: Braid, colours: Colours) -> float:
    """Seconds that the verifier takes for ``count_colourings``, to within a factor of a few.

    It fills a table of conjugates, and backtracks from seeds that determine all other arcs; in
    words of a hundred letters and more it misses the smallest sets of seeds. The figures are
    fitted to measurements on one core; the verifier knows nothing of them.
    """
    size, *others = _sizes(colours)
    widths = colouring_plan(braid, may_choose=False).iter_widths(size, *others)
    missed_seeds = min(max((len(braid) - 60) / 40, 0.0), 1.5)
    steps: float = sum(widths) * size**missed_seeds
    tables = _VERIFIER_SECONDS_PER_TABLE_PLACE * size**2
    return 3e-3 + tables + _VERIFIER_SECONDS_PER_STEP * steps


@lru_cache(maxsize=1024)
def _sizes(colours: Colours) -> tuple[int, int, int]:
    """The number of colours, a lower bound on the order of the centralisers, and of classes."""
    orders = [order(from_images(meridian)) for meridian in colours.meridians]
    return sum(class_sizes(colours)), min(orders), len(orders)


def _iter_leaves(
    plan: Plan, tables: ClassTables
) -> Iterator[tuple[NDArray[np.int32], IntegerArray]]:
    """The complete colourings up to conjugation, some at a time: entries and weights."""
    kernels = _kernels()
    walk = kernels.new_walk(plan.diagram.arcs, len(plan.steps), len(plan.diagram.components))
    total = 0
    while walk.state[kernels.DEPTH] >= 0:
        walk.state[kernels.LEAVES] = 0
        kernels.walk_plan(tables.arrays, plan.arrays, walk, _NODES_AT_ONCE)
        leaves = int(walk.state[kernels.LEAVES])
        total += leaves
        if total > _MOST_LEAVES:
            raise CapacityError(f"more than {_MOST_LEAVES} colourings: expected fewer to count")
        yield walk.leaf_entries[:leaves], walk.leaf_weights[:leaves]


@cache
def _kernels() -> ModuleType:
    """The inner loops, loaded when first needed, since the compiler is slow to load.

    Where the compiler is present but fails, they are loaded again as plain functions.
    """
    compiling = importlib.import_module("braidsearch.compiling")
    kernels = importlib.import_module("braidsearch.invariants.colourings.kernels")
    if not compiling.is_compiled():
        return kernels
    try:
        with compiling.interrupts_deferred():
            kernels.compile_for(class_tables(_SMALLEST).arrays)
    except Exception:  # whatever the compiler raises, the plain loops need none of it
        compiling.switch_off()
        kernels = importlib.reload(kernels)
    return kernels


_SMALLEST = Colours("S2, transpositions", ((2, 1),), ((2, 1),))
