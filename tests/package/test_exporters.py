from __future__ import annotations

import io
import json
import os
import subprocess
import sys
from pathlib import Path
from typing import Any

import nbformat
import pypdf
import pytest
import typst
from nbconvert.exporters import get_exporter
from nbformat import v4
from package_samples import NASTY, Parsed, columns_sheet, model, squeezed

from calcpack import fonts
from calcpack.package import templates
from calcpack.package.exporters import CalcpackHtml, CalcpackTypst, fragments
from calcpack.package.front import front


def compiled(source: str) -> pypdf.PdfReader:
    pdf = typst.compile(
        source.encode(),
        font_paths=[str(fonts.folder())],
        ignore_system_fonts=True,
        format="pdf",
        pdf_standards=["a-3a", "ua-1"],
        timestamp=0,
    )
    return pypdf.PdfReader(io.BytesIO(pdf))


def words(reader: pypdf.PdfReader) -> str:
    return squeezed("".join(page.extract_text() for page in reader.pages))


@pytest.mark.parametrize(("name", "exporter"), [("calcpack_html", CalcpackHtml), ("calcpack_typst", CalcpackTypst)])
def test_nbconvert_knows_the_exporters(name: str, exporter: type) -> None:
    assert get_exporter(name) is exporter


def test_a_sheet_alone_as_html(sheets: list[Any]) -> None:
    html, resources = CalcpackHtml(isolated=True).from_notebook_node(sheets[0])
    page = Parsed(html)
    assert resources["output_extension"] == ".html"
    assert page.elements[0][0] == "html"
    assert "C-01 Columns, levels 1 to 3" in " ".join(page.text.split())
    assert page.values("id").count("C-01:P_o") == 1
    assert "#C-01:P_o" in page.values("href")


def test_a_sheet_alone_as_typst_compiles_to_an_accessible_page(sheets: list[Any]) -> None:
    source, resources = CalcpackTypst(isolated=True).from_notebook_node(sheets[0])
    reader = compiled(source)
    assert resources["output_extension"] == ".typ"
    assert reader.metadata is not None
    assert reader.metadata.title == "C-01 Columns, levels 1 to 3"
    assert "C3carriesitsload" in words(reader)


@pytest.mark.parametrize("exporter", [CalcpackHtml, CalcpackTypst])
def test_a_notebook_without_a_sheet_is_still_a_document(exporter: type) -> None:
    nb = v4.new_notebook(cells=[v4.new_markdown_cell("words"), v4.new_code_cell("1 + 1")])
    source, _ = exporter(isolated=True).from_notebook_node(nb, resources={"metadata": {"name": 'a "b" <c>'}})
    assert "words" in source
    assert "1 + 1" not in source
    if exporter is CalcpackTypst:
        assert "words" in words(compiled(source))


def test_fragments_link_across_the_package(sheets: list[Any]) -> None:
    view = front(model(sheets), "html", ())
    view["places"] = {"C-01": "sheet 1 of 2", "A-03": "sheet 2 of 2"}
    first, second = fragments(sheets, "html", view)
    assert first.lstrip().startswith("<section")
    assert 'href="#C-01:f_c"' in second
    assert "sheet 2 of 2" in second


def test_a_fragment_of_typst_leans_on_the_house_file(sheets: list[Any]) -> None:
    first, _ = fragments(sheets, "typst", {})
    assert first.lstrip().startswith('#import "/house.typ": *')
    assert "#let" not in first


def test_texts_stay_texts(job: Path, monkeypatch: pytest.MonkeyPatch) -> None:
    nb = columns_sheet(job, monkeypatch, lambda text: f"{text} {NASTY}")
    page = Parsed(CalcpackHtml(isolated=True).from_notebook_node(nb)[0])
    assert "script" not in {tag for tag, _ in page.elements}
    assert squeezed(page.text).count(squeezed(NASTY)) >= 15
    shown = words(compiled(CalcpackTypst(isolated=True).from_notebook_node(nb)[0]))
    assert shown.count(squeezed(NASTY)) >= 15


def test_a_firm_replaces_a_named_block(tmp_path: Path, sheets: list[Any]) -> None:
    own = tmp_path / "own_typst"
    own.mkdir()
    (own / "conf.json").write_text(json.dumps({"base_template": "calcpack_typst"}))
    (own / "index.typ.j2").write_text(
        "{% extends 'sheet.typ.j2' %}{% block sheet %}{{ super() }}#prose({{ 'a \"rule\"' }}){% endblock %}"
    )
    places = [str(tmp_path), str(templates.folder())]
    exporter = CalcpackTypst(template_name="own_typst", extra_template_basedirs=places)
    source, _ = exporter.from_notebook_node(sheets[0])
    assert source.count('#sheet-start("C-01"') == 1
    assert '#prose("a \\"rule\\"")' in source
    assert 'a"rule"' in words(compiled(source))


def test_a_template_of_this_machine_does_not_reach_a_package(
    tmp_path: Path, monkeypatch: pytest.MonkeyPatch, sheets: list[Any]
) -> None:
    before = fragments(sheets[:1], "typst", {})
    for base in (tmp_path, tmp_path / "nbconvert" / "templates"):
        (base / "calcpack_typst").mkdir(parents=True)
        (base / "calcpack_typst" / "index.typ.j2").write_text("foreign")
        (base / "calcpack_typst" / "conf.json").write_text("")
    monkeypatch.chdir(tmp_path)
    monkeypatch.setenv("JUPYTER_PATH", str(tmp_path))
    assert fragments(sheets[:1], "typst", {}) == before


@pytest.mark.slow
def test_the_command_line_of_nbconvert(tmp_path: Path, sheets: list[Any]) -> None:
    nbformat.write(sheets[0], tmp_path / "c01.ipynb")
    subprocess.run(
        [sys.executable, "-m", "nbconvert", "--to", "calcpack_html", "c01.ipynb"],
        cwd=tmp_path, check=True, capture_output=True, env={**os.environ, "JUPYTER_NO_CONFIG": "1"},
    )  # fmt: skip
    assert "<title>C-01 Columns, levels 1 to 3</title>" in (tmp_path / "c01.html").read_text("utf-8")
