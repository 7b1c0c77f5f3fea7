"""Words in Z_2 * Z_3 against matrices, and their cyclic forms against trial."""

from hypothesis import given
from hypothesis import strategies as st

from braidsearch.three_braids.modular_group import (
    braid_preimage,
    cyclically_reduced,
    inverse_letters,
    least_rotation,
    modular_image,
    multiply_by,
)
from tests.strategies import braids_on

Matrix = tuple[int, int, int, int]

GENERATORS: dict[int, Matrix] = {
    1: (1, 1, 0, 1),
    2: (1, 0, -1, 1),
    -1: (1, -1, 0, 1),
    -2: (1, 0, 1, 1),
}
"""The representation of B_3 in SL(2,Z): both sides of 1 2 1 = 2 1 2 are (0, 1, -1, 0)."""

letters_of_cycles = st.lists(st.sampled_from([-1, 0, 1]), max_size=12)


def multiply(one: Matrix, other: Matrix) -> Matrix:
    a, b, c, d = one
    p, q, r, s = other
    return a * p + b * r, a * q + b * s, c * p + d * r, c * q + d * s


def matrix_up_to_sign(word: tuple[int, ...]) -> Matrix:
    """The image in PSL(2,Z): of the two matrices the larger."""
    product = (1, 0, 0, 1)
    for letter in word:
        product = multiply(product, GENERATORS[letter])
    return max(product, tuple(-entry for entry in product))


@given(braids_on(3, 8), braids_on(3, 8))
def test_images_are_equal_when_matrices_are(left, right):
    """The reduced words in a and b tell exactly the elements of PSL(2,Z) apart."""
    equal_words = modular_image(left.word) == modular_image(right.word)
    assert equal_words == (matrix_up_to_sign(left.word) == matrix_up_to_sign(right.word))


@given(braids_on(3, 30))
def test_an_image_is_that_of_its_braid_word(braid):
    """braid_preimage turns a reduced word back: its image is the word, its matrix the same."""
    image = modular_image(braid.word)
    back = braid_preimage(image)
    assert modular_image(back) == image
    assert matrix_up_to_sign(back) == matrix_up_to_sign(braid.word)
    assert len(back) <= len(braid.word) + 3


@given(braids_on(3, 30), braids_on(3, 30))
def test_words_multiply_and_invert_as_braids_do(left, right):
    """The image is a homomorphism."""
    product = modular_image(left.word)
    multiply_by(product, modular_image(right.word))
    assert product == modular_image(left.word + right.word)
    assert list(inverse_letters(modular_image(left.word))) == modular_image(left.inverse().word)


@given(braids_on(3, 30))
def test_the_core_is_cyclically_reduced(braid):
    """word = prefix core prefix^-1, and every rotation of the core is reduced."""
    word = modular_image(braid.word)
    core, prefix = cyclically_reduced(word)
    product = list(prefix)
    multiply_by(product, core)
    multiply_by(product, inverse_letters(prefix))
    assert product == word
    twice = list(core)
    multiply_by(twice, core)
    assert len(core) <= 1 or twice == [*core, *core]


@given(letters_of_cycles, st.integers(1, 3))
def test_the_least_rotation_is_the_least(letters, copies):
    """Against all rotations compared, and the period against all shifts."""
    cycle = letters * copies
    rotations = [cycle[start:] + cycle[:start] for start in range(len(cycle))] or [[]]
    start, period = least_rotation(cycle)
    assert rotations[start] == min(rotations)
    shifts = [shift for shift in range(1, len(cycle)) if rotations[shift] == cycle]
    assert period == min([*shifts, len(cycle) or 1])
