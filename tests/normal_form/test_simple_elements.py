"""The lattice of simple elements: every law, on whole small groups."""

from itertools import permutations

import pytest

from braidsearch.normal_form.simple_elements import SimpleElements, simple_elements


@pytest.fixture(params=[2, 3, 4], name="elements")
def _elements(request) -> SimpleElements:
    return simple_elements(request.param)


def all_names(elements: SimpleElements) -> list[int]:
    return [elements.number(ends) for ends in permutations(range(elements.strands))]


def test_complements_complete_to_delta(elements):
    """s * complement(s) = left_complement(s) * s = delta."""
    for name in all_names(elements):
        assert elements.product(name, elements.complement(name)) == elements.delta
        assert elements.product(elements.left_complement(name), name) == elements.delta


def test_meet_and_join_are_the_lattice_of_divisibility(elements):
    """The meet is the greatest among all common divisors, the join the least common multiple."""
    names = all_names(elements)
    divisors = {
        name: {d for d in names if _product_exists(elements, d, name, names)} for name in names
    }
    for one in names:
        for other in names:
            common = divisors[one] & divisors[other]
            assert divisors[elements.meet(one, other)] == common
            multiples = {m for m in names if {one, other} <= divisors[m]}
            join = elements.join(one, other)
            assert join in multiples
            assert all(join in divisors[m] for m in multiples)
            residue = elements.residue(one, other)
            assert elements.product(one, residue) == join


def _product_exists(elements, left, element, names) -> bool:
    """Whether left * q = element for a simple q: lengths must add up, too."""
    words = {name: elements.word(name) for name in (left, element)}
    rest = elements.quotient(left, element)
    return len(words[left]) + len(elements.word(rest)) == len(words[element]) and rest in names


def test_left_weighted_pairs_keep_the_product(elements):
    """The permutation of the product stays, and the left factor only grows."""
    for one in all_names(elements):
        for other in all_names(elements):
            left, right = elements.left_weighted(one, other)
            assert elements.divides(one, left)
            ends = [
                [
                    elements.permutations[b][elements.permutations[a][i]]
                    for i in range(elements.strands)
                ]
                for a, b in ((one, other), (left, right))
            ]
            assert ends[0] == ends[1]
            assert not elements.starts[right] & ~elements.finishes[left]


def test_a_product_that_is_not_simple_is_refused(elements):
    """delta * sigma_1 is not simple."""
    with pytest.raises(ValueError, match="not a simple element"):
        elements.product(elements.delta, elements.atoms[0])
