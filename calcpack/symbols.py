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
    RIGIDITY,
    SECOND_MOMENT,
    STRESS,
    UNIT_WEIGHT,
    VOLUME,
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


# Loads by the letters of ASCE 7 chapter 2, and the forces of a member that each of them causes.
_LOADS = {
    "D": "dead load", "F": "load of fluids", "L": "live load", "Lr": "roof live load", "S": "snow load",
    "R": "rain load", "W": "wind load", "E": "earthquake load", "H": "lateral earth pressure",
    "T": "self-straining load",
}  # fmt: skip
_MOMENTS = tuple(
    (f"{axis}{end}", f"{axis}{end.replace('_', ',')}", f"moment about the {axis} axis{place}")
    for axis in "xy"
    for end, place in (("", ""), ("_bottom", " at the bottom"), ("_top", " at the top"))
)
_EFFECTS = (
    ("P", "P_{", FORCE, "axial force"),
    ("V_x", "V_{x,", FORCE, "shear force along x"),
    ("V_y", "V_{y,", FORCE, "shear force along y"),
    ("T", "T_{", MOMENT, "torsional moment"),
    *((f"M_{name}", f"M_{{{latex},", MOMENT, meaning) for name, latex, meaning in _MOMENTS),
)
_LOAD_EFFECTS = tuple(
    (f"{effect}_{load}", f"{latex}{load}}}", dimension, f"{meaning}, {name}", "any")
    for effect, latex, dimension, meaning in _EFFECTS
    for load, name in _LOADS.items()
)
_FACTORED_MOMENTS = tuple(
    (f"M_{kind}{name}", f"M_{{{kind}{latex}}}", MOMENT, f"factored {meaning}{cause}", "any")
    for kind, cause in (("u", ""), ("s", ", caused by sway"))
    for name, latex, meaning in _MOMENTS
)

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
    ("M_u", "M_u", MOMENT, "factored moment", "any"),
    ("M_n", "M_n", MOMENT, "nominal flexural strength", "any"),
    ("V_u", "V_u", FORCE, "factored shear force", "any"),
    # Load combinations: factored forces, and what each load causes
    ("V_ux", "V_{ux}", FORCE, "factored shear force along x", "any"),
    ("V_uy", "V_{uy}", FORCE, "factored shear force along y", "any"),
    ("T_u", "T_u", MOMENT, "factored torsional moment", "any"),
    *_FACTORED_MOMENTS,
    *_LOAD_EFFECTS,
    # Axial force with bending
    ("c", "c", LENGTH, "depth of the neutral axis from the extreme compression fibre", "positive"),
    ("a", "a", LENGTH, "depth of the equivalent rectangular stress block", "positive"),
    ("u_x", "u_x", RATIO, "direction of the compressed face, its share along x", "any"),
    ("u_y", "u_y", RATIO, "direction of the compressed face, its share along y", "any"),
    ("h_u", "h_u", LENGTH, "distance of the extreme compression fibre from the centroid", "positive"),
    ("q", "q", LENGTH, "distance of the edge of the block from the centroid", "any"),
    ("x", "x", LENGTH, "distance from the centroid along x", "any"),
    ("y", "y", LENGTH, "distance from the centroid along y", "any"),
    ("x_o", "x_o", LENGTH, "outermost bar centre from the centroid along x", "positive"),
    ("y_o", "y_o", LENGTH, "outermost bar centre from the centroid along y", "positive"),
    ("x_before", "x_{before}", LENGTH, "x of the vertex before", "any"),
    ("y_before", "y_{before}", LENGTH, "y of the vertex before", "any"),
    ("A_c", "A_c", AREA, "area of the stress block", "positive"),
    ("A_v", "A_v", AREA, "twice the area between a side of the block and the centroid", "any"),
    ("S_vx", "S_{vx}", VOLUME, "six times the first moment of that triangle about y", "any"),
    ("S_vy", "S_{vy}", VOLUME, "six times the first moment of that triangle about x", "any"),
    ("A_v_sum", r"\Sigma A_v", AREA, "sum over the vertices", "positive"),
    ("S_vx_sum", r"\Sigma S_{vx}", VOLUME, "sum over the vertices", "any"),
    ("S_vy_sum", r"\Sigma S_{vy}", VOLUME, "sum over the vertices", "any"),
    ("omega", r"\omega", RATIO, "half the angle of the arc of the block, in radians", "positive"),
    ("x_c", "x_c", LENGTH, "centroid of the block along x", "any"),
    ("y_c", "y_c", LENGTH, "centroid of the block along y", "any"),
    ("u_c", "u_c", LENGTH, "centroid of the block from the centre of the circle", "nonnegative"),
    ("C_c", "C_c", FORCE, "compression in the concrete", "positive"),
    ("eps_cu", r"\epsilon_{cu}", RATIO, "maximum strain at the extreme compression fibre", "positive"),
    ("eps_s", r"\epsilon_s", RATIO, "strain of a bar, compression positive", "any"),
    ("eps_t", r"\epsilon_t", RATIO, "net tensile strain of the extreme tension bar", "any"),
    ("eps_ty", r"\epsilon_{ty}", RATIO, "yield strain", "positive"),
    ("d_s", "d_s", LENGTH, "depth of a bar from the extreme compression fibre", "any"),
    ("d_t", "d_t", LENGTH, "depth of the extreme tension bar", "positive"),
    ("f_s", "f_s", STRESS, "stress of a bar, compression positive", "any"),
    ("F_s", "F_s", FORCE, "force of a bar, displaced concrete deducted", "any"),
    ("F_s_sum", r"\Sigma F_s", FORCE, "sum of bar forces", "any"),
    ("M_Fx", "M_{Fx}", MOMENT, "moment of a bar about the x axis", "any"),
    ("M_Fy", "M_{Fy}", MOMENT, "moment of a bar about the y axis", "any"),
    ("M_Fx_sum", r"\Sigma M_{Fx}", MOMENT, "sum of moments of bars about the x axis", "any"),
    ("M_Fy_sum", r"\Sigma M_{Fy}", MOMENT, "sum of moments of bars about the y axis", "any"),
    ("P_n", "P_n", FORCE, "nominal axial strength", "any"),
    ("M_nx", "M_{nx}", MOMENT, "nominal moment strength about the x axis", "any"),
    ("M_ny", "M_{ny}", MOMENT, "nominal moment strength about the y axis", "any"),
    ("R_u", "R_u", FORCE, "distance of the load from the origin", "positive"),
    ("phi_R_n", r"\phi R_n", FORCE, "distance of the design strength from the origin", "positive"),
    ("k_u", "k_u", RATIO, "load over design strength along the ray", "positive"),
    ("S_u", "S_u", FORCE, "part of the load", "any"),
    ("S_n", "S_n", FORCE, "part of the nominal strength", "any"),
    ("Delta", r"\Delta", RATIO, "difference over the length of the load", "any"),
    ("T_ut", "T_{ut}", FORCE, "factored axial tension", "positive"),
    ("phi_P_nt", r"\phi P_{nt}", FORCE, "design axial strength in tension", "positive"),
    ("e_x", "e_x", LENGTH, "eccentricity along x", "any"),
    ("e_y", "e_y", LENGTH, "eccentricity along y", "any"),
    ("e_n", "e_n", LENGTH, "eccentricity of the strength", "any"),
    ("P_nx", "P_{nx}", FORCE, "nominal axial strength, bending about x alone", "positive"),
    ("P_ny", "P_{ny}", FORCE, "nominal axial strength, bending about y alone", "positive"),
    ("P_n_recip", "P_{n,recip}", FORCE, "nominal axial strength by the reciprocal load method", "positive"),
    ("P_n_least", "P_{n,least}", FORCE, "least axial strength for the reciprocal load method", "positive"),
    ("Delta_recip", r"\Delta_{recip}", RATIO, "reciprocal load against strain compatibility", "any"),
    # Slenderness
    ("k", "k", RATIO, "effective length factor", "positive"),
    ("r", "r", LENGTH, "radius of gyration", "positive"),
    ("slenderness", r"\frac{k \ell_u}{r}", RATIO, "slenderness", "positive"),
    ("slenderness_max", r"\frac{k \ell_{u,max}}{r}", RATIO, "slenderness that may be neglected", "positive"),
    ("psi_A", r"\psi_A", RATIO, "stiffness of columns over that of beams, one end", "nonnegative"),
    ("psi_B", r"\psi_B", RATIO, "stiffness of columns over that of beams, other end", "nonnegative"),
    ("psi_m", r"\psi_m", RATIO, "mean of the stiffness ratios of both ends", "nonnegative"),
    ("k_left", "k_{left}", RATIO, "left side of the alignment-chart equation", "any"),
    ("k_right", "k_{right}", RATIO, "right side of the alignment-chart equation", "any"),
    ("delta_k", r"\Delta_k", RATIO, "difference of the sides of the alignment-chart equation", "any"),
    ("I_g", "I_g", SECOND_MOMENT, "second moment of the gross section", "positive"),
    ("I_se", "I_{se}", SECOND_MOMENT, "second moment of the bars about the centroid of the section", "positive"),
    ("y_s", "y_s", LENGTH, "distance of the outer rows of bars from the x axis", "positive"),
    ("x_s", "x_s", LENGTH, "distance of the outer rows of bars from the y axis", "positive"),
    ("n_x", "n_x", COUNT, "number of bars along each face parallel to x, corners included", "positive"),
    ("n_y", "n_y", COUNT, "number of bars along each face parallel to y, corners included", "positive"),
    ("EI_eff", "EI_{eff}", RIGIDITY, "effective flexural stiffness", "positive"),
    ("beta_dns", r"\beta_{dns}", RATIO, "sustained share of the factored axial force", "nonnegative"),
    ("P_sustained", "P_{sustained}", FORCE, "factored sustained axial force, compression positive", "any"),
    ("P_c", "P_c", FORCE, "critical buckling load", "positive"),
    ("P_c_reduced", "P_{c,red}", FORCE, "critical buckling load, stiffness reduced", "positive"),
    ("stability", r"\frac{P_u}{P_{c,red}}", RATIO, "axial force over the reduced critical load", "nonnegative"),
    ("M_bottom", "M_{bottom}", MOMENT, "end moment at the bottom", "any"),
    ("M_top", "M_{top}", MOMENT, "end moment at the top", "any"),
    ("M_1", "M_1", MOMENT, "smaller end moment, negative in single curvature", "any"),
    ("M_2", "M_2", MOMENT, "larger end moment", "nonnegative"),
    ("M_2_min", "M_{2,min}", MOMENT, "least moment", "positive"),
    ("M_ns", "M_{ns}", MOMENT, "part of an end moment that sway does not cause", "any"),
    ("M_s", "M_s", MOMENT, "part of an end moment that sway causes", "any"),
    ("M_end", "M_{end}", MOMENT, "end moment, its sway part magnified", "any"),
    ("M_c", "M_c", MOMENT, "magnified moment", "nonnegative"),
    ("M_c_max", "M_{c,max}", MOMENT, "largest moment allowed with second-order effects", "positive"),
    ("C_m", "C_m", RATIO, "factor relating the diagram of moments to a uniform one", "positive"),
    ("delta_ns", r"\delta_{ns}", RATIO, "magnifier for curvature between the ends", "positive"),
    ("delta_s", r"\delta_{s}", RATIO, "magnifier of sway moments", "positive"),
    ("sum_P_u", r"\Sigma P_u", FORCE, "total factored vertical load of a story", "positive"),
    ("sum_P_c", r"\Sigma P_c", FORCE, "total critical load of the columns of a story that resist sway", "positive"),
    ("sum_P_c_reduced", r"\Sigma P_{c,red}", FORCE, "total critical load of a story, stiffness reduced", "positive"),
    ("stability_s", r"\frac{\Sigma P_u}{\Sigma P_{c,red}}", RATIO, "the same for a story", "nonnegative"),
    ("V_us", "V_{us}", FORCE, "factored horizontal story shear", "positive"),
    ("Delta_o", r"\Delta_o", LENGTH, "first-order lateral deflection of a story due to its shear", "nonnegative"),
    ("l_c", r"\ell_c", LENGTH, "story height between centres of joints", "positive"),
    ("Q", "Q", RATIO, "stability index of a story", "nonnegative"),
    # Shear of columns
    ("b_w", "b_w", LENGTH, "width of section in shear", "positive"),
    ("n_rows", "n_{rows}", COUNT, "rows of side bars beyond two thirds of the depth", "nonnegative"),
    ("rho_w", r"\rho_w", RATIO, "ratio of tension reinforcement to b_w d", "nonnegative"),
    ("lambda_s", r"\lambda_s", RATIO, "factor for the effect of member depth on shear", "positive"),
    ("N_u", "N_u", FORCE, "factored axial force that occurs with the shear, compression positive", "any"),
    ("axial_stress", r"\frac{N_u}{6 A_g}", STRESS, "share of the axial force in the shear strength", "any"),
    ("V_c_a", "V_{c,a}", FORCE, "shear strength of concrete by the equation, before its limits", "any"),
    ("V_c_max", "V_{c,max}", FORCE, "largest shear strength of concrete that counts", "positive"),
    ("V_c", "V_c", FORCE, "nominal shear strength of concrete", "nonnegative"),
    ("V_s", "V_s", FORCE, "nominal shear strength of transverse reinforcement", "nonnegative"),
    ("V_s_req", "V_{s,req}", FORCE, "shear strength that transverse reinforcement has to provide", "nonnegative"),
    ("V_n", "V_n", FORCE, "nominal shear strength", "positive"),
    ("phi_V_n", r"\phi V_{n}", FORCE, "design shear strength", "positive"),
    ("V_u_max", "V_{u,max}", FORCE, "largest factored shear that the section allows", "positive"),
    ("phi_V_nx", r"\phi V_{nx}", FORCE, "design shear strength along x", "positive"),
    ("phi_V_ny", r"\phi V_{ny}", FORCE, "design shear strength along y", "positive"),
    ("half_phi_V_c", r"V_{u,no}", FORCE, "shear above which shear reinforcement is required", "nonnegative"),
    ("r_V", "r_V", RATIO, "sum of the ratios of shear to design strength along x and y", "nonnegative"),
    ("r_V_max", "r_{V,max}", RATIO, "largest sum of those ratios", "positive"),
    ("A_bt", "A_{bt}", AREA, "nominal area of tie bar", "positive"),
    ("A_v_min", "A_{v,min}", AREA, "least area of shear reinforcement", "positive"),
    ("n_legs", "n_{legs}", COUNT, "legs of ties in one direction", "positive"),
    ("f_yt_v", "f_{yt,v}", STRESS, "yield strength of transverse reinforcement that counts in shear", "positive"),
    # Columns of special moment frames
    ("h_max", "h_{max}", LENGTH, "largest dimension of column", "positive"),
    ("h_min_least", "h_{min,least}", LENGTH, "smallest least dimension allowed", "positive"),
    ("f_c_min", "f'_{c,min}", STRESS, "least strength of concrete", "positive"),
    ("f_y_max", "f_{y,max}", STRESS, "largest yield strength of longitudinal bars", "positive"),
    ("r_h", r"\frac{h_{min}}{h_{max}}", RATIO, "ratio of the dimensions of column", "positive"),
    ("r_h_min", "r_{h,min}", RATIO, "least ratio of the dimensions of column", "positive"),
    ("l_o", r"\ell_o", LENGTH, "length from a joint face within which confinement is required", "positive"),
    ("h_x", "h_x", LENGTH, "largest spacing of laterally supported bars around the column", "positive"),
    ("h_x_max", "h_{x,max}", LENGTH, "largest spacing of laterally supported bars allowed", "positive"),
    ("s_o", "s_o", LENGTH, "largest spacing of transverse reinforcement by h_x", "positive"),
    ("n_legs_x", "n_{legs,x}", COUNT, "legs of ties parallel to x", "positive"),
    ("n_legs_y", "n_{legs,y}", COUNT, "legs of ties parallel to y", "positive"),
    ("n_l", r"n_\ell", COUNT, "laterally supported bars around the core", "positive"),
    ("k_f", "k_f", RATIO, "factor for concrete strength", "positive"),
    ("k_n", "k_n", RATIO, "factor for the effect of supported bars", "positive"),
    ("b_c", "b_c", LENGTH, "dimension of core across the legs, to the outside of the hoop", "positive"),
    ("A_sh", "A_{sh}", AREA, "area of transverse reinforcement across b_c within the spacing", "positive"),
    ("r_sh", r"\frac{A_{sh}}{s b_c}", RATIO, "transverse reinforcement over spacing times width of core", "positive"),
    ("r_sh_min", "r_{sh,min}", RATIO, "least A_sh/(s b_c)", "positive"),
    ("r_sh_a", r"r_{sh,a}", RATIO, "least A_sh/(s b_c), expression (a)", "positive"),
    ("r_sh_b", r"r_{sh,b}", RATIO, "least A_sh/(s b_c), expression (b)", "positive"),
    ("r_sh_c", r"r_{sh,c}", RATIO, "least A_sh/(s b_c), expression (c)", "nonnegative"),
    ("rho_s_d", r"\rho_{s,d}", RATIO, "least volume ratio of hoops, expression (d)", "positive"),
    ("rho_s_e", r"\rho_{s,e}", RATIO, "least volume ratio of hoops, expression (e)", "positive"),
    ("rho_s_f", r"\rho_{s,f}", RATIO, "least volume ratio of hoops, expression (f)", "nonnegative"),
    ("P_high", "P_{high}", FORCE, "axial force above which confinement depends on it", "positive"),
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
