"""The fixture that runs commands."""

import pytest

from tests.command_line.running import Runner


@pytest.fixture
def run(capsys: pytest.CaptureFixture[str]) -> Runner:
    """Runs a command line in this process."""
    return Runner(capsys)
