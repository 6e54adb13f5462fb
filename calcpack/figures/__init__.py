"""Figures of a calculation sheet, drawn to scale as SVG: sections, bar details, plan, elevation, interaction charts.

Every function takes floats in inches, lb and lb*in, keyword-only, and returns a `Figure`: the drawing, its caption and
a sentence that says the same to someone who cannot see it. Matplotlib is loaded when the first figure is drawn.
"""

from __future__ import annotations

from calcpack.figures.anchorage import cantilever_detail, development_detail, hook_detail
from calcpack.figures.bars import Bar, circular_bars, rectangular_bars
from calcpack.figures.building import building_section, framing_plan
from calcpack.figures.charts import side_by_side
from calcpack.figures.dowels import dowel_detail
from calcpack.figures.drawing import Figure
from calcpack.figures.ends import straight_end
from calcpack.figures.heads import headed_detail, hooked_end
from calcpack.figures.interaction import interaction_diagram, moment_contour
from calcpack.figures.laps import lap_detail, lap_stagger
from calcpack.figures.sections import column_section_circular, column_section_rectangular
from calcpack.figures.stress_block import neutral_axis_section
from calcpack.figures.trade import feet_inches

__all__ = [
    "Bar",
    "Figure",
    "building_section",
    "cantilever_detail",
    "circular_bars",
    "column_section_circular",
    "column_section_rectangular",
    "development_detail",
    "dowel_detail",
    "feet_inches",
    "framing_plan",
    "headed_detail",
    "hook_detail",
    "hooked_end",
    "interaction_diagram",
    "lap_detail",
    "lap_stagger",
    "moment_contour",
    "neutral_axis_section",
    "rectangular_bars",
    "side_by_side",
    "straight_end",
]
