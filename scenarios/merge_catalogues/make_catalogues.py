"""Make the two catalogues from recipes.py: scrambled words, diagram codes, curves in space.

    python make_catalogues.py [FOLDER]

writes register.csv, field_list.jsonl and curves/ into FOLDER (the folder of this file, unless
another is given), the same bytes each time.

Every link begins as a closed braid. A scramble conjugates, stabilizes, inserts a letter with its
inverse and applies relations of the braid group, none of which changes the closed braid as a link.
Then it is written down as the word, as the planar diagram code of its closure, or as closed
polygons around an axis, which are sheared, turned and shaken by less than the strands are apart.
"""

from __future__ import annotations

import csv
import json
import math
import random
import sys
from collections.abc import Sequence
from dataclasses import dataclass
from pathlib import Path
from typing import Any

from recipes import FIELD_LIST, LINKS, MORTON, REGISTER, SMUDGED, Recipe, Word

Point = tuple[float, float, float]

INNERMOST = 4.0
"""The radius of the first strand; each further one runs a step farther out."""
SHAKE = 0.12
"""The most by which a coordinate is displaced: strands stay at least 0.7 apart, and no point of
them moves by more than 0.21.
"""


# scrambles


def scramble(
    word: Word, strands: int, recipe: Recipe, generator: random.Random
) -> tuple[Word, int]:
    """Another word for the same link, perhaps on more strands."""
    letters, room = list(word), recipe.more_strands
    for _ in range(recipe.moves):
        kind = ("conjugate", "rotate", "insert", "relation", "relation", "stabilize")[
            below(generator, 6)
        ]
        if kind == "stabilize" and room:
            letters.append(random_sign(generator) * strands)
            strands, room = strands + 1, room - 1
        elif kind == "rotate" and letters:
            cut = below(generator, len(letters))
            letters = letters[cut:] + letters[:cut]
        elif kind == "relation":
            apply_random_relation(letters, generator)
        elif strands > 1:
            letter = random_sign(generator) * (1 + below(generator, strands - 1))
            if kind == "conjugate":
                letters = [-letter, *letters, letter]
            else:
                place = below(generator, len(letters) + 1)
                letters[place:place] = [letter, -letter]
    return freely_reduced(letters), strands


def freely_reduced(letters: Sequence[int]) -> Word:
    """The word without letters beside their inverses, which nobody would print."""
    kept: list[int] = []
    for letter in letters:
        if kept and kept[-1] == -letter:
            kept.pop()
        else:
            kept.append(letter)
    return tuple(kept)


def apply_random_relation(letters: list[int], generator: random.Random) -> None:
    """Commute two distant letters, or turn i j i into j i j, at a random place that has room.

    Of signs, i^e j^e i^f = j^f i^e j^e and its reverse i^e j^f i^f = j^f i^f j^e hold for any e, f.
    """
    places = [place for place in range(len(letters) - 1) if has_relation(letters, place)]
    if not places:
        return
    place = places[below(generator, len(places))]
    first, second = letters[place : place + 2]
    if abs(abs(first) - abs(second)) > 1:
        letters[place : place + 2] = [second, first]
        return
    i, j = abs(first), abs(second)
    signs = [1 if letter > 0 else -1 for letter in (letters[place + 2], second, first)]
    letters[place : place + 3] = [signs[0] * j, signs[1] * i, signs[2] * j]


def has_relation(letters: Sequence[int], place: int) -> bool:
    """Whether a relation begins at the place."""
    gap = abs(abs(letters[place]) - abs(letters[place + 1]))
    if gap != 1 or place + 2 >= len(letters) or abs(letters[place + 2]) != abs(letters[place]):
        return gap > 1
    first, middle, last = (letter > 0 for letter in letters[place : place + 3])
    return middle in (first, last)


def image_of(word: Word, image: str) -> Word:
    """The word of the mirror image, the reverse, or both."""
    if image in ("mirror", "mirror-reverse"):
        word = tuple(-letter for letter in word)
    return word[::-1] if image in ("reverse", "mirror-reverse") else word


def below(generator: random.Random, count: int) -> int:
    """A random number from 0 to ``count`` - 1, the same with every version of Python."""
    return int(generator.random() * count)


def random_sign(generator: random.Random) -> int:
    """1 or -1."""
    return 1 - 2 * below(generator, 2)


# planar diagram codes


@dataclass
class Crossing:
    """Four arcs, counterclockwise from the incoming under-arc; at a positive crossing the
    over-strand comes in at the fourth place, at a negative one at the second.
    """

    arcs: list[int]
    is_positive: bool


def diagram_of(word: Word, strands: int) -> list[Crossing]:
    """The closure of a braid of which a letter meets every strand: arcs 2 k and 2 k + 1 lie below
    letter k, on the left and on the right.
    """
    current = [-1] * strands
    for number, letter in enumerate(word):
        current[abs(letter) - 1 : abs(letter) + 1] = 2 * number, 2 * number + 1
    if -1 in current:
        raise ValueError(f"{word}: expected a letter at every strand, or a polygon")
    crossings = []
    for number, letter in enumerate(word):
        index = abs(letter)
        left, right = current[index - 1 : index + 1]
        below_left, below_right = 2 * number, 2 * number + 1
        current[index - 1 : index + 1] = below_left, below_right
        around = [left, below_left, below_right, right]  # counterclockwise, strands run downwards
        crossings.append(Crossing(around if letter > 0 else around[-1:] + around[:-1], letter > 0))
    return crossings


def following_arcs(crossings: Sequence[Crossing]) -> dict[int, int]:
    """Which arc comes behind which."""
    after = {}
    for crossing in crossings:
        under, second, ahead, fourth = crossing.arcs
        after[under] = ahead
        after |= {fourth: second} if crossing.is_positive else {second: fourth}
    return after


def components_of(crossings: Sequence[Crossing]) -> list[list[int]]:
    """The arcs of each component, along its direction."""
    after = following_arcs(crossings)
    components, seen = [], set[int]()
    for start in sorted(after):
        if start not in seen:
            component = [start]
            while after[component[-1]] != start:
                component.append(after[component[-1]])
            seen |= set(component)
            components.append(component)
    return components


def with_reversed_component(crossings: Sequence[Crossing]) -> list[Crossing]:
    """The diagram with the first of its components run through the other way."""
    turned = set(components_of(crossings)[0])
    made = []
    for crossing in crossings:
        under, over = (crossing.arcs[place] in turned for place in (0, 1))
        arcs = crossing.arcs[2:] + crossing.arcs[:2] if under else crossing.arcs
        made.append(Crossing(list(arcs), crossing.is_positive ^ under ^ over))
    return made


def planar_diagram_code(crossings: Sequence[Crossing], generator: random.Random) -> list[list[int]]:
    """The code with components, their first arcs and the crossings in a random order."""
    components, labels = shuffled(components_of(crossings), generator), dict[int, int]()
    for component in components:
        start = below(generator, len(component))
        for arc in component[start:] + component[:start]:
            labels[arc] = len(labels) + 1
    return shuffled([[labels[arc] for arc in one.arcs] for one in crossings], generator)


def shuffled(items: Sequence[Any], generator: random.Random) -> list[Any]:
    """The items in a random order."""
    left, made = list(items), []
    while left:
        made.append(left.pop(below(generator, len(left))))
    return made


# curves in space


def polygons_of(word: Word, strands: int) -> list[list[Point]]:
    """The closure as polygons that run clockwise around the axis, one for each component.

    Strands that run down a page have the first one, which is on the left of the page, on the right
    of their way; seen from above, what runs clockwise has the axis there. So strand i runs at the
    radius INNERMOST + i. Half-way through a letter both of its strands are at one radius, the one
    from outside half a step above at a positive letter, half a step below at a negative one.
    """
    after, ways = list(range(strands)), []
    for start in range(strands):
        at, way = start, list[tuple[float, float]]()
        for letter in word:
            way.append((INNERMOST + at, 0.0))
            low = abs(letter) - 1
            is_outer = at == low + 1
            if at not in (low, low + 1):
                way.append((INNERMOST + at, 0.0))
                continue
            way.append((INNERMOST + low + 0.5, 0.5 if is_outer == (letter > 0) else -0.5))
            at = low if is_outer else low + 1
        way += [(INNERMOST + at, 0.0)] * max(8 - 2 * len(word), 1)
        after[start] = at
        ways.append(way)
    return [
        bent([step for at in cycle for step in ways[at]], len(ways[0]))
        for cycle in cycles_of(after)
    ]


def bent(way: Sequence[tuple[float, float]], turn: int) -> list[Point]:
    """Radius and height of each step as a point, so many of them to one turn around the axis."""
    angles = [-2 * math.pi * step / turn for step in range(len(way))]
    return [
        (radius * math.cos(angle), radius * math.sin(angle), height)
        for (radius, height), angle in zip(way, angles, strict=True)
    ]


def cycles_of(after: Sequence[int]) -> list[list[int]]:
    """The cycles of a permutation."""
    cycles, left = [], set(range(len(after)))
    while left:
        cycle = [min(left)]
        while after[cycle[-1]] != cycle[0]:
            cycle.append(after[cycle[-1]])
        left -= set(cycle)
        cycles.append(cycle)
    return cycles


def disguised(polygons: Sequence[list[Point]], generator: random.Random) -> list[list[Point]]:
    """The polygons shaken, sheared and turned, none of which lets a strand pass another."""
    shear = [2 * generator.random() - 1 for _ in range(3)]
    angles = [2 * math.pi * generator.random() for _ in range(3)]
    made = []
    for polygon in polygons:
        moved = []
        for point in polygon:
            x, y, z = (c + SHAKE * (2 * generator.random() - 1) for c in point)
            x, y = x + shear[0] * y + shear[1] * z, y + shear[2] * z
            for angle in angles:
                turned = x * math.cos(angle) - y * math.sin(angle)
                x, y, z = z, turned, x * math.sin(angle) + y * math.cos(angle)
            moved.append((x, y, z))
        made.append(moved)
    return made


def format_polygons(polygons: Sequence[list[Point]]) -> str:
    """Rows x y z, an empty line between components."""
    blocks = [
        "\n".join(" ".join(f"{coordinate:.3f}" for coordinate in point) for point in polygon)
        for polygon in polygons
    ]
    return "\n\n".join(blocks) + "\n"


# files


def drawn_up(recipe: Recipe) -> tuple[Word, int, random.Random]:
    """The scrambled braid of an entry, and a generator for what follows."""
    generator = random.Random(f"merge catalogues: {recipe.name}")
    strands, word = LINKS[recipe.link]
    if recipe.name == "Q-01":
        strands, word = MORTON
    return *scramble(image_of(word, recipe.image), strands, recipe, generator), generator


def write_register(path: Path) -> None:
    """The printed register: a table of braid words."""
    rows: list[tuple[str, int, str, str]] = [SMUDGED]
    for recipe in REGISTER:
        word, strands, _ = drawn_up(recipe)
        rows.append((recipe.name, strands, " ".join(map(str, word)), recipe.note))
    with open(path, "w", encoding="utf-8", newline="") as file:
        writer = csv.writer(file, lineterminator="\n")
        writer.writerow(("name", "strands", "word", "note"))
        writer.writerows(sorted(rows))


def write_field_list(folder: Path) -> None:
    """The list of the group: JSON lines with diagram codes, and files of curves."""
    (folder / "curves").mkdir(exist_ok=True)
    with open(folder / "field_list.jsonl", "w", encoding="utf-8") as file:
        for recipe in FIELD_LIST:
            entry: dict[str, object] = {"name": recipe.name}
            word, strands, generator = drawn_up(recipe)
            if recipe.form == "polygon":
                entry["polygon"] = f"curves/{recipe.name.replace(' ', '-')}.xyz"
                polygons = disguised(polygons_of(word, strands), generator)
                (folder / str(entry["polygon"])).write_text(format_polygons(polygons))
            else:
                crossings = diagram_of(word, strands)
                if recipe.link.endswith("one component reversed"):
                    crossings = with_reversed_component(crossings)
                entry["pd"] = planar_diagram_code(crossings, generator)
            file.write(json.dumps(entry | {"note": recipe.note}) + "\n")


def main(arguments: Sequence[str]) -> None:
    """Write all files."""
    folder = Path(arguments[0]) if arguments else Path(__file__).parent
    folder.mkdir(parents=True, exist_ok=True)
    write_register(folder / "register.csv")
    write_field_list(folder)


if __name__ == "__main__":
    main(sys.argv[1:])
