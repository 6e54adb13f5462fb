"""Shear of a column with the axial force of the same combination, along x, along y and, in 318-19, both together.

Every combination is looked through with plain floats; those that govern are worked on the pad of the column.
"""

from __future__ import annotations

from collections.abc import Callable, Iterable, Iterator, Mapping, Sequence
from typing import Generic, NamedTuple, TypeVar

from calcpack.aci318 import shear
from calcpack.aci318.editions import Edition
from calcpack.formula import Formula
from calcpack.ledger import passes
from calcpack.members.column_forces import ForceValues
from calcpack.members.column_like import ColumnLike, ForceLike
from calcpack.members.column_rules import ColumnWorking
from calcpack.members.column_shear_direction import Direction, direction_of
from calcpack.members.pad import FloatPad
from calcpack.members.results import CheckResult
from calcpack.members.working import Choice

__all__ = ["shear_checks"]

T = TypeVar("T")
_SAME = "N_u is the axial force P_u of the same combination."
_NOT_REQUIRED = "In no combination does V_u exceed half of phi V_c: shear reinforcement is not required."
_REQUIRED = "V_u exceeds half of phi V_c: the minimum of shear reinforcement and its spacing have to be kept."
_APART = (
    "In no combination do the shears along x and along y both exceed half of their design strength: "
    "they need not be taken together (ACI 318-19 22.5.1.10)."
)


_READ: Mapping[str, Callable[[ForceLike], float]] = {
    "P_u": lambda force: force.P,
    "V_ux": lambda force: force.Vx,
    "V_uy": lambda force: force.Vy,
}


def _plain(force: ForceLike, symbols: Iterable[str]) -> dict[str, float]:
    return {symbol: float(_READ[symbol](force)) for symbol in symbols}


def _those(rule: Formula, values: Mapping[str, T]) -> dict[str, T]:
    return {symbol: values[symbol] for symbol in rule.arguments}


class _Load(NamedTuple, Generic[T]):
    """A combination on a pad: its shear, and the strength of concrete under its axial force."""

    V_u: T
    V_c: T


class _Demand(NamedTuple):
    """What a combination asks for in one direction.

    Attributes
    ----------
    ratio : V_u over phi V_n
    of_section : V_u over the largest that the section allows
    V_s_req : what ties have to provide
    excess : V_u less half of phi V_c
    """

    force: ForceLike
    ratio: float
    of_section: float
    V_s_req: float
    excess: float


class _Shear(Generic[T]):
    """The shear of one column on one pad."""

    def __init__(self, work: ColumnWorking[T], force_values: ForceValues[T]) -> None:
        self.work = work
        self.force_values = force_values
        self.directions: dict[str, Direction[T]] = {}
        self.loads: dict[tuple[int, str], _Load[T]] = {}
        self.strengths: dict[tuple[int, str], T] = {}

    def direction(self, name: str) -> Direction[T]:
        """A direction, worked when it is first asked for."""
        if name not in self.directions:
            if "phi_shear" not in self.work.values:
                self.work.values["phi_shear"] = self.work.pad.work(shear.phi_shear)
            self.directions[name] = direction_of(self.work, name, self.work.values["phi_shear"])
        return self.directions[name]

    def load(self, name: str, force: ForceLike) -> _Load[T]:
        """V_u and V_c of a combination in one direction, worked when they are first asked for."""
        key = id(force), name
        if key not in self.loads:
            pad, direction = self.work.pad, self.direction(name)
            demand = direction.demand
            stated = self.force_values(force, ("P_u", *demand.arguments))
            V_u = pad.work(demand, **_those(demand, stated))
            rule = direction.concrete(self.work.edition, pad.number(stated["P_u"]))
            if "N_u" in rule.arguments:
                pad.reason(_SAME)
            self.loads[key] = _Load(V_u, self.rule(direction, rule, N_u=stated["P_u"]))
        return self.loads[key]

    def rule(self, direction: Direction[T], rule: Formula, **own: T) -> T:
        """Work a formula with values of a direction and of a combination."""
        return self.work.pad.work(rule, **_those(rule, {**direction.values, **own}))

    def design(self, name: str, force: ForceLike) -> T:
        """The design shear strength under a combination, worked when it is first asked for."""
        key = id(force), name
        if key not in self.strengths:
            V_c = self.load(name, force).V_c
            self.strengths[key] = self.rule(self.direction(name), shear.design_shear_strength, V_c=V_c)
        return self.strengths[key]


def shear_checks(
    work: ColumnWorking[T], forces: Iterable[ForceLike], force_values: ForceValues[T] | None = None
) -> list[CheckResult]:
    """Work and verify the shear of a column; nothing where no factored shear acts.

    Parameters
    ----------
    force_values : states ``P_u``, ``V_ux`` and ``V_uy`` of a combination on the pad; shared with other checks, they
        stand there once
    """
    acting = [force for force in forces if force.combination is not None and (force.Vx or force.Vy)]
    if not acting:
        return []
    sheet = _Shear(work, force_values or ForceValues(work))
    demands = {name: _demands(_floats(work, name), work.edition, acting) for name in _names(work.column, acting)}
    results = [result for name, listed in demands.items() for result in _checks(sheet, name, listed)]
    if work.edition.biaxial_shear is not None and len(demands) == 2:
        results += _biaxial(sheet, demands["x"], demands["y"], work.edition.biaxial_shear)
    return results


def _floats(work: ColumnWorking[T], name: str) -> Direction[float]:
    plain = ColumnWorking(FloatPad(), work.column, work.edition)
    return direction_of(plain, name, shear.phi_shear())


def _names(column: ColumnLike, acting: Sequence[ForceLike]) -> list[str]:
    if column.b is None:
        return [""]
    acts = {"x": any(force.Vx for force in acting), "y": any(force.Vy for force in acting)}
    return [name for name, any_force in acts.items() if any_force]


def _demands(direction: Direction[float], edition: Edition, acting: Sequence[ForceLike]) -> list[_Demand]:
    demand, arguments = direction.demand, direction.demand.arguments
    found = []
    for force in acting:
        V_u = demand(**_plain(force, arguments))
        rule = direction.concrete(edition, force.P)
        V_c = rule(**_those(rule, {**direction.values, "N_u": force.P}))
        found.append(_demand(direction, force, V_u, V_c))
    return found


# The values of a direction and V_c have been through the gate of a formula: here the bare functions serve, for speed.
def _demand(direction: Direction[float], force: ForceLike, V_u: float, V_c: float) -> _Demand:
    values = direction.values
    phi, size = values["phi"], {symbol: values[symbol] for symbol in ("f_c", "b_w", "d")}
    phi_V_n = shear.design_shear_strength.function(phi=phi, V_c=V_c, V_s=values["V_s"])
    V_u_max = shear.section_maximum.function(phi=phi, V_c=V_c, **size)
    V_s_req = shear.steel_required.function(V_u=V_u, phi=phi, V_c=V_c)
    half = shear.shear_reinforcement_threshold.function(phi=phi, V_c=V_c)
    excess = min(V_u - half, 0.0) if half > 0 and passes(V_u / half) else V_u - half
    return _Demand(force, V_u / phi_V_n, V_u / V_u_max, V_s_req, excess)


def _suffix(name: str) -> str:
    return f", {name}" if name else ""


def _along(name: str) -> str:
    return f" along {name}" if name else ""


def _checks(sheet: _Shear[T], name: str, demands: Sequence[_Demand]) -> Iterator[CheckResult]:
    sheet.work.pad.heading(f"Shear{_along(name)}")
    sheet.direction(name)
    yield _strength(sheet, name, demands)
    yield _section(sheet, name, demands)
    # What ties have to provide and whether they are required at all go by the same combination: the largest V_s_req,
    # and where that is zero everywhere the largest excess.
    most = max(demands, key=lambda demand: (demand.V_s_req, demand.excess))
    load = sheet.load(name, most.force)
    sheet.rule(sheet.direction(name), shear.shear_reinforcement_threshold, V_c=load.V_c)
    if most.excess > 0:
        sheet.work.pad.reason(f"{most.force.combination}: {_REQUIRED}")
        yield _least_area(sheet, name, most)
        yield _spacing(sheet, name, most)
    else:
        sheet.work.pad.reason(_NOT_REQUIRED)
        for check, rule in (
            ("minimum shear reinforcement", shear.shear_reinforcement_minimum),
            ("spacing of shear reinforcement", shear.shear_spacing),
        ):
            combination = str(most.force.combination)
            clause = sheet.work.clause(rule)
            yield sheet.work.result(f"{check}{_suffix(name)}", clause, 0.0, {}, (_NOT_REQUIRED,), combination)


def _strength(sheet: _Shear[T], name: str, demands: Sequence[_Demand]) -> CheckResult:
    work, direction = sheet.work, sheet.direction(name)
    most = max(demands, key=lambda demand: demand.ratio)
    others = "the only combination with shear" if len(demands) == 1 else f"of {len(demands)} combinations with shear"
    work.pad.reason(f"Governing: {most.force.combination}, {others}.")
    load = sheet.load(name, most.force)
    phi_V_n, clause = sheet.design(name, most.force), work.clause(shear.design_shear_strength)
    ratio = work.verify(f"shear{_along(name)}", load.V_u, phi_V_n, clause)
    values = {"V_u": load.V_u, "V_c": load.V_c, "V_s": direction.values["V_s"], "phi_V_n": phi_V_n}
    return work.result(f"shear{_suffix(name)}", clause, ratio, values, (), str(most.force.combination))


def _section(sheet: _Shear[T], name: str, demands: Sequence[_Demand]) -> CheckResult:
    work, direction = sheet.work, sheet.direction(name)
    most = max(demands, key=lambda demand: demand.of_section)
    load = sheet.load(name, most.force)
    limit, clause = sheet.rule(direction, shear.section_maximum, V_c=load.V_c), work.clause(shear.section_maximum)
    ratio = work.verify(f"dimensions of the section for shear{_along(name)}", load.V_u, limit, clause)
    values = {"V_u": load.V_u, "V_u_max": limit}
    return work.result(f"section in shear{_suffix(name)}", clause, ratio, values, (), str(most.force.combination))


def _least_area(sheet: _Shear[T], name: str, most: _Demand) -> CheckResult:
    work, values = sheet.work, sheet.direction(name).values
    A_v, least, clause = values["A_v"], values["A_v_min"], work.clause(shear.shear_reinforcement_minimum)
    ratio = work.verify(f"least shear reinforcement{_along(name)}", least, A_v, clause)
    shown, check = {"A_v": A_v, "A_v_min": least}, f"minimum shear reinforcement{_suffix(name)}"
    return work.result(check, clause, ratio, shown, (), str(most.force.combination))


def _spacing(sheet: _Shear[T], name: str, most: _Demand) -> CheckResult:
    work, direction, load = sheet.work, sheet.direction(name), sheet.load(name, most.force)
    required = sheet.rule(direction, shear.steel_required, V_u=load.V_u, V_c=load.V_c)
    s_max, clause = sheet.rule(direction, shear.shear_spacing, V_s_req=required), work.clause(shear.shear_spacing)
    s = direction.values["s"]
    ratio = work.verify(f"spacing of shear reinforcement{_along(name)}", s, s_max, clause)
    values, check = {"s": s, "s_max": s_max, "V_s_req": required}, f"spacing of shear reinforcement{_suffix(name)}"
    return work.result(check, clause, ratio, values, (), str(most.force.combination))


def _biaxial(
    sheet: _Shear[T], along_x: Sequence[_Demand], along_y: Sequence[_Demand], rule: Formula
) -> Iterator[CheckResult]:
    pairs = [pair for pair in zip(along_x, along_y, strict=True) if pair[0].ratio > 0 and pair[1].ratio > 0]
    if not pairs:
        return
    work = sheet.work
    clause = work.clause(rule)
    work.pad.heading("Shear along x and along y together")
    high = [pair for pair in pairs if not passes(2 * min(pair[0].ratio, pair[1].ratio))]
    if not high:
        work.pad.reason(_APART)
        yield work.result("biaxial shear", clause, 0.0, {}, (_APART,))
        return
    force = max(high, key=lambda pair: pair[0].ratio + pair[1].ratio)[0].force
    work.pad.reason(f"Governing: {force.combination}; both ratios exceed one half.")
    own = {f"phi_V_n{name}": sheet.design(name, force) for name in ("x", "y")}
    own |= sheet.force_values(force, ("V_ux", "V_uy"))
    r_V, most = work.work(Choice(rule), **own), work.pad.work(shear.biaxial_shear_maximum)
    ratio = work.verify("shear along x and along y together", r_V, most, clause)
    yield work.result("biaxial shear", clause, ratio, {"r_V": r_V, "r_V_max": most}, (), str(force.combination))
