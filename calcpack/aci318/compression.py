"""Development of straight bars in compression, ACI 318 25.4.9. A hook does not count in compression."""

from __future__ import annotations

from math import sqrt

from calcpack.aci318.limits import BAR_DIAMETER, CONCRETE, LIGHTWEIGHT, YIELD_100, YIELD_LEAST
from calcpack.aci318.standards import ACI_318_14, ACI_318_19
from calcpack.formula import formula, inch
from calcpack.units import Area, Length, Ratio, Stress

__all__ = ["compression", "compression_minimum", "compression_reduced"]


# Both expressions of the clause end in psi_r d_b; taken out, the line breaks where the column is full.
@formula(
    ACI_318_14("25.4.9.2"),
    ACI_318_19("25.4.9.2"),
    empirical=True,
    limits=(CONCRETE, YIELD_LEAST, YIELD_100, LIGHTWEIGHT, BAR_DIAMETER),
)
def compression(*, f_y: Stress, f_c: Stress, lamb: Ratio, psi_r: Ratio, d_b: Length) -> Length:
    """Development length in compression by the equations, before the minimum."""
    root_f_c = min(sqrt(f_c), 100.0)
    l_dc_a = max(f_y / (50 * lamb * root_f_c), 0.0003 * f_y) * psi_r * d_b
    return l_dc_a


@formula(ACI_318_14("25.4.9.1"), ACI_318_19("25.4.9.1"))
def compression_minimum(*, l_dc_a: Length) -> Length:
    """Development length in compression, not less than 8 in."""
    l_dc = max(l_dc_a, 8 * inch)
    return l_dc


@formula(ACI_318_14("25.4.10.1"), ACI_318_19("25.4.10.1"))
def compression_reduced(*, l_dc_a: Length, A_s_required: Area, A_s_provided: Area) -> Length:
    """Development length in compression, reduced for excess reinforcement, not less than 8 in."""
    l_dc = max(l_dc_a * A_s_required / A_s_provided, 8 * inch)
    return l_dc
