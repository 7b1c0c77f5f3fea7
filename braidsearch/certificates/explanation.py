"""Certificates in words for people: what is claimed, and each step of the proof on a line."""

from __future__ import annotations

from collections.abc import Mapping
from typing import TYPE_CHECKING, Any

from braidsearch.certificates.display import show_permutation, show_value
from braidsearch.moves import Conjugate, Move, Rewrite, Stabilize
from braidsearch.words import Braid, format_word

if TYPE_CHECKING:
    from braidsearch.certificates.values import Certificate, Distinction

IMAGES: dict[str, str] = {
    "identity": "the closure",
    "mirror": "the mirror image of the closure",
    "reverse": "the reverse of the closure",
    "mirror-reverse": "the reversed mirror image of the closure",
}
"""What each symmetry makes of the closure of the right braid, in words."""

_LONGEST_WORD = 24


def explain_certificate(certificate: Certificate, most_moves: int | None = None) -> str:
    """The claim and its proof in short lines.

    ``most_moves`` bounds the moves shown of each chain: of a longer one the middle is left out,
    and said to be. None shows all.
    """
    if certificate.verdict == "same":
        return "\n".join(_explain_same(certificate, most_moves))
    lines = [f"claim: the closure of {_named('left', certificate.left)}"]
    for distinction in certificate.distinctions:
        image = IMAGES[distinction.symmetry]
        lines.append(f"  is not {image} of {_named('right', certificate.right)},")
        lines += ["  " + line for line in _explain_distinction(distinction, most_moves)]
    return "\n".join(lines)


def explain_move(move: Move) -> str:
    """One move in words, with the word that results."""
    word = shown_word(move.word)
    if isinstance(move, Rewrite):
        return f"rewrite by braid relations: {word}"
    if isinstance(move, Conjugate):
        return f"conjugate by {shown_word(move.by)}: {word}"
    if isinstance(move, Stabilize):
        return f"add strand {move.strands} with the letter {move.sign * (move.strands - 1)}: {word}"
    taken = f"take away strand {move.strands + 1} with the letter {move.sign * move.strands}"
    return f"{taken}: {word}"


def shown_word(word: tuple[int, ...]) -> str:
    """The letters, the middle of a long word left out."""
    if not word:
        return "(empty)"
    if len(word) <= _LONGEST_WORD:
        return " ".join(map(str, word))
    half = _LONGEST_WORD // 2
    head, tail = " ".join(map(str, word[:half])), " ".join(map(str, word[-half:]))
    return f"{head} ... {tail} ({len(word)} letters)"


def shown_braid(braid: Braid) -> str:
    """The braid as it may be typed, the middle of a long word left out."""
    if len(braid.word) <= _LONGEST_WORD:
        return f'"{format_word(braid)}"'
    return f'"{braid.strands}: {shown_word(braid.word)}"'


def _explain_same(certificate: Certificate, most_moves: int | None) -> list[str]:
    assert certificate.symmetry is not None
    image = IMAGES[certificate.symmetry]
    claim = [
        f"claim: the closure of {_named('left', certificate.left)}",
        f"  is {image} of {_named('right', certificate.right)}",
    ]
    if not certificate.moves:
        target = _image_of_right(certificate.symmetry)
        return [*claim, f"proof: LEFT is {target}, letter by letter"]
    lines = [f"proof: {count_of(len(certificate.moves), 'move')}, from LEFT"]
    lines += _number_moves(certificate.moves, most_moves)
    return [*claim, *lines, f"  which is {_image_of_right(certificate.symmetry)}, letter by letter"]


def _explain_distinction(distinction: Distinction, most_moves: int | None) -> list[str]:
    lines = []
    for side, moves in (("LEFT", distinction.left_moves), ("RIGHT", distinction.right_moves)):
        if moves:
            lines.append(f"after {count_of(len(moves), 'move')} on {side}:")
            lines += _number_moves(moves, most_moves)
    of = _image_of_right(distinction.symmetry, article="")
    lines.append(f"by the {describe_invariant(distinction)}:")
    for side, value in (("LEFT", distinction.left), (of, distinction.right)):
        text = show_value(distinction.invariant, value, dict(distinction.parameters))
        lines.append(f"  {side + ':':<{len(of) + 1}} {text}")
    return lines


def describe_invariant(distinction: Distinction) -> str:
    """The name of the invariant in words, with the parameters that select it."""
    return describe_evidence(distinction.invariant, dict(distinction.parameters))


def describe_evidence(invariant: str, parameters: Mapping[str, Any]) -> str:
    """The invariant with these parameters, in words."""
    from braidsearch.invariants import TITLES  # noqa: PLC0415 - not for proofs of sameness

    title = TITLES.get(invariant, invariant)
    if invariant == "sublinks":
        inner = {key: value for key, value in parameters.items() if key != "components"}
        of = describe_evidence(str(inner.pop("invariant")), inner)
        return f"{of} of all sublinks of {count_of(parameters['components'], 'component')}"
    if invariant == "colouring":
        shown = [
            ", ".join(map(show_permutation, parameters[name]))
            for name in ("generators", "meridians")
        ]
        return f"{title} in the group generated by {shown[0]}; meridian {shown[1]}"
    if invariant == "levine-tristram":
        return f"{title} at exp(2 pi i {parameters['power']}/{parameters['order']})"
    if invariant == "alexander-module":
        return f"{title} modulo {parameters['prime']}"
    given = ", ".join(f"{name} = {value}" for name, value in parameters.items())
    return f"{title} ({given})" if given else title


def _number_moves(moves: tuple[Move, ...], most_moves: int | None) -> list[str]:
    width = len(str(len(moves)))
    lines = [f"  {n:>{width}}. {explain_move(move)}" for n, move in enumerate(moves, 1)]
    if most_moves is None or len(lines) <= most_moves:
        return lines
    head, tail = (most_moves + 1) // 2, most_moves // 2
    hidden = len(lines) - head - tail
    left_out = f"  {'':>{width}}  ... {hidden} more moves, which stand in the certificate"
    return [*lines[:head], left_out, *(lines[-tail:] if tail else [])]


def _image_of_right(symmetry: str, article: str = "the ") -> str:
    return "RIGHT" if symmetry == "identity" else f"{article}{symmetry} of RIGHT"


def _named(side: str, braid: Braid) -> str:
    return f"{side.upper()} = {shown_braid(braid)}"


def count_of(number: int, noun: str) -> str:
    """The number with its noun: "1 move", "2 moves"."""
    return f"{number} {noun}" + ("" if number == 1 else "s")
