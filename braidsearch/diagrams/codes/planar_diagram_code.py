"""Planar diagram codes: for each crossing its four arcs, counterclockwise."""

from __future__ import annotations

from collections.abc import Iterable, Sequence

from braidsearch.diagrams.codes.groups import checked_groups, parse_integer_groups
from braidsearch.diagrams.link_diagram import Crossing, LinkDiagram, opposite_ends, quadruple
from braidsearch.errors import InputError

_EXPECTED = "four arc labels for each crossing, such as [[1,5,2,4],[3,1,4,6],[5,3,6,2]]"


def parse_planar_diagram_code(text: str) -> LinkDiagram:
    """Read a planar diagram code from text: a list of four labels a crossing, see below.

    Brackets of any kind, commas or blanks; or without brackets one crossing a line.
    """
    return planar_diagram_code(parse_integer_groups(text, _EXPECTED))


def format_planar_diagram_code(diagram: LinkDiagram, first_label: int = 1) -> str:
    """Write the code, with labels in order along each component from ``first_label`` upwards.

    Components without crossings stand behind the crossings, each as a list of one label. The
    reader gives ``diagram.renumbered()`` back.
    """
    ordered = diagram.renumbered()
    labels = [[arc + first_label for arc in crossing.arcs] for crossing in ordered.crossings]
    behind = first_label + ordered.arc_count
    labels += [[behind + circle] for circle in range(ordered.circles)]
    return "[" + ",".join("[" + ",".join(map(str, entry)) + "]" for entry in labels) + "]"


def planar_diagram_code(entries: Iterable[Iterable[int]]) -> LinkDiagram:
    """The diagram with this code: four labels a crossing, from the incoming under-arc
    counterclockwise; a single label is a component without crossings.

    Labels are integers from 0 upwards; each stands at two places. The under-strands give every
    component its direction. One that passes over everywhere runs the way in which its labels
    mostly ascend; where that does not tell (two arcs, as 7 and 8), from the smaller label to the
    larger at the crossing that is listed first. Such a component can be lifted off the others and
    is an unknot by itself, so either direction gives the same oriented link.

    Raises InputError for a list of another length, a label that is negative or does not stand at
    two places, under-strands that contradict each other, and a code that is not planar.
    """
    groups = checked_groups(entries, _EXPECTED, entries_per_crossing=4)
    crossings = [group for group in groups if len(group) != 1]
    _check_entries(groups)
    labels = [label for crossing in crossings for label in crossing]
    number_of = {label: number for number, label in enumerate(sorted(set(labels)))}
    arcs = [number_of[label] for label in labels]
    entering = _entering_places(arcs, opposite_ends(arcs), sorted(number_of))
    return LinkDiagram(
        tuple(
            Crossing(
                quadruple(arcs[4 * place : 4 * place + 4]), 1 if entering[4 * place + 3] else -1
            )
            for place in range(len(crossings))
        ),
        circles=len(groups) - len(crossings),
    )


def _check_entries(groups: Sequence[Sequence[int]]) -> None:
    places: dict[int, int] = {}
    for group in groups:
        if len(group) not in (1, 4):
            raise InputError(f"{list(group)[:8]} as a crossing: expected {_EXPECTED}")
        for label in group:
            if label < 0:
                raise InputError(f"arc label {label}: expected integers from 0 or 1 upwards")
            # A component without crossings is an arc whose two ends meet.
            places[label] = places.get(label, 0) + (1 if len(group) == 4 else 2)
    for label, count in places.items():
        if count != 2:
            often = "once" if count == 1 else f"{count} times"
            raise InputError(f"arc label {label} used {often}: expected every label at two places")


def _entering_places(
    arcs: Sequence[int], opposite: Sequence[int], labels: Sequence[int]
) -> list[bool]:
    """For each end whether its arc enters the crossing there."""
    is_entering = [False] * len(arcs)
    seen = [False] * len(arcs)
    for start in range(len(arcs)):
        if seen[start]:
            continue
        arrivals = []
        end = start
        while not seen[end]:
            seen[end] = seen[end ^ 2] = True
            arrivals.append(end)
            end = opposite[end ^ 2]  # through the crossing, and along the next arc
        if _runs_backwards(arrivals, arcs, labels):
            arrivals = [end ^ 2 for end in arrivals]
        for end in arrivals:
            is_entering[end] = True
    return is_entering


def _runs_backwards(arrivals: Sequence[int], arcs: Sequence[int], labels: Sequence[int]) -> bool:
    """Whether a component, given by the ends where it arrives at crossings, runs the other way."""
    places = {end % 4: end for end in arrivals}
    if 0 in places and 2 in places:
        raise InputError(
            f"arcs {labels[arcs[places[0]]]} and {labels[arcs[places[2]]]} of one component: "
            "expected every under-strand to enter by the first label of its crossing"
        )
    if 0 in places or 2 in places:
        return 2 in places
    steps = [arcs[end ^ 2] - arcs[end] for end in arrivals]
    ascents = sum(1 if step > 0 else -1 for step in steps)
    return ascents < 0 if ascents else steps[0] < 0
