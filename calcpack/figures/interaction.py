"""Interaction of axial force and moment: a diagram in one vertical plane, and a contour at one axial force."""

from __future__ import annotations

import math
from collections.abc import Iterable, Sequence
from itertools import pairwise

from calcpack.errors import Problem, RangeError
from calcpack.figures.charts import (
    DESIGN,
    GOVERNING,
    LOAD,
    MINOR,
    Chart,
    Mark,
    edges,
    even_axis,
    round_axis,
    round_step,
    signed,
)
from calcpack.figures.drawing import DIMENSION, HIDDEN, Figure, Pen, Point
from calcpack.figures.lettering import runs
from calcpack.figures.trade import Refusal

__all__ = ["interaction_diagram", "moment_contour"]

# Whole figure and the field of the chart on paper, inches.
_WIDTH, _HEIGHT = 2.9, 2.3
_KIP, _KIP_FT = 1e3, 12e3
# The curve joins sampled points; the ratio comes from the surface itself. They differ by less than this share.
_SAME = 0.02
_NEAR = 0.1
Legend = list[tuple[Pen | Mark, str]]


def interaction_diagram(
    *,
    P: Sequence[float],
    M: Sequence[float],
    P_nominal: Sequence[float],
    M_nominal: Sequence[float],
    loads: Sequence[Point],
    governing: tuple[float, float, float],
    cap: float,
    mark: str = "",
    plane: str = "",
) -> Figure:
    """Axial force against moment in the vertical plane of the governing load.

    Parameters
    ----------
    P, M : design strength from pure tension (P below zero) to pure compression, lb and lb*in; what lies above `cap`
        is cut off
    P_nominal, M_nominal : nominal strength, likewise, not cut
    loads : moment, lb*in, and axial force, lb, of every load; one in another plane by its own resultant moment
    governing : moment, lb*in, axial force, lb, and ratio along the ray from the origin, of the governing load
    cap : maximum design axial strength, lb
    mark : the column's mark, for caption and alternative text
    plane : the plane as it is named above the chart, e.g. ``M_{x} alone`` or ``34° from M_{y} to M_{x}``

    Raises
    ------
    RangeError : a curve that does not run from tension to compression, a number that is not finite, a moment below
        zero, or a ratio that does not agree with the curve
    """
    refusal = Refusal("the interaction diagram")
    _runs(refusal, "P, M", P, M)
    _runs(refusal, "P_nominal, M_nominal", P_nominal, M_nominal)
    _loads_hold(refusal, loads, governing)
    most = max(P, default=0.0)
    given, allowed = f"cap = {cap:g} lb", f"above 0 lb and no more than the design curve, {most:g} lb"
    refusal.unless(0 < cap <= most * (1 + 1e-6), given, allowed, "give the maximum design axial strength")
    refusal.settle()
    (point,), ratio = _kips([governing[:2]]), governing[2]
    design = _cut(_kips(zip(M, P, strict=True)), cap / _KIP)
    nominal, others = _kips(zip(M_nominal, P_nominal, strict=True)), _kips(loads)
    _agrees(design, point, ratio)
    chart = _force_chart([*design, *nominal, *others, point])
    chart.curve(nominal, HIDDEN, "nominal")
    chart.curve(design, DESIGN, "design")
    _ray(chart, point, 1 / ratio if ratio else math.inf)
    _marks(chart, [(load, LOAD) for load in others], point)
    chart.beside(_ratio(ratio), point, weight=600)
    chart.above(f"maximum {_written(cap / _KIP)} kip", (0.0, cap / _KIP))
    named = f", {_plain(plane)}" if plane else ""
    other = " (loads in other planes by their resultant moment)" if len(others) > 1 else ""
    caption = f"Interaction diagram of {_column(mark)}{named}{other}"
    alt = f"Axial force against moment for {_column(mark)}{named}: {_told(design, others, point, ratio)}"
    legend: Legend = [(DESIGN, "design"), (HIDDEN, "nominal"), (LOAD, "load"), (GOVERNING, "governing")]
    return chart.finish(plane, ("moment, kip·ft", "axial force, kip, compression above 0"), legend, caption, alt)


def moment_contour(
    *,
    Mx: Sequence[float],
    My: Sequence[float],
    loads: Sequence[tuple[float, float, float]],
    governing: Point,
    P: float,
    mark: str = "",
    near: float = 0.0,
) -> Figure:
    """Design moments about both axes at one axial force, equal scales.

    Parameters
    ----------
    Mx, My : design moments all the way round, lb*in; the last point joins the first
    loads : Mx, My, lb*in, and P, lb, of every load; those whose P is near that of the contour stand out
    governing : Mx and My of the governing load, lb*in
    P : axial force of the contour, compression above zero, lb
    mark : the column's mark, for caption and alternative text
    near : how far from `P` a load still stands out, lb; by default a tenth of the largest P

    Raises
    ------
    RangeError : a contour that does not go round the origin, or a number that is not finite
    """
    refusal = Refusal("the moment contour")
    _goes_round(refusal, Mx, My)
    _finite(refusal, "load", loads, ("Mx", "My", "P"))
    _finite(refusal, "governing", [governing], ("Mx", "My"))
    refusal.unless(math.isfinite(P), f"P = {P:g} lb", "a finite axial force", "correct it")
    refusal.unless(0 <= near < math.inf, f"near = {near:g} lb", "0 lb or more", "correct it")
    refusal.settle()
    # Across My, up Mx.
    contour = _kip_ft([*zip(My, Mx, strict=True), (My[0], Mx[0])])
    (point,), others = _kip_ft([governing[::-1]]), _kip_ft((y, x) for x, y, _ in loads)
    reach = near or _NEAR * max(map(abs, (P, *(load[2] for load in loads))))
    kinds = [LOAD if abs(load[2] - P) <= reach else MINOR for load in loads]
    chart = _moment_chart([*contour, *others, point])
    chart.curve(contour, DESIGN, "design", closed=True)
    _ray(chart, point, _exit(contour, point))
    _marks(chart, list(zip(others, kinds, strict=True)), point)
    level, spread = f"{_written(P / _KIP)} kip", f"{_written(reach / _KIP)} kip"
    caption = f"Design moments of {_column(mark)} at P = {level}"
    alt = (
        f"Contour of design moments of {_column(mark)} at an axial force of {level}: about x {_span(Mx)}, "
        f"about y {_span(My)}; {_count(loads)}, the governing one at Mx = {_written(point[1])} kip·ft, "
        f"My = {_written(point[0])} kip·ft."
    )
    legend: Legend = [
        (DESIGN, "design"),
        (LOAD, f"P ± {spread}"),
        (MINOR, "other P"),
        (GOVERNING, "governing"),
    ]
    return chart.finish(f"P = {level}", ("M_{y}, kip·ft", "M_{x}, kip·ft"), legend, caption, alt)


def _runs(refusal: Refusal, names: str, P: Sequence[float], M: Sequence[float]) -> None:
    """The curve is one of pairs, finite, from tension to compression, its moments not below zero."""
    if len(P) != len(M) or len(P) < 3:
        refusal.unless(False, f"{names}: {len(P)} and {len(M)} numbers", "3 pairs or more", "give the curve by points")
        return
    finite = all(map(math.isfinite, (*P, *M)))
    refusal.unless(finite, f"{names}: a number that is not finite", "finite forces and moments", "correct the curve")
    rising = P[0] < 0 < P[-1]
    given = f"{names}: from {P[0]:g} lb to {P[-1]:g} lb"
    refusal.unless(rising or not finite, given, "from tension, below 0, to compression", "order the points")
    # The ends of a sampled curve may miss zero by rounding.
    least, allowed = min(M), -1e-6 * max(map(abs, M))
    refusal.unless(least >= allowed or not finite, f"{names}: M = {least:g} lb*in", "0 lb*in or more", "give sizes")


def _goes_round(refusal: Refusal, Mx: Sequence[float], My: Sequence[float]) -> None:
    if len(Mx) != len(My) or len(Mx) < 3:
        refusal.unless(False, f"Mx, My: {len(Mx)} and {len(My)} numbers", "3 pairs or more", "give it by points")
        return
    if not all(map(math.isfinite, (*Mx, *My))):
        refusal.unless(False, "Mx, My: a number that is not finite", "finite moments", "take a P within the strength")
        return
    angles = [math.atan2(x, y) for x, y in zip(Mx, My, strict=True)]
    steps = [math.remainder(b - a, 2 * math.pi) for a, b in pairwise([*angles, angles[0]])]
    turns = abs(sum(steps)) / (2 * math.pi)
    given = f"Mx, My: {turns:.0f} times round the origin"
    refusal.unless(abs(turns - 1) < 0.01, given, "once round", "give directions all the way round")


def _loads_hold(refusal: Refusal, loads: Sequence[Point], governing: tuple[float, float, float]) -> None:
    _finite(refusal, "load", loads, ("M", "P"))
    _finite(refusal, "governing", [governing], ("M", "P", "ratio"))
    for moment, force in (*loads, governing[:2]):
        given = f"a load with M = {moment:g} lb*in, P = {force:g} lb"
        refusal.unless(not moment < 0, given, "a moment of 0 lb*in or more", "give its size")
    refusal.unless(not governing[2] < 0, f"ratio = {governing[2]:g}", "0 or more", "correct it")


def _finite(refusal: Refusal, what: str, rows: Iterable[Sequence[float]], names: Sequence[str]) -> None:
    for row in rows:
        given = ", ".join(f"{name} = {value:g}" for name, value in zip(names, row, strict=True))
        refusal.unless(all(map(math.isfinite, row)), f"{what}: {given}", "finite numbers", "correct the load")


def _agrees(curve: Sequence[Point], point: Point, ratio: float) -> None:
    """The ratio is what the drawn curve says it is.

    Raises
    ------
    RangeError : it is another one
    """
    drawn = 1 / _exit(curve, point)
    if abs(drawn - ratio) > _SAME * max(drawn, ratio):
        given = f"ratio = {ratio:.3f} at M = {_written(point[0])} kip·ft, P = {_written(point[1])} kip"
        allowed = f"{drawn:.3f}, where the ray from the origin meets the design curve"
        remedy = "give curve and ratio of the same plane"
        raise RangeError("the interaction diagram cannot be drawn", [Problem(given, allowed, remedy)])


def _exit(curve: Sequence[Point], point: Point) -> float:
    """By how much a load may grow before it meets the curve; infinite for no load."""
    (px, py), found = point, []
    for (ax, ay), (bx, by) in pairwise(curve):
        ux, uy = bx - ax, by - ay
        across = px * uy - py * ux
        if across:
            share, grown = (ax * py - ay * px) / across, (ax * uy - ay * ux) / across
            if -1e-9 <= share <= 1 + 1e-9 and grown > 0:
                found.append(grown)
    return min(found, default=math.inf)


def _cut(curve: Sequence[Point], cap: float) -> list[Point]:
    """The curve with what lies above the cap replaced by a level line."""
    high = cap * (1 + 1e-9)
    kept = [(m, min(p, cap)) for m, p in curve[:1]]
    for (m1, p1), (m2, p2) in pairwise(curve):
        if (p1 > high) != (p2 > high):
            kept.append((m1 + (m2 - m1) * (cap - p1) / (p2 - p1), cap))
        if p2 <= high:
            kept.append((m2, min(p2, cap)))
    return [*kept, (curve[-1][0], cap)] if curve[-1][1] > high else kept


def _kips(points: Iterable[Point]) -> list[Point]:
    return [(moment / _KIP_FT, force / _KIP) for moment, force in points]


def _kip_ft(points: Iterable[Point]) -> list[Point]:
    return [(one / _KIP_FT, other / _KIP_FT) for one, other in points]


def _force_chart(points: Sequence[Point]) -> Chart:
    x = round_axis(0.0, max(m for m, _ in points), 5)
    y = round_axis(min(p for _, p in points), max(p for _, p in points), 8)
    return Chart(x, y, _WIDTH - edges(x, y), _HEIGHT)


def _moment_chart(points: Sequence[Point]) -> Chart:
    """Both axes at one scale, each to the ends of the field."""
    xs, ys = [x for x, _ in points], [y for _, y in points]
    wide, high = 1.08 * (max(xs) - min(xs)), 1.08 * (max(ys) - min(ys))
    # The numbers along y take room from x, and how long they are hangs on the scale: twice is enough.
    width = _WIDTH - 0.6
    for _ in range(2):
        scale = max(wide / width, high / _HEIGHT)
        step = round_step(scale * width, 8)
        x, y = even_axis(xs, scale * width, step), even_axis(ys, scale * _HEIGHT, step)
        width = _WIDTH - edges(x, y)
    return Chart(x, y, (x.high - x.low) / scale, _HEIGHT)


def _ray(chart: Chart, point: Point, room: float) -> None:
    """From the origin through a load to where it meets the curve, or to the load where that is further."""
    if math.isfinite(room):
        far = max(room, 1.0)
        chart.curve([(0.0, 0.0), (point[0] * far, point[1] * far)], DIMENSION, "ray")


def _marks(chart: Chart, loads: Sequence[tuple[Point, Mark]], governing: Point) -> None:
    """Every load once, the small marks below the others, the governing one on top."""
    apart = [(load, mark) for load, mark in loads if math.dist(load, governing) > 1e-6 * math.hypot(*governing)]
    for load, mark in sorted(dict.fromkeys(apart), key=lambda pair: pair[1].diameter):
        chart.mark(load, mark, "load")
    chart.mark(governing, GOVERNING, "governing")


def _written(value: float) -> str:
    """A force or a moment as the alternative text and the labels give it."""
    return signed(f"{value:,.0f}" if abs(value) >= 100 else f"{value:.1f}")


def _ratio(ratio: float) -> str:
    """Two decimals, or as many as it takes to be seen on its side of 1."""
    places = next((n for n in (2, 3, 4) if (float(f"{ratio:.{n}f}") > 1) == (ratio > 1)), 5)
    return f"{ratio:.{places}f}"


def _column(mark: str) -> str:
    return f"column {mark}" if mark else "a column"


def _plain(text: str) -> str:
    """Text with its subscripts on the line."""
    return "".join(piece for piece, _ in runs(text))


def _count(loads: Sequence[object]) -> str:
    return "1 load" if len(loads) == 1 else f"{len(loads)} loads"


def _span(moments: Sequence[float]) -> str:
    low, high = (_written(moment / _KIP_FT) for moment in (min(moments), max(moments)))
    return f"from {low} to {high} kip·ft"


def _told(design: Sequence[Point], loads: Sequence[Point], point: Point, ratio: float) -> str:
    forces = [p for _, p in design]
    return (
        f"design strength from {_written(min(forces))} kip (tension) to {_written(max(forces))} kip, "
        f"the largest design moment {_written(max(m for m, _ in design))} kip·ft; {_count(loads)}, "
        f"the governing one at M = {_written(point[0])} kip·ft, P = {_written(point[1])} kip, ratio {_ratio(ratio)}."
    )
