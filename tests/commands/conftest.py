import pytest

from visionplan.cli import run
from visionplan.demo import demo_folder

BRIEF = """\
[scene]
field = ["120 mm", "90 mm"]
feature = "0.5 mm"
[station]
working_distance = ["250 mm", "450 mm"]
"""


class Command:
    """Runs a command in this process."""

    def __init__(self, capfd, folder):
        self.capfd, self.folder = capfd, folder
        self.demo = demo_folder()
        self.jar_lids = str(self.demo / "briefs" / "jar-lids.toml")

    def __call__(self, *arguments):
        """Exit status, standard output and standard error."""
        self.capfd.readouterr()
        status = run([str(argument) for argument in arguments])
        return status, *self.capfd.readouterr()

    def rows(self, item):
        """How many rows one of the demo's files has: its lines, less the heading."""
        return len((self.demo / f"{item}.csv").read_text(encoding="utf-8").splitlines()) - 1

    def brief(self, text=BRIEF, name="brief.toml"):
        """A file with a brief."""
        path = self.folder / name
        path.write_bytes(text if isinstance(text, bytes) else text.encode())
        return str(path)

    def refused(self, *arguments):
        """What standard error says of bad input or usage."""
        status, out, err = self(*arguments)
        assert (status, out) == (2, "")
        assert "Traceback" not in err
        assert err.endswith("\n")
        return err


@pytest.fixture
def command(capfd, tmp_path, monkeypatch):
    monkeypatch.chdir(tmp_path)
    monkeypatch.delenv("COLUMNS", raising=False)
    return Command(capfd, tmp_path)
