"""Roots of unity: their cosines to any precision, and their images modulo primes."""

from functools import lru_cache
from math import gcd

from braidsearch.invariants.residues import is_prime

_PRIME_BOUND = 2**31
_GUARD_BITS = 32


@lru_cache(maxsize=1024)
def fixed_point_cosine(power: int, order: int, precision: int) -> int:
    """2^precision times cos(2 pi power / order), to within 1; exact where that is an integer.

    Taylor's series in integers with 32 bits to spare, for angles of at most a quarter turn. There
    it has fewer terms than bits, so their roundings stay below half a unit.
    """
    turned = min(power % order, -power % order)  # cos is even: at most half a turn
    if 4 * turned > order:
        return -fixed_point_cosine(order - 2 * turned, 2 * order, precision)
    bits = precision + _GUARD_BITS
    angle = 2 * turned * fixed_point_pi(bits) // order
    square = angle * angle >> bits
    total, term, place = 0, 1 << bits, 0
    while term:
        total += -term if place % 4 else term
        place += 2
        term = (term * square >> bits) // (place * (place - 1))
    return (total + (1 << (_GUARD_BITS - 1))) >> _GUARD_BITS


@lru_cache(maxsize=64)
def fixed_point_pi(precision: int) -> int:
    """2^precision times pi, to within 1, by Machin's formula of 1706."""
    bits = precision + _GUARD_BITS
    return (16 * _inverse_tangent(5, bits) - 4 * _inverse_tangent(239, bits)) >> _GUARD_BITS


def _inverse_tangent(inverse: int, bits: int) -> int:
    """2^bits times arctan(1 / inverse), to within the number of its terms."""
    power = (1 << bits) // inverse
    total, place, sign = 0, 1, 1
    while power:
        total += sign * (power // place)
        power //= inverse * inverse
        place, sign = place + 2, -sign
    return total


@lru_cache(maxsize=4096)
def root_modulo_prime(order: int, number: int) -> tuple[int, int]:
    """The prime p = 1 mod ``order`` with this number, counted down from 2^31, and a root.

    The root has exactly the multiplicative order ``order``: the map of exp(2 pi i / order) to it
    extends to a homomorphism of the cyclotomic integers onto the field of p elements.
    """
    before = _PRIME_BOUND - 1 if number == 0 else root_modulo_prime(order, number - 1)[0] - 1
    candidate = (before - 1) // order * order + 1
    while not is_prime(candidate):
        candidate -= order
    return candidate, _root_of_order(order, candidate)


def _root_of_order(order: int, prime: int) -> int:
    divisors = [divisor for divisor in range(1, order) if order % divisor == 0]
    base = 2
    while True:
        root: int = pow(base, (prime - 1) // order, prime)
        if all(pow(root, divisor, prime) != 1 for divisor in divisors):
            return root
        base += 1


def totient(order: int) -> int:
    """The number of primitive roots of unity of this order, the degree of their field."""
    return sum(1 for power in range(1, order + 1) if gcd(power, order) == 1)
