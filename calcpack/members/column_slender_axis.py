"""What of the slenderness of a column does not depend on its loads: about one axis, worked once on a pad."""

from __future__ import annotations

from dataclasses import dataclass
from functools import cached_property
from typing import Generic, TypeVar

from calcpack.aci318 import columns, slenderness, stiffness
from calcpack.aci318.effective_length import effective_length_nonsway, effective_length_sway
from calcpack.errors import Problem, RangeError
from calcpack.formula import Formula
from calcpack.ledger import passes
from calcpack.members.column_rules import ColumnWorking
from calcpack.members.column_section import ColumnLike, row_of, section_source
from calcpack.members.working import Choice

__all__ = ["NO_DENSITY", "Axis", "restraint", "stated_factor"]

T = TypeVar("T")
NO_DENSITY = "Density of the lightweight concrete not stated: E_c is taken at 90 lb/ft^3, the least of 19.2.2.1(a)."
_METHOD = "root of the equation of the alignment chart"


@dataclass(frozen=True)
class _Rules:
    """The equations of bending about one axis; `row` gives the distance of the outer bars."""

    radius: Formula
    second_moment: Formula
    row: Formula
    bars: Formula
    least_moment: Formula


_ABOUT_X = _Rules(
    slenderness.radius_about_x,
    stiffness.second_moment_about_x,
    stiffness.bar_row_y,
    stiffness.bars_moment_about_x,
    slenderness.least_moment_about_x,
)
_ABOUT_Y = _Rules(
    slenderness.radius_about_y,
    stiffness.second_moment_about_y,
    stiffness.bar_row_x,
    stiffness.bars_moment_about_y,
    slenderness.least_moment_about_y,
)
_CIRCULAR = _Rules(
    slenderness.radius_circular,
    stiffness.second_moment_circular,
    columns.bar_circle,
    stiffness.bars_moment_circular,
    slenderness.least_moment_about_x,
)


def stated_factor(column: ColumnLike, axis: str) -> float | None:
    """The effective length factor that the row states for bending about an axis."""
    return column.k_x if axis == "x" else column.k_y


def restraint(column: ColumnLike, axis: str) -> tuple[float | None, float | None]:
    """Stiffness of columns over that of beams at the bottom and at the top, for bending about an axis."""
    if axis == "x":
        return column.psi_x_bottom, column.psi_x_top
    return column.psi_y_bottom, column.psi_y_top


class Axis(Generic[T]):
    """A column in bending about one axis, on one pad."""

    def __init__(self, work: ColumnWorking[T], name: str, rule: Formula) -> None:
        self.work = work
        self.name = name
        self.rule = rule
        self.light = work.column.lamb < 1
        self.rules = _CIRCULAR if work.column.b is None else _ABOUT_X if name == "x" else _ABOUT_Y

    @cached_property
    def r(self) -> T:
        """Radius of gyration."""
        return self.work.work(Choice(self.rules.radius))

    @cached_property
    def k(self) -> T:
        """Effective length factor of the column braced against sidesway."""
        stated = stated_factor(self.work.column, self.name)
        if stated is not None and self.work.column.frame != "sway":
            return self._stated(stated)
        if self._psi is not None:
            return self._from_restraint(slenderness.alignment_nonsway, *self._psi)
        clause = f"permitted where braced against sidesway, {self.work.edition.name} 6.6.4.4.3"
        return self.work.pad.given("k", 1.0, f"effective length factor, bending about {self.name}", clause)

    @cached_property
    def k_sway(self) -> T:
        """Effective length factor of the column free to sway."""
        stated = stated_factor(self.work.column, self.name)
        if stated is not None:
            return self._stated(stated)
        if self._psi is not None:
            return self._from_restraint(slenderness.alignment_sway, *self._psi)
        problem = Problem(f"k_{self.name} is empty in a sway frame", "k, or psi at both ends", "state one of them")
        raise RangeError(f"column {self.work.column.mark}", [problem], row_of(self.work.column))

    def _stated(self, k: float) -> T:
        means = f"effective length factor, bending about {self.name}"
        return self.work.pad.given("k", float(k), means, section_source(self.work.column))

    @cached_property
    def _psi(self) -> tuple[T, T] | None:
        bottom, top = restraint(self.work.column, self.name)
        if bottom is None or top is None:
            return None
        what, source = "stiffness of columns over that of beams", section_source(self.work.column)
        return (
            self.work.pad.given("psi_A", float(bottom), f"{what} at the bottom, bending about {self.name}", source),
            self.work.pad.given("psi_B", float(top), f"{what} at the top, bending about {self.name}", source),
        )

    def _from_restraint(self, equation: Formula, psi_A: T, psi_B: T) -> T:
        pad = self.work.pad
        sway = equation is slenderness.alignment_sway
        solve = effective_length_sway if sway else effective_length_nonsway
        ends = pad.number(psi_A), pad.number(psi_B)
        state = "free to sway" if sway else "braced against sidesway"
        means = f"effective length factor, bending about {self.name}, {state}"
        if not any(ends):
            return pad.given("k", solve(*ends), means, "both ends fixed, the corner of the alignment chart")
        clause = self.work.clause(equation)
        k = pad.solved("k", solve(*ends), means, _METHOD, clause, [psi_A, psi_B])
        pad.confirm([k], [pad.work(equation, psi_A=psi_A, psi_B=psi_B, k=k)])
        return k

    @cached_property
    def l_u(self) -> T:
        """Unsupported length, the same about both axes."""
        length = float(self.work.column.l_u or 0.0)
        return self._once("l_u", length, "unsupported length of column", section_source(self.work.column))

    @cached_property
    def slenderness(self) -> T:
        """k l_u/r of the column braced against sidesway."""
        return self.work.work(Choice(slenderness.slenderness_ratio), r=self.r, k=self.k, l_u=self.l_u)

    @cached_property
    def values(self) -> dict[str, T]:
        """The slenderness of the column braced against sidesway, and what it rests on."""
        return {"r": self.r, "k": self.k, "slenderness": self.slenderness}

    @cached_property
    def values_sway(self) -> dict[str, T]:
        """The slenderness of the column free to sway, its limit, and what it rests on."""
        slender = self.work.work(Choice(slenderness.slenderness_ratio), r=self.r, k=self.k_sway, l_u=self.l_u)
        limit = self.work.pad.work(slenderness.slenderness_limit_sway)
        return {"r": self.r, "k": self.k_sway, "slenderness": slender, "slenderness_max": limit}

    @cached_property
    def use_sway(self) -> float:
        """Slenderness over its limit, free to sway; said on the pad."""
        pad, values = self.work.pad, self.values_sway
        use = pad.number(values["slenderness"]) / pad.number(values["slenderness_max"])
        what = "is within" if passes(use) else "exceeds"
        then = "neglected" if passes(use) else "not neglected"
        pad.reason(f"k l_u/r {what} the limit of a sway frame: slenderness about {self.name} is {then}.")
        return use

    @cached_property
    def E_c(self) -> T:
        """Modulus of elasticity of the concrete, the same about both axes."""
        values = self.work.values
        if "E_c" not in values:
            rule = stiffness.modulus_lightweight if self.light else stiffness.modulus
            values["E_c"] = self.work.work(Choice(rule, NO_DENSITY if self.light else ""))
        return values["E_c"]

    @cached_property
    def I_g(self) -> T:
        """Second moment of the gross section."""
        return self.work.work(Choice(self.rules.second_moment))

    @cached_property
    def bars(self) -> dict[str, T]:
        """Modulus of the bars and their second moment, where the stiffness counts them."""
        if "I_se" not in self.rule.arguments:
            return {}
        E_s = self._once("E_s", 29e6, "modulus of elasticity of reinforcement", "ACI 318 20.2.2.2")
        own = {}
        if self.work.column.b is not None:
            source, n = section_source(self.work.column), self.work.column.bars
            own = {
                "n_x": self._once("n_x", float(n.n_x or 0), "number of bars along each face parallel to x", source),
                "n_y": self._once("n_y", float(n.n_y or 0), "number of bars along each face parallel to y", source),
                self.rules.row.result_name: self.work.work(Choice(self.rules.row)),
            }
        return {"E_s": E_s, "I_se": self.work.work(Choice(self.rules.bars), **own)}

    def _once(self, symbol: str, value: float, means: str, source: str) -> T:
        if symbol not in self.work.values:
            self.work.values[symbol] = self.work.pad.given(symbol, value, means, source)
        return self.work.values[symbol]

    def critical_load(self, beta_dns: T) -> T:
        """Critical load of the column braced against sidesway, with a sustained share."""
        arguments = {"E_c": self.E_c, "I_g": self.I_g, **self.bars}
        EI_eff = self.work.pad.work(self.rule, **arguments, beta_dns=beta_dns)
        return self.work.pad.work(slenderness.critical_load, EI_eff=EI_eff, k=self.k, l_u=self.l_u)

    def least_moment(self, P_u: T) -> T:
        """Least moment about the axis."""
        return self.work.work(Choice(self.rules.least_moment), P_u=P_u)
