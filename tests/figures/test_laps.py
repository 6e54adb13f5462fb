"""Laps: what is lapped is to scale on the page, what is left out is said, and laps of class A never meet.

Sizes are invented; expected places are worked by hand beside each test, by the geometry of the detail alone.
"""

from __future__ import annotations

from itertools import pairwise

import pytest
from gallery import lap, stagger
from svg_reading import Shape, shapes, texts, words
from test_details import level_lengths, stated_scale

from calcpack.errors import RangeError
from calcpack.figures import Figure

INK, GREY = "#1b1b1b", "#8a8a8a"


def bars(figure: Figure, colour: str) -> list[Shape]:
    """The bars from the left (ink) or from the right (grey), from the top down."""
    found = [shape for shape in shapes(figure, "bar") if colour in shape.style]
    return sorted(found, key=lambda shape: -shape.centre[1])


def lapped(figure: Figure) -> float:
    """Length over which both bars run, inches of the building."""
    (one,), (other,) = bars(figure, INK), bars(figure, GREY)
    return (one.box[2] - other.box[0]) * stated_scale(figure)


@pytest.mark.parametrize("available", [48.0, 39.7, 20.0])
def test_the_bars_overlap_by_the_length_available(available: float) -> None:
    figure = lap(lap_available=available)
    assert lapped(figure) == pytest.approx(available, rel=0.005)
    assert {39.7, available} <= set(level_lengths(figure))


def test_without_a_length_available_the_required_lap_is_drawn_and_nothing_is_compared() -> None:
    figure = lap(lap_available=None)
    assert lapped(figure) == pytest.approx(39.7, rel=0.005)
    assert "39.7 in required; length available not stated" in words(figure)
    assert not {"OK", "NG"} & {text.text for text in texts(figure)}
    assert figure.alt.endswith("39.7 in is required and the length available is not stated.")


@pytest.mark.parametrize(("available", "word", "sign"), [(39.8, "OK", "≤"), (39.7, "OK", "≤"), (39.6, "NG", ">")])
def test_the_word_on_both_sides_and_on_the_limit(available: float, word: str, sign: str) -> None:
    figure = lap(lap_available=available)
    assert word in [text.text for text in texts(figure)]
    assert f"39.7 in {sign} {available:.1f} in available" in words(figure)
    assert figure.alt.endswith(f"39.7 in is required and {available:.1f} in is available: {word}.")


def test_lengths_that_differ_are_never_shown_alike() -> None:
    # 39.72 and 39.68 both round to 39.7.
    figure = lap(lap_required=39.72, lap_available=39.68)
    assert "39.72 in > 39.68 in available" in words(figure)
    assert "39.72 in is required and 39.68 in is available: NG" in figure.alt


def test_bars_lie_side_by_side_a_hairline_apart() -> None:
    figure = lap(other_d_b=1.0, other_label="#8")
    (one,), (other,) = bars(figure, INK), bars(figure, GREY)
    scale = stated_scale(figure)
    assert (one.weight, other.weight) == pytest.approx((0.75 / scale * 72, 1.0 / scale * 72), rel=0.005)
    # Centres are half of both apart, and 0.6 pt of hairline.
    apart = (one.centre[1] - other.centre[1]) * 72
    assert apart == pytest.approx((one.weight + other.weight) / 2 + 0.6, abs=0.01)
    assert {"#6", "#8"} <= {text.text for text in texts(figure)}
    assert "tension lap of #6 with #8, 0.750 in and 1.000 in in diameter" in figure.alt


def directions(figure: Figure) -> list[float]:
    """Which way each arrow of a force points, from the left: -1 or 1."""
    heads = sorted((s for s in shapes(figure, "force") if len(s.points) > 2), key=lambda shape: shape.box[0])
    return [1.0 if head.points[0][0] > head.points[1][0] else -1.0 for head in heads]


def test_tension_pulls_and_compression_pushes() -> None:
    assert directions(lap()) == [-1.0, 1.0]
    assert directions(lap(compression=True)) == [1.0, -1.0]


def test_the_words_of_a_lap() -> None:
    tension = lap(lap_class="B")
    assert {"ℓ", "st"} <= {text.text for text in texts(tension)}
    assert tension.caption == "Tension lap of #6 bars, class B"
    assert tension.alt.startswith("Elevation to scale of W3: tension lap, class B of #6 bars, 0.750 in in diameter")
    pushed = lap(compression=True, mark="")
    assert {"ℓ", "sc"} <= {text.text for text in texts(pushed)}
    assert pushed.caption == "Compression lap of #6 bars"
    assert pushed.alt.startswith("Elevation to scale: compression lap of #6 bars")
    assert {"ℓ", "st,s"} <= {text.text for text in texts(lap(symbol="ℓ_{st,s}"))}


def test_the_middle_of_a_long_lap_of_thin_bars_is_left_out() -> None:
    figure = lap(d_b=0.375, lap_required=62.0, lap_available=70.0, bar_label="#3")
    assert len(bars(figure, INK)) == len(bars(figure, GREY)) == 2
    # Two breaks at the ends of the drawing and two at the gap.
    assert len(shapes(figure, "break")) == 4
    assert all(shape.weight >= 1.5 for shape in shapes(figure, "bar"))
    assert "Middle of the lap left out" in words(figure)
    # At 1 in = 12 in a lap of 3.6 in of paper shows 43.2 in, 2.4 in of them for the gap: 29.2 in of 70 in are missing.
    assert "; 29.2 in of the length is left out." in figure.alt
    assert {"62.0 in", "70.0 in available"} <= {text.text.removeprefix("= ") for text in texts(figure)}
    drawn = max(bar.box[2] for bar in bars(figure, INK)) - min(bar.box[0] for bar in bars(figure, GREY))
    assert drawn * stated_scale(figure) == pytest.approx(43.2, rel=0.005)


@pytest.mark.parametrize(("d_b", "required", "available"), [(0.375, 40.0, 42.0), (1.41, 120.0, 130.0)])
def test_a_lap_that_fits_is_not_broken(d_b: float, required: float, available: float) -> None:
    figure = lap(d_b=d_b, lap_required=required, lap_available=available)
    assert "left out" not in words(figure) + figure.alt
    assert lapped(figure) == pytest.approx(available, rel=0.005)


def test_nothing_is_left_out_where_the_bars_do_not_run() -> None:
    # 10 in of lap have no middle to spare: the length beyond them stays to scale.
    figure = lap(d_b=0.375, lap_required=82.0, lap_available=10.0)
    assert "left out" not in words(figure) + figure.alt
    assert lapped(figure) == pytest.approx(10.0, rel=0.01)
    assert 82.0 in level_lengths(figure)


def test_a_scale_that_is_asked_for_is_kept() -> None:
    figure = lap(d_b=0.375, lap_required=62.0, lap_available=70.0, scale=32.0)
    assert stated_scale(figure) == 32
    assert lapped(figure) == pytest.approx(70.0, rel=0.005)


def test_a_lap_that_cannot_be_is_refused() -> None:
    with pytest.raises(RangeError, match="the lap detail cannot be drawn") as caught:
        lap(d_b=0.0, other_d_b=-1.0, lap_required=-2.0, lap_available=0.0)
    assert [problem.given for problem in caught.value.problems] == [
        "d_b = 0 in",
        "other_d_b = -1 in",
        "lap_required = -2 in",
        "lap_available = 0 in",
    ]


def starts_and_ends(figure: Figure) -> list[tuple[float, float]]:
    """Where each lap starts and ends from the first one's start, inches of the building, from the top down."""
    origin, scale = bars(figure, GREY)[0].box[0], stated_scale(figure)
    pairs = zip(bars(figure, GREY), bars(figure, INK), strict=True)
    return [((right.box[0] - origin) * scale, (left.box[2] - origin) * scale) for right, left in pairs]


def test_every_other_lap_is_moved_along() -> None:
    places = starts_and_ends(stagger())
    expected = [(0.0, 25.5), (30.0, 55.5), (0.0, 25.5), (30.0, 55.5)]
    assert [place for pair in places for place in pair] == pytest.approx(
        [place for pair in expected for place in pair], abs=0.05
    )


def test_all_laps_at_one_section() -> None:
    places = starts_and_ends(stagger(lap=33.1, stagger=0.0, bars=6))
    assert len(places) == 6
    assert all(place == pytest.approx((0.0, 33.1), abs=0.05) for place in places)


def test_the_bars_are_their_spacing_apart() -> None:
    figure = stagger()
    scale, drawn = stated_scale(figure), bars(figure, INK)
    apart = [(one.centre[1] - other.centre[1]) * scale for one, other in pairwise(drawn)]
    assert apart == pytest.approx([8.0] * 3, rel=0.005)
    assert '8"' in {text.text for text in texts(figure)}


def test_laps_stagger_and_spacing_are_dimensioned() -> None:
    assert level_lengths(stagger()) == [25.5, 25.5, 30.0]
    assert level_lengths(stagger(stagger=0.0)) == [25.5]
    # Lines through the starts and ends of the laps; the second starts where the first ends.
    assert len(shapes(stagger(), "lap end")) == 4
    assert len(shapes(stagger(stagger=25.5), "lap end")) == 3
    assert len(shapes(stagger(stagger=0.0), "lap end")) == 2


def test_the_words_of_a_stagger() -> None:
    apart = stagger(mark="W3")
    assert "Class A: every other bar lapped at one section, the rest 30.0 in ≥ ℓ st along" in words(apart)
    assert apart.caption == "Laps of class A, #6 @ 8 in"
    assert 'of W3: 4 parallel bars #6 @ 8 in, 0.750 in in diameter, 8" apart, each lapped 25.5 in, class A' in apart.alt
    together = stagger(stagger=0.0)
    assert "Class B: all bars lapped at one section" in words(together)
    assert together.alt.endswith("class B; all bars lapped at one section.")
    # Bars stressed above half of f_y are class B, staggered or not.
    assert stagger(lap_class="B").caption == "Laps of class B, #6 @ 8 in"


def test_laps_that_would_meet_are_refused() -> None:
    assert stagger(stagger=25.5)
    with pytest.raises(RangeError, match=r"stagger = 25\.4 in +0 in, or the lap, 25\.5 in, and more: move"):
        stagger(stagger=25.4)
    with pytest.raises(RangeError, match=r"stagger = -1 in"):
        stagger(stagger=-1.0)


def test_class_a_at_one_section_is_refused_with_its_clause() -> None:
    with pytest.raises(RangeError, match=r"class A at one section +half of the bars .*25\.5\.2\.1\): stagger them"):
        stagger(stagger=0.0, lap_class="A")
    with pytest.raises(RangeError, match=r"lap_class = 'C' +A or B"):
        stagger(lap_class="C")


@pytest.mark.parametrize("count", [4, 12])
def test_as_many_bars_as_can_be_read(count: int) -> None:
    assert len(bars(stagger(bars=count), INK)) == count


@pytest.mark.parametrize("count", [3, 13])
def test_too_few_or_too_many_bars_are_refused(count: int) -> None:
    with pytest.raises(RangeError, match=rf"bars = {count} +4 to 12"):
        stagger(bars=count)


def test_bars_need_room_for_their_laps() -> None:
    assert stagger(spacing=1.51)
    with pytest.raises(RangeError, match=r"spacing = 1\.5 in +more than two bars side by side, 1\.5 in"):
        stagger(spacing=1.5)
