"""Proofs to be played: accepted certificates, and chains of random moves."""

import random
from pathlib import Path

from braidsearch.certificates import Certificate, read_certificate
from braidsearch.moves import MoveChain, Rewrite
from braidsearch.words import Braid
from tests.strategies import append_random_step

ACCEPTED = Path(__file__).parents[2] / "verifier" / "accepted"
FILES = sorted(file for file in ACCEPTED.glob("*.json") if file.name != "expected.json")

RELATIONS = Certificate.same(
    Braid([1, 2, 1, 3, -2, -3, 2, -2, 1]),
    Braid([2, 1, -3, -2, 3, 1]),
    "identity",
    [
        Rewrite((2, 1, 2, 3, -2, -3, 2, -2, 1)),
        Rewrite((2, 1, 2, 3, -2, -3, 1)),
        Rewrite((2, 1, -3, 2, 3, -3, 1)),
        Rewrite((2, 1, -3, 2, 1)),
        Rewrite((2, -3, 1, 2, 1)),
    ],
)
"""Each kind of relation as a step: braid relations, mixed ones, cancellations, a commutation."""


def accepted(name: str) -> Certificate:
    """An accepted certificate by the name of its file."""
    return read_certificate(ACCEPTED / f"{name}.json")


def random_proof(seed: int, steps: int, letters: int = 12) -> Certificate:
    """A proof of at least so many random moves from a random braid on four strands."""
    generator = random.Random(seed)
    word = [generator.choice([-3, -2, -1, 1, 2, 3]) for _ in range(letters)]
    chain = MoveChain(Braid(word, 4))
    while len(chain) < steps:
        append_random_step(chain, generator, 5)
    return Certificate.same(chain.start, chain.current, "identity", chain.moves)
