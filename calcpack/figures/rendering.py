"""From collected strokes and labels to SVG, the same bytes every time."""

from __future__ import annotations

import io
import re
import warnings
from collections.abc import Sequence
from typing import Any
from xml.sax.saxutils import quoteattr

from calcpack import fonts
from calcpack.figures.drawing import Figure, Label, Point, Stroke
from calcpack.figures.lettering import FAMILY, SUBSCRIPT, runs, text_width

__all__ = ["bounds", "render"]

_MARGIN = 0.05
_RC: Any = {"svg.hashsalt": "calcpack", "svg.fonttype": "none", "path.simplify": False, "text.usetex": False}


def bounds(strokes: Sequence[Stroke], labels: Sequence[Label]) -> tuple[float, float, float, float]:
    """Left, bottom, right, top of everything drawn, inches of paper."""
    boxes = [label.box for label in labels]
    for stroke in strokes:
        reach = stroke.radius + stroke.pen.weight / 144
        boxes += [(x - reach, y - reach, x + reach, y + reach) for x, y in stroke.points]
    return min(b[0] for b in boxes), min(b[1] for b in boxes), max(b[2] for b in boxes), max(b[3] for b in boxes)


def render(strokes: Sequence[Stroke], labels: Sequence[Label], caption: str, alt: str) -> Figure:
    """Draw on a page just large enough."""
    import matplotlib as mpl
    from matplotlib.backends.backend_svg import FigureCanvasSVG
    from matplotlib.figure import Figure as Page

    left, bottom, right, top = bounds(strokes, labels)
    width, height = right - left + 2 * _MARGIN, top - bottom + 2 * _MARGIN
    with mpl.rc_context(_RC):
        page = Page(figsize=(width, height), facecolor="none")
        axes = page.add_axes((0.0, 0.0, 1.0, 1.0))
        axes.set_axis_off()
        axes.set_xlim(left - _MARGIN, right + _MARGIN)
        axes.set_ylim(bottom - _MARGIN, top + _MARGIN)
        for order, stroke in enumerate(strokes):
            axes.add_artist(_patch(stroke, order))
        for label in labels:
            _write(axes, label)
        buffer = io.StringIO()
        nothing = {"Date": None, "Creator": None, "Format": None, "Type": None}
        canvas: Any = FigureCanvasSVG(page)
        with warnings.catch_warnings():
            # A Greek or Cyrillic mark is shown in another face by whoever draws the SVG; only its width is a guess.
            warnings.filterwarnings("ignore", message="Glyph .* missing from font")
            canvas.print_svg(buffer, metadata=nothing)
    return Figure(_tidied(buffer.getvalue(), alt), caption, alt, round(width, 4), round(height, 4))


def _patch(stroke: Stroke, order: int) -> Any:
    from matplotlib.patches import Circle, Polygon

    pen = stroke.pen
    dashes = (0, tuple(pen.weight * dash for dash in pen.dashes)) if pen.dashes else "solid"
    style = {
        "facecolor": stroke.fill or "none",
        "edgecolor": pen.colour if pen.weight else "none",
        "linewidth": pen.weight,
        "linestyle": "solid",
        "joinstyle": "round" if stroke.name in {"bar", "tie"} else "miter",
        "capstyle": "butt",
        "clip_on": False,
        "zorder": 1 + order / 10000,
        "gid": stroke.name or None,
    }
    if stroke.radius:
        patch: Any = Circle(stroke.points[0], stroke.radius, **style)
    else:
        patch = Polygon(stroke.points, closed=stroke.closed, **style)
    if pen.dashes:
        patch.set_linestyle(dashes)
    return patch


def _write(axes: Any, label: Label) -> None:
    pieces = runs(label.text)
    if len(pieces) == 1:
        _put(axes, label, label.text, label.at, label.size, label.anchor)
        return
    width = text_width(label.text, label.size, label.weight)
    along = -{"left": 0.0, "center": width / 2, "right": width}[label.anchor]
    for piece, lowered in pieces:
        size = label.size * (SUBSCRIPT if lowered else 1.0)
        down = -0.2 * label.size / 72 if lowered else 0.0
        # Leading spaces would collapse in SVG, so the run starts after them.
        lead = text_width(" " * (len(piece) - len(piece.lstrip())), size, label.weight)
        _put(axes, label, piece.strip(), _turned(label, along + lead, down), size, "left")
        along += text_width(piece, size, label.weight)


def _turned(label: Label, along: float, up: float) -> Point:
    x, y = label.at
    return (x - up, y + along) if label.turn else (x + along, y + up)


def _put(axes: Any, label: Label, text: str, at: Point, size: float, anchor: str) -> None:
    from matplotlib.font_manager import FontProperties

    face = FontProperties(
        family=list(FAMILY),
        fname=str(fonts.matplotlib_face(label.weight)),
        size=size,
        weight=label.weight,
        stretch="condensed",
    )
    axes.text(
        *at,
        text,
        fontproperties=face,
        color=label.colour,
        ha=anchor,
        va="baseline",
        rotation=label.turn,
        rotation_mode="anchor",
        clip_on=False,
        zorder=5,
        parse_math=False,
    )


def _tidied(svg: str, alt: str) -> str:
    """The bare ``svg`` element, fit to stand inside a page: no ids or classes to clash, no style sheet."""
    body = svg[svg.index("<svg") :]
    body = re.sub(r"\s*<defs>\s*<style.*?</style>\s*</defs>", "", body, flags=re.S)
    body = re.sub(r'<g id="(?:figure|axes|patch|text|line2d)_\d+">', "<g>", body)
    body = re.sub(r"\s*<!--.*?-->", "", body, flags=re.S)
    body = re.sub(r' id="([^"]+)"', r' data-part="\1"', body)
    return body.replace("<svg ", f'<svg role="img" aria-label={quoteattr(alt)} stroke-linejoin="round" ', 1)
