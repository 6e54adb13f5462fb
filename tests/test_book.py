"""The record behind a sheet: ids, values by symbol, parts and origins."""

from __future__ import annotations

import pytest

from calcpack import notebook
from calcpack.book import SheetBook
from calcpack.errors import LedgerError
from calcpack.ledger import Entry
from calcpack.units import LENGTH
from calcpack.value import Value


def entry(identifier: str, symbol: str = "x") -> Entry:
    sheet = identifier.split("/")[0]
    return Entry(identifier, "given", symbol, "a length", 1.0, "in", "1 in", sheet, source="S-1", status="confirmed")


@pytest.fixture
def book() -> SheetBook:
    return SheetBook("C-01", "Columns")


def test_free_ids_count_up_and_see_each_other(book: SheetBook) -> None:
    assert book._free_ids(["x", "y", "x"]) == ["C-01/x", "C-01/y", "C-01/x.2"]
    book._keep(entry("C-01/x"), LENGTH)
    assert book._free_ids(["x", "x"]) == ["C-01/x.2", "C-01/x.3"]


def test_values_stand_in_order_of_appearance(book: SheetBook) -> None:
    for name in ("C-01/x", "C-01/x.2"):
        book._keep(entry(name), LENGTH)
    assert [value.entry.id for value in book.values("x")] == ["C-01/x", "C-01/x.2"]
    assert book.values("y") == ()


def test_an_id_is_taken_once(book: SheetBook) -> None:
    book._keep(entry("C-01/x"), LENGTH)
    with pytest.raises(LedgerError, match="C-01/x is in the ledger already"):
        book._keep(entry("C-01/x"), LENGTH)


def test_without_a_front_end_nothing_is_ever_forgotten(book: SheetBook) -> None:
    book._keep(entry("C-01/x"), LENGTH)
    book._begin()
    assert len(book.ledger) == 1


def test_what_a_cell_admitted_stays_admitted(book: SheetBook, monkeypatch: pytest.MonkeyPatch) -> None:
    monkeypatch.setattr(notebook, "cell_key", lambda: ("a", 1))
    book.ledger.admit("L-01/q", "0" * 64)
    book._keep(entry("C-01/x"), LENGTH)
    monkeypatch.setattr(notebook, "cell_key", lambda: ("a", 2))
    book._begin()
    assert len(book.ledger) == 0
    assert book.ledger.hash("L-01/q") == "0" * 64


def test_parts_name_another_sheet_only(book: SheetBook) -> None:
    own, other = (Value(entry(f"{sheet}/x"), LENGTH, sheet) for sheet in ("C-01", "L-01"))
    assert book._part(own) == {"text": "1 in", "link": "C-01/x", "sheet": ""}
    assert book._part(other) == {"text": "1 in", "link": "L-01/x", "sheet": "L-01"}
    assert book._part("x") == {"text": "x", "link": "", "sheet": ""}
    assert (book._origin(own).sheet, book._origin(other).sheet) == ("", "L-01")


def test_the_place_names_the_cell_where_there_is_one(book: SheetBook, monkeypatch: pytest.MonkeyPatch) -> None:
    assert book._place() == "sheet C-01"
    monkeypatch.setattr(notebook, "cell_name", lambda: "cell [4]")
    assert book._place() == "sheet C-01, cell [4]"
