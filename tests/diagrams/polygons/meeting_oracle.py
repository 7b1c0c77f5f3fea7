"""Whether segments meet, and polygons themselves, decided by least distances and fractions."""

from fractions import Fraction
from itertools import combinations


def is_polygon_meeting_itself(rows):
    """Every pair of edges of a polygon, neighbours by whether they fold back."""
    points = [tuple(map(Fraction, row)) for row in rows]
    count = len(points)
    for i, j in combinations(range(count), 2):
        a, b, c, d = points[i], points[(i + 1) % count], points[j], points[(j + 1) % count]
        if b == c:
            meets = _folds_back(a, b, d)
        elif d == a:
            meets = _folds_back(c, a, b)
        else:
            meets = is_meeting_by_fractions(a, b, c, d)
        if meets:
            return True
    return False


def _folds_back(a, b, c):
    u, w = _minus(a, b), _minus(c, b)
    return _dot(u, w) > 0 and _dot(u, w) ** 2 == _dot(u, u) * _dot(w, w)


def is_meeting_by_fractions(a, b, c, d):
    """Minimise |a + s (b - a) - c - t (d - c)|^2 over the square: is the least value 0?"""
    u, w, g = (_minus(b, a), _minus(d, c), _minus(a, c))
    candidates = [(s, _clamped(_dot(_plus(g, u, s), w), _dot(w, w))) for s in (0, 1)]
    candidates += [(_clamped(-_dot(_plus(g, w, -t), u), _dot(u, u)), t) for t in (0, 1)]
    lower = _dot(u, u) * _dot(w, w) - _dot(u, w) ** 2
    if lower:
        s = (_dot(u, w) * _dot(g, w) - _dot(w, w) * _dot(g, u)) / lower
        if 0 <= s <= 1:
            candidates.append((s, _clamped(_dot(_plus(g, u, s), w), _dot(w, w))))
    gaps = [_plus(_plus(g, u, s), w, -t) for s, t in candidates]
    return any(_dot(gap, gap) == 0 for gap in gaps)


def _clamped(upper, lower):
    return min(max(upper / lower, Fraction(0)), Fraction(1)) if lower else Fraction(0)


def _minus(u, v):
    return tuple(x - y for x, y in zip(u, v, strict=True))


def _plus(u, v, factor):
    return tuple(x + factor * y for x, y in zip(u, v, strict=True))


def _dot(u, v):
    return sum(x * y for x, y in zip(u, v, strict=True))
