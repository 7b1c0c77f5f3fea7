"""The README says what is so: its commands print what stands there, its Python runs."""

import doctest
import re
import shlex
from pathlib import Path

import pytest

from tests.command_line.readme_examples import README, commands_of, console_blocks, run_blocks
from tests.command_line.running import Runner

TEXT = README.read_text(encoding="utf-8")
SETUPS = re.findall(r"```sh\n(.*?)\n```", TEXT, re.DOTALL)


def test_commands_print_what_the_readme_shows(tmp_path: Path) -> None:
    """Every console block, in order, in one folder: commands and output are equal to the letter.

    After a change on purpose: python -m tests.command_line.readme_examples
    """
    blocks = console_blocks(TEXT)
    assert sum(len(commands_of(block)) for block in blocks) >= 12
    assert run_blocks(blocks, tmp_path) == blocks
    assert "internal error" not in TEXT


def test_python_session_of_the_readme(tmp_path: Path, monkeypatch: pytest.MonkeyPatch) -> None:
    """The Python examples give the values shown."""
    monkeypatch.chdir(tmp_path)
    test = doctest.DocTestParser().get_doctest(TEXT, {}, "README", str(README), 0)
    results = doctest.DocTestRunner().run(test)
    assert results.attempted >= 8
    assert results.failed == 0


def test_two_commands_set_everything_up(run: Runner) -> None:
    """Each is one line that makes a virtual environment; one ends with a comparison that succeeds.

    The continuous integration runs both as they stand.
    """
    compare, tests = SETUPS
    for setup in SETUPS:
        assert "\n" not in setup
        assert setup.startswith("python3 -m venv ")
    last = shlex.split(compare.rpartition(" && ")[2])
    assert last[0] == ".venv/bin/braidsearch"
    assert run(*last[1:]).status == 0
    assert tests.rpartition(" && ")[2].startswith(".venv-tests/bin/pytest")


def test_readme_opens_with_the_job() -> None:
    """A title, then one paragraph, then the next heading."""
    title, paragraph, heading = TEXT.split("\n\n")[:3]
    assert title == "# braidsearch"
    assert paragraph.startswith("braidsearch says whether two closed braids are the same link.")
    assert heading.startswith("## ")


def test_readme_states_what_is_not_promised() -> None:
    """The three statements that a user must not miss."""
    flat = " ".join(TEXT.split())
    assert "Undecided is not different." in flat
    assert "Equality of links is proven, but only between the words as read." in flat
    assert "Where a published theorem is used beyond that, the certificate names it." in flat
