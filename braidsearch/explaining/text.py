"""An explanation as plain text, wrapped to a width, never within a letter."""

from __future__ import annotations

import textwrap
from collections.abc import Iterable, Iterator, Sequence

from braidsearch.certificates.explanation import IMAGES, count_of
from braidsearch.explaining.outline import (
    ExplainedChain,
    ExplainedDistinction,
    ExplainedStep,
    Explanation,
    MarkedBraid,
    Phrase,
)
from braidsearch.explaining.polynomial_text import polynomial_lines
from braidsearch.explaining.theorems import Theorem
from braidsearch.explaining.values import Polynomials, Table
from braidsearch.words import Braid

_ARROW = "<- differs"
NARROWEST = 40
"""Lines are never asked to be narrower than this."""


def format_text(explanation: Explanation, width: int = 100) -> str:
    """The explanation in lines of at most ``width`` characters, 40 at least.

    Letters on which a step acts stand in brackets. Only what cannot be broken, a long number in a
    value, may make a line longer.
    """
    width = max(width, NARROWEST)
    lines = [*_claim_lines(explanation, width), ""]
    if explanation.chain is not None:
        lines += _chain_lines(explanation.chain, width, "proof")
        begins = "which" if explanation.chain.steps else "proof: LEFT"
        lines += _wrap(f"{begins} is {explanation.chain.goal}, letter by letter", "", width)
    for distinction in explanation.distinctions:
        lines += _distinction_lines(distinction, width)
    if explanation.theorems:
        lines += ["", "theorems relied on:"]
    for theorem in explanation.theorems:
        lines += _theorem_lines(theorem, width)
    return "\n".join(lines)


def text_of(phrase: Phrase) -> str:
    """The phrase with its words as signed integers."""
    return "".join(part if isinstance(part, str) else " ".join(map(str, part)) for part in phrase)


def claim_text(explanation: Explanation) -> str:
    """What is claimed, in a sentence about LEFT and RIGHT."""
    certificate = explanation.certificate
    if certificate.verdict == "same":
        return f"the closure of LEFT is {IMAGES[str(certificate.symmetry)]} of RIGHT"
    images = (f"{IMAGES[item.symmetry]} of RIGHT" for item in explanation.distinctions)
    return f"the closure of LEFT is not {', nor '.join(images)}"


def _claim_lines(explanation: Explanation, width: int) -> Iterator[str]:
    certificate = explanation.certificate
    yield from _wrap(f"claim: {claim_text(explanation)}", "", width)
    for name, braid in (("LEFT", certificate.left), ("RIGHT", certificate.right)):
        size = f"({count_of(braid.strands, 'strand')}, {count_of(len(braid), 'letter')})"
        yield from _hang(f"  {name:<5} = ", [*_letters(braid), size], width)


def _chain_lines(chain: ExplainedChain, width: int, title: str) -> Iterator[str]:
    if not chain.steps:
        return
    goal = f" to {chain.goal}" if chain.goal else " to a braid that is handier to compute with"
    verb = "leads" if len(chain.steps) == 1 else "lead"
    text = f"{title}: {count_of(len(chain.steps), 'step')} {verb} from {chain.start}{goal}"
    yield from _wrap(text, "" if chain.goal else "  ", width)
    size = len(str(len(chain.steps)))
    for step in chain.steps:
        yield from _step_lines(step, size, width)


def _step_lines(step: ExplainedStep, size: int, width: int) -> Iterator[str]:
    number = f"  {step.number:>{size}}. "
    inner = " " * len(number)
    title = f"{step.title}: {text_of(step.detail)}"
    yield from _hang(number, title.split(), width)
    for name, marked in (("before", step.before), ("after", step.after)):
        yield from _hang(f"{inner}  {name + ':':<8}", marked_letters(marked), width)
    reason = f"allowed: {text_of(step.reason)} [{step.theorem.citation}]"
    yield from _wrap(reason, inner + "  ", width)


def marked_letters(marked: MarkedBraid) -> list[str]:
    """The letters as words of text, brackets at those that are marked; ``[]`` where none is."""
    letters = [str(letter) for letter in marked.braid.word]
    for start, end in reversed(marked.marks):
        if start == end:
            letters.insert(start, "[]")
        else:
            letters[start] = "[" + letters[start]
            letters[end - 1] += "]"
    return letters or ["(empty)"]


def _letters(braid: Braid) -> list[str]:
    return [str(letter) for letter in braid.word] or ["(empty)"]


def _distinction_lines(distinction: ExplainedDistinction, width: int) -> Iterator[str]:
    image = IMAGES[distinction.symmetry]
    yield from _wrap(f"proof that the closure of LEFT is not {image} of RIGHT", "", width)
    for chain in distinction.chains:
        yield from _chain_lines(chain, width, f"on {chain.start}")
    yield from _wrap(f"by the {distinction.title}:", "  ", width)
    names = ("LEFT", distinction.right_name)
    if isinstance(distinction.comparison, Polynomials):
        yield from polynomial_lines(distinction.comparison, names, "    ", width)
    else:
        yield from _table_lines(distinction.comparison, names, width)
    cited = "; ".join(t.citation for t in distinction.theorems if t.publications)
    tags = f" [{cited}]" if cited else ""
    text = f"The values differ, and are those of the oriented links{tags}: the links differ."
    yield from _wrap(text, "  ", width)


def _table_lines(table: Table, names: Sequence[str], width: int) -> Iterator[str]:
    """A row for each entry, an arrow behind those that differ; three lines where it is wide."""
    rows = [(table.heading, *names)]
    rows += [(entry.label, entry.left, entry.right) for entry in table.entries]
    marks = ["", *(_ARROW if entry.differs else "" for entry in table.entries)]
    sizes = [max(len(row[column]) for row in rows) for column in range(3)]
    if 4 + sum(sizes) + 6 + len(_ARROW) <= width:
        for (label, left, right), mark in zip(rows, marks, strict=True):
            cells = f"{left:>{sizes[1]}}  {right:>{sizes[2]}}  {mark}"
            yield f"    {label:<{sizes[0]}}  {cells}".rstrip()
        return
    for (label, *values), mark in zip(rows[1:], marks[1:], strict=True):
        head = f"{table.heading} {label}".strip()
        yield from _wrap(f"{head}: {mark}".rstrip(), "    ", width)
        for name, value in zip(names, values, strict=True):
            yield from _wrap(f"{name}: {value}", "      ", width)


def _theorem_lines(theorem: Theorem, width: int) -> Iterator[str]:
    yield from _hang("  - ", theorem.statement.split(), width)
    for publication in theorem.publications:
        yield from _hang("    ", f"{publication.tag}: {publication}.".split(), width)


def _wrap(text: str, indent: str, width: int) -> list[str]:
    return textwrap.wrap(
        text,
        width,
        initial_indent=indent,
        subsequent_indent=indent + "  ",
        break_long_words=False,
        break_on_hyphens=False,
    )


def _hang(head: str, words: Iterable[str], width: int) -> Iterator[str]:
    """Words behind a head, further lines below the first word; no word is ever cut."""
    line, is_bare = head, True
    for word in words:
        if not is_bare and len(line) + 1 + len(word) > width:
            yield line
            line, is_bare = " " * len(head), True
        line += word if is_bare else " " + word
        is_bare = False
    yield line
