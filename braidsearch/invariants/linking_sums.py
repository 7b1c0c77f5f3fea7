"""How much each component of a closed braid links all the others together."""

from braidsearch.invariants.linking_numbers import estimated_cost, is_applicable
from braidsearch.words.braid import Braid

__all__ = ["component_linking_sums", "estimated_cost", "is_applicable"]


def component_linking_sums(braid: Braid) -> list[int]:
    """For each component, the sum of its linking numbers with all other components; sorted.

    It is half the signed crossings of the component with others, so the lists of two links may
    differ where all pairs have the same linking numbers: it also sees which pairs share a
    component.
    """
    cycles = braid.component_cycles
    component_of = {position: number for number, cycle in enumerate(cycles) for position in cycle}
    at_position = [component_of[position] for position in range(braid.strands)]
    doubled = [0] * len(cycles)
    for letter in braid.word:
        index, sign = abs(letter), 1 if letter > 0 else -1
        left, right = at_position[index - 1], at_position[index]
        at_position[index - 1], at_position[index] = right, left
        if left != right:
            doubled[left] += sign
            doubled[right] += sign
    return sorted(crossings // 2 for crossings in doubled)
