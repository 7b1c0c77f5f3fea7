"""Say of every ring of a simulated melt which known link it is, with a proof for every decision.

    python classify.py FOLDER

reads the coordinates in rings/ and known_links.json beside this file, and writes
FOLDER/report.txt, FOLDER/types.json and FOLDER/certificates. Exit status: 0 settled, 3 when it
stayed open whether a ring is one of the known links.
"""

from __future__ import annotations

import json
import sys
from collections.abc import Iterator
from dataclasses import dataclass, field
from pathlib import Path

from braidsearch import (
    Braid,
    Certificate,
    InputError,
    SearchLimits,
    Woven,
    compare,
    format_word,
    parse_word,
    polygon_diagram,
    read_polygons,
    verify,
    weave,
)

HERE = Path(__file__).parent
LIMITS = SearchLimits(seconds=None, nodes=2_000)
"""Counted in nodes, so that the classification comes out the same on every machine."""
NO_TYPE = "none of the list"


@dataclass(frozen=True)
class Molecule:
    """One file of coordinates: a ring, or several that may be linked, and the braid woven of it.

    ``vertices`` counts those of all its rings, ``crossings`` those that were left of the drawing
    when the rings had been straightened as far as they let each other.
    """

    name: str
    rings: int
    vertices: int
    crossings: int
    woven: Woven


@dataclass
class Finding:
    """What a molecule is: a known link, or none of them, or what stayed open."""

    molecule: Molecule
    known: str | None = None
    mirror_of: str | None = None
    open_questions: list[str] = field(default_factory=list)
    certificates: list[str] = field(default_factory=list)

    @property
    def link_type(self) -> str:
        """The known link; ``none of the list``; or ``open``."""
        return self.known or ("open" if self.open_questions else NO_TYPE)


@dataclass
class Classification:
    """All findings, and the files that could not be read with the reason."""

    folder: Path
    known_links: dict[str, Braid]
    findings: list[Finding] = field(default_factory=list)
    unreadable: dict[str, str] = field(default_factory=dict)

    def add(self, file: Path) -> None:
        """Read a file and find out which known link lies in it."""
        try:
            molecule = read_molecule(file)
        except InputError as error:
            self.unreadable[file.name] = str(error)
        else:
            self.findings.append(self._find(molecule))

    @property
    def is_settled(self) -> bool:
        """Whether every molecule that could be read is a known link or proven to be none."""
        return not any(finding.open_questions for finding in self.findings)

    def _find(self, molecule: Molecule) -> Finding:
        """The known link that is proven to be the molecule's, or every proof that it is another."""
        finding = Finding(molecule)
        differences: list[tuple[str, Certificate]] = []
        for name, braid in self.known_links.items():
            verdict = compare(molecule.woven.braid, braid, limits=LIMITS)
            if verdict.certificate is None:
                finding.open_questions.append(name)
            elif verdict.outcome == "same":
                self._keep(finding, verdict.certificate, "is", name)
                finding.known, finding.open_questions = name, []
                return finding
            else:
                differences.append((name, verdict.certificate))
        for name, certificate in differences:
            self._keep(finding, certificate, "is-not", name)
        self._find_mirror_image(finding)
        return finding

    def _find_mirror_image(self, finding: Finding) -> None:
        """Note a known link whose mirror image the molecule is: for this group another link."""
        for name, braid in self.known_links.items():
            verdict = compare(finding.molecule.woven.braid, braid, up_to=["mirror"], limits=LIMITS)
            if verdict.certificate is not None and verdict.symmetry == "mirror":
                self._keep(finding, verdict.certificate, "mirrors", name)
                finding.mirror_of = name
                return

    def _keep(self, finding: Finding, certificate: Certificate, relation: str, known: str) -> None:
        """Save the certificate; a file that does not verify must not stay unnoticed.

        It is bound to the braid that was woven here and to the one in the list.
        """
        name = f"{finding.molecule.name}-{relation}-{known.replace(' ', '-')}.json"
        path = self.folder / "certificates" / name
        certificate.save(path)
        report = verify(path, left=finding.molecule.woven.braid, right=self.known_links[known])
        if not report.valid:
            raise RuntimeError(f"{path}: {report.reason}")
        finding.certificates.append(name)

    def iter_counts(self) -> Iterator[tuple[str, list[str]]]:
        """Each link type that occurs, known ones in the order of the list, with its molecules."""
        for link_type in (*self.known_links, NO_TYPE, "open"):
            names = [f.molecule.name for f in self.findings if f.link_type == link_type]
            if names:
                yield link_type, names

    def report(self) -> str:
        """The classification in words: the table first, then every molecule by itself."""
        lines = [f"{len(self.findings)} molecules against {len(self.known_links)} known links", ""]
        lines += [f"{t:<24}{len(names):>3}  {', '.join(names)}" for t, names in self.iter_counts()]
        lines += [f"{'not read':<24}{1:>3}  {file}: {why}" for file, why in self.unreadable.items()]
        for finding in self.findings:
            lines += ["", *describe(finding)]
        return "\n".join(lines) + "\n"

    def to_json(self) -> dict[str, object]:
        """The classification for programs."""
        return {
            "known_links": {name: format_word(braid) for name, braid in self.known_links.items()},
            "molecules": [finding_to_json(finding) for finding in self.findings],
            "unreadable": self.unreadable,
        }


def read_molecule(file: Path) -> Molecule:
    """The rings of a file, drawn and woven. Raises InputError for what are no closed curves."""
    polygons = read_polygons(file)
    diagram = polygon_diagram(polygons)
    vertices = sum(len(polygon) for polygon in polygons)
    return Molecule(file.stem, len(polygons), vertices, len(diagram.crossings), weave(diagram))


def describe(finding: Finding) -> list[str]:
    """What the report says of one molecule."""
    molecule = finding.molecule
    rings = "1 ring" if molecule.rings == 1 else f"{molecule.rings} rings"
    lines = [
        f"{molecule.name}: {finding.link_type}",
        f"  {rings}, {molecule.vertices} vertices; crossings left: {molecule.crossings}",
        f"  woven: {format_word(molecule.woven.braid)}",
    ]
    lines += [f"  checked: {check}" for check in molecule.woven.checks]
    lines += [f"  note: {note}" for note in molecule.woven.notes]
    lines += [f"  open: is it {name}?" for name in finding.open_questions]
    if finding.mirror_of is not None:
        lines.append(f"  it is the mirror image of {finding.mirror_of}, which is another link here")
    others = [name for name in finding.certificates if "-is-not-" in name]
    if others:
        pattern = f"certificates/{molecule.name}-is-not-*.json"
        lines.append(f"  proofs that it is none of {len(others)} known links: {pattern}")
    shown = [name for name in finding.certificates if name not in others]
    return lines + [f"  proof: certificates/{name}" for name in shown]


def finding_to_json(finding: Finding) -> dict[str, object]:
    """One molecule for programs."""
    molecule = finding.molecule
    return {
        "name": molecule.name,
        "type": finding.link_type,
        "rings": molecule.rings,
        "vertices": molecule.vertices,
        "crossings": molecule.crossings,
        "word": format_word(molecule.woven.braid),
        "checks": list(molecule.woven.checks),
        "notes": list(molecule.woven.notes),
        "mirror_of": finding.mirror_of,
        "open": finding.open_questions,
        "certificates": finding.certificates,
    }


def classify(folder: Path) -> Classification:
    """Classify all files of rings/ and write the folder."""
    words = json.loads((HERE / "known_links.json").read_text(encoding="utf-8"))
    known_links = {name: parse_word(word) for name, word in words.items()}
    (folder / "certificates").mkdir(parents=True, exist_ok=True)
    found = Classification(folder, known_links)
    for file in sorted((HERE / "rings").iterdir()):
        found.add(file)
    (folder / "report.txt").write_text(found.report(), encoding="utf-8")
    (folder / "types.json").write_text(json.dumps(found.to_json(), indent=1), encoding="utf-8")
    return found


def main(arguments: list[str]) -> int:
    """Classify into the folder named on the command line and print the report."""
    if len(arguments) != 1:
        print("usage: python classify.py FOLDER", file=sys.stderr)
        return 2
    found = classify(Path(arguments[0]))
    print(found.report(), end="")
    return 0 if found.is_settled else 3


if __name__ == "__main__":
    sys.exit(main(sys.argv[1:]))
