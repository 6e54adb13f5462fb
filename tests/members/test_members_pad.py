"""The pad of floats, results and their display units."""

from __future__ import annotations

import pytest

from calcpack import members
from calcpack.aci318.hooks import hook_minimum
from calcpack.members.pad import FloatPad, Pad
from calcpack.members.results import Requirement, measured, verdict_of


def test_float_pad_works_formulas_and_keeps_nothing() -> None:
    pad: Pad[float] = FloatPad()
    d_b = pad.given("d_b", 1.0, "nominal diameter of bar", "schedule")
    pad.reason("dropped")
    assert pad.number(pad.work(hook_minimum, l_dh_a=5.0, d_b=d_b)) == 8.0
    assert vars(pad) == {}


@pytest.mark.parametrize(
    ("ratio", "met", "verdict"),
    [
        (0.0, True, "OK"),
        (1.0, True, "OK"),
        (1.0000001, True, "NG"),
        (0.5, False, "NG"),
        (None, True, ""),
        (None, False, "NG"),
    ],
)
def test_verdict(ratio: float | None, met: bool, verdict: str) -> None:
    assert verdict_of(ratio, met) == verdict


def test_values_are_in_display_units_unrounded() -> None:
    assert measured("P_o", 1_323_200.5) == (1_323.2005, "kip")
    assert measured("l_d", 35.57562367) == (35.57562367, "in")
    assert measured("rho_g", 1 / 3) == (1 / 3, "")


def test_requirement_reads_with_its_clause() -> None:
    assert str(Requirement("25.4.2.2", "K_tr at least 0.5 d_b", met=False)) == "K_tr at least 0.5 d_b (25.4.2.2)"


def test_the_package_is_a_table_of_contents() -> None:
    assert members.__all__ == sorted(members.__all__)
    assert members.pad.FloatPad is FloatPad
    with pytest.raises(AttributeError, match=r"calcpack.members has no 'columns'; it has anchorage, column"):
        _ = members.columns
