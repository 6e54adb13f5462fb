"""A termination on a pad: sources, conditions beside the length, and that page and bulk agree."""

from __future__ import annotations

from collections.abc import Callable
from dataclasses import replace
from typing import Any

import pytest
from hypothesis import HealthCheck, given, settings
from hypothesis import strategies as st

from calcpack.aci318.editions import EDITIONS, Edition, edition
from calcpack.errors import RangeError
from calcpack.ledger import passes
from calcpack.members.anchorage import check, required_length, work_termination
from calcpack.members.results import CheckResult
from calcpack.members.termination import KINDS, Termination, place, row_of

Row = Callable[..., Termination]
PLACED = {"source": "S-301, detail 1, rev 2", "file": "inputs/anchorage.csv", "row": 2}
FULL = "S-301, detail 1, rev 2 (inputs/anchorage.csv, row 2)"


def worked(pad: Any, row: Termination, one: Edition) -> CheckResult:
    return work_termination(pad, row, one)[1]


# Sources


def test_a_source_names_the_drawing_first(row: Row) -> None:
    assert place(row(**PLACED)) == FULL
    assert place(row(**{**PLACED, "row": 0})) == "S-301, detail 1, rev 2 (inputs/anchorage.csv)"
    assert place(row(source="S-301")) == "S-301 (schedule, mark T1)"
    assert place(row(**{**PLACED, "source": "  "})) == "inputs/anchorage.csv, row 2"


def test_the_row_alone_is_where_an_error_is(row: Row, each: Edition) -> None:
    assert row_of(row(**PLACED)) == "inputs/anchorage.csv, row 2"
    with pytest.raises(RangeError) as caught:
        check(row(**PLACED, c_b=0.1), each)
    assert str(caught.value).endswith("\ninputs/anchorage.csv, row 2")


def test_what_the_schedule_states_cites_drawing_and_row(row: Row, each: Edition, steps: Any) -> None:
    worked(steps, row(c_b=2.0, available=60.0, lamb=0.75, K_tr=0.4, **PLACED), each)
    for symbol in ("f_c", "f_y", "lamb", "c_b", "K_tr", "l_available"):
        assert steps.source(symbol) == FULL


def test_defaults_do_not_claim_the_schedule(row: Row, each: Edition, steps: Any) -> None:
    worked(steps, row(c_b=2.0, **PLACED), each)
    assert steps.source("lamb") == "normalweight concrete, default of the schedule"
    assert steps.source("K_tr") == "no transverse reinforcement counted, default of the schedule"
    assert steps.source("f_c") == FULL


def test_a_bar_cites_the_table_of_its_standard(row: Row, each: Edition, steps: Any) -> None:
    worked(steps, row(bar=9, **PLACED), each)
    (d_b,) = [one for one in steps.givens if one.symbol == "d_b"]
    assert d_b.means == "nominal diameter of bar, #9"
    assert (d_b.value, d_b.source) == (1.128, "ASTM A615 and A706, nominal dimensions")


def test_side_cover_of_a_head_is_not_called_that_of_a_hook(row: Row, e19: Edition, recording: Any) -> None:
    for kind, words in (("headed", "side cover of the headed bar"), ("hook 90", "side cover normal to the plane")):
        pad = recording()
        worked(pad, row(kind, side_cover=2.5), e19)
        assert next(one.means for one in pad.givens if one.symbol == "c_side").startswith(words)


# The length against the detail


@pytest.mark.parametrize(
    ("kind", "what"),
    [
        ("straight tension", "T1: #8 bar in tension developed within the length available"),
        ("hook 90", "T1: 90-degree hook of #8 bar developed within the length available"),
        ("hook 180", "T1: 180-degree hook of #8 bar developed within the length available"),
        ("headed", "T1: headed #8 bar developed within the length available"),
        ("straight compression", "T1: #8 bar in compression developed within the length available"),
        ("lap tension", "T1: tension lap of #8 bars within the length available"),
        ("lap compression", "T1: compression lap of #8 bars within the length available"),
    ],
)
def test_the_verdict_reads_alone(kind: str, what: str, row: Row, each: Edition, steps: Any) -> None:
    result = worked(steps, row(kind, available=60.0), each)
    (verdict,) = steps.verdicts
    assert (verdict.what, verdict.clause) == (what, result.clause)
    assert (verdict.capacity, verdict.ratio) == (60.0, result.ratio)


def test_without_a_length_available_nothing_is_verified(row: Row, each: Edition, steps: Any) -> None:
    value, result = work_termination(steps, row(), each)
    assert steps.verdicts == []
    assert result.values["l_d"] == (value, "in")


def test_a_ratio_above_one_by_the_noise_of_arithmetic_is_ok_on_both(row: Row, each: Edition, steps: Any) -> None:
    # The ledger allows 1e-9; the checks in bulk have to allow the same.
    needed = check(row(), each).values["l_d"][0]
    barely = row(available=needed / (1 + 5e-10))
    assert (check(barely, each).ratio or 0.0) > 1.0
    assert check(barely, each).verdict == "OK"
    worked(steps, barely, each)
    assert steps.words == ["OK"]
    assert check(row(available=needed / (1 + 5e-9)), each).verdict == "NG"


# Conditions beside the length


def test_close_bars_with_too_little_transverse_reinforcement(row: Row, e19: Edition, steps: Any) -> None:
    # ACI 318-19 25.4.2.2, from memory: K_tr of 0.5 d_b = 0.5 in for bars of Grade 80 closer than 6 in.
    worked(steps, row(f_y=80_000.0, spacing=5.0, K_tr=0.4, c_b=2.0), e19)
    verdict = steps.verdicts[0]
    assert verdict.what == "T1: transverse reinforcement of close bars of high grade"
    assert (verdict.demand, verdict.capacity, verdict.clause) == (0.5, 0.4, "25.4.2.2")
    assert verdict.word == "NG"
    assert any(text.startswith("Not met: bars at 5 in, f_y = 80,000 psi: K_tr = 0.4 in") for text in steps.reasons)


@pytest.mark.parametrize(("changes", "least"), [({"spacing": 5.0}, 5.0), ({"clear_spacing": 3.0}, 4.0)])
def test_close_bars_without_any_are_compared_by_their_spacing(
    changes: dict[str, float], least: float, row: Row, e19: Edition, steps: Any
) -> None:
    result = worked(steps, row("lap tension", f_y=80_000.0, available=400.0, **changes), e19)
    verdict = steps.verdicts[0]
    assert verdict.what == "T1: spacing of bars of high grade without transverse reinforcement"
    assert (verdict.demand, verdict.capacity, verdict.clause) == (6.0, least, "25.5.1.5")
    assert (verdict.word, result.verdict) == ("NG", "NG")


def test_close_bars_that_comply_are_verified_without_a_complaint(row: Row, e19: Edition, steps: Any) -> None:
    result = worked(steps, row(f_y=80_000.0, spacing=5.0, K_tr=0.5, c_b=2.0, available=400.0), e19)
    assert steps.words == ["OK", "OK", "OK"]
    assert result.verdict == "OK"
    assert not any(text.startswith("Not met") for text in steps.reasons)


def test_an_unknown_spacing_is_said_and_not_decided(row: Row, e19: Edition, steps: Any) -> None:
    worked(steps, row(f_y=80_000.0), e19)
    assert steps.verdicts == []
    (text,) = [text for text in steps.reasons if text.startswith("Spacing of bars not stated")]
    assert "if bars stand closer than 6 in: K_tr = 0 in, at least 0.5 d_b = 0.5 in (25.4.2.2)" in text


def test_a_smallest_index_of_nothing_is_refused(row: Row, e19: Edition) -> None:
    with pytest.raises(RangeError, match=r"K_tr = 1e-300 in +a length, zero or more"):
        check(row(K_tr=1e-300), e19)


@pytest.mark.parametrize(
    ("changes", "words"),
    [
        ({"clear_cover": 1.5}, ["OK"]),
        ({"clear_cover": 1.4}, ["NG"]),
        ({"spacing": 4.0}, ["OK"]),
        ({"spacing": 3.9}, ["NG"]),
        ({"clear_spacing": 3.0}, ["OK"]),
        ({"clear_spacing": 2.9}, ["NG"]),
        ({"clear_cover": 1.5, "spacing": 3.9}, ["OK", "NG"]),
        ({"clear_cover": 1.49, "spacing": 3.97}, ["OK", "OK"]),
        ({}, []),
    ],
)
def test_c_b_is_held_against_cover_and_spacing(
    changes: dict[str, float], words: list[str], row: Row, each: Edition, steps: Any
) -> None:
    # Chapter 2: c_b of 2 in needs 1.5 in of cover to a No. 8 bar and 4 in between centres; one per cent is let pass.
    result = worked(steps, row(c_b=2.0, **changes), each)
    assert steps.words == words
    assert (result.verdict == "NG") is ("NG" in words)


@pytest.mark.parametrize(
    ("name", "changes", "words"),
    [
        ("ACI 318-14", {"clear_cover": 2.0}, ["OK"]),
        ("ACI 318-14", {"clear_cover": 1.99}, ["NG"]),
        ("ACI 318-14", {"spacing": 5.0}, ["OK"]),
        ("ACI 318-14", {"spacing": 4.99}, ["NG"]),
        ("ACI 318-19", {"spacing": 3.0}, ["OK"]),
        ("ACI 318-19", {"spacing": 2.99}, ["NG"]),
        ("ACI 318-19", {"clear_spacing": 2.0}, ["OK"]),
        ("ACI 318-19", {"clear_cover": 1.0, "clear_spacing": 1.0}, ["NG", "NG"]),
    ],
)
def test_clearances_of_heads_are_verified(
    name: str, changes: dict[str, float], words: list[str], row: Row, steps: Any
) -> None:
    # ACI 318 25.4.4.1, from memory: cover 2 d_b; spacing 5 d_b between centres in 318-14, 3 d_b in 318-19.
    worked(steps, row("headed", **changes), edition(name))
    assert steps.words == words
    assert all(verdict.clause == "25.4.4.1" for verdict in steps.verdicts)


def test_a_reduction_not_taken_is_said_on_the_page(row: Row, e19: Edition, steps: Any) -> None:
    worked(steps, row("hook 90", A_s_required=3.0, A_s_provided=4.0), e19)
    assert "No reduction for excess reinforcement: not permitted for hooks (25.4.10.1)." in steps.reasons


def test_a_required_length_carries_its_conditions(row: Row, e19: Edition, steps: Any) -> None:
    required = required_length(steps, row("headed", clear_cover=1.0), e19)
    (requirement,) = required.requirements
    assert not requirement.met
    assert required.notes == ("Not met: clear cover 1 in, at least 2 d_b = 2 in (25.4.4.1)",)


# Random rows

ROWS = st.builds(
    Termination,
    mark=st.just("P"),
    kind=st.sampled_from(KINDS),
    bar=st.sampled_from([3, 5, 7, 8, 9, 11]),
    f_c=st.floats(2_500.0, 15_000.0),
    f_y=st.sampled_from([40_000.0, 60_000.0, 80_000.0, 100_000.0]),
    lamb=st.sampled_from([0.75, 1.0]),
    top=st.booleans(),
    coating=st.sampled_from(["none", "epoxy", "zinc", "dual"]),
    c_b=st.none() | st.floats(0.75, 4.0),
    clear_cover=st.none() | st.floats(0.5, 6.0),
    clear_spacing=st.none() | st.floats(0.5, 12.0),
    spacing=st.none() | st.floats(1.0, 12.0),
    K_tr=st.just(0.0) | st.floats(0.1, 2.0),
    side_cover=st.none() | st.floats(0.5, 12.0),
    tail_cover=st.none() | st.floats(0.5, 4.0),
    confining_ties=st.booleans(),
    in_column_core=st.booleans(),
    available=st.none() | st.floats(1.0, 150.0),
)
EXAMPLES = settings(
    max_examples=150, deadline=None, suppress_health_check=[HealthCheck.function_scoped_fixture, HealthCheck.too_slow]
)


def refusal(action: Callable[[], object]) -> str:
    """What an action is refused with; empty where it is not."""
    try:
        action()
    except RangeError as error:
        return str(error)
    return ""


def attempt(row: Termination, one: Edition, pad: Any) -> CheckResult | None:
    """The result on a pad; None where the row is refused, on the page as in bulk."""
    said = refusal(lambda: check(row, one))
    if said:
        assert refusal(lambda: work_termination(pad, row, one)) == said
        assert pad.steps == []
        return None
    result = check(row, one)
    assert worked(pad, row, one) == result
    return result


@EXAMPLES
@given(row=ROWS, name=st.sampled_from(list(EDITIONS)))
def test_page_and_bulk_agree(row: Termination, name: str, recording: Any) -> None:
    pad = recording()
    result = attempt(row, edition(name), pad)
    if result is not None:
        assert ("NG" in pad.words) is (result.verdict == "NG")
        if result.verdict == "OK":
            assert pad.verdicts[-1].ratio == result.ratio
        not_met = [note for note in result.notes if note.startswith("Not met")]
        assert [f"{note}." for note in not_met] == [text for text in pad.reasons if text.startswith("Not met")]
        assert len(not_met) == sum(not passes(verdict.ratio) for verdict in pad.verdicts) - (
            result.ratio is not None and not passes(result.ratio)
        )


@EXAMPLES
@given(row=ROWS, name=st.sampled_from(list(EDITIONS)))
def test_every_step_is_of_the_edition_and_nothing_is_given_twice(row: Termination, name: str, recording: Any) -> None:
    one, pad = edition(name), recording()
    if attempt(row, one, pad) is not None:
        for _, formula in pad.clauses:
            assert formula.clause(one.standard).standard in (one.standard, None)
        symbols = [item.symbol for item in pad.givens]
        assert len(symbols) == len(set(symbols))
        assert all(verdict.what.startswith("P: ") for verdict in pad.verdicts)


@EXAMPLES
@given(row=ROWS, name=st.sampled_from(list(EDITIONS)))
def test_a_longer_detail_never_fails_where_a_shorter_one_passes(row: Termination, name: str, recording: Any) -> None:
    one = edition(name)
    result = attempt(row, one, recording())
    if result is not None and result.verdict == "OK" and row.available:
        assert check(replace(row, available=row.available * 1.5), one).verdict == "OK"


@EXAMPLES
@given(row=ROWS, name=st.sampled_from(list(EDITIONS)))
def test_a_top_bar_is_never_shorter(row: Termination, name: str, recording: Any) -> None:
    one = edition(name)
    if attempt(row, one, recording()) is not None:
        (other,), (top,) = (check(replace(row, top=top), one).values.values() for top in (False, True))
        assert top[0] >= other[0]


@pytest.mark.parametrize("changes", [{}, {"clear_cover": 9.0}, {"clear_spacing": 9.0}])
@pytest.mark.parametrize("coating", ["epoxy", "dual"])
@pytest.mark.parametrize("kind", ["straight tension", "lap tension"])
def test_a_coated_bar_takes_the_larger_factor_until_cover_and_spacing_are_both_stated(
    kind: str, coating: str, changes: dict[str, float], row: Row, each: Edition, steps: Any
) -> None:
    work_termination(steps, row(kind, coating=coating, **changes), each)
    assert steps.values["psi_e"] == 1.5
    assert any("not stated: the smaller factor cannot be claimed" in text for text in steps.reasons)
    known = row(kind, coating=coating, clear_cover=9.0, clear_spacing=9.0)
    assert check(known, each).values != check(row(kind, coating=coating, **changes), each).values
