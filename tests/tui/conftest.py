import pytest


@pytest.fixture(autouse=True)
def state_home(tmp_path, monkeypatch):
    """A state folder of the test's own."""
    home = tmp_path / "state"
    monkeypatch.setenv("XDG_STATE_HOME", str(home))
    return home / "visionplan"
