"""Pictures of braids, of their closures and of proofs, as SVG."""

from braidsearch.drawing.braid_parts import DIRECTIONS, Mark
from braidsearch.drawing.braid_pictures import draw_braid, draw_closure
from braidsearch.drawing.proof_sheets import MOST_STAGES, count_left_out, draw_proof

__all__ = [
    "DIRECTIONS",
    "MOST_STAGES",
    "Mark",
    "count_left_out",
    "draw_braid",
    "draw_closure",
    "draw_proof",
]
