"""The half twist delta, and the words turned over by it."""

from __future__ import annotations

Letters = tuple[int, ...]


def half_twist(strands: int) -> Letters:
    """A positive word for delta, in which every two strands cross once."""
    return tuple(index for top in range(strands - 1, 0, -1) for index in range(1, top + 1))


def flip_letters(letters: Letters, strands: int) -> Letters:
    """The letters turned over: sigma_i becomes sigma_(n-i), conjugation by the half twist."""
    return tuple(strands - letter if letter > 0 else -strands - letter for letter in letters)
