"""Every certificate of the scenarios, and under tests/, is explained and drawn by the commands."""

import subprocess
import sys
from pathlib import Path

import pytest

from braidsearch.certificates import parse_certificate
from braidsearch.errors import InputError
from tests.command_line.readme_examples import TOUR, console_blocks, run_blocks
from tests.command_line.running import Runner, environment
from tests.explaining.showing import check_shown, iter_certificate_files

TESTS = Path(__file__).parents[1]
SCENARIOS = TESTS.parent / "scenarios"


@pytest.fixture
def run(capsys: pytest.CaptureFixture[str]) -> Runner:
    """Runs a command line in this process."""
    return Runner(capsys)


@pytest.mark.parametrize(
    ("script", "fewest"),
    [
        ("merge_ring_lists/merge.py", 60),
        ("classify_rings/classify.py", 40),
        ("merge_catalogues/merge.py", 100),
    ],
)
def test_certificates_of_scenarios(script: str, fewest: int, run: Runner, tmp_path: Path) -> None:
    """The script is run as its users run it; nothing that it writes is left out."""
    subprocess.run(
        [sys.executable, str(SCENARIOS / script), str(tmp_path / "out")],
        capture_output=True,
        check=False,  # a pair may stay open
        timeout=600,
        env=environment(),
    )
    files = list(iter_certificate_files(tmp_path / "out"))
    assert len(files) >= fewest
    assert sum(check_shown(run, file, tmp_path) for file in files) > 0


def test_certificates_of_the_tour(run: Runner, tmp_path: Path) -> None:
    """The commands of the guided tour write certificates too."""
    run_blocks(console_blocks(TOUR.read_text(encoding="utf-8")), tmp_path)
    files = list(iter_certificate_files(tmp_path))
    assert {file.name for file in files} >= {"proof.json", "small_steps.json"}
    for file in files:
        assert check_shown(run, file, tmp_path) >= 0


def test_every_scenario_is_looked_at() -> None:
    """A scenario that is added is added here."""
    folders = {path.name for path in SCENARIOS.iterdir() if (path / "README.md").is_file()}
    assert folders == {"merge_ring_lists", "classify_rings", "merge_catalogues", "guided_tour"}


FILES = {str(file.relative_to(TESTS)): file for file in iter_certificate_files(TESTS)}
VALID = [name for name in FILES if not name.startswith(("verifier/rejected", "verifier/malformed"))]


@pytest.mark.parametrize("name", VALID)
def test_valid_certificates_among_the_tests(name: str, run: Runner, tmp_path: Path) -> None:
    """Whatever file under tests/ is not there to be refused, wherever it lies."""
    assert check_shown(run, FILES[name], tmp_path) >= 0


def test_other_certificates_among_the_tests(run: Runner) -> None:
    """What is not valid is not explained; it is drawn as it stands, or refused in one line, which
    is for whoever looks for the mistake in it.
    """
    others = [file for name, file in FILES.items() if name not in VALID]
    assert len(others) > 100
    drawn = 0
    for file in others:
        try:
            parse_certificate(file.read_text(encoding="utf-8"))
        except InputError:
            run.fail("explain", str(file))
            run.fail("draw", "--proof", str(file))
            run.fail("draw", "--proof", str(file), "--page")
            continue
        outcome = run("explain", str(file))
        assert (outcome.status, outcome.output) == (1, "")
        sheet, page = run("draw", str(file)), run("draw", str(file), "--page")
        assert (sheet.status, sheet.errors.count("\n")) == (0, 1)
        assert "rejected: " in sheet.errors
        assert page.status in (0, 2)
        assert page.errors.count("\n") == 1
        drawn += 1
    assert drawn > 50
