"""Merge two catalogues in a ledger, with a proof for every merge and for every refusal.

    python merge.py FOLDER

reads register.csv and field_list.jsonl beside this file, runs the command ``braidsearch ledger``
on them, and writes FOLDER/report.txt, merged.json, links.ledger, merged.csv, commands.txt, proofs
and evidence. The same command again goes on with the ledger that is there. Exit status: 0 settled,
3 when a question stayed open, 1 when a certificate or the ledger does not hold.

Nothing of the package is imported here: everything is asked of its command, and every certificate
is verified by the one file verify.py, copied alone into an empty folder.
"""

from __future__ import annotations

import csv
import json
import re
import shlex
import shutil
import subprocess
import sys
import tempfile
from collections import Counter
from collections.abc import Iterable, Iterator, Sequence
from concurrent.futures import ThreadPoolExecutor
from dataclasses import asdict, dataclass, field
from functools import partial
from importlib.util import find_spec
from pathlib import Path
from typing import Any

HERE = Path(__file__).parent
AT_A_TIME = 2
"""Processes at work."""
CATALOGUES = {"Register": "register.csv", "Saltmarsh": "field_list.jsonl"}
CLAIM = re.compile(r"same as (Q-[0-9]+)")
"""What a note may say of another entry."""
TITLES = {
    "linking-numbers": "the linking numbers",
    "alexander": "the Alexander polynomial",
    "jones": "the Jones polynomial",
    "three-braid": "the classification of closed 3-braids",
    "colouring": "the colourings in a finite group",
}
"""The invariants that decide here, in words."""
IMAGES = {
    "identity": "is",
    "mirror": "is the mirror image of",
    "reverse": "is the reverse of",
    "mirror-reverse": "is the reversed mirror image of",
}


@dataclass(frozen=True)
class Entry:
    """An entry as the ledger holds it; ``word`` has the strand count in front."""

    name: str
    source: str
    note: str
    word: str

    @property
    def title(self) -> str:
        """The name with its source, by which the ledger finds it."""
        return f"{self.source}/{self.name}"

    def __str__(self) -> str:
        return f"{self.name} ({self.source})"


@dataclass(frozen=True)
class Finding:
    """What the ledger can prove of two entries.

    ``evidence`` has the kinds of moves with their numbers, or the invariants that differ.
    ``certificate`` is the file, None where the ledger has no proof.
    """

    left: Entry
    right: Entry
    outcome: str
    symmetry: str | None
    reason: str
    evidence: dict[str, int]
    certificate: str | None

    def __str__(self) -> str:
        if self.outcome == "undecided":
            return f"{self.left}, {self.right}: OPEN: {self.reason}"
        relation = IMAGES[self.symmetry or ""] if self.outcome == "same" else "is not"
        claim = f"{self.left} {relation} {self.right}"
        return "\n    ".join((claim, self.why, f"proof: {self.certificate}"))

    @property
    def why(self) -> str:
        """The evidence in words."""
        if self.outcome == "different":
            titles = (TITLES.get(name, f"the invariant {name}") for name in self.evidence)
            return f"told apart by {' and '.join(titles)}"
        kinds = ", ".join(f"{count} {kind}" for kind, count in self.evidence.items())
        return f"{self.reason}: {kinds}" if kinds else "letter by letter"


@dataclass
class Merge:
    """The merged catalogue as it grows: classes of entries, findings, and what went wrong."""

    folder: Path
    left_out: list[str] = field(default_factory=list)
    classes: list[list[Entry]] = field(default_factory=list)
    merges: list[Finding] = field(default_factory=list)
    images: list[Finding] = field(default_factory=list)
    refusals: list[Finding] = field(default_factory=list)
    claims: dict[str, Finding] = field(default_factory=dict)
    open_questions: list[str] = field(default_factory=list)
    checked: str = ""
    verified: int = 0
    faults: list[str] = field(default_factory=list)

    @property
    def status(self) -> int:
        """The exit status: 1 for faults, 3 for open questions, 0 when all is settled."""
        findings = [*self.merges, *self.images, *self.refusals, *self.claims.values()]
        is_open = self.open_questions or any(one.certificate is None for one in findings)
        return 1 if self.faults else 3 if is_open else 0

    @property
    def duplicates(self) -> list[Finding]:
        """The merges of entries of one catalogue."""
        return [one for one in self.merges if one.left.source == one.right.source]


class Command:
    """Runs ``braidsearch ledger`` on the ledger in a folder; ``run`` is what was run, in order."""

    def __init__(self, folder: Path) -> None:
        self.folder = folder.resolve()
        self.run: list[str] = []

    def __call__(self, action: str, *arguments: str) -> str:
        """What the action prints. Raises RuntimeError for a mistake in the input."""
        self.run.append(self._shown(action, *arguments))
        return self._output(action, *arguments)

    def json(self, action: str, *arguments: str) -> Any:
        """The object that the action prints with --json."""
        return json.loads(self(action, *arguments, "--json"))

    def proofs(
        self, relation: str, pairs: Iterable[tuple[Entry, Entry]], *arguments: str
    ) -> list[Finding]:
        """What the ledger has about each two entries, the certificates in files of their own."""
        asked = []
        for left, right in pairs:
            name = f"{left.name}-{relation}-{right.name}.json".replace(" ", "-")
            path = str(self.folder / "proofs" / name)
            given = "proof", left.title, right.title, *arguments, "-o", path, "--json"
            self.run.append(self._shown(*given))
            asked.append((left, right, f"proofs/{name}", given))
        with ThreadPoolExecutor(AT_A_TIME) as pool:
            return list(pool.map(lambda one: self._proof(*one), asked))

    def _proof(self, left: Entry, right: Entry, file: str, given: Sequence[str]) -> Finding:
        said = json.loads(self._output(*given))
        proof = said["certificate"] or {}
        kinds = [move["move"] for move in proof.get("moves", ())]
        kinds += [one["invariant"] for one in proof.get("distinctions", ())]
        evidence = dict(Counter(kinds))
        outcome, symmetry, reason = said["outcome"], said["symmetry"], said["reason"]
        return Finding(left, right, outcome, symmetry, reason, evidence, file if proof else None)

    def _line(self, action: str, *arguments: str) -> list[str]:
        return ["ledger", action, str(self.folder / "links.ledger"), *arguments]

    def _shown(self, action: str, *arguments: str) -> str:
        """The command as it may be typed, with paths from the folder."""
        line = self._line(action, *arguments)
        shown = [argument.removeprefix(f"{self.folder}/") for argument in line]
        return shlex.join(["braidsearch", *shown])

    def _output(self, action: str, *arguments: str) -> str:
        finished = subprocess.run(
            [sys.executable, "-m", "braidsearch", *self._line(action, *arguments)],
            cwd=HERE,
            capture_output=True,
            text=True,
            check=False,
        )
        if finished.returncode not in (0, 1, 3):
            line = self._shown(action, *arguments)
            raise RuntimeError(f"{line}: {finished.stderr.strip()}")
        return finished.stdout


# what is asked of the ledger


def merge_catalogues(folder: Path) -> Merge:
    """Enter both catalogues, sort, ask for every proof, and write all of it out."""
    (folder / "proofs").mkdir(parents=True, exist_ok=True)
    ledger, merge = Command(folder), Merge(folder)
    for source, file in CATALOGUES.items():
        added = ledger.json("add", file, "--source", source, "--keep-good")
        merge.left_out += added["problems"]
    ledger("sort", "--up-to", "any")
    report = ledger.json("report", "--all")
    classes = {
        one["number"]: [entry_of(each) for each in one["entries"]] for one in report["classes"]
    }
    merge.classes = list(classes.values())
    merge.open_questions = [question_of(one) for one in report["open_questions"]]
    merge.faults += [f"contradiction {one['number']}" for one in report["contradictions"]]
    ask_for_proofs(ledger, merge, [[classes[number] for number in g] for g in report["groups"]])
    ledger("export", "--csv", str(ledger.folder / "merged.csv"))
    ledger("export", "--certificates", str(ledger.folder / "evidence"))
    checked = ledger.json("check")
    merge.faults += checked["faults"]
    merge.checked = f"{checked['proofs']} proofs, {checked['values']} values"
    verify_all(merge)
    (folder / "commands.txt").write_text("\n".join(ledger.run) + "\n", encoding="utf-8")
    (folder / "report.txt").write_text(report_of(merge), encoding="utf-8")
    (folder / "merged.json").write_text(json.dumps(to_json(merge), indent=1), encoding="utf-8")
    return merge


def ask_for_proofs(ledger: Command, merge: Merge, groups: list[list[list[Entry]]]) -> None:
    """Ask for each merge, for each image with its refusal, and for what the notes claim."""
    merges = [(first, other) for first, *others in merge.classes for other in others]
    merge.merges = ledger.proofs("is", merges)
    firsts = [[one[0] for one in group] for group in groups]
    images = [(first, other) for first, *others in firsts for other in others]
    merge.images = ledger.proofs("is-image-of", images, "--up-to", "any")
    merge.refusals = ledger.proofs("is-not", images)
    entries = {entry.name: entry for one in merge.classes for entry in one}
    claims = {
        entry.name: (entries[claim[1]], entry)
        for entry in entries.values()
        if (claim := CLAIM.search(entry.note))
    }
    found = {(one.left, one.right): one for one in (*merge.merges, *merge.refusals)}
    asked = [pair for pair in claims.values() if pair not in found]
    found |= zip(asked, ledger.proofs("claimed-to-be", asked), strict=True)
    merge.claims = {name: found[pair] for name, pair in claims.items()}


def entry_of(value: dict[str, Any]) -> Entry:
    """An entry of the report."""
    braid = value["braid"]
    word = f"{braid['strands']}: {' '.join(map(str, braid['word']))}".strip()
    return Entry(value["name"], value["source"], value["note"], word)


def question_of(value: dict[str, Any]) -> str:
    """An open question of the report, in words."""
    left, right = value["left"]["name"], value["right"]["name"]
    return f"{left}, {right} up to {value['symmetry']}: {value['reason']}"


# the sceptic


def verify_all(merge: Merge) -> None:
    """Verify each certificate by verify.py alone, bound to the words that it must be about."""
    package = find_spec("braidsearch")
    if package is None or package.origin is None:
        raise RuntimeError("braidsearch: expected it to be installed")
    with tempfile.TemporaryDirectory() as empty, ThreadPoolExecutor(AT_A_TIME) as pool:
        verifier = Path(empty) / "verify.py"
        shutil.copy(Path(package.origin).parent / "verifier" / "verify.py", verifier)
        for fault in pool.map(partial(fault_of, verifier), iter_certificates(merge)):
            merge.verified += 1
            merge.faults += [fault] if fault else []


def fault_of(verifier: Path, written: tuple[Path, str, str]) -> str:
    """What the verifier has against a certificate about two words; nothing where it holds."""
    file, left, right = written
    finished = subprocess.run(
        [sys.executable, "-I", verifier, file, "--left", left, "--right", right],
        cwd=verifier.parent,
        capture_output=True,
        text=True,
        check=False,
    )
    if finished.returncode == 0:
        return ""
    return f"{file.name}: {finished.stdout}{finished.stderr}".strip()


def iter_certificates(merge: Merge) -> Iterator[tuple[Path, str, str]]:
    """Every file that was written, with the two words that it must be about."""
    folder = merge.folder.resolve()
    findings = (*merge.merges, *merge.images, *merge.refusals, *merge.claims.values())
    files = {one.certificate: one for one in findings if one.certificate}
    for file, one in files.items():
        yield folder / file, one.left.word, one.right.word
    with open(folder / "evidence" / "index.csv", encoding="utf-8", newline="") as index:
        for row in csv.DictReader(index):
            yield folder / "evidence" / row["file"], row["left"], row["right"]


# what comes out


def report_of(merge: Merge) -> str:
    """The merge in words."""
    entries = sum(map(len, merge.classes))
    wrong = [one for one in merge.claims.values() if one.outcome == "different"]
    lines = [
        f"{entries} entries, {len(merge.left_out)} left out: {len(merge.classes)} oriented links",
        f"merges: {len(merge.merges)}, {len(merge.duplicates)} of them inside one catalogue",
        f"claims in notes: {len(merge.claims)}, {len(wrong)} of them refuted",
        f"open questions: {len(merge.open_questions) or 'none'}",
        f"ledger check: {merge.checked}",
        f"verify.py alone: {merge.verified} certificates, {len(merge.faults) or 'no'} faults",
        *section("faults", merge.faults),
        *section("left out", merge.left_out),
        *section("open", merge.open_questions),
        *section("merges", merge.merges),
        *section("duplicates inside one catalogue", merge.duplicates),
        *section("images of one another", merge.images),
        *section("images that are other oriented links", merge.refusals),
        *section("claims in notes", map(claim_of, merge.claims.values())),
        *section("the merged catalogue", iter_merged(merge)),
    ]
    return "\n".join(lines) + "\n"


def section(title: str, items: Iterable[object]) -> list[str]:
    """A heading with its items, nothing where there are none."""
    lines = [f"  {item}" for item in items]
    return ["", f"{title}:", *lines] if lines else []


def claim_of(one: Finding) -> str:
    """What a note claims, and whether it is so."""
    said = {"same": "right", "different": "REFUTED", "undecided": "open"}[one.outcome]
    return f'{one.right.name} notes "{one.right.note}": {said}\n    {one}'


def iter_merged(merge: Merge) -> Iterator[str]:
    """Each oriented link with all its names."""
    for number, one in enumerate(merge.classes, 1):
        yield f"{number:>2}  {', '.join(map(str, one))}"


def to_json(merge: Merge) -> dict[str, object]:
    """The merge for programs."""
    return {
        "left_out": merge.left_out,
        "classes": [[asdict(entry) for entry in one] for one in merge.classes],
        "merges": [asdict(one) for one in merge.merges],
        "images": [asdict(one) for one in merge.images],
        "refusals": [asdict(one) for one in merge.refusals],
        "claims": {name: asdict(one) for name, one in merge.claims.items()},
        "open_questions": merge.open_questions,
        "verified": merge.verified,
        "faults": merge.faults,
    }


def main(arguments: list[str]) -> int:
    """Merge into the folder named on the command line and print the report."""
    if len(arguments) != 1:
        print("usage: python merge.py FOLDER", file=sys.stderr)
        return 2
    merge = merge_catalogues(Path(arguments[0]))
    print(report_of(merge), end="")
    return merge.status


if __name__ == "__main__":
    sys.exit(main(sys.argv[1:]))
