"""One direction of shear of a column: width, depth and tension reinforcement, and what ties or a spiral provide."""

from __future__ import annotations

from collections.abc import Mapping
from dataclasses import dataclass
from typing import Generic, TypeVar

from calcpack.aci318 import shear
from calcpack.aci318.editions import Edition
from calcpack.formula import Formula
from calcpack.ledger import passes
from calcpack.members.column_rules import ColumnWorking, Face
from calcpack.members.column_section import section_source
from calcpack.members.column_ties import area_of_tie_bar, legs_along, yield_of_ties
from calcpack.members.working import Choice
from calcpack.symbols import lookup

__all__ = ["Direction", "direction_of"]

T = TypeVar("T")
_TENSION = "Bars farther than two thirds of the depth from the compressed face are taken as tension reinforcement."
_ONE_LAYER = "Of these bars only the outermost layer lies that far: d is its depth."
_CENTROID = "d is the depth of the centroid of these bars."
_CIRCLE = "Bars on the circle farther than two thirds of h from the compressed edge, the least of any direction."
_ENOUGH = "A_v is at least A_v,min: equation (a) of the table is used; (b) is permitted as well and not worked."
_FEW = "A_v is below A_v,min: equation (c) of the table is used."


@dataclass(frozen=True)
class _Axis:
    """Formulas of the dimensions along an axis."""

    width: Formula
    layer: Formula
    rows: Formula
    demand: Formula
    symbol: str


_AXES = {
    "x": _Axis(shear.width_x, shear.depth_of_layer_x, shear.rows_beyond_x, shear.shear_along_x, "V_ux"),
    "y": _Axis(shear.width_y, shear.depth_of_layer_y, shear.rows_beyond_y, shear.shear_along_y, "V_uy"),
}


@dataclass(frozen=True)
class Direction(Generic[T]):
    """What does not depend on the load.

    Attributes
    ----------
    name : ``x``, ``y``, or empty for a circular column, which is as strong in every direction
    demand : what makes V_u of the factored shears, which are its arguments
    few_ties : whether the ties are fewer than the minimum of shear reinforcement
    values : values by symbol
    """

    name: str
    demand: Formula
    few_ties: bool
    values: Mapping[str, T]

    def concrete(self, edition: Edition, N_u: float) -> Formula:
        """The equation of the shear strength of concrete under an axial force."""
        if self.few_ties and edition.shear_few_ties is not None:
            return edition.shear_few_ties
        if N_u > 0:
            return edition.shear_compression
        return edition.shear_tension if N_u < 0 else edition.shear_alone


def direction_of(work: ColumnWorking[T], name: str, phi: T) -> Direction[T]:
    """Work a direction on the pad of the column."""
    values = _circular(work) if not name else _rectangular(work, name)
    values |= {"phi": phi, "A_g": work.value("A_g"), "f_c": work.value("f_c"), "lamb": _lightweight(work)}
    values["s"] = work.value("s")
    _reinforce(work, values)
    fewer = not passes(work.pad.number(values["A_v_min"]) / work.pad.number(values["A_v"]))
    if work.edition.shear_few_ties is not None:
        work.pad.reason(_FEW if fewer else _ENOUGH)
        if fewer:
            _add_ratio(work, values)
    return Direction(name, _AXES[name].demand if name else shear.shear_resultant, fewer, values)


def _circular(work: ColumnWorking[T]) -> dict[str, T]:
    return {
        "b_w": work.work(Choice(shear.width_circular)),
        "d": work.work(Choice(shear.depth_circular)),
        "A_v": work.work(Choice(shear.area_of_tie_circular)),
    }


def _rectangular(work: ColumnWorking[T], name: str) -> dict[str, T]:
    axis = _AXES[name]
    far, side = (work.faces[-1], work.faces[0]) if name == "x" else (work.faces[0], work.faces[-1])
    values = {"b_w": work.work(Choice(axis.width)), "n_face": far.own["n_face"]}
    values |= _depth(work, axis, side, values["n_face"])
    values["A_v"] = work.pad.work(shear.area_of_legs, n_legs=legs_along(work, name), A_bt=area_of_tie_bar(work))
    return values


def _depth(work: ColumnWorking[T], axis: _Axis, side: Face[T], n_face: T) -> dict[str, T]:
    """The depth of the tension reinforcement, and the rows of side bars where any belong to it."""
    d_t = work.work(Choice(axis.layer))
    if side.n_face == 2:
        return {"d": work.work(Choice(shear.depth_one_layer), d_t=d_t)}
    pitch = work.work(Choice(side.pitch), **side.own)
    n_rows = work.work(Choice(axis.rows, _TENSION), d_t=d_t, s=pitch)
    if work.pad.number(n_rows) == 0:
        return {"d": work.work(Choice(shear.depth_one_layer, _ONE_LAYER), d_t=d_t)}
    rule = Choice(shear.depth_with_side_bars, _CENTROID)
    return {"n_rows": n_rows, "d": work.work(rule, d_t=d_t, n_rows=n_rows, n_face=n_face, s=pitch)}


def _reinforce(work: ColumnWorking[T], values: dict[str, T]) -> None:
    """Strength and least area of the ties."""
    yield_of_ties(work)
    if "f_yt_v" not in work.values:
        work.values["f_yt_v"] = work.work(Choice(shear.yield_in_shear))
    values["f_yt_v"] = work.values["f_yt_v"]
    for symbol, rule in (("V_s", shear.steel_strength), ("A_v_min", shear.shear_reinforcement_minimum)):
        values[symbol] = work.pad.work(rule, **_those(rule, values))


def _add_ratio(work: ColumnWorking[T], values: dict[str, T]) -> None:
    """Size effect and ratio of tension reinforcement, which equation (c) asks for."""
    values["lambda_s"] = work.pad.work(shear.size_effect, d=values["d"])
    if work.column.b is None:
        values["A_s"] = work.work(Choice(shear.tension_area_circular, _CIRCLE))
    elif "n_rows" in values:
        values["A_s"] = work.work(Choice(shear.tension_area_with_side_bars), **_some(values, "n_face", "n_rows"))
    else:
        values["A_s"] = work.work(Choice(shear.tension_area_one_layer), **_some(values, "n_face"))
    values["rho_w"] = work.pad.work(shear.tension_ratio, **_those(shear.tension_ratio, values))


def _lightweight(work: ColumnWorking[T]) -> T:
    if "lamb" not in work.values:
        means, source = lookup("lamb").meaning, section_source(work.column)
        work.values["lamb"] = work.pad.given("lamb", float(work.column.lamb), means, source)
    return work.values["lamb"]


def _those(rule: Formula, values: Mapping[str, T]) -> dict[str, T]:
    """The arguments of a formula that are among the values."""
    return {symbol: values[symbol] for symbol in rule.arguments if symbol in values}


def _some(values: Mapping[str, T], *symbols: str) -> dict[str, T]:
    return {symbol: values[symbol] for symbol in symbols}
