"""Values stated or worked once on a pad, and which rule serves a symbol of a row or of a column."""

from __future__ import annotations

from dataclasses import dataclass, field, replace
from typing import Any

import pytest

from calcpack.aci318 import columns, hooks
from calcpack.aci318.editions import Edition, edition
from calcpack.formula import Formula
from calcpack.members.anchorage import required_length
from calcpack.members.column_rules import ColumnWorking
from calcpack.members.column_section import Bars, Column, Force, Ties, force_source, row_of, section_source
from calcpack.members.sources import position, source_text
from calcpack.members.working import Choice, Stated, Working

TIED = Column("C1", 16.0, 20.0, Bars(8, 9, 3, 3), Ties("ties", 3, 12.0), 1.5, 4_000.0, 60_000.0, aggregate=0.75)
ROUND = Column("C2", None, 20.0, Bars(8, 8), Ties("spiral", 4, 2.5), 1.5, 5_000.0, 60_000.0)


@dataclass
class HookRules:
    """Rules of one hook: its length is worked from the equation's result and the bar, both stated."""

    asked: list[str] = field(default_factory=list)

    def choice(self, symbol: str) -> Choice | None:
        self.asked.append(symbol)
        return Choice(hooks.hook_minimum, "Because.") if symbol == "l_dh" else None

    def stated(self, symbol: str) -> Stated:
        return Stated({"l_dh_a": 7, "d_b": 1}[symbol], symbol, "from memory")


def test_a_value_is_worked_from_what_its_equation_asks_for(steps: Any) -> None:
    assert Working(steps, HookRules()).value("l_dh") == 8.0
    assert steps.steps == [("given", "l_dh_a"), ("given", "d_b"), ("reason", "Because."), ("worked", "l_dh")]


def test_a_value_is_asked_for_once(steps: Any) -> None:
    rules = HookRules()
    working = Working(steps, rules)
    first = [working.value(symbol) for symbol in ("d_b", "l_dh", "d_b", "l_dh")]
    assert first == [1.0, 8.0, 1.0, 8.0]
    assert rules.asked == ["d_b", "l_dh", "l_dh_a"]
    assert len(steps.steps) == 4


def test_whole_numbers_are_stated_as_floats(steps: Any) -> None:
    Working(steps, HookRules()).value("d_b")
    assert [type(one.value) for one in steps.givens] == [float]


def test_an_argument_of_its_own_stands_for_the_one_by_symbol(steps: Any) -> None:
    working = Working(steps, HookRules())
    assert working.work(Choice(hooks.hook_minimum), l_dh_a=20.0) == 20.0
    assert "l_dh_a" not in working.values
    assert steps.told("given") == ["d_b"]


@dataclass(frozen=True)
class Placed:
    file: str = ""
    row: int = 0


@pytest.mark.parametrize(
    ("record", "where"),
    [
        (Placed("inputs/forces.csv", 3), "inputs/forces.csv, row 3"),
        (Placed("inputs/forces.csv"), "inputs/forces.csv"),
        (Placed(), "elsewhere"),
        (Placed(row=3), "elsewhere"),
    ],
)
def test_position_of_a_record(record: Placed, where: str) -> None:
    assert position(record, "elsewhere") == where


@pytest.mark.parametrize(
    ("source", "text"),
    [("S-301, rev 2", "S-301, rev 2 (row 3)"), (" S-301 ", "S-301 (row 3)"), ("", "row 3"), ("  ", "row 3")],
)
def test_source_of_a_record(source: str, text: str) -> None:
    assert source_text(source, "row 3") == text


def test_places_of_a_column_and_its_forces() -> None:
    placed = replace(TIED, source="S-401", file="inputs/columns.csv", row=4)
    assert row_of(placed) == "inputs/columns.csv, row 4"
    assert section_source(placed) == "S-401 (inputs/columns.csv, row 4)"
    assert row_of(TIED) == section_source(TIED) == "column schedule, mark C1"
    assert force_source(Force("1.4D", 1.0, file="inputs/forces.csv", row=9), TIED) == "inputs/forces.csv, row 9"
    assert force_source(Force("1.4D", 1.0), TIED) == "member forces of C1"


# Values of a column by symbol


@pytest.mark.parametrize(
    ("column", "symbol", "expected"),
    [
        # Hand, a rectangle of 16 by 20 in with eight No. 9 in No. 3 ties at 12 in.
        (TIED, "A_g", 320.0),
        (TIED, "A_st", 8.0),
        (TIED, "P_o", 0.85 * 4_000.0 * 312.0 + 480_000.0),
        (TIED, "P_n_max", 0.80 * 1_540_800.0),
        (TIED, "phi", 0.65),
        (TIED, "phi_P_n_max", 0.52 * 1_540_800.0),
        (TIED, "rho_g", 0.025),
        (TIED, "n_min", 4.0),
        (TIED, "h_min", 16.0),
        (TIED, "d_bt_min", 0.375),
        (TIED, "s_max", 16.0),
        # Hand, a circle of 20 in with eight No. 8 in a No. 4 spiral at 2.5 in.
        (ROUND, "A_g", 314.15927),
        (ROUND, "A_st", 6.32),
        (ROUND, "P_o", 0.85 * 5_000.0 * (314.15927 - 6.32) + 379_200.0),
        (ROUND, "phi", 0.75),
        (ROUND, "n_min", 6.0),
        (ROUND, "D_s", 15.0),
        (ROUND, "D_c", 17.0),
        (ROUND, "A_ch", 226.98007),
        (ROUND, "h_min", 20.0),
        (ROUND, "d_bt_min", 0.375),
    ],
)
def test_a_value_of_a_column(column: Column, symbol: str, expected: float, each: Edition, steps: Any) -> None:
    assert ColumnWorking(steps, column, each).value(symbol) == pytest.approx(expected)


@pytest.mark.parametrize("bar", [10, 11])
def test_size_of_ties_goes_by_the_bars(bar: int, each: Edition, steps: Any) -> None:
    # ACI 318 25.7.2.2: No. 3 around No. 10 and smaller, No. 4 above.
    column = replace(TIED, bars=Bars(8, bar, 3, 3))
    assert ColumnWorking(steps, column, each).value("d_bt_min") == {10: 0.375, 11: 0.5}[bar]


def test_bars_above_grade_80_take_the_formula_of_their_edition(e19: Edition, steps: Any) -> None:
    for f_y, formula in ((80_000.0, columns.axial_strength), (80_001.0, columns.axial_strength_high_grade)):
        ColumnWorking(steps, replace(TIED, f_y=f_y), e19).value("P_o")
        assert steps.clauses[-1] == ("P_o", formula)


def test_a_value_that_the_schedule_leaves_out_cannot_be_asked_for(each: Edition, steps: Any) -> None:
    with pytest.raises(KeyError, match="d_agg is not stated for column C1"):
        ColumnWorking(steps, replace(TIED, aggregate=None), each).value("d_agg")


# Which rule serves a row of the anchorage schedule


@pytest.mark.parametrize(
    ("kind", "name", "changes", "used"),
    [
        ("straight tension", "ACI 318-14", {"c_b": 2.0}, "straight_tension_14"),
        ("straight tension", "ACI 318-19", {"c_b": 2.0}, "straight_tension_19"),
        ("straight tension", "ACI 318-14", {}, "straight_tension_other_14"),
        ("straight tension", "ACI 318-19", {}, "straight_tension_other_19"),
        ("straight tension", "ACI 318-14", {"clear_cover": 1.0, "clear_spacing": 2.0}, "straight_tension_spaced_14"),
        ("straight tension", "ACI 318-19", {"clear_cover": 1.0, "clear_spacing": 2.0}, "straight_tension_spaced_19"),
        ("straight tension", "ACI 318-19", {"A_s_required": 1.0, "A_s_provided": 2.0}, "straight_tension_reduced"),
        ("hook 90", "ACI 318-14", {}, "hook_14"),
        ("hook 90", "ACI 318-14", {"A_s_required": 1.0, "A_s_provided": 2.0}, "hook_reduced"),
        ("hook 90", "ACI 318-14", {"confining_ties": True}, "hook_in_ties"),
        ("hook 90", "ACI 318-14", {"side_cover": 2.5, "tail_cover": 2.0}, "hook_cover_90"),
        ("hook 180", "ACI 318-14", {"side_cover": 2.5}, "hook_cover_180"),
        ("hook 180", "ACI 318-19", {}, "hook_19"),
        ("hook 180", "ACI 318-19", {"confining_ties": True}, "ties_at_hooks"),
        ("hook 180", "ACI 318-19", {"spacing": 6.0}, "spaced_hooks"),
        ("hook 180", "ACI 318-19", {"clear_spacing": 5.0}, "spaced_hooks"),
        ("hook 90", "ACI 318-19", {"side_cover": 2.5}, "location_outside_core"),
        ("hook 90", "ACI 318-19", {"side_cover": 2.5, "in_column_core": True}, "location_in_core"),
        ("headed", "ACI 318-14", {}, "head_14"),
        ("headed", "ACI 318-19", {}, "head_19"),
        ("headed", "ACI 318-19", {"confining_ties": True}, "ties_at_heads"),
        ("headed", "ACI 318-19", {"spacing": 6.0}, "spaced_heads"),
        ("headed", "ACI 318-19", {"clear_spacing": 5.0}, "spaced_heads"),
        ("straight compression", "ACI 318-14", {"confining_ties": True}, "ties_in_compression"),
        ("straight compression", "ACI 318-19", {}, "without_ties_in_compression"),
        ("straight compression", "ACI 318-19", {"A_s_required": 1.0, "A_s_provided": 2.0}, "compression_reduced"),
        ("lap tension", "ACI 318-14", {"lap_class": "A"}, "lap_class_a"),
        ("lap tension", "ACI 318-19", {}, "lap_class_b"),
        ("lap compression", "ACI 318-14", {}, "lap_without_reduction"),
        ("lap compression", "ACI 318-19", {"confining_ties": True}, "lap_in_ties"),
        ("lap compression", "ACI 318-19", {"f_y": 80_000.0}, "lap_compression"),
        ("lap compression", "ACI 318-19", {"f_y": 80_001.0}, "lap_compression_high_grade"),
    ],
)
def test_the_rule_that_serves(kind: str, name: str, changes: dict[str, Any], used: str, row: Any, steps: Any) -> None:
    required_length(steps, row(kind, **changes), edition(name))
    assert used in [formula.name for _, formula in steps.clauses]


def test_every_formula_of_a_row_is_worked_once(row: Any, each: Edition, steps: Any) -> None:
    required_length(steps, row("lap compression", confining_ties=True), each)
    formulas: list[Formula] = [formula for _, formula in steps.clauses]
    assert len(formulas) == len(set(formulas))
