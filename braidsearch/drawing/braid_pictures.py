"""Pictures of a braid and of its closure."""

from __future__ import annotations

from collections.abc import Sequence

from braidsearch.drawing.braid_parts import Mark, Options, braid_part, closure_part
from braidsearch.drawing.levels import check_size
from braidsearch.drawing.sheet import Sheet
from braidsearch.drawing.svg import write_svg
from braidsearch.words import Braid, format_word


def draw_braid(  # noqa: PLR0913 - each is one choice about the picture
    braid: Braid,
    *,
    direction: str = "down",
    has_letters: bool = False,
    marks: Sequence[Mark] = (),
    is_transparent: bool = False,
    identifier: str = "",
) -> str:
    """The picture of a braid, as SVG.

    Strands run downwards, or to the right with strand 1 at the bottom. sigma_i is a positive,
    right-handed crossing: of two strands that run downwards the one from the right, at position
    i + 1, passes over. Read level by level, each from the left, the crossings are the letters of
    the word. A long braid goes on in further parts, dashed lines where it is cut.

    Components of the closure have a colour and a pattern of their own. ``identifier`` is what the
    ids in the picture begin with; by default a digest of its content.

    Raises CapacityError for more than 2,000 crossings or 60 strands, InputError for an unknown
    direction.
    """
    check_size(braid)
    part = braid_part(braid, Options(direction, has_letters, tuple(marks)))
    title = f"Braid on {_count(braid.strands, 'strand')} with {_count(len(braid), 'letter')}"
    description = f"{describe_word(braid)} {_describe_direction(direction)}"
    return write_svg(Sheet(part, title, description, is_transparent, identifier))


def draw_closure(  # noqa: PLR0913 - each is one choice about the picture
    braid: Braid,
    *,
    direction: str = "down",
    has_letters: bool = False,
    marks: Sequence[Mark] = (),
    is_transparent: bool = False,
    identifier: str = "",
) -> str:
    """The picture of the closure of a braid, as SVG: strands lead back beside the braid.

    The diagram is that of ``closed_braid_diagram``. Arguments, conventions and errors are those of
    ``draw_braid``; a closure is never cut into parts.
    """
    check_size(braid)
    part = closure_part(braid, Options(direction, has_letters, tuple(marks)))
    title = (
        f"Closure of a braid on {_count(braid.strands, 'strand')} with "
        f"{_count(len(braid), 'letter')}: {_count(braid.components, 'component')}"
    )
    description = f"{describe_word(braid)} {_describe_direction(direction)}"
    return write_svg(Sheet(part, title, description, is_transparent, identifier))


def describe_word(braid: Braid) -> str:
    """The word of the braid, as it may be typed, in a sentence."""
    return f"Word: {format_word(braid)}."


def _describe_direction(direction: str) -> str:
    if direction == "down":
        run, over = "downwards", "the one from the right"
    else:
        run, over = "to the right, strand 1 at the bottom", "the one from above"
    return f"Strands run {run}; at a positive letter {over} passes over."


def _count(number: int, noun: str) -> str:
    return f"{number} {noun}" + ("" if number == 1 else "s")
