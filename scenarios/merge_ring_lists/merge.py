"""Merge two lists of closed braids into one list of link types, with a proof for every decision.

    python merge.py FOLDER

reads simulation.csv and microscope.json beside this file and writes FOLDER/report.txt,
FOLDER/types.json and FOLDER/certificates. Exit status: 0 settled, 3 when a pair stayed open.
"""

from __future__ import annotations

import csv
import json
import sys
from dataclasses import dataclass, field
from pathlib import Path

from braidsearch import (
    Braid,
    Certificate,
    InputError,
    SearchLimits,
    compare,
    format_word,
    parse_word,
    verify,
)

HERE = Path(__file__).parent
LIMITS = SearchLimits(seconds=None, nodes=2_000)
"""Counted in nodes, so that the merge comes out the same on every machine."""


@dataclass(frozen=True)
class Ring:
    """One entry of a list: its name there, and its braid."""

    name: str
    braid: Braid


@dataclass
class LinkType:
    """Rings that were proven to be one link; the first is the one that others are compared to."""

    name: str
    rings: list[Ring] = field(default_factory=list)


@dataclass
class Merge:
    """The list of types as it grows, and what stands beside it."""

    folder: Path
    types: list[LinkType] = field(default_factory=list)
    unreadable: list[str] = field(default_factory=list)
    open_pairs: list[tuple[str, str]] = field(default_factory=list)
    mirror_pairs: list[tuple[str, str]] = field(default_factory=list)

    def add(self, ring: Ring) -> None:
        """Put the ring to its type, or make a new type of it."""
        differences: list[tuple[LinkType, Certificate]] = []
        for link_type in self.types:
            verdict = compare(ring.braid, link_type.rings[0].braid, limits=LIMITS)
            if verdict.certificate is None:
                self.open_pairs.append((ring.name, link_type.name))
            elif verdict.outcome == "same":
                self._keep(verdict.certificate, f"{ring.name}-is-{link_type.name}")
                link_type.rings.append(ring)
                return
            else:
                differences.append((link_type, verdict.certificate))
        made = LinkType(f"type-{len(self.types) + 1}", [ring])
        self.types.append(made)
        for link_type, certificate in differences:
            self._keep(certificate, f"{made.name}-is-not-{link_type.name}")

    def find_mirror_pairs(self) -> None:
        """Note which types are mirror images of one another."""
        for place, left in enumerate(self.types):
            for right in self.types[:place]:
                verdict = compare(
                    left.rings[0].braid, right.rings[0].braid, up_to=["mirror"], limits=LIMITS
                )
                if verdict.outcome == "same" and verdict.symmetry == "mirror":
                    assert verdict.certificate is not None
                    self._keep(verdict.certificate, f"{left.name}-mirrors-{right.name}")
                    self.mirror_pairs.append((left.name, right.name))

    def _keep(self, certificate: Certificate, name: str) -> None:
        """Save the certificate; a file that does not verify must not stay unnoticed."""
        path = self.folder / "certificates" / f"{name}.json"
        certificate.save(path)
        report = verify(path, left=certificate.left, right=certificate.right)
        if not report.valid:
            raise RuntimeError(f"{path}: {report.reason}")

    def report(self) -> str:
        """The merged list in words."""
        lines = []
        for link_type in self.types:
            word = format_word(link_type.rings[0].braid)
            lines.append(f"{link_type.name}: closure of {word}")
            lines.append("  rings: " + ", ".join(ring.name for ring in link_type.rings))
        lines += [f"mirror images: {left} and {right}" for left, right in self.mirror_pairs]
        lines += [f"open: is {ring} of {link_type}?" for ring, link_type in self.open_pairs]
        lines += [f"not read: {problem}" for problem in self.unreadable]
        return "\n".join(lines) + "\n"

    def to_json(self) -> dict[str, object]:
        """The merged list for programs."""
        return {
            "types": [
                {
                    "name": link_type.name,
                    "word": format_word(link_type.rings[0].braid),
                    "rings": [ring.name for ring in link_type.rings],
                }
                for link_type in self.types
            ],
            "mirror_pairs": self.mirror_pairs,
            "open_pairs": self.open_pairs,
            "unreadable": self.unreadable,
        }


def read_rows() -> list[tuple[str, str]]:
    """The name and the braid, as text, of every row of both lists."""
    with open(HERE / "simulation.csv", encoding="utf-8", newline="") as file:
        rows = [(row["ring"], f"{row['strands']}: {row['word']}") for row in csv.DictReader(file)]
    plates = json.loads((HERE / "microscope.json").read_text(encoding="utf-8"))
    return rows + [(f"plate-{plate['plate']}", plate["braid"]) for plate in plates]


def merge_lists(folder: Path) -> Merge:
    """Read both lists, merge them, and write the folder."""
    (folder / "certificates").mkdir(parents=True, exist_ok=True)
    merge = Merge(folder)
    for name, text in read_rows():
        try:
            ring = Ring(name, parse_word(text))
        except InputError as error:
            merge.unreadable.append(f"{name}: {error}")
        else:
            merge.add(ring)
    merge.find_mirror_pairs()
    (folder / "report.txt").write_text(merge.report(), encoding="utf-8")
    (folder / "types.json").write_text(json.dumps(merge.to_json(), indent=1), encoding="utf-8")
    return merge


def main(arguments: list[str]) -> int:
    """Merge into the folder named on the command line and print the report."""
    if len(arguments) != 1:
        print("usage: python merge.py FOLDER", file=sys.stderr)
        return 2
    merge = merge_lists(Path(arguments[0]))
    print(merge.report(), end="")
    return 3 if merge.open_pairs else 0


if __name__ == "__main__":
    sys.exit(main(sys.argv[1:]))
