"""The linking numbers of a closed braid, over all pairs of its components."""

from braidsearch.words.braid import Braid


def pair_linking_numbers(braid: Braid) -> list[int]:
    """The linking numbers of all pairs of different components, sorted.

    One entry for each unordered pair, zeros included, so m components give m (m - 1) / 2 entries.
    A positive crossing of two components counts 1/2: the closure of sigma_1^2 has [1].
    """
    component_of = _component_of_each_start(braid)
    at_position = list(component_of)
    doubled: dict[tuple[int, int], int] = {}
    for letter in braid.word:
        index = abs(letter)
        left, right = at_position[index - 1], at_position[index]
        at_position[index - 1], at_position[index] = right, left
        if left != right:
            pair = (min(left, right), max(left, right))
            doubled[pair] = doubled.get(pair, 0) + (1 if letter > 0 else -1)
    # Two closed curves in the plane cross an even number of times.
    numbers = [crossings // 2 for crossings in doubled.values()]
    components = max(component_of) + 1
    untouched = components * (components - 1) // 2 - len(numbers)
    return sorted(numbers + [0] * untouched)


def _component_of_each_start(braid: Braid) -> list[int]:
    component_of = [0] * braid.strands
    for number, cycle in enumerate(braid.component_cycles):
        for position in cycle:
            component_of[position] = number
    return component_of


def estimated_cost(braid: Braid) -> float:
    """Seconds that ``pair_linking_numbers`` needs, to within a factor of a few."""
    return 3e-6 + 3e-7 * (len(braid) + 3 * braid.strands) + 1e-8 * braid.strands**2


def is_applicable(braid: Braid) -> bool:
    """Always: ``pair_linking_numbers`` answers for every braid."""
    return braid.strands > 0
