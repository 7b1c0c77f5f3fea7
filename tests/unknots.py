"""Seeded words for the unknot: hard ones from the literature, and long ones by random moves."""

import random

from braidsearch.words import Braid
from tests.scrambles import apply_random_relation

# Morton, An irreducible 4-string braid with unknotted closure, 1983, in mirror form; the word is
# from memory, and that its closure is the unknot is what the tests find out.
MORTON = Braid([3, 3, -2, 3, -2, -1, -1, -1, 2, -1, 2])


def morton_family(power: int) -> Braid:
    """alpha (2 2)^m beta (-2 -2)^m: words for the unknot, made from Morton's by exchange moves.

    With alpha = 3 3 -2 3 -2 and beta = -1 -1 -1 2 -1 2; m = 0 is Morton's braid.
    """
    alpha, beta = [3, 3, -2, 3, -2], [-1, -1, -1, 2, -1, 2]
    return Braid([*alpha, *[2] * (2 * power), *beta, *[-2] * (2 * power)], 4)


def random_unknot(generator: random.Random, letters: int, strands: int) -> Braid:
    """A word of at least so many letters on so many strands whose closure is the unknot.

    It grows from the one-strand braid by stabilizations, conjugations, cancelling pairs, relations
    and rotations, drawn at random.
    """
    word: list[int] = []
    count = 1
    while len(word) < letters or count < strands:
        kind = generator.random()
        if count == 1 or (count < strands and kind < 0.1):
            word.append(generator.choice([1, -1]) * count)
            count += 1
            continue
        letter = generator.choice([1, -1]) * generator.randrange(1, count)
        if kind < 0.35:
            word = [-letter, *word, letter]
        elif kind < 0.45:
            place = generator.randrange(len(word) + 1)
            word[place:place] = [letter, -letter]
        else:
            for _ in range(5):
                apply_random_relation(word, generator)
            cut = generator.randrange(len(word))
            word = word[cut:] + word[:cut]
    return Braid(word, count)


def random_unknots(count: int, seed: int) -> list[Braid]:
    """Seeded unknots of 100 to 400 letters on 5 to 15 strands."""
    generator = random.Random(seed)
    return [
        random_unknot(generator, generator.randint(100, 400), generator.randint(5, 15))
        for _ in range(count)
    ]
