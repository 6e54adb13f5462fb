"""Lettering finds a place that is clear, and lines are broken at it."""

from __future__ import annotations

import pytest
from hypothesis import given
from hypothesis import strategies as st
from svg_reading import crosses, overlap

from calcpack.figures.clearing import BLOCKED, Obstacles, broken, centred, inked, inside_part
from calcpack.figures.drawing import Label
from calcpack.figures.numerals import numbered

BOX = (1.0, 1.0, 2.0, 3.0)
POINTS = st.tuples(st.floats(-4, 6), st.floats(-4, 6))


def test_the_part_of_a_segment_in_a_box() -> None:
    assert inside_part((0.0, 2.0), (4.0, 2.0), BOX) == pytest.approx((0.25, 0.5))
    assert inside_part((1.5, 0.0), (1.5, 2.0), BOX) == pytest.approx((0.5, 1.0))
    assert inside_part((1.2, 1.2), (1.8, 2.8), BOX) == (0.0, 1.0)
    assert inside_part((0.0, 0.5), (4.0, 0.5), BOX) is None
    # Along a side it is not inside.
    assert inside_part((0.0, 1.0), (4.0, 1.0), BOX) is None


@given(POINTS, POINTS)
def test_pieces_keep_off_the_boxes_and_lie_on_the_segment(start: tuple[float, float], end: tuple[float, float]) -> None:
    boxes = [BOX, (1.5, 2.0, 4.0, 2.5)]
    for one, other in broken(start, end, boxes):
        assert not any(crosses(one, other, box) for box in boxes)
        for x, y in (one, other):
            across = (end[0] - start[0]) * (y - start[1]) - (end[1] - start[1]) * (x - start[0])
            assert across == pytest.approx(0.0, abs=1e-6)


def test_how_a_segment_is_broken() -> None:
    # A gap of 0.02 in is kept on both sides.
    assert broken((0.0, 2.0), (4.0, 2.0), [BOX]) == [((0.0, 2.0), (0.98, 2.0)), ((2.02, 2.0), (4.0, 2.0))]
    assert broken((0.0, 2.0), (4.0, 2.0), []) == [((0.0, 2.0), (4.0, 2.0))]
    assert broken((1.2, 2.0), (1.8, 2.0), [BOX]) == []
    nested = [BOX, (0.5, 1.5, 3.0, 2.5)]
    assert broken((0.0, 2.0), (4.0, 2.0), nested) == [((0.0, 2.0), (0.48, 2.0)), ((3.02, 2.0), (4.0, 2.0))]


def test_a_label_centred_on_a_point() -> None:
    for turn in (0, 90):
        left, bottom, right, top = inked(centred("E", (1.0, 2.0), 7.0, turn))
        assert ((left + right) / 2, (bottom + top) / 2) == pytest.approx((1.0, 2.0), abs=0.003)


def test_room_below_the_line_only_for_letters_that_hang() -> None:
    assert inked(Label("24", (1.0, 2.0)))[1] == 2.0
    assert inked(Label("24", (1.0, 2.0), turn=90))[2] == 1.0
    assert inked(Label("y", (1.0, 2.0))) == Label("y", (1.0, 2.0)).box


def test_what_standing_somewhere_costs() -> None:
    over = Obstacles(within=(0.0, 0.0, 4.0, 4.0))
    box = (1.0, 1.0, 1.5, 1.2)
    assert over.cost(box) == 0
    over.breakable.append(((0.0, 1.1), (4.0, 1.1)))
    assert 0 < over.cost(box) < BLOCKED
    over.breakable.clear()
    over.path([(0.0, 1.1), (4.0, 1.1), (4.0, 4.0)])
    assert over.cost(box) == BLOCKED
    over.discs.append(((1.6, 1.1), 0.1))
    assert over.cost(box) == 2 * BLOCKED
    over.boxes.append((1.2, 0.0, 1.3, 4.0))
    assert over.cost(box) == 3 * BLOCKED
    assert over.cost((-0.1, 2.0, 0.2, 2.2)) == BLOCKED


def test_a_disc_counts_by_its_distance_from_the_box() -> None:
    # The corner grown by 0.02 in is at (1.52, 1.22); a centre 0.1 in off both ways is 0.1414 in from it.
    box = (1.0, 1.0, 1.5, 1.2)
    assert Obstacles(discs=[((1.62, 1.32), 0.141)]).cost(box) == 0
    assert Obstacles(discs=[((1.62, 1.32), 0.142)]).cost(box) == BLOCKED


def test_the_first_of_the_best_is_taken_and_then_stands_in_the_way() -> None:
    over = Obstacles(discs=[((1.0, 1.0), 0.1)])
    labels = [Label("8", (x, 1.0)) for x in (1.0, 2.0, 3.0)]
    assert over.place(labels) is labels[1]
    assert over.place(labels) is labels[2]
    assert not overlap(inked(labels[1]), inked(labels[2]))
    # With no place left, the one that covers least.
    assert over.place(labels[:1]) is labels[0]


def test_numerals_of_a_ring_stand_inside_it() -> None:
    bars = [((x, y), 0.05) for x, y in ((-1.0, -1.0), (0.0, -1.0), (1.0, -1.0), (-1.0, 1.0), (0.0, 1.0), (1.0, 1.0))]
    found = numbered(bars, Obstacles(discs=list(bars)), circular=False)
    assert [label.text for label in found] == ["1", "2", "3", "4", "5", "6"]
    for label in found:
        left, bottom, right, top = inked(label)
        assert min(left, bottom) > -1.0
        assert max(right, top) < 1.0


def test_a_bar_in_the_middle_has_its_numeral_below() -> None:
    bars = [((0.0, 0.0), 0.05), ((1.0, 0.0), 0.05), ((-1.0, 0.0), 0.05)]
    for circular in (True, False):
        first = numbered(bars, Obstacles(discs=list(bars)), circular=circular)[0]
        assert inked(first)[3] < -0.05
