"""Strategies shared by the property tests."""

from hypothesis import strategies as st

from braidsearch.diagrams.closed_braid_diagram import closed_braid_diagram
from braidsearch.diagrams.link_diagram import LinkDiagram
from braidsearch.words import Braid


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
