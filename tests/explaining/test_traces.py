"""Words up to far commutation, and the way of a chain with its commutations put off."""

from hypothesis import given
from hypothesis import strategies as st

from braidsearch.moves.elementary_order import postpone_commutations
from braidsearch.moves.elementary_relations import (
    Relation,
    apply_relation,
    count_essential,
    is_far,
    iter_relations,
)
from braidsearch.moves.elementary_search import (
    search_relations,
    shorten_chain,
    words_of_chain,
)
from braidsearch.moves.elementary_traces import commutations_between, iter_links, trace_name
from braidsearch.words import Braid
from tests.artin_action import artin_images
from tests.strategies import braids, braids_on


def distances_by_commutation(word: tuple[int, ...]) -> dict[tuple[int, ...], int]:
    """All words that far commutations lead to, with the fewest that do, by breadth-first search."""
    found = {word: 0}
    edge = [word]
    while edge:
        wider = []
        for letters in edge:
            for at in range(len(letters) - 1):
                one, other = letters[at : at + 2]
                moved = (*letters[:at], other, one, *letters[at + 2 :])
                if is_far(one, other) and moved not in found:
                    found[moved] = found[letters] + 1
                    wider.append(moved)
        edge = wider
    return found


@given(braids_on(5, max_letters=6), braids_on(5, max_letters=6))
def test_names_are_those_of_words_up_to_commutation(one: Braid, other: Braid) -> None:
    """Two words have one name exactly if far commutations join them, and the fewest are found."""
    found = distances_by_commutation(one.word)
    for word, distance in found.items():
        assert trace_name(word) == trace_name(one.word)
        relations = commutations_between(one.word, word)
        assert words_of_chain(one.word, relations)[-1] == word
        assert len(relations) == distance
    assert (trace_name(one.word) == trace_name(other.word)) == (other.word in found)


@given(braids_on(5, max_letters=7))
def test_links_are_all_relations_after_commutations(braid: Braid) -> None:
    """What links lead to is what a cancellation or braid relation makes of some equal word."""
    expected = set()
    for word in distances_by_commutation(braid.word):
        for relation in iter_relations(word):
            if count_essential([relation]):
                expected.add(trace_name(apply_relation(word, relation)))
    found = set()
    for link in iter_links(braid.word):
        words = words_of_chain(link.before, link.relations())
        assert words[-1] == link.after
        found.add(trace_name(link.after))
    assert found == expected


def random_chain(
    braid: Braid, choices: list[tuple[int, int]]
) -> tuple[list[Relation], tuple[int, ...]]:
    """A chain of relations and insertions, and the word to which it leads."""
    word, chain = braid.word, []
    for choice, letter in choices:
        relations = list(iter_relations(word))
        if abs(letter) < braid.strands:
            relations.append(Relation(choice % (len(word) + 1), (), (letter, -letter)))
        if relations:
            chain.append(relations[choice % len(relations)])
            word = apply_relation(word, chain[-1])
    return chain, word


choice_lists = st.lists(
    st.tuples(st.integers(0, 999), st.integers(-5, 5).filter(bool)), max_size=25
)


@given(braids(max_strands=6, max_letters=12), choice_lists)
def test_postponed_commutations_change_nothing_else(
    braid: Braid, choices: list[tuple[int, int]]
) -> None:
    """The chain leads to the same word, with as many other relations as before."""
    chain, target = random_chain(braid, choices)
    made = postpone_commutations(braid.word, chain, target)
    assert words_of_chain(braid.word, made)[-1] == target
    assert count_essential(made) == count_essential(chain)


@given(braids(max_strands=5, max_letters=8), choice_lists, st.integers(0, 1))
def test_short_cuts_are_no_longer(
    braid: Braid, choices: list[tuple[int, int]], radius: int
) -> None:
    """A shortened chain leads to the same word, with at most as many other relations."""
    chain, target = random_chain(braid, choices)
    made = shorten_chain(braid.word, chain, radius)
    assert words_of_chain(braid.word, made)[-1] == target
    assert count_essential(made) <= count_essential(chain)


@given(braids(max_strands=5, max_letters=8), choice_lists)
def test_search_finds_what_it_says(braid: Braid, choices: list[tuple[int, int]]) -> None:
    """A chain found leads from one word to the other; none is found between two elements."""
    _, target = random_chain(braid, choices[:4])
    found = search_relations(braid.word, target, 200)
    assert found is None or words_of_chain(braid.word, found)[-1] == target
    if braid.strands > 1:
        other = (*target, 1)
        assert artin_images(Braid(other, braid.strands)) != artin_images(braid)
        assert search_relations(braid.word, other, 200) is None
