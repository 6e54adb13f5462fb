"""Axial strength, limits of longitudinal bars, ties and spirals."""

from __future__ import annotations

import math
from typing import Any

import pytest
from hypothesis import given
from hypothesis import strategies as st

from calcpack.aci318 import columns, ties
from calcpack.aci318.bars import BARS
from calcpack.errors import RangeError


def test_axial_strength_by_hand() -> None:
    # Hand: 0.85 * 4 * (256 - 8) + 60 * 8 = 1323.2 kip.
    assert columns.axial_strength(f_c=4_000.0, A_g=256.0, A_st=8.0, f_y=60_000.0) == pytest.approx(1_323_200.0)


def test_maximum_and_design_strength_tied_and_spiral() -> None:
    # ACI 318 Table 22.4.2.1 and 21.2.2; hand: 0.65 * 0.80 = 0.52, 0.75 * 0.85 = 0.6375.
    tied = columns.axial_strength_maximum_tied(P_o=1_000.0)
    spiral = columns.axial_strength_maximum_spiral(P_o=1_000.0)
    assert columns.design_axial_strength(phi=columns.phi_tied(), P_n_max=tied) == pytest.approx(520.0)
    assert columns.design_axial_strength(phi=columns.phi_spiral(), P_n_max=spiral) == pytest.approx(637.5)


@pytest.mark.parametrize(("f_y", "counted"), [(60_000.0, 60_000.0), (80_000.0, 80_000.0), (100_000.0, 80_000.0)])
def test_yield_strength_counts_up_to_80_ksi(f_y: float, counted: float) -> None:
    # ACI 318-19 22.4.2.1, from memory.
    assert columns.yield_in_axial_strength(f_y=f_y) == counted


def test_axial_strength_of_high_grades_takes_the_counted_yield() -> None:
    one = {"f_c": 5_000.0, "A_g": 400.0, "A_st": 12.0}
    low = columns.axial_strength(**one, f_y=80_000.0)
    assert columns.axial_strength_high_grade(**one, f_y_axial=80_000.0) == low
    with pytest.raises(RangeError, match=r"f_y = 80,001 psi +allowed up to 80,000 psi \(ACI 318-14 Table 20.2.2.4a"):
        columns.axial_strength(**one, f_y=80_001.0)


def test_areas() -> None:
    assert columns.area_rectangular(b=12.0, h=20.0) == 240.0
    assert columns.area_circular(h=20.0) == pytest.approx(314.159, abs=1e-3)
    assert columns.area_of_bars(n_bars=8, A_b=1.0) == 8.0
    assert columns.reinforcement_ratio(A_st=8.0, A_g=256.0) == 0.03125


def test_limits_of_longitudinal_reinforcement() -> None:
    # ACI 318 10.6.1.1 and 10.7.3.1.
    assert columns.reinforcement_ratio_minimum() == 0.01
    assert columns.reinforcement_ratio_maximum() == 0.08
    assert columns.bars_minimum_tied() == 4
    assert columns.bars_minimum_spiral() == 6


@pytest.mark.parametrize(
    ("d_b", "d_agg", "expected"),
    [(0.875, 0.75, 1.5), (1.0, 0.75, 1.5), (1.128, 0.75, 1.692), (1.0, 1.125, 1.5), (1.0, 1.5, 2.0)],
)
def test_clear_spacing_of_bars(d_b: float, d_agg: float, expected: float) -> None:
    # ACI 318 25.2.3: 1.5 in, 1.5 d_b, 4/3 d_agg; equal at No. 8 and at 1 1/8 in aggregate.
    assert columns.bar_spacing_minimum_aggregate(d_b=d_b, d_agg=d_agg) == pytest.approx(expected)


def test_clear_spacing_without_aggregate() -> None:
    assert columns.bar_spacing_minimum(d_b=1.0) == 1.5
    assert columns.bar_spacing_minimum(d_b=1.27) == pytest.approx(1.905)


def test_bars_of_a_face_fill_its_width() -> None:
    # Geometry: covers, ties, bars and gaps add up to the width.
    s_clear = columns.bar_spacing_face(b=16.0, c_cover=1.5, d_bt=0.375, n_face=3, d_b=1.128)
    assert 2 * (1.5 + 0.375) + 3 * 1.128 + 2 * s_clear == pytest.approx(16.0)


def test_bars_on_a_circle_are_spaced_along_the_chord() -> None:
    # Geometry: four bars on a circle stand on the corners of a square of side D_s/sqrt(2).
    assert columns.bar_spacing_circular(D_s=10.0, n_bars=4, d_b=1.0) == pytest.approx(10 / math.sqrt(2) - 1)


def test_spacing_along_either_face_by_hand() -> None:
    # Hand: (16 - 2 * 1.875 - 3 * 1.128)/2 = 4.433 in; (24 - 3.75 - 5 * 1.128)/4 = 3.6525 in.
    common = {"c_cover": 1.5, "d_bt": 0.375, "d_b": 1.128}
    assert columns.bar_spacing_face(b=16.0, n_face=3.0, **common) == pytest.approx(4.433)
    assert columns.bar_spacing_side(h=24.0, n_face=5.0, **common) == pytest.approx(3.6525)


def test_spacing_on_a_circle_by_hand() -> None:
    # Hand: D_s = 20 - 2 * 2 - 1 = 15 in; eight bars: 15 sin(22.5 deg) = 15 * 0.3826834 = 5.74025 in between centres.
    D_s = columns.bar_circle(h=20.0, c_cover=1.5, d_bt=0.5, d_b=1.0)
    assert D_s == 15.0
    assert columns.bar_pitch_circular(D_s=D_s, n_bars=8.0) == pytest.approx(5.74025, abs=1e-5)
    assert columns.bar_spacing_circular(D_s=D_s, n_bars=8.0, d_b=1.0) == pytest.approx(4.74025, abs=1e-5)


def test_six_bars_on_a_circle_stand_a_radius_apart() -> None:
    # Geometry: the side of a regular hexagon is the radius of its circle.
    assert columns.bar_pitch_circular(D_s=15.0, n_bars=6.0) == pytest.approx(7.5)


@pytest.mark.parametrize("n_face", [2.0, 3.0, 9.0])
@pytest.mark.parametrize("width", [10.0, 16.0, 30.0])
def test_centres_stand_one_diameter_further_apart_than_bars(width: float, n_face: float) -> None:
    # Geometry; with nine No. 11 in 10 in the bars overlap and the clear spacing is below zero.
    common = {"c_cover": 1.5, "d_bt": 0.5, "d_b": 1.41, "n_face": n_face}
    clear, pitch = columns.bar_spacing_face(b=width, **common), columns.bar_pitch_face(b=width, **common)
    assert pitch == pytest.approx(clear + 1.41)
    assert columns.bar_spacing_side(h=width, **common) == clear
    assert columns.bar_pitch_side(h=width, **common) == pitch


def test_bars_that_just_touch_have_no_clear_spacing() -> None:
    # Hand: 2 * (1.5 + 0.375) + 3 * 1 = 6.75 in.
    assert columns.bar_spacing_face(b=6.75, c_cover=1.5, d_bt=0.375, n_face=3.0, d_b=1.0) == 0.0
    assert columns.bar_spacing_face(b=6.0, c_cover=1.5, d_bt=0.375, n_face=3.0, d_b=1.0) == -0.375


@pytest.mark.parametrize(("b", "h", "least"), [(14.0, 18.0, 14.0), (18.0, 14.0, 14.0), (16.0, 16.0, 16.0)])
def test_least_dimension(b: float, h: float, least: float) -> None:
    assert columns.least_dimension_rectangular(b=b, h=h) == least
    assert columns.least_dimension_circular(h=h) == h


@pytest.mark.parametrize(
    ("f_c", "A_g", "A_st", "f_y", "P_o"),
    [
        # Hand, in kip: 0.85 * 4 * (256 - 6.32) + 60 * 6.32; 0.85 * 3 * (144 - 1.76) + 40 * 1.76;
        # 0.85 * 8 * (576 - 16) + 80 * 16; 0.85 * 12 * (900 - 9) + 75 * 9.
        (4_000.0, 256.0, 6.32, 60_000.0, 1_228_112.0),
        (3_000.0, 144.0, 1.76, 40_000.0, 433_112.0),
        (8_000.0, 576.0, 16.0, 80_000.0, 5_088_000.0),
        (12_000.0, 900.0, 9.0, 75_000.0, 9_763_200.0),
    ],
)
def test_axial_strength_of_several_columns(f_c: float, A_g: float, A_st: float, f_y: float, P_o: float) -> None:
    assert columns.axial_strength(f_c=f_c, A_g=A_g, A_st=A_st, f_y=f_y) == pytest.approx(P_o)


@pytest.mark.parametrize(
    ("arguments", "message"),
    [
        ({"f_c": 2_499.0}, r"f_c = 2,499 psi +allowed 2,500 psi and up"),
        ({"f_y": 39_999.0}, r"f_y = 39,999 psi +allowed 40,000 psi"),
        ({"A_st": 0.0}, r"A_st = 0 in\^2 +has to be an area above zero"),
        ({"A_g": -1.0}, r"A_g = -1 in\^2 +has to be an area above zero"),
        ({"f_y": float("nan")}, r"f_y = nan psi"),
    ],
)
def test_range_of_the_axial_strength(arguments: dict[str, float], message: str) -> None:
    plain = {"f_c": 4_000.0, "A_g": 256.0, "A_st": 8.0, "f_y": 60_000.0}
    with pytest.raises(RangeError, match=message):
        columns.axial_strength(**{**plain, **arguments})


@pytest.mark.parametrize(("f_c", "f_y"), [(2_500.0, 40_000.0), (2_500.0, 80_000.0)])
def test_axial_strength_on_the_ends_of_its_range(f_c: float, f_y: float) -> None:
    found = columns.axial_strength(f_c=f_c, A_g=100.0, A_st=1.0, f_y=f_y)
    assert found == pytest.approx(0.85 * f_c * 99.0 + f_y)


@pytest.mark.parametrize(("d_b", "d_bt_min"), [(1.0, 0.375), (1.27, 0.375), (1.41, 0.5), (2.257, 0.5)])
def test_tie_size(d_b: float, d_bt_min: float) -> None:
    # ACI 318 25.7.2.2: No. 3 to No. 10 bars, No. 4 above.
    assert ties.tie_size(d_b=d_b) == d_bt_min


@pytest.mark.parametrize(
    ("d_b", "d_bt", "h_min", "s_max"),
    [(0.875, 0.375, 20.0, 14.0), (1.41, 0.375, 30.0, 18.0), (1.41, 0.5, 12.0, 12.0), (0.75, 0.375, 12.0, 12.0)],
    ids=["16 d_b", "48 d_bt", "least dimension", "equal"],
)
def test_tie_spacing(d_b: float, d_bt: float, h_min: float, s_max: float) -> None:
    # ACI 318 25.7.2.1.
    assert ties.tie_spacing(d_b=d_b, d_bt=d_bt, h_min=h_min) == s_max


def test_other_limits_of_ties_and_spirals() -> None:
    # ACI 318 25.7.2.1, 25.7.2.3, 25.7.3.1, 25.7.3.2.
    assert ties.tie_clear_minimum(d_agg=0.75) == 1.0
    assert ties.unsupported_bar_maximum() == 6.0
    assert ties.spiral_size() == 0.375
    assert (ties.spiral_clear_minimum(), ties.spiral_clear_maximum()) == (1.0, 3.0)
    assert ties.spiral_clear_minimum_aggregate(d_agg=0.75) == 1.0
    assert ties.spiral_clear_minimum_aggregate(d_agg=1.5) == 2.0
    assert ties.spiral_clear(s=2.25, d_bt=0.375) == 1.875


def test_trap_two_definitions_of_the_spiral_ratio_differ() -> None:
    # col-spiral-civl4135: 0.0119 by 4 A_sp/(D_c s), published; 0.01165 along the centre line, which fails 0.0118.
    A_sp, D_c, d_bt, s = 0.11, 18.5, 0.375, 2.0
    ours, simplified = ties.spiral_ratio(A_sp=A_sp, D_c=D_c, d_bt=d_bt, s=s), 4 * A_sp / (D_c * s)
    assert simplified == pytest.approx(0.0119, rel=0.003)
    assert ours == pytest.approx(0.01165, rel=0.0005)
    A_g, A_ch = columns.area_circular(h=21.5), ties.core_area(D_c=D_c)
    least = ties.spiral_ratio_minimum(A_g=A_g, A_ch=A_ch, f_c=3_000.0, f_yt=40_000.0)
    assert ours < least < simplified


def test_spiral_ratio_is_volume_over_volume() -> None:
    # Geometry: one turn of length pi (D_c - d_bt) in a core slice of height s.
    turn, core = 0.2 * math.pi * (15.0 - 0.5), math.pi / 4 * 15.0**2 * 2.5
    assert ties.spiral_ratio(A_sp=0.2, D_c=15.0, d_bt=0.5, s=2.5) == pytest.approx(turn / core)


@pytest.mark.parametrize(("f_yt", "refused"), [(100_000.0, False), (100_001.0, True), (39_999.0, True)])
def test_yield_strength_of_spirals(f_yt: float, refused: bool) -> None:
    arguments: dict[str, Any] = {"A_g": 300.0, "A_ch": 200.0, "f_c": 4_000.0, "f_yt": f_yt}
    if refused:
        with pytest.raises(RangeError, match=r"allowed 40,000 psi to 100,000 psi \(ACI 318-14 and 318-19 25.7.3.3\)"):
            ties.spiral_ratio_minimum(**arguments)
    else:
        assert ties.spiral_ratio_minimum(**arguments) == pytest.approx(0.45 * 0.5 * 0.04)


AREA = st.floats(100.0, 2_000.0)


@given(A_g=AREA, part=st.floats(0.01, 0.08), f_c=st.floats(2_500.0, 12_000.0))
def test_steel_never_weakens_a_column(A_g: float, part: float, f_c: float) -> None:
    bare = 0.85 * f_c * A_g
    assert columns.axial_strength(f_c=f_c, A_g=A_g, A_st=part * A_g, f_y=60_000.0) > bare


@given(h=st.floats(12.0, 60.0), cover=st.floats(1.0, 3.0))
def test_core_is_inside_the_section(h: float, cover: float) -> None:
    D_c = ties.core_diameter(h=h, c_cover=cover)
    assert ties.core_area(D_c=D_c) < columns.area_circular(h=h)


@pytest.mark.parametrize(
    ("h", "c_cover", "D_c", "A_ch"),
    # Hand: 20 - 3 = 17 in, pi/4 * 289 = 226.980; 24 - 4 = 20 in, 314.159; 18 - 3 = 15 in, 176.715 in^2.
    [(20.0, 1.5, 17.0, 226.980), (24.0, 2.0, 20.0, 314.159), (18.0, 1.5, 15.0, 176.715)],
)
def test_core_by_hand(h: float, c_cover: float, D_c: float, A_ch: float) -> None:
    assert ties.core_diameter(h=h, c_cover=c_cover) == D_c
    assert ties.core_area(D_c=D_c) == pytest.approx(A_ch, abs=1e-3)


def test_least_spiral_ratio_by_hand() -> None:
    # Common practice, 20 in column, 1.5 in cover: 0.45 (400/289 - 1) * 4/60 = 0.011522, and twice with f_c twice.
    arguments = {"A_g": 314.159, "A_ch": 226.980, "f_yt": 60_000.0}
    least = ties.spiral_ratio_minimum(**arguments, f_c=4_000.0)
    assert least == pytest.approx(0.011522, abs=1e-6)
    assert ties.spiral_ratio_minimum(**arguments, f_c=8_000.0) == pytest.approx(2 * least)


@given(d_b=st.sampled_from([bar.d_b for bar in BARS.values()]), h_min=st.floats(8.0, 60.0))
def test_tie_spacing_is_the_least_of_three(d_b: float, h_min: float) -> None:
    found = ties.tie_spacing(d_b=d_b, d_bt=0.375, h_min=h_min)
    assert found in (16 * d_b, 18.0, h_min)
    assert found <= min(18.0, h_min, 16 * d_b)


@given(d_b=st.sampled_from([bar.d_b for bar in BARS.values()]), d_agg=st.floats(0.25, 3.0))
def test_larger_aggregate_never_brings_bars_closer(d_b: float, d_agg: float) -> None:
    found = columns.bar_spacing_minimum_aggregate(d_b=d_b, d_agg=d_agg)
    assert found >= columns.bar_spacing_minimum(d_b=d_b)
    assert found >= d_agg


@given(f_y=st.floats(40_000.0, 100_000.0))
def test_the_two_axial_formulas_agree_up_to_80_ksi(f_y: float) -> None:
    one = {"f_c": 5_000.0, "A_g": 400.0, "A_st": 12.0}
    counted = columns.yield_in_axial_strength(f_y=f_y)
    high = columns.axial_strength_high_grade(**one, f_y_axial=counted)
    assert high == columns.axial_strength(**one, f_y=min(f_y, 80_000.0))


@given(s=st.floats(1.0, 6.0), closer=st.floats(0.5, 0.99))
def test_a_closer_pitch_gives_more_spiral(s: float, closer: float) -> None:
    common = {"A_sp": 0.2, "D_c": 17.0, "d_bt": 0.5}
    assert ties.spiral_ratio(**common, s=s * closer) > ties.spiral_ratio(**common, s=s)
