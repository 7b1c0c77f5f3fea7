"""The modular group PSL(2,Z) = Z_2 * Z_3, onto which the braids on 3 strands map.

Delta^2 = (s1 s2)^3 generates the centre of B_3. Modulo it, a = Delta = s1 s2 s1 has order 2 and
b = s1 s2 has order 3, and there are no other relations. The generators are s1 = b^-1 a and
s2 = a b^-1, in B_3 itself as well. Words hold 0 for a, 1 for b and -1 for b^-1; a word is reduced
when every second letter is a, and then it is the only reduced word of its element.
"""

from __future__ import annotations

from collections.abc import Iterable, Sequence

Letters = tuple[int, ...]

_IMAGES = {1: (-1, 0), -1: (0, 1), 2: (0, -1), -2: (1, 0)}
_PREIMAGES = {image: letter for letter, image in _IMAGES.items()}
_SINGLE_PREIMAGES = {0: (1, 2, 1), 1: (1, 2), -1: (-2, -1)}


def modular_image(word: Iterable[int]) -> list[int]:
    """The reduced word in a and b of the image of a braid word on 3 strands."""
    image: list[int] = []
    for letter in word:
        multiply_by(image, _IMAGES[letter])
    return image


def multiply_by(word: list[int], letters: Iterable[int]) -> None:
    """Multiply a reduced word on the right by the letters, in place: it stays reduced."""
    for letter in letters:
        if not word or (word[-1] == 0) != (letter == 0):
            word.append(letter)
        elif letter != 0 and word[-1] == letter:
            word[-1] = -letter  # b b = b^-1
        else:
            word.pop()


def inverse_letters(letters: Sequence[int]) -> Letters:
    """The letters of the inverse; a is its own."""
    return tuple(-letter for letter in reversed(letters))


def braid_preimage(letters: Sequence[int]) -> Letters:
    """A braid word with this image, which is a reduced word; full twists are left out.

    Two letters make one braid letter, and one that is left over makes two or three.
    """
    pairs = zip(letters[::2], letters[1::2], strict=False)
    word = tuple(_PREIMAGES[pair] for pair in pairs)
    return word + _SINGLE_PREIMAGES[letters[-1]] if len(letters) % 2 else word


def cyclically_reduced(letters: Sequence[int]) -> tuple[Letters, Letters]:
    """The core and the prefix of a reduced word: word = prefix * core * prefix^-1.

    The core has one letter at most, or begins and ends with letters of different kinds, so that
    each of its rotations is reduced.
    """
    core = list(letters)
    first, last = 0, len(core) - 1
    while first < last and (core[first] == 0) == (core[last] == 0):
        if core[first] != 0 and core[first] == core[last]:
            core[last] = -core[last]  # b w b is conjugate to w b^-1, and w begins with a
        else:
            last -= 1
        first += 1
    return tuple(core[first : last + 1]), tuple(letters[:first])


def least_rotation(letters: Sequence[int]) -> tuple[int, int]:
    """Where the least rotation begins, and the period: its length without repetitions.

    Two candidate beginnings are compared letter by letter; the one that loses takes with it all
    the beginnings that lie within what was compared (Shiloach, Fast canonization of circular
    strings, 1981). Cost: linear.
    """
    length = len(letters)
    doubled = tuple(letters) * 2
    left, right, equal = 0, 1, 0
    while right < length and equal < length:
        one, other = doubled[left + equal], doubled[right + equal]
        if one == other:
            equal += 1
            continue
        if one > other:
            left = max(left + equal + 1, right)
            right = left + 1
        else:
            right += equal + 1
        equal = 0
    period = right - left if equal == length else length
    return left, period
