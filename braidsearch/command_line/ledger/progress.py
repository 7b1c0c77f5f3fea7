"""How far a long action is: a bar on a terminal, elsewhere a line now and then."""

from __future__ import annotations

import sys
import time
from collections.abc import Iterator
from contextlib import contextmanager, suppress
from typing import TYPE_CHECKING, Any

from braidsearch.command_line.answer import print_error

if TYPE_CHECKING:
    from rich.progress import Progress

FIRST_AFTER = 1.0
"""Seconds before a bar appears: a short action shows none."""

BETWEEN_LINES = 30.0
"""Seconds between two lines, where standard error is no terminal."""


class Display:
    """Shows what is told on standard error; ``name`` stands in front of a line."""

    def __init__(self, name: str) -> None:
        self._name = name
        self._is_terminal = sys.stderr is not None and sys.stderr.isatty()
        self._began = self._last_line = time.monotonic()
        self._doing, self._since = "", self._began
        self._bar: Progress | None = None
        self._task: Any = None

    def tell(self, doing: str, done: int, total: int, detail: str = "") -> None:
        """Show that so many of so many are done."""
        now = time.monotonic()
        if doing != self._doing:
            self._doing, self._since, self._task = doing, now, None
        rate = done / (now - self._since) if done and now > self._since else 0.0
        if self._is_terminal and now - self._began >= FIRST_AFTER:
            with suppress(OSError):  # a terminal that is gone must not end the action
                self._show_bar(done, total, rate, detail)
        elif not self._is_terminal and now - self._last_line >= BETWEEN_LINES:
            self._last_line = now
            print_error(f"{self._name}: {_line(doing, done, total, rate, detail)}")

    def _show_bar(self, done: int, total: int, rate: float, detail: str) -> None:
        if self._bar is None:
            self._bar = _make_bar()
            self._bar.start()
        if self._task is None:
            for task in self._bar.task_ids:
                self._bar.remove_task(task)
            self._task = self._bar.add_task(self._doing, total=total, rate="", left="", detail="")
        left = show_seconds((total - done) / rate) + " left" if rate else ""
        shown: dict[str, Any] = {
            "rate": f"{rate:.0f}/s" if rate else "",
            "left": left,
            "detail": detail,
        }
        self._bar.update(self._task, completed=done, total=total, **shown)

    def close(self) -> None:
        """Leave the terminal as it was."""
        if self._bar is not None:
            with suppress(OSError):
                self._bar.stop()


@contextmanager
def shown_progress(name: str) -> Iterator[Display]:
    """A display for the time of an action."""
    display = Display(name)
    try:
        yield display
    finally:
        display.close()


def _make_bar() -> Progress:
    from rich.console import Console  # noqa: PLC0415 - only on a terminal
    from rich.progress import BarColumn, MofNCompleteColumn, Progress, TextColumn  # noqa: PLC0415

    return Progress(
        TextColumn("{task.description}"),
        BarColumn(),
        MofNCompleteColumn(),
        TextColumn("{task.fields[rate]}"),
        TextColumn("{task.fields[left]}"),
        TextColumn("{task.fields[detail]}"),
        console=Console(stderr=True),
        transient=True,
    )


def _line(doing: str, done: int, total: int, rate: float, detail: str) -> str:
    parts = [f"{doing}: {done} of {total}"]
    if rate:
        parts += [f"{rate:.0f} a second", f"about {show_seconds((total - done) / rate)} left"]
    return ", ".join([*parts, detail] if detail else parts)


def show_seconds(seconds: float) -> str:
    """A time as people say it: in seconds, minutes or hours."""
    if seconds < 100:
        return f"{seconds:.0f} s"
    minutes = seconds / 60
    return f"{minutes:.0f} min" if minutes < 100 else f"{minutes / 60:.1f} h"
