"""Longitudinal bars of one column: their share of the section, their number, their spacing."""

from __future__ import annotations

from collections.abc import Iterator
from typing import TypeVar

from calcpack.aci318 import columns
from calcpack.members.column_rules import NO_AGGREGATE, ColumnWorking
from calcpack.members.results import CheckResult
from calcpack.members.working import Choice

__all__ = ["bar_checks"]

T = TypeVar("T")


def bar_checks(work: ColumnWorking[T]) -> Iterator[CheckResult]:
    """Checks of the longitudinal bars of a column."""
    yield _reinforcement_ratio(work)
    yield _number_of_bars(work)
    yield _bar_spacing(work)


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
    reason = f"Bars {closest.name} touch: the least clear spacing exceeds even the spacing of their centres."
    pitch = work.work(Choice(closest.pitch, reason), **closest.own)
    work.verify("clear spacing of longitudinal bars, which touch", least, pitch, clause)
    return work.result("bar spacing", clause, None, values, notes, met=False)
