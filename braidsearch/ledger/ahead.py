"""Blocks of braids prepared ahead of their turn, whenever a worker would have nothing to do."""

from __future__ import annotations

from collections import deque
from collections.abc import Iterator
from concurrent.futures import FIRST_COMPLETED, Executor, Future, wait
from typing import Any

from braidsearch.ledger.executors import SerialExecutor
from braidsearch.ledger.preparing import Prepared, prepare_all
from braidsearch.ledger.store import Store
from braidsearch.words import Braid

BLOCK = 256
"""Braids of one block."""

_MOST_AHEAD = 64  # blocks
_CHUNK = 16  # braids prepared in one task
_TASKS_A_WORKER = 3  # that are begun before it asks for more
_WORKERS = 16  # where an executor does not say how many it has

Block = tuple[list[int], list[Prepared]]
"""Numbers of braids, and the same prepared."""


class Ahead:
    """Hands out the unsorted braids in blocks, in order, prepared.

    To prepare braids depends on nothing but them. So it fills the time of workers that wait for
    one long search among the classes: a search of seconds leaves no worker idle.
    """

    def __init__(self, store: Store, executor: Executor) -> None:
        self._store, self._executor = store, executor
        self._is_serial = isinstance(executor, SerialExecutor)
        workers = getattr(executor, "_max_workers", _WORKERS)
        self._enough = _TASKS_A_WORKER * workers
        self._blocks = self._iter_unsorted()
        self._is_at_end = False
        self._begun: deque[tuple[list[int], list[Future[list[Prepared]]]]] = deque()
        self._running: set[Future[Any]] = set()

    def next_block(self) -> Block | None:
        """The next block, None after the last one."""
        if not self._begun:
            self._begin_block()
        if not self._begun:
            return None
        numbers, tasks = self._begun.popleft()
        return numbers, [one for task in tasks for one in self.result_of(task)]

    def result_of(self, task: Future[Any]) -> Any:
        """The result of any task; while it is waited for, braids are prepared ahead."""
        while not (self._is_serial or task.done()):
            self._feed()
            wait({task, *self._running}, return_when=FIRST_COMPLETED)
        return task.result()

    def _feed(self) -> None:
        self._running = {task for task in self._running if not task.done()}
        while len(self._running) < self._enough and len(self._begun) < _MOST_AHEAD:
            if not self._begin_block():
                return

    def _begin_block(self) -> bool:
        """Begin to prepare one block more; False where there is none."""
        if self._is_at_end:
            return False
        block = next(self._blocks, None)
        self._is_at_end = block is None
        if block is None:
            return False
        braids = [braid for _, braid in block]
        tasks = [
            self._executor.submit(prepare_all, braids[start : start + _CHUNK])
            for start in range(0, len(braids), _CHUNK)
        ]
        self._begun.append(([number for number, _ in block], tasks))
        self._running.update(tasks)
        return True

    def _iter_unsorted(self) -> Iterator[list[tuple[int, Braid]]]:
        after = 0
        while block := self._store.unsorted(BLOCK, after):
            after = block[-1][0]
            yield block
