"""The examples of the README: run them, compare them, write them anew.

``python -m tests.command_line.readme_examples`` puts what the commands print now into the README
and into the guided tour.
"""

import os
import re
import subprocess
import sys
import tempfile
from pathlib import Path

from tests.command_line.running import environment

PROJECT = Path(__file__).parents[2]
README = PROJECT / "README.md"
TOUR = PROJECT / "scenarios" / "guided_tour" / "README.md"
_CONSOLE = re.compile(r"```console\n(.*?)```", re.DOTALL)
_PROMPT = "$ "


def console_blocks(text: str) -> list[str]:
    """The blocks in which commands and their output stand."""
    return _CONSOLE.findall(text)


def commands_of(block: str) -> list[str]:
    """The commands of a block, in order."""
    lines = block.splitlines()
    return [line.removeprefix(_PROMPT) for line in lines if line.startswith(_PROMPT)]


def run_blocks(blocks: list[str], folder: Path) -> list[str]:
    """Each block with the output that its commands have in the folder, one after the other."""
    shell = make_shell(folder)
    return [
        "".join(
            f"{_PROMPT}{command}\n{output_of(command, folder, shell)}"
            for command in commands_of(block)
        )
        for block in blocks
    ]


def make_shell(folder: Path) -> dict[str, str]:
    """An environment whose ``braidsearch`` and ``python`` are those under test."""
    bin_folder = folder / ".bin"
    bin_folder.mkdir()
    for name, start in (("braidsearch", "-m braidsearch "), ("python", "")):
        script = bin_folder / name
        script.write_text(f'#!/bin/sh\nexec "{sys.executable}" {start}"$@"\n')
        script.chmod(0o755)
    return {**environment(), "PATH": f"{bin_folder}{os.pathsep}{os.environ['PATH']}"}


def output_of(command: str, folder: Path, shell: dict[str, str]) -> str:
    """What the command prints, on standard output and standard error."""
    finished = subprocess.run(
        ["sh", "-c", command],
        cwd=folder,
        env=shell,
        stdout=subprocess.PIPE,
        stderr=subprocess.STDOUT,
        text=True,
        check=False,
        timeout=120,
    )
    return finished.stdout


def rewrite(page: Path) -> None:
    """Put the output of now into the page."""
    text = page.read_text(encoding="utf-8")
    with tempfile.TemporaryDirectory() as folder:
        outputs = run_blocks(console_blocks(text), Path(folder))
    if "internal error" in "".join(outputs):
        raise RuntimeError("an example ended in an internal error: nothing was written")
    made = iter(outputs)
    fresh = _CONSOLE.sub(lambda _: f"```console\n{next(made)}```", text)
    page.write_text(fresh, encoding="utf-8")


if __name__ == "__main__":
    for page in (README, TOUR):
        rewrite(page)
