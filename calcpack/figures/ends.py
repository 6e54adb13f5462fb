"""Ends of bars of which a schedule states the lengths, and little of the member around them.

What the schedule does not state is not drawn as if it were: concrete without a stated face is left open or broken off,
and a length that nobody offers is not compared.
"""

from __future__ import annotations

from collections.abc import Iterable
from dataclasses import dataclass

from calcpack.figures.drawing import CENTRE, INK, SOFT, TEXT, Drawing, Figure, Point
from calcpack.figures.elevation import callout, plain, word
from calcpack.figures.lettering import text_width
from calcpack.figures.trade import Refusal, feet_inches, scale_that_fits

__all__ = [
    "Lengths",
    "force",
    "label_room",
    "lengths_from",
    "of",
    "patch",
    "section_line",
    "short_scale",
    "stated",
    "straight_end",
]

# Larger scales would make short pieces of thick bars fill the page.
_LARGEST = 8.0
# Concrete drawn past what is stated, inches of paper.
BEYOND, ABOVE, BELOW = 0.35, 0.3, 0.45


@dataclass(frozen=True)
class Lengths:
    """The length that is required and the one that the detail offers, inches.

    Attributes
    ----------
    symbol : of the required length, ``_{ }`` sets a subscript
    available : None where nobody states it
    """

    symbol: str
    required: float
    available: float | None

    @property
    def drawn(self) -> float:
        """The length at which the bar is drawn."""
        return self.required if self.available is None else self.available

    @property
    def reach(self) -> float:
        """The longer of both."""
        return max(self.required, self.drawn)

    @property
    def texts(self) -> tuple[str, str]:
        """Both lengths with one decimal, or with as many as tell them apart."""
        need, have = plain(self.required), plain(self.drawn)
        places = 1
        while need == have and self.required != self.drawn and places < 9:
            places += 1
            need, have = f"{self.required:.{places}f} in", f"{self.drawn:.{places}f} in"
        return need, have

    @property
    def dimensions(self) -> list[tuple[float, str]]:
        """Each length with the text of its dimension."""
        need, have = self.texts
        required = (self.required, f"{self.symbol} = {need}")
        return [required] if self.available is None else [required, (self.available, f"{have} available")]

    @property
    def verdicts(self) -> list[tuple[str, str]]:
        """What is compared, and the word; no word where nothing is compared."""
        need, have = self.texts
        if self.available is None:
            return [(f"{self.symbol} = {need} required; length available not stated", "")]
        sign = "≤" if self.required <= self.available else ">"
        return [(f"{self.symbol} = {need} {sign} {have} available", word(self.required, self.available))]

    @property
    def sentence(self) -> str:
        """The same in words."""
        need, have = self.texts
        if self.available is None:
            return f"{need} is required and the length available is not stated"
        return f"{need} is required and {have} is available: {word(self.required, self.available)}"

    def check(self, refusal: Refusal, required: str, available: str = "available") -> None:
        """Note lengths that are not above zero under the names of the arguments."""
        refusal.positive(**{required: self.required})
        stated(refusal, **{available: self.available})


def stated(refusal: Refusal, **lengths: float | None) -> None:
    """Those of the lengths that are stated have to be above zero."""
    refusal.positive(**{name: value for name, value in lengths.items() if value is not None})


def short_scale(scale: float, width: float, height: float, paper_width: float, paper_height: float) -> float:
    """The scale asked for, or the largest trade scale that fits, 1 in = 8 in at most."""
    return scale or max(_LARGEST, scale_that_fits(width, height, paper_width, paper_height))


def label_room(label: str) -> float:
    """How much of a bar, in inches of paper, its callout needs."""
    return text_width(label, TEXT) + 0.6


def patch(drawing: Drawing, low: Point, high: Point, face: str) -> None:
    """Concrete around a bar, broken off at both ends: a line at its stated face, top or bottom, where there is one."""
    (left, bottom), (right, top) = low, high
    drawing.area([(left, bottom), (right, bottom), (right, top), (left, top)])
    if face:
        y = top if face == "top" else bottom
        drawing.line((left, y), (right, y), name="outline")
    for x in (left, right):
        drawing.break_line((x, bottom), (x, top))


def section_line(drawing: Drawing, low: float, high: float) -> None:
    """The critical section at x = 0, a chain line a little past both levels."""
    past = 0.1 * drawing.scale
    drawing.line((0.0, low - past), (0.0, high + past), pen=CENTRE, name="critical section")


def lengths_from(drawing: Drawing, y: float, dimensions: Iterable[tuple[float, str]]) -> None:
    """Level dimensions from x = 0 above `y`, the shorter nearer.

    Text that does not go between the ticks stands on the left, where no extension line of a longer one runs through it.
    """
    for number, (length, text) in enumerate(sorted(dimensions)):
        drawing.dim_x(0.0, length, y, 0.18 + 0.24 * number, text, "left")


def force(drawing: Drawing, at: Point, way: int, *, compression: bool) -> None:
    """An arrow beyond an end of a bar, `way` of it: away from the bar in tension, towards it in compression."""
    x, y = drawing.paper(at, (0.12 * way, 0.0))
    tail, tip = (x, x + 0.26 * way) if not compression else (x + 0.26 * way, x)
    back = tip - 0.1 * (1 if tip > tail else -1)
    drawing.stroke((tail, y), (back, y), name="force")
    drawing.stroke((tip, y), (back, y + 0.035), (back, y - 0.035), fill=INK, name="force")


def straight_end(
    *,
    d_b: float,
    l_d: float,
    available: float | None,
    bar_label: str,
    symbol: str = "ℓ_{d}",
    compression: bool = False,
    cover: float | None = None,
    top: bool = False,
    section_label: str = "critical section",
    mark: str = "",
    scale: float = 0.0,
) -> Figure:
    """A straight bar past a critical section, in concrete of which the schedule states the cover at most.

    Parameters
    ----------
    d_b : bar diameter, inches
    l_d : required development length, inches
    available : length from the critical section to the end of the bar, inches; None where it is not stated
    bar_label : callout, e.g. ``#8 top``
    symbol : of the required length, ``_{ }`` sets a subscript
    compression : the bar is in compression
    cover : clear, inches; None where it is not stated
    top : the cover is that of the top face
    section_label, mark : words for the critical section and the place
    scale : inches of the member in one inch of paper; by default the largest trade scale that fits

    Raises
    ------
    RangeError : a length that is not positive
    """
    lengths = Lengths(symbol, l_d, available)
    refusal = Refusal("the detail of a straight end")
    refusal.positive(d_b=d_b)
    lengths.check(refusal, "l_d")
    stated(refusal, cover=cover)
    refusal.settle()
    drawing = Drawing(short_scale(scale, lengths.reach, 0.0, 3.4, 1.0))
    back, right = label_room(bar_label) * drawing.scale, lengths.drawn + BEYOND * drawing.scale
    face = "" if cover is None else "top" if top else "bottom"
    above, below = ABOVE * drawing.scale, BELOW * drawing.scale
    high = d_b / 2 + (cover if cover is not None and top else above)
    low = -d_b / 2 - (cover if cover is not None and not top else below)
    patch(drawing, (-back, low), (right, high), face)
    drawing.bar([(-back, 0.0), (lengths.drawn, 0.0)], d_b)
    force(drawing, (-back, 0.0), -1, compression=compression)
    section_line(drawing, low, high)
    drawing.text(section_label, (0.0, low), (0.06, -0.19), anchor="left", size=7.0, colour=SOFT)
    lengths_from(drawing, high, lengths.dimensions)
    if face:
        drawing.dim_y(*((d_b / 2, high) if top else (low, -d_b / 2)), right, 0.2)
    callout(drawing, (-back + 0.2 * drawing.scale, 0.0), d_b, low, bar_label)
    loaded = "compression" if compression else "tension"
    covered = f", clear cover {feet_inches(cover)} at the {face}" if cover is not None else ""
    alt = (
        f"Elevation to scale{of(mark)}: {bar_label}, {d_b:.3f} in in diameter, straight past the {section_label}, "
        f"in {loaded}{covered}; {lengths.sentence}."
    )
    return drawing.finish(f"Straight end of {bar_label} in {loaded}", alt, lengths.verdicts)


def of(mark: str) -> str:
    """The place in a sentence, where it has a mark."""
    return f" of {mark}" if mark else ""
