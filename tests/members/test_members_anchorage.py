"""Anchorage rows of every kind: which equation and factor serve, in which order, and what is noted."""

from __future__ import annotations

import math
from collections.abc import Callable
from typing import Any

import pytest
from hypothesis import HealthCheck, given, settings
from hypothesis import strategies as st

from calcpack.aci318.editions import EDITIONS, Edition, edition
from calcpack.errors import RangeError
from calcpack.members.anchorage import check, check_all, required_length
from calcpack.members.pad import FloatPad
from calcpack.members.termination import KINDS, Termination, place

Row = Callable[..., Termination]
SYMBOLS = {
    "straight tension": "l_d",
    "hook 90": "l_dh",
    "hook 180": "l_dh",
    "headed": "l_dt",
    "straight compression": "l_dc",
    "lap tension": "l_st",
    "lap compression": "l_sc",
}
# 60000/sqrt(4000), the common part of most hand computations below.
BASE = 60_000.0 / math.sqrt(4_000.0)


def length(row: Termination, one: Edition) -> float:
    return required_length(FloatPad(), row, one).value


@pytest.mark.parametrize("kind", SYMBOLS)
def test_every_kind_gives_its_usual_symbol(kind: str, row: Row, each: Edition) -> None:
    result = check(row(kind, available=60.0), each)
    assert (result.mark, result.check, result.combination) == ("T1", kind, "")
    ((symbol, (value, unit)),) = result.values.items()
    assert (symbol, unit) == (SYMBOLS[kind], "in")
    assert result.ratio == pytest.approx(value / 60.0)
    assert result.clause


@pytest.mark.parametrize("kind", KINDS)
def test_without_an_available_length_there_is_no_ratio_and_no_verdict(kind: str, row: Row, each: Edition) -> None:
    result = check(row(kind), each)
    assert (result.ratio, result.verdict) == (None, "")


def test_verdict_is_ok_up_to_and_at_one(row: Row, e19: Edition) -> None:
    needed = length(row(), e19)
    assert check(row(available=needed), e19).verdict == "OK"
    assert check(row(available=needed), e19).ratio == 1.0
    assert check(row(available=needed * 0.999), e19).verdict == "NG"


@pytest.mark.parametrize("kind", KINDS)
def test_every_step_cites_the_edition_of_the_job(kind: str, row: Row, each: Edition, steps: Any) -> None:
    required_length(steps, row(kind, side_cover=2.5, tail_cover=2.0), each)
    for _, formula in steps.clauses:
        assert formula.clause(each.standard).standard is each.standard


def test_a_hook_cites_the_tables_of_hooks(row: Row, e19: Edition, steps: Any) -> None:
    required_length(steps, row("hook 90", side_cover=2.5), e19)
    cited = {target: formula.clause(e19.standard).number for target, formula in steps.clauses}
    for factor in ("psi_e", "psi_r", "psi_o", "psi_c"):
        assert cited[factor] == "Table 25.4.3.2"


def test_a_head_cites_the_table_of_heads(row: Row, e19: Edition, steps: Any) -> None:
    required_length(steps, row("headed", side_cover=2.5), e19)
    cited = {target: formula.clause(e19.standard).number for target, formula in steps.clauses}
    for factor in ("psi_e", "psi_p", "psi_o", "psi_c"):
        assert cited[factor] == "Table 25.4.4.3"


def test_steps_come_in_the_order_of_a_hand_calculation(row: Row, e19: Edition, steps: Any) -> None:
    required_length(steps, row(c_b=2.0), e19)
    symbols = [name for kind, name in steps.steps if kind != "reason"]
    assert symbols == [
        # Givens first, then factors, then the equation.
        *["f_y", "f_c", "lamb", "d_b", "c_b", "K_tr", "psi_t", "psi_e", "psi_s", "psi_g"],
        *["psi_te", "confinement", "root_f_c", "l_d_a", "l_d"],
    ]


def test_each_value_is_stated_once(row: Row, each: Edition, steps: Any) -> None:
    required_length(steps, row("lap compression", f_y=80_000.0), each)
    names = [name for kind, name in steps.steps if kind == "given"]
    assert len(names) == len(set(names))


# Which equation


def test_c_b_calls_the_general_equation(row: Row, each: Edition, steps: Any) -> None:
    found = required_length(steps, row(c_b=2.0), each)
    assert found.clause == {"ACI 318-14": "25.4.2.3a", "ACI 318-19": "25.4.2.4a"}[each.name]
    assert found.value == pytest.approx(3 / 40 * BASE / 2.0)
    assert "General equation: c_b is stated." in steps.reasons


@pytest.mark.parametrize(
    ("changes", "coefficient"),
    [
        ({}, 3 / 40),
        ({"clear_cover": 2.0}, 3 / 40),
        ({"clear_spacing": 5.0}, 3 / 40),
        ({"clear_cover": 1.0, "clear_spacing": 2.0}, 1 / 20),
        ({"clear_cover": 0.99, "clear_spacing": 2.0}, 3 / 40),
        ({"clear_cover": 1.0, "clear_spacing": 1.99}, 3 / 40),
        ({"clear_cover": 1.0, "clear_spacing": 1.0, "confining_ties": True}, 1 / 20),
        ({"clear_cover": 1.0, "clear_spacing": 0.99, "confining_ties": True}, 3 / 40),
        ({"clear_cover": 0.99, "clear_spacing": 1.0, "confining_ties": True}, 3 / 40),
    ],
)
def test_row_of_the_table(changes: dict[str, Any], coefficient: float, row: Row, each: Edition, steps: Any) -> None:
    # ACI 318-14 Table 25.4.2.2, 318-19 Table 25.4.2.3, conditions from memory.
    found = required_length(steps, row(**changes), each)
    assert found.value == pytest.approx(coefficient * BASE)
    assert found.clause == {"ACI 318-14": "Table 25.4.2.2", "ACI 318-19": "Table 25.4.2.3"}[each.name]
    wanted = "Table, first row" if coefficient == 1 / 20 else "Table, other cases"
    assert any(text.startswith(wanted) for text in steps.reasons)


def test_missing_cover_is_named_in_the_reason(row: Row, e14: Edition, steps: Any) -> None:
    required_length(steps, row(clear_spacing=4.0), e14)
    assert "Table, other cases: clear cover not stated." in steps.reasons


# Factors


def test_trap_top_bars_change_straight_bars_and_not_hooks(row: Row, each: Edition) -> None:
    assert length(row(top=True), each) == pytest.approx(1.3 * length(row(), each))
    assert length(row("lap tension", top=True), each) == pytest.approx(1.3 * length(row("lap tension"), each))
    for kind in ("hook 90", "hook 180", "headed"):
        assert length(row(kind, top=True), each) == length(row(kind), each)


def test_trap_grade_factor_in_318_19_only(row: Row, e14: Edition, e19: Edition) -> None:
    grade_80 = row(f_y=80_000.0)
    assert length(grade_80, e19) == pytest.approx(1.15 * length(grade_80, e14))
    assert length(row(), e19) == pytest.approx(length(row(), e14))


@pytest.mark.parametrize(
    ("coating", "changes", "factor"),
    [
        ("none", {}, 1.0),
        ("zinc", {}, 1.0),
        ("epoxy", {"clear_cover": 3.0, "clear_spacing": 6.0}, 1.2),
        ("dual", {"clear_cover": 3.0, "clear_spacing": 6.0}, 1.2),
        ("epoxy", {"clear_cover": 2.9, "clear_spacing": 6.0}, 1.5),
        ("epoxy", {"clear_cover": 3.0, "clear_spacing": 5.9}, 1.5),
        ("epoxy", {"c_b": 3.5}, 1.2),
        ("epoxy", {"c_b": 3.4}, 1.5),
    ],
)
def test_coating_of_straight_bars(
    coating: str, changes: dict[str, Any], factor: float, row: Row, each: Edition, steps: Any
) -> None:
    required_length(steps, row(coating=coating, **changes), each)
    assert steps.values["psi_e"] == factor


def test_trap_coating_of_ends_is_1_2_whatever_the_cover(row: Row, each: Edition) -> None:
    for kind in ("hook 90", "headed"):
        assert length(row(kind, coating="epoxy"), each) == pytest.approx(1.2 * length(row(kind), each))
        assert length(row(kind, coating="zinc"), each) == length(row(kind), each)


@pytest.mark.parametrize(
    ("kind", "changes", "factor"),
    [
        ("hook 90", {}, 1.0),
        ("hook 90", {"side_cover": 2.5}, 1.0),
        ("hook 90", {"tail_cover": 2.0}, 1.0),
        ("hook 90", {"side_cover": 2.5, "tail_cover": 2.0}, 0.7),
        ("hook 90", {"side_cover": 2.5, "tail_cover": 1.9}, 1.0),
        ("hook 180", {"side_cover": 2.5}, 0.7),
        ("hook 180", {"side_cover": 2.4}, 1.0),
        ("hook 180", {}, 1.0),
        ("hook 90", {"confining_ties": True}, 0.8),
        ("hook 90", {"side_cover": 2.5, "tail_cover": 2.0, "confining_ties": True}, 0.56),
    ],
)
def test_hooks_of_318_14(kind: str, changes: dict[str, Any], factor: float, row: Row, e14: Edition) -> None:
    # ACI 318-14 Table 25.4.3.2.
    assert length(row(kind, **changes), e14) == pytest.approx(factor * BASE / 50)


@pytest.mark.parametrize(
    ("changes", "factor"),
    [
        ({}, 2.0),
        ({"confining_ties": True}, 1.25),
        ({"spacing": 6.0}, 1.25),
        ({"spacing": 5.9}, 2.0),
        ({"side_cover": 6.0}, 1.6),
        ({"side_cover": 5.9}, 2.0),
        ({"side_cover": 2.5, "in_column_core": True}, 1.6),
        ({"side_cover": 2.4, "in_column_core": True}, 2.0),
        ({"in_column_core": True}, 2.0),
        ({"side_cover": 2.5, "in_column_core": True, "confining_ties": True}, 1.0),
    ],
)
@pytest.mark.parametrize(("kind", "divisor"), [("hook 90", 55), ("hook 180", 55), ("headed", 75)])
def test_hooks_and_heads_of_318_19(
    kind: str, divisor: int, changes: dict[str, Any], factor: float, row: Row, e19: Edition
) -> None:
    # ACI 318-19 Tables 25.4.3.2 and 25.4.4.3: 1.6 and 1.25; psi_c = 4000/15000 + 0.6; d_b = 1.
    psi_c = 4_000.0 / 15_000.0 + 0.6
    assert length(row(kind, **changes), e19) == pytest.approx(max(factor * psi_c * BASE / divisor, 8.0))


@pytest.mark.parametrize("bar", [14, 18])
def test_trap_large_hooks_take_no_favourable_factor(bar: int, row: Row, e14: Edition, e19: Edition) -> None:
    favourable = {"bar": bar, "side_cover": 20.0, "tail_cover": 2.0, "confining_ties": True, "in_column_core": True}
    for one in (e14, e19):
        assert length(row("hook 90", **favourable), one) == pytest.approx(length(row("hook 90", bar=bar), one))


def test_compression_in_ties(row: Row, each: Edition) -> None:
    # ACI 318 25.4.9.2: 60000/(50 sqrt(4000)) = 18.97 in; Table 25.4.9.3: 0.75.
    assert length(row("straight compression"), each) == pytest.approx(BASE / 50)
    assert length(row("straight compression", confining_ties=True), each) == pytest.approx(0.75 * BASE / 50)


# Reduction for excess reinforcement

AREAS = {"A_s_required": 3.0, "A_s_provided": 4.0}


@pytest.mark.parametrize(
    ("kind", "name", "factor"),
    [
        ("straight tension", "ACI 318-14", 0.75),
        ("straight tension", "ACI 318-19", 0.75),
        ("straight compression", "ACI 318-14", 0.75),
        ("straight compression", "ACI 318-19", 0.75),
        ("hook 90", "ACI 318-14", 0.75),
        ("hook 90", "ACI 318-19", 1.0),
        ("hook 180", "ACI 318-19", 1.0),
        ("headed", "ACI 318-14", 1.0),
        ("headed", "ACI 318-19", 1.0),
        ("lap tension", "ACI 318-14", 1.0),
        ("lap tension", "ACI 318-19", 1.0),
        ("lap compression", "ACI 318-19", 1.0),
    ],
)
def test_trap_excess_steel_counts_only_where_it_is_allowed(kind: str, name: str, factor: float, row: Row) -> None:
    # AB-XS-01, published: straight bars in both editions, hooks in 318-14 only, heads and laps in neither.
    one = edition(name)
    assert length(row(kind, **AREAS), one) == pytest.approx(factor * length(row(kind), one))
    said = any("No reduction for excess" in note for note in check(row(kind, **AREAS), one).notes)
    assert said is (factor == 1.0)


# common practice: 318-19 Tables 25.4.3.2 and 25.4.4.3, 6 d_b centre to centre, 5 d_b clear of a No. 8.
@pytest.mark.parametrize(("clear", "factor"), [(5.1, 1.0), (5.0, 1.0), (4.9, 1.6)])
@pytest.mark.parametrize("kind", ["hook 90", "hook 180", "headed"])
def test_clear_spacing_counts_as_spacing_of_hooks_and_heads(
    kind: str, clear: float, factor: float, row: Row, e19: Edition
) -> None:
    confined = length(row(kind, confining_ties=True, clear_spacing=clear), e19)
    assert length(row(kind, clear_spacing=clear), e19) == pytest.approx(factor * confined)


# Laps


def test_lap_class(row: Row, each: Edition, steps: Any) -> None:
    l_d = length(row(), each)
    assert length(row("lap tension", lap_class="A"), each) == pytest.approx(l_d)
    assert length(row("lap tension", lap_class="B"), each) == pytest.approx(1.3 * l_d)
    assert required_length(steps, row("lap tension"), each).value == pytest.approx(1.3 * l_d)
    assert "Class B: class not stated." in steps.reasons


@pytest.mark.parametrize(("provided", "refused"), [(2.1, False), (2.0, False), (1.9, True)])
def test_trap_class_a_needs_twice_the_area(provided: float, refused: bool, row: Row, each: Edition) -> None:
    # AB-LAP-06, ACI 318 Table 25.5.2.1.
    one = row("lap tension", lap_class="A", A_s_required=1.0, A_s_provided=provided)
    if refused:
        with pytest.raises(RangeError, match=r"class A from twice the area required \(Table 25.5.2.1\): use class B"):
            check(one, each)
    else:
        assert length(one, each) == pytest.approx(length(row(), each))


def test_compression_lap_above_grade_80_follows_the_tension_lap(row: Row, e19: Edition) -> None:
    one = {"f_y": 100_000.0, "clear_cover": 2.0, "clear_spacing": 6.0}
    assert length(row("lap compression", **one), e19) == pytest.approx(length(row("lap tension", **one), e19))


# Conditions beside the length


@pytest.mark.parametrize(
    ("changes", "met"),
    [
        ({"spacing": 5.9, "K_tr": 0.4}, False),
        ({"spacing": 5.9, "K_tr": 0.5}, True),
        ({"spacing": 6.0, "K_tr": 0.0}, True),
        ({"clear_spacing": 4.9}, False),
        ({"clear_spacing": 5.0}, True),
        ({"spacing": 4.0, "f_y": 79_999.0}, True),
    ],
)
@pytest.mark.parametrize(("kind", "clause"), [("straight tension", "25.4.2.2"), ("lap tension", "25.5.1.5")])
def test_trap_close_bars_of_high_grade_need_ties(
    kind: str, clause: str, changes: dict[str, Any], met: bool, row: Row, e14: Edition, e19: Edition
) -> None:
    # ACI 318-19 25.4.2.2 and 25.5.1.5: Grade 80 and above, closer than 6 in, K_tr of 0.5 d_b.
    one = row(kind, available=400.0, **{"f_y": 80_000.0, **changes})
    assert check(one, e19).verdict == ("OK" if met else "NG")
    assert any(clause in note for note in check(one, e19).notes) is (not met or changes.get("K_tr") == 0.5)
    assert check(one, e14).verdict == "OK"


def test_unknown_spacing_of_high_grade_bars_is_noted(row: Row, e19: Edition) -> None:
    result = check(row(f_y=80_000.0, available=400.0), e19)
    assert result.verdict == "OK"
    assert any(note.startswith("if bars stand closer than 6 in") for note in result.notes)


def test_c_b_that_contradicts_cover_or_spacing_is_not_met(row: Row, each: Edition) -> None:
    assert check(row(c_b=2.0, clear_cover=1.5, available=90.0), each).verdict == "OK"
    short = check(row(c_b=2.5, clear_cover=1.5, available=90.0), each)
    assert short.verdict == "NG"
    assert short.notes == ("Not met: c_b = 2.5 in, clear cover gives 2 in (2.2)",)
    assert check(row(c_b=2.5, spacing=4.0, available=90.0), each).verdict == "NG"
    # The smaller of 3.5 in and 2 in counts.
    assert check(row(c_b=2.5, clear_cover=3.0, spacing=4.0, available=90.0), each).verdict == "NG"
    assert check(row(c_b=2.0, clear_cover=3.0, spacing=4.0, available=90.0), each).verdict == "OK"


@pytest.mark.parametrize(
    ("changes", "name", "met"),
    [
        ({"clear_cover": 2.0}, "ACI 318-14", True),
        ({"clear_cover": 1.9}, "ACI 318-14", False),
        ({"clear_spacing": 4.0}, "ACI 318-14", True),
        ({"clear_spacing": 3.9}, "ACI 318-14", False),
        ({"spacing": 3.0}, "ACI 318-19", True),
        ({"spacing": 2.9}, "ACI 318-19", False),
        ({}, "ACI 318-19", True),
    ],
)
def test_clearances_of_heads(changes: dict[str, Any], name: str, met: bool, row: Row) -> None:
    # ACI 318-14 25.4.4.1: cover 2 d_b, clear spacing 4 d_b; 318-19: 3 d_b centre to centre; from memory.
    assert check(row("headed", available=60.0, **changes), edition(name)).verdict == ("OK" if met else "NG")


# Schedules


def test_a_schedule_reports_every_row_that_cannot_be_checked(row: Row, e19: Edition) -> None:
    good = row(mark="A", available=90.0)
    bad = [row(mark="B", f_c=40.0, file="inputs/anchorage.csv", row=3), row(mark="C", bar=12, file="x.csv", row=4)]
    assert [result.mark for result in check_all([good, good], e19)] == ["A", "A"]
    with pytest.raises(RangeError, match=r"(?s)2 rows cannot.*inputs/anchorage.csv, row 3.*x.csv, row 4"):
        check_all([good, *bad], e19)


def test_place_of_a_row(row: Row) -> None:
    assert place(row(file="inputs/anchorage.csv", row=14)) == "inputs/anchorage.csv, row 14"
    assert place(row(file="inputs/anchorage.csv")) == "inputs/anchorage.csv"
    assert place(row()) == "schedule, mark T1"


ROWS = st.builds(
    Termination,
    mark=st.just("P"),
    kind=st.sampled_from(list(SYMBOLS)),
    bar=st.sampled_from([3, 4, 5, 6, 7, 8, 9, 10, 11]),
    f_c=st.floats(2_500.0, 15_000.0),
    f_y=st.sampled_from([40_000.0, 60_000.0]),
    top=st.booleans(),
    clear_cover=st.floats(0.5, 6.0),
    clear_spacing=st.floats(0.5, 12.0),
    coating=st.sampled_from(["none", "epoxy", "zinc", "dual"]),
    side_cover=st.none() | st.floats(0.5, 12.0),
    confining_ties=st.booleans(),
    in_column_core=st.booleans(),
)
MINIMA = {"l_d": 12.0, "l_dh": 6.0, "l_dt": 6.0, "l_dc": 8.0, "l_st": 12.0, "l_sc": 12.0}


@settings(suppress_health_check=[HealthCheck.too_slow], deadline=None)
@given(row=ROWS, name=st.sampled_from(list(EDITIONS)))
def test_no_length_falls_below_its_minimum(row: Termination, name: str) -> None:
    found = required_length(FloatPad(), row, edition(name))
    assert found.value >= MINIMA[found.symbol]


@settings(deadline=None)
@given(row=ROWS, name=st.sampled_from(list(EDITIONS)))
def test_a_bar_does_not_get_shorter_in_less_cover(row: Termination, name: str) -> None:
    from dataclasses import replace

    one = edition(name)
    shallow = replace(row, clear_cover=row.clear_cover / 2 if row.clear_cover else None)
    assert length(shallow, one) >= length(row, one)
