"""A canonical form among the classes whose fingerprints agree with its own: which is it, if any."""

from __future__ import annotations

from collections.abc import Callable, Iterable, Iterator, Sequence
from functools import partial

from braidsearch.certificates import Certificate, format_certificate
from braidsearch.errors import CapacityError
from braidsearch.invariants.finer import finer_ladder, sublink_ladder
from braidsearch.ledger.findings import Effort, Finding
from braidsearch.ledger.fingerprints import Fingerprint
from braidsearch.search.closed_three_braids import is_classified, three_braid_ladder
from braidsearch.search.distinguish import Distinguisher, Ladder, Values
from braidsearch.search.explorer import Pace
from braidsearch.search.gate import judge
from braidsearch.search.limits import Budget, Ending
from braidsearch.search.meet import Meeting
from braidsearch.search.proof import checked_chain
from braidsearch.search.query import Course, Query
from braidsearch.search.route import Route
from braidsearch.words import Braid

_SHORT, _LONG = 60, 400  # nodes up to which a search for sameness goes, before and after
_SUBLINK_SECONDS = 0.05  # the invariants of sublinks are asked, by estimate of each,
_FINER_SECONDS = 0.1  # and before the finer ones are

_PACE = Pace(expansions_first=1, turns_an_expansion=12, walks_a_turn=20)
_ROUNDS = ((0.1, 0.1), (0.2, 0.5), (0.4, 5.0), (0.6, 20.0))
"""As of a query, for searches that are short beside the dearer invariants."""

_LEAST_NODES = (0, 200, 5_000, 20_000)
"""So many nodes must be allowed for each of these rounds: whoever asks for little waits little."""

_ALLOWANCE = 20.0
_NODES_FOR_ALL = 5_000  # from which on nothing is left untried

Marked = tuple[Braid, Fingerprint]
"""A form with its fingerprint."""


def place_all(
    forms: Sequence[Marked], candidates: Iterable[Marked], effort: Effort
) -> list[tuple[Finding, ...]]:
    """For each form in turn what was found: it joins the class of one candidate, or becomes one.

    The last finding of a form is "same" when it was found to be a candidate.
    """
    known, values = list(candidates), Values()
    results = []
    for form, marks in forms:
        agreeing = [other for other, theirs in known if marks.first_difference(theirs) is None]
        findings = place(form, agreeing, effort, values)
        results.append(findings)
        if not findings or findings[-1].outcome != "same":
            known.append((form, marks))
    return results


def place(
    form: Braid, candidates: Sequence[Braid], effort: Effort, values: Values | None = None
) -> tuple[Finding, ...]:
    """What is found about each candidate, by steps each dearer than the one before.

    ``values`` holds the values of invariants that were computed for these braids before.

    Every step is taken for all candidates that are left before the next one is. Sameness with one
    of them ends it, and is the last finding then.
    """
    known = Values() if values is None else values
    questions = [_Question(form, candidate, effort, known) for candidate in candidates]
    findings: dict[Braid, Finding] = {}
    for step in _iter_steps(effort):
        for question in questions:
            if question.right in findings:
                continue
            found = step(question)
            if found is not None and found.outcome == "same":
                return (found,)
            if found is not None:
                findings[question.right] = found
    return tuple(findings[candidate] for candidate in candidates)


def _iter_steps(effort: Effort) -> Iterator[Callable[[_Question], Finding | None]]:
    yield partial(_Question.search, nodes=min(_SHORT, effort.nodes))
    yield _Question.tell_apart
    yield partial(_Question.search, nodes=min(_LONG, effort.nodes))
    yield _Question.tell_apart_finer
    yield partial(_Question.search, nodes=effort.nodes)
    yield _Question.ask if effort.nodes >= _NODES_FOR_ALL else _Question.leave_open


def ask(left: Braid, right: Braid, symmetry: str, effort: Effort) -> Finding:
    """The whole question whether closure(left) is symmetry(closure(right)).

    Raises KeyboardInterrupt when it is interrupted: an answer that nothing but the user's
    impatience left open must not be kept.
    """
    query = Query(
        left, right, (symmetry,), Budget(effort.limits), others=(), course=_course(effort)
    )
    verdict = query.settled()
    if verdict.explored["ending"] == Ending.INTERRUPTED.value:
        raise KeyboardInterrupt
    text = None if verdict.certificate is None else format_certificate(verdict.certificate)
    return Finding(left, right, symmetry, verdict.outcome, text, verdict.reason)


def _course(effort: Effort) -> Course:
    rounds = (
        turn for turn, least in zip(_ROUNDS, _LEAST_NODES, strict=True) if effort.nodes >= least
    )
    return Course(tuple(rounds), _ALLOWANCE)


class _Question:
    """A form and one candidate; each step gives a finding, or None where it leaves it open."""

    def __init__(self, form: Braid, candidate: Braid, effort: Effort, values: Values) -> None:
        self.left, self.right, self.effort = form, candidate, effort
        self.budget = Budget(effort.limits)
        # Canonical forms up to 3 strands are equal, or the links differ: no search is needed.
        self.is_classified = is_classified(form) and is_classified(candidate)
        self.meeting: Meeting | None = None
        self.values = values

    def tell_apart(self) -> Finding | None:
        """What is cheap and decides most: sublinks, or the classification of closed 3-braids."""
        steps = three_braid_ladder if self.is_classified else sublink_ladder
        return self._distinguish(steps, _SUBLINK_SECONDS)

    def tell_apart_finer(self) -> Finding | None:
        """Finer invariants, the cheaper ones."""
        return self._distinguish(finer_ladder, _FINER_SECONDS)

    def _distinguish(self, steps: Ladder, seconds: float) -> Finding | None:
        plain = Route(self.left), Route(self.right)
        distinguisher = Distinguisher(self.left, self.right, "identity", self.values)
        allowance = _ALLOWANCE * seconds
        found = distinguisher.find(*plain, seconds, self.budget, steps, allowance)
        if found is None or distinguisher.found_by is None:
            return None
        certificate = Certificate.different(self.left, self.right, [found])
        reason = f"told apart by the {distinguisher.found_by.title}"
        return _finding(certificate, "identity", reason)

    def leave_open(self) -> Finding:
        """What is said when little was allowed: dearer steps are for those who allow more."""
        reason = f"neither moves nor a differing invariant found ({Ending.NODE_LIMIT.value})"
        return Finding(self.left, self.right, "identity", "undecided", None, reason)

    def ask(self) -> Finding:
        """The whole question."""
        return ask(self.left, self.right, "identity", self.effort)

    def search(self, nodes: int) -> Finding | None:
        """The search for moves, begun or gone on with, until so many nodes were entered."""
        if self.is_classified:
            return None
        try:
            if self.meeting is None:
                plain = Route(self.left), Route(self.right)
                self.meeting = Meeting(*plain, self.budget, _PACE)
            if self.meeting.run(nodes / max(1, self.effort.nodes)) is not Ending.FOUND:
                return None
        except CapacityError:
            return None
        chain = checked_chain(self.left, self.meeting.moves(), self.right)
        certificate = Certificate.same(self.left, self.right, "identity", chain.moves)
        count = len(certificate.moves)
        reason = "one move" if count == 1 else f"{count} moves"
        return _finding(certificate, "identity", reason)


def _finding(certificate: Certificate, symmetry: str, reason: str) -> Finding | None:
    """What the certificate proves, once the verifier has accepted it."""
    if not judge(certificate).valid:
        return None
    sides = certificate.left, certificate.right
    return Finding(*sides, symmetry, certificate.verdict, format_certificate(certificate), reason)
