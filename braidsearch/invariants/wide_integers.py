"""Tables of polynomials with integer coefficients of any size, as NumPy arrays."""

import numpy as np
from numpy.typing import NDArray

IntArray = NDArray[np.int64]

LIMB_BITS = 44
"""Limbs are digits to the base 2^LIMB_BITS; the 18 bits above are room to grow between carries."""

_WORD_BITS = 62


class WideRows:
    """Polynomials, one a row and one coefficient a column, that grow without wrapping.

    The coefficient at (row, column) is the sum over k of ``limbs[k][row, column]`` times
    2^(LIMB_BITS * k). Whoever changes the rows applies one and the same linear map to every limb,
    and says beforehand by ``reserve`` how often the map can double the largest coefficient. All
    coefficients outside the columns ``low`` to ``high - 1`` are zero.

    The bound: every limb is below 2^b in absolute value, b measured at the last carry, and since
    then at most h doublings were reserved, so it is below 2^(b + h); carries happen before
    b + h would exceed 62. Adding two numbers below 2^62 stays inside 64 bits.
    """

    def __init__(self, rows: int, columns: int, low: int = 0) -> None:
        """A table of zeros; the window is the one column ``low``."""
        self.limbs: list[IntArray] = [np.zeros((rows, columns), dtype=np.int64)]
        self.low = low
        self.high = low + 1
        self._headroom = _WORD_BITS - 1

    def reserve(self, doublings: int) -> None:
        """Make sure that the largest coefficient may be doubled so many times (at most 16)."""
        if self._headroom < doublings:
            self._carry()
            bits = max(_bit_length(limb) for limb in self.limbs)
            self._headroom = _WORD_BITS - bits
        self._headroom -= doublings

    def trim(self) -> None:
        """Narrow the window to the columns that are not zero."""
        used = np.zeros(self.high - self.low, dtype=bool)
        for limb in self.limbs:
            used |= limb[:, self.low : self.high].any(axis=0)
        places = np.flatnonzero(used)
        if len(places):
            self.high = self.low + int(places[-1]) + 1
            self.low += int(places[0])

    def totals(self, rows: IntArray) -> list[int]:
        """The coefficients, from column ``low`` on, of the sum of some rows, as Python integers."""
        self.reserve(len(rows).bit_length())
        result = [0] * (self.high - self.low)
        for place, limb in enumerate(self.limbs):
            sums = limb[rows, self.low : self.high].sum(axis=0)
            result = [
                total + (value << (LIMB_BITS * place))
                for total, value in zip(result, sums.tolist(), strict=True)
            ]
        return result

    def _carry(self) -> None:
        """Bring every limb to at most 2^(LIMB_BITS - 1), the last to at most 2^LIMB_BITS."""
        for place, limb in enumerate(self.limbs):
            window = limb[:, self.low : self.high]
            if place == len(self.limbs) - 1:
                if _bit_length(window) <= LIMB_BITS:
                    break
                self.limbs.append(np.zeros_like(limb))
            carry = (window + (1 << (LIMB_BITS - 1))) >> LIMB_BITS
            window -= carry << LIMB_BITS
            self.limbs[place + 1][:, self.low : self.high] += carry


def _bit_length(values: IntArray) -> int:
    return max(int(values.max()), -int(values.min())).bit_length()
