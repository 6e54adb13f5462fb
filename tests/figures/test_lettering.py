"""Widths of text in the shipped face, and subscripts."""

from __future__ import annotations

import pytest
from fontTools.ttLib import TTFont

from calcpack import fonts
from calcpack.figures.drawing import Label, arc
from calcpack.figures.lettering import runs, text_width


def test_runs() -> None:
    assert runs("plain") == [("plain", False)]
    assert runs("ℓ_{d} = 3 in") == [("ℓ", False), ("d", True), (" = 3 in", False)]
    assert runs("a_{b}c_{de}") == [("a", False), ("b", True), ("c", False), ("de", True)]
    assert runs("") == []


@pytest.mark.parametrize("weight", [400, 600])
def test_widths_are_the_advances_of_the_font_file(weight: int) -> None:
    face = TTFont(fonts.matplotlib_face(weight))
    names = face.getBestCmap()
    units = sum(face["hmtx"][names[ord(c)]][0] for c in "8-#9 ℓ")
    # 1000 units in an em (head table); 7.5 pt an em; 72 pt an inch.
    assert text_width("8-#9 ℓ", 7.5, weight) == pytest.approx(units / 1000 * 7.5 / 72, rel=2e-3)


def test_a_subscript_is_narrower() -> None:
    assert text_width("ℓ_{d}", 7.5) < text_width("ℓd", 7.5)
    assert text_width("ℓ_{d}", 7.5) > text_width("ℓ", 7.5)


def test_the_box_of_a_label_follows_its_anchor() -> None:
    width = text_width("2 1/2", 7.5)
    left, centre, right = (Label("2 1/2", (1.0, 2.0), anchor).box for anchor in ("left", "center", "right"))
    assert left[0] == pytest.approx(1.0)
    assert right[2] == pytest.approx(1.0)
    assert (centre[0] + centre[2]) / 2 == pytest.approx(1.0)
    assert left[2] - left[0] == pytest.approx(width)
    upright = Label("2 1/2", (1.0, 2.0), "center", turn=90).box
    assert upright[3] - upright[1] == pytest.approx(width)
    assert (upright[1] + upright[3]) / 2 == pytest.approx(2.0)


def test_an_arc_ends_where_it_should() -> None:
    # A quarter of the circle of radius 2 about (1, 1), clockwise from the top: geometry.
    points = arc((1.0, 1.0), 2.0, 90, 0)
    assert points[0] == pytest.approx((1.0, 3.0))
    assert points[-1] == pytest.approx((3.0, 1.0))
    assert len(points) == 19
    assert all((x - 1) ** 2 + (y - 1) ** 2 == pytest.approx(4.0) for x, y in points)
