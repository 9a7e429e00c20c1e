"""Where the demo works lie: an invented works with its catalogue and its briefs."""

from typing import TYPE_CHECKING

if TYPE_CHECKING:
    from pathlib import Path

DEMO_BRIEF = "briefs/jar-lids.toml"
"""The brief to begin with, within the folder."""


def demo_folder() -> "Path":
    """The folder of the demo works: within the installed package, or beside it in a checkout."""
    from pathlib import Path

    package = Path(__file__).resolve().parent
    installed = package / "catalogs_demo"
    return installed if installed.is_dir() else package.parent / "catalogs_demo"
