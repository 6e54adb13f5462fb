"""Bar details: lengths to scale on the page, verdicts in words, impossible details refused."""

from __future__ import annotations

import math

import pytest
from gallery import cantilever, development, dowels, hook, hook_180
from svg_reading import Shape, shapes, texts, words

from calcpack.errors import RangeError
from calcpack.figures import Figure


def stated_scale(figure: Figure) -> float:
    (note,) = (text.text for text in texts(figure) if text.text.startswith("Scale"))
    number, unit = note.removeprefix("Scale 1 in = ").split()
    return float(number) * (12 if unit == "ft" else 1)


def critical(figure: Figure) -> float:
    (line,) = shapes(figure, "critical section")
    return line.centre[0]


def level_lengths(figure: Figure) -> list[float]:
    """Lengths of the level dimension lines, inches of the building."""
    lines = shapes(figure, "dimension")
    return sorted(round(line.width * stated_scale(figure), 1) for line in lines if line.height < 1e-6)


def bar_of(figure: Figure) -> Shape:
    return max(shapes(figure, "bar"), key=lambda shape: len(shape.points))


@pytest.mark.parametrize("available", [41.0, 28.0, 33.1])
def test_the_straight_bar_ends_where_it_does(available: float) -> None:
    figure = development(available=available)
    scale = stated_scale(figure)
    bar = bar_of(figure)
    assert (bar.box[2] - critical(figure)) * scale == pytest.approx(available, rel=0.005)
    assert bar.weight == pytest.approx(1.0 / scale * 72, rel=0.005)
    assert {33.1, available} <= set(level_lengths(figure))


def test_a_straight_bar_lies_under_its_cover() -> None:
    figure = development()
    (outline,) = shapes(figure, "outline")
    # Cover 2 in + half of 1 in.
    assert (outline.box[3] - bar_of(figure).box[3]) * stated_scale(figure) == pytest.approx(2.5, rel=0.005)
    assert outline.height * stated_scale(figure) == pytest.approx(24.0, rel=0.005)


@pytest.mark.parametrize(("available", "word", "sign"), [(33.2, "OK", "≤"), (33.1, "OK", "≤"), (33.0, "NG", ">")])
def test_the_word_on_both_sides_and_on_the_limit(available: float, word: str, sign: str) -> None:
    figure = development(available=available)
    assert word in [text.text for text in texts(figure)]
    assert f"= 33.1 in {sign} {available:.1f} in available" in words(figure)
    assert figure.alt.endswith(f"33.1 in is required: {word}.")


def test_the_words_of_a_development() -> None:
    figure = development(section_label="column face", member="beam B2", symbol="ℓ_{dc}")
    assert {"#8 top", "column face", "ℓ", "dc", "2'-0\""} <= {text.text for text in texts(figure)}
    assert "past the column face of beam B2, 2'-0\" deep" in figure.alt
    assert figure.caption == "Development of #8 top past the column face"


def test_the_shorter_length_stands_nearer() -> None:
    for figure in (development(), development(available=28.0), hook(), hook_180(), cantilever()):
        level = {text.text: text.box[1] for text in texts(figure) if "available" in text.text or text.text == "ℓ"}
        need, have = level_of_symbol(figure), max(y for text, y in level.items() if text.endswith("available"))
        assert (need > have) == ("NG" in words(figure))


def level_of_symbol(figure: Figure) -> float:
    return max(text.box[1] for text in texts(figure) if text.text == "ℓ")


def test_a_bar_deeper_than_its_member_is_refused() -> None:
    assert development(h=3.01)
    with pytest.raises(RangeError, match=r"3 in are needed +less than h = 3 in"):
        development(h=3.0)
    with pytest.raises(RangeError, match="the development detail cannot be drawn") as caught:
        development(d_b=-1.0, l_d=0.0, available=math.inf)
    assert [p.given for p in caught.value.problems] == ["d_b = -1 in", "l_d = 0 in", "available = inf in"]


def test_the_hook_reaches_its_available_length() -> None:
    figure = hook()
    scale, bar = stated_scale(figure), bar_of(figure)
    # To the outside of the hook; the drawn path is the centreline, half a bar inside.
    assert (bar.box[2] - critical(figure)) * scale + 0.5 == pytest.approx(15.5, rel=0.005)


def test_the_bend_and_the_tail_of_90_degrees() -> None:
    figure = hook()
    scale, bar = stated_scale(figure), bar_of(figure)
    # Centreline radius (6 + 1)/2 = 3.5 in, then 12 in of extension: 15.5 in down.
    assert bar.height * scale == pytest.approx(15.5, rel=0.005)
    assert (bar.points[-2][1] - bar.points[-1][1]) * scale == pytest.approx(12.0, rel=0.005)
    assert bar.points[-1][0] == pytest.approx(bar.points[-2][0], abs=1e-5)


def test_the_bend_and_the_tail_of_180_degrees() -> None:
    figure = hook_180()
    scale, bar = stated_scale(figure), bar_of(figure)
    # Centreline diameter 4.5 + 0.75 = 5.25 in; the tail runs back 3 in.
    assert bar.height * scale == pytest.approx(5.25, rel=0.005)
    assert (bar.points[-2][0] - bar.points[-1][0]) * scale == pytest.approx(3.0, rel=0.005)
    assert (bar.box[2] - critical(figure)) * scale + 0.375 == pytest.approx(9.5, rel=0.005)


def test_the_cover_beyond_the_hook() -> None:
    figure = hook()
    faces = [shape.box[2] for shape in shapes(figure, "outline")]
    assert (max(faces) - critical(figure)) * stated_scale(figure) == pytest.approx(15.5 + 2.5, rel=0.005)
    assert '2 1/2"' in {text.text for text in texts(figure)}


def test_the_words_of_a_hook() -> None:
    figure = hook()
    assert {"6.0 in inside dia.", "12.0 in ext.", "3-#8", "column face", "15.5 in available", "OK"} <= {
        text.text for text in texts(figure)
    }
    assert "standard 90 degree hook in column C3, bend diameter 6.0 in inside, extension 12.0 in" in figure.alt
    assert "9.5 in is available" in hook_180().alt
    assert hook_180().alt.endswith("NG.")
    assert hook_180().caption == "Standard 180° hook of 3-#6 in column C3"


def test_a_hook_that_cannot_be_is_refused() -> None:
    with pytest.raises(RangeError, match=r"bend = 135 degrees +90 or 180 degrees"):
        hook(bend=135)
    # 6/2 + 1 = 4 in: the bend alone.
    assert hook(available=4.01)
    with pytest.raises(RangeError, match=r"available = 4 in +more than the bend, 4 in: lengthen it"):
        hook(available=4.0)
    with pytest.raises(RangeError, match=r"tail_cover = 0 in"):
        hook(tail_cover=0.0)


def test_the_cantilever_to_scale() -> None:
    figure = cantilever()
    scale, bar, face = stated_scale(figure), bar_of(figure), critical(figure)
    assert (face - bar.box[0]) * scale == pytest.approx(41.0, rel=0.005)
    # Stops its cover short of the tip.
    assert (bar.box[2] - face) * scale == pytest.approx(72.0 - 2.0, rel=0.005)
    assert {18.0, 33.1, 41.0, 72.0} <= set(level_lengths(figure))


def test_a_back_span_of_another_depth() -> None:
    figure = cantilever(h=8.0, h_back=12.0)
    backs = [shape for shape in shapes(figure, "outline") if shape.box[2] < critical(figure) - 0.01]
    (back,) = backs
    (front,) = (shape for shape in shapes(figure, "outline") if shape not in backs)
    # Below the top face: 12 in on the left, and its support 0.8 of the greater depth further.
    assert (front.box[3] - back.points[0][1]) * stated_scale(figure) == pytest.approx(12.0, rel=0.005)
    assert '8"' in {text.text for text in texts(figure)}


def test_the_words_of_a_cantilever() -> None:
    figure = cantilever()
    assert {"6'-0\"", "1'-6\"", "1'-4\"", "face of support", "#8 @ 5 in top"} <= {text.text for text in texts(figure)}
    assert "6'-0\" beyond a support 1'-6\" wide, 1'-4\" deep" in figure.alt
    with pytest.raises(RangeError, match=r"the cantilever detail.*\n.*span = 0 in"):
        cantilever(span=0.0)
    with pytest.raises(RangeError, match=r"3 in are needed +less than h = 3 in"):
        cantilever(h_back=3.0)


def test_dowels_to_scale() -> None:
    figure = dowels()
    scale = stated_scale(figure)
    footing = max(shapes(figure, "outline"), key=lambda shape: shape.width)
    assert (footing.width * scale, footing.height * scale) == pytest.approx((84.0, 24.0), rel=0.005)
    hooked = [shape for shape in shapes(figure, "bar") if len(shape.points) > 4]
    assert len(hooked) == 2
    for bar in hooked:
        assert (bar.box[3] - footing.box[3]) * scale == pytest.approx(36.0, rel=0.005)
        # Straight to 14 in, then the centreline radius (9.024 + 1.128)/2 = 5.076 in.
        assert (footing.box[3] - bar.box[1]) * scale == pytest.approx(19.076, rel=0.005)
        assert bar.width * scale == pytest.approx(5.076 + 13.5, rel=0.005)


def test_dowels_turn_outward_and_lap_the_column_bars() -> None:
    figure = dowels()
    middle = max(shapes(figure, "outline"), key=lambda shape: shape.width).centre[0]
    hooked = [shape for shape in shapes(figure, "bar") if len(shape.points) > 4]
    straight = [shape for shape in shapes(figure, "bar") if len(shape.points) == 2]
    assert {bar.points[-1][0] > middle for bar in hooked} == {True, False}
    assert all(abs(bar.points[-1][0] - middle) > abs(bar.points[0][0] - middle) for bar in hooked)
    assert len(straight) == 2
    assert all("#8a8a8a" in bar.style for bar in straight)


def test_each_length_of_the_dowels_has_its_word() -> None:
    figure = dowels()
    bold = [text.text for text in texts(figure) if text.text in {"OK", "NG"}]
    assert bold == ["OK", "NG"]
    assert "lap 34.0 in required and 36.0 in provided: OK" in figure.alt
    assert "straight embedment 21.4 in required and 14.0 in provided: NG" in figure.alt
    assert {"36.0 in lap", "14.0 in", "8-#9 dowels", "7'-0\""} <= {text.text for text in texts(figure)}


def test_dowels_that_do_not_fit_are_refused() -> None:
    # 14 + 5.076 + 0.564 + 3 = 22.64 in.
    assert dowels(footing_h=22.64)
    with pytest.raises(RangeError, match=r"embedment, bend and cover take 22\.64 in +footing_h = 22\.6 in"):
        dowels(footing_h=22.6)
    with pytest.raises(RangeError, match=r"84 in are needed +less than footing_width = 84 in"):
        dowels(column_h=84.0)
    with pytest.raises(RangeError, match=r"column_cover = 8 in +two dowels side by side"):
        dowels(column_cover=8.0)
