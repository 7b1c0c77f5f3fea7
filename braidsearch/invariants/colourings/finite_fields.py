"""Finite fields of any prime power order, small enough for tables."""

from __future__ import annotations

from dataclasses import dataclass
from functools import cached_property, lru_cache
from itertools import product

from braidsearch.errors import CapacityError

LARGEST_ORDER = 1_000


@dataclass(frozen=True)
class FiniteField:
    """The field with characteristic^degree elements, the integers 0, ..., order - 1.

    The base-p digits of an element, lowest first, are its coordinates in powers of a root of the
    first polynomial, in lexicographic order of its coefficients, whose root generates the
    multiplicative group. So 0 and 1 are what they should be, and addition is digit by digit.
    """

    characteristic: int
    degree: int

    @property
    def order(self) -> int:
        """The number of elements."""
        return int(self.characteristic**self.degree)

    @property
    def primitive_element(self) -> int:
        """A generator of the multiplicative group."""
        return self._powers[1 % (self.order - 1)]

    def add(self, left: int, right: int) -> int:
        """The sum."""
        digits = zip(self._digits(left), self._digits(right), strict=True)
        return self._element([a + b for a, b in digits])

    def negative(self, element: int) -> int:
        """The element that adds up to zero with this one."""
        return self._element([-digit for digit in self._digits(element)])

    def multiply(self, left: int, right: int) -> int:
        """The product."""
        if not left or not right:
            return 0
        return self._powers[(self._logarithms[left] + self._logarithms[right]) % (self.order - 1)]

    def power(self, element: int, exponent: int) -> int:
        """A power; negative exponents for non-zero elements alone."""
        if not element:
            if exponent < 0:
                raise ZeroDivisionError("the inverse of 0 in a field")
            return 0 if exponent else 1
        return self._powers[self._logarithms[element] * exponent % (self.order - 1)]

    def frobenius(self, element: int, times: int = 1) -> int:
        """The field automorphism t -> t^p, carried out so many times."""
        return self.power(element, self.characteristic ** (times % self.degree))

    def _digits(self, element: int) -> list[int]:
        digits = []
        for _ in range(self.degree):
            element, digit = divmod(element, self.characteristic)
            digits.append(digit)
        return digits

    def _element(self, digits: list[int]) -> int:
        value = 0
        for digit in reversed(digits):
            value = value * self.characteristic + digit % self.characteristic
        return value

    @cached_property
    def _powers(self) -> list[int]:
        """The powers of the root, exponents 0 to order - 2."""
        for coefficients in product(range(self.characteristic), repeat=self.degree):
            powers = self._powers_of_root(list(coefficients))
            if len(powers) == self.order - 1:
                return powers
        raise AssertionError("the multiplicative group of a finite field is cyclic")

    def _powers_of_root(self, coefficients: list[int]) -> list[int]:
        """The distinct powers of a root r of r^k = the sum of coefficients[i] r^i."""
        powers: list[int] = []
        digits = [1] + [0] * (self.degree - 1)
        while not powers or (any(digits) and self._element(digits) != 1):
            powers.append(self._element(digits))
            shifted, top = [0, *digits[:-1]], digits[-1]
            digits = [
                (digit + top * coefficient) % self.characteristic
                for digit, coefficient in zip(shifted, coefficients, strict=True)
            ]
            if len(powers) > self.order:
                return []
        return powers if any(digits) else []

    @cached_property
    def _logarithms(self) -> dict[int, int]:
        return {element: exponent for exponent, element in enumerate(self._powers)}


@lru_cache(maxsize=64)
def finite_field(order: int) -> FiniteField:
    """The field with so many elements.

    Raises ValueError unless the order is a power of a prime, CapacityError above LARGEST_ORDER.
    """
    if order > LARGEST_ORDER:
        raise CapacityError(f"a field with {order} elements: expected at most {LARGEST_ORDER}")
    prime = next((p for p in range(2, order + 1) if order % p == 0), 0)
    degree, rest = 0, order
    while prime and rest % prime == 0:
        degree, rest = degree + 1, rest // prime
    if rest != 1 or degree == 0:
        raise ValueError(f"a field with {order} elements: expected a power of a prime")
    return FiniteField(prime, degree)
