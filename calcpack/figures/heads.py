"""Hooked and headed bars in a joint, to scale, with as much of the joint as is stated."""

from __future__ import annotations

import math

from calcpack.figures.drawing import INK, Drawing, Figure, Point, arc
from calcpack.figures.ends import Lengths, of, short_scale
from calcpack.figures.joints import FOOT, Joint, Surroundings
from calcpack.figures.trade import Refusal, feet_inches, inches

__all__ = ["headed_detail", "hooked_end"]

_WIDE, _HIGH = 2.8, 1.7


def headed_detail(
    *,
    d_b: float,
    head_width: float,
    l_dt: float,
    available: float | None,
    bar_label: str,
    head_thickness: float = 0.0,
    head_label: str = "",
    head_cover: float | None = None,
    cover: float | None = None,
    side_cover: float | None = None,
    h: float | None = None,
    section_label: str = "critical section",
    mark: str = "",
    scale: float = 0.0,
) -> Figure:
    """A headed bar in a joint: the bearing face, the length it needs and the length it has.

    Parameters
    ----------
    d_b : bar diameter, inches
    head_width : of the head in elevation, inches
    l_dt : required length from the critical section to the bearing face of the head, inches
    available : the same length as detailed, inches; None where it is not stated
    bar_label : callout, e.g. ``3-#8``
    head_thickness : inches; drawn as one bar diameter by default
    head_label : callout of the head; its width by default
    head_cover : clear, from the head to the far face of the joint, inches; None where it is not stated
    cover : clear, from the top face of the member to the bar, inches; None where it is not stated
    side_cover : clear, square to the elevation, inches, noted below it; None where it is not stated
    h : depth of the member that the bar comes from, inches, with its cover; None where it is not stated
    section_label, mark : words for the critical section and the place
    scale : inches of the member in one inch of paper; by default the largest trade scale that fits

    Raises
    ------
    RangeError : a length that is not positive, a head no wider than the bar, or a bar deeper than the member
    """
    thick, half = head_thickness or d_b, head_width / 2
    label = head_label or f"head {feet_inches(head_width)} wide"
    lengths, around = Lengths("ℓ_{dt}", l_dt, available), Surroundings(head_cover, cover, side_cover, h)
    refusal = Refusal("the headed detail")
    refusal.positive(d_b=d_b, head_width=head_width, head_thickness=thick)
    lengths.check(refusal, "l_dt")
    around.check(refusal, d_b, "head_cover")
    refusal.unless(head_width > d_b, f"head_width = {head_width:g} in", f"more than the bar, {d_b:g} in", "correct it")
    refusal.settle()
    bearing = lengths.drawn
    end = bearing + thick
    wide = max(lengths.reach, end + (head_cover or 0.0))
    drawing = Drawing(short_scale(scale, wide, max(h or 0.0, head_width), _WIDE, _HIGH))
    joint = Joint.about(drawing, around, d_b, bar_label, (bearing, -half), (end, half))
    drawing.rectangle(bearing, -half, end, half, fill=INK, name="head")
    drawing.bar([(joint.left, 0.0), (bearing, 0.0)], d_b)
    joint.dimension(lengths, end, section_label, bar_label)
    joint.call_out((end, 0.5 * half), 0.12, label)
    joint.call_out((bearing, -half), -0.2, "bearing face")
    alt = (
        f"Elevation to scale{of(mark)}: {bar_label}, {d_b:.3f} in in diameter, with a {label}{around.sentence}; "
        f"from the {section_label} to the bearing face of the head {lengths.sentence}."
    )
    return drawing.finish(f"Headed {bar_label} in a joint", alt, [*lengths.verdicts, *around.notes])


def hooked_end(
    *,
    d_b: float,
    bend: int,
    bend_diameter: float,
    extension: float,
    l_dh: float,
    available: float | None,
    bar_label: str,
    tail_cover: float | None = None,
    cover: float | None = None,
    side_cover: float | None = None,
    section_label: str = "critical section",
    mark: str = "",
    scale: float = 0.0,
) -> Figure:
    """A standard hook in a joint of which the schedule states covers at most: bend and extension to scale.

    Parameters
    ----------
    d_b : bar diameter, inches
    bend : 90 or 180, degrees
    bend_diameter : inside diameter of the bend, inches
    extension : straight extension past the bend, inches
    l_dh : required length from the critical section to the outside of the hook, inches
    available : the same length as detailed, inches; None where it is not stated
    bar_label : callout, e.g. ``3-#8``
    tail_cover : clear, from the outside of the hook to the far face of the joint, inches; None where it is not stated
    cover : clear, from the top face of the member to the bar, inches; None where it is not stated
    side_cover : clear, square to the elevation, inches, noted below it; None where it is not stated
    section_label, mark : words for the critical section and the place
    scale : inches of the member in one inch of paper; by default the largest trade scale that fits

    Raises
    ------
    RangeError : a length that is not positive, or a bend that is not 90 or 180 degrees
    """
    lengths, around = Lengths("ℓ_{dh}", l_dh, available), Surroundings(tail_cover, cover, side_cover)
    refusal = Refusal("the detail of a hooked end")
    refusal.positive(d_b=d_b, bend_diameter=bend_diameter, extension=extension)
    lengths.check(refusal, "l_dh")
    around.check(refusal, d_b, "tail_cover")
    refusal.unless(bend in (90, 180), f"bend = {bend} degrees", "90 or 180 degrees (a standard hook)", "correct it")
    refusal.settle()
    outside, radius = lengths.drawn, (bend_diameter + d_b) / 2
    path = _hook((outside - d_b / 2 - radius, -radius), radius, extension, bend)
    (start, _), (tail, deep) = path[0], (path[-1][0], path[-1][1] - (d_b / 2 if bend == 180 else 0.0))
    wide = max(lengths.reach, outside + (tail_cover or 0.0))
    drawing = Drawing(short_scale(scale, wide, -deep, _WIDE, _HIGH))
    joint = Joint.about(drawing, around, d_b, bar_label, (min(start, tail), deep), (outside, 0.0))
    drawing.bar([(joint.left, 0.0), *path], d_b)
    joint.dimension(lengths, outside, section_label, bar_label)
    _dimension_hook(joint, path, bend, bend_diameter, extension)
    alt = (
        f"Elevation to scale{of(mark)}: {bar_label}, {d_b:.3f} in in diameter, ends in a standard {bend} degree hook, "
        f"bend diameter {inches(bend_diameter)} in inside, extension {inches(extension)} in{around.sentence}; from the "
        f"{section_label} to the outside of the hook {lengths.sentence}."
    )
    return drawing.finish(f"Standard {bend}° hook of {bar_label}", alt, [*lengths.verdicts, *around.notes])


def _hook(centre: Point, radius: float, extension: float, bend: int) -> list[Point]:
    """Centreline of the hook from the start of its bend, turning down, to the end of its tail."""
    turn = arc(centre, radius, 90, 90 - bend)
    x, y = turn[-1]
    return [*turn, (x, y - extension) if bend == 90 else (x - extension, y)]


def _dimension_hook(joint: Joint, path: list[Point], bend: int, bend_diameter: float, extension: float) -> None:
    """The bend and the extension; that of a 180-degree hook is carried below the joint, clear of the bar."""
    drawing, d_b, text = joint.drawing, joint.d_b, f"{inches(extension)} in ext."
    (x, _), (tail, low) = path[0], path[-1]
    outer, angle = (bend_diameter + 2 * d_b) / 2, math.radians(30)
    tip = (x + outer * math.cos(angle), outer * math.sin(angle) - (bend_diameter + d_b) / 2)
    joint.call_out(tip, 0.1, f"{inches(bend_diameter)} in inside dia.")
    if bend == 90:
        drawing.dim_y(low, low + extension, joint.far, 0.24, text)
        return
    for at in (tail, tail + extension):
        start, end = drawing.paper((at, low - d_b / 2), (0.0, -0.04)), drawing.paper((at, joint.foot))
        drawing.stroke(start, end)
    drawing.dim_x(tail, tail + extension, joint.foot, -FOOT, text, "left")
