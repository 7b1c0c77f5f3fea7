"""Closed polygons in space: reading them, simplifying them, and the diagrams they project to."""

from braidsearch.diagrams.polygons.arrays import MAX_VERTICES, Polygon, check_polygons
from braidsearch.diagrams.polygons.drawing import polygon_diagram, simplify_polygons
from braidsearch.diagrams.polygons.reading import format_polygons, parse_polygons, read_polygons

__all__ = [
    "MAX_VERTICES",
    "Polygon",
    "check_polygons",
    "format_polygons",
    "parse_polygons",
    "polygon_diagram",
    "read_polygons",
    "simplify_polygons",
]
