"""Dowels between a footing and a column, in elevation and to scale."""

from __future__ import annotations

from calcpack.figures.drawing import GREY, Drawing, Figure, arc
from calcpack.figures.elevation import column, compared, inside, lengths_up, plain, word
from calcpack.figures.trade import Refusal, feet_inches, scale_that_fits

__all__ = ["dowel_detail"]


def dowel_detail(
    *,
    column_h: float,
    footing_width: float,
    footing_h: float,
    d_b: float,
    bend_diameter: float,
    extension: float,
    cover: float,
    column_cover: float,
    lap: float,
    lap_available: float,
    l_dc: float,
    embedment: float,
    bar_label: str,
    mark: str = "",
    scale: float = 0.0,
) -> Figure:
    """Dowels from a footing into a column: lap above, embedment below, each with the length it needs.

    Parameters
    ----------
    column_h : side of the column seen, inches
    footing_width, footing_h : of the footing, inches
    d_b : dowel diameter, inches
    bend_diameter, extension : inside diameter and straight extension of the hook at its foot, inches
    cover : clear, below the hook, inches
    column_cover : from the face of the column to the dowel, inches
    lap, lap_available : required length of the lap splice and the length the dowel rises, inches
    l_dc, embedment : required development length and straight length above the bend, inches
    bar_label : callout, e.g. ``8-#9 dowels``
    mark : the column's mark
    scale : inches of the member in one inch of paper; by default the largest trade scale that fits

    Raises
    ------
    RangeError : a length that is not positive, a column wider than its footing, or dowels that do not fit
    """
    radius = (bend_diameter + d_b) / 2
    room = column_h / 2 - column_cover - d_b / 2
    refusal = Refusal("the dowel detail")
    refusal.positive(column_h=column_h, footing_width=footing_width, footing_h=footing_h, d_b=d_b, cover=cover)
    refusal.positive(bend_diameter=bend_diameter, extension=extension, column_cover=column_cover)
    refusal.positive(lap=lap, lap_available=lap_available, l_dc=l_dc, embedment=embedment)
    inside(refusal, column_h, footing_width, "footing_width")
    depth = embedment + radius + d_b / 2 + cover
    refusal.unless(
        depth <= footing_h + 1e-6,
        f"embedment, bend and cover take {depth:g} in",
        f"footing_h = {footing_h:g} in",
        "shorten the embedment or deepen the footing",
    )
    refusal.unless(room > d_b, f"column_cover = {column_cover:g} in", "two dowels side by side in the column", "")
    refusal.settle()
    top = 1.2 * max(lap, lap_available)
    drawing = Drawing(scale or scale_that_fits(footing_width, footing_h + top, 3.2, 3.8))
    column(drawing, (-column_h / 2, 0.0), (column_h / 2, top), open_foot=False)
    half = footing_width / 2
    drawing.rectangle(-half, -footing_h, half, 0.0, name="outline")
    for side in (-1, 1):
        _dowel(drawing, side, room, d_b, radius, extension, embedment, lap_available, top)
    face = column_h / 2
    _lengths(drawing, face, half, lap, lap_available, l_dc, embedment)
    drawing.dim_y(-footing_h, 0.0, -half, -0.24)
    drawing.dim_x(-half, half, -footing_h, -0.24)
    drawing.dim_x(-face, face, top, 0.2)
    drawing.leader((-room, 0.35 * lap_available), (-face / drawing.scale + room / drawing.scale - 0.3, 0.12), bar_label)
    verdicts = [compared("Lap ℓ_{sc}", lap, lap_available), compared("Embedment ℓ_{dc}", l_dc, embedment)]
    name = f"column {mark}" if mark else "the column"
    alt = (
        f"Elevation to scale: {bar_label}, {d_b:.3f} in in diameter, from a footing {feet_inches(footing_width)} wide "
        f"and {feet_inches(footing_h)} thick into {name}, {feet_inches(column_h)}; lap {plain(lap)} required and "
        f"{plain(lap_available)} provided: {word(lap, lap_available)}; straight embedment {plain(l_dc)} required and "
        f"{plain(embedment)} provided: {word(l_dc, embedment)}."
    )
    return drawing.finish(f"Dowels of {name}, {bar_label}", alt, verdicts)


def _dowel(
    drawing: Drawing,
    side: int,
    room: float,
    d_b: float,
    radius: float,
    extension: float,
    embedment: float,
    rise: float,
    top: float,
) -> None:
    """One dowel, hooked outward, and beside it the column bar that it laps; the bar is drawn in grey."""
    centre = (side * (room + radius), -embedment)
    turn = arc(centre, radius, 180, 270) if side > 0 else arc(centre, radius, 0, -90)
    end = (centre[0] + side * extension, centre[1] - radius)
    drawing.bar([(side * room, rise), *turn, end], d_b, name="bar")
    inner = side * (room - 1.3 * d_b)
    drawing.bar([(inner, 0.06 * top), (inner, top)], d_b, colour=GREY, name="bar")


def _lengths(
    drawing: Drawing, face: float, half: float, lap: float, lap_available: float, l_dc: float, embedment: float
) -> None:
    """Lap and embedment, required and as detailed."""
    laps = (lap, f"ℓ_{{sc}} = {plain(lap)}"), (lap_available, f"{plain(lap_available)} lap")
    lengths_up(drawing, 0.0, face, 0.2, *laps)
    lengths_up(drawing, 0.0, half, 0.2, (l_dc, f"ℓ_{{dc}} = {plain(l_dc)}"), (embedment, plain(embedment)), way=-1)
