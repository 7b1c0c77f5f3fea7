"""The report of compare on a terminal: evidence cut so that it is seen, and what to type next."""

import re
from argparse import Namespace
from collections.abc import Mapping
from pathlib import Path
from typing import Any

import pytest
from hypothesis import assume, given, settings
from hypothesis import strategies as st

from braidsearch.certificates import Certificate, Distinction
from braidsearch.command_line.compare_steps import Question, further_limits
from braidsearch.command_line.compare_summary import show_difference, summarize_verdict
from braidsearch.command_line.terminal import Terminal
from braidsearch.search.driver import compare
from braidsearch.search.limits import SearchLimits
from braidsearch.search.verdict import Verdict
from braidsearch.words import Braid, format_word, parse_word
from tests.strategies import braids

TREFOIL, MIRROR_TREFOIL = Braid([1, 1, 1]), Braid([-1, -1, -1])
UNUSUAL = "\x1b]0;한.json"


def question(
    left: Braid = TREFOIL,
    right: Braid = MIRROR_TREFOIL,
    limits: SearchLimits | None = None,
    **changed: Any,
) -> Question:
    """What compare was asked, with some of the arguments changed."""
    usual = {"up_to": None, "output": None}
    typed = {"left": format_word(left), "right": format_word(right), **usual, **changed}
    return Question(left, right, Namespace(**typed), limits or SearchLimits())


def undecided(ending: str, nodes: int = 0, seconds: float = 1.0, *tried: str) -> Verdict:
    """A verdict of a search that ended so."""
    explored = {"nodes": nodes, "seconds": seconds, "ending": ending, "tried": list(tried)}
    return Verdict("undecided", None, "nothing was found", None, explored)


def summary(verdict: Verdict, asked: Question, columns: int = 79) -> list[str]:
    """The lines of the report without colour."""
    return summarize_verdict(verdict, asked, Terminal(columns)).splitlines()


@given(braids(3, 8), braids(3, 8), st.integers(39, 140), st.sampled_from([None, "p.json", UNUSUAL]))
def test_reports_fit_every_terminal(
    left: Braid, right: Braid, columns: int, output: str | None
) -> None:
    """No line is wider than the terminal, with colour the same lines, and the verdict comes first.

    Closed 3-braids are always decided (Birman, Menasco, 1993), so both verdicts with a certificate
    are met; of the undecided ones below.
    """
    verdict = compare(left, right, limits=SearchLimits(seconds=None, nodes=0))
    asked = question(left, right, output=output)
    lines = summary(verdict, asked, columns)
    assert max(map(len, lines)) <= columns
    assert lines[0].split()[:2] == [
        {"same": "=", "different": "≠"}[verdict.outcome],
        verdict.outcome,
    ]
    painted = summarize_verdict(verdict, asked, Terminal(columns, is_coloured=True))
    bare = re.sub("\x1b\\[[0-9;]*m", "", painted).splitlines()
    assert "\x1b" not in "".join(bare)
    first_step = next(at for at, line in enumerate(lines) if "certificate:" in line)
    assert bare[-(len(lines) - first_step) :] == lines[first_step:]
    assert max(map(len, bare)) <= columns


@pytest.mark.parametrize("columns", [39, 79, 119])
def test_undecided_reports_are_short(columns: int) -> None:
    """What was tried takes two lines for each kind, however many values agreed."""
    tried = [
        f"equal invariants, {symmetry}: {', '.join(f'invariant-{n}' for n in range(60))}"
        for symmetry in ("identity", "mirror", "reverse", "mirror-reverse")
    ]
    tried += ["search for moves, identity", "search for moves, mirror", *"abcdef"]
    lines = summary(undecided("node limit", 200_000, 50.0, *tried), question(), columns)
    assert max(map(len, lines)) <= columns
    text = " ".join(line.strip() for line in lines)
    assert "? undecided" in lines[0]
    assert text.count("equal invariants") == text.count("search for moves") == 1
    assert "equal invariants, identity, mirror, reverse, mirror-reverse:" in text
    assert "search for moves, identity, mirror" in text
    assert "and 4 more" in text
    assert len(lines) <= 20


def test_the_identity_alone_is_not_named() -> None:
    """Where no symmetric image was asked for, there is nothing to tell it from."""
    tried = ("equal invariants, identity: jones", "search for moves, identity", "x, mirror: y")
    lines = summary(undecided("node limit", 7, 1.0, *tried), question(), 79)
    assert {"equal invariants: jones", "search for moves", "x, mirror: y"} <= {
        line.strip() for line in lines
    }


POLYNOMIALS = st.lists(
    st.tuples(st.integers(-400, 400), st.integers(-999, 999).filter(bool)),
    min_size=1,
    max_size=60,
    unique_by=lambda term: term[0],
).map(lambda terms: tuple(sorted((2 * power, coefficient) for power, coefficient in terms)))


@settings(max_examples=60)
@given(POLYNOMIALS, POLYNOMIALS, st.integers(0, 60), st.integers(28, 110))
def test_values_are_cut_where_they_differ(left: Any, right: Any, shared: int, columns: int) -> None:
    """Polynomials that agree in so many terms: both fit, and what is shown of them differs."""
    right = (*left[:shared], *(term for term in right if term[0] > left[: shared + 1][-1][0]))
    assume(left != right)
    shown = show_difference(Distinction("identity", "jones", {}, (), (), left, right), columns)
    assert shown[0] != shown[1]
    assert max(map(len, shown)) <= columns


def test_values_are_left_whole_where_they_fit() -> None:
    """Those of the trefoils; of a pair that begins alike and is too long, whole terms."""
    (distinction,) = certificate_of(compare(TREFOIL, MIRROR_TREFOIL)).distinctions
    assert show_difference(distinction, 28) == ("t + t^3 - t^4", "-t^-4 + t^-3 + t^-1")
    left = tuple((2 * power, 7) for power in range(10, 40))
    right = (*left[:20], (80, -1))
    shown = show_difference(Distinction("identity", "jones", {}, (), (), left, right), 40)
    assert shown == ("... + 7 t^28 + 7 t^29 + 7 t^30 ...", "... + 7 t^28 + 7 t^29 - t^40")


def certificate_of(verdict: Verdict) -> Certificate:
    """The certificate, which there must be."""
    assert verdict.certificate is not None
    return verdict.certificate


def test_values_that_cannot_be_shown_to_differ_are_not_shown() -> None:
    """Two long lists that begin alike are not printed as if they were equal."""
    values = [(*range(300), last) for last in (1, 2)]
    distinction = Distinction("identity", "linking-sums", {}, (), (), *values)
    certificate = Certificate.different(TREFOIL, MIRROR_TREFOIL, [distinction])
    explored = {"nodes": 0, "seconds": 0.0, "ending": "found", "tried": []}
    lines = summary(Verdict("different", None, "told apart", certificate, explored), question())
    assert not [line for line in lines if "LEFT:" in line]
    assert "    the values are long, and begin alike: the certificate has them whole" in lines


def test_first_and_last_move_are_shown() -> None:
    """Of a chain its ends, of one move that, of equal words none.

    The word is Morton's (An irreducible 4-string braid with unknotted closure, 1983; mirror form,
    from memory).
    """
    left, right = parse_word("3 3 -2 3 -2 -1 -1 -1 2 -1 2"), parse_word("1:")
    verdict = compare(left, right)
    count = len(certificate_of(verdict).moves)
    lines = summary(verdict, question(left, right))
    assert lines[2] == f"  {count} moves lead from LEFT to RIGHT"
    assert re.match(" +1[.] ", lines[3])
    assert lines[4] == f"    {count}. take away strand 2 with the letter 1: (empty)"
    assert lines[5] == ""
    rotated = compare(parse_word("1 2"), parse_word("2 1"))
    assert len(certificate_of(rotated).moves) == 1
    assert sum(" 1. " in line for line in summary(rotated, question())) == 1
    equal = summary(compare(TREFOIL, TREFOIL), question())
    assert equal[2:4] == ["  LEFT and RIGHT are the same word", ""]


def test_each_image_has_its_invariant_where_they_are_not_all_the_same() -> None:
    """Mutants: one image is told apart by colourings, its mirror image by a polynomial.

    The two knots of 11 crossings share all polynomials (Conway, 1970; words from memory).
    """
    left = parse_word("-1 -1 2 -1 2 -1 3 -2 -2 3 3")
    right = parse_word("-1 -1 -1 -1 2 2 1 -3 2 2 -3 2 -3")
    lines = summary(compare(left, right, up_to=("mirror",)), question(left, right))
    at = lines.index("  from RIGHT: colourings")
    assert lines[at + 1].startswith("    LEFT:  728 colourings")
    assert lines[at + 2].startswith("    RIGHT: 392 colourings")
    assert lines[at + 3] == "  from its mirror: Jones polynomial"


def test_nothing_proposed_writes_over_a_file(
    tmp_path: Path, monkeypatch: pytest.MonkeyPatch
) -> None:
    """Where proof.json is there already, and after a certificate was written, names are new."""
    monkeypatch.chdir(tmp_path)
    (tmp_path / "proof.json").touch()
    (tmp_path / "mine.mirror.json").touch()
    verdict = compare(TREFOIL, MIRROR_TREFOIL)
    kept = "\n".join(summary(verdict, question(), 200))
    assert 'keep it: braidsearch compare "1 1 1" "-1 -1 -1" -o proof-2.json' in kept
    assert "--up-to mirror -o proof.mirror.json" in kept
    written = "\n".join(summary(verdict, question(output="mine.json"), 200))
    assert "certificate: mine.json" in written
    assert "--up-to mirror -o mine.mirror-2.json" in written
    assert "read it: braidsearch explain mine.json" in written


@pytest.mark.parametrize("typed", ["-", "pd: -", "pd: [[1,2],\n[3,4]]", "dt: " + "4 6 2 " * 200])
def test_links_that_cannot_be_typed_again_are_told_in_words(typed: str) -> None:
    """Standard input, line breaks and very long codes: the same command with more options."""
    limits = SearchLimits(seconds=5)
    given_so = Namespace(left=typed, right="1", up_to=None, output=None, seconds=5.0)
    asked = Question(TREFOIL, MIRROR_TREFOIL, given_so, limits)
    lines = summary(undecided("time limit", 9, 5.0), asked)
    assert lines[-1] == "  go on: the same command with --seconds 60 -o proof.json"


@pytest.mark.parametrize(
    ("limits", "ending", "spent", "further"),
    [
        ({}, "node limit", (200_000, 20.0), {"nodes": 2_000_000, "seconds": 200}),
        ({"nodes": 100}, "node limit", (100, 0.01), {}),
        ({"nodes": 0}, "node limit", (0, 1.0), {}),
        (
            {"nodes": 50_000, "seconds": None},
            "node limit",
            (50_000, 9.0),
            {"nodes": 500_000, "seconds": None},
        ),
        ({}, "time limit", (10, 60.0), {"seconds": 600}),
        ({}, "time limit", (150_000, 60.0), {"seconds": 600, "nodes": None}),
        ({"seconds": 1}, "time limit", (10, 1.0), {}),
        ({"seconds": 0}, "time limit", (0, 0.0), {}),
        ({"max_strands": 5}, "time limit", (10, 60.0), {"seconds": 600, "max_strands": 7}),
        ({"max_strands": 999, "seconds": 6}, "time limit", (1, 6.0), {"max_strands": 1000}),
        ({"seconds": 7}, "interrupted", (10, 3.0), {"seconds": 7}),
    ],
)
def test_further_search_raises_the_limit_that_was_reached(
    limits: Mapping[str, Any], ending: str, spent: tuple[int, float], further: Mapping[str, Any]
) -> None:
    """Tenfold, to the usual one at least, with room for it in the other limit."""
    explored = {"nodes": spent[0], "seconds": spent[1], "ending": ending}
    assert further_limits(SearchLimits(**limits), explored) == SearchLimits(**further)


def test_what_no_limit_ended_is_tightened_first() -> None:
    """Links too large for the search: the larger word is made smaller."""
    right = Braid([1] * 9)
    lines = summary(undecided("too large"), question(right=right))
    assert lines[-1] == '  go on: braidsearch tighten "1 1 1 1 1 1 1 1 1"'
    piped = Namespace(left="1 1 1", right="-", up_to=None, output="p.json")
    lines = summary(undecided("too large"), Question(TREFOIL, right, piped, SearchLimits()))
    assert lines[-2] == "  certificate: none, so p.json was not written"
    assert lines[-1] == "  go on: braidsearch tighten RIGHT, and compare what it finds"


def test_an_image_found_on_the_way_is_offered_before_a_longer_search() -> None:
    """Undecided, but the mirror image was met: the question with a sure answer comes first."""
    image = Certificate.same(TREFOIL, MIRROR_TREFOIL, "mirror", [])
    explored = {"nodes": 9, "seconds": 60.0, "ending": "time limit", "tried": []}
    verdict = Verdict("undecided", None, "nothing", None, explored, image=image)
    lines = summary(verdict, question(up_to=["reverse"]), 120)
    command = 'braidsearch compare "1 1 1" "-1 -1 -1"'
    assert lines[-2:] == [
        f"  prove the mirror: {command} --up-to mirror -o proof.mirror.json",
        f"  go on: {command} --up-to reverse --seconds 600 -o proof.json",
    ]
