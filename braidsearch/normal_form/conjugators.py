"""Short words for conjugating elements."""

from __future__ import annotations

from braidsearch.normal_form.left_normal_form import NormalForm, left_normal_form
from braidsearch.words import Braid


def short_conjugator(by: tuple[int, ...], strands: int) -> tuple[int, ...]:
    """A short word that conjugates as ``by`` does: full twists are central and dropped.

    The candidates are ``by`` and the normal form with every power of delta of one parity, since
    the negative powers are worked into the factors.
    """
    form = left_normal_form(Braid.trusted(tuple(by), strands))
    parity = form.infimum % 2
    candidates = [tuple(by)]
    for infimum in range(-len(form.factors) - 1, 2):
        if infimum % 2 == parity:
            turned = NormalForm(strands, infimum, form.factors)
            candidates.append(turned.to_braid().word)
    return min(candidates, key=len)
