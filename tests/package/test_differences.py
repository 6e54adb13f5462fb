"""How a comparison reads: what comes first, what is left out and counted, and the JSON object."""

from __future__ import annotations

import json
import re
from dataclasses import replace
from typing import Any

import pytest
from comparison_samples import Book, beam

from calcpack.ledger import Ledger
from calcpack.package.compare import compare
from calcpack.package.differences import compare_json, compare_text
from calcpack.package.issued import Issued

OLD = Issued("record/issued/A", Ledger(), "26-044", "revision A, Plan review", {}, "aa")
NEW = Issued("draft", Ledger(), "26-044", "draft of revision B, Plan review", {}, "bb")


def text(old: Ledger, new: Ledger, everything: bool = False, **sheets: Any) -> list[str]:
    found = compare(old, new, sheets.get("old_sheets"), sheets.get("new_sheets"))
    return compare_text(found, OLD, NEW, everything).split("\n")


def schedule(strength: float, rows: int = 12, capacity: float = 1e6) -> Ledger:
    """A strength under many rows of a schedule: each has a depth, a worked strength and a verdict."""
    book = Book()
    f_c = book.given("f_c", strength, unit="psi", source="S-001, rev 1")
    demand = book.given("P_u", capacity, unit="lb")
    for row in range(rows):
        h = book.given("h", 10.0 + row, source=f"S-401 (inputs/columns.csv, row {row + 2})")
        P_n = book.work("P_n", "f_c*h**2", {"f_c": f_c, "h": h}, unit="lb", means=f"strength of C{row}")
        book.verify(f"C{row} carries", demand, P_n)
    return book.ledger


def test_no_difference() -> None:
    assert text(beam(Book()), beam(Book())) == [
        "old  record/issued/A  26-044, revision A, Plan review",
        "new  draft            26-044, draft of revision B, Plan review",
        "",
        "no difference: 6 values",
    ]


def test_what_is_not_known_of_a_package_is_left_out() -> None:
    found = compare(beam(Book()), beam(Book()))
    lines = compare_text(found, Issued("a.json", Ledger()), Issued("b.json", Ledger())).split("\n")
    assert lines[:2] == ["old  a.json", "new  b.json"]


def test_one_given() -> None:
    """The whole of it, as it reads: 17.5/40 = 0.4375 and 21.5/40 = 0.5375 by hand."""
    old, new = beam(Book()), beam(Book(), h=24.0, source="S-201, rev 2")
    old = Ledger(replace(entry, source="S-201, rev 1") if entry.id == "C-01/w" else entry for entry in old)
    new = Ledger(replace(entry, source="S-201, rev 1") if entry.id == "C-01/w" else entry for entry in new)
    assert text(old, new)[3:] == [
        "sheets:   1 changed",
        "values:   1 changed, 1 moved with what changed",
        "verdicts: 1 moved with what changed",
        "",
        "C-01",
        "  changed",
        "    C-01/h  20 in → 24 in  +20.0 %  meaning of h",
        "      source: S-201, rev 1 → S-201, rev 2",
        "      1 verdict rests on it: C-01/verdict",
        "  verdicts",
        "    C-01/verdict  0.4375 OK → 0.5375 OK  +22.9 %  depth fits",
        "  moved with what changed",
        "    C-01/d  17.5 in → 21.5 in  +22.9 %  effective depth",
    ]


def test_verdicts_that_turned_stand_first() -> None:
    """4,000 psi carry 1,000 kip from 16 in (15.8 in by hand), 3,000 psi from 19 in (18.3 in): C6 to C8 turn."""
    lines = text(schedule(4000.0), schedule(3000.0))
    head = lines[3 : lines.index("C-01") - 1]
    assert head[:3] == [
        "sheets:   1 changed",
        "values:   1 changed, 12 moved with what changed",
        "verdicts: 12 moved with what changed",
    ]
    assert [re.sub(r"  .*  ", "  ", line) for line in head[3:]] == [
        f"NG now: C-01/verdict.{number + 1}  C{number} carries" for number in (6, 7, 8)
    ]
    assert re.search(r"0\.977 OK → 1\.302 NG  \+33\.3 %", head[3])
    given = lines.index("  changed")
    assert lines[given + 1] == "    C-01/f_c  4,000 psi → 3,000 psi  −25.0 %  meaning of f_c"
    assert lines[given + 2] == (
        "      12 verdicts rest on it: C-01/verdict.7 OK → NG, C-01/verdict.8 OK → NG, C-01/verdict.9 OK → NG, "
        "C-01/verdict and 8 more"
    )
    verdicts = lines.index("  verdicts")
    assert ["OK → " in line and " NG " in line for line in lines[verdicts + 1 : verdicts + 4]] == [True] * 3


def test_a_verdict_that_holds_again_and_one_that_is_new() -> None:
    lines = text(schedule(3000.0, rows=8), schedule(4000.0, rows=8))
    assert [line[:22] for line in lines if line.startswith(("OK now", "NG"))] == [
        "OK now: C-01/verdict.7", "OK now: C-01/verdict.8",
    ]  # fmt: skip
    lines = text(schedule(4000.0, rows=0), schedule(4000.0, rows=1))
    assert "NG, added: C-01/verdict = 2.5 NG  C0 carries" in lines


def test_long_lists_are_cut_and_counted_and_all_lists_all() -> None:
    lines = text(schedule(4000.0, rows=30), schedule(4100.0, rows=30))
    for title in ("  verdicts", "  moved with what changed"):
        start = lines.index(title)
        assert lines[start + 11] == "    and 20 more"
    assert lines[-1] == "calcpack compare --all lists every value"
    full = text(schedule(4000.0, rows=30), schedule(4100.0, rows=30), everything=True)
    assert len([line for line in full if line.startswith("    C-01/verdict")]) == 30
    assert not any("more" in line and "rest" not in line for line in full)
    assert full[-1].startswith("    C-01/P_n")


@pytest.mark.parametrize(("rows", "cut"), [(10, False), (11, True)])
def test_a_list_of_ten_is_whole(rows: int, cut: bool) -> None:
    lines = text(schedule(4000.0, rows), schedule(4100.0, rows))
    assert ("    and 1 more" in lines) is cut
    assert lines[-1].startswith("calcpack compare --all") is cut


def test_every_verdict_that_turned_is_listed_however_many() -> None:
    old, new = schedule(4000.0, rows=30, capacity=3.9e5), schedule(1000.0, rows=30, capacity=3.9e5)
    turned = [line for line in text(old, new) if line.startswith("    C-01/verdict") and "NG" in line]
    # By hand: 390 kip at 4,000 psi need 9.9 in, at 1,000 psi 19.7 in: C0 (10 in) to C9 (19 in).
    assert len(turned) == 10
    more = [line for line in text(old, schedule(300.0, rows=30, capacity=3.9e5)) if line.startswith("    C-01/verdict")]
    # At 300 psi 36.1 in: C0 to C26 turn, and no other is listed.
    assert len(more) == 27


def test_what_moved_most_stands_first() -> None:
    old, new = Book(), Book()
    for book, value in ((old, 10.0), (new, 12.0)):
        a = book.given("a", value)
        book.work("b", "a + 100", {"a": a})
        book.work("c", "a*a", {"a": a})
        book.work("d", "a - 10", {"a": a})  # from zero: no percentage can be larger
    lines = text(old.ledger, new.ledger)
    start = lines.index("  moved with what changed")
    assert [line.split()[0] for line in lines[start + 1 :]] == ["C-01/d", "C-01/c", "C-01/b"]
    assert lines[start + 1] == "    C-01/d  0 in → 2 in  meaning of d"


def test_what_rests_on_a_change_and_stands_is_counted() -> None:
    old, new = Book(), Book()
    for book, psi in ((old, 1.5), (new, 1.4)):
        book.work("psi_te", "min(psi*1.3, 1.7)", {"psi": book.given("psi", psi, unit="")}, unit="")
    lines = text(old.ledger, new.ledger)
    assert "values:   1 changed, 1 rest on what changed and stand" in lines
    assert lines[-1] == "  1 more rest on what changed and stand as they were"


def test_every_field_that_differs_is_told() -> None:
    old, new = Book(), Book()
    for book, text_, clause, condition in ((old, "h - 2.5", "22.2", ""), (new, "h - 3", "22.4", "h > 12")):
        h = book.given("h", 20.0)
        book.work("d", text_, {"h": h}, clause=clause, condition=condition)
    lines = text(old.ledger, new.ledger)
    start = lines.index("  changed")
    assert lines[start + 1 :] == [
        "    C-01/d  17.5 in → 17 in  −2.86 %  meaning of d",
        "      clause: 22.2 → 22.4",
        "      expression: h - 2.5 → h - 3",
        "      condition: none → h > 12",
    ]


def test_a_change_that_leaves_the_value_shows_it_once() -> None:
    old, new = Book(), Book()
    old.given("h", 20.0, status="assumed")
    new.given("h", 20.0)
    assert text(old.ledger, new.ledger)[-2:] == [
        "    C-01/h  20 in  meaning of h", "      status: assumed → confirmed",
    ]  # fmt: skip


def test_a_given_that_is_worked_now_tells_both_origins() -> None:
    old, new = Book(), Book()
    old.given("P_u", 266.0, unit="kip")
    new.work("P_u", "1.4*P_D", {"P_D": new.given("P_D", 190.0, unit="kip")}, unit="kip")
    lines = text(old.ledger, new.ledger)
    start = lines.index("  changed")
    assert lines[start + 1 : start + 4] == [
        "    C-01/P_u  266 kip  meaning of P_u",
        "      was given: S-201, rev 1",
        "      is worked: 1.4*P_D [ACI 318-19 22.4.2.2]",
    ]


def test_a_line_that_takes_another_value_names_both() -> None:
    old, new = Book(), Book()
    for book, index in ((old, 0), (new, 1)):
        sides = [book.given("h", 16.0), book.given("h", 18.0)]
        book.work("d", "h - 2.5", {"h": sides[index]})
    assert "      h from: C-01/h → C-01/h.2" in text(old.ledger, new.ledger)


def test_an_id_that_shifted_is_named_with_the_old_one() -> None:
    old, new = Book(), Book()
    new.given("h", 30.0, source="S-301")
    for book, value in ((old, 16.0), (new, 18.0)):
        book.given("h", value)
    lines = text(old.ledger, new.ledger)
    assert "    C-01/h.2 (was C-01/h)  16 in → 18 in  +12.5 %  meaning of h" in lines
    assert lines[-2:] == ["  added", "    C-01/h = 30 in  meaning of h"]


def test_sheets_added_dropped_and_renamed() -> None:
    old, new = beam(Book()), beam(Book())
    book = Book("C-09")
    book.verify("fits", book.given("a", 1.0), book.given("b", 2.0))
    new = Ledger([*new, *book.ledger])
    subjects = {"C-01": "Beams"}, {"C-01": "Beams, level 2", "C-09": "Canopy"}
    lines = text(old, new, old_sheets=subjects[0], new_sheets=subjects[1])
    assert lines[3:] == [
        "sheets:   1 changed, 1 added",
        "values:   2 added",
        "verdicts: 1 added",
        "",
        "C-01  Beams → Beams, level 2",
        "",
        "C-09  Canopy  added",
        "  2 values, 1 verdict",
    ]
    lines = text(new, old, old_sheets=subjects[1], new_sheets=subjects[0])
    assert lines[3:6] == ["sheets:   1 changed, 1 dropped", "values:   2 dropped", "verdicts: 1 dropped"]
    assert lines[-2:] == ["C-09  Canopy  dropped", "  2 values, 1 verdict"]


def test_values_added_and_dropped_on_a_sheet() -> None:
    old, new = beam(Book()), Book()
    beam(new)
    new.given("b", 12.0)
    lines = text(old, new.ledger)
    assert lines[3:] == [
        "sheets:   1 changed",
        "values:   1 added",
        "verdicts: none",
        "",
        "C-01",
        "  added",
        "    C-01/b = 12 in  meaning of b",
    ]
    assert text(new.ledger, old)[-2:] == ["  dropped", "    C-01/b = 12 in  meaning of b"]


@pytest.mark.parametrize(("rows", "words"), [(1, "1 given otherwise"), (3, "3 givens otherwise")])
def test_rows_that_only_moved_are_counted(rows: int, words: str) -> None:
    old, new = Book(), Book()
    for book, first in ((old, 2), (new, 3)):
        for row in range(rows):
            book.given("h", 10.0 + row, source=f"S-401 (inputs/columns.csv, row {first + row})")
    assert text(old.ledger, new.ledger)[3:] == [
        f"no difference: {rows} value{'s' * (rows > 1)}", f"{words} the same in another row of the table",
    ]  # fmt: skip


# JSON


def as_json(old: Ledger, new: Ledger, *sheets: dict[str, str]) -> Any:
    made = compare_json(compare(old, new, *sheets), OLD, NEW)
    return json.loads(json.dumps(made, allow_nan=False))


def test_the_object_of_two_equal_packages() -> None:
    nothing: dict[str, Any] = {"added": [], "dropped": [], "changed": []}
    assert as_json(beam(Book()), beam(Book())) == {
        "old": {"path": "record/issued/A", "job": "26-044", "label": "revision A, Plan review", "ledger": "aa"},
        "new": {"path": "draft", "job": "26-044", "label": "draft of revision B, Plan review", "ledger": "bb"},
        "same": True,
        "sheets": nothing,
        "verdicts": {**nothing, "unmoved": []},
        "values": {**nothing, "unmoved": []},
        "shifted": [],
        "failing": [],
    }


def test_the_object_of_one_changed_given() -> None:
    data = as_json(beam(Book()), beam(Book(), h=24.1), {"C-01": "Beams"}, {"C-01": "Beams, level 2"})
    assert data["same"] is False
    assert data["sheets"]["changed"] == [{"id": "C-01", "subject": {"from": "Beams", "to": "Beams, level 2"}}]
    given, depth = data["values"]["changed"]
    assert given == {
        "id": "C-01/h", "was": "C-01/h", "sheet": "C-01", "kind": "given", "symbol": "h", "means": "meaning of h",
        "unit": "in", "cause": "own", "from": 20.0, "to": 24.1, "change": 24.1 - 20.0,
        "percent": 100 * ((24.1 - 20.0) / 20.0), "shown": {"from": "20 in", "to": "24.1 in"},
        "differs": {"value": {"from": 20.0, "to": 24.1}}, "verdicts": ["C-01/verdict"],
    }  # fmt: skip
    assert (depth["id"], depth["cause"], depth["differs"], depth["from"]) == ("C-01/d", "below", {}, 17.5)
    (verdict,) = data["verdicts"]["changed"]
    assert (verdict["from"], verdict["verdict"]) == (0.4375, {"from": "OK", "to": "OK"})  # 17.5/40 by hand


def test_the_object_names_what_fails_what_stands_and_what_shifted() -> None:
    old, new = Book(), Book()
    for book, a, row in ((old, 1.9, 2), (new, 2.5, 3)):
        given = book.given("a", a)
        cap = book.work("c", "min(a, 1)", {"a": given})
        book.given("h", 10.0, source=f"inputs/columns.csv, row {row}")
        book.verify("fits", given, book.given("b", 2.0))
        book.verify("is small", cap, cap)
    data = as_json(old.ledger, new.ledger)
    assert data["failing"] == ["C-01/verdict"]
    assert data["verdicts"]["unmoved"] == ["C-01/verdict.2"]
    assert data["values"]["unmoved"] == ["C-01/c"]
    assert data["shifted"] == ["C-01/h"]


def test_the_object_of_what_was_added_and_dropped() -> None:
    old, new = Book(), Book()
    old.given("a", 1.0)
    h = new.given("h", 20.0)
    new.verify("fits", h, h)
    data = as_json(old.ledger, new.ledger)
    assert data["values"]["dropped"] == [
        {
            "id": "C-01/a", "sheet": "C-01", "kind": "given", "symbol": "a", "means": "meaning of a", "value": 1.0,
            "unit": "in", "shown": "1 in", "source": "S-201, rev 1",
        }
    ]  # fmt: skip
    assert [entry["id"] for entry in data["values"]["added"]] == ["C-01/h"]
    assert [(entry["id"], entry["verdict"]) for entry in data["verdicts"]["added"]] == [("C-01/verdict", "OK")]


def test_the_object_of_a_line_that_takes_another_value() -> None:
    old, new = Book(), Book()
    for book, index in ((old, 0), (new, 1)):
        sides = [book.given("h", 16.0), book.given("h", 18.0)]
        book.work("d", "h - 2.5", {"h": sides[index]})
    (change,) = as_json(old.ledger, new.ledger)["values"]["changed"]
    assert change["differs"] == {"rests_on": {"from": {"h": "C-01/h"}, "to": {"h": "C-01/h.2"}}}
