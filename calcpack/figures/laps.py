"""Lap splices: two bars side by side with the lap they need and have, and the laps of parallel bars."""

from __future__ import annotations

from dataclasses import dataclass
from itertools import pairwise

from calcpack.figures.drawing import GREY, Drawing, Figure, Pen
from calcpack.figures.elevation import callout, plain
from calcpack.figures.ends import BELOW, Lengths, force, label_room, lengths_from, of, patch, short_scale
from calcpack.figures.trade import Refusal, feet_inches, scale_that_fits

__all__ = ["lap_detail", "lap_stagger"]

# Bars of a contact lap touch; a hairline between them shows where one ends and the other goes on. Points.
_HAIRLINE, _THINNEST = 0.6, 0.7
# A bar thinner than this on paper shows nothing of its size: before that, the middle of a long lap is left out. Points.
_LEGIBLE = 1.5
_WIDE, _HIGH, _LEFT_OUT = 3.6, 3.0, 0.2
_ALIGNED = Pen(0.35, GREY, (6, 4))


@dataclass(frozen=True)
class _Along:
    """Where a length along the lap is drawn: what lies between `start` and `end` is left out, `gap` stands for it."""

    start: float = 0.0
    end: float = 0.0
    gap: float = 0.0

    def __call__(self, x: float) -> float:
        """The place of `x` on the drawing."""
        return x if x <= self.start else x - (self.end - self.start) + self.gap

    def pieces(self, left: float, right: float) -> list[tuple[float, float]]:
        """What is drawn of a line, in places on the drawing."""
        if not (self.gap and left < self.start and self.end < right):
            return [(self(left), self(right))]
        return [(left, self.start), (self(self.end), self(right))]


def lap_detail(
    *,
    d_b: float,
    lap_required: float,
    lap_available: float | None,
    bar_label: str,
    other_d_b: float = 0.0,
    other_label: str = "",
    compression: bool = False,
    symbol: str = "",
    lap_class: str = "",
    mark: str = "",
    scale: float = 0.0,
) -> Figure:
    """Two bars in a contact lap: the lap they need and the lap they have.

    A long lap of thin bars is broken in its middle, so that the ends stay legible.

    Parameters
    ----------
    d_b : diameter of the bar from the left, inches
    lap_required : inches
    lap_available : the lap as detailed, inches; None where it is not stated
    bar_label : callout, e.g. ``#8``
    other_d_b, other_label : diameter, inches, and callout of the bar it is lapped with; the same by default
    compression : a lap in compression, otherwise in tension
    symbol : of the required lap, ``_{ }`` sets a subscript; that of the kind of lap by default
    lap_class : A or B, of a tension lap
    mark : words for the place
    scale : inches of the member in one inch of paper; by default the largest trade scale that fits

    Raises
    ------
    RangeError : a length that is not positive
    """
    other_d_b, other_label = other_d_b or d_b, other_label or bar_label
    lengths = Lengths(symbol or ("ℓ_{sc}" if compression else "ℓ_{st}"), lap_required, lap_available)
    refusal = Refusal("the lap detail")
    refusal.positive(d_b=d_b, other_d_b=other_d_b)
    lengths.check(refusal, "lap_required", "lap_available")
    refusal.settle()
    drawing, along = _drawing(lengths, min(d_b, other_d_b), scale, label_room(bar_label) + label_room(other_label))
    left, right = -label_room(bar_label) * drawing.scale, lengths.drawn + label_room(other_label) * drawing.scale
    below = -_apart(drawing, d_b, other_d_b)
    high, low = d_b / 2 + 0.25 * drawing.scale, below - other_d_b / 2 - BELOW * drawing.scale
    for start, end in along.pieces(left, right):
        patch(drawing, (start, low), (end, high), "")
    for start, end in along.pieces(left, lengths.drawn):
        drawing.bar([(start, 0.0), (end, 0.0)], d_b)
    for start, end in along.pieces(0.0, right):
        drawing.bar([(start, below), (end, below)], other_d_b, colour=GREY)
    force(drawing, (left, 0.0), -1, compression=compression)
    force(drawing, (along(right), below), 1, compression=compression)
    lengths_from(drawing, high, [(along(length), text) for length, text in lengths.dimensions])
    callout(drawing, (left + 0.2 * drawing.scale, 0.0), d_b, low, bar_label)
    callout(drawing, (along(lengths.drawn) + 0.2 * drawing.scale, below), other_d_b, low, other_label)
    return _lap_finished(
        drawing, along, lengths, (d_b, bar_label), (other_d_b, other_label), compression, lap_class, mark
    )


def _lap_finished(
    drawing: Drawing,
    along: _Along,
    lengths: Lengths,
    one: tuple[float, str],
    other: tuple[float, str],
    compression: bool,
    lap_class: str,
    mark: str,
) -> Figure:
    loaded, bars = "compression" if compression else "tension", _bars(one[1], other[1])
    classed = f", class {lap_class}" if lap_class else ""
    left_out = f"; {plain(along.end - along.start)} of the length is left out" if along.gap else ""
    sizes = f"{one[0]:.3f} in in diameter" if one == other else f"{one[0]:.3f} in and {other[0]:.3f} in in diameter"
    alt = (
        f"Elevation to scale{of(mark)}: {loaded} lap{classed} of {bars}, {sizes}, side by side; "
        f"{lengths.sentence}{left_out}."
    )
    notes = [("Middle of the lap left out", "")] if along.gap else []
    caption = f"{loaded.capitalize()} lap of {bars}{classed}"
    return drawing.finish(caption, alt, [*lengths.verdicts, *notes])


def _bars(label: str, other: str) -> str:
    return f"{label} bars" if label == other else f"{label} with {other}"


def _drawing(lengths: Lengths, d_b: float, scale: float, beside: float) -> tuple[Drawing, _Along]:
    """The scale, and what is left out of a lap too long for its bars to be seen; `beside` is what callouts take."""
    wide = min(_WIDE, max(_WIDE + 1.5 - beside, 1.5))
    whole = short_scale(scale, lengths.reach, 0.0, wide, 1.0)
    limit = d_b * 72 / _LEGIBLE
    # Neighbouring trade scales differ by half at most, so this one is below the limit.
    larger = max(scale_that_fits(limit / 1.5, 0.0, 1.0, 1.0), 8.0)
    if scale or whole <= limit or larger >= whole:
        return Drawing(whole), _Along()
    gap = _LEFT_OUT * larger
    excess = lengths.reach - wide * larger + gap
    # Within the lap as drawn, clear of the length required.
    marks = sorted({0.0, min(lengths.required, lengths.drawn), lengths.drawn})
    start, end = max(pairwise(marks), key=lambda part: part[1] - part[0])
    if end - start - excess < 1.2 * larger:
        return Drawing(whole), _Along()
    middle = (start + end) / 2
    return Drawing(larger), _Along(middle - excess / 2, middle + excess / 2, gap)


def _apart(drawing: Drawing, d_b: float, other: float) -> float:
    """Between the centres of lapped bars as drawn, inches of the building."""
    point = drawing.scale / 72
    return (max(d_b, _THINNEST * point) + max(other, _THINNEST * point)) / 2 + _HAIRLINE * point


def lap_stagger(
    *,
    d_b: float,
    lap: float,
    spacing: float,
    bar_label: str,
    stagger: float = 0.0,
    bars: int = 4,
    lap_class: str = "",
    symbol: str = "ℓ_{st}",
    mark: str = "",
    scale: float = 0.0,
) -> Figure:
    """Laps of parallel bars in plan: all at one section, or those of every other bar moved along by the stagger.

    Parameters
    ----------
    d_b : bar diameter, inches
    lap : length of each lap, inches
    spacing : of the bars, centre to centre, inches
    bar_label : callout, e.g. ``#6 @ 8 in``
    stagger : from the start of one lap to the start of the next bar's, inches; 0 where all are at one section
    bars : how many are drawn, 4 to 12
    lap_class : A or B; by default A where the laps are staggered and B where they are not
    symbol : of the lap, ``_{ }`` sets a subscript
    mark : words for the place
    scale : inches of the member in one inch of paper; by default the largest trade scale that fits

    Raises
    ------
    RangeError : a length that is not positive, laps that overlap along the bars, bars that do not fit their spacing, or
        laps of class A at one section
    """
    lap_class = lap_class or ("A" if stagger else "B")
    _check_stagger(d_b, lap, spacing, stagger, bars, lap_class)
    reach, deep = stagger + lap, (bars - 1) * spacing
    drawing = Drawing(short_scale(scale, reach, deep, _WIDE, _HIGH))
    margin = 0.25 * drawing.scale
    left, right = -label_room(bar_label) * drawing.scale, reach + 0.5 * drawing.scale
    high, low = margin, -deep - BELOW * drawing.scale
    patch(drawing, (left, low), (right, high), "")
    for x in dict.fromkeys((0.0, lap, stagger, reach)):
        drawing.line((x, low), (x, high), pen=_ALIGNED, name="lap end")
    apart = _apart(drawing, d_b, d_b)
    for number in range(bars):
        start, y = stagger * (number % 2), -spacing * number
        drawing.bar([(left, y), (start + lap, y)], d_b)
        drawing.bar([(start, y - apart), (right, y - apart)], d_b, colour=GREY)
    _dimension_stagger(drawing, lap, spacing, stagger, (high, low, right), symbol)
    callout(drawing, (left + 0.2 * drawing.scale, -deep), d_b, low, bar_label)
    said = _said(stagger, symbol)
    alt = (
        f"Plan to scale{of(mark)}: {bars} parallel bars {bar_label}, {d_b:.3f} in in diameter, "
        f"{feet_inches(spacing)} apart, each lapped {plain(lap)}, class {lap_class}; {said[1]}."
    )
    return drawing.finish(f"Laps of class {lap_class}, {bar_label}", alt, [(f"Class {lap_class}: {said[0]}", "")])


def _said(stagger: float, symbol: str) -> tuple[str, str]:
    """Where the laps are, as a line under the drawing and in words."""
    if not stagger:
        return ("all bars lapped at one section",) * 2
    text = f"every other bar lapped at one section, the rest {plain(stagger)}"
    return f"{text} ≥ {symbol} along", f"{text} along, at least the lap"


def _check_stagger(d_b: float, lap: float, spacing: float, stagger: float, bars: int, lap_class: str) -> None:
    refusal = Refusal("the stagger of laps")
    refusal.positive(d_b=d_b, lap=lap, spacing=spacing)
    refusal.unless(4 <= bars <= 12, f"bars = {bars}", "4 to 12", "correct it")
    refusal.unless(lap_class in ("A", "B"), f"lap_class = {lap_class!r}", "A or B (ACI 318 25.5.2.1)", "correct it")
    refusal.unless(
        lap_class != "A" or stagger != 0,
        "laps of class A at one section",
        "half of the bars at most spliced within the lap length (ACI 318 25.5.2.1)",
        "stagger them, or make them class B",
    )
    refusal.unless(
        stagger == 0 or stagger >= lap,
        f"stagger = {stagger:g} in",
        f"0 in, or the lap, {lap:g} in, and more",
        "move the laps apart",
    )
    refusal.unless(
        spacing > 2 * d_b, f"spacing = {spacing:g} in", f"more than two bars side by side, {2 * d_b:g} in", "correct it"
    )
    refusal.settle()


def _dimension_stagger(
    drawing: Drawing, lap: float, spacing: float, stagger: float, edges: tuple[float, float, float], symbol: str
) -> None:
    """The laps, the stagger and the spacing."""
    high, low, right = edges
    text = f"{symbol} = {plain(lap)}"
    lengths_from(drawing, high, [(lap, text), *([(stagger, f"{plain(stagger)} stagger")] if stagger else [])])
    if stagger:
        drawing.dim_x(stagger, stagger + lap, low, -0.2, text)
    drawing.dim_y(-spacing, 0.0, right, 0.2)
