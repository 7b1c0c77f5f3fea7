"""A ledger checked from the bottom: the file, every proof, what the classes rest on."""

from __future__ import annotations

import json
from collections import deque
from collections.abc import Callable, Iterator, Sequence
from concurrent.futures import Executor, Future
from dataclasses import dataclass, field
from typing import TypeVar

from braidsearch.certificates import parse_certificate
from braidsearch.errors import BraidsearchError
from braidsearch.ledger.fingerprints import FIELDS, Fingerprint
from braidsearch.ledger.groups import ImageUnion
from braidsearch.ledger.schema import printable
from braidsearch.ledger.store import COLUMNS, Evidence, Store, base_of, key_of
from braidsearch.search.gate import is_confirmed, judge
from braidsearch.words import Braid

Item = TypeVar("Item")
Result = TypeVar("Result")

_CHUNK = 32
_AHEAD = 64


@dataclass(frozen=True, slots=True)
class CheckReport:
    """What a check has looked at, and every fault, one line each; no line: all is proven.

    Entries that are not sorted yet are counted: nothing is said of them, so nothing is wrong.
    """

    proofs: int
    values: int
    classes: int
    unsorted: int = 0
    faults: tuple[str, ...] = field(default=())

    @property
    def valid(self) -> bool:
        """Whether everything was found to hold."""
        return not self.faults


def check_ledger(
    store: Store, executor: Executor, report: Callable[[int, int], None] | None = None
) -> CheckReport:
    """Check the file, every proof by the verifier, every class and every stored value.

    - SQLite's own checks of the file and of what refers to what; every braid is one;
    - each proof is about the braids under which it is stored, and the verifier accepts it;
    - each braid of an entry has a proof that leads to its canonical form, and the forms of one
      class hang together by proofs;
    - the values by which classes are told apart are those that the verifier computes;
    - every two classes differ in such a value, by a proof, or are listed as undecided;
    - no proofs contradict each other.

    Where the file, or then a braid, is damaged, that alone is reported: nothing else has a meaning.
    """
    faults = list(_faults_of_file(store)) or list(_faults_of_braids(store))
    if faults:
        return CheckReport(0, 0, 0, 0, tuple(faults))
    total = store.count("evidence") + store.count("classes")
    proofs, wrong = _check_proofs(store, executor, lambda done: report and report(done, total))
    faults += wrong
    values, wrong = _check_values(
        store, executor, lambda done: report and report(proofs + done, total)
    )
    faults += wrong
    faults += _faults_of_entries(store)
    faults += _faults_of_classes(store)
    faults += _faults_between_classes(store)
    faults += _contradictions(store)
    unsorted = store.count("entries", "braid NOT IN (SELECT braid FROM placed)")
    return CheckReport(proofs, values, store.count("classes"), unsorted, tuple(faults))


def _faults_of_file(store: Store) -> Iterator[str]:
    for (text,) in store.rows("PRAGMA integrity_check"):
        yield from (f"file: {printable(line)}" for line in text.splitlines() if line != "ok")
    for row in store.rows("PRAGMA foreign_key_check"):
        yield f"file: {row[0]}, row {row[1]}: refers to what is not there"


def _faults_of_braids(store: Store) -> Iterator[str]:
    for number, strands, word in store.rows("SELECT id, strands, word FROM braids"):
        try:
            braid = Braid(map(int, word.split()), strands)
        except ValueError as error:  # InputError is one
            yield f"braid {number}: {error}"
        else:
            if " ".join(map(str, braid.word)) != word:
                yield f"braid {number}: {word!r}: expected single blanks between its letters"


def check_proofs(items: Sequence[tuple[Evidence, Braid, Braid]]) -> list[str | None]:
    """For each proof the reason why it does not hold, None where the verifier accepts it."""
    return [_fault_of(*item) for item in items]


def _fault_of(evidence: Evidence, left: Braid, right: Braid) -> str | None:
    try:
        certificate = parse_certificate(evidence.certificate)
    except BraidsearchError as error:
        return str(error)
    if (certificate.left, certificate.right) != (left, right):
        return "it is about other braids"
    if certificate.verdict == "same":
        symmetries = [certificate.symmetry]
    else:
        symmetries = [item.symmetry for item in certificate.distinctions]
    if certificate.verdict != evidence.verdict or symmetries != [evidence.symmetry]:
        return "it claims something else"
    report = judge(certificate)
    return None if report.valid else report.reason


def _check_proofs(
    store: Store, executor: Executor, tell: Callable[[int], object]
) -> tuple[int, list[str]]:
    faults: list[str] = []
    done = 0
    for chunk, results in _spread(executor, check_proofs, _proofs_with_braids(store)):
        for (evidence, _, _), fault in zip(chunk, results, strict=True):
            if fault is not None:
                faults.append(f"proof {evidence.number}: {fault}")
        done += len(chunk)
        tell(done)
    return done, faults


def _proofs_with_braids(store: Store) -> Iterator[tuple[Evidence, Braid, Braid]]:
    for evidence in store.evidence():
        yield evidence, store.braid(evidence.left), store.braid(evidence.right)


def check_values(items: Sequence[tuple[int, Braid, Fingerprint]]) -> list[list[str]]:
    """For each class the names of the values that the verifier does not confirm."""
    return [
        [name for name in FIELDS if not _is_confirmed(name, form, marks)]
        for _, form, marks in items
    ]


def _is_confirmed(name: str, form: Braid, marks: Fingerprint) -> bool:
    try:
        value = marks.value(name)
    except ValueError:  # no JSON
        return False
    return value is None or bool(is_confirmed(name, form, value))


def _check_values(
    store: Store, executor: Executor, tell: Callable[[int], object]
) -> tuple[int, list[str]]:
    faults: list[str] = []
    done = values = 0
    for chunk, results in _spread(executor, check_values, store.all_classes()):
        for (number, _, marks), wrong in zip(chunk, results, strict=True):
            values += len([text for text in marks.values if text is not None])
            faults += [f"class {number}: its {name} is another one" for name in wrong]
        done += len(chunk)
        tell(done)
    return values, faults


def _faults_of_entries(store: Store) -> Iterator[str]:
    rows = store.rows(
        "SELECT placed.braid FROM placed WHERE placed.braid != placed.form AND NOT EXISTS ("
        "SELECT 1 FROM evidence WHERE evidence.left = placed.braid "
        "AND evidence.right = placed.form AND verdict = 'same' AND symmetry = 'identity')"
    )
    for (number,) in rows:
        yield f"braid {number}: no proof leads to its canonical form"
    for number, text in store.rows("SELECT id, remarks FROM entries"):
        if not _is_list_of_texts(text):
            yield f"entry {number}: its remarks are damaged"


def _is_list_of_texts(text: str) -> bool:
    try:
        value = json.loads(text)
    except ValueError:
        return False
    return isinstance(value, list) and all(isinstance(item, str) for item in value)


def _faults_of_classes(store: Store) -> Iterator[str]:
    rows = store.rows(
        "SELECT classes.id FROM classes LEFT JOIN forms ON forms.braid = classes.form "
        "WHERE forms.class IS NOT classes.id"
    )
    for (number,) in rows:
        yield f"class {number}: the form that represents it is none of its own"
    union = ImageUnion()
    for left, right in _proofs_inside_classes(store):
        union.join(left, right)
    parts: dict[int, set[int]] = {}
    for form, number in store.rows("SELECT braid, class FROM forms"):
        parts.setdefault(number, set()).add(union.find(form)[0])
    for number, found in sorted(parts.items()):
        if len(found) > 1:
            yield f"class {number}: its proofs leave it in {len(found)} parts"
    for row in store.rows("SELECT id, key, base, is_complete, " + COLUMNS + " FROM fingerprints"):
        number, key, base, is_complete, *values = row
        marks = Fingerprint(tuple(values))
        if (key, base, is_complete) != (key_of(marks), base_of(marks), marks.is_complete):
            yield f"fingerprint {number}: it is looked up under other values than it has"


def _proofs_inside_classes(store: Store) -> list[tuple[int, int]]:
    return store.rows(
        "SELECT evidence.left, evidence.right FROM evidence "
        "JOIN forms AS one ON one.braid = evidence.left "
        "JOIN forms AS other ON other.braid = evidence.right "
        "WHERE verdict = 'same' AND symmetry = 'identity' AND one.class = other.class"
    )


def _faults_between_classes(store: Store) -> Iterator[str]:
    """Classes whose fingerprints agree, with neither a proof of difference nor an open question."""
    form_class = dict(store.rows("SELECT braid, class FROM forms"))
    known = {
        frozenset((form_class[left], form_class[right]))
        for table in ("undecided WHERE", "evidence WHERE verdict = 'different' AND")
        for left, right in store.rows(
            f"SELECT left, right FROM {table} symmetry = 'identity' "
            "AND left IN (SELECT braid FROM forms) AND right IN (SELECT braid FROM forms)"
        )
    }
    for one, other in store.iter_agreeing_pairs():
        if frozenset((one, other)) not in known:
            yield f"classes {one} and {other}: nothing tells them apart, and no question is open"


def _contradictions(store: Store) -> Iterator[str]:
    """The contradictions that are known, and proofs that say what the classes deny."""
    known = set()
    for number, same, different in store.rows("SELECT id, same, different FROM contradictions"):
        known |= {same, different}
        by = "the values of its classes" if different is None else f"proof {different}"
        yield f"contradiction {number}: proof {same} and {by}"
    rows = store.rows(
        "SELECT evidence.id, verdict, one.class, other.class FROM evidence "
        "JOIN forms AS one ON one.braid = evidence.left "
        "JOIN forms AS other ON other.braid = evidence.right WHERE symmetry = 'identity' "
        "AND (verdict = 'same') != (one.class = other.class) ORDER BY evidence.id"
    )
    for number, verdict, one, other in rows:
        if number not in known and verdict == "same":
            first, second = sorted((one, other))
            yield f"proof {number}: it joins classes {first} and {second}, which are kept apart"
        elif number not in known:
            yield f"proof {number}: it tells braids apart that are both in class {one}"


def _spread(
    executor: Executor, function: Callable[[Sequence[Item]], list[Result]], items: Iterator[Item]
) -> Iterator[tuple[list[Item], list[Result]]]:
    """The function on chunks of the items, in order; only a few chunks are held at a time."""
    waiting: deque[tuple[list[Item], Future[list[Result]]]] = deque()
    chunk: list[Item] = []
    for item in items:
        chunk.append(item)
        if len(chunk) == _CHUNK:
            waiting.append((chunk, executor.submit(function, chunk)))
            chunk = []
        if len(waiting) >= _AHEAD:
            done, task = waiting.popleft()
            yield done, task.result()
    if chunk:
        waiting.append((chunk, executor.submit(function, chunk)))
    for done, task in waiting:
        yield done, task.result()
