"""Straight bars in tension: caps, floors, the table against the equation, and laws that hold between them."""

from __future__ import annotations

import math
from typing import Any

import pytest
from hypothesis import given
from hypothesis import strategies as st

from calcpack.aci318 import development as dev
from calcpack.aci318 import laps
from calcpack.aci318.bars import BARS
from calcpack.errors import RangeError

PLAIN: dict[str, Any] = {"f_y": 60_000.0, "f_c": 4_000.0, "lamb": 1.0, "psi_t": 1.0, "psi_e": 1.0}
GENERAL: dict[str, Any] = {**PLAIN, "psi_s": 1.0, "c_b": 2.0, "K_tr": 0.0, "d_b": 1.0}


def lines(formula: Any, **arguments: float) -> dict[str, float]:
    return {recorded.line.target: recorded.value for recorded in formula.record(**arguments).lines}


def test_general_equation_by_hand() -> None:
    # Hand: 3/40 * 60000/sqrt(4000) * 1/2.0 * 1.0 = 35.5756 in.
    assert dev.straight_tension_14(**GENERAL) == pytest.approx(35.5756, abs=1e-4)
    assert dev.straight_tension_19(**GENERAL, psi_g=1.0) == dev.straight_tension_14(**GENERAL)


def test_grade_factor_multiplies_in_318_19_only() -> None:
    grade_80 = {**GENERAL, "f_y": 80_000.0}
    ratio = dev.straight_tension_19(**grade_80, psi_g=1.15) / dev.straight_tension_14(**grade_80)
    assert ratio == pytest.approx(1.15)
    assert "psi_g" not in dev.straight_tension_14.arguments


def test_trap_product_of_casting_and_coating_is_capped() -> None:
    # ACI 318-14 25.4.2.4, 318-19 25.4.2.5: 1.3 * 1.5 = 1.95 counts as 1.7.
    assert lines(dev.straight_tension_14, **{**GENERAL, "psi_t": 1.3, "psi_e": 1.5})["psi_te"] == 1.7
    assert lines(dev.straight_tension_14, **{**GENERAL, "psi_t": 1.3, "psi_e": 1.2})["psi_te"] == 1.3 * 1.2


@pytest.mark.parametrize(("f_c", "root"), [(9_999.0, math.sqrt(9_999.0)), (10_000.0, 100.0), (12_000.0, 100.0)])
def test_trap_root_of_strength_is_capped(f_c: float, root: float) -> None:
    # ACI 318 25.4.1.4.
    assert lines(dev.straight_tension_14, **{**GENERAL, "f_c": f_c})["root_f_c"] == root


@pytest.mark.parametrize(("c_b", "K_tr", "term"), [(2.4, 0.0, 2.4), (2.0, 0.5, 2.5), (2.5, 0.1, 2.5), (4.0, 2.0, 2.5)])
def test_trap_confinement_is_capped(c_b: float, K_tr: float, term: float) -> None:
    # ACI 318-14 25.4.2.3, 318-19 25.4.2.4.
    assert lines(dev.straight_tension_14, **{**GENERAL, "c_b": c_b, "K_tr": K_tr})["confinement"] == term


def test_trap_transverse_index_counts_only_the_bars_developed() -> None:
    # Two of four bars developed along the plane: n = 2 doubles K_tr of n = 4. Hand: 40 * 0.22/(8 * 2) = 0.55 in.
    assert dev.transverse_index(A_tr=0.22, s=8.0, n=2) == pytest.approx(0.55)
    assert dev.transverse_index(A_tr=0.22, s=8.0, n=4) == pytest.approx(0.275)


@pytest.mark.parametrize(("l_d_a", "l_d"), [(11.99, 12.0), (12.0, 12.0), (12.01, 12.01)])
def test_minimum(l_d_a: float, l_d: float) -> None:
    assert dev.straight_tension_minimum(l_d_a=l_d_a) == l_d


@pytest.mark.parametrize(("required", "l_d"), [(1.0, 40.0), (0.5, 20.0), (0.3, 12.0), (0.29, 12.0)])
def test_minimum_holds_after_the_reduction_for_excess_steel(required: float, l_d: float) -> None:
    assert dev.straight_tension_reduced(l_d_a=40.0, A_s_required=required, A_s_provided=1.0) == pytest.approx(l_d)


@pytest.mark.parametrize(
    ("c_c", "s_clear", "c_b"),
    [(1.5, 9.0, 2.0), (3.0, 2.0, 1.5), (1.5, 3.0, 2.0)],
    ids=["cover governs", "spacing governs", "equal"],
)
def test_cover_or_spacing(c_c: float, s_clear: float, c_b: float) -> None:
    assert dev.cover_or_spacing(c_c=c_c, s_clear=s_clear, d_b=1.0) == c_b


@pytest.mark.parametrize(
    ("formula", "d_b", "coefficient"),
    [
        (dev.straight_tension_spaced_14, 0.75, 1 / 25),
        (dev.straight_tension_spaced_14, 0.875, 1 / 20),
        (dev.straight_tension_other_14, 0.75, 3 / 50),
        (dev.straight_tension_other_14, 0.875, 3 / 40),
    ],
)
def test_table_by_size_and_case(formula: Any, d_b: float, coefficient: float) -> None:
    # ACI 318-14 Table 25.4.2.2, the four coefficients from memory; AB-LD-01 and AB-LD-10 publish results of each.
    assert formula(**PLAIN, d_b=d_b) == pytest.approx(coefficient * 60_000.0 / math.sqrt(4_000.0) * d_b)


@pytest.mark.parametrize("d_b", [bar.d_b for bar in BARS.values()])
def test_table_of_318_19_is_that_of_318_14_times_the_grade_factor(d_b: float) -> None:
    for old, new in (
        (dev.straight_tension_spaced_14, dev.straight_tension_spaced_19),
        (dev.straight_tension_other_14, dev.straight_tension_other_19),
    ):
        assert new(**PLAIN, psi_g=1.15, d_b=d_b) == pytest.approx(1.15 * old(**PLAIN, d_b=d_b))


@pytest.mark.parametrize(
    ("change", "message"),
    [
        ({"f_c": 2_499.0}, r"f_c = 2,499 psi +allowed 2,500 psi and up \(ACI 318-14 and 318-19 Table 19.2.1.1\)"),
        ({"f_c": 40.0}, r"was this meant to be 4,000 psi\?"),
        ({"f_y": 80_001.0}, r"f_y = 80,001 psi +allowed up to 80,000 psi \(ACI 318-14 Table 20.2.2.4a\)"),
        ({"f_y": 39_999.0}, r"allowed 40,000 psi and up \(ASTM A615, lowest grade\)"),
        ({"lamb": 0.74}, r"lamb = 0.74 +allowed 0.75 to 1 \(ACI 318-14 and 318-19 19.2.4\)"),
        ({"lamb": 1.01}, r"lamb = 1.01"),
        ({"d_b": 0.9}, r"d_b = 0.9 in +one of 0.375, 0.5, .* in \(ASTM A615, No. 3 to No. 18\)"),
        ({"c_b": 0.0}, r"c_b = 0 in +has to be a length above zero"),
        ({"K_tr": -0.1}, r"K_tr = -0.1 in +has to be a length, zero or more"),
    ],
)
def test_values_out_of_range_are_refused(change: dict[str, float], message: str) -> None:
    with pytest.raises(RangeError, match=message):
        dev.straight_tension_14(**{**GENERAL, **change})


def test_limits_hold_on_their_ends() -> None:
    dev.straight_tension_14(**{**GENERAL, "f_c": 2_500.0, "f_y": 80_000.0, "lamb": 0.75})
    dev.straight_tension_19(**{**GENERAL, "f_y": 100_000.0}, psi_g=1.3)
    with pytest.raises(RangeError, match=r"allowed up to 100,000 psi \(ACI 318-19 Table 20.2.2.4a\)"):
        dev.straight_tension_19(**{**GENERAL, "f_y": 100_001.0}, psi_g=1.3)


BAR = st.sampled_from([bar.d_b for bar in BARS.values()])
STRENGTH = st.floats(2_500.0, 15_000.0)
YIELD = st.floats(40_000.0, 80_000.0)
COVER = st.floats(0.3, 6.0)


@given(d_b=BAR, f_c=STRENGTH, low=YIELD, high=YIELD, c_b=COVER)
def test_length_grows_with_yield_strength(d_b: float, f_c: float, low: float, high: float, c_b: float) -> None:
    low, high = sorted((low, high))
    one = {**GENERAL, "d_b": d_b, "f_c": f_c, "c_b": c_b}
    assert dev.straight_tension_14(**{**one, "f_y": low}) <= dev.straight_tension_14(**{**one, "f_y": high})


@given(d_b=BAR, weak=STRENGTH, strong=STRENGTH, c_b=COVER)
def test_length_does_not_grow_with_concrete_strength(d_b: float, weak: float, strong: float, c_b: float) -> None:
    weak, strong = sorted((weak, strong))
    one = {**GENERAL, "d_b": d_b, "c_b": c_b}
    assert dev.straight_tension_14(**{**one, "f_c": strong}) <= dev.straight_tension_14(**{**one, "f_c": weak})


@given(d_b=BAR, f_c=STRENGTH, f_y=YIELD)
def test_first_row_of_the_table_is_the_equation_at_one_and_a_half_diameters(d_b: float, f_c: float, f_y: float) -> None:
    """The table is the equation with (c_b + K_tr)/d_b = 1.5; its 25 rounds 3/40 * 0.8/1.5 = 1/25 exactly."""
    psi_s = 0.8 if d_b <= 0.75 else 1.0
    one = {**PLAIN, "f_c": f_c, "f_y": f_y, "d_b": d_b}
    equation = dev.straight_tension_14(**one, psi_s=psi_s, c_b=1.5 * d_b, K_tr=0.0)
    assert dev.straight_tension_spaced_14(**one) == pytest.approx(equation, rel=1e-9)
    assert dev.straight_tension_other_14(**one) == pytest.approx(1.5 * equation, rel=1e-9)


@given(d_b=BAR, c_b=st.floats(1.5, 5.0))
def test_table_is_never_shorter_than_the_equation_where_its_conditions_hold(d_b: float, c_b: float) -> None:
    psi_s = 0.8 if d_b <= 0.75 else 1.0
    equation = dev.straight_tension_14(**PLAIN, psi_s=psi_s, c_b=c_b * d_b, K_tr=0.0, d_b=d_b)
    assert dev.straight_tension_spaced_14(**PLAIN, d_b=d_b) >= equation * (1 - 1e-12)


@pytest.mark.parametrize(
    "formula",
    [
        dev.straight_tension_14,
        dev.straight_tension_19,
        dev.straight_tension_spaced_14,
        dev.straight_tension_spaced_19,
        dev.straight_tension_other_14,
        dev.straight_tension_other_19,
    ],
    ids=lambda formula: formula.name,
)
@pytest.mark.parametrize("d_b", [0.5, 1.0])
def test_lightweight_concrete_lengthens_every_straight_bar(formula: Any, d_b: float) -> None:
    # ACI 318 25.4.2: lambda of 0.75 divides the length.
    known = {**GENERAL, "psi_g": 1.0, "d_b": d_b}
    arguments = {name: known[name] for name in formula.arguments}
    assert formula(**{**arguments, "lamb": 0.75}) == pytest.approx(formula(**arguments) / 0.75)


@pytest.mark.parametrize("psi_e", [1.2, 1.5])
@pytest.mark.parametrize(
    "formula",
    [
        dev.straight_tension_spaced_14,
        dev.straight_tension_spaced_19,
        dev.straight_tension_other_14,
        dev.straight_tension_other_19,
    ],
    ids=lambda formula: formula.name,
)
def test_trap_the_table_caps_the_product_too(formula: Any, psi_e: float) -> None:
    # 1.3 * 1.2 = 1.56 and 1.3 * 1.5 = 1.95, counted as 1.7.
    known = {**GENERAL, "psi_g": 1.0}
    arguments = {name: known[name] for name in formula.arguments}
    expected = min(1.3 * psi_e, 1.7) * formula(**arguments)
    assert formula(**{**arguments, "psi_t": 1.3, "psi_e": psi_e}) == pytest.approx(expected)


# Beside the length


def test_centres_of_bars_are_a_diameter_further_apart_than_their_clear_spacing() -> None:
    assert dev.centre_spacing(s_clear=4.0, d_b=1.128) == pytest.approx(5.128)


@pytest.mark.parametrize(("c_c", "d_b", "c_b"), [(1.5, 1.0, 2.0), (2.0, 0.75, 2.375), (0.75, 0.5, 1.0)])
def test_c_b_by_cover_is_the_definition_with_one_per_cent(c_c: float, d_b: float, c_b: float) -> None:
    # ACI 318 2.2: cover to the bar centre.
    assert dev.c_b_by_cover(c_c=c_c, d_b=d_b) == pytest.approx(1.01 * c_b)


@pytest.mark.parametrize(("s", "c_b"), [(4.0, 2.0), (6.0, 3.0), (5.25, 2.625)])
def test_c_b_by_spacing_is_the_definition_with_one_per_cent(s: float, c_b: float) -> None:
    # ACI 318 2.2: half the centre-to-centre spacing.
    assert dev.c_b_by_spacing(s=s) == pytest.approx(1.01 * c_b)


@pytest.mark.parametrize(("d_b", "least"), [(0.625, 0.3125), (1.0, 0.5), (1.41, 0.705)])
def test_close_bars_of_high_grade(d_b: float, least: float) -> None:
    # ACI 318-19 25.4.2.2 and 25.5.1.5, from memory: closer than 6 in, K_tr of 0.5 d_b; not in 318-14.
    assert dev.close_bars() == 6.0
    assert dev.transverse_index_minimum(d_b=d_b) == pytest.approx(least)
    assert laps.lap_transverse_index_minimum(d_b=d_b) == pytest.approx(least)
    assert laps.lap_close_bars() == 6.0
    assert [str(clause) for clause in dev.close_bars.clauses] == ["ACI 318-19 25.4.2.2"]
    assert [str(clause) for clause in laps.lap_close_bars.clauses] == ["ACI 318-19 25.5.1.5"]


@given(c_c=st.floats(0.5, 6.0), s_clear=st.floats(0.5, 12.0), d_b=st.sampled_from([0.375, 0.75, 1.0, 1.41]))
def test_the_smaller_of_the_two_bounds_is_c_b(c_c: float, s_clear: float, d_b: float) -> None:
    bounds = (
        dev.c_b_by_cover(c_c=c_c, d_b=d_b),
        dev.c_b_by_spacing(s=dev.centre_spacing(s_clear=s_clear, d_b=d_b)),
    )
    whole = dev.cover_or_spacing(c_c=c_c, s_clear=s_clear, d_b=d_b)
    assert min(bounds) == pytest.approx(1.01 * whole)
