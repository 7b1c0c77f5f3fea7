"""Legs of a proof: conjugations by group elements, strand changes and exchanges, with both ends."""

from __future__ import annotations

from collections.abc import Iterable, Sequence
from dataclasses import dataclass

from braidsearch.words import Braid
from braidsearch.words.handles import reduce_handles_turned
from braidsearch.words.reduction import free_reduce_letters

Letters = tuple[int, ...]


@dataclass(frozen=True, slots=True)
class Conjugation:
    """From ``source`` to a word ``target`` for by^-1 * source * by; ``by`` may be empty."""

    source: Braid
    target: Braid
    by: Letters


@dataclass(frozen=True, slots=True)
class Stabilization:
    """From ``source`` on n strands to the word with the letter sign * n added, on n+1 strands."""

    source: Braid
    sign: int

    @property
    def target(self) -> Braid:
        """The stabilized word."""
        strands = self.source.strands
        return Braid.trusted((*self.source.word, self.sign * strands), strands + 1)


@dataclass(frozen=True, slots=True)
class Destabilization:
    """The way back: from ``target`` with the letter sign * n added to ``target``, on n strands."""

    target: Braid
    sign: int

    @property
    def source(self) -> Braid:
        """The word that can be destabilized."""
        return Stabilization(self.target, self.sign).target


@dataclass(frozen=True, slots=True)
class Exchange:
    """From alpha s^sign beta s^-sign to alpha s^-sign beta s^sign, with s the last generator.

    Neither alpha nor beta uses s. Birman, Menasco, Studying links via closed braids IV, 1990.
    """

    strands: int
    alpha: Letters
    beta: Letters
    sign: int

    @property
    def source(self) -> Braid:
        """The word before."""
        s = self.sign * (self.strands - 1)
        return Braid.trusted((*self.alpha, s, *self.beta, -s), self.strands)

    @property
    def target(self) -> Braid:
        """The word after."""
        s = self.sign * (self.strands - 1)
        return Braid.trusted((*self.alpha, -s, *self.beta, s), self.strands)


Leg = Conjugation | Stabilization | Destabilization | Exchange


def inverse_letters(letters: Iterable[int]) -> Letters:
    """The inverse word."""
    return tuple(-letter for letter in reversed(tuple(letters)))


def reversed_leg(leg: Leg) -> Leg:
    """The leg that leads back."""
    if isinstance(leg, Conjugation):
        return Conjugation(leg.target, leg.source, inverse_letters(leg.by))
    if isinstance(leg, Stabilization):
        return Destabilization(leg.source, leg.sign)
    if isinstance(leg, Destabilization):
        return Stabilization(leg.target, leg.sign)
    return Exchange(leg.strands, leg.alpha, leg.beta, -leg.sign)


def shortened_exchange(leg: Exchange) -> Exchange:
    """The same exchange with alpha and beta written without handles, the last generator first.

    A braid that commutes with s because it is one of B_(n-2) is so found: handle reduction writes
    it without sigma_(n-2).
    """
    alpha, beta = (
        reduce_handles_turned(Braid.trusted(part, leg.strands - 1)).word
        for part in (leg.alpha, leg.beta)
    )
    return Exchange(leg.strands, alpha, beta, leg.sign)


def exchange_as_strand_changes(leg: Exchange) -> list[Leg]:
    """The exchange through one stabilization and one destabilization, three conjugations around.

    With t the generator after s (for sign 1), alpha s beta s^-1 is conjugate to
    s alpha s beta s^-2; with t added, that is conjugate to s^-2 beta s alpha s t; with t dropped,
    to alpha s^-1 beta s.
    """
    s, t = leg.sign * (leg.strands - 1), leg.sign * leg.strands
    around = Braid.trusted((s, *leg.alpha, s, *leg.beta, -s, -s), leg.strands)
    back = Braid.trusted((-s, -s, *leg.beta, s, *leg.alpha, s), leg.strands)
    middle = (s, *leg.alpha, s, t, *leg.beta, s, *leg.alpha, s, t)
    up, down = Stabilization(around, leg.sign), Destabilization(back, leg.sign)
    return [
        Conjugation(leg.source, around, (-s,)),
        up,
        Conjugation(up.target, down.source, middle),
        down,
        Conjugation(back, leg.target, (-s, -s, *leg.beta, s)),
    ]


def exchange_as_conjugation(leg: Exchange) -> Letters | None:
    """What the exchange conjugates by, when alpha or beta visibly commutes with s; else None.

    If beta commutes, both ends are alpha * beta. If alpha does, they are s (alpha beta) s^-1 and
    s^-1 (alpha beta) s for sign 1, and s^2 leads from one to the other.
    """
    neighbour = leg.strands - 2
    if neighbour not in map(abs, leg.beta):
        return ()
    if neighbour not in map(abs, leg.alpha):
        return (leg.sign * (leg.strands - 1),) * 2
    return None


class LegBuilder:
    """Legs under construction; conjugations wait, and are composed, until another leg needs them.

    ``source`` is the word that the last leg reached, and the element now reached is
    waiting^-1 * source * waiting.
    """

    def __init__(self, start: Braid) -> None:
        self.source = start
        self.legs: list[Leg] = []
        self._waiting: list[int] = []

    def conjugate(self, by: Sequence[int]) -> None:
        """Conjugate the element reached."""
        for letter in by:
            if self._waiting and self._waiting[-1] == -letter:
                self._waiting.pop()
            else:
                self._waiting.append(letter)

    def settle(self, word: Sequence[int]) -> None:
        """Write out the conjugations that wait; ``word`` is a word for the element reached."""
        target = Braid.trusted(tuple(word), self.source.strands)
        if self._waiting or target != self.source:
            self.legs.append(Conjugation(self.source, target, tuple(self._waiting)))
        self.source = target
        self._waiting = []

    def add(self, leg: Leg) -> None:
        """Continue with a leg whose source is the element reached."""
        if isinstance(leg, Conjugation):
            self.conjugate(leg.by)
            return
        if isinstance(leg, Exchange):
            leg = shortened_exchange(leg)
            by = exchange_as_conjugation(leg)
            if by is not None:
                self.conjugate(by)
                return
        self.settle(leg.source.word)
        self.legs.append(leg)
        self.source = leg.target

    def destabilize(self, before: Sequence[int], sign: int, after: Sequence[int]) -> None:
        """From before * s^sign * after, neither of which uses the last generator s, drop s.

        The element reached becomes before * after, on one strand less.
        """
        strands = self.source.strands
        self.conjugate((*before, sign * (strands - 1)))
        word = free_reduce_letters((*after, *before))
        self.add(Destabilization(Braid.trusted(tuple(word), strands - 1), sign))
        self.conjugate(after)


def composed(legs: Sequence[Leg], *, exchanges: bool) -> list[Leg]:
    """The same passage with neighbouring conjugations composed to one.

    Exchanges stay legs of their own if ``exchanges``; otherwise they are taken apart, and their
    first and last conjugations composed with what stands beside them.
    """
    if not legs:
        return []
    builder = LegBuilder(legs[0].source)
    for leg in legs:
        if isinstance(leg, Exchange) and not exchanges:
            for part in exchange_as_strand_changes(leg):
                builder.add(part)
        else:
            builder.add(leg)
    builder.settle(legs[-1].target.word)
    return builder.legs
