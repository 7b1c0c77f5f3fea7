"""``compare``: invariants and searches interleaved until one of them settles the question."""

from __future__ import annotations

from collections.abc import Callable, Sequence
from typing import TYPE_CHECKING, Any

from braidsearch.certificates import Certificate, Distinction
from braidsearch.errors import InputError
from braidsearch.search.distinguish import Distinguisher
from braidsearch.search.gate import judge
from braidsearch.search.limits import Budget, Ending, Progress, SearchLimits
from braidsearch.search.route import Route
from braidsearch.search.simplify import simplified
from braidsearch.search.verdict import Verdict
from braidsearch.words import SYMMETRIES, Braid, apply_symmetry

if TYPE_CHECKING:
    from braidsearch.search.meet import Meeting

CHEAP_SECONDS = 0.05
FAIR_SECONDS = 1.0
DEAR_SECONDS = 60.0
_FIRST_SHARE = 0.3


def compare(
    left: Braid,
    right: Braid,
    *,
    up_to: Sequence[str] = (),
    limits: SearchLimits | None = None,
    progress: Callable[[Progress], None] | None = None,
) -> Verdict:
    """Whether the closures of two braids are the same oriented link.

    ``up_to`` names the symmetries (mirror, reverse, mirror-reverse) that may be applied to the
    right link as well. "same" comes with a chain of Markov moves, "different" with an invariant
    that differs for every symmetry asked; both have passed the independent verifier. "undecided"
    says that the limits were reached, and nothing about the links. Raises InputError for an
    unknown symmetry.
    """
    for symmetry in up_to:
        if symmetry not in SYMMETRIES:
            raise InputError(f"up to {symmetry!r}: expected {', '.join(SYMMETRIES[1:])}")
    asked = tuple(dict.fromkeys(("identity", *up_to)))
    query = _Query(left, right, asked, Budget(limits or SearchLimits(), progress))
    try:
        return query.answer()
    except KeyboardInterrupt:
        return query.undecided(Ending.INTERRUPTED)


class _Query:
    """One question: the two braids, the symmetries still open, what has been found and tried."""

    def __init__(self, left: Braid, right: Braid, asked: tuple[str, ...], budget: Budget) -> None:
        self.left, self.right, self.asked, self.budget = left, right, asked, budget
        self.distinguishers = {name: Distinguisher(left, right, name) for name in asked}
        self.distinctions: dict[str, Distinction] = {}
        self.meetings: dict[str, Meeting] = {}
        self.tried: list[str] = []
        self.ending = Ending.NOT_SEARCHED

    @property
    def open_symmetries(self) -> list[str]:
        """The symmetries that no invariant has excluded yet, in the order asked."""
        return [name for name in self.asked if name not in self.distinctions]

    def answer(self) -> Verdict:
        """The stages in order of cost; the first that settles the question ends it."""
        left, right = Route(self.left), Route(self.right)
        if self._distinguish(left, right, CHEAP_SECONDS):
            return self._different()
        left = simplified(self.left, self.budget)
        right = simplified(self.right, self.budget)
        self.tried.append("simplification of both sides")
        if self._distinguish(left, right, FAIR_SECONDS):
            return self._different()
        return (
            self._search(left, 0.0, _FIRST_SHARE)
            or (self._different() if self._distinguish(left, right, DEAR_SECONDS) else None)
            or self._search(left, _FIRST_SHARE, 1.0)
            or self.undecided(self.ending)
        )

    def _distinguish(self, left: Route, right: Route, dearest: float) -> bool:
        for symmetry in self.open_symmetries:
            self.budget.tell(left.current.strands, "invariants")
            found = self.distinguishers[symmetry].find(left, right, dearest, self.budget)
            if found is not None:
                self.distinctions[symmetry] = found
        return not self.open_symmetries

    def _search(self, left: Route, start: float, end: float) -> Verdict | None:
        """Search for moves for each open symmetry in turn, from one share of the limits to another.

        The question asked comes first: a symmetry that is met early says nothing about it.
        """
        symmetries = self.open_symmetries
        for place, symmetry in enumerate(symmetries, 1):
            share = start + (end - start) * place / len(symmetries)
            meeting = self._meeting(left, symmetry)
            self.ending = meeting.run(share)
            if self.ending is Ending.FOUND:
                return self._same(meeting, symmetry)
        return None

    def _meeting(self, left: Route, symmetry: str) -> Meeting:
        """The search for this symmetry, begun or as it was left."""
        if symmetry not in self.meetings:
            from braidsearch.search.meet import Meeting  # noqa: PLC0415 - loads a graph library

            image = apply_symmetry(self.right, symmetry)
            right = simplified(image, self.budget)
            self.meetings[symmetry] = Meeting(left, right, self.budget)
            self.tried.append(f"search for moves, {symmetry}")
        return self.meetings[symmetry]

    def _same(self, meeting: Meeting, symmetry: str) -> Verdict:
        image = apply_symmetry(self.right, symmetry)
        chain = checked_chain(self.left, meeting.moves(), image)
        certificate = Certificate.same(self.left, self.right, symmetry, chain.moves)
        count = len(chain.moves)
        steps = f"{count} move" + ("" if count == 1 else "s")
        target = "RIGHT" if symmetry == "identity" else f"the {symmetry} of RIGHT"
        return self._judged(certificate, f"{steps} lead from LEFT to {target}", symmetry)

    def _different(self) -> Verdict:
        found = [self.distinctions[name] for name in self.asked]
        certificate = Certificate.different(self.left, self.right, found)
        names = ", ".join(dict.fromkeys(distinction.invariant for distinction in found))
        return self._judged(certificate, f"these invariants differ: {names}", None)

    def _judged(self, certificate: Certificate, reason: str, symmetry: str | None) -> Verdict:
        """The verdict, once the verifier has accepted its certificate."""
        report = judge(certificate)
        if not report.valid:
            self.tried.append(f"a certificate that the verifier did not accept: {report.reason}")
            return self.undecided(Ending.NOT_ACCEPTED)
        return Verdict(certificate.verdict, symmetry, reason, certificate, self.explored())

    def undecided(self, ending: Ending) -> Verdict:
        """The verdict when nothing has settled the question."""
        reason = f"neither moves nor a differing invariant found ({ending.value})"
        return Verdict(
            "undecided", None, reason, None, self.explored(ending), self._suggestions(ending)
        )

    def explored(self, ending: Ending | None = None) -> dict[str, Any]:
        """What has been done so far: nodes, seconds, the ending and what was tried, in words."""
        equal = [
            f"equal invariants, {name}: {', '.join(distinguisher.agreed)}"
            for name, distinguisher in self.distinguishers.items()
            if distinguisher.agreed
        ]
        return {
            "nodes": self.budget.nodes,
            "seconds": round(self.budget.seconds, 3),
            "ending": (ending or Ending.FOUND).value,
            "tried": equal + self.tried,
        }

    def _suggestions(self, ending: Ending) -> tuple[str, ...]:
        limits = self.budget.limits
        hints = {
            Ending.TIME_LIMIT: "allow more seconds",
            Ending.INTERRUPTED: "let the search run to its limits",
            Ending.NODE_LIMIT: "allow more nodes",
            Ending.EXHAUSTED: "allow more strands: all within the bounds was searched",
        }
        wider = "ask for other symmetries too" if len(self.asked) < len(SYMMETRIES) else ""
        more = "allow more strands" if limits.max_strands is not None else ""
        return tuple(dict.fromkeys(hint for hint in (hints.get(ending), more, wider) if hint))
