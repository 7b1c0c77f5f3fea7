"""Strategies for certificates of any well-formed content, true or not."""

from dataclasses import replace

from hypothesis import strategies as st

from braidsearch.certificates import Certificate, Distinction
from braidsearch.certificates.grammar import INVARIANTS, PARAMETERS, SUBLINKS, VALUES, Shape
from braidsearch.moves import Conjugate, Destabilize, Rewrite, Stabilize
from braidsearch.words import SYMMETRIES
from tests.strategies import braids

letters = st.integers(-9, 9).filter(bool)
words = st.lists(letters, max_size=8).map(tuple)
signs = st.sampled_from([1, -1])
strand_counts = st.integers(1, 12)
moves = st.one_of(
    st.builds(Rewrite, words),
    st.builds(Conjugate, words, words),
    st.builds(Stabilize, signs, strand_counts, words),
    st.builds(Destabilize, signs, strand_counts, words),
)
move_lists = st.lists(moves, max_size=5)
integers = st.integers(-9, 9) | st.integers(-(2**400), 2**400)


def values_of_shape(shape: Shape) -> st.SearchStrategy[object]:
    """Values of the shape."""
    if shape.is_permutation:
        orders = st.integers(1, 5).map(lambda degree: range(1, degree + 1))
        least, most = shape.entries or (0, 3)
        return st.lists(orders.flatmap(st.permutations), min_size=least, max_size=min(most, 3))
    if shape.depth == 0:
        bounded = shape.least is not None
        return st.integers(shape.least, shape.most) if bounded else integers
    inner = values_of_shape(replace(shape, depth=shape.depth - 1))
    if shape.depth == 1 and shape.width is not None:
        return st.lists(inner, min_size=shape.width, max_size=shape.width)
    return st.lists(inner, max_size=4)


@st.composite
def parameters_and_values(
    draw: st.DrawFn, invariant: str
) -> tuple[dict[str, object], list[object]]:
    """Parameters for the invariant, and two values of the shape that it has with them."""
    shapes = dict(PARAMETERS.get(invariant, {}))
    parameters: dict[str, object] = {}
    if invariant == SUBLINKS:
        inner = draw(st.sampled_from(sorted(VALUES)))
        parameters["invariant"] = inner
        shapes |= PARAMETERS.get(inner, {})
        values = st.lists(values_of_shape(VALUES[inner]), max_size=3)
    else:
        values = values_of_shape(VALUES[invariant])
    parameters |= {name: draw(values_of_shape(shape)) for name, shape in shapes.items()}
    return parameters, [draw(values), draw(values)]


symmetries = st.sampled_from(SYMMETRIES)


@st.composite
def distinctions(draw: st.DrawFn, symmetry: str) -> Distinction:
    """A distinction for the symmetry, by any invariant."""
    invariant = draw(st.sampled_from(sorted(INVARIANTS)))
    parameters, (left, right) = draw(parameters_and_values(invariant))
    return Distinction(
        symmetry=symmetry,
        invariant=invariant,
        parameters=parameters,
        left_moves=draw(move_lists),
        right_moves=draw(move_lists),
        left=left,
        right=right,
    )


differences = st.lists(symmetries, min_size=1, max_size=4, unique=True).flatmap(
    lambda names: st.tuples(*map(distinctions, names))
)
certificates = st.one_of(
    st.builds(Certificate.same, braids(), braids(), symmetries, move_lists),
    st.builds(Certificate.different, braids(), braids(), differences),
)
