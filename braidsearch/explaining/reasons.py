"""What each step of a proof does, and why it is allowed: moves and elementary steps in words."""

from __future__ import annotations

from braidsearch.certificates.explanation import count_of
from braidsearch.explaining.outline import ExplainedStep, Letters, MarkedBraid, Phrase, Span
from braidsearch.explaining.theorems import MARKOV_MOVES, RELATIONS
from braidsearch.moves import Conjugate, Move, Rewrite, Stabilize
from braidsearch.moves.elementary_steps import (
    BRAID_RELATION,
    CANCELLATION,
    CONJUGATION,
    DESTABILIZATION,
    FAR_COMMUTATION,
    INSERTION,
    MIXED_BRAID_RELATION,
    STABILIZATION,
    ElementaryStep,
)
from braidsearch.words import Braid

_AROUND: Phrase = ("around the closure what stands in front and behind meets and cancels",)


def explain_move(number: int, before: Braid, move: Move, after: Braid) -> ExplainedStep:
    """A move of a certificate as a step of its own."""
    if isinstance(move, Rewrite):
        return _explain_rewriting(number, before, after)
    if isinstance(move, Conjugate):
        return _explain_conjugation(number, before, move.by, after)
    at = len(before if isinstance(move, Stabilize) else after)
    kind = STABILIZATION if isinstance(move, Stabilize) else DESTABILIZATION
    letter = (move.sign * (max(before.strands, after.strands) - 1),)
    put, taken = (letter, ()) if kind == STABILIZATION else ((), letter)
    return explain_step(number, before, ElementaryStep(kind, at + 1, taken, put, 0), after)


def explain_step(number: int, before: Braid, step: ElementaryStep, after: Braid) -> ExplainedStep:
    """An elementary step as a step of a proof, the letters that it acts on marked."""
    start = step.place - 1
    taken = [(start, start + len(step.before))]
    put = [(start, start + len(step.after))]
    if step.kind == CONJUGATION:
        taken, put = [], [(0, 1), (len(after) - 1, len(after))]
    detail, reason = _describe(step, before)
    is_markov = step.kind in (CONJUGATION, STABILIZATION, DESTABILIZATION)
    return ExplainedStep(
        number,
        step.kind,
        detail,
        MarkedBraid(before, tuple(taken)),
        MarkedBraid(after, tuple(put)),
        reason,
        MARKOV_MOVES if is_markov else RELATIONS,
        step.move,
    )


def _describe(step: ElementaryStep, braid: Braid) -> tuple[Phrase, Phrase]:
    """What the step does to which letters, and why it may."""
    place = _places(step)
    strands = count_of(braid.strands, "strand")
    if step.kind == INSERTION:
        return (f"{place} put in: ", step.after), (step.after, " is the trivial braid")
    if step.kind == CANCELLATION:
        return (f"{place} taken out: ", step.before), (step.before, " is the trivial braid")
    equation: Phrase = (f"{place}: ", step.before, " becomes ", step.after)
    if step.kind == FAR_COMMUTATION:
        return equation, ("the two crossings have no strand in common, so they may change places",)
    if step.kind == BRAID_RELATION:
        return equation, ("the strand that crosses two others moves past their crossing",)
    if step.kind == MIXED_BRAID_RELATION:
        i, j = abs(step.before[0]), abs(step.before[1])
        base: Phrase = ("it is ", (i, j, i), " = ", (j, i, j))
        return equation, (*base, " with letters taken to the other side")
    if step.kind == CONJUGATION:
        by = step.after[1:]
        return (
            ("by the letter ", by, ": its inverse in front, itself behind"),
            _AROUND,
        )
    if step.kind == STABILIZATION:
        return (
            ("the letter ", step.after, f" behind the word on {strands} adds one strand"),
            ("it alone passes the new strand: a kink of the closure, which can be untwisted",),
        )
    return (
        ("the last letter ", step.before, f" of the word on {strands} goes with its strand"),
        ("it alone passes the last strand: a kink of the closure, which can be untwisted",),
    )


def _places(step: ElementaryStep) -> str:
    last = step.place + max(len(step.before), len(step.after)) - 1
    return f"letters {step.place} {'and' if last == step.place + 1 else 'to'} {last}"


def _explain_rewriting(number: int, before: Braid, after: Braid) -> ExplainedStep:
    one, other = _changed(before.word, after.word)
    return ExplainedStep(
        number,
        "rewriting",
        (f"the marked letters are written anew, by relations of the group on {_strands(before)}",),
        MarkedBraid(before, (one,)),
        MarkedBraid(after, (other,)),
        ("both words are the same braid",),
        RELATIONS,
    )


def _explain_conjugation(number: int, before: Braid, by: Letters, after: Braid) -> ExplainedStep:
    """A conjugation by any word; one that turns the word around is shown as such."""
    size, length = len(by), len(before)
    inverse = tuple(-letter for letter in reversed(by))
    reason: Phrase = ("a closed braid has no first letter",)
    if before.word == by + before.word[size:] and after.word == before.word[size:] + by:
        detail: Phrase = (f"the first {_letters(size)} around the closure to the end",)
        one, other = (0, size), (length - size, length)
    elif after.word == inverse + before.word[: length - size] and before.word[-size:] == inverse:
        detail = (f"the last {_letters(size)} around the closure to the front",)
        one, other = (length - size, length), (0, size)
    else:
        detail = ("by a = ", by)
        reason = ("the word after is the braid a^-1 (the word before) a: ", *_AROUND)
        one, other = _changed(before.word, after.word)
    return ExplainedStep(
        number,
        CONJUGATION,
        detail,
        MarkedBraid(before, (one,)),
        MarkedBraid(after, (other,)),
        reason,
        MARKOV_MOVES,
    )


def _changed(before: Letters, after: Letters) -> tuple[Span, Span]:
    """What is left of both words without their common beginning and their common end."""
    shorter = min(len(before), len(after))
    start = next((k for k in range(shorter) if before[k] != after[k]), shorter)
    room = shorter - start
    end = next((k for k in range(room) if before[-1 - k] != after[-1 - k]), room)
    return (start, len(before) - end), (start, len(after) - end)


def _letters(size: int) -> str:
    return "letter" if size == 1 else f"{size} letters"


def _strands(braid: Braid) -> str:
    return count_of(braid.strands, "strand")
