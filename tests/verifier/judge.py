"""A second, slow verifier, written from FORMAT.md with other methods than verify.py.

It judges a JSON value that has been read; equality in the braid group is decided by Artin's
action on the free group, and invariants are those of ``oracles``.
"""

from __future__ import annotations

from functools import cache
from typing import Any

from tests.verifier import oracles

SYMMETRIES = {
    "identity": list,
    "mirror": lambda word: [-letter for letter in word],
    "reverse": lambda word: list(word[::-1]),
    "mirror-reverse": lambda word: [-letter for letter in word[::-1]],
}
WIDTHS = {"alexander": 2, "jones": 2, "homfly": 3}
HEADER = {"format", "version", "left", "right", "verdict"}
cached_value = cache(oracles.value)
cached_is_equal = cache(oracles.is_equal)


def holds(data: Any) -> bool:
    """Whether the value is a certificate of the format whose conditions all hold."""
    if not isinstance(data, dict) or data.get("format") != "braidsearch certificate":
        return False
    if type(data.get("version")) is not int or data["version"] != 1:
        return False
    left, right = data.get("left"), data.get("right")
    if not (is_braid(left) and is_braid(right)):
        return False
    if data.get("verdict") == "same":
        return data.keys() == HEADER | {"symmetry", "moves"} and same_holds(data)
    if data.get("verdict") == "different":
        return data.keys() == HEADER | {"distinctions"} and different_holds(data)
    return False


def same_holds(data: Any) -> bool:
    if not is_one_of(data["symmetry"], SYMMETRIES):
        return False
    end = end_of_moves(data["left"], data["moves"])
    word = SYMMETRIES[data["symmetry"]](data["right"]["word"])
    return end == (data["right"]["strands"], word)


def different_holds(data: Any) -> bool:
    items = data["distinctions"]
    if not isinstance(items, list) or not all(isinstance(item, dict) for item in items):
        return False
    symmetries = [item.get("symmetry") for item in items]
    if not items or not all(is_one_of(symmetry, SYMMETRIES) for symmetry in symmetries):
        return False
    distinct = len(set(symmetries)) == len(symmetries)
    return distinct and all(distinction_holds(data, item) for item in items)


def distinction_holds(data: Any, item: Any) -> bool:
    sides = {"left", "right", "left_moves", "right_moves"}
    if item.keys() != sides | {"symmetry", "invariant", "parameters"} or item["parameters"] != {}:
        return False
    name = item["invariant"]
    if not is_one_of(name, {*WIDTHS, "components", "linking-numbers", "linking-sums", "signature"}):
        return False
    if not (has_form(name, item["left"]) and has_form(name, item["right"])):
        return False
    left = end_of_moves(data["left"], item["left_moves"])
    right = end_of_moves(data["right"], item["right_moves"])
    if left is None or right is None or item["left"] == item["right"]:
        return False
    image = (right[0], SYMMETRIES[item["symmetry"]](right[1]))
    return all(
        cached_value(name, strands, tuple(word)) == stated
        for (strands, word), stated in ((left, item["left"]), (image, item["right"]))
    )


def has_form(name: str, value: Any) -> bool:
    if name in ("components", "signature"):
        return type(value) is int
    if not isinstance(value, list):
        return False
    if name in ("linking-numbers", "linking-sums"):
        return all(type(number) is int for number in value)
    return all(
        isinstance(entry, list)
        and len(entry) == WIDTHS[name]
        and all(type(number) is int for number in entry)
        for entry in value
    )


def end_of_moves(braid: Any, moves: Any) -> tuple[int, list[int]] | None:
    """Strands and word after all moves; None when one of them does not hold."""
    if not isinstance(moves, list):
        return None
    strands, word = braid["strands"], list(braid["word"])
    for move in moves:
        if not isinstance(move, dict) or not is_word(move.get("word"), 1000):
            return None
        after = move["word"]
        if not move_holds(strands, word, move, after):
            return None
        strands, word = move.get("strands", strands), after
    return strands, word


def move_holds(strands: int, word: list[int], move: Any, after: list[int]) -> bool:
    kind = move.get("move")
    if kind == "rewrite" and move.keys() == {"move", "word"}:
        return is_word(after, strands) and cached_is_equal(strands, tuple(after), tuple(word))
    if kind == "conjugate" and move.keys() == {"move", "by", "word"}:
        by = move["by"]
        if not (is_word(after, strands) and is_word(by, strands)):
            return False
        conjugate = [-letter for letter in by[::-1]] + word + by
        return cached_is_equal(strands, tuple(after), tuple(conjugate))
    if move.keys() != {"move", "sign", "strands", "word"}:
        return False
    sign, count = move["sign"], move["strands"]
    if type(sign) is not int or sign not in (1, -1) or type(count) is not int:
        return False
    if kind == "stabilize":
        return count == strands + 1 <= 1000 and after == [*word, sign * strands]
    if kind == "destabilize":
        is_last = word == [*after, sign * (strands - 1)]
        return count == strands - 1 >= 1 and is_last and is_word(after, strands - 1)
    return False


def is_one_of(value: Any, names: Any) -> bool:
    return isinstance(value, str) and value in names


def is_braid(data: Any) -> bool:
    if not isinstance(data, dict) or data.keys() != {"strands", "word"}:
        return False
    strands = data["strands"]
    return type(strands) is int and 1 <= strands <= 1000 and is_word(data["word"], strands)


def is_word(data: Any, strands: int) -> bool:
    return isinstance(data, list) and all(
        type(letter) is int and 1 <= abs(letter) < strands for letter in data
    )
