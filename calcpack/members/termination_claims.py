"""What a row of the anchorage schedule claims beside its kind, and lacks or contradicts: refused with the clause."""

from __future__ import annotations

from collections.abc import Iterator

from calcpack.aci318.bars import BARS, NO_11
from calcpack.aci318.editions import Edition
from calcpack.errors import Problem
from calcpack.members.termination import TerminationLike

__all__ = ["claims"]

_LAPS = ("lap tension", "lap compression")
_IN_BUNDLES = ("straight tension", "straight compression", *_LAPS)
_IN_JOINTS = ("hook 90", "straight tension")
_HALF = 0.5
_LARGEST = 1e30
# Dimensions rounded on the drawing, as for c_b against cover and spacing.
_ROUNDED = 1.01


def claims(row: TerminationLike, edition: Edition) -> Iterator[Problem]:
    """What is wrong with the claims of a row."""
    yield from _bundle(row)
    yield from _sizes_spliced(row)
    yield from _share(row)
    yield from _bar_stress(row)
    yield from _column(row)
    yield from _joint(row, edition)
    yield from _support(row)
    if row.kind == "mechanical splice" and row.available is not None:
        yield Problem(
            f"available = {row.available:,g} in", "blank: a mechanical splice is judged by its force (25.5.7.1)"
        )


def _bundle(row: TerminationLike) -> Iterator[Problem]:
    if row.bundle == 1:
        return
    given = f"bundle = {row.bundle}"
    if row.bundle not in (2, 3, 4):
        yield Problem(given, "1 to 4 bars (25.6.1.1)")
    if row.kind not in _IN_BUNDLES:
        yield Problem(
            given,
            f"1 for a {row.kind}: lengths of bundled bars are of straight bars and their laps (25.6.1.5, 25.6.1.7)",
        )
    if row.kind == "straight tension" and row.bar > NO_11.size and row.bar in BARS:
        allowed = f"#{NO_11.size} and smaller in bundles of beams (25.6.1.3)"
        yield Problem(f"{given}, bar = #{row.bar}", allowed, "unbundle them, or use smaller bars")
    if row.other_bar is not None:
        yield Problem(f"{given}, other_bar = #{row.other_bar}", "bars of one size in a lap within a bundle (25.6.1.7)")


def _sizes_spliced(row: TerminationLike) -> Iterator[Problem]:
    if row.other_bar is None:
        return
    given = f"other_bar = #{row.other_bar}"
    if row.kind not in _LAPS:
        yield Problem(given, f"blank for {row.kind}: it is the other bar of a lap (25.5.2.2, 25.5.5.4)")
    elif row.other_bar not in BARS:
        yield Problem(given, f"one of {', '.join(f'#{size}' for size in BARS)} (ASTM A615, A706)")
    elif row.other_bar > NO_11.size and (row.kind == "lap tension" or row.bar > NO_11.size):
        yield Problem(given, "#11 and smaller (25.5.1.1)", "use another splice")


def _share(row: TerminationLike) -> Iterator[Problem]:
    if row.spliced is None:
        return
    given = f"spliced = {row.spliced:,.4g}"
    if row.kind not in _LAPS:
        yield Problem(given, f"blank for {row.kind}: it chooses the class of a lap (Table 25.5.2.1)")
    elif not 0 < row.spliced <= 1:
        yield Problem(given, "a share of the bars, above 0 and up to 1 (Table 25.5.2.1)", "write 50% or 0.5")
    elif row.lap_class == "A" and row.spliced > _HALF:
        yield Problem(
            f"lap_class = A, {given}", "class A with half the bars spliced or fewer (Table 25.5.2.1)", "use class B"
        )


def _bar_stress(row: TerminationLike) -> Iterator[Problem]:
    if row.bar_stress is None:
        return
    given = f"bar_stress = {row.bar_stress:,.4g}"
    if row.kind not in _LAPS:
        yield Problem(given, f"blank for {row.kind}: it chooses the lap of column bars (10.7.5.2)")
    elif not 0 <= row.bar_stress <= 1:
        yield Problem(given, "tensile stress over f_y, 0 to 1; 0 in compression (10.7.5.2.2)")
    elif row.kind == "lap compression" and row.bar_stress > 0:
        allowed = "0: bars in tension under a factored combination take a tension lap (10.7.5.2.2)"
        yield Problem(given, allowed, "use kind 'lap tension'")
    elif row.lap_class == "A" and row.bar_stress > _HALF:
        yield Problem(f"lap_class = A, {given}", "class A up to 0.5 f_y (Table 10.7.5.2.2)", "use class B")


def _column(row: TerminationLike) -> Iterator[Problem]:
    if row.spiral and row.kind not in ("lap compression", "straight compression"):
        yield Problem("spiral = yes", f"no for {row.kind}: it counts in compression (10.7.5.2.1, Table 25.4.9.3)")


def _joint(row: TerminationLike, edition: Edition) -> Iterator[Problem]:
    if row.joint != "special":
        return
    given = "joint = special"
    if row.kind not in _IN_JOINTS:
        yield Problem(given, f"blank for {row.kind}: hook 90 or straight tension (18.8.5.1, 18.8.5.3)")
        return
    if row.bar > NO_11.size and row.bar in BARS:
        yield Problem(f"{given}, bar = #{row.bar}", f"#{NO_11.size} and smaller (18.8.5.1)")
    if not row.in_column_core:
        yield Problem(f"{given}, in_column_core = no", "yes: the bar ends in the confined core (18.8.5.1)")
    largest = edition.special_yield()
    if row.f_y > largest:
        clause = f"{edition.name} Table 20.2.2.4a, special moment frames"
        yield Problem(f"{given}, f_y = {row.f_y:,g} psi", f"allowed up to {largest:,g} psi ({clause})")
    if row.lamb not in (0.75, 1.0):
        yield Problem(f"{given}, lambda = {row.lamb:,g}", "0.75 or 1 (18.8.5.1)")
    if row.bundle != 1:
        yield Problem(f"{given}, bundle = {row.bundle}", "1: no length of bundled bars in a joint is given (18.8.5)")


def _support(row: TerminationLike) -> Iterator[Problem]:
    claimed = [name for name in ("M_n", "V_u", "l_a") if getattr(row, name) is not None]
    claimed += ["confined_reaction"] if row.confined_reaction else []
    if claimed and row.kind != "straight tension":
        yield Problem(", ".join(claimed), f"blank for {row.kind}: straight bars at a support (9.7.3.8.3)")
        return
    for name, unit in (("M_n", "lb*in"), ("V_u", "lb")):
        value = getattr(row, name)
        if claimed and value is None:
            yield Problem(
                f"{' and '.join(claimed)} without {name}", "M_n and V_u (9.7.3.8.3)", "state both, or neither"
            )
        elif value is not None and not 0 < value <= _LARGEST:
            yield Problem(f"{name} = {value:,g} {unit}", "above zero (9.7.3.8.3)")
