"""Groups up to symmetry: a union that remembers by which symmetry things are images."""

from itertools import product
from pathlib import Path

from hypothesis import given
from hypothesis import strategies as st

from braidsearch.certificates.joining import compose_symmetries
from braidsearch.ledger.groups import ImageUnion, group_classes
from braidsearch.ledger.store import Store
from braidsearch.words import SYMMETRIES
from tests.ledger.ledgers import make_ledger

ITEMS = range(6)
statements = st.lists(
    st.tuples(st.sampled_from(ITEMS), st.sampled_from(ITEMS), st.sampled_from(SYMMETRIES)),
    max_size=8,
)
KINDS = st.sets(st.sampled_from(SYMMETRIES))


def reachable(
    start: int, links: list[tuple[int, int, str]], asked: set[str]
) -> set[tuple[int, str]]:
    """All things with the symmetries that lead there, by walking; ``asked`` may be used at any."""
    found, waiting = {(start, "identity")}, [(start, "identity")]
    while waiting:
        item, so_far = waiting.pop()
        steps = [(there, symmetry) for here, there, symmetry in links if here == item]
        steps += [(here, symmetry) for here, there, symmetry in links if there == item]
        steps += [(item, symmetry) for symmetry in asked]
        for there, symmetry in steps:
            following = there, compose_symmetries(so_far, symmetry)
            if following not in found:
                found.add(following)
                waiting.append(following)
    return found


@given(statements, KINDS)
def test_union_is_what_walking_finds(links: list[tuple[int, int, str]], asked: set[str]) -> None:
    """Two things share a place just when a walk over statements and asked symmetries joins them."""
    union = ImageUnion()
    for one, other, symmetry in links:
        union.join(one, other, symmetry)
    for one, other in product(ITEMS, ITEMS):
        is_joined = (other, "identity") in reachable(one, links, asked)
        assert (union.place(one, asked) == union.place(other, asked)) == is_joined


def test_groups_of_a_ledger(sorted_once: Path) -> None:
    """Trefoils of both hands are one group up to mirror images, and two up to reverses."""
    store = Store(sorted_once)
    try:
        assert [len(group) for group in group_classes(store)].count(2) == 1
        assert group_classes(store, ("mirror",)) == group_classes(store)
        alone = [[number] for (number,) in store.rows("SELECT id FROM classes ORDER BY id")]
        assert group_classes(store, ("reverse",)) == alone
        assert group_classes(store, ()) == alone
    finally:
        store.close()


def test_nothing_is_grouped_before_it_is_asked(tmp_path: Path) -> None:
    """A sorting that does not look for images leaves every class by itself."""
    store = Store(make_ledger(tmp_path / "plain.ledger"))
    try:
        assert all(len(group) == 1 for group in group_classes(store))
    finally:
        store.close()
