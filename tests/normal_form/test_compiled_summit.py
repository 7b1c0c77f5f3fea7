"""The compiled walk of the ultra summit set finds, to the letter, what the plain one finds."""

from __future__ import annotations

import os
import random
import subprocess
import sys
from collections.abc import Iterator

import pytest
from hypothesis import given, settings
from hypothesis import strategies as st

from braidsearch.compiling import is_compiled
from braidsearch.errors import OutOfTimeError
from braidsearch.normal_form import (
    compiled_summit,
    conjugacy,
    ranked_tables,
    row_table,
    summit_kernel,
)
from braidsearch.normal_form.compiled_summit import CompiledSummit
from braidsearch.normal_form.conjugacy import conjugacy_class, iter_summit, plain_summit
from braidsearch.normal_form.found_summit import FoundSummit, PlainSummit
from braidsearch.normal_form.left_normal_form import never
from braidsearch.words import Braid
from braidsearch.words.half_twist import half_twist
from tests.artin_action import artin_images
from tests.strategies import braids

MOST_STRANDS = 6 if is_compiled() else 4  # the tables of 720 elements take long in plain loops
CAPS = (0, 1, 2, 5, 20, 100, 2_000)
needs_compiler = pytest.mark.skipif(not is_compiled(), reason="nothing is compiled here")


def seen(summit: FoundSummit) -> tuple[object, ...]:
    """Everything that can be asked of a summit."""
    return summit.size, summit.is_complete, summit.least(), list(summit.iter_members())


def compiled(braid: Braid, cap: int = 2_000) -> FoundSummit:
    """The summit by the compiled loops, and not by the plain walk that they fall back to."""
    found = compiled_summit.compiled_summit(braid, cap, never)
    assert isinstance(found, CompiledSummit)
    return found


def iter_random_braids(count: int, seed: int) -> Iterator[Braid]:
    """Random words, among them powers, words without a middle generator, words of one sign."""
    generator = random.Random(seed)
    for number in range(count):
        strands = generator.randint(2, MOST_STRANDS)
        letters = [*range(1 - strands, 0), *range(1, strands)]
        if number % 7 == 0 and strands > 3:
            letters.remove(2)
            letters.remove(-2)
        if number % 11 == 0:
            letters = [letter for letter in letters if letter > 0]
        most = (0, 0, 30, 20, 16, 14, 12)[strands]
        word = generator.choices(letters, k=generator.randint(0, most))
        if number % 5 == 0:
            word = word[: most // 3] * 2
        yield Braid(word, strands)


def special_braids(strands: int) -> list[Braid]:
    """Trivial, periodic (roots of the full twist and their powers), twisted both ways."""
    around = list(range(1, strands))
    delta = list(half_twist(strands))
    undone = [-letter for letter in reversed(delta)]
    words = [[], delta, undone, delta * 3, undone * 3]
    for power in range(1, strands + 1):
        words += [around * power, [*around, 1] * power, [-letter for letter in around] * power]
    words += [[1] * 5, [*delta, 1, *delta], undone * 2 + [1, 1, strands - 1]]
    return [Braid(word, strands) for word in words]


def test_both_walks_find_the_same_in_random_braids() -> None:
    """Members, their order, conjugators, the least, completeness: equal, at every cap."""
    generator = random.Random(1)
    for braid in iter_random_braids(5_000, seed=2):
        cap = generator.choice(CAPS)
        assert seen(compiled(braid, cap)) == seen(plain_summit(braid, cap)), (braid, cap)


@pytest.mark.parametrize("strands", range(2, MOST_STRANDS + 1))
def test_both_walks_find_the_same_in_special_braids(strands: int) -> None:
    """Trivial, periodic and reducible braids, infima of both signs."""
    for braid in special_braids(strands):
        for cap in (0, 1, 3, 300):
            assert seen(compiled(braid, cap)) == seen(plain_summit(braid, cap)), (braid, cap)


@settings(max_examples=150)
@given(braids(max_strands=MOST_STRANDS, max_letters=18), st.sampled_from(CAPS))
def test_both_walks_find_the_same(braid: Braid, cap: int) -> None:
    """The same for whatever word; one strand is left to the plain walk."""
    if compiled_summit.is_small(braid.strands):
        assert seen(compiled(braid, cap)) == seen(plain_summit(braid, cap))
    else:
        assert braid.strands == 1


@settings(max_examples=60)
@given(braids(max_strands=MOST_STRANDS, max_letters=9))
def test_conjugators_conjugate(braid: Braid) -> None:
    """Artin's action on the free group, which knows no normal form, says the same."""
    if not compiled_summit.is_small(braid.strands):
        return
    for member, by in list(compiled(braid).iter_members())[:6]:
        conjugator = Braid(by, braid.strands)
        assert artin_images(braid * conjugator) == artin_images(conjugator * member)


@pytest.mark.parametrize("strands", range(2, MOST_STRANDS + 1))
def test_tables_hold_the_operations(strands: int) -> None:
    """Left-weighted pairs, meets, residues, complements and flips are those of permutations."""
    tables = ranked_tables.ranked_tables(strands)
    elements, names = tables.elements, tables.names
    count = len(names)
    generator = random.Random(strands)
    pairs = [(one, other) for one in range(count) for other in range(count)]
    for one, other in pairs if count < 30 else generator.sample(pairs, 2_000):
        first, second = names[one], names[other]
        expected = (
            *elements.left_weighted(first, second),
            elements.meet(first, second),
            elements.residue(first, second),
        )
        assert tuple(names[name] for name in tables.pairs[one, other]) == expected
    for one, name in enumerate(names):
        expected = (name, elements.flip(name), elements.complement(name))
        assert tuple(names[image] for image in tables.singles[:, one]) == expected
    assert [names[atom] for atom in tables.atoms] == elements.atoms
    assert list(tables.permutations) == sorted(tables.permutations)


def test_a_walk_in_many_pieces_is_the_same_walk(monkeypatch: pytest.MonkeyPatch) -> None:
    """Asked after every step whether to stop, and with no room at first, it finds the same."""
    for name in ("_LETTERS_A_QUESTION", "_SLIDES_A_QUESTION", "_ROOM"):
        monkeypatch.setattr(compiled_summit, name, 1)
    monkeypatch.setattr(compiled_summit, "_FACTORS_A_QUESTION", 0)
    for braid in iter_random_braids(150, seed=3):
        for cap in (2, 2_000):
            assert seen(compiled(braid, cap)) == seen(plain_summit(braid, cap)), (braid, cap)


class Patience:
    """Says stop after so many questions, and from then on."""

    def __init__(self, questions: int) -> None:
        self.questions = questions

    def __call__(self) -> bool:
        self.questions -= 1
        return self.questions < 0


def test_a_walk_that_is_stopped_says_so(monkeypatch: pytest.MonkeyPatch) -> None:
    """Wherever it is stopped, it raises or returns conjugates; longer patience finds no less."""
    for name in ("_LETTERS_A_QUESTION", "_SLIDES_A_QUESTION"):
        monkeypatch.setattr(compiled_summit, name, 1)
    monkeypatch.setattr(compiled_summit, "_FACTORS_A_QUESTION", 0)
    braid = Braid([1, -2, 3, 1, -2, 3, 3, -1, 2], 4)
    whole = plain_summit(braid, 2_000)
    endings = set()
    for questions in range(60):
        try:
            found = compiled_summit.compiled_summit(braid, 2_000, Patience(questions))
        except OutOfTimeError:
            endings.add("no normal form")
            assert questions < len(braid)
            continue
        endings.add((type(found), found.is_complete))
        for member, by in found.iter_members():
            conjugator = Braid(by, 4)
            assert artin_images(braid * conjugator) == artin_images(conjugator * member)
        assert not found.is_complete or seen(found) == seen(whole)
    partial, complete = (CompiledSummit, False), (CompiledSummit, True)
    assert endings == {"no normal form", (PlainSummit, False), partial, complete}


def test_nothing_is_stopped_for_the_trivial_word() -> None:
    """A braid without letters has its normal form at once, as on the plain path."""
    found = compiled_summit.compiled_summit(Braid((), 3), 10, lambda: True)
    plain = plain_summit(Braid((), 3), 10, lambda: True)
    assert seen(found)[2:] == seen(plain)[2:]


def test_a_member_that_strays_is_left_to_the_plain_walk(monkeypatch: pytest.MonkeyPatch) -> None:
    """What no member of the super summit set does ends in the plain walk, not in a wrong set."""
    monkeypatch.setattr(summit_kernel, "walk", lambda *_: summit_kernel.STRAYED)
    braid = Braid([1, 2, -3, 1, 1, -2], 4)
    found = compiled_summit.compiled_summit(braid, 50, never)
    assert isinstance(found, PlainSummit)
    assert seen(found) == seen(plain_summit(braid, 50))


@needs_compiler
@settings(max_examples=40)
@given(braids(max_strands=7, max_letters=10))
def test_a_process_that_asks_often_gets_the_same_classes(braid: Braid) -> None:
    """From some member on the compiled walk is taken, where there are tables: nothing changes."""
    before = conjugacy._members
    try:
        conjugacy._members = 0
        plain = conjugacy_class(braid, 40), list(iter_summit(braid, 40))
        assert conjugacy._members > 0
        conjugacy._members = 10**9
        is_by_loops = isinstance(conjugacy.find_summit(braid, 40), CompiledSummit)
        assert is_by_loops == (2 <= braid.strands <= 6)
        assert (conjugacy_class(braid, 40), list(iter_summit(braid, 40))) == plain
    finally:
        conjugacy._members = before


def test_without_a_compiler_the_plain_walk_is_taken(monkeypatch: pytest.MonkeyPatch) -> None:
    """However often a process asks."""
    monkeypatch.setattr(compiled_summit, "is_ready", lambda: False)
    monkeypatch.setattr(conjugacy, "_members", 10**9)
    assert isinstance(conjugacy.find_summit(Braid([1, 2, -1], 3), 40), PlainSummit)


@needs_compiler
def test_all_is_compiled_before_the_first_walk() -> None:
    """One signature for each loop, whatever it is given: an interrupt never meets the compiler."""
    assert compiled_summit.is_ready()
    for braid in iter_random_braids(40, seed=4):
        seen(compiled(braid))
    loops = (
        *(ranked_tables.fill_weighted, ranked_tables.fill_meets, ranked_tables.fill_residues),
        *(summit_kernel.read_letters, summit_kernel.slide, summit_kernel.walk),
        *(row_table.fill_slots, row_table.least_row),
    )
    assert [len(loop.signatures) for loop in loops] == [1] * len(loops)


SCRIPT = """
import sys
from braidsearch.normal_form.conjugacy import conjugacy_class, plain_summit
from braidsearch.words import Braid

conjugacy_class(Braid([1, -2, 3, 1, -2], 4))
print("numba" in sys.modules)
from braidsearch.normal_form.compiled_summit import compiled_summit, is_ready

print(is_ready())
for word in ([1, -2, 3, 1, -2], [1, 2, 3] * 3, [-1, -1, -3, 2, 2], [2, -1, 2, 3, 3, 1, -2]):
    found = compiled_summit(Braid(word, 4), 100, lambda: False)
    plain = plain_summit(Braid(word, 4), 100)
    assert list(found.iter_members()) == list(plain.iter_members())
    assert (found.least(), found.is_complete) == (plain.least(), plain.is_complete)
    print(found.size)
"""


def test_the_loops_hold_in_plain_reading() -> None:
    """A single class loads no compiler; switched off, the loops themselves find the same."""
    environment = {**os.environ, "NUMBA_DISABLE_JIT": "1", "PYTHONPATH": ":".join(sys.path)}
    result = subprocess.run(
        [sys.executable, "-c", SCRIPT], env=environment, capture_output=True, text=True, check=False
    )
    assert result.returncode == 0, result.stderr
    lines = result.stdout.split()
    assert lines[:2] == ["False", "False"]
    assert all(int(size) > 0 for size in lines[2:])
    assert len(lines) == 6
