from __future__ import annotations

import subprocess
import sys
from collections.abc import Callable
from pathlib import Path

import pytest
from hypothesis import given, settings
from hypothesis import strategies as st

from calcpack.errors import Problem, TableError
from calcpack.job import Column, Row, Table, read_table
from calcpack.job.tables import repeated, yes_no
from calcpack.units import AREA, FORCE, LENGTH, MOMENT, RATIO, STRESS, UNIT_WEIGHT, Dimension, convert

Put = Callable[..., Path]

COLUMNS = (
    Column("mark", required=True),
    Column("f_c", STRESS, required=True, above=0),
    Column("d", LENGTH, least=0, default=2.0),
    Column("k", RATIO, default=1.0),
    Column("top", default=False, parse=yes_no, allowed="yes or no"),
    Column("coating", choices=("none", "epoxy")),
)


def read(root: Path) -> Table:
    table = read_table(root, "bars", COLUMNS)
    assert table is not None
    return table


def problems_of(root: Path) -> list[tuple[str, str, str, str]]:
    with pytest.raises(TableError, match=r"^inputs/bars\.(csv|xlsx): \d problems?\n") as caught:
        read(root)
    return [(each.given, each.allowed, each.remedy, each.where) for each in caught.value.problems]


def problem_of(root: Path) -> tuple[str, str, str, str]:
    (problem,) = problems_of(root)
    return problem


def test_absent_table_is_none(job_root: Path) -> None:
    assert read_table(job_root, "bars", COLUMNS) is None
    (job_root / "inputs").rmdir()
    assert read_table(job_root, "bars", COLUMNS) is None


def test_values_defaults_and_places(put: Put) -> None:
    table = read(put("bars.csv", "mark,f_c [ksi],d [ft],top,coating\nC1,4,1.5,YES,epoxy\n\nC2,5,,,\n"))
    assert (table.file, table.sizes["f_c"], table.sizes["d"]) == ("inputs/bars.csv", 1000.0, 12.0)
    first, second = table.rows
    # 1 ksi = 1000 psi and 1 ft = 12 in by definition.
    assert first.values == {"mark": "C1", "f_c": 4000.0, "d": 18.0, "k": 1.0, "top": True, "coating": "epoxy"}
    assert second.values == {"mark": "C2", "f_c": 5000.0, "d": 2.0, "k": 1.0, "top": False, "coating": None}
    assert [row.where for row in table.rows] == ["inputs/bars.csv, row 2", "inputs/bars.csv, row 4"]


def test_blank_and_filled(put: Put) -> None:
    (row,) = read(put("bars.csv", "mark,f_c [psi]\nC1,4000\n")).rows
    assert (row.blank("coating"), row.filled("coating")) == (True, False)
    assert (row.blank("f_c"), row.filled("f_c")) == (False, True)
    assert (row.blank("absent"), row.filled("absent")) == (False, False)


# published: NIST Special Publication 811 (2008), appendix B.8: inch 25.4 mm, pound-force 4.4482216152605 N.
INCH, POUND = 25.4, 4.4482216152605


@pytest.mark.parametrize(
    ("header", "dimension", "cell", "expected"),
    [
        ("x [mm]", LENGTH, "457.2", 18.0),
        ("x [m]", LENGTH, "1", 1000 / INCH),
        ("x [MPa]", STRESS, "1", INCH**2 / POUND),
        ("x [kN]", FORCE, "1", 1000 / POUND),
        ("x [kN*m]", MOMENT, "1", 1e6 / POUND / INCH),
        ("x [kip-ft]", MOMENT, "1", 12000.0),
        ("x [kip·ft]", MOMENT, "1", 12000.0),
        ("x [mm^2]", AREA, "1", 1 / INCH**2),
        ("x [pcf]", UNIT_WEIGHT, "1728", 1.0),
        ("  x  [ in ] ", LENGTH, "1", 1.0),
    ],
)
def test_any_unit_of_the_dimension(put: Put, header: str, dimension: Dimension, cell: str, expected: float) -> None:
    columns = (Column("x", dimension),)
    table = read_table(put("bars.csv", f"{header}\n{cell}\n"), "bars", columns)
    assert table is not None
    assert table.rows[0].values["x"] == pytest.approx(expected, rel=1e-12)


# published: NIST Special Publication 811 (2008), appendix B.8: inch 25.4 mm. Exact, for clauses ask for 2 in or more.
@pytest.mark.parametrize(
    ("unit", "cell", "inches"),
    [("mm", "50.8", 2.0), ("mm", "12.7", 0.5), ("cm", "2.54", 1.0), ("mm", "28.6512", 1.128)],
)
def test_a_converted_number_stands_exactly_on_its_limit(put: Put, unit: str, cell: str, inches: float) -> None:
    table = read_table(put("bars.csv", f"x [{unit}]\n{cell}\n"), "bars", (Column("x", LENGTH),))
    assert table is not None
    assert table.rows[0].values["x"] == inches


@pytest.mark.parametrize(
    ("cell", "expected"),
    [
        ("4000", 4000.0),
        ("+4000.", 4000.0),
        ("4e3", 4000.0),
        (" 4000 ", 4000.0),
        ('"4,000"', 4000.0),
        ('"1,234,567.5"', 1234567.5),
        (".5", 0.5),
    ],
)
def test_numbers(put: Put, cell: str, expected: float) -> None:
    assert read(put("bars.csv", f"mark,f_c [psi]\nC1,{cell}\n")).rows[0].values["f_c"] == expected


@pytest.mark.parametrize(
    ("cell", "remedy"),
    [
        ("four", "enter a number"),
        ("4000 psi", "the unit stands in the header, the cell holds the number alone"),
        ("4ksi", "the unit stands in the header, the cell holds the number alone"),
        ('"4,5"', "enter a number"),
        ('"40,00"', "enter a number"),
        ("1/2", "enter a number"),
        ("4_000", "enter a number"),
        ("٤٠٠٠", "enter a number"),
        ("nan", "enter a number"),
        ("inf", "enter a number"),
        ("-Infinity", "enter a number"),
        ("1e999", "enter a finite number"),
        ("0", "correct the value"),
        ("-1", "correct the value"),
        ("", "fill the cell"),
        ("  ", "fill the cell"),
    ],
)
def test_what_is_no_number(put: Put, cell: str, remedy: str) -> None:
    given, allowed, found, where = problem_of(put("bars.csv", f"mark,f_c [psi]\nC1,4000\nC2,{cell}\n"))
    inner = cell.strip().strip('"')
    assert given == (f"f_c = {inner!r}" if inner else "f_c is empty")
    assert (allowed, found) == ("a number [psi], above 0", remedy)
    assert where == "inputs/bars.csv, row 3, column 'f_c [psi]'"


def test_a_finite_number_of_a_huge_unit_overflows(put: Put) -> None:
    given, *_ = problem_of(put("bars.csv", "mark,f_c [ksi]\nC1,1e306\n"))
    assert given == "f_c = '1e306'"


def test_least_admits_its_bound(put: Put) -> None:
    assert read(put("bars.csv", "mark,f_c [psi],d [in]\nC1,1,0\n")).rows[0].values["d"] == 0
    _, allowed, *_ = problem_of(put("bars.csv", "mark,f_c [psi],d [in]\nC1,1,-0.001\n"))
    assert allowed == "a number [in], not below 0"


@pytest.mark.parametrize(("expected", "cells"), [(True, "yes Yes TRUE true 1"), (False, "no NO False false 0")])
def test_yes_and_no(put: Put, expected: bool, cells: str) -> None:
    lines = "".join(f"C1,1,{cell}\n" for cell in cells.split())
    assert {row.values["top"] for row in read(put("bars.csv", f"mark,f_c [psi],top\n{lines}")).rows} == {expected}


def test_neither_yes_nor_no(put: Put) -> None:
    problem = problem_of(put("bars.csv", "mark,f_c [psi],top\nC1,1,x\n"))
    assert problem == ("top = 'x'", "yes or no", "write yes or no", "inputs/bars.csv, row 2, column 'top'")


@pytest.mark.parametrize(("cell", "remedy"), [("Epoxi", "did you mean 'epoxy'?"), ("zinc", "write one of these")])
def test_choices(put: Put, cell: str, remedy: str) -> None:
    problem = problem_of(put("bars.csv", f"mark,f_c [psi],coating\nC1,1,{cell}\n"))
    assert problem[:3] == (f"coating = {cell!r}", "'none' or 'epoxy'", remedy)


# One header mistake each: the header, then given, allowed (its beginning) and remedy; all stand in row 1.
HEADERS = [
    ("mark,f_c", "column 'f_c' has no unit", "the unit of a stress or pressure", "head it e.g. 'f_c [psi]'"),
    ("mark,f_c []", "column 'f_c []' has no unit", "the unit of a stress or pressure", "head it e.g. 'f_c [psi]'"),
    ("mark,f_c [in]", "column 'f_c [in]' (length)", "the unit of a stress or pressure", "head it e.g. 'f_c [psi]'"),
    ("mark,f_c [kg]", "column 'f_c [kg]': unit 'kg'", "in, ft, mm, m, lb", "write the unit as in calcpack/units.txt"),
    ("mark,f_c [psi", "column 'f_c [psi'", "'symbol [unit]', e.g. 'f_c [psi]'", "close the bracket"),
    ("mark [in],f_c [psi]", "column 'mark [in]' has a unit", "a column without a unit", "head it 'mark'"),
    ("mark,f_c [psi],k [in]", "column 'k [in]' has a unit", "a column without a unit", "head it 'k'"),
    ("mark,f_c [psi],Top", "unknown column 'Top'", "one of mark, f_c [psi], d [in]", "did you mean 'top'?"),
    ("mark,f_c [psi],zzz [in]", "unknown column 'zzz [in]'", "one of mark,", "remove it"),
    ("mark,f_c [psi],f_c [MPa]", "column 'f_c' stands twice", "each column once", "remove one"),
    ("mark,,f_c [psi]", "column 2 has no name", "a name over every column", "name it or remove it"),
    ("mark", "column 'f_c [psi]' is missing", "every required column", "add it"),
    ("f_c [psi]", "column 'mark' is missing", "every required column", "add it"),
    ("", "row 1 is empty", "a header such as mark,f_c [psi]", ""),
    (",,", "row 1 is empty", "a header such as mark,f_c [psi]", ""),
    ("mark;f_c [psi]", "columns separated by ';'", "by ','", "export with commas"),
    ("mark\tf_c [psi]", "columns separated by '\\t'", "by ','", "export with commas"),
]


@pytest.mark.parametrize(("header", "given", "allowed", "remedy"), HEADERS)
def test_headers(put: Put, header: str, given: str, allowed: str, remedy: str) -> None:
    problems = problems_of(put("bars.csv", f"{header}\n"))
    (problem,) = [each for each in problems if "is missing" not in each[0]] or problems
    assert problem[0] == given
    assert problem[1].startswith(allowed)
    assert problem[2].startswith(remedy)
    assert problem[3] == "inputs/bars.csv, row 1"


def test_all_errors_of_a_file_come_at_once(put: Put) -> None:
    text = "mark,f_c [in],d [in],colour,coating\nC1,4000,x,red,epoxy\n,4000,1,red,tar\nC3,4000\n"
    problems = problems_of(put("bars.csv", text))
    assert [(given, where.removeprefix("inputs/bars.csv, ")) for given, _, _, where in problems] == [
        ("column 'f_c [in]' (length)", "row 1"),
        ("unknown column 'colour'", "row 1"),
        ("d = 'x'", "row 2, column 'd [in]'"),
        ("mark is empty", "row 3, column 'mark'"),
        ("coating = 'tar'", "row 3, column 'coating'"),
        ("2 cells", "row 4"),
    ]


def test_the_message_carries_everything(put: Put) -> None:
    line = r"f_c = 'x' +a number \[psi\], above 0: enter a number +\[inputs/bars\.csv, row 2, column 'f_c \[psi\]'\]"
    with pytest.raises(TableError, match=line):
        read(put("bars.csv", "mark,f_c [psi]\nC1,x\n"))


@pytest.mark.parametrize(("row", "count"), [("C1", 1), ("C1,4000,5", 3), ("C1,4,000", 3)])
def test_ragged_rows(put: Put, row: str, count: int) -> None:
    problem = problem_of(put("bars.csv", f"mark,f_c [psi]\n{row}\n"))
    assert problem == (
        f"{count} cells",
        "2 cells, as in the header",
        "a text with a comma needs double quotes around it",
        "inputs/bars.csv, row 2",
    )


def test_trailing_commas_of_a_spreadsheet_are_no_cells(put: Put) -> None:
    assert read(put("bars.csv", "mark,f_c [psi],,\nC1,4000,,\n,,,\n")).rows[0].values["f_c"] == 4000


def test_a_rule_sees_rows_without_their_wrong_cells(put: Put) -> None:
    def rule(table: Table) -> list[Problem]:
        assert [sorted(row.values) for row in table.rows] == [["coating", "d", "k", "mark", "top"], []]
        assert table.symbols == {"mark", "f_c"}
        return [table.problem("the header", "another"), table.rows[0].problem("the row", "another")]

    root = put("bars.csv", "mark,f_c [in]\nC1,4000\nC2\n")
    with pytest.raises(TableError, match=r"4 problems") as caught:
        read_table(root, "bars", COLUMNS, rule)
    assert [problem.where for problem in caught.value.problems[2:]] == [
        "inputs/bars.csv, row 1",
        "inputs/bars.csv, row 2",
    ]


def test_repeated_names_the_first_row(put: Put) -> None:
    table = read(put("bars.csv", "mark,f_c [psi]\nC1,1\nC2,1\nC1,1\nC1,1\n"))
    assert repeated(table, "mark") == [
        Problem("mark = 'C1'", "each mark once", "row 2 has it already", f"inputs/bars.csv, row {row}")
        for row in (4, 5)
    ]


UNITS = {"f_c": ["psi", "ksi", "MPa", "psf", "kPa"], "d": ["in", "ft", "mm", "m", "cm", "yd"]}
VALUES = st.floats(min_value=1e-6, max_value=1e9)


@settings(deadline=None)
@given(
    st.lists(st.tuples(VALUES, VALUES), min_size=1, max_size=5),
    st.sampled_from(UNITS["f_c"]),
    st.sampled_from(UNITS["d"]),
)
def test_any_units_read_back_to_the_same_floats(
    tmp_path_factory: pytest.TempPathFactory, rows: list[tuple[float, float]], stress: str, length: str
) -> None:
    root = tmp_path_factory.mktemp("job")
    (root / "inputs").mkdir()
    lines = [f"C{number},{convert(f_c, stress)!r},{convert(d, length)!r}" for number, (f_c, d) in enumerate(rows)]
    text = "\n".join([f"mark,f_c [{stress}],d [{length}]", *lines])
    (root / "inputs" / "bars.csv").write_text(text, encoding="utf-8")
    for row, (f_c, d) in zip(read(root).rows, rows, strict=True):
        assert row.values["f_c"] == pytest.approx(f_c, rel=1e-12)
        assert row.values["d"] == pytest.approx(d, rel=1e-12)


@settings(deadline=None)
@given(st.text(max_size=60))
def test_any_text_is_a_table_or_an_error_that_explains(tmp_path_factory: pytest.TempPathFactory, text: str) -> None:
    root = tmp_path_factory.mktemp("job")
    (root / "inputs").mkdir()
    (root / "inputs" / "bars.csv").write_text(f"mark,f_c [psi]\n{text}", encoding="utf-8", errors="replace")
    rows, problems = outcome(root)
    assert all(problem.where.startswith("inputs/bars.csv, row ") for problem in problems)
    assert all(row.values["mark"] and row.values["f_c"] > 0 for row in rows)


def outcome(root: Path) -> tuple[tuple[Row, ...], tuple[Problem, ...]]:
    try:
        return read(root).rows, ()
    except TableError as error:
        return (), error.problems


def test_importing_the_job_loads_no_unit_registry() -> None:
    code = "import sys, calcpack.job; sys.exit(bool({'pint', 'openpyxl', 'numpy'} & set(sys.modules)))"
    assert subprocess.run([sys.executable, "-c", code], check=False).returncode == 0
