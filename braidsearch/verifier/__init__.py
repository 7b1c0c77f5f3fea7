"""The independent verifier of certificates: one file that imports nothing of this project."""

from braidsearch.verifier.verify import Report, recompute, verify_file, verify_text

__all__ = ["Report", "recompute", "verify_file", "verify_text"]
