"""Which arcs are given colours, in which order, so that few colours determine all others.

At a crossing y = o^-1 x o the over arc and one arc below determine the other one. The two arcs
below do not determine the over arc, but leave one colour for it on average: over a class of N
elements there are N^2 triples and N^2 pairs (x, y). So any two arcs give the third, and few
arcs take their colours from nowhere, the seeds: for most diagrams of few crossings two.
"""

from __future__ import annotations

from collections.abc import Iterable, Iterator, Sequence
from dataclasses import dataclass, field
from enum import IntEnum
from functools import cached_property, lru_cache
from typing import NamedTuple

import numpy as np
from numpy.typing import NDArray

from braidsearch.invariants.colourings.arcs import ArcDiagram, Crossing, arc_diagram
from braidsearch.words.braid import Braid


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


_NOMINAL_SIZE, _NOMINAL_CENTRALISER = 200, 10
_MOST_WORK = 20_000


@lru_cache(maxsize=256)
def colouring_plan(braid: Braid, may_choose: bool = True) -> Plan:
    """A plan with few seeds for the closure; without ``may_choose`` it takes no CHOOSE step.

    Each crossing is tried as the start, as many as a bound on the work allows; seeds beyond it
    are chosen one by one, each so that it determines most.
    """
    diagram = arc_diagram(braid)
    starts = range(len(diagram.crossings))
    most = max(4, _MOST_WORK // (1 + len(starts) ** 2))
    plans = [
        _planned(diagram, start, may_choose) for start in starts[:: 1 + len(starts) // (most + 1)]
    ]
    if not plans:
        return _planned(diagram, None, may_choose)
    return min(plans, key=lambda plan: _nominal_cost(plan.steps))


def _nominal_cost(steps: Iterable[Step]) -> float:
    return sum(iter_widths(steps, _NOMINAL_SIZE, _NOMINAL_CENTRALISER))


@dataclass
class _Progress:
    """The arcs that are coloured so far, the crossings that are used up, and the steps."""

    diagram: ArcDiagram
    around: Sequence[Sequence[int]]
    known: list[bool]
    used: list[bool]
    steps: list[Step] = field(default_factory=list)

    def copy(self) -> _Progress:
        """An independent copy, to try what a step leads to."""
        return _Progress(self.diagram, self.around, self.known[:], self.used[:], self.steps[:])

    def take(self, step: Step, arc: int) -> None:
        """Give ``arc`` its colour by a step, and then all that follows from it."""
        self.steps.append(step)
        self.known[arc] = True
        waiting = [arc]
        while waiting:
            arc = waiting.pop(0)
            for number in self.around[arc]:
                if not self.used[number]:
                    self._conclude(number, waiting)

    def _conclude(self, number: int, waiting: list[int]) -> None:
        """Use a crossing up, if two of its arcs are known and one of them goes over."""
        crossing, known = self.diagram.crossings[number], self.known
        over, before, after = crossing
        if not known[over] or not (known[before] or known[after]):
            return
        self.used[number] = True
        if known[before] and known[after]:
            self.steps.append(Step(StepKind.CHECK, *crossing))
            return
        kind, new = (StepKind.FORWARD, after) if known[before] else (StepKind.BACKWARD, before)
        self.steps.append(Step(kind, *crossing))
        known[new] = True
        waiting.append(new)

    def merit(self) -> tuple[int, int]:
        """Checks made and arcs known: what makes one way better than another."""
        checks = sum(step.kind == StepKind.CHECK for step in self.steps)
        return checks, sum(self.known)


def _planned(diagram: ArcDiagram, start: int | None, may_choose: bool) -> Plan:
    around: list[list[int]] = [[] for _ in range(diagram.arcs)]
    for number, crossing in enumerate(diagram.crossings):
        for arc in dict.fromkeys(crossing):
            around[arc].append(number)
    progress = _Progress(diagram, around, [False] * diagram.arcs, [False] * len(diagram.crossings))
    first = 0 if start is None else diagram.crossings[start][0]
    progress.take(Step(StepKind.FIRST, first), first)
    if start is not None:
        _seed(progress, first, diagram.crossings[start][1])
    while True:
        if may_choose:
            _choose_all(progress)
        if all(progress.known):
            break
        _seed(progress, first, _best_seed(progress, may_choose))
    return Plan(diagram, (*checks_first(progress.steps), Step(StepKind.COMPLETE)))


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


def _seed(progress: _Progress, first: int, arc: int) -> None:
    if progress.known[arc]:
        return
    seeded = any(step.kind == StepKind.SECOND for step in progress.steps)
    kind = StepKind.SEED if seeded else StepKind.SECOND
    progress.take(Step(kind, arc, first, first), arc)


def _choose_all(progress: _Progress) -> None:
    """Find over arcs from the arcs below them while there are any, the most telling one first."""
    while True:
        open_crossings = list(_iter_choices(progress))
        if not open_crossings:
            return
        if len(open_crossings) > 1:
            crossing = max(open_crossings, key=lambda crossing: _merit_of(progress, crossing))
        else:
            crossing = open_crossings[0]
        _choose(progress, crossing)


def _iter_choices(progress: _Progress) -> Iterator[Crossing]:
    for crossing in progress.diagram.crossings:
        over, before, after = crossing
        if progress.known[before] and progress.known[after] and not progress.known[over]:
            yield crossing


def _choose(progress: _Progress, crossing: Crossing) -> None:
    # The crossing of the choice holds by the choice, so it is used up before what follows.
    progress.used[progress.diagram.crossings.index(crossing)] = True
    progress.take(Step(StepKind.CHOOSE, *crossing), crossing[0])


def _merit_of(progress: _Progress, crossing: Crossing) -> tuple[int, int]:
    trial = progress.copy()
    _choose(trial, crossing)
    return trial.merit()


def _best_seed(progress: _Progress, may_choose: bool) -> int:
    """The arc that determines most, of several the one whose checks come earliest.

    It meets a known arc at a crossing, or nothing follows.
    """
    known = progress.known
    meeting = dict.fromkeys(
        arc
        for crossing in progress.diagram.crossings
        if any(known[arc] for arc in crossing)
        for arc in crossing
        if not known[arc]
    )
    if not meeting:
        return _unmet_arc(progress)

    taken = len(progress.steps)

    def merit(arc: int) -> tuple[int, int, int]:
        trial = _with_seed(progress, arc, may_choose)
        kinds = [step.kind for step in trial.steps[taken:]]
        first_check = kinds.index(StepKind.CHECK) if StepKind.CHECK in kinds else len(kinds)
        return *trial.merit(), -first_check

    return max(meeting, key=merit)


def _with_seed(progress: _Progress, arc: int, may_choose: bool) -> _Progress:
    """What a seed leads to, roughly: choices are made in the order in which they are met."""
    trial = progress.copy()
    trial.take(Step(StepKind.SEED, arc), arc)
    if may_choose:
        for crossing in _iter_choices(trial):
            if not trial.known[crossing[0]]:
                _choose(trial, crossing)
    return trial


def _unmet_arc(progress: _Progress) -> int:
    """An arc of a part of the diagram that no known arc meets: one that goes over, if any."""
    for over, _, _ in progress.diagram.crossings:
        if not progress.known[over]:
            return over
    return progress.known.index(False)
