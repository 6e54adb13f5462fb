"""Bars that continue in beams, and structural integrity, ACI 318 9.7.3 and 9.7.7: common practice, by hand."""

from __future__ import annotations

import pytest

from calcpack.aci318 import continuity
from calcpack.aci318.standards import ACI_318_14, ACI_318_19


@pytest.mark.parametrize(("d", "d_b", "expected"), [(21.5, 1.0, 21.5), (12.0, 1.0, 12.0), (11.0, 1.0, 12.0)])
def test_extension_past_a_section(d: float, d_b: float, expected: float) -> None:
    # 9.7.3.3: d or 12 d_b; the same bounds the embedment that counts at an inflection, 9.7.3.8.3.
    assert continuity.extension_past_section(d=d, d_b=d_b) == expected
    assert continuity.embedment_at_inflection(d=d, d_b=d_b) == expected


@pytest.mark.parametrize(
    ("d", "d_b", "l_n", "expected"),
    [(21.5, 1.0, 288.0, 21.5), (11.0, 1.0, 160.0, 12.0), (15.0, 1.0, 320.0, 20.0), (20.0, 1.0, 320.0, 20.0)],
)
def test_extension_of_negative_bars(d: float, d_b: float, l_n: float, expected: float) -> None:
    # 9.7.3.8.4: d, 12 d_b, or a sixteenth of the clear span.
    assert continuity.extension_of_negative_bars(d=d, d_b=d_b, l_n=l_n) == expected


def test_bars_at_a_simple_support() -> None:
    # 9.7.3.8.3: 200 kip*ft over 80 kip = 30 in, with 6 in past the centre of support: 36 in; 1.3 times: 45 in.
    ends = {"M_n": 200.0 * 12_000, "V_u": 80_000.0, "l_a": 6.0}
    assert continuity.development_maximum_at_support(**ends) == pytest.approx(36.0)
    assert continuity.development_maximum_confined(**ends) == pytest.approx(45.0)
    # The embedment is not increased.
    assert continuity.development_maximum_confined(**{**ends, "l_a": 0.0}) == pytest.approx(39.0)


def test_shares_that_run_on() -> None:
    # 9.7.3.8.1: a third into a simple support; .2: a quarter into others; .4: a third past the inflection.
    assert continuity.positive_area_into_simple_support(A_s_pos=3.0) == pytest.approx(1.0)
    assert continuity.positive_area_into_support(A_s_pos=3.0) == pytest.approx(0.75)
    assert continuity.negative_area_past_inflection(A_s_neg=6.0) == pytest.approx(2.0)
    assert continuity.embedment_into_support() == 6.0


def test_structural_integrity() -> None:
    # 9.7.7.1: a quarter of the positive, a sixth of the negative bars of perimeter beams, two bars at least.
    assert continuity.integrity_positive(A_s_pos=4.0) == pytest.approx(1.0)
    assert continuity.integrity_negative(A_s_neg=6.0) == pytest.approx(1.0)
    assert continuity.integrity_bars() == 2.0


@pytest.mark.parametrize("standard", [ACI_318_14, ACI_318_19])
def test_beams_inside_cite_their_own_clause(standard: object) -> None:
    inside = continuity.integrity_positive_inside
    assert inside(A_s_pos=4.0) == pytest.approx(1.0)
    assert {clause.number for clause in inside.clauses if clause.standard == standard} == {"9.7.7.2(a)"}
