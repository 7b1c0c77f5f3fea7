"""What ``draw`` says of a picture: where it is, and, for scripts, what is on it and how large."""

from __future__ import annotations

import re
from dataclasses import dataclass

from braidsearch.certificates import Certificate, braid_to_json
from braidsearch.certificates.explanation import count_of
from braidsearch.command_line.answer import one_line
from braidsearch.words import Braid

_SIZE = re.compile(r'<svg [^>]*? width="([0-9.]+)" height="([0-9.]+)"')


@dataclass(frozen=True)
class Drawn:
    """A picture with what it shows.

    ``kind`` is "braid", "closure", "proof" or "page"; ``text`` is SVG, of a page HTML. ``link`` is
    the certificate of a proof or a page, otherwise the braid; ``stages_left_out`` counts the
    braids of a proof for which the picture has no room, ``fault`` says why the verifier rejects the
    certificate. A page has no ``direction`` and no size of its own: whoever looks at it chooses.
    """

    kind: str
    text: str
    link: Braid | Certificate
    direction: str | None = None
    stages_left_out: int = 0
    fault: str = ""

    @property
    def size(self) -> tuple[float, float] | None:
        """Width and height of a picture, in the units of SVG, which browsers show as pixels."""
        found = None if self.kind == "page" else _SIZE.match(self.text)
        return None if found is None else (float(found[1]), float(found[2]))


def report_drawn(drawn: Drawn, file: str) -> str:
    """The line that says where the picture is."""
    return f"{'page' if drawn.kind == 'page' else 'picture'}: {file}"


def warnings_of(drawn: Drawn) -> str:
    """A line if the claim is not to be believed, one if the picture of a proof is not whole."""
    lines = []
    if drawn.fault:
        lines.append(one_line(f"LINK: drawn as it stands, but rejected: {drawn.fault}"))
    if drawn.stages_left_out:
        left_out = count_of(drawn.stages_left_out, "stage")
        lines.append(f"{left_out} left out: --stages all draws every one, --page plays them")
    return "\n".join(f"braidsearch draw: {line}" for line in lines)


def drawn_to_json(drawn: Drawn, file: str | None) -> dict[str, object]:
    """The picture as --json prints it: the text itself only where it went into no file."""
    width, height = drawn.size or (None, None)
    return {
        "drawn": drawn.kind,
        **_link_to_json(drawn),
        "direction": drawn.direction,
        "width": width,
        "height": height,
        "format": "html" if drawn.kind == "page" else "svg",
        "bytes": len(drawn.text.encode()) + 1,
        "file": file,
        "picture": drawn.text if file is None else None,
    }


def _link_to_json(drawn: Drawn) -> dict[str, object]:
    link = drawn.link
    if isinstance(link, Braid):
        return {
            "braid": braid_to_json(link),
            "letters": len(link),
            "components": link.components,
        }
    return {
        "left": braid_to_json(link.left),
        "right": braid_to_json(link.right),
        "verdict": link.verdict,
        "symmetry": link.symmetry,
        "valid": not drawn.fault,
        "steps": sum(map(len, link.chains)),
        "stages_left_out": drawn.stages_left_out,
    }
