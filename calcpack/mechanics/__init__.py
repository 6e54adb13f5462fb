"""Strength of reinforced sections: geometry, stress block, strain compatibility, interaction surface.

Floats in inch, pound and psi; no units, no printing. `Section` holds the geometry, `Rule` what an edition says of phi
and of the maximum axial strength, and `Surface` answers for load points.
"""

from __future__ import annotations

from calcpack.mechanics.reduction import NOMINAL, Rule, rule_318_14, rule_318_19
from calcpack.mechanics.section import Section, circle, polygon, rectangle
from calcpack.mechanics.strength import BarStates, Nominal, bar_states, nominal
from calcpack.mechanics.surface import Checked, Surface

__all__ = [
    "NOMINAL",
    "BarStates",
    "Checked",
    "Nominal",
    "Rule",
    "Section",
    "Surface",
    "bar_states",
    "circle",
    "nominal",
    "polygon",
    "rectangle",
    "rule_318_14",
    "rule_318_19",
]
