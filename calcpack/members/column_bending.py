"""Evidence of strength under axial force and bending: what a hand needs to verify a neutral axis.

Direction and depth of the neutral axis are stated as found; the block, the bars, the sums and the comparison with the
load on its ray are worked from them, and the differences that vanish confirm them.
"""

from __future__ import annotations

from collections.abc import Mapping, Sequence
from dataclasses import dataclass
from typing import Generic, TypeVar

from calcpack.aci318 import bending, compatibility
from calcpack.aci318.standards import ACI_318_14
from calcpack.formula import Formula
from calcpack.members.bar_layout import bar_rows
from calcpack.members.column_block import Axes, NeutralAxis, step, work_block
from calcpack.members.column_rules import ColumnWorking
from calcpack.tabulation import Column, Row, Tabulation, Worked

__all__ = ["Strength", "work_ray", "work_strength", "work_tension"]

T = TypeVar("T")
_METHOD = "equilibrium by Newton's method"
_ASSUMED = "22.2.1, 22.2.2"
_DEPTHS = {"": compatibility.bar_depth, "x": compatibility.bar_depth_x, "y": compatibility.bar_depth_y}
_LEVERS: Mapping[str, tuple[Formula, ...]] = {
    "x": (compatibility.moment_x,),
    "y": (compatibility.moment_y,),
    "": (compatibility.moment_x, compatibility.moment_y),
}
_SUMS: Mapping[str, tuple[Formula, ...]] = {
    "x": (compatibility.axial_sum, compatibility.moment_sum_x),
    "y": (compatibility.axial_sum, compatibility.moment_sum_y),
    "": (compatibility.axial_sum, compatibility.moment_sum_x, compatibility.moment_sum_y),
}
# Lengths of load and strength, by the axes of bending.
_RAYS: Mapping[tuple[str, bool], tuple[Formula, Formula]] = {
    ("x", False): (bending.load_length_x, bending.strength_length_x),
    ("x", True): (bending.load_length_x, bending.strength_length_x),
    ("y", False): (bending.load_length_y, bending.strength_length_y),
    ("y", True): (bending.load_length_y_circular, bending.strength_length_y_circular),
    ("", False): (bending.load_length, bending.strength_length),
    ("", True): (bending.load_length_circular, bending.strength_length_circular),
}


@dataclass(frozen=True)
class Strength(Generic[T]):
    """The strength at a neutral axis: every value by its symbol, and the rows of the table of bars.

    Attributes
    ----------
    solved : the values that were found by iteration
    """

    axes: Axes
    values: dict[str, T]
    bars: Sequence[Mapping[str, T]]
    solved: tuple[T, ...]


def work_strength(
    work: ColumnWorking[T], axis: NeutralAxis, axes: Axes, point: Mapping[str, T], layers: Sequence[Row[T]] = ()
) -> Strength[T]:
    """State a neutral axis and work the block, the bars and their sums; the sheet shows each.

    Parameters
    ----------
    work : the column
    axis : the neutral axis found
    axes : about which axes it bends
    point : P_u, M_ux, M_uy as far as they act: what the neutral axis was solved from
    layers : of bars, where a table by layers is wanted in place of one by bars
    """
    v = {name: work.value(name) for name in ("h", "f_c", "f_y", "E_s", "eps_cu", "beta_1", "A_b")}
    v |= {} if work.column.b is None else {"b": work.value("b")}
    v |= point
    rows = layers or bar_rows(work)
    solved = _solved(work, v, axis, axes, [*point.values(), *(v[name] for name in ("h", "f_c", "f_y", "A_b"))])
    work_block(work, v, axes)
    table = work.pad.tabulate(_bar_table(axes, bool(layers)), rows, v)
    v |= table.totals
    for formula in _SUMS[axes.name]:
        step(work, v, formula)
    return Strength(axes, v, table.rows, solved)


def _solved(
    work: ColumnWorking[T], v: dict[str, T], axis: NeutralAxis, axes: Axes, origin: Sequence[T]
) -> tuple[T, ...]:
    if axes.name == "":
        means = "direction of the compressed face, counterclockwise from +x"
        v["theta"] = work.pad.solved("theta", axis.theta, means, _METHOD, _ASSUMED, origin)
    means = "depth of the neutral axis from the extreme compression fibre"
    v["c"] = work.pad.solved("c", axis.c, means, _METHOD, _ASSUMED, origin)
    return tuple(v[name] for name in ("theta", "c") if name in v)


def _bar_table(axes: Axes, layers: bool) -> Tabulation:
    levers = _LEVERS[axes.name]
    steps = (compatibility.bar_strain, compatibility.bar_stress, compatibility.bar_force)
    places = [Column(lever, 4) for lever in ("xy" if not layers else axes.levers)]
    results = [Column("d_s", 4), Column("eps_s", 7), Column("f_s", 2, "ksi"), Column("F_s", 2)]
    return Tabulation(
        title="Layers of bars at the neutral axis" if layers else "Bars at the neutral axis",
        label="layer" if layers else "bar",
        formulas=(_DEPTHS[axes.name], *steps, *levers),
        columns=(
            *([Column("A_b", 2)] if layers else []),
            *places,
            *results,
            *(Column(formula.result_name, 2) for formula in levers),
        ),
        totals={"F_s": "F_s_sum", **{formula.result_name: f"{formula.result_name}_sum" for formula in levers}},
    )


def work_ray(work: ColumnWorking[T], strength: Strength[T], what: str, clause: str) -> float:
    """Compare a load with the design strength on its ray, confirm the neutral axis, and return the ratio."""
    v, axes = strength.values, strength.axes
    last = max(range(len(strength.bars)), key=lambda row: work.pad.number(strength.bars[row]["d_s"]))
    work.pad.reason(f"The extreme tension bar, square to the neutral axis, is bar {last + 1}.")
    v["d_t"] = strength.bars[last]["d_s"]
    step(work, v, compatibility.tension_strain)
    v["eps_ty"] = work.value("eps_ty")
    step(work, v, _phi(work))
    load, design = _RAYS[axes.name, axes.circular]
    step(work, v, load)
    step(work, v, design)
    ratio = work.verify(what, v["R_u"], v["phi_R_n"], clause)
    step(work, v, bending.load_share)
    table = work.pad.tabulate(_DIFFERENCES, _parts(v, axes), v)
    work.pad.confirm(strength.solved, [row["Delta"] for row in table.rows])
    return ratio


_DIFFERENCES = Tabulation(
    title="Load against strength, part by part",
    label="part",
    formulas=(bending.difference,),
    columns=(Column("S_u", 2), Column("S_n", 2), Column("Delta", 4)),
)


def _parts(v: Mapping[str, T], axes: Axes) -> list[Row[T]]:
    depth, width = "h", "h" if axes.circular else "b"
    rows: list[Row[T]] = [("P", {"S_u": v["P_u"], "S_n": v["P_n"]})]
    if "y" in axes.levers:
        rows.append((f"M about x, over {depth}", _part(v, "M_ux", "M_nx", depth)))
    if "x" in axes.levers:
        rows.append((f"M about y, over {width}", _part(v, "M_uy", "M_ny", width)))
    return rows


def _part(v: Mapping[str, T], load: str, strength: str, size: str) -> Mapping[str, Worked[T]]:
    return {
        symbol: Worked(f"{moment}/{size}", {moment: v[moment], size: v[size]})
        for symbol, moment in (("S_u", load), ("S_n", strength))
    }


def _phi(work: ColumnWorking[T]) -> Formula:
    spiral = work.column.ties.kind == "spiral"
    if work.edition.standard == ACI_318_14:
        return compatibility.phi_spiral_14 if spiral else compatibility.phi_tied_14
    return compatibility.phi_spiral_19 if spiral else compatibility.phi_tied_19


def work_tension(work: ColumnWorking[T], P_u: T, what: str) -> float:
    """Compare axial tension alone with the design strength in tension, and return the ratio."""
    T_ut = work.pad.work(bending.tension_force, P_u=P_u)
    phi = work.pad.work(bending.phi_tension)
    values = {"f_y": work.value("f_y"), "A_st": work.value("A_st")}
    strength = work.pad.work(bending.tension_strength, phi=phi, **values)
    return work.verify(what, T_ut, strength, work.clause(bending.tension_strength))
