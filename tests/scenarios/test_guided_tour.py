"""The guided tour: its commands print what it shows, its pictures are those of now."""

import sys
from pathlib import Path

from tests.command_line.readme_examples import TOUR, commands_of, console_blocks, run_blocks

FOLDER = TOUR.parent
sys.path.insert(0, str(FOLDER))

from make_pictures import make_pictures  # noqa: E402 - a script beside the tour

TEXT = TOUR.read_text(encoding="utf-8")


def test_commands_print_what_the_tour_shows(tmp_path: Path) -> None:
    """Every console block, in order, in one folder.

    After a change on purpose: python -m tests.command_line.readme_examples
    """
    blocks = console_blocks(TEXT)
    assert sum(len(commands_of(block)) for block in blocks) >= 15
    assert run_blocks(blocks, tmp_path) == blocks
    assert "internal error" not in TEXT


def test_pictures_are_those_that_the_script_draws() -> None:
    """Every picture of the folder is what the tool draws now, and every one is shown."""
    pictures = make_pictures()
    assert sorted(path.name for path in (FOLDER / "pictures").iterdir()) == sorted(pictures)
    for name, picture in pictures.items():
        assert (FOLDER / "pictures" / name).read_text(encoding="utf-8") == picture
        assert f"](pictures/{name})" in TEXT


def test_readme_shows_pictures_that_exist() -> None:
    """The pictures named in the README lie where it says."""
    readme = (FOLDER.parents[1] / "README.md").read_text(encoding="utf-8")
    shown = [
        line.rpartition("(")[2].rstrip(")") for line in readme.splitlines() if line[:2] == "!["
    ]
    assert len(shown) >= 2
    for path in shown:
        assert (FOLDER.parents[1] / path).is_file(), path
