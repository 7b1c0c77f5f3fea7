"""What verdicts, certificates and distinctions show of themselves in a notebook."""

from __future__ import annotations

import re
from collections.abc import Iterator, Sequence
from html import escape
from typing import TYPE_CHECKING, Any

from braidsearch.certificates import Certificate, Distinction
from braidsearch.certificates.display import VARIABLES, show_value
from braidsearch.certificates.explanation import (
    IMAGES,
    count_of,
    describe_invariant,
    explain_move,
    shown_braid,
)
from braidsearch.drawing.braid_pictures import draw_closure
from braidsearch.drawing.value_markup import value_markup
from braidsearch.moves import Move
from braidsearch.words import Braid

if TYPE_CHECKING:
    from braidsearch.search.verdict import Verdict

MOST_CROSSINGS, MOST_STRANDS = 60, 12
"""Larger closures are not drawn: they would fill the notebook."""

MOST_MOVES = 12

_TITLES = {
    "same": "Same link",
    "different": "Different links",
    "undecided": "Undecided: neither sameness nor difference was proven",
}
_FRAME = "max-width:52em;line-height:1.45"
_WORD = "font-family:ui-monospace,Menlo,Consolas,monospace"
_BESIDE = "display:flex;flex-wrap:wrap;gap:1em;align-items:flex-end;margin:.6em 0"


def certificate_html(certificate: Certificate) -> str:
    """The claim with the pictures of both closures, and the proof in words, as HTML.

    Of a long chain the middle is left out, and said to be. Whether the claim holds is not checked.
    """
    return _framed(_TITLES[certificate.verdict], _iter_certificate(certificate))


def verdict_html(verdict: Verdict) -> str:
    """The outcome with its reason; what proves it, or what was tried and how to go on."""
    return _framed(_TITLES[verdict.outcome], _iter_verdict(verdict))


def distinction_latex(distinction: Distinction) -> str | None:
    """Both polynomials with the sign between them, in display style; None for other invariants."""
    if distinction.invariant not in VARIABLES:
        return None
    left, right = (
        polynomial_latex(distinction.invariant, value)
        for value in (distinction.left, distinction.right)
    )
    return rf"$\displaystyle {left} \;\neq\; {right}$"


def polynomial_latex(invariant: str, value: Any) -> str:
    """A polynomial, as a certificate holds it, in LaTeX without dollar signs."""
    text = show_value(invariant, value)
    return re.sub(r"\^(?:\(([^)]*)\)|(-?\d+))", lambda power: f"^{{{power[1] or power[2]}}}", text)


def _framed(title: str, parts: Iterator[str]) -> str:
    head = f'<div style="{_FRAME}"><p style="margin:.2em 0"><strong>{title}</strong></p>'
    return "\n".join([head, *parts, "</div>"])


def _iter_verdict(verdict: Verdict) -> Iterator[str]:
    yield _paragraph(escape(_sentence(verdict.reason)))
    if verdict.certificate is not None:
        yield from _iter_certificate(verdict.certificate)
    if verdict.suggestions:
        items = "".join(f"<li>{escape(each)}</li>" for each in verdict.suggestions)
        yield f'<ul style="margin:.3em 0">{items}</ul>'
    if verdict.image is not None:
        image = IMAGES[str(verdict.image.symmetry)]
        yield _paragraph(
            f"Not asked, but proven by the certificate <code>image</code> of this verdict: the "
            f"closure of LEFT is {image} of RIGHT."
        )


def _iter_certificate(certificate: Certificate) -> Iterator[str]:
    left, right = _named("LEFT", certificate.left), _named("RIGHT", certificate.right)
    if certificate.verdict == "same":
        yield _paragraph(
            f"The closure of {left} is {IMAGES[str(certificate.symmetry)]} of {right}."
        )
    else:
        images = ", nor ".join(IMAGES[each.symmetry] for each in certificate.distinctions)
        yield _paragraph(f"The closure of {left} is not {images} of {right}.")
    yield from _iter_pictures(certificate)
    if certificate.verdict == "same":
        yield from _iter_chain("LEFT", certificate.moves)
        of = "" if certificate.symmetry == "identity" else f"the {certificate.symmetry} of "
        yield _paragraph(
            f"{'This' if certificate.moves else 'LEFT'} is {of}RIGHT, letter by letter."
        )
    for distinction in certificate.distinctions:
        yield from _iter_distinction(distinction)


def _iter_distinction(distinction: Distinction) -> Iterator[str]:
    for name, moves in (("LEFT", distinction.left_moves), ("RIGHT", distinction.right_moves)):
        yield from _iter_chain(name, moves)
    image = IMAGES[distinction.symmetry]
    yield _paragraph(f"Not {image} of RIGHT, by the {escape(describe_invariant(distinction))}:")
    of = "" if distinction.symmetry == "identity" else f"{distinction.symmetry} of "
    rows = "".join(
        f'<tr><th scope="row" style="text-align:left">{name}</th>'
        f'<td style="text-align:left">{_value(distinction, value)}</td></tr>'
        for name, value in (("LEFT", distinction.left), (f"{of}RIGHT", distinction.right))
    )
    yield f'<table style="margin:.3em 0">{rows}</table>'


def _value(distinction: Distinction, value: Any) -> str:
    return value_markup(show_value(distinction.invariant, value, dict(distinction.parameters)))


def _iter_pictures(certificate: Certificate) -> Iterator[str]:
    braids = {"LEFT": certificate.left, "RIGHT": certificate.right}
    drawn = {name: braid for name, braid in braids.items() if _is_drawn(braid)}
    if drawn:
        pictures = "".join(
            f'<figure style="margin:0">{draw_closure(braid)}'
            f"<figcaption>{name}</figcaption></figure>"
            for name, braid in drawn.items()
        )
        yield f'<div style="{_BESIDE}">{pictures}</div>'


def _is_drawn(braid: Braid) -> bool:
    return len(braid) <= MOST_CROSSINGS and braid.strands <= MOST_STRANDS


def _iter_chain(name: str, moves: Sequence[Move]) -> Iterator[str]:
    """The moves as a numbered list; of a long one the first and the last of them."""
    if not moves:
        return
    yield _paragraph(f"{count_of(len(moves), 'move')} from {name}:")
    head, tail = len(moves), 0
    if len(moves) > MOST_MOVES:
        head, tail = MOST_MOVES - MOST_MOVES // 3, MOST_MOVES // 3
    yield '<ol style="margin:.3em 0">'
    yield from map(_item, moves[:head])
    if tail:
        yield "</ol>"
        yield _paragraph(f"{len(moves) - head - tail} more moves stand in the certificate.")
        yield f'<ol start="{len(moves) - tail + 1}" style="margin:.3em 0">'
        yield from map(_item, moves[-tail:])
    yield "</ol>"


def _item(move: Move) -> str:
    text, _, word = explain_move(move).rpartition(": ")
    return f'<li>{escape(_sentence(text))}: <span style="{_WORD}">{escape(word)}</span></li>'


def _named(name: str, braid: Braid) -> str:
    word = shown_braid(braid).strip('"')
    return f'{name} = <span style="{_WORD}">{escape(word)}</span>'


def _paragraph(content: str) -> str:
    return f'<p style="margin:.3em 0">{content}</p>'


def _sentence(text: str) -> str:
    return text[:1].upper() + text[1:]
