"""Slenderness by moment magnification: stiffness, effective length, limits, magnifiers."""

from __future__ import annotations

import math
from typing import Any

import pytest
from hypothesis import given
from hypothesis import strategies as st

from calcpack.aci318 import slenderness, stiffness
from calcpack.aci318.effective_length import effective_length_nonsway, effective_length_sway
from calcpack.aci318.standards import ACI_318_14, ACI_318_19
from calcpack.errors import RangeError
from calcpack.formula import Formula

# Clauses


@pytest.mark.parametrize(
    ("rule", "in_14", "in_19"),
    [
        # From memory: 6.2.5 of 318-14 became 6.2.5.1, its 6.2.5.1 became 6.2.5.2, and its 6.2.6 became 6.2.5.3.
        (slenderness.slenderness_ratio, "6.2.5", "6.2.5.1"),
        (slenderness.slenderness_limit_sway, "6.2.5(a)", "6.2.5.1(a)"),
        (slenderness.slenderness_limit_nonsway, "6.2.5(b)", "6.2.5.1(b)"),
        (slenderness.radius_about_x, "6.2.5.1(b)", "6.2.5.2(b)"),
        (slenderness.radius_circular, "6.2.5.1(c)", "6.2.5.2(c)"),
        (slenderness.second_order_limit, "6.2.6", "6.2.5.3"),
        (slenderness.magnifier_nonsway, "6.6.4.5.2", "6.6.4.5.2"),
        (slenderness.critical_load, "6.6.4.4.2", "6.6.4.4.2"),
        (stiffness.stiffness_gross, "6.6.4.4.4(a)", "6.6.4.4.4(a)"),
        (stiffness.modulus, "19.2.2.1(b)", "19.2.2.1(b)"),
    ],
)
def test_clauses_of_both_editions(rule: Formula, in_14: str, in_19: str) -> None:
    assert rule.clause(ACI_318_14).number == in_14
    assert rule.clause(ACI_318_19).number == in_19


# Stiffness


@pytest.mark.parametrize(
    ("f_c", "E_c"),
    # Common practice, ksi: 57 sqrt(3,000) = 3,122; 57 sqrt(4,000) = 3,605; 57 sqrt(5,000) = 4,031.
    [(3_000.0, 3_122_000.0), (4_000.0, 3_605_000.0), (5_000.0, 4_031_000.0)],
)
def test_modulus_of_normalweight_concrete(f_c: float, E_c: float) -> None:
    assert stiffness.modulus(f_c=f_c) == pytest.approx(E_c, rel=2e-4)


def test_modulus_of_lightweight_concrete_is_that_of_the_least_density() -> None:
    # Hand: 90**1.5 = 853.815; 33 * 853.815 = 28,175.9; times sqrt(4,000) = 63.2456 gives 1,782,000 psi.
    assert stiffness.modulus_lightweight(f_c=4_000.0) == pytest.approx(1_782_000.0, rel=1e-4)


@given(f_c=st.floats(2_500.0, 12_000.0))
def test_lightweight_is_about_half_as_stiff(f_c: float) -> None:
    ratio = stiffness.modulus_lightweight(f_c=f_c) / stiffness.modulus(f_c=f_c)
    assert ratio == pytest.approx(33 * 90**1.5 / 57_000)
    assert 0.4 < ratio < 0.6


def test_second_moments_of_gross_sections() -> None:
    # Hand: 12 * 20**3/12 = 8,000; 20 * 12**3/12 = 2,880; pi/64 * 20**4 = 7,853.98 in^4.
    assert stiffness.second_moment_about_x(b=12.0, h=20.0) == 8_000.0
    assert stiffness.second_moment_about_y(b=12.0, h=20.0) == 2_880.0
    assert stiffness.second_moment_circular(h=20.0) == pytest.approx(7_853.98, abs=0.01)


def around(n_x: int, n_y: int, x_s: float, y_s: float) -> list[tuple[float, float]]:
    """Bars around a rectangle one by one, corners once."""
    xs = [x_s * (2 * i / (n_x - 1) - 1) for i in range(n_x)]
    ys = [y_s * (2 * i / (n_y - 1) - 1) for i in range(n_y)]
    return sorted({(x, y) for x in xs for y in (-y_s, y_s)} | {(x, y) for x in (-x_s, x_s) for y in ys})


@given(n_x=st.integers(2, 9), n_y=st.integers(2, 9), x_s=st.floats(3.0, 30.0), y_s=st.floats(3.0, 30.0))
def test_second_moment_of_bars_is_the_sum_over_the_bars(n_x: int, n_y: int, x_s: float, y_s: float) -> None:
    bars = around(n_x, n_y, x_s, y_s)
    assert len(bars) == 2 * (n_x + n_y) - 4
    numbers = {"n_x": float(n_x), "n_y": float(n_y)}
    about_x = stiffness.bars_moment_about_x(A_b=0.79, y_s=y_s, **numbers)
    about_y = stiffness.bars_moment_about_y(A_b=0.79, x_s=x_s, **numbers)
    assert about_x == pytest.approx(sum(0.79 * y**2 for _, y in bars))
    assert about_y == pytest.approx(sum(0.79 * x**2 for x, _ in bars))


@given(count=st.integers(3, 20), D_s=st.floats(5.0, 60.0))
def test_second_moment_of_bars_on_a_circle_is_the_sum_over_the_bars(count: int, D_s: float) -> None:
    found = stiffness.bars_moment_circular(A_st=count * 0.6, D_s=D_s)
    heights = [D_s / 2 * math.sin(2 * math.pi * i / count + 0.3) for i in range(count)]
    assert found == pytest.approx(sum(0.6 * y**2 for y in heights))


def test_rows_of_bars_by_hand() -> None:
    # Hand: 18/2 - 1.5 - 0.375 - 1.128/2 = 6.561; 12/2 - the same = 3.561 in.
    common = {"c_cover": 1.5, "d_bt": 0.375, "d_b": 1.128}
    assert stiffness.bar_row_y(h=18.0, **common) == pytest.approx(6.561)
    assert stiffness.bar_row_x(b=12.0, **common) == pytest.approx(3.561)


def test_effective_stiffness_by_hand() -> None:
    # Hand, E_c 3,600 ksi, I_g 8,748, E_s I_se 29,000 * 300, beta_dns 0.5:
    # 0.4 * 3,600 * 8,748/1.5 = 8,398,080; (0.2 * 3,600 * 8,748 + 8,700,000)/1.5 = 9,999,040 kip*in^2.
    gross = {"E_c": 3.6e6, "I_g": 8_748.0, "beta_dns": 0.5}
    assert stiffness.stiffness_gross(**gross) == pytest.approx(8_398_080_000.0)
    assert stiffness.stiffness_bars(**gross, E_s=29e6, I_se=300.0) == pytest.approx(9_999_040_000.0)


def test_a_sustained_share_of_0_6_leaves_a_quarter_of_the_gross_stiffness() -> None:
    # From memory, R6.6.4.4.4: with 0.6 the simple equation becomes 0.25 E_c I_g.
    assert stiffness.stiffness_gross(E_c=1.0, I_g=1.0, beta_dns=0.6) == pytest.approx(0.25)


@pytest.mark.parametrize("rule", [stiffness.stiffness_gross, stiffness.stiffness_bars])
@pytest.mark.parametrize(("beta_dns", "fits"), [(0.0, True), (1.0, True), (-0.01, False), (1.01, False)])
def test_a_share_is_between_none_and_all(rule: Formula, beta_dns: float, fits: bool) -> None:
    arguments = dict.fromkeys(rule.arguments, 1.0) | {"beta_dns": beta_dns}
    if fits:
        assert rule(**arguments) > 0
    else:
        with pytest.raises(RangeError, match=r"beta_dns = -?[\d.]+ +allowed 0 to 1 \(ACI 318-14 and 318-19 6.6.4.4.4"):
            rule(**arguments)


@pytest.mark.parametrize(
    ("sustained", "P_u", "share"),
    [(276.0, 552.0, 0.5), (552.0, 552.0, 1.0), (600.0, 552.0, 1.0), (0.0, 552.0, 0.0), (-50.0, 552.0, 0.0)],
)
def test_sustained_share(sustained: float, P_u: float, share: float) -> None:
    # 6.6.4.4.4; more than all and less than none have no meaning.
    assert slenderness.sustained_ratio(P_sustained=sustained, P_u=P_u) == share


def test_critical_load_is_that_of_euler() -> None:
    # Hand: pi**2 * 1e9/(2 * 100)**2 = 246,740 lb; a quarter of that of a length half as effective.
    assert slenderness.critical_load(EI_eff=1e9, k=2.0, l_u=100.0) == pytest.approx(246_740.1, abs=0.1)
    assert slenderness.critical_load(EI_eff=1e9, k=1.0, l_u=100.0) == pytest.approx(4 * 246_740.1, abs=0.4)


# Effective length


@pytest.mark.parametrize(
    ("psi_A", "psi_B", "nonsway", "sway"),
    [
        # Common practice: readings of the alignment charts, to two figures. Fixed ends and the cantilever are exact.
        (0.0, 0.0, 0.50, 1.00),
        (0.0, 1e9, 0.70, 2.00),
        (1.0, 1.0, 0.77, 1.32),
        (2.0, 2.0, 0.86, 1.59),
        (10.0, 10.0, 0.96, 3.01),
    ],
)
def test_readings_of_the_alignment_charts(psi_A: float, psi_B: float, nonsway: float, sway: float) -> None:
    assert effective_length_nonsway(psi_A, psi_B) == pytest.approx(nonsway, abs=0.006)
    assert effective_length_sway(psi_A, psi_B) == pytest.approx(sway, abs=0.03)


def test_published_chart_reading_at_2_and_2() -> None:
    # col-k-alignment-2-2: exact roots 0.85528 and 1.5895.
    assert effective_length_nonsway(2.0, 2.0) == pytest.approx(0.85528, abs=5e-6)
    assert effective_length_sway(2.0, 2.0) == pytest.approx(1.5895, abs=5e-5)


def test_hinges_and_fixed_ends() -> None:
    # First principles: hinged-hinged pi, fixed-hinged tan u = u at 4.49341, fixed-fixed 2 pi; sway: fixed-fixed pi.
    assert effective_length_nonsway(1e12, 1e12) == pytest.approx(1.0, abs=1e-6)
    assert effective_length_nonsway(0.0, 1e12) == pytest.approx(math.pi / 4.493409458, abs=1e-6)
    assert effective_length_nonsway(0.0, 0.0) == 0.5
    assert effective_length_sway(0.0, 0.0) == 1.0
    assert effective_length_sway(0.0, 1e12) == pytest.approx(2.0, abs=1e-6)


PSI = st.floats(0.05, 50.0)


@given(psi_A=PSI, psi_B=PSI)
def test_braced_factor_makes_the_column_with_its_beams_singular(psi_A: float, psi_B: float) -> None:
    # Independent: slope deflection with stability functions; beams in symmetric single curvature restrain the ends by
    # 2/psi of the column's EI/l. At buckling the determinant of the end rotations vanishes.
    u = math.pi / effective_length_nonsway(psi_A, psi_B)
    near = u * (math.sin(u) - u * math.cos(u))
    far = u * (u - math.sin(u))
    scale = 2 * (1 - math.cos(u)) - u * math.sin(u)
    ends = (near + scale * 2 / psi_A) * (near + scale * 2 / psi_B)
    assert ends == pytest.approx(far**2, rel=1e-6, abs=1e-6)


@given(psi_A=PSI, psi_B=PSI)
def test_sway_factor_makes_the_column_with_its_beams_singular(psi_A: float, psi_B: float) -> None:
    # Independent: no shear in the column, beams in double curvature restrain the ends by 6/psi.
    u = math.pi / effective_length_sway(psi_A, psi_B)
    near, far = u * math.cos(u), u
    ends = (near + math.sin(u) * 6 / psi_A) * (near + math.sin(u) * 6 / psi_B)
    assert ends == pytest.approx(far**2, rel=1e-6, abs=1e-9)


@given(psi_A=st.floats(0.0, 1e6), psi_B=st.floats(0.0, 1e6))
def test_factors_stay_within_those_of_perfect_ends(psi_A: float, psi_B: float) -> None:
    assert 0.5 <= effective_length_nonsway(psi_A, psi_B) <= 1.0
    assert effective_length_sway(psi_A, psi_B) >= 1.0
    assert effective_length_nonsway(psi_A, psi_B) == effective_length_nonsway(psi_B, psi_A)
    assert effective_length_sway(psi_A, psi_B) == effective_length_sway(psi_B, psi_A)


@given(psi_A=PSI, psi_B=PSI, more=st.floats(1.01, 3.0))
def test_softer_beams_never_shorten_the_column(psi_A: float, psi_B: float, more: float) -> None:
    assert effective_length_nonsway(psi_A * more, psi_B) >= effective_length_nonsway(psi_A, psi_B)
    assert effective_length_sway(psi_A * more, psi_B) >= effective_length_sway(psi_A, psi_B)


@given(psi_A=st.floats(0.01, 100.0), psi_B=st.floats(0.01, 100.0))
def test_the_chart_equations_confirm_their_roots(psi_A: float, psi_B: float) -> None:
    ends = {"psi_A": psi_A, "psi_B": psi_B}
    assert abs(slenderness.alignment_nonsway(**ends, k=effective_length_nonsway(psi_A, psi_B))) < 1e-6
    assert abs(slenderness.alignment_sway(**ends, k=effective_length_sway(psi_A, psi_B))) < 1e-6


@given(psi_A=PSI, psi_B=PSI, off=st.sampled_from([0.97, 1.03]))
def test_the_chart_equations_refuse_a_factor_that_is_3_per_cent_off(psi_A: float, psi_B: float, off: float) -> None:
    ends = {"psi_A": psi_A, "psi_B": psi_B}
    braced = min(max(effective_length_nonsway(psi_A, psi_B) * off, 0.501), 0.9999)
    assert abs(slenderness.alignment_nonsway(**ends, k=braced)) > 1e-4
    assert abs(slenderness.alignment_sway(**ends, k=max(effective_length_sway(psi_A, psi_B) * off, 1.001))) > 1e-4


# Whether slenderness counts


@pytest.mark.parametrize(
    ("M_1", "limit"),
    # 34 + 12 M_1/M_2 up to 40, with M_2 = 100: equal in single curvature, none, 40 on it and above, double curvature.
    [(-100.0, 22.0), (-50.0, 28.0), (0.0, 34.0), (49.0, 39.88), (50.0, 40.0), (51.0, 40.0), (100.0, 40.0)],
)
def test_limit_in_nonsway_frames(M_1: float, limit: float) -> None:
    assert slenderness.slenderness_limit_nonsway(M_1=M_1, M_2=100.0) == pytest.approx(limit)


def test_published_double_curvature() -> None:
    # col-load-wight-12-2: 38.0 and 94.4 kip*ft, double curvature; 34 + 12 * 0.4025 = 38.8, 0.6 - 0.4 * 0.4025 = 0.439.
    M = {"M_1": 38.0, "M_2": 94.4}
    assert slenderness.slenderness_limit_nonsway(**M) == pytest.approx(38.8, abs=0.05)
    assert slenderness.moment_factor(**M) == pytest.approx(0.439, abs=5e-4)


def test_limits_that_do_not_depend_on_moments() -> None:
    # 6.2.5(a) of 318-14; a uniform moment gives the same number as 34 - 12.
    assert slenderness.slenderness_limit_sway() == 22.0
    assert slenderness.slenderness_limit_uniform() == slenderness.slenderness_limit_nonsway(M_1=-1.0, M_2=1.0)
    assert slenderness.stability_index_limit() == 0.05


def test_radii_and_slenderness() -> None:
    # 0.30 of the depth in the direction of bending, 0.25 of a diameter; hand: 0.87 * 156/5.4 = 25.133.
    assert slenderness.radius_about_x(h=18.0) == pytest.approx(5.4)
    assert slenderness.radius_about_y(b=12.0) == pytest.approx(3.6)
    assert slenderness.radius_circular(h=20.0) == 5.0
    assert slenderness.slenderness_ratio(k=0.87, l_u=156.0, r=5.4) == pytest.approx(25.133, abs=5e-4)


@given(h=st.floats(8.0, 60.0))
def test_radii_are_close_to_those_of_the_gross_section(h: float) -> None:
    # Geometry: sqrt(I_g/A_g) is h/sqrt(12) = 0.289 h and h/4.
    assert slenderness.radius_about_x(h=h) == pytest.approx(h / math.sqrt(12), rel=0.04)
    assert slenderness.radius_circular(h=h) == h / 4


# End moments


@pytest.mark.parametrize(
    ("bottom", "top", "M_1", "M_2"),
    [
        # Equal signs compress the same face: single curvature, M_1 negative.
        (40.0, 90.0, -40.0, 90.0),
        (-90.0, -40.0, -40.0, 90.0),
        (40.0, -90.0, 40.0, 90.0),
        (-90.0, 40.0, 40.0, 90.0),
        (90.0, 90.0, -90.0, 90.0),
        (90.0, -90.0, 90.0, 90.0),
        (0.0, -90.0, 0.0, 90.0),
        (0.0, 0.0, 0.0, 0.0),
    ],
)
def test_smaller_and_larger_end_moment(bottom: float, top: float, M_1: float, M_2: float) -> None:
    ends = {"M_bottom": bottom, "M_top": top}
    assert slenderness.end_moment_smaller(**ends) == M_1
    assert math.copysign(1.0, slenderness.end_moment_smaller(**ends)) == (-1.0 if M_1 < 0 else 1.0)
    assert slenderness.end_moment_larger(**ends) == M_2


MOMENT = st.floats(-1e7, 1e7)


@given(bottom=MOMENT, top=MOMENT)
def test_end_moments_do_not_mind_which_face_or_end_comes_first(bottom: float, top: float) -> None:
    for rule in (slenderness.end_moment_smaller, slenderness.end_moment_larger):
        found = rule(M_bottom=bottom, M_top=top)
        assert found == rule(M_bottom=top, M_top=bottom) == rule(M_bottom=-bottom, M_top=-top)
    smaller = slenderness.end_moment_smaller(M_bottom=bottom, M_top=top)
    assert abs(smaller) <= slenderness.end_moment_larger(M_bottom=bottom, M_top=top)


def test_sway_moments() -> None:
    # Hand: 50 of which 20 by sway, magnified by 1.3: 30 + 1.3 * 20 = 56; all of it: 65.
    assert slenderness.nonsway_part(M_u=50.0, M_s=20.0) == 30.0
    assert slenderness.end_moment_sway(M_ns=30.0, delta_s=1.3, M_s=20.0) == 56.0
    assert slenderness.end_moment_sway_whole(delta_s=1.3, M_u=50.0) == 65.0


@given(M_u=MOMENT, M_s=MOMENT)
def test_without_magnification_the_parts_add_up(M_u: float, M_s: float) -> None:
    rest = slenderness.nonsway_part(M_u=M_u, M_s=M_s)
    assert slenderness.end_moment_sway(M_ns=rest, delta_s=1.0, M_s=M_s) == pytest.approx(M_u, abs=1e-6)


def test_all_as_sway_is_not_on_the_safe_side_where_parts_oppose() -> None:
    # 50 by gravity and -40 by wind: 10 as a whole, 14 magnified by 1.4, though the parts give 50 - 56 = -6; with 40 and
    # -50 the whole gives -14 and the parts -30. This is why the note says where it is on the safe side.
    assert slenderness.end_moment_sway(M_ns=40.0, delta_s=1.4, M_s=-50.0) == pytest.approx(-30.0)
    assert slenderness.end_moment_sway_whole(delta_s=1.4, M_u=-10.0) == pytest.approx(-14.0)


# Magnifier between the ends


def delta_ns(C_m: float, stability: float) -> float:
    return slenderness.magnifier_nonsway(C_m=C_m, stability=stability)


@pytest.mark.parametrize(
    ("C_m", "stability", "expected"),
    # Hand: C_m/(1 - P_u/(0.75 P_c)), not below 1: on it where C_m = 1 - stability.
    [(1.0, 0.0, 1.0), (1.0, 0.5, 2.0), (0.6, 0.5, 1.2), (0.5, 0.5, 1.0), (0.4, 0.5, 1.0), (0.2, 0.75, 1.0)],
)
def test_magnifier(C_m: float, stability: float, expected: float) -> None:
    assert delta_ns(C_m, stability) == pytest.approx(expected)


@pytest.mark.parametrize("stability", [1.0, 1.0 + 1e-12, 1.5, 100.0, float("nan"), float("inf")])
def test_no_magnifier_at_the_critical_load_or_beyond(stability: float) -> None:
    # The equation would give infinity, then negative numbers that the floor of 1.0 would hide.
    with pytest.raises(RangeError, match=r"stability = .* \(below 1, ACI 318-14 and 318-19 6.6.4.5.2\)"):
        delta_ns(1.0, stability)


def test_just_below_the_critical_load_the_magnifier_is_large_and_positive() -> None:
    assert delta_ns(1.0, 1.0 - 1e-9) == pytest.approx(1e9, rel=1e-6)


@given(C_m=st.floats(0.2, 1.0), low=st.floats(0.0, 0.95), more=st.floats(0.0, 0.04))
def test_the_magnifier_grows_with_the_load_and_does_not_jump(C_m: float, low: float, more: float) -> None:
    before, after = delta_ns(C_m, low), delta_ns(C_m, low + more)
    assert 1.0 <= before <= after
    # The slope of 1/(1 - x) is below 1/(1 - 0.99)**2 there.
    assert after - before <= more * 1e4 + 1e-12


@given(stability=st.floats(0.0, 0.9))
def test_equal_end_moments_are_between_the_exact_secant_and_its_bound(stability: float) -> None:
    # First principles: under equal end moments M y'' + P y = -M bends the middle to M sec(pi/2 sqrt(P/P_c)); under a
    # sine curve of moments it is 1/(1 - P/P_c) exactly; a uniform moment is at most 4/pi of its first sine term.
    exact, found = 1 / math.cos(math.pi / 2 * math.sqrt(stability)), delta_ns(1.0, stability)
    assert found <= exact * (1 + 1e-12)
    assert exact <= 4 / math.pi * found


def largest_moment(beta: float, stability: float) -> float:
    """The exact largest moment of a pin-ended column over M_2, for a moment of beta times M_2 at the other end."""
    u = math.pi * math.sqrt(stability)
    sine = (beta - math.cos(u)) / math.sin(u)
    return max(abs(math.cos(u * i / 2000) + sine * math.sin(u * i / 2000)) for i in range(2001))


@given(beta=st.floats(-1.0, 1.0), stability=st.floats(0.01, 0.6))
def test_the_moment_factor_is_close_to_the_exact_beam_column(beta: float, stability: float) -> None:
    # First principles, the solution of EI y'' + P y = -M(x). The straight line 0.6 + 0.4 beta of Austin (1961, from
    # memory) follows it within some per cent while no magnifier is above about 2.
    C_m = slenderness.moment_factor(M_1=-beta, M_2=1.0)
    found, exact = delta_ns(C_m, stability), largest_moment(beta, stability)
    assert found == pytest.approx(exact, rel=0.17)


@pytest.mark.parametrize(("M_1", "C_m"), [(-100.0, 1.0), (-50.0, 0.8), (0.0, 0.6), (50.0, 0.4), (100.0, 0.2)])
def test_moment_factor(M_1: float, C_m: float) -> None:
    # 0.6 - 0.4 M_1/M_2; trap: single curvature has to come out the worst.
    assert slenderness.moment_factor(M_1=M_1, M_2=100.0) == pytest.approx(C_m)


def test_moment_factor_without_end_moments() -> None:
    assert slenderness.moment_factor_uniform() == 1.0
    with pytest.raises(RangeError, match="moment_factor: no result"):
        slenderness.moment_factor(M_1=0.0, M_2=0.0)


def test_stability_ratio_holds_the_stiffness_reduction() -> None:
    # Trap: 0.75 stands in the nonsway magnifier and in the one by critical loads, not in 1/(1 - Q).
    reduced = slenderness.reduced_critical_load(P_c=1_000.0)
    assert reduced == 750.0
    assert slenderness.stability_ratio(P_u=375.0, P_c_reduced=reduced) == 0.5
    assert slenderness.reduced_critical_load_story(sum_P_c=1_000.0) == 750.0
    assert slenderness.magnifier_sway(Q=0.2) == pytest.approx(1.25)


def test_least_moments() -> None:
    # Hand: 500 kip (0.6 + 0.03 * 14) = 510 kip*in, and with 24 in 500 * 1.32 = 660 kip*in.
    assert slenderness.least_moment_about_x(P_u=500e3, h=14.0) == pytest.approx(510e3)
    assert slenderness.least_moment_about_y(P_u=500e3, b=24.0) == pytest.approx(660e3)


def test_magnified_moment_and_its_sign() -> None:
    # Published end: 1.79 * 510 kip*in = 913 kip*in, recomputed in col-slender-cee415-nonsway.
    assert slenderness.moment_magnified(delta_ns=1.79, M_2=510.0) == pytest.approx(913.0, abs=0.5)
    assert slenderness.moment_reversed(M_c=913.0) == -913.0


@pytest.mark.parametrize(("M_2", "M_2_min", "limit"), [(100.0, 50.0, 140.0), (50.0, 50.0, 70.0), (0.0, 50.0, 70.0)])
def test_limit_of_second_order_moments(M_2: float, M_2_min: float, limit: float) -> None:
    assert slenderness.second_order_limit(M_2=M_2, M_2_min=M_2_min) == pytest.approx(limit)


# Sway


@pytest.mark.parametrize(("Q", "delta_s"), [(0.0, 1.0), (0.05, 1 / 0.95), (1 / 3, 1.5), (0.5, 2.0)])
def test_magnifier_of_sway_moments_from_the_stability_index(Q: float, delta_s: float) -> None:
    assert slenderness.magnifier_sway(Q=Q) == pytest.approx(delta_s)


@pytest.mark.parametrize(
    ("rule", "symbol"),
    [(slenderness.magnifier_sway, "Q"), (slenderness.magnifier_sway_by_loads, "stability_s")],
)
@pytest.mark.parametrize("value", [1.0, 1.2, 5.0])
def test_no_magnifier_of_a_story_that_buckles(rule: Formula, symbol: str, value: float) -> None:
    with pytest.raises(RangeError, match=rf"{symbol} = .* \(below 1, ACI 318-14 and 318-19 6.6.4.6.2\([ab]\)\)"):
        rule(**{symbol: value})


def test_stability_index_by_hand() -> None:
    # col-sway-q-method: 1,000 * 0.5/(40 * 125) = 0.1; twice the deflection is twice the index.
    story = {"sum_P_u": 1e6, "V_us": 40e3, "l_c": 125.0}
    assert slenderness.stability_index(**story, Delta_o=0.5) == pytest.approx(0.1)
    assert slenderness.stability_index(**story, Delta_o=1.0) == pytest.approx(0.2)


@given(share=st.floats(0.0, 0.74))
def test_magnifier_by_critical_loads(share: float) -> None:
    ratio = slenderness.stability_ratio_story(sum_P_u=share + 1e-9, sum_P_c_reduced=0.75)
    assert slenderness.magnifier_sway_by_loads(stability_s=ratio) == pytest.approx(1 / (1 - share / 0.75), rel=1e-4)


@pytest.mark.parametrize(
    ("rule", "arguments", "message"),
    [
        (slenderness.slenderness_ratio, {"k": 0.0, "l_u": 100.0, "r": 5.0}, r"k = 0 +has to be a ratio above zero"),
        (slenderness.alignment_sway, {"psi_A": -1.0, "psi_B": 1.0, "k": 1.2}, r"psi_A = -1 +has to be a ratio, zero"),
        (slenderness.critical_load, {"EI_eff": 1e9, "k": 1.0, "l_u": -1.0}, r"l_u = -1 in +has to be a length above"),
        (slenderness.stability_ratio, {"P_u": 1.0, "P_c_reduced": 0.0}, r"P_c_reduced = 0 lb +has to be a force"),
        (
            slenderness.slenderness_limit_nonsway,
            {"M_1": 1.0, "M_2": -1.0},
            r"M_2 = -1 lb\*in +has to be a moment, zero",
        ),
        (stiffness.modulus, {"f_c": 40.0}, r"f_c = 40 psi +allowed 2,500 psi and up"),
    ],
)
def test_impossible_input_is_refused(rule: Formula, arguments: dict[str, Any], message: str) -> None:
    with pytest.raises(RangeError, match=message):
        rule(**arguments)
