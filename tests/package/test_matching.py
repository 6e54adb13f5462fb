"""What is the same value in two ledgers, though lines, rows, words and values have moved."""

from __future__ import annotations

import pytest
from comparison_samples import Book, Step, beam, programs, run
from hypothesis import given

from calcpack.ledger import Ledger
from calcpack.package.matching import match, placeless, sides, wires


def matched(old: Ledger, new: Ledger) -> dict[str, str]:
    return match(*sides(old, new))


def column(book: Book, mark: str, row: int, h: float, f_c: str, means: str = "strength") -> str:
    """A row of a schedule and the line worked from it."""
    side = book.given("h", h, source=f"S-401 (inputs/columns.csv, row {row})", means=f"depth of {mark}")
    return book.work("P", "0.85*f_c*h**2", {"f_c": f_c, "h": side}, means=means, unit="lb")


def test_a_ledger_matches_itself() -> None:
    ledger = beam(Book())
    assert matched(ledger, ledger) == {entry.id: entry.id for entry in ledger}


def test_a_line_inserted_before_shifts_ids_and_nothing_else() -> None:
    old, new = Book(), Book()
    for book, values in ((old, (16.0, 14.0)), (new, (20.0, 16.0, 14.0))):
        for value in values:
            book.work("d", "h - 2.5", {"h": book.given("h", value)})
    assert matched(old.ledger, new.ledger) == {
        "C-01/h.2": "C-01/h", "C-01/d.2": "C-01/d", "C-01/h.3": "C-01/h.2", "C-01/d.3": "C-01/d.2",
    }  # fmt: skip


def test_a_line_inserted_while_a_given_under_all_lines_changed() -> None:
    """Every worked value is another number, and the inserted one has the words of the others."""
    old, new = Book(), Book()
    for book, strength, rows in ((old, 4000.0, ("C1", "C2")), (new, 5000.0, ("C0", "C1", "C2"))):
        f_c = book.given("f_c", strength, unit="psi")
        for row, mark in enumerate(rows, 2):
            column(book, mark, row, 16.0, f_c)
    assert matched(old.ledger, new.ledger) == {
        "C-01/f_c": "C-01/f_c",
        "C-01/h.2": "C-01/h", "C-01/P.2": "C-01/P", "C-01/h.3": "C-01/h.2", "C-01/P.3": "C-01/P.2",
    }  # fmt: skip


def test_what_was_made_from_the_same_values_is_the_same_where_all_words_are_alike() -> None:
    """All givens stand first: neither the place nor the words of a worked line say whose it is."""
    old, new = Book(), Book()
    for book, strength, depths in ((old, 4000.0, (16.0, 14.0)), (new, 5000.0, (20.0, 16.0, 14.0))):
        f_c = book.given("f_c", strength, unit="psi")
        for side in [book.given("h", depth) for depth in depths]:
            book.work("P", "f_c*h", {"f_c": f_c, "h": side})
    found = matched(old.ledger, new.ledger)
    assert (found["C-01/P.2"], found["C-01/P.3"]) == ("C-01/P", "C-01/P.2")
    assert "C-01/P" not in found


def test_the_row_of_a_table_is_no_content() -> None:
    old, new = Book(), Book()
    for book, row in ((old, 2), (new, 3)):
        column(book, "C1", row, 16.0, book.given("f_c", 4000.0))
    before, after = sides(old.ledger, new.ledger)
    assert before.contents == after.contents
    assert [entry.source for entry in new.ledger if entry.symbol == "h"] == ["S-401 (inputs/columns.csv, row 3)"]


@pytest.mark.parametrize(
    ("source", "without"),
    [
        ("inputs/forces.csv, row 12", "inputs/forces.csv"),
        ("S-401, rev 2 (inputs/columns.csv, row 3)", "S-401, rev 2 (inputs/columns.csv)"),
        ("S-401, row 3", "S-401, row 3"),  # a row of a drawing's table is where the engineer looks it up
        ("", ""),
    ],
)
def test_a_source_without_its_row(source: str, without: str) -> None:
    assert placeless(source) == without


def test_lines_in_another_order_are_the_same_lines() -> None:
    old, new = Book(), Book()
    for book, values in ((old, (16.0, 14.0)), (new, (14.0, 16.0))):
        for value in values:
            book.given("h", value)
    assert matched(old.ledger, new.ledger) == {"C-01/h": "C-01/h.2", "C-01/h.2": "C-01/h"}


def test_alike_entries_keep_their_ids_where_one_of_them_is_edited() -> None:
    old, new = Book(), Book()
    for book, first in ((old, 16.0), (new, 18.0)):
        for value in (first, 16.0, 16.0):
            book.given("h", value)
    assert matched(old.ledger, new.ledger) == {entry.id: entry.id for entry in old.ledger}


@pytest.mark.parametrize(
    ("value", "more"),
    [
        (18.0, {}),
        (18.0, {"source": "S-201, rev 2"}),
        (16.0, {"means": "other words"}),
        (18.0, {"means": "other words"}),
        (16.0, {"means": "other words", "source": "S-201, rev 2"}),
    ],
    ids=["value", "value and source", "words", "words and value", "words and source"],
)
def test_a_given_that_was_edited_among_others_of_its_symbol(value: float, more: dict[str, str]) -> None:
    old, new = Book(), Book()
    for book, edited, fields in ((old, 16.0, {}), (new, value, more)):
        book.given("h", 12.0)
        book.given("h", edited, **fields)
        book.given("h", 20.0)
    assert matched(old.ledger, new.ledger)["C-01/h.2"] == "C-01/h.2"


def test_a_given_with_nothing_in_common_but_its_id_is_another() -> None:
    old, new = Book(), Book()
    for book, value, words in ((old, 16.0, "wall"), (new, 18.0, "footing")):
        book.given("h", 12.0)
        book.given("h", value, means=words, source=f"S-{value}")
    assert "C-01/h.2" not in matched(old.ledger, new.ledger)


def test_a_symbol_that_stands_once_on_a_sheet_is_the_same_whatever_it_became() -> None:
    old, new = Book(), Book()
    old.given("P_u", 276.0, means="factored force")
    new.work("P_u", "1.4*D", {"D": new.given("D", 190.0)}, means="factored force, 1.4D")
    assert matched(old.ledger, new.ledger) == {"C-01/P_u": "C-01/P_u"}


def test_a_line_with_another_expression_keeps_what_rests_on_it() -> None:
    old, new = Book(), Book()
    for book, text in ((old, "h - 2.5"), (new, "h - 3")):
        side = book.given("h", 20.0)
        for _ in range(2):
            d = book.work("d", text, {"h": side})
            book.work("z", "0.9*d", {"d": d})
    assert matched(old.ledger, new.ledger) == {entry.id: entry.id for entry in old.ledger}


def test_another_edition_of_every_clause_moves_nothing_to_another_line() -> None:
    old, new = Book(), Book()
    for book, edition in ((old, "ACI 318-14"), (new, "ACI 318-19")):
        if book is new:
            book.work("l_d", "40*d_b", {"d_b": book.given("d_b", 1.27, means="another bar")}, edition=edition)
        for size in (0.75, 1.0):
            bar = book.given("d_b", size)
            book.work("l_d", "40*d_b", {"d_b": bar}, edition=edition)
    found = matched(old.ledger, new.ledger)
    assert {identifier: was for identifier, was in found.items() if "l_d" in identifier} == {
        "C-01/l_d.2": "C-01/l_d", "C-01/l_d.3": "C-01/l_d.2",
    }  # fmt: skip


def test_a_verdict_in_other_words_about_the_same_values_is_the_same() -> None:
    old, new = Book(), Book()
    for book, words in ((old, "fits"), (new, "length is enough")):
        a, b = book.given("a", 1.0), book.given("b", 2.0)
        book.verify("first", a, a)
        book.verify(words, a, b)
    assert matched(old.ledger, new.ledger)["C-01/verdict.2"] == "C-01/verdict.2"


def test_values_of_two_sheets_or_two_symbols_never_match() -> None:
    old, new, other = Book("C-01"), Book("C-02"), Book("C-01")
    old.given("h", 16.0)
    new.given("h", 16.0)
    other.given("b", 16.0)
    assert matched(old.ledger, new.ledger) == {}
    assert matched(old.ledger, other.ledger) == {}


def test_a_verdict_is_not_a_value_called_ratio() -> None:
    old, new = Book(), Book()
    old.verify("fits", old.given("a", 1.0), old.given("b", 2.0))
    new.work("ratio", "a/b", {"a": new.given("a", 1.0), "b": new.given("b", 2.0)})
    assert "C-01/ratio" not in matched(old.ledger, new.ledger)


def test_what_an_entry_rests_on_by_its_part() -> None:
    book = Book()
    a, b = book.given("a", 1.0), book.given("b", 2.0)
    c = book.work("c", "a + b", {"a": a, "b": b})
    x = book.solve("x", 1.5, (a, b))
    v = book.verify("fits", c, x)
    assert wires(book.ledger[a]) == {}
    assert wires(book.ledger[c]) == {"a": a, "b": b}
    assert wires(book.ledger[x]) == {"input 1": a, "input 2": b}
    assert wires(book.ledger[v]) == {"demand": c, "capacity": x}


@given(programs, programs)
def test_matching_has_no_direction(one: tuple[Step, ...], other: tuple[Step, ...]) -> None:
    old, new = run(one)[0].ledger, run(other)[0].ledger
    forth, back = matched(old, new), matched(new, old)
    assert {was: now for now, was in forth.items()} == back


@given(programs, programs)
def test_no_two_values_match_one(one: tuple[Step, ...], other: tuple[Step, ...]) -> None:
    old, new = run(one)[0].ledger, run(other)[0].ledger
    found = matched(old, new)
    assert len(set(found.values())) == len(found)
    assert all(old[was].symbol == new[now].symbol for now, was in found.items())
