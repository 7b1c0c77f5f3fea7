"""The loop of handle reduction, compiled: the same steps as the plain one, on arrays."""

from __future__ import annotations

from typing import Any

import numpy as np

from braidsearch.compiling import compiled, is_compiled

_ROOM = 400  # letters of room beside a multiple of the word: what is pushed across grows
_TIMES = 12
_FULL, _OUT_OF_STEPS = -1, -2


def without_handles(word: list[int], steps: int) -> list[int] | None:
    """The word without handles; None where steps or room run out, or nothing is compiled."""
    if not is_compiled():
        return None
    room = _TIMES * len(word) + _ROOM
    done, waiting = np.empty(room, np.int64), np.empty(room, np.int64)
    waiting[: len(word)] = word[::-1]
    length = _reduce(done, waiting, len(word), steps)
    return None if length < 0 else done[:length].tolist()


@compiled
def _reduce(done: Any, waiting: Any, count: int, steps: int) -> int:
    """Reduce the letters on the stack ``waiting`` into ``done``; the length, or a failure."""
    length = 0
    while count > 0:
        count -= 1
        letter = waiting[count]
        start = _handle_start(done, length, letter)
        if start < 0:
            if length == len(done):
                return _FULL
            done[length] = letter
            length += 1
        else:
            # What is pushed out of the handle is read again, from its first letter on.
            if count + 3 * (length - start) > len(waiting):
                return _FULL
            first = done[start]
            index, sign = abs(first), 1 if first > 0 else -1
            for place in range(length - 1, start, -1):
                inner = done[place]
                if abs(inner) == index + 1:
                    waiting[count] = sign * (index + 1)
                    waiting[count + 1] = index if inner > 0 else -index
                    waiting[count + 2] = -sign * (index + 1)
                    count += 3
                else:
                    waiting[count] = inner
                    count += 1
            length = start
        steps -= 1
        if steps < 0:
            return _OUT_OF_STEPS
    return length


@compiled
def _handle_start(done: Any, length: int, letter: int) -> int:
    """The place of the letter with which ``letter`` closes a handle; -1 where it closes none."""
    index = abs(letter)
    sign_above = 0
    for place in range(length - 1, -1, -1):
        other = done[place]
        if other == -letter:
            return place
        if other == letter or abs(other) == index - 1:
            return -1
        if abs(other) == index + 1:
            sign = 1 if other > 0 else -1
            if sign_above == -sign:
                return -1
            sign_above = sign
    return -1
