"""Ties and spirals of one column."""

from __future__ import annotations

from collections.abc import Iterator

from calcpack.aci318 import columns, ties
from calcpack.aci318.bars import bar
from calcpack.aci318.editions import Edition
from calcpack.formula import Formula
from calcpack.members.column_section import ColumnLike, bar_faces
from calcpack.members.results import CheckResult, measured, verdict_of

__all__ = ["transverse_checks"]

_NO_AGGREGATE = "Aggregate size not stated: 4/3 d_agg is not checked."


def transverse_checks(column: ColumnLike, edition: Edition) -> Iterator[CheckResult]:
    """Checks of the ties, or of the spiral, of a column."""
    if column.ties.kind == "spiral":
        yield _size(column, edition, "spiral size", ties.spiral_size, ties.spiral_size())
        yield _pitch(column, edition)
        yield _spiral_ratio(column, edition)
    else:
        yield _size(column, edition, "tie size", ties.tie_size, ties.tie_size(d_b=bar(column.bars.size).d_b))
        yield _tie_spacing(column, edition)
        if column.b is not None:
            yield _lateral_support(column, edition)


def _clause(rule: Formula, edition: Edition) -> str:
    return rule.clause(edition.standard).number


def _size(column: ColumnLike, edition: Edition, name: str, rule: Formula, least: float) -> CheckResult:
    d_bt = bar(column.ties.size).d_b
    ratio = least / d_bt
    values = {"d_bt": measured("d_bt", d_bt), "d_bt_min": measured("d_bt_min", least)}
    return CheckResult(column.mark, name, _clause(rule, edition), "", ratio, verdict_of(ratio), values)


def _tie_spacing(column: ColumnLike, edition: Edition) -> CheckResult:
    h_min = column.h if column.b is None else min(column.b, column.h)
    d_bt = bar(column.ties.size).d_b
    s_max = ties.tie_spacing(d_b=bar(column.bars.size).d_b, d_bt=d_bt, h_min=h_min)
    clear, ratio = column.ties.spacing - d_bt, column.ties.spacing / s_max
    values = {"s": measured("s", column.ties.spacing), "s_max": measured("s_max", s_max)}
    notes: tuple[str, ...] = (_NO_AGGREGATE,)
    if column.aggregate is not None:
        least = ties.tie_clear_minimum(d_agg=column.aggregate)
        ratio = max(ratio, least / clear) if clear > 0 else ratio
        values |= {"s_clear": measured("s_clear", clear), "s_clear_min": measured("s_clear_min", least)}
        notes = ()
    clause, verdict = _clause(ties.tie_spacing, edition), verdict_of(ratio, clear > 0)
    return CheckResult(column.mark, "tie spacing", clause, "", ratio, verdict, values, notes)


def _lateral_support(column: ColumnLike, edition: Edition) -> CheckResult:
    """Corner bars are held by the tie; of the others the schedule does not say which a crosstie holds."""
    limit = ties.unsupported_bar_maximum()
    faces = [face for face in bar_faces(column) if face.n_face > 2]
    clear = max((face.s_clear for face in faces), default=0.0)
    clause = _clause(ties.unsupported_bar_maximum, edition)
    values = {"x_clear": measured("x_clear", clear), "x_clear_max": measured("x_clear_max", limit)}
    if not faces:
        return CheckResult(column.mark, "lateral support of bars", clause, "", 0.0, "OK", values)
    crowded = [face.name for face in faces if face.n_face > 3 or face.s_clear > limit]
    if crowded:
        note = f"Bars between the corners {' and '.join(crowded)} need crossties; the schedule does not show any."
        return CheckResult(column.mark, "lateral support of bars", clause, "", None, "", values, (note,))
    ratio = clear / limit
    return CheckResult(column.mark, "lateral support of bars", clause, "", ratio, verdict_of(ratio), values)


def _pitch(column: ColumnLike, edition: Edition) -> CheckResult:
    clear = column.ties.spacing - bar(column.ties.size).d_b
    notes: tuple[str, ...] = ()
    if column.aggregate is None:
        least, notes = ties.spiral_clear_minimum(), (_NO_AGGREGATE,)
    else:
        least = ties.spiral_clear_minimum_aggregate(d_agg=column.aggregate)
    most = ties.spiral_clear_maximum()
    ratio = max(clear / most, least / clear) if clear > 0 else None
    values = {
        "s_clear": measured("s_clear", clear),
        "s_clear_min": measured("s_clear_min", least),
        "s_clear_max": measured("s_clear_max", most),
    }
    clause = _clause(ties.spiral_clear_maximum, edition)
    return CheckResult(column.mark, "spiral pitch", clause, "", ratio, verdict_of(ratio, clear > 0), values, notes)


def _spiral_ratio(column: ColumnLike, edition: Edition) -> CheckResult:
    spiral, f_yt = bar(column.ties.size), column.f_yt or column.f_y
    D_c = ties.core_diameter(h=column.h, c_cover=column.cover)
    A_ch, A_g = ties.core_area(D_c=D_c), columns.area_circular(h=column.h)
    rho_s = ties.spiral_ratio(A_sp=spiral.A_b, D_c=D_c, d_bt=spiral.d_b, s=column.ties.spacing)
    least = ties.spiral_ratio_minimum(A_g=A_g, A_ch=A_ch, f_c=column.f_c, f_yt=f_yt)
    ratio = least / rho_s
    values = {"rho_s": measured("rho_s", rho_s), "rho_s_min": measured("rho_s_min", least)}
    notes: tuple[str, ...] = ("A turn is measured along its centre line, pi (D_c - d_bt).",)
    if column.f_yt is None:
        notes += ("f_yt not stated: f_y is taken.",)
    clause = _clause(ties.spiral_ratio_minimum, edition)
    return CheckResult(column.mark, "spiral ratio", clause, "", ratio, verdict_of(ratio), values, notes)
