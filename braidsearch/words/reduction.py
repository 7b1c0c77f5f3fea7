"""Free and cyclic reduction of braid words: the cancellations that are visible in the letters."""

from collections.abc import Iterable

from braidsearch.words.braid import Braid


def free_reduce_letters(letters: Iterable[int]) -> list[int]:
    """The letters with every neighbouring pair i, -i removed, repeatedly."""
    reduced: list[int] = []
    for letter in letters:
        if reduced and reduced[-1] == -letter:
            reduced.pop()
        else:
            reduced.append(letter)
    return reduced


def free_reduce(braid: Braid) -> Braid:
    """The freely reduced word: the same element of the braid group, on the same strands."""
    return Braid.trusted(tuple(free_reduce_letters(braid.word)), braid.strands)


def cyclic_reduce(braid: Braid) -> tuple[Braid, tuple[int, ...]]:
    """The cyclically reduced word and the letters ``by`` that conjugate to it.

    The result equals by^-1 * braid * by in the group, so its closure is the same link.
    """
    reduced = free_reduce_letters(braid.word)
    depth = 0
    while 2 * depth + 1 < len(reduced) and reduced[depth] == -reduced[-1 - depth]:
        depth += 1
    core = reduced[depth : len(reduced) - depth]
    return Braid.trusted(tuple(core), braid.strands), tuple(reduced[:depth])


def find_rotation(left: Braid, right: Braid) -> int | None:
    """The number of letters to move from the front of ``left`` to its end to get ``right``.

    None where no rotation of the word does. The letters moved conjugate one word to the other.
    """
    length = len(left)
    if left.strands != right.strands or length != len(right):
        return None
    if left.word == right.word:
        return 0
    doubled = _as_text(left.word * 2)
    found = doubled.find(_as_text(right.word))
    return None if found < 0 else doubled[:found].count(" ")


def _as_text(word: tuple[int, ...]) -> str:
    """The word with a blank in front of and behind each letter, for the search of substrings."""
    return " " + " ".join(map(str, word)) + " "
