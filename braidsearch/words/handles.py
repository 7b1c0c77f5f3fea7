"""Handle reduction: a fast way to a short word for the same element of the braid group."""

from __future__ import annotations

from braidsearch.words.braid import Braid
from braidsearch.words.half_twist import flip_letters
from braidsearch.words.reduction import free_reduce_letters

_STEPS_A_LETTER = 60
_CALLS_BEFORE_COMPILING = 3_000  # a process that asks so often has time to load the compiler
_calls = 0


def reduce_handles(braid: Braid) -> Braid:
    """A word for the same element without handles; mostly a short one.

    A handle is sigma_j^e v sigma_j^-e where v has no sigma_(j-1) and no sigma_j, and sigma_(j+1)
    in one sign only; pushing the strand across takes both sigma_j away. Dehornoy, A fast method
    for comparing braids, 1997. Where that would take very many steps, or ends in a longer word,
    the freely reduced word is returned.
    """
    word = free_reduce_letters(braid.word)
    reduced = _without_handles(word, _STEPS_A_LETTER * (len(word) + 10))
    if reduced is None or len(reduced) > len(word):
        reduced = word
    return Braid.trusted(tuple(reduced), braid.strands)


def reduce_handles_turned(braid: Braid) -> Braid:
    """The same with the word turned over: handles of the last generator go first."""
    strands = braid.strands
    turned = reduce_handles(Braid.trusted(flip_letters(braid.word, strands), strands))
    return Braid.trusted(flip_letters(turned.word, strands), strands)


def _without_handles(word: list[int], steps: int) -> list[int] | None:
    """A word without handles, compiled once that is worth its start; None as below."""
    global _calls  # noqa: PLW0603 - how often this process has come here
    _calls += 1
    if _calls > _CALLS_BEFORE_COMPILING and word:
        from braidsearch.words.handle_kernel import without_handles  # noqa: PLC0415

        reduced = without_handles(word, steps)
        if reduced is not None:
            return reduced
    return _without_handles_plainly(word, steps)


def _without_handles_plainly(word: list[int], steps: int) -> list[int] | None:
    """Reduce the handle that ends first, again and again; None when the steps run out.

    ``done`` is free of handles, so the handle that a new letter closes holds no other one; what
    is pushed out of it is read again.
    """
    done: list[int] = []
    waiting = word[::-1]
    while waiting:
        letter = waiting.pop()
        start = _handle_start(done, letter)
        if start is None:
            done.append(letter)
        else:
            waiting.extend(reversed(_pushed_across(done[start], done[start + 1 :])))
            del done[start:]
        steps -= 1
        if steps < 0:
            return None
    return done


def _handle_start(done: list[int], letter: int) -> int | None:
    """The place of the letter with which ``letter`` closes a handle, if it closes one."""
    index = abs(letter)
    sign_above = 0
    for place in range(len(done) - 1, -1, -1):
        other = done[place]
        if other == -letter:
            return place
        if other == letter or abs(other) == index - 1:
            return None
        if abs(other) == index + 1:
            sign = 1 if other > 0 else -1
            if sign_above == -sign:
                return None
            sign_above = sign
    return None


def _pushed_across(first: int, inside: list[int]) -> list[int]:
    """What becomes of the inside of a handle that begins with ``first``."""
    index, sign = abs(first), 1 if first > 0 else -1
    above = index + 1
    pushed: list[int] = []
    for letter in inside:
        if abs(letter) == above:
            middle = index if letter > 0 else -index
            pushed.extend((-sign * above, middle, sign * above))
        else:
            pushed.append(letter)
    return pushed
