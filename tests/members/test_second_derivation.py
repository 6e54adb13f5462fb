"""Every length and every limit of a column against a second derivation that shares nothing with calcpack."""

from __future__ import annotations

import csv
import json
import random
import re
from pathlib import Path
from typing import Any

import pytest
from job_samples import JOB, calcpack, make_job
from second_derivation import SIZES, Refusal, Row, axial_strength, second, spiral_ratio, tie_spacing, unmet

from calcpack.aci318.editions import edition
from calcpack.errors import RangeError
from calcpack.job import read_columns
from calcpack.members import anchorage, column
from calcpack.members.results import CheckResult
from calcpack.members.termination import Termination

EDITIONS = ("14", "19")
SYMBOLS = {
    "straight tension": "l_d", "hook 90": "l_dh", "hook 180": "l_dh", "headed": "l_dt", "straight compression": "l_dc",
    "lap tension": "l_st", "lap compression": "l_sc",
}  # fmt: skip

# How the project words what the second derivation calls by name.
NAMES = {
    r"^f_c = ": "f_c",
    r"^f_y = ": "f_y",
    r"^bar = #1[48]": "size",
    r"^lambda = ": "lightweight",
    r"^A_s_required = ": "areas",
    r"^lap_class = A, A_s_required": "class A",
}

TIMES = (0.75, 1, 1.5, 2, 2.5, 3, 3.5, 4)
GAPS = (1, 1.5, 2, 3, 4, 5, 6, 7, 9)


def one_row(rng: random.Random, number: int) -> Row:
    """A termination as schedules have it: materials of the trade, cells often blank, distances often on a limit."""
    size = rng.choice((4, 5, 6, 7, 8, 9, 10, 11)) if rng.random() < 0.8 else rng.choice(list(SIZES))
    row: Row = {
        "mark": f"T{number}",
        "kind": rng.choice(list(SYMBOLS)),
        "bar": f"#{size}",
        "f_c": rng.choice((2500, 2999, 3000, 4000, 4400, 4500, 5000, 5999, 6000, 7000, 9000, 10000, 12000)),
        "f_y": rng.choice((40000, 60000, 60000, 60000, 80000, 80000, 100000)),
    }
    if rng.random() < 0.03:
        row["f_c"] = 2000
    if rng.random() < 0.03:
        row["f_y"] = 110000
    optional: Row = {
        "lambda": rng.choice((0.75, 0.75, 0.85, 1.0)) if row["kind"] != "headed" or rng.random() < 0.2 else None,
        "top": rng.random() < 0.6,
        "coating": rng.choice(("none", "epoxy", "zinc", "dual")),
        "K_tr": round(rng.uniform(0, 1.5) * SIZES[size][0], 3),
        "side_cover": rng.choice((1.5, 2, 2.499, 2.5, 3, 5, 6, 9)),
        "tail_cover": rng.choice((1, 1.9, 2, 2.5, 3)),
        "confining_ties": rng.random() < 0.6,
        "in_column_core": rng.random() < 0.6,
        "lap_class": rng.choice("AB"),
        "available": rng.choice((12, 24, 60, 100)),
    }
    row |= {symbol: value for symbol, value in optional.items() if rng.random() < 0.5}
    return row | distances(rng, SIZES[size][0]) | areas(rng)


def distances(rng: random.Random, diameter: float) -> Row:
    """Cover, spacing and c_b: all three in agreement, some of the first two, c_b alone, or none."""
    cover, gap = round(diameter * rng.choice(TIMES), 4), round(diameter * rng.choice(GAPS), 4)
    c_b = round(diameter * rng.choice((0.9, 1.2, 1.5, 2, 2.5, 3, 4)), 4)
    return rng.choice(
        [
            {"clear_cover": cover, "clear_spacing": gap, "c_b": min(cover + diameter / 2, (gap + diameter) / 2)},
            {"clear_cover": cover, "clear_spacing": gap},
            {"clear_cover": cover, "clear_spacing": gap},
            {"clear_cover": cover},
            {"clear_spacing": gap},
            {"c_b": c_b},
            {"c_b": c_b},
            {},
        ]
    )


def areas(rng: random.Random) -> Row:
    if rng.random() < 0.6:
        return {}
    share = 1.1 if rng.random() < 0.05 else rng.choice((0.3, 0.45, 0.5, 0.6, 0.8, 0.95, 1.0))
    return {"A_s_provided": 3.16, "A_s_required": 3.16 * share}


def rows(name: str, count: int) -> list[Row]:
    rng = random.Random(f"ACI 318-{name}")
    return [one_row(rng, number) for number in range(1, count + 1)]


def as_termination(row: Row) -> Termination:
    filled = {symbol: value for symbol, value in row.items() if value is not None}
    values = {("lamb" if symbol == "lambda" else symbol): value for symbol, value in filled.items()}
    return Termination(**(values | {"bar": int(row["bar"][1:])}))


def reasons(error: RangeError) -> set[str]:
    """What a refusal names, each problem by exactly one name."""
    found = [[name for pattern, name in NAMES.items() if re.search(pattern, one.given)] for one in error.problems]
    assert all(len(names) == 1 for names in found), error
    return {names[0] for names in found}


def word(row: Row, name: str, length: float) -> str:
    """The verdict: by the conditions first, by the length where one is available."""
    if unmet(row, name):
        return "NG"
    if row.get("available") is None:
        return ""
    return "OK" if length <= row["available"] * (1 + 1e-9) else "NG"


@pytest.mark.parametrize("name", EDITIONS)
def test_the_same_lengths_conditions_and_refusals(name: str) -> None:
    seen = set()
    for row in rows(name, 300):
        expected = second(row, name)
        if isinstance(expected, Refusal):
            with pytest.raises(RangeError) as caught:
                anchorage.check(as_termination(row), edition(f"ACI 318-{name}"))
            assert reasons(caught.value) == expected.reasons, row
            seen |= expected.reasons
        else:
            result = anchorage.check(as_termination(row), edition(f"ACI 318-{name}"))
            assert result.values[SYMBOLS[row["kind"]]] == (pytest.approx(expected, rel=1e-9), "in"), row
            assert result.verdict == word(row, name, expected), row
            seen |= unmet(row, name) | {row["kind"]}
    heads = {"cover of head", "spacing of heads"}
    assert seen == {*SYMBOLS, *NAMES.values(), *heads, *(["K_tr"] if name == "19" else [])}


# Columns

Column = dict[str, Any]


def one_column(rng: random.Random, number: int) -> Column:
    """A column that holds its bars, tied or spiral, rectangular or circular."""
    shape = rng.choice(("rectangular", "circular"))
    spiral = shape == "circular" and rng.random() < 0.6
    n_x, n_y = rng.randint(2, 5), rng.randint(2, 5)
    size = rng.choice((6, 7, 8, 9, 10, 11, 14))
    tie = rng.choice((3, 4, 5))
    return {
        "mark": f"C{number}",
        "shape": shape,
        "b": rng.choice((14, 18, 20, 24, 30.5)),
        "h": rng.choice((14, 18, 24, 30, 36.25)),
        "bars": rng.randint(4, 12) if shape == "circular" else 2 * (n_x + n_y) - 4,
        "layout": "" if shape == "circular" else f" ({n_x}x{n_y})",
        "size": size,
        "tie": tie,
        "spiral": spiral,
        "spacing": rng.choice((1.75, 2.25, 3)) if spiral else rng.choice((6, 10, 12, 18)),
        "cover": rng.choice((1.5, 2)),
        "f_c": rng.choice((3000, 4000, 5000, 8000, 12000)),
        "f_y": rng.choice((40000, 60000, 60000, 80000)),
        "f_yt": rng.choice((60000, 80000, 100000)),
    }


MEASURES = ("b", "h", "cover", "f_c", "f_y", "f_yt")


def column_table(columns: list[Column], units: dict[str, tuple[str, float]]) -> str:
    """columns.csv in the units given, each with its size in in or psi."""
    heads = [f"{symbol} [{units[symbol][0]}]" for symbol in MEASURES]
    lines = [",".join(["mark", "shape", "bars", "ties", *heads])]
    for one in columns:
        cells = {symbol: str(one[symbol] / units[symbol][1]) for symbol in MEASURES}
        if one["shape"] == "circular":
            cells["b"] = ""
        ties = f"#{one['tie']}{' spiral' if one['spiral'] else ''}@{one['spacing'] / units['cover'][1]:.10g}"
        bars = f"{one['bars']}-#{one['size']}{one['layout']}"
        lines.append(",".join([one["mark"], one["shape"], bars, ties, *cells.values()]))
    return "\n".join(lines) + "\n"


# published: NIST Special Publication 811 (2008), appendix B.8: inch 25.4 mm, pound-force 4.4482216152605 N.
MPA = 25.4**2 / 4.4482216152605
US = {"b": ("in", 1), "h": ("in", 1), "cover": ("in", 1), "f_c": ("psi", 1), "f_y": ("psi", 1), "f_yt": ("psi", 1)}
MIXED = {
    "b": ("mm", 1 / 25.4), "h": ("ft", 12), "cover": ("mm", 1 / 25.4), "f_c": ("MPa", MPA), "f_y": ("ksi", 1000),
    "f_yt": ("ksi", 1000),
}  # fmt: skip


def columns_of(name: str, count: int) -> list[Column]:
    rng = random.Random(f"columns of ACI 318-{name}")
    return [one_column(rng, number) for number in range(1, count + 1)]


@pytest.mark.parametrize("name", EDITIONS)
def test_the_same_axial_strength_ties_and_spirals(name: str, tmp_path: Path) -> None:
    columns = columns_of(name, 100)
    root = make_job(tmp_path / "job", columns=column_table(columns, MIXED))
    for one, row in zip(columns, read_columns(root), strict=True):
        found: dict[str, CheckResult] = {}
        for result in column.check(row, [], column.Context(edition(f"ACI 318-{name}"))):
            found[result.check] = result
        strength = [found["axial strength"].values[symbol] for symbol in ("P_o", "phi_P_n_max")]
        assert strength == [(pytest.approx(value / 1000, rel=1e-9), "kip") for value in axial_strength(one)]
        if one["spiral"]:
            values = [found["spiral ratio"].values[symbol][0] for symbol in ("rho_s", "rho_s_min")]
            assert values == pytest.approx(spiral_ratio(one), rel=1e-9)
        else:
            assert found["tie spacing"].values["s_max"][0] == pytest.approx(tie_spacing(one), rel=1e-9)


# Through the command

SIZES_OF_UNITS = {
    "f_c": ("MPa", MPA), "f_y": ("ksi", 1000), "c_b": ("mm", 1 / 25.4), "clear_cover": ("mm", 1 / 25.4),
    "clear_spacing": ("in", 1), "K_tr": ("mm", 1 / 25.4), "side_cover": ("cm", 1 / 2.54),
    "tail_cover": ("mm", 1 / 25.4), "available": ("ft", 12), "A_s_required": ("mm^2", 1 / 645.16),
    "A_s_provided": ("in^2", 1),
}  # fmt: skip
BARE = ("mark", "kind", "bar", "lambda", "top", "coating", "confining_ties", "in_column_core", "lap_class")


def cell(row: Row, symbol: str) -> str:
    value = row.get(symbol)
    if value is None:
        return ""
    if isinstance(value, bool):
        return "yes" if value else "no"
    return f"{value / SIZES_OF_UNITS[symbol][1]:.15g}" if symbol in SIZES_OF_UNITS else str(value)


def write_anchorage(path: Path, listed: list[Row]) -> None:
    with path.open("w", encoding="utf-8", newline="") as file:
        writer = csv.writer(file)
        writer.writerow([*BARE, *(f"{symbol} [{unit}]" for symbol, (unit, _) in SIZES_OF_UNITS.items())])
        writer.writerows([cell(row, symbol) for symbol in (*BARE, *SIZES_OF_UNITS)] for row in listed)


@pytest.mark.slow
@pytest.mark.parametrize("name", EDITIONS)
def test_the_command_gives_the_same_in_mixed_units(name: str, tmp_path: Path) -> None:
    listed = [row for row in rows(name, 300) if not isinstance(second(row, name), Refusal)]
    columns = columns_of(name, 100)
    rows_of_forces = [f"{one['mark']},LC1,500,0,0" for one in columns]
    forces = "\n".join(["mark,combination,P [kN],Mx [kip*ft],My [kip*ft]", *rows_of_forces])
    toml = JOB.replace("318-19", f"318-{name}")
    root = make_job(tmp_path / "job", toml=toml, columns=column_table(columns, MIXED), forces=forces)
    write_anchorage(root / "inputs" / "anchorage.csv", listed)
    done = calcpack("check", root, "--json")
    assert done.returncode in (0, 1), done.stderr
    results = json.loads(done.stdout)["results"]
    lengths = {result["mark"]: result for result in results if result["check"] in SYMBOLS}
    for row in listed:
        value = lengths[row["mark"]]["values"][SYMBOLS[row["kind"]]]["value"]
        assert value == pytest.approx(second(row, name), rel=1e-9), row
    strengths = {result["mark"]: result["values"] for result in results if "phi_P_n_max" in result["values"]}
    for one in columns:
        found = [strengths[one["mark"]][symbol]["value"] for symbol in ("P_o", "phi_P_n_max")]
        assert found == pytest.approx([value / 1000 for value in axial_strength(one)], rel=1e-9)


@pytest.mark.slow
@pytest.mark.parametrize("name", EDITIONS)
def test_the_command_names_every_row_it_refuses(name: str, tmp_path: Path) -> None:
    listed = [row for row in rows(name, 300) if isinstance(second(row, name), Refusal)]
    root = make_job(tmp_path / "job", toml=JOB.replace("318-19", f"318-{name}"))
    write_anchorage(root / "inputs" / "anchorage.csv", listed)
    done = calcpack("check", root, "--json")
    assert (done.returncode, done.stdout) == (2, "")
    named = {int(number) for number in re.findall(r"inputs/anchorage.csv, row (\d+)", done.stderr)}
    assert named == set(range(2, len(listed) + 2))
