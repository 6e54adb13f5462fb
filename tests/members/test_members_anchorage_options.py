"""Straight against hooked: what each option needs, which reductions apply, what is missing, and what fits."""

from __future__ import annotations

import math
from collections.abc import Callable
from typing import Any

import pytest

from calcpack.aci318.editions import Edition
from calcpack.errors import RangeError
from calcpack.members.anchorage import check
from calcpack.members.anchorage_options import HEAD, Option, option_cells, options, work_options
from calcpack.members.anchorage_reductions import APPLIES, DOES_NOT, UNKNOWN
from calcpack.members.pad import FloatPad
from calcpack.members.termination import KINDS, Termination

Row = Callable[..., Termination]
BASE = 60_000.0 / math.sqrt(4_000.0)
TENSION = ["straight tension", "hook 90", "hook 180", "headed"]


def by_kind(row: Termination, one: Edition) -> dict[str, Option]:
    return {option.kind: option for option in options(row, one)}


def states(option: Option) -> dict[str, str]:
    return {reduction.what: reduction.state for reduction in option.reductions}


@pytest.mark.parametrize(
    ("kind", "kinds"),
    [
        *((kind, TENSION) for kind in TENSION),
        # 25.4.1.2: hooks and heads add nothing in compression.
        ("straight compression", ["straight compression"]),
        ("lap tension", ["lap tension", "mechanical splice"]),
        ("lap compression", ["lap compression", "mechanical splice"]),
        ("mechanical splice", ["mechanical splice"]),
    ],
)
def test_the_options_of_a_kind(kind: str, kinds: list[str], row: Row, each: Edition) -> None:
    assert [option.kind for option in options(row(kind), each)] == kinds
    assert set(KINDS) >= set(kinds)


def test_an_option_needs_what_its_own_row_would(row: Row, each: Edition) -> None:
    one = row(top=True, side_cover=2.5, tail_cover=2.0, available=30.0)
    for kind, option in by_kind(one, each).items():
        result = check(row(kind, top=True, side_cover=2.5, tail_cover=2.0, available=30.0), each)
        ((symbol, (value, _)),) = result.values.items()
        assert (option.symbol, option.length, option.clause) == (symbol, value, result.clause)
        assert option.fits is (result.verdict == "OK")


def test_without_an_available_length_nothing_fits_or_fails(row: Row, each: Edition) -> None:
    assert {option.fits for option in options(row(), each)} == {None}


def test_an_option_fits_exactly(row: Row, e14: Edition) -> None:
    needed = BASE / 50
    assert by_kind(row(available=needed), e14)["hook 90"].fits is True
    assert by_kind(row(available=needed * 0.999), e14)["hook 90"].fits is False


def test_a_condition_not_met_is_no_fit(row: Row, e14: Edition) -> None:
    # 25.4.4.1: cover of 2 d_b to a headed bar.
    assert by_kind(row(available=60.0, clear_cover=2.0), e14)["headed"].fits is True
    assert by_kind(row(available=60.0, clear_cover=1.9), e14)["headed"].fits is False


def test_what_an_edition_does_not_permit_is_no_option(row: Row, e14: Edition, e19: Edition) -> None:
    # 318-14 25.4.4.1: headed bars up to Grade 60.
    refused = by_kind(row(f_y=80_000.0), e14)["headed"]
    assert refused.length is None
    assert any("25.4.4.1" in text for text in refused.refused)
    assert by_kind(row(f_y=80_000.0), e19)["headed"].length is not None


@pytest.mark.parametrize(
    ("changes", "state", "factor"),
    [
        ({"side_cover": 2.5, "tail_cover": 2.0}, APPLIES, 0.7),
        ({"side_cover": 2.4, "tail_cover": 2.0}, DOES_NOT, 1.0),
        ({"side_cover": 2.4}, DOES_NOT, 1.0),
        ({"side_cover": 2.5}, UNKNOWN, 1.0),
        ({}, UNKNOWN, 1.0),
        ({"side_cover": 2.5, "tail_cover": 2.0, "bar": 14}, DOES_NOT, 1.693),
    ],
)
def test_covers_of_a_hook_of_318_14(changes: dict[str, Any], state: str, factor: float, row: Row, e14: Edition) -> None:
    option = by_kind(row("hook 90", **changes), e14)["hook 90"]
    assert states(option)["covers of the hook"] == state
    assert option.length == pytest.approx(factor * BASE / 50)


def test_what_is_missing_is_named(row: Row, e14: Edition, e19: Edition) -> None:
    hook = by_kind(row("hook 90", side_cover=2.5), e14)["hook 90"]
    assert [text.split(";")[0] for text in hook.missing] == [
        "state tail_cover",
        "state confining_ties where they are there (Table 25.4.3.2)",
        "state A_s_required and A_s_provided, where none of the exclusions holds (25.4.10.1, 25.4.10.2)",
    ]
    hook = by_kind(row("hook 90"), e19)["hook 90"]
    assert [text.split(" (")[0] for text in hook.missing] == [
        "state confining_ties, or the spacing",
        "state side_cover: 6 in or more",
    ]
    straight = by_kind(row(), e19)["straight tension"]
    assert straight.missing[0].startswith("state clear_cover and clear_spacing")
    assert by_kind(row(clear_cover=2.0), e19)["straight tension"].missing[0].startswith("state clear_spacing:")
    general = by_kind(row(c_b=2.0), e19)["straight tension"]
    assert general.missing[0] == "state K_tr of ties or stirrups along the bar (25.4.2)"


def test_the_length_at_best_takes_what_is_missing_as_favourable(row: Row, e14: Edition, e19: Edition) -> None:
    # 318-14: 0.7 and 0.8; 318-19: 1.6 and 1.25 drop out; the table's first row is two thirds of its other cases.
    hook = by_kind(row("hook 90"), e14)["hook 90"]
    assert hook.length_at_best == pytest.approx(0.56 * BASE / 50)
    hook = by_kind(row("hook 90"), e19)["hook 90"]
    assert hook.length_at_best == pytest.approx((hook.length or 0.0) / 2.0)
    straight = by_kind(row(), e19)["straight tension"]
    assert straight.length_at_best == pytest.approx((straight.length or 0.0) * 2 / 3)
    known = row("hook 90", side_cover=6.0, confining_ties=True)
    assert by_kind(known, e19)["hook 90"].length_at_best is None


@pytest.mark.parametrize(
    ("changes", "what", "state"),
    [
        ({"spacing": 6.0}, "ties of 0.4 A_hs or spacing of 6 d_b", APPLIES),
        ({"clear_spacing": 5.0}, "ties of 0.4 A_hs or spacing of 6 d_b", APPLIES),
        ({"spacing": 5.9}, "ties of 0.4 A_hs or spacing of 6 d_b", UNKNOWN),
        ({"confining_ties": True}, "ties of 0.4 A_hs or spacing of 6 d_b", APPLIES),
        ({"bar": 14, "confining_ties": True}, "ties of 0.4 A_hs or spacing of 6 d_b", DOES_NOT),
        ({"side_cover": 6.0}, "side cover, outside a column core", APPLIES),
        ({"side_cover": 5.9}, "side cover, outside a column core", DOES_NOT),
        ({"side_cover": 2.5, "in_column_core": True}, "side cover, inside a column core", APPLIES),
        ({"side_cover": 2.4, "in_column_core": True}, "side cover, inside a column core", DOES_NOT),
        ({"bar": 18, "side_cover": 20.0}, "side cover, outside a column core", DOES_NOT),
        ({}, "concrete strength", APPLIES),
        ({"f_c": 6_000.0}, "concrete strength", DOES_NOT),
        ({"A_s_required": 1.0, "A_s_provided": 2.0}, "excess reinforcement", DOES_NOT),
    ],
)
def test_reductions_of_a_hook_of_318_19(changes: dict[str, Any], what: str, state: str, row: Row, e19: Edition) -> None:
    assert states(by_kind(row("hook 90", **changes), e19)["hook 90"])[what] == state


@pytest.mark.parametrize(
    ("changes", "what", "state"),
    [
        ({"bar": 6}, "size of bar", APPLIES),
        ({"bar": 7}, "size of bar", DOES_NOT),
        ({"clear_cover": 1.0, "clear_spacing": 2.0}, "cover and spacing", APPLIES),
        ({"clear_cover": 1.0, "clear_spacing": 1.0}, "cover and spacing", UNKNOWN),
        ({"clear_cover": 1.0, "clear_spacing": 1.0, "confining_ties": True}, "cover and spacing", APPLIES),
        ({"clear_cover": 0.9, "clear_spacing": 2.0}, "cover and spacing", DOES_NOT),
        ({"clear_cover": 0.9}, "cover and spacing", DOES_NOT),
        ({"c_b": 2.0}, "cover and spacing", APPLIES),
        ({"c_b": 0.9}, "cover and spacing", DOES_NOT),
        ({"c_b": 2.0, "K_tr": 0.3}, "transverse reinforcement", APPLIES),
        ({"A_s_required": 1.0, "A_s_provided": 2.0}, "excess reinforcement", APPLIES),
        ({"excess_exclusion": "seismic"}, "excess reinforcement", DOES_NOT),
    ],
)
def test_reductions_of_a_straight_bar(changes: dict[str, Any], what: str, state: str, row: Row, each: Edition) -> None:
    assert states(by_kind(row(**changes), each)["straight tension"])[what] == state


@pytest.mark.parametrize(
    ("kind", "changes", "state"),
    [
        ("straight compression", {}, UNKNOWN),
        ("straight compression", {"confining_ties": True}, APPLIES),
        ("lap compression", {"spiral": True}, APPLIES),
    ],
)
def test_reductions_in_compression(kind: str, changes: dict[str, Any], state: str, row: Row, each: Edition) -> None:
    assert next(iter(states(by_kind(row(kind, **changes), each)[kind]).values())) == state


def test_trap_ties_that_meet_one_provision_are_not_claimed_for_another(row: Row, e19: Edition) -> None:
    # Least stirrups along a straight bar are no ties of 0.4 A_hs at a hook; those of one hook serve the other.
    tied = by_kind(row(confining_ties=True), e19)
    assert tied["hook 90"].length == by_kind(row(), e19)["hook 90"].length
    hooked = by_kind(row("hook 90", confining_ties=True), e19)
    assert hooked["hook 180"].length == hooked["hook 90"].length
    assert (hooked["hook 180"].length or 0.0) < (tied["hook 180"].length or 0.0)
    assert hooked["headed"].length == tied["headed"].length


def test_a_joint_holds_its_own_conditions(row: Row, each: Edition) -> None:
    found = by_kind(row("hook 90", joint="special", in_column_core=True), each)
    assert found["hook 90"].length == pytest.approx(BASE / 65)
    assert found["hook 180"].length is None
    assert states(found["hook 90"]) == {"covers and ties": DOES_NOT, "excess reinforcement": DOES_NOT}


def test_a_lap_or_a_mechanical_splice(row: Row, each: Edition) -> None:
    one = row("lap tension", spliced=0.5, bar_stress=0.4, lap_class="A", available=60.0)
    found = by_kind(one, each)
    assert found["mechanical splice"].symbol == "P_splice"
    assert found["mechanical splice"].fits is None
    assert found["lap tension"].fits is False


def test_a_row_that_cannot_be_checked_has_no_options(row: Row, each: Edition, steps: Any) -> None:
    with pytest.raises(RangeError, match=r"available = 0 in +a length above zero"):
        options(row(available=0.0), each)
    with pytest.raises(RangeError, match=r"f_c = 40 psi"):
        work_options(steps, row(f_c=40.0), each)
    assert steps.steps == []


# On a pad


def test_options_are_worked_under_their_kinds_and_give_no_verdict(row: Row, each: Edition, steps: Any) -> None:
    one = row(available=20.0, side_cover=2.5)
    worked = work_options(steps, one, each)
    assert steps.told("heading") == [f"T1: {kind}" for kind in TENSION]
    assert steps.verdicts == []
    assert [found.option for found in worked] == options(one, each)
    for found in worked:
        assert found.value == found.option.length
        assert found.ratio == pytest.approx((found.option.length or 0.0) / 20.0)
    said = [text for kind, text in steps.under("T1: hook 90") if kind == "reason"]
    assert any(text.startswith("Not known: ") for text in said)


def test_cells_of_a_table(row: Row, e14: Edition) -> None:
    worked = work_options(FloatPad(), row(f_y=80_000.0, available=40.0, clear_cover=2.0, clear_spacing=4.0), e14)
    cells = {found.option.kind: option_cells(found) for found in worked}
    assert {len(one) for one in cells.values()} == {len(HEAD)}
    assert cells["headed"][3] == "not permitted"
    assert "25.4.4.1" in str(cells["headed"][5])
    assert cells["hook 90"][1] == pytest.approx(80_000 / (50 * math.sqrt(4_000)))
    assert cells["hook 90"][3] == "fits"
    assert cells["straight tension"][3] == "does not fit"
    assert cells["straight tension"][4] == "cover and spacing: first row of the table"


def test_a_condition_not_met_stands_in_its_cell(row: Row, e19: Edition) -> None:
    worked = work_options(FloatPad(), row("headed", clear_cover=1.5), e19)
    (cells,) = (option_cells(found) for found in worked if found.option.kind == "headed")
    assert str(cells[5]).startswith("not met: clear cover 1.5 in, at least 2 d_b = 2 in (25.4.4.1)")
    assert cells[2:4] == ("–", "–")
