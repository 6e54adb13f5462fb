from __future__ import annotations

from collections.abc import Iterator
from pathlib import Path

import pytest

from calcpack.package import templates


@pytest.fixture(autouse=True)
def fresh() -> Iterator[None]:
    templates.folder.cache_clear()
    yield
    templates.folder.cache_clear()


def templates_at(folder: Path) -> Path:
    (folder / "calcpack_html").mkdir(parents=True)
    (folder / "calcpack_html" / "conf.json").write_text("{}")
    return folder


def test_the_source_tree_holds_both_kinds() -> None:
    names = {path.name for path in templates.folder().iterdir()}
    assert names >= {"calcpack_html", "calcpack_typst"}
    assert "#let givens(" in templates.read("calcpack_typst/house.typ")


def test_beside_the_package_when_it_holds_none(tmp_path: Path, monkeypatch: pytest.MonkeyPatch) -> None:
    beside = templates_at(tmp_path / "report_templates")
    monkeypatch.setattr(templates, "_PACKAGE", tmp_path / "calcpack")
    assert templates.folder() == beside


def test_inside_the_package_comes_first(tmp_path: Path, monkeypatch: pytest.MonkeyPatch) -> None:
    templates_at(tmp_path / "report_templates")
    inside = templates_at(tmp_path / "calcpack" / "_report_templates")
    monkeypatch.setattr(templates, "_PACKAGE", tmp_path / "calcpack")
    assert templates.folder() == inside


def test_an_installation_without_templates_says_so(tmp_path: Path, monkeypatch: pytest.MonkeyPatch) -> None:
    monkeypatch.setattr(templates, "_PACKAGE", tmp_path / "calcpack")
    with pytest.raises(FileNotFoundError, match=r"no templates in .*_report_templates: install calcpack again"):
        templates.folder()
