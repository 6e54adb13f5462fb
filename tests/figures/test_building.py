"""Key plan and section of a building: to scale, marked, and refused where they cannot be."""

from __future__ import annotations

import itertools
import math

import pytest
from gallery import FT, building, plan
from svg_reading import shapes, texts, words

from calcpack.errors import RangeError


def test_the_plan_to_scale() -> None:
    figure = plan()
    (outline,) = shapes(figure, "outline")
    # 86 ft and 48 ft 6 in between the outer lines, 9 in of slab beyond each; 1 in = 20 ft.
    assert "Scale 1 in = 20 ft" in words(figure)
    assert outline.width * 240 == pytest.approx(86 * FT + 18, rel=0.005)
    assert outline.height * 240 == pytest.approx(48 * FT + 6 + 18, rel=0.005)


def test_columns_stand_on_their_grid_lines_at_their_size() -> None:
    figure = plan()
    (outline,) = shapes(figure, "outline")
    columns = shapes(figure, "column")
    assert len(columns) == 7
    sizes = sorted((round(c.width * 240, 1), round(c.height * 240, 1)) for c in columns)
    # 18 in square unless a size is given.
    assert sizes == [(18.0, 18.0)] * 5 + [(20.0, 24.0)] * 2
    pointed = sorted(c.centre for c in columns if "#234f8c" in c.style)
    origin = outline.box[0] + 9 / 240, outline.box[1] + 9 / 240
    found = [((x - origin[0]) * 240, (y - origin[1]) * 240) for x, y in pointed]
    assert found[0] == pytest.approx((28 * FT, 24 * FT), rel=0.005)
    assert found[1] == pytest.approx((58 * FT, 24 * FT), rel=0.005)


def test_bubbles_and_bay_dimensions() -> None:
    figure = plan()
    named = [text.text for text in texts(figure)]
    assert len(shapes(figure, "bubble")) == 7
    assert all(name in named for name in ("A", "B", "C", "D", "1", "2", "3"))
    assert named.count("28'-0\"") == 2
    assert {"30'-0\"", "24'-0\"", "24'-6\"", "86'-0\"", "48'-6\""} <= set(named)
    for bubble in shapes(figure, "bubble"):
        assert (
            sum(
                math.dist(bubble.centre, ((t.box[0] + t.box[2]) / 2, (t.box[1] + t.box[3]) / 2)) < 0.03
                for t in texts(figure)
            )
            == 1
        )


def test_marks_as_often_as_columns() -> None:
    named = [text.text for text in texts(plan())]
    assert (named.count("C1"), named.count("C3"), named.count("C4")) == (4, 2, 1)


def test_a_single_bay_has_no_overall_dimension() -> None:
    figure = plan(grid_x=[("A", 0.0), ("B", 240.0)], columns={"C1": (0, 0)}, sizes={}, emphasis=())
    assert [text.text for text in texts(figure)].count("20'-0\"") == 1


@pytest.mark.parametrize("direction", [0.0, 70.0, 180.0])
def test_north(direction: float) -> None:
    (arrow,) = shapes(plan(north=direction), "north")
    (x1, y1), (x2, y2) = arrow.points
    assert math.degrees(math.atan2(y2 - y1, x2 - x1)) % 360 == pytest.approx(direction, abs=0.01)
    assert "N" in {text.text for text in texts(plan(north=direction))}


def test_no_north_unless_asked() -> None:
    assert shapes(plan(north=None), "north") == []


def test_the_plan_in_words() -> None:
    alt = plan().alt
    assert alt.startswith(
        "Key plan, level 2, to scale: 4 grid lines along x from A to D, 86'-0\" apart in all, 3 along y"
    )
    assert alt.endswith("7 columns: C1, C3, C4.")


def test_all_problems_of_a_plan_at_once() -> None:
    with pytest.raises(RangeError, match="the framing plan cannot be drawn") as caught:
        plan(
            grid_x=[("A", 0.0), ("B", 100.0), ("C", 100.0)],
            grid_y=[("1", 0.0)],
            columns={"C1": (0, 1)},
            sizes={"C1": (0.0, 18.0)},
            emphasis=("C9",),
            edge=-1.0,
        )
    assert [problem.given for problem in caught.value.problems] == [
        "grid_x: C at 100 in",
        "grid_y has 1",
        "edge = -1 in",
        "b of C1 = 0 in",
        "column C1 at (0, 1)",
        "emphasis on C9",
    ]


@pytest.mark.parametrize("place", [(-1, 0), (4, 0), (0, 3)])
def test_a_column_off_the_grid_is_refused(place: tuple[int, int]) -> None:
    assert plan(columns={"C1": (3, 2)}, sizes={}, emphasis=())
    with pytest.raises(RangeError, match=r"column C1 at .* indices from \(0, 0\) to \(3, 2\): correct its grid lines"):
        plan(columns={"C1": place}, sizes={}, emphasis=())


def test_a_plan_without_columns_is_refused() -> None:
    with pytest.raises(RangeError, match=r"no columns +one column at least"):
        plan(columns={}, emphasis=())


def test_the_section_to_scale() -> None:
    figure = building()
    columns, slabs, footings = (shapes(figure, part) for part in ("column", "slab", "footing"))
    assert "Scale 1 in = 20 ft" in words(figure)
    assert (len(columns), len(slabs), len(footings)) == (3, 3, 3)
    # From the top of the footings to the roof: 3 ft + 26 ft.
    assert {round(column.height * 240 / FT, 2) for column in columns} == {29.0}
    assert {round(footing.width * 240, 1) for footing in footings} == {84.0}
    tops = sorted(slab.box[3] for slab in slabs)
    assert [(b - a) * 240 for a, b in itertools.pairwise(tops)] == pytest.approx([14 * FT, 12 * FT], rel=0.005)
    places = sorted(column.centre[0] for column in columns)
    assert [(b - a) * 240 for a, b in itertools.pairwise(places)] == pytest.approx([28 * FT, 30 * FT], rel=0.005)


def test_levels_and_storeys_are_named() -> None:
    named = {text.text for text in texts(building())}
    assert {
        "Footing\u00a0\u00a0−3'-0\"",
        "Level 1\u00a0\u00a0±0",
        "Level 2\u00a0\u00a0+14'-0\"",
        "Roof\u00a0\u00a0+26'-0\"",
    } <= named
    assert {"3'-0\"", "14'-0\"", "12'-0\"", "28'-0\"", "30'-0\"", "A", "B", "C"} <= named


def test_the_ground_only_where_asked() -> None:
    assert len(shapes(building(), "ground")) == 1
    assert shapes(building(ground=""), "ground") == []


def test_the_section_in_words() -> None:
    figure = building()
    assert figure.caption == "Section on line 2"
    assert figure.alt.endswith(
        "column lines A, B, C, 58'-0\" apart in all; Level 1 3'-0\" above Footing, Level 2 14'-0\" above Level 1, "
        "Roof 12'-0\" above Level 2."
    )


def test_all_problems_of_a_section_at_once() -> None:
    with pytest.raises(RangeError, match="the building section cannot be drawn") as caught:
        building(levels=[("One", 0.0), ("Two", -1.0)], grid=[("A", 0.0)], ground="Attic", slab_h=0.0)
    assert [problem.given for problem in caught.value.problems] == [
        "slab_h = 0 in",
        "levels: Two at -1 in",
        "grid has 1",
        "ground = Attic",
    ]
