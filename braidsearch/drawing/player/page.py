"""The page of a proof: one HTML file that needs nothing else, not even a network."""

from __future__ import annotations

import base64
import hashlib
import json
from collections.abc import Iterator, Sequence
from html import escape
from importlib.resources import files
from typing import Any

from braidsearch.certificates import Certificate, Distinction
from braidsearch.certificates.display import show_value
from braidsearch.certificates.explanation import (
    IMAGES,
    count_of,
    describe_invariant,
    explain_move,
    shown_braid,
)
from braidsearch.drawing.player.scenes import REASONS, page_measures, page_scenes
from braidsearch.drawing.proof_sheets import draw_proof
from braidsearch.drawing.value_markup import value_markup
from braidsearch.moves import Move

SCRIPTS = (
    "curves.js",
    "layout.js",
    "strands.js",
    "drawing.js",
    "motion.js",
    "timeline.js",
    "picture.js",
    "lane_view.js",
    "words.js",
    "player.js",
)
"""The parts of the page's one script, in the order in which they need each other."""

STILL_STAGES, STILL_CROSSINGS = 24, 1_500
"""About how much the sheet shows those who look without scripts: the page is to stay small."""


def draw_proof_page(certificate: Certificate) -> str:
    """The page of a certificate, as one HTML file: the proof as moving pictures, and in words.

    Nothing is fetched: styles, script and the proof itself stand inside, and the page's own policy
    forbids everything else. With scripts off there are the claim, all steps in words, and a still
    sheet of the proof. Whether the claim holds is not checked here. Raises InputError where a
    move of the certificate states what is no braid. The text is ASCII, so that it means the same in
    every encoding.
    """
    proof = {"scenes": page_scenes(certificate), "reasons": REASONS}
    style, script = _resource("page.css"), _script()
    title = "Two closed braids, one link"
    if certificate.verdict == "different":
        title = "Two closed braids, different links"
    parts = [
        "<!doctype html>",
        '<html lang="en">',
        "<head>",
        '<meta charset="utf-8">',
        f'<meta http-equiv="Content-Security-Policy" content="{_policy(style, script)}">',
        '<meta name="viewport" content="width=device-width, initial-scale=1">',
        f"<title>{title}</title>",
        f"<style>{style}</style>",
        "</head>",
        "<body>",
        f'<header><h1>{title}</h1>\n<p class="claim">{_claim(certificate)}</p></header>',
        _resource("player.html"),
        *_evidence(certificate),
        *_all_steps(certificate),
        f'<noscript><section class="all"><h2>The proof, drawn</h2>\n<div class="sheet">'
        f"{_still_sheet(certificate)}</div></section></noscript>",
        _footer(certificate),
        f'<script type="application/json" id="measures">{_json(page_measures())}</script>',
        f'<script type="application/json" id="proof">{_json(proof)}</script>',
        f"<script>{script}</script>",
        "</body>",
        "</html>",
    ]
    text = "\n".join(parts) + "\n"
    return text.encode("ascii", "xmlcharrefreplace").decode("ascii")


def _resource(name: str) -> str:
    folder = files("braidsearch.drawing.player") / "page"
    return (folder / name).read_text(encoding="utf-8").strip()


def _script() -> str:
    """All parts within one function, so that the page has no names of its own to collide with."""
    head = (
        '"use strict";\n(() => {\n'
        "const readJson = (id) => JSON.parse(document.getElementById(id).textContent);\n"
        'const M = readJson("measures"), PROOF = readJson("proof");\n'
    )
    return head + "\n".join(_resource(name) for name in SCRIPTS) + "\n})();"


def _policy(style: str, script: str) -> str:
    def digest(text: str) -> str:
        return base64.b64encode(hashlib.sha256(text.encode()).digest()).decode()

    return (
        f"default-src 'none'; style-src 'sha256-{digest(style)}'; "
        f"script-src 'sha256-{digest(script)}'; base-uri 'none'; form-action 'none'"
    )


def _json(value: Any) -> str:
    """The value as JSON that no HTML parser can take for the end of its element."""
    return json.dumps(value, separators=(",", ":")).replace("<", "\\u003c")


def _claim(certificate: Certificate) -> str:
    left, right = (
        f'{name} = <span class="word">{escape(shown_braid(braid).strip(chr(34)))}</span>'
        for name, braid in (("LEFT", certificate.left), ("RIGHT", certificate.right))
    )
    if certificate.verdict == "same":
        image = IMAGES[str(certificate.symmetry)]
        return f"The closure of {left} is {image} of {right}."
    images = ", nor ".join(f"{IMAGES[each.symmetry]}" for each in certificate.distinctions)
    return f"The closure of {left} is not {images} of {right}."


def _evidence(certificate: Certificate) -> Iterator[str]:
    """For each distinction the invariant and both values; the page shows the one of its scene."""
    for distinction in certificate.distinctions:
        of = "" if distinction.symmetry == "identity" else f"{distinction.symmetry} of "
        rows = "\n".join(
            f'<tr><th scope="row">{name}</th>'
            f'<td class="value">{_value(distinction, value)}</td></tr>'
            for name, value in (("LEFT", distinction.left), (f"{of}RIGHT", distinction.right))
        )
        yield (
            f'<section class="evidence"><h2>Not {IMAGES[distinction.symmetry]} of RIGHT, by the '
            f"{escape(describe_invariant(distinction))}</h2>\n<table>{rows}</table></section>"
        )


def _value(distinction: Distinction, value: Any) -> str:
    return value_markup(show_value(distinction.invariant, value, dict(distinction.parameters)))


def _all_steps(certificate: Certificate) -> Iterator[str]:
    """Every step as an item of a list, from which the page takes its words."""
    chains: list[tuple[str, Sequence[Move]]] = [("", certificate.moves)]
    for distinction in certificate.distinctions:
        chains += [("On LEFT", distinction.left_moves), ("On RIGHT", distinction.right_moves)]
    count = sum(len(moves) for _, moves in chains)
    if not count:
        return
    yield f'<details class="all"><summary>All {count_of(count, "step")} as a list</summary>'
    for name, moves in chains:
        if moves:
            yield (f"<h2>{name}</h2>\n" if name else "") + "<ol>"
            yield from (f'<li class="step">{_step_text(move)}</li>' for move in moves)
            yield "</ol>"
    yield "</details>"


def _step_text(move: Move) -> str:
    text, _, word = explain_move(move).rpartition(": ")
    return f'{escape(text[0].upper() + text[1:])}: <span class="word">{escape(word)}</span>'


def _still_sheet(certificate: Certificate) -> str:
    longest = max(len(certificate.left), *(len(move.word) for move in certificate.moves), 1)
    stages = min(STILL_STAGES, max(2, STILL_CROSSINGS // longest))
    sheet = draw_proof(certificate, most_stages=stages)
    return sheet.replace(' style="max-width:100%;height:auto"', "", 1)  # the page's style has it


def _footer(certificate: Certificate) -> str:
    basis = (
        "Each step is a move that keeps the link (Markov, 1935; Birman, Braids, links and mapping "
        "class groups, 1974)."
        if certificate.verdict == "same"
        else "The values are invariants of oriented links, so links with different values differ."
    )
    return (
        f"<footer><p>{basis} At a positive letter the strand that comes from the higher position "
        "passes over. This page shows a proof and does not check it: "
        "<code>braidsearch verify</code> replays the certificate.</p></footer>"
    )
