"""The options that several actions on a ledger share."""

from __future__ import annotations

from argparse import Namespace
from collections.abc import Sequence

from braidsearch.command_line.arguments import CommandParser
from braidsearch.errors import InputError
from braidsearch.words import SYMMETRIES

_MOST_PROCESSES = 1_000


def ledger_parser(action: str, description: str, examples: str) -> CommandParser:
    """A parser whose first argument is the file of the ledger."""
    parser = CommandParser(f"ledger {action}", description, examples)
    parser.add_text("ledger", metavar="LEDGER", explanation="the file of the ledger")
    return parser


def add_nodes(parser: CommandParser) -> None:
    """The option --nodes."""
    parser.add_number(
        "--nodes",
        int,
        "a count",
        "conjugacy classes that the search for one question enters (1000)",
    )


def read_nodes(given: Namespace) -> int:
    """The nodes given. Raises InputError for none: each question must end."""
    from braidsearch.ledger.ledger import DEFAULT_NODES  # noqa: PLC0415 - help comes faster

    nodes = getattr(given, "nodes", DEFAULT_NODES)
    if nodes is None:
        raise InputError("--nodes: 'none': expected a count, so that every question ends")
    return int(nodes)


def add_symmetries(parser: CommandParser, explanation: str) -> None:
    """The option --up-to."""
    parser.add_text(
        "--up-to",
        metavar="SYMMETRIES",
        explanation=f"{explanation}: mirror,reverse,mirror-reverse or any",
        is_repeatable=True,
    )


def read_symmetries(values: Sequence[str] | None) -> tuple[str, ...]:
    """The symmetries asked for beside the identity, in the order of SYMMETRIES."""
    names = [name.strip() for value in values or () for name in value.split(",")]
    for name in names:
        if name not in (*SYMMETRIES, "any"):
            raise InputError(f"--up-to: {name!r}: expected any, or {', '.join(SYMMETRIES[1:])}")
    wanted = SYMMETRIES if "any" in names else names
    return tuple(symmetry for symmetry in SYMMETRIES[1:] if symmetry in wanted)


def add_workers(parser: CommandParser) -> None:
    """The options --processes and --scheduler."""
    parser.add_number("--processes", int, "a count", "processes at work (one for each core)")
    parser.add_text(
        "--scheduler",
        metavar="ADDRESS",
        explanation="work on the Dask cluster with this scheduler, such as tcp://127.0.0.1:8786",
    )


def read_processes(given: Namespace) -> int | None:
    """The processes given, None for one for each core. Raises InputError for no count."""
    processes: int | None = getattr(given, "processes", None)
    if processes is not None and not 1 <= processes <= _MOST_PROCESSES:
        raise InputError(f"--processes: {processes}: expected a count from 1 to {_MOST_PROCESSES}")
    if getattr(given, "scheduler", None) is not None and processes is not None:
        raise InputError("--processes: expected no --scheduler beside it")
    return processes
