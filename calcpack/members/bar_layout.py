"""Where the bars of a column stand, as numbers and as rows of a worked table."""

from __future__ import annotations

import math
from collections import Counter
from typing import TypeVar

from calcpack.aci318.bars import bar
from calcpack.members.column_like import ColumnLike
from calcpack.members.column_rules import ColumnWorking
from calcpack.tabulation import Row, Worked

__all__ = ["bar_positions", "bar_rows", "layer_rows"]

T = TypeVar("T")


def bar_positions(column: ColumnLike) -> list[tuple[float, float]]:
    """Centres of the longitudinal bars from the centre of the section, x along `b`, y along `h`, in."""
    inset = column.cover + bar(column.ties.size).d_b + bar(column.bars.size).d_b / 2
    if column.b is None:
        radius, step = column.h / 2 - inset, 2 * math.pi / column.bars.count
        return [(radius * math.cos(step * i), radius * math.sin(step * i)) for i in range(column.bars.count)]
    x, y = column.b / 2 - inset, column.h / 2 - inset
    return [(x * _share(i, n_x), y * _share(j, n_y)) for i, n_x, j, n_y in _around(column)]


def _around(column: ColumnLike) -> list[tuple[int, int, int, int]]:
    """Places along x and y, and how many there are: the faces parallel to x first, then what stands between them."""
    n_x, n_y = column.bars.n_x or 0, column.bars.n_y or 0
    faces = [(i, n_x, j, n_y) for j in (0, n_y - 1) for i in range(n_x)]
    return faces + [(i, n_x, j, n_y) for i in (0, n_x - 1) for j in range(1, n_y - 1)]


def _share(place: int, count: int) -> float:
    return 2 * place / (count - 1) - 1


def bar_rows(work: ColumnWorking[T]) -> list[Row[T]]:
    """The bars as rows of a worked table, in the order of `bar_positions`; coordinates are worked from the section."""
    column = work.column
    if column.b is None:
        D_s, count = {"D_s": work.value("D_s")}, column.bars.count
        return [
            (str(i + 1), {name: Worked(f"D_s/2*{turn}(2*pi*{i}/{count})", D_s) for name, turn in _TURNS.items()})
            for i in range(count)
        ]
    x_o, y_o = {"x_o": work.value("x_o")}, {"y_o": work.value("y_o")}
    return [
        (str(number), {"x": Worked(_placed("x_o", i, n_x), x_o), "y": Worked(_placed("y_o", j, n_y), y_o)})
        for number, (i, n_x, j, n_y) in enumerate(_around(column), 1)
    ]


_TURNS = {"x": "cos", "y": "sin"}


def _placed(outermost: str, place: int, count: int) -> str:
    if place in (0, count - 1):
        return outermost if place else f"-{outermost}"
    return f"{outermost}*(2*{place}/({count} - 1) - 1)"


def layer_rows(work: ColumnWorking[T], axis: str) -> list[Row[T]]:
    """The bars of a rectangular column in layers parallel to an axis, as rows of a worked table; areas summed."""
    across, outermost = ("y", "y_o") if axis == "x" else ("x", "x_o")
    places = Counter((j, n_y) if axis == "x" else (i, n_x) for i, n_x, j, n_y in _around(work.column))
    reach, area = {outermost: work.value(outermost)}, {"A_b": work.value("A_b")}
    return [
        (
            str(number),
            {across: Worked(_placed(outermost, place, along), reach), "A_b": Worked(f"{count}*A_b", area)},
        )
        for number, ((place, along), count) in enumerate(sorted(places.items()), 1)
    ]
