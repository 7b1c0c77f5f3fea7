"""braidsearch explain FILE: the proof that a certificate holds, in words, step by step."""

from __future__ import annotations

import shutil
import sys
from argparse import Namespace
from collections.abc import Sequence
from typing import TYPE_CHECKING

from braidsearch.certificates import (
    Certificate,
    check_destination,
    format_certificate,
    parse_certificate,
    write_certificate,
)
from braidsearch.command_line.answer import SUCCESS, Answer, json_answer, one_line
from braidsearch.command_line.arguments import CommandParser
from braidsearch.errors import BraidsearchError, InputError
from braidsearch.search.gate import judge

if TYPE_CHECKING:
    from braidsearch.explaining import Explanation

_DESCRIPTION = """Explain a certificate: the claim; every step with the word before and after, the
part that it acts on in brackets, and why it is allowed; for a difference both values, one under the
other; and where the theorems that are relied on are published. The certificate is verified first,
and one that is not valid is refused.

--steps elementary writes every conjugation and rewriting out in single letters and relations: free
insertion and cancellation, far commutation, the braid relation. That is a certificate again, which
the verifier accepts: -o writes it."""

_EXAMPLES = """  braidsearch explain proof.json
  braidsearch explain proof.json --steps elementary -o elementary.json
  braidsearch explain proof.json --format latex > proof.tex

exit status: 0 explained, 1 for a certificate that is rejected, 2 for a file that cannot be read or
a mistake in the input."""

_REJECTED = 1
_WIDTH = 100  # where the output is no terminal
_LARGEST_FILE = 16_000_000  # bytes: the verifier reads no more


def answer(arguments: Sequence[str]) -> Answer:
    """Carry out the command. Raises InputError for what cannot be read or written."""
    parser = CommandParser("explain", _DESCRIPTION, _EXAMPLES)
    parser.add_text("file", metavar="FILE", explanation="a certificate (-: standard input)")
    parser.add_text("--steps", metavar="KIND", explanation="moves (as they stand), or elementary")
    parser.add_text("--format", metavar="FORM", explanation="text, or latex")
    parser.add_text(
        "-o", "--output", metavar="FILE", explanation="the certificate of --steps elementary"
    )
    parser.add_json()
    given = parser.read(arguments)
    _check_options(given)
    certificate = _read(given.file)
    report = judge(certificate)
    if not report.valid:
        return _refuse(given, report.claim, report.reason)
    from braidsearch.explaining import explain_proof  # noqa: PLC0415 - mistakes come faster

    explanation = explain_proof(certificate, is_elementary=given.steps == "elementary")
    if explanation.is_elementary:
        _check_expansion(explanation.certificate)
    return _answer(explanation, given)


def _check_options(given: Namespace) -> None:
    for name, value, known in (
        ("--steps", given.steps, ("moves", "elementary")),
        ("--format", given.format, ("text", "latex")),
    ):
        if value not in (None, *known):
            raise InputError(f"{name}: {value!r}: expected {' or '.join(known)}")
    if given.json and given.format == "latex":
        raise InputError("--format latex with --json: expected one of them")
    if given.output is not None:
        if given.steps != "elementary":
            raise InputError(f"-o {given.output}: expected --steps elementary with it")
        if given.output == "-" and given.json:
            raise InputError("-o -: expected a file, since --json prints the explanation there")
        if given.output != "-":
            check_destination(given.output)


def _read(file: str) -> Certificate:
    """The certificate in the file. Raises InputError, which names the file and what is wrong."""
    name = "standard input" if file == "-" else file
    try:
        data = _read_bytes(file)
        if len(data) > _LARGEST_FILE:
            raise InputError(f"more than {_LARGEST_FILE} bytes: expected a smaller file")
        return parse_certificate(data.decode("utf-8"))
    except OSError as error:
        raise InputError(f"{name}: {error.strerror}: expected a certificate file") from None
    except UnicodeDecodeError:
        raise InputError(f"{name}: expected text in UTF-8") from None
    except InputError as error:
        raise InputError(f"{name}: {error}") from None


def _read_bytes(file: str) -> bytes:
    """The content, with one byte more than allowed where it is too long."""
    if file != "-":
        with open(file, "rb") as opened:
            return opened.read(_LARGEST_FILE + 1)
    if sys.stdin is None:
        raise InputError("it is closed: expected a certificate")
    return sys.stdin.buffer.read(_LARGEST_FILE + 1)


def _refuse(given: Namespace, claim: str, reason: str) -> Answer:
    """Nothing false is explained."""
    hint = one_line(f"braidsearch explain: {given.file}: rejected: {reason}")
    if given.json:
        return json_answer(_REJECTED, {"valid": False, "claim": claim, "reason": reason}, hint)
    return Answer(_REJECTED, "", hint)


def _check_expansion(certificate: Certificate) -> None:
    """An expansion leaves here only after the independent verifier has accepted it."""
    report = judge(certificate)
    if not report.valid:
        raise BraidsearchError(
            f"the elementary steps were not accepted ({report.reason}): expected them to be"
        )


def _answer(explanation: Explanation, given: Namespace) -> Answer:
    from braidsearch.explaining import (  # noqa: PLC0415 - mistakes come faster
        explanation_to_json,
        format_latex,
        format_text,
    )

    if given.output not in (None, "-"):
        write_certificate(explanation.certificate, given.output)
    if given.json:
        return json_answer(SUCCESS, explanation_to_json(explanation))
    if given.format == "latex":
        text = format_latex(explanation)
    else:
        text = format_text(explanation, _width())
    if given.output != "-":
        return Answer(SUCCESS, text)
    return Answer(SUCCESS, format_certificate(explanation.certificate).rstrip(), text)


def _width() -> int:
    is_terminal = sys.stdout is not None and sys.stdout.isatty()
    return shutil.get_terminal_size().columns if is_terminal else _WIDTH
