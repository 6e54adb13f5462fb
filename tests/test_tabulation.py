"""Worked tables on floats: what a row works, what it leaves out, what is refused."""

from __future__ import annotations

import time
from dataclasses import replace
from typing import Any

import pytest
from hypothesis import given
from hypothesis import strategies as st
from job_samples import twice
from table_samples import (
    BARS,
    DEPTHS,
    SHARED,
    float_rows,
    force,
    moment,
    running_rows,
    running_table,
    strain,
    stress,
)

from calcpack import expression
from calcpack.errors import InputError, RangeError
from calcpack.formula import formula
from calcpack.members.pad import FloatPad, Pad
from calcpack.tabulation import Above, Column, FloatBench, Tabulation, Worked, tabulate, targets, total_expression
from calcpack.units import Force, Length, Stress

PAD: Pad[float] = FloatPad()


def column(made: Any, symbol: str) -> list[Any]:
    return [values.get(symbol) for values in made.rows]


def test_bars_worked_by_hand() -> None:
    made = PAD.tabulate(BARS, float_rows(), SHARED)
    # By hand: 0.003 (15 - d)/15; 29,000 ksi times it, at most 58 ksi, which is reached at 0.002 (d = 25 in);
    # 1 in² times it; the force times (16.5 in - d).
    assert column(made, "eps_s") == pytest.approx([0.0024, 0.0006, 0.0, -0.001, -0.002, -0.003], rel=1e-12)
    assert column(made, "f_s") == pytest.approx([58e3, 17.4e3, 0.0, -29e3, -58e3, -58e3], rel=1e-12)
    assert column(made, "F_s") == column(made, "f_s")
    assert column(made, "M_Fx") == pytest.approx([783e3, 78.3e3, 0.0, 101.5e3, 493e3, 783e3], rel=1e-12)
    assert column(made, "d_s") == list(DEPTHS)
    assert made.totals == pytest.approx({"F_s_sum": -69.6e3, "M_Fx_sum": 2238.8e3}, rel=1e-12)


@pytest.mark.parametrize(("strained", "worked"), [(0.0019, 55_100.0), (0.002, 58_000.0), (0.0021, 58_000.0)])
def test_both_sides_of_yield_and_the_value_on_it(strained: float, worked: float) -> None:
    table = Tabulation("Stress", "bar", (stress,), (Column("f_s", 1),))
    rows: list[Any] = [("1", {"eps_s": strained}), ("2", {"eps_s": -strained})]
    made = PAD.tabulate(table, rows, SHARED)
    # By hand: 29,000 ksi times 0.0019 is 55.1 ksi; 58/29,000 is 0.002.
    assert column(made, "f_s") == pytest.approx([worked, -worked], rel=1e-12)


def test_an_argument_of_the_row_goes_before_a_shared_one() -> None:
    table = Tabulation("Force", "bar", (force,), (Column("F_s", 1),))
    made = PAD.tabulate(table, [("a", {"A_b": 2.0}), ("b", {})], {"A_b": 1.0, "f_s": 100.0})
    assert column(made, "F_s") == [200.0, 100.0]
    assert [sorted(values) for values in made.rows] == [["A_b", "F_s"], ["F_s"]]


def test_a_row_takes_what_the_row_above_has() -> None:
    made = PAD.tabulate(running_table(totals={"F_s": "P_n"}), running_rows([1.0, 2.0, 3.0, 4.0]), {"f_s": 10.0})
    # 10, 20, 30, 40; the first row has no sum above it, so none of its own
    assert column(made, "S_u") == [None, 30.0, 60.0, 100.0]
    assert column(made, "S_above") == [None, 10.0, 30.0, 60.0]
    assert made.totals == {"P_n": 100.0}


def test_a_row_takes_nothing_from_a_row_that_has_nothing() -> None:
    table = Tabulation("Force", "bar", (force,), (Column("F_s", 1),))
    rows: list[Any] = [
        ("1", {"A_b": Above("A_b")}), ("2", {"A_b": 3.0, "y": Above("A_b")}), ("3", {"A_b": Above("y")}),
        ("4", {"A_b": 1.0}), ("5", {"A_b": Above("A_b")}),
    ]  # fmt: skip
    made = PAD.tabulate(table, rows, {"f_s": 10.0})
    assert column(made, "F_s") == [None, 30.0, None, 10.0, 10.0]
    assert column(made, "y") == [None, None, None, None, None]


def test_own_values_may_be_plain_arithmetic() -> None:
    table = Tabulation("Depths", "bar", (), (Column("d_s", 2),), {"d_s": "h_u"})
    rows: list[Any] = [
        ("1", {"d_s": Worked("x_o*(2*1/(4 - 1) - 1) + 5", {"x_o": 9.0})}),
        ("2", {"d_s": Worked("h/2 - D_s/2*cos(2*pi*3/8)", {"h": 20.0, "D_s": 16.0})}),
        ("3", {"d_s": 1.5}),
    ]
    # by hand: 9 (-1/3) + 5; 10 + 8/√2; as stated
    assert column(PAD.tabulate(table, rows, {}), "d_s") == pytest.approx([2.0, 15.656854249492380, 1.5], rel=1e-15)


def test_lines_between_are_values_of_the_row_too() -> None:
    table = Tabulation("Spans", "bay", (twice,), (Column("L_2", 1), Column("L_3", 1)))
    made = PAD.tabulate(table, [("1", {"L_1": 60.0})], {})
    assert made.rows == ({"L_1": 60.0, "L_2": 120.0, "L_3": 180.0},)  # 2 × 5 ft, 3 × 5 ft
    assert targets(twice) == ("L_2", "L_3")
    assert targets(stress) == ("f_s",)


@formula("test")
def other_force(*, A_b: Length, f_y: Stress) -> Force:
    """Force of a bar, another way."""
    F_s: Force = A_b * A_b * f_y
    return F_s


def test_two_formulas_may_give_one_symbol_in_different_rows() -> None:
    table = Tabulation("Force", "bar", (force, other_force), (Column("F_s", 1),))
    rows: list[Any] = [("1", {"f_s": 10.0}), ("2", {"f_y": 20.0})]
    assert column(PAD.tabulate(table, rows, {"A_b": 3.0}), "F_s") == [30.0, 180.0]
    with pytest.raises(InputError, match=r"F_s is set before other_force sets it  one value a row  \[bar 1\]"):
        PAD.tabulate(table, rows, {"A_b": 3.0, "f_y": 20.0})


@given(st.lists(st.floats(-1e9, 1e9), min_size=1, max_size=90))
def test_a_total_is_what_its_expression_gives(values: list[float]) -> None:
    text, where = total_expression("F_s", values)
    assert FloatBench().total("P_n", "F_s", values) == expression.evaluate(text, where)


def test_the_expression_of_a_total() -> None:
    assert total_expression("F_s", [3.0, 4.0]) == ("F_s_1 + F_s_2", {"F_s_1": 3.0, "F_s_2": 4.0})
    assert total_expression("x", [3.0]) == ("x_1", {"x_1": 3.0})


# What is refused


def changed(**changes: Any) -> Tabulation:
    return replace(BARS, **changes)


EPS = Column("eps_s", 7)


@pytest.mark.parametrize(
    ("table", "message"),
    [
        (changed(title=" "), r"a table without a title  what is worked, in words"),
        (changed(columns=()), r"no columns  one column or more"),
        (changed(formulas=(len,)), r"<built-in function len>  a formula: put @formula"),
        (changed(columns=BARS.columns[:-1], totals={}), r"M_Fx is worked and not printed  a column for every worked"),
        (changed(columns=(*BARS.columns, Column("f_c", 1))), r"column f_c  a value of the rows or a result: d_s, A_b"),
        (changed(columns=(*BARS.columns, EPS)), r"column eps_s stands 2 times  once"),
        (changed(columns=(*BARS.columns[:-1], Column("M_Fx", -1))), r"column M_Fx: -1 decimals  a whole number from 0"),
        (changed(columns=(*BARS.columns[:-1], Column("M_Fx", 10))), r"column M_Fx: 10 decimals"),
        (changed(columns=(*BARS.columns[:-1], Column("M_Fx", True))), r"column M_Fx: True decimals"),
        (changed(columns=(*BARS.columns[:-1], Column("M_Fx", 1.0))), r"column M_Fx: 1.0 decimals"),  # type: ignore[arg-type]
        (changed(totals={"f_y": "P_n"}), r"total P_n of f_y  the symbol of a column: d_s, A_b, eps_s, f_s, F_s, M_Fx"),
        (changed(totals={"F_s": "sum of F"}), r"total 'sum of F' of F_s +letters, digits and _"),
    ],
)  # fmt: skip
def test_a_table_that_cannot_be_worked(table: Tabulation, message: str) -> None:
    with pytest.raises(InputError, match=message):
        PAD.tabulate(table, float_rows(), SHARED)


@pytest.mark.parametrize("decimals", [0, 9])
def test_the_fewest_and_the_most_decimals(decimals: int) -> None:
    columns = (*BARS.columns[:-1], Column("M_Fx", decimals))
    assert PAD.tabulate(changed(columns=columns), float_rows(), SHARED).totals


def test_everything_wrong_with_a_table_at_once() -> None:
    with pytest.raises(InputError, match=r"^table ''\n") as caught:
        PAD.tabulate(Tabulation("", "bar", (force,), ()), [], {})
    assert [problem.given for problem in caught.value.problems] == ["a table without a title", "no rows", "no columns"]


def test_an_own_value_that_is_worked_stands_on_the_page() -> None:
    rows: list[Any] = [("1", {"A_b": 1.0, "y": Worked("2*b", {"b": 1.0})})]
    with pytest.raises(InputError, match=r"y is worked and not printed  a column for every worked value: add y"):
        PAD.tabulate(Tabulation("Force", "bar", (force,), (Column("F_s", 1),)), rows, {"f_s": 1.0})


def test_totals_have_as_many_terms_as_an_expression_can() -> None:
    table = Tabulation("Force", "bar", (force,), (Column("F_s", 1),), {"F_s": "P_n"})
    rows: list[Any] = [(str(number), {"f_s": 1.0}) for number in range(91)]
    assert PAD.tabulate(table, rows[:90], {"A_b": 1.0}).totals == {"P_n": 90.0}
    with pytest.raises(InputError, match=r"totals over 91 rows  at most 90: make two tables, and add their totals"):
        PAD.tabulate(table, rows, {"A_b": 1.0})
    assert len(PAD.tabulate(replace(table, totals={}), rows, {"A_b": 1.0}).rows) == 91


@pytest.mark.parametrize(
    ("rows", "shared", "message"),
    [
        ([{"f_s": 1.0}], {}, r"force lacks A_b  a value in a row, or shared by all: state it"),
        ([{}, {}], {}, r"force lacks A_b, f_s"),
        ([{"A_b": Above("A_b")}], {"f_s": 1.0}, r"force lacks A_b"),
        ([{"A_b": 1.0}, {"f_s": 1.0}], {}, r"force lacks an argument in every row  all of them in one row or more"),
    ],
)  # fmt: skip
def test_an_argument_that_no_row_has(rows: list[Any], shared: dict[str, float], message: str) -> None:
    table = Tabulation("Force", "bar", (force,), (Column("F_s", 1),), {"F_s": "P_n"})
    with pytest.raises(InputError, match=message):
        PAD.tabulate(table, [(str(number), own) for number, own in enumerate(rows, 1)], shared)


def test_a_column_of_own_values_that_no_row_has() -> None:
    table = Tabulation("Force", "bar", (force,), (Column("F_s", 1), Column("y", 1)))
    with pytest.raises(InputError, match=r"column y has no value in any row  a value in one row or more"):
        PAD.tabulate(table, [("1", {"y": Above("y")})], {"A_b": 1.0, "f_s": 1.0})


def test_a_formula_without_its_lines_between_is_named_once() -> None:
    table = Tabulation("Spans", "bay", (twice,), (Column("L_2", 1), Column("L_3", 1)))
    with pytest.raises(InputError) as caught:
        PAD.tabulate(table, [("1", {})], {})
    assert [problem.given for problem in caught.value.problems] == ["twice lacks L_1"]


@pytest.mark.parametrize(
    ("worked", "message"),
    [
        (Worked("0.5*b", {}), r"d_s = '0.5\*b'  a value for every symbol in it: add b to where  \[bar 1\]"),
        (Worked("b*h*b", {"h": 1.0}), r"add b to where"),
        (Worked("b if h else 2", {"h": 1.0, "b": 1.0}), r"plain arithmetic \(not allowed in a formula"),
        (Worked("b *", {"b": 1.0}), r"plain arithmetic \(not an expression"),
        (Worked("1/b", {"b": 0.0}), r"plain arithmetic \('1/b' has no value here"),
    ],
)
def test_arithmetic_that_cannot_be_worked(worked: Worked[float], message: str) -> None:
    table = Tabulation("Depths", "bar", (), (Column("d_s", 1),))
    with pytest.raises(InputError, match=message):
        PAD.tabulate(table, [("1", {"d_s": worked})], {})


def test_values_out_of_range_are_told_row_by_row() -> None:
    table = Tabulation("Force", "bar", (force,), (Column("F_s", 1),))
    rows: list[Any] = [("1", {"A_b": -1.0}), ("2", {"A_b": 1.0}), ("3", {"A_b": 0.0})]
    with pytest.raises(RangeError, match=r"^table 'Force'\n.*A_b = -1 in\^2 .*\[bar 1\]\n.*A_b = 0 in\^2 .*\[bar 3\]$"):
        PAD.tabulate(table, rows, {"f_s": 1.0})


def test_a_bench_is_all_that_differs() -> None:
    assert tabulate(BARS, float_rows(), SHARED, FloatBench()) == PAD.tabulate(BARS, float_rows(), SHARED)


def test_a_table_of_24_bars_and_5_formulas_takes_milliseconds() -> None:
    @formula("statics")
    def moment_y(*, F_s: Force, d_s: Length) -> Force:
        """A fifth one."""
        S_n = F_s * d_s / d_s
        return S_n

    table = changed(formulas=(strain, stress, force, moment, moment_y), columns=(*BARS.columns, Column("S_n", 1)))
    rows: list[Any] = [(str(number), {"d_s": 1.0 + number}) for number in range(24)]
    shared = {**SHARED, "h": 60.0}
    rows[0][1]["A_b"] = 1.0
    PAD.tabulate(table, rows, shared)
    start = time.perf_counter()
    for _ in range(5):
        PAD.tabulate(table, rows, shared)
    seconds = (time.perf_counter() - start) / 5
    print(f"24 bars, 5 formulas: {seconds * 1e3:.2f} ms, goal 1, bound 20")
    assert seconds < 0.02
