"""The section with its neutral axis, measured on the SVG; expected places are geometry worked in the comments."""

from __future__ import annotations

import math
import random
from itertools import combinations, pairwise

import pytest
from gallery import neutral_axis, neutral_axis_round
from svg_reading import Text, crosses, overlap, shapes, texts, words

from calcpack.errors import RangeError
from calcpack.figures import Figure, rectangular_bars

Point = tuple[float, float]


def inches(figure: Figure, part: str, scale: float = 12.0) -> list[list[Point]]:
    """The lines of a part in inches of the column, from its centre."""
    (outline,) = shapes(figure, "outline")
    x, y = outline.centre
    return [[((i - x) * scale, (j - y) * scale) for i, j in shape.points] for shape in shapes(figure, part)]


def ends(figure: Figure, part: str, scale: float = 12.0) -> tuple[Point, Point]:
    """The two ends of a part that may be broken at numerals, in inches of the column."""
    every = [point for line in inches(figure, part, scale) for point in line]
    return max(combinations(every, 2), key=lambda pair: math.dist(*pair))


def area(points: list[Point]) -> float:
    return abs(sum(a[0] * b[1] - b[0] * a[1] for a, b in pairwise([*points, points[0]]))) / 2


def depth_below(reach: float, degrees: float, point: Point) -> float:
    """How far a point lies from the extreme compression fibre, square to the neutral axis."""
    theta = math.radians(degrees)
    return reach - point[0] * math.cos(theta) - point[1] * math.sin(theta)


def rectangle_reach(degrees: float) -> float:
    """Of 18 by 24 in: the corner on the compressed side."""
    theta = math.radians(degrees)
    return 9 * abs(math.cos(theta)) + 12 * abs(math.sin(theta))


DIRECTIONS = [0.0, 37.0, 90.0, 143.0, 180.0, 233.0, 270.0, 307.0, -37.0]


@pytest.mark.parametrize("degrees", DIRECTIONS)
def test_block_and_axis_lie_at_their_depths(degrees: float) -> None:
    figure = neutral_axis(degrees=degrees, c=11.0, a=8.8)
    reach = rectangle_reach(degrees)
    for part, depth in (("edge", 8.8), ("neutral axis", 11.0)):
        for end in ends(figure, part):
            assert depth_below(reach, degrees, end) == pytest.approx(depth, abs=0.02)
    (block,) = inches(figure, "block")
    depths = [depth_below(reach, degrees, corner) for corner in block]
    assert min(depths) == pytest.approx(0.0, abs=0.01)
    assert max(depths) == pytest.approx(8.8, abs=0.01)


def test_the_area_of_a_level_block_and_of_a_corner() -> None:
    (level,) = inches(neutral_axis(degrees=90.0, c=10.0, a=8.0), "block")
    # 18 in x 8 in.
    assert area(level) == pytest.approx(144.0, rel=0.005)
    (corner,) = inches(neutral_axis(degrees=45.0, c=10.0, a=8.0), "block")
    # A triangle of height 8 in between two sides at 45 degrees: base 16 in.
    assert area(corner) == pytest.approx(64.0, rel=0.005)
    assert len(set(corner)) == 3
    (most,) = inches(neutral_axis(degrees=45.0, c=33.0, a=26.0), "block")
    # The whole but a triangle of height 21 sqrt(2) - 26 = 3.698 in.
    assert area(most) == pytest.approx(18 * 24 - 3.698**2, rel=0.005)


def test_the_area_of_a_segment_of_a_circle() -> None:
    (block,) = inches(neutral_axis_round(c=7.5, a=6.0), "block")
    # R = 10 in, its chord 4 in from the centre: R^2 acos(0.4) - 4 sqrt(100 - 16) = 115.93 - 36.66 in^2.
    assert area(block) == pytest.approx(79.27, rel=0.005)
    start, end = ends(neutral_axis_round(c=7.5, a=6.0), "edge")
    assert math.dist(start, end) == pytest.approx(2 * math.sqrt(84), rel=0.005)


def test_the_axis_runs_past_the_section_on_both_sides() -> None:
    for degrees in DIRECTIONS:
        start, end = ends(neutral_axis(degrees=degrees, c=11.0), "neutral axis")
        for x, y in (start, end):
            assert abs(x) > 9.5 or abs(y) > 12.5, degrees


def test_the_dimensions_are_square_to_the_axis_and_as_long_as_they_say() -> None:
    for degrees in DIRECTIONS:
        figure = neutral_axis(degrees=degrees, c=11.0, a=8.8)
        lines = inches(figure, "dimension")
        assert sorted(math.dist(*line[:2]) for line in lines) == pytest.approx([8.8, 11.0], rel=0.005)
        for (x1, y1), (x2, y2) in lines:
            along = math.radians(degrees)
            assert (x2 - x1) * math.sin(along) == pytest.approx((y2 - y1) * math.cos(along), abs=0.02)
        assert {"c = 11.00 in", "block, a = 8.80 in", "neutral axis"} <= {text.text for text in texts(figure)}


def test_hatching_fills_the_block_and_nothing_else() -> None:
    for degrees in DIRECTIONS:
        lines = inches(neutral_axis(degrees=degrees, c=11.0, a=8.8), "hatch")
        assert len(lines) > 10
        for point in (end for line in lines for end in line):
            assert depth_below(rectangle_reach(degrees), degrees, point) <= 8.8 + 0.02
            assert abs(point[0]) <= 9.02
            assert abs(point[1]) <= 12.02
    for line in inches(neutral_axis_round(), "hatch"):
        assert all(math.hypot(*end) <= 10.02 for end in line)


@pytest.mark.parametrize("degrees", [-90.0, 0.0, 45.0, 135.0, 180.0])
def test_hatching_is_never_along_the_edge(degrees: float) -> None:
    for one, other in inches(neutral_axis(degrees=degrees, c=11.0), "hatch"):
        way = math.atan2(other[1] - one[1], other[0] - one[0]) - math.radians(degrees)
        # At 45 degrees to the page it is at 45 or 90 degrees to an edge along the page or a diagonal.
        assert abs(math.cos(way)) > 0.7


def filled(figure: Figure) -> set[Point]:
    """Centres of the filled bars, inches, to two decimals."""
    (outline,) = shapes(figure, "outline")
    x, y = outline.centre
    bars = (bar for bar in shapes(figure, "bar") if "fill: #1b1b1b" in bar.style)
    return {(round((bar.centre[0] - x) * 12, 2), round((bar.centre[1] - y) * 12, 2)) for bar in bars}


def test_bars_in_compression_are_filled() -> None:
    # Bars at y = 9.561, 3.187, -3.187 and -9.561 in, so 2.439, 8.813, 15.187 and 21.561 in below the upper face.
    for c, count in ((2.43, 0), (2.45, 3), (8.81, 3), (8.82, 5), (15.2, 7), (21.6, 10)):
        assert len(filled(neutral_axis(degrees=90.0, c=c))) == count
    figure = neutral_axis(degrees=90.0, c=9.0)
    assert filled(figure) == {(-6.56, 9.56), (0.0, 9.56), (6.56, 9.56), (-6.56, 3.19), (6.56, 3.19)}
    assert len(shapes(figure, "bar")) == 10
    # On the neutral axis itself a bar has no strain.
    assert len(filled(neutral_axis(degrees=90.0, bars=[(0.0, 3.0, 1.0)], c=9.0))) == 0


def test_open_bars_are_as_large_as_filled_ones() -> None:
    # To the outside of their lines: 1.128 in.
    for bar in shapes(neutral_axis(), "bar"):
        assert (bar.width + bar.weight / 72) * 12 == pytest.approx(1.128, rel=0.005)


def numerals(figure: Figure) -> list[Text]:
    return sorted((text for text in texts(figure) if text.text.isdigit()), key=lambda text: int(text.text))


def middle(text: Text) -> Point:
    return (text.box[0] + text.box[2]) / 2, (text.box[1] + text.box[3]) / 2


def faults(figure: Figure) -> list[str]:
    """Numerals that are far from their bar, nearer to another, on a bar or on the tie; lettering on lettering."""
    found, bars, marks = [], shapes(figure, "bar"), numerals(figure)
    (tie,) = shapes(figure, "tie")
    for mark, bar in zip(marks, bars, strict=True):
        nearest = min(bars, key=lambda other: math.dist(middle(mark), other.centre))
        if nearest is not bar:
            found.append(f"{mark.text} reads as another bar's")
        if any(overlap(mark.box, other.box) for other in bars):
            found.append(f"{mark.text} on a bar")
        if any(crosses(start, end, mark.box) for start, end in pairwise(tie.points)):
            found.append(f"{mark.text} on the tie")
    every = texts(figure)
    found += [f"{one.text} on {two.text}" for one, two in combinations(every, 2) if overlap(one.box, two.box)]
    lines = [pair for shape in shapes(figure) if "stroke: #" in shape.style for pair in pairwise(shape.points)]
    return found + [f"a line through {text.text}" for text in every if any(crosses(*line, text.box) for line in lines)]


@pytest.mark.parametrize(
    ("n_x", "n_y", "d_b"),
    [(2, 2, 1.41), (3, 3, 1.27), (2, 5, 1.0), (4, 4, 1.0), (5, 5, 1.128), (5, 9, 0.75), (7, 7, 0.875)],
)
def test_numerals_stand_at_their_bars(n_x: int, n_y: int, d_b: float) -> None:
    for degrees, c in zip(DIRECTIONS, (2.0, 5.0, 9.0, 12.0, 14.0, 17.0, 3.0, 8.0, 20.0), strict=True):
        figure = neutral_axis(n_x=n_x, n_y=n_y, d_b=d_b, degrees=degrees, c=c)
        assert [int(text.text) for text in numerals(figure)] == list(range(1, 2 * (n_x + n_y) - 3))
        assert faults(figure) == [], (degrees, c)


@pytest.mark.parametrize(("count", "h"), [(4, 16.0), (6, 20.0), (9, 24.0), (16, 30.0), (24, 36.0)])
def test_numerals_stand_at_their_bars_in_a_circle(count: int, h: float) -> None:
    for degrees, c in zip(DIRECTIONS, (2.0, 5.0, 9.0, 12.0, 14.0, 15.5, 3.0, 8.0, 15.0), strict=True):
        assert faults(neutral_axis_round(count=count, h=h, degrees=degrees, c=c)) == [], (degrees, c)


def test_lettering_stands_clear_for_any_axis() -> None:
    spread = random.Random(318)
    for _ in range(40):
        degrees, c = spread.uniform(-180, 180), spread.choice([0.3, 1.0, 4.0, 9.0, 16.0, 25.0])
        shape = spread.choice([(18.0, 24.0), (24.0, 14.0), (12.0, 12.0), (36.0, 16.0)])
        figure = neutral_axis(b=shape[0], h=shape[1], n_y=2, degrees=degrees, c=c)
        assert faults(figure) == [], (degrees, c, shape)


def test_an_axis_outside_is_a_note() -> None:
    # At 45 degrees the section is 21 sqrt(2) = 29.70 in deep.
    inside, outside = neutral_axis(degrees=45.0, c=29.69, a=20.0), neutral_axis(degrees=45.0, c=29.71, a=20.0)
    assert shapes(inside, "neutral axis")
    assert "outside" not in words(inside)
    assert shapes(outside, "neutral axis") == []
    assert "neutral axis outside the section, c = 29.71 in" in words(outside)
    assert "block, a = 20.00 in" in words(outside)
    assert len(shapes(outside, "dimension")) == 1


def test_a_block_over_the_whole_section_has_no_edge() -> None:
    figure = neutral_axis(degrees=90.0, c=30.0, a=24.0)
    (block,) = inches(figure, "block")
    assert area(block) == pytest.approx(18 * 24, rel=0.005)
    assert shapes(figure, "edge") == shapes(figure, "dimension") == []
    assert "neutral axis outside, c = 30.00 in; block over the whole section" in words(figure)
    assert shapes(neutral_axis(degrees=90.0, c=30.0, a=23.9), "edge")


def test_pure_compression_and_pure_tension_need_no_direction() -> None:
    pressed = neutral_axis(c=math.inf, theta=math.nan)
    assert "uniform compression, block over the whole section" in words(pressed)
    assert len(filled(pressed)) == 10
    assert pressed.alt.endswith("bars 1 to 10 in compression.")
    pulled = neutral_axis(c=0.0, theta=math.nan)
    assert "no concrete in compression" in words(pulled)
    assert (len(filled(pulled)), shapes(pulled, "block"), shapes(pulled, "hatch")) == (0, [], [])
    assert pulled.alt.endswith("bars 1 to 10 in tension.")


def test_the_words() -> None:
    figure = neutral_axis(degrees=90.0, c=9.0)
    expected = "Neutral axis and compression block of column C3, 1'-6\" x 2'-0\"; bars in compression filled"
    assert figure.caption == expected
    # `rectangular_bars` lists the lower face, the upper face, then left and right: 3 + 3 + 2 + 2.
    assert figure.alt == (
        "Section of column C3, 1'-6\" x 2'-0\", to scale, 10 bars: c = 9.00 in and a = 7.20 in from the extreme "
        "compression fibre, compressed face at 90.0 degrees counterclockwise from x; bars 4 to 6, 8, 10 in "
        "compression, 1 to 3, 7, 9 in tension."
    )
    assert neutral_axis(degrees=-37.0).alt.count("323.0 degrees") == 1
    assert "column C5, 1'-8\" dia." in neutral_axis_round().caption
    assert "of a column, 1'-6\"" in neutral_axis(mark="").caption


@pytest.mark.parametrize("scale", [6.0, 10.0, 24.0])
def test_a_chosen_scale_is_kept(scale: float) -> None:
    figure = neutral_axis(degrees=90.0, c=10.0, a=8.0, scale=scale)
    (outline,) = shapes(figure, "outline")
    assert (outline.width * scale, outline.height * scale) == pytest.approx((18.0, 24.0), rel=0.005)
    assert f"Scale 1 in = {scale:g} in" in words(figure)
    (tie,) = shapes(figure, "tie")
    # 18 - 2 (1.5) - 0.375 between the centrelines.
    assert tie.width * scale == pytest.approx(14.625, rel=0.005)
    assert tie.weight == pytest.approx(max(0.375 / scale * 72, 0.7), rel=0.005)


def test_a_block_deeper_than_its_axis_is_refused() -> None:
    assert neutral_axis(c=9.0, a=9.0)
    with pytest.raises(RangeError, match=r"a = 9\.01 in +from 0 in to c = 9 in: give the depth of the block"):
        neutral_axis(c=9.0, a=9.01)
    with pytest.raises(RangeError, match=r"a = -1 in"):
        neutral_axis(a=-1.0)


def test_all_problems_at_once() -> None:
    with pytest.raises(RangeError, match="the section with its neutral axis cannot be drawn") as caught:
        neutral_axis(bars=[(7.0, 0.0, 1.0), (0.0, 0.0, -1.0)], theta=math.nan, c=-2.0)
    given = [problem.given for problem in caught.value.problems]
    assert given[:2] == ["bar of 1 in at x = 7 in, y = 0 in", "d_b = -1 in"]
    assert given[-2:] == ["c = -2 in", "a = -1.6 in"]
    with pytest.raises(RangeError, match=r"theta = nan +a direction in rad: give it"):
        neutral_axis(theta=math.nan)
    with pytest.raises(RangeError, match=r"no bars +one bar at least"):
        neutral_axis(bars=[])
    with pytest.raises(RangeError, match=r"h = 0 in +a length above 0 in"):
        neutral_axis(h=0.0, bars=rectangular_bars(b=18.0, h=24.0, cover=1.5, tie_d=0.375, d_b=1.0, n_x=2, n_y=2))


def test_a_bar_on_the_tie_is_inside_and_a_hair_further_is_not() -> None:
    # 18/2 - 1.5 - 0.375 - 0.5 = 6.625 in; in the circle 10 - 1.5 - 0.5 - 0.5 = 7.5 in.
    assert neutral_axis(bars=[(6.625, 0.0, 1.0)])
    with pytest.raises(RangeError, match=r"x = 6\.63 in, y = 0 in +the whole bar inside the tie"):
        neutral_axis(bars=[(6.63, 0.0, 1.0)])
    assert neutral_axis_round(bars=[(0.0, -7.5, 1.0)])
    with pytest.raises(RangeError, match=r"y = -7\.51 in"):
        neutral_axis_round(bars=[(0.0, -7.51, 1.0)])
