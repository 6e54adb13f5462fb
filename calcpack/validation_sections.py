"""Published sections under axial force and bending, worked by the functions that serve a package.

A case says how its bars stand and whether its source deducts the concrete that bars displace; where it does not, that
concrete is put back before the numbers are compared.
"""

from __future__ import annotations

from collections.abc import Callable, Mapping
from math import cos, pi, radians, sin
from typing import TYPE_CHECKING, Any

if TYPE_CHECKING:
    from calcpack.mechanics import Section

__all__ = ["section_value"]

_KIP, _KIP_FT = 1e3, 12e3
_ALONG_Y = pi / 2
_FACES = 2


def section_value(inputs: Mapping[str, Any], quantity: str) -> float:
    """A quantity such as ``P_n at e = 6 in``, in the unit its source prints: kip, kip ft, kip in, in."""
    given = inputs["section"]
    worked = _Worked(_section(given), bool(given["deducted"]))
    return worked.quantities()[quantity.split(" = ")[0]](inputs)


def _section(given: Mapping[str, Any]) -> Section:
    """A circle with bars on a circle, or a rectangle with bars in the two faces square to the bending."""
    from calcpack.mechanics import circle, rectangle

    materials = {"f_c": given["f_c"], "f_y": given["f_y"]}
    area = given["A_b"]
    if given["layout"] == "circle":
        radius, count = given["radius"], given["n"]
        turns = [radians(given["first"]) + 2 * pi * number / count for number in range(count)]
        return circle(given["h"], [(radius * cos(turn), radius * sin(turn), area) for turn in turns], **materials)
    half, count = given["h"] / 2 - given["d_prime"], given["n_face"]
    across = [given["b"] / 4 * (2 * number / (count - 1) - 1) for number in range(count)]
    bars = [(x, y, area) for x in across for y in (-half, half)]
    return rectangle(given["b"], given["h"], bars, **materials)


class _Worked:
    """One section in bending about x, the face at +y compressed."""

    def __init__(self, section: Section, deducted: bool) -> None:
        self.section, self.deducted = section, deducted

    def quantities(self) -> Mapping[str, Callable[[Mapping[str, Any]], float]]:
        """What a source may print, by its name."""
        c_b = self._depth(self.section.f_y / self.section.E_s)
        return {
            "P_b": lambda _: self._at(c_b)[0] / _KIP,
            "e_b": lambda _: self._at(c_b)[1] / self._at(c_b)[0],
            "0.70 P_b": lambda _: 0.70 * self._at(c_b)[0] / _KIP,
            "0.70 M_b": lambda _: 0.70 * self._at(c_b)[1] / _KIP,
            "c_b": lambda _: c_b,
            "a_b": lambda _: self.section.beta_1 * c_b,
            "Cc": lambda _: self._concrete(self.section.beta_1 * c_b) / _KIP,
            "d_extreme": lambda _: self._d_t,
            "P_o": lambda _: (self.section.P_o + self._displaced) / _KIP,
            "P_n at e": lambda inputs: self._at_eccentricity(inputs["e"]) / _KIP,
            "P_n at c": lambda inputs: self._at(inputs["c"])[0] / _KIP,
            "M_n at c": lambda inputs: self._at(inputs["c"])[1] / _KIP_FT,
            "e at c": lambda inputs: self._at(inputs["c"])[1] / self._at(inputs["c"])[0],
            "P_n at eps_t": lambda inputs: self._at(self._depth(inputs["eps_t"]))[0] / _KIP,
            "M_n at eps_t": lambda inputs: self._at(self._depth(inputs["eps_t"]))[1] / _KIP_FT,
            "M of pair": lambda inputs: self._moment_of_pair(inputs["pair"], inputs["c"]) / _KIP,
        }

    @property
    def _d_t(self) -> float:
        return float(self.section.extent[1] / 2 - self.section.y.min())

    @property
    def _displaced(self) -> float:
        return 0.0 if self.deducted else 0.85 * self.section.f_c * float(self.section.A_st)

    def _depth(self, eps_t: float) -> float:
        return self.section.eps_cu / (self.section.eps_cu + eps_t) * self._d_t

    def _at(self, c: float) -> tuple[float, float]:
        from calcpack.mechanics import bar_states, nominal

        point = nominal(self.section, _ALONG_Y, c)
        inside = bar_states(self.section, _ALONG_Y, c).in_block[:, 0]
        back = (0.0 if self.deducted else 0.85 * self.section.f_c) * self.section.A_b * inside
        return float(point.P[0] + back.sum()), float(point.Mx[0] + (back * self.section.y).sum())

    def _concrete(self, a: float) -> float:
        import numpy as np

        from calcpack.mechanics.block import compression_block

        area, _, _ = compression_block(self.section, np.array([_ALONG_Y]), np.array([a]))
        return 0.85 * self.section.f_c * float(area[0])

    def _at_eccentricity(self, e: float) -> float:
        from calcpack.mechanics import NOMINAL, Surface

        load = self.section.P_o / 10
        return float(load / Surface(self.section, NOMINAL).check(load, load * e, 0).ratio[0])

    def _moment_of_pair(self, pair: int, c: float) -> float:
        from calcpack.mechanics import bar_states

        force = bar_states(self.section, _ALONG_Y, c).force[:, 0]
        rows = (-self.section.y).argsort()[_FACES * pair : _FACES * pair + _FACES]
        return float(abs((force[rows] * self.section.y[rows]).sum()))
