"""Plans: the order in which the arcs of a diagram are given colours, and crossings are checked."""

from __future__ import annotations

from collections.abc import Iterable, Iterator
from dataclasses import dataclass
from enum import IntEnum
from functools import cached_property
from typing import NamedTuple

import numpy as np
from numpy.typing import NDArray

from braidsearch.invariants.colourings.arcs import ArcDiagram


class StepKind(IntEnum):
    """What a step does with the arcs of its crossing.

    FIRST gives the over arc the meridian of a class, SECOND a colour up to the centraliser of
    the first, SEED any colour. CHOOSE gives it each colour that takes the arcs below into each
    other. FORWARD finds y, BACKWARD finds x, CHECK compares, COMPLETE has all arcs coloured.
    """

    FIRST = 0
    SECOND = 1
    SEED = 2
    CHOOSE = 3
    FORWARD = 4
    BACKWARD = 5
    CHECK = 6
    COMPLETE = 7


@dataclass(frozen=True)
class Step:
    """A step at the crossing (over, before, after); seeds use ``over``, SECOND the first's arc."""

    kind: StepKind
    over: int = 0
    before: int = 0
    after: int = 0

    @property
    def determined_arc(self) -> int:
        """The arc whose colour FORWARD or BACKWARD finds."""
        return self.after if self.kind == StepKind.FORWARD else self.before

    @property
    def used_arcs(self) -> tuple[int, ...]:
        """The arcs whose colours FORWARD, BACKWARD and CHECK need."""
        if self.kind == StepKind.CHECK:
            return self.over, self.before, self.after
        return self.over, self.before if self.kind == StepKind.FORWARD else self.after


class PlanArrays(NamedTuple):
    """A plan for the inner loop.

    A row of ``steps`` is kind, over, before, after, and the place of the last step before it that
    tries several colours. Each component has the arc at which it starts, its passages (over arc,
    sign) from ``passage_starts`` on, and its writhe.
    """

    steps: NDArray[np.int64]
    starts: NDArray[np.int64]
    passage_starts: NDArray[np.int64]
    passages: NDArray[np.int64]
    writhes: NDArray[np.int64]


@dataclass(frozen=True)
class Plan:
    """The steps that colour all arcs of a diagram and check each crossing."""

    diagram: ArcDiagram
    steps: tuple[Step, ...]

    @property
    def seeds(self) -> int:
        """The number of arcs that take their colours from nowhere."""
        return sum(step.kind <= StepKind.SEED for step in self.steps)

    @cached_property
    def arrays(self) -> PlanArrays:
        """The plan as the inner loop reads it."""
        rows, last = [], -1
        for place, step in enumerate(self.steps):
            rows.append((step.kind, step.over, step.before, step.after, last))
            if step.kind <= StepKind.CHOOSE:
                last = place
        components = self.diagram.components
        lengths = [len(component.passages) for component in components]
        passages = [passage for component in components for passage in component.passages]
        return PlanArrays(
            steps=np.array(rows, dtype=np.int64),
            starts=np.array([component.start for component in components], dtype=np.int64),
            passage_starts=np.cumsum([0, *lengths], dtype=np.int64),
            passages=np.array(passages, dtype=np.int64).reshape(-1, 2),
            writhes=np.array([component.writhe for component in components], dtype=np.int64),
        )

    def iter_widths(self, size: int, centraliser: int, classes: int = 1) -> Iterator[float]:
        """How many partial colourings to expect at each step."""
        return iter_widths(self.steps, size, centraliser, classes)


def iter_widths(
    steps: Iterable[Step], size: int, centraliser: int, classes: int = 1
) -> Iterator[float]:
    """How many partial colourings to expect at each step.

    Seeds multiply, choices leave as many as they find, and a check is passed by one in ``size``;
    trivial colourings pass everywhere.
    """
    width = 1.0
    for step in steps:
        if step.kind == StepKind.FIRST:
            width *= classes
        elif step.kind == StepKind.SECOND:
            width *= 1 + size / centraliser
        elif step.kind == StepKind.SEED:
            width *= size
        elif step.kind == StepKind.CHECK:
            width = max(width / size, 1.0)
        yield width


def checks_first(steps: Iterable[Step]) -> list[Step]:
    """The same steps, each check as early as possible after the step that tries colours.

    What a check does not need comes after it, so that a colour that fails costs little. Among the
    checks between two steps that try colours, the one that needs least is made first.
    """
    ordered: list[Step] = []
    block: list[Step] = []
    for step in steps:
        if step.kind <= StepKind.CHOOSE:
            ordered += _block_in_order(block)
            ordered.append(step)
            block = []
        else:
            block.append(step)
    return ordered + _block_in_order(block)


def _block_in_order(block: list[Step]) -> list[Step]:
    """Steps that are determined, checks first."""
    makers = {step.determined_arc: step for step in block if step.kind != StepKind.CHECK}
    needs: dict[Step, dict[Step, None]] = {}
    for step in block:
        used = [makers[arc] for arc in step.used_arcs if arc in makers]
        needs[step] = dict.fromkeys(one for maker in used for one in (*needs[maker], maker))
    ordered: dict[Step, None] = {}
    checks = [step for step in block if step.kind == StepKind.CHECK]
    while checks:
        check = min(checks, key=lambda step: sum(one not in ordered for one in needs[step]))
        ordered.update(dict.fromkeys((*needs[check], check)))
        checks.remove(check)
    return [*ordered, *(step for step in block if step not in ordered)]
