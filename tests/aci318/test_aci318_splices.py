"""Class of laps, laps of two sizes, mechanical splices, dowels. Hand arithmetic; clauses from memory where not said."""

from __future__ import annotations

import pytest

from calcpack.aci318 import dowels, splices
from calcpack.errors import RangeError


@pytest.mark.parametrize(
    ("times", "spliced", "factor"),
    [
        # AB-LAP-06: class A needs twice the area and half the bars or fewer.
        (2.1, 0.5, 1.0),
        (2.1, 1.0, 1.3),
        (1.9, 0.5, 1.3),
        (1.9, 1.0, 1.3),
        # on both conditions, and just beyond each
        (2.0, 0.5, 1.0),
        (1.999, 0.5, 1.3),
        (2.0, 0.501, 1.3),
    ],
)
def test_class_by_area(times: float, spliced: float, factor: float) -> None:
    found = splices.lap_by_area(l_d_a=30.0, A_s_required=1.0, A_s_provided=times, r_spliced=spliced)
    assert found == pytest.approx(30.0 * factor)


@pytest.mark.parametrize(
    ("stress", "spliced", "factor"),
    [(0.5, 0.5, 1.0), (0.501, 0.5, 1.3), (0.5, 0.501, 1.3), (0.0, 0.5, 1.0), (0.2, 1.0, 1.3), (0.9, 0.25, 1.3)],
)
def test_class_of_column_bars(stress: float, spliced: float, factor: float) -> None:
    # Table 10.7.5.2.2: up to half of f_y with half the bars or fewer spliced, class A; else class B.
    found = splices.lap_by_bar_stress(l_d_a=30.0, r_stress=stress, r_spliced=spliced)
    assert found == pytest.approx(30.0 * factor)


@pytest.mark.parametrize(("l_d_a", "a", "b"), [(7.637, 12.0, 12.0), (9.5, 12.0, 12.35), (12.0, 12.0, 15.6)])
def test_trap_the_minimum_stands_once_whatever_chooses_the_class(l_d_a: float, a: float, b: float) -> None:
    # AB-LAP-05: the 12 in is of the lap, not of the length it starts from.
    for r_spliced, expected in ((0.5, a), (1.0, b)):
        areas = {"A_s_required": 1.0, "A_s_provided": 2.0}
        assert splices.lap_by_area(l_d_a=l_d_a, **areas, r_spliced=r_spliced) == pytest.approx(expected)
        assert splices.lap_by_bar_stress(l_d_a=l_d_a, r_stress=0.3, r_spliced=r_spliced) == pytest.approx(expected)


@pytest.mark.parametrize("share", [-0.1, 1.1])
def test_a_share_lies_between_nothing_and_all(share: float) -> None:
    with pytest.raises(RangeError, match=r"r_spliced = -?\d.* allowed 0 to 1 \(a share of the bars\)"):
        splices.lap_by_area(l_d_a=30.0, A_s_required=1.0, A_s_provided=2.0, r_spliced=share)


@pytest.mark.parametrize(
    ("larger", "smaller", "expected"), [(47.0, 37.0, 47.0), (30.0, 37.0, 37.0), (37.0, 37.0, 37.0)]
)
def test_laps_of_two_sizes(larger: float, smaller: float, expected: float) -> None:
    # 25.5.2.2 and 25.5.5.4: development of the larger bar or lap of the smaller one.
    assert splices.lap_tension_of_sizes(l_d=larger, l_st_s=smaller) == expected
    assert splices.lap_compression_of_sizes(l_dc=larger, l_sc_s=smaller) == expected


def test_a_mechanical_splice_develops_a_quarter_more_than_yield() -> None:
    # 25.5.7.1: 1.25*60000*1.00 and 1.25*80000*1.56
    assert splices.mechanical_splice(f_y=60_000.0, A_b=1.0) == pytest.approx(75_000.0)
    assert splices.mechanical_splice(f_y=80_000.0, A_b=1.56) == pytest.approx(156_000.0)


def test_ties_from_which_a_compression_lap_is_reduced() -> None:
    # 10.7.5.2.1: 0.0015*24*10 = 0.36 in^2
    assert splices.lap_tie_area_minimum(h=24.0, s=10.0) == pytest.approx(0.36)


def test_area_of_dowels() -> None:
    # AB-FT-05, published: column of 14 by 14 in, 0.005*196 = 0.98 in^2; 4 No. 8 = 3.16 in^2.
    assert dowels.dowel_area_minimum(A_g=196.0) == pytest.approx(0.98)
    assert dowels.dowel_area(n_bars=4.0, A_b=0.79) == pytest.approx(3.16)
