"""Worked tables on a sheet: entries of the ledger, what is shown of them, and the copies for notebooks."""

from __future__ import annotations

import re
from collections.abc import Iterator
from dataclasses import replace
from pathlib import Path
from typing import Any

import pytest
from job_samples import GIVENS as LISTED
from job_samples import Shown, make_job
from nbconvert.filters.markdown_mistune import markdown2html_mistune
from table_samples import (
    BARS,
    DEPTHS,
    SHARED,
    float_rows,
    force,
    moment,
    running_rows,
    running_table,
    sheet_rows,
    state,
    stress,
)

from calcpack import Sheet, expression, notebook
from calcpack.carrying import leave, results_folder
from calcpack.errors import InputError, RangeError, SheetError
from calcpack.formula import formula
from calcpack.items import bundle, markdown, plain
from calcpack.ledger import Ledger, replay
from calcpack.members.pad import FloatPad, Pad
from calcpack.scheduled import SheetPad
from calcpack.tabulating import fixed_text
from calcpack.tabulation import Column, Tabulated, Tabulation, Worked
from calcpack.units import Force, Length
from calcpack.value import Value

# handcalcs calls names of pyparsing that are due to go.
pytestmark = pytest.mark.filterwarnings("ignore::DeprecationWarning")


@pytest.fixture(autouse=True)
def shown(monkeypatch: pytest.MonkeyPatch) -> Shown:
    return Shown(monkeypatch)


@pytest.fixture
def root(tmp_path: Path) -> Path:
    return make_job(tmp_path / "job", givens=LISTED)


@pytest.fixture
def sheet(root: Path) -> Sheet:
    return Sheet("C-01", "Bars", job=root)


@pytest.fixture
def bars(sheet: Sheet) -> Tabulated[Value]:
    shared = state(sheet)
    return sheet.tabulate(BARS, sheet_rows(sheet, shared), shared)


def cells(item: dict[str, Any], column: int) -> list[Any]:
    return [row["cells"][column] for row in item["rows"]]


def made_cells(item: dict[str, Any]) -> Iterator[dict[str, Any]]:
    for cell in [*(cell for row in item["rows"] for cell in row["cells"]), *item["totals"]]:
        if cell and cell["id"]:
            yield cell


# The ledger


def test_a_sheet_works_what_the_checks_in_bulk_work(bars: Tabulated[Value]) -> None:
    plain_bars = FloatPad().tabulate(BARS, float_rows(), SHARED)
    assert [{symbol: float(value) for symbol, value in row.items()} for row in bars.rows] == list(plain_bars.rows)
    assert {symbol: float(value) for symbol, value in bars.totals.items()} == plain_bars.totals


def test_every_worked_cell_is_an_entry(bars: Tabulated[Value]) -> None:
    entry = bars.rows[1]["eps_s"].entry
    assert (entry.id, entry.kind, entry.symbol, entry.sheet) == ("C-01/eps_s.2", "worked", "eps_s", "C-01")
    assert (entry.clause, entry.edition, entry.formula) == ("22.2.1.2", "ACI 318-19", "strain")
    assert entry.expression == "eps_cu * (c - d_s) / c"
    assert entry.where == {"eps_cu": "C-01/eps_cu", "c": "C-01/c", "d_s": "C-01/d_s.3"}
    assert (entry.means, entry.condition) == ("strain of a bar, compression positive, bar 2", "")
    # 0.003 (15 - 12)/15, by hand
    assert (entry.value, entry.unit, entry.shown) == (pytest.approx(0.0006), "", "0.0006000")


def test_the_rule_that_chose_a_line_is_kept_row_by_row(bars: Tabulated[Value]) -> None:
    stresses = [row["f_s"].entry for row in bars.rows]
    assert [entry.expression for entry in stresses] == ["f_y", *["E_s * eps_s"] * 3, "-f_y", "-f_y"]
    yielding, tension = stresses[0], stresses[5]
    assert yielding.condition == "abs(eps_s) >= f_y / E_s and eps_s > 0"
    assert yielding.where == {"f_y": "C-01/f_y", "eps_s": "C-01/eps_s", "E_s": "C-01/E_s"}
    assert tension.condition == "abs(eps_s) >= f_y / E_s and eps_s <= 0"
    assert (yielding.value, yielding.unit, yielding.shown) == (58_000.0, "psi", "58.00 ksi")
    assert tension.shown == "−58.00 ksi"


def test_an_own_value_may_be_arithmetic_with_an_entry_of_its_own(bars: Tabulated[Value]) -> None:
    entry = bars.rows[1]["d_s"].entry
    assert (entry.id, entry.kind, entry.clause, entry.edition) == ("C-01/d_s.3", "worked", "arithmetic", "")
    assert (entry.expression, entry.value) == ("d_s + 9 * c / 15", 12.0)  # 3 in and 9 in
    assert entry.where == {"d_s": "C-01/d_s", "c": "C-01/c"}
    assert entry.means == "depth of a bar from the extreme compression fibre, bar 2"
    assert bars.rows[0]["d_s"].entry.kind == bars.rows[5]["d_s"].entry.kind == "given"


def test_a_total_is_a_sum_of_entries(bars: Tabulated[Value]) -> None:
    entry = bars.totals["F_s_sum"].entry
    assert (entry.id, entry.symbol, entry.means) == ("C-01/F_s_sum", "F_s_sum", "sum of bar forces")
    assert entry.expression == "F_s_1 + F_s_2 + F_s_3 + F_s_4 + F_s_5 + F_s_6"
    assert entry.where["F_s_1"] == "C-01/F_s"
    assert entry.where["F_s_6"] == "C-01/F_s.6"
    # 58 + 17.4 + 0 - 29 - 58 - 58 kip, by hand
    assert (entry.value, entry.unit, entry.shown) == (pytest.approx(-69_600.0), "lb", "−69.60 kip")
    assert (entry.clause, entry.edition) == ("sum of a column", "")


def test_replay_gives_the_identical_numbers(sheet: Sheet, bars: Tabulated[Value]) -> None:
    done = replay(sheet.ledger.to_json())
    assert len(done) == 4 + 4 * 6 + 6 + 2  # depths, formulas, conditions, totals
    assert all(item.stated == item.replayed for item in done)
    assert len(list(Ledger.from_json(sheet.ledger.to_json()))) == len(sheet.ledger)
    for total in bars.totals.values():
        symbols = {symbol: sheet.ledger[found].value for symbol, found in total.entry.where.items()}
        assert expression.evaluate(total.entry.expression, symbols) == total.entry.value


def test_a_changed_row_changes_what_rests_on_it_and_nothing_else(root: Path) -> None:
    def hashes(depth: str) -> dict[str, str]:
        sheet = Sheet("C-01", "Bars", job=root)
        shared = state(sheet)
        rows: list[Any] = [
            (str(number), {"d_s": sheet.given("d_s", text, source="S-201"), "A_b": shared["A_b"]})
            for number, text in enumerate(("3 in", depth, "30 in"), 1)
        ]
        sheet.tabulate(BARS, rows, shared)
        return {entry.id: sheet.ledger.hash(entry.id) for entry in sheet.ledger}

    before, after = hashes("12 in"), hashes("13 in")
    changed = {identifier.removeprefix("C-01/") for identifier in before if before[identifier] != after[identifier]}
    assert changed == {"d_s.2", "eps_s.2", "f_s.2", "F_s.2", "M_Fx.2", "F_s_sum", "M_Fx_sum"}


def test_ids_go_on_from_what_the_sheet_has(sheet: Sheet) -> None:
    shared = state(sheet)
    for _ in range(2):
        made = sheet.tabulate(BARS, sheet_rows(sheet, shared), shared)
    assert made.rows[0]["F_s"].entry.id == "C-01/F_s.7"
    assert made.totals["F_s_sum"].entry.id == "C-01/F_s_sum.2"
    assert made.totals["F_s_sum"].entry.where["F_s_1"] == "C-01/F_s.7"


def test_a_cell_that_runs_again_forgets_the_table_it_made(sheet: Sheet, monkeypatch: pytest.MonkeyPatch) -> None:
    shared = state(sheet)
    rows: list[Any] = [("1", {"d_s": sheet.given("d_s", "3 in", source="S-201"), "A_b": shared["A_b"]})]
    for count in (1, 2):
        monkeypatch.setattr(notebook, "cell_key", lambda count=count: ("a", count))
        made = sheet.tabulate(BARS, rows, shared)
        assert made.rows[0]["F_s"].entry.id == "C-01/F_s"
    assert [value.entry.id for value in sheet.values("F_s")] == ["C-01/F_s"]


def test_blank_cells_and_totals_over_the_rows_that_have_the_value(sheet: Sheet, shown: Shown) -> None:
    areas = [sheet.given("A_b", f"{area} in^2", source="S-201") for area in (1, 2, 3)]
    f_s = sheet.given("f_s", "10 ksi", source="test")
    made = sheet.tabulate(running_table(totals={"S_u": "P_n"}), running_rows(areas), {"f_s": f_s})
    assert [sorted(row) for row in made.rows] == [["A_b", "F_s"], *[["A_b", "F_s", "S_above", "S_u"]] * 2]
    # 10 + 20, and 30 more, kip; both added once more
    assert [float(row["S_u"]) for row in made.rows[1:]] == [30_000.0, 60_000.0]
    assert made.totals["P_n"].entry.where == {"S_u_1": "C-01/S_u", "S_u_2": "C-01/S_u.2"}
    assert made.rows[1]["S_above"] is made.rows[0]["F_s"]
    assert made.rows[2]["S_u"].entry.where == {"S_above": "C-01/S_u", "F_s": "C-01/F_s.3"}
    assert cells(shown.last, 2) == [
        None,
        {"id": "", "text": "10.0", "link": "C-01/F_s", "sheet": ""},
        {"id": "", "text": "30.0", "link": "C-01/S_u", "sheet": ""},
    ]
    assert cells(shown.last, 3)[0] is None
    assert all(item.agrees for item in replay(sheet.ledger.to_json()))


def test_a_total_without_a_place_in_the_notation_table(sheet: Sheet) -> None:
    A_b, f_s = sheet.given("A_b", "2 in^2", source="S-201"), sheet.given("f_s", "10 ksi", source="test")
    table = Tabulation("Layer", "bar", (force,), (Column("F_s", 1),), {"F_s": "F_layer"})
    made = sheet.tabulate(table, [("1", {"A_b": A_b})], {"f_s": f_s})
    assert made.totals["F_layer"].entry.means == "sum of F_s: Layer"
    assert made.totals["F_layer"].dimension.name == "force"


def test_a_pad_of_a_sheet_and_a_pad_of_floats_take_the_same_table(sheet: Sheet) -> None:
    def work(pad: Pad[Any]) -> float:
        shared = {symbol: pad.given(symbol, value, "a value", "S-1") for symbol, value in SHARED.items()}
        rows: list[Any] = [
            (str(number), {"d_s": Worked(f"{depth}*c/15", {"c": shared["c"]}), "A_b": shared["A_b"]})
            for number, depth in enumerate(DEPTHS, 1)
        ]
        return pad.number(pad.tabulate(BARS, rows, shared).totals["M_Fx_sum"])

    assert work(SheetPad(sheet)) == work(FloatPad())


def test_later_workings_go_on_from_a_total(sheet: Sheet, bars: Tabulated[Value], shown: Shown) -> None:
    @formula("statics")
    def strength(*, C_c: Force, F_s_sum: Force) -> Force:
        """Axial strength."""
        P_n = C_c + F_s_sum
        return P_n

    C_c = sheet.given("C_c", "500 kip", source="test")
    entry = sheet.work(strength, C_c=C_c, F_s_sum=bars.totals["F_s_sum"]).entry
    assert entry.where["F_s_sum"] == "C-01/F_s_sum"
    assert ["−69.60 kip", "C-01/F_s_sum", ""] in shown.last["lines"][0]["values"]


# What is shown


@pytest.mark.usefixtures("bars")
def test_the_item_holds_equations_columns_and_cells(shown: Shown) -> None:
    item = shown.last
    assert (item["type"], item["title"], item["label"]) == ("tabulated", "Bars at the neutral axis", "bar")
    assert item["caption"] == "Strains, stresses and forces"
    assert [(line["symbol"], line["clause"], line["edition"]) for line in item["equations"]] == [
        ("eps_s", "22.2.1.2", "ACI 318-19"),
        *[("f_s", "20.2.2.1", "ACI 318-19")] * 3,
        ("F_s", "statics", ""),
        ("M_Fx", "statics", ""),
    ]
    assert [len(line["conditions"]) for line in item["equations"]] == [0, 1, 2, 2, 0, 0]
    assert [(column["symbol"], column["unit"]) for column in item["columns"]] == [
        ("d_s", "in"), ("A_b", "in²"), ("eps_s", ""), ("f_s", "ksi"), ("F_s", "kip"), ("M_Fx", "kip·in"),
    ]  # fmt: skip
    assert [row["label"] for row in item["rows"]] == ["1", "2", "3", "4", "5", "6"]
    assert [cell["text"] for cell in cells(item, 4)] == ["58.00", "17.40", "0.00", "−29.00", "−58.00", "−58.00"]
    assert item["totals"][:4] == [None] * 4
    assert item["totals"][5] == {
        "id": "C-01/M_Fx_sum", "text": "2,238.8", "link": "", "sheet": "", "symbol": "M_Fx_sum", "room": "",
    }  # fmt: skip


@pytest.mark.usefixtures("bars")
def test_each_entry_stands_in_one_cell_and_givens_are_linked_to(shown: Shown) -> None:
    item = shown.last
    found = [cell["id"] for cell in made_cells(item)]
    assert found[:6] == [
        "C-01/eps_s", "C-01/f_s", "C-01/F_s", "C-01/M_Fx", "C-01/d_s.3", "C-01/eps_s.2",
    ]  # fmt: skip
    assert found[-2:] == ["C-01/F_s_sum", "C-01/M_Fx_sum"]
    assert found == [entry["id"] for entry in item["entries"]]
    assert cells(item, 0)[0] == {"id": "", "text": "3.00", "link": "C-01/d_s", "sheet": ""}
    assert cells(item, 0)[5] == {"id": "", "text": "30.00", "link": "C-01/d_s.2", "sheet": ""}
    assert cells(item, 1)[3] == {"id": "", "text": "1.00", "link": "C-01/A_b", "sheet": ""}


@pytest.mark.usefixtures("bars")
def test_an_entry_is_shown_as_its_cell_with_the_unit(shown: Shown) -> None:
    units = [column["unit"] for column in shown.last["columns"]]
    known = {entry["id"]: entry["shown"] for entry in shown.last["entries"]}
    for row in [*(row["cells"] for row in shown.last["rows"]), shown.last["totals"]]:
        for cell, unit in zip(row, units, strict=True):
            if cell and cell["id"]:
                assert known[cell["id"]] == f"{cell['text']} {unit}".strip()


@pytest.mark.parametrize(
    ("parts", "decimals", "text", "room"),
    [
        # The cells print 1.3, 1.3, …; the sum of three is 4.0 where the cells add up to 3.9, of four 5.4 against 5.2.
        ([1.34] * 3, 1, "4.0", ""),
        ([1.34] * 4, 1, "5", ".0"),
        ([1.34] * 20, 1, "27", ".0"),  # 26.8 against 26.0
        # 8.4 against 6: whole numbers cannot show less
        ([1.4] * 6, 0, "8", ""),
        # 4 × 0.126 prints as 4 × 0.13: 0.504 against 0.52; in tenths both give 0.5
        ([0.126] * 4, 2, "0.5", "0"),
        ([1.34, -1.34, 2.0], 1, "2.0", ""),
    ],
)
def test_a_sum_shows_no_more_than_its_printed_cells_add_up_to(
    sheet: Sheet, shown: Shown, parts: list[float], decimals: int, text: str, room: str
) -> None:
    rows: list[Any] = [
        (str(number), {"F_s": sheet.given("F_s", f"{part} kip", source="test")}) for number, part in enumerate(parts, 1)
    ]
    table = Tabulation("Forces", "bar", (), (Column("F_s", decimals),), {"F_s": "P_n"})
    made = sheet.tabulate(table, rows, {})
    assert (shown.last["totals"][0]["text"], shown.last["totals"][0]["room"]) == (text, room)
    assert made.totals["P_n"].entry.shown == f"{text} kip"
    assert float(made.totals["P_n"]) == pytest.approx(1000 * sum(parts))


def test_without_totals_there_is_no_foot(sheet: Sheet, shown: Shown) -> None:
    shared = state(sheet)
    sheet.tabulate(replace(BARS, totals={}), sheet_rows(sheet, shared), shared)
    assert shown.last["totals"] == []


def test_a_value_of_another_sheet_names_it(root: Path, shown: Shown) -> None:
    materials = Sheet("M-01", "Materials", job=root)
    materials.given("A_b", "0.79 in^2", source="ASTM A615")
    leave(results_folder(root), "M-01", materials.ledger, list(materials.ledger))
    sheet = Sheet("C-01", "Bars", job=root)
    A_b, f_s = sheet.carry("M-01", "A_b"), sheet.given("f_s", "10 ksi", source="test")
    table = Tabulation("Force", "bar", (force,), (Column("A_b", 2), Column("F_s", 2)))
    sheet.tabulate(table, [("1", {"A_b": A_b})], {"f_s": f_s})
    assert cells(shown.last, 0) == [{"id": "", "text": "0.79", "link": "M-01/A_b", "sheet": "M-01"}]


@pytest.mark.parametrize(
    ("value", "decimals", "text"),
    [  # common practice: ties to the even digit, no minus before nothing, thousands apart
        (0.0, 2, "0.00"), (-0.0, 2, "0.00"), (-0.004, 2, "0.00"), (-0.006, 2, "−0.01"), (0.125, 2, "0.12"),
        (0.135, 2, "0.14"), (2.5, 0, "2"), (-3.5, 0, "−4"), (1234.5678, 1, "1,234.6"), (-1234567.0, 0, "−1,234,567"),
        (999.996, 2, "1,000.00"), (0.1 + 0.2, 9, "0.300000000"), (1e-12, 3, "0.000"), (1e21, 0, "1" + ",000" * 7),
    ],
)  # fmt: skip
def test_fixed_decimals(value: float, decimals: int, text: str) -> None:
    assert fixed_text(value, decimals) == text


# The copies for notebooks


@pytest.mark.usefixtures("bars")
def test_a_plain_copy_reads_as_a_table(shown: Shown) -> None:
    lines = plain(shown.last).splitlines()
    assert lines[0] == "Bars at the neutral axis  [ACI 318-19 22.2.1.2; ACI 318-19 20.2.2.1; statics]"
    assert lines[1] == "  εs = εcu · (c − ds)/c"
    assert lines[2] == "  fs = Es εs  where |εs| < fy/Es"
    assert lines[3] == "  fs = fy  where |εs| ≥ fy/Es, and εs > 0"
    assert lines[7] == "Strains, stresses and forces"
    assert lines[8].split("  ")[0] == "bar"
    assert lines[10].split() == ["2", "12.00", "1.00", "0.0006000", "17.40", "17.40", "78.3"]
    assert len({len(line) for line in lines[8:14]}) == 1
    assert lines[-1].split()[0] == "Sum"
    assert re.search(r"= −69\.60  .* = 2,238\.8$", lines[-1])


@pytest.mark.usefixtures("bars")
def test_a_markdown_copy_is_one_table_with_its_equations(shown: Shown) -> None:
    text = markdown(shown.last)
    html = markdown2html_mistune(text)
    assert html.count("<table>") == 1
    assert html.count("<tr>") == 1 + 6 + 1
    assert text.count("$$") == 2
    assert text.count(r"\text{where }") == 3
    assert text.count(r"\text{, and }") == 2
    assert "$f_{s}$, ksi" in text
    assert "**Sum**" in text
    assert r"= **−69.60**" in text
    assert set(bundle(shown.last)) == {
        "application/vnd.calcpack.item+json", "text/markdown", "text/plain",
    }  # fmt: skip


def test_a_table_without_formulas_is_arithmetic(sheet: Sheet, shown: Shown) -> None:
    b = sheet.given("b", "16 in", source="S-201")
    sheet.tabulate(Tabulation("Depths", "row", (), (Column("y", 1),)), [("a", {"y": Worked("0.5*b", {"b": b})})], {})
    assert plain(shown.last).splitlines() == ["Depths  [arithmetic]", "row  y, in", "a      8.0"]
    assert "$$" not in markdown(shown.last)


def test_no_text_of_the_author_becomes_markup(sheet: Sheet, shown: Shown) -> None:
    nasty = "<script>x</script> | $y$ *b* `c` [a](b)\n# d"
    b = sheet.given("b", "16 in", source="S-201")
    table = Tabulation(nasty, nasty, (), (Column("y", 1),), caption=nasty)
    sheet.tabulate(table, [(nasty, {"y": Worked("0.5*b", {"b": b})})], {})
    html = markdown2html_mistune(markdown(shown.last))
    assert html.count("<tr>") == 2
    assert not re.search(r"<(script|em>|a |h1|code)", html.replace("<em>", "", 1))


# What is refused


def refused(sheet: Sheet, error: type[InputError], message: str, table: Tabulation, *work: Any) -> InputError:
    """The error, after which the sheet is as it was."""
    before = len(sheet.ledger)
    with pytest.raises(error, match=message) as caught:
        sheet.tabulate(table, *work)
    assert len(sheet.ledger) == before
    assert caught.value.where == "sheet C-01"
    return caught.value


FORCE = Tabulation("Force", "bar", (force,), (Column("F_s", 1),))


def test_raw_numbers_are_refused_wherever_they_stand(sheet: Sheet) -> None:
    f_s: Any = 10_000.0
    rows: Any = [("1", {"A_b": 1.0}), ("2", {"A_b": Worked("2*b", {"b": 1.0})})]
    error = refused(
        sheet, SheetError, r"A_b = 1.0 +a value of the ledger: sheet.given\('A_b'", FORCE, rows, {"f_s": f_s}
    )
    assert [(problem.given, problem.where) for problem in error.problems] == [
        ("f_s = 10000.0", "shared"), ("A_b = 1.0", "row 1"), ("b = 1.0", "row 2"),
    ]  # fmt: skip


@pytest.mark.parametrize(
    ("columns", "message"),
    [
        ((Column("F_s", 1, "in"),), r"column F_s in in  a unit of a force: e.g. kip"),
        ((Column("F_s", 1, "furlong"),), r"column F_s in furlong  .*write the unit as in calcpack/units.txt"),
    ],
)
def test_a_unit_that_does_not_fit(sheet: Sheet, columns: tuple[Column, ...], message: str) -> None:
    shared = state(sheet)
    refused(sheet, SheetError, message, replace(FORCE, columns=columns), [("1", {})], shared)


def test_a_unit_that_fits(sheet: Sheet) -> None:
    A_b, f_s = sheet.given("A_b", "2 in^2", source="S-201"), sheet.given("f_s", "10 ksi", source="test")
    table = replace(FORCE, columns=(Column("F_s", 0, "lb"),))
    made = sheet.tabulate(table, [("1", {"A_b": A_b})], {"f_s": f_s})
    assert made.rows[0]["F_s"].entry.shown == "20,000 lb"


def test_arithmetic_states_a_symbol_of_the_notation_table(sheet: Sheet) -> None:
    b = sheet.given("b", "16 in", source="S-201")
    table = Tabulation("Depths", "row", (), (Column("y_mine", 1),))
    rows: Any = [("a", {"y_mine": Worked("0.5*b", {"b": b})})]
    refused(sheet, SheetError, r"y_mine = '0.5\*b'  a symbol of the notation table: .*\[row a\]", table, rows, {})


def test_values_of_another_dimension(sheet: Sheet) -> None:
    shared = state(sheet)
    b = sheet.given("b", "16 in", source="S-201")
    refused(sheet, SheetError, r"A_b = 16 in  an area  \[bar 1\]", FORCE, [("1", {"A_b": b})], {"f_s": shared["f_y"]})
    depths = Tabulation("Depths", "row", (), (Column("y", 1),))
    rows: Any = [("a", {"y": b}), ("b", {"y": shared["A_b"]})]
    refused(sheet, SheetError, r"y = 1.00 in²  a length  \[row b\]", depths, rows, {})


def test_a_total_of_another_dimension(sheet: Sheet) -> None:
    shared = state(sheet)
    table = replace(FORCE, totals={"F_s": "M_Fx_sum"})
    refused(sheet, SheetError, r"total M_Fx_sum of F_s  a force; M_Fx_sum is a moment", table, [("1", {})], shared)


def test_what_the_table_itself_lacks(sheet: Sheet) -> None:
    shared = state(sheet)
    refused(sheet, InputError, r"no rows  one row or more", FORCE, [], shared)
    refused(sheet, InputError, r"force lacks f_s  a value in a row", FORCE, [("1", {})], shared)
    unknown = replace(FORCE, columns=(Column("F_s", 1), Column("f_c", 1)))
    refused(sheet, InputError, r"column f_c  a value of the rows", unknown, [("1", {})], shared)
    refused(sheet, InputError, r"a formula: put @formula", replace(FORCE, formulas=(len,)), [("1", {})], shared)


def test_a_value_out_of_range_names_its_row(sheet: Sheet) -> None:
    shared = state(sheet)
    zero = sheet.given("A_b", "0 in^2", source="test")
    rows: Any = [("1", {"A_b": shared["A_b"]}), ("2", {"A_b": zero})]
    refused(sheet, RangeError, r"A_b = 0 in\^2 .*\[bar 2\]\nsheet C-01$", FORCE, rows, {"f_s": shared["f_y"]})


def test_a_formula_of_the_other_edition_is_refused_once(sheet: Sheet) -> None:
    from calcpack.aci318.standards import ACI_318_14

    @formula(ACI_318_14("1.1"))
    def old(*, d_s: Length) -> Length:
        """An older one."""
        y = 2 * d_s
        return y

    d_s = sheet.given("d_s", "3 in", source="S-201")
    table = Tabulation("Old", "bar", (old,), (Column("y", 1),))
    error = refused(sheet, SheetError, r"old of ACI 318-14 1\.1", table, [("1", {"d_s": d_s}), ("2", {"d_s": d_s})], {})
    assert len(error.problems) == 1


def test_formulas_of_both_editions_cite_the_jobs(tmp_path: Path, shown: Shown) -> None:
    from job_samples import JOB

    older = Sheet("C-01", "Bars", job=make_job(tmp_path / "old", toml=JOB.replace("318-19", "318-14")))
    shared = state(older)
    eps_s = older.given("eps_s", 0.001, source="test")
    table = Tabulation("Stress", "bar", (stress,), (Column("f_s", 1, "ksi"),))
    assert older.tabulate(table, [("1", {"eps_s": eps_s})], shared).rows[0]["f_s"].entry.edition == "ACI 318-14"
    assert {line["edition"] for line in shown.last["equations"]} == {"ACI 318-14"}


def test_moments_take_the_display_unit_of_their_dimension(sheet: Sheet, shown: Shown) -> None:
    shared = state(sheet)
    F_s, d_s = sheet.given("F_s", "12 kip", source="test"), sheet.given("d_s", "4.5 in", source="test")
    table = Tabulation("Moment", "bar", (moment,), (Column("M_Fx", 2),))
    made = sheet.tabulate(table, [("1", {"F_s": F_s, "d_s": d_s})], shared)
    assert made.rows[0]["M_Fx"].entry.shown == "12.00 kip·ft"  # 12 kip at 16.5 in - 4.5 in
    assert shown.last["columns"] == [{"symbol": "M_Fx", "unit": "kip·ft"}]
