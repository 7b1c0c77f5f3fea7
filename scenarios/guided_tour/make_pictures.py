"""Draw the pictures of the README and of the tour with the tool itself.

Run: python scenarios/guided_tour/make_pictures.py [FOLDER]

Writes an SVG file for each picture into the folder (by default the one beside this file).
"""

from __future__ import annotations

import sys
from pathlib import Path

from braidsearch import Braid, compare, draw_braid, draw_closure, draw_proof

FOLDER = Path(__file__).parent / "pictures"
FOUR_STRANDS = Braid([1, -2, 3, -2, 1, 3, -2, -2, 1, 3, -2, 3])
TREFOIL, OTHER = Braid([1, 1, 1]), Braid([1, 2, 1, 2])


def make_pictures() -> dict[str, str]:
    """Every picture by the name of its file."""
    certificate = compare(TREFOIL, OTHER).certificate
    if certificate is None:
        raise RuntimeError("the two words for the trefoil were not joined")
    return {
        "braid.svg": draw_braid(FOUR_STRANDS, direction="right", has_letters=True),
        "closure.svg": draw_closure(FOUR_STRANDS),
        "proof.svg": draw_proof(certificate),
    }


def main() -> None:
    """Write the files."""
    folder = Path(sys.argv[1]) if len(sys.argv) > 1 else FOLDER
    folder.mkdir(parents=True, exist_ok=True)
    for name, picture in make_pictures().items():
        (folder / name).write_text(picture, encoding="utf-8")


if __name__ == "__main__":
    main()
