"""Ties and spirals of one column, as procedures on a pad."""

from __future__ import annotations

from collections.abc import Iterator
from dataclasses import replace
from typing import TypeVar

from calcpack.aci318 import ties
from calcpack.formula import Formula
from calcpack.members.column_rules import CENTRE_LINE, NO_AGGREGATE, NO_F_YT, ColumnWorking
from calcpack.members.results import CheckResult, measured
from calcpack.members.working import Choice

__all__ = ["transverse_checks"]

T = TypeVar("T")


def transverse_checks(work: ColumnWorking[T]) -> Iterator[CheckResult]:
    """Checks of the ties, or of the spiral, of a column."""
    if work.column.ties.kind == "spiral":
        yield _size(work, "spiral size", "diameter of spiral", ties.spiral_size)
        yield _pitch(work)
        yield _spiral_ratio(work)
    else:
        yield _size(work, "tie size", "diameter of ties", ties.tie_size)
        yield _tie_spacing(work)
        if work.column.b is not None:
            yield _lateral_support(work)


def _size(work: ColumnWorking[T], name: str, what: str, rule: Formula) -> CheckResult:
    d_bt, least, clause = work.value("d_bt"), work.value("d_bt_min"), work.clause(rule)
    ratio = work.verify(what, least, d_bt, clause)
    return work.result(name, clause, ratio, {"d_bt": d_bt, "d_bt_min": least})


def _tie_spacing(work: ColumnWorking[T]) -> CheckResult:
    clause = work.clause(ties.tie_spacing)
    s_max, s = work.value("s_max"), work.value("s")
    ratio = work.verify("spacing of ties", s, s_max, clause)
    values = {"s": s, "s_max": s_max}
    if work.column.aggregate is None:
        return work.result("tie spacing", clause, ratio, values, work.note(NO_AGGREGATE))
    clear, least = work.work(Choice(ties.spiral_clear)), work.work(Choice(ties.tie_clear_minimum))
    ratio = max(ratio, work.verify("clear spacing of ties", least, clear, clause))
    return work.result("tie spacing", clause, ratio, {**values, "s_clear": clear, "s_clear_min": least})


def _lateral_support(work: ColumnWorking[T]) -> CheckResult:
    """Corner bars are held by the tie; of the others the schedule does not say which a crosstie holds."""
    name, clause = "lateral support of bars", work.clause(ties.unsupported_bar_maximum)
    faces = [face for face in work.faces if face.n_face > 2]
    limit = work.value("x_clear_max")
    most = work.pad.number(limit)
    if not faces:
        work.pad.reason("Every bar stands in a corner of the ties.")
        result = work.result(name, clause, 0.0, {"x_clear_max": limit})
        return replace(result, values={"x_clear": measured("x_clear", 0.0), **result.values})
    widest = max(faces, key=lambda face: work.pad.number(face.s_clear))
    values = {"x_clear": widest.s_clear, "x_clear_max": limit}
    crowded = [face.name for face in faces if face.n_face > 3 or work.pad.number(face.s_clear) > most]
    if crowded:
        sides = " and ".join(crowded)
        notes = work.note(f"Bars between the corners {sides} need crossties; the schedule does not show any.")
        return work.result(name, clause, None, values, notes)
    if work.pad.number(widest.s_clear) <= 0:
        work.pad.reason("The bars between the corners touch those that the ties hold.")
        return work.result(name, clause, 0.0, values)
    work.pad.reason("A bar between two corner bars stands without a crosstie where it is close to them.")
    ratio = work.verify(name, widest.s_clear, limit, clause)
    return work.result(name, clause, ratio, values)


def _pitch(work: ColumnWorking[T]) -> CheckResult:
    clause = work.clause(ties.spiral_clear_maximum)
    clear, most = work.work(Choice(ties.spiral_clear)), work.value("s_clear_max")
    known = work.column.aggregate is not None
    notes = () if known else work.note(NO_AGGREGATE)
    least = work.work(Choice(ties.spiral_clear_minimum_aggregate if known else ties.spiral_clear_minimum))
    high = work.verify("largest clear spacing of spiral turns", clear, most, clause)
    low = work.verify("least clear spacing of spiral turns", least, clear, clause)
    values = {"s_clear": clear, "s_clear_min": least, "s_clear_max": most}
    return work.result("spiral pitch", clause, max(high, low), values, notes)


def _spiral_ratio(work: ColumnWorking[T]) -> CheckResult:
    clause = work.clause(ties.spiral_ratio_minimum)
    notes = [CENTRE_LINE]
    rho_s = work.value("rho_s")
    if work.column.f_yt is None:
        notes += work.note(NO_F_YT)
    least = work.value("rho_s_min")
    ratio = work.verify("volume ratio of spiral", least, rho_s, clause)
    return work.result("spiral ratio", clause, ratio, {"rho_s": rho_s, "rho_s_min": least}, tuple(notes))
