"""Every entry into a class: blocks of braids, prepared ahead, placed by fingerprint, kept whole.

A block is a fixed number of braids in the order of entry; it is kept in one transaction, so that a
sorting that is broken off goes on from the last block. What becomes of a form depends on the
classes before it alone, never on blocks, workers or the clock: the same entries and limits make
the same ledger.
"""

from __future__ import annotations

from collections.abc import Callable, Iterator, Sequence
from concurrent.futures import Executor, Future
from contextlib import contextmanager
from dataclasses import dataclass
from typing import Any

from braidsearch.ledger.ahead import BLOCK, Ahead
from braidsearch.ledger.findings import Effort, Finding
from braidsearch.ledger.fingerprints import Fingerprint
from braidsearch.ledger.following import merge_what_follows
from braidsearch.ledger.imaging import Imager
from braidsearch.ledger.judgements import Judgements
from braidsearch.ledger.placing import Marked, ask, place_all
from braidsearch.ledger.preparing import Prepared
from braidsearch.ledger.store import Store
from braidsearch.words import Braid

Report = Callable[["SortProgress"], None]


@dataclass(frozen=True, slots=True)
class SortProgress:
    """How far a sorting is: ``doing`` in words, what of how many is done, what came of it."""

    doing: str
    done: int
    total: int
    classes: int
    undecided: int


@dataclass(frozen=True, slots=True)
class SortSummary:
    """What a sorting has done: braids placed, questions retried and settled, contradictions met."""

    placed: int
    retried: int
    settled: int
    contradictions: int


class Sorter:
    """One sorting of one ledger."""

    def __init__(
        self, store: Store, effort: Effort, executor: Executor, report: Report | None
    ) -> None:
        self.store, self.effort, self.executor, self.report = store, effort, executor, report
        self.judgements = Judgements(store, effort)
        self.revision = store.revision()
        self.placed = self.retried = self.settled = 0

    def sort(self, up_to: Sequence[str]) -> SortSummary:
        """Retry what is open and was tried with less, place what is not sorted, look for images."""
        before = self.store.count("contradictions")
        self._retry()
        self._place_all()
        if up_to:
            self._find_images(up_to)
        with self._changing():
            merge_what_follows(self.store, self.judgements)
        found = self.store.count("contradictions") - before
        return SortSummary(self.placed, self.retried, self.settled, found)

    # open questions

    def _retry(self) -> None:
        questions = [
            (left, right, symmetry)
            for left, right, symmetry, tried, _ in self.store.undecided()
            if not self.effort.is_within(tried)
        ]
        self.retried = len(questions)
        for done, batch in _in_batches(questions, BLOCK):
            self._tell("retrying open questions", done, len(questions))
            tasks = [
                self.executor.submit(ask, *self._braids(left, right), symmetry, self.effort)
                for left, right, symmetry in batch
            ]
            for (left, right, symmetry), task in zip(batch, tasks, strict=True):
                if not self.store.is_undecided(left, right, symmetry):
                    continue  # it followed from the answers before it
                finding = task.result()
                with self._changing():
                    self.judgements.take_answer(left, right, finding)
                self.settled += finding.outcome != "undecided"

    def _braids(self, left: int, right: int) -> tuple[Braid, Braid]:
        return self.store.braid(left), self.store.braid(right)

    # entries

    def _place_all(self) -> None:
        total = self.store.count_unsorted()
        self._tell("sorting", 0, total)
        self.ahead = Ahead(self.store, self.executor)
        while (block := self.ahead.next_block()) is not None:
            self._place_block(*block)
            self.placed += len(block[0])
            self._tell("sorting", self.placed, total)

    def _place_block(self, numbers: Sequence[int], prepared: Sequence[Prepared]) -> None:
        findings = self._findings(prepared)
        with self._changing():
            for number, one in zip(numbers, prepared, strict=True):
                self.judgements.take_form(number, one, findings.get(one.form, ()))

    def _findings(self, prepared: Sequence[Prepared]) -> dict[Braid, tuple[Finding, ...]]:
        """What was found for each new form of a block, by searches in every bucket by itself."""
        new: dict[Braid, Fingerprint] = {}
        for one in prepared:
            if one.form not in new and self.judgements.class_of(one.form) is None:
                new[one.form] = one.fingerprint
        findings: dict[Braid, tuple[Finding, ...]] = {}
        tasks: list[tuple[list[Marked], Future[Any]]] = []
        for bucket in self._buckets(new):
            candidates = self._candidates(bucket)
            if len(bucket) == 1 and not candidates:
                findings[bucket[0][0]] = ()
            else:
                task = self.executor.submit(place_all, bucket, candidates, self.effort)
                tasks.append((bucket, task))
        for bucket, task in tasks:
            results = self.ahead.result_of(task)
            for (form, _), found in zip(bucket, results, strict=True):
                findings[form] = tuple(found)
        return findings

    def _buckets(self, new: dict[Braid, Fingerprint]) -> list[list[Marked]]:
        """The new forms in groups: whatever may be one link is in one group.

        A fingerprint that lacks a value agrees with several that have it, so that all with its
        base go together.
        """
        wide = {marks.base for marks in new.values() if not marks.is_complete}
        bases = {marks.base for marks in new.values()} - wide
        wide |= {base for base in bases if self.store.has_incomplete(base)}
        groups: dict[object, list[Marked]] = {}
        for form, marks in new.items():
            key = marks.base if marks.base in wide else marks
            groups.setdefault(key, []).append((form, marks))
        return list(groups.values())

    def _candidates(self, bucket: Sequence[Marked]) -> list[Marked]:
        """The classes that a form of the bucket may belong to, oldest first."""
        found: dict[int, Marked] = {}
        for marks in dict.fromkeys(marks for _, marks in bucket):
            for number, form, theirs in self.store.agreeing_classes(marks):
                found[number] = form, theirs
        return [found[number] for number in sorted(found)]

    def _find_images(self, symmetries: Sequence[str]) -> None:
        imager = Imager(self.store, self.judgements, self.executor, symmetries)
        for done, total, change in imager.iter_blocks():
            with self._changing():
                change()
            self._tell("looking for symmetric images", done, total)

    @contextmanager
    def _changing(self) -> Iterator[None]:
        """A transaction on the state that the findings were made for."""
        with self.store.writing():
            self.store.check_revision(self.revision)
            yield
            revision = self.store.revision()
        self.revision = revision

    def _tell(self, doing: str, done: int, total: int) -> None:
        if self.report is not None:
            classes, undecided = self.store.count("classes"), self.store.count("undecided")
            self.report(SortProgress(doing, done, total, classes, undecided))


def _in_batches(items: Sequence[Any], size: int) -> Iterator[tuple[int, Sequence[Any]]]:
    for start in range(0, len(items), size):
        yield start, items[start : start + size]
