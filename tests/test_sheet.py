"""What an author writes: givens, workings, verdicts and what is printed beside them."""

from __future__ import annotations

from pathlib import Path
from types import SimpleNamespace
from typing import Any

import pytest
from job_samples import ANCHORAGE, GIVENS, Shown, axial, casting, make_job, twice

from calcpack import Sheet, notebook
from calcpack.aci318 import development, editions, hooks
from calcpack.carrying import leave, results_folder
from calcpack.errors import LayoutError, LedgerError, NeedsSheet, RangeError, SheetError, TableError, UnitError
from calcpack.formula import Limit, Standard, formula
from calcpack.ledger import replay
from calcpack.units import Area, Length, Ratio
from calcpack.value import Value

SOURCE = "S-001, note 4, rev 2"


@pytest.fixture
def root(tmp_path: Path) -> Path:
    return make_job(tmp_path / "job", givens=GIVENS, anchorage=ANCHORAGE)


@pytest.fixture(autouse=True)
def shown(monkeypatch: pytest.MonkeyPatch) -> Shown:
    return Shown(monkeypatch)


@pytest.fixture
def sheet(root: Path) -> Sheet:
    return Sheet("C-01", "Columns", job=root)


@pytest.fixture
def column(sheet: Sheet) -> Sheet:
    """A sheet with what the axial strength asks for."""
    sheet.given("f_c", "4 ksi", source=SOURCE)
    sheet.given("f_y", "60 ksi", source=SOURCE)
    sheet.given("A_g", "256 in^2", source="S-401")
    sheet.given("A_st", "6.32 in^2", source="S-401")
    return sheet


def replayed(sheet: Sheet) -> int:
    """How many lines of the sheet were worked again from its entries alone, all of them with the stated result."""
    done = replay(entry.to_json() for entry in sheet.ledger)
    assert [item for item in done if not item.agrees] == []
    return len(done)


# Sheet


@pytest.mark.usefixtures("sheet")
def test_a_sheet_shows_its_title_and_what_it_read(shown: Shown) -> None:
    assert shown.items[0] == {
        "type": "sheet", "entries": [], "id": "C-01", "subject": "Columns", "concrete": "ACI 318-19",
        "reads": [["job codes", "Codes(building='IBC 2021', concrete='ACI 318-19', loads='ASCE 7-16')"]],
    }  # fmt: skip


def test_the_job_is_found_above_the_notebook(root: Path, monkeypatch: pytest.MonkeyPatch) -> None:
    monkeypatch.chdir(root / "sheets")
    assert Sheet("L-01", "Loads").given("q_allow").entry.sheet == "L-01"


@pytest.mark.parametrize("identifier", ["", "C 01", "-1", "../x", "é1", "C" * 17, "C/1", '"<b>'])
def test_an_id_that_cannot_stand_in_a_title_block(root: Path, identifier: str) -> None:
    with pytest.raises(SheetError, match=r"an id like C-01 and a subject: give both"):
        Sheet(identifier, "Columns", job=root)


@pytest.mark.parametrize("identifier", ["1", "C-01", "A.2-b", "C" * 16])
def test_ids_that_can(root: Path, identifier: str) -> None:
    assert Sheet(identifier, "Columns", job=root).id == identifier


def test_a_sheet_needs_a_subject_and_a_job(root: Path, tmp_path: Path) -> None:
    with pytest.raises(SheetError, match="an id like C-01 and a subject"):
        Sheet("C-01", " \n", job=root)
    (tmp_path / "elsewhere").mkdir()
    with pytest.raises(TableError, match=r"is not in a job folder .*calcpack start"):
        Sheet("C-01", "Columns", job=tmp_path / "elsewhere")


# Givens


def test_a_given_is_kept_coherent_and_shown_as_written(sheet: Sheet, shown: Shown) -> None:
    value = sheet.given("f_c", "4 ksi", source=SOURCE)
    entry = value.entry
    assert (entry.id, entry.kind, entry.value, entry.unit) == ("C-01/f_c", "given", 4000.0, "psi")
    assert (entry.shown, entry.source, entry.status, entry.sheet) == ("4 ksi", SOURCE, "confirmed", "C-01")
    assert entry.means == "specified compressive strength of concrete"
    assert shown.last["entries"] == [entry.to_json()]
    assert (shown.last["id"], shown.last["shown"], shown.last["source"]) == ("C-01/f_c", "4 ksi", SOURCE)
    assert float(value) == 4000.0
    assert str(value) == "f_c = 4 ksi"


def test_a_given_in_another_unit_than_it_is_written_in(sheet: Sheet) -> None:
    # 1 ft is 12 in, by definition
    assert sheet.given("L_1", "30 in", "span", source="S-1", unit="ft").entry.shown == "2.5 ft"


def test_a_symbol_of_the_authors_own_takes_the_dimension_of_its_unit(sheet: Sheet) -> None:
    assert sheet.given("q_mud", "3 psi", "mud", source="GR-7").dimension.name == "stress or pressure"


def test_a_symbol_given_twice_has_two_ids(sheet: Sheet) -> None:
    ids = [sheet.given("L_1", f"{n} ft", "span", source="S-1").entry.id for n in (1, 2, 3)]
    assert ids == ["C-01/L_1", "C-01/L_1.2", "C-01/L_1.3"]
    assert [float(value) for value in sheet.values("L_1")] == [12.0, 24.0, 36.0]


def test_the_hash_follows_the_content_and_not_the_place(root: Path) -> None:
    def digest(identifier: str = "C-01", value: str = "4 ksi", source: str = SOURCE) -> str:
        made = Sheet(identifier, "Columns", job=root)
        return made.ledger.hash(made.given("f_c", value, source=source).entry.id)

    assert digest() == digest("C-02") == digest(value="4000 psi")
    assert len({digest(), digest(value="4.5 ksi"), digest(source="S-001, note 4, rev 3")}) == 3


@pytest.mark.parametrize(
    ("arguments", "message"),
    [
        ({"source": ""}, r"f_c without a source  where it comes from: source='S-001, note 4, rev 2'"),
        ({"source": "  \t"}, r"f_c without a source"),
        ({"status": "guessed"}, r"f_c: status 'guessed'  confirmed or assumed"),
        ({"symbol": "my value"}, r"symbol 'my value' +letters, digits and _, as in code: e.g. 'w_u'"),
        ({"symbol": "q_mud", "value": "1 psi"}, r"q_mud without a meaning  what it is, in words: means='…'"),
    ],
)
def test_a_given_without_what_it_needs(sheet: Sheet, arguments: dict[str, str], message: str) -> None:
    with pytest.raises(SheetError, match=message) as caught:
        sheet.given(**{"symbol": "f_c", "value": "4 ksi", "source": SOURCE, **arguments})
    assert caught.value.where == "sheet C-01"
    assert len(sheet.ledger) == 0


def test_everything_wrong_with_a_given_at_once(sheet: Sheet) -> None:
    with pytest.raises(SheetError) as caught:
        sheet.given("a b", "4 ksi", status="?")
    assert len(caught.value.problems) == 4


@pytest.mark.parametrize(
    ("value", "message"),
    [
        ("4 in", r"f_c = 4 in \(length\) +a stress or pressure: write it in psi"),
        ("4", r"f_c = 4 \(no unit\) +a stress or pressure: add the unit, e.g. psi"),
        (4000.0, r"f_c = 4000.0 \(no unit\) +a stress or pressure"),
        ("4 furlong^2", r"unit"),
        ("four ksi", r"f_c = 'four ksi' +a number with its unit"),
        (float("nan"), r"f_c = nan +a finite number"),
        ([4], r"f_c = \[4\]"),
    ],
)
def test_a_given_of_the_wrong_kind_names_sheet_and_remedy(sheet: Sheet, value: object, message: str) -> None:
    with pytest.raises(UnitError, match=message) as caught:
        sheet.given("f_c", value, source=SOURCE)
    assert caught.value.where == "sheet C-01"


@pytest.mark.parametrize("unit", ["ft", "bogus"])
def test_a_given_cannot_be_shown_in_a_unit_of_another_dimension(sheet: Sheet, unit: str) -> None:
    with pytest.raises(UnitError, match=unit) as caught:
        sheet.given("f_c", "4 ksi", source=SOURCE, unit=unit)
    assert caught.value.where == "sheet C-01"
    assert len(sheet.ledger) == 0


def test_a_given_of_the_list(sheet: Sheet, shown: Shown) -> None:
    value = sheet.given("q_allow")
    assert value.entry.value == pytest.approx(4000 / 144)  # 1 ft is 12 in
    assert (value.entry.status, value.entry.source) == ("assumed", "Geotechnical report GR-7 rev 1, table 3")
    assert value.entry.shown == "4.0 kip/ft²"
    ((key, digest),) = shown.last["reads"]
    assert key == "givens q_allow"
    assert len(digest) == 64


def test_a_given_that_is_not_listed_names_those_that_are(sheet: Sheet) -> None:
    with pytest.raises(SheetError, match=r"q_bear without a value  one of inputs/givens.toml \(q_allow, h_below\)"):
        sheet.given("q_bear")


def test_without_a_list_the_message_says_so(tmp_path: Path) -> None:
    bare = Sheet("C-01", "Columns", job=make_job(tmp_path / "bare"))
    with pytest.raises(SheetError, match=r"\(which lists none\): list it there, or write value, means and source here"):
        bare.given("q_allow")


# Workings


def test_arguments_are_taken_by_symbol(column: Sheet, shown: Shown) -> None:
    """B3: each line cites its clause and edition."""
    value = column.work(axial)
    # by hand: 0.85 (4) (256 - 6.32) + 60 (6.32) = 848.912 + 379.2 = 1,228.112 kip
    assert float(value) == pytest.approx(1_228_112.0, rel=1e-12)
    entry = value.entry
    assert (entry.id, entry.kind, entry.unit, entry.shown) == ("C-01/P_o", "worked", "lb", "1,228 kip")
    assert (entry.clause, entry.edition, entry.formula) == ("22.4.2.2", "ACI 318-19", "axial")
    assert entry.expression == "0.85 * f_c * (A_g - A_st) + f_y * A_st"
    assert entry.where == {symbol: f"C-01/{symbol}" for symbol in ("f_c", "A_g", "A_st", "f_y")}
    assert entry.condition == ""
    assert replayed(column) == 1
    assert shown.last["title"] == "Nominal axial strength at zero eccentricity"
    assert [line["id"] for line in shown.last["lines"]] == ["C-01/P_o"]


def test_a_rule_states_the_condition_that_held(sheet: Sheet) -> None:
    for depth, factor, condition in (("15 in", 1.3, "h_below > 12"), ("12 in", 1.0, "h_below <= 12")):
        h_below = sheet.given("h_below", depth, source="S-301")
        entry = sheet.work(casting, h_below=h_below).entry
        assert (entry.value, entry.condition) == (factor, condition)
        assert entry.where == {"h_below": h_below.entry.id}
    assert replayed(sheet) == 4  # two lines, two conditions


def test_lines_between_are_entries_of_their_own(sheet: Sheet, shown: Shown) -> None:
    sheet.given("L_1", "5 ft", "span", source="S-1")
    last = sheet.work(twice)
    middle = sheet.ledger["C-01/L_2"]
    assert (middle.value, middle.clause, last.entry.value) == (120.0, "geometry", 180.0)  # 2 × 5 ft, 3 × 5 ft
    assert last.entry.where == {"L_2": "C-01/L_2", "L_1": "C-01/L_1"}
    assert [entry["id"] for entry in shown.last["entries"]] == ["C-01/L_2", "C-01/L_3"]
    assert [float(value) for value in sheet.values("L_2")] == [120.0]


def test_the_same_working_twice(column: Sheet) -> None:
    assert [column.work(axial).entry.id for _ in range(2)] == ["C-01/P_o", "C-01/P_o.2"]


def test_everything_missing_at_once(sheet: Sheet) -> None:
    sheet.given("f_c", "4 ksi", source=SOURCE)
    with pytest.raises(SheetError, match=r"^axial\n") as caught:
        sheet.work(axial)
    assert [problem.given for problem in caught.value.problems] == [
        "A_g is missing",
        "A_st is missing",
        "f_y is missing",
    ]
    assert caught.value.problems[0].remedy == "sheet.given('A_g', …), or pass A_g=…"
    assert caught.value.where == "sheet C-01"


def test_a_symbol_set_twice_has_to_be_chosen(column: Sheet) -> None:
    second = column.given("f_c", "5 ksi", source=SOURCE)
    with pytest.raises(SheetError, match=r"f_c is set 2 times on this sheet  one: pass f_c=…"):
        column.work(axial)
    assert column.work(axial, f_c=second).entry.where["f_c"] == "C-01/f_c.2"


@pytest.mark.parametrize("number", [4000.0, 4000, "4 ksi", None])
def test_a_raw_number_is_refused(column: Sheet, number: Any) -> None:
    with pytest.raises(SheetError, match=r"a value of the ledger: sheet.given\('f_c', …, source='…'\) first"):
        column.work(axial, f_c=number)


def test_a_value_of_another_dimension_is_refused(column: Sheet) -> None:
    with pytest.raises(SheetError, match=r"f_c = 256 in²  a stress or pressure"):
        column.work(axial, f_c=column.values("A_g")[0])


def test_an_argument_the_formula_does_not_have(column: Sheet) -> None:
    with pytest.raises(SheetError, match=r"g_c = f_c = 4 ksi +arguments are f_c, A_g, A_st, f_y"):
        column.work(axial, g_c=column.values("f_c")[0])


def test_a_function_that_is_no_formula(column: Sheet) -> None:
    def plain(f_c: float) -> float:
        return f_c

    with pytest.raises(SheetError, match=r"plain.*a formula.*@formula"):
        column.work(plain)  # type: ignore[arg-type]


def test_a_range_error_carries_the_sheet_and_the_cell(column: Sheet, monkeypatch: pytest.MonkeyPatch) -> None:
    @formula("test", limits=(Limit("A_st", "office practice", 10.0),))
    def steel(*, A_st: Area) -> Area:
        """Steel."""
        A_s: Area = 2 * A_st
        return A_s

    monkeypatch.setattr(notebook, "cell_name", lambda: "cell [7]")
    with pytest.raises(RangeError, match=r"A_st = 6.32 in\^2 +allowed 10 in\^2 and up \(office practice\)") as caught:
        column.work(steel)
    assert caught.value.where == "sheet C-01, cell [7]"
    assert "C-01/A_s" not in column.ledger


def test_a_formula_of_the_other_edition_is_refused(sheet: Sheet) -> None:
    other = editions.edition("ACI 318-14").hook
    assert other is not sheet.code.hook
    with pytest.raises(SheetError, match=r"of ACI 318-14 25\.4\.3\.1.* +ACI 318-19, the job's edition: use sheet.code"):
        sheet.work(other, **{name: _any(sheet, name, other) for name in other.arguments})


def _any(sheet: Sheet, name: str, used: Any) -> Value:
    dimension = used.arguments[name]
    stress = "60 ksi" if name == "f_y" else "4 ksi"
    number = {"stress or pressure": stress, "length": "1 in", "area": "1 in^2"}.get(dimension.name, 1.0)
    return sheet.given(name, number, "a value", source="test")


def test_a_formula_of_both_editions_cites_the_jobs(tmp_path: Path, shown: Shown) -> None:
    from job_samples import JOB

    older = Sheet("C-01", "Columns", job=make_job(tmp_path / "old", toml=JOB.replace("318-19", "318-14")))
    for symbol, value in (("f_c", "4 ksi"), ("f_y", "60 ksi"), ("A_g", "256 in^2"), ("A_st", "6.32 in^2")):
        older.given(symbol, value, source="S-401")
    assert older.work(axial).entry.edition == "ACI 318-14"
    assert shown.last["edition"] == "ACI 318-14"


def test_a_standard_that_is_no_edition_of_the_code_needs_no_choice(sheet: Sheet) -> None:
    @formula(Standard("ASTM A615")("9.1"))
    def bar(*, L_1: Length) -> Length:
        """Bar."""
        L_2: Length = 2 * L_1
        return L_2

    sheet.given("L_1", "1 in", "span", source="S-1")
    entry = sheet.work(bar).entry
    assert (entry.edition, entry.clause) == ("ASTM A615", "9.1")


def test_the_codes_own_formulas_run_on_a_sheet(sheet: Sheet) -> None:
    d_b = sheet.given("d_b", "1 in", source="ASTM A615")
    # published: ACI 318-19 table 25.3.1, 6 d_b for No. 8
    assert float(sheet.work(hooks.bend_diameter, d_b=d_b)) == 6.0
    assert development.straight_tension_reduced.arguments["A_s_required"].name == "area"


# Verdicts


@pytest.mark.parametrize(
    ("demand", "text", "verdict"),
    [
        ("0.9999 ft", "1.00", "OK"),
        ("1 ft", "1.00", "OK"),
        ("1.0004 ft", "1.0004", "NG"),
        ("1.004 ft", "1.004", "NG"),
        ("1.006 ft", "1.01", "NG"),
        ("1.000000001 ft", "1.00", "OK"),  # within what binary arithmetic may add
        ("1.00000001 ft", "1.000000010", "NG"),
        ("0 ft", "0.00", "OK"),
        ("0.994 ft", "0.99", "OK"),
    ],
)
def test_a_ratio_never_reads_better_than_it_is(
    sheet: Sheet, shown: Shown, demand: str, text: str, verdict: str
) -> None:
    """A15: OK up to 1.0, NG above, and no printed ratio hides which."""
    value = sheet.verify(
        "fits",
        demand=sheet.given("L_1", demand, "needed", source="S-1"),
        capacity=sheet.given("L_2", "1 ft", "there", source="S-1"),
    )
    assert (value.entry.shown, value.entry.verdict) == (text, verdict)
    assert (shown.last["ratio_text"], shown.last["verdict"]) == (text, verdict)
    assert (float(text) > 1.0) == (verdict == "NG")


def test_a_verdict_rests_on_both_sides(column: Sheet, shown: Shown) -> None:
    demand = column.given("P_u", "614.056 kip", source="run 14")
    value = column.verify("C1 carries", demand=demand, capacity=column.work(axial), clause="22.4.2.1")
    entry = value.entry
    assert (entry.demand, entry.capacity, entry.clause) == ("C-01/P_u", "C-01/P_o", "22.4.2.1")
    assert entry.ratio == entry.value == pytest.approx(0.5)  # 614.056/1,228.112
    assert shown.last["demand"] == {
        "symbol": "P_u", "shown": "614.056 kip", "text": "614.056 kip", "link": "C-01/P_u", "sheet": "",
    }  # fmt: skip
    assert replayed(column) == 4
    assert column.ledger.users("C-01/P_o") == ("C-01/verdict",)


@pytest.mark.parametrize(
    ("capacity", "message"), [("0 in", "above zero: check what is provided"), ("-1 in", "above zero")]
)
def test_a_capacity_of_nothing(sheet: Sheet, capacity: str, message: str) -> None:
    left = sheet.given("x_1", "1 in", "needed", source="S-1")
    right = sheet.given("x_2", capacity, "there", source="S-1")
    with pytest.raises(SheetError, match=message):
        sheet.verify("fits", demand=left, capacity=right)


def test_two_dimensions_cannot_be_compared(column: Sheet) -> None:
    f_c, area = column.values("f_c")[0], column.values("A_g")[0]
    with pytest.raises(SheetError, match=r"demand f_c = 4 ksi, capacity A_g = 256 in²  two values of one dimension"):
        column.verify("fits", demand=f_c, capacity=area)


def test_numbers_without_a_source_cannot_be_compared(sheet: Sheet) -> None:
    with pytest.raises(SheetError, match=r"verify 'fits'") as caught:
        sheet.verify("fits", demand=1.0, capacity=2.0)  # type: ignore[arg-type]
    assert [problem.given for problem in caught.value.problems] == ["demand = 1.0", "capacity = 2.0"]


# Notes, tables, figures


def test_values_in_a_note_are_linked(column: Sheet, shown: Shown) -> None:
    f_c = column.values("f_c")[0]
    column.note("Concrete of ", f_c, " as on the drawings.")
    assert shown.last["style"] == "note"
    assert shown.last["parts"] == [
        {"text": "Concrete of ", "link": "", "sheet": ""},
        {"text": "4 ksi", "link": "C-01/f_c", "sheet": ""},
        {"text": " as on the drawings.", "link": "", "sheet": ""},
    ]
    column.conclude("Good.")
    assert (shown.last["style"], shown.last["parts"][0]["text"]) == ("conclusion", "Good.")


@pytest.mark.parametrize("parts", [(), ("",), (" ", "\n")])
def test_an_empty_note(sheet: Sheet, parts: tuple[str, ...]) -> None:
    with pytest.raises(SheetError, match="an empty text  a sentence"):
        sheet.note(*parts)


def test_a_table_of_texts_and_values(column: Sheet, shown: Shown) -> None:
    column.table(["Case", "A"], [["gross", column.values("A_g")[0]]], caption="Areas")
    assert shown.last["caption"] == "Areas"
    assert shown.last["rows"][0][1] == {"text": "256 in²", "link": "C-01/A_g", "sheet": ""}


def test_a_table_with_a_ragged_edge(sheet: Sheet) -> None:
    with pytest.raises(SheetError, match=r"rows of \[1, 2, 3\] cells  2 cells, one for each head"):
        sheet.table(["a", "b"], [["1"], ["1", "2"], ["1", "2", "3"]])


@pytest.mark.parametrize("alt", ["", "  ", None])
def test_a_figure_says_what_it_shows(sheet: Sheet, alt: Any) -> None:
    with pytest.raises(SheetError, match="a figure without alt text  one sentence of what it shows"):
        sheet.figure(SimpleNamespace(svg="<svg/>", caption="c", alt=alt, width=1.0))  # type: ignore[arg-type]


def test_something_that_is_no_figure(sheet: Sheet) -> None:
    with pytest.raises(SheetError, match="without alt text"):
        sheet.figure("plot.png")  # type: ignore[arg-type]


def test_a_caption_may_replace_the_figures_own(sheet: Sheet, shown: Shown) -> None:
    figure: Any = SimpleNamespace(svg="<svg/>", caption="own", alt="A square", width=1.5)
    sheet.figure(figure)
    sheet.figure(figure, "another")
    assert [item["caption"] for item in shown.of("figure")] == ["own", "another"]


def test_headings(sheet: Sheet, shown: Shown) -> None:
    sheet.heading("Strength")
    assert (shown.last["type"], shown.last["text"]) == ("heading", "Strength")


# Values of other sheets


def test_a_carried_value_keeps_its_origin(root: Path, sheet: Sheet, shown: Shown) -> None:
    other = Sheet("L-01", "Loads", job=root)
    span = other.given("L_1", "5 ft", "span", source="S-1")
    leave(results_folder(root), "L-01", other.ledger, list(other.ledger))
    carried = sheet.carry("L-01", "L_1")
    assert (carried.entry, carried.sheet) == (span.entry, "L-01")
    assert shown.last["reads"] == [["sheet L-01 L-01/L_1", other.ledger.hash("L-01/L_1")]]
    assert (shown.last["id"], shown.last["link"], shown.last["source"]) == ("", "L-01/L_1", "sheet L-01")
    assert shown.last["entries"] == []
    made = sheet.work(twice)
    assert made.entry.where["L_1"] == "L-01/L_1"
    sheet.note("span ", carried)
    assert shown.last["parts"][1] == {"text": "5 ft", "link": "L-01/L_1", "sheet": "L-01"}


def test_a_sheet_that_has_not_run(sheet: Sheet) -> None:
    with pytest.raises(NeedsSheet, match=r"^needs sheet L-01\n.*run it first, or: calcpack draft") as caught:
        sheet.carry("L-01", "P_u")
    assert caught.value.sheet == "L-01"


# Solved values


@formula("continuity")
def root_error(*, A_g: Area, D_c: Length) -> Ratio:
    """Difference of an area and the square of a length, over the area."""
    gap = (A_g - D_c**2) / A_g
    return gap


def test_a_solved_value_and_what_confirms_it(column: Sheet, shown: Shown) -> None:
    (area,) = column.values("A_g")
    side = column.solved(
        "D_c", f"{float(area) ** 0.5!r} in", "side", method="bisection", clause="22.2", solved_from=[area, area]
    )
    assert (side.entry.kind, side.entry.solved_from) == ("solved", ("C-01/A_g",))
    assert shown.last["source"] == "bisection; confirmed below"
    gap = column.work(root_error, D_c=side)
    column.confirm([side], [gap])
    assert column.ledger["C-01/D_c"].confirmed_by == ("C-01/gap",)
    assert shown.last["confirms"] == [["C-01/D_c", ["C-01/gap"]]]
    assert [one for one in replay(column.ledger.to_json()) if not one.agrees] == []


def test_what_does_not_vanish_confirms_nothing(column: Sheet) -> None:
    (area,) = column.values("A_g")
    side = column.solved("D_c", "7 in", "side", method="bisection", clause="22.2", solved_from=[area])
    other = column.solved("h", "7 in", "side", method="bisection", clause="22.2", solved_from=[area])
    gap = column.work(root_error, D_c=side)
    with pytest.raises(SheetError, match=r"gap = .* = [\d.]+ +a ratio of at most 1e-06(.|\n)*does not rest on C-01/h"):
        column.confirm([side, other], [gap])
    with pytest.raises(SheetError, match=r"A_g = .* +a value made by sheet.solved"):
        column.confirm([area], [gap])
    with pytest.raises(SheetError, match="nothing that confirms it"):
        column.confirm([side], [])


@pytest.mark.parametrize(("method", "known"), [("", True), (" ", True), ("bisection", False)])
def test_a_solved_value_without_method_or_origin(column: Sheet, method: str, known: bool) -> None:
    origin = [column.values("f_c")[0]] * known
    with pytest.raises(SheetError, match="a method, and the values of the ledger that it was found from"):
        column.solved("c", "7 in", "depth", method=method, clause="22.2", solved_from=origin)


def test_a_solved_value_with_a_wrong_unit_names_the_sheet(column: Sheet) -> None:
    with pytest.raises(UnitError, match=r"sheet C-01$"):
        column.solved("d_b", "7 psi", "depth", method="bisection", clause="22", solved_from=[column.values("f_c")[0]])


def test_a_solved_value_is_not_solved_from_a_number(column: Sheet) -> None:
    origin: Any = [0.0]
    with pytest.raises(SheetError, match=r"solved from 0\.0 +a method, and the values"):
        column.solved("c", "7 in", "depth", method="bisection", clause="22", solved_from=origin)


# A line that cannot be printed


def test_a_line_that_cannot_be_laid_out_names_the_sheet(sheet: Sheet, monkeypatch: pytest.MonkeyPatch) -> None:
    def refuse(*_: object) -> None:
        raise LayoutError("the layout of twice does not compute what it computes")

    sheet.given("L_1", "5 ft", "span", source="S-1")
    monkeypatch.setattr(sheet._store, "layout", refuse)
    with pytest.raises(LayoutError, match="does not compute"):
        sheet.work(twice)
    assert "C-01/L_2" not in sheet.ledger


def test_layouts_are_kept_in_the_job(column: Sheet, root: Path) -> None:
    column.work(axial)
    assert (root / ".calcpack" / "layouts.json").is_file()


# A cell that is run again


class Cells:
    """Cells as a front end runs them: each has an id, each execution a number."""

    def __init__(self, patch: pytest.MonkeyPatch) -> None:
        self.now = ("", 0)
        patch.setattr(notebook, "cell_key", lambda: self.now)

    def run(self, name: str) -> None:
        self.now = (name, self.now[1] + 1)


@pytest.fixture
def cells(monkeypatch: pytest.MonkeyPatch) -> Cells:
    return Cells(monkeypatch)


def test_a_cell_run_again_replaces_what_it_set(sheet: Sheet, cells: Cells) -> None:
    cells.run("a")
    sheet.given("L_1", "5 ft", "span", source="S-1")
    sheet.given("x_1", "1 in", "rest", source="S-1")
    cells.run("a")
    sheet.given("L_1", "6 ft", "span", source="S-1")
    assert [(entry.id, entry.value) for entry in sheet.ledger] == [("C-01/L_1", 72.0)]
    assert sheet.values("x_1") == ()


def test_what_rests_on_a_replaced_value_goes_too(sheet: Sheet, cells: Cells) -> None:
    cells.run("a")
    sheet.given("L_1", "5 ft", "span", source="S-1")
    cells.run("b")
    sheet.given("x_1", "1 ft", "kept", source="S-1")
    last = sheet.work(twice)
    cells.run("c")
    sheet.verify("fits", demand=sheet.values("x_1")[0], capacity=last)
    cells.run("a")
    sheet.given("L_1", "6 ft", "span", source="S-1")
    assert [entry.id for entry in sheet.ledger] == ["C-01/x_1", "C-01/L_1"]
    cells.run("b")
    sheet.given("x_1", "1 ft", "kept", source="S-1")
    assert float(sheet.work(twice)) == 216.0  # 3 × 6 ft
    assert replayed(sheet) == 2


def test_ids_stay_the_same_however_often_a_cell_runs(sheet: Sheet, cells: Cells) -> None:
    for _ in range(3):
        cells.run("a")
        sheet.given("L_1", "5 ft", "span", source="S-1")
        cells.run("b")
        sheet.work(twice)
    assert [entry.id for entry in sheet.ledger] == ["C-01/L_1", "C-01/L_2", "C-01/L_3"]


def test_a_cell_forgets_only_what_is_its_own(sheet: Sheet, cells: Cells) -> None:
    cells.run("a")
    sheet.given("L_1", "5 ft", "span", source="S-1")
    cells.run("b")
    sheet.work(twice)
    cells.run("a")  # drops what b made
    sheet.given("L_1", "6 ft", "span", source="S-1")
    cells.run("c")
    sheet.given("L_2", "1 ft", "a value of its own", source="S-2")
    cells.run("b")
    sheet.work(twice)
    assert sheet.ledger["C-01/L_2"].source == "S-2"


def test_carried_values_survive_a_cell_run_again(root: Path, sheet: Sheet, cells: Cells) -> None:
    other = Sheet("L-01", "Loads", job=root)
    other.given("L_1", "5 ft", "span", source="S-1")
    leave(results_folder(root), "L-01", other.ledger, list(other.ledger))
    cells.run("a")
    sheet.carry("L-01", "L_1")
    for _ in range(2):
        cells.run("b")
        assert sheet.work(twice).entry.id == "C-01/L_3"


def test_a_value_that_is_gone_cannot_be_worked_with(sheet: Sheet, cells: Cells) -> None:
    cells.run("a")
    span = sheet.given("L_1", "5 ft", "span", source="S-1")
    cells.run("a")
    sheet.given("x_1", "6 ft", "span", source="S-1")
    with pytest.raises(LedgerError, match="rests on C-01/L_1, which the ledger does not hold"):
        sheet.work(twice, L_1=span)
