"""Worked tables for the tests: bars of an invented section at a neutral axis, and running sums."""

from __future__ import annotations

from typing import Any

from calcpack import Sheet
from calcpack.aci318.standards import ACI_318_14, ACI_318_19
from calcpack.formula import formula
from calcpack.tabulation import Above, Column, Row, Tabulation, Worked
from calcpack.units import Area, Force, Length, Moment, Ratio, Stress
from calcpack.value import Value


@formula(ACI_318_14("22.2.1.2"), ACI_318_19("22.2.1.2"))
def strain(*, eps_cu: Ratio, c: Length, d_s: Length) -> Ratio:
    """Strain of a bar."""
    eps_s = eps_cu * (c - d_s) / c
    return eps_s


@formula(ACI_318_14("20.2.2.1"), ACI_318_19("20.2.2.1"))
def stress(*, E_s: Stress, eps_s: Ratio, f_y: Stress) -> Stress:
    """Stress of a bar."""
    if abs(eps_s) < f_y / E_s:
        f_s = E_s * eps_s
    elif eps_s > 0:
        f_s = f_y
    else:
        f_s = -f_y
    return f_s


@formula("statics")
def force(*, A_b: Area, f_s: Stress) -> Force:
    """Force of a bar."""
    F_s = A_b * f_s
    return F_s


@formula("statics")
def moment(*, F_s: Force, h: Length, d_s: Length) -> Moment:
    """Moment of a bar about the centre of the section."""
    M_Fx = F_s * (h / 2 - d_s)
    return M_Fx


@formula("statics")
def running(*, S_above: Force, F_s: Force) -> Force:
    """Sum of the forces down to this bar."""
    S_u = S_above + F_s
    return S_u


BARS = Tabulation(
    "Bars at the neutral axis",
    "bar",
    (strain, stress, force, moment),
    (
        Column("d_s", 2),
        Column("A_b", 2),
        Column("eps_s", 7),
        Column("f_s", 2, "ksi"),
        Column("F_s", 2),
        Column("M_Fx", 1, "kip*in"),
    ),
    {"F_s": "F_s_sum", "M_Fx": "M_Fx_sum"},
    "Strains, stresses and forces",
)
SHARED = {"eps_cu": 0.003, "c": 15.0, "h": 33.0, "f_y": 58_000.0, "E_s": 29_000_000.0, "A_b": 1.0}
DEPTHS = (3.0, 12.0, 15.0, 20.0, 25.0, 30.0)
GIVENS = {
    "eps_cu": 0.003, "c": "15 in", "h": "33 in", "f_y": "58 ksi", "E_s": "29000 ksi", "A_b": "1.00 in^2",
}  # fmt: skip


def float_rows() -> list[Row[float]]:
    """The bars as floats."""
    return [(str(number), {"d_s": depth, "A_b": SHARED["A_b"]}) for number, depth in enumerate(DEPTHS, 1)]


def state(sheet: Sheet) -> dict[str, Value]:
    """The shared values, stated on a sheet."""
    return {symbol: sheet.given(symbol, value, source="S-201, rev 0") for symbol, value in GIVENS.items()}


def sheet_rows(sheet: Sheet, shared: dict[str, Value]) -> list[Row[Value]]:
    """The same bars on a sheet: the first depth a given, those below it plain arithmetic, the last one a given."""
    first = sheet.given("d_s", "3 in", source="S-201, rev 0")
    below = [Worked(f"d_s + {depth - 3.0:g}*c/15", {"d_s": first, "c": shared["c"]}) for depth in DEPTHS[1:-1]]
    last = sheet.given("d_s", "30 in", source="S-201, rev 0")
    depths: list[Any] = [first, *below, last]
    return [(str(number), {"d_s": depth, "A_b": shared["A_b"]}) for number, depth in enumerate(depths, 1)]


def running_table(**more: Any) -> Tabulation:
    """Forces, and their sum so far, which the first row cannot have."""
    columns = (Column("A_b", 2), Column("F_s", 1), Column("S_above", 1), Column("S_u", 1))
    return Tabulation("Running sum", "bar", (force, running), columns, **more)


def running_rows(areas: list[Any]) -> list[Row[Any]]:
    """Rows that take the sum of the row above, the second row its force."""
    above: list[dict[str, Any]] = [{}, {"S_above": Above("F_s")}, *({"S_above": Above("S_u")} for _ in areas[2:])]
    return [(str(number), {"A_b": area, **own}) for number, (area, own) in enumerate(zip(areas, above, strict=True), 1)]
