"""The classes of 3-braids that a flype leads out of: recognition, complete, by runs of signs.

The claim. Let F be the class of 1^u 2^v 1^w 2^e, e = +-1, and F' that of its flype
1^w 2^v 1^u 2^e. Then F' is F read backwards, and the classes F that differ from F' are exactly
those that ``flype_exponents`` recognises. So the flype partner depends on F alone, in whatever
way F is written as such a word.

Reading backwards. 2^e 1^w 2^v 1^u is the first word read backwards and a rotation of the second.
Read backwards, the exponent sum stays and the cyclic word in a and b is read backwards
(``ThreeBraidClass.reverse``). So F = F' exactly when the cyclic word is its own reversal, up to
rotation: call it symmetric. In particular every cyclic word of two runs at most is symmetric.

It is enough to treat e = 1: all crossings changed, the signs and the full twists are negated.

Where F = F' at once. (1) u = w. (2) v in {0, 1}: 1^(u+w) 2 has two blocks, and 1^w 2 1^u 2 is a
rotation of 1^u 2 1^w 2. (3) v = -1: since 2^-1 1^w 2 = 1 2^w 1^-1 the class is that of 1^u 2^w.
(4) u = 0: the class of 2^(v+1) 1^w. (5) u = 1: 1 2^v 1^w 2 is conjugate to 2 1 2^v 1^w =
1^v 2 1 1^w, so to 1^(v+w+1) 2. (6) u = 2: since 2 1 1 2 = Delta^2 1^-2 the class is that of
Delta^2 2^(v-1) 1^(w-2). (7) w in {0, 1, 2}: by symmetry. A product of two blocks 1^m 2^n, with full
twists or without, is its own reversal up to rotation, as a braid.

What remains. |v| >= 2 and u, w <= -1 or >= 3, u != w. The table gives the cyclic sequence of the
exponents of b after reduction, as runs of signs, and d, the power of Delta^2 (``full_twists``),
with p = -u or q = -w where these are positive and m = -v. Each line is the product of
  1^i = (b^-1 a)^i, 1^-i = (a b)^i, 2^i = (a b^-1)^i, 2^-i = (b a)^i  (i > 0),
reduced at its four junctions; no block collapses, since every block left has the exponent stated,
which is not negative.

  u < 0, w < 0, v > 0   + p,    - v,    + q,    - 1             d = 0
  u < 0, w > 2, v < 0   + p,    - 1,    + m-1,  - w-1           d = 0
  u < 0, w > 2, v > 0   + p+1,  - v-1,  + 1,    - w-2           d = 1
  u > 2, w > 2, v < 0   - u-2,  + m,    - w-2,  + 1             d = 1
  u < 0, w < 0, v < 0   + p-1,  - 1,    + m-2,  - 1,  + q-1,  - 1     d = -1, + may be empty
  u > 2, w > 2, v > 0   - u-3,  + 1,    - v-2,  + 1,  - w-3,  + 1     d = 2, - may be empty
  u > 2, w < 0          the lines with u < 0, w > 2, u and w exchanged, read backwards

The first two lines say the same: all runs + P, - y, + Q, - 1 with y >= 2. Such a word is symmetric
exactly when P = Q. The next two say: + P, - x, + 1, - y with P >= 2, symmetric exactly when x = y.
The last two: three single signs of one kind apart by three runs of the other, symmetric exactly
when two of the runs are equal. The exponents are the lengths of the runs up to constants, so they
are read off: the recognition tries the rotations of at most six runs and misses nothing. No search
over exponents is needed, and a word with N letters b has |u| + |v| + |w| <= N + 5.

As a by-product F != F' exactly when u != w, |v| >= 2 and neither u nor w is one of 0, e, 2e, v+e
(Ko, Lee, Flypes of closed 3-braids in the standard contact space, 1999). The torus links (2, k)
and the unknot have symmetric words, so that no class is in both families.
"""

from __future__ import annotations

from collections.abc import Sequence

from braidsearch.three_braids.conjugacy import ThreeBraidClass

Exponents = tuple[int, int, int, int]
"""u, v, w, e: the word 1^u 2^v 1^w 2^e."""

Run = tuple[int, int]


def flype_exponents(named: ThreeBraidClass) -> Exponents | None:
    """u, v, w, e with 1^u 2^v 1^w 2^e in the class, where the flype of this leads to another one.

    None when there is no such word: every flype leads back to the class, or there is none.
    """
    for sign in (1, -1):
        runs = [(sign * kind, length) for kind, length in named.runs]
        found = _positive_exponents(runs, sign * named.full_twists)
        if found is not None:
            u, v, w = found
            return sign * u, sign * v, sign * w, sign
    return None


def _positive_exponents(runs: Sequence[Run], twists: int) -> tuple[int, int, int] | None:
    """u, v, w for e = 1, from the cyclic runs of signs, line by line of the table."""
    if twists in (0, 1) and len(runs) == 4:
        starts = [start for start in range(4) if runs[start][0] == 1]
        return next(filter(None, (_from_runs(runs, start, twists) for start in starts)), None)
    if twists in (-1, 2):
        gaps = _three_gaps(runs, -1 if twists < 0 else 1)
        return _from_gaps(gaps, twists) if len(set(gaps)) == 3 else None
    return None


def _from_runs(runs: Sequence[Run], start: int, twists: int) -> tuple[int, int, int] | None:
    first, second, third, fourth = (length for _, length in (*runs[start:], *runs[:start]))
    if twists == 0 and fourth == 1 < second and first != third:
        return -first, second, -third
    if twists == 1 and third == 1 < first and second != fourth:
        return 1 - first, second + 1, fourth + 2
    return None


def _from_gaps(gaps: Sequence[int], twists: int) -> tuple[int, int, int]:
    first, second, third = gaps
    if twists < 0:
        return -first - 1, -second - 2, -third - 1
    return first + 3, second + 2, third + 3


def _three_gaps(runs: Sequence[Run], single: int) -> list[int]:
    """How many other signs follow each of the three ``single`` ones, in cyclic order.

    The runs are even in number, or just one; an empty list where there are not three.
    """
    if sum(length for kind, length in runs if kind == single) != 3 or len(runs) < 2:
        return []
    start = next(place for place, (kind, _) in enumerate(runs) if kind == single)
    ordered = (*runs[start:], *runs[:start])
    gaps: list[int] = []
    for (_, singles), (_, others) in zip(ordered[::2], ordered[1::2], strict=True):
        gaps += [0] * (singles - 1) + [others]
    return gaps
