"""Sheets of proofs: every stage is there, marked where moves act, in colours that stay."""

import itertools
import random
import re
from collections import Counter
from pathlib import Path
from xml.etree import ElementTree

import pytest
from hypothesis import given, settings
from hypothesis import strategies as st

from braidsearch.certificates import Certificate, read_certificate
from braidsearch.drawing import DIRECTIONS, draw_proof
from braidsearch.drawing.changes import changed_letters
from braidsearch.errors import InputError
from braidsearch.moves import Conjugate, Destabilize, MoveChain, Rewrite, Stabilize
from braidsearch.search.driver import compare
from braidsearch.search.limits import SearchLimits
from braidsearch.search.tighten import tighten
from braidsearch.words import Braid, format_word
from tests.certificates.arbitrary import certificates, words
from tests.certificates.test_file_format import DIFFERENT, SAME
from tests.drawing.layout import do_overlap, is_inside, iter_rectangles, text_rectangles, view_box
from tests.drawing.svg_reader import SVG, Picture, read_picture
from tests.knot_tables import iter_knots, iter_links
from tests.scrambles import scramble
from tests.strategies import braids, move_chains

VERIFIER_CASES = [
    file
    for folder in ("accepted", "rejected")
    for file in sorted((Path(__file__).parents[1] / "verifier" / folder).glob("*.json"))
    if file.name != "expected.json"
]


LETTER_SIZE = 9.5


def certificate_of(chain: MoveChain) -> Certificate:
    return Certificate.same(chain.start, chain.current, "identity", chain.moves)


def check_marks(picture: Picture) -> None:
    """The edge of no mark comes near the letter of a crossing, inside or outside of it."""
    letters = [
        (content, (left - 2.5, top - 2.5, right + 2.5, bottom + 2.5))
        for (content, (left, top, right, bottom)), (_, _, size, _) in zip(
            text_rectangles(picture), picture.texts, strict=True
        )
        if size == LETTER_SIZE
    ]
    marks = [element for element in picture.root.iter(f"{SVG}rect") if "x" in element.attrib]
    for mark in marks:
        x, y, width, height = (float(mark.attrib[name]) for name in ("x", "y", "width", "height"))
        edges = (x, y, x + width, y + height)
        for content, room in letters:
            assert is_inside(room, edges) or not do_overlap(room, edges), content


def check_layout(picture: Picture) -> None:
    """Nothing is cut off, no two texts overlap, and marks keep clear of letters."""
    check_marks(picture)
    page = view_box(picture)
    assert all(is_inside(rectangle, page) for rectangle in iter_rectangles(picture))
    texts = sorted(text_rectangles(picture), key=lambda pair: pair[1][1])
    for place, (_, one) in enumerate(texts):
        near = itertools.takewhile(lambda pair: pair[1][1] < one[3], texts[place + 1 :])  # noqa: B023
        assert not any(do_overlap(one, other) for _, other in near)


def letter_names(picture: Picture) -> set[str]:
    return {text for text, *_ in picture.texts}


@given(move_chains(max_moves=6))
@settings(max_examples=50)
def test_every_stage_can_be_read(chain: MoveChain) -> None:
    """The words read from the strands, one stage after the other, are those of the proof."""
    picture = read_picture(draw_proof(certificate_of(chain)), is_turned=True)
    expected = chain.braids
    words = picture.letters()
    strands = [len(part) for part in picture.braid_runs()]
    assert [letter for word in words for letter in word] == [
        letter for braid in expected for letter in braid.word
    ]
    assert [count for count, _ in itertools.groupby(strands)] == [
        count for count, _ in itertools.groupby(braid.strands for braid in expected)
    ]
    check_layout(picture)


@given(move_chains(max_moves=6))
@settings(max_examples=50)
def test_colours_stay_with_their_components(chain: MoveChain) -> None:
    """Half the signed crossings between two colours are their linking number: in every stage it is
    the same, and so is the number of colours.
    """
    picture = read_picture(draw_proof(certificate_of(chain)), is_turned=True)
    starts = [picture.runs[part[0]].start.imag for part in picture.braid_runs()]
    lengths = [len(word) for word in picture.letters()]
    seen_in: dict[int, list[tuple[frozenset[object], int]]] = {}
    for seen in picture.crossings:
        above = [place for place, y in enumerate(starts) if y > seen.centre.imag]
        looks = frozenset({picture.runs[seen.under_before].look, picture.runs[seen.over].look})
        seen_in.setdefault(min(above), []).append((looks, seen.sign))
    stages: list[Counter[frozenset[object]]] = []
    parts = iter(range(len(lengths)))
    for braid in chain.braids:
        sums: Counter[frozenset[object]] = Counter()
        stages.append(sums)
        found, looks = 0, set()
        while not looks or found < len(braid):
            part = next(parts)
            looks |= {picture.runs[run].look for run in picture.braid_runs()[part]}
            found += lengths[part]
            for pair, sign in seen_in.get(part, []):
                sums[pair] += sign
        assert len(looks) == chain.start.components
    linking = [{pair: n for pair, n in sums.items() if n and len(pair) == 2} for sums in stages]
    assert all(each == linking[0] for each in linking)


@given(
    braids(max_strands=13, max_letters=12).flatmap(lambda start: move_chains(start, 4)),
    st.sampled_from(DIRECTIONS),
)
@settings(max_examples=50)
def test_marks_keep_clear_of_letters(chain: MoveChain, direction: str) -> None:
    """In every stage, also where letters have two digits and a sign."""
    check_layout(read_picture(draw_proof(certificate_of(chain), direction=direction)))


@given(move_chains(max_moves=8))
def test_a_move_keeps_what_is_not_marked(chain: MoveChain) -> None:
    """The letters outside the marks are the same before and after, in the same order."""
    for before, move in zip(chain.braids, chain.moves, strict=False):
        (first, last), (start, end) = changed_letters(before.word, move)
        assert before.word[:first] + before.word[last:] == move.word[:start] + move.word[end:]


@given(words, st.data())
def test_a_turned_word_is_marked_at_its_ends(word: tuple[int, ...], data: st.DataObject) -> None:
    """What a conjugation carries from one end to the other is marked, the shorter of two ways."""
    turn = data.draw(st.integers(0, len(word)))
    after = word[turn:] + word[:turn]
    by = word[:turn]
    (first, last), (start, end) = changed_letters(word, Conjugate(by, after))
    assert word[first:last] == after[start:end]
    assert last - first <= len(word) / 2
    assert after == word or {first, len(word) - last} >= {0}
    assert after == word or {start, len(word) - end} >= {0}


def test_moves_that_are_easy_to_see() -> None:
    """By hand: what each kind of move acts on, and what it makes."""
    assert changed_letters((1, 1), Stabilize(-1, 3, (1, 1, -2))) == ((0, 0), (2, 3))
    assert changed_letters((1, 1, -2), Destabilize(-1, 2, (1, 1))) == ((2, 3), (0, 0))
    assert changed_letters((3, 1, 2, 1), Rewrite((3, 2, 1, 2))) == ((1, 4), (1, 4))
    assert changed_letters((3, 1, -1, 2), Rewrite((3, 2))) == ((1, 3), (1, 1))
    assert changed_letters((1, 2, 2), Conjugate((1,), (2, 2, 1))) == ((0, 1), (2, 3))
    assert changed_letters((1, 2, 2), Conjugate((-2,), (2, 1, 2))) == ((2, 3), (0, 1))


def test_bands_and_frames_of_a_small_proof() -> None:
    """Stabilization frames its letter; the conjugation that follows bands what it changes."""
    picture = read_picture(draw_proof(SAME), is_turned=True)
    rectangles = [e for e in picture.root.iter(f"{SVG}rect") if "x" in e.attrib]
    frames = [e for e in rectangles if e.attrib["fill"] == "none"]
    assert (len(rectangles), len(frames)) == (3, 2)
    assert picture.letters() == [[1, 1, 1], [1, 1, 1, 2], [1, 2, 1, 2]]


def test_captions_say_what_the_certificate_says() -> None:
    """Claim, moves and values are on the sheet, and in its description with the words."""
    text = draw_proof(SAME)
    assert "1. add strand 3 with the letter 2: 1 1 1 2" in text
    assert "2. conjugate by 1: 1 2 1 2" in text
    assert "This is RIGHT, letter by letter." in text
    description = ElementTree.fromstring(text).find(f"{SVG}desc").text
    assert "Left: Word: 1 1 1. Right: Word: 1 2 1 2." in description
    text = draw_proof(DIFFERENT)
    lines = " ".join(element.text for element in ElementTree.fromstring(text).iter(f"{SVG}text"))
    assert "The closure of LEFT is not the closure of RIGHT, by the Jones polynomial." in lines
    assert "LEFT: t + t^3 - t^4" in text
    assert "RIGHT: -t^-4 + t^-3 + t^-1" in text


def test_long_proofs_are_shown_in_part() -> None:
    """The middle is left out and counted; all are shown when asked for."""
    word: tuple[int, ...] = (1, -2, 3, 3)
    moves = []
    for turn in range(99):
        word = word[1:] + word[:1]
        moves.append(Conjugate(((1, -2, 3, 3) * 25)[turn : turn + 1], word))
    proof = Certificate.same(Braid([1, -2, 3, 3]), Braid(word), "identity", moves)
    shown = read_picture(draw_proof(proof, most_stages=10), is_turned=True)
    assert len(shown.letters()) == 10
    assert "... 90 stages left out, which stand in the certificate" in letter_names(shown)
    assert any("99 moves" in text for text in letter_names(shown))
    assert len(read_picture(draw_proof(proof), is_turned=True).letters()) == 60
    whole = read_picture(draw_proof(proof, most_stages=None), is_turned=True)
    assert len(whole.letters()) == 100
    assert not any("left out" in text for text in letter_names(whole))
    with pytest.raises(InputError, match="1 stages: expected at least 2"):
        draw_proof(proof, most_stages=1)


def test_stages_that_are_too_large_are_named() -> None:
    """A braid beyond what a picture holds is a line of text; the others are drawn."""
    moves = [Rewrite((1, -1) * 1001), Rewrite(())]
    text = draw_proof(Certificate.same(Braid([], 2), Braid([], 2), "identity", moves))
    assert read_picture(text, is_turned=True).letters() == [[], []]
    assert text.count("(too large for this sheet, or not a braid)") == 1


@pytest.mark.parametrize("file", VERIFIER_CASES, ids=lambda file: f"{file.parent.name}-{file.stem}")
def test_every_certificate_of_the_verifier_is_drawn(file: Path) -> None:
    """True or false: what can be read is drawn, with both words in its description."""
    try:
        certificate = read_certificate(file)
    except InputError:
        pytest.skip("not a certificate that can be read")
    for direction in DIRECTIONS:
        text = draw_proof(certificate, direction=direction)
        picture = read_picture(text, is_turned=direction == "right")
        page = view_box(picture)
        assert all(is_inside(rectangle, page) for rectangle in iter_rectangles(picture))
        description = picture.root.find(f"{SVG}desc").text
        for braid in (certificate.left, certificate.right):
            assert f"Word: {format_word(braid)}." in description


@given(certificates, st.sampled_from(DIRECTIONS))
def test_any_well_formed_certificate_is_drawn(certificate: Certificate, direction: str) -> None:
    """Moves that no group has are lines of text: a picture is no proof, and never an exception."""
    text = draw_proof(certificate, direction=direction)
    check_layout(read_picture(text))
    assert text == draw_proof(certificate, direction=direction)
    assert re.search("<title[^>]*>Proof that two braids close to ", text)


def draw_comparison(left: Braid, right: Braid) -> bool:
    """Whether a certificate was found; if so its sheets are drawn and looked at."""
    verdict = compare(left, right, limits=SearchLimits(seconds=20, nodes=400))
    if verdict.certificate is None:
        return False
    for direction in DIRECTIONS:
        check_layout(read_picture(draw_proof(verdict.certificate, direction=direction)))
    return True


def test_proofs_of_the_search_are_drawn() -> None:
    """Proofs about the tables' words (KnotInfo, LinkInfo, package database-knotinfo)."""
    generator = random.Random(20)
    rows = [*iter_knots(7), *itertools.islice(iter_links(7), 6)]
    found = [draw_comparison(row.braid, scramble(row.braid, generator, 8, 1)) for row in rows[::3]]
    assert all(found)
    assert draw_comparison(rows[0].braid, rows[1].braid)
    check_layout(read_picture(draw_proof(tighten(Braid([1, 2, -1, 2, 3, 2])).certificate)))


@pytest.mark.slow
def test_two_hundred_proofs_are_drawn() -> None:
    """The same for 200 seeded pairs, knots and links, the same and different ones."""
    generator = random.Random(200)
    rows = [*iter_knots(9), *itertools.islice(iter_links(8), 100)]
    drawn = 0
    while drawn < 200:
        left = generator.choice(rows).braid
        other = left if generator.random() < 0.8 else generator.choice(rows).braid
        drawn += draw_comparison(left, scramble(other, generator, 12, 1))
