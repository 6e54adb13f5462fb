"""Strength combinations of ASCE 7-16 and 7-22 against a list written by hand."""

from __future__ import annotations

import math
import re
from dataclasses import FrozenInstanceError

import pytest
from hypothesis import given
from hypothesis import strategies as st

from calcpack import loads
from calcpack.errors import RangeError
from calcpack.loads.combinations import (
    ALTERNATIVE,
    LATERAL,
    LOADS,
    STANDARDS,
    SUSTAINED,
    Settings,
    combinations,
    factor_text,
    load_standard,
    name_of,
)
from calcpack.loads.standards import ASCE_7_16, ASCE_7_22

# from memory: ASCE 7-16 2.3.1 (1 to 5) and 2.3.6 (6 and 7), every choice written out by hand. Companions are also
# absent, and in 2 to 4 the principal load while a companion acts; wind and earthquake act in both directions.
BY_HAND_16 = """
1: 1.4D
2: 1.2D+1.6L   2: 1.2D+1.6L+0.5Lr   2: 1.2D+1.6L+0.5S   2: 1.2D+1.6L+0.5R
3: 1.2D+1.6Lr  3: 1.2D+1.6Lr+1.0L   3: 1.2D+1.6Lr+0.5W  3: 1.2D+1.6Lr-0.5W
3: 1.2D+1.6S   3: 1.2D+1.6S+1.0L    3: 1.2D+1.6S+0.5W   3: 1.2D+1.6S-0.5W
3: 1.2D+1.6R   3: 1.2D+1.6R+1.0L    3: 1.2D+1.6R+0.5W   3: 1.2D+1.6R-0.5W
4: 1.2D+1.0W   4: 1.2D+1.0W+0.5Lr   4: 1.2D+1.0W+0.5S   4: 1.2D+1.0W+0.5R
4: 1.2D-1.0W   4: 1.2D-1.0W+0.5Lr   4: 1.2D-1.0W+0.5S   4: 1.2D-1.0W+0.5R
4: 1.2D+1.0W+1.0L  4: 1.2D+1.0W+1.0L+0.5Lr  4: 1.2D+1.0W+1.0L+0.5S  4: 1.2D+1.0W+1.0L+0.5R
4: 1.2D-1.0W+1.0L  4: 1.2D-1.0W+1.0L+0.5Lr  4: 1.2D-1.0W+1.0L+0.5S  4: 1.2D-1.0W+1.0L+0.5R
2: 1.2D+0.5Lr  2: 1.2D+0.5S  2: 1.2D+0.5R
3: 1.2D+1.0L   3: 1.2D+0.5W  3: 1.2D-0.5W
4: 1.2D+1.0L+0.5Lr  4: 1.2D+1.0L+0.5S  4: 1.2D+1.0L+0.5R
5: 0.9D+1.0W   5: 0.9D-1.0W
6: 1.2D+1.0E   6: 1.2D+1.0E+1.0L    6: 1.2D+1.0E+0.2S   6: 1.2D+1.0E+1.0L+0.2S
6: 1.2D-1.0E   6: 1.2D-1.0E+1.0L    6: 1.2D-1.0E+0.2S   6: 1.2D-1.0E+1.0L+0.2S
7: 0.9D+1.0E   7: 0.9D-1.0E
"""
# from memory: ASCE 7-22 2.3.1 and 2.3.6. Snow is at strength level: 0.3S in 2 and 4, 1.0S in 3, 0.15S in 6.
BY_HAND_22 = """
1: 1.4D
2: 1.2D+1.6L   2: 1.2D+1.6L+0.5Lr   2: 1.2D+1.6L+0.3S   2: 1.2D+1.6L+0.5R
3: 1.2D+1.6Lr  3: 1.2D+1.6Lr+1.0L   3: 1.2D+1.6Lr+0.5W  3: 1.2D+1.6Lr-0.5W
3: 1.2D+1.0S   3: 1.2D+1.0S+1.0L    3: 1.2D+1.0S+0.5W   3: 1.2D+1.0S-0.5W
3: 1.2D+1.6R   3: 1.2D+1.6R+1.0L    3: 1.2D+1.6R+0.5W   3: 1.2D+1.6R-0.5W
4: 1.2D+1.0W   4: 1.2D+1.0W+0.5Lr   4: 1.2D+1.0W+0.3S   4: 1.2D+1.0W+0.5R
4: 1.2D-1.0W   4: 1.2D-1.0W+0.5Lr   4: 1.2D-1.0W+0.3S   4: 1.2D-1.0W+0.5R
4: 1.2D+1.0W+1.0L  4: 1.2D+1.0W+1.0L+0.5Lr  4: 1.2D+1.0W+1.0L+0.3S  4: 1.2D+1.0W+1.0L+0.5R
4: 1.2D-1.0W+1.0L  4: 1.2D-1.0W+1.0L+0.5Lr  4: 1.2D-1.0W+1.0L+0.3S  4: 1.2D-1.0W+1.0L+0.5R
2: 1.2D+0.5Lr  2: 1.2D+0.3S  2: 1.2D+0.5R
3: 1.2D+1.0L   3: 1.2D+0.5W  3: 1.2D-0.5W
4: 1.2D+1.0L+0.5Lr  4: 1.2D+1.0L+0.3S  4: 1.2D+1.0L+0.5R
5: 0.9D+1.0W   5: 0.9D-1.0W
6: 1.2D+1.0E   6: 1.2D+1.0E+1.0L    6: 1.2D+1.0E+0.15S  6: 1.2D+1.0E+1.0L+0.15S
6: 1.2D-1.0E   6: 1.2D-1.0E+1.0L    6: 1.2D-1.0E+0.15S  6: 1.2D-1.0E+1.0L+0.15S
7: 0.9D+1.0E   7: 0.9D-1.0E
"""
BY_HAND = {"ASCE 7-16": BY_HAND_16, "ASCE 7-22": BY_HAND_22}
BOTH = pytest.mark.parametrize("standard", ["ASCE 7-16", "ASCE 7-22"])
CLAUSES = {"1": "2.3.1", "2": "2.3.1", "3": "2.3.1", "4": "2.3.1", "5": "2.3.1", "6": "2.3.6", "7": "2.3.6"}


def letters(name: str) -> set[str]:
    """The loads of a combination's name."""
    return set(re.findall(r"[A-Z][a-z]?", name))


def second_derivation(standard: str, having: set[str], live: float = 1.0) -> list[str]:
    """The names by editing the list above as text."""
    written = re.findall(r"\d: \S+", BY_HAND[standard])
    names = [name.replace("+1.0L", f"+{live}L") for name in written if letters(name) <= having]
    if "F" in having:
        # from memory: F has the factor of D in 1 to 4, 6 and 7, and is not in 5.
        names = [name if name[0] == "5" else re.sub(r" (\d\.\d)D", r" \1D+\1F", name) for name in names]
    if "H" in having:
        names += [f"{name}+1.6H" for name in names]
    if "T" in having:
        names += [f"{name}+1.0T" for name in names]
    return names


def labels(standard: str, having: set[str], settings: Settings | None = None) -> list[str]:
    return [one.label for one in combinations(standard, having, settings or Settings())]


@BOTH
@given(others=st.sets(st.sampled_from(LOADS)), live=st.sampled_from([1.0, 0.5]))
def test_combinations_are_those_of_a_second_derivation(standard: str, others: set[str], live: float) -> None:
    having = others | {"D"}
    found = labels(standard, having, Settings(live_companion=live))
    assert sorted(found) == sorted(second_derivation(standard, having, live))
    assert len(found) == len(set(found))
    assert [name[0] for name in found] == sorted(name[0] for name in found)


@BOTH
def test_the_list_by_hand_is_whole(standard: str) -> None:
    # 1, then 1 x 4, 3 x 4, 2 x 2 x 4, 2, 2 x 2 x 2 and 2 by counting the choices of each combination; without the
    # principal load 3 in each of 2, 3 and 4, as those of 4 that 2 and 3 hold already stand once.
    assert len(second_derivation(standard, {*"DLSRWE", "Lr"})) == 1 + 4 + 12 + 16 + 2 + 8 + 2 + 3 * 3
    assert len(labels(standard, set(LOADS))) == 54 * 2 * 2


@BOTH
@given(others=st.sets(st.sampled_from(LOADS)))
def test_label_terms_and_clause_agree(standard: str, others: set[str]) -> None:
    for one in combinations(standard, {*others, "D"}):
        parts = re.findall(r"([+-]?\d+\.\d+)([A-Za-z]+)", one.label.split(": ")[1])
        assert [(load, float(factor)) for factor, load in parts] == list(one.terms)
        assert one.label.startswith(f"{one.number}: ")
        assert str(one.clause) == f"{standard} {CLAUSES[one.number]}"
        assert one.reasons == ()


# published: Wight & MacGregor, Reinforced Concrete, example 12-2, pp. 595-597, factors its column with 1.2D + 1.6L.
def test_dead_and_live_load_alone() -> None:
    assert labels("ASCE 7-16", {"D", "L"}) == labels("ASCE 7-22", {"D", "L"})
    assert labels("ASCE 7-16", {"D", "L"}) == ["1: 1.4D", "2: 1.2D+1.6L", "3: 1.2D+1.0L"]


def test_dead_load_is_always_checked_alone() -> None:
    assert labels("ASCE 7-16", {"D"}) == ["1: 1.4D"]
    assert labels("ASCE 7-16", {"D", "F"}) == ["1: 1.4D+1.4F"]


def test_a_principal_load_is_out_only_where_a_companion_acts() -> None:
    assert labels("ASCE 7-16", {"D", "W"})[1:3] == ["3: 1.2D+0.5W", "3: 1.2D-0.5W"]
    assert labels("ASCE 7-16", {"D", "S"}) == ["1: 1.4D", "2: 1.2D+0.5S", "3: 1.2D+1.6S"]
    assert {name[0] for name in labels("ASCE 7-16", {"D", "E"})} == {"1", "6", "7"}


def test_equal_factors_stand_once() -> None:
    # 1.2 D + 1.0 L is combination 3 without a roof load, and 4 without wind.
    for having in (["D", "L", "W"], ["D", "L", "S", "W", "Lr"]):
        terms = [one.terms for one in combinations("ASCE 7-16", having)]
        assert len(set(terms)) == len(terms)
        assert (("D", 1.2), ("L", 1.0)) in terms


def test_only_companion_live_load_is_reduced() -> None:
    half = Settings(live_companion=0.5)
    factors = {
        (one.number, factor)
        for one in combinations("ASCE 7-16", {"D", "L", "S", "W", "E"}, half)
        for load, factor in one.terms
        if load == "L"
    }
    # common practice: ASCE 7 2.3.1, exception 1: 0.5L in 3 and 4, in 2.3.6 in 6; 1.6L stays in 2
    assert factors == {("2", 1.6), ("3", 0.5), ("4", 0.5), ("6", 0.5)}


@pytest.mark.parametrize(("number", "clause"), [("3", "2.3.1"), ("4", "2.3.1"), ("6", "2.3.6")])
def test_a_reduced_live_load_says_why(number: str, clause: str) -> None:
    half = Settings(live_companion=0.5)
    for one in combinations("ASCE 7-22", {"D", "L", "Lr", "W", "E"}, half):
        if one.number == number:
            reduced = f"L is a companion with 0.5 instead of 1.0 (ASCE 7-22 {clause}, exception for L)."
            assert one.reasons == ((reduced,) if ("L", 0.5) in one.terms else ())


# common practice: 1.2 + 0.2 S_DS and 0.9 - 0.2 S_DS on D (ASCE 7 12.4.2.2), rho on Q_E (12.4.2.1); by hand.
@BOTH
@pytest.mark.parametrize(
    ("S_DS", "rho", "names"),
    [
        (1.0, 1.3, ["6: 1.4D+1.3E", "6: 1.4D-1.3E", "7: 0.7D+1.3E", "7: 0.7D-1.3E"]),
        (0.5, 1.0, ["6: 1.3D+1.0E", "6: 1.3D-1.0E", "7: 0.8D+1.0E", "7: 0.8D-1.0E"]),
        (0.83, 1.3, ["6: 1.366D+1.3E", "6: 1.366D-1.3E", "7: 0.734D+1.3E", "7: 0.734D-1.3E"]),
        (None, 1.0, ["6: 1.2D+1.0E", "6: 1.2D-1.0E", "7: 0.9D+1.0E", "7: 0.9D-1.0E"]),
    ],
)
def test_vertical_earthquake_effect_and_redundancy(
    standard: str, S_DS: float | None, rho: float, names: list[str]
) -> None:
    assert labels(standard, {"D", "E"}, Settings(S_DS=S_DS, rho=rho)) == ["1: 1.4D", *names]


def test_earthquake_settings_change_nothing_else() -> None:
    plain = [name for name in labels("ASCE 7-16", set(LOADS)) if name[0] in "12345"]
    seismic = labels("ASCE 7-16", set(LOADS), Settings(S_DS=1.0, rho=1.3))
    assert [name for name in seismic if name[0] in "12345"] == plain


def test_fluids_have_no_vertical_earthquake_effect() -> None:
    names = labels("ASCE 7-16", {"D", "F", "E"}, Settings(S_DS=1.0))
    assert names == ["1: 1.4D+1.4F"] + [
        f"{start}{sign}1.0E" for start in ("6: 1.4D+1.2F", "7: 0.7D+0.9F") for sign in "+-"
    ]


def test_factors_of_an_earthquake_say_how_they_are_made() -> None:
    listed = combinations("ASCE 7-22", {"D", "E"}, Settings(S_DS=0.83, rho=1.3))
    redundancy = "E is Q_E; E_h = rho Q_E with rho = 1.3 (ASCE 7-22 12.4.2.1)."
    assert {one.number: one.reasons for one in listed} == {
        "1": (),
        "6": ("D with E_v = 0.2 S_DS D: 1.2 + 0.2 S_DS = 1.2 + 0.2 (0.83) = 1.366 (ASCE 7-22 12.4.2.2).", redundancy),
        "7": ("D with E_v = 0.2 S_DS D: 0.9 - 0.2 S_DS = 0.9 - 0.2 (0.83) = 0.734 (ASCE 7-22 12.4.2.2).", redundancy),
    }


@given(S_DS=st.floats(0.01, 4.0), rho=st.sampled_from([1.0, 1.3]))
def test_the_printed_factor_is_the_one_that_is_used(S_DS: float, rho: float) -> None:
    for one in combinations("ASCE 7-16", {"D", "E"}, Settings(S_DS=S_DS, rho=rho))[1:]:
        (_, dead), (_, shaking) = one.terms
        sign = 1 if one.number == "6" else -1
        assert math.isclose(dead, {"6": 1.2, "7": 0.9}[one.number] + sign * 0.2 * S_DS, abs_tol=1e-9)
        assert abs(shaking) == rho
        assert float(re.findall(r"([\d.]+)D", one.label)[0]) == dead


def test_wind_and_earthquake_never_act_together() -> None:
    for one in combinations("ASCE 7-16", LOADS):
        assert not {"W", "E"} <= {load for load, _ in one.terms}
        assert len({"Lr", "S", "R"} & {load for load, _ in one.terms}) <= 1


@pytest.mark.parametrize(
    ("changes", "message"),
    [
        ({"live_companion": 0.6}, r"live_companion = 0.6  1.0, or 0.5 \(ASCE 7 2.3.1, exception 1; ACI 318 5.3.3\)"),
        ({"S_DS": 0.0}, r"S_DS = 0  above 0, up to 4, in g \(ASCE 7 11.4\)"),
        ({"S_DS": -0.1}, r"S_DS = -0.1  above 0"),
        ({"S_DS": 4.01}, r"S_DS = 4.01  above 0, up to 4"),
        ({"S_DS": math.nan}, r"S_DS = nan  above 0"),
        ({"S_DS": 1.0, "rho": 1.2}, r"rho = 1.2  1.0 or 1.3 \(ASCE 7 12.3.4\)$"),
        ({"rho": 1.3}, r"rho = 1.3  1.0 where S_DS is not stated, .*: state S_DS, or apply rho to the rows of E"),
        ({"live_companion": 2.0, "S_DS": 83.0, "rho": 3.0}, r"(?s)live_companion = 2 .*S_DS = 83 .*rho = 3 "),
    ],
)
def test_settings_out_of_range_are_refused(changes: dict[str, float], message: str) -> None:
    with pytest.raises(RangeError, match=message) as caught:
        Settings(**changes)
    assert str(caught.value).startswith("settings of the load combinations\n")
    assert len(caught.value.problems) == (3 if len(changes) == 3 else 1)


def test_settings_on_the_limits() -> None:
    assert (Settings(S_DS=4.0).S_DS, Settings(S_DS=1e-6).S_DS) == (4.0, 1e-6)
    assert Settings() == Settings(1.0, None, 1.0)


def test_what_cannot_be_combined_is_named_at_once() -> None:
    with pytest.raises(RangeError, match="load combinations") as caught:
        combinations("ASCE 7-16", ["X", "L", "X", "Q"])
    assert [problem.line() for problem in caught.value.problems] == [
        "load 'Q'  one of D, F, L, Lr, S, R, W, E, H, T",
        "load 'X'  one of D, F, L, Lr, S, R, W, E, H, T",
        "loads L, Q, X  D among them: it acts in every combination: add the dead load",
    ]
    with pytest.raises(RangeError, match="loads none  D among them"):
        combinations("ASCE 7-16", [])


def test_an_unknown_standard_is_refused() -> None:
    with pytest.raises(RangeError, match="loads = 'ASCE 7-10'  one of ASCE 7-16, ASCE 7-22"):
        combinations("ASCE 7-10", ["D"])
    with pytest.raises(RangeError, match="loads = ''  one of"):
        load_standard("")


def test_standards_by_name() -> None:
    assert load_standard("ASCE 7-16").standard is ASCE_7_16
    assert load_standard("ASCE 7-22").standard is ASCE_7_22
    assert list(STANDARDS) == ["ASCE 7-16", "ASCE 7-22"]
    assert (ASCE_7_16.title[-4:], ASCE_7_22.title[-4:]) == ("2016", "2022")


@pytest.mark.parametrize("record", [Settings(), STANDARDS["ASCE 7-16"], STANDARDS["ASCE 7-16"].rules[0]])
def test_records_that_are_shared_cannot_be_changed(record: object) -> None:
    with pytest.raises(FrozenInstanceError, match="cannot assign to field"):
        setattr(record, next(iter(vars(record))), None)


# Wind and earthquake reverse, and no other load.
def test_only_wind_and_earthquake_have_a_negative_factor() -> None:
    negative = {load for one in combinations("ASCE 7-22", LOADS) for load, factor in one.terms if factor < 0}
    assert negative == {"W", "E"}


# from memory: the letters of ASCE 7 2.2
def test_kinds_of_loads() -> None:
    assert set(LOADS) == {"D", "F", "L", "Lr", "S", "R", "W", "E", "H", "T"}
    assert set(ALTERNATIVE) == {"L", "Lr", "S", "R", "W", "E"}
    assert set(SUSTAINED) == {"D", "F", "H"}
    assert set(LATERAL) == {"W", "E"}


@pytest.mark.parametrize(
    ("factor", "text"), [(1.0, "+1.0"), (-0.5, "-0.5"), (1.366, "+1.366"), (0.15, "+0.15"), (-1.0, "-1.0")]
)
def test_factors_have_a_sign_and_a_decimal(factor: float, text: str) -> None:
    assert factor_text(factor) == text


def test_names_carry_cases() -> None:
    assert name_of("4", [("D", 1.2), ("W(+x)", -1.0), ("L", 1.0)]) == "4: 1.2D-1.0W(+x)+1.0L"
    assert name_of("9", [("W", -1.0)]) == "9: -1.0W"


def test_the_room_is_a_table_of_contents() -> None:
    assert loads.__all__ == sorted(loads.__all__)
    assert loads.combinations.combinations is combinations
    with pytest.raises(AttributeError, match=r"calcpack.loads has no 'forces'; it has combinations, equations"):
        _ = loads.forces
