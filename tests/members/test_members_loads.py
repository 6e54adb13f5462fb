"""Unfactored forces of a column combined, and worked on a pad. Invented forces, unless a source stands."""

from __future__ import annotations

import re
import time
from collections.abc import Sequence
from dataclasses import replace
from pathlib import Path
from typing import Any

import pytest
from hypothesis import given
from hypothesis import strategies as st

from calcpack import notebook
from calcpack.errors import RangeError, TableError
from calcpack.job.records import ForceRow
from calcpack.ledger import replay
from calcpack.loads.combinations import LOADS, Settings, combinations
from calcpack.members.column_loads import FormedForce, LoadRow, combined, work_forces
from calcpack.members.column_section import Bars, Column, Force, Sway, Term, Ties
from calcpack.members.pad import FloatPad
from calcpack.scheduled import SheetPad
from calcpack.sheet import Sheet

COLUMN = Column("C7", 16.0, 16.0, Bars(8, 9, 3, 3), Ties("ties", 3, 16.0), 1.5, 4_000.0, 60_000.0)
FILE = "inputs/forces.csv"
KIP, KIP_FT = 1_000.0, 12_000.0
DEAD = LoadRow("D", 100.0, 20.0, -8.0, Vx=3.0, Vy=-2.0, T=1.0, file=FILE, row=2)
LIVE = LoadRow("L", 50.0, 10.0, 4.0, Vx=1.0, Vy=6.0, T=2.0, file=FILE, row=3)
WIND = LoadRow("W", -4.0, 60.0, 30.0, Vx=9.0, Vy=8.0, T=5.0, case="+x", file=FILE, row=4)
ENDS = replace(LIVE, Mx=None, Mx_bottom=-5.0, Mx_top=10.0)


def formed(*rows: Any, standard: str = "ASCE 7-16", settings: Settings | None = None) -> dict[str, Any]:
    """The combinations of rows by their names."""
    found = combined(COLUMN, rows, standard, settings or Settings())
    assert len({force.combination for force in found}) == len(found)
    return {str(force.combination): force for force in found}


def by_name(name: str, rows: Sequence[LoadRow], symbol: str, only: str = "") -> float:
    """The sum that a combination's name tells, over rows found by load and case; `only` are loads that count."""
    total = 0.0
    for factor, load, case in re.findall(r"([+-]?\d+\.\d+)([A-Z][a-z]?)(?:\(([^)]*)\))?", name.split(": ")[1]):
        same = [row for row in rows if row.load == load]
        wanted = [row for row in same if row.case == case] or [same[int(case) - 1 if case else 0]]
        if not only or load in only.split():
            total += float(factor) * getattr(wanted[0], symbol)
    return total


# published: Wight & MacGregor, Reinforced Concrete: Mechanics and Design, example 12-2, pp. 595-597: P_u 134 kip;
# M_u -94.4 kip ft at the top, -38.0 kip ft at the bottom, from D and L. Signs of the ends here are those of the book.
@pytest.mark.parametrize("standard", ["ASCE 7-16", "ASCE 7-22"])
def test_wight_and_macgregor_example_12_2(standard: str) -> None:
    dead = LoadRow("D", 80 * KIP, None, Mx_bottom=-21 * KIP_FT, Mx_top=-60 * KIP_FT)
    live = LoadRow("L", 24 * KIP, None, Mx_bottom=-8 * KIP_FT, Mx_top=-14 * KIP_FT)
    force = formed(dead, live, standard=standard)["2: 1.2D+1.6L"]
    in_kip = force.P / KIP
    assert in_kip == pytest.approx(134, rel=0.004)
    assert (force.Mx, force.My) == (None, 0.0)
    assert force.Mx_top / KIP_FT == pytest.approx(-94.4, rel=1e-4)
    assert force.Mx_bottom / KIP_FT == pytest.approx(-38.0, rel=1e-4)


@pytest.mark.parametrize(
    ("P_D", "P_L", "P_u"),
    [
        (175, 300, 690),  # published: CIVL 4135 class notes, Design of a Spiral Column (university handout)
        (130, 180, 444),  # from memory: McCormac & Brown, Design of Reinforced Concrete, example 9.1
    ],
)
def test_axial_force_of_dead_and_live_load(P_D: float, P_L: float, P_u: float) -> None:
    force = formed(LoadRow("D", P_D * KIP), LoadRow("L", P_L * KIP))["2: 1.2D+1.6L"]
    in_kip = force.P / KIP
    assert in_kip == pytest.approx(P_u)


def test_every_force_is_combined() -> None:
    force = formed(DEAD, LIVE, WIND)["4: 1.2D-1.0W(+x)+1.0L"]
    # by hand: 1.2 D - 1.0 W + 1.0 L
    assert (force.P, force.Mx, force.My) == pytest.approx((174.0, -26.0, -35.6))
    assert (force.Vx, force.Vy, force.T) == pytest.approx((-4.4, -4.4, -1.8))
    assert (force.Mx_bottom, force.Mx_top, force.My_bottom, force.My_top) == (None, None, None, None)
    assert force.terms == (Term(1.2, "D", DEAD), Term(-1.0, "W", WIND), Term(1.0, "L", LIVE))
    assert (force.file, force.row, force.rule.number) == (FILE, 0, "4")
    assert isinstance(force, Force)


def test_sway_is_what_wind_and_earthquake_cause() -> None:
    quake = LoadRow("E", 1.0, None, 7.0, Mx_bottom=40.0, Mx_top=-50.0)
    forces = formed(DEAD, LIVE, WIND, quake)
    # by hand: a single moment has its sway part at both ends
    assert forces["5: 0.9D-1.0W(+x)"].sway == Sway(-60.0, -60.0, -30.0, -30.0)
    assert forces["7: 0.9D+1.0E"].sway == Sway(40.0, -50.0, 7.0, 7.0)
    assert forces["2: 1.2D+1.6L"].sway == Sway(0.0, 0.0, 0.0, 0.0)


def test_sustained_force_is_that_of_dead_load_fluids_and_earth() -> None:
    rows = [DEAD, LIVE, WIND, LoadRow("F", 10.0), LoadRow("H", 5.0), LoadRow("T", 1_000.0), LoadRow("S", 500.0)]
    forces = formed(*rows)
    # by hand: 1.2 x 100 + 1.2 x 10, and 1.6 x 5 where earth pressure acts
    assert forces["2: 1.2D+1.2F+1.6L+0.5S+1.0T"].P_sustained == pytest.approx(132.0)
    assert forces["4: 1.2D+1.2F+1.0W(+x)+1.0L+0.5S+1.6H+1.0T"].P_sustained == pytest.approx(140.0)
    assert forces["5: 0.9D+1.0W(+x)"].P_sustained == pytest.approx(90.0)


def test_a_single_moment_counts_at_both_ends_beside_moments_at_the_ends() -> None:
    forces = formed(DEAD, ENDS, WIND)
    force = forces["2: 1.2D+1.6L"]
    # by hand: 1.2 x 20 + 1.6 x (-5), and 1.6 x 10; about y one moment is left
    assert (force.Mx, force.Mx_bottom, force.Mx_top) == (None, pytest.approx(16.0), pytest.approx(40.0))
    assert (force.My, force.My_bottom, force.My_top) == (pytest.approx(-3.2), None, None)
    # Where a combination has no row with ends it gives ends all the same, as the others of the column do.
    assert (forces["1: 1.4D"].Mx, forces["1: 1.4D"].Mx_bottom, forces["1: 1.4D"].Mx_top) == (None, 28.0, 28.0)


def test_moments_at_the_ends_about_y() -> None:
    force = formed(replace(DEAD, My=None, My_bottom=1.0, My_top=2.0), LIVE)["2: 1.2D+1.6L"]
    assert (force.Mx, force.Mx_bottom, force.Mx_top) == (pytest.approx(40.0), None, None)
    assert (force.My, force.My_bottom, force.My_top) == (None, pytest.approx(7.6), pytest.approx(8.8))


def test_several_rows_of_a_load_are_alternatives() -> None:
    other = replace(WIND, P=7.0, case="+y")
    names = [name for name in formed(DEAD, LIVE, WIND, other) if name[0] == "4"]
    assert names == [
        f"4: 1.2D{sign}1.0W({case}){live}" for sign in "+-" for live in ("", "+1.0L") for case in ("+x", "+y")
    ]
    force = formed(DEAD, WIND, other)["5: 0.9D-1.0W(+y)"]
    assert (force.P, force.terms[1].row) == (pytest.approx(83.0), other)


def test_alternatives_without_a_case_are_counted() -> None:
    rows = [DEAD, LIVE, replace(LIVE, P=30.0, row=9), replace(WIND, case=" +x ")]
    forces = formed(*rows)
    assert [name for name in forces if name[0] == "2"] == ["2: 1.2D+1.6L(1)", "2: 1.2D+1.6L(2)"]
    assert [force.P for force in forces.values()][1:3] == pytest.approx([200.0, 168.0])
    assert "5: 0.9D+1.0W(+x)" in forces


def test_a_case_of_a_load_with_one_row_is_not_in_the_name() -> None:
    assert list(formed(replace(DEAD, case="self weight"), replace(LIVE, case="")))[:2] == ["1: 1.4D", "2: 1.2D+1.6L"]
    assert list(formed(replace(DEAD, case="x"), replace(LIVE, case="x"))) == [
        "1: 1.4D",
        "2: 1.2D+1.6L(x)",
        "3: 1.2D+1.0L(x)",
    ]


def test_factored_rows_pass_unchanged() -> None:
    given_factored = Force("1.2D+1.6L", 10.0)
    listed = ForceRow(
        "C7", "1.4D", None, "", 1.0, 0.0, 0.0, *[None] * 4, Vx=0.0, Vy=0.0, T=0.0, row=5, file=FILE
    )  # fmt: skip
    assert combined(COLUMN, [given_factored, listed], "ASCE 7-16") == [given_factored, listed]
    assert combined(COLUMN, [], "ASCE 7-16") == []
    both = combined(COLUMN, [DEAD, given_factored], "ASCE 7-16")
    assert both[0] is given_factored
    assert [force.combination for force in both] == ["1.2D+1.6L", "1: 1.4D"]


def test_rows_of_a_job_are_combined() -> None:
    row = ForceRow("C7", None, "D", "", 2.0, None, 3.0, 4.0, 5.0, None, None, 6.0, 7.0, 8.0, row=5, file=FILE)
    (force,) = combined(COLUMN, [row], "ASCE 7-22")
    assert (force.combination, force.Mx_bottom, force.Mx_top) == ("1: 1.4D", pytest.approx(5.6), pytest.approx(7.0))
    assert (force.P, force.My, force.T) == (pytest.approx(2.8), pytest.approx(4.2), pytest.approx(11.2))


def test_standard_and_settings_are_those_asked_for() -> None:
    snow = LoadRow("S", 10.0)
    assert "2: 1.2D+1.6L+0.3S" in formed(DEAD, LIVE, snow, standard="ASCE 7-22")
    assert "2: 1.2D+1.6L+0.5S" in formed(DEAD, LIVE, snow)
    quake = formed(DEAD, LIVE, LoadRow("E", 10.0), settings=Settings(0.5, 1.0, 1.3))["6: 1.4D-1.3E+0.5L"]
    # by hand: (1.2 + 0.2 x 1.0) 100 - 1.3 x 10 + 0.5 x 50; what lasts of it is 1.2 x 100, without E_v
    assert (quake.P, quake.P_sustained) == (pytest.approx(152.0), pytest.approx(120.0))
    with pytest.raises(RangeError, match="loads = 'ASCE 7-05'"):
        combined(COLUMN, [DEAD], "ASCE 7-05")


def problems(*rows: Any) -> list[str]:
    """The problems of rows, a line each."""
    with pytest.raises(TableError, match=r"^column C7: unfactored forces\n") as caught:
        combined(COLUMN, rows, "ASCE 7-16")
    return [problem.line() for problem in caught.value.problems]


@pytest.mark.parametrize("load", ["D", "F", "H", "T"])
def test_two_rows_of_a_load_that_has_one(load: str) -> None:
    rows = [DEAD, replace(DEAD, load=load, row=7), replace(DEAD, load=load, row=9)]
    places = f"{FILE}, row 7; {FILE}, row 9"
    places, count = (f"{FILE}, row 2; {places}", 3) if load == "D" else (places, 2)
    allowed = "one row; alternatives are for L, Lr, S, R, W, E: add them up in one row"
    assert problems(*rows) == [f"{count} rows of load {load}  {allowed}  [{places}]"]


@pytest.mark.parametrize("load", ["L", "Lr", "S", "R", "W", "E"])
def test_cases_that_cannot_be_told_apart(load: str) -> None:
    first, second = replace(LIVE, load=load, case="a", row=7), replace(LIVE, load=load, case=" a", row=9)
    rule = "a case of its own for each row: rename one"
    told = f"2 rows of load {load} with case 'a'  {rule}  [{FILE}, row 7; {FILE}, row 9]"
    assert problems(DEAD, first, second, replace(second, case="b", row=10)) == [told]
    # A row without a case is counted, and may run into a case of that name.
    counted = problems(DEAD, replace(first, case="2"), replace(second, case=""))
    assert counted == [told.replace("'a'", "'2'")]
    assert combined(COLUMN, [DEAD, first, replace(second, case="b")], "ASCE 7-16")


def test_everything_wrong_is_told_at_once() -> None:
    rows = [
        replace(LIVE, row=2),
        replace(LIVE, load="Q", row=3),
        LoadRow("H", 1.0),
        LoadRow("H", 2.0),
        replace(LIVE, load="S", Mx_bottom=1.0, row=6),
        replace(LIVE, load="R", My=None, My_top=1.0, row=7),
        replace(LIVE, load="W", Mx=None, row=8),
        replace(LIVE, load="E", Mx=None, Mx_bottom=1.0, row=9),
    ]
    everywhere = "; ".join([f"{FILE}, row 2", f"{FILE}, row 3", "member forces of C7"])
    everywhere += "".join(f"; {FILE}, row {row}" for row in (6, 7, 8, 9))
    ends = "  {0}, or {0}_bottom and {0}_top: give the one or the other  [inputs/forces.csv, row {1}]"
    assert problems(*rows) == [
        f"load = 'Q'  one of D, F, L, Lr, S, R, W, E, H, T  [{FILE}, row 3]",
        "2 rows of load H  one row; alternatives are for L, Lr, S, R, W, E: add them up in one row"
        "  [member forces of C7]",
        "rows of L, Q, H, S, R, W, E without D  a row of D: dead load acts in every combination: add it"
        f"  [{everywhere}]",
        "Mx of load S" + ends.format("Mx", 6),
        "My of load R" + ends.format("My", 7),
        "Mx of load W" + ends.format("Mx", 8),
        "Mx of load E" + ends.format("Mx", 9),
    ]


sizes = st.floats(-1e6, 1e6)


@st.composite
def tables(draw: st.DrawFn) -> list[LoadRow]:
    """Rows of a column: one of D, at most one of F, H and T, up to three of each other load."""
    loads = ["D"]
    for load in LOADS[1:]:
        loads += [load] * draw(st.integers(0, 1 if load in "FHT" else 2 if load in ("W", "L") else 1))
    return [
        LoadRow(
            load,
            *[draw(sizes) for _ in range(3)],
            Vx=draw(sizes),
            Vy=draw(sizes),
            T=draw(sizes),
            case=str(place),
            file=FILE,
            row=place + 2,
        )
        for place, load in enumerate(loads)
    ]


@given(rows=tables(), standard=st.sampled_from(["ASCE 7-16", "ASCE 7-22"]))
def test_a_force_is_the_sum_that_its_name_tells(rows: list[LoadRow], standard: str) -> None:
    forces = formed(*rows, standard=standard)
    expected = sum(
        _choices([load for load, _ in one.terms], rows) for one in combinations(standard, {row.load for row in rows})
    )
    assert len(forces) == expected
    for name, force in list(forces.items())[:: max(1, len(forces) // 25)]:
        for symbol in ("P", "Mx", "My", "Vx", "Vy", "T"):
            assert getattr(force, symbol) == pytest.approx(by_name(name, rows, symbol), rel=1e-9, abs=1e-6)
        assert force.P_sustained == pytest.approx(by_name(name, rows, "P", "D F H"), rel=1e-9, abs=1e-6)
        sway = by_name(name, rows, "Mx", "W E"), by_name(name, rows, "My", "W E")
        assert (force.sway.Mx_bottom, force.sway.My_top) == pytest.approx(sway, rel=1e-9, abs=1e-6)
        assert (force.sway.Mx_top, force.sway.My_bottom) == (force.sway.Mx_bottom, force.sway.My_top)


def _choices(loads: Sequence[str], rows: Sequence[LoadRow]) -> int:
    product = 1
    for load in loads:
        product *= sum(row.load == load for row in rows)
    return product


WHOLE = ["P_u", "M_ux", "M_uy", "V_ux", "V_uy", "T_u"]


@given(rows=tables())
def test_what_is_worked_on_a_pad_is_what_was_combined_to_the_last_digit(rows: list[LoadRow]) -> None:
    found = combined(COLUMN, rows, "ASCE 7-16")
    for force in found[:: max(1, len(found) // 10)]:
        worked = work_forces(FloatPad(), COLUMN, force, WHOLE)
        assert worked == dict(zip(WHOLE, (force.P, force.Mx, force.My, force.Vx, force.Vy, force.T), strict=True))


def test_parts_and_ends_worked_are_those_combined() -> None:
    for force in combined(COLUMN, [DEAD, ENDS, WIND, LoadRow("F", 3.0), LoadRow("H", 4.0)], "ASCE 7-16"):
        assert isinstance(force, FormedForce)
        names = ["P_sustained", "M_ux_bottom", "M_ux_top", "M_uy_bottom", "M_uy_top"]
        values = (force.P_sustained, force.Mx_bottom, force.Mx_top, force.My, force.My)
        assert work_forces(FloatPad(), COLUMN, force, names) == dict(zip(names, values, strict=True))
        sway = work_forces(FloatPad(), COLUMN, force, ["M_sx_bottom", "M_sx_top", "M_sx", "M_sy", "M_sy_top"])
        assert force.sway is not None
        if "W" in str(force.combination):
            x, y = force.sway.Mx_top, force.sway.My_top
            assert sway == {"M_sx_bottom": x, "M_sx_top": x, "M_sx": x, "M_sy": y, "M_sy_top": y}
        else:
            assert sway == {}


def test_a_combination_is_worked_from_its_rows(steps: Any) -> None:
    force = formed(DEAD, ENDS, WIND)["4: 1.2D-1.0W(+x)+1.0L"]
    values = work_forces(steps, COLUMN, force, ["P_u", "M_ux_bottom", "M_ux_top"])
    # by hand: 1.2 x 100 + 4 + 50; 1.2 x 20 - 60 - 5; 1.2 x 20 - 60 + 10
    assert values == {"P_u": 174.0, "M_ux_bottom": -41.0, "M_ux_top": -26.0}
    assert [(given.symbol, given.value, given.means, given.source) for given in steps.givens] == [
        ("P_D", 100.0, "axial force, dead load", f"{FILE}, row 2"),
        ("P_W", -4.0, "axial force, wind load (+x)", f"{FILE}, row 4"),
        ("P_L", 50.0, "axial force, live load", f"{FILE}, row 3"),
        ("M_x_D", 20.0, "moment about the x axis, dead load", f"{FILE}, row 2"),
        ("M_x_W", 60.0, "moment about the x axis, wind load (+x)", f"{FILE}, row 4"),
        ("M_x_bottom_L", -5.0, "moment about the x axis at the bottom, live load", f"{FILE}, row 3"),
        ("M_x_top_L", 10.0, "moment about the x axis at the top, live load", f"{FILE}, row 3"),
    ]
    assert steps.told("worked") == ["P_u", "M_ux_bottom", "M_ux_top"]
    assert [formula.source.splitlines()[1] for _, formula in steps.clauses] == [
        "P_u = 1.2 * P_D - P_W + P_L",
        "M_ux_bottom = 1.2 * M_x_D - M_x_W + M_x_bottom_L",
        "M_ux_top = 1.2 * M_x_D - M_x_W + M_x_top_L",
    ]
    assert {str(formula.clause()) for _, formula in steps.clauses} == {"ASCE 7-16 2.3.1"}
    assert steps.reasons == []


def test_a_factor_that_is_made_is_explained_between_givens_and_working(steps: Any) -> None:
    settings = Settings(live_companion=0.5, S_DS=0.83, rho=1.3)
    force = formed(DEAD, LIVE, LoadRow("E", 10.0), standard="ASCE 7-22", settings=settings)["6: 1.366D+1.3E+0.5L"]
    assert work_forces(steps, COLUMN, force, ["P_u"]) == {"P_u": pytest.approx(174.6)}
    assert [kind for kind, _ in steps.steps] == [*["given"] * 3, *["reason"] * 3, "worked"]
    assert "1.2 + 0.2 (0.83) = 1.366 (ASCE 7-22 12.4.2.2)" in steps.reasons[0]
    assert [str(formula.clause()) for _, formula in steps.clauses] == ["ASCE 7-22 2.3.6"]
    assert steps.source("P_E") == "member forces of C7"


def test_a_factored_force_is_stated(steps: Any) -> None:
    force = Force("1.2D+1.6L", 9.0, None, 2.0, Mx_bottom=3.0, Mx_top=4.0, Vy=5.0, T=6.0, file=FILE, row=8)
    names = ["P_u", "M_ux_bottom", "M_ux_top", "M_uy", "M_uy_bottom", "M_uy_top", "V_ux", "V_uy", "T_u"]
    values = work_forces(steps, COLUMN, force, names)
    assert list(values.values()) == [9.0, 3.0, 4.0, 2.0, 2.0, 2.0, 0.0, 5.0, 6.0]
    assert steps.told("given") == list(values) == names
    assert {given.source for given in steps.givens} == {f"{FILE}, row 8"}
    assert steps.givens[0].means == "factored axial force, compression positive, 1.2D+1.6L"
    assert steps.told("worked") == []


def test_one_moment_cannot_be_asked_for_where_the_ends_are_given() -> None:
    with pytest.raises(KeyError, match=r"M_ux of 1\.4D: its moment is given at the ends"):
        work_forces(FloatPad(), COLUMN, Force("1.4D", 1.0, None, Mx_bottom=1.0, Mx_top=1.0), ["M_ux"])
    with pytest.raises(KeyError, match="M_ux of a row: its moment is given at the ends"):
        work_forces(FloatPad(), COLUMN, formed(DEAD, ENDS)["2: 1.2D+1.6L"], ["M_ux"])


def test_parts_of_a_force_that_was_not_formed_are_not_known() -> None:
    with pytest.raises(KeyError, match=r"P_sustained, M_sx of 1\.4D: known only where the combination was formed"):
        work_forces(FloatPad(), COLUMN, Force("1.4D", 1.0), ["P_u", "P_sustained", "M_sx"])
    with pytest.raises(KeyError, match=r"P_sustained of 1: 1\.4D: known only where"):
        work_forces(FloatPad(), COLUMN, FormedForce("1: 1.4D", 1.0), ["P_sustained"])


JOB = """
[job]
number = "26-120"
title = "Invented weir house"
location = "Nowhere"
client = "Nobody"
firm = "No firm"

[codes]
building = "IBC 2021"
concrete = "ACI 318-19"
loads = "ASCE 7-16"

[units]
system = "US"

[people.abc]
name = "A. B. C."
role = "originator"

[[revision]]
letter = "A"
date = 2026-11-02
purpose = "Plan review"
description = "First issue"
"""


# handcalcs calls names of pyparsing that are due to go.
@pytest.mark.filterwarnings("ignore::DeprecationWarning")
def test_a_combination_on_a_sheet(tmp_path: Path, monkeypatch: pytest.MonkeyPatch) -> None:
    (tmp_path / "inputs").mkdir()
    (tmp_path / "job.toml").write_text(JOB, "utf-8")
    shown: list[Any] = []
    monkeypatch.setattr(notebook, "show", shown.append)
    sheet = Sheet("C-01", "Combined forces", tmp_path)
    dead = replace(DEAD, P=80 * KIP, Mx=12 * KIP_FT)
    live = replace(LIVE, P=24 * KIP, Mx=-3 * KIP_FT)
    wind = replace(WIND, P=-5 * KIP, Mx=40 * KIP_FT)
    force = formed(dead, live, wind)["4: 1.2D-1.0W(+x)+1.0L"]
    values = work_forces(SheetPad(sheet), COLUMN, force, ["P_u", "M_ux", "M_sx"])
    assert {symbol: float(value) for symbol, value in values.items()} == {
        "P_u": force.P, "M_ux": force.Mx, "M_sx": -40 * KIP_FT,
    }  # fmt: skip
    worked = {item["entries"][0]["symbol"]: item["entries"][0] for item in shown if item["type"] == "work"}
    # by hand: 1.2 x 80 + 5 + 24 = 125 kip; 1.2 x 12 - 40 - 3 = -28.6 kip ft
    assert [(entry["expression"], entry["shown"]) for entry in worked.values()] == [
        ("1.2 * P_D - P_W + P_L", "125 kip"),
        ("1.2 * M_x_D - M_x_W + M_x_L", "−28.6 kip·ft"),
        ("-M_x_W", "−40 kip·ft"),
    ]
    assert {(entry["edition"], entry["clause"]) for entry in worked.values()} == {("ASCE 7-16", "2.3.1")}
    assert worked["P_u"]["where"] == {"P_D": "C-01/P_D", "P_W": "C-01/P_W", "P_L": "C-01/P_L"}
    replayed = replay([entry for item in shown for entry in item["entries"]])
    assert [one.agrees for one in replayed] == [True, True, True]


def test_a_job_of_columns_is_combined_in_a_second_or_two() -> None:
    rows = [DEAD, LIVE, WIND, replace(WIND, case="+y"), *[LoadRow(load, 1.0) for load in ("Lr", "S", "E", "E")]]
    start = time.perf_counter()
    found = [combined(replace(COLUMN, mark=f"C{number}"), rows, "ASCE 7-16") for number in range(500)]
    assert time.perf_counter() - start < 5.0
    # by hand, for 1 to 7: 1 + 3 + 2 x 6 + 4 x 2 x 3 + 4 + 4 x 2 x 2 + 4, and without the principal load 2 + 5 + 2
    assert {len(forces) for forces in found} == {73}
