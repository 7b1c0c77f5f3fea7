"""Tables of wide integers are the tables of Python integers that they stand for."""

import numpy as np
import pytest
from hypothesis import given
from hypothesis import strategies as st

from braidsearch.invariants.homfly import trace_of
from braidsearch.invariants.wide_integers import LIMB_BITS, WideRows


def all_totals(table, rows):
    return [table.totals(np.array([row])) for row in range(rows)]


PAIRS = [(source, target) for source in range(3) for target in range(3) if source != target]


@given(st.lists(st.tuples(st.sampled_from(PAIRS), st.booleans()), max_size=400))
def test_sums_that_outgrow_a_word(steps):
    """Rows added to and subtracted from each other, again and again, never wrap.

    The rows stay independent, so that the last sums grow like Fibonacci numbers.
    """
    table = WideRows(3, 4)
    table.limbs[0][:] = [[1, -2, 3, 0], [5, 0, -1, 7], [0, 1, 1, -1]]
    table.high = 4
    exact = table.limbs[0].astype(object)
    for (source, target), is_sum in [*steps, *[((0, 1), True), ((1, 0), True)] * 60]:
        table.reserve(1)
        for limb in table.limbs:
            row = limb[source].copy()
            limb[target] = limb[target] + row if is_sum else limb[target] - row
        row = exact[source].copy()
        exact[target] = exact[target] + row if is_sum else exact[target] - row
    assert all_totals(table, 3) == exact.tolist()
    assert max(abs(value) for value in exact.ravel()) > 2**64
    assert len(table.limbs) > 1


@pytest.mark.parametrize("doublings", [1, 7, 16])
def test_powers_of_two_at_the_edge(doublings):
    """The largest growth that was reserved for is reached, and passes 2^1000 exactly."""
    table = WideRows(2, 1)
    table.limbs[0][:, 0] = [1, -1]
    total = 0
    while total < 1000:
        table.reserve(doublings)
        table.limbs = [limb << doublings for limb in table.limbs]
        total += doublings
    assert all_totals(table, 2) == [[2**total], [-(2**total)]]
    assert all(abs(int(limb.max())) < 2**62 for limb in table.limbs)
    assert len(table.limbs) >= total // (LIMB_BITS + 18)


def test_totals_of_rows_and_trimming():
    """A total adds the rows asked for, over the columns that are left after trimming."""
    table = WideRows(3, 6, low=1)
    table.limbs[0][:, 2:4] = [[1, 2], [3, 4], [5, 6]]
    table.high = 6
    table.trim()
    assert (table.low, table.high) == (2, 4)
    assert table.totals(np.array([0, 2])) == [6, 8]


@pytest.mark.parametrize("power", [0, 30, 45, 59, 60, 200])
def test_the_trace_of_large_elements(power):
    """The Ocneanu trace of 2^power times an element is 2^power times its trace, without wrapping.

    All 720 coefficients are at the limit that the headroom allows, the worst that can come.
    """
    table = WideRows(720, 40)
    table.limbs[0][:, 0] = 1
    table.high = 40
    for _ in range(power):
        table.reserve(1)
        table.limbs = [limb << 1 for limb in table.limbs]
    small = WideRows(720, 40)
    small.limbs[0][:, 0] = 1
    small.high = 40
    wanted = [[value << power for value in row] for row in trace_of(small, 6)]
    assert trace_of(table, 6) == wanted
    assert max(max(row) for row in wanted) >> power > 2**8
