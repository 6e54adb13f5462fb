"""Columns of special moment frames and lateral support of bars: each limit by hand, on it and on both sides."""

from __future__ import annotations

import math
from typing import Any

import pytest
from hypothesis import given
from hypothesis import strategies as st

from calcpack.aci318 import lateral_support, special_frames, ties
from calcpack.aci318.standards import ACI_318_14, ACI_318_19
from calcpack.errors import FormulaError, RangeError

# The 24 in square column of col-smf-ash-24, 1.5 in cover: core 21 in, 441 in^2.
SQUARE = {"A_g": 576.0, "A_ch": 441.0, "f_c": 5_000.0, "f_yt": 60_000.0}


# Dimensions, materials, bars


def test_limits_that_are_numbers() -> None:
    # From memory, 18.7.2.1, 18.7.4.1, 18.7.4.2, 18.7.5.2(e) and (f), Table 19.2.1.1, Table 20.2.2.4a.
    assert special_frames.dimension_minimum() == 12.0
    assert special_frames.dimension_ratio_minimum() == 0.4
    assert special_frames.reinforcement_ratio_maximum_special() == 0.06
    assert special_frames.bars_minimum_hoops() == 6.0
    assert special_frames.supported_spacing_maximum() == 14.0
    assert special_frames.supported_spacing_maximum_high() == 8.0
    assert special_frames.concrete_minimum() == 3_000.0
    assert special_frames.yield_maximum_14() == 60_000.0
    assert special_frames.yield_maximum_19() == 80_000.0


def test_yield_strengths_stand_in_their_editions() -> None:
    with pytest.raises(FormulaError, match="yield_maximum_14 is not in ACI 318-19"):
        special_frames.yield_maximum_14.clause(ACI_318_19)
    with pytest.raises(FormulaError, match="yield_maximum_19 is not in ACI 318-14"):
        special_frames.yield_maximum_19.clause(ACI_318_14)


def test_dimensions() -> None:
    assert special_frames.largest_dimension_rectangular(b=16.0, h=24.0) == 24.0
    assert special_frames.largest_dimension_rectangular(b=24.0, h=16.0) == 24.0
    assert special_frames.largest_dimension_circular(h=30.0) == 30.0
    assert special_frames.dimension_ratio(h_min=16.0, h_max=40.0) == 0.4


def test_core_to_the_outside_of_the_hoop() -> None:
    # col-smf-ash-24: 24 - 2 * 1.5 = 21 in.
    assert special_frames.core_dimension_x(b=24.0, c_cover=1.5) == 21.0
    assert special_frames.core_dimension_y(h=30.0, c_cover=1.5) == 27.0
    assert special_frames.core_area_rectangular(b=24.0, h=30.0, c_cover=1.5) == 21.0 * 27.0


# Length and spacing


@pytest.mark.parametrize(
    ("h_max", "l_u", "l_o"),
    [(24.0, 120.0, 24.0), (24.0, 144.0, 24.0), (24.0, 150.0, 25.0), (16.0, 96.0, 18.0), (18.0, 108.0, 18.0)],
)
def test_confined_length(h_max: float, l_u: float, l_o: float) -> None:
    # From memory, 18.7.5.1: depth, l_u/6, 18 in.
    assert special_frames.length_confined(h_max=h_max, l_u=l_u) == l_o


def test_confined_length_without_the_height() -> None:
    assert special_frames.length_confined_without_height(h_max=16.0) == 18.0
    assert special_frames.length_confined_without_height(h_max=24.0) == 24.0


@pytest.mark.parametrize(
    ("h_x", "s_o"), [(5.0, 6.0), (8.0, 6.0), (8.3, 5.9), (11.0, 5.0), (13.7, 4.1), (14.0, 4.0), (16.0, 4.0)]
)
def test_spacing_by_the_bars_held(h_x: float, s_o: float) -> None:
    # From memory, 18.7.5.3: 4 + (14 - h_x)/3, between 4 and 6 in.
    assert special_frames.confinement_spacing_by_bars(h_x=h_x) == pytest.approx(s_o)


@pytest.mark.parametrize(
    ("h_min", "d_b", "s_o", "s_max"),
    # From memory, 18.7.5.3: h_min/4, 6 d_b, s_o, each governing once, and two of them at once.
    [(16.0, 1.0, 6.0, 4.0), (30.0, 0.75, 6.0, 4.5), (30.0, 1.0, 5.0, 5.0), (24.0, 1.0, 6.0, 6.0)],
)
def test_spacing_within_the_confined_length(h_min: float, d_b: float, s_o: float, s_max: float) -> None:
    arguments = {"h_min": h_min, "d_b": d_b, "s_o": s_o}
    assert special_frames.confinement_spacing_14(**arguments) == s_max
    assert special_frames.confinement_spacing_19(**arguments, f_y=60_000.0) == s_max


@pytest.mark.parametrize(("f_y", "s_max"), [(40e3, 4.5), (60e3, 4.5), (60_001.0, 3.75), (80e3, 3.75)])
def test_grade_80_bars_take_five_diameters_in_318_19(f_y: float, s_max: float) -> None:
    # From memory, 318-19 18.7.5.3(c) and 18.7.5.5; No. 6 bars: 6 * 0.75 and 5 * 0.75 in.
    assert special_frames.confinement_spacing_19(h_min=30.0, d_b=0.75, s_o=6.0, f_y=f_y) == s_max
    assert special_frames.spacing_beyond_19(d_b=0.75, f_y=f_y) == s_max


@pytest.mark.parametrize(("d_b", "s_max"), [(0.75, 4.5), (1.0, 6.0), (1.128, 6.0)])
def test_spacing_outside_the_confined_length(d_b: float, s_max: float) -> None:
    # From memory, 18.7.5.5: 6 d_b and 6 in.
    assert special_frames.spacing_beyond_14(d_b=d_b) == s_max
    assert special_frames.spacing_beyond_19(d_b=d_b, f_y=60_000.0) == s_max


def test_six_inches_limit_grade_80_as_well() -> None:
    assert special_frames.spacing_beyond_19(d_b=1.27, f_y=80_000.0) == 6.0
    assert special_frames.spacing_beyond_19(d_b=1.128, f_y=80_000.0) == pytest.approx(5.64)


# Confinement


def lines(recording: Any) -> dict[str, float]:
    return {line.line.target: line.value for line in recording.lines}


def test_confinement_of_a_square_column() -> None:
    # col-smf-ash-24, common practice: (a) 0.00765, (b) 0.0075.
    found = lines(special_frames.confinement_rectilinear.record(**SQUARE))
    assert found["r_sh_a"] == pytest.approx(0.00765, rel=1e-3)
    assert found["r_sh_b"] == pytest.approx(0.0075)
    assert found["r_sh_min"] == found["r_sh_a"]


def test_the_two_expressions_are_equal_where_the_gross_area_is_1_3_of_the_core() -> None:
    # Hand: 0.3 (A_g/A_ch - 1) = 0.09.
    found = lines(special_frames.confinement_rectilinear.record(**{**SQUARE, "A_g": 1.3 * 441.0}))
    assert found["r_sh_a"] == pytest.approx(found["r_sh_b"])
    wide = special_frames.confinement_rectilinear(**{**SQUARE, "A_g": 1.2 * 441.0})
    assert wide == pytest.approx(0.0075)


def test_confinement_under_a_high_axial_force() -> None:
    # Hand, P_u = 0.5 * 576 * 5 = 1,440 kip, k_f = 1, k_n = 12/10: 0.2 * 1.2 * 1440/(60 * 441) = 0.0130612.
    k_f, k_n = special_frames.concrete_factor(f_c=5_000.0), special_frames.bars_factor(n_l=12.0)
    assert (k_f, k_n) == (1.0, 1.2)
    found = lines(special_frames.confinement_rectilinear_high.record(**SQUARE, k_f=k_f, k_n=k_n, P_u=1_440_000.0))
    assert found["r_sh_c"] == pytest.approx(0.0130612, rel=1e-5)
    assert found["r_sh_min"] == found["r_sh_c"]


def test_axial_force_above_which_it_counts() -> None:
    assert special_frames.axial_force_high(A_g=576.0, f_c=5_000.0) == pytest.approx(864_000.0)


@pytest.mark.parametrize(("f_c", "k_f"), [(4e3, 1.0), (10e3, 1.0), (10_001.0, 1.00004), (12_500.0, 1.1), (15e3, 1.2)])
def test_factor_for_concrete(f_c: float, k_f: float) -> None:
    # From memory, 18.7.5.4: f_c/25,000 + 0.6, at least 1.
    assert special_frames.concrete_factor(f_c=f_c) == pytest.approx(k_f)


@pytest.mark.parametrize(("n_l", "k_n"), [(4.0, 2.0), (8.0, 4 / 3), (12.0, 1.2), (22.0, 1.1)])
def test_factor_for_held_bars(n_l: float, k_n: float) -> None:
    # From memory, 18.7.5.4: n_l/(n_l - 2).
    assert special_frames.bars_factor(n_l=n_l) == pytest.approx(k_n)


def test_confinement_of_a_circular_column() -> None:
    # Hand, 24 in with 1.5 in cover: A_g/A_ch = (24/21)^2; (d) 0.45 * 0.306122 * 5/60 = 0.0114796; (e) 0.01.
    A_g, A_ch = math.pi / 4 * 24.0**2, math.pi / 4 * 21.0**2
    arguments = {"A_g": A_g, "A_ch": A_ch, "f_c": 5_000.0, "f_yt": 60_000.0}
    found = lines(special_frames.confinement_circular.record(**arguments))
    assert found["rho_s_d"] == pytest.approx(0.0114796, rel=1e-5)
    assert found["rho_s_e"] == pytest.approx(0.01)
    assert found["rho_s_d"] == ties.spiral_ratio_minimum(**arguments)
    large = special_frames.confinement_circular(**{**arguments, "A_g": 1.1 * A_ch})
    assert large == pytest.approx(0.01)


def test_confinement_of_a_circular_column_under_a_high_axial_force() -> None:
    # Hand: 0.35 * 1.1 * 1,000/(60 * 346.36) = 0.0185263.
    arguments = {"A_g": 452.389, "A_ch": 346.36, "f_c": 12_500.0, "f_yt": 60_000.0}
    found = lines(special_frames.confinement_circular_high.record(**arguments, k_f=1.1, P_u=1_000_000.0))
    assert found["rho_s_f"] == pytest.approx(0.0185263, rel=1e-4)
    # (d) 0.45 * 0.306124 * 12.5/60 = 0.0286991 governs here.
    assert found["rho_s_min"] == pytest.approx(0.0286991, rel=1e-4)


def test_provided_and_least_confinement_of_the_same_legs() -> None:
    # Hand: four legs of No. 4 at 4 in in a 21 in core: 0.8/84 = 0.0095238.
    A_sh = special_frames.confinement_area(n_legs=4.0, A_bt=0.2)
    assert special_frames.confinement_provided(A_sh=A_sh, s=4.0, b_c=21.0) == pytest.approx(0.0095238, rel=1e-5)


PLAIN = st.fixed_dictionaries(
    {
        "A_ch": st.floats(100.0, 1_000.0),
        "A_g": st.floats(1_050.0, 2_000.0),
        "f_c": st.floats(3_000.0, 15_000.0),
        "f_yt": st.floats(40_000.0, 100_000.0),
    }
)


@given(arguments=PLAIN, P_u=st.floats(0.0, 5e6), n_l=st.integers(4, 40))
def test_a_high_axial_force_never_asks_for_less(arguments: dict[str, float], P_u: float, n_l: int) -> None:
    k_f, k_n = special_frames.concrete_factor(f_c=arguments["f_c"]), special_frames.bars_factor(n_l=float(n_l))
    low = special_frames.confinement_rectilinear(**arguments)
    high = special_frames.confinement_rectilinear_high(**arguments, k_f=k_f, k_n=k_n, P_u=P_u)
    assert low <= high == max(low, 0.2 * k_f * k_n * P_u / (arguments["f_yt"] * arguments["A_ch"]))
    low = special_frames.confinement_circular(**arguments)
    assert low <= special_frames.confinement_circular_high(**arguments, k_f=k_f, P_u=P_u)


@pytest.mark.parametrize(
    ("changes", "message"),
    [
        (
            {"P_u": -1.0},
            r"P_u = -1 lb +allowed 0 lb and up \(ACI 318-14 and 318-19 18.7.5.2, the largest c",
        ),
        ({"f_yt": 100_001.0}, r"f_yt = 100,001 psi +allowed 40,000 psi to 100,000 psi"),
        ({"f_c": 5.0}, r"f_c = 5 psi +allowed 2,500 psi and up"),
    ],
)
def test_range_of_the_confinement(changes: dict[str, float], message: str) -> None:
    with pytest.raises(RangeError, match=message):
        special_frames.confinement_rectilinear_high(**{**SQUARE, "k_f": 1.0, "k_n": 1.2, "P_u": 1.0, **changes})


def test_two_held_bars_have_no_factor() -> None:
    with pytest.raises(RangeError, match=r"n_l = 2 +allowed 3 and up \(ACI 318-14 and 318-19 18.7.5.4\)"):
        special_frames.bars_factor(n_l=2.0)


# Lateral support


@pytest.mark.parametrize(("n_face", "least"), [(2.0, 1.5), (3.0, 2.0), (4.0, 2.5), (5.0, 3.0), (7.0, 4.0)])
def test_legs_that_hold_corner_and_alternate_bars(n_face: float, least: float) -> None:
    # From memory, 25.7.2.3; 3 legs hold bars 1, 3 and 5 of five, and 4 bars need 3 legs as well.
    assert lateral_support.legs_minimum(n_face=n_face) == least


COVERS = {"c_cover": 1.5, "d_bt": 0.5, "d_b": 1.0}


@pytest.mark.parametrize(
    ("n_face", "n_legs", "spaces"),
    [(2.0, 2.0, 1), (3.0, 2.0, 2), (3.0, 3.0, 1), (4.0, 3.0, 2), (5.0, 3.0, 2), (5.0, 4.0, 2), (6.0, 3.0, 3)],
)
def test_spacing_of_held_bars(n_face: float, n_legs: float, spaces: int) -> None:
    # Geometry: 24 - 2 * 2 - 1 = 19 in between the corner bars.
    h_x = pytest.approx(spaces * 19.0 / (n_face - 1))
    assert lateral_support.support_spacing_x(b=24.0, n_face=n_face, n_legs=n_legs, **COVERS) == h_x
    assert lateral_support.support_spacing_y(h=24.0, n_face=n_face, n_legs=n_legs, **COVERS) == h_x


@given(n_face=st.integers(2, 9), n_legs=st.integers(2, 9))
def test_evenly_shared_legs_have_the_smallest_widest_gap(n_face: int, n_legs: int) -> None:
    # Counted: the smallest number of spaces such that legs at that distance reach the last bar.
    spaces = next(step for step in range(1, 9) if step * (n_legs - 1) >= n_face - 1)
    found = lateral_support.support_spacing_x(b=24.0, n_face=float(n_face), n_legs=float(n_legs), **COVERS)
    assert found == pytest.approx(spaces * 19.0 / (n_face - 1))


def test_bars_on_a_circle_are_all_held() -> None:
    # Geometry: the side of a hexagon is the radius.
    assert lateral_support.support_spacing_circular(D_s=20.0, n_bars=6.0) == pytest.approx(10.0)


@pytest.mark.parametrize(
    ("n_x", "n_y", "n_legs_x", "n_legs_y", "n_l"),
    # Hand: all of 4 by 4 are 12; corners alone 4; 4 along x and 2 of 4 along y 8; more legs than bars 12.
    [(4.0, 4.0, 4.0, 4.0, 12.0), (4.0, 4.0, 2.0, 2.0, 4.0), (4.0, 4.0, 2.0, 4.0, 8.0), (4.0, 4.0, 6.0, 5.0, 12.0)],
)
def test_held_bars_around_the_core(n_x: float, n_y: float, n_legs_x: float, n_legs_y: float, n_l: float) -> None:
    assert lateral_support.supported_bars(n_x=n_x, n_y=n_y, n_legs_x=n_legs_x, n_legs_y=n_legs_y) == n_l
