"""A joint of which a schedule states the covers at most: what is not stated is left open or broken off."""

from __future__ import annotations

from dataclasses import dataclass

from calcpack.figures.drawing import SOFT, Drawing, Point
from calcpack.figures.elevation import callout, inside
from calcpack.figures.ends import ABOVE, BELOW, BEYOND, Lengths, label_room, lengths_from, section_line, stated
from calcpack.figures.trade import Refusal, feet_inches

__all__ = ["FOOT", "Joint", "Surroundings"]

# Dimensions below a joint clear the end of the critical section, inches of paper.
FOOT = 0.24


@dataclass(frozen=True)
class Surroundings:
    """What is stated of the concrete around the end of a bar, inches; None where nobody states it.

    Attributes
    ----------
    beyond : from the outside of the hook or head to the far face of the joint
    cover : clear, from the top face of the member to the bar
    side_cover : clear, square to the elevation
    h : depth of the member
    """

    beyond: float | None = None
    cover: float | None = None
    side_cover: float | None = None
    h: float | None = None

    def check(self, refusal: Refusal, d_b: float, beyond: str) -> None:
        """Note what cannot be; `beyond` is the name of that argument."""
        stated(refusal, **{beyond: self.beyond, "cover": self.cover, "side_cover": self.side_cover, "h": self.h})
        if self.h is not None:
            refusal.unless(self.cover is not None, f"h = {self.h:g} in without a cover", "both, or neither", "add it")
            inside(refusal, (self.cover or 0.0) + d_b, self.h, "h")

    @property
    def sentence(self) -> str:
        """The covers and the depth, to end a sentence with."""
        told = (
            (self.beyond, "clear beyond it"),
            (self.cover, "clear above the bar"),
            (self.side_cover, "side cover"),
            (self.h, "depth of the member"),
        )
        return "".join(f", {feet_inches(value)} {words}" for value, words in told if value is not None)

    @property
    def notes(self) -> list[tuple[str, str]]:
        """What an elevation cannot show, as lines under it."""
        if self.side_cover is None:
            return []
        return [(f"Side cover {feet_inches(self.side_cover)}, square to this elevation", "")]


@dataclass(frozen=True)
class Joint:
    """The joint as it is drawn; the critical section is at x = 0 and the bar at y = 0, inches.

    Attributes
    ----------
    left, far : where the member is broken off, and the far face of the joint
    high, low : of the member
    top, foot : of the joint
    """

    drawing: Drawing
    around: Surroundings
    d_b: float
    left: float
    far: float
    high: float
    low: float
    top: float
    foot: float

    @classmethod
    def about(
        cls, drawing: Drawing, around: Surroundings, d_b: float, bar_label: str, low: Point, high: Point
    ) -> Joint:
        """Around a bar whose end, hook or head included, keeps between two corners; draws the concrete."""
        scale = drawing.scale
        face = d_b / 2 + (ABOVE * scale if around.cover is None else around.cover)
        # A hook that is too long for its joint lies in the member.
        lowest = min(-d_b / 2, low[1]) if low[0] < 0 else -d_b / 2
        bottom = lowest - BELOW * scale if around.h is None else face - around.h
        made = cls(
            drawing=drawing,
            around=around,
            d_b=d_b,
            left=min(0.0, low[0]) - label_room(bar_label) * scale,
            far=high[0] + (BEYOND * scale if around.beyond is None else around.beyond),
            high=face,
            low=bottom,
            top=max(face, high[1]) + ABOVE * scale,
            foot=min(bottom, low[1]) - ABOVE * scale,
        )
        made._concrete()
        return made

    def _concrete(self) -> None:
        """Faces that are stated as lines; the joint broken off above and below, the member at its left end."""
        drawing, left, far = self.drawing, self.left, self.far
        drawing.area([(left, self.low), (0.0, self.low), (0.0, self.high), (left, self.high)])
        drawing.area([(0.0, self.foot), (far, self.foot), (far, self.top), (0.0, self.top)])
        upper = [] if self.around.cover is None else [(left, self.high)]
        lower = [] if self.around.h is None else [(left, self.low)]
        drawing.line(*upper, (0.0, self.high), (0.0, self.top), name="outline")
        drawing.line(*lower, (0.0, self.low), (0.0, self.foot), name="outline")
        drawing.break_line((left, self.low), (left, self.high))
        if self.around.beyond is None:
            drawing.break_line((far, self.foot), (far, self.top))
        else:
            drawing.line((far, self.foot), (far, self.top), name="outline")
        for y in (self.foot, self.top):
            drawing.break_line((0.0, y), (far, y))

    def dimension(self, lengths: Lengths, end: float, section_label: str, bar_label: str) -> None:
        """The critical section, the lengths, the covers that are stated, and the callout of the bar.

        `end` is the outside of the hook or head.
        """
        drawing, around, d_b = self.drawing, self.around, self.d_b
        section_line(drawing, self.foot, self.top)
        drawing.text(section_label, (0.0, self.top), (-0.06, -0.12), anchor="right", size=7.0, colour=SOFT)
        lengths_from(drawing, self.top, lengths.dimensions)
        if around.beyond is not None:
            drawing.dim_x(end, self.far, self.foot, -FOOT)
        off = -0.2
        if around.cover is not None:
            off = drawing.dim_y(d_b / 2, self.high, self.left, off)
        if around.h is not None:
            drawing.dim_y(self.low, self.high, self.left, off - 0.1)
        callout(drawing, (self.left + 0.2 * drawing.scale, 0.0), d_b, self.low, bar_label)

    def call_out(self, tip: Point, rise: float, text: str) -> None:
        """A leader to a point of the bar from beyond the far face, `rise` above it on paper."""
        self.drawing.leader(tip, ((self.far - tip[0]) / self.drawing.scale + 0.12, rise), text)
