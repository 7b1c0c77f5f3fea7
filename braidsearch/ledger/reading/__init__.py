"""Reading catalogues of links from files: tables, JSON, lists of words, diagrams, polygons."""

from braidsearch.ledger.reading.catalogue import (
    is_certificate_file,
    iter_outcomes,
    iter_rows,
    read_entries,
)
from braidsearch.ledger.reading.entries import (
    entry_of,
    gather_entries,
    iter_distinct,
    outcome_of,
)
from braidsearch.ledger.reading.values import (
    Entry,
    Problem,
    Reading,
    Repeated,
    Row,
    format_problems,
)

__all__ = [
    "Entry",
    "Problem",
    "Reading",
    "Repeated",
    "Row",
    "entry_of",
    "format_problems",
    "gather_entries",
    "is_certificate_file",
    "iter_distinct",
    "iter_outcomes",
    "iter_rows",
    "outcome_of",
    "read_entries",
]
