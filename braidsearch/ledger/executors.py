"""Where the work of a ledger is done: here, in processes of this machine, or on a Dask cluster."""

from __future__ import annotations

import os
import signal
import threading
import time
from collections.abc import Callable, Iterator
from concurrent.futures import BrokenExecutor, CancelledError, Executor, Future, ProcessPoolExecutor
from contextlib import contextmanager
from multiprocessing import get_context, parent_process
from typing import Any

from braidsearch.errors import InputError

SECONDS_WITHOUT_WORKERS = 60.0
"""How long a cluster that has lost all its workers is waited for."""

_SECONDS_BETWEEN_LOOKS = 1.0


class DeferredFuture(Future[Any]):
    """A task that is done when its result is asked for."""

    def __init__(self, function: Callable[..., Any], arguments: tuple[Any, ...]) -> None:
        super().__init__()
        self._task = function, arguments

    def result(self, timeout: float | None = None) -> Any:
        """The result, worked out at the first call."""
        if not self.done():
            function, arguments = self._task
            self.set_result(function(*arguments))
        return super().result(timeout)


class SerialExecutor(Executor):
    """Does each task in this process, when its result is asked for."""

    def submit(  # type: ignore[override]
        self, function: Callable[..., Any], /, *arguments: Any
    ) -> DeferredFuture:
        """The task, to be done when its result is asked for."""
        return DeferredFuture(function, arguments)


@contextmanager
def open_executor(processes: int | None = None, scheduler: str | None = None) -> Iterator[Executor]:
    """The executor for so many processes (None: one for each core), or for a Dask cluster.

    After an error or an interrupt nothing that was not begun is begun any more; to be told to
    terminate is an interrupt too. Raises InputError for a scheduler that does not answer, without
    the library for one, and when a process has ended before its work was done.
    """
    count = processes or available_cores()
    with _termination_interrupts():
        if scheduler is not None:
            with _dask_executor(scheduler) as executor:
                yield executor
        elif count == 1:
            yield SerialExecutor()
        else:
            with _process_pool(count) as executor:
                yield executor


@contextmanager
def _process_pool(count: int) -> Iterator[Executor]:
    with _interrupts_held():
        context = get_context("spawn")
        pool = ProcessPoolExecutor(count, mp_context=context, initializer=_begin_worker)
    try:
        with _interrupts_held(), _signals_blocked():
            for _ in range(count):
                pool.submit(available_cores)  # anything: a process is started for each
        yield pool
    except BrokenExecutor:
        _end_now(pool)
        raise InputError(
            "a worker process was ended from outside, or for want of memory: what was kept before "
            "is not lost: expected to run the command again, perhaps with fewer processes"
        ) from None
    except BaseException:
        _end_now(pool)
        raise
    pool.shutdown()


def available_cores() -> int:
    """The cores that this process may use."""
    if hasattr(os, "sched_getaffinity"):
        return len(os.sched_getaffinity(0))
    return os.cpu_count() or 1


@contextmanager
def _termination_interrupts() -> Iterator[None]:
    """Take the signal to terminate as an interrupt, where nobody else minds it.

    A process that is ended by it has no time to end its workers and to say what was kept.
    """
    is_main = threading.current_thread() is threading.main_thread()
    if not is_main or signal.getsignal(signal.SIGTERM) is not signal.SIG_DFL:
        yield
        return
    signal.signal(signal.SIGTERM, signal.default_int_handler)
    try:
        yield
    finally:
        signal.signal(signal.SIGTERM, signal.SIG_DFL)


@contextmanager
def _interrupts_held() -> Iterator[None]:
    """Let interrupts wait: a process whose parent ends while it is started has a traceback."""
    if threading.current_thread() is not threading.main_thread():
        yield  # no signal interrupts another thread
        return
    arrived: list[int] = []
    handlers = {
        number: signal.signal(number, lambda number, _: arrived.append(number))
        for number in (signal.SIGINT, signal.SIGTERM)
    }
    try:
        yield
    finally:
        for number, handler in handlers.items():
            signal.signal(number, handler)
    if arrived:
        raise KeyboardInterrupt


@contextmanager
def _signals_blocked() -> Iterator[None]:
    """Block what may interrupt, for this thread and for the processes that it starts.

    Ctrl-C goes to all processes of a terminal, and one that is only about to begin would answer it
    with a traceback.
    """
    if not hasattr(signal, "pthread_sigmask"):
        yield
        return
    before = signal.pthread_sigmask(signal.SIG_BLOCK, {signal.SIGINT, signal.SIGTERM})
    try:
        yield
    finally:
        signal.pthread_sigmask(signal.SIG_SETMASK, before)


def _begin_worker() -> None:
    """Leave interrupts to the parent, and end when the parent ends, however it does."""
    signal.signal(signal.SIGINT, signal.SIG_IGN)
    if hasattr(signal, "pthread_sigmask"):
        signal.pthread_sigmask(signal.SIG_UNBLOCK, {signal.SIGINT, signal.SIGTERM})
    threading.Thread(target=_end_with_parent, daemon=True).start()


def _end_with_parent() -> None:
    parent = parent_process()
    if parent is not None:
        parent.join()
        os._exit(1)


def _end_now(pool: ProcessPoolExecutor) -> None:
    """End the workers at once: what they are at is not wanted any more."""
    workers = list((getattr(pool, "_processes", None) or {}).values())
    pool.shutdown(wait=False, cancel_futures=True)
    for worker in workers:
        worker.terminate()


@contextmanager
def _dask_executor(address: str) -> Iterator[Executor]:
    try:
        from distributed import Client, KilledWorker  # noqa: PLC0415 - an extra that few install
        from distributed.comm.addressing import get_address_host_port  # noqa: PLC0415 - the same
    except ImportError:
        raise InputError(
            f"--scheduler {address}: the library of Dask clusters is missing: "
            "expected braidsearch installed with its extra, as braidsearch[cluster]"
        ) from None
    open_client: Any = Client  # the library has no types
    try:
        get_address_host_port(address)  # a client for what is no address does not close well
        client = open_client(address, timeout="10s", set_as_default=False)
    except (OSError, ValueError, TypeError) as error:
        reason = str(error).splitlines()[0] if str(error) else type(error).__name__
        raise InputError(
            f"--scheduler {address}: {reason}: expected the address of a running Dask "
            "scheduler, such as tcp://127.0.0.1:8786"
        ) from None
    try:
        with client:
            executor = client.get_executor(pure=False)
            with _watched(client, executor):
                yield executor
    except (CancelledError, KilledWorker):
        raise InputError(
            f"--scheduler {address}: the cluster has ended, or its workers have, before their work "
            "was done: what was kept before is not lost: expected a cluster that stays; run the "
            "command again to go on"
        ) from None


@contextmanager
def _watched(client: Any, executor: Executor) -> Iterator[None]:
    """Cancel what is asked of a cluster once it has had no workers for a while.

    A scheduler that lives keeps the tasks of lost workers for others that may come. To those that
    a cluster has not had yet any time is given.
    """
    ended = threading.Event()

    def watch() -> None:
        last_seen = None
        while True:
            try:
                workers = client.nthreads()
            except (OSError, RuntimeError, TypeError):  # the client is closing
                return
            now = time.monotonic()
            if workers:
                last_seen = now
            elif last_seen is not None and now - last_seen > SECONDS_WITHOUT_WORKERS:
                executor.shutdown(wait=False)
                return
            if ended.wait(_SECONDS_BETWEEN_LOOKS):
                return

    threading.Thread(target=watch, daemon=True).start()
    try:
        yield
    finally:
        ended.set()
