"""Walks over arc presentations become proofs, and join what class by class stays apart."""

import random

import pytest
from hypothesis import given, settings
from hypothesis import strategies as st

from braidsearch.arc_walk import cooled, heat
from braidsearch.diagrams import arcs_from_word, word_from_arcs
from braidsearch.moves import MoveChain
from braidsearch.moves.arcs import legs_from_arc_moves
from braidsearch.normal_form import are_equal
from braidsearch.search.driver import compare
from braidsearch.search.limits import SearchLimits
from braidsearch.search.route import Route
from braidsearch.search.walk_proofs import walk_moves, without_class_loops
from braidsearch.search.walks import Walker, cooled_route, walked_stretch
from braidsearch.words import Braid
from tests.knot_tables import iter_knots, iter_links
from tests.scrambles import scramble
from tests.strategies import braids
from tests.unknots import morton_family, random_unknots

LIMITS = SearchLimits(seconds=None, nodes=20_000)


@settings(max_examples=40)
@given(braids(max_strands=5, max_letters=15), st.integers(0, 2**32))
def test_a_walk_without_its_loops_keeps_its_ends(braid, seed):
    """Cutting loops between conjugate stages leaves checked moves from the word to the end."""
    arcs = arcs_from_word(braid)
    walk = heat(arcs, seed, 300, 3)
    chain = MoveChain(braid)
    chain.extend(walk_moves(braid, walk.iter_moves()))
    end = word_from_arcs(walk.end)
    assert chain.current.strands == end.strands
    assert are_equal(chain.current, end)


@settings(max_examples=40)
@given(braids(max_strands=4, max_letters=12), st.integers(0, 2**32), st.integers(0, 400))
def test_cutting_loops_never_lengthens(braid, seed, tries):
    """Few or no legs at all are legs still, and the ends stay literally the same."""
    walk = heat(arcs_from_word(braid), seed, tries, 2)
    legs = legs_from_arc_moves(walk.start, walk.iter_moves())
    shorter = without_class_loops(legs)
    strand_changes = [
        len([leg for leg in some if leg.source.strands != leg.target.strands])
        for some in (legs, shorter)
    ]
    assert strand_changes[1] <= strand_changes[0]
    if legs and shorter:
        assert (shorter[0].source, shorter[-1].target) == (legs[0].source, legs[-1].target)


def test_routes_are_written_on_demand():
    """A cooled route is remembered by its seed and replays as true moves."""
    braid = scramble(Braid([1, 1, 1, -2, 1, -2]), random.Random(3), 80, 4)
    route = cooled_route(Route(braid), seed=7)
    assert route.current.strands < braid.strands
    chain = MoveChain(braid)
    chain.extend(route.moves)
    assert are_equal(chain.current, route.current)
    back = MoveChain(route.current)
    chain.rewrite(route.current.word)
    back.extend(Route(braid, (*route.stretches,)).reversed_moves())
    assert back.current == braid


def test_walkers_repeat_themselves_by_seed():
    """The same seed proposes the same braids, and nothing is proposed twice."""
    braid = next(row.braid for row in iter_knots(9) if row.name == "9_42")
    proposals = []
    for _ in range(2):
        walker = Walker(braid, set(), seed=5)
        ends = [walker.propose(most_strands=4) for _ in range(40)]
        proposals.append([stretch.end for stretch in ends if stretch is not None])
    assert proposals[0] == proposals[1]
    assert proposals[0]


def test_a_stretch_leads_from_the_word_itself():
    """The moves of a walked stretch begin at the word and end at the stretch's end."""
    braid = Braid([1, 2, -1, 2, 3, -2, 1, 3])
    stretch = walked_stretch(braid, [cooled(braid, 3)])
    chain = MoveChain(braid)
    chain.extend(stretch.moves)
    assert chain.current.strands == stretch.end.strands
    assert are_equal(chain.current, stretch.end)


@pytest.mark.parametrize("power", range(5))
def test_mortons_family_is_the_unknot(power):
    """Exchange moves hide the unknot ever deeper; each is proven to be the unknot."""
    assert compare(morton_family(power), Braid([]), limits=LIMITS).outcome == "same"


def test_random_unknots():
    """A sample of long random words for the unknot, on up to 15 strands."""
    for braid in random_unknots(8, seed=151):
        assert compare(braid, Braid([]), limits=LIMITS).outcome == "same", braid


@pytest.mark.slow
def test_many_random_unknots():
    """Sixty long random words for the unknot, and the deeper members of Morton's family."""
    for braid in [*random_unknots(60, seed=152), morton_family(5), morton_family(6)]:
        assert compare(braid, Braid([]), limits=LIMITS).outcome == "same", braid


def published_pairs():
    """Links of the table whose row holds two words (LinkInfo; read at test time)."""
    rows = [row for row in iter_links(11) if len(set(row.braids)) == 2]
    assert len(rows) > 2_600
    return rows


def test_published_words_for_one_link():
    """A sample of the rows with two words: the same oriented link, by proofs of modest length."""
    lengths = []
    for row in published_pairs()[7::90]:
        verdict = compare(*row.braids, limits=LIMITS)
        assert verdict.outcome == "same", row.name
        lengths.append(len(verdict.certificate.moves))
    assert sorted(lengths)[len(lengths) // 2] <= 30


def test_the_misprinted_row():
    """The two words of L10n99{0,0,0} are two links: the linking numbers belong to other pairs."""
    row = next(row for row in published_pairs() if row.name == "L10n99{0,0,0}")
    verdict = compare(*row.braids, limits=LIMITS)
    assert verdict.outcome == "different"
    assert verdict.certificate.distinctions[0].invariant == "linking-sums"


def test_knots_of_twelve_crossings_against_heavy_scrambles():
    """A sample of the knots up to 12 crossings after 200 random moves and four more strands."""
    generator = random.Random(200)
    for row in list(iter_knots(12))[30::250]:
        scrambled = scramble(row.braid, generator, 200, 4)
        assert compare(row.braid, scrambled, limits=LIMITS).outcome == "same", row.name
