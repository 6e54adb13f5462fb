"""An independent check of biaxial bending: the reciprocal load, from strengths about each axis alone."""

from __future__ import annotations

from collections.abc import Mapping
from math import isnan
from typing import TypeVar

from calcpack.aci318 import bending
from calcpack.members.bar_layout import layer_rows
from calcpack.members.column_bending import Strength, work_strength
from calcpack.members.column_block import Axes, NeutralAxis
from calcpack.members.column_rules import ColumnWorking
from calcpack.members.interaction import Interaction
from calcpack.members.working import Choice
from calcpack.tabulation import Column, Row, Tabulation, Worked

__all__ = ["BAND", "work_reciprocal"]

T = TypeVar("T")
# From memory: Bresler compared the method with tests and computed strengths, and found them within some 10 %.
BAND = 0.10
_ECCENTRICITY = {
    axis: Tabulation(
        title="Eccentricity of the strength against that of the load",
        label="bending",
        formulas=(formula,),
        columns=(Column("e_n", 4), Column(load, 4), Column("Delta", 4)),
    )
    for axis, load, formula in (
        ("x", "e_y", bending.eccentricity_difference_y),
        ("y", "e_x", bending.eccentricity_difference_x),
    )
}
_TITLE = "Independent check: reciprocal load"
_TENSION = (
    "Not used: with one of the eccentricities alone the nominal axial strength is below that, and bending governs."
)
_NO_MOMENT = "Not used: one of the eccentricities is so small that the strength is that of axial force alone."
_TURNED = "Not used: bars on the edge of the block turn the neutral axis of one of the eccentricities alone."
_INSIDE = "Within its band of 10 %: the neutral axis above is no gross mistake. This is no part of the design check."
_OUTSIDE = "Outside its band of 10 %: look at the neutral axis above, and at how far the bars are from symmetric."


def work_reciprocal(work: ColumnWorking[T], checked: Interaction, strength: Strength[T]) -> None:
    """Compare the strength by strain compatibility with the reciprocal load; say so where that is not meant for it."""
    v, number = strength.values, work.pad.number
    if work.column.b is None or strength.axes.name or number(v["P_u"]) <= 0:
        return
    P, Mx, My = (number(v[name]) for name in ("P_u", "M_ux", "M_uy"))
    alone = {"x": _alone(checked, P, Mx, 0.0), "y": _alone(checked, P, 0.0, My)}
    work.pad.heading(_TITLE)
    least = work.work(Choice(bending.reciprocal_least))
    if min(P_n for _, P_n in alone.values()) < number(least):
        work.pad.reason(_TENSION)
        return
    if any(isnan(found.theta) for found, _ in alone.values()):
        work.pad.reason(_NO_MOMENT)
        return
    if not all(found.fits(Axes(axis, False)) for axis, (found, _) in alone.items()):
        work.pad.reason(_TURNED)
        return
    P_nx = _about(work, "x", alone["x"][0], v)
    P_ny = _about(work, "y", alone["y"][0], v)
    _compare(work, P_nx, P_ny, v["P_n"])


def _compare(work: ColumnWorking[T], P_nx: T, P_ny: T, P_n: T) -> None:
    recip = work.pad.work(bending.reciprocal_load, P_nx=P_nx, P_ny=P_ny, P_o=work.value("P_o"))
    off = work.pad.number(work.pad.work(bending.reciprocal_difference, P_n_recip=recip, P_n=P_n))
    work.pad.reason(_INSIDE if abs(off) <= BAND else _OUTSIDE)


def _alone(checked: Interaction, P: float, Mx: float, My: float) -> tuple[NeutralAxis, float]:
    """Neutral axis and nominal axial strength with one eccentricity."""
    from calcpack.mechanics import NOMINAL, Surface

    found = Surface(checked.surface.section, NOMINAL).check([P], [Mx], [My])
    return NeutralAxis(float(found.theta[0]), float(found.c[0])), float(found.P_n[0])


def _about(work: ColumnWorking[T], axis: str, found: NeutralAxis, v: Mapping[str, T]) -> T:
    """The nominal axial strength with the eccentricity of bending about one axis."""
    work.pad.reason(f"Bending about {axis} alone, with its eccentricity; strengths are nominal.")
    moment, lever = ("M_ux", bending.eccentricity_y) if axis == "x" else ("M_uy", bending.eccentricity_x)
    point = {"P_u": v["P_u"], moment: v[moment]}
    e = work.pad.work(lever, **point)
    alone = work_strength(work, found, Axes(axis, False), point, layer_rows(work, axis))
    values = {**alone.values, lever.result_name: e}
    strength = "M_nx" if axis == "x" else "M_ny"
    e_n = Worked(f"{strength}/P_n", {name: values[name] for name in (strength, "P_n")})
    row: Row[T] = (f"about {axis}", {"e_n": e_n, lever.result_name: e})
    (left,) = work.pad.tabulate(_ECCENTRICITY[axis], [row], values).rows
    work.pad.confirm(alone.solved, [left["Delta"]])
    return alone.values["P_n"]
