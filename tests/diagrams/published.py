"""The published diagrams: planar diagram codes of the tables, in their several columns.

From the package ``database-knotinfo`` (C. Livingston, A. H. Moore, KnotInfo and LinkInfo).
"""

from braidsearch.diagrams import LinkDiagram, parse_planar_diagram_code
from tests.knot_tables import TableRow


def planar_diagram_text(row: TableRow) -> str:
    return row.columns["pd_notation" if row.is_knot else "pd_notation_vector"]


def published_diagram(row: TableRow) -> LinkDiagram:
    return parse_planar_diagram_code(planar_diagram_text(row))


def dowker_thistlethwaite_text(row: TableRow) -> str:
    return row.columns["dt_notation" if row.is_knot else "dt_code"]
