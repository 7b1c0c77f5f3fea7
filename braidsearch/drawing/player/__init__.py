"""A proof as one HTML page: the pictures move from step to step."""

from braidsearch.drawing.player.page import draw_proof_page

__all__ = ["draw_proof_page"]
