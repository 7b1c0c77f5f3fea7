"""The compiled loop of handle reduction does, step for step, what the plain one does."""

import random

import pytest
from hypothesis import given
from hypothesis import strategies as st

from braidsearch.compiling import is_compiled
from braidsearch.words import Braid, handle_kernel, handles
from braidsearch.words.handle_kernel import without_handles
from tests.artin_action import artin_images
from tests.strategies import braids

ENOUGH = 100_000
needs_compiler = pytest.mark.skipif(not is_compiled(), reason="nothing is compiled here")


def plainly(word: list[int], steps: int) -> list[int] | None:
    """The plain loop."""
    return handles._without_handles_plainly(word, steps)


@needs_compiler
@given(braids(max_strands=6, max_letters=40))
def test_both_loops_give_the_same_word(braid: Braid) -> None:
    """Letter by letter, and the same element of the braid group (Artin's action)."""
    word = list(braid.word)
    found = without_handles(word, ENOUGH)
    assert found == plainly(word, ENOUGH)
    assert found is not None
    assert all(type(letter) is int for letter in found)
    assert word == list(braid.word)
    if len(word) <= 12:
        assert artin_images(Braid(found, braid.strands)) == artin_images(braid)


@needs_compiler
@given(braids(max_strands=5, max_letters=20), st.integers(0, 60))
def test_both_loops_count_the_same_steps(braid: Braid, steps: int) -> None:
    """They run out of steps at the same one."""
    assert without_handles(list(braid.word), steps) == plainly(list(braid.word), steps)


@needs_compiler
def test_what_outgrows_its_room_is_left_to_the_plain_loop(
    monkeypatch: pytest.MonkeyPatch,
) -> None:
    """A word that grows too long on the way gives None, never a wrong word."""
    monkeypatch.setattr(handle_kernel, "_ROOM", 0)
    monkeypatch.setattr(handle_kernel, "_TIMES", 1)
    generator = random.Random(3)
    given_up = 0
    for _ in range(200):
        word = generator.choices([1, -1, 2, -2, 3, -3], k=25)
        found = without_handles(word, ENOUGH)
        given_up += found is None
        assert found in (None, plainly(word, ENOUGH))
    assert given_up > 0


def test_without_a_compiler_the_plain_loop_is_taken(monkeypatch: pytest.MonkeyPatch) -> None:
    """The kernel says so, and reduction goes on as before."""
    monkeypatch.setattr(handle_kernel, "is_compiled", lambda: False)
    monkeypatch.setattr(handles, "_calls", 10**9)
    assert without_handles([1, 2, -1], ENOUGH) is None
    braid = Braid([1, 2, -1, 1, -2])
    assert artin_images(handles.reduce_handles(braid)) == artin_images(braid)


@given(braids(max_strands=5, max_letters=20))
def test_a_process_that_asks_often_gets_the_same_words(braid: Braid) -> None:
    """What the compiled loop does from some call on changes no result."""
    before = handles._calls
    try:
        handles._calls = 0
        plain = handles.reduce_handles(braid)
        handles._calls = 10**9
        assert handles.reduce_handles(braid) == plain
    finally:
        handles._calls = before
