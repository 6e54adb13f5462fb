"""What is wrong with a row of the column schedule."""

from __future__ import annotations

from collections.abc import Iterator
from math import pi, sin

from calcpack.aci318.bars import BARS, bar
from calcpack.aci318.editions import Edition
from calcpack.aci318.limits import CONCRETE, YIELD_LEAST
from calcpack.errors import Problem, RangeError
from calcpack.formula import Limit
from calcpack.members.column_section import ColumnLike, row_of
from calcpack.members.column_slenderness import slender_problems

__all__ = ["refuse_problems"]


_HIGHEST = Limit("f_c", "as far as the stress block is used here", high=20_000)


def refuse_problems(column: ColumnLike, edition: Edition) -> None:
    """Raise everything that is wrong with a column, at once.

    Raises
    ------
    RangeError : a value outside the range of its clause or impossible in the section
    """
    problems = [*_sizes(column), *_bars(column)]
    if not problems:
        problems = list(_fit(column))
    problems += [*_materials(column, edition), *slender_problems(column, edition)]
    if problems:
        raise RangeError(f"column {column.mark}", problems, row_of(column))


def _sizes(column: ColumnLike) -> Iterator[Problem]:
    lengths = {"h": column.h, "cover": column.cover, "spacing": column.ties.spacing}
    optional = {"b": column.b, "aggregate": column.aggregate, "l_u": column.l_u}
    lengths |= {name: value for name, value in optional.items() if value is not None}
    for name, value in lengths.items():
        if not 1e-9 <= value <= 1e30:
            yield Problem(f"{name} = {value:,g} in", "a length above zero")
    for name, size in (("bars", column.bars.size), ("ties", column.ties.size)):
        if size not in BARS:
            yield Problem(f"{name}: #{size}", f"one of {', '.join(f'#{known}' for known in BARS)} (ASTM A615, A706)")


def _materials(column: ColumnLike, edition: Edition) -> Iterator[Problem]:
    high = Limit("f_y", f"{edition.name} Table 20.2.2.4a", high=edition.f_y_max)
    spiral = Limit("f_yt", f"{edition.name} 25.7.3.3", high=100_000)
    values = [
        ("f_c", column.f_c, CONCRETE),
        ("f_c", column.f_c, _HIGHEST),
        ("f_y", column.f_y, YIELD_LEAST),
        ("f_y", column.f_y, high),
    ]
    if column.f_yt is not None:
        values += [("f_yt", column.f_yt, YIELD_LEAST), ("f_yt", column.f_yt, spiral)]
    for name, value, limit in values:
        if not limit.holds(value):
            yield Problem(f"{name} = {value:,g} psi", limit.words("psi"))


def _bars(column: ColumnLike) -> Iterator[Problem]:
    if column.b is None:
        if column.bars.count < 3:
            yield Problem(f"bars: {column.bars.count} on a circle", "3 or more")
        return
    if column.bars.n_x is None or column.bars.n_y is None or column.bars.n_x < 2 or column.bars.n_y < 2:
        yield Problem(
            f"bars: {column.bars.n_x} x {column.bars.n_y} along the faces",
            "2 or more along each face, corners included",
        )
    elif column.bars.count != 2 * (column.bars.n_x + column.bars.n_y) - 4:
        around = 2 * (column.bars.n_x + column.bars.n_y) - 4
        yield Problem(
            f"bars: {column.bars.count} in a layout of {column.bars.n_x} x {column.bars.n_y}",
            f"{around} stand around it",
        )
    if column.ties.kind == "spiral":
        yield Problem("spiral in a rectangular column", "spirals in circular columns only are checked", "use ties")


def _fit(column: ColumnLike) -> Iterator[Problem]:
    d_bt = bar(column.ties.size).d_b
    if column.ties.spacing <= d_bt:
        given = f"{column.ties.kind}: #{column.ties.size} at {column.ties.spacing:,g} in"
        yield Problem(given, f"a spacing above the diameter of the bar, {d_bt:,g} in")
    taken = 2 * (column.cover + d_bt + bar(column.bars.size).d_b)
    least = column.h if column.b is None else min(column.b, column.h)
    if least <= taken:
        yield Problem(f"{least:,g} in across", f"more than cover, ties and bars take: {taken:,g} in")
        return
    d_b = bar(column.bars.size).d_b
    for name, pitch in _pitches(column, column.cover + d_bt + d_b / 2):
        if pitch < d_b * (1 - 1e-9):
            given = f"bars: {column.bars.count}-#{column.bars.size}, which overlap {name}"
            allowed = f"{d_b:,g} in or more between centres, not {pitch:,.4g} in"
            yield Problem(given, allowed, "use fewer or smaller bars, or a larger section")


def _pitches(column: ColumnLike, inset: float) -> Iterator[tuple[str, float]]:
    """Distances between the centres of neighbouring bars, by where they stand."""
    if column.b is None or column.bars.n_x is None or column.bars.n_y is None:
        yield "on the circle", (column.h - 2 * inset) * sin(pi / column.bars.count)
        return
    yield "along x", (column.b - 2 * inset) / (column.bars.n_x - 1)
    yield "along y", (column.h - 2 * inset) / (column.bars.n_y - 1)
