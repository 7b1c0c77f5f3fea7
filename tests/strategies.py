"""Strategies shared by the property tests."""

import random

from hypothesis import strategies as st

from braidsearch.diagrams.closed_braid_diagram import closed_braid_diagram
from braidsearch.diagrams.link_diagram import LinkDiagram
from braidsearch.moves import MoveChain
from braidsearch.words import Braid
from tests.scrambles import apply_random_relation


@st.composite
def braids(draw: st.DrawFn, max_strands: int = 5, max_letters: int = 20) -> Braid:
    """A braid word with any letters, on 1 to ``max_strands`` strands."""
    strands = draw(st.integers(1, max_strands))
    if strands == 1:
        return Braid([], strands=1)
    letters = st.integers(1 - strands, strands - 1).filter(bool)
    return Braid(draw(st.lists(letters, max_size=max_letters)), strands=strands)


@st.composite
def braids_on(draw: st.DrawFn, strands: int, max_letters: int = 20) -> Braid:
    """A braid word with any letters on exactly so many strands."""
    letters = st.integers(1 - strands, strands - 1).filter(bool) if strands > 1 else st.nothing()
    return Braid(draw(st.lists(letters, max_size=max_letters)), strands=strands)


@st.composite
def link_diagrams(draw: st.DrawFn, max_strands: int = 4, max_letters: int = 10) -> LinkDiagram:
    """The diagram of a closed braid with some of its components reversed, perhaps mirrored."""
    diagram = closed_braid_diagram(draw(braids(max_strands, max_letters)))
    components = st.integers(0, diagram.component_count - 1)
    diagram = diagram.reversed_components(draw(st.sets(components)))
    return diagram.mirrored() if draw(st.booleans()) else diagram


@st.composite
def move_chains(draw: st.DrawFn, start: Braid | None = None, max_moves: int = 8) -> MoveChain:
    """A checked chain of all four moves from ``start``, or from any small braid."""
    chain = MoveChain(draw(braids(max_strands=4, max_letters=8)) if start is None else start)
    generator = draw(st.randoms(use_true_random=False))
    for _ in range(draw(st.integers(0, max_moves))):
        append_random_step(chain, generator)
    return chain


def append_random_step(chain: MoveChain, generator: random.Random, most_strands: int = 6) -> None:
    """Add a move of a kind chosen at random, two where a destabilization needs a rotation first.

    Now and then the last moves are undone instead, so that chains come back to earlier words.
    """
    word, strands = list(chain.current.word), chain.current.strands
    kinds = ["rewrite", "conjugate", "stabilize", "destabilize", "return"]
    kind = generator.choice(kinds if strands > 1 else ["stabilize", "return"])
    last_places = [at for at, letter in enumerate(word) if abs(letter) == strands - 1]
    if kind == "return":
        way = chain.reversed_moves()
        chain.extend(way[: generator.randrange(len(way) + 1)])
    elif kind == "stabilize" and strands < most_strands:
        chain.stabilize(generator.choice([1, -1]))
    elif kind == "destabilize" and strands > 1 and len(last_places) == 1:
        cut = last_places[0] + 1
        chain.conjugate(word[:cut], word[cut:] + word[:cut])
        chain.destabilize()
    elif kind == "conjugate":
        letters = [*range(1 - strands, 0), *range(1, strands)]
        chain.conjugate(generator.choices(letters, k=generator.randrange(1, 4)))
    else:
        for _ in range(3):
            apply_random_relation(word, generator)
        if strands > 1 and generator.random() < 0.5:
            letter, place = generator.randrange(1, strands), generator.randrange(len(word) + 1)
            word[place:place] = [letter, -letter]
        chain.rewrite(word)
