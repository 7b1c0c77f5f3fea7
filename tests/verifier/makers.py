"""Small valid certificates, made at random from moves and from values of the oracles."""

from __future__ import annotations

import random
from typing import Any

from tests.scrambles import apply_random_relation
from tests.verifier import oracles
from tests.verifier.judge import SYMMETRIES
from tests.verifier.permutation_groups import A4, S3, S3_ROTATIONS

Certificate = dict[str, Any]
INVARIANTS = (
    "components",
    "linking-numbers",
    "linking-sums",
    "alexander",
    "jones",
    "homfly",
    "signature",
)
FINER: tuple[tuple[str, dict[str, Any]], ...] = (
    ("colouring", S3),
    ("colouring", S3_ROTATIONS),
    ("colouring", A4),
    ("levine-tristram", {"order": 6, "power": 1}),
    ("levine-tristram", {"order": 5, "power": 2}),
    ("alexander-module", {"prime": 2}),
    ("alexander-module", {"prime": 3}),
    ("sublinks", {"components": 1, "invariant": "jones"}),
    ("sublinks", {"components": 2, "invariant": "alexander-module", "prime": 5}),
    ("three-braid", {}),
)


def random_word(generator: random.Random, strands: int, letters: int) -> list[int]:
    if strands == 1:
        return []
    return [generator.choice([1, -1]) * generator.randrange(1, strands) for _ in range(letters)]


def random_moves(
    generator: random.Random, strands: int, word: list[int], count: int
) -> tuple[list[Any], int, list[int]]:
    """A list of up to ``count`` moves from the braid, with the strands and letters of its end."""
    moves: list[Any] = []
    for _ in range(count):
        kind = generator.choice(["rewrite", "conjugate", "stabilize", "destabilize"])
        if kind == "destabilize":
            if not can_destabilize(strands, word):
                continue
            sign = 1 if word[-1] > 0 else -1
            strands, word = strands - 1, word[:-1]
            moves.append({"move": kind, "sign": sign, "strands": strands, "word": word})
        elif kind == "stabilize":
            sign = generator.choice([1, -1])
            strands, word = strands + 1, [*word, sign * strands]
            moves.append({"move": kind, "sign": sign, "strands": strands, "word": word})
        elif kind == "conjugate":
            by = random_word(generator, strands, generator.randrange(3))
            word = rewritten(generator, strands, [-g for g in reversed(by)] + word + by)
            moves.append({"move": kind, "by": by, "word": word})
        else:
            word = rewritten(generator, strands, word)
            moves.append({"move": kind, "word": word})
    return moves, strands, word


def can_destabilize(strands: int, word: list[int]) -> bool:
    return [abs(letter) for letter in word].count(strands - 1) == 1 and abs(word[-1]) == strands - 1


def rewritten(generator: random.Random, strands: int, word: list[int]) -> list[int]:
    """Another word for the same element: cancelling pairs dropped, one put in, relations used."""
    reduced: list[int] = []
    for letter in word:
        if reduced and reduced[-1] == -letter:
            reduced.pop()
        else:
            reduced.append(letter)
    if strands > 1 and generator.random() < 0.3:
        letter = random_word(generator, strands, 1)[0]
        place = generator.randrange(len(reduced) + 1)
        reduced[place:place] = [letter, -letter]
    for _ in range(3):
        apply_random_relation(reduced, generator)
    return reduced


def make_same(generator: random.Random) -> Certificate:
    """A valid certificate of sameness with up to six moves."""
    strands = generator.randrange(1, 4)
    word = random_word(generator, strands, generator.randrange(6))
    moves, after, end = random_moves(generator, strands, word, generator.randrange(7))
    symmetry = generator.choice(list(SYMMETRIES))
    return {
        "format": "braidsearch certificate",
        "version": 1,
        "left": {"strands": strands, "word": word},
        "right": {"strands": after, "word": SYMMETRIES[symmetry](end)},
        "verdict": "same",
        "symmetry": symmetry,
        "moves": moves,
    }


def make_different(
    generator: random.Random, invariants: Any = tuple((name, {}) for name in INVARIANTS)
) -> Certificate:
    """A valid certificate of difference for one or two symmetries."""
    braids = []
    for _ in range(2):
        strands = generator.randrange(1, 5)
        word = random_word(generator, strands, generator.randrange(2, 7))
        braids.append({"strands": strands, "word": word})
    distinctions = []
    for symmetry in generator.sample(list(SYMMETRIES), 4):
        for invariant, parameters in generator.sample(invariants, len(invariants)):
            item = make_distinction(generator, braids, symmetry, invariant, parameters)
            if None not in (item["left"], item["right"]) and item["left"] != item["right"]:
                distinctions.append(item)
                break
    if not distinctions:
        return make_different(generator, invariants)
    return {
        "format": "braidsearch certificate",
        "version": 1,
        "left": braids[0],
        "right": braids[1],
        "verdict": "different",
        "distinctions": distinctions[: generator.randrange(1, 3)],
    }


def make_distinction(
    generator: random.Random, braids: list[Any], symmetry: str, invariant: str, parameters: Any
) -> Certificate:
    """A distinction with true values, which may be equal, or None where there is none."""
    ends, lists = [], []
    for braid in braids:
        count = generator.choice([0, 0, 2])
        moves, strands, word = random_moves(generator, braid["strands"], braid["word"], count)
        lists.append(moves)
        ends.append((strands, word))
    right_strands, right_word = ends[1]
    return {
        "symmetry": symmetry,
        "invariant": invariant,
        "parameters": parameters,
        "left_moves": lists[0],
        "right_moves": lists[1],
        "left": oracles.value(invariant, *ends[0], **parameters),
        "right": oracles.value(
            invariant, right_strands, SYMMETRIES[symmetry](right_word), **parameters
        ),
    }


def make_finely_different(generator: random.Random) -> Certificate:
    """The same by colourings, signatures at roots of unity, modules, sublinks, 3-braids."""
    return make_different(generator, FINER)
