"""Differences turned round, and carried over by sameness, are differences that hold."""

import json
import random
from dataclasses import replace

import pytest

from braidsearch.certificates import format_certificate, parse_certificate
from braidsearch.certificates.grammar import INVARIANTS
from braidsearch.certificates.joining import (
    compose_symmetries,
    join_chain,
    join_different,
    join_same,
    reverse_certificate,
)
from braidsearch.moves import MoveChain
from braidsearch.words import SYMMETRIES, Braid, parse_word
from tests.certificates.evidence import (
    certificate_between,
    certificate_of,
    holds_for,
    is_accepted,
    random_path,
)
from tests.knot_tables import iter_links
from tests.strategies import append_random_step
from tests.verifier.finer_oracles import TooLargeError
from tests.verifier.judge import holds
from tests.verifier.makers import make_different, make_finely_different

TREFOIL, MIRROR, EIGHT = Braid([1, 1, 1]), Braid([-1, -1, -1]), Braid([1, -2, 1, -2])


def random_differences(count):
    """Certificates of difference by all invariants, with values from the tests' second routes."""
    generator = random.Random(611)
    makers = [make_different, make_finely_different]
    texts = [json.dumps(makers[at % 2](generator)) for at in range(count)]
    return [parse_certificate(text) for text in texts]


DIFFERENCES = random_differences(36)


def test_every_invariant_is_among_the_differences():
    """Each name of the format tells two links apart here, and each symmetry is asked about."""
    items = [item for one in DIFFERENCES for item in one.distinctions]
    assert {item.invariant for item in items} == set(INVARIANTS)
    assert {item.symmetry for item in items} == set(SYMMETRIES)


def check_difference(certificate, generator):
    """Turn a difference round, join it with sameness on either side and both; all must hold.

    The second verifier of the tests, which shares no code with the first, has to agree.
    """
    left, right = certificate.left, certificate.right
    assert is_accepted(certificate, left, right)
    turned = reverse_certificate(certificate)
    assert holds_for(turned, right, left)
    assert reverse_certificate(turned) == certificate
    before = [reverse_certificate(one) for one in reversed(random_path(left, generator))]
    after = random_path(right, generator)
    far_left, far_right = before[0].left, after[-1].right
    one, other = join_same(*before), join_same(*after)
    assert holds_for(join_different(one, certificate, None), far_left, right)
    assert holds_for(join_different(None, certificate, other), left, far_right)
    joined = join_different(one, certificate, other)
    assert holds_for(joined, far_left, far_right)
    shortened = join_chain([*before, certificate, *after])
    assert holds_for(shortened, far_left, far_right)
    between = compose_symmetries(one.symmetry, other.symmetry)
    expected = [compose_symmetries(item.symmetry, between) for item in certificate.distinctions]
    for made in (joined, shortened):
        assert [item.symmetry for item in made.distinctions] == expected
    assert join_different(None, certificate, None) == certificate
    return shortened


@pytest.mark.parametrize("certificate", DIFFERENCES, ids=range(len(DIFFERENCES)))
def test_differences(certificate):
    """A differs from D when A is the same as B, B differs from C, and C is the same as D."""
    joined = check_difference(certificate, random.Random(612))
    try:
        assert holds(json.loads(format_certificate(joined)))
    except TooLargeError:
        assert len(joined.left) + len(joined.right) > 20


def test_differences_with_plain_sameness():
    """Without symmetries on the way nothing is carried over: values and parameters stay."""
    for certificate in DIFFERENCES[:20]:
        chain = MoveChain(certificate.left)
        for _ in range(6):
            append_random_step(chain, random.Random(613))
        one = certificate_of(chain, "identity")
        joined = join_different(reverse_certificate(one), certificate, None)
        for item, own in zip(joined.distinctions, certificate.distinctions, strict=True):
            assert replace(item, left_moves=own.left_moves) == own
            assert item.left_moves == (*reverse_certificate(one).moves, *own.left_moves)


# The knot 8_17 as a closed 3-braid: its mirror-reverse alone is the same (KnotInfo's table).
EIGHT_SEVENTEEN = parse_word("-1 -1 2 -1 2 -1 2 2")
# Two mutants of 11 crossings; the words are those of the README.
MUTANTS = ("-1 -1 2 -1 2 -1 3 -2 -2 3 3", "-1 -1 -1 -1 2 2 1 -3 2 2 -3 2 -3")


@pytest.mark.parametrize(
    ("left", "right", "up_to", "invariant"),
    [
        (TREFOIL, MIRROR, ("reverse",), "jones"),
        (TREFOIL, EIGHT, SYMMETRIES[1:], "alexander"),
        (EIGHT_SEVENTEEN, EIGHT_SEVENTEEN.reverse(), (), "three-braid"),
        (*map(parse_word, MUTANTS), (), "colouring"),
    ],
)
def test_differences_that_were_searched_for(left, right, up_to, invariant):
    """What compare finds, by the invariant that tells these knots apart, is turned and joined."""
    found = certificate_between(left, right, *up_to)
    assert found.distinctions[0].invariant == invariant
    check_difference(found, random.Random(614))


def test_sums_of_linking_numbers_of_a_published_row():
    """The two words of L10n99{0,0,0}, a misprint in LinkInfo (read at test time), differ."""
    row = next(row for row in iter_links(10) if row.name == "L10n99{0,0,0}")
    found = certificate_between(*row.braids)
    assert found.distinctions[0].invariant == "linking-sums"
    check_difference(found, random.Random(615))
