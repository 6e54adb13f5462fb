"""Editions of ACI 318: a record that names which function serves each role. What editions share exists once."""

from __future__ import annotations

from dataclasses import dataclass

from calcpack.aci318 import development, factors, heads, hooks, shear, special_frames
from calcpack.aci318.standards import ACI_318_14, ACI_318_19
from calcpack.errors import InputError, Problem
from calcpack.formula import Formula, Standard

__all__ = ["EDITIONS", "Edition", "edition"]


@dataclass(frozen=True)
class Edition:
    """One edition of ACI 318: the functions and limits in which it differs from others.

    Attributes
    ----------
    f_y_max : largest yield strength of deformed bars, psi, Table 20.2.2.4a
    head_f_y_max : largest yield strength of headed bars, psi, 25.4.4.1
    straight_tension : general equation; the table has the rows `straight_tension_spaced` and `straight_tension_other`
    lightweight_by_test : whether lambda between 0.75 and 1.0, from a splitting test, holds for straight bars
    grade_factor : rule of psi_g, or None
    hook_reduced : a hook's length reduced for excess reinforcement, or None where that is not permitted
    hook_by_cover : psi_c of hooks goes by cover and psi_r by ties at 3 d_b, else psi_c by strength and psi_r by A_th
    head_spacing : least centre-to-centre spacing of headed bars
    close_bars_need_ties : whether bars of Grade 80 and above, closer than 6 in, need K_tr of 0.5 d_b
    shear_compression, shear_alone, shear_tension : shear strength of concrete with axial compression, without axial
        force, and with axial tension
    shear_few_ties : the same with less than the minimum of shear reinforcement, or None where it makes no difference
    biaxial_shear : sum of the ratios of shear along x and y, or None where each is verified alone
    special_yield : largest yield strength of longitudinal bars in a special moment frame
    special_spacing, special_spacing_beyond : largest spacing of hoops of such a column, within l_o and outside it
    """

    standard: Standard
    f_y_max: float
    head_f_y_max: float
    straight_tension: Formula
    straight_tension_spaced: Formula
    straight_tension_other: Formula
    lightweight_by_test: bool
    grade_factor: Formula | None
    close_bars_need_ties: bool
    hook: Formula
    hook_reduced: Formula | None
    hook_by_cover: bool
    head: Formula
    head_spacing: Formula
    shear_compression: Formula
    shear_alone: Formula
    shear_tension: Formula
    shear_few_ties: Formula | None
    biaxial_shear: Formula | None
    special_yield: Formula
    special_spacing: Formula
    special_spacing_beyond: Formula

    @property
    def name(self) -> str:
        """The name of the standard, e.g. ``ACI 318-19``."""
        return self.standard.name


EDITIONS: dict[str, Edition] = {
    one.name: one
    for one in (
        Edition(
            standard=ACI_318_14,
            f_y_max=80_000.0,
            head_f_y_max=60_000.0,
            straight_tension=development.straight_tension_14,
            straight_tension_spaced=development.straight_tension_spaced_14,
            straight_tension_other=development.straight_tension_other_14,
            lightweight_by_test=True,
            grade_factor=None,
            close_bars_need_ties=False,
            hook=hooks.hook_14,
            hook_reduced=hooks.hook_reduced,
            hook_by_cover=True,
            head=heads.head_14,
            head_spacing=heads.head_spacing_14,
            shear_compression=shear.concrete_compression_14,
            shear_alone=shear.concrete_alone_14,
            shear_tension=shear.concrete_tension_14,
            shear_few_ties=None,
            biaxial_shear=None,
            special_yield=special_frames.yield_maximum_14,
            special_spacing=special_frames.confinement_spacing_14,
            special_spacing_beyond=special_frames.spacing_beyond_14,
        ),
        Edition(
            standard=ACI_318_19,
            f_y_max=100_000.0,
            head_f_y_max=100_000.0,
            straight_tension=development.straight_tension_19,
            straight_tension_spaced=development.straight_tension_spaced_19,
            straight_tension_other=development.straight_tension_other_19,
            lightweight_by_test=False,
            grade_factor=factors.reinforcement_grade,
            close_bars_need_ties=True,
            hook=hooks.hook_19,
            hook_reduced=None,
            hook_by_cover=False,
            head=heads.head_19,
            head_spacing=heads.head_spacing_19,
            shear_compression=shear.concrete_with_ties_19,
            shear_alone=shear.concrete_with_ties_19,
            shear_tension=shear.concrete_with_ties_19,
            shear_few_ties=shear.concrete_few_ties_19,
            biaxial_shear=shear.biaxial_shear,
            special_yield=special_frames.yield_maximum_19,
            special_spacing=special_frames.confinement_spacing_19,
            special_spacing_beyond=special_frames.spacing_beyond_19,
        ),
    )
}


def edition(name: str) -> Edition:
    """The edition of that name.

    >>> edition("ACI 318-19").name
    'ACI 318-19'

    Raises
    ------
    InputError : an edition that calcpack does not have
    """
    if name not in EDITIONS:
        allowed = " or ".join(repr(known) for known in EDITIONS)
        raise InputError(
            "unknown concrete code", [Problem(f"concrete = {name!r}", allowed, "correct [codes] concrete")]
        )
    return EDITIONS[name]
