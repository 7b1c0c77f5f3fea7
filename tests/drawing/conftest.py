"""One browser for all tests that look with it, since it takes a while to start."""

from collections.abc import Iterator

import pytest

from tests.drawing.browser import CHROMIUM, DrivenBrowser


@pytest.fixture(scope="session")
def browser(tmp_path_factory: pytest.TempPathFactory) -> Iterator[DrivenBrowser]:
    """A running browser; where there is none, the test is skipped."""
    if CHROMIUM is None:
        pytest.skip("there is no chromium here to look with")
    with DrivenBrowser(tmp_path_factory.mktemp("profile")) as driven:
        yield driven
