"""Values carried from one sheet to another."""

from __future__ import annotations

import json
from pathlib import Path

import pytest
from nbformat import v4

from calcpack.carrying import carried, leave, results_folder
from calcpack.errors import NeedsSheet, SheetError
from calcpack.items import MIME
from calcpack.ledger import Entry, Ledger


def entry(identifier: str, symbol: str, value: float = 60.0, unit: str = "in") -> Entry:
    return Entry(identifier, "given", symbol, "a value", value, unit, "shown", "L-01", source="S-1", status="confirmed")


@pytest.fixture
def root(tmp_path: Path) -> Path:
    ledger = Ledger([entry("L-01/L_1", "L_1"), entry("L-01/d", "d"), entry("L-01/d.2", "d", 3.0, "psi")])
    leave(results_folder(tmp_path), "L-01", ledger, list(ledger))
    return tmp_path


def test_a_value_comes_with_its_hash_and_dimension(root: Path) -> None:
    value, digest = carried(root, "L-01", "L_1", "sheet C-01")
    assert value.entry == entry("L-01/L_1", "L_1")
    assert (value.dimension.name, value.sheet) == ("length", "L-01")
    assert digest == Ledger([entry("L-01/L_1", "L_1")]).hash("L-01/L_1")


def test_by_id_where_the_symbol_is_set_twice(root: Path) -> None:
    with pytest.raises(SheetError, match=r"d of sheet L-01: L-01/d, L-01/d\.2 +exactly one .*: carry it by its id"):
        carried(root, "L-01", "d", "sheet C-01")
    value, _ = carried(root, "L-01", "L-01/d.2", "sheet C-01")
    assert (value.entry.value, value.dimension.name) == (3.0, "stress or pressure")


def test_a_name_that_is_not_there(root: Path) -> None:
    with pytest.raises(SheetError, match=r"q of sheet L-01: none +exactly one") as caught:
        carried(root, "L-01", "q", "sheet C-01, cell [3]")
    assert caught.value.where == "sheet C-01, cell [3]"


def test_a_sheet_that_left_nothing(root: Path) -> None:
    with pytest.raises(NeedsSheet, match=r"^needs sheet L-02\n  sheet L-02 has no results") as caught:
        carried(root, "L-02", "q", "")
    assert caught.value.sheet == "L-02"


@pytest.mark.parametrize("sheet", ["../L-01", "a/b", ""])
def test_a_sheet_is_no_path(root: Path, sheet: str) -> None:
    with pytest.raises(NeedsSheet, match="needs sheet"):
        carried(root / ".calcpack", sheet, "q", "")


def test_a_run_keeps_its_results_apart(root: Path, monkeypatch: pytest.MonkeyPatch, tmp_path: Path) -> None:
    assert results_folder(root) == root / ".calcpack" / "results"
    monkeypatch.setenv("CALCPACK_RESULTS", str(tmp_path / "mine"))
    assert results_folder(root) == tmp_path / "mine"


def store(root: Path, name: str, *items: dict[str, object]) -> None:
    outputs = [v4.new_output("display_data", data={MIME: item, "text/plain": ""}) for item in items]
    made = v4.new_notebook(cells=[v4.new_code_cell("…", outputs=outputs)])
    (root / "sheets").mkdir(exist_ok=True)
    (root / "sheets" / name).write_text(json.dumps(made), "utf-8")


def test_at_an_authors_desk_a_value_comes_from_the_outputs_stored_in_the_notebook(
    root: Path, monkeypatch: pytest.MonkeyPatch
) -> None:
    (root / "sheets").mkdir()
    (root / "sheets" / "00_torn.ipynb").write_text('{"cells": [{"cell', "utf-8")
    (root / "sheets" / "01_list.ipynb").write_text("[]", "utf-8")
    span = entry("L-02/s", "s")
    store(
        root, "02.ipynb", {"type": "sheet", "id": "L-02", "entries": []}, {"type": "given", "entries": [span.to_json()]}
    )
    value, digest = carried(root, "L-02", "s", "")
    assert (value.entry, digest) == (span, Ledger([span]).hash("L-02/s"))
    monkeypatch.setenv("CALCPACK_RESULTS", str(root / "a_run"))
    with pytest.raises(NeedsSheet, match="needs sheet L-02"):
        carried(root, "L-02", "s", "")  # a run takes nothing that it has not made itself


def test_stored_outputs_that_carry_from_a_third_sheet(root: Path) -> None:
    made = Entry(
        "L-03/x",
        "worked",
        "x",
        "b",
        2.0,
        "in",
        "2 in",
        "L-03",
        clause="statics",
        expression="2 * s",
        where={"s": "L-02/s"},
    )
    given_here = {"type": "given", "entries": [], "reads": [["sheet L-02 L-02/s", "1" * 64]]}
    store(
        root, "03.ipynb", {"type": "sheet", "id": "L-03", "entries": []}, given_here,
        {"type": "work", "entries": [made.to_json()]},
    )  # fmt: skip
    value, _ = carried(root, "L-03", "x", "")
    assert value.entry.where == {"s": "L-02/s"}


def test_texts_are_kept_as_they_are(tmp_path: Path) -> None:
    odd = Entry("L-01/x", "given", "x", '«é» 🧪 "q" <b>', 1.0, "", "1", "L-01", source="S-1 §3", status="confirmed")
    leave(tmp_path / "r", "L-01", Ledger([odd]), [odd])
    assert "🧪" in (tmp_path / "r" / "L-01.json").read_text("utf-8")
