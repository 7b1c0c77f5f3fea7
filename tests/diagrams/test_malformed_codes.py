"""Texts and lists that are not the code of a diagram: one line each, with what was expected."""

import pytest
from hypothesis import given
from hypothesis import strategies as st

from braidsearch.diagrams import (
    NOTATIONS,
    LinkDiagram,
    gauss_code,
    parse_code,
    planar_diagram_code,
)
from braidsearch.errors import InputError

FOUR_LABELS = "expected four arc labels for each crossing"
PASSAGES = "expected passages such as O1+ U2+"
EVEN_NUMBERS = "expected even numbers such as 4 6 2"


def message_of(notation: str, text: str) -> str:
    with pytest.raises(InputError) as caught:
        parse_code(notation, text)
    message = str(caught.value)
    assert "\n" not in message
    assert "expected" in message
    return message


@pytest.mark.parametrize(
    ("text", "message"),
    [
        ("", f"an empty text: {FOUR_LABELS}"),
        ("  \n ", f"an empty text: {FOUR_LABELS}"),
        ("[]", f"[] as a crossing: {FOUR_LABELS}"),
        ("[[1,5,2,4],[3,1,4,6],[5,3,6]]", f"[5, 3, 6] as a crossing: {FOUR_LABELS}"),
        ("[[1,5,2,4],[3,1,4,6],[5,3,6,7]]", "arc label 2 used once: expected every label at two"),
        ("[[1,5,2,1],[3,1,4,6],[5,3,6,2]]", "arc label 1 used 3 times: expected every label"),
        ("[[1,1,2,2],[2]]", "arc label 2 used 4 times: expected every label at two places"),
        ("[[1,5,2,x],[3,1,4,6],[5,3,6,2]]", f"'x': {FOUR_LABELS}"),
        ("[[1,5,2,4.0],[3,1,4,6],[5,3,6,2]]", f"'4.0': {FOUR_LABELS}"),
        ("[[1,5,2,4,[3,1,4,6],[5,3,6,2]]", f"'4' before a bracket: {FOUR_LABELS}"),
        ("[[1,5,2,4],[3,1,4,6],[5,3,6,2]", f"'[' without its partner: {FOUR_LABELS}"),
        ("[1,5,2,4],[3,1,4,6],[5,3,6,2]]", f"']' without its partner: {FOUR_LABELS}"),
        ("[[1,5,2,4),[3,1,4,6],[5,3,6,2]]", f"')' without its partner: {FOUR_LABELS}"),
        ("[[1,5,2,4],3,[5,3,6,2]]", f"'3' beside brackets: {FOUR_LABELS}"),
        ("[[-1,5,2,4],[3,-1,4,6],[5,3,6,2]]", "arc label -1: expected integers from 0 or 1"),
        ("[[1,2,1,2]]", "the piece of crossing 1, 1 crossing in all: expected a planar diagram"),
        ("[[2,5,1,4],[3,1,4,6],[5,3,6,2]]", "arcs 2 and 4 of one component: expected every under"),
        (
            "[[1,4,2,5],[3,1,4,6],[5,3,6,2]]",
            "the piece of crossing 1, 3 crossings in all: expected a planar diagram, found one of",
        ),
    ],
)
def test_planar_diagram_codes(text: str, message: str) -> None:
    """Arcs used once or thrice, crossings of three arcs, brackets, contradictions, genus."""
    assert message_of("planar-diagram", text).startswith(message)


@pytest.mark.parametrize(
    ("text", "message"),
    [
        ("", f"an empty text: {PASSAGES}"),
        ("O1+ U2+ O3+ U1+ O2+", "crossing 3 passed over only: expected every crossing once over"),
        ("O1+ U2+ O3+ O1+ O2+ U3+", "crossing 1 passed over twice: expected every crossing once"),
        ("1 -2 3 -1 2 3", "crossing 3 passed over twice: expected every crossing once over and"),
        ("0 1 -1", "crossing 0: expected crossings numbered from 1 upwards"),
        ("O1+ U2+ O3+ U1- O2+ U3+", "'U1-': expected the same sign at both passages of 1"),
        ("O1+ U2+ O3+ U1 O2+ U3+", f"'U1': {PASSAGES}"),
        ("O1+ U2+ 3 U1+ O2+ U3+", f"'3': {PASSAGES}"),
        ("1 -2 3 -1 2 three", f"'three': {PASSAGES}"),
        ("O1+ U2+ U1+ O2+", "the piece of crossing 1, 2 crossings in all: expected a planar"),
        ("1 -2 -1 2", "a code of 2 crossings that no planar diagram has: expected the code of"),
        ("1; -1", "a code of 1 crossing that no planar diagram has: expected the code of"),
    ],
)
def test_gauss_codes(text: str, message: str) -> None:
    """Crossings passed once, or twice on one level, signs that differ, codes without a plane."""
    assert message_of("gauss", text).startswith(message)


@pytest.mark.parametrize(
    ("text", "message"),
    [
        ("", f"an empty text: {EVEN_NUMBERS}"),
        ("4 5 2", f"5: {EVEN_NUMBERS}"),
        ("4 6 8", "8: expected even numbers from 2 to 6, as there are 3 entries"),
        ("4 0 2", "0: expected even numbers from 2 to 6, as there are 3 entries"),
        ("4 6 -4", "-4: expected every even number once, found 4 twice"),
        ("4 six 2", f"'six': {EVEN_NUMBERS}"),
        ("4 6 8 10 2", "a code of 5 crossings that no planar diagram has: expected the code"),
        ("[2] [4]] ", f"']' without its partner: {EVEN_NUMBERS}"),
    ],
)
def test_dowker_thistlethwaite_codes(text: str, message: str) -> None:
    """Odd entries, entries out of range or twice, codes without a plane."""
    assert message_of("dowker-thistlethwaite", text).startswith(message)


def test_lists_that_are_no_codes() -> None:
    """Lists are read as strictly as texts."""
    for entries in ([[1, 5, 2, True]], [["1", 5, 2, 4]], [[1.0, 5, 2, 4]], ["1524"], 7, [7]):
        with pytest.raises(InputError, match="expected four arc labels"):
            planar_diagram_code(entries)  # type: ignore[arg-type]
    with pytest.raises(InputError, match="2 signs: expected 3, one for each crossing"):
        gauss_code([[1, -2, 3, -1, 2, -3]], [1, 1])
    with pytest.raises(InputError, match="crossing 2: expected its sign, 1 or -1, among the signs"):
        gauss_code([[1, -2, 3, -1, 2, -3]], {1: 1, 3: 1})


def test_an_unknown_notation() -> None:
    """The names that exist are listed."""
    with pytest.raises(InputError, match="notation 'pd': expected one of planar-diagram, gauss, "):
        parse_code("pd", "[[1,1,2,2]]")


@pytest.mark.parametrize(
    ("notation", "text"),
    [
        ("planar-diagram", "1 2 3 4\n" * 50_001),
        ("gauss", "1 -1 " * 50_001),
        ("dowker-thistlethwaite", "2 " * 50_001),
    ],
)
def test_a_text_without_end(notation: str, text: str) -> None:
    """Too many crossings are turned away before anything is built from them."""
    assert message_of(notation, text).endswith("entries: expected at most 50000 crossings")


def read_or_message(notation: str, text: str) -> LinkDiagram | str:
    """The diagram of a text, or the message that turns it away."""
    try:
        return parse_code(notation, text)[0]
    except InputError as error:
        return str(error)


@given(
    st.sampled_from(NOTATIONS),
    st.text(st.sampled_from("[](){}, \n;+-−OU0123456789x"), max_size=60),
)
def test_no_text_raises_anything_else(notation: str, text: str) -> None:
    """Either a diagram or one line of error, whatever the text."""
    answer = read_or_message(notation, text)
    if isinstance(answer, str):
        assert "\n" not in answer
        assert "expected" in answer
    else:
        assert answer.component_count > 0


@given(
    st.permutations([1, 1, 2, 2, 3, 3, 4, 4]).map(lambda labels: [labels[:4], labels[4:]]),
    st.permutations([1, -1, 2, -2, 3, -3]),
    st.permutations([2, 4, -6, 8]),
)
def test_codes_of_arbitrary_permutations(
    labels: list[list[int]], passages: list[int], evens: list[int]
) -> None:
    """Counted right, they are diagrams in the plane or they are turned away in one line."""
    for notation, entries in zip(NOTATIONS, (labels, passages, evens), strict=True):
        answer = read_or_message(notation, str(entries))
        is_turned_away = isinstance(answer, str) and "expected" in answer
        assert is_turned_away or (isinstance(answer, LinkDiagram) and answer.is_planar)
