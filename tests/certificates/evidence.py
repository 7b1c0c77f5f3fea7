"""Evidence that tests join: paths of certificates, and damage that no certificate survives."""

from __future__ import annotations

import random
from collections.abc import Iterator, Sequence
from dataclasses import replace

from hypothesis import strategies as st

from braidsearch.certificates import Certificate, format_certificate
from braidsearch.moves import Move, MoveChain
from braidsearch.search.driver import compare
from braidsearch.search.limits import SearchLimits
from braidsearch.verifier import verify_text
from braidsearch.words import SYMMETRIES, Braid, apply_symmetry
from tests.strategies import append_random_step, move_chains

LIMITS = SearchLimits(seconds=None, nodes=400)
symmetries = st.sampled_from(SYMMETRIES)


def is_accepted(certificate: Certificate, left: Braid, right: Braid) -> bool:
    """Whether the verifier accepts the certificate as one about these two braids."""
    text = format_certificate(certificate)
    bound = ((braid.strands, braid.word) for braid in (left, right))
    return verify_text(text, *bound).valid


def holds_for(certificate: Certificate, left: Braid, right: Braid) -> bool:
    """Whether it is accepted as it is, and with no damage done to it."""
    return is_accepted(certificate, left, right) and not any(
        verify_text(format_certificate(damaged)).valid for damaged in iter_damaged(certificate)
    )


def iter_damaged(certificate: Certificate) -> Iterator[Certificate]:
    """The certificate with something in it that cannot be true, in one place after the other."""
    right = certificate.right
    added = Braid([*right.word, right.strands], right.strands + 1)
    if certificate.verdict == "same":
        yield replace(certificate, right=added)
        for moves in damaged_moves(certificate.moves):
            yield replace(certificate, moves=moves)
    for place, item in enumerate(certificate.distinctions):
        changes = [
            {"left": item.right, "right": item.left},
            {"left": item.right},
            {"right": item.left},
            *({"left_moves": moves} for moves in damaged_moves(item.left_moves)),
            *({"right_moves": moves} for moves in damaged_moves(item.right_moves)),
        ]
        for change in changes:
            items = list(certificate.distinctions)
            items[place] = replace(item, **change)
            yield replace(certificate, distinctions=tuple(items))


def damaged_moves(moves: Sequence[Move]) -> Iterator[tuple[Move, ...]]:
    """One letter more after one of the moves: the parity of the exponent sum says it is false."""
    for place in {0, len(moves) // 2, len(moves) - 1} & set(range(len(moves))):
        move = replace(moves[place], word=(*moves[place].word, 1))
        yield (*moves[:place], move, *moves[place + 1 :])


def certificate_of(chain: MoveChain, symmetry: str) -> Certificate:
    """The claim that a chain proves, about its start and the image of its end."""
    right = apply_symmetry(chain.current, symmetry)
    return Certificate.same(chain.start, right, symmetry, chain.moves)


@st.composite
def paths(draw: st.DrawFn, start: Braid | None = None, max_length: int = 4) -> list[Certificate]:
    """Certificates of sameness, each of which begins where the last one ends."""
    found: list[Certificate] = []
    for _ in range(draw(st.integers(1, max_length))):
        found.append(certificate_of(draw(move_chains(start, 6)), draw(symmetries)))
        start = found[-1].right
    return found


def random_path(start: Braid, generator: random.Random, length: int = 2) -> list[Certificate]:
    """The same from a seed, and through all symmetries in turn."""
    found: list[Certificate] = []
    for symmetry in generator.sample(SYMMETRIES, length):
        chain = MoveChain(start)
        for _ in range(5):
            append_random_step(chain, generator)
        found.append(certificate_of(chain, symmetry))
        start = found[-1].right
    return found


def certificate_between(left: Braid, right: Braid, *up_to: str) -> Certificate:
    """What compare certifies about the two."""
    certificate = compare(left, right, up_to=up_to, limits=LIMITS).certificate
    assert certificate is not None
    return certificate
