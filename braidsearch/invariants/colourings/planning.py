"""Which arcs are given colours, in which order, so that few colours determine all others.

At a crossing y = o^-1 x o the over arc and one arc below determine the other one. The two arcs
below do not determine the over arc, but leave one colour for it on average: over a class of N
elements there are N^2 triples and N^2 pairs (x, y). So any two arcs give the third, and few arcs
take their colours from nowhere, the seeds: two or three for most diagrams of a dozen crossings.
"""

from __future__ import annotations

from collections.abc import Iterable, Iterator, Sequence
from dataclasses import dataclass, field
from functools import lru_cache

from braidsearch.invariants.colourings.arcs import ArcDiagram, Crossing, arc_diagram
from braidsearch.invariants.colourings.plans import (
    Plan,
    Step,
    StepKind,
    checks_first,
    iter_widths,
)
from braidsearch.words.braid import Braid

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
