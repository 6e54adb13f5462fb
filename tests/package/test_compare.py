"""What was changed, what only follows, what was added and dropped (package requirements D3, D4)."""

from __future__ import annotations

import time
from dataclasses import replace
from typing import Any

import pytest
from comparison_samples import Book, Step, beam, givens, programs, run
from hypothesis import assume, given
from hypothesis import strategies as st

from calcpack.ledger import Entry, Ledger
from calcpack.package.compare import Change, Comparison, SheetChange, compare


def ids(entries: Any) -> list[str]:
    return [item.new.id if isinstance(item, Change) else item.id for item in entries]


def edited(ledger: Ledger, identifier: str, **fields: Any) -> Ledger:
    """The ledger with one entry edited, nothing worked again."""
    return Ledger(replace(entry, **fields) if entry.id == identifier else entry for entry in ledger)


def only(found: Comparison) -> Change:
    assert (len(found.changed), found.added, found.dropped) == (1, (), ())
    return found.changed[0]


def test_the_same_ledger_shows_nothing() -> None:
    found = compare(beam(Book()), beam(Book()))
    assert found == Comparison((), (), (), (), (), (), 6)
    assert found.is_empty


def test_a_given_is_changed_and_what_rests_on_it_follows() -> None:
    found = compare(beam(Book()), beam(Book(), h=24.0))
    change = only(found)
    assert (change.new.id, change.differs, change.verdicts) == ("C-01/h", ("value",), ("C-01/verdict",))
    assert ids(found.followed) == ["C-01/d", "C-01/verdict"]
    assert [(item.differs, item.moved) for item in found.followed] == [((), True), ((), True)]
    assert found.sheets == (SheetChange("C-01", "changed"),)
    assert not found.is_empty


@pytest.mark.parametrize(
    ("identifier", "fields", "differs"),
    [
        ("C-01/h", {"value": 21.0}, ("value",)),
        ("C-01/h", {"source": "S-201, rev 2"}, ("source",)),
        ("C-01/h", {"status": "assumed"}, ("status",)),
        ("C-01/h", {"means": "overall depth"}, ("means",)),
        ("C-01/h", {"source": "S-201, rev 2", "value": 21.0}, ("source", "value")),
        ("C-01/d", {"expression": "h - 3 + 0.5"}, ("expression",)),
        ("C-01/d", {"expression": "h - 3", "value": 17.0}, ("expression",)),
        ("C-01/d", {"clause": "22.2"}, ("clause",)),
        ("C-01/d", {"edition": "ACI 318-14"}, ("edition",)),
        ("C-01/d", {"condition": "h > 3"}, ("condition",)),
        ("C-01/d", {"value": 17.6}, ("value",)),  # the program works it out in another way
        ("C-01/verdict", {"clause": "9.3"}, ("clause",)),
        ("C-01/verdict", {"verdict": "NG"}, ("value",)),
        ("C-01/h", {"unit": "mm"}, ("unit",)),
    ],
)
def test_whatever_is_an_entrys_own_is_a_change_of_its_own(
    identifier: str, fields: dict[str, Any], differs: tuple[str, ...]
) -> None:
    old = beam(Book())
    found = compare(old, edited(old, identifier, **fields))
    assert only(found).differs == differs
    assert set(ids(found.followed)) == old.above(identifier)


@pytest.mark.parametrize("fields", [{"shown": "1'-8\""}, {"formula": "depth"}])
def test_how_a_value_is_printed_is_no_difference(fields: dict[str, str]) -> None:
    old = beam(Book())
    assert compare(old, edited(old, "C-01/d", **fields)).is_empty


def test_a_given_in_another_row_of_its_table_is_told_apart() -> None:
    old, new = Book(), Book()
    for book, row in ((old, 2), (new, 3)):
        beam(book, source=f"S-201 (inputs/columns.csv, row {row})")
    found = compare(old.ledger, new.ledger)
    assert found.is_empty
    assert ids(found.shifted) == ["C-01/h"]
    assert [old.ledger.hash(name) == new.ledger.hash(name) for name in ("C-01/h", "C-01/w")] == [False, True]


def test_a_row_that_moves_does_not_hide_a_value_that_changed() -> None:
    old, new = Book(), Book()
    for book, row, h in ((old, 2, 20.0), (new, 3, 24.0)):
        beam(book, h=h, source=f"S-201 (inputs/columns.csv, row {row})")
    found = compare(old.ledger, new.ledger)
    assert only(found).differs == ("value",)
    assert found.shifted == ()


def test_what_does_not_move_is_told_from_what_does() -> None:
    """A cap holds the value: 1.7 whatever the product, by hand."""
    old, new = Book(), Book()
    for book, psi in ((old, 1.5), (new, 1.4)):
        book.work("psi_te", "min(psi*1.3, 1.7)", {"psi": book.given("psi", psi)})
    found = compare(old.ledger, new.ledger)
    assert [(item.new.id, item.new.value, item.moved) for item in found.followed] == [("C-01/psi_te", 1.7, False)]


@pytest.mark.parametrize(
    ("before", "after", "moved"),
    [
        (3e6, 3e6 * (1 + 5e-13), False),
        (3e6, 3e6 * (1 + 5e-12), True),
        (0.0, 5e-10, False),  # a residual that vanishes
        (0.0, 2e-9, True),
        (3.0, 3.0, False),
    ],
)
def test_the_noise_of_arithmetic_is_no_move(before: float, after: float, moved: bool) -> None:
    entry = beam(Book())["C-01/d"]
    assert Change(replace(entry, value=before), replace(entry, value=after)).moved is moved


def test_a_line_that_takes_another_value_is_rewired() -> None:
    old, new = Book(), Book()
    for book, index in ((old, 0), (new, 1)):
        sides = [book.given("h", 16.0), book.given("h", 18.0)]
        book.work("d", "h - 2.5", {"h": sides[index]})
    change = only(compare(old.ledger, new.ledger))
    assert (change.new.id, change.differs) == ("C-01/d", ("rests_on",))


def test_a_line_that_takes_its_value_from_a_twin_is_the_same() -> None:
    old, new = Book(), Book()
    for book, index in ((old, 0), (new, 1)):
        sides = [book.given("h", 16.0), book.given("h", 16.0)]
        book.work("d", "h - 2.5", {"h": sides[index]})
    assert compare(old.ledger, new.ledger).is_empty


def test_what_rested_on_a_value_that_was_replaced_follows() -> None:
    old, new = Book(), Book()
    old.work("d", "h - 2.5", {"h": old.given("h", 16.0)})
    new.sheet = "L-01"
    carried = new.given("h", 18.0)
    new.sheet = "C-01"
    new.work("d", "h - 2.5", {"h": carried})
    found = compare(old.ledger, new.ledger)
    assert (found.changed, ids(found.followed)) == ((), ["C-01/d"])
    assert (ids(found.added), ids(found.dropped)) == (["L-01/h"], ["C-01/h"])


def test_a_value_solved_from_more_is_rewired() -> None:
    old, new = Book(), Book()
    for book, count in ((old, 1), (new, 2)):
        names = [book.given(symbol, 5.0) for symbol in "ab"]
        book.solve("c", 3.0, tuple(names[:count]))
    assert only(compare(old.ledger, new.ledger)).differs == ("rests_on",)


def test_another_expression_tells_by_itself_that_it_rests_on_more() -> None:
    old, new = Book(), Book()
    for book, text in ((old, "a + 1"), (new, "a + b")):
        where = {symbol: book.given(symbol, 5.0) for symbol in "ab"}
        book.work("c", text, {name: used for name, used in where.items() if name in text})
    assert only(compare(old.ledger, new.ledger)).differs == ("expression",)


# Verdicts


def judged(*capacities: float) -> Ledger:
    """A sheet with a verdict on a demand of 10 for each capacity."""
    book = Book()
    demand = book.given("M_u", 10.0)
    for number, capacity in enumerate(capacities, 1):
        book.verify(f"check {number}", demand, book.given("M_n", capacity, means=f"strength {number}"))
    return book.ledger


@pytest.mark.parametrize(
    ("before", "after", "turned", "failing"),
    [
        ((12.0,), (11.0,), 0, []),
        ((12.0,), (10.0,), 0, []),  # a ratio of 1 holds
        ((12.0,), (9.0,), 1, ["C-01/verdict"]),
        ((9.0,), (8.0,), 0, []),  # it failed before
        ((9.0,), (12.0,), 1, []),
        ((12.0,), (12.0, 9.0), 0, ["C-01/verdict.2"]),
        ((12.0,), (12.0, 12.5), 0, []),
        ((12.0, 9.0), (12.0,), 0, []),
    ],
)
def test_verdicts_that_turn_and_verdicts_that_fail_now(
    before: tuple[float, ...], after: tuple[float, ...], turned: int, failing: list[str]
) -> None:
    found = compare(judged(*before), judged(*after))
    assert (len(found.turned), ids(found.failing)) == (turned, failing)


def test_the_verdicts_that_rest_on_a_change_are_its_own_and_no_others() -> None:
    found = compare(judged(12.0, 13.0, 14.0), judged(12.0, 13.5, 14.0))
    assert only(found).verdicts == ("C-01/verdict.2",)
    demand = edited(judged(12.0, 13.0, 14.0), "C-01/M_u", value=9.0)
    assert only(compare(judged(12.0, 13.0, 14.0), demand)).verdicts == (
        "C-01/verdict", "C-01/verdict.2", "C-01/verdict.3",
    )  # fmt: skip


# The change as a number


@pytest.mark.parametrize(
    ("before", "after", "change", "percent"),
    [
        (4000.0, 3500.0, -500.0, -12.5),  # by hand: 500/4000 = 1/8
        (8.0, 10.0, 2.0, 25.0),
        (-8.0, -10.0, -2.0, -25.0),  # it became less
        (-8.0, 8.0, 16.0, 200.0),
        (0.0, 8.0, 8.0, None),
        (8.0, 0.0, -8.0, -100.0),
        (-1e308, 1e308, None, None),  # no number can hold it
        (1e-300, 1e300, 1e300, None),
    ],
)
def test_the_change_and_its_per_cent(before: float, after: float, change: float | None, percent: float | None) -> None:
    entry = beam(Book())["C-01/h"]
    moved = Change(replace(entry, value=before), replace(entry, value=after))
    assert (moved.change, moved.percent) == (change, percent)


def test_values_of_two_units_have_no_difference() -> None:
    entry = beam(Book())["C-01/h"]
    moved = Change(entry, replace(entry, unit="mm", value=508.0))
    assert (moved.change, moved.percent) == (None, None)


# Sheets


def on_sheets(**values: float) -> Ledger:
    book = Book()
    for sheet, value in values.items():
        book.sheet = sheet.replace("_", "-")
        book.given("h", value)
    return book.ledger


def test_sheets_added_dropped_and_changed() -> None:
    found = compare(on_sheets(C_01=1.0, C_02=2.0, C_03=3.0), on_sheets(C_03=3.0, C_01=1.5, A_01=4.0))
    assert found.sheets == (
        SheetChange("C-01", "changed"), SheetChange("A-01", "added"), SheetChange("C-02", "dropped"),
    )  # fmt: skip
    assert (ids(found.added), ids(found.dropped)) == (["A-01/h"], ["C-02/h"])


def test_a_sheet_with_another_subject_is_changed_and_its_values_stand() -> None:
    ledger = on_sheets(C_01=1.0, C_02=2.0)
    found = compare(
        ledger, ledger, {"C-01": "Columns", "C-02": "Walls"}, {"C-02": "Walls", "C-01": "Columns, levels 1 and 2"}
    )
    assert found.sheets == (SheetChange("C-01", "changed", "Columns", "Columns, levels 1 and 2"),)
    assert not found.is_empty


def test_a_subject_that_one_side_does_not_know_is_no_difference() -> None:
    ledger = on_sheets(C_01=1.0)
    assert compare(ledger, ledger, {"C-01": "Columns"}, {"C-01": ""}).is_empty
    assert compare(ledger, ledger, {"C-01": "Columns"}).is_empty


def test_a_sheet_without_values_counts_where_both_sides_list_their_sheets() -> None:
    ledger = on_sheets(C_01=1.0)
    with_notes = {"C-01": "Columns", "G-01": "Notes"}
    assert compare(ledger, ledger, {"C-01": "Columns"}, with_notes).sheets == (
        SheetChange("G-01", "added", "", "Notes"),
    )
    assert compare(ledger, ledger, with_notes, {"C-01": "Columns"}).sheets == (
        SheetChange("G-01", "dropped", "Notes", ""),
    )
    assert compare(ledger, ledger, None, with_notes).is_empty
    assert compare(ledger, ledger, with_notes, None).is_empty


def test_a_ledger_against_none() -> None:
    ledger = beam(Book())
    assert ids(compare(Ledger(), ledger).added) == ids(ledger)
    assert ids(compare(ledger, Ledger()).dropped) == ids(ledger)
    assert compare(Ledger(), Ledger()).is_empty


# Whatever the sheets


@given(programs)
def test_any_ledger_is_the_same_as_itself(program: tuple[Step, ...]) -> None:
    assert compare(run(program)[0].ledger, run(program)[0].ledger).is_empty


@given(programs, programs)
def test_what_is_added_one_way_is_dropped_the_other_way(one: tuple[Step, ...], other: tuple[Step, ...]) -> None:
    first, second = run(one)[0].ledger, run(other)[0].ledger
    forth, back = compare(first, second), compare(second, first)
    assert ids(forth.added) == ids(back.dropped)
    assert ids(forth.dropped) == ids(back.added)
    assert {(item.old.id, item.new.id) for item in forth.changed} == {
        (item.new.id, item.old.id) for item in back.changed
    }
    assert [sheet.state for sheet in forth.sheets] == [sheet.state for sheet in back.sheets]


@given(programs, st.data(), st.booleans())
def test_an_edited_given_is_the_one_change_and_its_dependants_follow(
    program: tuple[Step, ...], data: st.DataObject, front: bool
) -> None:
    """Also where a line inserted before everything shifts the ids."""
    assume(givens(program))
    index = data.draw(st.sampled_from(givens(program)))
    old, names = run(program, sourced=True)
    new, now = run(program, edited=index, front=front, sourced=True)
    found = compare(old.ledger, new.ledger)
    assert [(item.old.id, item.new.id, item.differs) for item in found.changed] == [
        (names[index], now[index], ("value",))
    ]
    assert set(ids(found.followed)) == new.ledger.above(now[index])
    assert (len(found.added), found.dropped) == (int(front), ())
    moved = {item.new.id for item in found.followed if item.moved}
    assert moved == {
        identifier
        for was, identifier in zip(names, now, strict=True)
        if identifier in new.ledger.above(now[index]) and not _alike(old.ledger[was], new.ledger[identifier])
    }
    verdicts = {name for name in new.ledger.above(now[index]) if new.ledger[name].kind == "verdict"}
    assert set(found.changed[0].verdicts) == verdicts


def _alike(before: Entry, after: Entry) -> bool:
    # Sums and products of small whole numbers: whatever differs differs by far more than noise.
    return abs(before.value - after.value) <= 1e-6 * abs(before.value) and before.verdict == after.verdict


@given(programs)
def test_a_line_put_before_everything_is_the_one_difference(program: tuple[Step, ...]) -> None:
    found = compare(run(program)[0].ledger, run(program, front=True)[0].ledger)
    assert (ids(found.added), found.dropped, found.changed, found.followed) == (["S/a"], (), (), ())


@given(programs, st.integers(0, 11))
def test_a_last_line_that_is_taken_away_is_dropped(program: tuple[Step, ...], keep: int) -> None:
    shorter = program[: max(1, keep)]
    found = compare(run(program)[0].ledger, run(shorter)[0].ledger)
    assert len(found.dropped) == len(program) - len(shorter)
    assert (found.added, found.changed, found.followed) == ((), (), ())


@pytest.mark.slow
def test_two_large_ledgers_are_compared_within_seconds() -> None:
    """30,000 entries of which most move: less than 3 s of one core."""

    def large(f_c: float) -> Ledger:
        book = Book("C-01")
        for number in range(60):
            book.sheet = f"C-{number}"
            strength = book.given("f_c", f_c, unit="psi")
            for row in range(100):
                h = book.given("h", 12.0 + row, source=f"S-401 (inputs/columns.csv, row {row + 2})")
                area = book.work("A_g", "h**2", {"h": h}, unit="in^2")
                P_o = book.work("P_o", "0.85*f_c*A_g", {"f_c": strength, "A_g": area}, unit="lb")
                P_n = book.work("P_n", "0.8*P_o", {"P_o": P_o}, unit="lb")
                book.verify("carries", area, P_n)
        return book.ledger

    old, new = large(4000.0), large(5000.0)
    start = time.process_time()
    found = compare(old, new)
    seconds = time.process_time() - start
    assert (len(old), len(found.changed), len(found.followed)) == (30_060, 60, 18_000)
    assert seconds < 3.0
