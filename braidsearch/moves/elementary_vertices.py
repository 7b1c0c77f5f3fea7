"""Where two words for one element pass through the same element on their way."""

from __future__ import annotations

from collections.abc import Iterator

from braidsearch.moves.elementary_relations import Letters

_PRIME = (1 << 61) - 1
_VARIABLE = 0x1B873593CC9E2D51 % _PRIME
_INVERSE = pow(_VARIABLE, -1, _PRIME)


def iter_blocks(word: Letters, target: Letters) -> Iterator[tuple[Letters, Letters]]:
    """Pieces of both words, in order, that begin and end at the same elements, as far as is seen.

    Elements are compared by their unreduced Burau matrices (Burau, Ueber Zopfgruppen und
    gleichsinnig verdrillte Verkettungen, 1936) at one number modulo a prime, applied to one
    vector. Equal elements look equal; others hardly ever, which whoever joins the pieces sees.
    """
    strands = max(map(abs, word + target), default=0) + 1
    seen = {name: place for place, name in enumerate(_iter_names(word, strands))}
    start = other_start = 0
    for place, name in enumerate(_iter_names(target, strands)):
        meeting = seen.get(name)
        if meeting is None or meeting < start or not place:
            continue
        yield word[start:meeting], target[other_start:place]
        start, other_start = meeting, place
    if (start, other_start) != (len(word), len(target)):
        yield word[start:], target[other_start:]


def _iter_names(word: Letters, strands: int) -> Iterator[tuple[int, ...]]:
    """A name for each prefix of the word: the image of a vector under its Burau matrix."""
    vector = [pow(3, strand + 1, _PRIME) for strand in range(strands)]
    yield tuple(vector)
    for letter in word:
        place = abs(letter) - 1
        one, other = vector[place], vector[place + 1]
        if letter > 0:
            vector[place] = other
            vector[place + 1] = (_VARIABLE * one + (1 - _VARIABLE) * other) % _PRIME
        else:
            vector[place + 1] = one
            vector[place] = (_INVERSE * (other - (1 - _VARIABLE) * one)) % _PRIME
        yield tuple(vector)
