"""Interaction charts, read back from their own ticks; the curves are straight pieces that can be worked by hand."""

from __future__ import annotations

import inspect
import math
import re
import subprocess
import sys
from itertools import combinations
from pathlib import Path

import pytest
import test_every_figure as common
from gallery import CHARTS, CONTOUR, DESIGN, GALLERY, KIP, KIP_FT, MANY, NOMINAL, circular, contour, interaction
from svg_reading import root, shapes, texts, words

from calcpack.errors import RangeError
from calcpack.figures import Figure, side_by_side
from calcpack.figures.charts import Axis, even_axis, round_axis, round_step

TO_SCALE = 0.005
# What holds for every figure holds for a chart, except that it states no scale.
SHARED = [
    check
    for name, check in vars(common).items()
    if name.startswith("test_") and list(inspect.signature(check).parameters) == ["name"] and "scale" not in name
]


@pytest.mark.parametrize("check", SHARED, ids=lambda check: check.__name__)
@pytest.mark.parametrize("name", CHARTS)
def test_a_chart_keeps_what_every_figure_keeps(name: str, check: object, monkeypatch: pytest.MonkeyPatch) -> None:
    monkeypatch.setitem(GALLERY, name, CHARTS[name])
    assert callable(check)
    check(name)


def test_charts_go_into_a_pdf_a(tmp_path: Path, monkeypatch: pytest.MonkeyPatch) -> None:
    for name, make in CHARTS.items():
        monkeypatch.setitem(GALLERY, name, make)
    common.test_all_of_them_go_into_a_pdf_a(tmp_path)


def test_charts_are_the_same_bytes_in_another_process() -> None:
    code = (
        "import hashlib; from gallery import CHARTS;"
        "print(hashlib.sha256(''.join(make().svg for make in CHARTS.values()).encode()).hexdigest())"
    )
    run = {"capture_output": True, "text": True, "check": True, "cwd": Path(__file__).parent}
    assert len({subprocess.run([sys.executable, "-c", code], **run).stdout for _ in range(2)}) == 1


def axis_of(figure: Figure, way: int) -> tuple[float, float]:
    """Value at zero inches and value in an inch along x (0) or y (1), read from ticks and the numbers at them."""
    found = []
    for tick in shapes(figure, "tick"):
        upright = tick.width < 1e-6
        if upright == (way == 0):
            near = min(texts(figure), key=lambda text: math.dist(tick.points[1], _foot(text.box, way)))
            found.append((tick.centre[way], float(near.text.replace(",", "").replace("−", "-"))))
    (at, value), (last, end) = found[0], found[-1]
    each = (end - value) / (last - at)
    assert all(value + each * (place - at) == pytest.approx(number, abs=0.01 * each) for place, number in found)
    return value - each * at, each


def _foot(box: tuple[float, float, float, float], way: int) -> tuple[float, float]:
    """Where a number faces its tick: its top along x, its right along y."""
    return ((box[0] + box[2]) / 2, box[3]) if way == 0 else (box[2], (box[1] + box[3]) / 2)


def points(figure: Figure, part: str) -> list[list[tuple[float, float]]]:
    """What is drawn as `part`, in the units of the axes; a mark by its centre."""
    (x0, x1), (y0, y1) = axis_of(figure, 0), axis_of(figure, 1)
    found = []
    for shape in shapes(figure, part):
        drawn = [shape.centre] if part in {"load", "governing"} else shape.points
        found.append([(x0 + x1 * x, y0 + y1 * y) for x, y in drawn])
    return found


def near(point: tuple[float, float], other: tuple[float, float]) -> bool:
    return math.dist(point, other) < 2.0


def test_the_curves_are_where_the_axes_say() -> None:
    figure = interaction()
    (design,), (nominal,) = points(figure, "design"), points(figure, "nominal")
    assert len(design) == len(DESIGN)
    assert all(map(near, design, DESIGN))
    assert all(map(near, nominal, NOMINAL))


def test_the_design_curve_is_heavy_and_the_nominal_one_thin_and_dashed() -> None:
    figure = interaction()
    (design,), (nominal,) = shapes(figure, "design"), shapes(figure, "nominal")
    assert design.weight > 2 * nominal.weight
    assert "stroke-dasharray" in nominal.style
    assert "stroke-dasharray" not in design.style


@pytest.mark.parametrize("cap", [900.0, 800.0, 700.0])
def test_the_curve_is_cut_at_the_maximum(cap: float) -> None:
    # From (300, 500) to (180, 900) the moment falls 0.3 kip-ft a kip: 210 at 800 kip, 240 at 700.
    (design,) = points(interaction(cap=cap * KIP), "design")
    assert near(design[-1], (0.0, cap))
    assert near(design[-2], (180 + 0.3 * (900 - cap), cap))
    assert max(p for _, p in design) == pytest.approx(cap, abs=2)
    assert f"maximum {cap:.0f} kip" in words(interaction(cap=cap * KIP))


def test_a_curve_that_ends_above_the_maximum_is_closed_level() -> None:
    whole = {"P": [-300 * KIP, 0, 500 * KIP, 1700 * KIP], "M": [0, 200 * KIP_FT, 300 * KIP_FT, 0]}
    figure = interaction(governing=(100, 0, 0.5), **whole)
    (design,) = points(figure, "design")
    # 300 - 300 (900 - 500)/1200 = 200.
    assert all(map(near, design, [(0, -300), (200, 0), (300, 500), (200, 900), (0, 900)]))


def test_every_load_has_its_mark_and_the_governing_one_is_filled() -> None:
    figure = interaction()
    loads = [mark for (mark,) in points(figure, "load")]
    assert sorted((round(m / 5) * 5, round(p / 10) * 10) for m, p in loads) == [(40, 700), (90, 120)]
    ((worst,),) = points(figure, "governing")
    assert near(worst, (150, 200))
    (shape,) = shapes(figure, "governing")
    assert "fill: #1b1b1b" in shape.style
    assert all("fill: #ffffff" in mark.style and mark.width < shape.width for mark in shapes(figure, "load"))
    assert len(points(interaction(loads=MANY), "load")) == len(set(MANY))


@pytest.mark.parametrize(
    ("governing", "end"),
    [
        ((150, 200, 0.5), (300, 400)),  # on the upright piece, twice the load
        ((40, -120, 0.6), (66.67, -200)),  # P = -300 + 1.5 M meets P = -3 M at M = 66.67
        ((90, 720, 0.8), (112.5, 900)),  # at the maximum
        ((360, 480, 1.2), (360, 480)),  # past the curve, to the load
        ((300, 400, 1.0), (300, 400)),  # on it
    ],
)
def test_the_ray_runs_through_the_load_to_the_curve(
    governing: tuple[float, float, float], end: tuple[float, float]
) -> None:
    ((start, last),) = points(interaction(governing=governing), "ray")
    assert near(start, (0, 0))
    assert near(last, end)


def test_no_load_no_ray() -> None:
    figure = CHARTS["interaction, no load"]()
    assert shapes(figure, "ray") == []
    assert "0.00" in words(figure)


@pytest.mark.parametrize(
    ("ratio", "text"),
    [(0.5, "0.50"), (0.996, "1.00"), (1.0, "1.00"), (1.004, "1.004"), (1.0004, "1.0004"), (1.2, "1.20")],
)
def test_a_ratio_is_never_written_on_the_wrong_side_of_one(ratio: float, text: str) -> None:
    # Two decimals, but 1.004 is past the limit, which 1.00 would hide.
    figure = interaction(governing=(300 * ratio, 400 * ratio, ratio))
    assert text in {found.text for found in texts(figure)}
    assert f"ratio {text}." in figure.alt


def test_a_ratio_that_the_curve_contradicts_is_refused() -> None:
    # The curve says 0.5; 2 % of the greater is allowed for a sampled curve.
    assert interaction(governing=(150, 200, 0.509))
    with pytest.raises(RangeError, match=r"ratio = 0\.520 at M = 150 kip·ft, P = 200 kip +0\.500, where the ray"):
        interaction(governing=(150, 200, 0.52))
    with pytest.raises(RangeError, match=r"ratio = 0\.400 at M = 0\.0 kip·ft, P = 0\.0 kip"):
        interaction(governing=(0, 0, 0.4))


def test_the_words_of_a_diagram() -> None:
    figure = interaction()
    assert figure.caption == (
        "Interaction diagram of column C3, 28° from My to Mx (loads in other planes by their resultant moment)"
    )
    assert figure.alt == (
        "Axial force against moment for column C3, 28° from My to Mx: design strength from −300 kip (tension) to "
        "900 kip, the largest design moment 300 kip·ft; 3 loads, the governing one at M = 150 kip·ft, P = 200 kip, "
        "ratio 0.50."
    )
    named = {text.text for text in texts(figure)}
    assert {
        "moment, kip·ft",
        "axial force, kip, compression above 0",
        "design",
        "nominal",
        "load",
        "governing",
    } <= named
    one = interaction(loads=[(150, 200)], mark="", plane="")
    assert one.caption == "Interaction diagram of a column"
    assert "; 1 load, the" in one.alt


@pytest.mark.parametrize("name", CHARTS)
def test_a_chart_is_as_wide_as_half_a_column_of_text(name: str) -> None:
    figure = CHARTS[name]()
    assert 2.6 < figure.width <= 2.95
    assert figure.height < 3.4


def test_marks_keep_off_the_lettering() -> None:
    for name in CHARTS:
        figure = CHARTS[name]()
        inside = [text for text in texts(figure) if re.match(r"maximum|\d\.\d\d", text.text)]
        for mark in [*shapes(figure, "load"), *shapes(figure, "governing")]:
            assert not any(common.overlap(mark.box, text.box) for text in inside), name


def test_a_curve_that_is_none_is_refused() -> None:
    with pytest.raises(RangeError, match=r"P, M: 2 and 6 numbers +3 pairs or more"):
        interaction(P=[-1.0, 1e6])
    with pytest.raises(RangeError, match=r"P_nominal, M_nominal: from 1 lb to 3 lb +from tension, below 0, to comp"):
        interaction(P_nominal=[1.0, 2.0, 3.0], M_nominal=[0.0, 1.0, 0.0])
    with pytest.raises(RangeError, match=r"P, M: M = -12000 lb\*in +0 lb\*in or more"):
        interaction(P=[-1e5, 0.0, 1e6], M=[0.0, -12000.0, 12000.0])
    with pytest.raises(RangeError, match=r"P, M: a number that is not finite"):
        interaction(P=[-1e5, math.nan, 1e6], M=[0.0, 1.0, 0.0])


def test_a_moment_of_zero_is_one_and_below_is_not() -> None:
    assert interaction(loads=[(0.0, 100.0)])
    with pytest.raises(RangeError, match=r"a load with M = -120 lb\*in, P = 100000 lb +a moment of 0 lb\*in or more"):
        interaction(loads=[(-0.01, 100.0)])


def test_all_problems_of_a_diagram_at_once() -> None:
    with pytest.raises(RangeError, match="the interaction diagram cannot be drawn") as caught:
        interaction(loads=[(math.nan, 1.0)], governing=(150, math.inf, -1.0), cap=0.0)
    given = [problem.given for problem in caught.value.problems]
    assert given == [
        "load: M = nan, P = 1000",
        "governing: M = 1.8e+06, P = inf, ratio = -1",
        "ratio = -1",
        "cap = 0 lb",
    ]


def test_a_maximum_above_the_curve_is_refused() -> None:
    assert interaction(cap=900 * KIP)
    with pytest.raises(RangeError, match=r"cap = 901000 lb +above 0 lb and no more than the design curve, 900000 lb"):
        interaction(cap=901 * KIP)


def test_the_contour_is_closed_and_where_the_axes_say() -> None:
    ((*curve, last),) = points(contour(), "design")
    assert len(curve) == len(CONTOUR)
    assert all(map(near, curve, CONTOUR))
    assert near(last, CONTOUR[0])


@pytest.mark.parametrize("name", [name for name in CHARTS if name.startswith("contour")])
def test_the_contour_has_equal_scales(name: str) -> None:
    figure = CHARTS[name]()
    assert axis_of(figure, 0)[1] == pytest.approx(axis_of(figure, 1)[1], rel=TO_SCALE)


def test_moments_about_y_lie_across_and_about_x_up() -> None:
    figure = contour()
    ((worst,),) = points(figure, "governing")
    assert near(worst, (90, 60))
    loads = sorted((round(x / 10) * 10, round(y / 10) * 10) for ((x, y),) in points(figure, "load"))
    assert loads == [(20, 20), (40, -80)]
    # 180 t = 2/3 (200 - 80 t) on the first piece: t = 0.571, at My = 154.3, Mx = 102.9.
    ((start, end),) = points(figure, "ray")
    assert near(start, (0, 0))
    assert near(end, (154.3, 102.9))


@pytest.mark.parametrize(("near_by", "large"), [(0.0, 2), (9.9e3, 1), (10e3, 2), (220e3, 3)])
def test_loads_of_another_axial_force_are_small(near_by: float, large: int) -> None:
    # P = 300 kip: the loads are 0, 10 and 220 kip off; by default a tenth of the largest, 31 kip, is near.
    loads = [(60, 95, 300), (-80, 40, 310), (20, 20, 80)]
    marks = shapes(contour(loads=loads, near=near_by), "load")
    most = max(mark.width for mark in marks)
    assert len(marks) == 3
    assert sum(mark.width > 0.9 * most for mark in marks) == large


def test_the_words_of_a_contour() -> None:
    figure = contour()
    assert figure.caption == "Design moments of column C3 at P = 300 kip"
    assert "about x from −300 to 300 kip·ft, about y from −200 to 200 kip·ft; 3 loads" in figure.alt
    assert figure.alt.endswith("the governing one at Mx = 60.0 kip·ft, My = 90.0 kip·ft.")
    assert {"P = 300 kip", "P ± 31.0 kip", "other P", "governing"} <= {text.text for text in texts(figure)}
    assert "P = −40.0 kip" in words(CHARTS["contour, tension"]())


def test_a_contour_that_is_none_is_refused() -> None:
    with pytest.raises(RangeError, match=r"Mx, My: 1 and 8 numbers +3 pairs or more"):
        contour(Mx=[1.0])
    with pytest.raises(RangeError, match=r"not finite +finite moments: take a P within the strength"):
        contour(Mx=[math.nan] * 8)
    with pytest.raises(RangeError, match=r"Mx, My: 0 times round the origin +once round"):
        contour(Mx=[1.0, 2.0, 1.0], My=[1.0, 1.5, 2.0])
    with pytest.raises(RangeError, match="the moment contour cannot be drawn") as caught:
        contour(P=math.inf, near=-1.0, governing=(0.0, math.nan))
    given = [problem.given for problem in caught.value.problems]
    assert given == ["governing: Mx = 0, My = nan", "P = inf lb", "near = -1 lb"]


def test_two_figures_side_by_side() -> None:
    left, right = interaction(), circular()
    both = side_by_side(left, right, gap=0.3)
    assert both.width == pytest.approx(left.width + 0.3 + right.width, abs=1e-3)
    assert both.height == pytest.approx(max(left.height, right.height), abs=1e-3)
    assert words(both) == f"{words(left)} {words(right)}"
    assert root(both).get("aria-label") == both.alt == f"Left: {left.alt} Right: {right.alt}"
    assert both.caption == f"{left.caption}. {right.caption}"
    moves = [group.get("transform", "") for group in root(both)]
    found = [tuple(map(float, re.findall(r"[\d.]+", move))) for move in moves]
    # Lower edges level, the right one past the left one and the gap; points.
    tops = [72 * (both.height - figure.height) for figure in (left, right)]
    assert found == [
        pytest.approx((0.0, tops[0]), abs=0.01),
        pytest.approx((72 * left.width + 21.6, tops[1]), abs=0.01),
    ]


def test_a_pair_of_charts_goes_beside_each_other_on_a_page() -> None:
    both = side_by_side(interaction(loads=MANY), contour())
    assert both.width <= 6.2
    assert both == side_by_side(interaction(loads=MANY), contour())
    assert both.svg.count("<svg") == 1
    assert not re.search(r' id="|href|url\(', both.svg)


@pytest.mark.parametrize(
    ("span", "most", "step"), [(10, 10, 1), (10.1, 10, 2), (21, 10, 5), (51, 10, 10), (0.5, 5, 0.1), (1e6, 5, 2e5)]
)
def test_steps_are_round(span: float, most: int, step: float) -> None:
    assert round_step(span, most) == pytest.approx(step)
    assert span / round_step(span, most) <= most * (1 + 1e-9)


def test_an_axis_covers_its_values() -> None:
    axis = round_axis(-330.0, 1810.0, 8)
    # 2140 in 8 parts needs 267.5, so 500; half a step is 250.
    assert (axis.low, axis.high, axis.step) == (-500.0, 2000.0, 500.0)
    assert axis.ticks == [-500.0, 0.0, 500.0, 1000.0, 1500.0, 2000.0]
    assert round_axis(0.0, 1750.0, 8).high == 1750.0
    assert round_axis(0.0, 1751.0, 4).high == 2000.0
    assert [axis.written(value) for value in (-500.0, 1500.0)] == ["−500", "1,500"]
    assert [Axis(0.0, 1.0, step).written(0.4) for step in (0.2, 0.05)] == ["0.4", "0.40"]
    even = even_axis([0.0, 10.0], 40.0, 10.0)
    assert (even.low, even.high, even.share(5.0)) == (-15.0, 25.0, 0.5)


def test_numbers_at_the_ticks_keep_apart() -> None:
    for name in CHARTS:
        numbers = [text for text in texts(CHARTS[name]()) if re.fullmatch(r"−?[\d,.]+", text.text)]
        assert len(numbers) >= 6
        assert all(not common.overlap(one.box, other.box) for one, other in combinations(numbers, 2)), name
