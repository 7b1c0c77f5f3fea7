"""What is done for each braid by itself: its canonical form, the proof of that, its fingerprint."""

from __future__ import annotations

from collections.abc import Sequence
from dataclasses import dataclass

from braidsearch.certificates import Certificate, format_certificate
from braidsearch.errors import CapacityError
from braidsearch.ledger.fingerprints import Fingerprint, fingerprint
from braidsearch.search.canonical_form import canonical_route
from braidsearch.search.gate import judge
from braidsearch.search.proof import checked_chain
from braidsearch.search.route import Route
from braidsearch.words import Braid

_LONGEST_SHORTENED = 60  # moves from which on a chain to the canonical form is freed of detours


@dataclass(frozen=True, slots=True)
class Prepared:
    """A braid with its canonical form, which is the same oriented link.

    ``certificate`` is the text of the proof, accepted by the verifier; None where the braid is its
    own form. ``fingerprint`` is that of the form.
    """

    braid: Braid
    form: Braid
    certificate: str | None
    fingerprint: Fingerprint


def prepare_all(braids: Sequence[Braid]) -> list[Prepared]:
    """Each braid prepared, in order."""
    return [prepare(braid) for braid in braids]


def prepare(braid: Braid) -> Prepared:
    """The braid prepared. A braid that is too large for a canonical form is its own form."""
    try:
        certificate = form_certificate(braid)
    except CapacityError:
        certificate = None
    if certificate is None:
        return Prepared(braid, braid, None, fingerprint(braid))
    form = certificate.right
    return Prepared(braid, form, format_certificate(certificate), fingerprint(form))


def form_certificate(braid: Braid) -> Certificate | None:
    """The proof that the canonical form is the same link; None for a braid that is its own form.

    Raises CapacityError for what is too large for a form, or for the verifier.
    """
    route = canonical_route(braid)
    if route.current == braid:
        return None
    certificate = same_certificate(route, route.current)
    if certificate is None:
        raise CapacityError("the verifier did not accept the moves to the canonical form")
    return certificate


def same_certificate(route: Route, end: Braid) -> Certificate | None:
    """The certificate of a route that ends at ``end``, None unless the verifier accepts it."""
    moves = route.moves
    chain = checked_chain(route.start, moves, end, is_short=len(moves) < _LONGEST_SHORTENED)
    certificate = Certificate.same(route.start, end, "identity", chain.moves)
    return certificate if judge(certificate).valid else None
