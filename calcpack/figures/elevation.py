"""What the elevations of bar details share: broken members, critical sections, required lengths, verdicts."""

from __future__ import annotations

from calcpack.figures.drawing import CENTRE, SOFT, Drawing, Point
from calcpack.figures.trade import Refusal

__all__ = [
    "beam",
    "callout",
    "column",
    "compared",
    "critical_section",
    "inside",
    "lengths_along",
    "lengths_up",
    "plain",
    "word",
]


def plain(length: float) -> str:
    """A computed or compared length as the sheet prints it: inches, one decimal."""
    return f"{length:.1f} in"


def word(required: float, available: float) -> str:
    """The word of a verdict."""
    return "OK" if required <= available else "NG"


def inside(refusal: Refusal, taken: float, allowed: float, name: str) -> None:
    """Note a problem where what is taken does not leave anything of `name`, both in inches."""
    refusal.unless(
        taken < allowed, f"{taken:g} in are needed", f"less than {name} = {allowed:g} in", "correct one of them"
    )


def beam(drawing: Drawing, low: Point, high: Point) -> None:
    """A horizontal member, broken off at its left end."""
    (left, bottom), (right, top) = low, high
    drawing.area([(left, bottom), (right, bottom), (right, top), (left, top)])
    drawing.line((left, bottom), (right, bottom), (right, top), (left, top), name="outline")
    drawing.break_line((left, bottom), (left, top))


def column(drawing: Drawing, low: Point, high: Point, *, open_foot: bool = True) -> None:
    """A vertical member, broken off above and, where `open_foot`, below."""
    (left, bottom), (right, top) = low, high
    drawing.area([(left, bottom), (right, bottom), (right, top), (left, top)])
    drawing.line((left, bottom), (left, top), name="outline")
    drawing.line((right, bottom), (right, top), name="outline")
    drawing.break_line((left, top), (right, top))
    if open_foot:
        drawing.break_line((left, bottom), (right, bottom))


def critical_section(drawing: Drawing, x: float, low: float, high: float, label: str) -> None:
    """A chain line at `x`, a little past the member at both ends, with its label at the foot."""
    past = 0.1 * drawing.scale
    drawing.line((x, low - past), (x, high + past), pen=CENTRE, name="critical section")
    if label:
        drawing.text(label, (x, low - past), (-0.05, 0.0), anchor="right", size=7.0, colour=SOFT)


def lengths_along(
    drawing: Drawing, start: float, y: float, off: float, *lengths: tuple[float, str], way: int = 1
) -> None:
    """Level dimensions from one point, the shorter nearer, so that no extension line runs through another's text."""
    for number, (length, text) in enumerate(sorted(lengths)):
        drawing.dim_x(start, start + way * length, y, off + 0.24 * number, text, "right" if way > 0 else "left")


def lengths_up(drawing: Drawing, start: float, x: float, off: float, *lengths: tuple[float, str], way: int = 1) -> None:
    """Upright dimensions from one point, the shorter nearer."""
    for length, text in sorted(lengths):
        off = drawing.dim_y(start, start + way * length, x, off, text)


def callout(drawing: Drawing, target: Point, d_b: float, bottom: float, label: str) -> None:
    """A callout for a bar, inside the member where it is deep enough on paper, else below it."""
    tip = (target[0], target[1] - d_b / 2)
    room = (tip[1] - bottom) / drawing.scale
    drawing.leader(tip, (0.1, -0.24 if room > 0.4 else -room - 0.16), label)


def compared(symbol: str, required: float, available: float) -> tuple[str, str]:
    """What was compared, as a line, and the word."""
    sign = "≤" if required <= available else ">"
    return f"{symbol} = {plain(required)} {sign} {plain(available)} available", word(required, available)
