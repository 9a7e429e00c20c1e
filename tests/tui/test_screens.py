"""Every view as plain text at both sizes, against what was looked over."""

import pytest

from tests.tui.screens import SCREENS, file_of, taken


@pytest.mark.parametrize("name", SCREENS)
async def test_screen(name):
    assert await taken(name) == file_of(name).read_text(), "look it over, then: python -m tests.tui.screens"
