r"""The notation table: every symbol of ACI 318 that calcpack uses, with its meaning, dimension and typesetting.

Everything that names a symbol is made from this table. The typeset form is LaTeX of a small kind (letters, Greek,
``\ell``, primes, subscripts); it is turned into MathML, Typst, plain text and speech by `calcpack.typeset`.
Meanings follow the notation chapters of ACI 318-14 and 318-19 (chapter 2), in our words.
"""

from __future__ import annotations

import re
from dataclasses import dataclass

from calcpack.units import (
    ANGLE,
    AREA,
    COUNT,
    FORCE,
    LENGTH,
    LINE_LOAD,
    MOMENT,
    RATIO,
    STRESS,
    UNIT_WEIGHT,
    Dimension,
)

__all__ = ["NOTATION", "Symbol", "is_known", "lookup", "typeset_name"]


@dataclass(frozen=True)
class Symbol:
    """A symbol: its name in code, typeset form, dimension, meaning, and the sign its values have."""

    name: str
    latex: str
    dimension: Dimension
    meaning: str
    sign: str = "positive"


_ROWS: tuple[tuple[str, str, Dimension, str, str], ...] = (
    # Materials
    ("f_c", "f'_c", STRESS, "specified compressive strength of concrete", "positive"),
    ("root_f_c", r"\sqrt{f'_c}", STRESS, "square root of the concrete strength, in psi", "positive"),
    ("f_y", "f_y", STRESS, "specified yield strength of reinforcement", "positive"),
    ("f_yt", "f_{yt}", STRESS, "specified yield strength of transverse reinforcement", "positive"),
    ("f_y_axial", "f_{y,axial}", STRESS, "yield strength that counts in axial strength", "positive"),
    ("E_s", "E_s", STRESS, "modulus of elasticity of reinforcement", "positive"),
    ("E_c", "E_c", STRESS, "modulus of elasticity of concrete", "positive"),
    ("w_c", "w_c", UNIT_WEIGHT, "unit weight of concrete", "positive"),
    ("lamb", r"\lambda", RATIO, "factor for lightweight concrete", "positive"),
    # Bars and geometry
    ("d_b", "d_b", LENGTH, "nominal diameter of bar", "positive"),
    ("d_bt", "d_{bt}", LENGTH, "nominal diameter of tie or spiral bar", "positive"),
    ("d_bt_min", "d_{bt,min}", LENGTH, "least diameter of tie bar", "positive"),
    ("A_b", "A_b", AREA, "nominal area of one bar", "positive"),
    ("A_s", "A_s", AREA, "area of longitudinal tension reinforcement", "nonnegative"),
    ("A_s_required", r"A_{s,required}", AREA, "area of reinforcement required by analysis", "positive"),
    ("A_s_provided", r"A_{s,provided}", AREA, "area of reinforcement provided", "positive"),
    ("A_st", "A_{st}", AREA, "total area of longitudinal reinforcement", "positive"),
    ("A_g", "A_g", AREA, "gross area of concrete section", "positive"),
    ("A_ch", "A_{ch}", AREA, "area of core to the outside edges of transverse reinforcement", "positive"),
    ("A_tr", "A_{tr}", AREA, "area of transverse reinforcement across the plane of splitting", "nonnegative"),
    ("A_th", "A_{th}", AREA, "area of ties or stirrups confining hooked bars", "nonnegative"),
    ("A_hs", "A_{hs}", AREA, "area of hooked bars being developed", "positive"),
    ("A_tt", "A_{tt}", AREA, "area of ties parallel to headed bars", "nonnegative"),
    ("A_sp", "A_{sp}", AREA, "area of spiral bar", "positive"),
    ("b", "b", LENGTH, "width of section", "positive"),
    ("h", "h", LENGTH, "overall depth or diameter of section", "positive"),
    ("h_min", "h_{min}", LENGTH, "least dimension of column", "positive"),
    ("d", "d", LENGTH, "effective depth", "positive"),
    ("D_c", "D_c", LENGTH, "diameter of core, out to out of spiral", "positive"),
    ("D_s", "D_s", LENGTH, "diameter of the circle through the bar centres", "positive"),
    ("c_cover", "c_{cover}", LENGTH, "clear cover to ties or spiral", "positive"),
    ("n_face", "n_{face}", COUNT, "number of bars along a face, corners included", "positive"),
    ("s", "s", LENGTH, "centre-to-centre spacing", "positive"),
    ("s_max", "s_{max}", LENGTH, "largest spacing allowed", "positive"),
    ("s_min", "s_{min}", LENGTH, "least spacing, centre to centre", "positive"),
    ("s_clear", "s_{clear}", LENGTH, "clear spacing", "positive"),
    ("s_clear_min", "s_{clear,min}", LENGTH, "least clear spacing allowed", "positive"),
    ("s_clear_max", "s_{clear,max}", LENGTH, "largest clear spacing allowed", "positive"),
    ("c_c", "c_c", LENGTH, "clear cover of reinforcement", "positive"),
    ("c_c_min", "c_{c,min}", LENGTH, "least clear cover", "positive"),
    ("c_b", "c_b", LENGTH, "least of cover to bar centre and half the bar spacing", "positive"),
    ("c_b_max", "c_{b,max}", LENGTH, "largest c_b that the stated cover or spacing gives", "positive"),
    ("c_side", "c_{side}", LENGTH, "side cover normal to the plane of the hook", "positive"),
    ("c_tail", "c_{tail}", LENGTH, "cover on the bar extension beyond the hook", "positive"),
    ("d_agg", "d_{agg}", LENGTH, "nominal maximum size of coarse aggregate", "positive"),
    ("h_below", "h_{below}", LENGTH, "depth of fresh concrete cast below the bar", "nonnegative"),
    ("n", "n", COUNT, "number of bars developed along the plane of splitting", "positive"),
    ("n_bars", "n_{bars}", COUNT, "number of longitudinal bars", "positive"),
    ("n_min", "n_{min}", COUNT, "least number of longitudinal bars", "positive"),
    ("x_clear", "x_{clear}", LENGTH, "clear distance from a bar to the next laterally supported bar", "positive"),
    ("x_clear_max", "x_{clear,max}", LENGTH, "largest clear distance to a laterally supported bar", "positive"),
    ("rho_g", r"\rho_g", RATIO, "ratio of longitudinal reinforcement to gross area", "positive"),
    ("rho_g_min", r"\rho_{g,min}", RATIO, "least ratio of longitudinal reinforcement", "positive"),
    ("rho_g_max", r"\rho_{g,max}", RATIO, "largest ratio of longitudinal reinforcement", "positive"),
    ("rho_s", r"\rho_s", RATIO, "volume ratio of spiral reinforcement to core", "positive"),
    ("rho_s_min", r"\rho_{s,min}", RATIO, "least volume ratio of spiral reinforcement", "positive"),
    # Development
    ("l_d", r"\ell_d", LENGTH, "development length in tension", "positive"),
    ("l_d_a", r"\ell_{d,a}", LENGTH, "development length in tension by the equation, before its minimum", "positive"),
    ("l_dh", r"\ell_{dh}", LENGTH, "development length of a hooked bar in tension", "positive"),
    (
        "l_dh_a",
        r"\ell_{dh,a}",
        LENGTH,
        "development length of a hooked bar by the equation, before its minima",
        "positive",
    ),
    ("l_dt", r"\ell_{dt}", LENGTH, "development length of a headed bar in tension", "positive"),
    (
        "l_dt_a",
        r"\ell_{dt,a}",
        LENGTH,
        "development length of a headed bar by the equation, before its minima",
        "positive",
    ),
    ("l_dc", r"\ell_{dc}", LENGTH, "development length in compression", "positive"),
    (
        "l_dc_a",
        r"\ell_{dc,a}",
        LENGTH,
        "development length in compression by the equation, before its minimum",
        "positive",
    ),
    ("l_st", r"\ell_{st}", LENGTH, "tension lap splice length", "positive"),
    ("l_sc", r"\ell_{sc}", LENGTH, "compression lap splice length", "positive"),
    ("l_sc_a", r"\ell_{sc,a}", LENGTH, "compression lap by the table, before column reductions", "positive"),
    ("l_ext", r"\ell_{ext}", LENGTH, "straight extension at the end of a standard hook", "positive"),
    ("l_available", r"\ell_{available}", LENGTH, "length the detail offers", "positive"),
    ("D_bend", r"D_{bend}", LENGTH, "least inside diameter of bend", "positive"),
    ("K_tr", "K_{tr}", LENGTH, "transverse reinforcement index", "nonnegative"),
    ("K_tr_min", "K_{tr,min}", LENGTH, "least transverse reinforcement index", "positive"),
    ("confinement", r"\frac{c_b + K_{tr}}{d_b}", RATIO, "confinement term", "positive"),
    ("psi_t", r"\psi_t", RATIO, "factor for casting position", "positive"),
    ("psi_e", r"\psi_e", RATIO, "factor for reinforcement coating", "positive"),
    ("psi_te", r"\psi_t \psi_e", RATIO, "product of the casting and coating factors", "positive"),
    ("psi_s", r"\psi_s", RATIO, "factor for bar size", "positive"),
    ("psi_g", r"\psi_g", RATIO, "factor for reinforcement grade", "positive"),
    ("psi_c", r"\psi_c", RATIO, "factor for cover (318-14) or concrete strength (318-19)", "positive"),
    ("psi_r", r"\psi_r", RATIO, "factor for confining reinforcement", "positive"),
    ("psi_o", r"\psi_o", RATIO, "factor for location of the bar", "positive"),
    ("psi_p", r"\psi_p", RATIO, "factor for parallel ties at headed bars", "positive"),
    ("excess", r"\frac{A_{s,required}}{A_{s,provided}}", RATIO, "ratio of required to provided area", "positive"),
    # Strength
    ("phi", r"\phi", RATIO, "strength reduction factor", "positive"),
    ("alpha", r"\alpha", RATIO, "factor on the maximum axial strength", "positive"),
    ("beta_1", r"\beta_1", RATIO, "depth of the stress block over depth of the neutral axis", "positive"),
    ("P_o", "P_o", FORCE, "nominal axial strength at zero eccentricity", "positive"),
    ("P_n_max", "P_{n,max}", FORCE, "maximum nominal axial strength", "positive"),
    ("phi_P_n_max", r"\phi P_{n,max}", FORCE, "maximum design axial strength", "positive"),
    ("P_u", "P_u", FORCE, "factored axial force, compression positive", "any"),
    ("P_D", "P_D", FORCE, "axial force, dead load", "any"),
    ("P_L", "P_L", FORCE, "axial force, live load", "any"),
    ("P_Lr", "P_{Lr}", FORCE, "axial force, roof live load", "any"),
    ("M_ux", "M_{ux}", MOMENT, "factored moment about the x axis", "any"),
    ("M_uy", "M_{uy}", MOMENT, "factored moment about the y axis", "any"),
    ("M_u", "M_u", MOMENT, "factored moment", "any"),
    ("M_n", "M_n", MOMENT, "nominal flexural strength", "any"),
    ("V_u", "V_u", FORCE, "factored shear force", "any"),
    # Loads
    ("w_D", "w_D", LINE_LOAD, "dead load per length", "any"),
    ("w_L", "w_L", LINE_LOAD, "live load per length", "any"),
    ("w_u", "w_u", LINE_LOAD, "factored load per length", "any"),
    ("q_D", "q_D", STRESS, "dead load per area", "any"),
    ("q_L", "q_L", STRESS, "live load per area", "any"),
    ("q_u", "q_u", STRESS, "factored load per area", "any"),
    ("q_allow", "q_{allow}", STRESS, "allowable soil bearing pressure", "positive"),
    ("A_t", "A_t", AREA, "tributary area", "positive"),
    ("L", "L", LENGTH, "span", "positive"),
    ("l_u", r"\ell_u", LENGTH, "unsupported length of column", "positive"),
    ("theta", r"\theta", ANGLE, "angle", "any"),
)

NOTATION: dict[str, Symbol] = {row[0]: Symbol(*row) for row in _ROWS}

_GREEK = frozenset(
    [
        "alpha",
        "beta",
        "gamma",
        "delta",
        "epsilon",
        "zeta",
        "eta",
        "theta",
        "kappa",
        "lambda",
        "mu",
        "nu",
        "xi",
        "rho",
        "sigma",
        "tau",
        "phi",
        "chi",
        "psi",
        "omega",
        "Gamma",
        "Delta",
        "Theta",
        "Lambda",
        "Xi",
        "Pi",
        "Sigma",
        "Phi",
        "Psi",
        "Omega",
    ]
)


def is_known(name: str) -> bool:
    """Whether the notation table holds the symbol."""
    return name in NOTATION


def lookup(name: str) -> Symbol:
    """The symbol of that name.

    Raises
    ------
    KeyError : the table does not hold it
    """
    return NOTATION[name]


def typeset_name(name: str) -> str:
    r"""LaTeX of a symbol: from the table, or made from the name (``w_u_max`` as ``w_{u,max}``, ``delta_s`` with Greek).

    An engineer's own formula may use any name; ``f_c_prime``-like spellings are not guessed at.
    """
    if name in NOTATION:
        return NOTATION[name].latex
    base, *subscripts = re.sub(r"(?<=\D)_?(\d+)$", r"_\1", name).split("_") if name[-1].isdigit() else name.split("_")
    # A length l is set as in the code book, where a plain l reads as a one.
    head = r"\ell" if base == "l" else _letter(base)
    if base in ("phi", "Phi") and len(subscripts) >= 2 and len(subscripts[0]) == 1 and subscripts[0].isupper():
        return rf"{head} {typeset_name('_'.join(subscripts))}"
    return f"{head}_{{{','.join(_letter(part) for part in subscripts if part)}}}" if any(subscripts) else head


def _letter(part: str) -> str:
    if part in _GREEK:
        return f"\\{part}"
    if part == "lamb":
        return r"\lambda"
    return r"\ell" if part == "ell" else part
