"""One force on a slender column, in bending about one axis: neglected, or magnified."""

from __future__ import annotations

from collections.abc import Callable, Mapping
from dataclasses import dataclass, field
from functools import cached_property
from typing import Any, Generic, TypeVar

from calcpack.aci318 import slenderness
from calcpack.ledger import passes
from calcpack.members.column_rules import ColumnWorking
from calcpack.members.column_section import ColumnLike, ForceLike, StoryLike, force_source, section_source
from calcpack.members.column_slender_axis import Axis
from calcpack.members.column_slender_frame import Frame, Frames, Notes

__all__ = ["ASSUMED_BETA", "WHOLE_SWAY", "Bent", "Case", "Shared", "States", "bend", "wanted"]

T = TypeVar("T")
States = Callable[[ForceLike], Mapping[str, T]]
ASSUMED_BETA = "beta_dns is taken as 0.6, as ACI 318 R6.6.4.4.4 suggests: the schedule states no sustained share."
WHOLE_SWAY = (
    "The force table does not tell sway moments from others: delta_s magnifies all of the end moments, on the safe "
    "side where both act in one direction."
)


@dataclass(frozen=True)
class Bent(Generic[T]):
    """Bending about one axis under one force.

    Attributes
    ----------
    ends : moments at the bottom and at the top, with their sway part magnified
    use : k l_u/r over the limit up to which slenderness is neglected; None where no limit decides
    stability : P_u over 0.75 P_c; None where slenderness is neglected
    second_order : the largest moment over 1.4 times the first-order one; None also where the column buckles
    own : the larger end moment magnified, without its sign
    least : the least moment magnified, where it exceeds the larger end moment
    story : sum of P_u and 0.75 of the sum of P_c, of a story that buckles
    values : by symbol
    """

    axis: str
    ends: tuple[T, T]
    use: float | None = None
    stability: float | None = None
    second_order: float | None = None
    own: T | None = None
    least: T | None = None
    story: tuple[T, T] | None = None
    values: Mapping[str, T] = field(default_factory=dict)

    @property
    def moment(self) -> T | None:
        """The largest magnified moment, without its sign; None where nothing is magnified along the column."""
        return self.own if self.least is None else self.least


class Shared(Generic[T]):
    """What all forces on one column share, on one pad; `states` gives values of a force that are worked elsewhere."""

    def __init__(self, work: ColumnWorking[T], states: States[T] | None) -> None:
        self.work = work
        self.states = states
        self.notes = Notes(work)
        self.frames = Frames(work, self.notes)
        self.critical: dict[str, dict[str, T]] = {}

    @cached_property
    def beta_dns(self) -> T:
        """Sustained share that the row states, or that the commentary suggests."""
        stated, means = self.work.column.beta_dns, "sustained share of the factored axial force"
        if stated is not None:
            return self.work.pad.given("beta_dns", float(stated), means, section_source(self.work.column))
        self.notes.say(ASSUMED_BETA)
        return self.work.pad.given("beta_dns", 0.6, means, "assumed, ACI 318 R6.6.4.4.4")


class Case(Generic[T]):
    """One force on the pad: its values, and what bending about both axes shares."""

    def __init__(self, shared: Shared[T], force: ForceLike, story: StoryLike | None) -> None:
        self.shared, self.force, self.story = shared, force, story
        self.stated = shared.states(force) if shared.states else {}
        self.P_u = self.state("P_u", "factored axial force", force.P)
        self.ends = {
            "x": self._ends("M_ux", "factored moment about x", force.Mx, force.Mx_bottom, force.Mx_top),
            "y": self._ends("M_uy", "factored moment about y", force.My, force.My_bottom, force.My_top),
        }

    def state(self, symbol: str, means: str, value: float) -> T:
        """A value of the force: as it is worked elsewhere, else from the force table."""
        if symbol in self.stated:
            return self.stated[symbol]
        work = self.shared.work
        source = force_source(self.force, work.column)
        return work.pad.given(symbol, float(value), f"{means}, {self.force.combination}", source)

    def _ends(
        self, symbol: str, means: str, whole: float | None, bottom: float | None, top: float | None
    ) -> tuple[T, T]:
        if whole is not None:
            both = self.state(symbol, means, whole)
            return both, both
        return (
            self.state(f"{symbol}_bottom", f"{means} at the bottom", bottom or 0.0),
            self.state(f"{symbol}_top", f"{means} at the top", top or 0.0),
        )

    @cached_property
    def frame(self) -> Frame[T]:
        """How the frame behaves; asked for only where that matters."""
        return self.shared.frames.of(self.story)

    @cached_property
    def own_share(self) -> T | None:
        """Sustained share of this combination, where it tells one and the row does not."""
        sustained = getattr(self.force, "P_sustained", None)
        work = self.shared.work
        if work.column.beta_dns is not None or sustained is None:
            return None
        P_sustained = self.state("P_sustained", "factored sustained axial force", sustained)
        return work.pad.work(slenderness.sustained_ratio, P_sustained=P_sustained, P_u=self.P_u)

    def critical(self, axis: Axis[T]) -> dict[str, T]:
        """Critical load about an axis, and 0.75 of it; worked once for a column where its sustained share is one."""
        known = self.shared.critical
        if self.own_share is None and axis.name in known:
            return known[axis.name]
        beta_dns = self.shared.beta_dns if self.own_share is None else self.own_share
        P_c = axis.critical_load(beta_dns)
        reduced = self.shared.work.pad.work(slenderness.reduced_critical_load, P_c=P_c)
        found = {"beta_dns": beta_dns, "P_c": P_c, "P_c_reduced": reduced}
        if self.own_share is None:
            known[axis.name] = found
        return found

    def swayed(self, axis: str, delta_s: T) -> tuple[T, T]:
        """End moments with their sway part magnified."""
        pad, ends, parts = self.shared.work.pad, self.ends[axis], _sway_parts(self.force, axis)
        if parts is None:
            self.shared.notes.say(WHOLE_SWAY)
            bottom = pad.work(slenderness.end_moment_sway_whole, delta_s=delta_s, M_u=ends[0])
            if ends[0] is ends[1]:
                return bottom, bottom
            return bottom, pad.work(slenderness.end_moment_sway_whole, delta_s=delta_s, M_u=ends[1])
        if not any(parts):
            pad.reason(f"No part of the moment about {axis} is caused by wind or earthquake.")
            return ends
        one, means = ends[0] is ends[1], f"part of the moment about {axis} that wind and earthquake cause"
        M_s = self._ends(f"M_s{axis}", means, parts[0] if one else None, *parts)
        bottom = self._swayed_end(ends[0], M_s[0], delta_s)
        return bottom, bottom if one else self._swayed_end(ends[1], M_s[1], delta_s)

    def _swayed_end(self, M_u: T, M_s: T, delta_s: T) -> T:
        pad = self.shared.work.pad
        M_ns = pad.work(slenderness.nonsway_part, M_u=M_u, M_s=M_s)
        return pad.work(slenderness.end_moment_sway, M_ns=M_ns, delta_s=delta_s, M_s=M_s)


def wanted(column: ColumnLike, force: ForceLike) -> list[str]:
    """Symbols of the values of a force that its slenderness asks for."""
    moments = {axis: _ends_of(axis, whole) for axis, whole in (("x", force.Mx), ("y", force.My))}
    symbols = ["P_u", *(f"M_u{end}" for ends in moments.values() for end in ends)]
    # Only of a combination that was formed from loads are the parts worked.
    if getattr(force, "rule", None) is None:
        return symbols
    if column.beta_dns is None:
        symbols.append("P_sustained")
    if column.frame == "sway":
        swaying = [ends for axis, ends in moments.items() if any(_sway_parts(force, axis) or ())]
        symbols += [f"M_s{end}" for ends in swaying for end in ends]
    return symbols


def _ends_of(axis: str, whole: float | None) -> list[str]:
    return [axis] if whole is not None else [f"{axis}_bottom", f"{axis}_top"]


def _sway_parts(force: ForceLike, axis: str) -> tuple[float, float] | None:
    """What wind and earthquake cause of the end moments; None where the force does not tell."""
    sway: Any = getattr(force, "sway", None)
    return None if sway is None else (getattr(sway, f"M{axis}_bottom"), getattr(sway, f"M{axis}_top"))


def bend(axis: Axis[T], case: Case[T]) -> Bent[T]:
    """One force in bending about one axis.

    Raises
    ------
    RangeError : a sway frame of which k, or a magnifier, is not known
    """
    column, ends = case.shared.work.column, case.ends[axis.name]
    case.shared.work.pad.reason(f"Slenderness, bending about {axis.name}.")
    if column.frame == "sway" and column.delta_s is None and passes(axis.use_sway):
        return Bent(axis.name, ends, axis.use_sway, values=axis.values_sway)
    frame = case.frame
    if frame.buckles is not None:
        return Bent(axis.name, ends, story=frame.buckles)
    if frame.delta_s is not None:
        ends = case.swayed(axis.name, frame.delta_s)
    # Only compression bends a column further; the story still sways with one in tension.
    if case.force.P <= 0:
        return Bent(axis.name, ends)
    return _between_ends(axis, case, ends)


def _between_ends(axis: Axis[T], case: Case[T], ends: tuple[T, T]) -> Bent[T]:
    """Neglect slenderness, or magnify for curvature between the ends."""
    pad, frame = case.shared.work.pad, case.frame
    values = {**axis.values, "P_u": case.P_u}
    M_2 = pad.work(slenderness.end_moment_larger, M_bottom=ends[0], M_top=ends[1])
    M_1 = pad.work(slenderness.end_moment_smaller, M_bottom=ends[0], M_top=ends[1])
    values |= {"M_1": M_1, "M_2": M_2}
    use = None
    if not frame.sway:
        limit = values["slenderness_max"] = _limit(axis, M_1, M_2)
        use = pad.number(axis.slenderness) / pad.number(limit)
        if passes(use):
            pad.reason(f"k l_u/r is within its limit: slenderness about {axis.name} is neglected.")
            return Bent(axis.name, ends, use, values=values)
        pad.reason(f"k l_u/r exceeds its limit: moments about {axis.name} are magnified.")
    values |= case.critical(axis)
    stability = pad.work(slenderness.stability_ratio, P_u=case.P_u, P_c_reduced=values["P_c_reduced"])
    number = pad.number(stability)
    if number >= 1:
        pad.reason(f"P_u reaches 0.75 P_c: the column buckles about {axis.name}, and no magnifier exists.")
        return Bent(axis.name, ends, use, number, values=values)
    return _magnified(axis, case, ends, values, stability, use)


def _limit(axis: Axis[T], M_1: T, M_2: T) -> T:
    pad = axis.work.pad
    if pad.number(M_2) == 0:
        return pad.work(slenderness.slenderness_limit_uniform)
    return pad.work(slenderness.slenderness_limit_nonsway, M_1=M_1, M_2=M_2)


def _magnified(
    axis: Axis[T], case: Case[T], ends: tuple[T, T], values: dict[str, T], stability: T, use: float | None
) -> Bent[T]:
    pad, M_1, M_2 = axis.work.pad, values["M_1"], values["M_2"]
    if pad.number(M_2) == 0:
        C_m = pad.work(slenderness.moment_factor_uniform)
    else:
        C_m = pad.work(slenderness.moment_factor, M_1=M_1, M_2=M_2)
    delta_ns = pad.work(slenderness.magnifier_nonsway, C_m=C_m, stability=stability)
    M_2_min = axis.least_moment(case.P_u)
    own, least = pad.work(slenderness.moment_magnified, delta_ns=delta_ns, M_2=M_2), None
    if pad.number(M_2_min) > pad.number(M_2):
        pad.reason(f"The least moment about {axis.name} exceeds M_2 and takes its place.")
        least = pad.work(slenderness.moment_magnified, delta_ns=delta_ns, M_2=M_2_min)
    first = case.ends[axis.name]
    if first is not ends:
        pad.reason("Without second-order effects:")
        M_2 = pad.work(slenderness.end_moment_larger, M_bottom=first[0], M_top=first[1])
    M_c_max = pad.work(slenderness.second_order_limit, M_2=M_2, M_2_min=M_2_min)
    M_c = own if least is None else least
    values |= {"C_m": C_m, "delta_ns": delta_ns, "M_2_min": M_2_min, "M_c": M_c, "M_c_max": M_c_max}
    second_order = pad.number(M_c) / pad.number(M_c_max)
    return Bent(axis.name, ends, use, pad.number(stability), second_order, own, least, values=values)
