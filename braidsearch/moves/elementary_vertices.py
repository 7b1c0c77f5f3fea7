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
    gleichsinnig verdrillte Verkettungen, 1936) at one number modulo a prime, between a row and a
    column. Equal elements look equal; others hardly ever, and whoever joins the pieces sees it.
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


def _iter_names(word: Letters, strands: int) -> Iterator[int]:
    """A name for each prefix of the word: its Burau matrix between a row and a column."""
    column = [pow(3, strand + 1, _PRIME) for strand in range(strands)]
    row = [pow(5, strand + 1, _PRIME) for strand in range(strands)]
    name = sum(one * other for one, other in zip(row, column, strict=True)) % _PRIME
    yield name
    for letter in word:
        place = abs(letter) - 1
        one, other = column[place], column[place + 1]
        if letter > 0:
            new_one, new_other = other, _VARIABLE * one + (1 - _VARIABLE) * other
        else:
            new_one, new_other = _INVERSE * (other - (1 - _VARIABLE) * one), one
        column[place], column[place + 1] = new_one % _PRIME, new_other % _PRIME
        change = row[place] * (new_one - one) + row[place + 1] * (new_other - other)
        name = (name + change) % _PRIME
        yield name
