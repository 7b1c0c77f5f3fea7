"""A second, slow verifier, written from FORMAT.md with other methods than verify.py.

It judges a JSON value that has been read; equality in the braid group is decided by Artin's
action on the free group, and invariants are those of ``oracles``.
"""

from __future__ import annotations

import json
from functools import cache
from typing import Any

from tests.verifier import oracles

SYMMETRIES = {
    "identity": list,
    "mirror": lambda word: [-letter for letter in word],
    "reverse": lambda word: list(word[::-1]),
    "mirror-reverse": lambda word: [-letter for letter in word[::-1]],
}
PLAIN = {
    *("components", "linking-numbers", "linking-sums", "alexander", "jones", "homfly"),
    *("signature", "three-braid", "colouring", "levine-tristram", "alexander-module"),
}
HEADER = {"format", "version", "left", "right", "verdict"}
cached_is_equal = cache(oracles.is_equal)


@cache
def cached_value(name: str, strands: int, word: tuple[int, ...], parameters: str) -> Any:
    return oracles.value(name, strands, word, **json.loads(parameters))


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
    if item.keys() != sides | {"symmetry", "invariant", "parameters"}:
        return False
    name, parameters = item["invariant"], item["parameters"]
    if not is_one_of(name, {*PLAIN, "sublinks"}) or not are_parameters(name, parameters):
        return False
    if not (is_of_integers(item["left"]) and is_of_integers(item["right"])):
        return False
    left = end_of_moves(data["left"], item["left_moves"])
    right = end_of_moves(data["right"], item["right_moves"])
    if left is None or right is None or item["left"] == item["right"]:
        return False
    image = (right[0], SYMMETRIES[item["symmetry"]](right[1]))
    return all(
        cached_value(name, strands, tuple(word), json.dumps(parameters)) == stated
        for (strands, word), stated in ((left, item["left"]), (image, item["right"]))
    )


def is_of_integers(value: Any) -> bool:
    """Whether a value is an integer or is built of lists of integers; true and 1.0 are none."""
    return all(map(is_of_integers, value)) if isinstance(value, list) else type(value) is int


def are_parameters(name: str, given: Any) -> bool:
    """Whether the parameters have the keys and ranges of the invariant."""
    if not isinstance(given, dict):
        return False
    if name == "sublinks":
        rest = dict(given)
        count, inner = rest.pop("components", None), rest.pop("invariant", None)
        is_fit = is_in(count, 1, 1000) and is_one_of(inner, PLAIN)
        return is_fit and are_parameters(inner, rest)
    if name == "levine-tristram":
        is_fit = given.keys() == {"order", "power"}
        return is_fit and is_in(given["order"], 2, 60) and is_in(given["power"], 1, 59)
    if name == "alexander-module":
        return given.keys() == {"prime"} and is_in(given["prime"], 2, 1000)
    if name == "colouring":
        is_fit = given.keys() == {"generators", "meridians"} and given["meridians"] != []
        return is_fit and all(
            isinstance(one, list) and all(map(is_permutation, one)) for one in given.values()
        )
    return given == {}


def is_in(value: Any, least: int, most: int) -> bool:
    return type(value) is int and least <= value <= most


def is_permutation(data: Any) -> bool:
    return (
        isinstance(data, list)
        and is_of_integers(data)
        and not any(isinstance(entry, list) for entry in data)
        and 1 <= len(data) <= 200
        and sorted(data) == list(range(1, len(data) + 1))
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
