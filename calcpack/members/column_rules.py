"""Which equation works a value of a column, what its schedule states, and the values worked so far."""

from __future__ import annotations

from collections.abc import Callable, Iterator, Mapping
from dataclasses import dataclass
from functools import cached_property
from math import isclose
from typing import Generic, TypeVar

from calcpack.aci318 import columns, compatibility, stress_block, ties
from calcpack.aci318.bars import bar
from calcpack.aci318.editions import Edition
from calcpack.aci318.standards import ACI_318_14
from calcpack.formula import Formula
from calcpack.members.column_section import ColumnLike, section_source
from calcpack.members.pad import Pad
from calcpack.members.results import CheckResult, measured, verdict_of
from calcpack.members.sources import NOMINAL
from calcpack.members.working import Choice, Stated, Working
from calcpack.symbols import lookup

__all__ = ["CENTRE_LINE", "NO_AGGREGATE", "NO_F_YT", "ColumnWorking", "Face"]

T = TypeVar("T")
Rule = Callable[[ColumnLike, Edition], Choice]
NO_AGGREGATE = "Aggregate size not stated: 4/3 d_agg is not checked."
CENTRE_LINE = "A turn is measured along its centre line, pi (D_c - d_bt)."
NO_F_YT = "f_yt is taken as f_y: the schedule states no other."


@dataclass(frozen=True)
class Face(Generic[T]):
    """Bars along a face, or around a circle: their number, their clear spacing, and the rule of their spacing."""

    name: str
    n_face: int
    s_clear: T
    pitch: Formula
    own: Mapping[str, T]


def _always(formula: Formula, reason: str = "") -> Rule:
    return lambda _column, _edition: Choice(formula, reason)


def _by_shape(circular: Formula, rectangular: Formula) -> Rule:
    return lambda column, _edition: Choice(circular if column.b is None else rectangular)


def _by_confinement(spiral: Formula, tied: Formula) -> Rule:
    return lambda column, _edition: Choice(spiral if column.ties.kind == "spiral" else tied)


def _axial(column: ColumnLike, _edition: Edition) -> Choice:
    return Choice(columns.axial_strength_high_grade if column.f_y > 80_000 else columns.axial_strength)


def _yield_strain(column: ColumnLike, edition: Edition) -> Choice:
    # A stress that was converted from another unit may miss the grade by its last digits.
    permitted = edition.standard == ACI_318_14 and isclose(column.f_y, 60_000.0, rel_tol=1e-9)
    return Choice(compatibility.yield_strain_grade_60 if permitted else compatibility.yield_strain)


def _counted_yield(_column: ColumnLike, edition: Edition) -> Choice:
    return Choice(columns.yield_in_axial_strength, f"Bars above Grade 80 ({edition.name} 22.4.2.1).")


_RULES: Mapping[str, Rule] = {
    "A_g": _by_shape(columns.area_circular, columns.area_rectangular),
    "A_st": _always(columns.area_of_bars),
    "P_o": _axial,
    "f_y_axial": _counted_yield,
    "P_n_max": _by_confinement(columns.axial_strength_maximum_spiral, columns.axial_strength_maximum_tied),
    "phi": _by_confinement(columns.phi_spiral, columns.phi_tied),
    "phi_P_n_max": _always(columns.design_axial_strength),
    "rho_g": _always(columns.reinforcement_ratio),
    "rho_g_min": _always(columns.reinforcement_ratio_minimum),
    "rho_g_max": _always(columns.reinforcement_ratio_maximum),
    "n_min": _by_confinement(columns.bars_minimum_spiral, columns.bars_minimum_tied),
    "D_s": _always(columns.bar_circle),
    "x_o": _always(columns.outermost_bar_x),
    "y_o": _always(columns.outermost_bar_y),
    "beta_1": _always(stress_block.beta_1),
    "eps_ty": _yield_strain,
    "h_min": _by_shape(columns.least_dimension_circular, columns.least_dimension_rectangular),
    "d_bt_min": _by_confinement(ties.spiral_size, ties.tie_size),
    "s_max": _always(ties.tie_spacing),
    "x_clear_max": _always(ties.unsupported_bar_maximum),
    "s_clear_max": _always(ties.spiral_clear_maximum),
    "D_c": _always(ties.core_diameter),
    "A_ch": _always(ties.core_area),
    "rho_s": _always(ties.spiral_ratio, CENTRE_LINE),
    "rho_s_min": _always(ties.spiral_ratio_minimum),
}

# Meaning of what the schedule states; a column of the table, or a property of its bars or ties.
_SCHEDULED: Mapping[str, tuple[Callable[[ColumnLike], float | None], str]] = {
    "b": (lambda column: column.b, "width of column along x"),
    "c_cover": (lambda column: column.cover, "clear cover to ties or spiral"),
    "n_bars": (lambda column: column.bars.count, "number of longitudinal bars"),
    "f_c": (lambda column: column.f_c, "specified compressive strength of concrete"),
    "f_y": (lambda column: column.f_y, "specified yield strength of longitudinal bars"),
    "d_agg": (lambda column: column.aggregate, "nominal maximum size of coarse aggregate"),
}


@dataclass(frozen=True)
class _ColumnRules:
    """The rules of a column in an edition, and what its row states."""

    column: ColumnLike
    edition: Edition

    def choice(self, symbol: str) -> Choice | None:
        """The formula that serves a symbol for this column; None where it is stated."""
        rule = _RULES.get(symbol)
        return rule(self.column, self.edition) if rule else None

    @cached_property
    def source(self) -> str:
        """Where the row comes from, put together once."""
        return section_source(self.column)

    def stated(self, symbol: str) -> Stated:
        """What the row, its defaults or the bar standard state."""
        column, spiral = self.column, self.column.ties.kind == "spiral"
        if symbol in _SCHEDULED:
            read, means = _SCHEDULED[symbol]
            value = read(column)
            if value is None:
                raise KeyError(f"{symbol} is not stated for column {column.mark}")
            return Stated(value, means, self.source)
        match symbol:
            case "h":
                means = "diameter of column" if column.b is None else "depth of column along y"
                return Stated(column.h, means, self.source)
            case "s":
                means = "pitch of spiral" if spiral else "centre-to-centre spacing of ties"
                return Stated(column.ties.spacing, means, self.source)
            case "E_s":
                return Stated(29e6, "modulus of elasticity of reinforcement", f"{self.edition.name} 20.2.2.2")
            case "eps_cu":
                return Stated(0.003, lookup(symbol).meaning, f"{self.edition.name} 22.2.2.1")
            case "f_yt":
                return self.yield_of_spiral()
        return self.nominal(symbol)

    def yield_of_spiral(self) -> Stated:
        """f_yt, or f_y where the schedule leaves it out."""
        means = "specified yield strength of spiral"
        if self.column.f_yt is None:
            return Stated(self.column.f_y, means, "taken as f_y, default of the schedule")
        return Stated(self.column.f_yt, means, self.source)

    def nominal(self, symbol: str) -> Stated:
        """A nominal dimension of the bars or of the ties."""
        longitudinal, transverse = self.column.bars.size, self.column.ties.size
        word = "spiral" if self.column.ties.kind == "spiral" else "tie"
        stated = {
            "d_b": (bar(longitudinal).d_b, f"nominal diameter of bar, #{longitudinal}"),
            "A_b": (bar(longitudinal).A_b, f"nominal area of one bar, #{longitudinal}"),
            "d_bt": (bar(transverse).d_b, f"nominal diameter of {word}, #{transverse}"),
            "A_sp": (bar(transverse).A_b, f"nominal area of {word}, #{transverse}"),
        }
        return Stated(*stated[symbol], NOMINAL)


class ColumnWorking(Working[T]):
    """One column being worked on one pad."""

    def __init__(self, pad: Pad[T], column: ColumnLike, edition: Edition) -> None:
        super().__init__(pad, _ColumnRules(column, edition))
        self.column = column
        self.edition = edition

    def clause(self, rule: Formula) -> str:
        """The number of a rule's clause in the edition of the job."""
        return rule.clause(self.edition.standard).number

    def verify(self, what: str, demand: T, capacity: T, clause: str) -> float:
        """Verify two values of this column."""
        return self.pad.verify(f"{self.column.mark}: {what}", demand, capacity, clause)

    def note(self, text: str) -> tuple[str, ...]:
        """Say on the pad what goes into the notes of the result as well."""
        self.pad.reason(text)
        return (text,)

    def result(
        self,
        check: str,
        clause: str,
        ratio: float | None,
        values: Mapping[str, T],
        notes: tuple[str, ...] = (),
        combination: str = "",
        met: bool = True,
    ) -> CheckResult:
        """The result of a check, with the numbers behind its values."""
        numbers = {symbol: measured(symbol, self.pad.number(value)) for symbol, value in values.items()}
        verdict = verdict_of(ratio, met)
        return CheckResult(self.column.mark, check, clause, combination, ratio, verdict, numbers, notes)

    @cached_property
    def faces(self) -> tuple[Face[T], ...]:
        """The faces of a rectangular column, or the circle of a circular one, with the clear spacing of their bars."""
        n_x, n_y = self.column.bars.n_x, self.column.bars.n_y
        if self.column.b is None or n_x is None or n_y is None:
            s_clear = self.work(Choice(columns.bar_spacing_circular))
            return (Face("circle", self.column.bars.count, s_clear, columns.bar_pitch_circular, {}),)
        return tuple(self._sides(n_x, n_y))

    def _sides(self, n_x: int, n_y: int) -> Iterator[Face[T]]:
        alike = self.column.b == self.column.h
        if n_x == n_y:
            both = self._number_along(n_x, "each face")
            yield self._along_x("along x and along y" if alike else "along x", n_x, both)
            if not alike:
                yield self._along_y(n_y, both)
        else:
            yield self._along_x("along x", n_x, self._number_along(n_x, "each face parallel to x"))
            yield self._along_y(n_y, self._number_along(n_y, "each face parallel to y"))

    def _number_along(self, n_face: int, where: str) -> T:
        means = f"number of bars along {where}, corners included"
        return self.pad.given("n_face", float(n_face), means, section_source(self.column))

    def _along_x(self, name: str, count: int, n_face: T) -> Face[T]:
        self.pad.reason(f"Bars {name}.")
        s_clear = self.work(Choice(columns.bar_spacing_face), n_face=n_face)
        return Face(name, count, s_clear, columns.bar_pitch_face, {"n_face": n_face})

    def _along_y(self, count: int, n_face: T) -> Face[T]:
        self.pad.reason("Bars along y.")
        s_clear = self.work(Choice(columns.bar_spacing_side), n_face=n_face)
        return Face("along y", count, s_clear, columns.bar_pitch_side, {"n_face": n_face})
