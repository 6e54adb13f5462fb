"""Lap splices: two bars side by side with the lap they need and have, and the laps of parallel bars."""

from __future__ import annotations

from itertools import pairwise

from calcpack.figures.drawing import GREY, SOFT, THIN, Drawing, Figure
from calcpack.figures.elevation import lengths_along, plain
from calcpack.figures.ends import BELOW, Lengths, force, label_room, of, short_scale, stated
from calcpack.figures.trade import Refusal, feet_inches, scale_that_fits

__all__ = ["lap_detail", "lap_stagger"]

# Bars touch in a contact lap; the hairline between them, points, shows where one ends and the other goes on.
_HAIRLINE, _THINNEST = 0.6, 0.7
# A bar thinner than this on paper, points, shows nothing of its size: the middle of a long lap is left out before that.
_LEGIBLE = 1.5
_PAPER, _LEFT_OUT = 3.6, 0.16


def _placeholder() -> None: ...
