"""Bundled bars. Expected numbers are worked by hand; the clauses, ACI 318 25.6.1, are common practice."""

from __future__ import annotations

import math
from collections.abc import Callable

import pytest
from hypothesis import given
from hypothesis import strategies as st

from calcpack.aci318 import bundles, development
from calcpack.aci318.bars import BARS
from calcpack.errors import RangeError

GENERAL = {
    "f_y": 60_000.0, "f_c": 4_000.0, "lamb": 1.0, "psi_t": 1.0, "psi_e": 1.0, "psi_s": 1.0, "c_b": 3.0, "K_tr": 0.5,
    "d_b": 1.0,
}  # fmt: skip


@pytest.mark.parametrize(("n", "factor"), [(1, 1.0), (2, 1.0), (3, 1.2), (4, 1.33)])
def test_increase_of_a_bundle(n: int, factor: float) -> None:
    # 25.6.1.5: none for two bars, 20 per cent for three, 33 per cent for four.
    assert bundles.bundle_factor(n_bundle=float(n)) == factor


@pytest.mark.parametrize("n", [0.0, 2.5, 5.0])
def test_a_bundle_holds_one_to_four_bars(n: float) -> None:
    with pytest.raises(RangeError, match=r"n_bundle = .*one of 1, 2, 3, 4.*25.6.1.1"):
        bundles.bundle_factor(n_bundle=n)
    with pytest.raises(RangeError, match=r"25.6.1.1"):
        bundles.equivalent_diameter(A_b=0.79, n_bundle=n)


@pytest.mark.parametrize(
    ("A_b", "n", "expected"),
    [
        # sqrt(4*3*0.79/pi) = sqrt(3.017578)
        (0.79, 3, 1.737118),
        # sqrt(4*4*1.00/pi) = 4/sqrt(pi)
        (1.00, 4, 2.256758),
        # sqrt(4*2*1.56/pi) = sqrt(3.972507)
        (1.56, 2, 1.993115),
    ],
)
def test_equivalent_diameter(A_b: float, n: int, expected: float) -> None:
    assert bundles.equivalent_diameter(A_b=A_b, n_bundle=float(n)) == pytest.approx(expected, rel=1e-6)


@given(size=st.sampled_from(list(BARS)), n=st.integers(1, 4))
def test_the_bundle_has_the_area_of_its_bars(size: int, n: int) -> None:
    d_be = bundles.equivalent_diameter(A_b=BARS[size].A_b, n_bundle=float(n))
    assert math.pi / 4 * d_be**2 == pytest.approx(n * BARS[size].A_b)


def test_confinement_goes_by_the_bundle_and_length_by_the_bar() -> None:
    # 3/40*60000/sqrt(4000)/((3.0+0.5)/1.75)*1.0 = 71.151247/2.0
    assert bundles.general_tension_of_bundle_14(**GENERAL, d_be=1.75) == pytest.approx(35.575624, rel=1e-6)
    assert bundles.general_tension_of_bundle_19(**GENERAL, psi_g=1.15, d_be=1.75) == pytest.approx(1.15 * 35.575624)


def test_caps_hold_for_bundles_too() -> None:
    # psi_t psi_e at 1.7; confinement 3.5/1.0 counted as 2.5; root of strength at 100 psi: 0.075*600*1.7/2.5.
    top = {**GENERAL, "psi_t": 1.3, "psi_e": 1.5, "f_c": 14_000.0}
    assert bundles.general_tension_of_bundle_14(**top, d_be=1.0) == pytest.approx(30.6)


@given(d_be=st.floats(1.0, 3.0))
def test_a_bundle_of_one_bar_is_the_bar(d_be: float) -> None:
    alone = development.straight_tension_14(**{**GENERAL, "c_b": 3.0 / d_be, "K_tr": 0.5 / d_be})
    assert bundles.general_tension_of_bundle_14(**GENERAL, d_be=d_be) == pytest.approx(alone)


@pytest.mark.parametrize(
    ("c_c", "s_clear", "psi_e"), [(6.0, 12.0, 1.2), (5.9, 12.0, 1.5), (6.0, 11.9, 1.5), (9.0, 20.0, 1.2)]
)
def test_coating_by_the_equivalent_diameter(c_c: float, s_clear: float, psi_e: float) -> None:
    # 3 d_be = 6 in of cover, 6 d_be = 12 in between bundles.
    assert bundles.coated_bundle(c_c=c_c, s_clear=s_clear, d_be=2.0) == psi_e


@pytest.mark.parametrize(("c_b", "psi_e"), [(7.0, 1.2), (6.9, 1.5)])
def test_coating_by_c_b(c_b: float, psi_e: float) -> None:
    assert bundles.coated_bundle_by_c_b(c_b=c_b, d_be=2.0) == psi_e


INCREASED: list[tuple[Callable[..., float], dict[str, float], float]] = [
    # 1.2*30
    (bundles.bundled_tension, {"l_d_a": 30.0}, 36.0),
    # the single bar needs 12 in: 1.2*12
    (bundles.bundled_tension, {"l_d_a": 8.0}, 14.4),
    (bundles.bundled_tension, {"l_d_a": 12.0}, 14.4),
    # 1.2*30*0.75
    (bundles.bundled_tension_reduced, {"l_d_a": 30.0, "A_s_required": 3.0, "A_s_provided": 4.0}, 27.0),
    # 1.2*max(14*0.75, 12)
    (bundles.bundled_tension_reduced, {"l_d_a": 14.0, "A_s_required": 3.0, "A_s_provided": 4.0}, 14.4),
    # 1.2*20, 1.2*8
    (bundles.bundled_compression, {"l_dc_a": 20.0}, 24.0),
    (bundles.bundled_compression, {"l_dc_a": 7.0}, 9.6),
    (bundles.bundled_compression_reduced, {"l_dc_a": 20.0, "A_s_required": 3.0, "A_s_provided": 4.0}, 18.0),
    (bundles.bundled_compression_reduced, {"l_dc_a": 9.0, "A_s_required": 3.0, "A_s_provided": 4.0}, 9.6),
    # 1.2*30, 1.2*1.3*30; the minimum of the single bar once: 1.2*12
    (bundles.bundled_lap_class_a, {"l_d_a": 30.0}, 36.0),
    (bundles.bundled_lap_class_a, {"l_d_a": 9.0}, 14.4),
    (bundles.bundled_lap_class_b, {"l_d_a": 30.0}, 46.8),
    (bundles.bundled_lap_class_b, {"l_d_a": 9.0}, 14.4),
    # 1.2*30; 1.2*0.83*30; 1.2*0.75*30
    (bundles.bundled_lap_compression, {"l_sc_a": 30.0}, 36.0),
    (bundles.bundled_lap_in_ties, {"l_sc_a": 30.0}, 29.88),
    (bundles.bundled_lap_in_ties, {"l_sc_a": 13.0}, 14.4),
    (bundles.bundled_lap_in_spiral, {"l_sc_a": 30.0}, 27.0),
    (bundles.bundled_lap_in_spiral, {"l_sc_a": 13.0}, 14.4),
]


@pytest.mark.parametrize(("formula", "arguments", "expected"), INCREASED)
def test_the_length_of_the_single_bar_is_increased(
    formula: Callable[..., float], arguments: dict[str, float], expected: float
) -> None:
    assert formula(**arguments, k_bundle=1.2) == pytest.approx(expected)
