"""What the page plays, as values that JSON can hold: scenes, lanes, steps and their parts."""

from __future__ import annotations

from collections.abc import Sequence
from typing import Any

from braidsearch.certificates import Certificate
from braidsearch.drawing.changes import carried_components, changed_letters
from braidsearch.drawing.geometry import (
    ARROW_LENGTH,
    GAP,
    LEAD,
    LEVEL_HEIGHT,
    STRAND_SPACING,
    STROKE,
)
from braidsearch.drawing.levels import MAX_CROSSINGS, MAX_STRANDS
from braidsearch.drawing.palette import BAND, COLOURS, DASHES, FRAME, HAIRLINE, INK, PAPER
from braidsearch.drawing.player.movements import Budget, movement_parts
from braidsearch.drawing.sheet import MARGIN
from braidsearch.drawing.strand_paths import (
    CLOSING_GAP,
    closing_reach,
    components_of_positions,
)
from braidsearch.drawing.svg import FONT
from braidsearch.errors import InputError
from braidsearch.moves import Conjugate, Destabilize, Move, Rewrite, Stabilize
from braidsearch.words import Braid

KINDS: dict[type[Move], str] = {
    Rewrite: "rewriting",
    Conjugate: "conjugation",
    Stabilize: "stabilization",
    Destabilize: "destabilization",
}

REASONS: dict[str, str] = {
    "rewriting": "Both words are the same braid: braid relations lead from one to the other.",
    "conjugation": "A closed braid has no first letter: what leaves at the end comes in at the "
    "front, around the closure.",
    "stabilization": "The new strand makes a kink of the closure, which can be untwisted.",
    "destabilization": "The last strand is a kink of the closure, which can be untwisted.",
}
"""Why each kind of move keeps the link."""


def page_measures() -> dict[str, Any]:
    """The measures and colours of all pictures, by the names that the page has for them."""
    spacings = [
        closing_reach(0, strands)[0] - closing_reach(1, strands)[0]
        for strands in range(MAX_STRANDS + 2)
    ]
    return {
        "strandSpacing": STRAND_SPACING,
        "levelHeight": LEVEL_HEIGHT,
        "lead": LEAD,
        "stroke": STROKE,
        "gap": GAP,
        "closingGap": CLOSING_GAP,
        "returnSpacings": spacings,
        "arrowLength": ARROW_LENGTH,
        "font": FONT,
        "margin": MARGIN,
        "mostCrossings": MAX_CROSSINGS,
        "mostStrands": MAX_STRANDS,
        "colours": COLOURS,
        "dashes": DASHES,
        "ink": INK,
        "paper": PAPER,
        "band": BAND,
        "frame": FRAME,
        "hairline": HAIRLINE,
    }


def page_scenes(certificate: Certificate) -> list[dict[str, Any]]:
    """One scene for a proof of sameness, one for each distinction otherwise.

    A scene has a lane for each braid that is seen in it; a lane has steps, and a step has parts.
    Raises InputError where a move states what is no braid.
    """
    budget = Budget()
    left, right = certificate.left, certificate.right
    if certificate.verdict == "same":
        lane = _lane("LEFT", left, certificate.moves, budget)
        of = "" if certificate.symmetry == "identity" else f"{certificate.symmetry} of "
        lane["goal"] = f"{of}RIGHT"
        opening = "The proof begins with this braid."
        closing = f"This is {'the ' if of else ''}{lane['goal']}, letter by letter."
        return [{"title": "LEFT", "opening": opening, "closing": closing, "lanes": [lane]}]
    return [
        {
            "title": "Two different links",
            "opening": "Both braids, with their values below.",
            "lanes": [
                _lane("LEFT", left, distinction.left_moves, budget),
                _lane("RIGHT", right, distinction.right_moves, budget),
            ],
        }
        for distinction in certificate.distinctions
    ]


def _lane(name: str, start: Braid, moves: Sequence[Move], budget: Budget) -> dict[str, Any]:
    components: tuple[int, ...] = tuple(components_of_positions(start))
    lane: dict[str, Any] = {
        "name": name,
        "start": {"strands": start.strands, "word": start.word, "components": components},
        "steps": [],
    }
    braid = start
    for number, move in enumerate(moves, 1):
        after = _stated_braid(braid, move, number)
        components = _carried(components, braid, move, after)
        acted, made = changed_letters(braid.word, move)
        parts = movement_parts(braid, move, components, budget)
        step = {"kind": KINDS[type(move)], "parts": parts, "acted": acted, "made": made}
        lane["steps"].append(step)
        braid = after
    return lane


def _stated_braid(before: Braid, move: Move, number: int) -> Braid:
    strands = move.strands if isinstance(move, Stabilize | Destabilize) else before.strands
    if isinstance(move, Stabilize | Destabilize):
        is_kept = move.word[: len(before)] == before.word[: len(move.word)]
        change = 1 if isinstance(move, Stabilize) else -1
        longer = len(move.word) - len(before) == strands - before.strands == change
        if not (is_kept and longer):
            raise InputError(f"move {number} of the proof: expected one letter and one strand")
    try:
        return Braid(move.word, strands)
    except InputError as error:
        raise InputError(f"move {number} of the proof: {error}") from None


def _carried(
    components: tuple[int, ...], before: Braid, move: Move, after: Braid
) -> tuple[int, ...]:
    try:
        carried = carried_components(components, before, move)
    except InputError:
        carried = None  # a conjugation by letters that the group does not have
    return tuple(components_of_positions(after) if carried is None else carried)
