"""A worked table as the page shows it: read by an independent reader, in HTML and in the PDF."""

from __future__ import annotations

import io
import re
import sys
from collections import Counter
from collections.abc import Iterator
from dataclasses import replace
from datetime import UTC, datetime
from pathlib import Path
from typing import Any
from xml.etree import ElementTree

import pypdf
import pytest
import typst
from package_samples import NASTY, Parsed, Recorder, job_folder, model, squeezed
from pypdf.generic import DictionaryObject

from calcpack import fonts
from calcpack.ledger import Ledger, replay
from calcpack.package.blocks import anchors, blocks, foreign_outputs
from calcpack.package.collect import collect
from calcpack.package.exporters import CalcpackHtml, CalcpackTypst
from calcpack.package.page import build_html
from calcpack.package.pdf import build_pdf
from calcpack.package.run import Executed
from calcpack.sheet import Sheet
from calcpack.tabulation import Column, Tabulation, Worked

sys.path.insert(0, str(Path(__file__).parents[1]))
sys.path.insert(0, str(Path(__file__).parents[1] / "typeset"))

import page_reading
from table_samples import BARS, GIVENS, running_rows, running_table, sheet_rows, state

WHEN = datetime(2026, 11, 20, 12, tzinfo=UTC)


def bars_sheet(root: Path, patch: Any, table: Tabulation = BARS, rows: int = 0) -> Any:
    """Sheet C-01 with the bars of the samples, or with `rows` of them."""
    recorder = Recorder(patch)
    sheet = Sheet("C-01", "Bars of a column", job=root)
    shared = state(sheet)
    if not rows:
        stated = sheet_rows(sheet, shared)
    else:
        c = shared["c"]
        depths = [Worked(f"c*{number + 1}/{rows}", {"c": c}) for number in range(rows)]
        stated = [(str(number), {"d_s": d, "A_b": shared["A_b"]}) for number, d in enumerate(depths, 1)]
    made = sheet.tabulate(table, stated, shared)
    sheet.note("The bars carry ", made.totals["F_s_sum"], ".")
    return recorder.notebook()


@pytest.fixture(scope="module")
def notebook(tmp_path_factory: pytest.TempPathFactory) -> Any:
    root = job_folder(tmp_path_factory.mktemp("bars") / "job")
    with pytest.MonkeyPatch.context() as patch:
        return bars_sheet(root, patch)


@pytest.fixture(scope="module")
def html(notebook: Any) -> str:
    return str(CalcpackHtml(isolated=True).from_notebook_node(notebook)[0])


CIRCLE = replace(
    BARS,
    columns=(
        Column("d_s", 3), Column("A_b", 2), Column("eps_s", 6), Column("f_s", 1, "ksi"), Column("F_s", 1),
        Column("M_Fx", 0, "kip*in"),
    ),
)  # fmt: skip


@pytest.fixture(scope="module")
def circle(tmp_path_factory: pytest.TempPathFactory) -> str:
    """Twelve bars on a circle, none at a round depth, as HTML."""
    root = job_folder(tmp_path_factory.mktemp("circle") / "job")
    with pytest.MonkeyPatch.context() as patch:
        recorder = Recorder(patch)
        sheet = Sheet("C-01", "Bars on a circle", job=root)
        stated = {**GIVENS, "c": "13.37 in", "h": "36 in", "D_s": "30.4 in", "A_b": "0.79 in^2", "f_y": "60 ksi"}
        shared = {symbol: sheet.given(symbol, value, source="S-201, rev 0") for symbol, value in stated.items()}
        used = {symbol: shared[symbol] for symbol in ("h", "D_s")}
        rows: list[Any] = [
            (str(number), {"d_s": Worked(f"h/2 - D_s/2*cos(2*pi*{number - 1}/12)", used), "A_b": shared["A_b"]})
            for number in range(1, 13)
        ]
        sheet.tabulate(CIRCLE, rows, shared)
        return str(CalcpackHtml(isolated=True).from_notebook_node(recorder.notebook())[0])


def compiled(notebook: Any) -> pypdf.PdfReader:
    source = CalcpackTypst(isolated=True).from_notebook_node(notebook)[0]
    pdf = typst.compile(
        source.encode(), font_paths=[str(fonts.folder())], ignore_system_fonts=True, format="pdf",
        pdf_standards=["a-3a", "ua-1"], timestamp=0,
    )  # fmt: skip
    return pypdf.PdfReader(io.BytesIO(pdf))


def part(html: str, name: str) -> ElementTree.Element:
    """The one element of that class, as a tree."""
    assert html.count(f'<div class="{name}">') == 1
    start = at = html.index(f'<div class="{name}">')
    depth = 0
    for found in re.finditer(r"<(/?)div\b", html[start:]):
        depth += -1 if found[1] else 1
        at = start + found.end()
        if not depth:
            break
    return ElementTree.fromstring(f"{html[start:at]}>".replace("<br>", "<br/>"))


def words(element: ElementTree.Element) -> str:
    return "".join(element.itertext()).strip()


def tokens(element: ElementTree.Element) -> list[page_reading.Token]:
    return page_reading.mathml("".join(ElementTree.tostring(child, "unicode") for child in element))


# The blocks


@pytest.mark.parametrize("target", ["html", "typst"])
def test_a_table_is_a_block_that_every_cell_can_be_found_in(notebook: Any, target: str) -> None:
    (block,) = [block for block in blocks(notebook, target) if block["kind"] == "tabulated"]
    assert [line["clause"] for line in block["lines"]] == ["22.2.1.2", "20.2.2.1", "", "", "statics", ""]
    assert {line["edition"] for line in block["lines"]} == {""}  # the sheet's own stands in its title block
    assert [line["opening"] for line in block["lines"]] == ["where"] * 6
    assert len(block["rows"]) == 6
    found = [cell["anchor"] for row in block["rows"] for cell in row["cells"]]
    assert found[6:9] == ["C-01:d_s.3", "", "C-01:eps_s.2"]
    assert block["rows"][0]["cells"][0]["link"] == "C-01:d_s"
    assert [cell["anchor"] for cell in block["totals"]] == ["", "", "", "", "C-01:F_s_sum", "C-01:M_Fx_sum"]
    assert foreign_outputs(notebook) == []


def test_links_lead_to_cells_and_totals(notebook: Any) -> None:
    found = anchors(notebook)
    assert {"C-01:eps_s", "C-01:F_s.6", "C-01:d_s.3", "C-01:F_s_sum"} <= found
    assert "" not in found
    (note,) = [block for block in blocks(notebook, "html") if block["kind"] == "note"]
    assert note["parts"][1]["link"] == "C-01:F_s_sum"


def test_another_edition_than_the_sheets_stands_beside_the_clause(notebook: Any) -> None:
    import copy

    changed = copy.deepcopy(notebook)
    for cell in changed.cells:
        for output in cell.outputs:
            for item in output["data"].values():
                if isinstance(item, dict) and item["type"] == "tabulated":
                    item["equations"][1]["edition"] = "ACI 318-14"
    (block,) = [block for block in blocks(changed, "html") if block["kind"] == "tabulated"]
    assert [(line["edition"], line["clause"]) for line in block["lines"]] == [
        ("", "22.2.1.2"), ("ACI 318-14", "20.2.2.1"), ("", "20.2.2.1"), ("", ""), ("", "statics"), ("", ""),
    ]  # fmt: skip


def test_the_package_takes_the_cells_into_its_ledger(notebook: Any) -> None:
    content = collect([Executed("sheets/C-01.ipynb", notebook, "")])
    data = content.ledger.to_json()
    assert {"C-01/eps_s.2", "C-01/F_s_sum"} <= {entry["id"] for entry in data}
    assert Ledger.from_json(data).below("C-01/M_Fx_sum") >= {"C-01/M_Fx.6", "C-01/d_s.2", "C-01/E_s", "C-01/c"}
    done = replay(data)
    assert len(done) > 30
    assert all(item.agrees for item in done)


# HTML


def test_equations_stand_in_symbols_each_beside_its_clause(html: str) -> None:
    general = part(html, "work general")
    assert words(general[0]) == "Bars at the neutral axis"
    lines = general.findall("div")
    assert len(lines) == 6
    assert [words(clause) for clause in general.findall("p")[1:]] == ["22.2.1.2", "20.2.2.1", "", "", "statics", ""]
    assert not re.search(r"\d", words(lines[0]))
    conditions = [" ".join(words(found).split()) for found in general.iter("span") if found.get("class") == "since"]
    assert [text[:6] for text in conditions] == ["where "] * 3
    assert [text.count(", and ") for text in conditions] == [0, 1, 1]
    spoken = [math.get("alttext") for math in lines[0].iter("math") if math.get("alttext")]
    assert spoken == ["epsilon s equals epsilon cu times the quantity c minus d s, over c"]


def test_the_table_has_heads_for_columns_rows_and_the_sum(html: str) -> None:
    table = part(html, "scroll worked").find("table")
    assert table is not None
    assert [child.tag for child in table] == ["caption", "thead", "tbody", "tfoot"]
    heads = table.findall("thead/tr/th")
    assert {head.get("scope") for head in heads} == {"col"}
    assert words(heads[0]) == "bar"
    assert [(head[1].tail or "").strip("\n") for head in heads[1:]] == ["in", "in²", "\u00a0", "ksi", "kip", "kip·in"]
    rows = table.findall("tbody/tr")
    assert [(row[0].tag, row[0].get("scope"), words(row[0])) for row in rows] == [
        ("th", "row", str(number)) for number in range(1, 7)
    ]
    assert {len(row) for row in rows} == {7}
    foot = table.findall("tfoot/tr")
    assert len(foot) == 1
    assert (foot[0][0].get("scope"), words(foot[0][0])) == ("row", "Sum")
    assert [cell.get("id") for cell in foot[0][1:]] == [None, None, None, None, "C-01:F_s_sum", "C-01:M_Fx_sum"]
    assert words(foot[0][5]).startswith("−69.60")


def test_each_entry_is_one_place_of_the_page(html: str) -> None:
    page = Parsed(html)
    ids = Counter(page.values("id"))
    assert max(ids.values()) == 1
    assert all(ids[link[1:]] == 1 for link in page.values("href"))
    cells = part(html, "scroll worked")
    assert len([cell for cell in cells.iter("td") if cell.get("id")]) == 4 + 4 * 5 + 4 + 2
    assert "#C-01:F_s_sum" in page.values("href")
    assert [link.get("href") for link in cells.iter("a")].count("#C-01:A_b") == 6


def printed_table(html: str) -> Iterator[dict[str, str]]:
    """Each row as the texts of its cells by the printed symbol."""
    table = part(html, "scroll worked")
    heads = [tokens(head[0])[0][1] for head in table.findall("table/thead/tr/th")[1:]]
    for row in table.findall("table/tbody/tr"):
        yield dict(zip(heads, map(words, row[1:]), strict=True))


def printed_givens(html: str) -> dict[str, float]:
    found = {}
    for row in re.findall(r"<tr><td><math[^>]*>(.*?)</math></td><td>.*?</td><td class=\"value\">(.*?)</td>", html):
        found[page_reading.mathml(row[0])[0][1]] = page_reading.printed_number(re.sub(r"<[^>]+>", "", row[1]))
    return found


def printed_equations(html: str) -> Iterator[tuple[str, list[page_reading.Token], list[list[page_reading.Token]]]]:
    """Each equation: the symbol it gives, its right side, and the conditions printed beside it."""
    for line in part(html, "work general").findall("div"):
        maths = list(line.iter("math"))
        since = [math for span in line.iter("span") if span.get("class") == "since" for math in span.iter("math")]
        left, right = [math for math in maths if math not in since][:2]
        (name,) = [text for kind, text in tokens(left) if kind == "name"]
        yield name, page_reading.split_at_equals(tokens(right))[-1], [tokens(math) for math in since]


def last_place(text: str) -> float:
    return float(10 ** -len(text.partition(".")[2]))


@pytest.mark.parametrize(("page", "bars"), [("html", 6), ("circle", 12)])
def test_a_calculator_fed_with_the_printed_cells_gives_the_printed_cells(
    page: str, bars: int, request: pytest.FixtureRequest
) -> None:
    """Honest digits: to the last digit, give or take one; the units of the columns are coherent in kip and in."""
    html = request.getfixturevalue(page)
    givens, equations = printed_givens(html), list(printed_equations(html))
    assert {"E_s", "f_y", "c", "h", "A_b"} <= set(givens)
    checked: Counter[str] = Counter()
    for row in printed_table(html):
        known = {**givens, **{name: page_reading.printed_number(text) for name, text in row.items()}}
        for name, right, conditions in equations:
            if all(page_reading.holds(condition, known) for condition in conditions):
                checked[name] += 1
                close = pytest.approx(known[name], abs=1.001 * last_place(row[name]))
                assert page_reading.worked(right, known) == close
    assert checked == dict.fromkeys(("ε_s", "f_s", "F_s", "M_Fx"), bars)


def test_the_printed_cells_add_up_to_the_printed_sums(html: str) -> None:
    rows = list(printed_table(html))
    foot = part(html, "scroll worked").findall("table/tfoot/tr/td")
    for index, name in ((4, "F_s"), (5, "M_Fx")):
        text = (foot[index].text or "").strip()
        total = sum(page_reading.printed_number(row[name]) for row in rows)
        assert total == pytest.approx(page_reading.printed_number(text), abs=1.001 * last_place(text))


def test_blank_cells_stay_blank(tmp_path: Path, monkeypatch: pytest.MonkeyPatch) -> None:
    recorder = Recorder(monkeypatch)
    sheet = Sheet("C-01", "Sums", job=job_folder(tmp_path / "job"))
    areas = [sheet.given("A_b", f"{area} in^2", source="S-201") for area in (1, 2)]
    f_s = sheet.given("f_s", "10 ksi", source="test")
    sheet.tabulate(running_table(), running_rows(areas), {"f_s": f_s})
    notebook = recorder.notebook()
    source = str(CalcpackHtml(isolated=True).from_notebook_node(notebook)[0])
    rows = part(source, "scroll worked").findall("table/tbody/tr")
    assert [words(cell) for cell in rows[0]] == ["1", "1.00", "10.0", "", ""]
    assert [words(cell) for cell in rows[1]] == ["2", "2.00", "20.0", "10.0", "30.0"]
    assert part(source, "scroll worked").find("table/tfoot") is None
    assert len(compiled(notebook).pages) == 1


# The PDF


def table_tags(reader: pypdf.PdfReader) -> Iterator[DictionaryObject]:
    waiting = [reader.trailer["/Root"]["/StructTreeRoot"]]
    while waiting:
        node = waiting.pop().get_object()
        if isinstance(node, DictionaryObject):
            yield node
            children = node.get("/K", [])
            waiting += children if isinstance(children, list) else [children]


def test_the_pdf_tags_the_heads_of_the_table(notebook: Any) -> None:
    tags = Counter(str(tag.get("/S")) for tag in table_tags(compiled(notebook)))
    # givens: four heads; bars: seven
    assert tags["/TH"] == 4 + 7
    assert tags["/THead"] == 2


def test_24_bars_with_their_equations_take_less_than_a_page(tmp_path: Path, monkeypatch: pytest.MonkeyPatch) -> None:
    reader = compiled(bars_sheet(job_folder(tmp_path / "job"), monkeypatch, rows=24))
    assert len(reader.pages) == 1
    assert "Sum" in reader.pages[0].extract_text()


def test_a_long_table_goes_on_under_its_heads(tmp_path: Path, monkeypatch: pytest.MonkeyPatch) -> None:
    reader = compiled(bars_sheet(job_folder(tmp_path / "job"), monkeypatch, rows=80))
    texts = [page.extract_text() for page in reader.pages]
    assert len(texts) == 2
    assert ["kip·in" in text for text in texts] == [True, True]
    assert ["Sum" in text for text in texts] == [False, True]


def test_the_whole_package_builds_and_links_into_the_table(notebook: Any) -> None:
    made = model([notebook])
    page = Parsed(build_html(made, [notebook]))
    assert "#C-01:F_s_sum" in page.values("href")
    reader = pypdf.PdfReader(io.BytesIO(build_pdf(made, [notebook], [], WHEN)))
    (last,) = [page for page in reader.pages if "The bars carry" in page.extract_text()]
    links = [note.get_object() for note in last["/Annots"] if note.get_object()["/Subtype"] == "/Link"]
    # six areas, the first and the last depth, and the sum in the note
    assert len(links) == 6 + 2 + 1


def test_any_text_is_printed_as_it_is(tmp_path: Path, monkeypatch: pytest.MonkeyPatch) -> None:
    text = NASTY.replace("W" * 90, "")
    table = replace(BARS, title=text, label=text, caption=text)
    notebook = bars_sheet(job_folder(tmp_path / "job"), monkeypatch, table)
    page = Parsed(str(CalcpackHtml(isolated=True).from_notebook_node(notebook)[0]))
    assert page.open == []
    assert squeezed(page.text).count(squeezed(text)) == 3
    assert len(compiled(notebook).pages) >= 1
