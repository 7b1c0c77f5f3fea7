"""Braid words: the value, its notations, its reductions and its symmetries."""

from braidsearch.words.braid import MAX_LETTERS, MAX_STRANDS, Braid
from braidsearch.words.notation import format_sigma, format_word, parse_word
from braidsearch.words.reduction import cyclic_reduce, free_reduce
from braidsearch.words.symmetry import SYMMETRIES, apply_symmetry

__all__ = [
    "MAX_LETTERS",
    "MAX_STRANDS",
    "SYMMETRIES",
    "Braid",
    "apply_symmetry",
    "cyclic_reduce",
    "format_sigma",
    "format_word",
    "free_reduce",
    "parse_word",
]
