"""Sections and loads that several tests use; bars by rows as a schedule has them."""

from __future__ import annotations

from itertools import product

import numpy as np
from numpy.typing import NDArray

from calcpack.mechanics import Section, Surface, circle, polygon, rectangle, rule_318_19

Floats = NDArray[np.float64]

# An L, a channel and a tee, in, as an architect draws them: from a corner, in the first quadrant.
L_SHAPE = [(0, 0), (30, 0), (30, 10), (10, 10), (10, 40), (0, 40)]
L_BARS = [(2.5, 2.5), (27.5, 2.5), (27.5, 7.5), (7.5, 7.5), (2.5, 37.5), (7.5, 37.5)]
CHANNEL = [(0, 0), (40, 0), (40, 30), (32, 30), (32, 8), (8, 8), (8, 30), (0, 30)]
CHANNEL_BARS = [(3, 3), (20, 3), (37, 3), (3, 27), (37, 27), (5, 15), (35, 15)]
TEE = [(0, 0), (10, 0), (10, 20), (30, 20), (30, 28), (-20, 28), (-20, 20), (0, 20)]
TEE_BARS = [(2.5, 2.5), (7.5, 2.5), (2.5, 25.5), (7.5, 25.5), (-17, 24), (27, 24)]


def around(b: float, h: float, n_x: int, n_y: int, A_b: float, edge: float = 2.5) -> list[tuple[float, float, float]]:
    """Bars around a rectangle, n_x along each face parallel to x and n_y along each other, corners in both."""
    x, y = np.linspace(-b / 2 + edge, b / 2 - edge, n_x), np.linspace(-h / 2 + edge, h / 2 - edge, n_y)
    faces = [*product(x, (y[0], y[-1])), *product((x[0], x[-1]), y[1:-1])]
    return [(float(at_x), float(at_y), A_b) for at_x, at_y in faces]


def ring(radius: float, count: int, A_b: float, first: float = 0.0) -> list[tuple[float, float, float]]:
    """Bars on a circle, the first at an angle from +x, rad."""
    angles = first + 2 * np.pi * np.arange(count) / count
    return [(float(radius * np.cos(angle)), float(radius * np.sin(angle)), A_b) for angle in angles]


def tied(b: float = 16, h: float = 24, n_x: int = 3, n_y: int = 4, A_b: float = 1.27, **materials: float) -> Section:
    """A rectangular section with bars around it."""
    return rectangle(b, h, around(b, h, n_x, n_y, A_b), **{"f_c": 5000.0, "f_y": 60_000.0, **materials})


def with_bars(outline: list[tuple[float, float]], bars: list[tuple[float, float]], A_b: float = 1.0) -> Section:
    """A polygon with equal bars."""
    return polygon(outline, [(x, y, A_b) for x, y in bars], f_c=5000, f_y=60_000)


def samples() -> dict[str, Section]:
    """Sections of every kind: symmetric about both axes, about one, about none; polygons, circles, an opening."""
    return {
        "rectangle": tied(),
        "square": tied(20, 20, 3, 3, 1.0, f_c=4000),
        "wide, Grade 80": tied(30, 14, 5, 2, 1.0, f_c=8000, f_y=80_000),
        "Grade 100": tied(18, 18, 3, 3, 1.0, f_c=10_000, f_y=100_000),
        "circle": circle(20, ring(7, 8, 0.79), f_c=5000, f_y=60_000),
        "L": with_bars(L_SHAPE, L_BARS),
        "channel": with_bars(CHANNEL, CHANNEL_BARS),
        "tee": with_bars(TEE, TEE_BARS),
        "hollow": polygon(
            [(-15, -15), (15, -15), (15, 15), (-15, 15)],
            around(30, 30, 4, 4, 0.79),
            f_c=4000,
            f_y=60_000,
            openings=[[(-6, -6), (6, -6), (6, 6), (-6, 6)]],
        ),
        "bars at one face": rectangle(12, 20, [(-3, -7.5, 1.0), (0, -7.5, 1.0), (3, -7.5, 1.0)], f_c=4000, f_y=60_000),
    }


def surface(section: Section, spiral: bool = False) -> Surface:
    """Its design surface under ACI 318-19."""
    return Surface(section, rule_318_19(f_y=section.f_y, spiral=spiral))


def random_loads(section: Section, count: int, seed: int) -> Floats:
    """P, Mx, My (3, count): from most of the tension strength to beyond the compression strength, in all directions."""
    rng = np.random.default_rng(seed)
    P = rng.uniform(-0.8 * section.P_nt_max, 0.7 * section.P_o, count)
    width, depth = section.extent
    return np.stack([P, *(rng.normal(size=(2, count)) * section.P_o * np.array([[depth], [width]]) / 6)])
