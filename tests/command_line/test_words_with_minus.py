"""A word that begins with a minus sign is a word, wherever it stands."""

import itertools

import pytest
from hypothesis import HealthCheck, given, settings

from braidsearch.command_line.arguments import CommandParser
from braidsearch.errors import InputError
from braidsearch.words import Braid, format_word
from tests.command_line.running import Runner
from tests.strategies import braids

WORDS = ["-1", "-1,2", "-1 2", "-1 -2", "-12", "−1 2", "[-1]", "4: -1", "- 1", "-1x"]


def parser() -> CommandParser:
    """A parser of the shape that the commands have."""
    made = CommandParser("try", "A trial.", "  braidsearch try -1")
    made.add_word("left", "a word")
    made.add_word("right", "a word")
    made.add_text("--bound", metavar="WORD", explanation="a word")
    made.add_number("--seconds", float, "seconds", "a number")
    made.add_json()
    return made


@pytest.mark.parametrize("word", WORDS)
def test_words_stand_anywhere_on_the_line(word: str) -> None:
    """Before, between and behind the options, and as the value of one, the word arrives intact."""
    pieces = (["--json"], ["--seconds", "3"], ["--bound", word], [word], [word])
    for order in itertools.permutations(pieces):
        given_ = parser().read([argument for piece in order for argument in piece])
        assert (given_.left, given_.right, given_.bound) == (word, word, word)
        assert given_.seconds == 3


@pytest.mark.parametrize("word", WORDS)
def test_double_minus_ends_the_options(word: str) -> None:
    """After -- everything is a word, also what looks like an option."""
    given_ = parser().read(["--json", "--", word, "--json"])
    assert (given_.left, given_.right) == (word, "--json")


@pytest.mark.parametrize("option", ["-x", "--mirror", "-s1", "--1", "-j"])
def test_unknown_options_stay_mistakes(option: str) -> None:
    """What begins with a minus sign and a letter is an option, and an unknown one is named."""
    with pytest.raises(InputError, match=f"{option}: expected only the options"):
        parser().read(["1", "1", option])


def test_negative_numbers_reach_their_options() -> None:
    """A number below zero is read as one, so that its own check can refuse it."""
    assert parser().read(["1", "1", "--seconds", "-5"]).seconds == -5
    with pytest.raises(InputError, match="--seconds: '-5x': expected seconds"):
        parser().read(["1", "1", "--seconds", "-5x"])


@given(braids(max_strands=4, max_letters=6))
@settings(max_examples=40, suppress_health_check=[HealthCheck.function_scoped_fixture])
def test_commands_read_the_word_that_was_meant(run: Runner, braid: Braid) -> None:
    """normalise --json tells back exactly the strands and letters that were typed."""
    text = format_word(braid)
    for arguments in (["--json", text], [text, "--json"], ["--json", "--", text]):
        answer = run("normalise", *arguments).json
        assert answer["braid"] == {"strands": braid.strands, "word": list(braid.word)}
