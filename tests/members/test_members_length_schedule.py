"""The development and lap schedule: lengths against published ones, rounding, refusals, notes, and both editions."""

from __future__ import annotations

import math
from collections.abc import Mapping
from typing import Any

import pytest
from hypothesis import given
from hypothesis import strategies as st

from calcpack import validation
from calcpack.aci318.bars import BARS
from calcpack.aci318.editions import Edition, edition
from calcpack.errors import RangeError
from calcpack.ledger import passes
from calcpack.members.anchorage import check
from calcpack.members.length_basis import Basis, EndConditions, Extent, Strengths
from calcpack.members.length_notes import NoteList, assumptions, dash, decimals, table_title
from calcpack.members.length_schedule import (
    COLUMNS,
    LengthCell,
    LengthTable,
    needs_room,
    rounded_up,
    row_for,
    state_strengths,
    work_lengths,
)
from calcpack.members.pad import FloatPad

NAMES = [column.name for column in COLUMNS]
PLAIN = Strengths(4000.0, 60_000.0)
SPACED = {"clear_cover": Extent(1.0, True), "clear_spacing": Extent(2.0, True)}


def worked(strengths: Strengths, basis: Basis, code: Edition, notes: NoteList | None = None) -> LengthTable[float]:
    pad = FloatPad()
    increment = state_strengths(pad, [strengths], basis)
    return work_lengths(pad, strengths, basis, code, notes or NoteList(), increment)


def cell(name: str, size: int, code: Edition, strengths: Strengths = PLAIN, **basis: Any) -> LengthCell[float]:
    table = worked(strengths, Basis(sizes=(size,), **basis), code)
    return table.rows[size][NAMES.index(name)]


def rounded(name: str, size: int, code: Edition, strengths: Strengths = PLAIN, **basis: Any) -> float | None:
    return cell(name, size, code, strengths, **basis).rounded


# Published values. Every case of tests/published that a schedule can express: no K_tr, no reduction for excess.

EXPRESSED = {
    "kind", "bar", "f_c", "f_y", "lamb", "top", "coating", "lap_class", "clear_cover", "clear_spacing", "side_cover",
    "tail_cover", "confining_ties", "in_column_core",
}  # fmt: skip
CASES = [case for case in validation.cases() if case.by == "anchorage" and set(case.inputs) <= EXPRESSED]


def _extent(inputs: Mapping[str, Any], key: str) -> Extent | None:
    return Extent(inputs[key]) if key in inputs else None


def _basis(inputs: Mapping[str, Any], increment: float = 1.0) -> Basis:
    ties = inputs.get("confining_ties", False)
    ends = {"side_cover": _extent(inputs, "side_cover"), "ties": ties}
    ends["in_column_core"] = inputs.get("in_column_core", False)
    return Basis(
        increment=increment, clear_cover=_extent(inputs, "clear_cover"), clear_spacing=_extent(inputs, "clear_spacing"),
        hooks=EndConditions(**ends, tail_cover=_extent(inputs, "tail_cover")), heads=EndConditions(**ends),
        confined=ties, lap_ties=ties, sizes=(inputs["bar"],),
    )  # fmt: skip


def _place(inputs: Mapping[str, Any]) -> int:
    wanted = {"top": inputs.get("top", False), "lap_class": inputs.get("lap_class", "B")}
    (place,) = [
        place
        for place, column in enumerate(COLUMNS)
        if column.kind == inputs["kind"]
        and (column.symbol not in ("l_d", "l_st") or column.states.get("top", False) == wanted["top"])
        and (column.symbol != "l_st" or column.states["lap_class"] == wanted["lap_class"])
    ]
    return place


def test_there_are_many_published_cases_of_every_length() -> None:
    assert len(CASES) > 150
    assert {COLUMNS[_place(case.inputs)].symbol for case in CASES} == {"l_d", "l_dh", "l_dt", "l_dc", "l_st", "l_sc"}


@pytest.mark.parametrize("case", CASES, ids=lambda case: case.name)
def test_a_cell_is_the_published_length(case: validation.Case) -> None:
    inputs = case.inputs
    strengths = Strengths(inputs["f_c"], inputs["f_y"], inputs.get("coating", "none"), inputs.get("lamb", 1.0))
    table = worked(strengths, _basis(inputs), edition(case.edition))
    found = table.rows[inputs["bar"]][_place(inputs)]
    assert found.required == pytest.approx(case.expected, rel=case.tolerance / 100)
    assert found.rounded is not None
    assert found.rounded == math.ceil(found.required or 0.0)


# published: the unrounded lengths of cases AB-HK-07, AB-HK-08, AB-LSC-03 of tests/published, rounded up by hand.
@pytest.mark.parametrize(
    ("name", "size", "code", "required", "expected"),
    [
        ("hook 90°", 4, "ACI 318-14", 6.641, 7.0),
        ("hook 90°", 5, "ACI 318-14", 8.301, 9.0),
        ("hook 90°", 6, "ACI 318-14", 9.961, 10.0),
        ("hook 90°", 8, "ACI 318-14", 13.28, 14.0),
        ("compression lap", 9, "ACI 318-14", 33.84, 34.0),
        ("compression lap", 9, "ACI 318-19", 33.84, 34.0),
    ],
)
def test_published_lengths_rounded_up(name: str, size: int, code: str, required: float, expected: float) -> None:
    hooks = EndConditions(Extent(2.5), Extent(2.0))
    found = cell(name, size, edition(code), hooks=hooks)
    assert found.required == pytest.approx(required, rel=1e-3)
    assert found.rounded == expected


# By hand: 60,000/(20 sqrt(4,000)) = 47.434 for #8; 1.3 times it is 61.664, and 1.3 times that 80.164;
# 0.0005*60,000 = 30; 60,000/(50 sqrt(4,000)) = 18.974 (ACI 318-14 and 318-19, equations as published).
@pytest.mark.parametrize(
    ("name", "expected"),
    [
        ("straight, other", 48.0),
        ("straight, top", 62.0),
        ("compression", 19.0),
        ("lap A, top", 62.0),
        ("lap A, other", 48.0),
        ("lap B, top", 81.0),
        ("lap B, other", 62.0),
        ("compression lap", 30.0),
    ],
)
def test_a_row_by_hand(name: str, expected: float, each: Edition) -> None:
    assert rounded(name, 8, each, **SPACED) == expected


def test_where_the_editions_differ(e14: Edition, e19: Edition) -> None:
    # published: AB-HK-08 of tests/published, 29.9 in by ACI 318-19 and 18.97 in by ACI 318-14, no covers stated.
    assert (rounded("hook 90°", 8, e14), rounded("hook 90°", 8, e19)) == (19.0, 30.0)
    # By hand, 318-14 25.4.4.2: 0.016*60,000/63.25 = 15.18; 318-19: 60,000*1.6*1.25*0.8667/(75*63.25) = 21.92.
    assert (rounded("headed", 8, e14), rounded("headed", 8, e19)) == (16.0, 22.0)
    # By hand, 318-19 grade factor 1.15 for Grade 80: 80,000*1.15/(20*63.25) = 72.73; 318-14 has none: 63.25.
    grade_80 = Strengths(4000.0, 80_000.0)
    lengths = [rounded("straight, other", 8, code, grade_80, **SPACED) for code in (e14, e19)]
    assert lengths == [64.0, 73.0]


# Rounding


# By hand: what lies on a multiple stays, what lies a billionth of it above is the noise of arithmetic.
@pytest.mark.parametrize(
    ("required", "increment", "expected"),
    [
        (24.0001, 1.0, 25.0),
        (24.999999, 1.0, 25.0),
        (25.0, 1.0, 25.0),
        (25.000000001, 1.0, 25.0),
        (25.0000001, 1.0, 26.0),
        (25.001, 1.0, 26.0),
        (25.0, 3.0, 27.0),
        (27.0, 3.0, 27.0),
        (27.01, 3.0, 30.0),
        (12.25, 0.25, 12.25),
        (12.26, 0.25, 12.5),
        (0.1 + 0.2, 0.3, 0.3),
    ],
)
def test_rounding_up(required: float, increment: float, expected: float) -> None:
    assert rounded_up(l_required=required, l_increment=increment) == pytest.approx(expected, rel=1e-15)


@given(st.floats(1.0, 500.0), st.sampled_from([0.25, 0.5, 1.0, 3.0, 6.0, 12.0]))
def test_a_rounded_length_passes_the_check_and_no_shorter_multiple_does(required: float, increment: float) -> None:
    length = rounded_up(l_required=required, l_increment=increment)
    assert length % increment == 0.0
    assert passes(required / length)
    assert length - increment < required


@pytest.mark.parametrize("increment", [0.25, 0.5, 1.0, 3.0])
def test_a_detail_with_the_printed_length_is_ok(increment: float, each: Edition) -> None:
    basis = Basis(increment=increment, **SPACED)
    table = worked(PLAIN, basis, each)
    seen = 0
    for size, cells in table.rows.items():
        for column, one in zip(COLUMNS, cells, strict=True):
            if one.rounded is not None:
                row = row_for(column, size, PLAIN, basis, each)
                for offered, verdict in ((one.rounded, "OK"), (one.rounded - increment, "NG")):
                    assert check(_offering(row, offered), each).verdict == verdict
                seen += 1
    assert seen == 9 * 11 + 2 * 5


def _offering(row: Any, available: float) -> Any:
    from dataclasses import replace

    return replace(row, available=available)


# Sizes and kinds that an edition does not allow


def marks(
    strengths: Strengths, code: Edition, **basis: Any
) -> tuple[dict[tuple[int, str], tuple[int, ...]], list[str]]:
    notes = NoteList()
    table = worked(strengths, Basis(**basis), code, notes)
    cells = {(size, NAMES[place]): one for size, row in table.rows.items() for place, one in enumerate(row)}
    return {key: one.notes for key, one in cells.items() if one.rounded is None}, notes.texts


def test_sizes_above_no_11_have_no_head_and_no_lap(each: Edition) -> None:
    # published: 25.4.4.1 heads and 25.5.1.1 laps, No. 11 and smaller (ACI 318-14, ACI 318-19).
    dashes, texts = marks(PLAIN, each)
    laps = [name for name in NAMES if name.startswith("lap")]
    assert set(dashes) == {(size, name) for size in (14, 18) for name in ["headed", *laps, "compression lap"]}
    assert texts == [
        "Headed bars: #11 and smaller (25.4.4.1).",
        "Tension laps: #11 and smaller (25.5.1.1).",
        "Compression laps: #11 and smaller (25.5.1.1).",
    ]
    assert dashes[14, "headed"] == (1,)
    assert dashes[18, "lap A, top"] == (2,)
    assert dashes[14, "compression lap"] == (3,)


def test_heads_of_high_grade_in_both_editions(e14: Edition, e19: Edition) -> None:
    # published: 25.4.4.1, f_y up to 60,000 psi in ACI 318-14.
    high = Strengths(4000.0, 80_000.0)
    dashes, texts = marks(high, e14, sizes=(8, 14))
    assert set(dashes) >= {(8, "headed"), (14, "headed")}
    assert texts[0] == "Headed bars: f_y allowed up to 60,000 psi (ACI 318-14 25.4.4.1)."
    # Two reasons, two notes.
    assert len(dashes[14, "headed"]) == 2
    assert (8, "headed") not in marks(high, e19, sizes=(8,))[0]


def test_heads_in_lightweight_concrete(each: Edition) -> None:
    dashes, texts = marks(Strengths(4000.0, 60_000.0, lamb=0.75), each, sizes=(8,))
    assert set(dashes) == {(8, "headed")}
    assert "25.4.4.1, normalweight concrete" in texts[0]


@pytest.mark.parametrize(("f_c", "f_y"), [(2400.0, 60_000.0), (4000.0, 100_001.0)])
def test_strengths_without_any_length_are_refused(f_c: float, f_y: float, each: Edition) -> None:
    with pytest.raises(RangeError, match="no length can be given"):
        worked(Strengths(f_c, f_y, source="inputs/columns.csv"), Basis(), each)


def test_the_weakest_concrete_allowed_has_lengths(each: Edition) -> None:
    assert rounded("straight, other", 5, each, Strengths(2500.0, 60_000.0)) is not None


# What lengths hold for


def test_covers_in_bar_diameters_and_in_inches() -> None:
    assert Extent(2.0).of(9) == 2.0
    assert Extent(2.0, True).of(9) == pytest.approx(2.256)  # 2 times 1.128, published: ASTM A615, No. 9
    assert (str(Extent(1.5)), str(Extent(1.0, True)), str(Extent(2.5, True))) == ("1.5 in", "d_b", "2.5 d_b")


@pytest.mark.parametrize(
    ("cover", "spacing", "expected"),
    [
        # By hand for #8: first row 47.43, other cases 1.5 times it, 71.15.
        (Extent(1.0, True), Extent(2.0, True), 48.0),
        (Extent(0.99, True), Extent(2.0, True), 72.0),
        (Extent(1.0, True), Extent(1.99, True), 72.0),
        (Extent(1.0), Extent(2.0), 48.0),
        (None, None, 72.0),
    ],
)
def test_the_row_of_the_table_follows_from_cover_and_spacing(
    cover: Extent | None, spacing: Extent | None, expected: float, each: Edition
) -> None:
    assert rounded("straight, other", 8, each, clear_cover=cover, clear_spacing=spacing) == expected


def test_a_cover_in_inches_serves_small_bars_better(each: Edition) -> None:
    # 1.5 in reaches d_b up to #11 (1.41 in); #14 has 1.693 in: other cases, 3*60,000/(40*63.25)*1.693 = 120.5.
    covers = {"clear_cover": Extent(1.5), "clear_spacing": Extent(2.0, True)}
    assert rounded("straight, other", 11, each, **covers) == 67.0  # 47.43*1.41 = 66.9
    assert rounded("straight, other", 14, each, **covers) == 121.0


def test_the_general_equation_takes_the_lesser_of_cover_and_spacing(each: Edition) -> None:
    # By hand, #8, c_b = min(2 + 0.5, (3 + 1)/2) = 2: 3/40*60,000/63.25/2 = 35.58; by spacing of 6: c_b = 2.5, 28.46.
    general = {"general": True, "clear_cover": Extent(2.0)}
    assert rounded("straight, other", 8, each, **general, clear_spacing=Extent(3.0)) == 36.0
    assert rounded("straight, other", 8, each, **general, clear_spacing=Extent(6.0)) == 29.0


def test_coated_bars_take_the_smaller_factor_only_with_the_cover_for_it(each: Edition) -> None:
    # By hand, #8: 47.43 times 1.2 = 56.92 with 3 d_b and 6 d_b, else 1.5 = 71.15; top: product capped at 1.7, 80.64.
    epoxy = Strengths(4000.0, 60_000.0, "epoxy")
    wide = {"clear_cover": Extent(3.0, True), "clear_spacing": Extent(6.0, True)}
    assert rounded("straight, other", 8, each, epoxy, **wide) == 57.0
    assert rounded("straight, other", 8, each, epoxy, **SPACED) == 72.0
    assert rounded("straight, top", 8, each, epoxy, **SPACED) == 81.0
    zinc = Strengths(4000.0, 60_000.0, "zinc")
    assert rounded("straight, other", 8, each, zinc, **SPACED) == 48.0


def test_conditions_of_hooks_heads_and_compression(e14: Edition, e19: Edition) -> None:
    # By hand, 318-14 hook of #8: 18.97, times 0.7 for covers = 13.28, times 0.8 for ties = 10.63.
    met = EndConditions(Extent(2.5), Extent(2.0), ties=True)
    assert rounded("hook 90°", 8, e14, hooks=met) == 11.0
    assert rounded("hook 180°", 8, e14, hooks=EndConditions(Extent(2.5))) == 14.0
    assert rounded("hook 90°", 8, e14, hooks=EndConditions(Extent(2.5))) == 19.0
    # 318-19: 60,000*0.8667/(55*63.25) = 14.95 with ties and in the core; 21.92/2 = 10.96 for the head.
    core = EndConditions(Extent(2.5), ties=True, in_column_core=True)
    assert rounded("hook 90°", 8, e19, hooks=core) == 15.0
    assert rounded("headed", 8, e19, heads=core) == 11.0
    assert rounded("headed", 8, e14, heads=core) == rounded("headed", 8, e14) == 16.0
    # 0.75*18.97 = 14.23 and 0.83*30 = 24.9; one does not stand for the other.
    assert rounded("compression", 8, e19, confined=True) == 15.0
    assert rounded("compression lap", 8, e19, confined=True) == 30.0
    assert rounded("compression lap", 8, e19, lap_ties=True) == 25.0


def test_no_top_bar_factor_on_hooks_and_heads(each: Edition) -> None:
    tops = [column.name for column in COLUMNS if column.states.get("top")]
    assert tops == ["straight, top", "lap A, top", "lap B, top"]
    row = row_for(COLUMNS[NAMES.index("hook 90°")], 8, PLAIN, Basis(), each)
    assert row.top is False


@pytest.mark.parametrize("f_y", [60_000.0, 80_000.0, 100_000.0])
def test_bars_of_high_grade_keep_six_inches(f_y: float, e14: Edition, e19: Edition) -> None:
    # published: ACI 318-19 25.4.2.2, Grade 80 and above, 6 in from centre to centre or K_tr; not in ACI 318-14.
    strengths = Strengths(4000.0, f_y)
    assert needs_room(strengths, e19) == (f_y >= 80_000.0)
    assert not needs_room(strengths, e14)
    column = COLUMNS[0]
    spacing = row_for(column, 8, strengths, Basis(**SPACED), e19).spacing
    assert spacing == (6.0 if f_y >= 80_000.0 else None)
    if f_y >= 80_000.0:
        # 3 bar diameters of #18 are 6.771 in: more than 6 in.
        assert row_for(column, 18, strengths, Basis(**SPACED), e19).spacing == pytest.approx(6.771)
        assert row_for(column, 8, strengths, Basis(), e19).spacing is None
        assert row_for(COLUMNS[2], 8, strengths, Basis(**SPACED), e19).spacing is None
        text = " ".join(assumptions([strengths], Basis(**SPACED), e19))
        assert "bars in tension stand 6 in or more from centre to centre" in text


@pytest.mark.parametrize("f_y", [80_000.0, 100_000.0])
def test_no_condition_is_left_unmet_in_a_schedule(f_y: float, e19: Edition) -> None:
    bases = [Basis(), Basis(**SPACED), Basis(general=True, **SPACED)]
    for basis in bases:
        for size in BARS:
            for column in COLUMNS:
                row = row_for(column, size, Strengths(4000.0, f_y), basis, e19)
                if size <= 11 or column.symbol in ("l_d", "l_dh", "l_dc"):
                    assert check(row, e19).verdict == ""


# Words


def test_titles() -> None:
    assert table_title(PLAIN) == "f′c = 4,000 psi, Grade 60, uncoated bars"
    light = Strengths(5000.0, 80_000.0, "dual", 0.75)
    assert table_title(light) == (
        "f′c = 5,000 psi, lightweight concrete, λ = 0.75, Grade 80, zinc and epoxy dual-coated bars"
    )


def test_dashes_and_decimals() -> None:
    assert (dash(()), dash((1,)), dash((2, 13))) == ("–", "–¹", "–² ¹³")
    assert [decimals(step) for step in (0.25, 0.5, 0.75, 1.0, 1.5, 3.0)] == [2, 1, 2, 0, 1, 0]


def said(code: Edition, *tables: Strengths, **basis: Any) -> str:
    return "\n".join(assumptions(tables or (PLAIN,), Basis(**basis), code))


def test_the_rule_of_rounding_is_stated(each: Edition) -> None:
    assert f"Lengths by {each.name}, minima included, each rounded up to the next multiple of 3 in" in said(
        each, increment=3.0
    )


def test_what_is_assumed_of_straight_bars(e14: Edition, e19: Edition) -> None:
    assert "Table 25.4.2.3, other cases" in said(e19)
    assert "Table 25.4.2.2, other cases" in said(e14)
    assert "clear cover of d_b or more and clear spacing of 2 d_b or more" in said(e19, **SPACED)
    assert "equation 25.4.2.4a with K_tr = 0" in said(e19, general=True, **SPACED)
    assert "equation 25.4.2.3a with K_tr = 0" in said(e14, general=True, **SPACED)


def test_what_is_assumed_of_hooks_and_heads(e14: Edition, e19: Edition) -> None:
    hooks = EndConditions(Extent(2.5), Extent(2.0), ties=True, in_column_core=True)
    text = said(e14, hooks=hooks)
    assert "side cover of 2.5 in or more, cover of 2 in or more on the extension of a 90° hook" in text
    assert "in ties or stirrups at 3 d_b or closer, up to #11" in text
    assert "column core" not in text
    text = said(e19, hooks=hooks)
    assert "extension of a 90° hook" not in text
    assert "in ties or stirrups of A_th = 0.4 A_hs or more, up to #11, ends inside a column core" in text
    assert "no side cover counted; no confining ties counted, ends not inside a column core" in said(e19)
    # published: 25.4.4.1, 3 d_b from centre to centre in ACI 318-19, 4 d_b clear in ACI 318-14.
    assert "bars 3 d_b or more from centre to centre" in said(e19)
    assert "bars 5 d_b or more from centre to centre" in said(e14)


def test_coating_and_grade_are_spoken_of_only_where_a_table_has_them(e19: Edition) -> None:
    assert "coating" not in said(e19)
    assert "Epoxy and dual coating" in said(e19, PLAIN, Strengths(4000.0, 60_000.0, "epoxy"))
    assert "coating" not in said(e19, Strengths(4000.0, 60_000.0, "zinc"))
    assert "Grade 80 and above" not in said(e19)
    assert "Grade 80 and above" in said(e19, Strengths(4000.0, 80_000.0))


def test_what_is_assumed_of_compression(each: Edition) -> None:
    assert "no spiral or close ties counted" in said(each)
    assert "inside a spiral or close ties (25.4.9.3)" in said(each, confined=True)
    assert "in column ties of 0.0015 h s or more" in said(each, lap_ties=True)
    assert "no reduction for column ties or spiral" in said(each)
