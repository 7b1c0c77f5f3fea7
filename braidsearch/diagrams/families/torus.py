"""Torus links and cables, as closed braids."""

from __future__ import annotations

from braidsearch.errors import InputError
from braidsearch.words.braid import MAX_LETTERS, MAX_STRANDS, Braid


def torus_link(p: int, q: int) -> Braid:
    """The torus link T(p, q) as the braid (sigma_1 ... sigma_(p-1))^q on p strands.

    It has gcd(p, q) components, all running the same way; q below 0 gives the mirror image, and
    so does p below 0. T(2, 3) is the right-handed trefoil. T(p, q) and T(q, p) are the same link.

    Raises InputError for p = 0 and for words that are too long.
    """
    if p == 0:
        raise InputError("torus link with p = 0: expected at least one strand")
    strands, turns = abs(p), q if p > 0 else -q
    _check_size(strands, abs(turns) * (strands - 1), f"torus link T({p}, {q})")
    return Braid(_turns(0, strands, turns), strands)


def cable(braid: Braid, strands: int, twists: int) -> Braid:
    """The cable of a closed braid: so many parallel strands for each component, with twists.

    Parallel strands do not link each other when ``twists`` is 0 (they follow the Seifert surface
    of their component); each twist moves them on by one, with positive crossings above 0. The
    cable of the one-strand braid is the torus link T(strands, twists), that of any knot is its
    (strands, twists) cable. In a link every component is treated alike.

    Raises InputError for fewer than one strand and for words that are too long.
    """
    if strands < 1:
        raise InputError(f"{strands} strands of a cable: expected at least 1")
    cycles = braid.component_cycles
    writhes = _own_writhes(braid)
    turns = [twists - strands * writhe for writhe in writhes]
    length = len(braid) * strands**2 + (strands - 1) * sum(map(abs, turns))
    _check_size(braid.strands * strands, length, f"cable of {strands} strands")
    letters: list[int] = []
    for cycle, turn in zip(cycles, turns, strict=True):
        letters += _turns(strands * cycle[0], strands, turn)
    for letter in braid.word:
        letters += _parallel_letters(letter, strands)
    return Braid(letters, braid.strands * strands)


def _turns(before: int, strands: int, turns: int) -> list[int]:
    """A braid of the strands behind the first ``before`` that moves them on, turn by turn."""
    once = list(range(before + 1, before + strands))
    if turns < 0:
        once = [-index for index in reversed(once)]
    return once * abs(turns)


def _parallel_letters(letter: int, strands: int) -> list[int]:
    """The crossing of two bands: each strand of the one crosses every strand of the other."""
    middle, sign = abs(letter) * strands, 1 if letter > 0 else -1
    return [sign * (middle - i + j) for i in range(strands) for j in range(strands)]


def _own_writhes(braid: Braid) -> list[int]:
    """For each component of the closure the signed count of its crossings with itself."""
    component = [0] * braid.strands
    for number, cycle in enumerate(braid.component_cycles):
        for position in cycle:
            component[position] = number
    writhes = [0] * len(braid.component_cycles)
    for letter in braid.word:
        left, right = abs(letter) - 1, abs(letter)
        if component[left] == component[right]:
            writhes[component[left]] += 1 if letter > 0 else -1
        component[left], component[right] = component[right], component[left]
    return writhes


def _check_size(strands: int, letters: int, name: str) -> None:
    if strands > MAX_STRANDS or letters > MAX_LETTERS:
        raise InputError(
            f"{name}: {letters} letters on {strands} strands: expected at most {MAX_LETTERS} "
            f"letters and {MAX_STRANDS} strands"
        )
