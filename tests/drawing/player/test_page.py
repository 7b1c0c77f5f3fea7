"""The page of a proof as a file: whole, closed to the outside, with every stage inside."""

import base64
import hashlib
import json
import re
from html.parser import HTMLParser
from typing import Any

import pytest

from braidsearch.certificates import Certificate, Distinction, read_certificate
from braidsearch.drawing.player import draw_proof_page
from braidsearch.drawing.player.page import SCRIPTS
from braidsearch.errors import InputError
from braidsearch.moves import Conjugate, Destabilize, MoveChain, Rewrite, Stabilize
from braidsearch.words import Braid
from tests.architecture.source import PACKAGE
from tests.certificates.test_file_format import DIFFERENT, SAME
from tests.drawing.player.proofs import FILES, RELATIONS, accepted, random_proof

VOID = {"meta", "input", "path", "rect", "br"}


class Elements(HTMLParser):
    """All elements of a page with their attributes, what their text is, and the open ones."""

    def __init__(self, page: str) -> None:
        super().__init__()
        self.found: list[tuple[str, dict[str, str | None]]] = []
        self.texts: dict[str, list[str]] = {}
        self.open: list[str] = []
        self.feed(page)
        self.close()

    def handle_starttag(self, tag: str, attrs: list[tuple[str, str | None]]) -> None:
        self.found.append((tag, dict(attrs)))
        if tag not in VOID:
            self.open.append(tag)

    def handle_startendtag(self, tag: str, attrs: list[tuple[str, str | None]]) -> None:
        self.found.append((tag, dict(attrs)))

    def handle_endtag(self, tag: str) -> None:
        assert self.open.pop() == tag

    def handle_data(self, data: str) -> None:
        if self.open:
            self.texts.setdefault(self.open[-1], []).append(data)


def data_of(page: str) -> Any:
    """What the page's script is given."""
    found = re.search(r'<script type="application/json" id="proof">(.*?)</script>', page)
    assert found
    return json.loads(found[1])


@pytest.mark.parametrize("file", FILES, ids=lambda file: file.stem)
def test_every_accepted_certificate_has_a_page(file: Any) -> None:
    """Elements are closed in order, ids are unique, there is one heading of the first rank, and as
    many steps in the list as there are moves.
    """
    certificate = read_certificate(file)
    elements = Elements(draw_proof_page(certificate))
    assert elements.open == []
    ids = [attributes["id"] for _, attributes in elements.found if "id" in attributes]
    assert len(set(ids)) == len(ids)
    tags = [tag for tag, _ in elements.found]
    assert tags.count("h1") == 1
    moves = len(certificate.moves) + sum(
        len(each.left_moves) + len(each.right_moves) for each in certificate.distinctions
    )
    steps = [each for tag, each in elements.found if tag == "li" and each.get("class") == "step"]
    assert len(steps) == moves
    assert ("html", {"lang": "en"}) in elements.found


@pytest.mark.parametrize("certificate", [SAME, DIFFERENT, RELATIONS])
def test_nothing_is_fetched(certificate: Certificate) -> None:
    """No element and no style names anything outside the file; the only address is the name of the
    SVG namespace.
    """
    page = draw_proof_page(certificate)
    elements = Elements(page)
    for tag, attributes in elements.found:
        assert tag not in {"link", "iframe", "img", "object", "embed", "base"}
        assert not {"src", "href", "srcset", "action", "style"} & set(attributes)
        assert not any(name.startswith("on") for name in attributes)
    assert set(re.findall(r"[a-z]+://[^\s\"'<>]*", page)) <= {"http://www.w3.org/2000/svg"}
    assert not re.search(r"url\((?!#)|@import|import\(|fetch\(|XMLHttp|eval\(|innerHTML", page)


def test_the_policy_lets_in_what_stands_inside_alone() -> None:
    """The policy forbids all but the style and the script with the digests of those inside."""
    page = draw_proof_page(SAME)
    found = re.search(r'Content-Security-Policy" content="([^"]*)"', page)
    assert found
    policy = dict(part.split(" ", 1) for part in found[1].split("; "))
    assert policy["default-src"] == policy["base-uri"] == policy["form-action"] == "'none'"
    for name, element in (("style-src", "style"), ("script-src", "script")):
        texts = re.findall(rf"<{element}>(.*?)</{element}>", page, re.DOTALL)
        assert len(texts) == 1
        digest = base64.b64encode(hashlib.sha256(texts[0].encode()).digest()).decode()
        assert policy[name] == f"'sha256-{digest}'"


def test_all_parts_of_the_script_are_used_and_plain() -> None:
    """Each script in the folder is in the page, and every one is ASCII."""
    folder = PACKAGE / "drawing" / "player" / "page"
    assert {file.name for file in folder.glob("*.js")} == set(SCRIPTS)
    page = draw_proof_page(SAME)
    assert page.isascii()
    for name in SCRIPTS:
        assert (folder / name).read_text(encoding="utf-8").strip() in page


def test_the_same_certificate_gives_the_same_page() -> None:
    """Byte for byte."""
    proof = random_proof(3, 12)
    assert draw_proof_page(proof) == draw_proof_page(proof)


def test_hostile_names_stay_text() -> None:
    """What a certificate names, a name that looks like markup too, becomes no element."""
    hostile = "</script><script>alert(1)</script><img src=x onerror=alert(1)>"
    item = DIFFERENT.distinctions[0]
    certificate = Certificate.different(
        DIFFERENT.left,
        DIFFERENT.right,
        [Distinction(item.symmetry, hostile, {hostile: hostile}, [], [], hostile, hostile)],
    )
    plain, page = draw_proof_page(DIFFERENT), draw_proof_page(certificate)
    assert [tag for tag, _ in Elements(page).found if tag in {"script", "img"}] == ["script"] * 3
    assert page.count("<script") == plain.count("<script")
    assert hostile in "".join(Elements(page).texts["td"])


def test_values_are_seen_on_both_sides() -> None:
    """A difference shows both values, powers raised."""
    page = draw_proof_page(DIFFERENT)
    assert "t + t<sup>3</sup> &#8722; t<sup>4</sup>" in page
    assert "&#8722;t<sup>&#8722;4</sup> + t<sup>&#8722;3</sup> + t<sup>&#8722;1</sup>" in page
    scene = data_of(page)["scenes"][0]
    assert [lane["name"] for lane in scene["lanes"]] == ["LEFT", "RIGHT"]


def test_without_scripts_there_is_a_still_proof() -> None:
    """The claim, the steps in words, and a sheet of pictures stand in the file itself."""
    page = draw_proof_page(SAME)
    noscript = page.split("<noscript>")[1].split("</noscript>")[0]
    assert noscript.count("<svg") == 1
    assert "LEFT" in Elements(page).texts["p"][0]
    assert "Add strand 3 with the letter 2" in page


@pytest.mark.parametrize(
    "move",
    [
        Rewrite((1, 1, 5)),
        Stabilize(1, 3, (1, 1, 2)),
        Stabilize(1, 4, (1, 1, 1, 2)),
        Destabilize(1, 1, (1,)),
    ],
)
def test_moves_that_state_no_stage_are_refused(move: Any) -> None:
    """Letters outside the group, and strands that come without their letter."""
    with pytest.raises(InputError, match="move 1 of the proof: "):
        draw_proof_page(Certificate.same(Braid([1, 1, 1]), Braid([1]), "identity", [move]))


def test_false_moves_are_drawn_all_the_same() -> None:
    """Whether a rewriting holds is for the verifier: the page shows what is stated."""
    for move in (Rewrite((1, 1)), Conjugate((1,), (1,)), Conjugate((4,), (1, 1, -1))):
        page = draw_proof_page(Certificate.same(Braid([1, 1, 1]), Braid([1]), "identity", [move]))
        (step,) = data_of(page)["scenes"][0]["lanes"][0]["steps"]
        assert [part[:2] for part in step["parts"]] == [["rewriting", list(move.word)]]


def test_long_proofs_stay_small() -> None:
    """Ten thousand moves on words of about twelve letters: a page of less than four megabytes."""
    chain = MoveChain(Braid([1, 2, -3, 2, 1, -2, 3, 3, 1, -2], 4), is_checked=False)
    for number in range(10_000):
        word = chain.current.word
        if number % 4 == 0:
            chain.append(Conjugate(word[:1], word[1:] + word[:1]))
        elif number % 4 == 1:
            chain.append(Rewrite((2, -2, *word)))
        elif number % 4 == 2:
            chain.append(Rewrite(word[2:]))
        else:
            chain.append(Conjugate(word[:3], word[3:] + word[:3]))
    proof = Certificate.same(chain.start, chain.current, "identity", chain.moves)
    page = draw_proof_page(proof)
    assert len(page) < 4_000_000
    assert len(data_of(page)["scenes"][0]["lanes"][0]["steps"]) == 10_000


def test_pages_differ_where_certificates_do() -> None:
    """A proof of sameness has one scene, a difference one for each symmetry."""
    different = accepted("different-for-all-symmetries")
    assert len(data_of(draw_proof_page(different))["scenes"]) == 4
    assert len(data_of(draw_proof_page(SAME))["scenes"]) == 1
