"""Explanations as LaTeX: well formed, whole, and read back as the words that they show."""

import re
import shutil
import subprocess
from pathlib import Path

import pytest
from hypothesis import given
from hypothesis import strategies as st

from braidsearch.certificates import Certificate
from braidsearch.explaining import explain_proof, format_latex
from braidsearch.explaining.latex import latex_text, latex_word
from braidsearch.words import Braid
from tests.certificates.arbitrary import certificates
from tests.explaining.latex_checking import check_latex
from tests.explaining.reading import ACCEPTED, accepted, chains, without_moves
from tests.strategies import braids

_LETTER = re.compile(r"\\sigma_\{(\d+)\}(?:\^\{(-?\d+)\})?")


def read_word(latex: str) -> tuple[int, ...]:
    """The braid word that stands in sigma notation."""
    letters: list[int] = []
    for index, power in _LETTER.findall(latex):
        exponent = int(power or "1")
        letters += [int(index) if exponent > 0 else -int(index)] * abs(exponent)
    return tuple(letters)


@given(braids(), st.integers(0, 20), st.integers(0, 20))
def test_words_are_read_back(braid: Braid, one: int, other: int) -> None:
    """Whatever part is marked, the letters are all there, and the marked ones in brackets."""
    start, end = sorted((min(one, len(braid)), min(other, len(braid))))
    shown = latex_word(braid.word, [(start, end)])
    assert read_word(shown) == braid.word
    marked = shown.partition(r"\bigl[")[2].partition(r"\bigr]")[0]
    assert read_word(marked) == braid.word[start:end]
    check_latex(f"${shown}$")


@given(st.text(alphabet="ab tvz123^-+()/_%&#${}~\\<>|:.öÜ", max_size=30))
def test_any_text_is_escaped(text: str) -> None:
    """No character of a text is left to be a command."""
    check_latex(latex_text(text))


@pytest.mark.parametrize("name", ACCEPTED)
@pytest.mark.parametrize("is_elementary", [False, True])
def test_accepted_certificates_are_well_formed(name: str, is_elementary: bool) -> None:
    """Braces and environments pair up, and each item shows the words before and after it."""
    explanation = explain_proof(accepted(name), is_elementary)
    text = format_latex(explanation)
    check_latex(text)
    shown = [read_word(line) for line in text.splitlines() if line.startswith("  to $")]
    expected = [move.word for _, moves in chains(explanation.certificate) for move in moves]
    assert shown == expected


@given(certificates.map(without_moves))
def test_whatever_can_be_read_is_well_formed(certificate: Certificate) -> None:
    """No value of an invariant breaks the fragment."""
    check_latex(format_latex(explain_proof(certificate)))


@pytest.mark.parametrize(
    "text", [r"\begin{proof}", r"\end{proof}", "{", "$x", "x_1", r"\foo", "$a & b$", "ü", "50%"]
)
def test_the_checker_notices(text: str) -> None:
    """A fragment that does not compile is not called well formed."""
    with pytest.raises((AssertionError, IndexError)):
        check_latex(text)


@pytest.mark.skipif(shutil.which("pdflatex") is None, reason="pdflatex is not installed")
def test_a_fragment_compiles(tmp_path: Path) -> None:
    """A plain article with amsmath and amsthm takes all fragments, one after the other."""
    body = "\n\n".join(
        format_latex(explain_proof(accepted(name), is_elementary))
        for name in ACCEPTED
        for is_elementary in (False, True)
    )
    head = "\\documentclass{article}\n\\usepackage{amsmath,amsthm}\n\\begin{document}\n"
    (tmp_path / "article.tex").write_text(head + body + "\n\\end{document}\n", encoding="ascii")
    finished = subprocess.run(
        ["pdflatex", "-halt-on-error", "-interaction=nonstopmode", "article.tex"],
        cwd=tmp_path,
        capture_output=True,
        check=False,
        timeout=120,
    )
    assert finished.returncode == 0, finished.stdout[-2000:]
