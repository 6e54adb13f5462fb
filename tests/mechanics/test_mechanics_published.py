"""Columns recomputed by others under axial force and bending; numbers that sources print stand in tests/published."""

from __future__ import annotations

import numpy as np
import pytest
from mechanics_samples import around, ring, tied

from calcpack.mechanics import (
    NOMINAL,
    Section,
    Surface,
    circle,
    nominal,
    rectangle,
    rule_318_14,
    rule_318_19,
)
from calcpack.mechanics.block import compression_block

KIP, KIP_FT = 1e3, 12e3
ALONG_Y = np.pi / 2


def two_faces(b: float, h: float, area: float, f_c: float, f_y: float) -> Section:
    """Bars in the two faces square to the bending, 2.5 in to their centres; `area` of each face in two bars."""
    bars = [(x, y, area / 2) for x in (-b / 4, b / 4) for y in (2.5 - h / 2, h / 2 - 2.5)]
    return rectangle(b, h, bars, f_c=f_c, f_y=f_y)


def at_depth(section: Section, c: float) -> tuple[float, float]:
    point = nominal(section, ALONG_Y, c)
    return float(point.P[0]), float(point.Mx[0])


def depth_at(section: Section, eps_t: float) -> float:
    d = section.extent[1] / 2 - section.y.min()
    return float(0.003 / (0.003 + eps_t) * d)


def _axis(a: float) -> tuple[np.ndarray, np.ndarray]:
    return np.array([ALONG_Y]), np.array([a])


def test_displaced_concrete_of_the_hicks_column_is_deducted_by_default() -> None:
    # common practice: the note to the case of Hicks, recomputed without the package: 271.1 kip and 2246 kip-in.
    section = two_faces(12, 18, 2.0, 3000, 40_000)
    P, M = at_depth(section, depth_at(section, 40_000 / 29e6))
    assert pytest.approx(271.1, abs=0.05) == P / KIP
    assert pytest.approx(2246, abs=0.5) == M / KIP


def test_displaced_concrete_of_the_nilson_column_is_deducted_by_default() -> None:
    # common practice: the note to the case of Nilson, recomputed without the package.
    section = two_faces(12, 20, 2.0, 4000, 60_000)
    P_b, M_b = at_depth(section, depth_at(section, 60_000 / 29e6))
    P_5, M_5 = at_depth(section, 5.0)
    assert (P_b / KIP, M_b / KIP_FT) == pytest.approx((352.4, 313.3), abs=0.05)
    assert pytest.approx((133.6, 238.9), abs=0.05) == (P_5 / KIP, M_5 / KIP_FT)
    assert pytest.approx(1042.4, abs=0.05) == section.P_o / KIP


def test_round_column_at_the_balanced_point() -> None:
    # common practice: the note to the round column, recomputed at c = 7.75 in: 265.4 kip in the concrete, 229.3, 2416.
    section = circle(16, ring(5.5, 8, 1.0, np.pi / 8), f_c=4000, f_y=60_000)
    area = compression_block(section, *_axis(0.85 * 7.75))[0][0]
    P, M = at_depth(section, 7.75)
    assert 0.85 * 4 * area == pytest.approx(265.4, abs=0.05)
    assert pytest.approx(229.3, abs=0.05) == P / KIP
    assert pytest.approx(2416, abs=0.5) == M / KIP


def test_half_a_circle() -> None:
    # published: elementary geometry, area pi D^2/8 and centroid 4 R/(3 pi) from the centre.
    section = circle(20, ring(7, 8, 0.79), f_c=4000, f_y=60_000)
    area, S_x, S_y = compression_block(section, *_axis(10.0))
    assert area[0] == pytest.approx(157.08, rel=1e-4)
    assert S_y[0] / area[0] == pytest.approx(4.2441, rel=1e-4)
    assert S_x[0] == pytest.approx(0, abs=1e-10)


def test_phi_in_the_transition() -> None:
    # common practice: ACI 318-14 and 318-19 Table 21.2.2 at a strain of 0.004, Grade 60.
    strain = np.array(0.004)
    assert rule_318_14(f_y=60_000, spiral=False).phi(strain) == pytest.approx(0.8167, abs=5e-5)
    assert rule_318_14(f_y=60_000, spiral=True).phi(strain) == pytest.approx(0.85, abs=5e-5)
    assert rule_318_19(f_y=60_000, spiral=False).phi(strain) == pytest.approx(0.8109, abs=5e-5)


def test_biaxial_column_near_its_reciprocal_load() -> None:
    # common practice: the note to the biaxial case of Nilson, strain compatibility at 2.5 in: 643, 626 and 1268.8 kip.
    section = tied(12, 20, 3, 3, 1.0, f_c=4000)
    load = np.full(3, 1e5)
    strengths = load / Surface(section, NOMINAL).check(load, load * [6, 0, 6], load * [0, 3, 3]).ratio / KIP
    assert strengths[:2] == pytest.approx([626, 643], abs=0.5)  # 6 in along y, 3 in along x
    assert section.P_o / KIP == pytest.approx(1268.8, abs=0.05)
    # from memory: Bresler (1960) found his reciprocal load within 9.4 % of tests and theory.
    assert strengths[2] == pytest.approx(1 / (1 / 643 + 1 / 626 - 1 / 1268.8), rel=0.094)


def test_uniaxial_strengths_behind_a_biaxial_handout() -> None:
    # common practice: the note to the handout CVEN 444, strain compatibility at 2.5 in, eight bars 3 by 3 replaced by
    # two bars of 1.27 in^2 a face: 619.7 and 574.4 kip.
    along_y = rectangle(16, 24, [(x, y, 1.27) for x in (-5.5, 5.5) for y in (-9.5, 9.5)], f_c=5000, f_y=60_000)
    nominal_surface = Surface(along_y, NOMINAL)
    strengths = 1e5 / nominal_surface.check([1e5, 1e5], [12e5, 0], [0, 8e5]).ratio / KIP
    assert len(around(16, 24, 2, 2, 1.27)) == along_y.x.size
    assert sorted(strengths) == pytest.approx([574.4, 619.7], abs=0.05)
