from __future__ import annotations

from pathlib import Path
from typing import Any

import pytest
from markupsafe import Markup
from nbformat import v4
from package_samples import Recorder, columns_sheet

from calcpack.items import MIME, bundle
from calcpack.package.blocks import Printer, anchors, blocks, foreign_outputs
from calcpack.sheet import Sheet
from calcpack.typeset.layout import Layout, Slot


def shown(*items: dict[str, Any]) -> Any:
    outputs = [v4.new_output("display_data", data=bundle(item)) for item in items]
    return v4.new_notebook(cells=[v4.new_code_cell("…", outputs=outputs)])


def given(identifier: str = "C-01/b", **more: Any) -> dict[str, Any]:
    item = {"type": "given", "id": identifier, "symbol": "b", "means": "width", "shown": "18 in", "source": "S-201"}
    return {**item, "status": "confirmed", "entries": [], "reads": [], **more}


def note(text: str = "A remark.") -> dict[str, Any]:
    return {"type": "note", "style": "note", "parts": [{"text": text, "link": "", "sheet": ""}], "entries": []}


def kinds(made: list[dict[str, Any]]) -> list[str]:
    return [block["kind"] for block in made]


@pytest.mark.parametrize("target", ["html", "typst"])
def test_a_sheet_in_order(sheets: list[Any], target: str) -> None:
    made = blocks(sheets[0], target)
    assert kinds(made) == [
        "sheet", "heading", "text", "given", "heading", "work", "verdict", "table", "figure", "note", "note",
    ]  # fmt: skip
    assert len(made[3]["rows"]) == 5


@pytest.mark.parametrize("target", ["html", "typst"])
def test_words_above_the_cell_that_opens_a_sheet_stand_below_its_heading(target: str) -> None:
    sheet = {"type": "sheet", "id": "C-01", "subject": "Columns", "concrete": "ACI 318-19", "entries": [], "reads": []}
    notebook = shown(sheet, note())
    notebook.cells.insert(0, v4.new_markdown_cell("Words that came first."))
    assert kinds(blocks(notebook, target)) == ["sheet", "text", "note"]


def test_consecutive_givens_make_one_table_and_others_part_them() -> None:
    made = blocks(shown(given(), given("C-01/h"), note(), given("C-01/d")), "html")
    assert kinds(made) == ["given", "note", "given"]
    assert [len(block["rows"]) for block in made if block["kind"] == "given"] == [2, 1]


def test_the_first_givens_and_long_lists_have_heads() -> None:
    two, three = [given(), given()], [given(), given(), given()]
    made = blocks(shown(given(), note(), *two, note(), *three), "html")
    assert [block["headed"] for block in made if block["kind"] == "given"] == [True, False, True]


def test_levels_of_headings_never_skip() -> None:
    nb = v4.new_notebook(
        cells=[v4.new_markdown_cell(source) for source in ("#### deep", "### deeper", "# top", "###### six")]
    )
    assert [block["level"] for block in blocks(nb, "html")] == [2, 3, 2, 3]


def test_work_has_rows_in_the_language_of_the_target(sheets: list[Any]) -> None:
    typst = blocks(sheets[0], "typst")[5]["lines"][0]
    html = blocks(sheets[0], "html")[5]["lines"][0]
    assert len(typst["rows"]) == len(html["rows"]) == 2
    assert all(isinstance(row["right"], Markup) for row in typst["rows"] + html["rows"])
    # 0.85(4)(324 - 8) + 60(8) = 1,554.4 kip, by hand.
    number, unit = typst["shown"].split()
    assert (float(number.replace(",", "")), unit) == (pytest.approx(1554.4, abs=0.5), "kip")
    assert html["shown"] == typst["shown"]
    assert '#v("C-01:f_c", "4\u00a0ksi")' in typst["rows"][1]["right"]
    assert '<a href="#C-01:f_c">4\u00a0ksi</a>' in html["rows"][1]["right"]
    assert typst["rows"][1]["spoken"].startswith("equals 0.85 times 4 ksi times bracket 324 in²")


def test_a_line_result_stands_beside_another_unit_only() -> None:
    line = blocks(work_in_pounds(), "html")[0]["lines"][0]
    assert (line["line_result"], line["shown"]) == ("1,000 lb", "1 kip")


def work_in_pounds() -> Any:
    layout = Layout(("mul", (("slot", 0), ("slot", 1))), (Slot("symbol", "f_c"), Slot("symbol", "A_g")))
    return worked(layout, [["100 psi", "", ""], ["10 in²", "", ""]])


def worked(layout: Layout, values: list[list[str]], conditions: Any = ()) -> Any:
    line = {
        "id": "C-01/P", "symbol": "P", "layout": layout.to_json(), "values": values, "conditions": list(conditions),
        "line_result": "1,000 lb", "shown": "1 kip",
    }  # fmt: skip
    return shown({"type": "work", "title": "Force", "clause": "statics", "edition": "", "lines": [line], "entries": []})


def long_sum(terms: int) -> Layout:
    return Layout(
        ("add", tuple(("+", ("slot", index)) for index in range(terms))),
        tuple(Slot("symbol", "P_u") for _ in range(terms)),
    )


@pytest.mark.parametrize(("target", "sign"), [("html", '<mo form="infix">+</mo>'), ("typst", 'class("binary", +)')])
def test_a_long_line_goes_on_in_rows_that_open_with_the_sign(target: str, sign: str) -> None:
    (line,) = blocks(worked(long_sum(12), [["1,234.5 kip", "", ""]] * 12), target)[0]["lines"]
    # Twelve symbols fit in a row; of twelve values, each some 6.5 em, four fit in the 28.6 em beside the symbol.
    assert [row["goes_on"] for row in line["rows"]] == [False, False, True, True]
    assert all((sign in row["right"][:40]) == row["goes_on"] for row in line["rows"])
    assert not line["wide"]


def test_a_line_that_cannot_be_broken_is_wide() -> None:
    whole = Layout(("frac", long_sum(12).tree, ("slot", 0)), long_sum(12).slots)
    assert blocks(worked(whole, [["1,234.5 kip", "", ""]] * 12), "html")[0]["lines"][0]["wide"]
    short = Layout(("frac", long_sum(2).tree, ("slot", 0)), long_sum(2).slots)
    assert not blocks(worked(short, [["1 kip", "", ""]] * 2), "html")[0]["lines"][0]["wide"]


@pytest.mark.parametrize(("terms", "short"), [(2, True), (3, False)])
def test_parts_of_a_condition_stand_apart(terms: int, short: bool) -> None:
    tests = tuple(("rel", "<=", ("slot", index), ("slot", terms)) for index in range(terms))
    slots = (*(Slot("symbol", "P_u") for _ in range(terms)), Slot("number", "4000", "psi"))
    condition = {
        "layout": Layout(("or", tests), slots).to_json(),
        "values": [["1 kip", "", ""]] * terms + [["4,000 psi", "", ""]],
    }
    nb = worked(long_sum(1), [["1 kip", "", ""]], [condition])
    (made,) = blocks(nb, "html")[0]["lines"][0]["conditions"]
    assert (made["word"], len(made["parts"]), made["with_values"], made["short"]) == ("or", terms, True, short)
    assert made["parts"][0]["spoken"] == "P u at most 4,000 psi"
    assert made["parts"][0]["spoken_values"] == "1 kip at most 4,000 psi"


def test_the_edition_stands_where_it_is_not_the_one_of_the_sheet(sheets: list[Any]) -> None:
    works = [block for block in blocks(sheets[1], "html") if block["kind"] == "work"]
    assert [work["edition"] for work in works] == ["ASCE 7-16", "", ""]
    assert [work["clause"] for work in works] == ["2.3.1", "25.4.2.5", "25.4.2.4a"]


def test_the_condition_that_held_is_said_with_its_values(sheets: list[Any]) -> None:
    _, work, _ = (block for block in blocks(sheets[1], "html") if block["kind"] == "work")
    (line,) = work["lines"]
    (condition,) = line["conditions"]
    (part,) = condition["parts"]
    assert (condition["word"], condition["with_values"], condition["short"]) == ("", True, True)
    assert part["spoken"] == "h below greater than 12 in"
    assert part["spoken_values"] == "16 in greater than 12 in"
    assert 'href="#A-03:h_below"' in part["values"]


def test_links_lead_only_to_what_the_document_holds(sheets: list[Any]) -> None:
    alone = str(blocks(sheets[1], "html"))
    assert "C-01:f_c" not in alone
    assert "A-03:d_b" in alone
    together = str(blocks(sheets[1], "html", anchors(sheets[0]) | anchors(sheets[1])))
    assert '<a href="#C-01:f_c">' in together
    assert '<span class="from">C-01</span>' in together


def test_a_carried_value_links_to_its_origin(sheets: list[Any]) -> None:
    known = anchors(sheets[0]) | anchors(sheets[1])
    row = next(block for block in blocks(sheets[1], "typst", known) if block["kind"] == "given")["rows"][0]
    assert (row["anchor"], row["link"], row["text"]) == ("", "C-01:f_c", "4\u00a0ksi")


def test_every_id_stands_once() -> None:
    made = blocks(shown(given(), given(), note(), given()), "html")
    assert [row["anchor"] for block in made if block["kind"] == "given" for row in block["rows"]] == ["C-01:b", "", ""]


def test_ids_of_a_notebook(sheets: list[Any]) -> None:
    assert anchors(sheets[0]) == {
        "C-01", "C-01:f_c", "C-01:f_y", "C-01:A_g", "C-01:A_st", "C-01:P_u", "C-01:P_o", "C-01:verdict",
    }  # fmt: skip


@pytest.mark.parametrize(("ratio", "fill", "sign"), [(0.4, 0.4, "≤"), (1.0, 1.0, "≤"), (1.32, 1.0, ">")])
def test_a_verdict(ratio: float, fill: float, sign: str) -> None:
    side = {"symbol": "P_u", "shown": "1 kip", "text": "1 kip", "link": "", "sheet": ""}
    word = "NG" if ratio > 1 else "OK"
    item = {
        "type": "verdict", "id": "C-01/verdict", "what": "holds", "clause": "", "ratio": ratio,
        "ratio_text": str(ratio),
        "verdict": word, "demand": side, "capacity": side, "entries": [],
    }  # fmt: skip
    (block,) = blocks(shown(item), "typst")
    assert (block["fill"], block["sign"], block["word"], block["ok"]) == (fill, sign, word, ratio <= 1)


@pytest.mark.parametrize(
    ("cells", "numeric"),
    [
        (["0.89", "1,200 kip", "−31 kip·ft", "±4 %", "1.2 × 10³ psi", "—", ""], True),
        (["1.2D + 1.6L"], False),
        (["C3"], False),
        (["4 bars, 2 each face"], False),
    ],
)
def test_a_column_of_numbers_is_known(cells: list[str], numeric: bool) -> None:
    parts = [[{"text": cell, "link": "", "sheet": ""}] for cell in cells]
    item = {"type": "table", "head": parts[0], "rows": parts, "caption": "", "entries": []}
    assert blocks(shown(item), "html")[0]["numeric"] == [numeric]


def test_a_table_without_rows() -> None:
    item = {"type": "table", "head": [{"text": "a", "link": "", "sheet": ""}], "rows": [], "caption": "", "entries": []}
    assert blocks(shown(item), "html")[0]["rows"] == []


def test_drawings_of_a_sheet_share_no_ids(job: Path, monkeypatch: pytest.MonkeyPatch) -> None:
    nb = columns_sheet(job, monkeypatch)
    nb.cells.append(nb.cells[-3])
    svgs = [block["svg"] for block in blocks(nb, "html") if block["kind"] == "figure"]
    assert len(svgs) == 2
    assert all(isinstance(svg, Markup) for svg in svgs)
    assert svgs[0] != svgs[1]


def test_a_symbol_that_cannot_be_set_stays_text() -> None:
    assert Printer("html", ()).symbol("f_c")["words"] == ""
    assert Printer("html", ()).symbol("a#b") == {"math": "", "spoken": "a#b", "words": "a#b"}


def test_outputs_that_are_no_items_are_left_out_and_listed() -> None:
    nb = v4.new_notebook(
        cells=[
            v4.new_markdown_cell("text"),
            v4.new_code_cell("…", outputs=[v4.new_output("stream", name="stdout", text="hello")]),
            v4.new_code_cell("…", outputs=[v4.new_output("display_data", data=bundle(note()))]),
            v4.new_code_cell(
                "…", outputs=[v4.new_output("execute_result", data={"text/plain": "4", "text/html": "<b>4</b>"})]
            ),
            v4.new_code_cell("…", outputs=[v4.new_output("error", ename="E", evalue="v", traceback=[])]),
            v4.new_code_cell("…", outputs=[v4.new_output("display_data", data={MIME: {"type": "film"}})]),
        ]
    )
    assert foreign_outputs(nb) == [
        (1, "stream (stdout)"), (3, "execute_result (text/plain, text/html)"), (4, "error"), (5, "item (film)"),
    ]  # fmt: skip
    assert kinds(blocks(nb, "html")) == ["text", "note"]


def test_a_source_kept_as_lines_reads_as_one() -> None:
    cell = v4.new_markdown_cell("")
    cell.source = ["one\n", "two"]
    (block,) = blocks(v4.new_notebook(cells=[cell]), "html")
    assert block["body"] == "<p>one two</p>"


def test_an_empty_heading_is_no_block() -> None:
    assert blocks(v4.new_notebook(cells=[v4.new_markdown_cell("#\n\nwords")]), "html")[0]["kind"] == "text"


def test_a_value_keeps_its_unit_on_its_line(job: Path, monkeypatch: pytest.MonkeyPatch) -> None:
    recorder = Recorder(monkeypatch)
    sheet = Sheet("N-01", "Notes", job=job)
    value = sheet.given("b", "18 in", source="S-201")
    sheet.note("as wide as ", value)
    parts = blocks(recorder.notebook(), "typst")[-1]["parts"]
    assert [part["text"] for part in parts] == ["as wide as ", "18\u00a0in"]
