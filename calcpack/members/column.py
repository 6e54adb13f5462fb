"""Axial strength, longitudinal bars and transverse reinforcement of one column.

Each check is a procedure on a pad: the same steps serve the checks in bulk and the printed sheet. Bending,
slenderness and shear are not covered here; `owed` names them.
"""

from __future__ import annotations

from collections.abc import Iterable, Sequence
from typing import TypeVar

from calcpack.aci318 import columns
from calcpack.aci318.editions import Edition
from calcpack.members.column_problems import refuse_problems
from calcpack.members.column_rules import NO_AGGREGATE, ColumnWorking
from calcpack.members.column_section import ColumnLike, ForceLike, force_source
from calcpack.members.column_ties import transverse_checks
from calcpack.members.pad import FloatPad, Pad
from calcpack.members.results import CheckResult
from calcpack.members.working import Choice

__all__ = ["axial_capacity", "check", "owed", "work_column"]

T = TypeVar("T")
_FLOATS = FloatPad()
_AXIAL = "22.4.2"
_UNFACTORED = "Forces are listed by load, not factored: the axial force is not verified."


def check(column: ColumnLike, forces: Iterable[ForceLike], edition: Edition) -> list[CheckResult]:
    """Check one column: axial strength under its forces, its bars, its ties or spiral.

    Raises
    ------
    RangeError : everything that is wrong with the column, at once
    """
    return work_column(_FLOATS, column, forces, edition)


def work_column(pad: Pad[T], column: ColumnLike, forces: Iterable[ForceLike], edition: Edition) -> list[CheckResult]:
    """Work and verify every check of one column on a pad.

    Raises
    ------
    RangeError : everything that is wrong with the column, at once
    """
    refuse_problems(column, edition)
    work = ColumnWorking(pad, column, edition)
    work.state("A_g", "A_st", "phi_P_n_max", "c_cover", "d_b", "d_bt", "s")
    if column.aggregate is not None:
        work.state("d_agg")
    if column.ties.kind == "spiral":
        work.state("rho_s", "rho_s_min")
    pad.heading("Axial strength")
    results = [_axial(work, list(forces))]
    pad.heading("Longitudinal bars")
    results += [_reinforcement_ratio(work), _number_of_bars(work), _bar_spacing(work)]
    pad.heading("Spiral" if column.ties.kind == "spiral" else "Ties")
    return [*results, *transverse_checks(work)]


def axial_capacity(pad: Pad[T], column: ColumnLike, edition: Edition) -> tuple[T, T]:
    """Work the axial strength at zero eccentricity and the maximum design axial strength."""
    return _capacity(ColumnWorking(pad, column, edition))


def _capacity(work: ColumnWorking[T]) -> tuple[T, T]:
    _, _, P_o, _, capacity = [work.value(symbol) for symbol in ("A_g", "A_st", "P_o", "P_n_max", "phi_P_n_max")]
    return P_o, capacity


def _axial(work: ColumnWorking[T], forces: Sequence[ForceLike]) -> CheckResult:
    P_o, capacity = _capacity(work)
    values = {"P_o": P_o, "phi_P_n_max": capacity}
    governing = max(forces, key=lambda force: force.P, default=None)
    if governing is None:
        work.pad.reason("No forces listed for this column: its axial strength is stated, not verified.")
        return work.result("axial strength", _AXIAL, None, values)
    if governing.combination is None:
        return work.result("axial strength", _AXIAL, None, values, work.note(_UNFACTORED))
    name = governing.combination
    work.pad.reason(_why(name, len(forces)))
    means = f"factored axial force, {name}, compression positive"
    values["P_u"] = P_u = work.pad.given("P_u", governing.P, means, force_source(governing, work.column))
    if governing.P <= 0:
        # Tension is not a matter of this check: its ratio is zero, and `owed` names the check it needs.
        work.pad.reason("No combination compresses the column: its maximum axial strength is not called on.")
        return work.result("axial strength", _AXIAL, 0.0, values, combination=name)
    ratio = work.verify("axial force within the maximum axial strength", P_u, capacity, _AXIAL)
    return work.result("axial strength", _AXIAL, ratio, values, combination=name)


def _why(name: str, count: int) -> str:
    listed = "the only combination listed" if count == 1 else f"the largest axial force of {count} combinations"
    return f"Governing: {name}, {listed}."


def _reinforcement_ratio(work: ColumnWorking[T]) -> CheckResult:
    rho_g, clause = work.value("rho_g"), work.clause(columns.reinforcement_ratio)
    low = work.verify("least ratio of longitudinal reinforcement", work.value("rho_g_min"), rho_g, clause)
    high = work.verify("largest ratio of longitudinal reinforcement", rho_g, work.value("rho_g_max"), clause)
    values = {"rho_g": rho_g, "A_st": work.value("A_st"), "A_g": work.value("A_g")}
    return work.result("reinforcement ratio", clause, max(low, high), values)


def _number_of_bars(work: ColumnWorking[T]) -> CheckResult:
    n_bars, n_min, clause = work.value("n_bars"), work.value("n_min"), work.clause(columns.bars_minimum_tied)
    ratio = work.verify("number of longitudinal bars", n_min, n_bars, clause)
    return work.result("number of bars", clause, ratio, {"n_bars": n_bars, "n_min": n_min})


def _bar_spacing(work: ColumnWorking[T]) -> CheckResult:
    closest = min(work.faces, key=lambda face: work.pad.number(face.s_clear))
    known = work.column.aggregate is not None
    notes = () if known else work.note(NO_AGGREGATE)
    rule = columns.bar_spacing_minimum_aggregate if known else columns.bar_spacing_minimum
    least, clause = work.work(Choice(rule)), work.clause(rule)
    values = {"s_clear": closest.s_clear, "s_clear_min": least}
    if work.pad.number(closest.s_clear) > 0:
        ratio = work.verify("clear spacing of longitudinal bars", least, closest.s_clear, clause)
        return work.result("bar spacing", clause, ratio, values, notes)
    # No clear spacing is left to compare with. The least one is at least 1.5 d_b, more than d_b between centres.
    reason = f"Bars {closest.name} overlap or touch: the least clear spacing exceeds even the spacing of their centres."
    pitch = work.work(Choice(closest.pitch, reason), **closest.own)
    work.verify("clear spacing of longitudinal bars, which overlap", least, pitch, clause)
    return work.result("bar spacing", clause, None, values, notes, met=False)


def owed(column: ColumnLike, forces: Iterable[ForceLike]) -> list[str]:
    """The checks that the column owes and that are not covered here, for the list of open items."""
    listed = list(forces)
    names = []
    if any(force.Mx is None or force.My is None or force.Mx or force.My or force.P < 0 for force in listed):
        names.append("axial force with bending is checked here, its working is not printed on a sheet yet")
    if any(force.combination is None for force in listed):
        names.append("load combinations: unfactored rows are not combined yet, and no check counts them")
    if column.l_u is not None:
        names.append("slenderness")
    if any(force.Vx or force.Vy for force in listed):
        names.append("shear")
    if any(force.T for force in listed):
        names.append("torsion")
    return names
