"""braidsearch draw LINK: the picture of a braid, of its closure, or of a proof; its page."""

from __future__ import annotations

import os
import re
from argparse import Namespace
from collections.abc import Sequence
from dataclasses import replace
from pathlib import Path
from typing import TYPE_CHECKING

from braidsearch.certificates import check_destination, parse_certificate
from braidsearch.command_line.answer import SUCCESS, Answer, json_answer
from braidsearch.command_line.arguments import CommandParser, read_standard_input
from braidsearch.command_line.draw_report import (
    Drawn,
    drawn_to_json,
    report_drawn,
    warnings_of,
)
from braidsearch.command_line.link_input import INPUTS, WORD_OR_DRAWING, read_link_argument
from braidsearch.errors import CapacityError, InputError
from braidsearch.search.gate import judge

if TYPE_CHECKING:
    from braidsearch.certificates import Certificate

_DESCRIPTION = f"""Print a picture as SVG: of a braid, of its closure, or of all stages of the
proof in a certificate, which is known by its content. Strands run downwards, or to the right;
components differ in colour and in the pattern inside them; the word is kept as description.
With --page a proof becomes one HTML page, which moves the strands from step to step. A certificate
that the verifier rejects is drawn as it stands, with a warning on standard error.

{INPUTS}

--json prints one object in place of the picture: what was "drawn" (braid, closure, proof, page),
the braid with its numbers of letters and components, or the claim with its number of steps, the
width and height, the bytes, the file, and the picture itself where no -o names one."""

_EXAMPLES = """  braidsearch draw "1 -2 1 -2" --closure -o figure-eight.svg
  braidsearch draw "4: 1 2 -1 2 3 2" --direction right --letters > braid.svg
  braidsearch draw proof.json -o proof.svg
  braidsearch draw proof.json --page -o proof.html
  braidsearch compare "1 1 1" "1 2 1 2" -o - | braidsearch draw --proof - -o proof.svg
  braidsearch draw "1 -2 1 -2" --closure -o figure-eight.svg --json

exit status: 0 drawn, 2 for a mistake in the input."""

_LONGEST_INPUT = 100_000_000
_LONGEST_NUMBER = 9


def answer(arguments: Sequence[str]) -> Answer:
    """Carry out the command. Raises InputError for what cannot be read or written."""
    given = _parser().read(arguments)
    _check_choices(given)
    if given.output not in (None, "-"):
        _check_picture_destination(given.output, given.link)
    drawn = _draw(given)
    file = None if given.output == "-" else given.output
    if file is not None:
        _write_picture(drawn.text, file)
    if given.json:
        return json_answer(SUCCESS, drawn_to_json(drawn, file), warnings_of(drawn))
    text = drawn.text if file is None else report_drawn(drawn, file)
    return Answer(SUCCESS, text, warnings_of(drawn))


def _parser() -> CommandParser:
    parser = CommandParser("draw", _DESCRIPTION, _EXAMPLES)
    parser.add_word("link", f"{WORD_OR_DRAWING}; or a certificate file")
    for flag, explanation in (
        ("--closure", "draw the closure of the braid"),
        ("--proof", "LINK is a certificate (a file, or - for standard input)"),
        ("--page", "one HTML page that plays the proof, with the steps in words"),
        ("--letters", "write each letter beside its crossing (proofs have them always)"),
        ("--transparent", "without the white paper behind the picture"),
    ):
        parser.add_argument(flag, action="store_true", help=explanation)
    parser.add_text(
        "--direction",
        metavar="WAY",
        explanation="down or right: where strands run to (braids: down; proofs: right)",
    )
    parser.add_text(
        "--stages", metavar="N", explanation="most stages of a proof that are shown (60), or all"
    )
    parser.add_text("-o", "--output", metavar="FILE", explanation="file for the picture")
    parser.add_json()
    return parser


def _check_choices(given: Namespace) -> None:
    if given.output == "-" and given.json:
        raise InputError("-o -: expected a file, since --json prints the picture already")
    if given.closure and given.proof:
        raise InputError("--closure: expected no --proof beside it")
    if given.page:
        _check_choices_of_page(given)
    if given.direction not in (None, "down", "right"):
        raise InputError(f"--direction: {given.direction!r}: expected down or right")
    _read_stages(given.stages)


def _check_choices_of_page(given: Namespace) -> None:
    """A page has choices of its own, which whoever looks at it makes there."""
    for name in ("closure", "letters", "transparent", "direction", "stages"):
        if getattr(given, name) not in (None, False):
            raise InputError(f"--{name}: expected no --page beside it")


def _read_stages(text: str | None) -> int | None:
    """The most stages to show; None for all."""
    from braidsearch.drawing import MOST_STAGES  # noqa: PLC0415 - help and mistakes come faster

    if text is None or text == "all":
        return MOST_STAGES if text is None else None
    is_number = re.fullmatch(rf"[0-9]{{1,{_LONGEST_NUMBER}}}", text)
    if not is_number or int(text) < 2:
        raise InputError(f"--stages: {text[:40]!r}: expected an integer from 2 upwards, or all")
    return int(text)


def _draw(given: Namespace) -> Drawn:
    certificate = _read_certificate(given)
    if certificate is not None:
        if given.closure:
            raise InputError("--closure: expected a braid, since LINK is a certificate")
        drawn = _draw_page(certificate) if given.page else _draw_proof(certificate, given)
        report = judge(certificate)
        return drawn if report.valid else replace(drawn, fault=report.reason)
    if given.page:
        raise InputError("--page: expected a certificate, since it plays a proof")
    if given.stages is not None:
        raise InputError("--stages: expected a certificate, since it counts those of a proof")
    return _draw_braid(given)


def _draw_braid(given: Namespace) -> Drawn:
    from braidsearch import drawing  # noqa: PLC0415 - help and mistakes come faster

    braid, direction = read_link_argument("LINK", given.link), given.direction or "down"
    draw = drawing.draw_closure if given.closure else drawing.draw_braid
    try:
        text = draw(
            braid,
            direction=direction,
            has_letters=given.letters,
            is_transparent=given.transparent,
        )
    except CapacityError as error:
        raise CapacityError(f"LINK: {error}") from None
    return Drawn("closure" if given.closure else "braid", text, braid, direction)


def _draw_proof(certificate: Certificate, given: Namespace) -> Drawn:
    from braidsearch import drawing  # noqa: PLC0415 - help and mistakes come faster

    direction, most_stages = given.direction or "right", _read_stages(given.stages)
    text = drawing.draw_proof(
        certificate,
        direction=direction,
        most_stages=most_stages,
        is_transparent=given.transparent,
    )
    left_out = drawing.count_left_out(certificate, most_stages)
    return Drawn("proof", text, certificate, direction, left_out)


def _draw_page(certificate: Certificate) -> Drawn:
    from braidsearch.drawing.player import draw_proof_page  # noqa: PLC0415 - not for pictures

    try:
        return Drawn("page", draw_proof_page(certificate).rstrip("\n"), certificate)
    except InputError as error:
        raise InputError(f"LINK: {error}") from None


def _read_certificate(given: Namespace) -> Certificate | None:
    """The certificate that LINK names, None where it is a link."""
    name = given.link
    if name == "-":
        text = read_standard_input(_LONGEST_INPUT) if given.proof else ""
    elif given.proof or os.path.isfile(name):
        text = _read_file(name)
    elif name.endswith(".json"):
        raise InputError(f"LINK: {name!r}: expected an existing file")
    else:
        text = ""
    if not given.proof and not text.lstrip().startswith("{"):
        return None
    try:
        return parse_certificate(text)
    except InputError as error:
        raise InputError(f"LINK: {error}") from None


def _read_file(name: str) -> str:
    try:
        return Path(name).read_text(encoding="utf-8-sig")
    except OSError as error:
        raise InputError(f"LINK: {name!r}: {error.strerror}: expected a file") from None
    except ValueError:
        raise InputError(f"LINK: {name!r}: expected a file of text in UTF-8") from None


def _check_picture_destination(path: str, link: str) -> None:
    try:
        check_destination(path)
    except InputError as error:  # its line speaks of a certificate
        raise InputError(f"picture {str(error).removeprefix('certificate ')}") from None
    if os.path.isfile(link) and os.path.exists(path) and os.path.samefile(link, path):
        raise InputError(f"-o {path}: expected another file than LINK, which it would replace")


def _write_picture(picture: str, path: str) -> None:
    """Write the file whole or not at all."""
    target = os.path.realpath(path)
    partial = f"{target}.{os.getpid()}.partial"
    try:
        if os.path.exists(target) and not os.path.isfile(target):
            Path(target).write_text(picture + "\n", encoding="ascii")  # a pipe stays one
            return
        Path(partial).write_text(picture + "\n", encoding="ascii")
        os.replace(partial, target)
    except OSError as error:
        raise InputError(f"picture {path!r} cannot be written: {error.strerror}") from None
    finally:
        if os.path.exists(partial):
            os.unlink(partial)
