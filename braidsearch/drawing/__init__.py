"""Pictures of braids, of their closures and of proofs, as SVG."""

from braidsearch.drawing.braid_pictures import DIRECTIONS, Mark, draw_braid, draw_closure

__all__ = ["DIRECTIONS", "Mark", "draw_braid", "draw_closure"]
