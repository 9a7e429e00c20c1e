"""What a wheel holds."""

import zipfile

from tests.documents import ROOT


def test_the_demo_works_lie_within_the_package(tmp_path):
    from hatchling.builders.wheel import WheelBuilder

    (wheel,) = WheelBuilder(str(ROOT)).build(directory=str(tmp_path), versions=["standard"])
    with zipfile.ZipFile(wheel) as archive:
        names = {name for name in archive.namelist() if not name.endswith(("/", ".pyc"))}
    demo = {f"visionplan/{path.relative_to(ROOT)}" for path in (ROOT / "catalogs_demo").rglob("*") if path.is_file()}
    assert len(demo) > 3
    assert demo <= names
    modules = {str(path.relative_to(ROOT)) for path in (ROOT / "visionplan").rglob("*.py")}
    assert modules <= names
    assert not {name for name in names if name.startswith(("tests", ".venv"))}
