"""The table [lengths] of job.toml, and what the schedules ask for where it says nothing."""

from __future__ import annotations

from collections.abc import Callable
from pathlib import Path

import pytest

from calcpack.errors import TableError
from calcpack.job import load
from calcpack.job.length_settings import LengthSettings, lengths_of
from calcpack.members.length_basis import Basis, EndConditions, Extent, Strengths

Edit = Callable[..., Path]
Put = Callable[[str, str], Path]
SIZES = (3, 4, 5, 6, 7, 8, 9, 10, 11, 14, 18)

FULL = """[lengths]
concrete = ["4000 psi", "5 ksi"]
grade = ["60 ksi", "80 ksi"]
coating = ["none", "epoxy"]
lambda = 0.75
increment = "3 in"
sizes = ["#5", "#8", "#14"]
equation = "general"
clear_cover = "1.5 in"
clear_spacing = "2 d_b"
worked = "#5"

[lengths.hooks]
side_cover = "2.5 in"
tail_cover = "2 in"
ties = true

[lengths.heads]
side_cover = "6 d_b"
in_column_core = true

[lengths.compression]
confined = true
lap_ties = true

[units]"""


def stated(edit: Edit, text: str, *others: tuple[str, str]) -> LengthSettings:
    return load(edit(("[units]", f"{text}\n[units]"), *others)).lengths


def problems(edit: Edit, text: str, *others: tuple[str, str]) -> list[tuple[str, str]]:
    """What is wrong, as (given, where)."""
    with pytest.raises(TableError) as caught:
        stated(edit, text, *others)
    return [(problem.given, problem.where) for problem in caught.value.problems]


def test_every_key_is_read(edit: Edit) -> None:
    settings = load(edit(("[units]", FULL))).lengths
    assert settings.basis == Basis(
        increment=3.0, general=True, clear_cover=Extent(1.5), clear_spacing=Extent(2.0, True),
        hooks=EndConditions(Extent(2.5), Extent(2.0), ties=True),
        heads=EndConditions(Extent(6.0, True), in_column_core=True),
        confined=True, lap_ties=True, sizes=(5, 8, 14), source="job.toml, [lengths]",
    )  # fmt: skip
    assert settings.worked == 5
    source = "job.toml, [lengths]"
    assert settings.strengths == tuple(
        Strengths(f_c, f_y, coating, 0.75, source)
        for f_c in (4000.0, 5000.0)
        for f_y in (60_000.0, 80_000.0)
        for coating in ("none", "epoxy")
    )


def test_defaults_count_on_nothing(edit: Edit) -> None:
    settings = stated(edit, '[lengths]\nconcrete = "4 ksi"\ngrade = "60 ksi"\n')
    assert settings.strengths == (Strengths(4000.0, 60_000.0, source="job.toml, [lengths]"),)
    basis = settings.basis
    assert (basis.increment, basis.general, basis.clear_cover, basis.clear_spacing) == (1.0, False, None, None)
    assert basis.hooks == basis.heads == EndConditions()
    assert (basis.confined, basis.lap_ties, basis.sizes, settings.worked) == (False, False, SIZES, 8)


@pytest.mark.parametrize(
    ("sizes", "worked"), [('["#3", "#5"]', 5), ('["#9", "#11"]', 9), ('["#8", "#3"]', 8), ('["#7", "#9"]', 7)]
)
def test_the_size_worked_in_full_is_the_largest_common_one(edit: Edit, sizes: str, worked: int) -> None:
    assert stated(edit, f"[lengths]\nsizes = {sizes}\n").worked == worked


def test_metric_strengths_and_covers_are_converted(edit: Edit) -> None:
    settings = stated(edit, '[lengths]\nclear_cover = "50.8 mm"\nclear_spacing = "2 d_b"\nincrement = "1/2 in"\n')
    assert settings.basis.clear_cover == Extent(2.0)
    assert settings.basis.increment == 0.5


@pytest.mark.parametrize(
    ("key", "given"),
    [
        ('concrete = ["4000"]\ngrade = ["60 ksi"]', "concrete = 4000 (no unit)"),
        ('concrete = ["4 in"]\ngrade = ["60 ksi"]', "concrete = 4 in (length)"),
        ('concrete = ["4 psi"]\ngrade = ["60 ksi"]', "concrete = '4 psi'"),
        ('concrete = ["2499 psi"]\ngrade = ["60 ksi"]', "concrete = '2499 psi'"),
        ('concrete = ["20.1 ksi"]\ngrade = ["60 ksi"]', "concrete = '20.1 ksi'"),
        ('concrete = []\ngrade = ["60 ksi"]', "concrete is an empty list"),
        ('concrete = ["4 ksi", "4000 psi"]\ngrade = ["60 ksi"]', "concrete lists 4,000 psi twice"),
        ('concrete = ["4 ksi"]\ngrade = ["50 ksi"]', "grade = '50 ksi'"),
        ('concrete = ["4 ksi"]\ngrade = ["-60 ksi"]', "grade = '-60 ksi'"),
        ('concrete = ["4 ksi"]\ngrade = [60]', "grade = 60 (no unit)"),
        ('concrete = ["4 ksi"]', "grade is missing, concrete is stated"),
        ('grade = ["60 ksi"]', "concrete is missing, grade is stated"),
        ('coating = ["epoxy"]', "coating without concrete and grade"),
        ("lambda = 0.75", "lambda without concrete and grade"),
        ('concrete = ["4 ksi"]\ngrade = ["60 ksi"]\nlambda = 0.7', "lambda = 0.7"),
        ('concrete = ["4 ksi"]\ngrade = ["60 ksi"]\nlambda = true', "lambda = True"),
        ('concrete = ["4 ksi"]\ngrade = ["60 ksi"]\ncoating = "paint"', "coating = 'paint'"),
        ('increment = "0.3 in"', "increment = '0.3 in'"),
        ('increment = "13 in"', "increment = '13 in'"),
        ('increment = "0 in"', "increment = '0 in'"),
        ('increment = "25 mm"', "increment = '25 mm'"),
        ("increment = 1", "increment = 1 (no unit)"),
        ('sizes = ["#2"]', "sizes = '#2'"),
        ("sizes = [8]", "sizes = 8"),
        ('sizes = ["#8", "#8"]', "sizes lists #8 twice"),
        ('worked = "#12"', "worked = '#12'"),
        ('worked = "#9"\nsizes = ["#8"]', "worked = '#9'"),
        ('equation = "general"', "equation = 'general' without clear_cover and clear_spacing"),
        ('equation = "graph"', "equation = 'graph'"),
        ('clear_cover = "2 in"', "clear_cover alone"),
        ('clear_spacing = "2 d_b"', "clear_spacing alone"),
        ('clear_cover = "x d_b"\nclear_spacing = "2 d_b"', "clear_cover = 'x d_b'"),
        ('clear_cover = "0 d_b"\nclear_spacing = "2 d_b"', "clear_cover = '0 d_b'"),
        ('clear_cover = "inf d_b"\nclear_spacing = "2 d_b"', "clear_cover = 'inf d_b'"),
        ('clear_cover = 2\nclear_spacing = "2 d_b"', "clear_cover = 2 (no unit)"),
        ("cover = 2", "unknown key 'cover'"),
        ("hooks = 3", "hooks = 3"),
    ],
)
def test_one_mistake_is_named_with_its_place(edit: Edit, key: str, given: str) -> None:
    ((found, where),) = problems(edit, f"[lengths]\n{key}\n")
    assert found == given
    assert where.startswith("job.toml")


@pytest.mark.parametrize(
    ("table", "key", "given"),
    [
        ("hooks", "ties = 1", "ties = 1"),
        ("hooks", 'side_cover = "2 psi"', "side_cover = 2 psi (stress or pressure)"),
        ("hooks", "confined = true", "unknown key 'confined'"),
        ("heads", 'tail_cover = "2 in"', "unknown key 'tail_cover'"),
        ("heads", 'in_column_core = "yes"', "in_column_core = 'yes'"),
        ("compression", "ties = true", "unknown key 'ties'"),
        ("compression", "lap_ties = 2", "lap_ties = 2"),
    ],
)
def test_mistakes_of_the_conditions(edit: Edit, table: str, key: str, given: str) -> None:
    ((found, where),) = problems(edit, f"[lengths.{table}]\n{key}\n")
    assert found == given
    assert where.startswith(f"job.toml, [lengths.{table}]")


def test_all_mistakes_at_once(edit: Edit) -> None:
    text = '[lengths]\nconcrete = ["4"]\ngrade = ["50 ksi"]\nincrement = "x"\n[lengths.hooks]\nties = 2\n'
    assert sorted(where for _, where in problems(edit, text)) == [
        "job.toml, [lengths.hooks] ties",
        "job.toml, [lengths] concrete",
        "job.toml, [lengths] grade",
        "job.toml, [lengths] increment",
    ]


def test_a_strength_meant_in_ksi_is_asked_about(edit: Edit) -> None:
    with pytest.raises(TableError, match=r"was this meant to be 4,000 psi\?"):
        stated(edit, '[lengths]\nconcrete = ["4 psi"]\ngrade = ["60 ksi"]\n')


def test_a_grade_above_the_edition_is_refused_with_its_clause(edit: Edit) -> None:
    # published: Table 20.2.2.4a, 80 ksi in ACI 318-14 and 100 ksi in ACI 318-19 (ACI 318-14, ACI 318-19).
    text = '[lengths]\nconcrete = ["4 ksi"]\ngrade = ["100 ksi"]\n'
    assert stated(edit, text).strengths[0].f_y == 100_000.0
    with pytest.raises(TableError, match=r"up to 80 ksi \(ACI 318-14 Table 20\.2\.2\.4a\)"):
        stated(edit, text, ("ACI 318-19", "ACI 318-14"))
    assert stated(edit, text.replace("100", "80"), ("ACI 318-19", "ACI 318-14")).strengths[0].f_y == 80_000.0


# Without [lengths]

COLUMNS = """mark,shape,b [in],h [in],bars,ties,cover [in],f_c [psi],f_y [psi]
C1,rectangular,16,16,8-#8 (3x3),#3@14,1.5,5000,60000
C2,rectangular,16,16,8-#8 (3x3),#3@14,1.5,5000,80000
"""
ANCHORAGE = """mark,kind,bar,f_c [psi],f_y [psi],coating,lambda
T1,straight tension,#7,4000,60000,epoxy,0.75
T2,straight tension,#8,5000,60000,none,1.0
T3,straight tension,#8,5000,60000,epoxy,1.0
"""


def test_the_schedules_decide_where_lengths_says_nothing(put: Put) -> None:
    put("columns.csv", COLUMNS)
    root = put("anchorage.csv", ANCHORAGE)
    columns, anchorage = "inputs/columns.csv", "inputs/anchorage.csv"
    asked = lengths_of(load(root))
    assert asked.strengths == (
        Strengths(4000.0, 60_000.0, "epoxy", 0.75, anchorage),
        Strengths(5000.0, 60_000.0, "none", 1.0, f"{columns} and {anchorage}"),
        Strengths(5000.0, 60_000.0, "epoxy", 1.0, anchorage),
        Strengths(5000.0, 80_000.0, "none", 1.0, columns),
    )
    assert asked.worked == 8


def test_conditions_may_stand_without_strengths(put: Put) -> None:
    root = put("columns.csv", COLUMNS)
    path = root / "job.toml"
    path.write_text(path.read_text("utf-8") + '\n[lengths]\nincrement = "3 in"\n', "utf-8")
    asked = lengths_of(load(root))
    assert asked.basis.increment == 3.0
    assert [one.f_y for one in asked.strengths] == [60_000.0, 80_000.0]


def test_strengths_of_lengths_go_before_those_of_the_schedules(put: Put) -> None:
    root = put("columns.csv", COLUMNS)
    path = root / "job.toml"
    path.write_text(path.read_text("utf-8") + '\n[lengths]\nconcrete = "3 ksi"\ngrade = "60 ksi"\n', "utf-8")
    assert [one.f_c for one in lengths_of(load(root)).strengths] == [3000.0]


def test_a_job_that_names_no_concrete_is_told_what_to_add(job_root: Path) -> None:
    with pytest.raises(TableError, match=r'add to job\.toml: \[lengths\] concrete = \["4000 psi"\]'):
        lengths_of(load(job_root))
