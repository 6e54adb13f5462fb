"""Axial strength, longitudinal bars and transverse reinforcement of one column.

Bending, slenderness and shear are not covered here; `owed` names them.
"""

from __future__ import annotations

from collections.abc import Iterable, Iterator, Sequence
from typing import TypeVar

from calcpack.aci318 import columns
from calcpack.aci318.bars import bar
from calcpack.aci318.editions import Edition
from calcpack.formula import Formula
from calcpack.members.column_problems import refuse_problems
from calcpack.members.column_section import ColumnLike, ForceLike, bar_faces, section_source
from calcpack.members.column_ties import transverse_checks
from calcpack.members.pad import FloatPad, Pad
from calcpack.members.results import CheckResult, measured, verdict_of

__all__ = ["axial_capacity", "check", "gross_area", "owed", "steel_area"]

T = TypeVar("T")
_FLOATS = FloatPad()


def gross_area(pad: Pad[T], column: ColumnLike) -> T:
    """Work the gross area of the section."""
    source = section_source(column)
    if column.b is None:
        return pad.work(columns.area_circular, h=pad.given("h", column.h, "diameter of column", source))
    b = pad.given("b", column.b, "width of column along x", source)
    h = pad.given("h", column.h, "depth of column along y", source)
    return pad.work(columns.area_rectangular, b=b, h=h)


def steel_area(pad: Pad[T], column: ColumnLike) -> T:
    """Work the total area of the longitudinal bars."""
    one = bar(column.bars.size)
    n_bars = pad.given("n_bars", column.bars.count, "number of longitudinal bars", section_source(column))
    A_b = pad.given("A_b", one.A_b, f"nominal area of one bar, {one}", "ASTM A615 and A706, nominal dimensions")
    return pad.work(columns.area_of_bars, n_bars=n_bars, A_b=A_b)


def axial_capacity(pad: Pad[T], column: ColumnLike, edition: Edition) -> tuple[T, T]:
    """Work the axial strength at zero eccentricity and the maximum design axial strength."""
    source = section_source(column)
    A_g, A_st = gross_area(pad, column), steel_area(pad, column)
    f_c = pad.given("f_c", column.f_c, "specified compressive strength of concrete", source)
    f_y = pad.given("f_y", column.f_y, "specified yield strength of reinforcement", source)
    if column.f_y > 80_000:
        pad.reason(f"Bars above Grade 80 ({edition.name} 22.4.2.1).")
        f_y_axial = pad.work(columns.yield_in_axial_strength, f_y=f_y)
        P_o = pad.work(columns.axial_strength_high_grade, f_c=f_c, A_g=A_g, A_st=A_st, f_y_axial=f_y_axial)
    else:
        P_o = pad.work(columns.axial_strength, f_c=f_c, A_g=A_g, A_st=A_st, f_y=f_y)
    maximum, factor = _by_confinement(column)
    P_n_max = pad.work(maximum, P_o=P_o)
    phi = pad.work(factor)
    return P_o, pad.work(columns.design_axial_strength, phi=phi, P_n_max=P_n_max)


def _by_confinement(column: ColumnLike) -> tuple[Formula, Formula]:
    if column.ties.kind == "spiral":
        return columns.axial_strength_maximum_spiral, columns.phi_spiral
    return columns.axial_strength_maximum_tied, columns.phi_tied


def check(column: ColumnLike, forces: Iterable[ForceLike], edition: Edition) -> list[CheckResult]:
    """Check one column: axial strength under its forces, its bars, its ties or spiral.

    Raises
    ------
    RangeError : everything that is wrong with the column, at once
    """
    refuse_problems(column, edition)
    return [
        _axial(column, list(forces), edition),
        *_reinforcement(column, edition),
        *transverse_checks(column, edition),
    ]


def _axial(column: ColumnLike, forces: Sequence[ForceLike], edition: Edition) -> CheckResult:
    P_o, capacity = axial_capacity(_FLOATS, column, edition)
    # Tension is not a matter of this check: its ratio is zero, and `owed` names the check it needs.
    governing = max(forces, key=lambda force: force.P, default=None)
    ratio = None if governing is None else max(governing.P, 0.0) / capacity
    values = {"P_o": measured("P_o", P_o), "phi_P_n_max": measured("phi_P_n_max", capacity)}
    if governing is not None:
        values["P_u"] = measured("P_u", governing.P)
    combination = (governing.combination if governing else None) or ""
    clause = "22.4.2"
    return CheckResult(column.mark, "axial strength", clause, combination, ratio, verdict_of(ratio), values)


def _reinforcement(column: ColumnLike, edition: Edition) -> Iterator[CheckResult]:
    A_g, A_st = gross_area(_FLOATS, column), steel_area(_FLOATS, column)
    rho_g = columns.reinforcement_ratio(A_st=A_st, A_g=A_g)
    low, high = columns.reinforcement_ratio_minimum(), columns.reinforcement_ratio_maximum()
    ratio = max(low / rho_g, rho_g / high)
    values = {"rho_g": measured("rho_g", rho_g), "A_st": measured("A_st", A_st), "A_g": measured("A_g", A_g)}
    clause = columns.reinforcement_ratio.clause(edition.standard).number
    yield CheckResult(column.mark, "reinforcement ratio", clause, "", ratio, verdict_of(ratio), values)
    yield _number_of_bars(column, edition)
    yield _bar_spacing(column, edition)


def _number_of_bars(column: ColumnLike, edition: Edition) -> CheckResult:
    rule = columns.bars_minimum_spiral if column.ties.kind == "spiral" else columns.bars_minimum_tied
    least = rule()
    ratio = least / column.bars.count
    values = {"n_bars": measured("n_bars", column.bars.count), "n_min": measured("n_min", least)}
    clause = rule.clause(edition.standard).number
    return CheckResult(column.mark, "number of bars", clause, "", ratio, verdict_of(ratio), values)


def _bar_spacing(column: ColumnLike, edition: Edition) -> CheckResult:
    d_b = bar(column.bars.size).d_b
    if column.aggregate is None:
        rule = columns.bar_spacing_minimum
        least = rule(d_b=d_b)
        notes: tuple[str, ...] = ("Aggregate size not stated: 4/3 d_agg is not checked.",)
    else:
        rule = columns.bar_spacing_minimum_aggregate
        least = rule(d_b=d_b, d_agg=column.aggregate)
        notes = ()
    clear = min(face.s_clear for face in bar_faces(column))
    ratio = least / clear if clear > 0 else None
    values = {"s_clear": measured("s_clear", clear), "s_clear_min": measured("s_clear_min", least)}
    clause, verdict = rule.clause(edition.standard).number, verdict_of(ratio, clear > 0)
    return CheckResult(column.mark, "bar spacing", clause, "", ratio, verdict, values, notes)


def owed(column: ColumnLike, forces: Iterable[ForceLike]) -> list[str]:
    """The checks that the column owes and that are not covered here, for the list of open items."""
    listed = list(forces)
    names = []
    if any(force.Mx is None or force.My is None or force.Mx or force.My or force.P < 0 for force in listed):
        names.append("axial and bending")
    if column.l_u is not None:
        names.append("slenderness")
    if any(force.Vx or force.Vy for force in listed):
        names.append("shear")
    if any(force.T for force in listed):
        names.append("torsion")
    return names
