"""Shear with axial force: each equation by hand, both sides of its limits, and how it behaves."""

from __future__ import annotations

import math
from typing import Any

import pytest
from hypothesis import given
from hypothesis import strategies as st

from calcpack.aci318 import shear
from calcpack.aci318.standards import ACI_318_14, ACI_318_19
from calcpack.errors import RangeError
from calcpack.formula import Formula

# A 12 in by 16 in column, f_c 4,000 psi, as in PCA Notes on ACI 318, Example 12.3, from memory: sqrt(f_c) b_w d is
# 63.2456 * 165 = 10,435.5 lb.
COLUMN = {"lamb": 1.0, "f_c": 4_000.0, "b_w": 12.0, "d": 13.75}
LOADED = {**COLUMN, "A_g": 192.0}
ROOT = 10_435.516


# 318-14


@pytest.mark.parametrize(
    ("N_u", "factor"),
    # From memory, 22.5.6.1: 2 (1 + N_u/(2000 A_g)); 2000 A_g = 384 kip.
    [(0.0, 2.0), (10_000.0, 2.052083), (160_000.0, 2.833333), (384_000.0, 4.0)],
)
def test_compression_318_14(N_u: float, factor: float) -> None:
    assert shear.concrete_compression_14(N_u=N_u, **LOADED) == pytest.approx(factor * ROOT, rel=1e-6)


@pytest.mark.parametrize(
    ("N_u", "factor"),
    # From memory, 22.5.7.1; 500 A_g = 96 kip: half is left at 48 kip of tension, nothing at 96 kip and beyond.
    [(0.0, 2.0), (-48_000.0, 1.0), (-95_999.0, 2.083e-5), (-96_000.0, 0.0), (-200_000.0, 0.0)],
)
def test_tension_318_14(N_u: float, factor: float) -> None:
    assert shear.concrete_tension_14(N_u=N_u, **LOADED) == pytest.approx(factor * ROOT, rel=1e-3)


def test_strength_of_concrete_318_14_is_continuous_at_no_axial_force() -> None:
    alone = shear.concrete_alone_14(**COLUMN)
    assert alone == pytest.approx(2 * ROOT, rel=1e-6)
    assert shear.concrete_compression_14(N_u=0.0, **LOADED) == alone
    assert shear.concrete_tension_14(N_u=0.0, **LOADED) == alone
    assert shear.concrete_compression_14(N_u=1e-6, **LOADED) == pytest.approx(alone)
    assert shear.concrete_tension_14(N_u=-1e-6, **LOADED) == pytest.approx(alone)


def test_each_sign_of_the_axial_force_has_its_own_equation() -> None:
    with pytest.raises(RangeError, match=r"N_u = -1 lb +allowed 0 lb and up \(ACI 318-14 22.5.6.1, for compression\)"):
        shear.concrete_compression_14(N_u=-1.0, **LOADED)
    with pytest.raises(RangeError, match=r"N_u = 1 lb +allowed up to 0 lb \(ACI 318-14 22.5.7.1, for tension\)"):
        shear.concrete_tension_14(N_u=1.0, **LOADED)


# 318-19


@pytest.mark.parametrize(
    ("N_u", "V_c"),
    [
        # From memory, Table 22.5.5.1(a): (2 * 63.2456 + N_u/1152) * 165; the second term at most 0.05 f_c = 200 psi,
        # at N_u = 230.4 kip; the whole at most 5 * 63.2456 = 316.23 psi, which 2 * 63.25 + 200 = 326.49 psi exceeds.
        (0.0, 126.4911 * 165),
        (10_000.0, (126.4911 + 8.680556) * 165),
        (160_000.0, (126.4911 + 138.8889) * 165),
        (218_000.0, (126.4911 + 189.2361) * 165),
        (219_000.0, 316.2278 * 165),
        (1_000_000.0, 316.2278 * 165),
        (-50_000.0, (126.4911 - 43.40278) * 165),
        (-145_700.0, (126.4911 - 126.4757) * 165),
        (-145_718.0, 0.0),
        (-300_000.0, 0.0),
    ],
)
def test_with_the_least_shear_reinforcement_318_19(N_u: float, V_c: float) -> None:
    assert shear.concrete_with_ties_19(N_u=N_u, **LOADED) == pytest.approx(V_c, rel=1e-5, abs=0.1)


@pytest.mark.parametrize("N_u", [230_400.0, 230_401.0, 500_000.0])
def test_the_axial_share_stops_at_five_per_cent_of_the_concrete_strength(N_u: float) -> None:
    # f_c = 10,000 psi: 2 * 100 + min(N_u/1152, 500) psi; at 230.4 kip 200 psi, at 500 kip 434 psi, with 5 * 100 as cap.
    strong = {**LOADED, "f_c": 10_000.0}
    assert shear.concrete_with_ties_19(N_u=N_u, **strong) == pytest.approx(min(200 + N_u / 1152, 500.0) * 165)
    weak = shear.concrete_with_ties_19.record(N_u=N_u, **{**LOADED, "f_c": 4_000.0})
    assert {line.line.target: line.value for line in weak.lines}["axial_stress"] == pytest.approx(200.0)


@pytest.mark.parametrize(("rho_w", "factor"), [(0.001, 0.8), (0.008, 1.6), (0.015625, 2.0), (0.027, 2.4), (0.5, 5.0)])
def test_by_the_ratio_of_bars_318_19(rho_w: float, factor: float) -> None:
    # From memory, Table 22.5.5.1(b): 8 rho_w^(1/3), which is the 2 of (a) at 1/64; never above 5.
    found = shear.concrete_ratio_19(N_u=0.0, rho_w=rho_w, **LOADED)
    assert found == pytest.approx(factor * ROOT, rel=1e-6)


def test_with_few_ties_318_19_is_b_times_the_size_effect() -> None:
    # From memory, Table 22.5.5.1(c): 8 * 0.8 * 0.2 = 1.28 at rho_w = 0.008.
    arguments = {"N_u": 0.0, "rho_w": 0.008, **LOADED}
    assert shear.concrete_few_ties_19(lambda_s=0.8, **arguments) == pytest.approx(1.28 * ROOT, rel=1e-6)
    assert shear.concrete_few_ties_19(lambda_s=1.0, **arguments) == shear.concrete_ratio_19(**arguments)
    assert shear.concrete_few_ties_19(**{**arguments, "rho_w": 0.0}, lambda_s=0.8) == 0.0


@pytest.mark.parametrize(
    ("d", "factor"), [(5.0, 1.0), (10.0, 1.0), (10.01, 0.99975), (30.0, 0.707107), (70.0, 0.5), (190.0, 0.316228)]
)
def test_size_effect(d: float, factor: float) -> None:
    # From memory, 22.5.5.1.3: sqrt(2/(1 + d/10)); 2/4 at 30 in, 2/8 at 70 in, 2/20 at 190 in.
    assert shear.size_effect(d=d) == pytest.approx(factor, rel=1e-5)


# Both editions

CONCRETE = [shear.concrete_alone_14, shear.concrete_compression_14, shear.concrete_tension_14]
CONCRETE += [shear.concrete_with_ties_19, shear.concrete_ratio_19, shear.concrete_few_ties_19]


def strength(rule: Formula, **changes: float) -> float:
    plain = {**LOADED, "N_u": 0.0, "rho_w": 0.01, "lambda_s": 0.9, **changes}
    return rule(**{symbol: plain[symbol] for symbol in rule.arguments})


@pytest.mark.parametrize("rule", CONCRETE, ids=lambda rule: rule.name)
def test_the_root_of_the_concrete_strength_counts_up_to_100_psi(rule: Formula) -> None:
    # From memory, 22.5.3.1; 100^2 = 10,000 psi.
    assert strength(rule, f_c=9_999.0) < strength(rule, f_c=10_000.0)
    assert strength(rule, f_c=10_001.0) == strength(rule, f_c=10_000.0) == strength(rule, f_c=15_000.0)


@pytest.mark.parametrize("rule", CONCRETE, ids=lambda rule: rule.name)
def test_lightweight_concrete(rule: Formula) -> None:
    assert strength(rule, lamb=0.75) == pytest.approx(0.75 * strength(rule))
    with pytest.raises(RangeError, match=r"lamb = 0.7 +allowed 0.75 to 1 \(ACI 318-14 and 318-19 19.2.4\)"):
        strength(rule, lamb=0.7)


@pytest.mark.parametrize("rule", CONCRETE, ids=lambda rule: rule.name)
def test_concrete_below_the_range_is_refused(rule: Formula) -> None:
    with pytest.raises(RangeError, match=r"f_c = 4 psi +allowed 2,500 psi and up"):
        strength(rule, f_c=4.0)


FORCES = st.floats(-500_000.0, 1_500_000.0)


def by_sign_14(N_u: float) -> float:
    return strength(shear.concrete_compression_14 if N_u >= 0 else shear.concrete_tension_14, N_u=N_u)


@given(N_u=FORCES, more=st.floats(0.0, 200_000.0))
def test_compression_never_weakens_concrete(N_u: float, more: float) -> None:
    assert by_sign_14(N_u) <= by_sign_14(N_u + more) + 1e-6
    for rule in (shear.concrete_with_ties_19, shear.concrete_ratio_19, shear.concrete_few_ties_19):
        assert strength(rule, N_u=N_u) <= strength(rule, N_u=N_u + more) + 1e-6


@given(N_u=FORCES, f_c=st.floats(2_500.0, 15_000.0))
def test_318_19_stays_between_zero_and_its_cap(N_u: float, f_c: float) -> None:
    cap = 5 * min(math.sqrt(f_c), 100.0) * 165
    for rule in (shear.concrete_with_ties_19, shear.concrete_ratio_19, shear.concrete_few_ties_19):
        assert 0.0 <= strength(rule, N_u=N_u, f_c=f_c) <= cap * (1 + 1e-12)


@given(N_u=FORCES)
def test_318_19_is_continuous(N_u: float) -> None:
    # Between its limits the slope is b_w d/(6 A_g), 0.1432 lb/lb; nowhere is it more.
    step = abs(strength(shear.concrete_with_ties_19, N_u=N_u + 1.0) - strength(shear.concrete_with_ties_19, N_u=N_u))
    assert step <= 165 / 1152 + 1e-6


# Depth and tension reinforcement


def test_depth_of_the_outermost_layer() -> None:
    # Hand: 16 - (1.5 + 0.375 + 0.375) = 13.75 in.
    common = {"c_cover": 1.5, "d_bt": 0.375, "d_b": 0.75}
    assert shear.depth_of_layer_y(h=16.0, **common) == 13.75
    assert shear.depth_of_layer_x(b=20.0, **common) == 17.75
    assert shear.depth_one_layer(d_t=13.75) == 13.75


@pytest.mark.parametrize(
    ("d_t", "s", "rows"),
    # h = 24 in: farther than 16 in. Layers at 21, 21 - s, 21 - 2s, …; a layer at exactly 16 in does not count.
    [(21.0, 6.0, 0.0), (21.0, 5.0, 0.0), (21.0, 4.99, 1.0), (21.0, 2.5, 1.0), (21.0, 2.49, 2.0), (15.0, 3.0, 0.0)],
)
def test_rows_beyond_two_thirds(d_t: float, s: float, rows: float) -> None:
    assert shear.rows_beyond_y(d_t=d_t, h=24.0, s=s) == rows
    assert shear.rows_beyond_x(d_t=d_t, b=24.0, s=s) == rows


@given(s=st.floats(1.0, 12.0), d_t=st.floats(17.0, 23.0))
def test_rows_counted_one_by_one(s: float, d_t: float) -> None:
    counted = sum(d_t - i * s > 16.0 for i in range(1, 30))
    assert shear.rows_beyond_y(d_t=d_t, h=24.0, s=s) == counted


def test_depth_of_the_centroid_by_hand() -> None:
    # Four bars at 21 in, two at 18 in, two at 15 in: (84 + 36 + 30)/8 = 18.75 in; eight bars of 1 in^2.
    assert shear.depth_with_side_bars(d_t=21.0, n_rows=2.0, n_face=4.0, s=3.0) == pytest.approx(18.75)
    assert shear.tension_area_with_side_bars(n_face=4.0, n_rows=2.0, A_b=1.0) == 8.0
    assert shear.tension_area_one_layer(n_face=4.0, A_b=1.0) == 4.0
    assert shear.tension_ratio(A_s=8.0, b_w=20.0, d=20.0) == 0.02


def test_circular_columns() -> None:
    # From memory, 22.5.2.2: b_w = h and d = 0.8 h; A_v is two legs.
    assert (shear.width_circular(h=20.0), shear.depth_circular(h=20.0)) == (20.0, 16.0)
    assert shear.area_of_tie_circular(A_sp=0.2) == 0.4


@pytest.mark.parametrize("n_bars", [6.0, 8.0, 11.0, 20.0])
def test_tension_bars_of_a_circle_counted_in_every_direction(n_bars: float) -> None:
    # Bars farther than h/6 from the centre, away from the compressed edge; the least count as the circle is turned.
    h, D_s = 24.0, 19.0
    least = min(
        sum(D_s / 2 * math.cos(turn / 500 + 2 * math.pi * i / n_bars) > h / 6 for i in range(int(n_bars)))
        for turn in range(int(500 * 2 * math.pi / n_bars) + 1)
    )
    assert shear.tension_area_circular(n_bars=n_bars, D_s=D_s, h=h, A_b=1.0) == least


def test_no_bar_of_a_small_circle_lies_far_enough() -> None:
    assert shear.tension_area_circular(n_bars=6.0, D_s=7.0, h=24.0, A_b=1.0) == 0.0


# Shear reinforcement


def test_steel_strength_and_its_inverse() -> None:
    # Hand: 0.22 * 40 * 13.75/6.75 = 17.926 kip; A_v from V_s again.
    V_s = shear.steel_strength(A_v=0.22, f_yt_v=40_000.0, d=13.75, s=6.75)
    assert V_s == pytest.approx(17_925.93)
    assert V_s * 6.75 / (40_000.0 * 13.75) == pytest.approx(0.22)
    assert shear.area_of_legs(n_legs=3.0, A_bt=0.2) == pytest.approx(0.6)


@pytest.mark.parametrize(("f_yt", "counts"), [(40e3, 40e3), (60e3, 60e3), (60_001.0, 60e3), (100e3, 60e3)])
def test_yield_strength_counts_up_to_60_ksi_in_shear(f_yt: float, counts: float) -> None:
    # From memory, Table 20.2.2.4a.
    assert shear.yield_in_shear(f_yt=f_yt) == counts


@pytest.mark.parametrize(
    ("f_c", "A_v_min"),
    # From memory, 10.6.2.2: 50 psi up to f_c = (50/0.75)^2 = 4,444 psi; b_w s/f_yt = 12 * 10/60,000 = 0.002 in^2/psi.
    [(2_500.0, 0.1), (4_444.0, 0.1), (4_445.0, 0.100006), (6_400.0, 0.12), (14_400.0, 0.18)],
)
def test_least_shear_reinforcement(f_c: float, A_v_min: float) -> None:
    found = shear.shear_reinforcement_minimum(f_c=f_c, b_w=12.0, s=10.0, f_yt_v=60_000.0)
    assert found == pytest.approx(A_v_min, rel=1e-5)


@pytest.mark.parametrize(
    ("V_s_req", "d", "s_max"),
    # From memory, Table 10.7.6.5.2; f_c = 2,500 psi, b_w = 10 in: 4 sqrt(f_c) b_w d = 2,000 d lb.
    [
        *[(0.0, 20.0, 10.0), (40_000.0, 20.0, 10.0), (40_001.0, 20.0, 5.0)],
        *[(0.0, 48.0, 24.0), (0.0, 60.0, 24.0), (96_001.0, 48.0, 12.0), (120_001.0, 60.0, 12.0)],
    ],
)
def test_spacing_of_shear_reinforcement(V_s_req: float, d: float, s_max: float) -> None:
    assert shear.shear_spacing(V_s_req=V_s_req, f_c=2_500.0, b_w=10.0, d=d) == s_max


@pytest.mark.parametrize(("V_u", "required"), [(20_000.0, 0.0), (22_500.0, 0.0), (30_000.0, 10_000.0)])
def test_strength_required_of_ties(V_u: float, required: float) -> None:
    # Hand: V_u/0.75 - 30 kip.
    assert shear.steel_required(V_u=V_u, phi=0.75, V_c=30_000.0) == required


@given(V_u=st.floats(1.0, 1e6), V_c=st.floats(0.0, 1e6))
def test_what_is_required_of_ties_makes_the_design_strength_enough(V_u: float, V_c: float) -> None:
    required = shear.steel_required(V_u=V_u, phi=0.75, V_c=V_c)
    assert shear.design_shear_strength(phi=0.75, V_c=V_c, V_s=max(required, 1e-9)) >= V_u * (1 - 1e-12)


# Strength of the section


def test_design_strength_and_limits_of_the_section() -> None:
    # Hand, phi = 0.75 of Table 21.2.1: 0.75 (30 + 20) = 37.5 kip; 0.75 (30 + 8 * 50 * 100/1000) = 52.5 kip.
    phi = shear.phi_shear()
    assert phi == 0.75
    assert shear.design_shear_strength(phi=phi, V_c=30_000.0, V_s=20_000.0) == 37_500.0
    assert shear.section_maximum(phi=phi, V_c=30_000.0, f_c=2_500.0, b_w=10.0, d=10.0) == 52_500.0
    assert shear.shear_reinforcement_threshold(phi=phi, V_c=30_000.0) == 11_250.0


def test_demand_whatever_its_sense() -> None:
    assert (shear.shear_along_x(V_ux=-3.0), shear.shear_along_y(V_uy=4.0)) == (3.0, 4.0)
    assert shear.shear_resultant(V_ux=-3.0, V_uy=4.0) == 5.0


def test_biaxial_shear() -> None:
    # From memory, 318-19 22.5.1.11; hand: 60/100 + 45/50 = 1.5.
    found = shear.biaxial_shear(V_ux=-60.0, phi_V_nx=100.0, V_uy=45.0, phi_V_ny=50.0)
    assert found == pytest.approx(1.5)
    assert shear.biaxial_shear_maximum() == 1.5


@pytest.mark.parametrize(
    ("rule", "old", "new"),
    # From memory: what moved between the editions.
    [
        (shear.steel_strength, "22.5.10.5.3", "22.5.8.5.3"),
        (shear.steel_required, "22.5.10.1", "22.5.8.1"),
        (shear.shear_reinforcement_minimum, "10.6.2.2", "10.6.2.2"),
    ],
)
def test_clauses_of_both_editions(rule: Formula, old: str, new: str) -> None:
    assert rule.clause(ACI_318_14).number == old
    assert rule.clause(ACI_318_19).number == new


@pytest.mark.parametrize(
    ("rule", "arguments", "message"),
    [
        (shear.steel_strength, {"A_v": 0.2, "f_yt_v": 6e4, "d": 10.0, "s": 0.0}, r"s = 0 in +has to be a length above"),
        (shear.design_shear_strength, {"phi": 0.75, "V_c": -1.0, "V_s": 1.0}, r"V_c = -1 lb +has to be a force, zero"),
        (shear.size_effect, {"d": -1.0}, r"d = -1 in +has to be a length above zero"),
        (shear.biaxial_shear, {"V_ux": 1.0, "phi_V_nx": 0.0, "V_uy": 1.0, "phi_V_ny": 1.0}, r"phi_V_nx = 0 lb"),
    ],
)
def test_impossible_arguments_are_refused(rule: Formula, arguments: dict[str, Any], message: str) -> None:
    with pytest.raises(RangeError, match=message):
        rule(**arguments)
