"""Load points against the design surface: both ratios, the neutral axis, the cut, and loads on the axes."""

from __future__ import annotations

import numpy as np
import pytest
from mechanics_samples import around, random_loads, samples, surface, tied

from calcpack.errors import RangeError
from calcpack.mechanics import NOMINAL, Checked, Section, Surface, nominal, polygon, rectangle, rule_318_14, rule_318_19
from calcpack.mechanics.bracketing import bracketed
from calcpack.mechanics.search import newton
from calcpack.mechanics.targets import Rays, scale_of

SAMPLES = samples()
SYMMETRIC = ["rectangle", "square", "wide, Grade 80", "Grade 100", "circle", "hollow"]


def resultants(section: Section, checked: Checked, which: np.ndarray) -> np.ndarray:
    """Design strength at the reported neutral axes, from the strength module alone."""
    point = nominal(section, checked.theta[which], checked.c[which])
    return checked.phi[which] * np.stack([point.P, point.Mx, point.My])


@pytest.mark.parametrize("name", SAMPLES)
def test_load_over_ratio_is_the_design_strength_at_the_neutral_axis(name: str) -> None:
    section = SAMPLES[name]
    loads = random_loads(section, 150, seed=3)
    checked = surface(section).check(*loads)
    which = np.flatnonzero(~checked.capped)
    strength, scale = resultants(section, checked, which), scale_of(section)
    assert which.size > 75
    assert strength / scale == pytest.approx(loads[:, which] / checked.ratio[which] / scale, abs=1e-9)


@pytest.mark.parametrize("name", SAMPLES)
def test_where_the_cut_governs_the_ratio_is_that_of_axial_force(name: str) -> None:
    section = SAMPLES[name]
    design = surface(section)
    P, Mx, My = random_loads(section, 150, seed=4)
    checked = design.check(P, Mx / 30, My / 30)
    assert checked.capped.sum() > 10
    assert checked.ratio[checked.capped] == pytest.approx(P[checked.capped] / design.phi_P_n_max, rel=1e-14)
    assert (checked.ratio >= P / design.phi_P_n_max).all()


@pytest.mark.parametrize("name", SAMPLES)
def test_both_ratios_agree_at_one(name: str) -> None:
    section = SAMPLES[name]
    design = surface(section)
    loads = random_loads(section, 150, seed=5)
    checked = design.check(*loads)
    on = ~checked.capped
    again = design.moment_ratio(*(loads / checked.ratio)[:, on])
    # Bars at one face leave no axial tension strength to speak of: P alone exceeds it, though with a moment it holds.
    again = again[~np.isnan(again)]
    # A bar that enters the block, or phi that rises, may leave a notch: then the moment ratio is on the safe side.
    equal = np.abs(again - 1) < 1e-8
    assert again.size > 75
    assert equal.mean() > 0.95
    assert again.min() > 1 - 1e-8


def test_ratio_scales_with_the_load() -> None:
    section = tied()
    loads = random_loads(section, 60, seed=6)
    design = surface(section)
    assert design.check(*(3 * loads)).ratio == pytest.approx(3 * design.check(*loads).ratio, rel=1e-9)


def test_a_load_has_the_same_answer_alone_and_among_others() -> None:
    section = SAMPLES["L"]
    loads = random_loads(section, 40, seed=7)
    design = surface(section)
    together, ratios = design.check(*loads), design.moment_ratio(*loads)
    for place in range(0, 40, 5):
        alone = surface(section).check(*loads[:, place])
        assert alone.ratio[0] == pytest.approx(together.ratio[place], rel=1e-9)
        assert surface(section).moment_ratio(*loads[:, place])[0] == pytest.approx(ratios[place], rel=1e-8, nan_ok=True)


def test_more_loads_than_are_worked_at_once() -> None:
    section = tied()
    loads = np.tile(random_loads(section, 3, seed=8), 400)
    checked = surface(section).check(*loads)
    assert checked.ratio.size == 1200
    assert checked.ratio.reshape(400, 3) == pytest.approx(np.tile(checked.ratio[:3], (400, 1)), rel=1e-9)
    assert checked.governing == int(checked.ratio.argmax())


def test_no_loads() -> None:
    checked = surface(tied()).check([], [], [])
    assert checked.ratio.size == 0
    assert surface(tied()).moment_ratio([], [], []).size == 0


def test_no_force_at_all() -> None:
    checked = surface(tied()).check(0, 0, 0)
    assert checked.ratio.tolist() == [0]
    assert not checked.capped[0]
    assert surface(tied()).moment_ratio(0, 0, 0).tolist() == [0]


@pytest.mark.parametrize("name", SYMMETRIC)
def test_pure_compression(name: str) -> None:
    section = SAMPLES[name]
    design = surface(section)
    checked = design.check(design.phi_P_n_max, 0, 0)
    assert checked.ratio[0] == pytest.approx(1, rel=1e-14)
    assert checked.capped[0]
    assert (checked.c[0], checked.eps_t[0], checked.phi[0]) == (np.inf, -0.003, 0.65)
    assert np.isnan(checked.theta[0])
    assert design.moment_ratio(design.phi_P_n_max, 0, 0).tolist() == [0]


@pytest.mark.parametrize("name", SYMMETRIC)
def test_pure_tension(name: str) -> None:
    section = SAMPLES[name]
    design = surface(section)
    checked = design.check(-0.9 * section.P_nt_max, 0, 0)
    assert checked.ratio[0] == pytest.approx(1, rel=1e-12)
    assert (checked.c[0], checked.eps_t[0], checked.phi[0]) == (0, np.inf, 0.9)
    assert design.axial_limits == pytest.approx((-0.9 * section.P_nt_max, design.phi_P_n_max))


@pytest.mark.parametrize("name", ["L", "channel", "tee", "bars at one face"])
def test_axial_force_on_an_unsymmetric_section(name: str) -> None:
    section = SAMPLES[name]
    checked = surface(section).check([-1e5, 1e5], 0, 0)
    tension = resultants(section, checked, np.array([0]))
    # Bars off the centroid: axial tension needs concrete in compression to balance their moment, and is weaker.
    assert tension / scale_of(section) == pytest.approx(
        np.array([[-1e5 / checked.ratio[0]], [0], [0]]) / scale_of(section), abs=1e-9
    )
    assert 1e5 / checked.ratio[0] < 0.9 * section.P_nt_max
    assert 0 < checked.c[0] < np.inf


def test_pure_bending_by_hand() -> None:
    # common practice: 12 x 20 in, three No. 9 at 2.5 in from the tension face; a = A_s f_y/(0.85 f'c b) = 4.412 in.
    section = SAMPLES["bars at one face"]
    a = 3 * 60_000 / (0.85 * 4000 * 12)
    moment = 0.9 * 3 * 60_000 * (17.5 - a / 2)
    checked = surface(section).check(0, moment, 0)
    assert checked.ratio[0] == pytest.approx(1, rel=1e-9)
    assert checked.c[0] == pytest.approx(a / 0.85, rel=1e-9)
    assert checked.theta[0] == pytest.approx(np.pi / 2, abs=1e-12)
    assert checked.phi[0] == 0.9
    assert surface(section).moment_ratio(0, moment, 0)[0] == pytest.approx(1, rel=1e-8)


@pytest.mark.parametrize("name", SYMMETRIC)
def test_uniaxial_bending_keeps_the_neutral_axis_square(name: str) -> None:
    section = SAMPLES[name]
    moments = np.array([1.0, -1.0, 0.0, 0.0]) * section.P_o, np.array([0.0, 0.0, 1.0, -1.0]) * section.P_o
    for P in (-0.4 * section.P_nt_max, 0.0, 0.2 * section.P_o):
        checked = surface(section).check(P, *moments)
        turn = np.mod(checked.theta - np.pi * np.array([0.5, 1.5, 0.0, 1.0]) + 1, 2 * np.pi) - 1
        assert turn == pytest.approx(0, abs=1e-6)
        assert checked.ratio[:2] == pytest.approx(checked.ratio[0], rel=1e-9)
        assert checked.ratio[2:] == pytest.approx(checked.ratio[2], rel=1e-9)


def test_loads_almost_on_an_axis_are_those_on_it() -> None:
    section = tied()
    design = surface(section)
    P = np.array([-0.5 * section.P_nt_max, 0.0, 0.3 * section.P_o])
    for tilt in (1e-12, 1e-9, 1e-6):
        on, off = design.check(P, 1e6, 0), design.check(P, 1e6, 1e6 * tilt)
        assert off.ratio == pytest.approx(on.ratio, rel=10 * tilt + 1e-9)


def test_moment_ratio_is_nothing_where_axial_force_alone_exceeds() -> None:
    section = tied()
    design = surface(section)
    least, most = design.axial_limits
    P = np.array([least * 1.001, least, least * 0.999, most * 0.999, most, most * 1.001])
    assert np.isnan(design.moment_ratio(P, 1e5, 1e5)).tolist() == [True, True, False, False, False, True]
    assert np.isnan(design.moment_ratio(P, 0, 0)).tolist() == [True, False, False, False, False, True]


def test_moment_ratio_just_within_the_tension_strength() -> None:
    # The contour there is nearly a point, and bars off the centroid put it beside the axis.
    section = rectangle(16, 24, [(3, 2, 1.56)], f_c=5000, f_y=100_000)
    design = surface(section)
    P = design.axial_limits[0] * 0.997
    ratio = design.moment_ratio(P, 1e4, 2e4)[0]
    assert design.check(P, 1e4 / ratio, 2e4 / ratio).ratio[0] == pytest.approx(1, abs=1e-7)


def test_notch_where_phi_rises_faster_than_the_axial_strength_falls() -> None:
    section = SAMPLES["L"]
    design = surface(section)
    assert design._table.folds
    loads = random_loads(section, 400, seed=9)
    checked = design.check(*loads)
    on = loads / checked.ratio
    ratios = design.moment_ratio(*on)
    beyond = np.flatnonzero(~checked.capped & (ratios > 1.01))
    # On the surface, and yet past a smaller moment at which the same axial force is outside.
    assert beyond.size > 0
    for place in beyond[:3]:
        P, Mx, My = on[:, place]
        inner = np.array([Mx, My]) / ratios[place]
        inside, outside = (design.check(P, *(inner * share)).ratio[0] for share in (1 - 1e-6, 1 + 1e-4))
        assert inside <= 1 < outside


def test_compression_and_tension_limits_follow_the_edition() -> None:
    section = tied()
    for rule, phi, alpha in (
        (rule_318_14(f_y=60_000, spiral=False), 0.65, 0.80),
        (rule_318_19(f_y=60_000, spiral=True), 0.75, 0.85),
        (NOMINAL, 1.0, 1.0),
    ):
        assert Surface(section, rule).phi_P_n_max == pytest.approx(phi * alpha * section.P_o)


def test_an_edition_matters_only_in_the_transition() -> None:
    section = tied(f_y=80_000)
    loads = random_loads(section, 200, seed=10)
    old = Surface(section, rule_318_14(f_y=80_000, spiral=False)).check(*loads)
    new = Surface(section, rule_318_19(f_y=80_000, spiral=False)).check(*loads)
    between = (old.eps_t > 80 / 29e3 + 1e-9) & (old.eps_t < 80 / 29e3 + 0.003 - 1e-9) & ~old.capped
    assert (old.ratio[between] < new.ratio[between]).mean() > 0.95
    assert old.ratio[~between] == pytest.approx(new.ratio[~between], rel=1e-8)


def test_forces_that_are_not_numbers_are_all_named() -> None:
    with pytest.raises(RangeError, match="forces\n") as caught:
        surface(tied()).check([1.0, np.nan, 2.0], [0.0, np.inf, 0.0], [0.0, 0.0, -np.inf])
    assert [problem.given for problem in caught.value.problems] == ["P[1] = nan", "Mx[1] = inf", "My[2] = -inf"]
    with pytest.raises(RangeError, match=r"My\[0\] = nan +a finite number: correct the force"):
        surface(tied()).moment_ratio(0, 0, np.nan)


def test_contour_and_meridian_lie_on_the_surface() -> None:
    section = SAMPLES["tee"]
    design = surface(section)
    P = 0.2 * section.P_o
    Mx, My = design.contour(P, np.linspace(0, 2 * np.pi, 24, endpoint=False))
    ratio = design.check(P, Mx, My).ratio
    assert (np.abs(ratio - 1) < 1e-8).mean() > 0.9
    axial, moment = design.meridian(3.0, 4.0, 45)
    assert design.check(axial, 0.6 * moment, 0.8 * moment).ratio == pytest.approx(1, rel=1e-8)
    assert (axial[0], axial[-1]) == pytest.approx(design.axial_limits)
    assert axial.max() == pytest.approx(design.phi_P_n_max)


def test_contour_is_nothing_where_axial_force_alone_exceeds() -> None:
    Mx, My = surface(tied()).contour(1e7, [0.0, 1.0])
    assert np.isnan(Mx).all()
    assert np.isnan(My).all()


def test_contour_directions() -> None:
    Mx, My = surface(tied()).contour(1e5, [0.0, np.pi / 2])
    assert My[0] > 0
    assert Mx[1] > My[0]
    assert (Mx[0], My[1]) == pytest.approx((0, 0), abs=1e-6)


@pytest.mark.parametrize("moments", [(0.0, 0.0), (np.nan, 1.0)])
def test_meridian_needs_a_moment(moments: tuple[float, float]) -> None:
    with pytest.raises(RangeError, match=r"meridian\n.*a moment: say in which plane to look"):
        surface(tied()).meridian(*moments)


def test_bracketing_finds_what_newton_finds() -> None:
    section = SAMPLES["channel"]
    design = surface(section)
    loads = random_loads(section, 20, seed=12)
    along = loads / scale_of(section)
    along /= np.linalg.norm(along, axis=0)
    rays = Rays.through(design.rule, design._scale, design._poles, along)
    every = np.arange(20)
    start = design._table.nearest_to_rays(along)
    quick = newton(section, rays, every, design._table.theta[start], design._table.c[start])
    slow = bracketed(section, rays, every)
    assert slow.holds.all()
    both = quick.holds
    assert both.sum() > 15
    assert slow.strength[both] == pytest.approx(quick.strength[both], rel=5e-3)
    assert np.median(np.abs(slow.strength[both] / quick.strength[both] - 1)) < 1e-9


def test_a_bar_on_the_edge_of_the_block_counts_on_its_weaker_side() -> None:
    section = tied(20, 20, 3, 3, 1.27)
    depths = np.linspace(2.5, 17.5, 61) / section.beta_1
    for theta in (np.pi / 2, np.pi / 4, 0.3):
        for side in (1 - 1e-7, 1 + 1e-7):
            point = nominal(section, np.full(61, theta), depths * side)
            ratio = Surface(section, NOMINAL).check(point.P, point.Mx, point.My).ratio
            assert (ratio > 1 - 1e-9).all()
            assert (ratio < 1.02).all()


def test_a_section_of_many_sides() -> None:
    angles = np.arange(24) * np.pi / 12
    outline = np.column_stack([12 * np.cos(angles), 12 * np.sin(angles)])
    section = polygon(outline, around(14, 14, 3, 3, 1.0), f_c=4000, f_y=60_000)
    loads = random_loads(section, 50, seed=13)
    checked = surface(section).check(*loads)
    which = np.flatnonzero(~checked.capped)
    scale = scale_of(section)
    assert resultants(section, checked, which) / scale == pytest.approx(
        loads[:, which] / checked.ratio[which] / scale, abs=1e-9
    )


def test_a_row_of_the_schedule_with_its_forces() -> None:
    # common practice: 18 x 24 in, eight No. 9, No. 3 ties, 1.5 in cover: bars at 1.5 + 0.375 + 0.564 from the faces.
    section = rectangle(18, 24, around(18, 24, 3, 3, 1.0, 2.439), f_c=4000, f_y=60_000, d_b=1.128)
    design = Surface(section, rule_318_19(f_y=60_000, spiral=False))
    P, Mx, My = np.array([[300e3, 1.2e6, 0.6e6], [900e3, 0.2e6, 0.1e6], [100e3, 4.4e6, 2.2e6]]).T
    checked = design.check(P, Mx, My)
    worst = checked.governing
    assert design.P_o == pytest.approx(0.85 * 4000 * (432 - 8) + 60_000 * 8)
    assert design.phi_P_n_max == pytest.approx(0.65 * 0.80 * design.P_o)
    assert checked.capped.tolist() == [False, True, False]
    assert checked.ratio[1] == pytest.approx(900e3 / design.phi_P_n_max)
    assert worst == 2
    assert checked.ratio[worst] == checked.ratio.max()
    # Along the ray and at constant P the verdict is the same.
    moment_ratio = design.moment_ratio(P, Mx, My)
    assert ((moment_ratio <= 1) == (checked.ratio <= 1)).all()


def test_the_first_of_equal_ratios_governs() -> None:
    assert surface(tied()).check([1e5, 2e5, 2e5], 1e6, 0).governing in (0, 1)
    assert surface(tied()).check([2e5, 2e5], [1e6, -1e6], 0).ratio == pytest.approx(
        surface(tied()).check(2e5, 1e6, 0).ratio[0]
    )
    assert surface(tied()).check([2e5, 2e5], 1e6, 0).governing == 0


def test_a_load_that_no_neutral_axis_balances_is_refused() -> None:
    # One bar whose centre lies 0.02 in from a side of a channel: no couple in every direction.
    outline = [(0, 0), (40, 0), (40, 30), (32, 30), (32, 8), (8, 8), (8, 30), (0, 30)]
    section = polygon(outline, [(38.0, 0.0183, 1.27)], f_c=3000, f_y=80_000)
    with pytest.raises(
        RangeError, match=r"no neutral axis found\n.*P = 0 lb, Mx = -39760, My = 10650 lb\*in .*check the bars"
    ):
        surface(section).check(0, -39_760, 10_650)


@pytest.mark.parametrize("name", SAMPLES)
def test_strengths_on_the_axes_have_the_order_of_the_section(name: str) -> None:
    section = SAMPLES[name]
    least, most = surface(section).axial_limits
    assert least < 0 < most <= surface(section).phi_P_n_max
    assert -least <= 0.9 * section.P_nt_max * (1 + 1e-12)


def test_spirals_are_stronger_than_ties() -> None:
    section = SAMPLES["circle"]
    loads = random_loads(section, 80, seed=14)
    tied_ratio, spiral_ratio = (surface(section, spiral).check(*loads).ratio for spiral in (False, True))
    assert (spiral_ratio <= tied_ratio * (1 + 1e-9)).all()
    assert (spiral_ratio < tied_ratio * (1 - 1e-3)).sum() > 20
