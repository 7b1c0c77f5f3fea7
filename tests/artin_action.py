"""An oracle for equality in the braid group: Artin's faithful action on the free group.

Artin, Theory of braids, Annals of Mathematics, 1947. Shares nothing with normal forms.
"""

from braidsearch.words import Braid

FreeWord = tuple[int, ...]


def artin_images(braid: Braid) -> tuple[FreeWord, ...]:
    """The images of the free generators x_1 .. x_n, freely reduced: equal for equal braids."""
    images = [(index + 1,) for index in range(braid.strands)]
    for letter in braid.word:
        rules = _rules(letter)
        images = [_substitute(image, rules) for image in images]
    return tuple(images)


def _rules(letter: int) -> dict[int, FreeWord]:
    low, high = abs(letter), abs(letter) + 1
    if letter > 0:
        return {low: (low, high, -low), high: (low,)}
    return {low: (high,), high: (-high, low, high)}


def _substitute(word: FreeWord, rules: dict[int, FreeWord]) -> FreeWord:
    reduced: list[int] = []
    for generator in word:
        image = rules.get(abs(generator), (abs(generator),))
        for item in image if generator > 0 else (-part for part in reversed(image)):
            if reduced and reduced[-1] == -item:
                reduced.pop()
            else:
                reduced.append(item)
    return tuple(reduced)
