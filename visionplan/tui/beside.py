"""The catalogue that lies with a brief."""

from pathlib import Path

from visionplan.demo import demo_folder


def beside(brief: str) -> str:
    """The catalogue that lies with a brief, in its folder or the one above; "" for none."""
    folder = Path(brief).absolute().parent
    for candidate in (folder, folder.parent):
        if all((candidate / file).is_file() for file in ("lenses.csv", "cameras.csv")):
            return "" if candidate == demo_folder() else str(candidate)
    return ""
