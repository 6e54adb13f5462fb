"""Compression, and lap splices in tension and compression."""

from __future__ import annotations

import math

import pytest
from hypothesis import given
from hypothesis import strategies as st

from calcpack.aci318 import compression, laps
from calcpack.aci318.bars import BARS
from calcpack.errors import RangeError

PLAIN = {"f_y": 60_000.0, "lamb": 1.0, "psi_r": 1.0, "d_b": 1.0}


def test_the_two_expressions_meet_at_4444_psi() -> None:
    # 1/(50 sqrt(f_c)) = 0.0003 at f_c = (1/0.015)^2 = 4,444.4 psi; above it 18 d_b for Grade 60.
    meet = (1 / 0.015) ** 2
    assert compression.compression(**PLAIN, f_c=meet) == pytest.approx(18.0)
    assert compression.compression(**PLAIN, f_c=meet - 444) > 18.0
    assert compression.compression(**PLAIN, f_c=meet + 444) == pytest.approx(18.0)


def test_confinement_factor_applies_to_both_expressions() -> None:
    # ACI 318 25.4.9.2.
    tied = {**PLAIN, "psi_r": 0.75}
    assert compression.compression(**tied, f_c=3_000.0) == pytest.approx(0.75 * 60_000 / (50 * math.sqrt(3_000)))
    assert compression.compression(**tied, f_c=5_000.0) == pytest.approx(0.75 * 18.0)


@pytest.mark.parametrize(("l_dc_a", "l_dc"), [(7.9, 8.0), (8.0, 8.0), (8.1, 8.1)])
def test_minimum_in_compression(l_dc_a: float, l_dc: float) -> None:
    assert compression.compression_minimum(l_dc_a=l_dc_a) == l_dc


def test_minimum_in_compression_holds_after_the_reduction() -> None:
    assert compression.compression_reduced(l_dc_a=20.0, A_s_required=3.0, A_s_provided=4.0) == 15.0
    assert compression.compression_reduced(l_dc_a=20.0, A_s_required=1.0, A_s_provided=4.0) == 8.0


@pytest.mark.parametrize(("l_d_a", "a", "b"), [(7.637, 12.0, 12.0), (9.5, 12.0, 12.35), (12.0, 12.0, 15.6)])
def test_trap_a_lap_starts_from_the_length_without_its_minimum(l_d_a: float, a: float, b: float) -> None:
    # ACI 318 25.5.2.1; AB-LAP-05 names 1.3 * 12 = 15.6 in as the common error for l_d_a = 7.637 in.
    assert laps.lap_class_a(l_d_a=l_d_a) == a
    assert laps.lap_class_b(l_d_a=l_d_a) == pytest.approx(b)


@pytest.mark.parametrize(
    ("f_y", "f_c", "d_b", "expected"),
    [
        (60_000.0, 4_000.0, 1.0, 30.0),
        (60_000.0, 3_000.0, 1.0, 30.0),
        (60_000.0, 2_999.0, 1.0, 40.0),
        (60_000.0, 4_000.0, 0.375, 12.0),
        (60_000.0, 4_000.0, 0.5, 15.0),
        (60_000.0, 2_500.0, 0.375, 16.0),
        (80_000.0, 4_000.0, 1.0, 48.0),
        (80_000.0, 2_999.0, 1.0, 64.0),
        (40_000.0, 4_000.0, 0.5, 12.0),
    ],
)
def test_compression_lap(f_y: float, f_c: float, d_b: float, expected: float) -> None:
    # ACI 318 25.5.5.1, from memory; hand: 0.0005 f_y d_b or (0.0009 f_y - 24) d_b, 12 in, a third more below 3,000 psi.
    assert laps.lap_compression(f_y=f_y, f_c=f_c, d_b=d_b) == pytest.approx(expected)


def test_compression_lap_is_continuous_at_grade_60() -> None:
    below = laps.lap_compression(f_y=60_000.0, f_c=4_000.0, d_b=1.0)
    above = laps.lap_compression(f_y=60_000.0001, f_c=4_000.0, d_b=1.0)
    assert above == pytest.approx(below, abs=1e-5)


def test_compression_lap_above_grade_80_is_not_less_than_the_tension_lap() -> None:
    # ACI 318-19 25.5.5.1(c), from memory: (0.0009 * 100000 - 24) = 66 d_b or the tension lap.
    plain = {"f_y": 100_000.0, "f_c": 4_000.0, "d_b": 1.0}
    assert laps.lap_compression_high_grade(**plain, l_st=50.0) == pytest.approx(66.0)
    assert laps.lap_compression_high_grade(**plain, l_st=90.0) == pytest.approx(90.0)
    assert laps.lap_compression_high_grade(**{**plain, "f_c": 2_500.0}, l_st=90.0) == pytest.approx(120.0)
    assert laps.lap_compression_high_grade(**{**plain, "d_b": 0.5}, l_st=20.0) == pytest.approx(33.0)
    weak = {**plain, "d_b": 0.5, "f_c": 2_500.0}
    assert laps.lap_compression_high_grade(**weak, l_st=20.0) == pytest.approx(44.0)


@pytest.mark.parametrize(("l_sc_a", "ties", "spiral"), [(30.0, 24.9, 22.5), (12.0, 12.0, 12.0), (14.0, 12.0, 12.0)])
def test_trap_reductions_in_columns_keep_the_minimum(l_sc_a: float, ties: float, spiral: float) -> None:
    # ACI 318 10.7.5.2.1: 0.83 and 0.75, the lap not less than 12 in.
    assert laps.lap_in_ties(l_sc_a=l_sc_a) == pytest.approx(ties)
    assert laps.lap_in_spiral(l_sc_a=l_sc_a) == pytest.approx(spiral)
    assert laps.lap_without_reduction(l_sc_a=l_sc_a) == l_sc_a


def test_large_bars_are_not_lapped_in_compression() -> None:
    with pytest.raises(RangeError, match=r"d_b = 1.693 in +one of .*\(No. 11 and smaller, ACI 318\)"):
        laps.lap_compression(f_y=60_000.0, f_c=4_000.0, d_b=1.693)


def test_grades_above_80_need_the_other_formula() -> None:
    with pytest.raises(RangeError, match=r"f_y = 100,000 psi +allowed up to 80,000 psi"):
        laps.lap_compression(f_y=100_000.0, f_c=4_000.0, d_b=1.0)


SMALL = st.sampled_from([bar.d_b for bar in BARS.values() if bar.size <= 11])


@given(d_b=SMALL, f_c=st.floats(3_000.0, 15_000.0), f_y=st.floats(40_000.0, 80_000.0))
def test_a_compression_lap_is_longer_than_development_in_compression(d_b: float, f_c: float, f_y: float) -> None:
    developed = compression.compression(f_y=f_y, f_c=f_c, lamb=1.0, psi_r=1.0, d_b=d_b)
    assert laps.lap_compression(f_y=f_y, f_c=f_c, d_b=d_b) >= developed * (1 - 1e-12)


def test_lightweight_concrete_lengthens_the_first_expression_only() -> None:
    # ACI 318 25.4.9.2: lambda stands beside the root, not beside 0.0003 f_y.
    light = {**PLAIN, "lamb": 0.75}
    assert compression.compression(**light, f_c=3_000.0) == pytest.approx(60_000 / (50 * 0.75 * math.sqrt(3_000)))
    assert compression.compression(**light, f_c=10_000.0) == pytest.approx(18.0)
