"""Block, bars, signs, limits and phi at a given neutral axis."""

from __future__ import annotations

import numpy as np
import pytest
from mechanics_samples import L_BARS, L_SHAPE, ring, samples, tied, with_bars

from calcpack.errors import RangeError
from calcpack.mechanics import NOMINAL, Rule, Section, bar_states, circle, nominal, rule_318_14, rule_318_19
from calcpack.mechanics.block import compression_block, frame
from calcpack.mechanics.strength import Cut, cut_section

QUARTERS = np.arange(4) * np.pi / 2
SAMPLES = samples()


def test_block_of_a_rectangle_in_four_directions() -> None:
    # common practice: strips 16 x 5 in and 24 x 5 in of a section 16 x 24 in.
    area, S_x, S_y = compression_block(tied(), QUARTERS, np.full(4, 5.0))
    assert area == pytest.approx([120, 80, 120, 80])
    assert S_x == pytest.approx([120 * 5.5, 0, -120 * 5.5, 0], abs=1e-9)
    assert S_y == pytest.approx([0, 80 * 9.5, 0, -80 * 9.5], abs=1e-9)


def test_block_at_a_corner_is_a_triangle() -> None:
    # common practice: at 45 degrees a depth of 3 in cuts a triangle of sides 3 sqrt(2); its centroid is a third in.
    area, S_x, S_y = compression_block(tied(), np.array([np.pi / 4]), np.array([3.0]))
    assert area[0] == pytest.approx(9)
    assert S_x[0] == pytest.approx(9 * (8 - np.sqrt(2)))
    assert S_y[0] == pytest.approx(9 * (12 - np.sqrt(2)))


@pytest.mark.parametrize("name", SAMPLES)
def test_block_as_deep_as_the_section_is_the_section(name: str) -> None:
    section = SAMPLES[name]
    theta = np.linspace(-3, 3, 7)
    for depth in (frame(section, theta).depth, np.full(7, 1e6), np.full(7, np.inf)):
        area, S_x, S_y = compression_block(section, theta, depth)
        assert area == pytest.approx(section.A_g)
        assert np.stack([S_x, S_y]) == pytest.approx(0, abs=1e-9 * section.A_g)


def test_block_past_the_middle_of_a_circle() -> None:
    section = circle(20, ring(7, 8, 0.79), f_c=4000, f_y=60_000)
    shallow, deep = (compression_block(section, np.array([0.3]), np.array([a])) for a in (6.0, 14.0))
    assert shallow[0] + deep[0] == pytest.approx(100 * np.pi)
    assert shallow[1] == pytest.approx(deep[1])


def test_block_that_two_legs_share() -> None:
    # common practice: the channel's legs, 8 in wide, 5 in deep from the top.
    section = SAMPLES["channel"]
    area, _, S_y = compression_block(section, np.array([np.pi / 2]), np.array([5.0]))
    assert area[0] == pytest.approx(2 * 8 * 5)
    assert S_y[0] == pytest.approx(2 * 8 * 5 * (27.5 - section.centroid[1]))


@pytest.mark.parametrize(
    ("theta", "signs"),
    list(zip(QUARTERS, [(0, 1), (1, 0), (0, -1), (-1, 0)], strict=True)),
    ids=["+x", "+y", "-x", "-y"],
)
def test_positive_moments_compress_the_positive_faces(theta: float, signs: tuple[int, int]) -> None:
    section = tied()
    point, states = nominal(section, theta, 8.0), bar_states(section, theta, 8.0)
    moments = np.array([point.Mx[0], point.My[0]])
    assert np.sign(np.where(np.abs(moments) < 1, 0, moments)).tolist() == list(signs)
    compressed = states.strain[:, 0].argmax()
    position = section.x[compressed] * np.cos(theta) + section.y[compressed] * np.sin(theta)
    assert position > 0


def test_depth_h_serves_Mx() -> None:
    section = tied(b=12, h=24, n_x=2, n_y=2)
    assert nominal(section, np.pi / 2, 8.0).Mx[0] > 1.5 * nominal(section, 0.0, 8.0).My[0]


@pytest.mark.parametrize("name", SAMPLES)
def test_pure_compression_and_pure_tension(name: str) -> None:
    section = SAMPLES[name]
    point = nominal(section, np.array([0.4, 2.0]), np.array([0.0, np.inf]))
    stress = min(section.f_y, 0.003 * 29e6)
    squashed = 0.85 * section.f_c * (section.A_g - section.A_st) + stress * section.A_st
    assert pytest.approx([-section.P_nt_max, squashed]) == point.P
    assert point.eps_t.tolist() == [np.inf, -0.003]
    bars = section.A_b * section.y
    assert point.Mx == pytest.approx([-section.f_y * bars.sum(), (stress - 0.85 * section.f_c) * bars.sum()], abs=1e-3)


def test_bar_states_by_hand() -> None:
    # common practice: c = 10 in of 24 in, bars at 2.5, 8.833, 15.167 and 21.5 in; 29e6 psi, yield at 60,000 psi.
    states = bar_states(tied(), np.pi / 2, 10.0)
    order = np.argsort(states.d[:, 0])
    first, second, third, last = order[0], order[3], order[5], order[-1]
    assert states.strain[[first, second, third, last], 0] == pytest.approx(
        [0.00225, 0.00035, -0.00155, -0.00345], rel=1e-9
    )
    assert states.stress[[first, second, third, last], 0] == pytest.approx([60_000, 10_150, -44_950, -60_000])
    assert states.in_block[[first, second, third, last], 0].tolist() == [True, False, False, False]
    assert states.force[first, 0] == pytest.approx(1.27 * (60_000 - 4250))
    assert states.force[second, 0] == pytest.approx(1.27 * 10_150)


def test_a_bar_displaces_concrete_only_where_its_centre_is_inside_the_block() -> None:
    section = tied()
    c = 2.5 / section.beta_1
    before, on, after = (bar_states(section, np.pi / 2, c + move).in_block[:, 0].sum() for move in (-1e-9, 0, 1e-9))
    assert (before, on, after) == (0, 0, 3)


def test_scalars_and_arrays_give_the_same() -> None:
    section = tied()
    theta, c = np.array([0.1, 1.2, -2.0]), np.array([3.0, 9.0, 30.0])
    together = nominal(section, theta, c)
    apart = [nominal(section, one, depth) for one, depth in zip(theta, c, strict=True)]
    assert pytest.approx([point.P[0] for point in apart], rel=1e-13) == together.P
    assert together.Mx == pytest.approx([point.Mx[0] for point in apart], rel=1e-13)


@pytest.mark.parametrize(("theta", "c"), [(0.0, -1.0), (0.0, np.nan), (np.inf, 1.0)])
def test_neutral_axis_that_cannot_be(theta: float, c: float) -> None:
    with pytest.raises(RangeError, match=r"neutral axis\n.*c from 0 to infinity"):
        nominal(tied(), theta, c)


@pytest.mark.parametrize("name", SAMPLES)
def test_slopes_are_those_of_differences(name: str) -> None:
    section, step = SAMPLES[name], 1e-6
    theta, q = np.array([0.31, 1.07, 2.2, -1.3]), np.array([2.0, 1.0, -3.0, 4.0])

    def at(angle: np.ndarray, edge: np.ndarray) -> Cut:
        seen = frame(section, angle)
        return cut_section(section, seen, (seen.h - edge) / section.beta_1)

    def values(cut: Cut) -> np.ndarray:
        return np.vstack([cut.forces, 1e9 * cut.eps_t])

    here = at(theta, q)
    turned = (values(at(theta + step, q)) - values(at(theta - step, q))) / (2 * step)
    moved = (values(at(theta, q + step)) - values(at(theta, q - step))) / (2 * step)
    for slope, slope_eps, difference in zip(here.slopes, here.eps_t_slopes, (turned, moved), strict=True):
        assert np.vstack([slope, 1e9 * slope_eps]) == pytest.approx(difference, rel=1e-5, abs=2.0)


@pytest.mark.parametrize(
    ("rule", "points"),
    # published: ACI 318-14 and 318-19 Table 21.2.2, at and on both sides of each limit.
    [
        (rule_318_14(f_y=60_000, spiral=False), [(0.0, 0.65), (0.002, 0.65), (0.0035, 0.775), (0.005, 0.9), (1, 0.9)]),
        (rule_318_14(f_y=60_000, spiral=True), [(-0.003, 0.75), (0.002, 0.75), (0.0035, 0.825), (0.005, 0.9)]),
        (
            rule_318_14(f_y=80_000, spiral=False),
            [(80 / 29e3, 0.65), (0.005, 0.9), (0.00499, 0.9 - 0.25e-5 / 0.0022414)],
        ),
        (rule_318_19(f_y=60_000, spiral=False), [(60 / 29e3, 0.65), (60 / 29e3 + 0.0015, 0.775), (0.00507, 0.9)]),
        (rule_318_19(f_y=80_000, spiral=True), [(80 / 29e3, 0.75), (80 / 29e3 + 0.003, 0.9), (0.0057, 0.89707)]),
        (NOMINAL, [(-1, 1.0), (0.003, 1.0), (1, 1.0)]),
    ],
)
def test_phi_by_edition(rule: Rule, points: list[tuple[float, float]]) -> None:
    strain, expected = np.array(points).T
    assert rule.phi(strain) == pytest.approx(expected, abs=1e-5)


def test_grade_60_is_known_by_its_value() -> None:
    # published: ACI 318-14 21.2.2.1 lets eps_ty of Grade 60 be 0.002; other grades take f_y/E_s.
    for f_y in (60_000.0, 60_000.00000000001, 60_000 * (1 - 1e-15)):
        assert rule_318_14(f_y=f_y, spiral=False).eps_ty == 0.002
    for f_y in (59_999.0, 60_001.0, 60_916.0):
        assert rule_318_14(f_y=f_y, spiral=False).eps_ty == f_y / 29e6
    assert rule_318_14(f_y=60_000, spiral=False, E_s=30e6).eps_tc == 0.005
    assert rule_318_19(f_y=60_000, spiral=False, E_s=30e6).eps_tc == pytest.approx(0.005)


def test_slope_of_phi_is_zero_outside_the_transition() -> None:
    rule = rule_318_14(f_y=60_000, spiral=False)
    assert rule.slope(np.array([0.0019, 0.002, 0.003, 0.005, 0.006])) == pytest.approx([0, 0, 0.25 / 0.003, 0, 0])


def test_maximum_axial_strength_by_transverse_reinforcement() -> None:
    # published: ACI 318-19 Table 22.4.2.1
    assert rule_318_19(f_y=60_000, spiral=False).alpha == rule_318_14(f_y=60_000, spiral=False).alpha == 0.80
    assert rule_318_19(f_y=60_000, spiral=True).alpha == rule_318_14(f_y=60_000, spiral=True).alpha == 0.85


def test_phi_follows_the_extreme_bar_square_to_the_neutral_axis() -> None:
    section: Section = with_bars(L_SHAPE, L_BARS)
    theta, c = 1.1, 9.0
    square = section.x * np.cos(theta) + section.y * np.sin(theta)
    corners = np.array(L_SHAPE) - section.centroid
    d_t = (corners @ [np.cos(theta), np.sin(theta)]).max() - square.min()
    assert nominal(section, theta, c).eps_t[0] == pytest.approx(0.003 * (d_t / c - 1))
