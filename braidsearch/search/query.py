"""One question: invariants and searches interleaved until one of them settles it."""

from __future__ import annotations

import math
from collections.abc import Callable, Sequence
from dataclasses import dataclass
from typing import TYPE_CHECKING, Any

from braidsearch.certificates import Certificate, Distinction
from braidsearch.errors import CapacityError, OutOfTimeError
from braidsearch.invariants.finer import finer_ladder
from braidsearch.invariants.table import ladder
from braidsearch.moves import Move
from braidsearch.normal_form.conjugacy import find_conjugator
from braidsearch.search.closed_three_braids import (
    classified_moves,
    is_classified,
    three_braid_ladder,
)
from braidsearch.search.distinguish import Distinguisher, Ladder, Values
from braidsearch.search.effort import SUMMIT_CAP
from braidsearch.search.gate import judge
from braidsearch.search.limits import Budget, Ending
from braidsearch.search.proof import checked_chain
from braidsearch.search.route import Route
from braidsearch.search.simplify import greedy_route, simplified
from braidsearch.search.verdict import Verdict
from braidsearch.words import SYMMETRIES, Braid, apply_symmetry
from braidsearch.words.reduction import find_rotation

if TYPE_CHECKING:
    from braidsearch.search.meet import Meeting

CHEAP_SECONDS = 0.05
CHEAP_SECONDS_A_LETTER = 1e-4  # long words take as long to simplify
FAIR_SECONDS = 1.0
DEAR_SECONDS = 60.0
_ROUNDS = ((0.005, 0.1), (0.03, 1.0), (0.1, 5.0), (0.3, 20.0))
"""The share of the limits up to which each round searches, and its dearest invariants' seconds."""
_LAST_SHARE = 0.85  # what is left after it looks for a symmetric image
_LONGEST_GLANCE = 80  # letters up to which a glance at symmetric images takes no notable time
_MOST_GLANCED = 12  # and strands


@dataclass(frozen=True, slots=True)
class Course:
    """How searches and invariants take turns in a query.

    ``rounds`` says of each up to which share of the limits it searches, and which invariants it
    asks at most, in seconds each. Those of one round cost no more than ``allowance`` times that
    together, by estimate: queries without a clock need such a bound.
    """

    rounds: tuple[tuple[float, float], ...] = _ROUNDS
    allowance: float = math.inf


DEFAULT_COURSE = Course()


class Query:
    """The two braids, the symmetries asked for, what has been found so far and what was tried.

    ``others`` are the symmetries, not asked for, that are worth a look when the answer is not
    "same" (None: all).
    """

    def __init__(  # noqa: PLR0913, PLR0917 - the question, its bounds, and two refinements
        self,
        left: Braid,
        right: Braid,
        asked: tuple[str, ...],
        budget: Budget,
        others: Sequence[str] | None = None,
        course: Course = DEFAULT_COURSE,
    ) -> None:
        self.course = course
        self.left, self.right, self.asked, self.budget = left, right, asked, budget
        self.others = [
            name for name in (SYMMETRIES if others is None else others) if name not in asked
        ]
        values = Values()
        self.distinguishers = {
            name: Distinguisher(left, right, name, values) for name in SYMMETRIES
        }
        self.distinctions: dict[str, Distinction] = {}
        self.meetings: dict[str, Meeting] = {}
        self.greedy: dict[str | None, Route] = {}
        self.routes: dict[str | None, Route] = {}
        self.tried: list[str] = []
        self.ending = Ending.NOT_SEARCHED

    def settled(self) -> Verdict:
        """The answer, undecided where a limit, an interrupt or a bound on size breaks it off."""
        try:
            return self.answer()
        except KeyboardInterrupt:
            return self.undecided(Ending.INTERRUPTED)
        except OutOfTimeError:
            return self.undecided(Ending.TIME_LIMIT)
        except CapacityError:
            return self.undecided(Ending.TOO_LARGE)

    def answer(self) -> Verdict:
        """The stages in order of cost; the first that settles the question ends it."""
        plain = Route(self.left), Route(self.right)
        letters = len(self.left) + len(self.right)
        if self._distinguish(*plain, CHEAP_SECONDS + letters * CHEAP_SECONDS_A_LETTER):
            return self._different()
        rotated = self._compare_rotations()
        if rotated is not None:
            return rotated
        classified = self._classify(self._greedy)
        if classified is not None:
            return classified
        handy = self._route(None), self._route("identity")
        if self._distinguish(*handy, FAIR_SECONDS):
            return self._different()
        return (
            self._classify(self._route)
            or self._search_directly()
            or self._alternate()
            or self.undecided(self.ending, self._search_image())
        )

    def open_symmetries(self) -> list[str]:
        """The symmetries that no invariant has excluded yet, in the order asked."""
        return [name for name in self.asked if name not in self.distinctions]

    def _greedy(self, symmetry: str | None) -> Route:
        """The left braid (None), or an image of the right one, with visible reductions made."""
        if symmetry not in self.greedy:
            braid = self.left if symmetry is None else apply_symmetry(self.right, symmetry)
            self.greedy[symmetry] = greedy_route(braid, self.budget)
        return self.greedy[symmetry]

    def _route(self, symmetry: str | None) -> Route:
        """The same simplified as far as possible, made when first needed."""
        if symmetry not in self.routes:
            self.budget.tell(self.left.strands, "simplifying")
            self.routes[symmetry] = simplified(self._greedy(symmetry), self.budget)
        return self.routes[symmetry]

    def _distinguish(
        self, left: Route, right: Route, dearest: float, invariants: Ladder = ladder
    ) -> bool:
        for symmetry in self.open_symmetries():
            self.budget.tell(left.current.strands, "computing invariants")
            distinguisher = self.distinguishers[symmetry]
            found = distinguisher.find(
                left, right, dearest, self.budget, invariants, self.course.allowance * dearest
            )
            if found is not None:
                self.distinctions[symmetry] = found
        return not self.open_symmetries()

    def _classify(self, route: Callable[[str | None], Route]) -> Verdict | None:
        """The answer by the classification of closed 3-braids, where both are such.

        ``route`` gives the way to the left braid (None) and to an image of the right one.
        """
        handy = route(None), route("identity")
        if not all(is_classified(one.current) for one in handy):
            return None
        if self._distinguish(*handy, FAIR_SECONDS):
            return self._different()
        for symmetry in self.open_symmetries():
            moves = classified_moves(route(None), route(symmetry))
            if moves is not None:
                return self._same(moves, symmetry, is_short=True)
        if self._distinguish(*handy, DEAR_SECONDS, three_braid_ladder):
            return self._different()
        return None

    def _alternate(self) -> Verdict | None:
        """Searches and invariants in turn, each round with more of both than the one before."""
        handy = self._route(None), self._route("identity")
        share = 0.0
        for until, dearest in self.course.rounds:
            met = self._search(share, until)
            if met is not None:
                return met
            for invariants in (ladder, finer_ladder):
                if self._distinguish(*handy, dearest, invariants):
                    return self._different()
            if self.budget.ending() is not None:  # asked for little, so no dearer invariants
                return None
            share = until
        return self._search(share, _LAST_SHARE)

    def _compare_rotations(self) -> Verdict | None:
        """Whether the reduced words are rotations of each other, which is seen at once."""
        left = self._greedy(None)
        for symmetry in self.open_symmetries():
            right = self._greedy(symmetry)
            shift = find_rotation(left.current, right.current)
            if shift is not None:
                middle = left.conjugated(left.current.word[:shift], right.current)
                return self._same([*middle.moves, *right.reversed_moves()], symmetry)
        return None

    def _search_directly(self) -> Verdict | None:
        """Whether simplification has led to conjugate braids already."""
        for symmetry in self.open_symmetries():
            moves = self._direct_moves(symmetry)
            if moves is not None:
                return self._same(moves, symmetry)
        return None

    def _direct_moves(self, symmetry: str) -> list[Move] | None:
        left, right = self._route(None), self._route(symmetry)
        stop = self.budget.is_out_of_time
        by = find_conjugator(left.current, right.current, SUMMIT_CAP, stop)
        if by is None:
            return None
        middle = left.conjugated(by, right.current)
        return [*middle.moves, *right.reversed_moves()]

    def _search(self, start: float, end: float) -> Verdict | None:
        """Search for moves for each open symmetry in turn, from one share of the limits to another.

        The question asked comes first: a symmetry that is met early says nothing about it.
        """
        symmetries = self.open_symmetries()
        for place, symmetry in enumerate(symmetries, 1):
            share = start + (end - start) * place / len(symmetries)
            meeting = self._meeting(symmetry)
            self.ending = meeting.run(share)
            if self.ending is Ending.FOUND:
                return self._same(meeting.moves(), symmetry)
        return None

    def _meeting(self, symmetry: str) -> Meeting:
        """The search for this symmetry, begun or as it was left."""
        if symmetry not in self.meetings:
            from braidsearch.search.meet import Meeting  # noqa: PLC0415 - loads a graph library

            right = self._route(symmetry)
            self.meetings[symmetry] = Meeting(self._route(None), right, self.budget)
            image = "" if symmetry in self.asked else " (a symmetric image, not asked for)"
            self.tried.append(f"search for moves, {symmetry}{image}")
        return self.meetings[symmetry]

    def _search_image(self) -> Certificate | None:
        """Sameness with a symmetric image that was not asked for, when the question stays open."""
        for place, symmetry in enumerate(self.others, 1):
            if self.budget.ending() is not None:
                return None
            if self._is_excluded(symmetry):
                continue
            moves = self._direct_moves(symmetry)
            if moves is None:
                share = _LAST_SHARE + (1 - _LAST_SHARE) * place / len(self.others)
                meeting = self._meeting(symmetry)
                if meeting.run(share) is not Ending.FOUND:
                    continue
                moves = meeting.moves()
            return self._image_certificate(moves, symmetry)
        return None

    def _glance_at_images(self) -> Certificate | None:
        """A symmetric image that is conjugate after simplification, for small braids only."""
        letters, strands = len(self.left) + len(self.right), self.left.strands
        if letters > _LONGEST_GLANCE or max(strands, self.right.strands) > _MOST_GLANCED:
            return None
        for symmetry in self.others:
            moves = classified_moves(self._greedy(None), self._greedy(symmetry))
            if moves is None and not is_classified(self._greedy(None).current):
                moves = self._direct_moves(symmetry)
            if moves is not None:
                return self._image_certificate(moves, symmetry)
        return None

    def _is_excluded(self, symmetry: str) -> bool:
        left, right = self._route(None).current, self._route("identity").current
        distinguisher = self.distinguishers[symmetry]
        return distinguisher.is_different(left, right, FAIR_SECONDS, self.budget)

    def _image_certificate(self, moves: list[Move], symmetry: str) -> Certificate | None:
        certificate = self._certificate(moves, symmetry)
        return certificate if judge(certificate).valid else None

    def _certificate(self, moves: list[Move], symmetry: str, is_short: bool = False) -> Certificate:
        image = apply_symmetry(self.right, symmetry)
        chain = checked_chain(self.left, moves, image, is_short)
        return Certificate.same(self.left, self.right, symmetry, chain.moves)

    def _same(self, moves: list[Move], symmetry: str, is_short: bool = False) -> Verdict:
        certificate = self._certificate(moves, symmetry, is_short)
        count = len(certificate.moves)
        target = "RIGHT" if symmetry == "identity" else f"the {symmetry} of RIGHT"
        reason = {
            0: f"LEFT and {target} are the same word",
            1: f"one move leads from LEFT to {target}",
        }.get(count, f"{count} moves lead from LEFT to {target}")
        return self._judged(certificate, reason, symmetry)

    def _different(self) -> Verdict:
        found = [self.distinctions[name] for name in self.asked]
        certificate = Certificate.different(self.left, self.right, found)
        steps = (self.distinguishers[name].found_by for name in self.asked)
        titles = dict.fromkeys(step.title for step in steps if step is not None)
        reason = f"told apart by the {' and the '.join(titles)}"
        return self._judged(certificate, reason, None, self._glance_at_images())

    def _judged(
        self,
        certificate: Certificate,
        reason: str,
        symmetry: str | None,
        image: Certificate | None = None,
    ) -> Verdict:
        """The verdict, once the verifier has accepted its certificate."""
        report = judge(certificate)
        if not report.valid:
            self.tried.append(f"a certificate that the verifier did not accept: {report.reason}")
            return self.undecided(Ending.NOT_ACCEPTED)
        reason += _image_in_words(image)
        explored = self.explored(Ending.FOUND)
        return Verdict(certificate.verdict, symmetry, reason, certificate, explored, image=image)

    def undecided(self, ending: Ending, image: Certificate | None = None) -> Verdict:
        """The verdict when nothing has settled the question."""
        reason = f"neither moves nor a differing invariant found ({ending.value})"
        reason += _image_in_words(image)
        explored, hints = self.explored(ending), self._suggestions(ending, image)
        return Verdict("undecided", None, reason, None, explored, hints, image)

    def explored(self, ending: Ending) -> dict[str, Any]:
        """What has been done so far: nodes, seconds, the ending and what was tried, in words."""
        equal = [
            f"equal invariants, {name}: {', '.join(distinguisher.agreed_names())}"
            for name, distinguisher in self.distinguishers.items()
            if distinguisher.agreed and name in self.asked
        ]
        return {
            "nodes": self.budget.nodes,
            "seconds": round(self.budget.seconds, 3),
            "ending": ending.value,
            "tried": equal + self.tried,
        }

    def _suggestions(self, ending: Ending, image: Certificate | None) -> tuple[str, ...]:
        hints = {
            Ending.TIME_LIMIT: "allow more seconds",
            Ending.INTERRUPTED: "let the search run to its limits",
            Ending.NODE_LIMIT: "allow more nodes",
        }
        found = [hints[ending]] if ending in hints else []
        if self.budget.limits.max_strands is not None:
            found.append("allow more strands")
        if image is not None:
            found.append(f"ask up to {image.symmetry} for the certificate of that")
        elif self.others:
            found.append("ask for other symmetries too")
        return tuple(found)


def _image_in_words(image: Certificate | None) -> str:
    if image is None:
        return ""
    names = {"mirror": "mirror image", "mirror-reverse": "reversed mirror image"}
    return f"; RIGHT is the {names.get(str(image.symmetry), image.symmetry)} of LEFT"
