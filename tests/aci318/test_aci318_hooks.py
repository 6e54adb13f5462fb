"""Hooks and heads of both editions; geometry of hooks."""

from __future__ import annotations

import math
from typing import Any

import pytest
from hypothesis import given
from hypothesis import strategies as st

from calcpack.aci318 import heads, hooks
from calcpack.aci318.bars import BARS
from calcpack.errors import RangeError

HOOK_14: dict[str, Any] = {
    "f_y": 60_000.0,
    "f_c": 4_000.0,
    "lamb": 1.0,
    "psi_e": 1.0,
    "psi_c": 1.0,
    "psi_r": 1.0,
    "d_b": 1.0,
}
HOOK_19: dict[str, Any] = {**HOOK_14, "psi_o": 1.0}
HEAD_14: dict[str, Any] = {"f_y": 60_000.0, "f_c": 4_000.0, "psi_e": 1.0, "d_b": 1.0}
HEAD_19: dict[str, Any] = {**HEAD_14, "psi_p": 1.0, "psi_o": 1.0, "psi_c": 1.0}


def test_hook_equations_by_hand() -> None:
    # Hand: 60000/(50 sqrt(4000)) = 18.9737 in; 60000/(55 sqrt(4000)) = 17.2488 in for a bar of 1 in.
    assert hooks.hook_14(**HOOK_14) == pytest.approx(18.9737, abs=1e-4)
    assert hooks.hook_19(**HOOK_19) == pytest.approx(17.2488, abs=1e-4)


def test_trap_the_editions_differ_in_the_power_of_the_diameter() -> None:
    # Doubling the diameter doubles the length in 318-14 and gives 2**1.5 of it in 318-19.
    small, large = {"d_b": 0.5}, {"d_b": 1.0}
    assert hooks.hook_14(**HOOK_14 | large) / hooks.hook_14(**HOOK_14 | small) == pytest.approx(2.0)
    assert hooks.hook_19(**HOOK_19 | large) / hooks.hook_19(**HOOK_19 | small) == pytest.approx(2**1.5)


def test_trap_no_casting_factor_on_hooks_and_heads() -> None:
    for formula in (hooks.hook_14, hooks.hook_19, heads.head_14, heads.head_19):
        assert "psi_t" not in formula.arguments


@pytest.mark.parametrize("formula", [hooks.hook_14, hooks.hook_19])
def test_root_of_strength_is_capped_in_hooks(formula: Any) -> None:
    plain = HOOK_19 if "psi_o" in formula.arguments else HOOK_14
    assert formula(**{**plain, "f_c": 10_000.0}) == formula(**{**plain, "f_c": 14_000.0})


@pytest.mark.parametrize(
    ("l_dh_a", "d_b", "l_dh"),
    [(5.0, 0.5, 6.0), (6.0, 0.5, 6.0), (6.1, 0.5, 6.1), (8.5, 1.128, 9.024), (9.1, 1.128, 9.1), (6.0, 0.75, 6.0)],
)
def test_minima_of_hooks_and_heads(l_dh_a: float, d_b: float, l_dh: float) -> None:
    # ACI 318 25.4.3.1 and 25.4.4.2: 8 d_b and 6 in.
    assert hooks.hook_minimum(l_dh_a=l_dh_a, d_b=d_b) == l_dh
    assert heads.head_minimum(l_dt_a=l_dh_a, d_b=d_b) == l_dh


def test_reduction_for_excess_steel_stands_in_318_14_only() -> None:
    assert [str(clause) for clause in hooks.hook_reduced.clauses] == ["ACI 318-14 25.4.10.1"]
    assert hooks.hook_reduced(l_dh_a=20.0, A_s_required=3.0, A_s_provided=4.0, d_b=1.0) == 15.0
    assert hooks.hook_reduced(l_dh_a=20.0, A_s_required=1.0, A_s_provided=4.0, d_b=1.0) == 8.0


@pytest.mark.parametrize(("f_c", "counted"), [(5_999.0, 5_999.0), (6_000.0, 6_000.0), (9_000.0, 6_000.0)])
def test_head_of_318_14_counts_concrete_up_to_6000_psi(f_c: float, counted: float) -> None:
    # ACI 318-14 25.4.4.2.
    assert heads.head_14(**{**HEAD_14, "f_c": f_c}) == pytest.approx(0.016 * 60_000.0 / math.sqrt(counted))


def test_head_of_318_19_by_hand() -> None:
    # Hand: 60000/(75 sqrt(4000)) = 12.6491 in for a bar of 1 in.
    assert heads.head_19(**HEAD_19) == pytest.approx(12.6491, abs=1e-4)


@pytest.mark.parametrize(
    ("formula", "arguments", "message"),
    [
        (heads.head_14, {**HEAD_14, "f_y": 60_001.0}, r"allowed up to 60,000 psi \(ACI 318-14 25.4.4.1\)"),
        (heads.head_19, {**HEAD_19, "d_b": 1.693}, r"d_b = 1.693 in +one of .* 1.41 in \(No. 11 and smaller"),
        (hooks.hook_14, {**HOOK_14, "f_y": 80_001.0}, r"allowed up to 80,000 psi \(ACI 318-14"),
        (hooks.hook_19, {**HOOK_19, "f_y": 100_001.0}, r"allowed up to 100,000 psi \(ACI 318-19"),
        (hooks.hook_special_frame, {"f_y": 6e4, "f_c": 4e3, "lamb": 1.0, "d_b": 1.693}, r"No. 11 and smaller"),
        (hooks.tie_bend_diameter, {"d_b": 1.128}, r"No. 8 and smaller, ACI 318 Table 25.3.2"),
    ],
)
def test_range_of_hooks_and_heads(formula: Any, arguments: dict[str, float], message: str) -> None:
    with pytest.raises(RangeError, match=message):
        formula(**arguments)


@pytest.mark.parametrize(
    ("d_b", "diameters"),
    [(0.375, 6), (1.0, 6), (1.128, 8), (1.41, 8), (1.693, 10), (2.257, 10)],
)
def test_bend_diameter_by_size(d_b: float, diameters: int) -> None:
    # ACI 318 Table 25.3.1; published in AB-HG-03.
    assert hooks.bend_diameter(d_b=d_b) == pytest.approx(diameters * d_b)


@pytest.mark.parametrize(("d_b", "l_ext"), [(0.375, 2.5), (0.625, 2.5), (0.75, 3.0), (1.41, 5.64)])
def test_extension_of_180_degree_hooks(d_b: float, l_ext: float) -> None:
    # ACI 318 Table 25.3.1: 4 d_b, at least 2.5 in; equal at No. 5.
    assert hooks.extension_180(d_b=d_b) == pytest.approx(l_ext)


@pytest.mark.parametrize(("d_b", "l_ext"), [(0.375, 3.0), (0.5, 3.0), (0.625, 3.75), (0.75, 9.0), (1.0, 12.0)])
def test_extension_of_90_degree_tie_hooks(d_b: float, l_ext: float) -> None:
    # ACI 318 Table 25.3.2: 6 d_b and 3 in up to No. 5, 12 d_b above; equal at No. 4.
    assert hooks.tie_extension_90(d_b=d_b) == pytest.approx(l_ext)


@pytest.mark.parametrize(("d_b", "l_ext"), [(0.375, 3.0), (0.5, 3.0), (0.625, 3.75), (1.0, 6.0)])
def test_extension_of_135_degree_tie_hooks(d_b: float, l_ext: float) -> None:
    assert hooks.tie_extension_135(d_b=d_b) == pytest.approx(l_ext)


@pytest.mark.parametrize(("d_b", "bend"), [(0.375, 1.5), (0.625, 2.5), (0.75, 4.5), (1.0, 6.0)])
def test_bend_diameter_of_ties(d_b: float, bend: float) -> None:
    # ACI 318 Table 25.3.2; published in AB-HG-01.
    assert hooks.tie_bend_diameter(d_b=d_b) == bend


def test_extension_of_90_degree_hooks() -> None:
    assert hooks.extension_90(d_b=1.128) == pytest.approx(13.536)


def test_minima_of_hooks_in_special_frames() -> None:
    # ACI 318 18.8.5.1: 8 d_b and 6 in; at 10,000 psi the equation gives 9.23 d_b for Grade 60.
    weak = hooks.hook_special_frame(f_y=40_000.0, f_c=10_000.0, lamb=1.0, d_b=1.0)
    assert weak == 8.0
    assert hooks.hook_special_frame(f_y=40_000.0, f_c=10_000.0, lamb=1.0, d_b=0.375) == 6.0


# common practice: 18.8.5.1, 60000/(65*sqrt(4000)) = 14.595128 diameters; lightweight 10 d_b and 7.5 in.
@pytest.mark.parametrize(
    ("f_y", "f_c", "lamb", "d_b", "expected"),
    [
        (60_000.0, 4_000.0, 1.0, 1.0, 14.595128),
        (60_000.0, 4_000.0, 0.75, 1.0, 19.460171),
        (40_000.0, 10_000.0, 1.0, 1.0, 8.0),
        (40_000.0, 10_000.0, 1.0, 0.375, 6.0),
        (40_000.0, 10_000.0, 0.75, 1.0, 10.0),
        (40_000.0, 10_000.0, 0.75, 0.375, 7.5),
    ],
)
def test_hook_in_a_joint(f_y: float, f_c: float, lamb: float, d_b: float, expected: float) -> None:
    assert hooks.joint_hook_uncoated(f_y=f_y, f_c=f_c, lamb=lamb, d_b=d_b) == pytest.approx(expected, rel=1e-6)


def test_hook_in_a_joint_agrees_with_the_formula_without_coating() -> None:
    plain = {"f_y": 60_000.0, "f_c": 5_000.0, "lamb": 1.0, "d_b": 1.128}
    assert hooks.joint_hook_uncoated(**plain) == hooks.hook_special_frame(**plain)


def test_bars_in_a_joint_follow_from_the_hook() -> None:
    # 18.8.5.3: 2.5 times, and 3.25 times over more than 12 in of concrete; 18.8.5.5: coating.
    assert hooks.joint_hook(l_dh_j=14.0, psi_e=1.2) == pytest.approx(16.8)
    assert hooks.joint_straight(l_dh_j=14.0, psi_e=1.0) == pytest.approx(35.0)
    assert hooks.joint_straight_top(l_dh_j=14.0, psi_e=1.0) == pytest.approx(45.5)
    assert hooks.joint_straight_top(l_dh_j=14.0, psi_e=1.5) == pytest.approx(68.25)


def test_what_lies_outside_the_core_of_a_joint() -> None:
    # 18.8.5.4: 1.6*(35-20)+20 = 44; all of it inside changes nothing.
    assert hooks.joint_straight_outside_core(l_d=35.0, l_core=20.0) == pytest.approx(44.0)
    assert hooks.joint_straight_outside_core(l_d=35.0, l_core=35.0) == pytest.approx(35.0)


SMALL = st.sampled_from([bar.d_b for bar in BARS.values() if bar.size <= 11])


@given(d_b=SMALL, weak=st.floats(2_500.0, 15_000.0), strong=st.floats(2_500.0, 15_000.0))
def test_hooks_and_heads_do_not_grow_with_strength(d_b: float, weak: float, strong: float) -> None:
    weak, strong = sorted((weak, strong))
    for formula, plain in (
        (hooks.hook_14, HOOK_14),
        (hooks.hook_19, HOOK_19),
        (heads.head_14, HEAD_14),
        (heads.head_19, HEAD_19),
    ):
        one = {**plain, "d_b": d_b}
        assert formula(**{**one, "f_c": strong}) <= formula(**{**one, "f_c": weak})


@given(d_b=SMALL, f_c=st.floats(2_500.0, 15_000.0))
def test_a_head_is_shorter_than_a_hook_under_the_same_factors(d_b: float, f_c: float) -> None:
    # 55/75 of the hook in 318-19.
    same = {"d_b": d_b, "f_c": f_c}
    assert heads.head_19(**{**HEAD_19, **same}) == pytest.approx(55 / 75 * hooks.hook_19(**{**HOOK_19, **same}))


@pytest.mark.parametrize("formula", [hooks.hook_14, hooks.hook_19, hooks.hook_special_frame], ids=lambda one: one.name)
def test_lightweight_concrete_lengthens_hooks(formula: Any) -> None:
    # Tables 25.4.3.2 and 18.8.5.1: lambda of 0.75 divides the length. No minimum governs at 4,000 psi.
    arguments = {name: HOOK_19[name] for name in formula.arguments}
    assert formula(**{**arguments, "lamb": 0.75}) == pytest.approx(formula(**arguments) / 0.75)


@pytest.mark.parametrize("name", ["psi_e", "psi_c", "psi_r", "psi_o", "psi_p"])
@pytest.mark.parametrize("formula", [hooks.hook_14, hooks.hook_19, heads.head_14, heads.head_19])
def test_each_factor_multiplies_the_length(formula: Any, name: str) -> None:
    if name in formula.arguments:
        arguments = {symbol: {**HOOK_19, **HEAD_19}[symbol] for symbol in formula.arguments}
        assert formula(**{**arguments, name: 1.2}) == pytest.approx(1.2 * formula(**arguments))


@pytest.mark.parametrize(("d_b", "cover"), [(0.5, 1.0), (1.0, 2.0), (1.41, 2.82)])
def test_cover_of_heads(d_b: float, cover: float) -> None:
    # ACI 318 25.4.4.1, both editions, from memory: 2 d_b.
    assert heads.head_cover_minimum(d_b=d_b) == cover
    assert [str(clause) for clause in heads.head_cover_minimum.clauses] == [
        "ACI 318-14 25.4.4.1",
        "ACI 318-19 25.4.4.1",
    ]


@pytest.mark.parametrize(("d_b", "old", "new"), [(0.5, 2.5, 1.5), (1.0, 5.0, 3.0), (1.41, 7.05, 4.23)])
def test_spacing_of_heads_by_edition(d_b: float, old: float, new: float) -> None:
    # ACI 318-14 25.4.4.1: 4 d_b clear, so 5 d_b between centres; 318-19: 3 d_b between centres; from memory.
    assert heads.head_spacing_14(d_b=d_b) == pytest.approx(old)
    assert heads.head_spacing_19(d_b=d_b) == pytest.approx(new)
    assert old - d_b == pytest.approx(4 * d_b)


def test_hook_of_318_19_by_hand_with_all_factors() -> None:
    # Hand: 60000 * 1.2 * 1.6 * 1.25 * 0.9333333/(55 * 70.710678) * 0.875^1.5 = 28.285 in.
    factors = {"psi_e": 1.2, "psi_r": 1.6, "psi_o": 1.25, "psi_c": 5_000 / 15_000 + 0.6}
    found = hooks.hook_19(f_y=60_000.0, f_c=5_000.0, lamb=1.0, d_b=0.875, **factors)
    assert found == pytest.approx(28.285, abs=2e-3)


def test_hook_of_318_14_by_hand_with_all_factors() -> None:
    # Hand: 60000 * 1.2 * 0.7 * 0.8/(50 * 0.75 * 63.245553) * 1.128 = 19.1765 in.
    found = hooks.hook_14(f_y=60_000.0, f_c=4_000.0, lamb=0.75, psi_e=1.2, psi_c=0.7, psi_r=0.8, d_b=1.128)
    assert found == pytest.approx(19.1765, abs=1e-4)


def test_head_of_318_14_by_hand() -> None:
    # Hand: 0.016 * 60000 * 1.2/70.710678 * 0.75 = 12.2188 in.
    assert heads.head_14(f_y=60_000.0, f_c=5_000.0, psi_e=1.2, d_b=0.75) == pytest.approx(12.2188, abs=1e-4)
