"""Stress block, strain compatibility, phi and the ray of a load: values by hand and published ones."""

from __future__ import annotations

import math

import pytest
from hypothesis import given
from hypothesis import strategies as st

from calcpack.aci318 import bending, compatibility, stress_block
from calcpack.aci318.standards import ACI_318_14, ACI_318_19
from calcpack.errors import RangeError
from calcpack.formula import Formula

E_S = 29e6
ANGLES = st.floats(-math.pi, math.pi)


@pytest.mark.parametrize(
    ("rule", "in_14", "in_19"),
    [
        (stress_block.beta_1, "Table 22.2.2.4.3", "Table 22.2.2.4.3"),
        (stress_block.block_depth, "22.2.2.4.1", "22.2.2.4.1"),
        (stress_block.concrete_force, "22.2.2.4.1", "22.2.2.4.1"),
        (compatibility.bar_strain, "22.2.1.2", "22.2.1.2"),
        (compatibility.bar_stress, "20.2.2.1", "20.2.2.1"),
        (compatibility.axial_sum, "22.2.1.1", "22.2.1.1"),
        (compatibility.yield_strain, "21.2.2.1", "21.2.2.1"),
        (bending.strength_length, "22.4.1.1", "22.4.1.1"),
        (bending.tension_strength, "22.4.3.1", "22.4.3.1"),
        (bending.phi_tension, "Table 21.2.2", "Table 21.2.2"),
    ],
)
def test_clauses_of_both_editions(rule: Formula, in_14: str, in_19: str) -> None:
    # Clause numbers from memory of both editions.
    assert rule.clause(ACI_318_14).number == in_14
    assert rule.clause(ACI_318_19).number == in_19


# Stress block


@pytest.mark.parametrize(
    ("f_c", "beta_1"),
    [
        # Common practice, Table 22.2.2.4.3: 0.85 up to 4 ksi, less 0.05 for each ksi beyond, 0.65 from 8 ksi on.
        (2_500.0, 0.85),
        (4_000.0, 0.85),
        (4_001.0, 0.84995),
        (5_000.0, 0.80),
        (6_000.0, 0.75),
        (7_999.0, 0.65005),
        (8_000.0, 0.65),
        (8_001.0, 0.65),
        (12_000.0, 0.65),
    ],
)
def test_depth_of_the_block_over_that_of_the_axis(f_c: float, beta_1: float) -> None:
    assert stress_block.beta_1(f_c=f_c) == pytest.approx(beta_1, abs=1e-12)


def test_concrete_below_the_range_is_refused() -> None:
    with pytest.raises(RangeError, match=r"f_c = 2,499 psi +allowed 2,500 psi and up"):
        stress_block.beta_1(f_c=2_499.0)


def test_block_and_its_force_by_hand() -> None:
    # Hand: 0.85 * 10 = 8.5 in; 8.5 * 16 = 136 in^2; 0.85 * 4 * 136 = 462.4 kip.
    a = stress_block.block_depth(beta_1=0.85, c=10.0)
    A_c = stress_block.area_x(a=a, b=16.0, h=20.0)
    assert (a, A_c) == (8.5, 136.0)
    assert stress_block.concrete_force(f_c=4_000.0, A_c=A_c) == pytest.approx(462_400.0)


@pytest.mark.parametrize(
    ("a", "area", "arm"),
    # A rectangle of 16 by 20 in: half of it, nearly all, all, and a block deeper than the section.
    [(10.0, 160.0, 5.0), (19.0, 304.0, 0.5), (20.0, 320.0, 0.0), (23.0, 320.0, 0.0)],
)
def test_a_block_parallel_to_a_face(a: float, area: float, arm: float) -> None:
    assert stress_block.area_x(a=a, b=16.0, h=20.0) == area
    assert stress_block.area_y(a=a, b=20.0, h=16.0) == area
    for side in (1.0, -1.0):
        assert stress_block.centroid_y(u_y=side, a=a, h=20.0) == side * arm
        assert stress_block.centroid_x(u_x=side, a=a, b=20.0) == side * arm


@pytest.mark.parametrize(("M", "side"), [(5.0, 1.0), (-5.0, -1.0), (1e-9, 1.0), (-1e9, -1.0)])
def test_the_compressed_face_has_the_sign_of_the_moment(M: float, side: float) -> None:
    assert stress_block.side_y(M_ux=M) == side
    assert stress_block.side_x(M_uy=M) == side


@pytest.mark.parametrize(
    ("degrees", "u_x", "u_y"), [(0.0, 1.0, 0.0), (90.0, 0.0, 1.0), (180.0, -1.0, 0.0), (30.0, math.sqrt(0.75), 0.5)]
)
def test_direction_of_the_compressed_face(degrees: float, u_x: float, u_y: float) -> None:
    theta = math.radians(degrees)
    assert stress_block.direction_x(theta=theta) == pytest.approx(u_x, abs=1e-15)
    assert stress_block.direction_y(theta=theta) == pytest.approx(u_y, abs=1e-15)


@given(theta=ANGLES)
def test_the_extreme_fibre_is_the_farthest_corner(theta: float) -> None:
    u_x, u_y = stress_block.direction_x(theta=theta), stress_block.direction_y(theta=theta)
    corners = [x * u_x + y * u_y for x in (-8.0, 8.0) for y in (-10.0, 10.0)]
    h_u = stress_block.extreme_fibre_rectangular(b=16.0, h=20.0, u_x=u_x, u_y=u_y)
    assert h_u == pytest.approx(max(corners), rel=1e-12)
    assert stress_block.block_edge(h_u=h_u, a=3.0) == pytest.approx(max(corners) - 3.0)


def test_the_extreme_fibre_of_bending_about_one_axis() -> None:
    assert stress_block.extreme_fibre_x(h=20.0) == stress_block.extreme_fibre_circular(h=20.0) == 10.0
    assert stress_block.extreme_fibre_y(b=16.0) == 8.0


def polygon(vertices: list[tuple[float, float]]) -> tuple[float, float, float]:
    """Area and centroid by the formulas of a table of vertices."""
    areas, first_x, first_y = [], [], []
    for (x_before, y_before), (x, y) in zip(vertices, [*vertices[1:], vertices[0]], strict=True):
        A_j = stress_block.cross_product(x=x, y=y, x_before=x_before, y_before=y_before)
        areas.append(A_j)
        first_x.append(stress_block.moment_of_vertex_x(A_j=A_j, x=x, x_before=x_before))
        first_y.append(stress_block.moment_of_vertex_y(A_j=A_j, y=y, y_before=y_before))
    A_c = stress_block.area_polygon(A_j_sum=sum(areas))
    return (
        A_c,
        stress_block.centroid_x_polygon(S_jx_sum=sum(first_x), A_c=A_c),
        stress_block.centroid_y_polygon(S_jy_sum=sum(first_y), A_c=A_c),
    )


@pytest.mark.parametrize(
    ("vertices", "expected"),
    [
        # Elementary geometry: a triangle has half of base times height, and its centroid in the mean of its corners.
        ([(0.0, 0.0), (6.0, 0.0), (0.0, 9.0)], (27.0, 2.0, 3.0)),
        ([(2.0, 1.0), (8.0, 1.0), (2.0, 10.0)], (27.0, 4.0, 4.0)),
        ([(-3.0, -2.0), (5.0, -2.0), (5.0, 4.0), (-3.0, 4.0)], (48.0, 1.0, 1.0)),
        # A trapezoid of 4 and 2 in parallel sides, 3 in high: 9 in^2, 3 (4 + 2 * 2)/(3 (4 + 2)) = 4/3 in above.
        ([(-2.0, 0.0), (2.0, 0.0), (1.0, 3.0), (-1.0, 3.0)], (9.0, 0.0, 4 / 3)),
    ],
)
def test_a_block_by_its_vertices(vertices: list[tuple[float, float]], expected: tuple[float, float, float]) -> None:
    for start in range(len(vertices)):
        turned = vertices[start:] + vertices[:start]
        assert polygon(turned) == pytest.approx(expected, abs=1e-12)


def segment(h: float, a: float) -> tuple[float, float]:
    """Area of a segment and the distance of its centroid from the centre."""
    omega = stress_block.arc_half_angle(a=a, h=h)
    A_c = stress_block.area_circular(h=h, omega=omega)
    return A_c, stress_block.centroid_segment(h=h, omega=omega, A_c=A_c)


def test_half_a_circle() -> None:
    # Common practice (col-circular-segment-half): pi D^2/8 = 157.08 in^2, 4 R/(3 pi) = 4.2441 in from the centre.
    area, arm = segment(20.0, 10.0)
    assert area == pytest.approx(157.08, abs=0.005)
    assert arm == pytest.approx(4.2441, abs=5e-5)


@pytest.mark.parametrize("a", [20.0, 20.001, 25.0])
def test_a_block_that_covers_the_circle(a: float) -> None:
    area, arm = segment(20.0, a)
    assert area == pytest.approx(math.pi * 100.0)
    assert arm == pytest.approx(0.0, abs=1e-12)


def test_a_segment_and_the_rest_of_the_circle() -> None:
    # Beyond half, the block is the circle less the segment on the other side.
    small, large = segment(20.0, 4.0), segment(20.0, 16.0)
    assert small[0] + large[0] == pytest.approx(math.pi * 100.0)
    assert small[0] * small[1] == pytest.approx(large[0] * large[1])
    # Table of segments, common practice: with h/D = 0.2 the area is 0.111824 D^2.
    assert small[0] == pytest.approx(0.111824 * 400.0, rel=5e-6)


def test_the_centroid_of_a_segment_lies_in_its_direction() -> None:
    assert stress_block.centroid_x_segment(u_c=5.0, u_x=-0.6) == -3.0
    assert stress_block.centroid_y_segment(u_c=5.0, u_y=0.8) == 4.0


# Bars


@given(x=st.floats(-20.0, 20.0), y=st.floats(-20.0, 20.0), side=st.sampled_from([1.0, -1.0]))
def test_depths_about_one_axis_are_those_of_the_general_one(x: float, y: float, side: float) -> None:
    about_x = compatibility.bar_depth(h_u=10.0, u_x=0.0, u_y=side, x=x, y=y)
    about_y = compatibility.bar_depth(h_u=8.0, u_x=side, u_y=0.0, x=x, y=y)
    assert compatibility.bar_depth_x(h_u=10.0, u_y=side, y=y) == about_x
    assert compatibility.bar_depth_y(h_u=8.0, u_x=side, x=x) == about_y


@pytest.mark.parametrize(
    ("d_s", "strain"), [(2.5, 0.00225), (9.999, 3e-7), (10.0, 0.0), (10.001, -3e-7), (17.5, -0.00225), (20.0, -0.003)]
)
def test_strain_of_a_bar(d_s: float, strain: float) -> None:
    # Hand: 0.003 (10 - d)/10.
    assert compatibility.bar_strain(eps_cu=0.003, c=10.0, d_s=d_s) == pytest.approx(strain, abs=1e-15)
    assert compatibility.tension_strain(eps_cu=0.003, c=10.0, d_t=d_s) == pytest.approx(-strain, abs=1e-15)


@pytest.mark.parametrize(
    ("strain", "stress"),
    # Hand: 29,000 ksi times the strain, 58 ksi at 0.002.
    [(0.0, 0.0), (0.001, 29_000.0), (0.0019, 55_100.0), (0.002, 58_000.0), (0.0021, 58_000.0), (0.01, 58_000.0)],
)
def test_stress_of_a_bar_to_its_yield_strength(strain: float, stress: float) -> None:
    assert compatibility.bar_stress(E_s=E_S, eps_s=strain, f_y=58_000.0) == pytest.approx(stress)
    assert compatibility.bar_stress(E_s=E_S, eps_s=-strain, f_y=58_000.0) == pytest.approx(-stress)


@pytest.mark.parametrize(
    ("d_s", "force"),
    # Hand: 2 in^2 at 30 ksi, less 0.85 * 4 ksi where the centre lies inside the block; on its edge nothing is lost.
    [(8.4999, 53_200.0), (8.5, 60_000.0), (8.5001, 60_000.0)],
)
def test_a_bar_displaces_concrete_inside_the_block(d_s: float, force: float) -> None:
    found = compatibility.bar_force(A_b=2.0, f_s=30_000.0, f_c=4_000.0, d_s=d_s, a=8.5)
    assert found == pytest.approx(force)


def test_sums_by_hand() -> None:
    assert compatibility.moment_x(F_s=-60_000.0, y=-5.0) == 300_000.0
    assert compatibility.moment_y(F_s=-60_000.0, x=4.0) == -240_000.0
    assert compatibility.axial_sum(C_c=462_400.0, F_s_sum=-62_400.0) == 400_000.0
    assert compatibility.moment_sum_x(C_c=100_000.0, y_c=5.0, M_Fx_sum=300_000.0) == 800_000.0
    assert compatibility.moment_sum_y(C_c=100_000.0, x_c=-4.0, M_Fy_sum=300_000.0) == -100_000.0


def strengths(b: float, h: float, A_s: float, f_c: float, c: float) -> tuple[float, float]:
    """P_n and M_n about x of a section with equal bars 2.5 in from two faces, by the formulas in turn."""
    beta_1 = stress_block.beta_1(f_c=f_c)
    a = stress_block.block_depth(beta_1=beta_1, c=c)
    C_c = stress_block.concrete_force(f_c=f_c, A_c=stress_block.area_x(a=a, b=b, h=h))
    forces, moments = [], []
    for y in (h / 2 - 2.5, 2.5 - h / 2):
        d_s = compatibility.bar_depth_x(h_u=stress_block.extreme_fibre_x(h=h), u_y=1.0, y=y)
        eps_s = compatibility.bar_strain(eps_cu=0.003, c=c, d_s=d_s)
        f_s = compatibility.bar_stress(E_s=E_S, eps_s=eps_s, f_y=60_000.0)
        forces.append(compatibility.bar_force(A_b=A_s, f_s=f_s, f_c=f_c, d_s=d_s, a=a))
        moments.append(compatibility.moment_x(F_s=forces[-1], y=y))
    y_c = stress_block.centroid_y(u_y=1.0, a=a, h=h)
    P_n = compatibility.axial_sum(C_c=C_c, F_s_sum=sum(forces))
    return P_n, compatibility.moment_sum_x(C_c=C_c, y_c=y_c, M_Fx_sum=sum(moments))


@pytest.mark.parametrize(
    ("b", "h", "A_s", "f_c", "P_b", "e_b"),
    [
        # Published: Hassoun & Al-Manaseer, Structural Concrete, Table 11.3, p. 416, rows a, c, d, f, i, j, l.
        (20.0, 20.0, 7.62, 4_000.0, 572.0, 17.4),
        (24.0, 24.0, 10.16, 4_000.0, 848.0, 20.1),
        (18.0, 26.0, 7.62, 4_000.0, 698.0, 20.6),
        (14.0, 18.0, 5.08, 4_000.0, 354.0, 16.2),
        (14.0, 20.0, 4.0, 5_000.0, 476.0, 13.4),
        (16.0, 22.0, 5.08, 5_000.0, 606.0, 14.8),
        (14.0, 20.0, 4.0, 6_000.0, 534.0, 12.8),
    ],
)
def test_published_balanced_points(b: float, h: float, A_s: float, f_c: float, P_b: float, e_b: float) -> None:
    eps_y = compatibility.yield_strain(f_y=60_000.0, E_s=E_S)
    c = 0.003 / (0.003 + eps_y) * (h - 2.5)
    assert compatibility.tension_strain(eps_cu=0.003, c=c, d_t=h - 2.5) == pytest.approx(eps_y)
    P_n, M_n = strengths(b, h, A_s, f_c, c)
    assert P_n / 1000 == pytest.approx(P_b, rel=0.005)
    assert M_n / P_n == pytest.approx(e_b, rel=0.01)


# phi


def test_yield_strains() -> None:
    # Hand: 60/29,000; ACI 318-14 21.2.2.1 permits 0.002 for Grade 60.
    assert compatibility.yield_strain(f_y=60_000.0, E_s=E_S) == pytest.approx(0.00206897, abs=5e-9)
    assert compatibility.yield_strain_grade_60() == 0.002
    assert [clause.standard for clause in compatibility.yield_strain_grade_60.clauses] == [ACI_318_14]


def test_published_transition() -> None:
    # Common practice (col-phi-transition-gr60): 0.8167 tied, 0.85 spiral; 0.8109 tied by 318-19 with 60/29,000.
    assert compatibility.phi_tied_14(eps_t=0.004, eps_ty=0.002) == pytest.approx(0.8167, abs=5e-5)
    assert compatibility.phi_spiral_14(eps_t=0.004, eps_ty=0.002) == pytest.approx(0.85)
    assert compatibility.phi_tied_19(eps_t=0.004, eps_ty=60 / 29_000) == pytest.approx(0.8109, abs=5e-5)


@pytest.mark.parametrize(
    ("rule", "least", "tension_controlled"),
    [
        # Table 21.2.2, common practice; eps_ty = 0.0025: the transition ends at 0.005 in 318-14, at 0.0055 in 318-19.
        (compatibility.phi_tied_14, 0.65, 0.005),
        (compatibility.phi_spiral_14, 0.75, 0.005),
        (compatibility.phi_tied_19, 0.65, 0.0055),
        (compatibility.phi_spiral_19, 0.75, 0.0055),
    ],
)
def test_phi_on_both_sides_of_its_limits(rule: Formula, least: float, tension_controlled: float) -> None:
    def phi(eps_t: float) -> float:
        return rule(eps_t=eps_t, eps_ty=0.0025)

    assert [phi(eps_t) for eps_t in (-0.003, 0.0, 0.0024999, 0.0025)] == [least] * 4
    slope = (0.9 - least) / (tension_controlled - 0.0025)
    assert phi(0.0026) == pytest.approx(least + slope * 0.0001)
    assert phi((0.0025 + tension_controlled) / 2) == pytest.approx((least + 0.9) / 2)
    assert phi(tension_controlled - 1e-4) == pytest.approx(0.9 - slope * 1e-4)
    assert phi(tension_controlled) == pytest.approx(0.9)
    assert phi(tension_controlled + 1e-6) == phi(0.03) == 0.9


def test_the_branch_on_the_limit_of_the_transition() -> None:
    # 0.005 itself is tension-controlled; 0.002 itself compression-controlled.
    recorded = compatibility.phi_tied_14.record(eps_t=0.005, eps_ty=0.002)
    assert recorded.value == 0.9
    assert compatibility.phi_tied_14.record(eps_t=0.002, eps_ty=0.002).value == 0.65


def test_editions_part_where_bars_are_of_high_grade() -> None:
    # Trap of phi, hand: 80/29,000 = 0.0027586; at 0.005 318-14 has 0.9, 318-19 0.65 + 0.25 * 0.0022414/0.003 = 0.8368.
    eps_ty = compatibility.yield_strain(f_y=80_000.0, E_s=E_S)
    assert compatibility.phi_tied_14(eps_t=0.005, eps_ty=eps_ty) == 0.9
    assert compatibility.phi_tied_19(eps_t=0.005, eps_ty=eps_ty) == pytest.approx(0.8368, abs=5e-5)
    # With Grade 60 and 0.002 they agree everywhere.
    for eps_t in (0.001, 0.002, 0.003, 0.004, 0.0049, 0.005, 0.006):
        old, new = (rule(eps_t=eps_t, eps_ty=0.002) for rule in (compatibility.phi_tied_14, compatibility.phi_tied_19))
        assert old == pytest.approx(new)


# The ray


@given(
    P=st.floats(-1e6, 3e6),
    M_x=st.floats(-1e7, 1e7),
    M_y=st.floats(-1e7, 1e7),
    phi=st.floats(0.65, 0.9),
    share=st.floats(0.01, 5.0),
)
def test_a_load_is_a_share_of_the_strength_on_its_ray(
    P: float, M_x: float, M_y: float, phi: float, share: float
) -> None:
    size = {"b": 16.0, "h": 20.0}
    if abs(P) + abs(M_x) / 20 + abs(M_y) / 16 < 1.0:
        return
    k = share * phi
    R_u = bending.load_length(P_u=k * P, M_ux=k * M_x, M_uy=k * M_y, **size)
    phi_R_n = bending.strength_length(phi=phi, P_n=P, M_nx=M_x, M_ny=M_y, **size)
    k_u = bending.load_share(R_u=R_u, phi_R_n=phi_R_n)
    assert k_u == pytest.approx(share)
    for part in (P, M_x / 20, M_y / 16):
        left = bending.difference(S_u=k * part, S_n=part, phi=phi, k_u=k_u, R_u=R_u)
        assert left == pytest.approx(0.0, abs=1e-12)


def test_a_difference_is_left_where_the_load_is_off_the_ray() -> None:
    # Hand: 300 against 0.65 * 0.8 * 600 = 312 kip, 12 kip over a length of 500 kip.
    left = bending.difference(S_u=300e3, S_n=600e3, phi=0.65, k_u=0.8, R_u=500e3)
    assert left == pytest.approx(-0.024)


def test_lengths_by_hand() -> None:
    # Hand: sqrt(300^2 + 400^2) = 500; moments of 8,000 kip*in over 20 in are 400 kip.
    assert bending.load_length_x(P_u=300e3, M_ux=-8e6, h=20.0) == pytest.approx(500e3)
    assert bending.load_length_y(P_u=-300e3, M_uy=8e6, b=20.0) == pytest.approx(500e3)
    assert bending.load_length_y_circular(P_u=300e3, M_uy=8e6, h=20.0) == pytest.approx(500e3)
    assert bending.load_length_circular(P_u=0.0, M_ux=6e6, M_uy=8e6, h=20.0) == pytest.approx(500e3)
    # sqrt(2^2 + 3^2 + 6^2) = 7
    assert bending.load_length(P_u=200e3, M_ux=6e6, M_uy=9.6e6, b=16.0, h=20.0) == pytest.approx(700e3)


def test_design_strengths_by_hand() -> None:
    half: dict[str, float] = {"phi": 0.5, "P_n": 300e3}
    assert bending.strength_length_x(**half, M_nx=-8e6, h=20.0) == pytest.approx(250e3)
    assert bending.strength_length_y(**half, M_ny=8e6, b=20.0) == pytest.approx(250e3)
    assert bending.strength_length_y_circular(**half, M_ny=8e6, h=20.0) == pytest.approx(250e3)
    assert bending.strength_length_circular(phi=0.5, P_n=0.0, M_nx=6e6, M_ny=8e6, h=20.0) == pytest.approx(250e3)
    assert bending.strength_length(phi=0.5, P_n=200e3, M_nx=6e6, M_ny=9.6e6, b=16.0, h=20.0) == pytest.approx(350e3)


def test_tension_alone() -> None:
    # Hand: 0.9 * 60 * 8 = 432 kip.
    phi = bending.phi_tension()
    assert bending.tension_force(P_u=-216e3) == 216e3
    assert bending.tension_strength(phi=phi, f_y=60_000.0, A_st=8.0) == pytest.approx(432e3)


# The independent check


def test_published_reciprocal_load() -> None:
    # Published (col-biax-navfac-bresler): NAVFAC DM-2.08, 1986, p. 2.08-124: 808.775, 1148.662, 1821.6: 641.83 kip.
    found = bending.reciprocal_load(P_nx=808_775.0, P_ny=1_148_662.0, P_o=1_821_600.0)
    assert found / 1000 == pytest.approx(641.83, rel=1e-5)


def test_reciprocal_load_of_a_textbook() -> None:
    # From memory (col-biax-nilson-8-3): Nilson, Darwin & Dolan: 624, 595 and 1,258 kip: 401 kip.
    found = bending.reciprocal_load(P_nx=624e3, P_ny=595e3, P_o=1_258e3)
    assert found / 1000 == pytest.approx(401.0, rel=0.004)


def test_trap_the_whole_axial_strength_stands_in_the_reciprocal_load() -> None:
    # Published (col-biax-cven444): 360.7 kip is printed with 0.80 P_o; with P_o itself it is 346.5 kip.
    full = bending.reciprocal_load(P_nx=620.3e3, P_ny=578.4e3, P_o=2_198.4e3)
    assert full / 1000 == pytest.approx(346.5, abs=0.05)
    assert bending.reciprocal_load(P_nx=620.3e3, P_ny=578.4e3, P_o=0.8 * 2_198.4e3) / 1000 == pytest.approx(
        360.7, abs=0.05
    )


def test_reciprocal_load_without_one_eccentricity() -> None:
    # With no eccentricity about y its strength is P_o, and what is left is the strength about x.
    assert bending.reciprocal_load(P_nx=600e3, P_ny=1_300e3, P_o=1_300e3) == pytest.approx(600e3)


def test_eccentricities_and_their_differences() -> None:
    assert bending.eccentricity_x(M_uy=1.2e6, P_u=400e3) == 3.0
    assert bending.eccentricity_y(M_ux=-2.4e6, P_u=400e3) == -6.0
    assert bending.eccentricity_difference_x(e_n=3.4, e_x=3.0, b=16.0) == pytest.approx(0.025)
    assert bending.eccentricity_difference_y(e_n=-6.0, e_y=-6.0, h=20.0) == 0.0


def test_least_axial_force_and_difference_of_the_reciprocal_load() -> None:
    # Hand: 0.1 * 4 * 320 = 128 kip; (380 - 400)/400 = -0.05.
    assert bending.reciprocal_least(f_c=4_000.0, A_g=320.0) == pytest.approx(128e3)
    assert bending.reciprocal_difference(P_n_recip=380e3, P_n=400e3) == pytest.approx(-0.05)
