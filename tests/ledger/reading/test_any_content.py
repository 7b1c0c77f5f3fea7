"""Whatever a file holds, the answer is entries, lines that say what is wrong, or one error."""

import random
import time
from pathlib import Path

import pytest
from hypothesis import given, settings
from hypothesis import strategies as st

from braidsearch.errors import InputError
from braidsearch.ledger.reading import iter_outcomes, read_entries
from tests.ledger.reading.catalogues import TREFOIL_CODE, write

SUFFIXES = (
    *(".csv", ".tsv", ".jsonl", ".ndjson", ".json", ".txt", ".braids", ""),
    *(".pd", ".gauss", ".dt", ".xyz", ".polygon"),
)
SAMPLES = (
    b'name,word,note\na,1 1 1,"x, ""y"""\nb,"pd: ' + TREFOIL_CODE.encode() + b'",\nc,4: 1,z\n',
    b'{"name": "a", "word": [1, 1, 1]}\n{"braid": {"strands": 3, "word": [-2]}, "note": "x"}\n',
    b'[{"name": "a", "pd": [[1,5,2,4],[3,1,4,6],[5,3,6,2]]},\n {"link": "dt: 4 6 2"}]',
    b"# rings\na = 1 1 1\n4: 1 2 3\nb = gauss: O1+ U2+ O3+ U1+ O2+ U3+  # last\n",
    b"O1+ U2+ O3+ U1+ O2+ U3+\n4 6 2\n1 -2 3 -1 2 -3\n",
    b"x,y,z\n0.0,0,0\n1,0,0\n0,1,0\n\n5,0,0.5\n6,0,0\n5,1,0\n",
)


@pytest.fixture(scope="module")
def folder(tmp_path_factory: pytest.TempPathFactory) -> Path:
    """One folder for all examples."""
    return tmp_path_factory.mktemp("contents")


def lines_of(path: Path) -> list[str]:
    """What is said of the file: its mistakes, or the error that ends the reading."""
    try:
        reading = read_entries(path)
    except InputError as error:
        return [str(error)]
    assert len(reading.entries) + reading.problem_count + reading.repeated > 0
    return list(map(str, reading.problems))


def check_answer(path: Path) -> None:
    """Every line is fit to be printed, and says what was expected."""
    for line in lines_of(path):
        assert line.isprintable()
        assert "expected" in line


@given(st.sampled_from(SUFFIXES), st.binary(max_size=60))
def test_any_bytes(folder: Path, suffix: str, content: bytes) -> None:
    """No other exception leaves."""
    check_answer(write(folder / f"any{suffix}", content))


@given(st.sampled_from(SUFFIXES), st.text(alphabet=' \n\t",;:=#[]{}-+0123456789aOUpd', max_size=40))
def test_any_text_of_the_signs_that_matter(folder: Path, suffix: str, content: str) -> None:
    """No other exception leaves, of texts that are nearly something."""
    check_answer(write(folder / f"near{suffix}", content))


@settings(max_examples=60)
@given(st.sampled_from(SUFFIXES), st.sampled_from(SAMPLES), st.randoms(use_true_random=False))
def test_damaged_catalogues(
    folder: Path, suffix: str, content: bytes, generator: random.Random
) -> None:
    """A byte changed, taken out or put in, or the end cut off."""
    damaged = bytearray(content)
    for _ in range(generator.randrange(3)):
        place = generator.randrange(len(damaged))
        piece = bytes([generator.choice(b'\n",;:=#[]{}-0123\xe9\0')])
        damaged[place : place + generator.randrange(2)] = piece * generator.randrange(2)
    cut = generator.choice([len(damaged), generator.randrange(len(damaged))])
    check_answer(write(folder / f"damaged{suffix}", bytes(damaged[:cut])))


@pytest.mark.parametrize("suffix", [".csv", ".jsonl", ".txt"])
def test_time_goes_with_the_rows(folder: Path, suffix: str) -> None:
    """Twenty thousand words take a fraction of a second of the processor, none of it quadratic."""
    line = {".csv": "{},{}\n", ".jsonl": '{{"name": "{}", "word": "{}"}}\n', ".txt": "{} = {}\n"}
    title = "name,word\n" if suffix == ".csv" else ""
    rows = [line[suffix].format(f"ring {n}", "1 -2 3 -1 2 -3 1 2 3 -1") for n in range(20_000)]
    path = write(folder / f"many{suffix}", title + "".join(rows))
    begin = time.process_time()
    assert sum(1 for _ in iter_outcomes(path)) == len(rows)
    assert time.process_time() - begin < 2
