"""Ties and spirals of one column, as procedures on a pad."""

from __future__ import annotations

from collections.abc import Iterator, Sequence
from dataclasses import replace
from typing import TypeVar

from calcpack.aci318 import lateral_support, ties
from calcpack.aci318.bars import bar
from calcpack.formula import Formula
from calcpack.members.column_rules import CENTRE_LINE, NO_AGGREGATE, NO_F_YT, ColumnWorking, Face
from calcpack.members.column_section import section_source
from calcpack.members.results import CheckResult, measured
from calcpack.members.sources import NOMINAL
from calcpack.members.working import Choice

__all__ = ["LATERAL_SUPPORT", "area_of_tie_bar", "legs_across", "legs_along", "transverse_checks", "yield_of_ties"]

T = TypeVar("T")
LATERAL_SUPPORT = "lateral support of bars"


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


def yield_of_ties(work: ColumnWorking[T]) -> T:
    """f_yt of the ties or of the spiral, stated once; f_y where the schedule leaves it out."""
    if work.column.ties.kind != "spiral" and "f_yt" not in work.values:
        f_yt, means = work.column.f_yt, "specified yield strength of ties"
        source = "taken as f_y, default of the schedule" if f_yt is None else section_source(work.column)
        work.values["f_yt"] = work.pad.given("f_yt", float(f_yt or work.column.f_y), means, source)
    return work.value("f_yt")


def area_of_tie_bar(work: ColumnWorking[T]) -> T:
    """Nominal area of the bar of the ties, stated once."""
    if "A_bt" not in work.values:
        size = work.column.ties.size
        work.values["A_bt"] = work.pad.given("A_bt", bar(size).A_b, f"nominal area of tie, #{size}", NOMINAL)
    return work.values["A_bt"]


def legs_along(work: ColumnWorking[T], axis: str) -> T:
    """Number of legs parallel to x or to y, stated once."""
    symbol = f"n_legs_{axis}"
    if symbol not in work.values:
        count = work.column.legs_x if axis == "x" else work.column.legs_y
        means = f"legs of ties parallel to {axis}, hoops and crossties together"
        work.values[symbol] = work.pad.given(symbol, float(count), means, section_source(work.column))
    return work.values[symbol]


def legs_across(work: ColumnWorking[T], face: Face[T]) -> str:
    """The axis whose legs hold the bars of a face; of the fewer legs where one face stands for both directions."""
    if face.name == "along x":
        return "y"
    if face.name == "along y":
        return "x"
    return "y" if work.column.legs_y <= work.column.legs_x else "x"


def _legs(work: ColumnWorking[T], face: Face[T]) -> int:
    return work.column.legs_y if legs_across(work, face) == "y" else work.column.legs_x


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
    """Corner bars are held by the tie, others by further legs; two legs may mean that the schedule shows no more."""
    between = [face for face in work.faces if face.n_face > 2]
    if not between:
        return _every_bar_held(work, "Every bar stands in a corner of the ties.")
    loose = [face for face in between if face.n_face > _legs(work, face)]
    if not loose:
        return _every_bar_held(work, "Every bar is held by a leg of the ties or by a crosstie.")
    most = work.pad.number(work.value("x_clear_max"))
    unshown = [
        face.name
        for face in loose
        if _legs(work, face) == 2 and (face.n_face > 3 or work.pad.number(face.s_clear) > most)
    ]
    if unshown:
        values = {"x_clear": _widest(work, loose).s_clear, "x_clear_max": work.value("x_clear_max")}
        sides = " and ".join(unshown)
        notes = work.note(f"Bars between the corners {sides} need crossties; the schedule does not show any.")
        return work.result(LATERAL_SUPPORT, _clause(work), None, values, notes, met=not work.column.legs_stated)
    return _bars_between_held_ones(work, loose)


def _every_bar_held(work: ColumnWorking[T], why: str) -> CheckResult:
    limit = work.value("x_clear_max")
    work.pad.reason(why)
    result = work.result(LATERAL_SUPPORT, _clause(work), 0.0, {"x_clear_max": limit})
    return replace(result, values={"x_clear": measured("x_clear", 0.0), **result.values})


def _bars_between_held_ones(work: ColumnWorking[T], loose: Sequence[Face[T]]) -> CheckResult:
    """Every other bar held, and none farther from a held one than the limit."""
    ratio = max([_alternate_bars(work, face) for face in loose if _legs(work, face) > 2], default=0.0)
    widest, limit = _widest(work, loose), work.value("x_clear_max")
    values = {"x_clear": widest.s_clear, "x_clear_max": limit}
    if work.pad.number(widest.s_clear) <= 0:
        work.pad.reason("The bars between held bars touch them.")
    else:
        work.pad.reason("A bar between two held bars stands without a crosstie where it is close to them.")
        ratio = max(ratio, work.verify(LATERAL_SUPPORT, widest.s_clear, limit, _clause(work)))
    return work.result(LATERAL_SUPPORT, _clause(work), ratio, values)


def _alternate_bars(work: ColumnWorking[T], face: Face[T]) -> float:
    axis = legs_across(work, face)
    why = f"Corner bars and every other bar {face.name} have to be held; legs are taken as shared out evenly."
    least = work.work(Choice(lateral_support.legs_minimum, why), **face.own)
    return work.verify(f"legs across bars {face.name}", least, legs_along(work, axis), _clause(work))


def _widest(work: ColumnWorking[T], faces: Sequence[Face[T]]) -> Face[T]:
    return max(faces, key=lambda face: work.pad.number(face.s_clear))


def _clause(work: ColumnWorking[T]) -> str:
    return work.clause(ties.unsupported_bar_maximum)


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
