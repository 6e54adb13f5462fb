"""The checks of one column: axial force with bending, slenderness, shear, its bars, its ties or spiral.

Each check is a procedure on a pad: the same steps serve the checks in bulk and the printed sheet. In bulk every
combination is looked through; a sheet works the governing one of each check.
"""

from __future__ import annotations

from collections.abc import Iterable, Sequence
from dataclasses import dataclass
from functools import cached_property
from typing import Generic, TypeVar

from calcpack.aci318 import stiffness
from calcpack.aci318.editions import Edition
from calcpack.members.column_axial import axial_check
from calcpack.members.column_bars import bar_checks
from calcpack.members.column_forces import ForceValues
from calcpack.members.column_interaction import bending_check
from calcpack.members.column_like import ColumnLike, ForceLike, StoryLike
from calcpack.members.column_problems import refuse_problems
from calcpack.members.column_rules import ColumnWorking
from calcpack.members.column_shear import shear_checks
from calcpack.members.column_slender_bending import wanted
from calcpack.members.column_slender_frame import story_of
from calcpack.members.column_slenderness import Slenderness, slenderness_checks
from calcpack.members.column_special import special_checks, special_owed
from calcpack.members.column_ties import LATERAL_SUPPORT, transverse_checks
from calcpack.members.interaction import Interaction, LoadPoint, end_points
from calcpack.members.pad import FloatPad, Pad
from calcpack.members.results import CheckResult

__all__ = ["Context", "check", "owed", "undecided", "work_column"]

T = TypeVar("T")
_FLOATS = FloatPad()
_STIFFNESS = {"a": stiffness.stiffness_gross, "b": stiffness.stiffness_bars}


@dataclass(frozen=True)
class Context:
    """What the checks of a column need beside its row and its forces.

    Attributes
    ----------
    edition : of ACI 318
    stories : of sway frames
    stiffness : (EI)_eff by 6.6.4.4.4 (a) or (b)
    """

    edition: Edition
    stories: Sequence[StoryLike] = ()
    stiffness: str = "a"


def check(column: ColumnLike, forces: Iterable[ForceLike], context: Context) -> list[CheckResult]:
    """Check one column under every combination.

    Raises
    ------
    RangeError : everything that is wrong with the column, at once
    """
    return _Checks(_FLOATS, column, forces, context).results(evidence=False)


def work_column(pad: Pad[T], column: ColumnLike, forces: Iterable[ForceLike], context: Context) -> list[CheckResult]:
    """Work and verify every check of one column on a pad, each in its governing combination.

    Raises
    ------
    RangeError : everything that is wrong with the column, at once
    """
    return _Checks(pad, column, forces, context).results(evidence=True)


class _Checks(Generic[T]):
    """The checks of one column on one pad."""

    def __init__(self, pad: Pad[T], column: ColumnLike, forces: Iterable[ForceLike], context: Context) -> None:
        refuse_problems(column, context.edition)
        self.column, self.context = column, context
        self.forces = list(forces)
        self.factored = [force for force in self.forces if force.combination is not None]
        self.work = ColumnWorking(pad, column, context.edition)
        self.values = ForceValues(self.work)
        rule = _STIFFNESS[context.stiffness]
        self.slender = Slenderness(self.work, rule, lambda force: self.values(force, wanted(column, force)))

    def results(self, evidence: bool) -> list[CheckResult]:
        """Every check, in the order of a sheet, that of axial force with bending first."""
        work, column = self.work, self.column
        self._givens()
        slender = slenderness_checks(work, self.forces, self.context.stories, self.slender)
        bending = bending_check(work, self.interaction, self.slender, self.factored, self.context.stories, evidence)
        work.pad.heading("Axial strength")
        axial = axial_check(work, self.forces, self.values)
        work.pad.heading("Longitudinal bars")
        bars = list(bar_checks(work))
        work.pad.heading("Spiral" if column.ties.kind == "spiral" else "Ties")
        transverse = list(transverse_checks(work))
        shear = shear_checks(work, self.factored, self.values)
        special = special_checks(work, self.factored, self.values)
        return [bending, *slender, axial, *bars, *transverse, *shear, *special]

    def _givens(self) -> None:
        """A sheet opens with what the schedule and the standards state."""
        self.work.state("A_g", "A_st", "phi_P_n_max", "c_cover", "d_b", "d_bt", "s", "beta_1", "eps_ty")
        if self.column.aggregate is not None:
            self.work.state("d_agg")
        if self.column.ties.kind == "spiral":
            self.work.state("rho_s", "rho_s_min")
        names = dict.fromkeys(str(force.combination) for force in self.factored)
        if names:
            self.work.pad.reason(f"Combinations considered, {len(names)}: {'; '.join(names)}.")

    @cached_property
    def interaction(self) -> Interaction:
        """Every load point of every combination against the design surface; second-order effects included."""
        if self.column.l_u is None:
            return Interaction(self.column, self.context.edition, list(end_points(self.factored)))
        bulk = Slenderness(
            ColumnWorking(_FLOATS, self.column, self.context.edition), _STIFFNESS[self.context.stiffness]
        )
        points = [
            LoadPoint(number, place, force.combination or "", point.P, point.Mx, point.My)
            for number, force in enumerate(self.factored)
            for place, point in enumerate(bulk.magnified(force, self._story(force)).points)
        ]
        return Interaction(self.column, self.context.edition, points)

    def _story(self, force: ForceLike) -> StoryLike | None:
        return story_of(self.column, force, self.context.stories)


def owed(column: ColumnLike, forces: Iterable[ForceLike]) -> list[str]:
    """The checks that the column owes and that are not covered here, for the list of open items."""
    names = ["torsion"] if any(force.T for force in forces) else []
    return [*names, *(special_owed() if column.seismic == "special" else [])]


def undecided(results: Iterable[CheckResult]) -> list[str]:
    """What a schedule does not say that a check needs, for the list of open items."""
    return [
        f"{one.check}: {note} State legs_x and legs_y."
        for one in results
        if one.check == LATERAL_SUPPORT and not one.verdict
        for note in one.notes
    ]
