"""Reading and writing braid words: signed integers, sigma notation with powers."""

import re

from braidsearch.errors import InputError
from braidsearch.words.braid import MAX_LETTERS, MAX_STRANDS, Braid

_MINUS_SIGNS = dict.fromkeys(map(ord, "−‒–﹣－"), "-")  # every Unicode dash seen used as a minus
_SUPERSCRIPTS = str.maketrans("⁻⁺⁰¹²³⁴⁵⁶⁷⁸⁹", "-+0123456789")
_RAISED = re.compile(r"\^?([⁻⁺⁰¹²³⁴⁵⁶⁷⁸⁹]+)")
_SUBSCRIPTS = str.maketrans("₀₁₂₃₄₅₆₇₈₉", "0123456789")
_STRANDS = re.compile(r"\s*([^\s:]*)\s*:(.*)", re.DOTALL)
_BRACKETS = {"[": "]", "(": ")", "{": "}"}
_INTEGER = re.compile(r"[+-]?[0-9]+")
_SIGMA = re.compile(
    r"(?:s|S|σ|sigma|\\sigma)_?(?P<open>\{)?(?P<index>[0-9]+)(?(open)\})"
    r"(?P<power>\^(?:\{[+-]?[0-9]+\}|\([+-]?[0-9]+\)|[+-]?[0-9]+))?"
)
_GLUED = re.compile(r"(?=(?:(?<!\\)sigma|\\sigma|σ|s|S)_?\{?[0-9₀-₉])")
_LONGEST_TOKEN = 40
_EXPECTED = "expected integers such as 1 -2 or sigma notation such as s1 s2^-1"


def parse_word(text: str) -> Braid:
    """Read a braid from text.

    Signed integers separated by blanks or commas, with or without one pair of brackets
    (``1 -2``, ``[1, -2]``), or sigma notation with powers (``s1 s2^-1``, ``σ₁ σ₂⁻¹``, ``σ_1^3``);
    ``4: ...`` in front states the number of strands. A Unicode minus is a minus, and ``e`` or
    nothing is the empty word.

    Raises InputError, in one line that names the offending token and what was expected.
    """
    strands, body = _split_strands(text)
    letters: list[int] = []
    largest = 0
    for token in _iter_tokens(_strip_brackets(body)):
        letter, power = _read_token(token, len(letters))
        largest = max(largest, abs(letter))  # s2^0 writes no letter, yet speaks of three strands
        letters.extend([letter if power > 0 else -letter] * abs(power))
    return Braid(letters, largest + 1 if strands is None else strands)


def format_word(braid: Braid) -> str:
    """Write signed integers, with the strand count in front where the word does not imply it."""
    letters = " ".join(map(str, braid.word))
    implied = max(map(abs, braid.word), default=0) + 1
    if braid.strands == implied and letters:
        return letters
    return f"{braid.strands}: {letters}".rstrip()


def format_sigma(braid: Braid) -> str:
    """Write sigma notation, equal neighbours gathered into powers: ``σ1^2 σ2^-1``."""
    parts: list[str] = []
    position = 0
    while position < len(braid.word):
        letter = braid.word[position]
        end = position
        while end < len(braid.word) and braid.word[end] == letter:
            end += 1
        power = (end - position) * (1 if letter > 0 else -1)
        parts.append(f"σ{abs(letter)}" + ("" if power == 1 else f"^{power}"))
        position = end
    implied = max(map(abs, braid.word), default=0) + 1
    prefix = "" if parts and braid.strands == implied else f"{braid.strands}: "
    return (prefix + (" ".join(parts) or "e")).strip()


def _split_strands(text: str) -> tuple[int | None, str]:
    match = _STRANDS.fullmatch(text)
    if match is None:
        return None, text
    count = match.group(1)
    if not re.fullmatch(r"[0-9]{1,9}", count) or int(count) < 1:
        shown = _shown(count) or "':'"
        raise InputError(f"{shown} before the colon: expected a strand count of at least 1")
    if int(count) > MAX_STRANDS:
        raise InputError(f"{count} strands: expected at most {MAX_STRANDS}")
    return int(count), match.group(2)


def _strip_brackets(body: str) -> str:
    stripped = body.strip()
    if stripped[:1] in _BRACKETS and stripped[-1] == _BRACKETS[stripped[0]]:
        return stripped[1:-1]
    return stripped


def _iter_tokens(body: str) -> list[str]:
    tokens: list[str] = []
    for piece in re.split(r"[\s,;*·]+", body):
        tokens.extend(part for part in _GLUED.split(piece) if part)
    return [] if tokens in (["e"], ["ε"]) else tokens


def _read_token(token: str, before: int) -> tuple[int, int]:
    plain = token.translate(_MINUS_SIGNS).translate(_SUBSCRIPTS)
    if _INTEGER.fullmatch(plain):
        letter, power = _bounded(plain, token), 1
    else:
        letter, power = _read_sigma(plain, token)
    if letter == 0:
        raise InputError(f"{_shown(token)}: expected a non-zero index, since there is no sigma_0")
    if abs(letter) >= MAX_STRANDS:
        raise InputError(f"{_shown(token)}: expected an index below {MAX_STRANDS}")
    if before + abs(power) > MAX_LETTERS:
        raise InputError(
            f"{_shown(token)} as letter number {before + abs(power)}: "
            f"expected at most {MAX_LETTERS} letters"
        )
    return letter, power


def _read_sigma(plain: str, token: str) -> tuple[int, int]:
    lowered = _RAISED.sub(lambda raised: "^" + raised[1].translate(_SUPERSCRIPTS), plain)
    match = _SIGMA.fullmatch(lowered)
    if match is None:
        raise InputError(f"{_shown(token)}: {_EXPECTED}")
    power = match.group("power")
    exponent = 1 if power is None else _bounded(power.strip("^{}()"), token)
    return _bounded(match.group("index"), token), exponent


def _bounded(digits: str, token: str) -> int:
    """The integer, unless it has so many digits that reading it is already a mistake."""
    if len(digits) > 12:
        raise InputError(f"{_shown(token)}: expected an integer of at most 12 digits")
    return int(digits)


def _shown(token: str) -> str:
    """The token as quoted in a message: cut short, without line breaks."""
    short = token if len(token) <= _LONGEST_TOKEN else token[: _LONGEST_TOKEN - 3] + "..."
    return repr(short) if short else ""
