"""Strength reduction factor by the strain of the extreme tension bar, and the cap on axial strength, by edition."""

from __future__ import annotations

from dataclasses import dataclass
from math import isclose

import numpy as np

from calcpack.mechanics.outlines import Floats

__all__ = ["NOMINAL", "Rule", "rule_318_14", "rule_318_19"]

_GRADE_60 = 60_000.0


@dataclass(frozen=True)
class Rule:
    """What an edition says of phi and of the maximum axial strength.

    Attributes
    ----------
    eps_ty, eps_tc : tension strains at and below which phi is phi_c, and at and above which it is phi_t
    phi_c, phi_t : compression-controlled and tension-controlled
    alpha : maximum over nominal axial strength
    """

    eps_ty: float
    eps_tc: float
    phi_c: float
    phi_t: float
    alpha: float

    def phi(self, eps_t: Floats) -> Floats:
        """Strength reduction factor at a strain of the extreme tension bar, tension positive.

        >>> float(rule_318_14(f_y=60_000, spiral=False).phi(np.array(0.005)))
        0.9
        """
        share = np.clip((eps_t - self.eps_ty) / (self.eps_tc - self.eps_ty), 0.0, 1.0)
        phi: Floats = self.phi_c + (self.phi_t - self.phi_c) * share
        return phi

    def slope(self, eps_t: Floats) -> Floats:
        """Change of phi with the strain, zero outside the transition."""
        slope: Floats = np.where(
            (eps_t > self.eps_ty) & (eps_t < self.eps_tc), (self.phi_t - self.phi_c) / (self.eps_tc - self.eps_ty), 0.0
        )
        return slope


NOMINAL = Rule(eps_ty=0.002, eps_tc=0.005, phi_c=1.0, phi_t=1.0, alpha=1.0)


def rule_318_14(*, f_y: float, spiral: bool, E_s: float = 29e6) -> Rule:
    """ACI 318-14 Table 21.2.2 and Table 22.4.2.1: eps_ty of Grade 60 taken as 0.002, tension-controlled at 0.005."""
    # A stress that was converted from another unit may miss the grade by its last digits.
    eps_ty = 0.002 if isclose(f_y, _GRADE_60, rel_tol=1e-9) else f_y / E_s
    return _rule(eps_ty, 0.005, spiral)


def rule_318_19(*, f_y: float, spiral: bool, E_s: float = 29e6) -> Rule:
    """ACI 318-19 Table 21.2.2 and Table 22.4.2.1: eps_ty is f_y/E_s, tension-controlled 0.003 beyond it."""
    return _rule(f_y / E_s, f_y / E_s + 0.003, spiral)


def _rule(eps_ty: float, eps_tc: float, spiral: bool) -> Rule:
    phi_c, alpha = (0.75, 0.85) if spiral else (0.65, 0.80)
    return Rule(eps_ty=eps_ty, eps_tc=eps_tc, phi_c=phi_c, phi_t=0.9, alpha=alpha)
