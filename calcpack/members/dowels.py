"""Dowels from a column or pedestal into its foundation: their area, and development on both sides of the joint."""

from __future__ import annotations

from collections.abc import Iterator
from dataclasses import dataclass
from typing import TypeVar

from calcpack.aci318 import dowels
from calcpack.aci318.bars import BARS, NO_11, bar
from calcpack.aci318.editions import Edition
from calcpack.errors import Problem, RangeError
from calcpack.members.anchorage import work_termination
from calcpack.members.pad import Pad
from calcpack.members.results import CheckResult, measured, verdict_of
from calcpack.members.sources import NOMINAL
from calcpack.members.termination import Termination
from calcpack.symbols import lookup

__all__ = ["Dowels", "work_dowels"]

T = TypeVar("T")


@dataclass(frozen=True)
class Dowels:
    """Dowels of one column, in compression; lengths in, areas in^2, stresses psi.

    Attributes
    ----------
    A_g : of the column or pedestal
    n_bars, bar : of the dowels
    column_bar : that they lap with; its bars may be No. 14 or 18
    f_c_foundation, f_c_column : on the two sides of the joint
    into_foundation, into_column : straight lengths the detail offers; a hook adds nothing in compression
    ties, spiral : along the lap, as the columns of anchorage.csv
    """

    mark: str
    A_g: float
    n_bars: int
    bar: int
    column_bar: int
    f_c_foundation: float
    f_c_column: float
    f_y: float
    into_foundation: float
    into_column: float
    source: str
    ties: bool = False
    spiral: bool = False


def work_dowels(pad: Pad[T], row: Dowels, edition: Edition) -> list[CheckResult]:
    """Work and verify the area of dowels, their development in the foundation, and their lap with the column's bars.

    Raises
    ------
    RangeError : everything that is wrong with the dowels, at once
    """
    problems = [*_problems(row)]
    if problems:
        raise RangeError(f"{row.mark}: dowels", problems, row.source)
    pad.heading(f"{row.mark}: area of dowels")
    area = _area(pad, row, edition)
    results = [area]
    for words, termination in (("dowels in the foundation", _below(row)), ("dowels in the column", _above(row))):
        pad.heading(f"{row.mark}: {words}")
        results.append(work_termination(pad, termination, edition)[1])
    return results


def _problems(row: Dowels) -> Iterator[Problem]:
    if row.n_bars < 1:
        yield Problem(f"n_bars = {row.n_bars}", "one dowel or more")
    if row.bar not in BARS or row.bar > NO_11.size:
        yield Problem(f"bar = #{row.bar}", f"#3 to #{NO_11.size}, lapped with the column's bars (16.3.5.4, 25.5.1.1)")
    if not row.A_g > 0:
        yield Problem(f"A_g = {row.A_g:,g} in^2", "above zero (16.3.4.1)")


def _area(pad: Pad[T], row: Dowels, edition: Edition) -> CheckResult:
    A_g = pad.given("A_g", row.A_g, lookup("A_g").meaning, row.source)
    n_bars = pad.given("n_bars", float(row.n_bars), "number of dowels", row.source)
    A_b = pad.given("A_b", bar(row.bar).A_b, f"{lookup('A_b').meaning}, #{row.bar}", NOMINAL)
    provided = pad.work(dowels.dowel_area, n_bars=n_bars, A_b=A_b)
    least = pad.work(dowels.dowel_area_minimum, A_g=A_g)
    clause = dowels.dowel_area_minimum.clause(edition.standard).number
    ratio = pad.verify(f"{row.mark}: least area of dowels", least, provided, clause)
    values = {"A_s_min": measured("A_s_min", pad.number(least)), "A_s": measured("A_s", pad.number(provided))}
    return CheckResult(row.mark, "area of dowels", clause, "", ratio, verdict_of(ratio), values)


def _below(row: Dowels) -> Termination:
    return Termination(
        mark=row.mark, kind="straight compression", bar=row.bar, f_c=row.f_c_foundation, f_y=row.f_y,
        available=row.into_foundation, source=row.source,
    )  # fmt: skip


def _above(row: Dowels) -> Termination:
    other = row.column_bar if row.column_bar != row.bar else None
    return Termination(
        mark=row.mark, kind="lap compression", bar=row.bar, other_bar=other, f_c=row.f_c_column, f_y=row.f_y,
        available=row.into_column, confining_ties=row.ties, spiral=row.spiral, source=row.source,
    )  # fmt: skip
