"""Make the coordinates of the Harbour Street melt: rings on a lattice, moved about, then loosened.

    python make_rings.py [FOLDER]

writes the files of the rings into FOLDER (``rings`` beside this file, unless another is given),
the same bytes each time.

Every link begins as a closed braid on the cubic lattice. Then edges are pushed sideways across
squares whose other corners are free, which moves and stretches the rings and never takes one
through another, so the link stays what its braid says (the moves are those of Berg, Foerster,
Random paths and random surfaces on a digital computer, 1981; that they keep the knot type:
Janse van Rensburg, Whittington, The BFACF algorithm and knotted polygons, 1991). Last, every
vertex is displaced at random by less than half a lattice step, so that strands stay apart, and
the whole is turned at random and written with three decimals.
"""

from __future__ import annotations

import math
import random
import sys
from collections.abc import Sequence
from dataclasses import dataclass
from pathlib import Path

Point = tuple[int, int, int]

BOND = 1.5
"""The length of a lattice step in the files."""
NOISE = 0.25
"""The most by which a coordinate is displaced, in lattice steps: a vertex by at most 0.44."""
STEPS = ((1, 0, 0), (-1, 0, 0), (0, 1, 0), (0, -1, 0), (0, 0, 1), (0, 0, -1))


@dataclass(frozen=True)
class Recipe:
    """One file: the closed braid that is in it, how long its rings grow, and in how small a box.

    ``vertices`` counts those of all rings of the file together; ``box`` is the side of the cube,
    in lattice steps, into which they may push: a small one makes a dense tangle of a long ring.
    """

    file: str
    word: tuple[int, ...]
    strands: int
    vertices: int
    box: int = 24


MORTON = (3, 3, -2, 3, -2, -1, -1, -1, 2, -1, 2)
"""A braid for the unknot that no sequence of destabilizations undoes (Morton, An irreducible
4-string braid with unknotted closure, 1983)."""
TURNED = (2, -3, 1, -2, 4, 3)
HIDDEN_UNKNOT = (*TURNED, 1, -2, 3, -4, *(-letter for letter in reversed(TURNED)))
"""A conjugate of a product of all four generators, each once: the unknot on five strands."""

RECIPES = (
    Recipe("molecule-01.txt", (1,), 2, 90),
    Recipe("molecule-02.txt", (1, 1, 1), 2, 160),
    Recipe("molecule-03.txt", MORTON, 4, 320, 9),
    Recipe("molecule-04.csv", (1, -2, 1, -2), 3, 180),
    Recipe("molecule-05.txt", (-1, -1, -1), 2, 200, 10),
    Recipe("molecule-06.txt", (1, 1), 2, 150),
    Recipe("molecule-07.txt", (1, 1, 1, 1, 1), 2, 220),
    Recipe("molecule-08.txt", (1, 1, 1, 2, -1, 2), 3, 240, 10),
    Recipe("molecule-10.txt", (-1, -1), 2, 170),
    Recipe("molecule-11.txt", HIDDEN_UNKNOT, 5, 420, 9),
    Recipe("molecule-12.txt", (1, 1, 1, -2, -2, -2), 3, 260),
    Recipe("molecule-13.csv", (1, 1, 2, 2), 3, 260),
    Recipe("molecule-14.txt", (1, 1, 1, -2, 1, -2), 3, 260),
    Recipe("molecule-15.txt", (1, 2, 1, 2), 3, 300, 9),
    Recipe("molecule-16.txt", (), 2, 180, 8),
    Recipe("molecule-17.txt", (-1, -1, -1, -1, -1), 2, 210),
)
"""What lies in the melt; number 9 is the damaged file."""


def lattice_closed_braid(word: Sequence[int], strands: int) -> list[list[Point]]:
    """The closure of a braid as polygons on the cubic lattice, one a component.

    Strand i runs along x at y = i and returns below, in the plane y = i. At a positive letter the
    strand that comes from i + 1 goes over, one step higher, at a negative one that from i.
    """
    after: list[int] = []
    ways: list[list[Point]] = []
    for start in range(strands):
        way, at = [(-1, start, -1), (-1, start, 0)], start
        for column, letter in enumerate(word):
            x, low = 3 * column, abs(letter) - 1
            if at not in (low, low + 1):
                way += [(x + step, at, 0) for step in range(3)]
                continue
            to = low + 1 if at == low else low
            if (at == low) == (letter < 0):
                way += [(x, at, 0), (x, at, 1), (x + 1, at, 1), (x + 1, to, 1), (x + 2, to, 1)]
                way += [(x + 2, to, 0)]
            else:
                way += [(x, at, 0), (x + 1, at, 0), (x + 1, to, 0), (x + 2, to, 0)]
            at = to
        right = 3 * len(word)
        way += [(right, at, 0)] + [(x, at, -1) for x in range(right, -1, -1)]
        ways.append(way)
        after.append(at)
    return _joined(ways, after)


def _joined(ways: list[list[Point]], after: list[int]) -> list[list[Point]]:
    """The ways of the strands, one behind the other, for each cycle of the permutation."""
    polygons, left = [], set(range(len(ways)))
    while left:
        at, polygon = min(left), []
        while at in left:
            left.remove(at)
            polygon += ways[at]
            at = after[at]
        polygons.append(polygon)
    return polygons


class Melt:
    """Rings on the lattice that move without passing through one another."""

    def __init__(self, polygons: list[list[Point]], box: int, seed: int) -> None:
        self.polygons = polygons
        self._taken = {point for polygon in polygons for point in polygon}
        self._random = random.Random(seed)
        middle = [sum(p[k] for p in self._taken) // len(self._taken) for k in range(3)]
        self._low = [m - box // 2 for m in middle]
        self._high = [m - box // 2 + box for m in middle]

    def move(self, pushes: int, vertices: int) -> None:
        """Try so many pushes; above so many vertices none that makes a ring longer."""
        for _ in range(pushes):
            self._push(len(self._taken) < vertices)

    def _push(self, may_grow: bool) -> None:
        """Push a random edge a b one step sideways, to the opposite edge c d of a square."""
        polygon = self.polygons[self._below(len(self.polygons))]
        i = self._below(len(polygon))
        j = (i + 1) % len(polygon)
        a, b, step = polygon[i], polygon[j], STEPS[self._below(6)]
        c, d = _sum(a, step), _sum(b, step)
        if b == c or a == d:
            return
        comes_from_c, goes_to_d = polygon[i - 1] == c, polygon[(j + 1) % len(polygon)] == d
        if comes_from_c and goes_to_d:
            if len(polygon) > 4:
                self._taken -= {a, b}
                polygon[:] = [point for point in polygon if point not in (a, b)]
        elif comes_from_c:
            self._replace(polygon, i, d)
        elif goes_to_d:
            self._replace(polygon, j, c)
        elif may_grow and self._is_free(c) and self._is_free(d):
            self._taken |= {c, d}
            polygon[i + 1 : i + 1] = [c, d]

    def _replace(self, polygon: list[Point], place: int, point: Point) -> None:
        if self._is_free(point):
            self._taken.remove(polygon[place])
            self._taken.add(point)
            polygon[place] = point

    def _is_free(self, point: Point) -> bool:
        inside = all(
            low <= x < high for low, x, high in zip(self._low, point, self._high, strict=True)
        )
        return inside and point not in self._taken

    def _below(self, count: int) -> int:
        return int(self._random.random() * count)


def _sum(left: Point, right: Point) -> Point:
    return left[0] + right[0], left[1] + right[1], left[2] + right[2]


def loosened(polygons: list[list[Point]], seed: int) -> list[list[tuple[float, ...]]]:
    """The rings with every vertex displaced a little, and the whole turned at random."""
    generator = random.Random(seed)
    turn = _random_rotation(generator)
    found = []
    for polygon in polygons:
        ring = []
        for point in polygon:
            moved = [BOND * (x + NOISE * (2 * generator.random() - 1)) for x in point]
            ring.append(tuple(sum(map(float.__mul__, row, moved)) for row in turn))
        found.append(ring)
    return found


def _random_rotation(generator: random.Random) -> list[list[float]]:
    """A rotation by a unit quaternion, evenly spread (Shoemake, Uniform random rotations, 1992)."""
    u, v, w = generator.random(), 2 * math.pi * generator.random(), 2 * math.pi * generator.random()
    low, high = math.sqrt(1 - u), math.sqrt(u)
    a, b, c, d = low * math.sin(v), low * math.cos(v), high * math.sin(w), high * math.cos(w)
    return [
        [1 - 2 * (c * c + d * d), 2 * (b * c - a * d), 2 * (b * d + a * c)],
        [2 * (b * c + a * d), 1 - 2 * (b * b + d * d), 2 * (c * d - a * b)],
        [2 * (b * d - a * c), 2 * (c * d + a * b), 1 - 2 * (b * b + c * c)],
    ]


def make_rings(recipe: Recipe, seed: int) -> list[list[tuple[float, ...]]]:
    """The coordinates of the rings of one file."""
    melt = Melt(lattice_closed_braid(recipe.word, recipe.strands), recipe.box, seed)
    melt.move(40_000, 0)
    melt.move(400 * recipe.vertices, recipe.vertices)
    return loosened(melt.polygons, seed)


def ring_text(rings: list[list[tuple[float, ...]]], separator: str) -> str:
    """Rows x y z, a blank line between rings."""
    blocks = ["\n".join(separator.join(f"{x:.3f}" for x in row) for row in ring) for ring in rings]
    return "\n\n".join(blocks) + "\n"


def main(arguments: Sequence[str]) -> None:
    """Write every file, and the damaged one, which lost a coordinate."""
    folder = Path(arguments[0]) if arguments else Path(__file__).parent / "rings"
    folder.mkdir(parents=True, exist_ok=True)
    for number, recipe in enumerate(RECIPES):
        is_table = recipe.file.endswith(".csv")
        text = ring_text(make_rings(recipe, 2_000 + number), "," if is_table else " ")
        (folder / recipe.file).write_text("x,y,z\n" * is_table + text, encoding="utf-8")
    rows = (folder / "molecule-02.txt").read_text(encoding="utf-8").splitlines()[:60]
    rows[22] = rows[22].rsplit(" ", 1)[0]
    (folder / "molecule-09.txt").write_text("\n".join(rows) + "\n", encoding="utf-8")


if __name__ == "__main__":
    main(sys.argv[1:])
