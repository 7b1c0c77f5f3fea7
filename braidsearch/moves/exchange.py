"""The exchange move, written out in the four moves that a proof may hold."""

from __future__ import annotations

from braidsearch.errors import InputError
from braidsearch.moves.chain import MoveChain

Letters = tuple[int, ...]


def exchange(chain: MoveChain, alpha: Letters, beta: Letters, sign: int) -> None:
    """Exchange alpha s^sign beta s^-sign for alpha s^-sign beta s^sign at the end of the chain.

    s is the last generator sigma_(n-1), and alpha and beta do not use it; the current word must
    be literally alpha, sign*(n-1), beta, -sign*(n-1). Birman, Menasco, Studying links via closed
    braids IV, 1990; written out through one stabilization and one destabilization. Raises
    InputError when the current word is another.
    """
    strands = chain.current.strands
    s = sign * (strands - 1)
    if chain.current.word != (*alpha, s, *beta, -s):
        raise InputError(f"exchange in {list(chain.current.word)}: expected alpha, {s}, beta, {-s}")
    t = sign * strands
    chain.conjugate((-s,), (s, *alpha, s, *beta, -s, -s))
    chain.stabilize(sign)
    chain.conjugate((s, *alpha, s), (*beta, -s, -s, t, s, *alpha, s))
    chain.conjugate((t,), (*beta, s, *alpha, s, t, -s, -s))
    chain.conjugate((*beta, s, *alpha, s, t), (-s, -s, *beta, s, *alpha, s, t))
    chain.destabilize()
    chain.conjugate((-s, -s, *beta, s), (*alpha, -s, *beta, s))
