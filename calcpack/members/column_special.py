"""Columns of special moment frames, ACI 318 18.7: dimensions, bars, hoops within l_o and outside it.

`P_u` is the largest compression of the factored combinations. What is not covered, `special_owed` names.
"""

from __future__ import annotations

from collections.abc import Iterable, Iterator
from dataclasses import dataclass
from typing import Generic, TypeVar

from calcpack.aci318 import lateral_support, special_frames
from calcpack.formula import Formula
from calcpack.ledger import passes
from calcpack.members.column_forces import ForceValues
from calcpack.members.column_like import ForceLike
from calcpack.members.column_rules import CENTRE_LINE, ColumnWorking, Face
from calcpack.members.column_section import section_source
from calcpack.members.column_ties import area_of_tie_bar, legs_across, legs_along, yield_of_ties
from calcpack.members.results import CheckResult
from calcpack.members.working import Choice

__all__ = ["special_checks", "special_owed"]

T = TypeVar("T")
_FRAME = ", special moment frame"
_NO_HEIGHT = "The unsupported length is not stated: l_u/6 is not checked."
_NO_FORCE = "No factored axial force is listed: what depends on P_u is not checked."
_CONCRETE = "Concrete above 10,000 psi"


@dataclass(frozen=True)
class _Load(Generic[T]):
    """The largest compression: whether it, or the concrete, makes 18.7.5.2(f) and expression (c) or (f) apply."""

    combination: str
    P_u: T | None
    high: bool
    notes: tuple[str, ...]


def special_checks(
    work: ColumnWorking[T], forces: Iterable[ForceLike], force_values: ForceValues[T] | None = None
) -> list[CheckResult]:
    """Work and verify what a column of a special moment frame owes; nothing for another column.

    Parameters
    ----------
    force_values : states ``P_u`` of a combination on the pad; shared with other checks, it stands there once
    """
    if work.column.seismic != "special":
        return []
    work.pad.heading("Special moment frame")
    results = [_dimensions(work), _materials(work), _ratio_of_bars(work)]
    if work.column.b is None:
        results.append(_number_of_bars(work))
    results.append(_length(work))
    load = _load(work, forces, force_values or ForceValues(work))
    h_x = _spacing_of_bars(work)
    results += [_held_bars(work, h_x, load), _spacing(work, h_x)]
    results += [_hoops(work, load)] if work.column.b is None else [_legs(work, axis, load) for axis in ("x", "y")]
    return [*results, _beyond(work)]


def special_owed() -> list[str]:
    """What a column of a special moment frame owes and no check here covers."""
    return [
        "columns stronger than beams at the joints (18.7.3)",
        "shear that goes with the probable moments, and V_c of zero within l_o (18.7.6)",
        "lap splices within the centre half of the column (18.7.4)",
        "length of bars developed within half of the column, by ACI 318-19 (18.7.4.3)",
        "anchorage of hoops and alternation of crossties (18.7.5.2)",
    ]


def _dimensions(work: ColumnWorking[T]) -> CheckResult:
    least, clause = work.value("h_min"), work.clause(special_frames.dimension_minimum)
    limit = work.pad.work(special_frames.dimension_minimum)
    ratio = work.verify("least dimension of the column", limit, least, clause)
    values = {"h_min": least, "h_min_least": limit}
    if work.column.b is not None:
        r_h = work.pad.work(special_frames.dimension_ratio, h_min=least, h_max=_largest(work))
        r_h_min = work.pad.work(special_frames.dimension_ratio_minimum)
        ratio = max(ratio, work.verify("ratio of the dimensions of the column", r_h_min, r_h, clause))
        values |= {"r_h": r_h, "r_h_min": r_h_min}
    return work.result(f"dimensions{_FRAME}", clause, ratio, values)


def _largest(work: ColumnWorking[T]) -> T:
    if "h_max" not in work.values:
        circular, rectangular = special_frames.largest_dimension_circular, special_frames.largest_dimension_rectangular
        work.values["h_max"] = work.work(Choice(circular if work.column.b is None else rectangular))
    return work.values["h_max"]


def _materials(work: ColumnWorking[T]) -> CheckResult:
    f_c, f_y, rule = work.value("f_c"), work.value("f_y"), work.edition.special_yield
    least, most = work.pad.work(special_frames.concrete_minimum), work.pad.work(rule)
    low = work.verify("strength of concrete", least, f_c, work.clause(special_frames.concrete_minimum))
    high = work.verify("yield strength of longitudinal bars", f_y, most, work.clause(rule))
    values = {"f_c": f_c, "f_c_min": least, "f_y": f_y, "f_y_max": most}
    return work.result(f"materials{_FRAME}", work.clause(rule), max(low, high), values)


def _ratio_of_bars(work: ColumnWorking[T]) -> CheckResult:
    rule = special_frames.reinforcement_ratio_maximum_special
    rho_g, most, clause = work.value("rho_g"), work.pad.work(rule), work.clause(rule)
    least = work.value("rho_g_min")
    low = work.verify("least ratio of longitudinal reinforcement in a special moment frame", least, rho_g, clause)
    high = work.verify("largest ratio of longitudinal reinforcement in a special moment frame", rho_g, most, clause)
    values = {"rho_g": rho_g, "rho_g_min": least, "rho_g_max": most}
    return work.result(f"reinforcement ratio{_FRAME}", clause, max(low, high), values)


def _number_of_bars(work: ColumnWorking[T]) -> CheckResult:
    rule = special_frames.bars_minimum_hoops
    n_bars, least, clause = work.value("n_bars"), work.pad.work(rule), work.clause(rule)
    ratio = work.verify("number of bars within circular hoops", least, n_bars, clause)
    return work.result(f"number of bars{_FRAME}", clause, ratio, {"n_bars": n_bars, "n_min": least})


def _length(work: ColumnWorking[T]) -> CheckResult:
    """The length is a requirement on the detail; the schedule does not state what is built."""
    if work.column.l_u is None:
        rule, own, notes = special_frames.length_confined_without_height, {}, work.note(_NO_HEIGHT)
    else:
        if "l_u" not in work.values:
            source = section_source(work.column)
            work.values["l_u"] = work.pad.given("l_u", float(work.column.l_u), "unsupported length of column", source)
        rule, own, notes = special_frames.length_confined, {"l_u": work.values["l_u"]}, ()
    l_o = work.pad.work(rule, h_max=_largest(work), **own)
    return work.result(f"length l_o{_FRAME}", work.clause(rule), None, {"l_o": l_o}, notes)


def _load(work: ColumnWorking[T], forces: Iterable[ForceLike], force_values: ForceValues[T]) -> _Load[T]:
    factored = [force for force in forces if force.combination is not None]
    strong = work.column.f_c > 10_000
    governing = max(factored, key=lambda force: force.P, default=None)
    if governing is None:
        return _Load("", None, strong, work.note(_NO_FORCE))
    if governing.P <= 0:
        work.pad.reason("No combination compresses the column.")
        return _Load("", None, strong, ())
    name = str(governing.combination)
    work.pad.reason(f"{name} has the largest compression of {len(factored)} combinations.")
    P_u = force_values(governing, ["P_u"])["P_u"]
    limit = work.work(Choice(special_frames.axial_force_high))
    above = not passes(work.pad.number(P_u) / work.pad.number(limit))
    why = "P_u is above 0.3 A_g f_c" if above else _CONCRETE if strong else "P_u is at most 0.3 A_g f_c"
    work.pad.reason(f"{why}: expression with P_u {'applies' if above or strong else 'does not apply'}.")
    return _Load(name, P_u, above or strong, ())


def _spacing_of_bars(work: ColumnWorking[T]) -> T:
    """The largest h_x of the faces."""
    if work.column.b is None:
        return work.work(Choice(lateral_support.support_spacing_circular))
    return max((_face_spacing(work, face) for face in work.faces), key=work.pad.number)


def _face_spacing(work: ColumnWorking[T], face: Face[T]) -> T:
    along_y = face.name == "along y"
    rule = lateral_support.support_spacing_y if along_y else lateral_support.support_spacing_x
    why = f"Bars {face.name}; legs across them are taken as shared out evenly."
    return work.work(Choice(rule, why), **face.own, n_legs=_held_by(work, face))


def _held_by(work: ColumnWorking[T], face: Face[T]) -> T:
    """Legs across a face; more legs than bars hold no more bars."""
    legs = legs_along(work, legs_across(work, face))
    return legs if work.pad.number(legs) <= face.n_face else face.own["n_face"]


def _held_bars(work: ColumnWorking[T], h_x: T, load: _Load[T]) -> CheckResult:
    """h_x, and under a high axial force every bar held where hoops are rectilinear."""
    every = load.high and work.column.b is not None
    rule = special_frames.supported_spacing_maximum_high if every else special_frames.supported_spacing_maximum
    most, clause = work.pad.work(rule), work.clause(rule)
    check, values = f"spacing of held bars{_FRAME}", {"h_x": h_x, "h_x_max": most}
    ratio = work.verify("spacing of laterally supported bars", h_x, most, clause)
    if every:
        ratio = max([ratio, *_every_bar(work, clause)])
    return work.result(check, clause, ratio, values, load.notes, load.combination)


def _every_bar(work: ColumnWorking[T], clause: str) -> Iterator[float]:
    for face in work.faces:
        legs = _held_by(work, face)
        yield work.verify(f"every bar {face.name} held by a leg", face.own["n_face"], legs, clause)


def _spacing(work: ColumnWorking[T], h_x: T) -> CheckResult:
    rule = work.edition.special_spacing
    s_o = work.pad.work(special_frames.confinement_spacing_by_bars, h_x=h_x)
    s, s_max, clause = work.value("s"), work.work(Choice(rule), s_o=s_o), work.clause(rule)
    ratio = work.verify("spacing of hoops within l_o", s, s_max, clause)
    return work.result(f"spacing within l_o{_FRAME}", clause, ratio, {"s": s, "s_max": s_max, "s_o": s_o})


def _concrete_factor(work: ColumnWorking[T]) -> T:
    if "k_f" not in work.values:
        work.values["k_f"] = work.work(Choice(special_frames.concrete_factor))
    return work.values["k_f"]


def _bars_factor(work: ColumnWorking[T]) -> T:
    if "k_n" not in work.values:
        n_x, n_y = work.faces[0].own["n_face"], work.faces[-1].own["n_face"]
        n_l = work.work(
            Choice(lateral_support.supported_bars),
            n_x=n_x, n_y=n_y, n_legs_x=legs_along(work, "x"), n_legs_y=legs_along(work, "y"),
        )  # fmt: skip
        work.values["k_n"] = work.work(Choice(special_frames.bars_factor), n_l=n_l)
    return work.values["k_n"]


def _legs(work: ColumnWorking[T], axis: str, load: _Load[T]) -> CheckResult:
    """Legs parallel to an axis, across the dimension of the core along the other one."""
    across = special_frames.core_dimension_y if axis == "x" else special_frames.core_dimension_x
    work.pad.reason(f"Legs parallel to {axis}.")
    A_bt, n_legs, b_c = area_of_tie_bar(work), legs_along(work, axis), work.work(Choice(across))
    A_sh = work.pad.work(special_frames.confinement_area, n_legs=n_legs, A_bt=A_bt)
    r_sh = work.work(Choice(special_frames.confinement_provided), A_sh=A_sh, b_c=b_c)
    least, clause = _least_legs(work, load), work.clause(special_frames.confinement_rectilinear)
    ratio = work.verify(f"confinement by legs parallel to {axis}", least, r_sh, clause)
    values = {"A_sh": A_sh, "b_c": b_c, "r_sh": r_sh, "r_sh_min": least}
    return work.result(f"confinement, {axis}{_FRAME}", clause, ratio, values, load.notes, load.combination)


def _least_legs(work: ColumnWorking[T], load: _Load[T]) -> T:
    """The least A_sh/(s b_c), the same for both directions and worked once."""
    if "r_sh_min" not in work.values:
        if "A_ch" not in work.values:
            work.values["A_ch"] = work.work(Choice(special_frames.core_area_rectangular))
        yield_of_ties(work)
        work.values["r_sh_min"] = _least(
            work, load, special_frames.confinement_rectilinear, special_frames.confinement_rectilinear_high
        )
    return work.values["r_sh_min"]


def _least(work: ColumnWorking[T], load: _Load[T], low: Formula, high: Formula) -> T:
    """The least confinement by the table; the expression with P_u where it applies and P_u is compression."""
    if not load.high or load.P_u is None:
        return work.work(Choice(low))
    own = {"k_f": _concrete_factor(work), "P_u": load.P_u}
    if "k_n" in high.arguments:
        own["k_n"] = _bars_factor(work)
    return work.work(Choice(high), **own)


def _hoops(work: ColumnWorking[T], load: _Load[T]) -> CheckResult:
    """Circular hoops, or a spiral: volume ratio to the core."""
    yield_of_ties(work)
    rho_s = work.value("rho_s")
    low, high = special_frames.confinement_circular, special_frames.confinement_circular_high
    least, clause = _least(work, load, low, high), work.clause(low)
    ratio = work.verify("volume ratio of circular hoops or spiral within l_o", least, rho_s, clause)
    notes = (CENTRE_LINE, *load.notes)
    values = {"rho_s": rho_s, "rho_s_min": least}
    return work.result(f"confinement{_FRAME}", clause, ratio, values, notes, load.combination)


def _beyond(work: ColumnWorking[T]) -> CheckResult:
    """Ties outside l_o, the same as within it where the schedule states no others."""
    rule, beyond = work.edition.special_spacing_beyond, work.column.ties_beyond
    notes: tuple[str, ...] = ()
    if beyond is None:
        s, notes = work.value("s"), work.note("The schedule states no other ties outside l_o: those within it go on.")
    else:
        means = f"centre-to-centre spacing of {'spiral' if beyond.kind == 'spiral' else 'ties'} outside l_o"
        s = work.pad.given("s", float(beyond.spacing), means, section_source(work.column))
    s_max, clause = work.work(Choice(rule)), work.clause(rule)
    ratio = work.verify("spacing of transverse reinforcement outside l_o", s, s_max, clause)
    return work.result(f"spacing outside l_o{_FRAME}", clause, ratio, {"s": s, "s_max": s_max}, notes)
