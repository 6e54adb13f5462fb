"""Installed from a wheel, everything is found that the source tree holds; and the same from the tree itself."""

from __future__ import annotations

import json
import os
import subprocess
import sys
import sysconfig
import zipfile
from collections.abc import Sequence
from pathlib import Path

import pytest

ROOT = Path(__file__).parent.parent
_FOUND = """
import json
from importlib import resources
from importlib.metadata import entry_points
import calcpack
from calcpack import fonts, validation
from calcpack.package import templates
print(json.dumps({
    "package": calcpack.__file__,
    "templates": str(templates.folder()),
    "cases": len(validation.run()),
    "holds": all(case.holds for case in validation.run()),
    "fonts": len(list(fonts.folder().iterdir())),
    "starter": sorted(item.name for item in (resources.files("calcpack.job") / "starter").iterdir()),
    "exporters": sorted(point.name for point in entry_points(group="nbconvert.exporters") if "calcpack" in point.name),
}))
"""
FRONT = ("conf.json", "sheet.html.j2", "package.html.j2", "style.css")


def run(command: Sequence[object], cwd: Path, **environment: str) -> str:
    clean = {name: value for name, value in os.environ.items() if name not in ("PYTHONPATH", "PYTHONHOME")}
    done = subprocess.run(
        [str(part) for part in command], cwd=cwd, env={**clean, **environment}, capture_output=True, text=True,
        timeout=180, check=False,
    )  # fmt: skip
    assert done.returncode == 0, done.stdout + done.stderr
    return done.stdout


@pytest.fixture(scope="module")
def wheel(tmp_path_factory: pytest.TempPathFactory) -> Path:
    folder = tmp_path_factory.mktemp("wheel")
    run([sys.executable, "-m", "pip", "wheel", ROOT, "--no-deps", "-q", "-w", folder], folder)
    (found,) = folder.glob("calcpack-*.whl")
    return found


@pytest.fixture(scope="module")
def python(wheel: Path, tmp_path_factory: pytest.TempPathFactory) -> Path:
    """The Python of a new environment that holds the wheel, and sees the libraries of this one but not the tree."""
    import venv

    folder = tmp_path_factory.mktemp("venv")
    venv.create(folder, with_pip=False, symlinks=True)
    python = folder / "bin" / "python"
    site = Path(run([python, "-c", "import sysconfig; print(sysconfig.get_paths()['purelib'])"], folder).strip())
    run([sys.executable, "-m", "pip", "--python", python, "install", "--no-deps", "--no-index", "-q", wheel], folder)
    # Behind the wheel on the path, and without the tree that this environment is installed from.
    (site / "libraries.pth").write_text(f"{sysconfig.get_paths()['purelib']}\n", "utf-8")
    return python


@pytest.mark.slow
def test_a_wheel_holds_templates_cases_fonts_and_starter(wheel: Path) -> None:
    names = set(zipfile.ZipFile(wheel).namelist())
    for name in FRONT:
        assert f"calcpack/_report_templates/calcpack_html/{name}" in names
        assert any(other.endswith(f"share/jupyter/nbconvert/templates/calcpack_html/{name}") for other in names)
    assert "calcpack/_report_templates/calcpack_typst/house.typ" in names
    assert {"calcpack/job/starter/job.toml", "calcpack/job/starter/inputs/anchorage.csv", "calcpack/units.txt"} <= names
    assert any(name.startswith("calcpack/_published/") for name in names)
    assert any(name.startswith("calcpack/fonts/") and name.endswith((".ttf", ".otf")) for name in names)
    assert not any("__pycache__" in name or name.startswith(("tests/", "demo_project/")) for name in names)
    assert any(name.endswith("licenses/LICENSE") for name in names)


@pytest.mark.slow
@pytest.mark.parametrize("installed", ["wheel", "editable"])
def test_everything_is_found(installed: str, request: pytest.FixtureRequest, tmp_path: Path) -> None:
    python = request.getfixturevalue("python") if installed == "wheel" else sys.executable
    found = json.loads(run([python, "-c", _FOUND], tmp_path))
    inside = "site-packages" in found["package"]
    assert inside == (installed == "wheel")
    assert Path(found["templates"]).name == ("_report_templates" if installed == "wheel" else "report_templates")
    assert found["cases"] > 5
    assert found["holds"]
    assert found["fonts"] >= 3
    assert found["starter"] == ["inputs", "job.toml", "sheets"]
    assert found["exporters"] == ["calcpack_html", "calcpack_typst"]


@pytest.mark.slow
def test_a_job_is_started_and_drafted_from_a_wheel(python: Path, tmp_path: Path) -> None:
    command = python.with_name("calcpack")
    run([command, "start", "job"], tmp_path)
    assert "draft written: " in run([command, "draft", "job"], tmp_path)
    assert (tmp_path / "job" / "draft" / "package.pdf").stat().st_size > 10_000
    run([command, "validation"], tmp_path)
    # Its notebook alone, through nbconvert: the exporter and its templates are found by name.
    (sheet,) = (tmp_path / "job" / "sheets").glob("*.ipynb")
    environment = {
        "JUPYTER_PREFER_ENV_PATH": "1",
        "JUPYTER_CONFIG_DIR": str(tmp_path),
        "JUPYTER_DATA_DIR": str(tmp_path),
    }
    run([python, "-m", "nbconvert", "--to", "calcpack_html", sheet, "--output-dir", tmp_path], tmp_path, **environment)
    assert (tmp_path / f"{sheet.stem}.html").is_file()


@pytest.mark.slow
def test_nbconvert_finds_the_exporter_of_the_tree(tmp_path: Path) -> None:
    (sheet,) = (ROOT / "calcpack" / "job" / "starter" / "sheets").glob("*.ipynb")
    command = [sys.executable, "-m", "nbconvert", "--to", "calcpack_html", sheet, "--output-dir", tmp_path]
    run(command, tmp_path)
    page = (tmp_path / f"{sheet.stem}.html").read_text("utf-8")
    assert page.lstrip().startswith("<!DOCTYPE html>")
    assert 'class="sheet alone"' in page
