"""Colours and dash patterns by which components are told apart, and the tones of the rest."""

from __future__ import annotations

from dataclasses import dataclass

INK = "#33383f"
"""Numbers, letters and captions."""

QUIET = "#6b737e"
"""Remarks beside the matter."""

HAIRLINE = "#9aa1ab"
"""The lines on which strands begin and end."""

PAPER = "#ffffff"

BAND = "#fae9bd"
"""Soft, behind the part that a move acts on."""

FRAME = "#b58a1f"
"""The outline of the part that a move has made."""

COLOURS: tuple[str, ...] = (
    "#1d4e89",  # deep blue
    "#c8501e",  # burnt orange
    "#0b7a5e",  # green of the sea
    "#8e3b78",  # plum
    "#9a6b00",  # ochre
    "#3f88c5",  # sky
    "#5b4636",  # umber
    "#d1497b",  # rose
    "#5c6f1c",  # moss
)
"""Each at a contrast of 3 or more to white paper, neighbours of unlike lightness and warmth."""

DASHES: tuple[str, ...] = ("", "7 5", "1.6 4.4", "9 3.5 1.6 3.5", "none", "3.2 2.6", "14 3")
"""Patterns of the light line inside a strand, in user units; "" is no line, "none" one unbroken."""


@dataclass(frozen=True, slots=True)
class Look:
    """How one component is drawn: the colour of its strands, the dashes of the line inside."""

    colour: str
    dashes: str


def look_of(component: int) -> Look:
    """The look of the component with this number, from 0.

    The numbers of colours and of patterns have no common divisor, so that the first 63 components
    all look different. The pattern lies inside the strand: a strand is never broken but where it
    passes under another.
    """
    return Look(COLOURS[component % len(COLOURS)], DASHES[component % len(DASHES)])
