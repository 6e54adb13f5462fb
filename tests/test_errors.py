"""The error tree: what each message says, where it happened, and all problems at once."""

from __future__ import annotations

import inspect

import pytest

from calcpack import errors
from calcpack.errors import (
    CalcpackError,
    FormulaError,
    InputError,
    LayoutError,
    LedgerError,
    NeedsSheet,
    Problem,
    RangeError,
    RefusedError,
    SheetError,
    TableError,
    UnitError,
)

STRENGTH = Problem("f_c = 40 psi", "2,500 psi and up (ACI 318-19 19.2.1.1)", "was this meant to be 4,000 psi?")
BAR = Problem("d_b = 0.9 in", "a bar of ASTM A615", where="row 14")


def test_problem_is_one_line() -> None:
    assert STRENGTH.line() == "f_c = 40 psi  2,500 psi and up (ACI 318-19 19.2.1.1): was this meant to be 4,000 psi?"
    assert BAR.line() == "d_b = 0.9 in  a bar of ASTM A615  [row 14]"
    assert Problem("a", "b").line(4) == "a     b"


def test_message_lists_every_problem_aligned_and_the_place() -> None:
    error = RangeError("straight_tension: 2 arguments out of range", [STRENGTH, BAR], "inputs/anchorage.csv, row 14")
    assert str(error).splitlines() == [
        "straight_tension: 2 arguments out of range",
        "  f_c = 40 psi  2,500 psi and up (ACI 318-19 19.2.1.1): was this meant to be 4,000 psi?",
        "  d_b = 0.9 in  a bar of ASTM A615  [row 14]",
        "inputs/anchorage.csv, row 14",
    ]


def test_long_text_does_not_push_the_others_away() -> None:
    error = InputError("x", [Problem("n" * 200, "short"), Problem("a", "b")])
    assert str(error).splitlines()[2] == f"  a{' ' * 43}  b"


def test_data_is_on_the_error() -> None:
    error = UnitError("f_c", (problem for problem in [STRENGTH, BAR]), "row 3")
    assert (error.subject, error.problems, error.where) == ("f_c", (STRENGTH, BAR), "row 3")


def test_an_error_without_problems_still_speaks() -> None:
    assert str(InputError("nothing", [])) == "nothing"


@pytest.mark.parametrize("kind", [InputError, UnitError, RangeError, TableError, SheetError, NeedsSheet])
def test_at_names_the_place_and_keeps_kind_and_problems(kind: type[InputError]) -> None:
    moved = kind("f_c", [STRENGTH]).at("columns.csv, row 2")
    assert type(moved) is kind
    assert moved.problems == (STRENGTH,)
    assert str(moved).endswith("\ncolumns.csv, row 2")


def test_gathered_keeps_the_place_of_each() -> None:
    first = RangeError("a", [STRENGTH], "row 1")
    second = UnitError("b", [BAR, Problem("x", "y")], "row 2")
    both = TableError.gathered("columns.csv", [first, second])
    assert type(both) is TableError
    assert [problem.where for problem in both.problems] == ["row 1", "row 14", "row 2"]
    assert [problem.given for problem in both.problems] == ["f_c = 40 psi", "d_b = 0.9 in", "x"]


@pytest.mark.parametrize(
    ("kind", "parent"),
    [
        (InputError, CalcpackError),
        (UnitError, InputError),
        (RangeError, InputError),
        (TableError, InputError),
        (SheetError, InputError),
        (NeedsSheet, SheetError),
        (FormulaError, CalcpackError),
        (LayoutError, FormulaError),
        (LedgerError, CalcpackError),
        (RefusedError, CalcpackError),
        (CalcpackError, Exception),
    ],
)
def test_tree(kind: type[Exception], parent: type[Exception]) -> None:
    assert kind.__bases__ == (parent,)


def test_tree_is_drawn_at_the_top() -> None:
    drawn = errors.__doc__ or ""
    kinds = [name for name, one in vars(errors).items() if inspect.isclass(one) and issubclass(one, Exception)]
    assert [name for name in kinds if name not in drawn] == []
    assert sorted(errors.__all__) == errors.__all__
    assert set(kinds) | {"Problem"} == set(errors.__all__)


def test_needs_sheet_names_it() -> None:
    error = NeedsSheet("l_d", [Problem("F-01/l_d", "a sheet that has run")])
    error.sheet = "F-01"
    assert (NeedsSheet.sheet, error.sheet) == ("", "F-01")
