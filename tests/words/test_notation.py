"""Reading and writing words: every notation of the trade, and one line for every mistake."""

import time

import pytest
from hypothesis import given
from hypothesis import strategies as st

from braidsearch.errors import InputError
from braidsearch.words import MAX_LETTERS, Braid, format_sigma, format_word, parse_word
from tests.strategies import braids

FIGURE_EIGHT = Braid([1, -2, 1, -2])


@given(braids(max_strands=12, max_letters=30))
def test_signed_integers_round_trip(braid: Braid) -> None:
    """parse_word(format_word(b)) == b, strands without letters included."""
    assert parse_word(format_word(braid)) == braid


@given(braids(max_strands=12, max_letters=30))
def test_sigma_notation_round_trips(braid: Braid) -> None:
    """parse_word(format_sigma(b)) == b: powers lose no letter."""
    assert parse_word(format_sigma(braid)) == braid


@given(braids(max_strands=6), st.sampled_from([" ", ",", ", ", ";", "\t", "\n", " , "]))
def test_separators_and_brackets_do_not_matter(braid: Braid, separator: str) -> None:
    """Blanks, commas and one pair of brackets say nothing about the braid."""
    letters = separator.join(map(str, braid.word))
    prefix = f"{braid.strands}:"
    for opened, closed in ("", ""), ("[", "]"), ("(", ")"), ("{", "}"):
        assert parse_word(f"{prefix} {opened}{letters}{closed} ") == braid


@pytest.mark.parametrize(
    "text",
    [
        "1 -2 1 -2",
        "1,-2,1,-2",
        "[1, -2, 1, -2]",
        "{1;-2;1;-2}",
        "3: 1 -2 1 -2",
        "3:[1,-2,1,-2]",
        "1 −2 1 −2",
        "+1 -2 +1 -2",
        "s1 s2^-1 s1 s2^-1",
        "s1s2^-1s1s2^-1",
        "s_1 s_2^{-1} s_1 s_2^{-1}",
        "S1 S2^(-1) S1 S2^-1",
        "σ1 σ2⁻¹ σ1 σ2⁻¹",
        "σ₁σ₂⁻¹σ₁σ₂⁻¹",
        "σ_1 σ_2^−1 σ_1 σ_2^−1",
        r"\sigma_1 \sigma_2^{-1} \sigma_{1} \sigma_{2}^{-1}",
        "sigma1*sigma2^-1*sigma1*sigma2^-1",
    ],
)
def test_notations_of_the_trade(text: str) -> None:
    """The figure-eight knot in the notations that papers and tables use."""
    assert parse_word(text) == FIGURE_EIGHT


@pytest.mark.parametrize(
    ("text", "braid"),
    [
        ("", Braid([])),
        ("   ", Braid([])),
        ("[]", Braid([])),
        ("e", Braid([])),
        ("1:", Braid([], strands=1)),
        ("4:", Braid([], strands=4)),
        ("4: e", Braid([], strands=4)),
        ("σ_1^3", Braid([1, 1, 1])),
        ("s1^3 s2^-2", Braid([1, 1, 1, -2, -2])),
        ("s2^0", Braid([], strands=3)),
        ("5: 1 1", Braid([1, 1], strands=5)),
        ("-1", Braid([-1])),
        ("-1,2", Braid([-1, 2])),
    ],
)
def test_edges_of_the_notation(text: str, braid: Braid) -> None:
    """The empty word, strands without letters, powers, and words that begin with a minus sign."""
    assert parse_word(text) == braid


@pytest.mark.parametrize(
    ("text", "token"),
    [
        ("0", "0"),
        ("1 0 2", "0"),
        ("s0", "s0"),
        ("1 two 3", "two"),
        ("hello", "hello"),
        ("1.5", "1.5"),
        ("1e3", "1e3"),
        ("--1", "--1"),
        ("1 - 2", "'-'"),
        ("s1^", "s1^"),
        ("s1^x", "s1^x"),
        ("s", "s"),
        ("[1 2", "[1"),
        ("1 2]", "2]"),
        ("[1,(2)]", "(2)"),
        ("3: 1 2 3", "letter 3"),
        ("1: 1", "letter 1"),
        ("0: 1", "0"),
        ("-2: 1", "-2"),
        ("x: 1", "x"),
        (": 1", ":"),
        ("3: 2: 1", "2:"),
        ("2000: 1", "2000"),
        ("5000", "5000"),
        ("s1^200000", "s1^200000"),
        ("99999999999999999999", "99999999999999"),
        ("1 \x1b[31m2", "x1b[31m2"),
        ("1 \x00", "x00"),
        ("१", "१"),
    ],
)
def test_mistakes_are_named_in_one_line(text: str, token: str) -> None:
    """The message quotes the offending token and says what was expected, on one printable line."""
    with pytest.raises(InputError) as caught:
        parse_word(text)
    message = str(caught.value)
    assert token in message
    assert "expected" in message
    assert message.isprintable()
    assert len(message) < 200


@pytest.mark.parametrize(
    "text",
    ["1 " * 1_000_000, "s1" * 1_000_000, "1," * 1_000_000, "x" * 5_000_000, "1" * 5_000_000],
)
def test_a_million_letters_get_a_short_answer(text: str) -> None:
    """Too long a word is refused by one short line, within seconds."""
    begin = time.monotonic()
    with pytest.raises(InputError) as caught:
        parse_word(text)
    assert time.monotonic() - begin < 10
    assert "expected" in str(caught.value)
    assert len(str(caught.value)) < 200


def test_a_word_of_the_largest_length_is_read() -> None:
    """The limit itself is allowed."""
    assert len(parse_word(f"s1^{MAX_LETTERS}")) == MAX_LETTERS


@given(st.text(max_size=30))
def test_any_text_is_a_braid_or_one_line(text: str) -> None:
    """No text makes parse_word raise anything but InputError with one printable line."""
    try:
        braid = parse_word(text)
    except InputError as error:
        assert str(error).isprintable()  # noqa: PT017 - either way out is right
        assert "expected" in str(error)  # noqa: PT017
    else:
        assert parse_word(format_word(braid)) == braid
