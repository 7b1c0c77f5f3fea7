"""The progress line by itself: when it is written, how it fits, how it goes away."""

import io

import pytest

from braidsearch.command_line.progress import ProgressLine, progress_line
from braidsearch.search.limits import Progress


class BrokenTerminal(io.StringIO):
    """A terminal that went away; it counts what is written to it all the same."""

    attempts = 0

    def write(self, _: str) -> int:
        """Fail, as writing to it does."""
        self.attempts += 1
        raise OSError("gone")


def told(*moments: float, doing: str = "searching", strands: int = 4) -> str:
    """What stands on the terminal after progress was told at these seconds, and then erased."""
    stream = io.StringIO()
    line = ProgressLine(stream)
    for seconds in moments:
        line(Progress(seconds=seconds, nodes=17, strands=strands, doing=doing))
    line.erase()
    return stream.getvalue()


def test_nothing_in_the_first_second() -> None:
    """A query that is answered within a second leaves no trace."""
    assert told(0.0, 0.5, 0.99) == ""


def test_line_is_written_and_blanked_out() -> None:
    """Each line is written over the one before, and blanks over the last."""
    shown = told(1.0, 2.0).split("\r")
    assert shown[1] == "1 s, 17 classes, 4 strands: searching"
    assert shown[2] == "2 s, 17 classes, 4 strands: searching"
    assert shown[3] == " " * len(shown[2])
    assert shown[4] == ""


def test_at_most_ten_lines_a_second() -> None:
    """However often the search tells, the terminal is not flooded."""
    shown = told(*(1 + step / 1000 for step in range(1000)))
    assert 5 <= shown.count("searching") <= 10


def test_shorter_line_covers_the_longer_one() -> None:
    """Nothing of a longer line is left behind a shorter one."""
    stream = io.StringIO()
    line = ProgressLine(stream)
    line(Progress(1.0, 123456, 4, "simplifying both sides"))
    line(Progress(2.0, 1, 4, "x"))
    _, first, second = stream.getvalue().split("\r")
    assert len(second) == len(first)


def test_line_fits_the_terminal(monkeypatch: pytest.MonkeyPatch) -> None:
    """A narrow terminal gets a cut line, since a wrapped one could not be written over."""
    monkeypatch.setenv("COLUMNS", "20")
    assert all(len(part) < 20 for part in told(1.0, doing="searching " * 9).split("\r"))


def test_strands_that_are_not_known_are_left_out() -> None:
    """Before the search there is no braid to speak of."""
    assert "1 s, 17 classes: simplifying" in told(1.0, doing="simplifying", strands=0)


def test_terminal_that_is_gone_does_not_end_the_search() -> None:
    """The answer matters more than the line."""
    gone = BrokenTerminal()
    line = ProgressLine(gone)
    line(Progress(1.0, 1, 2, "searching"))
    line.erase()
    assert gone.attempts == 2


def test_no_line_without_a_terminal(monkeypatch: pytest.MonkeyPatch) -> None:
    """A file, a pipe and a closed stream get none."""
    monkeypatch.setattr("sys.stderr", io.StringIO())
    assert progress_line() is None
    monkeypatch.setattr("sys.stderr", None)
    assert progress_line() is None
