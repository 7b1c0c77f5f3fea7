"""The undisturbed ledger that the disturbed ones are held against."""

import pytest

from tests.ledger.robustness.ledgers import Life, live


@pytest.fixture(scope="session")
def life(tmp_path_factory: pytest.TempPathFactory) -> Life:
    """A ledger led through all its stages undisturbed."""
    return live(tmp_path_factory.mktemp("life"))
