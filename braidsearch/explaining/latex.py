"""An explanation as a fragment of LaTeX, for an article that loads amsmath and amsthm."""

from __future__ import annotations

import re
from collections.abc import Iterator, Sequence

from braidsearch.certificates.explanation import count_of
from braidsearch.explaining.outline import (
    ExplainedChain,
    ExplainedDistinction,
    ExplainedStep,
    Explanation,
    Letters,
    MarkedBraid,
    Phrase,
)
from braidsearch.explaining.theorems import Publication
from braidsearch.explaining.values import Exponents, Polynomials, Table
from braidsearch.words import Braid

_CLOSURES = {
    "identity": r"the closure of $\rho$",
    "mirror": r"the mirror image of the closure of $\rho$",
    "reverse": r"the reverse of the closure of $\rho$",
    "mirror-reverse": r"the reversed mirror image of the closure of $\rho$",
}
_NAMES = {
    "LEFT": r"$\lambda$",
    "RIGHT": r"$\rho$",
    "mirror of RIGHT": r"the mirror of $\rho$",
    "reverse of RIGHT": r"the reverse of $\rho$",
    "mirror-reverse of RIGHT": r"the mirror-reverse of $\rho$",
}
_SPECIAL = {
    "\\": r"\textbackslash{}",
    "~": r"\textasciitilde{}",
    **{character: "\\" + character for character in "#$%&_{}"},
    "ä": r"\"a",
    "ö": r"\"o",
    "ü": r"\"u",
    "Ä": r"\"A",
    "Ö": r"\"O",
    "Ü": r"\"U",
}
_POWER = re.compile(r"(?<![A-Za-z])([A-Za-z])\^(\(-?[0-9]+/[0-9]+\)|-?[0-9]+)")
_POLYNOMIAL = re.compile(r"-?(\d+|(\d+ )?[tvz](\^\S+)?( z(\^\S+)?)?)( [+-] .*)?")
_TERMS_A_LINE = 6


def format_latex(explanation: Explanation) -> str:
    """The claim, the proof with one item for each step, and the publications that it relies on.

    The fragment needs amsmath and amsthm and defines nothing. lambda and rho are the words LEFT
    and RIGHT; letters on which a step acts stand in brackets; lines may be broken between letters.
    """
    lines = [*_claim_lines(explanation), r"\begin{proof}"]
    if explanation.chain is not None:
        lines += _chain_lines(explanation.chain)
        goal = _NAMES[explanation.chain.goal]
        begin = "The last word" if explanation.chain.steps else r"The word $\lambda$"
        lines.append(f"{begin} is {goal}, letter by letter.")
    for distinction in explanation.distinctions:
        lines += _distinction_lines(distinction)
    lines += [r"\end{proof}", *_publication_lines(explanation)]
    return "\n".join(lines)


def latex_word(word: Letters, marks: Sequence[tuple[int, int]] = ()) -> str:
    r"""The word in sigma notation, for math mode: ``\sigma_{1}^{3}\,\allowbreak \sigma_{2}^{-1}``.

    Equal letters that stand side by side on one side of all marks are gathered into a power.
    """
    opened = {start for start, end in marks if start < end}
    closed = {end for start, end in marks if start < end}
    empty = {start for start, end in marks if start == end}
    cuts = sorted({0, len(word), *opened, *closed, *empty})
    pieces: list[str] = []
    for start, end in zip(cuts, [*cuts[1:], len(word)], strict=True):
        text = r"\,\allowbreak ".join(_powers(word[start:end]))
        text = (r"\bigl[" if start in opened else "") + text
        text += r"\bigr]" if end in closed and start < end else ""
        pieces += [r"\bigl[\,\bigr]"] * (start in empty) + [text] * (start < end)
    return r"\,\allowbreak ".join(pieces) or "1"


def latex_text(text: str) -> str:
    """Words with what LaTeX would read as commands escaped, and powers in math mode."""
    parts: list[str] = []
    at = 0
    for match in _POWER.finditer(text):
        parts.append(_escaped(text[at : match.start()]))
        exponent = match[2].strip("()")
        parts.append(f"${match[1]}^{{{exponent}}}$")
        at = match.end()
    return "".join(parts) + _escaped(text[at:])


def _escaped(text: str) -> str:
    plain = "".join(_SPECIAL.get(character, character) for character in text)
    return plain.replace("^", r"\textasciicircum{}").replace("<", "$<$").replace(">", "$>$")


def _powers(word: Letters) -> Iterator[str]:
    start = 0
    while start < len(word):
        end = start
        while end < len(word) and word[end] == word[start]:
            end += 1
        power = (end - start) * (1 if word[start] > 0 else -1)
        yield rf"\sigma_{{{abs(word[start])}}}" + ("" if power == 1 else f"^{{{power}}}")
        start = end


def _phrase(phrase: Phrase) -> str:
    return "".join(
        latex_text(part) if isinstance(part, str) else f"${latex_word(part)}$" for part in phrase
    )


def _claim_lines(explanation: Explanation) -> Iterator[str]:
    certificate = explanation.certificate
    yield r"\begin{trivlist}\item[\hskip\labelsep\textbf{Claim.}]\itshape"
    for name, braid in (("lambda", certificate.left), ("rho", certificate.right)):
        article = "Let" if name == "lambda" else "and let"
        yield f"{article} ${_definition(name, braid)}$ on {count_of(braid.strands, 'strand')}" + (
            "," if name == "lambda" else "."
        )
    if certificate.verdict == "same":
        image = _CLOSURES[str(certificate.symmetry)]
        yield rf"The closure of $\lambda$ is {image}."
    else:
        images = ", nor ".join(_CLOSURES[d.symmetry] for d in explanation.distinctions)
        yield rf"The closure of $\lambda$ is not {images}."
    yield r"\end{trivlist}"


def _definition(name: str, braid: Braid) -> str:
    return rf"\{name} = {latex_word(braid.word)}"


def _chain_lines(chain: ExplainedChain) -> Iterator[str]:
    if not chain.steps:
        return
    goal = f" to {_NAMES[chain.goal]}" if chain.goal else " to a handier braid"
    verb = "leads" if len(chain.steps) == 1 else "lead"
    count = count_of(len(chain.steps), "step")
    yield f"{count[:1].upper()}{count[1:]} {verb} from {_NAMES[chain.start]}{goal}."
    yield r"\begin{enumerate}"
    for step in chain.steps:
        yield from _step_lines(step)
    yield r"\end{enumerate}"


def _step_lines(step: ExplainedStep) -> Iterator[str]:
    yield rf"\item \emph{{{step.title[:1].upper()}{step.title[1:]}}}, {_phrase(step.detail)}:"
    yield f"  from ${_marked(step.before)}$"
    yield f"  to ${_marked(step.after)}$;"
    yield f"  {_phrase(step.reason)} [{latex_text(step.theorem.citation)}]."


def _marked(marked: MarkedBraid) -> str:
    return latex_word(marked.braid.word, marked.marks)


def _distinction_lines(distinction: ExplainedDistinction) -> Iterator[str]:
    yield rf"The closure of $\lambda$ is not {_CLOSURES[distinction.symmetry]}."
    for chain in distinction.chains:
        yield from _chain_lines(chain)
    yield f"Compare the {latex_text(distinction.title)}:"
    names = (_NAMES["LEFT"], _NAMES[distinction.right_name])
    if isinstance(distinction.comparison, Polynomials):
        yield from _polynomial_lines(distinction.comparison, names)
    else:
        yield from _table_lines(distinction.comparison, names)
    cited = "; ".join(latex_text(t.citation) for t in distinction.theorems if t.publications)
    tags = f" [{cited}]" if cited else ""
    yield f"The values differ, and are those of the oriented links{tags}: the links differ."


def _polynomial_lines(polynomials: Polynomials, names: Sequence[str]) -> Iterator[str]:
    """Both polynomials with terms of one exponent in one column, those that differ underlined."""
    terms = polynomials.terms or (((0,) * len(polynomials.variables), 0, 0),)
    for start in range(0, len(terms), _TERMS_A_LINE):
        block = terms[start : start + _TERMS_A_LINE]
        yield r"\[\begin{array}{l" + "r" * len(block) + "}"
        for side, name in enumerate(names):
            cells = [
                _term(polynomials, exponents, both[side], both[0] != both[1], start + k == 0)
                for k, (exponents, *both) in enumerate(block)
            ]
            yield rf"\text{{{name}:}} & {' & '.join(cells)} \\"
        yield r"\end{array}\]"


def _term(
    polynomials: Polynomials, exponents: Exponents, coefficient: int, differs: bool, is_first: bool
) -> str:
    if not coefficient:
        return r"\cdot"
    powers = []
    for (name, denominator), exponent in zip(polynomials.variables, exponents, strict=True):
        if exponent:
            whole = exponent % denominator == 0
            shown = str(exponent // denominator) if whole else f"{exponent}/{denominator}"
            powers.append(name if shown == "1" else f"{name}^{{{shown}}}")
    sign = "-" if coefficient < 0 else "" if is_first else "+"
    size = abs(coefficient)
    factor = "" if size == 1 and powers else str(size)
    body = " ".join(part for part in (factor, *powers) if part)
    return f"{{}}{sign} " + (rf"\underline{{{body}}}" if differs else body)


def _table_lines(table: Table, names: Sequence[str]) -> Iterator[str]:
    """A row for each entry, the values of those that differ underlined."""
    yield r"\begin{center}\begin{tabular}{p{0.5\linewidth}rr}"
    yield f"{latex_text(table.heading)} & {names[0]} & {names[1]} \\\\ \\hline"
    for entry in table.entries:
        values = [_cell(value) for value in (entry.left, entry.right)]
        if entry.differs:
            values = [rf"\underline{{{value}}}" for value in values]
        yield f"{_cell(entry.label)} & {' & '.join(values)} \\\\"
    yield r"\end{tabular}\end{center}"


def _cell(text: str) -> str:
    """A cell of a table: what is a number or a polynomial in math mode, the rest as words."""
    if not _POLYNOMIAL.fullmatch(text):
        return latex_text(text)
    powers = _POWER.sub(lambda match: f"{match[1]}^{{{match[2].strip('()')}}}", text)
    return f"${powers}$"


def _publication_lines(explanation: Explanation) -> Iterator[str]:
    found: list[Publication] = []
    for theorem in explanation.theorems:
        found += theorem.publications
    if not found:
        return
    yield r"\begin{description}"
    for publication in dict.fromkeys(found):
        yield rf"\item[{latex_text(publication.tag)}] {latex_text(str(publication))}."
    yield r"\end{description}"
