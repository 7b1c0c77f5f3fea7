"""Every certificate that the scenarios write is explained, and accepted in elementary steps."""

import subprocess
import sys
from pathlib import Path

import pytest

from braidsearch import verify
from braidsearch.certificates import read_certificate
from braidsearch.explaining import expand_certificate, explain_proof, format_latex, format_text
from tests.command_line.running import environment
from tests.explaining.latex_checking import check_latex
from tests.explaining.reading import check_steps

SCENARIOS = Path(__file__).parents[2] / "scenarios"


@pytest.mark.parametrize("script", ["merge_ring_lists/merge.py", "classify_rings/classify.py"])
def test_certificates_of_scenarios(script: str, tmp_path: Path) -> None:
    """The script is run as its users run it; nothing that it writes is left out."""
    subprocess.run(
        [sys.executable, str(SCENARIOS / script), str(tmp_path / "out")],
        capture_output=True,
        check=False,  # a pair may stay open
        timeout=300,
        env=environment(),
    )
    files = sorted((tmp_path / "out" / "certificates").glob("*.json"))
    assert len(files) > 20
    for file in files:
        certificate = read_certificate(file)
        expansion = expand_certificate(certificate)
        check_steps(expansion)
        left, right = certificate.left, certificate.right
        assert verify(expansion.certificate, left=left, right=right).valid, file.name
        for is_elementary in (False, True):
            explanation = explain_proof(certificate, is_elementary)
            assert format_text(explanation).startswith("claim: ")
            check_latex(format_latex(explanation))
