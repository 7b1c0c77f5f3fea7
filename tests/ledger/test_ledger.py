"""The ledger as scripts use it: adding, sorting, asking, proving, recording."""

import random
import textwrap
from concurrent.futures import ThreadPoolExecutor
from pathlib import Path

import pytest
from hypothesis import HealthCheck, given, settings
from hypothesis import strategies as st

from braidsearch import verify
from braidsearch.certificates import Certificate
from braidsearch.errors import InputError
from braidsearch.ledger.executors import open_executor
from braidsearch.ledger.ledger import AddSummary, Ledger
from braidsearch.ledger.reading import Entry
from braidsearch.search.driver import compare
from braidsearch.words import SYMMETRIES, Braid, parse_word
from tests.ledger.ledgers import (
    CLASSES,
    HOPF,
    LINKS,
    TREFOIL,
    TWINS,
    braid_entries,
    dump,
    entries_of,
    entry,
    make_ledger,
    partition,
)
from tests.scrambles import scramble
from tests.strategies import braids


def test_the_example_of_the_class_runs(tmp_path: Path, monkeypatch: pytest.MonkeyPatch) -> None:
    """What the docstring shows is so."""
    monkeypatch.chdir(tmp_path)
    example = textwrap.dedent((Ledger.__doc__ or "").rstrip().split("\n\n")[-1])
    *_, last = example.splitlines()
    assert last.endswith('# "same"')
    names = {"Ledger": Ledger, "Entry": Entry, "Braid": Braid}
    exec(example.replace("ledger.find(", "found = ledger.find("), names)
    assert names["found"] == "same"


def test_classes_are_the_oriented_links(sorted_once: Path) -> None:
    """Entries are in one class just when they are one oriented link."""
    assert partition(sorted_once) == tuple(sorted(CLASSES))


def test_adding_again_changes_nothing(plants: Path) -> None:
    """Entries that are there stay as they are, and are counted."""
    before = dump(plants)
    with Ledger(plants) as ledger:
        assert ledger.add(entries_of(LINKS)) == AddSummary(0, len(LINKS))
        assert ledger.sort().placed == 0
    assert dump(plants) == before


def test_all_entries_or_none(plants: Path) -> None:
    """A name that another link of its source has is refused, and all with it."""
    new = [entry("moss", "bench", "1 1 1 1"), entry("thistle", "bench", "1 1 1 1")]
    before = dump(plants)
    with Ledger(plants) as ledger:
        with pytest.raises(InputError, match="expected another name or source"):
            ledger.add(new)
        assert [one.name for one, _ in ledger.conflicts(new)] == ["thistle"]
        twice = [entry("moss", "x", "1"), entry("moss", "x", "1"), entry("moss", "x", "1 1")]
        assert [one.braid for one, _ in ledger.conflicts(twice)] == [Braid([1, 1])]
    assert dump(plants) == before


@pytest.mark.parametrize("name", ["a\nb", "a\x1b[31m", "x" * 300])
def test_names_that_cannot_be_shown_are_refused(tmp_path: Path, name: str) -> None:
    """Neither control characters nor endless names come into a ledger."""
    with Ledger(tmp_path / "a.ledger", create=True) as ledger:
        with pytest.raises(InputError, match="name"):
            ledger.add([entry(name, "", TREFOIL)])
        with pytest.raises(InputError, match="source"):
            ledger.add([entry("a", name, TREFOIL)])
        with pytest.raises(InputError, match="expected an entry with a name"):
            ledger.add([entry("", "", TREFOIL)])
        assert ledger.store.count("entries") == 0


def test_entries_are_named_in_three_ways(sorted_once: Path) -> None:
    """By name where it is the only one, by source/name, by number."""
    with Ledger(sorted_once) as ledger:
        yarrow = ledger.entry("yarrow")
        assert ledger.entry("bench/yarrow") == ledger.entry(f"#{yarrow.number}") == yarrow
        with pytest.raises(InputError, match="2 entries: expected one of bench/thistle, field/thi"):
            ledger.entry("thistle")
        for missing in ("moss", "#99", "#x", "bench/moss", "", "#", "\udcff", "#²", f"#{10**30}"):
            with pytest.raises(InputError, match="no such entry") as refused:
                ledger.entry(missing)
            assert str(refused.value).isprintable()
            assert not str(refused.value).startswith(":")
        with pytest.raises(InputError, match="is yarrow meant"):
            ledger.entry("yarow")


def test_every_pair_has_its_proof(sorted_once: Path, tmp_path: Path) -> None:
    """Of any two entries the ledger proves what the classes say, as one verified certificate."""
    with Ledger(sorted_once) as ledger:
        stored = ledger.store.entries()
        for one in stored:
            for other in stored:
                proof = ledger.proof(f"#{one.number}", f"#{other.number}")
                is_same = one.class_number == other.class_number
                assert proof.outcome == ("same" if is_same else "different")
                assert proof.certificate is not None
                assert verify(proof.certificate, left=one.braid, right=other.braid).valid


def test_proofs_up_to_symmetry(sorted_once: Path) -> None:
    """The trefoils of both hands are mirror images, the granny knot and the trefoil are not."""
    with Ledger(sorted_once) as ledger:
        found = ledger.proof("bench/thistle", "teasel", up_to=SYMMETRIES[1:])
        assert (found.outcome, found.symmetry) == ("same", "mirror")
        apart = ledger.proof("bench/thistle", "dock", up_to=SYMMETRIES[1:])
        assert apart.outcome == "different"
        assert apart.certificate is not None
        assert {item.symmetry for item in apart.certificate.distinctions} == set(SYMMETRIES)
        with pytest.raises(InputError, match="expected mirror"):
            ledger.proof("teasel", "dock", up_to=("sideways",))


def test_unsorted_entries_have_no_proof(plants: Path) -> None:
    """What is not sorted yet is said to be so."""
    with Ledger(plants) as ledger:
        ledger.add([entry("moss", "bench", "1 1 1 1")])
        with pytest.raises(InputError, match="moss: not sorted yet"):
            ledger.proof("moss", "teasel")
        assert ledger.report().unsorted == 1
        assert ledger.check().valid
        assert ledger.check().unsorted == 1


def test_links_of_one_fingerprint_are_told_apart(wood: Path) -> None:
    """Mutants share the fingerprint; the proof that they differ is stored with them."""
    with Ledger(wood) as ledger:
        assert len(ledger.report().classes) == 2
        assert ledger.store.count("fingerprints") == 1
        assert ledger.store.count("evidence", "verdict = 'different'") == 1
        assert ledger.proof("ash", "elm").outcome == "different"
        assert ledger.check().valid


@settings(max_examples=15, suppress_health_check=[HealthCheck.function_scoped_fixture])
@given(st.lists(braids(max_strands=3, max_letters=7), min_size=2, max_size=6), st.randoms())
def test_the_order_of_entry_makes_no_classes(
    tmp_path_factory: pytest.TempPathFactory, links: list[Braid], generator: random.Random
) -> None:
    """Sorting a list in any order gives the same partition, scrambles included."""
    scrambled = [scramble(braid, generator, 6, 1) for braid in links]
    entries = braid_entries([*links, *scrambled])
    shuffled = list(entries)
    generator.shuffle(shuffled)
    folder = tmp_path_factory.mktemp("orders")
    found = []
    for name, order in (("a", entries), ("b", shuffled)):
        with Ledger(folder / name, create=True) as ledger:
            ledger.add(order)
            ledger.sort()
        found.append(partition(folder / name))
    assert found[0] == found[1]
    home = {title: number for number, titles in enumerate(found[0]) for title in titles}
    for place in range(len(links)):
        assert home[f"drawn/b{place}"] == home[f"drawn/b{place + len(links)}"]


def random_entries(seed: int, count: int) -> list[Entry]:
    """Seeded braids of 2 to 4 strands, half of them scrambles of the others."""
    generator = random.Random(seed)
    links = []
    for _ in range(count // 2):
        strands = generator.randint(2, 4)
        letters = [letter for index in range(1, strands) for letter in (index, -index)]
        links.append(Braid(generator.choices(letters, k=generator.randint(3, 9)), strands))
    return braid_entries([*links, *(scramble(link, generator, 8, 1) for link in links)])


def test_any_executor_makes_the_same_ledger(tmp_path: Path) -> None:
    """Tasks that end in any order leave the same rows, the proofs to the letter."""
    entries = random_entries(7, 40)
    dumps = []
    executors = {
        "serial": lambda: open_executor(1),
        "threads": lambda: ThreadPoolExecutor(3),
        "processes": lambda: open_executor(2),
    }
    for name, make in executors.items():
        with make() as executor, Ledger(tmp_path / name, create=True) as ledger:
            ledger.add(entries)
            ledger.sort(up_to=("mirror",), executor=executor)
            assert ledger.check().valid
        dumps.append(dump(tmp_path / name))
    assert dumps[0] == dumps[1] == dumps[2]


def test_a_ledger_may_grow(tmp_path: Path) -> None:
    """Entries that come in two instalments end in the classes of one."""
    entries = random_entries(8, 30)
    for name, parts in (("once", [entries]), ("twice", [entries[:17], entries[17:]])):
        with Ledger(tmp_path / name, create=True) as ledger:
            for part in parts:
                ledger.add(part)
                ledger.sort()
    assert partition(tmp_path / "once") == partition(tmp_path / "twice")


def test_open_questions_keep_their_limits(tmp_path: Path) -> None:
    """Without nodes a search finds nothing; with more the question is asked again and settled."""
    path = make_ledger(tmp_path / "marsh.ledger", TWINS, nodes=0)
    with Ledger(path) as ledger:
        (question,) = ledger.report().open_questions
        assert (question.tried.nodes, question.symmetry) == (0, "identity")
        assert {question.left.name, question.right.name} == {"rush", "reed"}
        proof = ledger.proof("rush", "reed")
        assert (proof.outcome, proof.certificate, proof.question) == ("undecided", None, question)
        assert ledger.check().valid
        assert ledger.sort(nodes=0).retried == 0
        summary = ledger.sort(nodes=500)
        assert (summary.retried, summary.settled) == (1, 1)
        assert ledger.report().open_questions == ()
        assert ledger.proof("rush", "reed").outcome == "same"


def test_a_proof_found_elsewhere_joins_classes(tmp_path: Path) -> None:
    """A recorded certificate merges two classes, once; damaged ones are refused."""
    path = make_ledger(tmp_path / "marsh.ledger", TWINS, nodes=0)
    left, right = (parse_word(word) for _, _, word in TWINS)
    certificate = compare(left, right).certificate
    assert certificate is not None
    with Ledger(path) as ledger:
        false = Certificate.same(left, right, "identity", certificate.moves[:-1])
        with pytest.raises(InputError, match="the certificate does not hold"):
            ledger.record(false)
        assert ledger.record(certificate) == "it joins two classes"
        assert ledger.record(certificate) == "it is there already"
        assert partition(path) == (("marsh/reed", "marsh/rush"),)
        assert ledger.report().open_questions == ()
        assert ledger.check().valid


def test_a_proof_about_other_links_is_refused(sorted_once: Path) -> None:
    """The braids of a certificate must be in the ledger, and sorted."""
    certificate = compare(Braid([1, 1, 1, 1]), Braid([1, 1])).certificate
    assert certificate is not None
    with Ledger(sorted_once) as ledger:
        for take in (ledger.record, ledger.check_recordable):
            with pytest.raises(InputError, match="1 1 1 1: expected the braid of an entry"):
                take(certificate)


def test_a_recorded_mirror_image_makes_a_group(tmp_path: Path) -> None:
    """A proof up to symmetry leaves the classes apart, and groups them."""
    path = make_ledger(tmp_path / "hands.ledger", LINKS[:3])
    certificate = compare(Braid([1, 1, 1]), Braid([-1, -1, -1]), up_to=("mirror",)).certificate
    assert certificate is not None
    with Ledger(path) as ledger:
        assert len(ledger.report().groups) == 2
        assert ledger.record(certificate) == "it is kept as one more proof"
        report = ledger.report()
        assert (len(report.classes), len(report.groups)) == (2, 1)
        assert len(ledger.report(("reverse",)).groups) == 2


def test_a_proof_is_about_the_entries_given_whatever_they_are_called(tmp_path: Path) -> None:
    """An entry may have the number of another for its name."""
    with Ledger(tmp_path / "ledger", create=True) as ledger:
        ledger.add([entry("#2", "", TREFOIL), entry("#1", "", HOPF)])
        ledger.sort()
        first, second = ledger.store.entries()
        proof = ledger.proof(first, second)
        assert proof.certificate is not None
        assert (proof.certificate.left, proof.certificate.right) == (first.braid, second.braid)
