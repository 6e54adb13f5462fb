"""Formulas as they are called and recorded: ranges, branches, conditions, clauses."""

from __future__ import annotations

import ast
import math
import re
from math import log, sqrt
from typing import Any

import pytest
from hypothesis import given
from hypothesis import strategies as st

from calcpack.errors import FormulaError, RangeError
from calcpack.formula import Clause, Formula, Limit, Recording, Standard, formula, inch, psi
from calcpack.units import LENGTH, RATIO, STRESS, Area, Count, Force, Length, Moment, Ratio, Stress

ACI_14 = Standard("ACI 318-14")
ACI_19 = Standard("ACI 318-19", "Building Code Requirements for Structural Concrete")
DIAMETERS = (0.375, 0.5, 0.625, 0.75, 0.875, 1.0, 1.128, 1.27, 1.41)  # published: ASTM A615, table 1, No. 3 to No. 11


@formula(
    ACI_14("25.4.2.3a"),
    ACI_19("25.4.2.4a"),
    empirical=True,
    limits=(
        Limit("f_c", "ACI 318-19 19.2.1.1", low=2500.0),
        Limit("f_y", "ACI 318-19 Table 20.2.2.4a", high=100_000.0),
        Limit("lamb", "ACI 318-19 19.2.4", low=0.75, high=1.0),
        Limit("d_b", "ASTM A615", values=DIAMETERS),
    ),
)
def straight_tension(
    *, f_y: Stress, f_c: Stress, lamb: Ratio, psi_t: Ratio, psi_e: Ratio, c_b: Length, K_tr: Length, d_b: Length
) -> Length:
    """Development length of a deformed bar in tension."""
    psi_te = min(psi_t * psi_e, 1.7)
    confinement = min((c_b + K_tr) / d_b, 2.5)
    root_f_c = min(sqrt(f_c), 100)
    l_d = 3 / 40 * f_y / (lamb * root_f_c) * psi_te / confinement * d_b
    return l_d


@formula("rule of the firm")
def casting(*, h_below: Length, f_c: Stress, n: Count) -> Ratio:
    """A rule with nested and compound conditions."""
    if h_below > 12 * inch:
        if (f_c >= 4000 * psi and n < 4) or n == 7:
            psi_t = 1.3
        else:
            psi_t = 1.2
    elif h_below == 0:
        psi_t = 0.9
    else:
        psi_t = 1.0
    return psi_t


@formula("statics")
def couple(*, P_u: Force, L: Length) -> Moment:
    """A force at an arm."""
    M_u = P_u * L
    return M_u


GOOD: dict[str, float] = {
    "f_y": 60_000.0,
    "f_c": 4000.0,
    "lamb": 1.0,
    "psi_t": 1.3,
    "psi_e": 1.0,
    "c_b": 2.5,
    "K_tr": 0.0,
    "d_b": 1.0,
}


def with_(**changed: float) -> dict[str, float]:
    return {**GOOD, **changed}


def test_call_evaluates_the_body() -> None:
    # By hand: 3/40 * 60000/63.2456 * 1.3/2.5 * 1.0 = 36.9986.
    assert straight_tension(**GOOD) == pytest.approx(36.9986, abs=5e-5)


def test_formula_keeps_the_function_and_its_words() -> None:
    assert straight_tension.__doc__ == "Development length of a deformed bar in tension."
    assert straight_tension.name == straight_tension.__name__ == "straight_tension"
    assert straight_tension.__module__ == __name__
    assert straight_tension.function(**GOOD) == straight_tension(**GOOD)
    assert straight_tension.empirical
    assert not casting.empirical
    assert straight_tension.arguments["f_y"] == STRESS
    assert list(straight_tension.arguments) == list(GOOD)
    assert straight_tension.result == LENGTH


def test_repr_states_the_clauses() -> None:
    assert repr(straight_tension) == "<formula straight_tension: ACI 318-14 25.4.2.3a; ACI 318-19 25.4.2.4a>"
    assert repr(casting) == "<formula casting: rule of the firm>"


def test_clause_of_an_edition() -> None:
    assert str(straight_tension.clause()) == "ACI 318-14 25.4.2.3a"
    assert str(straight_tension.clause(ACI_19)) == "ACI 318-19 25.4.2.4a"
    assert casting.clause(ACI_19) == Clause("rule of the firm")
    assert ACI_19("1.2") == Clause("1.2", ACI_19)


def test_clause_of_another_standard_is_refused() -> None:
    message = r"straight_tension is not in ASCE 7-16; it stands in ACI 318-14 25\.4\.2\.3a, ACI 318-19 25\.4\.2\.4a"
    with pytest.raises(FormulaError, match=message):
        straight_tension.clause(Standard("ASCE 7-16"))


@pytest.mark.parametrize("clauses", [(), ("",), ("  ",), ("25.4", "")])
def test_a_formula_states_its_source(clauses: tuple[str, ...]) -> None:
    with pytest.raises(
        FormulaError, match=r"a formula states where it comes from: @formula\(ACI_318_19\('25\.4\.2\.4a'\)\)"
    ):
        formula(*clauses)


def test_limit_on_something_else_is_refused() -> None:
    def plain(*, d_b: Length) -> Length:
        s = d_b
        return s

    with pytest.raises(FormulaError, match="plain: limits on f_c, h, which are not arguments"):
        formula("x", limits=(Limit("f_c", "y"), Limit("d_b", "y"), Limit("h", "y")))(plain)


# Values exactly on the limits, both sides of each.
@pytest.mark.parametrize(
    ("name", "allowed", "message"),
    [
        ("f_c", 2500.0, ""),
        ("f_c", math.nextafter(2500.0, 0), r"f_c = 2,500 psi\s+allowed 2,500 psi and up \(ACI 318-19 19\.2\.1\.1\)"),
        ("f_c", 2499.9999, r"f_c = 2,499\.9999 psi\s+allowed 2,500 psi and up \(ACI 318-19 19\.2\.1\.1\)"),
        ("f_y", 100_000.0, ""),
        ("f_y", 100_001.0, r"f_y = 100,001 psi\s+allowed up to 100,000 psi \(ACI 318-19 Table 20\.2\.2\.4a\)"),
        ("f_y", 0.0, r"f_y = 0 psi\s+has to be a stress or pressure above zero"),
        ("lamb", 0.75, ""),
        ("lamb", 1.0, ""),
        ("lamb", 0.7499, r"lamb = 0\.7499\s+allowed 0\.75 to 1 \(ACI 318-19 19\.2\.4\)"),
        ("lamb", 1.0001, r"lamb = 1\.0001\s+allowed 0\.75 to 1"),
        ("d_b", 1.128, ""),
        ("d_b", 1.13, r"d_b = 1\.13 in\s+one of 0\.375, 0\.5, .*, 1\.41 in \(ASTM A615\)"),
        ("psi_t", math.ulp(0.0), ""),
        ("psi_t", 0.0, r"psi_t = 0\s+has to be a ratio above zero"),
        ("psi_t", -1.0, r"psi_t = -1\s+has to be a ratio above zero"),
        ("K_tr", 0.0, ""),
        ("K_tr", -0.001, r"K_tr = -0\.001 in\s+has to be a length, zero or more"),
        ("c_b", 1e30, ""),
        ("c_b", 1.1e30, r"c_b = 1\.1e\+30 in\s+has to be a length above zero"),
    ],
)
def test_limits_to_the_last_digit(name: str, allowed: float, message: str) -> None:
    if not message:
        assert straight_tension(**with_(**{name: allowed})) > 0
        return
    with pytest.raises(RangeError, match=message):
        straight_tension(**with_(**{name: allowed}))


@pytest.mark.parametrize("name", GOOD)
@pytest.mark.parametrize("value", [math.nan, math.inf, -math.inf])
def test_not_finite_is_refused_everywhere(name: str, value: float) -> None:
    with pytest.raises(RangeError, match=rf"1 argument out of range\n  {name} = -?(nan|inf)"):
        straight_tension(**with_(**{name: value}))


@pytest.mark.parametrize("value", [math.nan, math.inf, -math.inf])
def test_not_finite_is_refused_where_any_sign_is_allowed(value: float) -> None:
    assert couple(P_u=-5.0, L=2.0) == -10.0
    with pytest.raises(RangeError, match=r"P_u = -?(nan|inf) lb\s+has to be a force, a finite number"):
        couple(P_u=value, L=2.0)


def test_all_problems_at_once_with_units() -> None:
    with pytest.raises(RangeError, match="straight_tension: 4 arguments out of range") as caught:
        straight_tension(**with_(f_c=40.0, d_b=0.9, lamb=2.0, K_tr=-1.0))
    lines = str(caught.value).splitlines()
    assert [line.split(" = ")[0].strip() for line in lines[1:]] == ["K_tr", "f_c", "lamb", "d_b"]
    assert caught.value.problems[1].given == "f_c = 40 psi"


@pytest.mark.parametrize(
    ("f_c", "guess"), [(4.0, "4,000"), (40.0, "4,000"), (25.0, "2,500"), (2.5, "2,500"), (0.001, ""), (-4.0, "")]
)
def test_a_strength_in_other_units_is_guessed_at(f_c: float, guess: str) -> None:
    with pytest.raises(RangeError) as caught:
        straight_tension(**with_(f_c=f_c))
    assert caught.value.problems[0].remedy == (f"was this meant to be {guess} psi?" if guess else "")


def test_missing_and_unknown_arguments() -> None:
    with pytest.raises(TypeError, match="casting: missing f_c, n"):
        casting(h_below=12.0)
    with pytest.raises(TypeError, match="unexpected keyword argument 'depth'"):
        couple(P_u=1.0, L=2.0, depth=3.0)
    positional: Any = couple
    with pytest.raises(TypeError, match="positional argument"):
        positional(1.0, 2.0)


@formula("own")
def troubled(*, x: Ratio, y: Ratio) -> Ratio:
    """Has no value everywhere."""
    root: Ratio = sqrt(x)
    alpha = log(root) / y
    return alpha


@formula("own")
def powered(*, x: Ratio, y: Ratio) -> Ratio:
    """A power that leaves the real numbers, or the floats."""
    alpha = x**y
    return alpha


@pytest.mark.parametrize(
    ("x", "y", "reason"),
    [(-1.0, 1.0, "math domain error"), (1.0, 0.0, "division by zero"), (0.0, 1.0, "math domain error")],
)
def test_no_value_is_a_range_error_with_the_arguments(x: float, y: float, reason: str) -> None:
    message = rf"troubled: no result\n  x = {x:g}, y = {y:g}  arguments for which the equation has a value \(.*{reason}"
    with pytest.raises(RangeError, match=message):
        troubled(x=x, y=y)


def test_overflow_is_a_range_error() -> None:
    with pytest.raises(RangeError, match=r"powered: no result\n  x = 1e\+29, y = 20 "):
        powered(x=1e29, y=20.0)


def test_record_refuses_what_is_not_real() -> None:
    with pytest.raises(FormulaError, match=r"powered: alpha = .*j\) is not a finite real number"):
        powered.record(x=-8.0, y=0.5)


def test_record_keeps_lines_values_and_arguments() -> None:
    recording = straight_tension.record(**GOOD)
    assert isinstance(recording, Recording)
    assert recording.arguments == GOOD
    assert [line.line.target for line in recording.lines] == ["psi_te", "confinement", "root_f_c", "l_d"]
    # By hand: 1.3 * 1.0 below 1.7; 2.5/1.0 on the cap; sqrt(4000) below 100.
    assert [line.value for line in recording.lines][:3] == [1.3, 2.5, pytest.approx(63.2456, abs=5e-5)]
    assert recording.value == straight_tension(**GOOD)
    assert all(line.condition == "" for line in recording.lines)


@pytest.mark.parametrize(
    ("f_c", "root"), [(9_999.0, math.sqrt(9999)), (10_000.0, 100.0), (10_001.0, 100.0), (2500.0, 50.0)]
)
def test_cap_on_both_sides_and_on_it(f_c: float, root: float) -> None:
    assert straight_tension.record(**with_(f_c=f_c)).lines[2].value == pytest.approx(root, rel=1e-15)


# Worked by hand from the rule above.
BRANCHES = [
    (12.1, 4000.0, 3.0, 1.3, "h_below > 12 and (f_c >= 4000 and n < 4 or n == 7)"),
    (12.1, 3999.0, 7.0, 1.3, "h_below > 12 and (f_c >= 4000 and n < 4 or n == 7)"),
    (12.1, 4000.0, 4.0, 1.2, "h_below > 12 and ((f_c < 4000 or n >= 4) and n != 7)"),
    (12.1, 3999.0, 3.0, 1.2, "h_below > 12 and ((f_c < 4000 or n >= 4) and n != 7)"),
    (12.0, 4000.0, 3.0, 1.0, "h_below <= 12 and h_below != 0"),
    (11.9, 4000.0, 3.0, 1.0, "h_below <= 12 and h_below != 0"),
    (0.0, 4000.0, 3.0, 0.9, "h_below <= 12 and h_below == 0"),
]


@pytest.mark.parametrize(("h_below", "f_c", "n", "value", "condition"), BRANCHES)
def test_branch_taken_and_its_condition(h_below: float, f_c: float, n: float, value: float, condition: str) -> None:
    recording = casting.record(h_below=h_below, f_c=f_c, n=n)
    (line,) = recording.lines
    assert (recording.value, line.value) == (value, value)
    assert line.condition == condition


@given(st.floats(0, 30), st.floats(3000, 5000), st.sampled_from([3.0, 4.0, 7.0, 8.0]))
def test_printed_condition_holds_and_the_recording_is_the_call(h_below: float, f_c: float, n: float) -> None:
    from calcpack.expression import evaluate

    arguments = {"h_below": h_below, "f_c": f_c, "n": n}
    recording = casting.record(**arguments)
    assert recording.value == casting(**arguments)
    assert evaluate(recording.lines[-1].condition, arguments, condition=True) == 1.0


@given(
    st.fixed_dictionaries(
        {
            "f_y": st.floats(40_000, 100_000),
            "f_c": st.floats(2500, 20_000),
            "lamb": st.floats(0.75, 1.0),
            "psi_t": st.floats(1.0, 1.3),
            "psi_e": st.floats(1.0, 1.5),
            "c_b": st.floats(0.5, 6.0),
            "K_tr": st.floats(0.0, 3.0),
            "d_b": st.sampled_from(DIAMETERS),
        }
    )
)
def test_recording_equals_the_call_bit_for_bit(arguments: dict[str, float]) -> None:
    recording = straight_tension.record(**arguments)
    assert recording.value == straight_tension(**arguments) == straight_tension.function(**arguments)


@given(
    st.fixed_dictionaries({"f_c": st.floats(2500, 20_000), "c_b": st.floats(0.5, 6.0), "psi_t": st.floats(1.0, 1.3)})
)
def test_every_line_evaluates_from_its_text_alone(changed: dict[str, float]) -> None:
    from calcpack.expression import evaluate

    recording = straight_tension.record(**with_(**changed))
    known = dict(recording.arguments)
    for recorded in recording.lines:
        assert evaluate(recorded.line.text, known) == recorded.value
        known[recorded.line.target] = recorded.value


@given(st.floats(2500, 9000), st.floats(1.01, 1.9))
def test_stronger_concrete_never_needs_more_length(f_c: float, times: float) -> None:
    # A physical law: more bond, shorter bar.
    assert straight_tension(**with_(f_c=f_c * times)) <= straight_tension(**with_(f_c=f_c))


def test_a_formula_that_ends_with_another_line_is_not_recorded() -> None:
    @formula("own")
    def misplaced(*, d_b: Length) -> Length:
        s = 2 * d_b
        c_c = 3 * s
        if c_c > 6 * inch:
            c_c = s
        return s

    assert misplaced(d_b=1.0) == 2.0
    with pytest.raises(FormulaError, match=r"misplaced: the recorded lines give .* the function 2"):
        misplaced.record(d_b=1.0)


def test_a_branch_not_taken_leaves_no_line() -> None:
    @formula("own")
    def raised(*, d_b: Length) -> Length:
        s = 2 * d_b
        if s < 1 * inch:
            s = max(s, 1 * inch)
        return s

    assert [line.condition for line in raised.record(d_b=0.25).lines] == ["", "s < 1"]
    assert [line.condition for line in raised.record(d_b=0.5).lines] == [""]
    assert (raised(d_b=0.25), raised(d_b=0.5), raised(d_b=0.75)) == (1.0, 1.0, 1.5)


@pytest.mark.parametrize(
    ("limit", "unit", "words"),
    [
        (Limit("f_c", "A", low=2500), "psi", "allowed 2,500 psi and up (A)"),
        (Limit("f_c", "A", high=80_000), "psi", "allowed up to 80,000 psi (A)"),
        (Limit("lamb", "A", low=0.75, high=1), "", "allowed 0.75 to 1 (A)"),
        (Limit("d_b", "A", values=(0.5, 1.128)), "in", "one of 0.5, 1.128 in (A)"),
        (Limit("n", "A", values=(4, 6)), "", "one of 4, 6 (A)"),
        (Limit("n", "a count above zero", natural=True), "", "has to be a count above zero"),
    ],
)
def test_limit_in_words(limit: Limit, unit: str, words: str) -> None:
    assert limit.words(unit) == words


@given(st.floats())
def test_limit_holds_between_its_ends(value: float) -> None:
    limit = Limit("x", "A", low=-1.0, high=2.0)
    assert limit.holds(value) == (-1.0 <= value <= 2.0)
    assert Limit("x", "A").holds(value) == (abs(value) <= 1e30)
    assert Limit("x", "A", values=(1.0, 2.0)).holds(value) == (value in (1.0, 2.0))


def test_key_is_a_digest_of_the_source() -> None:
    assert re.fullmatch("[0-9a-f]{24}", straight_tension.key)
    assert straight_tension.key != casting.key
    assert "Development length" not in straight_tension.source
    assert "min(psi_t * psi_e, 1.7)" in straight_tension.source


def test_conditions_of_a_formula() -> None:
    assert [ast.unparse(test) for test in casting.conditions()] == [
        "h_below > 12 * inch",
        "f_c >= 4000 * psi and n < 4 or n == 7",
        "h_below == 0",
    ]


def test_a_formula_of_a_notebook_states_its_source_in_words() -> None:
    @formula("worked out on drawing S-201")
    def tributary(*, bay: Length, strip: Length) -> Area:
        A_t = bay * strip
        return A_t

    assert isinstance(tributary, Formula)
    assert str(tributary.clause()) == "worked out on drawing S-201"
    assert tributary.arguments == {"bay": LENGTH, "strip": LENGTH}
    assert tributary(bay=-2.0, strip=3.0) == -6.0
    assert casting.result == RATIO
