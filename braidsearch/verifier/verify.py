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
from collections import Counter
from collections.abc import Callable, Iterable, Iterator, Sequence
from dataclasses import dataclass
from fractions import Fraction
from itertools import chain, combinations, compress, pairwise
from math import comb, factorial, gcd, isqrt
from operator import eq
from typing import Any, NamedTuple, NoReturn

MAX_FILE_BYTES = 16_000_000
MAX_STRANDS = 1_000
MAX_LETTERS = 100_000  # in one word
MAX_MOVES = 100_000  # in one list of moves
MAX_DIGITS = 4_000  # in one integer
MAX_WORK = 500_000_000  # elementary steps for one certificate, about a tenth of a microsecond each
MAX_STATE_BITS = 2_000_000_000  # held at one time by the state sum of the Jones polynomial
MAX_DEGREE = 200  # of a permutation
MAX_GENERATORS = 1_000  # of a group of permutations, and as many meridians
MAX_GROUP = 500_000  # elements of a group that colours links
MAX_COLOURS = 3_000  # elements of it that may be colours


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


def recompute(invariant: str, strands: int, word: Sequence[int]) -> Any:
    """The value of an invariant without parameters, as a certificate would state it; else None.

    None for a value that is too large for this verifier. Raises KeyError for an unknown name.
    """
    try:
        braid = cyclically_reduced(Braid(strands, tuple(word)))
        return INVARIANTS[invariant].compute(braid, Work())
    except (RejectedError, MemoryError, RecursionError):
        return None


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
            check_value(f"{where}: {side}", item, braid, stated, work)
        if item.left == item.right:
            raise RejectedError(f"{where}: the two values are equal")
        names.append(item.invariant)
    if not names:
        raise RejectedError("no distinction: nothing is shown to differ")
    used = (*names, *(item.parameters.get("invariant") for item in claim.distinctions))
    theorem = f"; {THREE_BRAID_THEOREM}" if "three-braid" in used else ""
    return f"the values of {', '.join(names)} are as stated and differ{theorem}"


def check_value(where: str, item: Distinction, braid: Braid, stated: Any, work: Work) -> None:
    """Raise RejectedError unless ``stated`` is the invariant of the closure, entry by entry."""
    try:
        compute = INVARIANTS[item.invariant].compute
        value = compute(cyclically_reduced(braid), work, **item.parameters)
    except RejectedError as error:
        raise RejectedError(f"{where}: {error}") from None
    if stated != value:
        raise RejectedError(f"{where}: the stated {item.invariant} is not the recomputed one")


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


def integer_in(least: int, most: int) -> Reader:
    """A reader of an integer in a range."""

    def read(data: Any) -> int:
        if type(data) is not int or not least <= data <= most:
            raise UnreadableError(f"{shown(data)}: expected an integer, {least} to {most}")
        return data

    return read


def read_letter(data: Any) -> int:
    """A generator of some braid group or its inverse; of which group, the strands say."""
    if type(data) is not int or not 1 <= abs(data) < MAX_STRANDS:
        limit = MAX_STRANDS - 1
        raise UnreadableError(f"{shown(data)}: expected an integer, 1 to {limit} or -1 to -{limit}")
    return data


def read_permutation(data: Any) -> list[int]:
    """The images of 1, ..., d under a permutation of them."""
    images: list[int] = list_of(integer_in(1, MAX_DEGREE), MAX_DEGREE, least=1)(data)
    if sorted(images) != list(range(1, len(images) + 1)):
        raise UnreadableError(f"not a permutation of 1 to {len(images)}")
    return images


def read_word(data: Any) -> tuple[int, ...]:
    """A word."""
    return tuple(list_of(read_letter, MAX_LETTERS)(data))


def read_braid(data: Any) -> Braid:
    """A strand count and a word inside its group."""
    braid = Braid(**read_object(data, {"strands": integer_in(1, MAX_STRANDS), "word": read_word}))
    try:
        check_inside(braid.word, braid.strands)
    except RejectedError as error:
        raise UnreadableError(str(error)) from None
    return braid


def read_move(data: Any) -> Move:
    """One move; whether it holds is for ``apply_move`` to say."""
    return Move(**read_object(data, chosen(data, "move", MOVES)))


def read_distinction(data: Any) -> Distinction:
    """One distinction, its parameters and values in the form that the invariant has."""
    value, _, parameters = chosen(data, "invariant", INVARIANTS)
    if data["invariant"] == "sublinks":  # with the parameters of the invariant of its sublinks
        inner = read_inside(
            "parameters", lambda given: chosen(given, "invariant", PLAIN), data.get("parameters")
        )
        value, parameters = list_of(inner.value, MAX_FILE_BYTES), {**parameters, **inner.parameters}
    readers = {
        "symmetry": one_of(*SYMMETRIES),
        "invariant": one_of(*INVARIANTS),
        "parameters": lambda given: read_object(given, parameters),
        "left_moves": list_of(read_move, MAX_MOVES),
        "right_moves": list_of(read_move, MAX_MOVES),
        "left": value,
        "right": value,
    }
    return Distinction(**read_object(data, readers))


SIGNED: dict[str, Reader] = {
    "move": one_of("stabilize", "destabilize"),
    "sign": one_of(1, -1),
    "strands": integer_in(1, MAX_STRANDS),
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


def entry_pairs(form: list[dict[int, int]]) -> list[dict[int, tuple[int, int]]]:
    """The rows of (V, V^T): at (i, j) both entries, where one of them is not zero."""
    pairs: list[dict[int, tuple[int, int]]] = [{} for _ in form]
    for i, row in enumerate(form):
        for j, entry in row.items():
            pairs[i][j] = (entry, form[j].get(i, 0))
            pairs[j][i] = (form[j].get(i, 0), entry)
    return pairs


def alexander(braid: Braid, work: Work) -> list[list[int]]:
    """The Alexander polynomial det(V - t V^T), lowest exponent 0, lowest coefficient positive.

    It is zero when the surface falls apart. The determinant is taken at small t modulo a prime
    and interpolated. A row of the matrix has, for |t| = 1, one entry of at most 2 and at most
    six of 1; so by Hadamard and Parseval no coefficient exceeds 10^(N/2) < 2^(5N/3), which is
    below half the prime. t^N det(V - V^T / t) = (-1)^N det(V - t V^T), so t serves for 1/t too.
    """
    if len({abs(letter) for letter in braid.word}) < braid.strands - 1:
        return []
    pattern = entry_pairs(seifert_form(braid, work))
    size = len(pattern)
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


# Signatures at roots of unity, and the Alexander module over a prime field.


def connected_form(braid: Braid, work: Work) -> list[dict[int, int]]:
    """The Seifert matrix of a connected surface: a generator that is missing is put in as i, -i."""
    missing = sorted(set(range(1, braid.strands)).difference(map(abs, braid.word)))
    word = braid.word + tuple(letter for i in missing for letter in (i, -i))
    return seifert_form(Braid(braid.strands, word), work)


def levine_tristram(braid: Braid, work: Work, order: int, power: int) -> list[int]:
    """Signature and nullity of H = (1 - w) V + (1 - 1/w) V^T at w = exp(2 pi i power / order).

    The characteristic polynomial comes from the method of Faddeev and Le Verrier, in the ring
    Z[x] / (x^order - 1), where x stands for w: M_1 = 1, c_k = -trace(K M_k) / k, M_(k+1) =
    K M_k + c_k, with K = x V - V^T, and then c_k (1/x - 1)^k for H = (1/x - 1) K. All roots are
    real, so by Descartes' rule as many are positive as there are changes of sign.

    An element of the ring is held as its value at x = 2^width, modulo 2^(width * order) - 1. The
    absolute values in a row of V - V^T, V + V^T sum to 8 at most, so in H to 16: those in c_k sum
    to less than 17^size, in k c_k to less than 2^(5 size), and width = 5 size + 4 keeps them
    apart. So the division by k is one of integers without remainder.
    """
    if gcd(order, power) != 1 or power > order:
        raise RejectedError(f"{power} / {order} gives no primitive root of unity")
    rows = entry_pairs(connected_form(braid, work))
    size = len(rows)
    width = 5 * size + 4
    modulus = (1 << width * order) - 1
    work.spend(size * size * (size + sum(map(len, rows))) * (4 + width * order // 1000) + 10)
    matrix = [[int(i == j) for j in range(size)] for i in range(size)]
    coefficients = [1]
    for k in range(1, size + 1):
        columns = list(zip(*matrix, strict=True))
        matrix = []
        for row in rows:
            times_x = [sum(v * column[j] for j, (v, _) in row.items()) for column in columns]
            plain = [sum(w * column[j] for j, (_, w) in row.items()) for column in columns]
            pairs = zip(times_x, plain, strict=True)
            matrix.append([((one << width) - other) % modulus for one, other in pairs])
        trace = sum(matrix[i][i] for i in range(size)) % modulus
        c = -(trace - modulus if 2 * trace > modulus else trace) // k
        for i in range(size):
            matrix[i][i] += c
        coefficients.append(c * pow((1 << width * (order - 1)) - 1, k, modulus) % modulus)
    signs = real_signs(coefficients, width, order, power, work)
    nullity = next(k for k, sign in enumerate(reversed(signs)) if sign)
    places = [sign for sign in signs if sign]
    positive = sum(one != two for one, two in pairwise(places))
    return [2 * positive - (size - nullity), nullity]


def real_signs(packed: list[int], width: int, order: int, power: int, work: Work) -> list[int]:
    """The signs of real elements of Z[w], each given as its value at w = 2^width.

    The absolute values of its coefficients sum to less than 2^width, so it and its conjugates, at
    most order - 1 numbers whose product is an integer, are below that. So it is zero, or not below
    2^(width * (2 - order)) in absolute value; and the sum below is wrong by 2^(width + 40) units
    of 2^-bits at most.
    """
    bits = width * order + 64
    cosines = cosine_table(order, power, bits, work)
    modulus = (1 << width * order) - 1
    signs = []
    for given in packed:
        numbers = unpack(given - modulus if 2 * given > modulus else given, width, work)
        value = sum(c * cosine for c, cosine in zip(numbers, cosines, strict=False))
        work.spend(order * (4 + (bits >> 8)))
        signs.append(0 if abs(value) < 1 << width + 50 else 1 if value > 0 else -1)
    return signs


def cosine_table(order: int, power: int, bits: int, work: Work) -> list[int]:
    """2^bits cos(2 pi power j / order) for j below order, wrong by less than 2^40.

    Pi by Machin's formula, the first cosine by its series, the others by the recursion of the
    cosines of multiples.
    """
    one = 1 << bits
    work.spend(bits * (10 + bits // 100))
    pi = 16 * arctangent(5, one) - 4 * arctangent(239, one)
    square = (2 * pi * power // order) ** 2 >> bits
    term, first, k = one, 0, 0
    while term:
        first += -term if k % 4 else term
        k += 2
        term = (term * square >> bits) // (k * (k - 1))
    cosines = [one, first]
    while len(cosines) < order:
        cosines.append((2 * first * cosines[-1] >> bits) - cosines[-2])
    return cosines


def arctangent(cotangent: int, one: int) -> int:
    """The arctangent of 1 / cotangent in units of 1 / one, by its series."""
    power, total, k = one // cotangent, 0, 1
    while power:
        total += power // k if k % 4 == 1 else -(power // k)
        power //= cotangent * cotangent
        k += 2
    return total


Polynomial = list[int]  # coefficients modulo a prime, lowest power first, the last not zero


def alexander_module(braid: Braid, work: Work, prime: int) -> list[Polynomial]:
    """The invariant factors over F_p[t, 1/t] of the module presented by t V - V^T.

    They are those over F_p[t] without their powers of t. V - t V^T has the same ones: it is the
    transposed matrix, up to sign. So t and 1/t need not be told apart.
    """
    if any(prime % divisor == 0 for divisor in range(2, prime)):
        raise RejectedError(f"{prime} is not a prime number")
    pairs = entry_pairs(connected_form(braid, work))
    rows = [
        {j: add_multiple([], [-w, v], [1], prime, work) for j, (v, w) in row.items()}
        for row in pairs
    ]
    rows = [{j: entry for j, entry in row.items() if entry} for row in rows]
    diagonal = diagonal_form(rows, prime, work)
    factors = [normalised(factor, prime) for factor in diagonal]
    factors = [factor for factor in factors if len(factor) > 1]
    for i in range(len(factors)):
        for j in range(i + 1, len(factors)):
            one, two = factors[i], factors[j]
            while two:
                one, two = two, divide(one, two, prime, work)[1]
            cofactor, _ = divide(factors[i], one, prime, work)
            factors[j] = normalised(add_multiple([], cofactor, factors[j], prime, work), prime)
            factors[i] = normalised(one, prime)
    free = len(rows) - len(diagonal)
    return [factor for factor in factors if len(factor) > 1] + [[]] * free


def diagonal_form(rows: list[dict[int, Polynomial]], prime: int, work: Work) -> list[Polynomial]:
    """The entries, other than zero, of a diagonal matrix that presents the same module over F_p[t].

    The pivot is an entry of least degree. Rows are reduced by its row; when nothing is left under
    it, its row is reduced by its column. Where a remainder is left, the degree has gone down.
    """
    rows, diagonal = [row for row in rows if row], []
    while rows:
        work.spend(4 * sum(map(len, rows)))
        places = ((len(row[j]), len(row), i, j) for i, row in enumerate(rows) for j in row)
        _, _, i, j = min(places)
        pivot = rows.pop(i)
        for row in rows:
            if j in row:
                quotient, _ = divide(row[j], pivot[j], prime, work)
                for column, entry in pivot.items():
                    difference = add_multiple(
                        row.pop(column, []), [-c for c in quotient], entry, prime, work
                    )
                    if difference:
                        row[column] = difference
        if any(j in row for row in rows):
            rows.append(pivot)
        else:
            remainders = {k: divide(entry, pivot[j], prime, work)[1] for k, entry in pivot.items()}
            rest = {k: remainder for k, remainder in remainders.items() if remainder}
            if rest:
                rows.append({j: pivot[j], **rest})
            else:
                diagonal.append(pivot[j])
        rows = [row for row in rows if row]
    return diagonal


def add_multiple(
    one: Polynomial, factor: Polynomial, other: Polynomial, prime: int, work: Work
) -> Polynomial:
    """one + factor * other."""
    work.spend(10 + len(one) + len(factor) * len(other))
    total = one + [0] * (len(factor) + len(other) - 1 - len(one))
    for k, c in enumerate(factor):
        for power, d in enumerate(other, k):
            total[power] = (total[power] + c * d) % prime
    while total and total[-1] == 0:
        total.pop()
    return total


def divide(
    one: Polynomial, other: Polynomial, prime: int, work: Work
) -> tuple[Polynomial, Polynomial]:
    """Quotient and remainder."""
    quotient, scale = [0] * max(0, len(one) - len(other) + 1), pow(other[-1], -1, prime)
    while len(one) >= len(other):
        power, c = len(one) - len(other), one[-1] * scale % prime
        quotient[power] = c
        one = add_multiple(one, [0] * power + [-c], other, prime, work)
    return quotient, one


def normalised(polynomial: Polynomial, prime: int) -> Polynomial:
    """The multiple by a unit of F_p[t, 1/t] with constant term not 0 and leading coefficient 1."""
    scale = pow(polynomial[-1], -1, prime)
    first = next(power for power, c in enumerate(polynomial) if c)
    return [c * scale % prime for c in polynomial[first:]]


# Closed braids on three strands, by the images of their words in the modular group.

THREE_BRAID_THEOREM = "by the classification of closed 3-braids (Birman, Menasco, 1993)"
MODULAR_IMAGES = {1: (-1, 0), -1: (0, 1), 2: (0, -1), -2: (1, 0)}


def three_braid(braid: Braid, work: Work) -> list[list[int]]:
    """All conjugacy classes of 3-braids that close to this oriented link, sorted.

    By Birman and Menasco (Studying links via closed braids III, 1993) there is one, except: three
    for the unknot, 1 2, 1 -2, -1 -2; two for the torus links of type (2, k) with k not 1 or -1,
    1^k 2 and 1^k -2; two at most for 1^u 2^v 1^w 2^e with e = 1 or -1, that and 1^w 2^v 1^u 2^e.

    All members of the last family are found. With D = 1 2 1 and p = u - e, q = w - e the two are
    conjugate to 1^p 2^v 1^q D^e and 1^q 2^v 1^p D^e. Since D exchanges 1 and 2, what counts is the
    cyclic order of (p, v, q): when two of them are equal, the partners are conjugate. They also
    are when one of them is 0, 1 or -1, and by rotation that may be v: 1^p 1^q D^e; or, as
    2 = 1^-1 D 1^-1, 1^(p-1) D 1^(q-1) D^e; or 1^(p+1) D^-1 1^(q+1) D^e; in each p and q may be
    exchanged by conjugation, with D perhaps. So let all be different and none in {-1, 0, 1}.

    Then |p| + |v| + |q| <= length / 2 + 3 with the length of the cyclic word. In 1^k =
    (b^-1 a)^k = (a b)^-k and 2^k = (a b^-1)^k = (b a)^-k there are |k| - 1 letters a that stand
    between letters b of the same power. Where powers meet, at most the letters a beside them
    cancel and two letters b become one, not none: a power has |k| >= 2 letters b, so no letter b
    is touched from both sides, and two that meet are of one sign, for only powers of one sign meet
    so. All letters a inside the powers stay, and a cyclic word has length / 2 letters a.

    By the image in SL(2, Z), 1 -> (1 1; 0 1) and 2 -> (1 0; -1 1), e trace = p q v - p - q - v; and
    total = p + q + v + 3 e. So e, p + q + v and p q v are known, and v, a divisor, gives p and q.
    """
    if braid.strands > 3:
        raise RejectedError(f"a braid on {braid.strands} strands: expected at most 3")
    word = (*braid.word, *range(braid.strands, 3))
    own = conjugacy_class(word, work)
    for family in iter_families(word, len(own) // 2, work):
        classes = {conjugacy_class(member, work) for member in family}
        if own in classes:
            return sorted(map(list, classes))
    return [list(own)]


def iter_families(word: tuple[int, ...], half: int, work: Work) -> Iterator[list[tuple[int, ...]]]:
    """Lists of braids with one closure, of which one holds ``word``'s class unless it is alone.

    ``half`` is half the length of its cyclic word.
    """
    total, trace = sum(1 if letter > 0 else -1 for letter in word), modular_trace(word, work)
    for k in (total - 1, total + 1):
        powers = (1, -1) if k in (1, -1) else (k,)
        yield [word_of((1, power), (2, sign)) for power in powers for sign in (1, -1)]
    for e in (1, -1):
        product = e * trace + total - 3 * e  # of p, q and v; v is the least of them
        for v in range(-half, half):
            work.spend(10 + (product.bit_length() >> 6))
            if product == 0 or v in (-1, 0, 1) or product % v:
                continue
            both, other = total - 3 * e - v, product // v  # p + q and p q
            if abs(other) > (half + 3) ** 2:
                continue
            square = both * both - 4 * other
            root = isqrt(max(square, 0))
            p, q = (both - root) // 2, (both + root) // 2
            if root * root == square and v < p < q and abs(v) + abs(p) + abs(q) <= half + 3:
                end = word_of((1, e), (2, e), (1, e))
                pairs = ((p, q), (q, p))
                yield [word_of((1, one), (2, v), (1, two)) + end for one, two in pairs]


def word_of(*powers: tuple[int, int]) -> tuple[int, ...]:
    """The word of a product of powers of generators."""
    return tuple(i if k > 0 else -i for i, k in powers for _ in range(abs(k)))


def modular_trace(word: tuple[int, ...], work: Work) -> int:
    """The trace of the image in SL(2, Z) under 1 -> (1 1; 0 1), 2 -> (1 0; -1 1)."""
    a, b, c, d = 1, 0, 0, 1
    for letter in word:
        work.spend(6 + (a.bit_length() >> 8))
        sign = 1 if letter > 0 else -1
        if abs(letter) == 1:
            b, d = b + sign * a, d + sign * c
        else:
            a, c = a - sign * b, c - sign * d
    return a + d


def conjugacy_class(word: tuple[int, ...], work: Work) -> tuple[int, ...]:
    """The exponent sum and the cyclic word in Z_2 * Z_3: a complete invariant of conjugacy in B_3.

    The cyclic word is that of the image in PSL(2, Z) = <a, b | a^2 = b^3 = 1>, a = 1 2 1, b = 1 2:
    letters 0 for a, 1 for b and -1 for 1/b, cyclically reduced, the least rotation. The kernel is
    generated by the central (1 2)^3, whose exponent sum is 6.
    """
    letters: list[int] = []
    for letter in word:
        for x in MODULAR_IMAGES[letter]:
            if not letters or (letters[-1] == 0) != (x == 0):
                letters.append(x)
            elif joined := merged(letters.pop(), x):
                letters.append(joined)
    first = 0
    while len(letters) - first > 1 and (letters[first] == 0) == (letters[-1] == 0):
        letters[first] = merged(letters[first], letters.pop())
        first += letters[first] == 0
    cyclic = bytes(x + 1 for x in letters[first:])  # bytes are compared and copied at once
    work.spend(12 * len(word) + (len(cyclic) ** 2 >> 5))
    least = min((cyclic[k:] + cyclic[:k] for k in range(len(cyclic))), default=b"")
    return sum(1 if letter > 0 else -1 for letter in word), *(x - 1 for x in least)


def merged(one: int, other: int) -> int:
    """The product of two letters of one kind, 0 for none: a a = 1, b b = 1/b."""
    return (one + other + 1) % 3 - 1


# Colourings: homomorphisms of the link's group to a finite group, which is given by permutations.
# A permutation is held as 256 bytes, so p.translate(q) is p followed by q.

UNIT = bytes(range(256))
WEIGHT = -1  # in a table of colourings, the column of how often a row counts; the others are arcs
BEAM = 20  # sets of arcs that are followed in the choice of seeds


def colouring(
    braid: Braid, work: Work, generators: list[list[int]], meridians: list[list[int]]
) -> list[list[int]]:
    """How many colourings have each list of classes of (meridian, longitude), sorted.

    The arcs are coloured by members of the meridians' classes such that other = over^-1 one over
    at each passing: these are the homomorphisms that send meridians into the classes (Wirtinger).
    Over-arc and one other arc determine the third, so a few arcs, the seeds, determine all.
    Trying all colours of the seeds finds every colouring once; but

    - the first seed gets the given meridian x of each class only, and counts as often as the class
      has members: conjugation by the group permutes the colourings, and the members transitively;
    - the second seed gets one colour of each orbit under the centraliser of x, and counts as often
      as the orbit has members: the centraliser permutes the colourings that are left, and keeps x,
      the only colour until then, for what x alone determines is x.

    Conjugate colourings have the same list of classes, so each list counts all its colourings. The
    arcs of one component have colours of one class, so a seed beside one is tried in that only.
    """
    palette = palette_of(generators, meridians, work)
    diagram = diagram_of(braid, work)
    seeds = choose_seeds(diagram, braid.strands, len(palette.elements), work)
    known = determined({seeds[0]}, diagram.relations, work)
    steps = steps_after(known, seeds[1:], diagram)
    counts: Counter[tuple[int, ...]] = Counter()
    for kind, members in enumerate(palette.classes):
        fixed = dict.fromkeys(known, members[0])
        columns = {WEIGHT: [len(members)]}
        for second in steps[:1]:
            choices = members if second.one >= 0 else range(len(palette.elements))
            orbits = orbits_of(choices, kind, palette, work)
            columns = {second.target: [orbit[0] for orbit in orbits]}
            columns[WEIGHT] = [len(members) * len(orbit) for orbit in orbits]
        for colours in solutions(fixed, columns, steps[1:], palette, work):
            entries = sorted(entry_of(one, colours, palette, work) for one in diagram.circuits)
            counts[tuple(chain.from_iterable(entries))] += colours[WEIGHT]
    return sorted([*entries, count] for entries, count in counts.items())


class Palette(NamedTuple):
    """The colours, numbered: ``elements`` and, for each, the number of its class in ``kinds``.

    ``table[o][c]`` is the number of o^-1 c o, ``back[o][c]`` that of o c o^-1. ``carriers`` gives
    for each colour c an h such that h^-1 c h is the first of its class, the given meridian;
    ``centralisers`` for each class the elements of the group that commute with that. ``entries``
    remembers the entries of pairs (class, longitude beside its meridian).
    """

    elements: list[bytes]
    kinds: list[int]
    classes: list[list[int]]
    table: list[list[int]]
    back: list[list[int]]
    carriers: list[bytes]
    centralisers: list[list[bytes]]
    degree: int
    entries: dict[tuple[int, bytes], tuple[int, ...]]


def palette_of(generators: list[list[int]], meridians: list[list[int]], work: Work) -> Palette:
    """The classes of the meridians in the group; raises RejectedError unless these are right."""
    degree = len(meridians[0])
    if any(len(images) != degree for images in generators + meridians):
        raise RejectedError("permutations of different degrees")
    steps = [permutation(images) for images in generators]
    group = [UNIT]
    seen = {UNIT}
    for element in group:  # which grows
        work.spend(8 + 4 * len(steps))
        fresh = {element.translate(step) for step in steps} - seen
        seen |= fresh
        group.extend(fresh)
        if len(group) > MAX_GROUP:
            raise RejectedError(f"too large for this verifier: more than {MAX_GROUP} elements")
    number: dict[bytes, int] = {}
    kinds: list[int] = []
    carriers: list[bytes] = []
    classes, centralisers = [], []
    for kind, x in enumerate(map(permutation, meridians)):
        if x not in seen:
            raise RejectedError(f"meridian {kind + 1} is not in the group")
        if x in number:
            raise RejectedError(f"meridian {kind + 1} is conjugate to one before it")
        carrier = {x: UNIT}
        members = [x]
        for member in members:  # which grows
            work.spend(8 * len(steps))
            for step in steps:
                image = conjugate(member, step)
                if image not in carrier:
                    carrier[image] = inverted(step).translate(carrier[member])
                    members.append(image)
        number |= {member: len(number) + k for k, member in enumerate(members)}
        if len(number) > MAX_COLOURS:
            raise RejectedError(f"too large for this verifier: more than {MAX_COLOURS} colours")
        kinds += [kind] * len(members)
        classes.append([number[member] for member in members])
        carriers += carrier.values()
        work.spend(4 * len(group))
        centralisers.append([g for g in group if x.translate(g) == g.translate(x)])
    work.spend(10 * len(number) ** 2)
    table = [[number[conjugate(colour, over)] for colour in number] for over in number]
    back = [sorted(range(len(row)), key=row.__getitem__) for row in table]
    colours = list(number)
    return Palette(colours, kinds, classes, table, back, carriers, centralisers, degree, {})


def permutation(images: list[int]) -> bytes:
    """The permutation of 0, ..., 255 that moves only what is given, from 1 on."""
    return bytes(image - 1 for image in images) + UNIT[len(images) :]


def inverted(element: bytes) -> bytes:
    """The inverse permutation."""
    return bytes.maketrans(element, UNIT)


def conjugate(element: bytes, by: bytes) -> bytes:
    """by^-1 element by."""
    return inverted(by).translate(element).translate(by)


def orbits_of(choices: Iterable[int], kind: int, palette: Palette, work: Work) -> list[list[int]]:
    """The orbits of colours under the centraliser of a class's meridian."""
    number = {element: index for index, element in enumerate(palette.elements)}
    orbits = []
    left = dict.fromkeys(choices)
    while left:
        colour = palette.elements[next(iter(left))]
        work.spend(6 * len(palette.centralisers[kind]))
        orbit = {number[conjugate(colour, g)] for g in palette.centralisers[kind]}
        orbits.append(sorted(orbit))
        for member in orbit:
            del left[member]
    return orbits


class Diagram(NamedTuple):
    """The arcs of a closed braid's diagram, each from one passing under to the next.

    ``relations`` holds for each passing the arcs (over, one, other), other = over^-1 one over;
    ``owner`` the component of each arc; ``circuits`` for each component an arc and, on the way
    once around from there, the passings under: arc over it, sign, 1 if that is of the component.
    """

    relations: list[tuple[int, int, int]]
    owner: dict[int, int]
    circuits: list[tuple[int, list[tuple[int, int, int]]]]


def diagram_of(braid: Braid, work: Work) -> Diagram:
    """The diagram; arcs that pass the top have numbers below the number of strands."""
    work.spend(20 * len(braid.word) + braid.strands * (10 + braid.strands // 10))
    numbers = component_numbers(braid)
    arcs, tops = list(range(braid.strands)), list(range(braid.strands))
    owners = list(numbers)
    passings: list[list[tuple[int, int, int]]] = [[] for _ in tops]
    crossings = []
    for letter in braid.word:
        i = abs(letter) - 1
        over, under, sign = (i + 1, i, 1) if letter > 0 else (i, i + 1, -1)
        new, component = len(owners), numbers[tops[under]]
        one, other = (arcs[under], new) if sign > 0 else (new, arcs[under])
        crossings.append((arcs[over], one, other))
        passings[tops[under]].append((arcs[over], sign, int(numbers[tops[over]] == component)))
        owners.append(component)
        arcs[under] = new
        arcs[i], arcs[i + 1], tops[i], tops[i + 1] = arcs[i + 1], arcs[i], tops[i + 1], tops[i]
    name = list(range(len(owners)))

    def final(arc: int) -> int:
        while name[arc] != arc:
            arc = name[arc]
        return arc

    for top, arc in enumerate(arcs):  # where the closure joins them
        name[final(arc)] = final(top)
    circuits = []
    for component in range(max(numbers) + 1):
        start = top = numbers.index(component)
        circuit = list(passings[top])
        while (top := tops.index(top)) != start:
            circuit += passings[top]
        circuits.append((final(start), [(final(arc), sign, own) for arc, sign, own in circuit]))
    relations = [(final(over), final(one), final(other)) for over, one, other in crossings]
    return Diagram(relations, {arc: owners[arc] for arc in map(final, name)}, circuits)


def determined(arcs: set[int], relations: list[tuple[int, int, int]], work: Work) -> frozenset[int]:
    """The arcs whose colours follow from those of the given ones."""
    known, size = set(arcs), -1
    while size < len(known):
        size = len(known)
        work.spend(10 + len(known) + 2 * len(relations))
        for over, one, other in relations:
            if over in known and (one in known) != (other in known):
                known |= {one, other}
    return frozenset(known)


def choose_seeds(diagram: Diagram, strands: int, colours: int, work: Work) -> tuple[int, ...]:
    """Arcs that determine all, in an order in which little has to be tried.

    Arcs that are known have about ``colours`` to the power of (their number less that of the
    passings among them) colourings. Sets of known arcs grow by a seed and what follows; of those
    that cost least, ``BEAM`` are kept. Any choice that determines all gives the same counts.
    """
    relations, all_arcs = diagram.relations, frozenset(diagram.owner)
    stride = len(all_arcs) // 60 + 1
    useful = [arc for arc in diagram.owner if arc < strands or arc % stride == 0]

    def tried(known: frozenset[int]) -> int:
        work.spend(20 + 2 * len(relations))
        freedom = len(known) - sum(known.issuperset(one) for one in relations)
        return int(colours ** max(0, freedom))

    plans: dict[frozenset[int], tuple[int, tuple[int, ...]]] = {frozenset(): (0, ())}
    while all_arcs not in plans:
        grown: dict[frozenset[int], tuple[int, tuple[int, ...]]] = {}
        for known, (cost, seeds) in plans.items():
            for arc in useful:
                if arc not in known:
                    more = determined({*known, arc}, relations, work)
                    if more not in grown or grown[more][0] > cost:
                        grown[more] = (cost + tried(known), (*seeds, arc))
        ranked = sorted(grown, key=lambda known: (grown[known][0] + tried(known), -len(known)))
        plans = {known: grown[known] for known in ranked[:BEAM]}
    return plans[all_arcs][1]


class Step(NamedTuple):
    """Colour ``target`` by over^-1 one over, backward by over one over^-1; or check its colour.

    A seed has no ``over`` (-1), and as ``one`` an arc of its component, if one is known, or -1.
    """

    target: int
    over: int
    one: int
    backward: bool = False


def steps_after(known: frozenset[int], seeds: Sequence[int], diagram: Diagram) -> list[Step]:
    """Each seed and all that follows from it and what is known, checks as soon as possible."""
    arcs = set(known)
    waiting = [relation for relation in diagram.relations if not known.issuperset(relation)]
    steps: list[Step] = []

    def promise(relation: tuple[int, int, int]) -> tuple[bool, bool]:
        then = arcs.union(relation)
        checks = (then.issuperset(other) for other in waiting if other is not relation)
        return arcs.issuperset(relation), any(checks)

    for seed in seeds:
        beside = [arc for arc in arcs if diagram.owner[arc] == diagram.owner[seed]]
        steps.append(Step(seed, -1, min(beside, default=-1)))
        arcs.add(seed)
        while ready := [r for r in waiting if r[0] in arcs and (r[1] in arcs or r[2] in arcs)]:
            over, one, other = relation = max(ready, key=promise)
            waiting.remove(relation)
            forward = one in arcs
            steps.append(Step(other, over, one) if forward else Step(one, over, other, True))
            arcs |= {one, other}
    return steps


def solutions(
    fixed: dict[int, int],
    columns: dict[int, list[int]],
    steps: Sequence[Step],
    palette: Palette,
    work: Work,
) -> Iterator[dict[int, int]]:
    """The colourings that the steps make of the rows of a table, an arc a column.

    Arcs in ``fixed`` have one colour in all rows; each seed starts a table for each row.
    """
    for number, (target, over, one, backward) in enumerate(steps):
        if over < 0:
            for colours in rows_of(fixed, columns):
                choices: Sequence[int] = range(len(palette.elements))
                if one >= 0:
                    choices = palette.classes[palette.kinds[colours[one]]]
                work.spend(20 + len(choices) // 4)
                table = {target: list(choices)}
                yield from solutions(colours, table, steps[number + 1 :], palette, work)
            return
        rows = palette.back if backward else palette.table
        if over in fixed:
            row = rows[fixed[over]]
            found = [row[c] for c in columns[one]]
        elif one in fixed:
            colour = fixed[one]
            found = [rows[o][colour] for o in columns[over]]
        else:
            found = [rows[o][c] for o, c in zip(columns[over], columns[one], strict=True)]
            work.spend(len(found))
        work.spend(20 + len(found) // 4)
        if target not in columns and target not in fixed:
            columns[target] = found
            continue
        wanted = columns[target] if target in columns else [fixed[target]] * len(found)
        keep = list(map(eq, found, wanted))
        if True not in keep:
            return
        columns = {arc: list(compress(column, keep)) for arc, column in columns.items()}
    yield from rows_of(fixed, columns)


def rows_of(fixed: dict[int, int], columns: dict[int, list[int]]) -> Iterator[dict[int, int]]:
    """The rows of a table as colourings."""
    for row in zip(*columns.values(), strict=True):
        yield fixed | dict(zip(columns, row, strict=True))


def entry_of(
    circuit: tuple[int, list[tuple[int, int, int]]],
    colours: dict[int, int],
    palette: Palette,
    work: Work,
) -> tuple[int, ...]:
    """A component's class and the least conjugate of its longitude, beside the class's meridian.

    The longitude is the product of the elements over the passings under, to the power of their
    signs, corrected by the meridian so that it does not link the component.
    """
    start, passings = circuit
    work.spend(60 + 5 * len(passings) + palette.degree)
    longitude, own = UNIT, 0
    for over, sign, is_own in passings:
        element = palette.elements[colours[over]]
        longitude = longitude.translate(element if sign > 0 else inverted(element))
        own += sign * is_own
    colour = colours[start]
    meridian = palette.elements[colour]
    for _ in range(abs(own)):
        longitude = longitude.translate(inverted(meridian) if own > 0 else meridian)
    pair = palette.kinds[colour], conjugate(longitude, palette.carriers[colour])
    if pair not in palette.entries:
        work.spend(6 * len(palette.centralisers[pair[0]]))
        least = min(conjugate(pair[1], g) for g in palette.centralisers[pair[0]])
        palette.entries[pair] = (pair[0] + 1, *(i + 1 for i in least[: palette.degree]))
    return palette.entries[pair]


# Any of these, for the links that some of the components form.


def sublinks(
    braid: Braid, work: Work, components: int, invariant: str, **parameters: Any
) -> list[Any]:
    """The values of an invariant for all sublinks of so many components, sorted."""
    compute, numbers = PLAIN[invariant].compute, component_numbers(braid)
    work.spend(4 * len(braid.word) + 4 * braid.strands)
    return sorted(
        compute(sublink(braid, numbers, kept, work), work, **parameters)
        for kept in combinations(range(max(numbers) + 1), components)
    )


def sublink(braid: Braid, numbers: list[int], kept: Sequence[int], work: Work) -> Braid:
    """The braid that the strands of some components form, cyclically reduced."""
    wanted = set(kept)
    row = [number in wanted for number in numbers]
    work.spend(len(braid.word) * (6 + braid.strands // 20) + 4 * braid.strands)
    word = []
    for letter in braid.word:
        i = abs(letter) - 1
        if row[i] and row[i + 1]:
            place = sum(row[: i + 1])
            word.append(place if letter > 0 else -place)
        row[i], row[i + 1] = row[i + 1], row[i]
    return cyclically_reduced(Braid(sum(row), tuple(word)))


class Invariant(NamedTuple):
    """The readers of its values and parameters, and how it is computed from a braid and these."""

    value: Reader
    compute: Callable[..., Any]
    parameters: dict[str, Reader]


def lists_of(width: int) -> Reader:
    """A reader of a list of lists of ``width`` integers."""
    return list_of(list_of(read_integer, width, width), MAX_FILE_BYTES)


INTEGERS = list_of(read_integer, MAX_FILE_BYTES)
LISTS = list_of(INTEGERS, MAX_FILE_BYTES)
PLAIN: dict[str, Invariant] = {
    "components": Invariant(read_integer, components, {}),
    "linking-numbers": Invariant(INTEGERS, linking_numbers, {}),
    "linking-sums": Invariant(INTEGERS, linking_sums, {}),
    "alexander": Invariant(lists_of(2), alexander, {}),
    "jones": Invariant(lists_of(2), jones, {}),
    "homfly": Invariant(lists_of(3), homfly, {}),
    "signature": Invariant(read_integer, signature, {}),
    "levine-tristram": Invariant(
        list_of(read_integer, 2, 2),
        levine_tristram,
        {"order": integer_in(2, 60), "power": integer_in(1, 59)},
    ),
    "alexander-module": Invariant(LISTS, alexander_module, {"prime": integer_in(2, 1000)}),
    "colouring": Invariant(
        LISTS,
        colouring,
        {
            "generators": list_of(read_permutation, MAX_GENERATORS),
            "meridians": list_of(read_permutation, MAX_GENERATORS, least=1),
        },
    ),
    "three-braid": Invariant(LISTS, three_braid, {}),
}
INVARIANTS: dict[str, Invariant] = {
    **PLAIN,
    "sublinks": Invariant(
        INTEGERS,
        sublinks,
        {"components": integer_in(1, MAX_STRANDS), "invariant": one_of(*PLAIN)},
    ),
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
