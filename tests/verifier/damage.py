"""Damage to certificates: every field in turn, in every way; and damage to the text itself."""

from __future__ import annotations

import copy
import json
import random
from collections.abc import Iterator
from typing import Any

Path = tuple[Any, ...]
NAMES = (
    *("same", "different", "undecided", "identity", "mirror", "reverse", "mirror-reverse"),
    *("rewrite", "conjugate", "stabilize", "destabilize", "exchange", "components", "homfly"),
    *("linking-numbers", "alexander", "jones", "signature", "colouring", "three-braid", ""),
    *("levine-tristram", "alexander-module", "sublinks"),
)
STRANGERS = (None, True, False, 0, 1, -1, 2, 1.0, "1", [], {}, [[]], 10**9, 10**40, "\ud800")
WAYS = ("replace", "shift", "delete", "repeat", "exchange", "graft", "add", "name")


def iter_paths(node: Any, path: Path = ()) -> Iterator[Path]:
    """The places in a JSON value, the whole of it first."""
    yield path
    if isinstance(node, dict):
        for key, value in node.items():
            yield from iter_paths(value, (*path, key))
    elif isinstance(node, list):
        for index, value in enumerate(node):
            yield from iter_paths(value, (*path, index))


def at_path(node: Any, path: Path) -> Any:
    for step in path:
        node = node[step]
    return node


def damaged(data: Any, path: Path, way: str, generator: random.Random) -> Any:
    """A copy of the value, changed at the place; sometimes the change changes nothing."""
    if not path:
        return generator.choice(STRANGERS) if way == "replace" else copy.deepcopy(data)
    result = copy.deepcopy(data)
    holder, step = at_path(result, path[:-1]), path[-1]
    value = holder[step]
    if way == "replace":
        holder[step] = generator.choice(STRANGERS)
    elif way == "shift" and type(value) is int:
        holder[step] = generator.choice([value + 1, value - 1, -value, 2 * value, value + 10])
    elif way == "delete":
        del holder[step]
    elif way == "repeat" and isinstance(holder, list):
        holder.insert(step, copy.deepcopy(value))
    elif way == "exchange":
        other = generator.choice(list(holder) if isinstance(holder, dict) else range(len(holder)))
        holder[step], holder[other] = holder[other], value
    elif way == "graft":
        holder[step] = copy.deepcopy(at_path(data, generator.choice(list(iter_paths(data)))))
    elif way == "add" and isinstance(value, dict):
        value[generator.choice(["note", "strands", "by", "moves"])] = generator.choice(STRANGERS)
    elif way == "add" and isinstance(value, list):
        value.append(generator.choice([*STRANGERS, *value]))
    elif way == "name" and isinstance(value, str):
        holder[step] = generator.choice(NAMES)
    return result


def damaged_text(text: str, generator: random.Random) -> str:
    """The text with a stretch of it cut out, written twice, or replaced."""
    start = generator.randrange(len(text))
    end = min(len(text), start + generator.choice([1, 1, 1, 2, 5, 40]))
    middle = generator.choice(
        ["", text[start:end] * 2, generator.choice('0123456789-,:[]{}" .eNaNtrue\x00\n\\é')]
    )
    return text[:start] + middle + text[end:]


def as_text(data: Any) -> str:
    return json.dumps(data)
