"""Chains of evidence joined: certificates turned round, and strung into one certificate.

To be the same link is an equivalence, and what differs from a link differs from all that are the
same as it: what follows from several certificates is written here as one. Nothing is checked
again; the verifier judges what comes out. Every function takes time linear in the letters of the
moves.
"""

from __future__ import annotations

from collections.abc import Iterable, Sequence
from dataclasses import replace
from itertools import pairwise

from braidsearch.certificates.explanation import shown_braid
from braidsearch.certificates.grammar import MAX_MOVES
from braidsearch.certificates.symmetric_values import symmetric_parameters, symmetric_value
from braidsearch.certificates.values import Certificate, Distinction
from braidsearch.errors import CapacityError, InputError
from braidsearch.moves import Conjugate, Destabilize, Move, MoveChain, Rewrite, Stabilize
from braidsearch.moves.markov import stated_result
from braidsearch.words import SYMMETRIES, Braid, apply_symmetry

_LONGEST_CONJUGATOR = 1_000  # letters up to which the conjugators of several moves are joined

_FLAGS = {name: (name.startswith("mirror"), name.endswith("reverse")) for name in SYMMETRIES}
"""Of each symmetry, whether it negates letters and whether it reads words backwards."""


def reverse_certificate(certificate: Certificate) -> Certificate:
    """The same claim with left and right exchanged, and what proves it.

    Each symmetry is its own inverse: closure(left) = s(closure(right)) says as much as
    closure(right) = s(closure(left)), and the inequalities likewise. Stated values are carried
    over to the images under s, none is computed on a braid. Raises as ``symmetric_value`` does.
    """
    left, right = certificate.left, certificate.right
    if certificate.verdict == "same":
        symmetry = certificate.symmetry or "identity"
        chain = _draft(left, certificate.moves)
        moves = apply_symmetry_to_moves(chain.current, chain.reversed_moves(), symmetry)
        return _same(right, left, symmetry, moves)
    exchanged = []
    for item in certificate.distinctions:
        image = _with_values_of_images(item, item.symmetry)
        exchanged.append(
            replace(
                image,
                left_moves=item.right_moves,
                right_moves=item.left_moves,
                left=image.right,
                right=image.left,
            )
        )
    return Certificate.different(right, left, exchanged)


def apply_symmetry_to_moves(start: Braid, moves: Iterable[Move], symmetry: str) -> tuple[Move, ...]:
    """The moves from symmetry(start) to symmetry(end), for moves that lead from start to end.

    Read backwards, by^-1 w by is conjugated by the inverse of ``by`` read backwards, and the letter
    of a new strand stands in front: a conjugation brings it to the end, where the format has it.
    These conjugations are joined with their neighbours. Raises InputError for an unknown symmetry.
    """
    images: list[Move] = []
    before = start
    for move in moves:
        images += _images_of_move(before, move, symmetry)
        before = stated_result(before, move)
    image = apply_symmetry(start, symmetry)
    return tuple(_merged(image, images) if _FLAGS[symmetry][1] else images)


def compose_symmetries(first: str, second: str) -> str:
    """The symmetry that acts as both, one after the other; the four are Klein's four-group.

    Raises InputError for a name that is none of SYMMETRIES.
    """
    for name in (first, second):
        if name not in _FLAGS:
            raise InputError(f"symmetry {name!r}: expected one of {', '.join(SYMMETRIES)}")
    (mirrors, reverses), (also_mirrors, also_reverses) = _FLAGS[first], _FLAGS[second]
    flags = (mirrors != also_mirrors, reverses != also_reverses)
    return next(name for name, own in _FLAGS.items() if own == flags)


def join_same(first: Certificate, second: Certificate) -> Certificate:
    """From closure(A) = s(closure(B)) and closure(B) = t(closure(C)): closure(A) = st(closure(C)).

    The moves of both, those of the second one under s. Raises InputError where the second does not
    begin at the braid at which the first one ends, or either is no certificate of sameness, and
    CapacityError for more moves than a certificate can hold.
    """
    symmetry, moves = _path([first, second])
    return _same(first.left, second.right, symmetry, moves)


def join_different(
    same_left: Certificate | None, different: Certificate, same_right: Certificate | None
) -> Certificate:
    """From A the same as B, B different from C, and C the same as D: A is different from D.

    Each certificate of sameness may be None, for one braid on both its sides. With closure(A) =
    s(closure(B)) and closure(C) = t(closure(D)), a distinction for the symmetry r becomes one for
    srt, with values carried over to the images under s. Raises as ``join_same`` does, and as
    ``symmetric_value`` does.
    """
    lefts = [] if same_left is None else [same_left]
    rights = [] if same_right is None else [same_right]
    return _join_different(lefts, different, rights)


def join_chain(certificates: Iterable[Certificate]) -> Certificate:
    """One certificate for a path of certificates, each of which begins where the last one ends.

    All certify sameness, or all but one, and then the path proves the difference of its ends. Moves
    between two visits of one word are left out, and runs of rewritings and conjugations joined.
    Raises InputError for a path that is empty or interrupted, or with several differences: two
    links that both differ from a third may be the same. Raises CapacityError for more moves than a
    certificate can hold.
    """
    path = list(certificates)
    if not path:
        raise InputError("an empty chain of certificates: expected one at least")
    breaks = [place for place, one in enumerate(path) if one.verdict == "different"]
    if len(breaks) > 1:
        raise InputError(f"{len(breaks)} differences in one chain: expected at most one")
    if breaks:
        place = breaks[0]
        return _join_different(path[:place], path[place], path[place + 1 :], is_shortened=True)
    symmetry, moves = _path(path)
    return _same(path[0].left, path[-1].right, symmetry, _shortened(path[0].left, moves))


def _join_different(
    lefts: Sequence[Certificate],
    different: Certificate,
    rights: Sequence[Certificate],
    is_shortened: bool = False,
) -> Certificate:
    if different.verdict != "different":
        raise InputError("a certificate of sameness: expected one of difference")
    _check_links([*lefts, different, *rights])
    left = lefts[0].left if lefts else different.left
    right = rights[-1].right if rights else different.right
    symmetry, moves = _path(lefts)
    turned, back = _path([reverse_certificate(one) for one in reversed(rights)])
    joined = []
    for item in different.distinctions:
        left_moves = apply_symmetry_to_moves(different.left, item.left_moves, symmetry)
        right_moves = apply_symmetry_to_moves(different.right, item.right_moves, turned)
        sides = [(left, [*moves, *left_moves]), (right, [*back, *right_moves])]
        done = [_shortened(start, side) if is_shortened else side for start, side in sides]
        _check_lengths(*done)
        named = compose_symmetries(compose_symmetries(symmetry, item.symmetry), turned)
        image = _with_values_of_images(item, symmetry)
        joined.append(
            replace(image, symmetry=named, left_moves=tuple(done[0]), right_moves=tuple(done[1]))
        )
    return Certificate.different(left, right, joined)


def _path(certificates: Sequence[Certificate]) -> tuple[str, list[Move]]:
    """The symmetry s, and moves from the first left braid to s of the last right one."""
    for one in certificates:
        if one.verdict != "same":
            raise InputError("a certificate of difference: expected one of sameness")
    _check_links(certificates)
    symmetry, moves = "identity", list[Move]()
    for one in certificates:
        moves += apply_symmetry_to_moves(one.left, one.moves, symmetry)
        symmetry = compose_symmetries(symmetry, one.symmetry or "identity")
    return symmetry, moves


def _check_links(certificates: Sequence[Certificate]) -> None:
    for one, following in pairwise(certificates):
        if one.right != following.left:
            reached = shown_braid(one.right)
            raise InputError(f"left braid {shown_braid(following.left)}: expected {reached}")


def _same(left: Braid, right: Braid, symmetry: str, moves: Sequence[Move]) -> Certificate:
    _check_lengths(moves)
    return Certificate.same(left, right, symmetry, moves)


def _check_lengths(*chains: Sequence[Move]) -> None:
    for moves in chains:
        if len(moves) > MAX_MOVES:
            raise CapacityError(f"a chain of {len(moves)} moves: expected at most {MAX_MOVES}")


def _with_values_of_images(item: Distinction, symmetry: str) -> Distinction:
    """The distinction with both values those of the symmetric images of the two links."""
    parameters = dict(item.parameters)
    return replace(
        item,
        parameters=tuple(symmetric_parameters(item.invariant, parameters, symmetry).items()),
        left=symmetric_value(item.invariant, parameters, item.left, symmetry),
        right=symmetric_value(item.invariant, parameters, item.right, symmetry),
    )


def _images_of_move(before: Braid, move: Move, symmetry: str) -> list[Move]:
    """The moves from symmetry(before) to the symmetric image of what the move leads to."""
    after = apply_symmetry(stated_result(before, move), symmetry).word
    mirrors, reverses = _FLAGS[symmetry]
    if isinstance(move, Rewrite):
        return [Rewrite(after)]
    if isinstance(move, Conjugate):
        # Read backwards, by^-1 is the letters of by negated; the mirror image negates them again.
        by = move.by if mirrors == reverses else tuple(-letter for letter in move.by)
        return [Conjugate(by, after)]
    sign = -move.sign if mirrors else move.sign
    letter = sign * min(before.strands, move.strands)
    if not reverses:
        return [replace(move, sign=sign, word=after)]
    if isinstance(move, Stabilize):
        literal = (*after[1:], letter)
        return [Stabilize(sign, move.strands, literal), Conjugate((-letter,), after)]
    return [Conjugate((letter,), (*after, letter)), Destabilize(sign, move.strands, after)]


def _shortened(start: Braid, moves: Sequence[Move]) -> list[Move]:
    return _merged(start, _without_loops(start, moves))


def _without_loops(start: Braid, moves: Sequence[Move]) -> list[Move]:
    """The moves without those between the first and the last visit of a braid."""
    braids = _draft(start, moves).braids
    last_visit = {braid: place for place, braid in enumerate(braids)}
    kept = []
    place = last_visit[start]
    while place < len(moves):
        kept.append(moves[place])
        place = last_visit[braids[place + 1]]
    return kept


def _merged(start: Braid, moves: Iterable[Move]) -> list[Move]:
    """The moves with every run of rewritings and conjugations made one move, or none.

    The conjugators are multiplied and freely reduced; a product of more than a thousand letters is
    left in parts, far from the longest word that a certificate can hold.
    """
    merged: list[Move] = []
    first = here = start
    by: list[int] = []
    for move in moves:
        if isinstance(move, Rewrite | Conjugate):
            letters = move.by if isinstance(move, Conjugate) else ()
            if len(by) + len(letters) > _LONGEST_CONJUGATOR:
                merged += _one_move(first, by, here)
                first, by = here, []
            _multiply(by, letters)
            here = stated_result(here, move)
        else:
            merged += [*_one_move(first, by, here), move]
            first = here = stated_result(here, move)
            by = []
    return merged + _one_move(first, by, here)


def _one_move(first: Braid, by: Sequence[int], last: Braid) -> list[Move]:
    """The move that conjugates the first braid to the last one; none between equal words."""
    if first.word == last.word:
        return []
    return [Conjugate(tuple(by), last.word) if by else Rewrite(last.word)]


def _multiply(by: list[int], letters: Iterable[int]) -> None:
    """Append the letters, each cancelled against its inverse before it."""
    for letter in letters:
        if by and by[-1] == -letter:
            by.pop()
        else:
            by.append(letter)


def _draft(start: Braid, moves: Iterable[Move]) -> MoveChain:
    """The chain of the moves as they state their results."""
    chain = MoveChain(start, is_checked=False)
    chain.extend(moves)
    return chain
