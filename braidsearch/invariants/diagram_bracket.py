"""The Kauffman bracket of a diagram, by a state sum over a sweep: exact, or modulo a number."""

from __future__ import annotations

from collections.abc import Callable, Iterator
from dataclasses import dataclass

from braidsearch.diagrams.link_diagram import LinkDiagram
from braidsearch.errors import CapacityError
from braidsearch.invariants.diagram_sweep import Sweep, sweep_diagram
from braidsearch.invariants.laurent import Polynomial

MAX_STATES = 3_000_000
"""The largest ``Sweep.state_count`` that is taken on; a million takes some seconds."""

_MAX_PACKED_BITS = 4e9
_A_SMOOTHING = ((0, 1), (2, 3))
_B_SMOOTHING = ((1, 2), (3, 0))


@dataclass(frozen=True)
class _Ring:
    """What the state sum does to a coefficient: the two smoothings of a crossing, and a loop."""

    one: int
    smooth_a: Callable[[int], int]
    smooth_b: Callable[[int], int]
    loop: Callable[[int], int]
    add: Callable[[int, int], int]


def diagram_jones_polynomial(diagram: LinkDiagram) -> Polynomial:
    """The Jones polynomial of the diagram's link, computed on the diagram itself.

    Terms [e, c] with c the coefficient of t^(e/2), sorted, as in ``jones_polynomial``.

    The bracket <D> is the sum over all ways to smooth the crossings of A^(a - b) d^(loops - 1),
    a of them in the way of A, which joins the regions that the over-strand sweeps when it is
    turned counterclockwise, b in the other, and d = -A^2 - A^-2; then V = (-A^3)^-w <D> with
    t = A^-4 and w the writhe (Kauffman, State models and the Jones polynomial, 1987). With
    q = A^2 the sum is A^-c times one in q^a d^loops, d = -q - 1/q. Its coefficients are below
    2^(c + loops) and there are at most c + pieces loops, so they are read off a single integer,
    the value at q = 2^bits.

    Raises CapacityError where too many arcs are open at a time, see ``is_bracket_feasible``.
    """
    sweep = sweep_diagram(diagram)
    if not is_jones_feasible(diagram, sweep):
        raise CapacityError(_too_wide("the Jones polynomial", diagram, sweep))
    crossings = len(diagram.crossings)
    most_loops = crossings + len(diagram.pieces) + diagram.circles
    bits = crossings + most_loops + 2
    ring = _Ring(
        one=1 << (bits * most_loops),
        smooth_a=lambda value: value << bits,
        smooth_b=lambda value: value,
        loop=lambda value: -(value << bits) - (value >> bits),
        add=int.__add__,
    )
    total = _state_sum(diagram, sweep, ring)
    # One loop less: divide by d = -(q^2 + 1)/q.
    quotient = -(total << bits) // ((1 << (2 * bits)) + 1)
    writhe = diagram.writhe
    sign = -1 if writhe % 2 else 1
    highest = (crossings + 3 * writhe) // 2 + most_loops
    terms = [
        [highest - power, sign * digit] for power, digit in _iter_signed_digits(quotient, bits)
    ]
    return sorted(terms)


def is_jones_feasible(diagram: LinkDiagram, sweep: Sweep) -> bool:
    """Whether the exact polynomial can be computed: few states, and not too long coefficients."""
    crossings = len(diagram.crossings)
    return (
        sweep.state_count <= MAX_STATES
        and sweep.state_count * 8.0 * (crossings + diagram.circles) ** 2 <= _MAX_PACKED_BITS
    )


def is_bracket_feasible(sweep: Sweep) -> bool:
    """Whether a value of the bracket can be computed: the sweep has at most MAX_STATES states."""
    return sweep.state_count <= MAX_STATES


def bracket_value(diagram: LinkDiagram, variable: int, modulus: int) -> int:
    """(-A^3)^-w <D> for A = ``variable``, an invariant of the oriented link, modulo ``modulus``.

    It is the value of the Jones polynomial at t^(1/2) = A^-2, a residue from 0 upwards. A and
    A^4 + 1 must have inverses modulo the modulus, which may be a product of primes: one sum then
    yields the values modulo each of them.

    Raises CapacityError where too many arcs are open at a time, see ``is_bracket_feasible``.
    """
    sweep = sweep_diagram(diagram)
    if not is_bracket_feasible(sweep):
        raise CapacityError(_too_wide("the bracket", diagram, sweep))
    inverse = pow(variable, -1, modulus)
    loop = -(variable**2 + inverse**2) % modulus
    ring = _Ring(
        one=pow(loop, -1, modulus),
        smooth_a=lambda value: value * variable % modulus,
        smooth_b=lambda value: value * inverse % modulus,
        loop=lambda value: value * loop % modulus,
        add=lambda left, right: (left + right) % modulus,
    )
    kink = pow(-(variable**3), -diagram.writhe, modulus)
    return _state_sum(diagram, sweep, ring) * kink % modulus


def jones_value(polynomial: Polynomial, variable: int, modulus: int) -> int:
    """The value of a Jones polynomial in half powers of t at t^(1/2) = A^-2, A = ``variable``."""
    return sum(c * pow(variable, -2 * exponent, modulus) for exponent, c in polynomial) % modulus


def _too_wide(title: str, diagram: LinkDiagram, sweep: Sweep) -> str:
    return (
        f"{title} of a diagram with {len(diagram.crossings)} crossings, {sweep.width} arcs open "
        f"at a time: expected a narrower diagram"
    )


def _state_sum(diagram: LinkDiagram, sweep: Sweep, ring: _Ring) -> int:
    """The sum over all smoothings, one crossing after the other.

    A state tells, of the part of the diagram already smoothed, which open arcs it joins: at the
    slot of each of them stands the slot of the other, and 0 at free slots.
    """
    states = {bytes(1): ring.one}
    for step in _iter_steps(diagram, sweep):
        following: dict[bytes, int] = {}
        for state, value in states.items():
            longer = bytearray(state) + bytes(max(0, step.slots - len(state)))
            for one, other in step.opened:
                longer[one], longer[other] = other, one
            for pairs, smooth in ((_A_SMOOTHING, ring.smooth_a), (_B_SMOOTHING, ring.smooth_b)):
                joined = bytearray(longer)
                weight = smooth(value)
                for place, other_place in pairs:
                    if _join(joined, step.inner[place], step.inner[other_place]):
                        weight = ring.loop(weight)
                key = bytes(joined)
                known = following.get(key)
                following[key] = weight if known is None else ring.add(known, weight)
        states = following
    (total,) = states.values()
    for _ in range(diagram.circles):
        total = ring.loop(total)
    return total


def _join(state: bytearray, one: int, other: int) -> bool:
    """Join the open arcs at two slots, which become free; return whether that closes a loop."""
    far_one, far_other = state[one], state[other]
    state[one] = state[other] = 0
    if far_one == other:
        return True
    state[far_one], state[far_other] = far_other, far_one
    return False


@dataclass(frozen=True)
class _Step:
    """One crossing of the sweep: slots opened in pairs beforehand, and those at its four places.

    ``slots`` is one more than the largest slot in use.
    """

    opened: tuple[tuple[int, int], ...]
    inner: tuple[int, ...]
    slots: int


def _iter_steps(diagram: LinkDiagram, sweep: Sweep) -> Iterator[_Step]:
    """Slots for open arcs: an arc that is first met here is opened as a pair, one slot for this
    crossing and one for its other end.
    """
    slot_of_end: dict[int, int] = {}
    free: list[int] = []
    largest = 0
    for crossing in sweep.order:
        opened = []
        for end in range(4 * crossing, 4 * crossing + 4):
            if end in slot_of_end:
                continue
            while len(free) < 2:
                largest += 1
                free.append(largest)
            pair = free.pop(), free.pop()
            slot_of_end[end], slot_of_end[diagram.opposite_ends[end]] = pair
            opened.append(pair)
        inner = tuple(slot_of_end.pop(end) for end in range(4 * crossing, 4 * crossing + 4))
        yield _Step(tuple(opened), inner, largest + 1)
        free += inner


def _iter_signed_digits(value: int, bits: int) -> Iterator[tuple[int, int]]:
    """The non-zero digits of an integer to the base 2^bits, from -2^(bits-1) upwards."""
    base, half = 1 << bits, 1 << (bits - 1)
    place = 0
    while value:
        digit = (value + half) % base - half
        if digit:
            yield place, digit
        value = (value - digit) >> bits
        place += 1
