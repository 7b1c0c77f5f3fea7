"""Proofs that people can read: certificates in words, step by step, in text and in LaTeX."""

from braidsearch.explaining.expansion import Expansion, expand_certificate

__all__ = ["Expansion", "expand_certificate"]
