"""Straight, hooked and headed ends in concrete of which little is stated: to scale, and nothing made up.

Sizes are invented; expected places are worked by hand beside each test, by the geometry of the detail alone.
"""

from __future__ import annotations

import math
from collections.abc import Callable
from typing import Any

import pytest
from gallery import headed, hooked, hooked_180, straight
from svg_reading import shapes, texts, words
from test_details import bar_of, critical, level_lengths, stated_scale

from calcpack.errors import RangeError
from calcpack.figures import Figure

ENDS: list[tuple[Callable[..., Figure], str]] = [(straight, "l_d"), (hooked, "l_dh"), (headed, "l_dt")]
each_end = pytest.mark.parametrize(("draw", "required"), ENDS)


def upright_outlines(figure: Figure) -> list[float]:
    """Places of upright faces right of the critical section, inches of the building from it."""
    scale, origin = stated_scale(figure), critical(figure)
    found = {
        round((start[0] - origin) * scale, 1)
        for shape in shapes(figure, "outline")
        for start, end in zip(shape.points, shape.points[1:], strict=False)
        if abs(start[0] - end[0]) < 1e-6
    }
    return sorted(place for place in found if place > 0)


@each_end
def test_the_word_on_both_sides_and_on_the_limit(draw: Callable[..., Figure], required: str) -> None:
    for available, word, sign in ((14.1, "OK", "≤"), (14.0, "OK", "≤"), (13.9, "NG", ">")):
        figure = draw(**{required: 14.0}, available=available)
        assert word in [text.text for text in texts(figure)]
        assert f"14.0 in {sign} {available:.1f} in available" in words(figure)
        assert f"14.0 in is required and {available:.1f} in is available: {word}." in figure.alt
        assert {14.0, available} <= set(level_lengths(figure))


@each_end
def test_without_a_length_available_nothing_is_compared(draw: Callable[..., Figure], required: str) -> None:
    figure = draw(**{required: 14.0}, available=None)
    assert "= 14.0 in required; length available not stated" in words(figure)
    assert not {"OK", "NG"} & {text.text for text in texts(figure)}
    assert "14.0 in is required and the length available is not stated" in figure.alt
    assert 14.0 in level_lengths(figure)


@each_end
def test_lengths_that_differ_are_never_shown_alike(draw: Callable[..., Figure], required: str) -> None:
    figure = draw(**{required: 14.04}, available=14.03)
    assert "= 14.04 in > 14.03 in available" in words(figure)
    assert "14.04 in" in {text.text.removeprefix("= ") for text in texts(figure)}


@each_end
def test_the_shorter_length_stands_nearer(draw: Callable[..., Figure], required: str) -> None:
    for available, nearer in ((20.0, "need"), (8.0, "have")):
        figure = draw(**{required: 14.0}, available=available)
        have = max(text.box[1] for text in texts(figure) if text.text.endswith("in available"))
        need = max(text.box[1] for text in texts(figure) if text.text == "ℓ")
        assert (need < have) == (nearer == "need")


@each_end
def test_the_place_is_named_where_it_has_a_mark(draw: Callable[..., Figure], required: str) -> None:
    assert draw(**{required: 14.0}, mark="T1").alt.startswith("Elevation to scale of T1: ")
    assert draw(**{required: 14.0}, mark="").alt.startswith("Elevation to scale: ")


@each_end
def test_the_critical_section_is_labelled(draw: Callable[..., Figure], required: str) -> None:
    assert "critical section" in {text.text for text in texts(draw(**{required: 14.0}))}
    figure = draw(**{required: 14.0}, section_label="column face")
    assert "column face" in {text.text for text in texts(figure)}
    assert "column face" in figure.alt


@pytest.mark.parametrize("available", [60.0, 20.0])
def test_the_straight_bar_ends_where_it_does(available: float) -> None:
    figure = straight(available=available)
    scale, bar = stated_scale(figure), bar_of(figure)
    assert (bar.box[2] - critical(figure)) * scale == pytest.approx(available, rel=0.005)
    assert bar.weight == pytest.approx(0.75 / scale * 72, rel=0.005)


@pytest.mark.parametrize(("top", "side"), [(True, 1), (False, -1)])
def test_only_the_stated_face_is_drawn_and_dimensioned(top: bool, side: int) -> None:
    figure = straight(top=top)
    (face,) = shapes(figure, "outline")
    # 2 in of cover and half of 3/4 in.
    away = (face.centre[1] - bar_of(figure).centre[1]) * stated_scale(figure)
    assert away == pytest.approx(side * 2.375, rel=0.01)
    assert '2"' in {text.text for text in texts(figure)}
    assert f'clear cover 2" at the {"top" if top else "bottom"};' in figure.alt


def test_no_face_and_no_cover_where_none_is_stated() -> None:
    figure = straight(cover=None)
    assert shapes(figure, "outline") == []
    assert not [text.text for text in texts(figure) if text.text.endswith('"')]
    assert "cover" not in figure.alt


def test_tension_and_compression_of_a_straight_end() -> None:
    def points_left(figure: Figure) -> bool:
        (head,) = (shape for shape in shapes(figure, "force") if len(shape.points) > 2)
        return head.points[0][0] < head.points[1][0]

    pulled, pushed = straight(), straight(compression=True, symbol="ℓ_{dc}")
    assert points_left(pulled)
    assert not points_left(pushed)
    assert pulled.caption == "Straight end of #6 top in tension"
    assert "dc" in {text.text for text in texts(pushed)}
    assert "in compression" in pushed.alt


def test_a_straight_end_that_cannot_be_is_refused() -> None:
    with pytest.raises(RangeError, match="the detail of a straight end cannot be drawn") as caught:
        straight(d_b=0.0, l_d=math.nan, available=-1.0, cover=0.0)
    given = [problem.given for problem in caught.value.problems]
    assert given == ["d_b = 0 in", "l_d = nan in", "available = -1 in", "cover = 0 in"]


@pytest.mark.parametrize("available", [17.0, 9.0])
def test_the_hook_reaches_its_available_length(available: float) -> None:
    figure = hooked(available=available)
    # To the outside of the hook; the drawn path is the centreline, half a bar inside.
    reach = (bar_of(figure).box[2] - critical(figure)) * stated_scale(figure)
    assert reach + 0.4375 == pytest.approx(available, rel=0.005)


def test_the_bend_and_the_extension_of_90_degrees() -> None:
    figure = hooked()
    scale, bar = stated_scale(figure), bar_of(figure)
    # Centreline radius (5.25 + 0.875)/2 = 3.0625 in, then 10.5 in.
    assert bar.height * scale == pytest.approx(13.5625, rel=0.005)
    assert (bar.points[-2][1] - bar.points[-1][1]) * scale == pytest.approx(10.5, rel=0.005)
    assert {"5 1/4 in inside dia.", "10 1/2 in ext."} <= {text.text for text in texts(figure)}
    assert "standard 90 degree hook, bend diameter 5 1/4 in inside, extension 10 1/2 in, " in figure.alt


def test_the_bend_and_the_extension_of_180_degrees() -> None:
    figure = hooked_180()
    scale, bar = stated_scale(figure), bar_of(figure)
    # Centreline diameter 2.25 + 0.375 = 2.625 in; the tail runs back 2.5 in.
    assert bar.height * scale == pytest.approx(2.625, rel=0.005)
    assert (bar.points[-2][0] - bar.points[-1][0]) * scale == pytest.approx(2.5, rel=0.005)
    assert 2.5 in [round(line.width * scale, 1) for line in dimensions_between_ticks(figure)]
    assert figure.caption == "Standard 180° hook of #3"


def dimensions_between_ticks(figure: Figure) -> list[Any]:
    """Level dimension lines cut to their ticks: text beside one makes the line itself longer (0.19 in of paper)."""
    cut = []
    for line in shapes(figure, "dimension"):
        left, _, right, _ = line.box
        ticks = sorted(
            tick.centre[0]
            for tick in shapes(figure)
            if tick.weight == 0.7 and not tick.part and abs(tick.centre[1] - line.centre[1]) < 1e-3
        )
        inner = [x for x in ticks if left - 1e-3 <= x <= right + 1e-3]
        if line.height < 1e-6 and len(inner) >= 2:
            points = ((inner[0], line.centre[1]), (inner[1], line.centre[1]))
            cut.append(type(line)(line.part, points, line.style))
    return cut


def test_a_hook_longer_than_its_joint_is_drawn_as_it_is() -> None:
    # 4 in are available and the hook alone takes 22.57/2 + 2.257 = 13.5 in: the bend starts before the section.
    figure = hooked(d_b=2.257, bend_diameter=22.57, extension=27.08, l_dh=60.2, available=4.0)
    bar = bar_of(figure)
    assert bar.points[1][0] < critical(figure)
    assert (bar.box[2] - critical(figure)) * stated_scale(figure) == pytest.approx(4.0 - 1.1285, abs=0.05)
    assert "NG" in {text.text for text in texts(figure)}


def test_concrete_encloses_a_tail_that_leaves_the_joint() -> None:
    figure = hooked_180(d_b=2.257, bend_diameter=22.57, extension=9.03, l_dh=60.2, available=10.0)
    left_end = min(shapes(figure, "break"), key=lambda shape: shape.box[0])
    assert bar_of(figure).points[-1][0] < critical(figure)
    assert left_end.box[1] < bar_of(figure).box[1]


def test_the_far_face_only_where_the_cover_beyond_is_stated() -> None:
    assert upright_outlines(hooked()) == [19.0]
    assert '2" clear beyond it' in hooked().alt
    assert len(shapes(hooked(), "break")) == 3
    assert upright_outlines(hooked(tail_cover=None)) == []
    assert "clear beyond" not in hooked(tail_cover=None).alt
    assert len(shapes(hooked(tail_cover=None), "break")) == 4
    # 16 in, a head as thick as the bar, 4.5 in.
    assert upright_outlines(headed()) == [21.4]
    assert upright_outlines(headed(head_cover=None)) == []


@pytest.mark.parametrize("draw", [hooked, headed])
def test_side_cover_is_noted_since_an_elevation_cannot_show_it(draw: Callable[..., Figure]) -> None:
    figure = draw(side_cover=2.75)
    assert 'Side cover 2 3/4", square to this elevation' in words(figure)
    assert '2 3/4" side cover' in figure.alt
    assert "ide cover" not in words(draw(side_cover=None)) + draw(side_cover=None).alt


def test_the_top_face_only_where_its_cover_is_stated() -> None:
    assert '2" clear above the bar' in hooked(cover=2.0).alt
    assert "above the bar" not in hooked().alt
    level = [
        start[1]
        for shape in shapes(hooked(cover=2.0), "outline")
        for start, end in zip(shape.points, shape.points[1:], strict=False)
        if abs(start[1] - end[1]) < 1e-6
    ]
    bar = bar_of(hooked(cover=2.0))
    # 2 in and half of 7/8 in above the straight part.
    (face,) = level
    assert (face - bar.box[3]) * stated_scale(hooked(cover=2.0)) == pytest.approx(2.4375, rel=0.01)


def test_a_hook_that_cannot_be_is_refused() -> None:
    with pytest.raises(RangeError, match=r"bend = 135 degrees +90 or 180 degrees \(a standard hook\): correct it"):
        hooked(bend=135)
    with pytest.raises(RangeError, match="the detail of a hooked end cannot be drawn") as caught:
        hooked(l_dh=0.0, available=0.0, tail_cover=-2.0, extension=math.inf)
    given = [problem.given for problem in caught.value.problems]
    assert given == ["extension = inf in", "l_dh = 0 in", "available = 0 in", "tail_cover = -2 in"]


def test_the_bearing_face_is_at_the_available_length() -> None:
    figure = headed()
    scale, origin = stated_scale(figure), critical(figure)
    (head,) = shapes(figure, "head")
    assert (head.box[0] - origin) * scale == pytest.approx(16.0, rel=0.005)
    assert head.height * scale == pytest.approx(2.25, rel=0.005)
    assert head.width * scale == pytest.approx(0.875, rel=0.01)
    assert (bar_of(figure).box[2] - origin) * scale == pytest.approx(16.0, rel=0.005)
    assert {"bearing face", 'head 2 1/4" wide', '4 1/2"'} <= {text.text for text in texts(figure)}
    (thick,) = shapes(headed(head_thickness=1.5), "head")
    assert thick.width * stated_scale(headed(head_thickness=1.5)) == pytest.approx(1.5, rel=0.01)


def test_the_words_of_a_head() -> None:
    figure = headed(head_label="round head")
    assert "round head" in {text.text for text in texts(figure)}
    assert (
        'with a round head, 4 1/2" clear beyond it, 2" clear above the bar; from the critical section to' in figure.alt
    )
    assert "to the bearing face of the head 14.4 in is required and 16.0 in is available: OK." in figure.alt
    assert figure.caption == "Headed #7 top in a joint"


def test_the_depth_of_the_member_of_a_headed_bar() -> None:
    figure = headed(h=24.0)
    assert "2'-0\"" in {text.text for text in texts(figure)}
    assert "2'-0\" depth of the member" in figure.alt
    left_end = min(shapes(figure, "break"), key=lambda shape: shape.box[0])
    # A break line goes 0.06 in past both faces on paper.
    assert (left_end.height - 0.12) * stated_scale(figure) == pytest.approx(24.0, rel=0.005)
    assert "2'-0\"" not in words(headed())


def test_a_head_that_cannot_be_is_refused() -> None:
    assert headed(head_width=0.88)
    with pytest.raises(RangeError, match=r"head_width = 0\.875 in +more than the bar, 0\.875 in"):
        headed(head_width=0.875)
    # 2 in of cover and 7/8 in of bar.
    assert headed(h=2.88)
    with pytest.raises(RangeError, match=r"2\.875 in are needed +less than h = 2\.875 in"):
        headed(h=2.875)
    with pytest.raises(RangeError, match=r"h = 24 in without a cover +both, or neither"):
        headed(h=24.0, cover=None)
    with pytest.raises(RangeError, match=r"the headed detail cannot be drawn") as caught:
        headed(l_dt=0.0, available=-3.0, head_cover=0.0, side_cover=-1.0, head_thickness=-1.0)
    assert len(caught.value.problems) == 5
