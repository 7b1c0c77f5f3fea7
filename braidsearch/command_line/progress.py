"""The progress line of a long search, on standard error, on a terminal only."""

from __future__ import annotations

import shutil
import sys
from typing import TYPE_CHECKING, TextIO

if TYPE_CHECKING:
    from braidsearch.search.limits import Progress

FIRST_AFTER = 1.0
"""Seconds before the line appears: a short search shows none."""

_BETWEEN = 0.1


class ProgressLine:
    """One line that is written over itself while a search runs, and erased at its end."""

    def __init__(self, stream: TextIO) -> None:
        self._stream = stream
        self._last = FIRST_AFTER - _BETWEEN
        self._width = 0

    def __call__(self, progress: Progress) -> None:
        """Show where the search is, at most ten times a second."""
        if progress.seconds < max(FIRST_AFTER, self._last + _BETWEEN):
            return
        self._last = progress.seconds
        strands = f", {progress.strands} strands" if progress.strands else ""
        line = f"{progress.seconds:.0f} s, {progress.nodes} classes{strands}: {progress.doing}"
        self._overwrite(line[: shutil.get_terminal_size().columns - 1])

    def erase(self) -> None:
        """Leave the terminal as it was."""
        if self._width:
            self._overwrite("")
            self._width = 0

    def _overwrite(self, line: str) -> None:
        try:
            self._stream.write("\r" + line.ljust(self._width) + ("" if line else "\r"))
            self._stream.flush()
        except OSError:
            pass  # a terminal that is gone must not end the search
        self._width = len(line)


def progress_line() -> ProgressLine | None:
    """The line, where standard error is a terminal; None elsewhere."""
    stream = sys.stderr
    return ProgressLine(stream) if stream is not None and stream.isatty() else None
