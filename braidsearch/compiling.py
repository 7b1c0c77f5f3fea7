"""Compilation of the inner loops, with the plain source as the path that always works."""

from __future__ import annotations

import contextlib
import signal
import threading
from collections.abc import Callable, Iterator
from types import FrameType
from typing import Any, TypeVar

_Function = TypeVar("_Function", bound=Callable[..., Any])


@contextlib.contextmanager
def interrupts_deferred() -> Iterator[None]:
    """Hold a keyboard interrupt back until the block ends, and raise it then.

    The compiler calls back into Python from places where an exception is printed and lost.
    """
    handler = signal.getsignal(signal.SIGINT)
    if threading.current_thread() is not threading.main_thread() or not callable(handler):
        yield
        return
    held: list[tuple[int, FrameType | None]] = []
    signal.signal(signal.SIGINT, lambda number, frame: held.append((number, frame)))
    try:
        yield
    finally:
        signal.signal(signal.SIGINT, handler)
    if held:
        handler(*held[-1])


def _load_compiler() -> Callable[..., Any] | None:
    """The compiler's decorator, or None where it is not installed or is switched off."""
    try:
        with interrupts_deferred():
            from numba import config, njit  # noqa: PLC0415 - optional, and slow to import
    except Exception:
        return None  # an installation that does not fit this machine may fail in any way
    return None if getattr(config, "DISABLE_JIT", False) else njit


_decorator = _load_compiler()


def is_compiled() -> bool:
    """Whether the functions given to ``compiled`` from now on are compiled."""
    return _decorator is not None


def switch_off() -> None:
    """Leave functions plain from now on: for machines where the compiler does not work."""
    global _decorator  # noqa: PLW0603 - one switch for the whole process
    _decorator = None


def compiled(function: _Function) -> _Function:
    """The function compiled, its machine code kept on disk where a folder can be written.

    The plain function is returned where there is no compiler. It must therefore hold in both
    readings: integers that stay within 63 bits, and arrays that may be lists.
    """
    if _decorator is None:
        return function
    with contextlib.suppress(RuntimeError):  # no folder for the cache can be written
        return _decorator(cache=True)(function)  # type: ignore[no-any-return]
    return _decorator()(function)  # type: ignore[no-any-return]
