"""compare in a process of its own on a terminal: width, colour, and what may be typed next."""

import fcntl
import json
import os
import pty
import re
import shlex
import struct
import subprocess
import termios
from pathlib import Path

import pytest
from rich.cells import cell_len

from tests.command_line.running import command, environment, read_terminal, run_process

ESCAPE = re.compile("\x1b\\[[0-9;]*m")
MORTON = "3 3 -2 3 -2 -1 -1 -1 2 -1 2"
CASES = {
    "same": (("1 1 1", "1 2 1 2", "-o", "한 proof.json"), 0),
    "different": (("1 1 1", "-1 -1 -1"), 1),
    "all images": (("1 1 1", "1 1 1 1 1", "--up-to", "any"), 1),
    "undecided": ((MORTON, "1:", "--seconds", "0"), 3),
}
"""Arguments of compare and the exit status: trefoils, another torus knot, and a braid for the
unknot (Morton, An irreducible 4-string braid with unknotted closure, 1983; from memory)."""


def run_on_screen(
    *arguments: str, columns: int = 80, folder: Path | None = None, **variables: str
) -> tuple[int, str]:
    """Exit status of ``braidsearch ARGUMENTS`` and what it wrote on a terminal."""
    return read_screen(command(*arguments), columns, folder, **variables)


def read_screen(
    started: list[str], columns: int = 80, folder: Path | None = None, **variables: str
) -> tuple[int, str]:
    """Exit status, and what a process wrote on a terminal of so many columns, lines by newline."""
    leader, follower = pty.openpty()
    fcntl.ioctl(follower, termios.TIOCSWINSZ, struct.pack("HHHH", 24, columns, 0, 0))
    inherited = {k: v for k, v in environment().items() if k not in ("COLUMNS", "NO_COLOR")}
    process = subprocess.Popen(
        started,
        stdout=follower,
        stderr=subprocess.PIPE,
        cwd=folder,
        env={**inherited, "PYTHONUTF8": "1", "TERM": "xterm-256color", **variables},
    )
    os.close(follower)
    written = read_terminal(leader)
    assert process.communicate(timeout=60)[1] == b""
    return process.returncode, written.decode().replace("\r\n", "\n")


def shown_commands(report: str) -> list[str]:
    """The commands that a report proposes, each as a shell may be given it."""
    lines = [line + "\n" for line in report.splitlines()]
    starts = [at for at, line in enumerate(lines) if re.search("(^|: ) *braidsearch ", line)]
    found = []
    for at in starts:
        end = at
        while lines[end].endswith("\\\n"):
            end += 1
        text = "".join(lines[at : end + 1])
        found.append(text[text.index("braidsearch") :].rstrip())
    return found


@pytest.mark.parametrize("columns", [40, 80, 120])
@pytest.mark.parametrize("case", CASES)
def test_reports_follow_the_width(case: str, columns: int, tmp_path: Path) -> None:
    """No line is wider than the terminal, columns counted by the library rich; the status stays."""
    arguments, status = CASES[case]
    found, report = run_on_screen("compare", *arguments, columns=columns, folder=tmp_path)
    lines = ESCAPE.sub("", report).splitlines()
    assert found == status
    assert "\x1b[" in report
    assert "\x1b" not in "".join(lines)
    assert max(map(cell_len, lines)) < columns
    assert len(lines) <= 10 + 800 // columns
    assert lines[0][1:].startswith(("= same link", "≠ different links", "? undecided"))


def test_no_escape_codes_with_no_color(tmp_path: Path) -> None:
    """NO_COLOR of any value leaves plain text in the same words; an empty one leaves colour."""
    arguments = ("compare", "1 1 1", "-1 -1 -1")
    status, plain = run_on_screen(*arguments, folder=tmp_path, NO_COLOR="1")
    assert (status, "\x1b" in plain) == (1, False)
    painted = run_on_screen(*arguments, folder=tmp_path, NO_COLOR="")[1]
    assert "\x1b" in painted
    bare = ESCAPE.sub("", painted).replace(" ≠ different links ", "≠ different links:")
    assert bare.splitlines() == plain.splitlines()


def test_dumb_terminals_pipes_and_json_get_the_plain_answers(tmp_path: Path) -> None:
    """On a dumb terminal and in a pipe the report is the same, and --json is the same on all."""
    arguments = ("compare", "1 1 1", "1 2 1 2")
    piped = run_process(*arguments, cwd=tmp_path)
    assert "\x1b" not in piped.output
    assert "proof: 2 moves, from LEFT" in piped.output
    dumb = run_on_screen(*arguments, folder=tmp_path, columns=40, TERM="dumb")
    assert dumb == (piped.status, piped.output)
    status, shown = run_on_screen(*arguments, "--json", folder=tmp_path)
    answers = [json.loads(text) for text in (shown, run_process(*arguments, "--json").output)]
    for answer in answers:
        del answer["explored"]["seconds"]
    assert status == 0
    assert answers[0] == answers[1]


def test_a_terminal_without_unicode_gets_plain_marks(tmp_path: Path) -> None:
    """In an ASCII encoding the mark of a difference is written with what there is."""
    ascii_only = {"PYTHONIOENCODING": "ascii", "NO_COLOR": "1"}
    _, report = run_on_screen("compare", "1 1 1", "-1 -1 -1", folder=tmp_path, **ascii_only)
    assert report.startswith("!= different links: ")


def test_what_a_report_proposes_can_be_typed(tmp_path: Path) -> None:
    """Every command on a narrow screen, given to a shell as it stands, does what is said of it."""
    environ = environment()
    start = " ".join(map(shlex.quote, command()))
    for columns, (arguments, _) in ((40, CASES["same"]), (60, CASES["different"])):
        options = {"columns": columns, "folder": tmp_path, "NO_COLOR": "1"}
        report = run_on_screen("compare", *arguments, **options)[1]  # type: ignore[arg-type]
        proposed = shown_commands(report)
        assert len(proposed) == 2
        for text in proposed:
            script = f'braidsearch() {{ {start} "$@"; }}\n{text}'
            finished = subprocess.run(
                ["sh", "-c", script], check=False, cwd=tmp_path, env=environ, capture_output=True
            )
            same_question = "compare" in text and "--up-to" not in text
            assert finished.returncode == (1 if same_question else 0), text
            assert finished.stderr == b""
    written = {path.name for path in tmp_path.iterdir()}
    assert written == {"한 proof.json", "proof.json", "proof.mirror.json"}


def test_verify_on_a_terminal_has_a_mark(tmp_path: Path) -> None:
    """valid and rejected stand first, with a mark and colour; the claim and the reason follow."""
    file = str(tmp_path / "p.json")
    run_process("compare", "1 1 1", "1 2 1 2", "-o", file)
    for options, status, label in (((), 0, " ✓ valid "), (("--left", "1"), 1, " ✗ rejected ")):
        found, report = run_on_screen("verify", file, *options, columns=50)
        lines = ESCAPE.sub("", report).splitlines()
        assert found == status
        assert lines[0].startswith(label)
        assert "reason: " in report
        assert max(map(cell_len, lines)) < 50


def test_a_pipe_loads_nothing_of_terminals(tmp_path: Path) -> None:
    """Piped, neither the layout for terminals nor the library rich is loaded; on one, no rich."""
    script = tmp_path / "loaded.py"
    script.write_text(
        "import sys\n"
        "from braidsearch.command_line.main import main\n"
        "main(['compare', '1 1 1', '-1 -1 -1'])\n"
        "print('\\nMODULES', *sys.modules)\n"
    )
    run = [command()[0], str(script)]
    piped = subprocess.run(run, capture_output=True, check=True, text=True, env=environment())
    modules = set(piped.stdout.split("MODULES ")[1].split())
    assert "braidsearch.command_line.compare_report" in modules
    names = ("terminal", "compare_summary", "compare_steps")
    assert modules.isdisjoint({"rich", *(f"braidsearch.command_line.{name}" for name in names)})
    shown = read_screen(run, folder=tmp_path)[1]
    assert "braidsearch.command_line.terminal" in shown
    assert "rich" not in shown.split("MODULES ")[1].split()
