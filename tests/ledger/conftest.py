"""The ledger that most tests look at, sorted once."""

import shutil
from pathlib import Path

import pytest

from tests.ledger.ledgers import MUTANTS, make_ledger


@pytest.fixture(scope="session")
def sorted_once(tmp_path_factory: pytest.TempPathFactory) -> Path:
    """The invented ledger, sorted also up to symmetry; not to be written in."""
    return make_ledger(
        tmp_path_factory.mktemp("ledgers") / "plants.ledger",
        up_to=("mirror", "reverse", "mirror-reverse"),
    )


@pytest.fixture
def plants(sorted_once: Path, tmp_path: Path) -> Path:
    """A copy of the invented ledger."""
    return Path(shutil.copy(sorted_once, tmp_path / "plants.ledger"))


@pytest.fixture(scope="session")
def wood_once(tmp_path_factory: pytest.TempPathFactory) -> Path:
    """The ledger of two mutants, sorted; not to be written in."""
    return make_ledger(tmp_path_factory.mktemp("ledgers") / "wood.ledger", MUTANTS)


@pytest.fixture
def wood(wood_once: Path, tmp_path: Path) -> Path:
    """A copy of the ledger of two mutants."""
    return Path(shutil.copy(wood_once, tmp_path / "wood.ledger"))
