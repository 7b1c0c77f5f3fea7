"""braidsearch invariants WORD: the exact invariants of the closure of a braid."""

from __future__ import annotations

from collections.abc import Sequence

from braidsearch.certificates.display import show_value
from braidsearch.command_line.answer import SUCCESS, Answer, json_answer
from braidsearch.command_line.arguments import CommandParser, read_word_argument

_DESCRIPTION = """Print the invariants of the closure of a braid, all exact.

Conventions: the right-handed trefoil, the closure of "1 1 1", has Jones polynomial t + t^3 - t^4,
HOMFLY-PT polynomial 2 v^2 + v^2 z^2 - v^4 and signature -2. With --json the values stand as in a
certificate: polynomials as lists [exponents..., coefficient], Jones exponents in half powers."""

_EXAMPLES = """  braidsearch invariants "1 1 1"
  braidsearch invariants "-1,2,-1,2" --json"""


def answer(arguments: Sequence[str]) -> Answer:
    """Carry out the command. Raises InputError for a word that cannot be read."""
    parser = CommandParser("invariants", _DESCRIPTION, _EXAMPLES)
    parser.add_word("word", "a braid word")
    parser.add_json()
    given = parser.read(arguments)
    braid = read_word_argument("WORD", given.word)
    from braidsearch.invariants import INVARIANTS, compute_invariants  # noqa: PLC0415 - numpy

    values = compute_invariants(braid)
    titles = {invariant.name: invariant.title for invariant in INVARIANTS}
    missing = [title for name, title in titles.items() if name not in values]
    hint = f"braidsearch invariants: too large for: {', '.join(missing)}" if missing else ""
    if given.json:
        return json_answer(SUCCESS, dict(values), hint)
    width = max(map(len, titles.values())) + 1
    lines = (
        f"{titles[name] + ':':<{width}} {show_value(name, value)}" for name, value in values.items()
    )
    return Answer(SUCCESS, "\n".join(lines), hint)
