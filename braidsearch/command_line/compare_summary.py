"""The report of compare on a terminal: verdict, evidence in a few lines, what to type next.

It is short where the plain report is complete; ``braidsearch explain`` shows the rest of a proof.
"""

from __future__ import annotations

import re
import shlex
from collections.abc import Iterator, Mapping, Sequence
from typing import TYPE_CHECKING, Any

from braidsearch.certificates.display import VARIABLES, show_value
from braidsearch.certificates.explanation import count_of, describe_invariant, explain_move
from braidsearch.command_line.compare_report import headline
from braidsearch.command_line.compare_steps import Question, next_steps
from braidsearch.command_line.terminal import (
    Terminal,
    cut_pieces,
    cut_text,
    read_terminal,
    wrap_text,
)

if TYPE_CHECKING:
    from braidsearch.certificates import Certificate, Distinction
    from braidsearch.search.verdict import Verdict

_MOST_TRIED = 4
_LONGEST_TITLE = 60
_TERMS = re.compile(r" (?=[+-] )")


def summarize_verdict(
    verdict: Verdict, question: Question, terminal: Terminal | None = None
) -> str:
    """The report in lines that fit the terminal: by default the one that standard output is."""
    terminal = terminal or read_terminal()
    title, _, sentence = headline(verdict).partition(": ")
    lines = terminal.headline(verdict.outcome, title, sentence)
    lines += ["", *wrap_text(verdict.reason, terminal.text_columns, "  ", "  ")]
    lines += [*_evidence(verdict, terminal), ""]
    lines += terminal.item("certificate", _whereabouts(verdict, question.given.output))
    return "\n".join(lines + next_steps(verdict, question, terminal))


def _whereabouts(verdict: Verdict, output: str | None) -> str:
    if verdict.certificate is not None:
        return "not written" if output is None else shlex.quote(output)
    return "none" if output is None else f"none, so {shlex.quote(output)} was not written"


def _evidence(verdict: Verdict, terminal: Terminal) -> list[str]:
    certificate = verdict.certificate
    if certificate is None:
        return list(_iter_tried(verdict.explored, terminal))
    if certificate.verdict == "same":
        return list(_iter_ends(certificate, terminal))
    return list(_iter_differences(certificate.distinctions, terminal))


def _iter_ends(certificate: Certificate, terminal: Terminal) -> Iterator[str]:
    """The first and the last move, a line each."""
    count = len(certificate.moves)
    for number in sorted({1, count}) if count else ():
        text = f"{number:>{len(str(count))}}. {explain_move(certificate.moves[number - 1])}"
        yield "    " + cut_text(text, terminal.columns - 4)


def _iter_differences(distinctions: Sequence[Distinction], terminal: Terminal) -> Iterator[str]:
    """Both values for the identity, which is asked first; for the others the invariant alone.

    Which invariant tells which image apart is said where it is not the same for all.
    """
    groups: dict[str, list[str]] = {}
    for distinction in distinctions:
        of = "RIGHT" if distinction.symmetry == "identity" else f"its {distinction.symmetry}"
        groups.setdefault(_short_title(distinction), []).append(of)
    for place, (title, images) in enumerate(groups.items()):
        if len(groups) > 1:
            text = f"from {' and '.join(images)}: {title}"
            yield from wrap_text(text, terminal.text_columns, "  ", "    ")
        if place == 0:
            yield from _iter_sides(distinctions[0], terminal)


def _short_title(distinction: Distinction) -> str:
    """The invariant in words; without the parameters where they are long, as groups are."""
    from braidsearch.invariants import TITLES  # noqa: PLC0415 - not for proofs of sameness

    title = describe_invariant(distinction)
    name = distinction.invariant
    return title if len(title) <= _LONGEST_TITLE else TITLES.get(name, name)


def _iter_sides(distinction: Distinction, terminal: Terminal) -> Iterator[str]:
    """Both values, one under the other, cut to the width such that the difference is seen."""
    values = show_difference(distinction, terminal.columns - len("    RIGHT: "))
    if values[0] == values[1]:  # both are cut long before they differ
        text = "the values are long, and begin alike: the certificate has them whole"
        yield from wrap_text(text, terminal.text_columns, "    ", "    ")
        return
    yield f"    LEFT:  {values[0]}"
    yield f"    RIGHT: {values[1]}"


def show_difference(distinction: Distinction, columns: int) -> tuple[str, str]:
    """Both values in so many columns: the part that holds the first difference.

    What the values share in front is left out as far as it must be, in both alike, so that what
    stands one under the other may be compared.
    """
    left, right = _show_sides(distinction)
    is_sum = distinction.invariant in VARIABLES
    one, other = (_TERMS.split(text) if is_sum else text.split(" ") for text in (left, right))
    shared = 0
    while shared < min(len(one), len(other)) and one[shared] == other[shared]:
        shared += 1
    room = columns - 8  # dots and a blank on both sides
    start = 0
    while start < shared and any(
        len(" ".join(side[start : shared + 1])) > room for side in (one, other)
    ):
        start += 1
    if max(len(left), len(right)) <= columns:
        start = 0
    return cut_pieces(one, columns, start), cut_pieces(other, columns, start)


def _show_sides(distinction: Distinction) -> tuple[str, str]:
    """Both values in words; of polynomials that are long and begin alike, what comes after that."""
    name, parameters = distinction.invariant, dict(distinction.parameters)
    left: Any = distinction.left
    right: Any = distinction.right
    texts = show_value(name, left, parameters), show_value(name, right, parameters)
    if texts[0] != texts[1] or name not in VARIABLES:
        return texts
    shared = 0
    while left[shared : shared + 1] == right[shared : shared + 1]:
        shared += 1
    one, other = (show_value(name, value[shared:], parameters) for value in (left, right))
    return f"{count_of(shared, 'equal term')}, {one}", f"{count_of(shared, 'equal term')}, {other}"


def _iter_tried(explored: Mapping[str, Any], terminal: Terminal) -> Iterator[str]:
    """What was tried in short: how much of the limits, which values agreed, what was searched."""
    nodes = explored["nodes"]
    classes = "conjugacy class" if nodes == 1 else "conjugacy classes"
    spent = f"explored: {nodes} {classes} in {explored['seconds']:.1f} s"
    yield from wrap_text(spent, terminal.text_columns, "    ", "      ")
    items = _gathered(explored["tried"])
    for item in items[:_MOST_TRIED]:
        first, *others = wrap_text(item, terminal.text_columns, "    ", "      ")
        yield first
        if others:
            yield "      " + cut_text(" ".join(map(str.strip, others)), terminal.text_columns - 6)
    if len(items) > _MOST_TRIED:
        yield f"    and {len(items) - _MOST_TRIED} more"


def _gathered(tried: Sequence[str]) -> list[str]:
    """What was tried, the symmetries with one result on one line.

    "equal invariants, mirror: jones" and the like have a symmetry between comma and colon; where no
    other than the identity was asked for, nobody needs it.
    """
    groups: dict[tuple[str, str], list[str]] = {}
    for item in tried:
        kind, comma, rest = item.partition(", ")
        symmetry, colon, result = rest.partition(": ")
        groups.setdefault((kind + comma, colon + result), []).append(symmetry)
    return [
        kind.removesuffix(", ") + result
        if names == ["identity"]
        else f"{kind}{', '.join(names)}{result}"
        for (kind, result), names in groups.items()
    ]
