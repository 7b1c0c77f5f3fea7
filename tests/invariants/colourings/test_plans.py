"""Plans colour every arc before it is used, and use every crossing once."""

import pytest
from hypothesis import given, settings

from braidsearch.invariants.colourings.arcs import arc_diagram
from braidsearch.invariants.colourings.planning import colouring_plan
from braidsearch.invariants.colourings.plans import StepKind
from braidsearch.words import Braid
from tests.knot_tables import iter_knots
from tests.strategies import braids


def check_plan(braid, may_choose):
    """Walk through the steps with the set of coloured arcs."""
    plan = colouring_plan(braid, may_choose)
    coloured, used = set(), []
    for step in plan.steps[:-1]:
        crossing = (step.over, step.before, step.after)
        if step.kind <= StepKind.SEED:
            new = {step.over}
            assert step.kind != StepKind.SECOND or step.before == plan.steps[0].over
        else:
            used.append(crossing)
            new = {
                StepKind.CHOOSE: {step.over},
                StepKind.FORWARD: {step.after},
                StepKind.BACKWARD: {step.before},
                StepKind.CHECK: set(),
            }[step.kind]
            assert set(crossing) - new <= coloured
        assert new.isdisjoint(coloured)
        coloured |= new
    assert coloured == set(range(plan.diagram.arcs))
    assert sorted(used) == sorted(plan.diagram.crossings)
    assert plan.steps[0].kind == StepKind.FIRST
    assert plan.steps[-1].kind == StepKind.COMPLETE
    return plan


@settings(max_examples=150)
@given(braid=braids(max_strands=6, max_letters=24))
def test_plans_are_complete(braid):
    """Every arc is coloured once, after what it follows from; every crossing is used once.

    The strands at the top determine all arcs, so no more seeds than strands are ever needed.
    """
    assert check_plan(braid, True).seeds <= braid.strands
    strict = check_plan(braid, False)
    assert not any(step.kind == StepKind.CHOOSE for step in strict.steps)


def test_few_seeds_for_published_words():
    """Knots to 10 crossings take two or three seeds, and never more than where none is chosen.

    Without choices there are at least as many as the bridge index of the knot, since the seeds
    generate its group (R. Blair, A. Kjuchukova, R. Velazquez, P. Villanueva, Wirtinger systems of
    generators of knot groups, 2020); it is in the table (KnotInfo).
    """
    rows = list(iter_knots(10))
    assert len(rows) == 249
    for row in rows:
        strict = colouring_plan(row.braid, may_choose=False).seeds
        assert colouring_plan(row.braid).seeds <= min(strict, 3)
        assert strict >= int(row.columns["bridge_index"])


@pytest.mark.parametrize("strands", [1, 4])
def test_circles_without_crossings(strands):
    """Each circle of an unlink is an arc of its own, and a seed."""
    plan = check_plan(Braid([], strands), True)
    assert (plan.diagram.arcs, plan.seeds) == (strands, strands)


def test_arcs_of_one_colour_are_one():
    """A stabilized circle is one arc, and letters that cancel have one crossing, met by one arc."""
    assert arc_diagram(Braid([1, -2, 3])).arcs == 1
    assert len(arc_diagram(Braid([1, -1])).crossings) == 1
    assert len(arc_diagram(Braid([1, -1, 2, -2, 1, -1], 3)).crossings) == 2
    assert len(arc_diagram(Braid([1, 1, 1])).crossings) == 3


def test_components_of_the_hopf_link():
    """Each passes once under the other, with the letter's sign, and never under itself."""
    for sign in (1, -1):
        first, second = arc_diagram(Braid([sign, sign])).components
        assert first.passages == ((second.start, sign),)
        assert second.passages == ((first.start, sign),)
        assert first.writhe == second.writhe == 0


def test_large_words_are_planned_within_bounds():
    """A word of 1,000 letters on 12 strands has a plan, by fewer starts and trials."""
    letters = [((7 * i * i + 3 * i) % 11 + 1) * (1 if i % 3 else -1) for i in range(1000)]
    assert check_plan(Braid(letters, 12), True).seeds <= 12
