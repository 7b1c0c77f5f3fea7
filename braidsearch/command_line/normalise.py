"""braidsearch normalise WORD: reduced words, left normal form, conjugacy summit."""

from __future__ import annotations

from collections.abc import Sequence
from typing import TYPE_CHECKING, Any

from braidsearch.certificates import braid_to_json
from braidsearch.certificates.explanation import count_of, shown_word
from braidsearch.command_line.answer import SUCCESS, Answer, json_answer
from braidsearch.command_line.arguments import CommandParser
from braidsearch.command_line.link_input import WORD_OR_DRAWING, read_link_argument
from braidsearch.words import Braid, cyclic_reduce, format_word, free_reduce

if TYPE_CHECKING:
    from braidsearch.normal_form import NormalForm
    from braidsearch.normal_form.conjugacy import ConjugacyClass

_DESCRIPTION = """Print the freely reduced word, the Garside left normal form, and the canonical
representative of the conjugacy class with the element that conjugates to it.

The normal form is delta^infimum times simple factors (delta is the half twist), and decides
equality of braids. The representative is the least member of the ultra summit set: two braids are
conjugate exactly when theirs are equal, as long as the set was walked completely."""

_EXAMPLES = """  braidsearch normalise "1 2 -2 1 1 2 -1"
  braidsearch normalise "-1,2" --json"""


def answer(arguments: Sequence[str]) -> Answer:
    """Carry out the command. Raises InputError for a word that cannot be read."""
    from braidsearch.normal_form import left_normal_form  # noqa: PLC0415 - help comes faster
    from braidsearch.normal_form.conjugacy import conjugacy_class  # noqa: PLC0415 - the same

    parser = CommandParser("normalise", _DESCRIPTION, _EXAMPLES)
    parser.add_word("word", WORD_OR_DRAWING)
    parser.add_json()
    given = parser.read(arguments)
    braid = read_link_argument("WORD", given.word)
    form, summit = left_normal_form(braid), conjugacy_class(braid)
    if given.json:
        return json_answer(SUCCESS, _to_json(braid, form, summit))
    return Answer(SUCCESS, _report(braid, form, summit))


def _to_json(braid: Braid, form: NormalForm, summit: ConjugacyClass) -> dict[str, Any]:
    return {
        "braid": braid_to_json(braid),
        "reduced": braid_to_json(free_reduce(braid)),
        "normal_form": {"infimum": form.infimum, "factors": _factor_words(form)},
        "summit": {
            "representative": braid_to_json(summit.representative),
            "conjugator": list(summit.conjugator),
            "members": summit.summit_size,
            "complete": summit.is_complete,
        },
    }


def _report(braid: Braid, form: NormalForm, summit: ConjugacyClass) -> str:
    core, _ = cyclic_reduce(braid)
    factors = [" ".join(map(str, word)) for word in _factor_words(form)]
    members = count_of(summit.summit_size, "member")
    seen = members if summit.is_complete else f"more than the {members} seen"
    rows = {
        "braid": f"{format_word(braid)}",
        "size": f"{count_of(braid.strands, 'strand')}, {count_of(len(braid), 'letter')}",
        "freely reduced": format_word(free_reduce(braid)),
        "cyclically reduced": format_word(core),
        "left normal form": " | ".join([f"delta^{form.infimum}", *factors]),
        "conjugacy summit": format_word(summit.representative),
        "conjugated by": shown_word(summit.conjugator),
        "ultra summit set": seen,
    }
    width = max(map(len, rows)) + 1
    return "\n".join(f"{name + ':':<{width}} {value}" for name, value in rows.items())


def _factor_words(form: NormalForm) -> list[list[int]]:
    from braidsearch.normal_form.simple_elements import permutation_word  # noqa: PLC0415

    return [list(permutation_word(factor)) for factor in form.factors]
