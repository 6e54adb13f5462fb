"""A combination as a formula: what is printed is what ran."""

from __future__ import annotations

import math

import pytest
from hypothesis import given
from hypothesis import strategies as st

from calcpack import symbols
from calcpack.errors import FormulaError, RangeError
from calcpack.expression import evaluate
from calcpack.loads.combinations import LOADS, STANDARDS, Settings, combinations
from calcpack.loads.equations import combination_formula
from calcpack.loads.standards import ASCE_7_16, ASCE_7_22
from calcpack.typeset.layout import lay_out
from calcpack.units import FORCE, MOMENT

# handcalcs calls names of pyparsing that are due to go.
pytestmark = pytest.mark.filterwarnings("ignore::DeprecationWarning")

CLAUSE = ASCE_7_16("2.3.1")
LIVE = (("P_D", 1.2), ("P_L", 1.6), ("P_Lr", 0.5))


def test_the_line_is_the_combination() -> None:
    made = combination_formula(LIVE, "P_u", FORCE, CLAUSE)
    (line,) = made.lines()
    assert (line.target, line.text, line.dimension) == ("P_u", "1.2 * P_D + 1.6 * P_L + 0.5 * P_Lr", FORCE)
    assert made.arguments == {"P_D": FORCE, "P_L": FORCE, "P_Lr": FORCE}
    assert (made.result, made.result_name, made.empirical) == (FORCE, "P_u", False)
    assert str(made.clause()) == "ASCE 7-16 2.3.1"
    assert made.__doc__ == "Factored axial force, compression positive."
    assert made.name == "combined_P_u"
    # by hand: 1.2 x 100 + 1.6 x 50 + 0.5 x 10
    assert made(P_D=100.0, P_L=50.0, P_Lr=10.0) == 205.0


@pytest.mark.parametrize(
    ("terms", "text"),
    [
        ((("P_D", 1.4),), "1.4 * P_D"),
        ((("P_D", 0.9), ("P_W", -1.0)), "0.9 * P_D - P_W"),
        ((("P_D", 1.2), ("P_W", 1.0), ("P_L", 0.5)), "1.2 * P_D + P_W + 0.5 * P_L"),
        ((("P_D", 1.366), ("P_E", -1.3)), "1.366 * P_D - 1.3 * P_E"),
        ((("P_W", 0.5),), "0.5 * P_W"),
        ((("P_E", -1.3),), "-(1.3 * P_E)"),
        ((("P_W", -1.0),), "-P_W"),
        ((("P_W", -1.0), ("P_D", 1.2)), "-P_W + 1.2 * P_D"),
    ],
)
def test_signs_and_factors_of_one(terms: tuple[tuple[str, float], ...], text: str) -> None:
    made = combination_formula(terms, "P_u", FORCE, CLAUSE)
    (line,) = made.lines()
    assert line.text == text
    values = {name: float(7 * place + 3) for place, (name, _) in enumerate(terms)}
    assert math.isclose(made(**values), sum(factor * values[name] for name, factor in terms), rel_tol=1e-14)
    lay_out(line.value)


def test_a_sign_stands_before_a_lone_product() -> None:
    (line,) = combination_formula((("P_E", -1.3),), "P_u", FORCE, CLAUSE).lines()
    assert lay_out(line.value).tree == ("neg", ("mul", (("slot", 0), ("slot", 1))))


def test_one_formula_for_a_shape() -> None:
    assert combination_formula(LIVE, "P_u", FORCE, CLAUSE) is combination_formula(LIVE, "P_u", FORCE, CLAUSE)
    other = combination_formula(LIVE, "P_u", FORCE, ASCE_7_22("2.3.1"))
    assert str(other.clause()) == "ASCE 7-22 2.3.1"
    assert other.source == combination_formula(LIVE, "P_u", FORCE, CLAUSE).source


def test_formulas_of_one_name_do_not_mix() -> None:
    """The second has the same name as the first and another source."""
    first = combination_formula((("M_x_D", 1.2), ("M_x_L", 1.6)), "M_ux", MOMENT, CLAUSE)
    second = combination_formula((("M_x_D", 1.4),), "M_ux", MOMENT, CLAUSE)
    assert first.name == second.name
    assert [line.text for made in (first, second) for line in made.lines()] == [
        "1.2 * M_x_D + 1.6 * M_x_L", "1.4 * M_x_D",
    ]  # fmt: skip
    assert (first(M_x_D=1.0, M_x_L=1.0), second(M_x_D=1.0)) == (2.8, 1.4)


def test_what_is_no_force_is_refused() -> None:
    made = combination_formula(LIVE, "P_u", FORCE, CLAUSE)
    with pytest.raises(RangeError, match=r"P_L = nan lb\s+has to be a force, a finite number"):
        made(P_D=1.0, P_L=math.nan, P_Lr=0.0)
    with pytest.raises(TypeError, match="combined_P_u: missing P_Lr"):
        made(P_D=1.0, P_L=1.0)
    with pytest.raises(FormulaError, match="combined_P_u: pi has a meaning of its own"):
        combination_formula((("pi", 1.2),), "P_u", FORCE, CLAUSE)


SYMBOLS = {
    "P_u": ("P_{}", FORCE),
    "M_ux": ("M_x_{}", MOMENT),
    "M_uy_bottom": ("M_y_bottom_{}", MOMENT),
    "M_ux_top": ("M_x_top_{}", MOMENT),
    "V_uy": ("V_y_{}", FORCE),
    "T_u": ("T_{}", MOMENT),
}


@pytest.mark.parametrize("result", SYMBOLS)
@pytest.mark.parametrize("standard", STANDARDS)
@given(data=st.data())
def test_every_combination_prints_what_it_computes(standard: str, result: str, data: st.DataObject) -> None:
    listed = combinations(standard, LOADS, Settings(S_DS=0.83, rho=1.3))
    one = data.draw(st.sampled_from(listed))
    form, dimension = SYMBOLS[result]
    terms = tuple((form.format(load), factor) for load, factor in one.terms)
    made = combination_formula(terms, result, dimension, one.clause)
    values = {name: data.draw(st.floats(-1e6, 1e6)) for name, _ in terms}
    (recorded,) = made.record(**values).lines
    assert recorded.value == evaluate(recorded.line.text, values)
    by_hand = sum(factor * values[name] for name, factor in terms)
    assert math.isclose(recorded.value, by_hand, rel_tol=1e-9, abs_tol=1e-6)


@pytest.mark.parametrize("load", LOADS)
def test_every_effect_of_a_load_is_in_the_notation_table(load: str) -> None:
    forces = {f"{effect}_{load}": FORCE for effect in ("P", "V_x", "V_y")}
    ends = [f"M_{axis}{end}_{load}" for axis in "xy" for end in ("", "_bottom", "_top")]
    moments = dict.fromkeys([*ends, f"T_{load}"], MOMENT)
    for name, dimension in (forces | moments).items():
        symbol = symbols.lookup(name)
        assert (symbol.dimension, symbol.sign) == (dimension, "any")
        assert symbol.meaning.endswith(symbols.lookup(f"P_{load}").meaning.removeprefix("axial force"))
