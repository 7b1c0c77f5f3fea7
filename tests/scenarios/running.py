"""Running the script of a scenario as its users do."""

import subprocess
import sys
from pathlib import Path
from typing import NamedTuple

from tests.command_line.running import environment

SCENARIOS = Path(__file__).parents[2] / "scenarios"


class Finished(NamedTuple):
    """The exit status of a script, and the report that it printed."""

    status: int
    report: str


def run_scenario(script: str, folder: Path) -> Finished:
    """Run a script under scenarios/ that writes into a folder; it prints its report, and nothing
    else.
    """
    done = subprocess.run(
        [sys.executable, str(SCENARIOS / script), str(folder)],
        capture_output=True,
        text=True,
        check=False,
        timeout=600,
        env=environment(),
    )
    assert done.stderr == ""
    assert done.stdout == (folder / "report.txt").read_text(encoding="utf-8")
    return Finished(done.returncode, done.stdout)


def check_usage(script: str) -> None:
    """Without a folder the script says what it wants in one line, and writes nothing: status 2."""
    done = subprocess.run(
        [sys.executable, str(SCENARIOS / script)],
        capture_output=True,
        text=True,
        check=False,
        env=environment(),
    )
    assert done.returncode == 2
    assert done.stderr == f"usage: python {Path(script).name} FOLDER\n"
