"""Check a braidsearch certificate: one file, the standard library only, no search.

    python -I verify.py FILE [--left WORD] [--right WORD] [--json]

Exit status: 0 valid, 1 rejected, 2 unreadable or a usage error. The file reads in order of
trust: what a report means, the claims, the one function through which every move passes,
equality in the braid group, the strict reader, the invariants, the command line. The format
and the conventions stand in FORMAT.md. A braid here is a strand count n and a word of non-zero
integers, +i for sigma_i (a positive crossing) and -i for its inverse, read from left to right.
"""

from __future__ import annotations

import json
import os
import re
import sys
from bisect import bisect_left
from collections.abc import Callable, Iterable, Sequence
from dataclasses import dataclass
from fractions import Fraction
from math import comb, factorial
from typing import Any, NamedTuple, NoReturn

MAX_FILE_BYTES = 16_000_000
MAX_STRANDS = 1_000
MAX_LETTERS = 100_000  # in one word
MAX_MOVES = 100_000  # in one list of moves
MAX_DIGITS = 4_000  # in one integer
MAX_WORK = 500_000_000  # elementary steps for one certificate, about a tenth of a microsecond each
MAX_STATE_BITS = 2_000_000_000  # held at one time by the state sum of the Jones polynomial


# ---------------------------------------------------------------------------- what comes out


@dataclass(frozen=True)
class Report:
    """What became of a certificate.

    ``status`` is "valid", "rejected" (well formed, but not proven) or "unreadable". ``claim`` is
    what the file claims, in words, empty when it could not be read. ``reason`` is one line.
    """

    status: str
    claim: str
    reason: str

    @property
    def valid(self) -> bool:
        """True only when every condition of the certificate was recomputed and found to hold."""
        return self.status == "valid"


Bound = tuple[int, Sequence[int]] | None  # the braid that a side of the claim must be


class UnreadableError(Exception):
    """The text is not a certificate of this format; the message says where and why."""


class RejectedError(Exception):
    """The certificate can be read, but does not prove its claim; the message says why."""


class Work:
    """What one certificate may still cost, in elementary steps: never a matter of the clock."""

    def __init__(self, steps: int = MAX_WORK) -> None:
        self.left = steps

    def spend(self, steps: int) -> None:
        """Take ``steps`` away; raises RejectedError when they are more than what is left."""
        self.left -= steps
        if self.left < 0:
            raise RejectedError(
                f"too large for this verifier: more than {MAX_WORK} elementary steps of work"
            )


def verify_text(text: str | bytes, left: Bound = None, right: Bound = None) -> Report:
    """Verify a certificate given as text; raises nothing, whatever the text.

    ``left`` and ``right``, pairs (strands, word), bind the claim: a certificate about other
    braids, compared letter by letter, is rejected.
    """
    claim_in_words = ""
    try:
        claim = read_certificate(text)
        claim_in_words = describe_claim(claim)
        check_binding("left", claim.left, left)
        check_binding("right", claim.right, right)
        return Report("valid", claim_in_words, check_claim(claim, Work()))
    except UnreadableError as error:
        return Report("unreadable", "", str(error))
    except RejectedError as error:
        return Report("rejected", claim_in_words, str(error))
    except (MemoryError, RecursionError):
        return Report("rejected", claim_in_words, "too large for this verifier: out of memory")
    except Exception as error:  # a defect of this file must not pass for a proof
        reason = f"a defect in the verifier: {type(error).__name__}"
        return Report("rejected", claim_in_words, reason)


def verify_file(path: str | os.PathLike[str], left: Bound = None, right: Bound = None) -> Report:
    """Verify a certificate file as ``verify_text`` does; a missing file is unreadable."""
    try:
        with open(os.fspath(path), "rb") as file:  # a number would be an open descriptor
            content = file.read(MAX_FILE_BYTES + 1)
    except (OSError, ValueError, TypeError) as error:
        cause = getattr(error, "strerror", None) or str(error)
        return Report("unreadable", "", f"cannot read {shown(str(path))}: {cause}")
    return verify_text(content, left, right)


# ---------------------------------------------------------------------------- the claims


class Braid(NamedTuple):
    """A word on a number of strands."""

    strands: int
    word: tuple[int, ...]


class Move(NamedTuple):
    """One step, with the fields of its kind; the others keep their defaults."""

    move: str
    word: tuple[int, ...]
    by: tuple[int, ...] = ()
    sign: int = 0
    strands: int = 0


class Distinction(NamedTuple):
    """An invariant on which closure(left) and symmetry(closure(right)) are said to differ."""

    symmetry: str
    invariant: str
    parameters: dict[str, Any]
    left_moves: list[Move]
    right_moves: list[Move]
    left: Any
    right: Any


class Claim(NamedTuple):
    """A certificate as read, with the fields of its verdict; the others keep their defaults."""

    format: str
    version: int
    left: Braid
    right: Braid
    verdict: str
    symmetry: str = ""
    moves: Sequence[Move] = ()
    distinctions: Sequence[Distinction] = ()


SYMMETRIES: dict[str, str] = {
    "identity": "the closure",
    "mirror": "the mirror image of the closure",
    "reverse": "the reverse of the closure",
    "mirror-reverse": "the reversed mirror image of the closure",
}


def apply_symmetry(braid: Braid, symmetry: str) -> Braid:
    """The image: mirror negates the letters, reverse reads backwards, mirror-reverse inverts."""
    word = braid.word
    if symmetry in ("mirror", "mirror-reverse"):
        word = tuple(-letter for letter in word)
    if symmetry in ("reverse", "mirror-reverse"):
        word = word[::-1]
    return Braid(braid.strands, word)


def describe_claim(claim: Claim) -> str:
    """The claim in words; long words are cut, so ``left`` and ``right`` bind them in full."""
    left, right = format_braid(claim.left), format_braid(claim.right)
    if claim.verdict == "same":
        image = SYMMETRIES[claim.symmetry]
        return f"the closure of ({left}) is the same oriented link as {image} of ({right})"
    images = ", nor ".join(SYMMETRIES[distinction.symmetry] for distinction in claim.distinctions)
    return f"the closure of ({left}) is not the same oriented link as {images} of ({right})"


def check_binding(side: str, braid: Braid, bound: Any) -> None:
    """Raise RejectedError unless ``bound`` is None or exactly the claimed braid."""
    if bound is None:
        return
    try:
        strands, word = bound
        wanted = (strands, tuple(word))
    except (TypeError, ValueError):
        raise UnreadableError(f"the braid asked for as {side}: expected (strands, word)") from None
    if wanted != (braid.strands, braid.word):
        raise RejectedError(f"the certificate is about another {side} braid than the one asked for")


def check_claim(claim: Claim, work: Work) -> str:
    """Check everything that the certificate states; returns what was checked, in words."""
    if claim.verdict == "same":
        return check_same(claim, work)
    return check_different(claim, work)


def check_same(claim: Claim, work: Work) -> str:
    """Replay the moves from left; they must end at the very letters of symmetry(right).

    Each move keeps the oriented link that the braid closes to (Markov, 1936), and a symmetry
    acts on the closure as on the word.
    """
    end = replay(claim.left, claim.moves, "move", work)
    if end != apply_symmetry(claim.right, claim.symmetry):
        raise RejectedError(f"the moves do not end at the {claim.symmetry} image of right")
    return f"all {len(claim.moves)} moves hold and lead from left to right"


def check_different(claim: Claim, work: Work) -> str:
    """Recompute both values of each distinction: equal to what is stated, and different."""
    names = []
    for number, item in enumerate(claim.distinctions, 1):
        where = f"distinction {number} ({item.invariant}, {item.symmetry})"
        left = replay(claim.left, item.left_moves, f"{where}: left move", work)
        right = replay(claim.right, item.right_moves, f"{where}: right move", work)
        image = apply_symmetry(right, item.symmetry)
        for side, braid, stated in (("left", left, item.left), ("right", image, item.right)):
            check_value(f"{where}: {side}", item.invariant, braid, stated, work)
        if item.left == item.right:
            raise RejectedError(f"{where}: the two values are equal")
        names.append(item.invariant)
    if not names:
        raise RejectedError("no distinction: nothing is shown to differ")
    return f"the values of {', '.join(names)} are as stated and differ"


def check_value(where: str, invariant: str, braid: Braid, stated: Any, work: Work) -> None:
    """Raise RejectedError unless ``stated`` is the invariant of the closure, in canonical form."""
    form, compute = INVARIANTS[invariant]
    if form and stated != canonical(stated, form):
        raise RejectedError(f"{where}: the value is not in canonical form")
    try:
        value = compute(cyclically_reduced(braid), work)
    except RejectedError as error:
        raise RejectedError(f"{where}: {error}") from None
    if stated != value:
        raise RejectedError(f"{where}: the stated {invariant} is not the recomputed one")


def canonical(value: list[Any], form: int) -> list[Any]:
    """Sorted; in a polynomial no exponent twice and no coefficient zero."""
    if form == 1:
        return sorted(value)
    terms = {tuple(entry[:-1]): entry for entry in value if entry[-1]}
    return [terms[exponents] for exponents in sorted(terms)]


# ---------------------------------------------------------------------------- the moves


def replay(braid: Braid, moves: Sequence[Move], name: str, work: Work) -> Braid:
    """The braid after all moves; raises RejectedError at the first that does not hold."""
    for number, move in enumerate(moves, 1):
        try:
            braid = apply_move(braid, move, work)
        except RejectedError as error:
            raise RejectedError(f"{name} {number} ({move.move}): {error}") from None
    return braid


def apply_move(braid: Braid, move: Move, work: Work) -> Braid:
    """The braid that the move makes of ``braid``; raises RejectedError unless it holds."""
    strands, word = braid
    work.spend(20 + len(word) + len(move.word))
    if move.move == "rewrite":
        check_inside(move.word, strands)
        if not is_equal(strands, move.word, word, work):
            raise RejectedError(
                "the stated word is not equal to the current one in the braid group"
            )
        return Braid(strands, move.word)
    if move.move == "conjugate":
        check_inside(move.by, strands)
        check_inside(move.word, strands)
        if not is_equal(strands, move.by + move.word, word + move.by, work):
            raise RejectedError("the stated word is not equal to the conjugate in the braid group")
        return Braid(strands, move.word)
    if move.move == "stabilize":
        made = Braid(strands + 1, (*word, move.sign * strands))
    elif move.move == "destabilize":
        if word[-1:] != (move.sign * (strands - 1),):  # on one strand: letter 0, in no word
            raise RejectedError("the current word does not end in the letter to be taken away")
        made = Braid(strands - 1, word[:-1])
        check_inside(made.word, made.strands)
    else:
        raise RejectedError("an unknown move")
    if move.strands != made.strands:
        raise RejectedError(f"{move.strands} strands are stated where {made.strands} result")
    if move.word != made.word:
        raise RejectedError("the stated word is not the resulting one, letter by letter")
    return made


def check_inside(word: Iterable[int], strands: int) -> None:
    """Raise RejectedError for a letter that is no generator of the group on ``strands`` strands."""
    for letter in word:
        if not 1 <= abs(letter) < strands:
            raise RejectedError(f"letter {letter} is outside the group on {strands} strands")


# ---------------------------------------------------------------------------- equality


def is_equal(strands: int, first: tuple[int, ...], second: tuple[int, ...], work: Work) -> bool:
    """Whether two words are the same element of the braid group on ``strands`` strands.

    What they have in common is cancelled first, and what remains is shared between both sides:
    x * y^-1 = z holds exactly when x = z * y. So short coordinates stay short.
    """
    quotient = freely_reduced(first + inverse(second))
    half = len(quotient) // 2
    one = coordinates(strands, quotient[:half], work)
    return one == coordinates(strands, inverse(quotient[half:]), work)


def coordinates(strands: int, word: tuple[int, ...], work: Work) -> tuple[list[int], list[int]]:
    """The Dynnikov coordinates of a braid: its action on (0, 1, 0, 1, ..., 0, 1).

    They determine the braid (Dehornoy, Dynnikov, Rolfsen, Wiest, Ordering Braids, 2008, chapter
    on triangulations). A coordinate grows by a few bits a letter at most, which is paid for.
    """
    work.spend(strands)
    a, b = [0] * strands, [1] * strands
    for letter in word:
        i = abs(letter) - 1
        a1, b1, a2, b2 = a[i], b[i], a[i + 1], b[i + 1]
        work.spend(24 + ((a1.bit_length() + b1.bit_length() + b2.bit_length()) >> 9))
        if letter > 0:
            c = a1 - min(b1, 0) - a2 + max(b2, 0)
            a[i], b[i] = a1 + max(b1, 0) + max(max(b2, 0) - c, 0), b2 - max(c, 0)
            a[i + 1], b[i + 1] = a2 + min(b2, 0) + min(min(b1, 0) + c, 0), b1 + max(c, 0)
        else:
            c = a1 + min(b1, 0) - a2 - max(b2, 0)
            a[i], b[i] = a1 - max(b1, 0) - max(max(b2, 0) + c, 0), b2 + min(c, 0)
            a[i + 1], b[i + 1] = a2 - min(b2, 0) - min(min(b1, 0) - c, 0), b1 - min(c, 0)
    return a, b


def inverse(word: tuple[int, ...]) -> tuple[int, ...]:
    """The inverse word."""
    return tuple(-letter for letter in reversed(word))


def freely_reduced(word: Iterable[int]) -> tuple[int, ...]:
    """The word without neighbouring pairs i, -i."""
    reduced: list[int] = []
    for letter in word:
        if reduced and reduced[-1] == -letter:
            reduced.pop()
        else:
            reduced.append(letter)
    return tuple(reduced)


def cyclically_reduced(braid: Braid) -> Braid:
    """A freely reduced conjugate without a cancelling pair of ends: the same closure."""
    word = freely_reduced(braid.word)
    cut = 0
    while 2 * cut + 1 < len(word) and word[cut] == -word[-1 - cut]:
        cut += 1
    return Braid(braid.strands, word[cut : len(word) - cut])


# ---------------------------------------------------------------------------- the strict reader

# A reader takes a JSON value and returns what it says; what holds it puts the place in front of
# its complaint. Each table gives the keys of a kind of object and the readers of their values.
Reader = Callable[[Any], Any]


def read_certificate(text: str | bytes) -> Claim:
    """The claim in a certificate's text; raises UnreadableError for anything outside the format."""
    data = read_json(text)
    claim = Claim(**read_object(data, chosen(data, "verdict", CLAIMS)))
    if len({item.symmetry for item in claim.distinctions}) < len(claim.distinctions):
        raise UnreadableError("distinctions: expected each symmetry at most once")
    return claim


def read_json(text: str | bytes) -> Any:
    """The JSON value, read strictly: no key twice, no fraction, nothing after the value."""
    if not isinstance(text, str | bytes):
        raise UnreadableError("expected the certificate as text")
    if len(text) > MAX_FILE_BYTES:
        raise UnreadableError(f"the file is too large: expected at most {MAX_FILE_BYTES} bytes")
    try:
        decoded = text.decode("utf-8") if isinstance(text, bytes) else text
        if not decoded.strip():
            raise UnreadableError("the file is empty: expected a JSON object")
        return json.loads(
            decoded,
            object_pairs_hook=read_pairs,
            parse_int=read_digits,
            parse_float=refuse_number,
            parse_constant=refuse_number,
        )
    except UnicodeDecodeError as error:
        raise UnreadableError(f"not UTF-8 text: byte {error.start} is not part of it") from None
    except json.JSONDecodeError as error:
        place = f"line {error.lineno}, column {error.colno}"
        raise UnreadableError(f"not a JSON value: {error.msg} at {place}") from None
    except RecursionError:
        raise UnreadableError("lists or objects are nested too deeply") from None


def read_pairs(pairs: list[tuple[str, Any]]) -> dict[str, Any]:
    """An object, in which no key may stand twice."""
    data: dict[str, Any] = {}
    for key, value in pairs:
        if key in data:
            raise UnreadableError(f"the key {shown(key)} stands twice in one object")
        data[key] = value
    return data


def read_digits(digits: str) -> int:
    """An integer of bounded size."""
    if len(digits) > MAX_DIGITS:
        raise UnreadableError(f"an integer of {len(digits)} digits: expected at most {MAX_DIGITS}")
    return int(digits)


def refuse_number(text: str) -> NoReturn:
    """Refuse fractions, exponents and what is no number at all."""
    raise UnreadableError(f"the number {shown(text)}: expected integers only")


def read_object(data: Any, readers: dict[str, Reader]) -> dict[str, Any]:
    """An object with exactly the keys of ``readers``, each value read by its reader."""
    if type(data) is not dict:
        raise UnreadableError(f"{shown(data)}: expected an object")
    for key in data:
        if key not in readers:
            raise UnreadableError(f"the unknown key {shown(key)}")
    for key in readers:
        if key not in data:
            raise UnreadableError(f"the key {shown(key)} is missing")
    return {key: read_inside(key, reader, data[key]) for key, reader in readers.items()}


def read_inside(place: str, reader: Reader, data: Any) -> Any:
    """A value inside another; a complaint about it says where it stands."""
    try:
        return reader(data)
    except UnreadableError as error:
        raise UnreadableError(f"{place}: {error}") from None


def chosen(data: Any, key: str, table: dict[str, Any]) -> Any:
    """The entry of ``table`` that the object ``data`` names under ``key``."""
    if type(data) is not dict:
        raise UnreadableError(f"{shown(data)}: expected an object")
    if key not in data:
        raise UnreadableError(f"the key {shown(key)} is missing")
    return table[read_inside(key, one_of(*table), data[key])]


def one_of(*allowed: str | int) -> Reader:
    """A reader of one of a few values; true is not 1."""

    def read(data: Any) -> Any:
        if not any(type(data) is type(value) and data == value for value in allowed):
            raise UnreadableError(f"{shown(data)}: expected {' or '.join(map(str, allowed))}")
        return data

    return read


def list_of(reader: Reader, most: int, least: int = 0) -> Reader:
    """A reader of a list of ``least`` to ``most`` entries."""

    def read(data: Any) -> list[Any]:
        if type(data) is not list:
            raise UnreadableError(f"{shown(data)}: expected a list")
        if not least <= len(data) <= most:
            span = f"{least} to {most}" if least < most else f"{most}"
            raise UnreadableError(f"{len(data)} entries: expected {span}")
        entries: list[Any] = []
        try:
            entries.extend(map(reader, data))
        except UnreadableError as error:
            raise UnreadableError(f"entry {len(entries) + 1}: {error}") from None
        return entries

    return read


def read_integer(data: Any) -> int:
    """An integer; true and false are none."""
    if type(data) is not int:
        raise UnreadableError(f"{shown(data)}: expected an integer")
    return data


def read_letter(data: Any) -> int:
    """A generator of some braid group or its inverse; of which group, the strands say."""
    if type(data) is not int or not 1 <= abs(data) < MAX_STRANDS:
        limit = MAX_STRANDS - 1
        raise UnreadableError(f"{shown(data)}: expected an integer, 1 to {limit} or -1 to -{limit}")
    return data


def read_strands(data: Any) -> int:
    """A strand count."""
    if type(data) is not int or not 1 <= data <= MAX_STRANDS:
        raise UnreadableError(f"{shown(data)}: expected an integer, 1 to {MAX_STRANDS}")
    return data


def read_word(data: Any) -> tuple[int, ...]:
    """A word."""
    return tuple(list_of(read_letter, MAX_LETTERS)(data))


def read_braid(data: Any) -> Braid:
    """A strand count and a word inside its group."""
    braid = Braid(**read_object(data, {"strands": read_strands, "word": read_word}))
    try:
        check_inside(braid.word, braid.strands)
    except RejectedError as error:
        raise UnreadableError(str(error)) from None
    return braid


def read_move(data: Any) -> Move:
    """One move; whether it holds is for ``apply_move`` to say."""
    return Move(**read_object(data, chosen(data, "move", MOVES)))


def read_distinction(data: Any) -> Distinction:
    """One distinction, its two values in the form that the invariant has."""
    form, _ = chosen(data, "invariant", INVARIANTS)
    readers = {
        "symmetry": one_of(*SYMMETRIES),
        "invariant": one_of(*INVARIANTS),
        "parameters": lambda given: read_object(given, {}),
        "left_moves": list_of(read_move, MAX_MOVES),
        "right_moves": list_of(read_move, MAX_MOVES),
        "left": value_reader(form),
        "right": value_reader(form),
    }
    return Distinction(**read_object(data, readers))


def value_reader(form: int) -> Reader:
    """For an integer (form 0), a list of integers (1), or a list of lists of ``form`` integers."""
    if form == 0:
        return read_integer
    entry = read_integer if form == 1 else list_of(read_integer, form, form)
    return list_of(entry, MAX_FILE_BYTES)


SIGNED: dict[str, Reader] = {
    "move": one_of("stabilize", "destabilize"),
    "sign": one_of(1, -1),
    "strands": read_strands,
    "word": read_word,
}
MOVES: dict[str, dict[str, Reader]] = {
    "rewrite": {"move": one_of("rewrite"), "word": read_word},
    "conjugate": {"move": one_of("conjugate"), "by": read_word, "word": read_word},
    "stabilize": SIGNED,
    "destabilize": SIGNED,
}
HEADER: dict[str, Reader] = {
    "format": one_of("braidsearch certificate"),
    "version": one_of(1),
    "left": read_braid,
    "right": read_braid,
    "verdict": one_of("same", "different"),
}
CLAIMS: dict[str, dict[str, Reader]] = {
    "same": {
        **HEADER,
        "symmetry": one_of(*SYMMETRIES),
        "moves": list_of(read_move, MAX_MOVES),
    },
    "different": {
        **HEADER,
        "distinctions": list_of(read_distinction, len(SYMMETRIES), least=1),
    },
}


def shown(value: object) -> str:
    """A value as a message quotes it: in JSON's plain characters, one line, cut short."""
    if isinstance(value, list | dict):
        return "a list" if isinstance(value, list) else "an object"
    text = json.dumps(value)
    return text if len(text) <= 40 else text[:37] + "..."


def format_braid(braid: Braid) -> str:
    """The strand count, a colon and the letters, long words cut short."""
    letters = " ".join(map(str, braid.word[:24]))
    cut = f" ... {len(braid.word)} letters" if len(braid.word) > 24 else ""
    return f"{braid.strands}: {letters}{cut}".strip()


# ---------------------------------------------------------------------------- the invariants
#
# Each is a function of a cyclically reduced word, paid for from the work that is left.


def component_numbers(braid: Braid) -> list[int]:
    """For each position at the top, the number of the component that passes there, from 0."""
    start_of = list(range(braid.strands))
    for letter in braid.word:
        i = abs(letter) - 1
        start_of[i], start_of[i + 1] = start_of[i + 1], start_of[i]
    numbers = [-1] * braid.strands
    count = 0
    for first in range(braid.strands):
        if numbers[first] < 0:
            position = first
            while numbers[position] < 0:
                numbers[position] = count
                position = start_of[position]
            count += 1
    return numbers


def components(braid: Braid, work: Work) -> int:
    """The number of components."""
    work.spend(len(braid.word) + braid.strands)
    return max(component_numbers(braid)) + 1


def linking_numbers(braid: Braid, work: Work) -> list[int]:
    """The linking numbers of all pairs of components, sorted: half the signed crossings."""
    return sorted(crossings // 2 for crossings in signed_crossings(braid, work).values())


def linking_sums(braid: Braid, work: Work) -> list[int]:
    """For each component, the sum of its linking numbers with all others; sorted."""
    sums = [0] * components(braid, work)
    for pair, crossings in signed_crossings(braid, work).items():
        for number in pair:
            sums[number] += crossings // 2
    return sorted(sums)


def signed_crossings(braid: Braid, work: Work) -> dict[tuple[int, int], int]:
    """The sum of the signs of the crossings between each two components, an even number."""
    row = component_numbers(braid)
    count = max(row) + 1
    work.spend(4 * len(braid.word) + braid.strands + 4 * count * count)
    doubled = {(one, two): 0 for two in range(count) for one in range(two)}
    for letter in braid.word:
        i = abs(letter) - 1
        if row[i] != row[i + 1]:
            doubled[min(row[i], row[i + 1]), max(row[i], row[i + 1])] += 1 if letter > 0 else -1
        row[i], row[i + 1] = row[i + 1], row[i]
    return doubled


# A Seifert surface of the closed braid: a disc for each strand, a twisted band for each letter.


def seifert_form(braid: Braid, work: Work) -> list[dict[int, int]]:
    """The Seifert matrix V, as the non-zero entries of its rows.

    A basis of the surface's first homology: the loops through two successive bands of a column
    (Collins, An algorithm for computing the Seifert matrix of a link from a braid
    representation, 2016). Two loops of one column meet in a shared band; two loops of
    neighbouring columns meet in a disc when their bands alternate there. They are ordered by
    their first band, so the matrix is narrow. Where discs stay apart, V is a direct sum.
    """
    word = braid.word
    bands: list[list[int]] = [[] for _ in range(braid.strands + 1)]
    for time, letter in enumerate(word):
        bands[abs(letter)].append(time)
    loops = sorted(
        (at, column, k)
        for column in range(1, braid.strands)
        for k, at in enumerate(bands[column][:-1])
    )
    number = {(column, k): i for i, (_, column, k) in enumerate(loops)}
    work.spend(len(word) + braid.strands + 30 * len(loops))
    form: list[dict[int, int]] = [{} for _ in loops]
    for i, (first, column, k) in enumerate(loops):
        last = bands[column][k + 1]
        signs = [1 if word[at] > 0 else -1 for at in (first, last)]
        if sum(signs):
            form[i][i] = -sum(signs) // 2
        if (column, k + 1) in number:
            j = number[column, k + 1]
            row, entry, to = (i, 1, j) if signs[1] > 0 else (j, -1, i)
            form[row][to] = entry
        beside = bands[column + 1]
        for end, entry in ((last, 1), (first, -1)):
            m = bisect_left(beside, end) - 1  # the loop beside whose two bands lie round the end
            if m >= 0 and (column + 1, m) in number:
                inside = first < beside[m] if end == last else beside[m + 1] < last
                if inside:
                    form[i][number[column + 1, m]] = entry
    return form


def alexander(braid: Braid, work: Work) -> list[list[int]]:
    """The Alexander polynomial det(V - t V^T), lowest exponent 0, lowest coefficient positive.

    It is zero when the surface falls apart. The determinant is taken at small t modulo a prime
    and interpolated. A row of the matrix has, for |t| = 1, one entry of at most 2 and at most
    six of 1; so by Hadamard and Parseval no coefficient exceeds 10^(N/2) < 2^(5N/3), which is
    below half the prime. t^N det(V - V^T / t) = (-1)^N det(V - t V^T), so t serves for 1/t too.
    """
    if len({abs(letter) for letter in braid.word}) < braid.strands - 1:
        return []
    form = seifert_form(braid, work)
    size = len(form)
    pattern: list[dict[int, tuple[int, int]]] = [{} for _ in form]
    for i, row in enumerate(form):
        for j, entry in row.items():
            pattern[i][j] = (entry, form[j].get(i, 0))
            pattern[j][i] = (form[j].get(i, 0), entry)
    prime = mersenne_prime(5 * size // 3 + 3)
    points, values = [], []
    for t in range(2, size // 2 + 3):
        rows = [{j: (v - t * w) % prime for j, (v, w) in row.items()} for row in pattern]
        value = determinant(rows, prime, work)
        points += [t, pow(t, -1, prime)]
        values += [value, value * (-1) ** size * pow(points[-1], size, prime) % prime]
    coefficients = interpolate(points[: size + 1], values[: size + 1], prime, work)
    terms = [[exponent, c] for exponent, c in enumerate(coefficients) if c]
    unit = 1 if terms and terms[0][1] > 0 else -1
    return [[exponent - terms[0][0], unit * c] for exponent, c in terms]


def signature(braid: Braid, work: Work) -> int:
    """The signature of V + V^T, -2 for the right-handed trefoil; over split parts, the sum.

    The symmetric matrix is reduced over the rationals by congruences, one basis vector e at a
    time. When e * e = 0 but e * f is not, one of e + f and e - f serves in the place of e.
    """
    form = seifert_form(braid, work)
    rows: list[dict[int, Fraction]] = [{} for _ in form]
    for i, entries in enumerate(form):
        for j, entry in entries.items():
            add_entry(rows, i, j, Fraction(2 * entry if i == j else entry))
    result = 0
    for k, row in enumerate(rows):
        if row and k not in row:
            f = min(row)
            double, square = 2 * row[f], rows[f].get(f, Fraction(0))
            sign = -1 if square == -double else 1
            for j, number in list(rows[f].items()):
                if j != k:
                    add_entry(rows, k, j, sign * number)
            add_entry(rows, k, k, square + sign * double)
        if row:
            result += 1 if row[k] > 0 else -1
            split_off(rows, k, work)
    return result


def split_off(rows: list[dict[int, Fraction]], k: int, work: Work) -> None:
    """Make all other basis vectors orthogonal to the k-th, then take it away."""
    row, rows[k] = dict(rows[k]), {}
    square = row.pop(k)
    bits = square.numerator.bit_length() + square.denominator.bit_length()
    work.spend(len(row) * len(row) * (40 + bits // 8 + bits * bits // 8000))
    for i, entry in row.items():
        del rows[i][k]
        for j, other in row.items():
            if i <= j:
                add_entry(rows, i, j, -entry * other / square)


def add_entry(rows: list[dict[int, Fraction]], i: int, j: int, entry: Fraction) -> None:
    """Add to one entry of a sparse symmetric matrix and to its mirror image."""
    value = rows[i].get(j, Fraction(0)) + entry
    if value:
        rows[i][j] = rows[j][i] = value
    elif j in rows[i]:
        del rows[i][j]
        rows[j].pop(i, None)


# Arithmetic modulo a prime that is larger than what is wanted.

MERSENNE_EXPONENTS = (127, 521, 607, 1279, 2203, 2281, 3217, 4253, 4423, 9689, 9941, 11213)


def mersenne_prime(bits: int) -> int:
    """A prime above 2^bits; for numbers of no more than bits - 1 bits it leaves room for a sign."""
    for exponent in MERSENNE_EXPONENTS:
        if exponent > bits:
            return (1 << exponent) - 1
    raise RejectedError(f"too large for this verifier: coefficients of {bits} bits")


def determinant(rows: list[dict[int, int]], prime: int, work: Work) -> int:
    """The determinant modulo the prime of a sparse square matrix, by elimination row by row.

    A row is multiplied by the leading entry of the row to be subtracted, so nothing is divided
    until the end.
    """
    product, multiplied, cost = 1, 1, 8 + (prime.bit_length() >> 5)
    above: dict[int, tuple[int, dict[int, int]]] = {}  # column -> leading entry, what follows it
    for given in rows:
        row = dict(given)
        while row and min(row) in above:
            lead, subtracted = above[min(row)]
            factor = row.pop(min(row))
            work.spend((len(row) + len(subtracted) + 2) * cost)
            multiplied = multiplied * lead % prime
            for column in {*row, *subtracted}:
                entry = row.get(column, 0) * lead - factor * subtracted.get(column, 0)
                row[column] = entry % prime
            row = {column: entry for column, entry in row.items() if entry}
        if not row:
            return 0
        column = min(row)
        lead = row.pop(column)
        product = product * lead % prime
        above[column] = lead, row
    return permutation_sign(list(above)) * product * pow(multiplied, -1, prime) % prime


def permutation_sign(places: list[int]) -> int:
    """1 for an even permutation of 0, 1, 2, ..., -1 for an odd one, by counting exchanges."""
    sign = 1
    for i in range(len(places)):
        while places[i] != i:
            j = places[i]
            places[i], places[j] = places[j], j
            sign = -sign
    return sign


def interpolate(points: list[int], values: list[int], prime: int, work: Work) -> list[int]:
    """The coefficients of the polynomial through as many points, of least absolute residue."""
    size = len(points)
    work.spend(size * size * (8 + (prime.bit_length() >> 6)) + 10)
    product = [1]  # of all (x - point), lowest power first
    for point in points:
        shifted = [0, *product]
        product = [(s - point * c) % prime for s, c in zip(shifted, [*product, 0], strict=True)]
    result = [0] * size
    for point, value in zip(points, values, strict=True):
        quotient, at_point = [0] * size, 0
        for power in range(size, 0, -1):
            above = quotient[power] if power < size else 0
            quotient[power - 1] = (product[power] + point * above) % prime
        for c in reversed(quotient):
            at_point = (at_point * point + c) % prime
        scale = value * pow(at_point, -1, prime) % prime
        result = [(r + scale * c) % prime for r, c in zip(result, quotient, strict=True)]
    return [r - prime if 2 * r > prime else r for r in result]


# The bracket of the diagram, summed over the states of a growing part of it.

Crossing = tuple[int, int, int, int, int]  # arcs: in left, in right, out left, out right; sign


def crossings_of(braid: Braid) -> tuple[list[Crossing], int]:
    """The crossings of the closed braid's diagram, and the number of circles without any."""
    arcs = list(range(braid.strands))
    diagram: list[list[int]] = []
    for letter in braid.word:
        i = abs(letter) - 1
        out = braid.strands + 2 * len(diagram)
        diagram.append([arcs[i], arcs[i + 1], out, out + 1, 1 if letter > 0 else -1])
        arcs[i], arcs[i + 1] = out, out + 1
    closed = {arc: top for top, arc in enumerate(arcs)}
    crossings = [(a, b, closed.get(c, c), closed.get(d, d), sign) for a, b, c, d, sign in diagram]
    return crossings, sum(arc == top for top, arc in enumerate(arcs))


def sweep(crossings: list[Crossing], first: int, work: Work) -> tuple[int, list[Crossing]]:
    """An order of the crossings, from the given one on, that keeps few arcs open, with its cost.

    The next crossing is one with most open arcs, then the one with the oldest. The cost is the
    sum of the Catalan numbers that bound how many states there are.
    """
    ends: dict[int, list[int]] = {}
    for index, crossing in enumerate(crossings):
        for arc in crossing[:4]:
            ends.setdefault(arc, []).append(index)
    waiting = dict.fromkeys(range(len(crossings)))
    opened: dict[int, int] = {}  # open arc -> when it was opened
    order, cost, age = [], 0, 0
    index = first
    while True:
        del waiting[index]
        order.append(crossings[index])
        for arc in crossings[index][:4]:
            age += 1
            if opened.pop(arc, None) is None:
                opened[arc] = age
        cost += comb(len(opened), len(opened) // 2) // (len(opened) // 2 + 1)
        work.spend(20 + 20 * len(opened))
        near = {k for arc in opened for k in ends[arc] if k in waiting}
        if not waiting:
            return cost, order
        index = min(near or waiting, key=lambda k: rank(crossings[k], opened))


def rank(crossing: Crossing, opened: dict[int, int]) -> tuple[int, int]:
    """How little a crossing recommends itself as the next of a sweep."""
    ages = [opened[arc] for arc in crossing[:4] if arc in opened]
    return len(set(crossing[:4])) - len(ages), min(ages, default=0)


def join(partner: dict[int, int], one: int, two: int) -> int:
    """Join two arc ends in a matching of open ends; returns 1 if that closes a circle, else 0."""
    if one == two:
        return 1
    far_one, far_two = partner.pop(one, one), partner.pop(two, two)
    if far_one == two:
        return 1
    partner[far_one], partner[far_two] = far_two, far_one
    return 0


class Packed(NamedTuple):
    """q^low times a polynomial in q^2, which is held as the integer that it is at q^2 = 2^width."""

    low: int
    value: int


def jones(braid: Braid, work: Work) -> list[list[int]]:
    """The Jones polynomial, exponents counting half powers of t.

    V = (-A^3)^(-writhe) <D> with t = A^-4 (Kauffman, State models and the Jones polynomial,
    1987), where <positive crossing> = A <both strands on> + 1/A <turned back>, a circle is worth
    -(A^2 + A^-2) and one circle is worth 1. A state of the swept part is a matching of its open
    arcs; its value is a polynomial in q = A^2 whose exponents have one parity, since the change
    of one smoothing changes the number of circles by one. L letters on n strands have 2^L states
    of at most L + n circles, so the absolute values of all coefficients sum to at most
    2^(2L + n), and width = 2L + n + 2 keeps them apart.
    """
    crossings, free = crossings_of(braid)
    letters = len(crossings)
    width = 2 * letters + braid.strands + 2
    starts = range(0, letters, letters // 12 + 1)
    order = min((sweep(crossings, start, work) for start in starts), default=(0, []))[1]
    opened: list[int] = []
    states: dict[tuple[int, ...], Packed] = {(): Packed(0, 1)}
    for crossing in order:
        opened, states = add_crossing(opened, states, crossing, width, work)
    total = states[()]
    for _ in range(free):
        work.spend(40 + (total.value.bit_length() >> 10))
        total = times_circle(total, width)
    numbers = divide_by_circle(unpack(total.value, width, work))
    # Each crossing had q and 1 in place of A and 1/A; the circle divided by was q^-1 (1 + q^2).
    writhe = sum(crossing[4] for crossing in crossings)
    low, unit = 2 * (total.low + 1) - letters - 3 * writhe, -1 if writhe % 2 else 1
    return sorted([-low // 2 - 2 * power, unit * c] for power, c in enumerate(numbers) if c)


def add_crossing(
    opened: list[int],
    states: dict[tuple[int, ...], Packed],
    crossing: Crossing,
    width: int,
    work: Work,
) -> tuple[list[int], dict[tuple[int, ...], Packed]]:
    """Both smoothings of one more crossing: the arcs then open, and the states.

    A state lists the partner of each open arc, in the order of the open arcs.
    """
    a, b, c, d, sign = crossing
    arcs = (a, b, c, d)
    after = [arc for arc in opened if arc not in arcs]
    after += [arc for arc in arcs if arc not in opened and arcs.count(arc) == 1]
    through, back = ((a, c), (b, d)), ((a, b), (c, d))
    result: dict[tuple[int, ...], Packed] = {}
    bits = 0
    for state, packed in states.items():
        bits += packed.value.bit_length()
        if bits > MAX_STATE_BITS:
            raise RejectedError("too large for this verifier: the state sum of the bracket")
        work.spend(80 + 4 * len(opened) + (packed.value.bit_length() >> 8))
        for power, pairs in ((1, through), (0, back)) if sign > 0 else ((0, through), (1, back)):
            partner = dict(zip(opened, state, strict=True))
            circles = sum(join(partner, one, two) for one, two in pairs)
            term = Packed(packed.low + power, packed.value)
            for _ in range(circles):
                term = times_circle(term, width)
            key = tuple(partner[arc] for arc in after)
            result[key] = add_packed(result[key], term, width) if key in result else term
    return after, result


def times_circle(packed: Packed, width: int) -> Packed:
    """The product with -(q + 1/q)."""
    return Packed(packed.low - 1, -(packed.value + (packed.value << width)))


def add_packed(one: Packed, two: Packed, width: int) -> Packed:
    """The sum of two polynomials whose exponents have the same parity."""
    if one.low > two.low:
        one, two = two, one
    if (two.low - one.low) % 2:
        raise RejectedError("exponents of both parities in one state of the bracket")
    return Packed(one.low, one.value + (two.value << width * ((two.low - one.low) // 2)))


def unpack(value: int, width: int, work: Work) -> list[int]:
    """The coefficients of a polynomial from its value at 2^width, lowest power first."""
    coefficients = []
    while value:
        work.spend(10 + (value.bit_length() >> 10))
        digit = value & ((1 << width) - 1)
        digit -= (digit >> (width - 1)) << width
        coefficients.append(digit)
        value = (value - digit) >> width
    return coefficients


def divide_by_circle(numbers: list[int]) -> list[int]:
    """The quotient of a polynomial in q^2 by -(1 + q^2), lowest power first."""
    quotient = [0]
    for number in numbers:
        quotient.append(-number - quotient[-1])
    if quotient[-1]:
        raise RejectedError("the state sum is not a multiple of a circle's value")
    return quotient[1:-1]


# Characters of the Hecke algebra, in Young's seminormal form.


def lattice_words(size: int) -> dict[tuple[int, ...], list[tuple[int, ...]]]:
    """The standard tableaux of each shape; the k-th entry is the row in which k + 1 stands."""
    found: dict[tuple[int, ...], tuple[int, ...]] = {(): (0,) * size}  # tableau -> row lengths
    for _ in range(size):
        longer = {}
        for rows, shape in found.items():
            for row in range(size):
                if row == 0 or shape[row - 1] > shape[row]:
                    grown = (*shape[:row], shape[row] + 1, *shape[row + 1 :])
                    longer[(*rows, row)] = grown
        found = longer
    tableaux: dict[tuple[int, ...], list[tuple[int, ...]]] = {}
    for rows, shape in found.items():
        tableaux.setdefault(shape, []).append(rows)
    return tableaux


def homfly(braid: Braid, work: Work) -> list[list[int]]:
    """The HOMFLY-PT polynomial P as terms [v exponent, z exponent, coefficient].

    P = v^writhe * sum over shapes s of n boxes of weight(s) * character_s(word), where sigma_i
    acts on the Hecke algebra's module s with eigenvalues q and -1/q, z = q - 1/q (Jones, Hecke
    algebra representations of braid groups and link polynomials, 1987). Evaluated at small q
    modulo a prime and interpolated in z.

    Bounds, by expanding the word in the standard basis T_w and taking the trace strand by
    strand: L letters give coefficients of T_w of degree at most L - length(w) in z whose
    absolute values sum to 2^L at most; the trace of T_w times z^(n-1) has degree at most
    length(w) and norm at most 2^(n(n-1)/2). So z^(n-1) P has degree at most L in z,
    coefficients of at most L + n(n-1)/2 bits, and the exponents of z in it have the parity of L.
    """
    strands, letters = braid.strands, len(braid.word)
    count = letters // 2 + 1
    bits = letters + strands * (strands - 1) // 2 + 3
    prime = mersenne_prime(bits)
    cost = 2 + (prime.bit_length() ** 2 >> 15)
    work.spend(count * (letters + strands) * factorial(strands) * cost)
    points: list[int] = []
    rows: list[list[int]] = []
    q = 1
    modules = [module(shape, tableaux) for shape, tableaux in lattice_words(strands).items()]
    while len(points) < count:
        q += 1
        z = (q - pow(q, -1, prime)) % prime
        points.append(z * z % prime)
        scale = pow(z, strands - 1 - letters % 2, prime)
        rows.append([scale * c % prime for c in trace_at(q, modules, braid, prime)])
    writhe = sum(1 if letter > 0 else -1 for letter in braid.word)
    terms = []
    for k, values in enumerate(zip(*rows, strict=True)):
        for power, c in enumerate(interpolate(points, list(values), prime, work)):
            if c:
                exponent = 2 * power + letters % 2 - (strands - 1)
                terms.append([writhe - (strands - 1) + 2 * k, exponent, c])
    return sorted(terms)


class Module(NamedTuple):
    """A module of the Hecke algebra: a shape, and how each generator moves its tableaux.

    ``actions[i - 1]`` holds for each tableau the content of the box of i + 1 less that of i, and
    the number of the tableau with i and i + 1 exchanged, -1 where that is none.
    """

    shape: tuple[int, ...]
    actions: list[list[tuple[int, int]]]


def module(shape: tuple[int, ...], tableaux: list[tuple[int, ...]]) -> Module:
    """The module of one shape."""
    number = {rows: index for index, rows in enumerate(tableaux)}
    actions: list[list[tuple[int, int]]] = [[] for _ in range(len(shape) - 1)]
    for rows in tableaux:
        contents = [rows[:k].count(row) - row for k, row in enumerate(rows)]
        for i, action in enumerate(actions):
            exchanged = (*rows[:i], rows[i + 1], rows[i], *rows[i + 2 :])
            other = number.get(exchanged, -1) if exchanged != rows else -1
            action.append((contents[i + 1] - contents[i], other))
    return Module(shape, actions)


def trace_at(q: int, modules: list[Module], braid: Braid, prime: int) -> list[int]:
    """v^-writhe P at one q modulo the prime: the coefficients of v^(1-n), v^(3-n), ..., v^(n-1)."""
    span = range(-braid.strands, braid.strands + 1)
    powers = {k: pow(q, k, prime) for k in span}
    z = powers[1] - powers[-1]
    diagonal = {d: z * pow(1 - pow(q, -2 * d, prime), -1, prime) % prime for d in span if d}
    total = [0] * braid.strands
    for item in modules:
        scale = character(item, braid, diagonal, powers, prime)
        for k, c in enumerate(weight(item.shape, powers, prime)):
            total[k] = (total[k] + scale * c) % prime
    return total


def weight(shape: tuple[int, ...], powers: dict[int, int], prime: int) -> list[int]:
    """The weight of a module in the trace, over that of an unknot, as a polynomial in v.

    It is the product over the boxes of (q^c / v - v / q^c) / (q^h - q^-h), with c the content
    and h the hook length; the corner box, where c = 0, gives the unknot's (1/v - v) / z.
    """
    columns = [sum(length > column for length in shape) for column in range(shape[0])]
    coefficients, divisor = [powers[1] - powers[-1]], 1
    for row, length in enumerate(shape):
        for column in range(length):
            hook = length - column + columns[column] - row - 1
            divisor = divisor * (powers[hook] - powers[-hook]) % prime
            if row or column:
                up, down = powers[column - row], powers[row - column]
                pairs = zip([*coefficients, 0], [0, *coefficients], strict=True)
                coefficients = [(up * c - down * d) % prime for c, d in pairs]
    factor = pow(divisor, -1, prime)
    return [c * factor % prime for c in coefficients]


def character(
    item: Module, braid: Braid, diagonal: dict[int, int], powers: dict[int, int], prime: int
) -> int:
    """The trace of the word on one module, at one q modulo the prime.

    Seminormal form: g T = a T + (1/q + a) T', a = (q - 1/q) / (1 - q^(-2d)), where T' has i and
    i + 1 exchanged and d is the difference of their contents; g - 1/g = z (Hoefsmit,
    Representations of Hecke algebras of finite groups with BN-pairs of classical type, 1974).
    ``diagonal`` holds a for each d. Where there is no T', its factor is zero.
    """
    z = powers[1] - powers[-1]
    tables: dict[int, list[tuple[int, int, int]]] = {}
    for i, action in enumerate(item.actions, 1):
        rows = [(diagonal[d], diagonal[d] + powers[-1], to) for d, to in action]
        tables[i] = [(a, b, to) if to >= 0 else (a, 0, 0) for a, b, to in rows]
        tables[-i] = [(a - z, b, to) for a, b, to in tables[i]]
    trace = 0
    dimension = len(item.actions[0]) if item.actions else 1
    for k in range(dimension):
        row = [0] * dimension
        row[k] = 1
        for letter in braid.word:
            steps = zip(row, tables[letter], strict=True)
            row = [(x * a + row[to] * b) % prime for x, (a, b, to) in steps]
        trace += row[k]
    return trace % prime


INVARIANTS: dict[str, tuple[int, Callable[[Braid, Work], Any]]] = {
    "components": (0, components),
    "linking-numbers": (1, linking_numbers),
    "linking-sums": (1, linking_sums),
    "alexander": (2, alexander),
    "jones": (2, jones),
    "homfly": (3, homfly),
    "signature": (0, signature),
}


# ---------------------------------------------------------------------------- the command line

USAGE = "usage: verify.py FILE [--left WORD] [--right WORD] [--json]"
HELP = f"""{USAGE}

Check a braidsearch certificate. WORD is signed integers, such as "1 -2 1 -2", with the strand
count in front where it is more than the word needs: "4: 1 -2 1 -2". With --left or --right the
certificate must be about exactly these braids. Exit status: 0 valid, 1 rejected, 2 unreadable.
"""
INTEGER = "[+-]?[0-9]{1,9}"
WORD = re.compile(rf"\s*(?:([0-9]{{1,9}})\s*:)?\s*({INTEGER}(?:(?:\s*,\s*|\s+){INTEGER})*)?\s*")


class UsageError(Exception):
    """The command line cannot be understood; the message says why."""


def main(arguments: Sequence[str]) -> int:
    """Run the command line (without the program's name); returns the exit status."""
    try:
        options = parse_arguments(arguments)
        if options is None:
            return write(HELP, 0)
        report = verify_file(options["file"], options.get("left"), options.get("right"))
    except UsageError as error:
        return complain(f"{error}; {USAGE}")
    except KeyboardInterrupt:
        return complain("interrupted: nothing is shown")
    status = {"valid": 0, "rejected": 1}.get(report.status, 2)
    if options.get("json"):
        data = {"valid": report.valid, "claim": report.claim, "reason": report.reason}
        return write(json.dumps(data) + "\n", status)
    if report.status == "unreadable":
        return complain(f"unreadable: {report.reason}")
    return write(f"{report.status}: {report.reason}\nclaim: {report.claim}\n", status)


def complain(text: str) -> int:
    """Write one line to standard error; returns the exit status for it."""
    if sys.stderr is not None:
        print(text, file=sys.stderr)
    return 2


def write(text: str, status: int) -> int:
    """Write to standard output; what could not be said in full does not end in success."""
    if sys.stdout is None:
        return 2
    try:
        sys.stdout.write(text)
        sys.stdout.flush()
    except OSError:  # the reader has gone: nothing may be tried again at exit
        os.dup2(os.open(os.devnull, os.O_WRONLY), sys.stdout.fileno())
        return 2
    return status


def parse_arguments(arguments: Sequence[str]) -> dict[str, Any] | None:
    """The options by name, None when help is asked for; raises UsageError."""
    options: dict[str, Any] = {}
    waiting = iter(arguments)
    for argument in waiting:
        option, equals, value = argument.partition("=")
        if argument in ("-h", "--help"):
            return None
        name, given = "file", argument
        if argument == "--json":
            name = "json"
        elif option in ("--left", "--right"):
            name, given = option[2:], value if equals else next(waiting, "")
        elif argument.startswith("-"):
            raise UsageError(f"unknown option {shown(argument)}")
        if name in options:
            raise UsageError(f"{shown(argument)}: {name} is given already")
        options[name] = parse_word(given, option) if name in ("left", "right") else given
    if "file" not in options:
        raise UsageError("no FILE is given")
    return options


def parse_word(text: str, option: str) -> Braid:
    """A braid from signed integers with, perhaps, "n:" in front; raises UsageError."""
    match = WORD.fullmatch(text)
    if match is None or not text.strip():
        raise UsageError(f'{option} {shown(text)}: expected signed integers such as "1 -2 1 -2"')
    word = tuple(int(token) for token in re.findall(INTEGER, match[2] or ""))
    needed = max(map(abs, word), default=0) + 1
    strands = int(match[1]) if match[1] else needed
    if 0 in word or not needed <= strands <= MAX_STRANDS:
        raise UsageError(
            f"{option} {shown(text)}: expected letters within 1 to {MAX_STRANDS} strands"
        )
    return Braid(strands, word)


if __name__ == "__main__":
    sys.exit(main(sys.argv[1:]))
