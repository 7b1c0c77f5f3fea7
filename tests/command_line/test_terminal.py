"""Text set to the width of a terminal: columns, words, commands, and what a terminal is."""

import io
import re
import subprocess

import pytest
from hypothesis import example, given, settings
from hypothesis import strategies as st
from rich.cells import cell_len

from braidsearch.command_line.answer import is_on_terminal
from braidsearch.command_line.terminal import (
    VERDICTS,
    Terminal,
    column_count,
    cut_text,
    quote_argument,
    read_terminal,
    shown_text,
    wrap_command,
    wrap_text,
)
from braidsearch.words import format_word, parse_word
from tests.strategies import braids

LETTERS = "ab1-é한語\u0301 "
TEXTS = st.text(LETTERS, max_size=120)
COLUMNS = st.integers(12, 60)


class Screen(io.TextIOWrapper):
    """Standard output that says it is a terminal."""

    def __init__(self, encoding: str = "utf-8") -> None:
        super().__init__(io.BytesIO(), encoding)

    def isatty(self) -> bool:
        """It says so."""
        return True


def terminal_with(monkeypatch: pytest.MonkeyPatch, **variables: str) -> Terminal:
    """What is read of a colour terminal of 80 columns, these variables of the environment changed.

    The stream is set here, since a test's own output is redirected when its call begins.
    """
    monkeypatch.setattr("sys.stdout", Screen())
    monkeypatch.delenv("NO_COLOR", raising=False)
    for name, value in {"TERM": "xterm-256color", "COLUMNS": "80", **variables}.items():
        monkeypatch.setenv(name, value)
    return read_terminal()


@given(TEXTS)
def test_columns_are_counted_as_by_a_library_of_terminals(text: str) -> None:
    """Wide characters fill two columns and combining ones none, as the library rich counts them.

    Each character is counted alone there: a sequence that a terminal may draw as one is not ours.
    """
    assert column_count(text) == sum(map(cell_len, text))


@given(TEXTS, COLUMNS, st.sampled_from(["", "  ", "    "]), st.sampled_from(["", "   "]))
def test_wrapped_lines_fit_and_lose_nothing(text: str, columns: int, first: str, rest: str) -> None:
    """No line is wider than asked, and all characters but blanks are there in their order."""
    lines = wrap_text(text, columns, first, rest)
    assert all(column_count(line) <= columns for line in lines)
    assert "".join(lines).replace(" ", "") == text.replace(" ", "")


@given(st.lists(st.text("ab-", min_size=1, max_size=10), min_size=1), COLUMNS)
def test_words_that_fit_a_line_stay_whole(words: list[str], columns: int) -> None:
    """The words of the lines are the words of the text."""
    assert " ".join(wrap_text(" ".join(words), columns, "", "  ")).split() == words


def test_a_sentence_begins_below_a_title_that_leaves_no_room() -> None:
    """The first line may be full with what stands before the text."""
    assert wrap_text("sentence", 12, " " * 10, "  ") == ["", "  sentence"]


@given(TEXTS, COLUMNS)
def test_cut_text_fits_and_begins_the_text(text: str, columns: int) -> None:
    """What fits is left alone; of anything else stands the beginning, with dots behind it."""
    shown = cut_text(text, columns)
    assert column_count(shown) <= columns
    if column_count(text) <= columns:
        assert shown == text.rstrip()
    else:
        assert shown.endswith("...") or shown == text.rstrip()
        assert text.startswith(shown.removesuffix("...").rstrip())


def read_by_shell(lines: list[str]) -> list[str]:
    """The arguments that a shell makes of the lines."""
    script = "show() { printf '%s\\0' \"$@\"; }\nshow " + "\n".join(lines)
    finished = subprocess.run(["sh", "-c", script], capture_output=True, check=True, timeout=20)
    assert finished.stderr == b""
    return finished.stdout.decode().split("\0")[:-1]


FILES = st.text("ab -'\"$`!\\*é한", min_size=1, max_size=20)


@settings(max_examples=30)  # each starts a shell
@given(braids(max_letters=40), FILES, COLUMNS)
@example(parse_word("1 2 1"), "my  'own' $HOME.json", 30)
def test_a_shell_reads_a_command_as_it_is_set(braid: object, file: str, columns: int) -> None:
    """Broken over lines, the command has the same file and the same braid as before."""
    word = format_word(braid)  # type: ignore[arg-type]
    lines = wrap_command(["braidsearch", "verify", file, "--left", word], columns)
    if lines is None:
        return
    assert all(column_count(line) <= columns for line in lines)
    *others, shown = read_by_shell(lines)
    assert others == ["braidsearch", "verify", file, "--left"]
    assert parse_word(shown) == braid


def test_a_command_is_broken_between_arguments_before_it_is_broken_in_one() -> None:
    """An option keeps its value, a word is broken only where it fits no line."""
    arguments = ["braidsearch", "verify", "p.json", "--left", "1 2 1 2 1"]
    assert wrap_command(arguments, 80) == ['braidsearch verify p.json --left "1 2 1 2 1"']
    assert wrap_command(arguments, 30) == [
        "braidsearch verify p.json \\",
        '  --left "1 2 1 2 1"',
    ]
    assert wrap_command(arguments, 18) == [
        "braidsearch \\",
        "  verify p.json \\",
        '  --left "1 2 1 \\',
        '  2 1"',
    ]


@pytest.mark.parametrize(
    "argument", ["a" * 40, " ".join("1" * 300), "line\nbreak", "\x1b[31m", "pd: [[1, 5, 2, 4], [3,"]
)
def test_what_cannot_be_set_as_a_command_is_refused(argument: str) -> None:
    """Too wide, too long, not printable: None, and the report says it in other words."""
    assert wrap_command(["braidsearch", "weave", argument], 20) is None
    lines = Terminal(24).command("go on", ["braidsearch", argument], "the same")
    assert lines == ["  go on: the same"]


@pytest.mark.parametrize(
    ("argument", "quoted"),
    [
        ("1 1 1", '"1 1 1"'),
        ("-1 -1", '"-1 -1"'),
        ("4: 1 -2", '"4: 1 -2"'),
        ("1,2", "1,2"),
        ("my proof.json", "'my proof.json'"),
        ("1 $x", "'1 $x'"),
    ],
)
def test_words_of_integers_stand_in_double_quotes(argument: str, quoted: str) -> None:
    """As everywhere in the documentation; whatever a shell may take for more, in single ones."""
    assert quote_argument(argument) == quoted


def test_headline_has_a_mark_and_words_with_colour_and_without() -> None:
    """Each verdict has its own mark and title, so that nothing depends on colour."""
    for verdict, (colour, mark, plain_mark) in VERDICTS.items():
        painted = Terminal(60, is_coloured=True).headline(verdict, verdict, "a sentence")
        assert painted == [f"\x1b[{colour}m {mark} {verdict} \x1b[0m a sentence"]
        assert Terminal(60).headline(verdict, verdict, "a") == [f"{mark} {verdict}: a"]
        assert Terminal(60, encoding="ascii").headline(verdict, verdict, "a") == [
            f"{plain_mark} {verdict}: a"
        ]
    assert len({mark for _, mark, _ in VERDICTS.values()}) == len(VERDICTS)


def luminance(channels: tuple[int, int, int]) -> float:
    """Relative luminance of a colour (W3C, Web Content Accessibility Guidelines 2.2, 2023)."""
    shares = [value / 255 for value in channels]
    linear = [s / 12.92 if s <= 0.04045 else ((s + 0.055) / 1.055) ** 2.4 for s in shares]
    return sum(w * s for w, s in zip((0.2126, 0.7152, 0.0722), linear, strict=True))


def test_labels_are_legible_and_differ_in_grey() -> None:
    """Letters stand out by 7 to 1 (level AAA of the guidelines), and the two labels by 4.5 to 1.

    The colours are those that the terminal xterm has by default (from memory); without any hue
    one label is dark and the other light.
    """
    xterm = {97: (255, 255, 255), 44: (0, 0, 238), 30: (0, 0, 0), 103: (255, 255, 0)}
    grounds = []
    for verdict in ("same", "different"):
        letters, ground = (luminance(xterm[int(c)]) for c in VERDICTS[verdict][0].split(";"))
        assert (max(letters, ground) + 0.05) / (min(letters, ground) + 0.05) > 7
        grounds.append(ground + 0.05)
    assert max(grounds) / min(grounds) > 4.5


def test_text_that_a_terminal_would_obey_is_escaped() -> None:
    """Escape codes, line breaks and broken encodings in the name of a file come out as escapes."""
    assert shown_text("a\x1b[2J\n\udcff") == "a\\x1b[2J\\n\\udcff"
    assert shown_text("한", "ascii") == "\\ud55c"
    lines = Terminal(40).item("certificate", "x" * 90)
    assert max(map(len, lines)) == 40
    assert "".join(lines).replace(" ", "") == "certificate:" + "x" * 90
    assert Terminal(40).item("certificate", "two  blanks") == ["  certificate: two  blanks"]


@pytest.mark.parametrize(("columns", "used"), [("80", 79), ("40", 39), ("12", 39), ("300", 299)])
def test_width_follows_the_terminal(
    monkeypatch: pytest.MonkeyPatch, columns: str, used: int
) -> None:
    """All columns but the last one, and never less than a report needs."""
    terminal = terminal_with(monkeypatch, COLUMNS=columns)
    assert terminal.columns == used
    assert terminal.text_columns == min(used, 100)


@pytest.mark.parametrize(
    ("variables", "is_coloured"),
    [
        ({}, True),
        ({"NO_COLOR": "1"}, False),
        ({"NO_COLOR": "0"}, False),
        ({"NO_COLOR": ""}, True),
        ({"TERM": ""}, False),
    ],
)
def test_colour_is_taken_away_by_any_value(
    monkeypatch: pytest.MonkeyPatch, variables: dict[str, str], is_coloured: bool
) -> None:
    """NO_COLOR counts when it is present and not empty, whatever it says (no-color.org, 2017)."""
    terminal = terminal_with(monkeypatch, **variables)
    assert terminal.is_coloured is is_coloured
    assert bool(re.search("\x1b", terminal.paint("1", "text"))) is is_coloured


def test_pipes_closed_streams_and_dumb_terminals_are_none(monkeypatch: pytest.MonkeyPatch) -> None:
    """There a report is plain and complete."""
    terminal_with(monkeypatch)
    assert is_on_terminal()
    monkeypatch.setenv("TERM", "dumb")
    assert not is_on_terminal()
    monkeypatch.delenv("TERM")
    assert is_on_terminal()
    for stream in (None, io.StringIO()):
        monkeypatch.setattr("sys.stdout", stream)
        assert not is_on_terminal()
