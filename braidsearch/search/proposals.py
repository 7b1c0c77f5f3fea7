"""What to try from a conjugacy class: destabilizations, exchanges, stabilizations."""

from __future__ import annotations

from collections.abc import Iterator
from functools import lru_cache

from braidsearch.moves import MoveChain, exchange
from braidsearch.normal_form.conjugacy import iter_summit
from braidsearch.normal_form.left_normal_form import ShouldStop, never
from braidsearch.search.effort import MOST_TURNED
from braidsearch.words import Braid
from braidsearch.words.half_twist import flip_letters, half_twist
from braidsearch.words.handles import reduce_handles, reduce_handles_turned

Letters = tuple[int, ...]

_REMEMBERED = 20_000  # members of summits with their spellings: braids meet in the same classes


def iter_words(
    braid: Braid, cap: int, should_stop: ShouldStop = never
) -> Iterator[tuple[Letters, Letters]]:
    """Words for members of the class, each with the conjugator (by, word): word = by^-1 braid by.

    Every member of the ultra summit set, up to ``cap``, is written in its normal form and with its
    handles reduced from either side; then all of that turned over by the half twist.
    """
    turns = turnings(braid)
    seen: set[Letters] = set()
    for member, by in iter_summit(braid, cap, should_stop):
        for word in _spellings(member):
            if word not in seen:
                seen.add(word)
                yield by, word
                for turn in turns:
                    yield by + turn, flip_letters(word, braid.strands)


def turnings(braid: Braid) -> list[Letters]:
    """The half twist by which to turn a braid over, unless it has too many strands for that."""
    return [half_twist(braid.strands)] if braid.strands <= MOST_TURNED else []


@lru_cache(maxsize=_REMEMBERED)
def _spellings(member: Braid) -> tuple[Letters, ...]:
    return (member.word, reduce_handles(member).word, reduce_handles_turned(member).word)


def draft_destabilization(braid: Braid, by: Letters, word: Letters) -> MoveChain | None:
    """The way down by a strand, when the word uses the last generator exactly once."""
    last = braid.strands - 1
    places = [place for place, letter in enumerate(word) if abs(letter) == last]
    if len(places) != 1 or last == 0:
        return None
    cut = places[0] + 1
    draft = MoveChain(braid, is_checked=False)
    draft.conjugate(by + word[:cut], word[cut:] + word[:cut])
    draft.destabilize()
    return draft


def draft_exchange(braid: Braid, by: Letters, word: Letters) -> MoveChain | None:
    """An exchange move, when the word uses the last generator twice, with opposite signs."""
    last = braid.strands - 1
    places = [place for place, letter in enumerate(word) if abs(letter) == last]
    if len(places) != 2 or word[places[0]] != -word[places[1]]:
        return None
    first, second = places
    draft = MoveChain(braid, is_checked=False)
    rotated = word[second + 1 :] + word[: second + 1]
    draft.conjugate(by + word[: second + 1], rotated)
    alpha = word[second + 1 :] + word[:first]
    beta = word[first + 1 : second]
    if not alpha or not beta:
        return None
    exchange(draft, alpha, beta, 1 if word[first] > 0 else -1)
    return draft


def iter_stabilizations(braid: Braid) -> Iterator[MoveChain]:
    """Each strand brought to the last position, over and under the others, and stabilized.

    Stabilizations of one component with one sign differ by exchange moves only, but need not be
    conjugate; so several places are worth a try.
    """
    seen: set[tuple[Letters, int]] = set()
    for place in range(1, braid.strands + 1):
        for side in (1, -1):
            by = tuple(side * index for index in range(place, braid.strands))
            for sign in (1, -1):
                draft = MoveChain(braid, is_checked=False)
                draft.conjugate(by)
                draft.stabilize(sign)
                if (draft.current.word, sign) not in seen:
                    seen.add((draft.current.word, sign))
                    yield draft
