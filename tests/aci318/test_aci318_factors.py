"""Both sides of each rule and the value exactly on it. The limits are those of the tables cited, from memory."""

from __future__ import annotations

import pytest

from calcpack.aci318 import factors
from calcpack.aci318.bars import BARS
from calcpack.formula import Formula

D_8 = 1.0
D_14 = 1.693


@pytest.mark.parametrize(
    ("formula", "arguments", "expected"),
    [
        (factors.casting_position, {"h_below": 0.0}, 1.0),
        (factors.casting_position, {"h_below": 12.0}, 1.0),
        (factors.casting_position, {"h_below": 12.01}, 1.3),
        (factors.top_bar, {}, 1.3),
        (factors.other_bar, {}, 1.0),
        (factors.uncoated, {}, 1.0),
        (factors.coated_bar, {"c_c": 3.0, "s_clear": 6.0, "d_b": 1.0}, 1.2),
        (factors.coated_bar, {"c_c": 2.99, "s_clear": 6.0, "d_b": 1.0}, 1.5),
        (factors.coated_bar, {"c_c": 3.0, "s_clear": 5.99, "d_b": 1.0}, 1.5),
        (factors.coated_bar_by_c_b, {"c_b": 3.5, "d_b": 1.0}, 1.2),
        (factors.coated_bar_by_c_b, {"c_b": 3.49, "d_b": 1.0}, 1.5),
        (factors.coated_hook, {}, 1.2),
        (factors.coated_head, {}, 1.2),
        (factors.bar_size, {"d_b": 0.75}, 0.8),
        (factors.bar_size, {"d_b": 0.875}, 1.0),
        (factors.reinforcement_grade, {"f_y": 40_000.0}, 1.0),
        (factors.reinforcement_grade, {"f_y": 60_000.0}, 1.0),
        (factors.reinforcement_grade, {"f_y": 60_001.0}, 1.15),
        (factors.reinforcement_grade, {"f_y": 80_000.0}, 1.15),
        (factors.reinforcement_grade, {"f_y": 80_001.0}, 1.3),
        (factors.reinforcement_grade, {"f_y": 100_000.0}, 1.3),
        (factors.hook_cover_90, {"d_b": D_8, "c_side": 2.5, "c_tail": 2.0}, 0.7),
        (factors.hook_cover_90, {"d_b": D_8, "c_side": 2.49, "c_tail": 2.0}, 1.0),
        (factors.hook_cover_90, {"d_b": D_8, "c_side": 2.5, "c_tail": 1.99}, 1.0),
        (factors.hook_cover_90, {"d_b": D_14, "c_side": 2.5, "c_tail": 2.0}, 1.0),
        (factors.hook_cover_90, {"d_b": 1.41, "c_side": 2.5, "c_tail": 2.0}, 0.7),
        (factors.hook_cover_180, {"d_b": 1.41, "c_side": 2.5}, 0.7),
        (factors.hook_cover_180, {"d_b": 1.41, "c_side": 2.49}, 1.0),
        (factors.hook_cover_180, {"d_b": D_14, "c_side": 2.5}, 1.0),
        (factors.hook_cover_unknown, {}, 1.0),
        (factors.hook_in_ties, {"d_b": 1.41}, 0.8),
        (factors.hook_in_ties, {"d_b": D_14}, 1.0),
        (factors.hook_without_ties, {}, 1.0),
        (factors.confined_hooks, {"d_b": D_8, "A_th": 0.4, "A_hs": 1.0, "s": 3.0}, 1.0),
        (factors.confined_hooks, {"d_b": D_8, "A_th": 0.39, "A_hs": 1.0, "s": 3.0}, 1.6),
        (factors.confined_hooks, {"d_b": D_8, "A_th": 0.0, "A_hs": 1.0, "s": 6.0}, 1.0),
        (factors.confined_hooks, {"d_b": D_14, "A_th": 1.0, "A_hs": 1.0, "s": 20.0}, 1.6),
        (factors.ties_at_hooks, {"d_b": 1.41}, 1.0),
        (factors.ties_at_hooks, {"d_b": D_14}, 1.6),
        (factors.spaced_hooks, {"d_b": D_8, "s": 6.0}, 1.0),
        (factors.spaced_hooks, {"d_b": D_8, "s": 5.99}, 1.6),
        (factors.unconfined, {}, 1.6),
        (factors.location_in_core, {"d_b": D_8, "c_side": 2.5}, 1.0),
        (factors.location_in_core, {"d_b": D_8, "c_side": 2.49}, 1.25),
        (factors.location_in_core, {"d_b": D_14, "c_side": 9.0}, 1.25),
        # 6 d_b of a No. 3 is 2.25 in, less than 2.5 in: the second condition governs.
        (factors.location_in_core, {"d_b": 0.375, "c_side": 2.25}, 1.0),
        (factors.location_in_core, {"d_b": 0.375, "c_side": 2.24}, 1.25),
        (factors.location_outside_core, {"d_b": D_8, "c_side": 6.0}, 1.0),
        (factors.location_outside_core, {"d_b": D_8, "c_side": 5.99}, 1.25),
        (factors.location_outside_core, {"d_b": D_14, "c_side": 20.0}, 1.25),
        (factors.location_unknown, {}, 1.25),
        (factors.concrete_strength, {"f_c": 3_000.0}, 0.8),
        (factors.concrete_strength, {"f_c": 6_000.0}, 1.0),
        (factors.concrete_strength, {"f_c": 9_000.0}, 1.0),
        (factors.confined_heads, {"d_b": D_8, "A_tt": 0.3, "A_hs": 1.0, "s": 3.0}, 1.0),
        (factors.confined_heads, {"d_b": D_8, "A_tt": 0.29, "A_hs": 1.0, "s": 3.0}, 1.6),
        (factors.confined_heads, {"d_b": D_8, "A_tt": 0.0, "A_hs": 1.0, "s": 6.0}, 1.0),
        (factors.ties_at_heads, {"d_b": 1.41}, 1.0),
        (factors.ties_at_heads, {"d_b": D_14}, 1.6),
        (factors.spaced_heads, {"d_b": D_8, "s": 6.0}, 1.0),
        (factors.spaced_heads, {"d_b": D_8, "s": 5.99}, 1.6),
        (factors.unconfined_heads, {}, 1.6),
        (factors.ties_in_compression, {}, 0.75),
        (factors.without_ties_in_compression, {}, 1.0),
    ],
)
def test_factor(formula: Formula, arguments: dict[str, float], expected: float) -> None:
    assert formula(**arguments) == pytest.approx(expected, rel=1e-12)


@pytest.mark.parametrize("d_b", [one.d_b for one in BARS.values()])
@pytest.mark.parametrize(("cover", "spacing"), [(2.9, 6.0), (3.0, 5.9), (3.0, 6.0), (3.1, 20.0), (1.0, 2.0)])
def test_coating_by_c_b_agrees_with_cover_and_spacing(d_b: float, cover: float, spacing: float) -> None:
    # c_b = min(cover + d_b/2, (spacing + d_b)/2), the definition of chapter 2; cover and spacing in bar diameters.
    c_b = min(cover * d_b + d_b / 2, (spacing * d_b + d_b) / 2)
    by_both = factors.coated_bar(c_c=cover * d_b, s_clear=spacing * d_b, d_b=d_b)
    assert factors.coated_bar_by_c_b(c_b=c_b * (1 + 1e-12), d_b=d_b) == by_both


def test_strength_factor_of_hooks_is_continuous_at_6000_psi() -> None:
    below, on = factors.concrete_strength(f_c=6_000.0 - 1e-6), factors.concrete_strength(f_c=6_000.0)
    assert below == pytest.approx(on, abs=1e-9)


def test_a_factor_prints_the_condition_that_held() -> None:
    (line,) = factors.coated_bar.record(c_c=2.0, s_clear=8.0, d_b=1.0).lines
    assert line.condition == "c_c < 3 * d_b or s_clear < 6 * d_b"


def test_the_same_rule_cites_the_table_it_is_used_from() -> None:
    assert [str(clause) for clause in factors.head_in_core.clauses] == ["ACI 318-19 Table 25.4.4.3"]
    assert [str(clause) for clause in factors.location_in_core.clauses] == ["ACI 318-19 Table 25.4.3.2"]
    assert factors.head_in_core.key == factors.location_in_core.key
