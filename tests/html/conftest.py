import pytest

from tests.html.browser import browser


@pytest.fixture(scope="session")
def chromium(tmp_path_factory):
    """Yield one browser for all pages."""
    with browser(tmp_path_factory.mktemp("profile")) as found:
        yield found
