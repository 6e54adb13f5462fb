"""From executed notebooks to one ledger."""

from __future__ import annotations

from typing import Any

import pytest
from nbformat import v4

from calcpack.errors import LedgerError
from calcpack.items import MIME, stored_items
from calcpack.ledger import Entry
from calcpack.package.collect import collect
from calcpack.package.run import Executed, sheet_id


def given(identifier: str, value: float = 1.0) -> Entry:
    sheet, symbol = identifier.split("/")
    return Entry(identifier, "given", symbol, "a", value, "in", "1 in", sheet, source="S-1", status="confirmed")


def worked(identifier: str, expression: str, **where: str) -> Entry:
    sheet, symbol = identifier.split("/")
    return Entry(
        identifier,
        "worked",
        symbol,
        "b",
        2.0,
        "in",
        "2 in",
        sheet,
        clause="statics",
        expression=expression,
        where=where,
    )


def notebook(sheet: str, *entries: Entry, kind: str = "given") -> Any:
    items: list[dict[str, Any]] = [{"type": "sheet", "id": sheet, "subject": f"Sheet {sheet}", "entries": []}]
    items += [{"type": kind, "entries": [entry.to_json()]} for entry in entries]
    outputs = [v4.new_output("display_data", data={MIME: item, "text/plain": ""}) for item in items]
    stream = v4.new_output("stream", text="printed")
    cells = [v4.new_markdown_cell("text"), v4.new_code_cell("a", outputs=[stream, *outputs[:1]])]
    return v4.new_notebook(cells=[*cells, v4.new_code_cell("b", outputs=outputs[1:])])


def executed(sheet: str, *entries: Entry) -> Executed:
    return Executed(f"sheets/{sheet}.ipynb", notebook(sheet, *entries), "")


def test_items_stand_among_other_outputs() -> None:
    made = notebook("L-01", given("L-01/a"), given("L-01/b"))
    assert [item["type"] for item in stored_items(made)] == ["sheet", "given", "given"]
    assert sheet_id(made) == "L-01"
    assert sheet_id(v4.new_notebook(cells=[v4.new_code_cell("1")])) == ""


def test_sheets_in_order_and_one_ledger() -> None:
    content = collect([executed("L-01", given("L-01/a")), executed("C-01", worked("C-01/b", "2 * a", a="L-01/a"))])
    assert [(sheet.id, sheet.subject, sheet.path) for sheet in content.sheets] == [
        ("L-01", "Sheet L-01", "sheets/L-01.ipynb"), ("C-01", "Sheet C-01", "sheets/C-01.ipynb"),
    ]  # fmt: skip
    assert [entry.id for entry in content.ledger] == ["L-01/a", "C-01/b"]
    assert content.ledger.users("L-01/a") == ("C-01/b",)


def test_a_sheet_may_stand_before_the_one_it_takes_from() -> None:
    content = collect([executed("A-01", worked("A-01/b", "2 * a", a="L-01/a")), executed("L-01", given("L-01/a"))])
    assert [sheet.id for sheet in content.sheets] == ["A-01", "L-01"]
    assert [entry.id for entry in content.ledger] == ["L-01/a", "A-01/b"]


def test_sheets_that_rest_on_each_other_are_named() -> None:
    ring = [
        executed("A-01", worked("A-01/b", "2 * a", a="L-01/a")),
        executed("L-01", worked("L-01/a", "2 * b", b="A-01/b")),
    ]
    with pytest.raises(LedgerError, match="circular reference: A-01/b rests on L-01/a rests on A-01/b"):
        collect(ring)


def test_a_reference_to_nothing() -> None:
    with pytest.raises(LedgerError, match="A-01/b rests on L-01/a"):
        collect([executed("A-01", worked("A-01/b", "2 * a", a="L-01/a"))])


def test_the_content_of_a_sheet_follows_its_entries_and_what_they_rest_on() -> None:
    def digests(value: float) -> tuple[str, str, str]:
        content = collect(
            [
                executed("L-01", given("L-01/a", value)),
                executed("C-01", worked("C-01/b", "2 * a", a="L-01/a")),
                executed("N-01", given("N-01/n")),
            ]
        )
        return content.sheet_hash("L-01"), content.sheet_hash("C-01"), content.sheet_hash("N-01")

    before, after = digests(1.0), digests(1.5)
    assert [one == other for one, other in zip(before, after, strict=True)] == [False, False, True]
    assert digests(1.0) == before
