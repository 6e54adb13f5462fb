"""Column sections are drawn to scale: measured on the SVG, expected from the input."""

from __future__ import annotations

import math

import pytest
from gallery import circular, rectangular
from svg_reading import shapes, texts, words

from calcpack.errors import RangeError
from calcpack.figures import rectangular_bars

# Half a percent, as a scale rule reads; the SVG holds six decimals of a point.
TO_SCALE = pytest.approx


def test_outline_to_scale() -> None:
    figure = rectangular()
    (outline,) = shapes(figure, "outline")
    assert "Scale 1 in = 12 in" in words(figure)
    assert outline.width == TO_SCALE(18 / 12, rel=0.005)
    assert outline.height == TO_SCALE(24 / 12, rel=0.005)


@pytest.mark.parametrize("scale", [4.0, 10.0, 24.0])
def test_a_chosen_scale_is_kept(scale: float) -> None:
    figure = rectangular(scale=scale)
    (outline,) = shapes(figure, "outline")
    assert (outline.width, outline.height) == TO_SCALE((18 / scale, 24 / scale), rel=0.005)
    assert f"Scale 1 in = {scale:g} in" in words(figure)


def test_bars_to_scale_and_in_place() -> None:
    figure = rectangular()
    (outline,) = shapes(figure, "outline")
    drawn = shapes(figure, "bar")
    bars = rectangular_bars(b=18.0, h=24.0, cover=1.5, tie_d=0.375, d_b=1.128, n_x=3, n_y=4)
    assert len(drawn) == len(bars) == 10
    x, y = outline.centre
    found = sorted((round((s.centre[0] - x) * 12, 2), round((s.centre[1] - y) * 12, 2)) for s in drawn)
    assert found == sorted((round(bar.x, 2), round(bar.y, 2)) for bar in bars)
    assert {round(shape.width * 12, 2) for shape in drawn} == {1.13}


def test_the_tie_keeps_its_cover_and_thickness() -> None:
    figure = rectangular()
    (outline,), (tie,) = shapes(figure, "outline"), shapes(figure, "tie")
    # Centreline: cover + half the tie from each face.
    assert (tie.box[0] - outline.box[0]) * 12 == TO_SCALE(1.5 + 0.375 / 2, rel=0.005)
    assert (outline.box[3] - tie.box[3]) * 12 == TO_SCALE(1.5 + 0.375 / 2, rel=0.005)
    assert tie.weight == TO_SCALE(0.375 / 12 * 72, rel=0.005)


def test_the_tie_ends_in_hooks_of_135_degrees() -> None:
    (tie,) = shapes(rectangular(), "tie")
    for tip, root in ((tie.points[0], tie.points[1]), (tie.points[-1], tie.points[-2])):
        across, up = tip[0] - root[0], tip[1] - root[1]
        # Both tails point into the core, down and to the right at 45 degrees ...
        assert across == pytest.approx(-up, rel=1e-3)
        assert across > 0
        # ... and are 3 in long: 6 d_b is 2.25 in, the minimum 3 in governs (ACI 318-19 table 25.3.2, from memory).
        assert math.hypot(across, up) * 12 == TO_SCALE(3.0, rel=0.005)


def test_a_thicker_tie_has_a_longer_hook() -> None:
    (tie,) = shapes(rectangular(tie_d=0.625, scale=12.0), "tie")
    # 6 x 0.625 = 3.75 in.
    assert math.dist(tie.points[0], tie.points[1]) * 12 == TO_SCALE(3.75, rel=0.005)


def test_the_tie_lies_against_the_corner_bars() -> None:
    figure = rectangular()
    (tie,), bars = shapes(figure, "tie"), shapes(figure, "bar")
    corner = max(bars, key=lambda bar: bar.centre[0] + bar.centre[1])
    gap = min(math.dist(corner.centre, point) for point in tie.points)
    assert gap * 12 == TO_SCALE((1.128 + 0.375) / 2, rel=0.01)


def test_dimensions_and_callouts_are_text() -> None:
    found = {text.text for text in texts(rectangular())}
    assert {"1'-6\"", "2'-0\"", '1 1/2" clr', "10-#9", "#3 ties @ 12 in", "x", "y"} <= found


def test_caption_and_alternative_text() -> None:
    figure = rectangular()
    assert figure.caption == "Section of column C3, 1'-6\" x 2'-0\", 10-#9"
    assert "1'-6\" wide along x by 2'-0\" deep along y, 10 bars (10-#9) inside #3 ties @ 12 in" in figure.alt
    assert rectangular(mark="").caption.startswith("Section of a column,")


def test_a_bar_on_the_tie_is_inside_and_a_hair_further_is_not() -> None:
    # 18/2 - 1.5 - 0.375 - 0.5 = 6.625 in is the furthest centre of a 1 in bar.
    assert rectangular(bars=[(6.625, 0.0, 1.0)])
    with pytest.raises(RangeError, match=r"bar of 1 in at x = 6\.63 in, y = 0 in +the whole bar inside the tie"):
        rectangular(bars=[(6.63, 0.0, 1.0)])
    # 24/2 - 2.375 = 9.625 in along y.
    with pytest.raises(RangeError, match=r"y = 9\.63 in"):
        rectangular(bars=[(0.0, 9.63, 1.0)])


def test_all_problems_of_a_section_at_once() -> None:
    with pytest.raises(RangeError, match="the column section cannot be drawn") as caught:
        rectangular(cover=1.5, bars=[(30.0, 0.0, 1.0), (0.0, 0.0, -1.0)])
    assert len(caught.value.problems) == 2
    with pytest.raises(RangeError, match=r"no bars +one bar at least"):
        rectangular(bars=[])


def test_a_circle_to_scale() -> None:
    figure = circular()
    (outline,), (spiral,) = shapes(figure, "outline"), shapes(figure, "tie")
    assert (outline.width, outline.height) == TO_SCALE((20 / 12, 20 / 12), rel=0.005)
    # 20 - 2 (1.5) - 0.5 to the centreline of the spiral.
    assert spiral.width * 12 == TO_SCALE(16.5, rel=0.005)
    assert spiral.weight == TO_SCALE(0.5 / 12 * 72, rel=0.005)
    assert spiral.centre == pytest.approx(outline.centre, abs=1e-4)
    first = max(shapes(figure, "bar"), key=lambda bar: bar.centre[0])
    assert (first.centre[0] - outline.centre[0]) * 12 == TO_SCALE(7.5, rel=0.005)
    assert first.centre[1] == pytest.approx(outline.centre[1], abs=1e-4)


def test_the_words_of_a_circle() -> None:
    figure = circular()
    assert {"1'-8\" dia.", '1 1/2" clr', "10-#8", "#4 spiral @ 2 1/4 in"} <= {text.text for text in texts(figure)}
    assert "circular, 1'-8\" in diameter, 10 bars (10-#8)" in figure.alt


def test_a_bar_outside_the_spiral_is_refused() -> None:
    # 20/2 - 1.5 - 0.5 - 0.5 = 7.5 in; on the diagonal 5.30 each way.
    assert circular(bars=[(5.3, 5.3, 1.0)])
    with pytest.raises(RangeError, match=r"x = 5\.31 in, y = 5\.31 in"):
        circular(bars=[(5.31, 5.31, 1.0)])
    with pytest.raises(RangeError, match=r"h = 0 in +a length above 0 in"):
        circular(h=0.0)
    with pytest.raises(RangeError, match="no bars"):
        circular(bars=[])
