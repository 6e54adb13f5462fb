"""One figure of each kind, and awkward ones, for tests that hold for all. Invented members; sizes common practice."""

from __future__ import annotations

from collections.abc import Callable
from typing import Any

from calcpack import figures as fig
from calcpack.figures import Figure

FT = 12.0


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
    "plan": plan,
    "plan, small": lambda: plan(
        grid_x=[("A", 0.0), ("B", 240.0)],
        grid_y=[("1", 0.0), ("2", 192.0)],
        columns={"C1": (0, 0)},
        sizes={},
        emphasis=(),
    ),
    "building": building,
}
