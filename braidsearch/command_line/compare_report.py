"""The report of compare for people: the outcome first, then why, then how to check or go on."""

from __future__ import annotations

import shlex
from typing import TYPE_CHECKING

from braidsearch.certificates.explanation import IMAGES, explain_certificate
from braidsearch.words import Braid, format_word

if TYPE_CHECKING:
    from braidsearch.search.verdict import Verdict

_MOST_MOVES = 12
_LONGEST_BOUND_WORD = 60


def report_verdict(verdict: Verdict, left: Braid, right: Braid, output: str | None) -> str:
    """The report; ``output`` is where the certificate went (None: nowhere, "-": printed)."""
    lines = [headline(verdict), f"reason: {verdict.reason}"]
    if verdict.certificate is None:
        return "\n".join(lines + _tell_tried(verdict) + _tell_missing(output))
    lines.append(explain_certificate(verdict.certificate, most_moves=_MOST_MOVES))
    if verdict.image is not None:
        lines.append(f"symmetric image: --up-to {verdict.image.symmetry} gives its certificate")
    return "\n".join(lines + _tell_check(left, right, output))


def headline(verdict: Verdict) -> str:
    """The verdict, a colon, and what it says of LEFT and RIGHT."""
    if verdict.outcome == "same":
        image = IMAGES[verdict.symmetry or "identity"]
        if verdict.symmetry in (None, "identity"):
            return "same link: LEFT and RIGHT close to the same oriented link"
        return f"same link up to symmetry: the closure of LEFT is {image} of RIGHT"
    if verdict.outcome == "different":
        certificate = verdict.certificate
        asked = [d.symmetry for d in certificate.distinctions] if certificate else []
        beside = [symmetry for symmetry in asked if symmetry != "identity"]
        up_to = f", also up to {', '.join(beside)}" if beside else ""
        return f"different links: LEFT and RIGHT close to different oriented links{up_to}"
    return "undecided: neither sameness nor difference was proven (undecided is not different)"


def _tell_tried(verdict: Verdict) -> list[str]:
    explored = verdict.explored
    nodes, seconds, ending = explored["nodes"], explored["seconds"], explored["ending"]
    lines = [f"explored: {nodes} conjugacy classes in {seconds:.1f} s, ending: {ending}"]
    for title, items in (("tried:", explored["tried"]), ("to go on:", verdict.suggestions)):
        lines += [title, *(f"  - {item}" for item in items)] if items else []
    return lines


def _tell_missing(output: str | None) -> list[str]:
    if output is None:
        return ["certificate: none"]
    return [f"certificate: none, so {shlex.quote(output)} was not written"]


def _tell_check(left: Braid, right: Braid, output: str | None) -> list[str]:
    if output == "-":
        return ["certificate: on standard output", "check it: braidsearch verify FILE"]
    if output is None:
        return ["certificate: not written (add -o FILE; then: braidsearch verify FILE)"]
    file = shlex.quote(output)
    bound = "".join(f' {flag} "{word}"' for flag, word in bound_words(left, right))
    return [f"certificate: {file}", f"check it: braidsearch verify {file}{bound}"]


def bound_words(left: Braid, right: Braid) -> list[tuple[str, str]]:
    """The options of verify that bind a claim to these braids; none where they would be long."""
    options = [("--left", format_word(left)), ("--right", format_word(right))]
    length = sum(len(flag) + len(word) + 4 for flag, word in options)
    return options if length <= _LONGEST_BOUND_WORD else []
