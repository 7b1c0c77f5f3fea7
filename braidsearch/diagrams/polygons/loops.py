"""The compiled loops over polygons, loaded when they are first needed."""

from __future__ import annotations

import importlib
from collections.abc import Callable
from functools import cache
from typing import NamedTuple

import numpy as np

from braidsearch import compiling
from braidsearch.diagrams.polygons.edges import Edges, Numbers, work_arrays

_MODULES = ("exact_signs", "box_tree", "meetings", "reduction", "shortening", "crossings")


class Loops(NamedTuple):
    """The loops that are called from outside, each described where it is defined."""

    build_tree: Callable[[Edges], None]
    first_meeting: Callable[[Edges], tuple[int, int]]
    remove_all_vertices: Callable[[Edges], None]
    shorten: Callable[[Edges, Numbers, int, int], None]
    find_crossings: Callable[[Edges, Edges, Numbers], int]
    find_heights: Callable[[Edges, Numbers, Numbers, Numbers], None]


@cache
def load_loops() -> Loops:
    """The loops, compiled; the first call compiles them, or loads what was compiled before.

    Where the compiler is present but fails, they are loaded again as plain functions. What was
    compiled is kept with the file in which it stands and knows only of changes there: whoever
    edits one of these modules removes what is kept for the others.
    """
    folder = __name__.rpartition(".")[0]
    modules = [importlib.import_module(f"{folder}.{name}") for name in _MODULES]
    if compiling.is_compiled():
        try:
            with compiling.interrupts_deferred():
                _run_once(_gathered())
        except Exception:  # whatever the compiler raises, the plain loops need none of it
            compiling.switch_off()
            for module in modules:
                importlib.reload(module)
    return _gathered()


def _gathered() -> Loops:
    from braidsearch.diagrams.polygons import (  # noqa: PLC0415 - compiled
        box_tree,
        crossings,
        reduction,
        shortening,
    )

    return Loops(
        box_tree.build_tree,
        reduction.first_meeting,
        reduction.remove_all_vertices,
        shortening.shorten,
        crossings.find_crossings,
        crossings.find_heights,
    )


def _run_once(loops: Loops) -> None:
    square = np.array([[0.0, 0.0, 0.0], [1.0, 0.0, 0.0], [1.0, 1.0, 1.0], [0.0, 1.0, 0.0]])
    _, edges = work_arrays([square])
    loops.build_tree(edges)
    loops.first_meeting(edges)
    loops.find_crossings(edges, edges, np.zeros(2, np.int64))
    none = np.zeros(0, np.int64)
    loops.find_heights(edges, none, none, none)
    loops.shorten(edges, np.ones(2, np.int64), 1, 1)
    loops.remove_all_vertices(edges)
