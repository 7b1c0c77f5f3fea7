"""What to type after a comparison, as the report on a terminal says it."""

from __future__ import annotations

import math
import os
from argparse import Namespace
from collections.abc import Mapping, Sequence
from dataclasses import dataclass, replace
from itertools import count
from typing import TYPE_CHECKING, Any

from braidsearch.command_line.compare_report import bound_words
from braidsearch.command_line.link_input import is_standard_input
from braidsearch.command_line.terminal import Terminal, quote_argument
from braidsearch.words import MAX_STRANDS, Braid

if TYPE_CHECKING:
    from braidsearch.search.limits import SearchLimits
    from braidsearch.search.verdict import Verdict

_FURTHER = 10
"""How many times as far the search goes that is proposed after one that ran out."""


@dataclass(frozen=True)
class Question:
    """What was asked: the braids as read, the arguments as typed, and the limits."""

    left: Braid
    right: Braid
    given: Namespace
    limits: SearchLimits


def next_steps(verdict: Verdict, question: Question, terminal: Terminal) -> list[str]:
    """The lines that say what to do with the certificate, or how to go on without one."""
    if verdict.certificate is None:
        return _after_search(verdict, question, terminal)
    file = question.given.output
    lines = _keep(question, terminal) if file is None else _check(file, question, terminal)
    return lines + _offer_image(verdict, question, terminal)


def _check(file: str, question: Question, terminal: Terminal) -> list[str]:
    bound = [part for option in bound_words(question.left, question.right) for part in option]
    check = ["braidsearch", "verify", file, *bound]
    read = ["braidsearch", "explain", file]
    return [
        *terminal.command("check it", check, "braidsearch verify FILE, for the file above"),
        *terminal.command("read it", read, "braidsearch explain FILE, for the file above"),
    ]


def _keep(question: Question, terminal: Terminal) -> list[str]:
    options = [*_limit_options(question.limits, question.given), "-o", _file_name(question)]
    return _ask("keep it", question, _up_to(question), options, terminal)


def _offer_image(verdict: Verdict, question: Question, terminal: Terminal) -> list[str]:
    """The question of which the answer is known: same up to a symmetry that was not asked for."""
    if verdict.image is None:
        return []
    symmetry = str(verdict.image.symmetry)
    stem, ending = os.path.splitext(question.given.output or "proof.json")
    file = _free_name(f"{stem}.{symmetry}", ending)
    options = [*_limit_options(question.limits, question.given), "-o", file]
    return _ask(f"prove the {symmetry}", question, [symmetry], options, terminal)


def _after_search(verdict: Verdict, question: Question, terminal: Terminal) -> list[str]:
    """The image first, which is sure to be proven; then the same question, asked further."""
    lines = _offer_image(verdict, question, terminal)
    limits = further_limits(question.limits, verdict.explored)
    if limits is not None:
        options = [*_limit_options(limits, question.given), "-o", _file_name(question)]
        return lines + _ask("go on", question, _up_to(question), options, terminal)
    larger = "left" if len(question.left) >= len(question.right) else "right"
    typed = getattr(question.given, larger)
    words = f"braidsearch tighten {larger.upper()}, and compare what it finds"
    if is_standard_input(typed):
        return lines + terminal.item("go on", words)
    return lines + terminal.command("go on", ["braidsearch", "tighten", typed], words)


def further_limits(limits: SearchLimits, explored: Mapping[str, Any]) -> SearchLimits | None:
    """The limits for another try after a search that ended so; None if no limit ended it.

    The limit that was reached is raised tenfold, to the usual one at least, and the other out of
    its way, by the rate of this search. A bound on strands that was given is raised by two.
    """
    from braidsearch.search.limits import Ending, SearchLimits  # noqa: PLC0415 - see the caller

    usual = SearchLimits()
    nodes, seconds = explored["nodes"], explored["seconds"]
    if explored["ending"] == Ending.INTERRUPTED.value:
        return limits
    further = limits
    if explored["ending"] == Ending.NODE_LIMIT.value:
        most = max(_FURTHER * (limits.nodes or 0), usual.nodes or 0)
        needed = _rounded_up(seconds * most / nodes) if nodes else 0
        further = replace(limits, nodes=most)
        if limits.seconds is not None and needed > limits.seconds:
            further = replace(further, seconds=needed)
    elif explored["ending"] == Ending.TIME_LIMIT.value:
        longest = max(_FURTHER * (limits.seconds or 0), usual.seconds or 0)
        further = replace(limits, seconds=longest)
        if limits.nodes is not None and nodes * _FURTHER >= limits.nodes:
            further = replace(further, nodes=None)
    else:
        return None
    strands = limits.max_strands
    if strands is not None:
        further = replace(further, max_strands=min(strands + 2, MAX_STRANDS))
    return further


def _rounded_up(seconds: float) -> float:
    """The least number of one digit and noughts that is not smaller."""
    if seconds <= 1:
        return 1.0
    unit = 10.0 ** math.floor(math.log10(seconds))
    return math.ceil(seconds / unit) * unit


def _limit_options(limits: SearchLimits, given: Namespace) -> list[str]:
    """The options that set these limits; one at its usual value where another was typed before."""
    usual = type(limits)()
    options = []
    for name in ("seconds", "nodes", "max_strands"):
        value = getattr(limits, name)
        if value != getattr(usual, name) or hasattr(given, name):
            shown = "none" if value is None else f"{value:.12g}"
            options += [f"--{name.replace('_', '-')}", shown]
    return options


def _up_to(question: Question) -> list[str]:
    return list(question.given.up_to or [])


def _file_name(question: Question) -> str:
    """The file that was asked for, or one that may be."""
    return str(question.given.output or _free_name("proof", ".json"))


def _free_name(stem: str, ending: str) -> str:
    """A name that no file has: what is proposed must not write over a certificate."""
    names = (f"{stem}{'' if number == 1 else f'-{number}'}{ending}" for number in count(1))
    return next(name for name in names if not os.path.lexists(name))


def _ask(
    name: str,
    question: Question,
    symmetries: Sequence[str],
    options: Sequence[str],
    terminal: Terminal,
) -> list[str]:
    """The line with a question about the same links; in words where they cannot be typed again."""
    asked = ["--up-to", ",".join(symmetries)] if symmetries else []
    more = [*asked, *options]
    words = f"the same command with {' '.join(map(quote_argument, more))}"
    left, right = question.given.left, question.given.right
    if is_standard_input(left) or is_standard_input(right):
        return terminal.item(name, words)
    return terminal.command(name, ["braidsearch", "compare", left, right, *more], words)
