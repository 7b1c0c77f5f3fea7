"""The picture of a proof: all stages of a certificate on one sheet, with captions."""

from __future__ import annotations

from collections.abc import Iterable, Sequence
from dataclasses import dataclass

from braidsearch.certificates import Certificate, Distinction, explain_certificate
from braidsearch.certificates.display import show_value
from braidsearch.certificates.explanation import (
    IMAGES,
    count_of,
    describe_invariant,
    explain_move,
    shown_braid,
)
from braidsearch.drawing.braid_parts import Mark, Options, braid_part
from braidsearch.drawing.braid_pictures import describe_word
from braidsearch.drawing.changes import Span, carried_components, changed_letters
from braidsearch.drawing.levels import check_size
from braidsearch.drawing.palette import QUIET
from braidsearch.drawing.sheet import (
    COMFORTABLE_WIDTH,
    Part,
    Sheet,
    below,
    in_lines,
    paragraph,
)
from braidsearch.drawing.strand_paths import components_of_positions
from braidsearch.drawing.svg import write_svg
from braidsearch.errors import BraidsearchError, InputError
from braidsearch.moves import Destabilize, Move, Stabilize
from braidsearch.words import Braid

MOST_STAGES = 60
"""Stages of one chain of moves that a sheet shows unless it is told otherwise."""

MOST_CROSSINGS = 12_000
"""Crossings that all pictures of one sheet have together."""

_NARROW = 170.0
_SPACE = 12.0


@dataclass(frozen=True)
class _Stage:
    """One braid of a chain with its caption; ``braid`` is None where there is none to draw."""

    caption: str
    braid: Braid | None
    components: tuple[int, ...] = ()
    marks: tuple[Mark, ...] = ()


def draw_proof(  # noqa: PLR0913 - each is one choice about the picture
    certificate: Certificate,
    *,
    direction: str = "right",
    has_letters: bool = True,
    most_stages: int | None = MOST_STAGES,
    is_transparent: bool = False,
    identifier: str = "",
) -> str:
    """The picture of a certificate, as SVG: every stage of its proof, each with its caption.

    Stages stand one under the other, or, where strands run downwards, in lines beside each other.
    A soft band marks the letters that the next move acts on, a dashed frame those that the last
    one made. Strands keep the colours of their components from stage to stage.

    Of a chain with more than ``most_stages`` stages the middle is left out, and a stage that is
    too large to draw is a line of text; the sheet says so. Whether the claim holds is not checked
    here. Raises InputError for fewer than two stages, and for an unknown direction.
    """
    if most_stages is not None and most_stages < 2:
        raise InputError(f"{most_stages} stages: expected at least 2, the first and the last")
    writer = _SheetWriter(Options(direction, has_letters), most_stages)
    part = below([Part(0.0, 0.0), *writer.iter_parts(certificate), Part(0.0, 0.0)], _SPACE)
    title = f"Proof that two braids close to {_claimed(certificate)}"
    words = f"Left: {describe_word(certificate.left)} Right: {describe_word(certificate.right)}"
    description = f"{words}\n{explain_certificate(certificate, most_stages)}"
    return write_svg(Sheet(part, title, description, is_transparent, identifier))


def count_left_out(certificate: Certificate, most_stages: int | None = MOST_STAGES) -> int:
    """How many stages of its chains ``draw_proof`` leaves out, since they are too many."""
    if most_stages is None:
        return 0
    return sum(max(0, len(moves) + 1 - most_stages) for moves in certificate.chains)


class _SheetWriter:
    """Makes the parts of a sheet in order, and keeps count of what is left of its crossings."""

    def __init__(self, options: Options, most_stages: int | None) -> None:
        self._options = options
        self._most_stages = most_stages
        self._crossings_left = MOST_CROSSINGS

    def iter_parts(self, certificate: Certificate) -> Iterable[Part]:
        """All parts of the sheet from top to bottom."""
        left, right = certificate.left, certificate.right
        if certificate.verdict == "same":
            image = IMAGES[str(certificate.symmetry)]
            yield paragraph(f"The closure of LEFT is {image} of RIGHT = {shown_braid(right)}.")
            yield from self._chain_parts("LEFT", left, certificate.moves)
            of = "" if certificate.symmetry == "identity" else f"the {certificate.symmetry} of "
            yield paragraph(f"This is {of}RIGHT, letter by letter.")
        else:
            yield paragraph("The closures of LEFT and RIGHT are different links.")
            yield from self._chain_parts("LEFT", left, ())
            yield from self._chain_parts("RIGHT", right, ())
            for distinction in certificate.distinctions:
                yield from self._distinction_parts(distinction, left, right)

    def _distinction_parts(
        self, distinction: Distinction, left: Braid, right: Braid
    ) -> Iterable[Part]:
        image = IMAGES[distinction.symmetry]
        yield paragraph(
            f"The closure of LEFT is not {image} of RIGHT, by the "
            f"{describe_invariant(distinction)}."
        )
        chains = (("LEFT", left, distinction.left_moves), ("RIGHT", right, distinction.right_moves))
        for name, braid, moves in chains:
            if moves:
                yield from self._chain_parts(name, braid, moves)
        of = "RIGHT" if distinction.symmetry == "identity" else f"{distinction.symmetry} of RIGHT"
        for name, value in (("LEFT", distinction.left), (of, distinction.right)):
            shown = show_value(distinction.invariant, value, dict(distinction.parameters))
            yield paragraph(f"{name}: {shown}")

    def _chain_parts(self, name: str, start: Braid, moves: Sequence[Move]) -> Iterable[Part]:
        stages = _stages(name, start, moves)
        shown = _shown_numbers(len(stages), self._most_stages)
        if len(shown) < len(stages):
            yield paragraph(
                f"The proof has {count_of(len(moves), 'move')}; this sheet shows the first "
                "and the last of them.",
                colour=QUIET,
            )
        parts: list[Part] = []
        for before, number in zip([-1, *shown], shown, strict=False):
            if number > before + 1:
                hidden = count_of(number - before - 1, "stage")
                parts.append(paragraph(f"... {hidden} left out, which stand in the certificate"))
            parts.append(self._stage_part(stages[number]))
        yield below(parts, _SPACE) if not self._options.is_downwards else in_lines(parts)

    def _stage_part(self, stage: _Stage) -> Part:
        picture = self._picture(stage)
        width = COMFORTABLE_WIDTH
        if self._options.is_downwards:
            width = max(_NARROW, 0.0 if picture is None else picture.width)
        caption = paragraph(stage.caption, width)
        if picture is None:
            note = paragraph("(too large for this sheet, or not a braid)", width, colour=QUIET)
            return below([caption, note])
        column = Part(width if self._options.is_downwards else 0.0, 0.0)  # all equally wide
        return below([caption, picture, column], 2.0)

    def _picture(self, stage: _Stage) -> Part | None:
        """The braid of the stage, None where it cannot be drawn."""
        if stage.braid is None or len(stage.braid) > self._crossings_left:
            return None
        try:
            check_size(stage.braid)
        except BraidsearchError:
            return None
        self._crossings_left -= len(stage.braid)
        options = Options(self._options.direction, self._options.has_letters, stage.marks)
        return braid_part(stage.braid, options, stage.components)


def _stages(name: str, start: Braid, moves: Sequence[Move]) -> list[_Stage]:
    """The stages from the start on, each with what the moves around it change."""
    braids: list[Braid | None] = [start]
    for move in moves:
        braids.append(_stated_braid(braids[-1], move))
    spans: list[tuple[Span, Span]] = [
        changed_letters(() if before is None else before.word, move)
        for before, move in zip(braids, moves, strict=False)
    ]
    acted, made = [*(span for span, _ in spans), (0, 0)], [(0, 0), *(span for _, span in spans)]
    captions = [f"{name} = {shown_braid(start)}"]
    captions += [f"{number}. {explain_move(move)}" for number, move in enumerate(moves, start=1)]
    components = _components_of_stages(braids, moves)
    return [
        _Stage(caption, braid, colours, (Mark(*now), Mark(*then, is_frame=True)))
        for caption, braid, colours, now, then in zip(
            captions, braids, components, acted, made, strict=True
        )
    ]


def _stated_braid(before: Braid | None, move: Move) -> Braid | None:
    """The braid that the move states; None where its letters do not fit its strands."""
    if isinstance(move, Stabilize | Destabilize):
        strands = move.strands
    elif before is None:
        return None
    else:
        strands = before.strands
    try:
        return Braid(move.word, strands)
    except InputError:
        return None


def _components_of_stages(
    braids: Sequence[Braid | None], moves: Sequence[Move]
) -> list[tuple[int, ...]]:
    """For each stage the component of each start position, carried on from the first stage."""
    found: list[tuple[int, ...]] = []
    for number, braid in enumerate(braids):
        if braid is None:
            found.append(())
            continue
        before = braids[number - 1] if number else None
        carried = None
        if before is not None:
            try:
                carried = carried_components(found[-1], before, moves[number - 1])
            except InputError:
                carried = None  # a conjugation by letters that the group does not have
        found.append(tuple(components_of_positions(braid) if carried is None else carried))
    return found


def _shown_numbers(count: int, most: int | None) -> list[int]:
    if most is None or count <= most:
        return list(range(count))
    return [*range((most + 1) // 2), *range(count - most // 2, count)]


def _claimed(certificate: Certificate) -> str:
    if certificate.verdict == "different":
        return "different links"
    if certificate.symmetry == "identity":
        return "the same link"
    return f"the same link up to the symmetry {certificate.symmetry}"
