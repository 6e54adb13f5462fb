"""Ranges that clauses set for the arguments of several formulas."""

from __future__ import annotations

from calcpack.aci318.bars import BARS, NO_11
from calcpack.formula import Limit

__all__ = [
    "BAR_DIAMETER",
    "BAR_DIAMETER_TO_NO_11",
    "CONCRETE",
    "LIGHTWEIGHT",
    "YIELD_60",
    "YIELD_80",
    "YIELD_100",
    "YIELD_LEAST",
]

CONCRETE = Limit("f_c", "ACI 318-14 and 318-19 Table 19.2.1.1", low=2500)
LIGHTWEIGHT = Limit("lamb", "ACI 318-14 and 318-19 19.2.4", low=0.75, high=1.0)
YIELD_LEAST = Limit("f_y", "ASTM A615, lowest grade", low=40_000)
YIELD_60 = Limit("f_y", "ACI 318-14 25.4.4.1", high=60_000)
YIELD_80 = Limit("f_y", "ACI 318-14 Table 20.2.2.4a", high=80_000)
YIELD_100 = Limit("f_y", "ACI 318-19 Table 20.2.2.4a", high=100_000)
_DIAMETERS = tuple(bar.d_b for bar in BARS.values())
BAR_DIAMETER = Limit("d_b", "ASTM A615, No. 3 to No. 18", values=_DIAMETERS)
BAR_DIAMETER_TO_NO_11 = Limit(
    "d_b", "No. 11 and smaller, ACI 318", values=tuple(d_b for d_b in _DIAMETERS if d_b <= NO_11.d_b)
)
