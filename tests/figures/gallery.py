"""One figure of each kind, and awkward ones, for tests that hold for all. Invented members; sizes common practice."""

from __future__ import annotations

import math
from collections.abc import Callable
from typing import Any

from calcpack import figures as fig
from calcpack.figures import Figure

FT = 12.0
KIP, KIP_FT = 1e3, 12e3


def rectangular(*, n_x: int = 3, n_y: int = 4, d_b: float = 1.128, **given: Any) -> Figure:
    size = {"b": 18.0, "h": 24.0, "cover": 1.5, "tie_d": 0.375} | {
        name: given.pop(name) for name in ("b", "h", "cover", "tie_d") if name in given
    }
    bars = fig.rectangular_bars(**size, d_b=d_b, n_x=n_x, n_y=n_y)
    text = {"bar_label": f"{len(bars)}-#9", "tie_label": "#3 ties @ 12 in", "mark": "C3"}
    return fig.column_section_rectangular(**size, **({"bars": bars} | text | given))


def circular(**given: Any) -> Figure:
    bars = fig.circular_bars(h=20.0, cover=1.5, tie_d=0.5, d_b=1.0, count=10)
    text = {"bar_label": "10-#8", "spiral_label": "#4 spiral @ 2 1/4 in", "mark": "C5"}
    return fig.column_section_circular(**({"h": 20.0, "cover": 1.5, "spiral_d": 0.5, "bars": bars} | text | given))


def development(**given: Any) -> Figure:
    base = {"d_b": 1.0, "l_d": 33.1, "available": 41.0, "h": 24.0, "cover": 2.0, "bar_label": "#8 top"}
    return fig.development_detail(**(base | given))


def hook(**given: Any) -> Figure:
    base = {"d_b": 1.0, "bend": 90, "bend_diameter": 6.0, "extension": 12.0, "l_dh": 13.4, "available": 15.5, "h": 24.0}
    text = {
        "cover": 2.5,
        "tail_cover": 2.5,
        "bar_label": "3-#8",
        "section_label": "column face",
        "support": "column C3",
    }
    return fig.hook_detail(**(base | text | given))


def hook_180(**given: Any) -> Figure:
    base = {"d_b": 0.75, "bend": 180, "bend_diameter": 4.5, "extension": 3.0, "l_dh": 11.2, "available": 9.5, "h": 16.0}
    return hook(**(base | {"bar_label": "3-#6"} | given))


def cantilever(**given: Any) -> Figure:
    base = {"span": 72.0, "h": 16.0, "support_width": 18.0, "d_b": 1.0, "cover": 2.0, "l_d": 33.1, "available": 41.0}
    return fig.cantilever_detail(**(base | {"bar_label": "#8 @ 5 in top", "member": "the canopy"} | given))


def dowels(**given: Any) -> Figure:
    sizes = {"column_h": 18.0, "footing_width": 84.0, "footing_h": 24.0, "d_b": 1.128, "bend_diameter": 9.024}
    places = {"extension": 13.5, "cover": 3.0, "column_cover": 1.875, "lap": 34.0, "lap_available": 36.0}
    rest = {"l_dc": 21.4, "embedment": 14.0, "bar_label": "8-#9 dowels", "mark": "C3"}
    return fig.dowel_detail(**(sizes | places | rest | given))


def straight(**given: Any) -> Figure:
    base = {"d_b": 0.75, "l_d": 43.3, "available": 60.0, "bar_label": "#6 top", "cover": 2.0, "top": True, "mark": "W1"}
    return fig.straight_end(**(base | given))


def hooked(**given: Any) -> Figure:
    base: dict[str, Any] = {"d_b": 0.875, "bend": 90, "bend_diameter": 5.25, "extension": 10.5, "l_dh": 12.2}
    rest = {"available": 17.0, "bar_label": "#7", "tail_cover": 2.0, "side_cover": 2.75, "mark": "R1"}
    return fig.hooked_end(**(base | rest | given))


def hooked_180(**given: Any) -> Figure:
    base: dict[str, Any] = {"d_b": 0.375, "bend": 180, "bend_diameter": 2.25, "extension": 2.5, "l_dh": 6.0}
    return hooked(**(base | {"available": 4.0, "bar_label": "#3", "tail_cover": None} | given))


def headed(**given: Any) -> Figure:
    base: dict[str, Any] = {"d_b": 0.875, "head_width": 2.25, "l_dt": 14.4, "available": 16.0, "bar_label": "#7 top"}
    return fig.headed_detail(**(base | {"head_cover": 4.5, "cover": 2.0, "mark": "H1"} | given))


def lap(**given: Any) -> Figure:
    base: dict[str, Any] = {"d_b": 0.75, "lap_required": 39.7, "lap_available": 48.0, "bar_label": "#6", "mark": "W3"}
    return fig.lap_detail(**(base | given))


def stagger(**given: Any) -> Figure:
    base: dict[str, Any] = {"d_b": 0.75, "lap": 25.5, "spacing": 8.0, "stagger": 30.0, "bar_label": "#6 @ 8 in"}
    return fig.lap_stagger(**(base | given))


# No. 18 and No. 11, the hooks of Table 25.3.1: 10 and 8 bar diameters inside, 4 beyond a bend of 180 degrees.
NO_18: dict[str, Any] = {"d_b": 2.257, "bend_diameter": 22.57, "bar_label": "#18 top", "l_dh": 60.2}
NO_11: dict[str, Any] = {"d_b": 1.41, "bend_diameter": 11.28, "extension": 5.64, "bar_label": "#11", "l_dh": 24.0}


def plan(**given: Any) -> Figure:
    base: dict[str, Any] = {
        "grid_x": [("A", 0.0), ("B", 28 * FT), ("C", 58 * FT), ("D", 86 * FT)],
        "grid_y": [("1", 0.0), ("2", 24 * FT), ("3", 48 * FT + 6)],
        "columns": {"C1": [(0, 0), (3, 0), (0, 2), (3, 2)], "C3": [(1, 1), (2, 1)], "C4": (0, 1)},
        "sizes": {"C3": (20.0, 24.0)},
        "emphasis": ("C3",),
        "edge": 9.0,
        "north": 70.0,
        "title": "Key plan, level 2",
    }
    return fig.framing_plan(**(base | given))


def building(**given: Any) -> Figure:
    base: dict[str, Any] = {
        "levels": [("Footing", -36.0), ("Level 1", 0.0), ("Level 2", 14 * FT), ("Roof", 26 * FT)],
        "grid": [("A", 0.0), ("B", 28 * FT), ("C", 58 * FT)],
        "ground": "Level 1",
        "title": "Section on line 2",
    }
    return fig.building_section(**(base | given))


def neutral_axis(*, n_x: int = 3, n_y: int = 4, d_b: float = 1.128, degrees: float = 52.0, **given: Any) -> Figure:
    """The section of `rectangular`; beta_1 of 0.8 unless `a` is given."""
    size = {"b": 18.0, "h": 24.0, "cover": 1.5, "tie_d": 0.375} | {
        name: given.pop(name) for name in ("b", "h", "cover", "tie_d") if name in given
    }
    bars = fig.rectangular_bars(**size, d_b=d_b, n_x=n_x, n_y=n_y)
    return fig.neutral_axis_section(**size, **_cut({"bars": bars, "mark": "C3", "c": 13.3} | given, degrees))


def neutral_axis_round(*, count: int = 10, h: float = 20.0, degrees: float = 70.0, **given: Any) -> Figure:
    size: dict[str, Any] = {"h": h, "cover": 1.5, "tie_d": 0.5}
    bars = fig.circular_bars(**size, d_b=1.0, count=count)
    return fig.neutral_axis_section(b=None, **size, **_cut({"bars": bars, "mark": "C5", "c": 9.3} | given, degrees))


def _cut(given: dict[str, Any], degrees: float) -> dict[str, Any]:
    return {"theta": math.radians(degrees), "a": 0.8 * given["c"]} | given


# A curve of few straight pieces, so that what is drawn can be worked by hand. Invented; kip and kip-ft.
DESIGN = [(0, -300), (200, 0), (300, 200), (300, 500), (180, 900), (0, 900)]
NOMINAL = [(0, -333), (222, 0), (350, 300), (400, 700), (0, 1800)]
CONTOUR = [(200, 0), (120, 180), (0, 300), (-120, 180), (-200, 0), (-120, -180), (0, -300), (120, -180)]


def interaction(
    *, loads: Any = ((150, 200), (40, 700), (90, 120)), governing: Any = (150, 200, 0.5), **given: Any
) -> Figure:
    """Loads and the governing load (with its ratio) in kip and kip-ft: the curve is at (300, 400) along it."""
    curves = {
        "P": [p * KIP for _, p in DESIGN],
        "M": [m * KIP_FT for m, _ in DESIGN],
        "P_nominal": [p * KIP for _, p in NOMINAL],
        "M_nominal": [m * KIP_FT for m, _ in NOMINAL],
    }
    points = {"loads": [(m * KIP_FT, p * KIP) for m, p in loads]}
    worst = {"governing": (governing[0] * KIP_FT, governing[1] * KIP, governing[2])}
    rest = {"cap": 900 * KIP, "mark": "C3", "plane": "28° from M_{y} to M_{x}"}
    return fig.interaction_diagram(**(curves | points | worst | rest | given))


def contour(*, loads: Any = ((60, 90, 300), (-80, 40, 310), (20, 20, 80)), **given: Any) -> Figure:
    """Loads as Mx, My, P in kip-ft and kip."""
    curve = {"Mx": [x * KIP_FT for _, x in CONTOUR], "My": [y * KIP_FT for y, _ in CONTOUR]}
    points = {"loads": [(x * KIP_FT, y * KIP_FT, p * KIP) for x, y, p in loads]}
    return fig.moment_contour(
        **(curve | points | {"governing": (60 * KIP_FT, 90 * KIP_FT), "P": 300 * KIP, "mark": "C3"} | given)
    )


# Sixty loads spread over the diagram without a pattern a chart could be made for.
MANY = [(12.0 + 37.0 * i % 131, 90.0 + 83.0 * i % 531) for i in range(60)]


GALLERY: dict[str, Callable[[], Figure]] = {
    "rectangular": rectangular,
    "rectangular, four bars": lambda: rectangular(b=12.0, h=12.0, n_x=2, n_y=2, d_b=0.75),
    "rectangular, wide": lambda: rectangular(b=30.0, h=14.0, tie_d=0.5, n_x=5, n_y=2, d_b=1.27),
    "rectangular, wall": lambda: rectangular(b=48.0, h=12.0, n_x=9, n_y=2),
    "circular": circular,
    "development": development,
    "development, short": lambda: development(available=28.0, section_label="column face"),
    "development, slab": lambda: development(d_b=0.5, l_d=14.2, available=20.0, h=6.0, cover=0.75, bar_label="#4 top"),
    "hook 90": hook,
    "hook 180": hook_180,
    "cantilever": cantilever,
    "cantilever, slab": lambda: cantilever(span=60.0, h=8.0, h_back=10.0, support_width=10.0, d_b=0.625, l_d=19.0),
    "dowels": dowels,
    "dowels, shallow": lambda: dowels(footing_h=30.0, l_dc=14.0, embedment=20.0, lap=40.0, lap_available=36.0),
    "straight": straight,
    "straight, bottom": lambda: straight(d_b=0.375, l_d=12.0, available=None, cover=0.75, top=False, bar_label="#3"),
    "straight, short": lambda: straight(d_b=0.375, l_d=12.0, available=8.0, cover=None, bar_label="#3"),
    "straight, far too short": lambda: straight(d_b=2.257, l_d=180.2, available=4.0, cover=3.0, bar_label="#18 top"),
    "straight, much room": lambda: straight(d_b=2.257, l_d=12.0, available=300.0, top=False, bar_label="#18"),
    "straight, compression": lambda: straight(d_b=2.257, l_d=47.26, available=47.31, cover=None, compression=True),
    "hooked": hooked,
    "hooked, covers": lambda: hooked(cover=2.0, bar_label="#7 top, bundle of 2"),
    "hooked, short": lambda: hooked(**NO_18, extension=27.08, available=40.0, tail_cover=None),
    "hooked, shorter than its bend": lambda: hooked(**NO_18, extension=27.08, available=4.0),
    "hooked 180": hooked_180,
    "hooked 180, shorter than its bend": lambda: hooked_180(available=2.0, tail_cover=1.5),
    "hooked 180, out of the joint": lambda: hooked_180(**(NO_18 | {"extension": 9.03}), available=10.0, tail_cover=2.0),
    "hooked 180, not stated": lambda: hooked_180(**NO_11, available=None, cover=3.0),
    "headed": headed,
    "headed, member": lambda: headed(h=24.0, side_cover=2.75),
    "headed, short": lambda: headed(
        d_b=0.375, head_width=1.0, l_dt=6.0, available=3.0, head_cover=None, bar_label="#3"
    ),
    "headed, far too short": lambda: headed(d_b=1.41, head_width=3.2, l_dt=52.0, available=1.0, cover=None),
    "headed, not stated": lambda: headed(d_b=1.41, head_width=3.2, l_dt=52.0, available=None, head_label="round head"),
    "lap": lap,
    "lap, short": lambda: lap(d_b=0.375, lap_required=12.0, lap_available=10.0, bar_label="#3", compression=True),
    "lap, broken": lambda: lap(d_b=0.375, lap_required=62.0, lap_available=70.0, bar_label="#3"),
    "lap, far too short": lambda: lap(d_b=0.375, lap_required=82.0, lap_available=3.0, bar_label="#3"),
    "lap, two sizes": lambda: lap(d_b=1.41, other_d_b=2.257, bar_label="#11", other_label="#18", compression=True),
    "lap, not stated": lambda: lap(d_b=1.41, lap_required=120.0, lap_available=None, bar_label="#11"),
    "stagger": stagger,
    "stagger, one section": lambda: stagger(lap=33.1, stagger=0.0),
    "stagger, short": lambda: stagger(d_b=0.375, lap=12.0, spacing=18.0, stagger=14.0, bars=5),
    "stagger, close": lambda: stagger(d_b=1.41, lap=95.0, spacing=3.5, stagger=95.0, bars=6, bar_label="#11"),
    "plan": plan,
    "plan, small": lambda: plan(
        grid_x=[("A", 0.0), ("B", 240.0)],
        grid_y=[("1", 0.0), ("2", 192.0)],
        columns={"C1": (0, 0)},
        sizes={},
        emphasis=(),
    ),
    "building": building,
    "neutral axis": neutral_axis,
    "neutral axis, uniaxial": lambda: neutral_axis(degrees=90.0, c=14.2),
    "neutral axis, on the centre": lambda: neutral_axis(degrees=0.0, c=9.0, n_y=3),
    "neutral axis, shallow": lambda: neutral_axis(degrees=-37.0, c=1.2),
    "neutral axis, outside": lambda: neutral_axis(degrees=45.0, c=33.0, a=26.0),
    "neutral axis, 24 bars": lambda: neutral_axis(b=24.0, n_x=7, n_y=7, degrees=120.0, c=15.1),
    "neutral axis, wall": lambda: neutral_axis(b=48.0, h=12.0, n_x=9, n_y=2, degrees=90.0, c=4.0),
    "neutral axis, tension": lambda: neutral_axis(c=0.0),
    "neutral axis, compression": lambda: neutral_axis(c=math.inf),
    "neutral axis, circle": neutral_axis_round,
    "neutral axis, 24 in a circle": lambda: neutral_axis_round(count=24, h=30.0, degrees=200.0, c=4.3),
}

# Charts have no scale of the building.
CHARTS: dict[str, Callable[[], Figure]] = {
    "interaction": interaction,
    "interaction, tension": lambda: interaction(loads=[(40, -120)], governing=(40, -120, 0.6), plane=""),
    "interaction, exceeded": lambda: interaction(governing=(360, 480, 1.2)),
    "interaction, no load": lambda: interaction(loads=[], governing=(0, 0, 0.0)),
    "interaction, capped": lambda: interaction(governing=(90, 720, 0.8)),
    "interaction, many": lambda: interaction(loads=MANY),
    "contour": contour,
    "contour, many": lambda: contour(loads=[(m - 80.0, 0.4 * m - p / 10, p) for m, p in MANY]),
    "contour, tension": lambda: contour(P=-40 * KIP, loads=[(60, 90, -40)]),
}
