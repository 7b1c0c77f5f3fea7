"""Certificates: the claim about two closed braids and its proof, as values, files and words."""

from braidsearch.certificates.explanation import explain_certificate
from braidsearch.certificates.reading import parse_certificate, read_certificate
from braidsearch.certificates.values import Certificate, Distinction
from braidsearch.certificates.writing import (
    braid_to_json,
    certificate_to_json,
    check_destination,
    format_certificate,
    write_certificate,
)

__all__ = [
    "Certificate",
    "Distinction",
    "braid_to_json",
    "certificate_to_json",
    "check_destination",
    "explain_certificate",
    "format_certificate",
    "parse_certificate",
    "read_certificate",
    "write_certificate",
]
