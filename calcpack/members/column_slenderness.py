"""Second-order effects in a column: whether slenderness counts about each axis, and the magnified moments.

A `Slenderness` works one column on one pad; what does not depend on the load is worked once. `slenderness_checks` looks
through every combination and works the governing ones.
"""

from __future__ import annotations

import math
from collections.abc import Iterable, Iterator, Mapping, Sequence
from dataclasses import dataclass
from typing import Generic, TypeVar

from calcpack.aci318 import slenderness, stiffness
from calcpack.aci318.editions import Edition
from calcpack.errors import Problem
from calcpack.formula import Formula
from calcpack.members.column_loads import work_forces
from calcpack.members.column_rules import ColumnWorking
from calcpack.members.column_section import ColumnLike, ForceLike, StoryLike
from calcpack.members.column_slender_axis import NO_DENSITY, Axis, restraint, stated_factor
from calcpack.members.column_slender_bending import Bent, Case, Shared, States, bend, wanted
from calcpack.members.column_slender_frame import story_of
from calcpack.members.pad import FloatPad
from calcpack.members.results import CheckResult

__all__ = ["Magnified", "Point", "Slenderness", "on_sheet", "slender_problems", "slenderness_checks", "story_of"]

T = TypeVar("T")
_SHOWN = ("k", "r", "slenderness", "slenderness_max", "beta_dns", "P_c", "C_m", "delta_ns", "M_2_min", "M_c", "M_c_max")


@dataclass(frozen=True)
class Point(Generic[T]):
    """A load point for the check of the section."""

    P: T
    Mx: T
    My: T


@dataclass(frozen=True)
class Magnified(Generic[T]):
    """A force with its moments magnified.

    Attributes
    ----------
    points : what the section has to carry; none where the column or its story buckles, so that no magnifier exists
    stability : the largest P_u over 0.75 P_c, or that of a story that buckles; None where slenderness is neglected
    second_order : the largest moment over 1.4 times the first-order one; None where it is neglected or buckles
    about : bending about x and about y
    """

    points: tuple[Point[T], ...]
    stability: float | None = None
    second_order: float | None = None
    about: tuple[Bent[T], ...] = ()


class Slenderness(Generic[T]):
    """The slenderness of one column, on one pad.

    Parameters
    ----------
    rule : the equation of the effective stiffness, `stiffness.stiffness_gross` or `stiffness.stiffness_bars`
    states : gives the values of a force where they are worked, such as those of a combination; else they are stated
    """

    def __init__(
        self, work: ColumnWorking[T], rule: Formula = stiffness.stiffness_gross, states: States[T] | None = None
    ) -> None:
        self.work = work
        self.shared = Shared(work, states)
        self.axes = Axis(work, "x", rule), Axis(work, "y", rule)
        self._done: dict[tuple[int, int], tuple[ForceLike, StoryLike | None, Magnified[T]]] = {}

    @property
    def notes(self) -> tuple[str, ...]:
        """What was assumed so far."""
        texts = self.shared.notes.texts
        return (NO_DENSITY, *texts) if self.axes[0].light else tuple(texts)

    def magnified(self, force: ForceLike, story: StoryLike | None = None) -> Magnified[T]:
        """The force with its moments magnified where slenderness counts; worked once for each force and story.

        Parameters
        ----------
        story : the row of the column's story for the combination, in sway frames

        Raises
        ------
        RangeError : a sway frame of which k, or a magnifier, is not known
        """
        key = id(force), id(story)
        if key not in self._done:
            self._done[key] = force, story, self._magnify(Case(self.shared, force, story))
        return self._done[key][2]

    def _magnify(self, case: Case[T]) -> Magnified[T]:
        if self.work.column.l_u is None:
            return Magnified(_at_ends(case.P_u, case.ends["x"], case.ends["y"]))
        x, y = bend(self.axes[0], case), bend(self.axes[1], case)
        stories = [self._over(*one.story) for one in (x, y) if one.story is not None]
        stability = max([one.stability for one in (x, y) if one.stability is not None] + stories, default=None)
        if stability is not None and stability >= 1:
            return Magnified((), stability, None, (x, y))
        second_order = max((one.second_order for one in (x, y) if one.second_order is not None), default=None)
        return Magnified(self._points(case.P_u, x, y), stability, second_order, (x, y))

    def _over(self, demand: T, capacity: T) -> float:
        return self.work.pad.number(demand) / self.work.pad.number(capacity)

    def _points(self, P_u: T, x: Bent[T], y: Bent[T]) -> tuple[Point[T], ...]:
        """The least moments act about one axis at a time, 6.6.4.5.4."""
        if x.moment is None and y.moment is None:
            return _at_ends(P_u, x.ends, y.ends)
        if x.least is None and y.least is None:
            return (Point(P_u, self._signed(x, x.moment), self._signed(y, y.moment)),)
        if x.least is None or y.least is None:
            # A section may be weaker without the least moment than with it, as a circle of few bars.
            return tuple(
                Point(P_u, self._signed(x, Mx), self._signed(y, My)) for Mx, My in self._with_and_without(x, y)
            )
        self.work.pad.reason("The least moments act about one axis at a time: two load points.")
        return (
            Point(P_u, self._signed(x, x.least), self._signed(y, y.own)),
            Point(P_u, self._signed(x, x.own), self._signed(y, y.least)),
        )

    def _with_and_without(self, x: Bent[T], y: Bent[T]) -> tuple[tuple[T | None, T | None], ...]:
        """The least moment of one axis, and that axis by its own moments; the other axis as it is."""
        if x.least is None:
            return (x.moment, y.least), (x.moment, y.own)
        return (x.least, y.moment), (x.own, y.moment)

    def _signed(self, bent: Bent[T], moment: T | None) -> T:
        """A moment with the sign of the larger end moment; that moment itself where none is magnified."""
        number = self.work.pad.number
        larger = max(bent.ends, key=lambda end: abs(number(end)))
        if moment is None:
            return larger
        return self.work.pad.work(slenderness.moment_reversed, M_c=moment) if number(larger) < 0 else moment


def _at_ends(P_u: T, x: tuple[T, T], y: tuple[T, T]) -> tuple[Point[T], ...]:
    bottom, top = (Point(P_u, Mx, My) for Mx, My in zip(x, y, strict=True))
    # A moment that the table gives once is the same value at both ends.
    return (bottom,) if x[0] is x[1] and y[0] is y[1] else (bottom, top)


def on_sheet(work: ColumnWorking[T], rule: Formula = stiffness.stiffness_gross) -> Slenderness[T]:
    """The same for a sheet: the forces of a combination that was formed are worked from its loads."""

    def states(force: ForceLike) -> Mapping[str, T]:
        return work_forces(work.pad, work.column, force, wanted(work.column, force))

    return Slenderness(work, rule, states)


@dataclass(frozen=True)
class _Seen:
    """A force as it came out in bulk."""

    force: ForceLike
    story: StoryLike | None
    found: Magnified[float]


def slenderness_checks(
    work: ColumnWorking[T],
    forces: Iterable[ForceLike],
    stories: Sequence[StoryLike] = (),
    slender: Slenderness[T] | None = None,
) -> list[CheckResult]:
    """Stability and second-order moment over all combinations; the governing ones are worked on the pad.

    Parameters
    ----------
    slender : the column on the same pad, where other checks share it

    Returns
    -------
    ``stability`` and ``second-order moment``; ``slenderness`` alone where it is neglected in every combination; nothing
    where the schedule gives no length

    Raises
    ------
    RangeError : a sway frame of which k, or a magnifier, is not known
    """
    if work.column.l_u is None:
        return []
    slender = slender or on_sheet(work)
    bulk = Slenderness(ColumnWorking(FloatPad(), work.column, work.edition), slender.axes[0].rule)
    seen = []
    for force in forces:
        if force.combination is not None:
            story = story_of(work.column, force, stories)
            seen.append(_Seen(force, story, bulk.magnified(force, story)))
    work.pad.heading("Slenderness")
    checks = _Checks(work, slender, seen)
    return checks.magnified() if any(one.found.stability is not None for one in seen) else [checks.neglected()]


class _Checks(Generic[T]):
    """The governing combinations on the pad."""

    def __init__(self, work: ColumnWorking[T], slender: Slenderness[T], seen: Sequence[_Seen]) -> None:
        self.work, self.slender, self.seen = work, slender, seen

    def on_pad(self, one: _Seen, why: str) -> Magnified[T]:
        """Work the governing combination."""
        count = len(self.seen)
        of = "the only combination listed" if count == 1 else f"{why} of {count} combinations"
        self.work.pad.reason(f"Governing: {one.force.combination}, {of}.")
        return self.slender.magnified(one.force, one.story)

    def neglected(self) -> CheckResult:
        """Slenderness within its limit in every combination."""
        clause = self.work.clause(slenderness.slenderness_ratio)
        one = max(self.seen, key=_use, default=None)
        if one is None or _use(one) == 0:
            text = "No combination compresses the column" if one else "No forces listed for this column"
            notes = self.work.note(f"{text}: its slenderness is not called on.")
            return self.work.result("slenderness", clause, 0.0 if one else None, {}, notes)
        found = self.on_pad(one, "the largest k l_u/r over its limit")
        bent = max(found.about, key=lambda bent: bent.use or 0.0)
        what = f"slenderness neglected, bending about {bent.axis}"
        ratio = self.work.verify(what, bent.values["slenderness"], bent.values["slenderness_max"], clause)
        return self._result("slenderness", clause, ratio, bent, one)

    def magnified(self) -> list[CheckResult]:
        """Both checks, where slenderness counts in a combination."""
        return [self._stability(), self._second_order()]

    def _stability(self) -> CheckResult:
        one = max(self.seen, key=lambda one: one.found.stability or 0.0)
        found = self.on_pad(one, "the largest P_u over 0.75 P_c")
        story = next((bent.story for bent in found.about if bent.story is not None), None)
        bent = max(found.about, key=lambda bent: bent.stability or 0.0)
        if story is not None:
            clause = self.work.clause(slenderness.magnifier_sway_by_loads)
            ratio = self.work.verify("loads of the story within 0.75 of its critical loads", *story, clause)
        else:
            clause = self.work.clause(slenderness.magnifier_nonsway)
            P_u, capacity = bent.values["P_u"], bent.values["P_c_reduced"]
            what = f"axial force within 0.75 of the critical load, bending about {bent.axis}"
            ratio = self.work.verify(what, P_u, capacity, clause)
        return self._result("stability", clause, ratio, bent, one, met=ratio < 1)

    def _second_order(self) -> CheckResult:
        clause = self.work.clause(slenderness.second_order_limit)
        one = max(self.seen, key=lambda one: one.found.second_order or 0.0)
        buckling = next((one for one in self.seen if (one.found.stability or 0.0) >= 1), None)
        if buckling is not None:
            notes = self.work.note(f"No magnifier exists in {buckling.force.combination}: see stability.")
            combination = buckling.force.combination or ""
            return self.work.result("second-order moment", clause, None, {}, notes, combination, met=False)
        found = self.on_pad(one, "the largest moment over 1.4 times the first-order one")
        bent = max(found.about, key=lambda bent: bent.second_order or 0.0)
        M_c, limit = bent.values["M_c"], bent.values["M_c_max"]
        what = f"moment with second-order effects within 1.4 of the first-order one, bending about {bent.axis}"
        ratio = self.work.verify(what, M_c, limit, clause)
        return self._result("second-order moment", clause, ratio, bent, one)

    def _result(
        self, check: str, clause: str, ratio: float, bent: Bent[T], one: _Seen, met: bool = True
    ) -> CheckResult:
        values = {symbol: bent.values[symbol] for symbol in _SHOWN if symbol in bent.values}
        name = one.force.combination or ""
        return self.work.result(check, clause, ratio, values, self.slender.notes, name, met)


def _use(one: _Seen) -> float:
    return max((bent.use or 0.0 for bent in one.found.about), default=0.0)


def slender_problems(column: ColumnLike, edition: Edition) -> Iterator[Problem]:
    """What is wrong with what a row states of its slenderness."""
    for axis in "xy":
        yield from _axis_problems(column, axis, edition)
    if column.beta_dns is not None and not 0 <= column.beta_dns <= 1:
        yield Problem(f"beta_dns = {column.beta_dns:,g}", f"0 to 1 ({edition.name} 6.6.4.4.4)")
    if column.delta_s is None:
        return
    if not 1 <= column.delta_s < math.inf:
        yield Problem(f"delta_s = {column.delta_s:,g}", f"1.0 and up ({edition.name} 6.6.4.6.2)")
    if column.frame != "sway":
        given = f"delta_s = {column.delta_s:,g} in a frame that is {column.frame or 'not stated'}"
        yield Problem(given, "delta_s magnifies moments of a sway frame", "set frame to sway, or leave delta_s empty")


def _axis_problems(column: ColumnLike, axis: str, edition: Edition) -> Iterator[Problem]:
    k, ends = stated_factor(column, axis), dict(zip(("bottom", "top"), restraint(column, axis), strict=True))
    sway = column.frame == "sway"
    for end, psi in ends.items():
        if psi is not None and not 0 <= psi < math.inf:
            allowed = "zero or more: stiffness of the columns over that of the beams"
            yield Problem(
                f"psi_{axis}_{end} = {psi:,g}", allowed, "0 is fixed, a hinge has a large one, 10 in practice"
            )
    stated = [end for end, psi in ends.items() if psi is not None]
    if len(stated) == 1:
        allowed = f"both psi_{axis}_bottom and psi_{axis}_top, or none"
        yield Problem(f"psi_{axis}_{stated[0]} alone", allowed, "state the other end")
    if k is not None and not (1 if sway else 1e-9) <= k < math.inf:
        allowed = f"1.0 and up in a sway frame ({edition.name} 6.6.4.4.3)" if sway else "a factor above zero"
        yield Problem(f"k_{axis} = {k:,g}", allowed)
    if sway and column.l_u is not None and k is None and not stated:
        allowed = f"k_{axis}, or psi_{axis}_bottom and psi_{axis}_top ({edition.name} 6.6.4.4.3)"
        yield Problem(f"k_{axis} is empty in a sway frame", allowed, "state one of them")
