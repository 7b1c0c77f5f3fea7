"""The step of a sorting that looks for mirror images and reverses among the classes."""

from __future__ import annotations

from collections import deque
from collections.abc import Callable, Iterator, Sequence
from concurrent.futures import Executor, Future

import networkx as nx

from braidsearch.ledger.findings import Finding
from braidsearch.ledger.groups import group_classes
from braidsearch.ledger.images import Image, ask_images, images_of
from braidsearch.ledger.judgements import Judgements
from braidsearch.ledger.store import Store
from braidsearch.words import Braid

_AHEAD = 64
_BLOCK = 64  # classes whose answers are kept in one transaction


class Imager:
    """Asks for every class not asked for yet, whether it is an image of another class."""

    def __init__(
        self, store: Store, judgements: Judgements, executor: Executor, symmetries: Sequence[str]
    ) -> None:
        self.store, self.judgements, self.executor = store, judgements, executor
        self.symmetries = symmetries
        self.groups = nx.utils.UnionFind()
        for group in group_classes(store):
            self.groups.union(*group)

    def iter_blocks(self) -> Iterator[tuple[int, int, Callable[[], None]]]:
        """How many of how many classes are done after each block, with the change that it makes.

        The change must be made in a transaction before the next block is asked for.
        """
        waiting = self._waiting()
        done = 0
        ahead: deque[tuple[int, list[str], Future[list[Image]]]] = deque()
        numbers = iter(waiting)
        block: list[tuple[int, list[Image]]] = []
        while True:
            while len(ahead) < _AHEAD and (following := next(numbers, None)) is not None:
                form, symmetries = following
                task = self.executor.submit(images_of, self.store.braid(form), symmetries)
                ahead.append((form, symmetries, task))
            if ahead:
                form, _, task = ahead.popleft()
                block.append((form, task.result()))
            if block and (len(block) == _BLOCK or not ahead):
                done += len(block)
                answers = self._answers(block)
                kept = block
                yield done, len(waiting), lambda: self._take(kept, answers)  # noqa: B023
                block = []
            elif not ahead:
                return

    def _waiting(self) -> list[tuple[int, list[str]]]:
        """The forms of classes with the symmetries not asked for yet."""
        asked = set(self.store.rows("SELECT form, symmetry FROM imaged"))
        forms = [form for (form,) in self.store.rows("SELECT form FROM classes ORDER BY id")]
        waiting = [
            (form, [name for name in self.symmetries if (form, name) not in asked])
            for form in forms
        ]
        return [(form, symmetries) for form, symmetries in waiting if symmetries]

    def _answers(self, block: Sequence[tuple[int, list[Image]]]) -> dict[int, list[Finding]]:
        """The searches among classes of the image's fingerprint, for what no look-up has joined."""
        for form, images in block:
            for image in images:
                other = self.judgements.class_of(image.finding.right)
                if other is not None:
                    self.groups.union(self._class_of(form), other)
        tasks = {
            form: self.executor.submit(
                ask_images, self.store.braid(form), candidates, self.judgements.effort
            )
            for form, images in block
            if (candidates := self._candidates(form, images))
        }
        return {form: task.result() for form, task in tasks.items()}

    def _candidates(self, form: int, images: Sequence[Image]) -> list[tuple[Braid, str]]:
        """The older classes of which this one may be an image, not grouped with it yet."""
        own = self._class_of(form)
        found = {}
        for image in images:
            for number, braid, _ in self.store.agreeing_classes(image.fingerprint):
                if number < own and self.groups[number] != self.groups[own]:
                    found[number, image.symmetry] = braid
        return [(found[key], key[1]) for key in sorted(found)]

    def _take(
        self, block: Sequence[tuple[int, list[Image]]], answers: dict[int, list[Finding]]
    ) -> None:
        for form, images in block:
            for image in images:
                self._take_image(form, image)
            for finding in answers.get(form, ()):
                other = self.store.braid_number(finding.right)
                assert other is not None
                self.judgements.take_answer(form, other, finding)
                if finding.outcome == "same":
                    self.groups.union(self._class_of(form), self._class_of(other))

    def _take_image(self, form: int, image: Image) -> None:
        other = self.store.braid_number(image.finding.right)
        if other is not None and self.store.class_of_form(other) is not None:
            self.store.add_evidence(form, other, image.finding)
        self.store.execute(
            "INSERT OR IGNORE INTO imaged (form, symmetry) VALUES (?, ?)", [form, image.symmetry]
        )

    def _class_of(self, form: int) -> int:
        return int(self.store.class_of_form(form) or 0)
