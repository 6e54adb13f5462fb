"""Details of bars that are developed or hooked, in elevation and to scale, required beside available length."""

from __future__ import annotations

import math

from calcpack.figures.drawing import SOFT, Drawing, Figure, Point, arc
from calcpack.figures.elevation import (
    beam,
    callout,
    column,
    compared,
    critical_section,
    inside,
    lengths_along,
    plain,
    word,
)
from calcpack.figures.trade import Refusal, feet_inches, scale_that_fits

__all__ = ["cantilever_detail", "development_detail", "hook_detail"]

_WIDE, _HIGH = 4.4, 2.6


def development_detail(
    *,
    d_b: float,
    l_d: float,
    available: float,
    h: float,
    cover: float,
    bar_label: str,
    symbol: str = "ℓ_{d}",
    section_label: str = "critical section",
    member: str = "the member",
    end_cover: float = 2.0,
    scale: float = 0.0,
) -> Figure:
    """A straight bar beyond a critical section: the length it needs and the length it has.

    Parameters
    ----------
    d_b : bar diameter, inches
    l_d : required development length, inches
    available : length from the critical section to the end of the bar, inches
    h : depth of the member, inches
    cover : clear, from the top face to the bar, inches
    bar_label : callout, e.g. ``#8 top``
    symbol : of the required length, ``_{ }`` sets a subscript
    section_label, member : words for the critical section and the member
    end_cover : concrete beyond the end of the bar, inches
    scale : inches of the member in one inch of paper; by default the largest trade scale that fits

    Raises
    ------
    RangeError : a length that is not positive, or a bar deeper than the member
    """
    refusal = Refusal("the development detail")
    refusal.positive(d_b=d_b, l_d=l_d, available=available, h=h, cover=cover, end_cover=end_cover)
    inside(refusal, cover + d_b, h, "h")
    refusal.settle()
    back = 0.35 * max(l_d, available)
    reach = max(l_d, available + end_cover)
    drawing = Drawing(scale or scale_that_fits(back + reach, h, _WIDE, _HIGH))
    end = available + end_cover
    beam(drawing, (-back, -h), (end, 0.0))
    level = -cover - d_b / 2
    drawing.bar([(-back, level), (available, level)], d_b)
    critical_section(drawing, 0.0, -h, 0.0, section_label)
    lengths = (l_d, f"{symbol} = {plain(l_d)}"), (available, f"{plain(available)} available")
    lengths_along(drawing, 0.0, 0.0, 0.18, *lengths)
    drawing.dim_y(-h, 0.0, end, 0.22)
    callout(drawing, (0.25 * available, level), d_b, -h, bar_label)
    alt = (
        f"Elevation to scale: {bar_label}, {d_b:.3f} in in diameter, runs {plain(available)} past the "
        f"{section_label} of {member}, {feet_inches(h)} deep; {plain(l_d)} is required: {word(l_d, available)}."
    )
    return drawing.finish(
        f"Development of {bar_label} past the {section_label}", alt, [compared(symbol, l_d, available)]
    )


def hook_detail(
    *,
    d_b: float,
    bend: int,
    bend_diameter: float,
    extension: float,
    l_dh: float,
    available: float,
    h: float,
    cover: float,
    tail_cover: float,
    bar_label: str,
    section_label: str = "critical section",
    support: str = "the support",
    scale: float = 0.0,
) -> Figure:
    """A standard hook in a supporting member: bend and tail to scale, the length it needs and the length it has.

    Parameters
    ----------
    d_b : bar diameter, inches
    bend : 90 or 180, degrees
    bend_diameter : inside diameter of the bend, inches
    extension : straight extension past the bend, inches
    l_dh : required length from the critical section to the outside of the hook, inches
    available : the same length as detailed, inches
    h : depth of the member that the bar comes from, inches
    cover : clear, from its top face to the bar, inches
    tail_cover : concrete between the outside of the hook and the far face of the support, inches
    bar_label : callout, e.g. ``3-#8``
    section_label, support : words for the critical section and the support
    scale : inches of the member in one inch of paper; by default the largest trade scale that fits

    Raises
    ------
    RangeError : a length that is not positive, a bend that is not 90 or 180 degrees, or a hook longer than `available`
    """
    refusal = Refusal("the hook detail")
    refusal.positive(d_b=d_b, bend_diameter=bend_diameter, extension=extension, l_dh=l_dh, available=available)
    refusal.positive(h=h, cover=cover, tail_cover=tail_cover)
    refusal.unless(bend in (90, 180), f"bend = {bend} degrees", "90 or 180 degrees (a standard hook)", "correct it")
    inside(refusal, cover + d_b, h, "h")
    hook = bend_diameter / 2 + d_b
    refusal.unless(available > hook, f"available = {available:g} in", f"more than the bend, {hook:g} in", "lengthen it")
    refusal.settle()
    far, back = available + tail_cover, max(0.7 * available, 0.5 * h)
    radius, level = (bend_diameter + d_b) / 2, -cover - d_b / 2
    foot = min(-h, level - radius - extension - 1.5) - 0.15 * h
    top = 0.3 * h
    drawing = Drawing(scale or scale_that_fits(back + max(far, l_dh), top - foot, 3.4, 3.0))
    column(drawing, (0.0, foot), (far, top))
    beam(drawing, (-back, -h), (0.0, 0.0))
    path, tail = _hook(available - d_b / 2 - radius, level, radius, extension, bend)
    drawing.bar([(-back, level), *path], d_b)
    critical_section(drawing, 0.0, foot, top, "")
    lengths = (l_dh, f"ℓ_{{dh}} = {plain(l_dh)}"), (available, f"{plain(available)} available")
    lengths_along(drawing, 0.0, top, 0.18, *lengths)
    drawing.dim_x(available, far, foot, -0.2)
    if bend == 90:
        drawing.dim_y(tail[1], tail[1] + extension, far, 0.24, f"{plain(extension)} ext.")
    else:
        drawing.dim_x(tail[0], tail[0] + extension, tail[1] - d_b / 2, -0.2, f"{plain(extension)} ext.")
    _bend_callout(drawing, (available - d_b / 2 - radius, level - radius), radius + d_b / 2, bend_diameter, far)
    callout(drawing, (-0.8 * back, level), d_b, -h, bar_label)
    drawing.text(section_label, (0.0, foot), (-0.06, 0.02), anchor="right", size=7.0, colour=SOFT)
    alt = (
        f"Elevation to scale: {bar_label}, {d_b:.3f} in in diameter, ends in a standard {bend} degree hook in "
        f"{support}, bend diameter {plain(bend_diameter)} inside, extension {plain(extension)}; {plain(l_dh)} is "
        f"required from the {section_label} to the outside of the hook and {plain(available)} is available, "
        f"{feet_inches(tail_cover)} cover beyond: {word(l_dh, available)}."
    )
    return drawing.finish(
        f"Standard {bend}° hook of {bar_label} in {support}", alt, [compared("ℓ_{dh}", l_dh, available)]
    )


def cantilever_detail(
    *,
    span: float,
    h: float,
    support_width: float,
    d_b: float,
    cover: float,
    l_d: float,
    available: float,
    bar_label: str,
    h_back: float = 0.0,
    member: str = "the cantilever",
    scale: float = 0.0,
) -> Figure:
    """Top bars of a cantilever, developed past the face of the support into the back span.

    Parameters
    ----------
    span : from the face of the support to the tip, inches
    h, h_back : depth of the cantilever and of the back span, inches; the same by default
    support_width : inches
    d_b : bar diameter, inches
    cover : clear, from the top face to the bar, inches
    l_d : required development length past the face of the support, inches
    available : length of the bar past that face, inches
    bar_label : callout, e.g. ``#8 @ 5 in top``
    member : words for the cantilever
    scale : inches of the member in one inch of paper; by default the largest trade scale that fits

    Raises
    ------
    RangeError : a length that is not positive, or a bar deeper than the member
    """
    h_back = h_back or h
    refusal = Refusal("the cantilever detail")
    refusal.positive(span=span, h=h, h_back=h_back, support_width=support_width, d_b=d_b, cover=cover)
    refusal.positive(l_d=l_d, available=available)
    inside(refusal, cover + d_b, min(h, h_back), "h")
    refusal.settle()
    back = max(l_d, available, support_width) * 1.25
    deep = max(h, h_back)
    leg = 0.8 * deep
    drawing = Drawing(scale or scale_that_fits(back + span, deep + leg, 5.2, _HIGH))
    _cantilever_outline(drawing, span, h, h_back, support_width, back, deep + leg)
    level = -cover - d_b / 2
    drawing.bar([(-available, level), (span - cover, level)], d_b)
    critical_section(drawing, 0.0, -deep - leg, 0.0, "")
    lengths = (l_d, f"ℓ_{{d}} = {plain(l_d)}"), (available, f"{plain(available)} available")
    lengths_along(drawing, 0.0, 0.0, 0.18, *lengths, way=-1)
    drawing.dim_x(0.0, span, 0.0, 0.18)
    drawing.dim_x(-support_width, 0.0, -deep - leg, -0.2)
    drawing.dim_y(-h, 0.0, span, 0.22)
    callout(drawing, (0.45 * span, level), d_b, -h, bar_label)
    drawing.text("face of support", (0.0, -deep - 0.5 * leg), (0.06, -0.03), anchor="left", size=7.0, colour=SOFT)
    alt = (
        f"Elevation to scale of {member}: {feet_inches(span)} beyond a support {feet_inches(support_width)} wide, "
        f"{feet_inches(h)} deep; {bar_label} run {plain(available)} past the face of the support into the back span "
        f"and {plain(l_d)} is required: {word(l_d, available)}."
    )
    return drawing.finish(f"Top bars of {member}, {bar_label}", alt, [compared("ℓ_{d}", l_d, available)])


def _cantilever_outline(
    drawing: Drawing, span: float, h: float, h_back: float, support: float, back: float, foot: float
) -> None:
    """One outline through cantilever, support and back span; the ends that go on are left open and broken."""
    start = (-back, -h_back)
    inside = [start, (-support, -h_back), (-support, -foot), (0.0, -foot), (0.0, -h), (span, -h), (span, 0.0)]
    drawing.area([*inside, (-back, 0.0)])
    drawing.line((-back, 0.0), (span, 0.0), (span, -h), (0.0, -h), (0.0, -foot), name="outline")
    drawing.line(start, (-support, -h_back), (-support, -foot), name="outline")
    drawing.break_line(start, (-back, 0.0))
    drawing.break_line((-support, -foot), (0.0, -foot))


def _hook(start: float, level: float, radius: float, extension: float, bend: int) -> tuple[list[Point], Point]:
    """Centreline of the hook from the start of its bend, turning down, and the end of its tail."""
    turn = arc((start, level - radius), radius, 90, 90 - bend)
    x, y = turn[-1]
    tail = (x, y - extension) if bend == 90 else (x - extension, y)
    return [*turn, tail], tail


def _bend_callout(drawing: Drawing, centre: Point, radius: float, diameter: float, far: float) -> None:
    angle = math.radians(30)
    tip = (centre[0] + radius * math.cos(angle), centre[1] + radius * math.sin(angle))
    out = (far - tip[0]) / drawing.scale + 0.12
    drawing.leader(tip, (out, 0.1), f"{plain(diameter)} inside dia.")
