"""How reinforcement is written in a schedule: ``#8``, ``8-#9 (3x3)``, ``#3@12``, ``#4 spiral@2.25``."""

from __future__ import annotations

import re
from dataclasses import dataclass

__all__ = ["BAR_SIZES", "BarLayout", "Transverse", "bar_size", "parse_layout", "parse_transverse"]

# ASTM A615, table of deformed bar designations, inch-pound.
BAR_SIZES = (3, 4, 5, 6, 7, 8, 9, 10, 11, 14, 18)

_BAR = re.compile(r"#([0-9]{1,2})")
_LAYOUT = re.compile(r"([0-9]{1,4})\s*-\s*#([0-9]{1,2})(?:\s*\(\s*([0-9]{1,3})\s*[x×]\s*([0-9]{1,3})\s*\))?")
_TRANSVERSE = re.compile(r"#([0-9]{1,2})(\s+spiral)?\s*@\s*([0-9]+\.?[0-9]*|\.[0-9]+)")


@dataclass(frozen=True)
class BarLayout:
    """The longitudinal bars of a column.

    Attributes
    ----------
    count, size : how many, of which bar number
    n_x, n_y : bars along each face parallel to x and to y, corners counted in both; ``None`` on a circle
    text : as written
    """

    count: int
    size: int
    n_x: int | None
    n_y: int | None
    text: str


@dataclass(frozen=True)
class Transverse:
    """Ties or a spiral; `spacing` is the pitch of a spiral."""

    kind: str
    size: int
    spacing: float
    text: str


def bar_size(text: str) -> int:
    """The bar number of a size written ``#8``.

    Raises
    ------
    ValueError : another way of writing it, or a size that is not made
    """
    match = _BAR.fullmatch(text)
    if match is None:
        raise ValueError("write the size as #8")
    return _made(match[1])


def _made(number: str) -> int:
    if int(number) not in BAR_SIZES:
        raise ValueError(f"#{number} is not a bar of ASTM A615: #3 to #11, #14, #18")
    return int(number)


def parse_layout(text: str) -> BarLayout:
    """The bars of a column: ``8-#9 (3x3)`` in a rectangle, ``10-#8`` on a circle.

    Raises
    ------
    ValueError : another way of writing it, a size that is not made, or a count that disagrees with the layout
    """
    match = _LAYOUT.fullmatch(text)
    if match is None:
        raise ValueError("write it as 8-#9 (3x3) or 10-#8")
    count, size = int(match[1]), _made(match[2])
    if match[3] is None:
        if count < 3:
            raise ValueError("a circle needs at least 3 bars")
        return BarLayout(count, size, None, None, text)
    n_x, n_y = int(match[3]), int(match[4])
    if n_x < 2 or n_y < 2:
        raise ValueError("each face needs at least 2 bars, the corners")
    perimeter = 2 * n_x + 2 * n_y - 4
    if count != perimeter:
        raise ValueError(f"{n_x}x{n_y} makes {perimeter} bars, not {count}: corners count in both faces")
    return BarLayout(count, size, n_x, n_y, text)


def parse_transverse(text: str) -> Transverse:
    """The ties or spiral of a column, the spacing in the unit it was written in.

    Raises
    ------
    ValueError : another way of writing it, a size that is not made, or no spacing
    """
    match = _TRANSVERSE.fullmatch(text)
    if match is None:
        raise ValueError("write it as #3@12 or #4 spiral@2.25, the spacing a bare number in the unit of cover")
    spacing = float(match[3])
    if spacing <= 0:
        raise ValueError("the spacing has to be above 0")
    return Transverse("spiral" if match[2] else "ties", _made(match[1]), spacing, text)
