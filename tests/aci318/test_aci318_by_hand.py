"""Each equation against a computation by hand, with the arithmetic beside it. The clauses are from memory."""

from __future__ import annotations

import importlib
import math

import pytest

from calcpack.errors import RangeError
from calcpack.formula import Formula

# The number is that of the arithmetic, worked on a calculator; the clause says which rule it follows.
HAND: list[tuple[str, dict[str, float], float]] = [
    # ACI 318-14 25.4.2.3b, 318-19 25.4.2.4b: 40*0.22/(8*4)
    ("development.transverse_index", {"A_tr": 0.22, "s": 8.0, "n": 4.0}, 0.275),
    # the same: 40*0.40/(12*2)
    ("development.transverse_index", {"A_tr": 0.4, "s": 12.0, "n": 2.0}, 0.66666667),
    # the same: 40*0.62/(6*5)
    ("development.transverse_index", {"A_tr": 0.62, "s": 6.0, "n": 5.0}, 0.82666667),
    # 2.2: cover and spacing give the same: 1.5+0.5
    ("development.cover_or_spacing", {"c_c": 1.5, "s_clear": 3.0, "d_b": 1.0}, 2.0),
    # 2.2: spacing governs: (3+1)/2
    ("development.cover_or_spacing", {"c_c": 2.0, "s_clear": 3.0, "d_b": 1.0}, 2.0),
    # 2.2: cover governs: 0.75+0.3125
    ("development.cover_or_spacing", {"c_c": 0.75, "s_clear": 6.0, "d_b": 0.625}, 1.0625),
    # 25.4.2.3a: psi_t psi_e at 1.7, confinement on 2.5: 3/40*60000/sqrt(4000)*1.7/2.5*1
    (
        "development.straight_tension_14",
        {
            "f_y": 60_000.0,
            "f_c": 4000.0,
            "lamb": 1.0,
            "psi_t": 1.3,
            "psi_e": 1.5,
            "psi_s": 1.0,
            "c_b": 2.0,
            "K_tr": 0.5,
            "d_b": 1.0,
        },
        48.382848,
    ),
    # 25.4.2.3a: lightweight, No. 6: 3/40*60000/(0.75*sqrt(5000))*1.3*0.8/2.0*0.75
    (
        "development.straight_tension_14",
        {
            "f_y": 60_000.0,
            "f_c": 5000.0,
            "lamb": 0.75,
            "psi_t": 1.3,
            "psi_e": 1.0,
            "psi_s": 0.8,
            "c_b": 1.5,
            "K_tr": 0.0,
            "d_b": 0.75,
        },
        33.092597,
    ),
    # 25.4.2.3a: root of strength at 100 psi: 3/40*80000/100*1.2/2.5*1.41
    (
        "development.straight_tension_14",
        {
            "f_y": 80_000.0,
            "f_c": 12000.0,
            "lamb": 1.0,
            "psi_t": 1.0,
            "psi_e": 1.2,
            "psi_s": 1.0,
            "c_b": 3.0,
            "K_tr": 1.0,
            "d_b": 1.41,
        },
        40.608,
    ),
    # 25.4.2.4a: confinement (2.1 + 0.4)/1.128: 3/40*80000/sqrt(4000)*1.15/(2.5/1.128)*1.128
    (
        "development.straight_tension_19",
        {
            "f_y": 80_000.0,
            "f_c": 4000.0,
            "lamb": 1.0,
            "psi_t": 1.0,
            "psi_e": 1.0,
            "psi_s": 1.0,
            "psi_g": 1.15,
            "c_b": 2.1,
            "K_tr": 0.4,
            "d_b": 1.128,
        },
        55.526115,
    ),
    # 25.4.2.4a: 1.56 below 1.7, 10,000 psi just at the cap: 3/40*100000/100*1.3*1.2*1.3/2.0*1
    (
        "development.straight_tension_19",
        {
            "f_y": 100_000.0,
            "f_c": 10000.0,
            "lamb": 1.0,
            "psi_t": 1.3,
            "psi_e": 1.2,
            "psi_s": 1.0,
            "psi_g": 1.3,
            "c_b": 2.0,
            "K_tr": 0.0,
            "d_b": 1.0,
        },
        76.05,
    ),
    # 25.4.2.4a: 3/40*60000/(0.75*sqrt(3000))*0.8/2.0*0.5
    (
        "development.straight_tension_19",
        {
            "f_y": 60_000.0,
            "f_c": 3000.0,
            "lamb": 0.75,
            "psi_t": 1.0,
            "psi_e": 1.0,
            "psi_s": 0.8,
            "psi_g": 1.0,
            "c_b": 1.0,
            "K_tr": 0.0,
            "d_b": 0.5,
        },
        21.908902,
    ),
    # Table 25.4.2.2, No. 6: 60000/(25*sqrt(4000))*0.75
    (
        "development.straight_tension_spaced_14",
        {"f_y": 60_000.0, "f_c": 4000.0, "lamb": 1.0, "psi_t": 1.0, "psi_e": 1.0, "d_b": 0.75},
        28.460499,
    ),
    # Table 25.4.2.2, No. 7: 60000/(20*sqrt(4000))*0.875
    (
        "development.straight_tension_spaced_14",
        {"f_y": 60_000.0, "f_c": 4000.0, "lamb": 1.0, "psi_t": 1.0, "psi_e": 1.0, "d_b": 0.875},
        41.504894,
    ),
    # Table 25.4.2.2, other cases, No. 5: 3*60000*1.3/(50*sqrt(3000))*0.625
    (
        "development.straight_tension_other_14",
        {"f_y": 60_000.0, "f_c": 3000.0, "lamb": 1.0, "psi_t": 1.3, "psi_e": 1.0, "d_b": 0.625},
        53.402949,
    ),
    # Table 25.4.2.2, other cases, No. 8: 3*60000*1.3/(40*sqrt(3000))*1
    (
        "development.straight_tension_other_14",
        {"f_y": 60_000.0, "f_c": 3000.0, "lamb": 1.0, "psi_t": 1.3, "psi_e": 1.0, "d_b": 1.0},
        106.8059,
    ),
    # Table 25.4.2.3, No. 5: 80000*1.5*1.15/(25*sqrt(5000))*0.625
    (
        "development.straight_tension_spaced_19",
        {"f_y": 80_000.0, "f_c": 5000.0, "lamb": 1.0, "psi_t": 1.0, "psi_e": 1.5, "psi_g": 1.15, "d_b": 0.625},
        48.790368,
    ),
    # Table 25.4.2.3, No. 10, product at 1.7: 80000*1.7*1.15/(20*sqrt(5000))*1.27
    (
        "development.straight_tension_spaced_19",
        {"f_y": 80_000.0, "f_c": 5000.0, "lamb": 1.0, "psi_t": 1.3, "psi_e": 1.5, "psi_g": 1.15, "d_b": 1.27},
        140.45121,
    ),
    # Table 25.4.2.3, other cases, No. 4: 3*60000/(50*0.75*sqrt(4000))*0.5
    (
        "development.straight_tension_other_19",
        {"f_y": 60_000.0, "f_c": 4000.0, "lamb": 0.75, "psi_t": 1.0, "psi_e": 1.0, "psi_g": 1.0, "d_b": 0.5},
        37.947332,
    ),
    # Table 25.4.2.3, other cases, No. 11, root at 100 psi: 3*100000*1.3/(40*100)*1.41
    (
        "development.straight_tension_other_19",
        {"f_y": 100_000.0, "f_c": 14000.0, "lamb": 1.0, "psi_t": 1.0, "psi_e": 1.0, "psi_g": 1.3, "d_b": 1.41},
        137.475,
    ),
    # 25.4.10.1: three bars of four needed: 30*0.75
    ("development.straight_tension_reduced", {"l_d_a": 30.0, "A_s_required": 2.37, "A_s_provided": 3.16}, 22.5),
    # 25.4.10.1: 7.5 in, so 12 in
    ("development.straight_tension_reduced", {"l_d_a": 15.0, "A_s_required": 0.79, "A_s_provided": 1.58}, 12.0),
    # 25.4.3.1(a): 60000*0.56/(50*sqrt(3000))*0.75
    (
        "hooks.hook_14",
        {"f_y": 60_000.0, "f_c": 3000.0, "lamb": 1.0, "psi_e": 1.0, "psi_c": 0.7, "psi_r": 0.8, "d_b": 0.75},
        9.201739,
    ),
    # 25.4.3.1(a): root at 100 psi: 80000*1.2/(50*100)*1.41
    (
        "hooks.hook_14",
        {"f_y": 80_000.0, "f_c": 14000.0, "lamb": 1.0, "psi_e": 1.2, "psi_c": 1.0, "psi_r": 1.0, "d_b": 1.41},
        27.072,
    ),
    # 25.4.3.1(a), d_b to the power 1.5: 60000*1.25*0.8666667/(55*sqrt(4000))*0.75*sqrt(0.75)
    (
        "hooks.hook_19",
        {
            "f_y": 60_000.0,
            "f_c": 4000.0,
            "lamb": 1.0,
            "psi_e": 1.0,
            "psi_c": 0.8666667,
            "psi_r": 1.0,
            "psi_o": 1.25,
            "d_b": 0.75,
        },
        12.137034,
    ),
    # 25.4.3.1(a), lightweight: 100000*1.2*1.6/(55*0.75*sqrt(6000))
    (
        "hooks.hook_19",
        {
            "f_y": 100_000.0,
            "f_c": 6000.0,
            "lamb": 0.75,
            "psi_e": 1.2,
            "psi_c": 1.0,
            "psi_r": 1.6,
            "psi_o": 1.0,
            "d_b": 1.0,
        },
        60.089923,
    ),
    # 25.4.3.1(b): 8 d_b
    ("hooks.hook_minimum", {"l_dh_a": 7.5, "d_b": 1.0}, 8.0),
    # 25.4.3.1(c): 6 in
    ("hooks.hook_minimum", {"l_dh_a": 5.5, "d_b": 0.5}, 6.0),
    # 318-14 25.4.10.1: 16*0.75
    ("hooks.hook_reduced", {"l_dh_a": 16.0, "A_s_required": 0.9, "A_s_provided": 1.2, "d_b": 0.75}, 12.0),
    # 18.8.5.1: 60000/(65*sqrt(4000))
    ("hooks.hook_special_frame", {"f_y": 60_000.0, "f_c": 4000.0, "lamb": 1.0, "d_b": 1.0}, 14.595128),
    # 18.8.5.1, lightweight: 60000*1.128/(65*0.75*sqrt(4000))
    ("hooks.hook_special_frame", {"f_y": 60_000.0, "f_c": 4000.0, "lamb": 0.75, "d_b": 1.128}, 21.951072),
    # 25.4.4.2(a): 0.016*60000/sqrt(4000)*1.128
    ("heads.head_14", {"f_y": 60_000.0, "f_c": 4000.0, "psi_e": 1.0, "d_b": 1.128}, 17.121836),
    # 25.4.4.2(a): concrete counts to 6,000 psi: 0.016*60000*1.2/sqrt(6000)*0.625
    ("heads.head_14", {"f_y": 60_000.0, "f_c": 10000.0, "psi_e": 1.2, "d_b": 0.625}, 9.29516),
    # 25.4.4.2(a): 60000*1.2*1.6*1.25*0.9333333/(75*sqrt(5000))*1.128*sqrt(1.128)
    (
        "heads.head_19",
        {"f_y": 60_000.0, "f_c": 5000.0, "psi_e": 1.2, "psi_p": 1.6, "psi_o": 1.25, "psi_c": 0.9333333, "d_b": 1.128},
        30.36104,
    ),
    # 25.4.4.2(a): root at 100 psi: 100000/(75*100)*1.41*sqrt(1.41)
    (
        "heads.head_19",
        {"f_y": 100_000.0, "f_c": 12000.0, "psi_e": 1.0, "psi_p": 1.0, "psi_o": 1.0, "psi_c": 1.0, "d_b": 1.41},
        22.323763,
    ),
    # 25.4.4.2(b): 8*1.27
    ("heads.head_minimum", {"l_dt_a": 9.5, "d_b": 1.27}, 10.16),
    # 25.4.9.2(a): 60000/(50*sqrt(4000))
    ("compression.compression", {"f_y": 60_000.0, "f_c": 4000.0, "lamb": 1.0, "psi_r": 1.0, "d_b": 1.0}, 18.973666),
    # 25.4.9.2(b): 0.0003*60000*1.128
    ("compression.compression", {"f_y": 60_000.0, "f_c": 5000.0, "lamb": 1.0, "psi_r": 1.0, "d_b": 1.128}, 20.304),
    # 25.4.9.2(a), lightweight, in close ties: 80000*0.75/(50*0.75*sqrt(3000))*0.875
    ("compression.compression", {"f_y": 80_000.0, "f_c": 3000.0, "lamb": 0.75, "psi_r": 0.75, "d_b": 0.875}, 25.560386),
    # 25.4.10.1: 18.97*0.75
    ("compression.compression_reduced", {"l_dc_a": 18.97, "A_s_required": 3.0, "A_s_provided": 4.0}, 14.2275),
    # Table 25.5.2.1: 1.3
    ("laps.lap_class_b", {"l_d_a": 30.0}, 39.0),
    # Table 25.5.2.1: 1.0
    ("laps.lap_class_a", {"l_d_a": 30.0}, 30.0),
    # 25.5.5.1(b): (0.0009*75000-24)*1.128
    ("laps.lap_compression", {"f_y": 75000.0, "f_c": 4000.0, "d_b": 1.128}, 49.068),
    # 25.5.5.1: a third more below 3,000 psi: 4/3*0.0005*60000*0.875
    ("laps.lap_compression", {"f_y": 60_000.0, "f_c": 2800.0, "d_b": 0.875}, 35.0),
    # 10.7.5.2.1(a): 0.83
    ("laps.lap_in_ties", {"l_sc_a": 40.0}, 33.2),
    # 10.7.5.2.1(b): 0.75
    ("laps.lap_in_spiral", {"l_sc_a": 40.0}, 30.0),
    # geometry
    ("columns.area_rectangular", {"b": 14.0, "h": 22.0}, 308.0),
    # geometry: pi*144
    ("columns.area_circular", {"h": 24.0}, 452.38934),
    # geometry
    ("columns.area_of_bars", {"n_bars": 12.0, "A_b": 1.27}, 15.24),
    # Table 22.4.2.1: 0.80*1323200
    ("columns.axial_strength_maximum_tied", {"P_o": 1323200.0}, 1058560.0),
    # Table 22.4.2.1: 0.85*1323200
    ("columns.axial_strength_maximum_spiral", {"P_o": 1323200.0}, 1124720.0),
    # 0.65 of 1058.56 kip
    ("columns.design_axial_strength", {"phi": 0.65, "P_n_max": 1058560.0}, 688064.0),
    # 318-19 22.4.2.2: 0.85*6000*388+80000*12
    (
        "columns.axial_strength_high_grade",
        {"f_c": 6000.0, "A_g": 400.0, "A_st": 12.0, "f_y_axial": 80_000.0},
        2938800.0,
    ),
    # 10.6.1.1: 6.32/256
    ("columns.reinforcement_ratio", {"A_st": 6.32, "A_g": 256.0}, 0.0246875),
    # 25.2.3: 1.5 in
    ("columns.bar_spacing_minimum", {"d_b": 0.875}, 1.5),
    # 25.2.3: 1.5 d_b
    ("columns.bar_spacing_minimum", {"d_b": 1.41}, 2.115),
    # 25.2.3: 4/3 of the aggregate
    ("columns.bar_spacing_minimum_aggregate", {"d_b": 0.75, "d_agg": 1.5}, 2.0),
    # geometry: 24-3-0.75-1.27
    ("columns.bar_circle", {"h": 24.0, "c_cover": 1.5, "d_bt": 0.375, "d_b": 1.27}, 18.98),
    # geometry: 18.98*sin(radians(18))-1.27
    ("columns.bar_spacing_circular", {"D_s": 18.98, "n_bars": 10.0, "d_b": 1.27}, 4.5951426),
    # 25.7.2.1: 16 d_b
    ("ties.tie_spacing", {"d_b": 0.75, "d_bt": 0.375, "h_min": 24.0}, 12.0),
    # 25.7.2.1: 48 d_bt
    ("ties.tie_spacing", {"d_b": 1.27, "d_bt": 0.375, "h_min": 24.0}, 18.0),
    # 25.7.2.1: least dimension
    ("ties.tie_spacing", {"d_b": 1.27, "d_bt": 0.5, "h_min": 15.0}, 15.0),
    # 25.7.2.1
    ("ties.tie_clear_minimum", {"d_agg": 1.5}, 2.0),
    # geometry
    ("ties.spiral_clear", {"s": 2.25, "d_bt": 0.375}, 1.875),
    # volume of a turn over volume of the core: 0.2*pi*16.5/(pi/4*289*2.5)
    ("ties.spiral_ratio", {"A_sp": 0.2, "D_c": 17.0, "d_bt": 0.5, "s": 2.5}, 0.018269896),
    # volume of a turn over volume of the core: 0.11*pi*14.625/(pi/4*225*1.75)
    ("ties.spiral_ratio", {"A_sp": 0.11, "D_c": 15.0, "d_bt": 0.375, "s": 1.75}, 0.016342857),
    # 25.7.3.3: 0.45*(314.159/226.980-1)*5000/60000
    ("ties.spiral_ratio_minimum", {"A_g": 314.159, "A_ch": 226.98, "f_c": 5000.0, "f_yt": 60_000.0}, 0.014403086),
    # 25.7.3.3, f_yt at its limit: 0.45*(452.389/346.361-1)*0.04
    ("ties.spiral_ratio_minimum", {"A_g": 452.389, "A_ch": 346.361, "f_c": 4000.0, "f_yt": 100_000.0}, 0.0055101585),
]


def found(name: str) -> Formula:
    module, _, function = name.partition(".")
    one = getattr(importlib.import_module(f"calcpack.aci318.{module}"), function)
    assert isinstance(one, Formula)
    return one


ALL = pytest.mark.parametrize(("name", "arguments"), [case[:2] for case in HAND], ids=[case[0] for case in HAND])


@pytest.mark.parametrize(("name", "arguments", "expected"), HAND, ids=[case[0] for case in HAND])
def test_equation_by_hand(name: str, arguments: dict[str, float], expected: float) -> None:
    assert found(name)(**arguments) == pytest.approx(expected, rel=1e-6)


@ALL
def test_the_recorded_lines_end_in_the_result_of_the_call(name: str, arguments: dict[str, float]) -> None:
    recording = found(name).record(**arguments)
    assert recording.value == found(name)(**arguments)
    assert all(isinstance(recorded.value, float) for recorded in recording.lines)


@ALL
def test_no_argument_may_be_missing_or_not_a_number(name: str, arguments: dict[str, float]) -> None:
    for argument in arguments:
        with pytest.raises(TypeError, match=f"missing {argument}"):
            found(name)(**{key: value for key, value in arguments.items() if key != argument})
        with pytest.raises(RangeError, match=rf"{argument} = nan"):
            found(name)(**{**arguments, argument: math.nan})
