"""Seeded scrambles: long words for the same oriented link, made by moves chosen at random."""

import random

from braidsearch.words import Braid


def scramble(braid: Braid, generator: random.Random, moves: int, more_strands: int) -> Braid:
    """The braid after ``moves`` random conjugations, stabilizations and relations.

    At most ``more_strands`` stabilizations; every one of the moves keeps the closure.
    """
    word, strands = list(braid.word), braid.strands
    room = more_strands
    for _ in range(moves):
        kind = generator.choice(["conjugate", "rotate", "insert", "relation", "stabilize"])
        if kind == "stabilize" and room:
            word.append(generator.choice([1, -1]) * strands)
            strands, room = strands + 1, room - 1
        elif kind == "rotate" and word:
            cut = generator.randrange(len(word))
            word = word[cut:] + word[:cut]
        elif strands > 1:
            letter = generator.choice([1, -1]) * generator.randrange(1, strands)
            if kind == "conjugate":
                word = [-letter, *word, letter]
            elif kind == "insert":
                place = generator.randrange(len(word) + 1)
                word[place:place] = [letter, -letter]
            else:
                apply_random_relation(word, generator)
    return Braid(word, strands)


def apply_random_relation(word: list[int], generator: random.Random) -> None:
    """Apply one braid relation somewhere in the word, in place, if there is room for any.

    Distant letters commute. Of neighbouring indices i and j, i^e j^e i^f = j^f i^e j^e for any
    signs e and f, and its reverse i^e j^f i^f = j^f i^f j^e.
    """
    places = [place for place in range(len(word) - 1) if _has_relation(word, place)]
    if not places:
        return
    place = generator.choice(places)
    if abs(abs(word[place]) - abs(word[place + 1])) > 1:
        word[place], word[place + 1] = word[place + 1], word[place]
        return
    first, middle, last = word[place : place + 3]
    i, j = abs(first), abs(middle)
    signs = [1 if letter > 0 else -1 for letter in (last, middle, first)]
    word[place : place + 3] = [signs[0] * j, signs[1] * i, signs[2] * j]


def _has_relation(word: list[int], place: int) -> bool:
    gap = abs(abs(word[place]) - abs(word[place + 1]))
    if gap > 1:
        return True
    if gap == 0 or place + 2 >= len(word) or abs(word[place + 2]) != abs(word[place]):
        return False
    first, middle, last = (letter > 0 for letter in word[place : place + 3])
    return middle in (first, last)
