"""How a formula's source is read, and everything that is refused where it is defined."""

from __future__ import annotations

import ast
import itertools
import math
from collections.abc import Callable
from math import ceil, cos, pi, sin, sqrt
from typing import Any

import pytest
from hypothesis import given
from hypothesis import strategies as st

from calcpack import expression, formula_source
from calcpack.errors import FormulaError
from calcpack.formula import Branch, Formula, Line, formula, inch, psi
from calcpack.formula_source import flatten, lb, opposite, unit_constant, without_units
from calcpack.units import ANGLE, AREA, LENGTH, RATIO, STRESS, Angle, Area, Count, Force, Length, Ratio, Stress

own = formula("test of the reader")
width = 12.0
round_off = sin


def refused(function: Callable[..., float], message: str) -> None:
    with pytest.raises(FormulaError, match=message):
        own(function)


@own
def branched(*, h_below: Length, d_b: Length) -> Ratio:
    """Text that no digest sees."""
    a: Length = 2 * d_b  # a comment that no digest sees
    if h_below > 12 * inch and d_b < 1 * inch:
        psi_t = 1.3
    elif h_below > 24 * inch:
        psi_t = 1.2
    else:
        b = a / 2
        psi_t = b / b
    return psi_t


def test_lines_and_branches_are_read_in_order() -> None:
    first, choice = branched.body
    assert isinstance(first, Line)
    assert isinstance(choice, Branch)
    assert [line.target for line in branched.lines()] == ["a", "psi_t", "psi_t", "b", "psi_t"]
    assert [line.index for line in branched.lines()] == [1, 2, 3, 4, 5]
    assert [ast.unparse(test) for test in branched.conditions()] == [
        "h_below > 12 * inch and d_b < 1 * inch",
        "h_below > 24 * inch",
    ]
    assert len(list(flatten(branched.body))) == 7


def test_dimensions_come_from_annotation_table_and_result() -> None:
    dimensions = [line.dimension for line in branched.lines()]
    assert dimensions == [LENGTH, RATIO, RATIO, LENGTH, RATIO]
    assert branched.arguments == {"h_below": LENGTH, "d_b": LENGTH}
    assert branched.result == RATIO


def test_line_knows_its_text_and_symbols() -> None:
    @own
    def spaced(*, d_b: Length, s: Length) -> Length:
        s_clear_min = max(d_b, 1 * inch) + s - d_b
        return s_clear_min

    (line,) = spaced.lines()
    assert line.text == "max(d_b, 1) + s - d_b"
    assert line.names == ("d_b", "s")


def test_free_hand_formula_takes_any_name_with_an_annotation() -> None:
    @own
    def of_my_own(*, wall: Length, bay: Length, turn: Angle) -> Area:
        slanted: Length = wall / cos(turn)
        share: Ratio = slanted / bay
        panel = share * slanted * bay
        return panel

    assert [line.dimension for line in of_my_own.lines()] == [LENGTH, RATIO, AREA]
    assert of_my_own.arguments["turn"] == ANGLE
    assert of_my_own(wall=3.0, bay=2.0, turn=0.0) == 9.0


def test_a_name_set_twice_keeps_its_dimension() -> None:
    @own
    def twice(*, d_b: Length) -> Length:
        run: Length = 2 * d_b
        run = run + d_b
        s = run
        return s

    assert [line.dimension for line in twice.lines()] == [LENGTH, LENGTH, LENGTH]


def test_unannotated_local_outside_the_table_is_refused() -> None:
    def unknown(*, d_b: Length) -> Length:
        offset = 2 * d_b
        s = offset
        return s

    refused(unknown, r"unknown: offset is not in the notation table; annotate .* e\.g\. 'offset: Length = …'")


def test_annotation_without_a_dimension_is_refused(tmp_path: Any) -> None:
    def plain(*, d_b: Length) -> Length:
        offset: float = 2 * d_b
        s = offset
        return s

    refused(plain, r"plain: offset has no dimension: annotate it as Length, Stress, Force, Ratio, …")
    with pytest.raises(FormulaError, match=r"f: offset: name 'Lenght' is not defined; import it"):
        defined(tmp_path, "offset: Lenght = 2*d_b\ns = offset")


def test_arguments_state_their_dimension(tmp_path: Any) -> None:
    def bare(*, d_b) -> Length:
        s = d_b
        return s

    def floating(*, d_b: float) -> Length:
        s = d_b
        return s

    def open_result(*, d_b: Length):
        s = d_b
        return s

    refused(bare, "bare: d_b has no dimension: annotate it as Length")
    refused(floating, "floating: d_b has no dimension")
    refused(open_result, "open_result: the result has no dimension")
    with pytest.raises(FormulaError, match="f: name 'Lenght' is not defined where its arguments are annotated; import"):
        defined(tmp_path, "s = d_b", arguments="d_b: 'Lenght'")


def test_arguments_are_keyword_only_without_default() -> None:
    def positional(d_b: Length) -> Length:
        s = d_b
        return s

    def defaulted(*, d_b: Length = 1.0) -> Length:
        s = d_b
        return s

    def gathered(**d_b: Length) -> Length:
        s = d_b
        return s

    refused(positional, "positional: argument d_b must be keyword-only, without default")
    refused(defaulted, "defaulted: argument d_b must be keyword-only, without default")
    refused(gathered, "gathered: argument d_b must be keyword-only, without default")


def test_body_ends_with_return_and_a_name() -> None:
    def direct(*, d_b: Length) -> Length:
        return 2 * d_b

    def nothing(*, d_b: Length) -> Length:
        """Only words."""

    for function in (direct, nothing):
        refused(function, "the last statement must be 'return' and the name of the result")


@pytest.mark.parametrize("end", ["return 2*s", "return s, d_b", "return", "return 1", "d_b = 2", "pass"])
def test_other_ends_are_refused(end: str, tmp_path: Any) -> None:
    with pytest.raises(FormulaError, match="f: the last statement must be 'return' and the name of the result"):
        defined(tmp_path, "s = d_b", end=end)


def test_result_is_set_by_a_line_on_every_path() -> None:
    def untouched(*, d_b: Length) -> Length:
        return d_b

    def one_side(*, d_b: Length) -> Length:
        if d_b > 1 * inch:
            s = d_b
        return s

    refused(untouched, "untouched: d_b is returned, and not on every path set by a line")
    refused(one_side, "one_side: s is returned, and not on every path set by a line")


def test_symbol_of_one_side_is_unknown_after_the_branch() -> None:
    def half(*, d_b: Length) -> Length:
        if d_b > 1 * inch:
            c_c = d_b
        else:
            s = d_b
        s = 2 * c_c
        return s

    refused(half, "half: c_c is neither an argument nor set by a line above on every path")


def test_symbol_of_both_sides_is_known_after_the_branch() -> None:
    @own
    def both(*, d_b: Length) -> Length:
        if d_b > 1 * inch:
            c_c = d_b
        else:
            c_c = 2 * d_b
        s = 2 * c_c
        return s

    assert (both(d_b=2.0), both(d_b=1.0)) == (4.0, 4.0)


@pytest.mark.parametrize(
    "statement",
    [
        "s += 1",
        "s = c_c = d_b",
        "s, c_c = d_b, d_b",
        "for s in (1, 2): pass",
        "while d_b: pass",
        "with d_b: pass",
        "import math",
        "pass",
        "print(d_b)",
        "assert d_b",
        "def inner(): pass",
        "raise ValueError",
        "try:\n    s = 1\nfinally:\n    s = 2",
        "s: Length",
        "if d_b > 1:\n    return s",
        "s[0] = 1",
        "d_b.x = 1",
    ],
)
def test_statements_that_cannot_be_printed_are_refused(statement: str, tmp_path: Any) -> None:
    with pytest.raises(FormulaError, match=r"f: .* cannot be printed; a formula holds lines 'symbol = expression'"):
        defined(tmp_path, statement)


def defined(
    folder: Any, statement: str, arguments: str = "d_b: Length", before: str = "", end: str = "return s"
) -> Formula:
    """A formula `f` of one statement, defined in a file of its own."""
    body = "\n    ".join(statement.splitlines())
    source = (
        "from math import *\nfrom calcpack.formula import formula, inch, psi\nfrom calcpack.units import *\n"
        f"{before}\n@formula('x')\ndef f(*, {arguments}) -> Length:\n    {body}\n    {end}\n"
    )
    path = folder / f"module_{next(_COUNT)}.py"
    path.write_text(source, "utf-8")
    scope: dict[str, Any] = {"__name__": "made"}
    exec(compile(source, str(path), "exec"), scope)
    made = scope["f"]
    assert isinstance(made, Formula)
    return made


_COUNT = itertools.count()


@pytest.mark.parametrize(
    ("expression_", "message"),
    [
        ("d_b.real", r"not allowed in a formula: 'd_b\.real'"),
        ("d_b if d_b > 1 else 2", "not allowed in a formula"),
        ("sum([d_b])", "not allowed in a formula"),
        ("pow(d_b, 2)", "not allowed in a formula"),
        ("d_b > 1", "not allowed in a formula"),
        ("'x'", "not allowed in a formula"),
        ("d_b % 2", "not allowed in a formula"),
        ("d_bar + 1", "f: d_bar is neither an argument nor set by a line above on every path"),
        ("s + d_b", "f: s is neither an argument nor set by a line above on every path"),
        ("d_b*inch", "f: inch stands alone; write '12\\*inch', number first"),
        ("inch*2 + d_b", "f: inch stands alone"),
        ("d_b*2*inch", "f: inch stands alone"),
        ("-2*inch + d_b", "f: inch stands alone"),
        ("inch", "f: inch stands alone"),
        ("2*lb", "f: lb is neither an argument nor set by a line above"),
    ],
)
def test_expressions_refused_where_they_are_written(expression_: str, message: str, tmp_path: Any) -> None:
    with pytest.raises(FormulaError, match=message):
        defined(tmp_path, f"s = {expression_}")


@pytest.mark.parametrize("condition", ["d_b", "d_b > 1 and d_b", "d_b < 2 or -d_b"])
def test_a_value_is_no_condition(condition: str, tmp_path: Any) -> None:
    with pytest.raises(FormulaError, match=r"not a condition: -?d_b"):
        defined(tmp_path, f"s = d_b\nif {condition}:\n    s = 1")


@pytest.mark.parametrize("condition", ["not d_b > 1", "d_b is d_b", "d_b in (1, 2)", "(d_b > 1) == 1", "True"])
def test_conditions_outside_the_language_are_refused(condition: str, tmp_path: Any) -> None:
    with pytest.raises(FormulaError, match="not allowed in a formula"):
        defined(tmp_path, f"s = d_b\nif {condition}:\n    s = 1")


@pytest.mark.parametrize("name", ["pi", "inch", "psi", "lb", "sqrt", "min", "sin", "hypot"])
def test_names_with_a_meaning_of_their_own_are_no_symbols(name: str, tmp_path: Any) -> None:
    with pytest.raises(FormulaError, match=f"f: {name} has a meaning of its own; choose another symbol"):
        defined(tmp_path, f"s = 2*{name}", arguments=f"{name}: Length")
    with pytest.raises(FormulaError, match=f"f: {name} has a meaning of its own; choose another symbol"):
        defined(tmp_path, f"{name}: Length = 2*d_b\ns = d_b")


@pytest.mark.parametrize(
    ("before", "used"),
    [
        ("def sqrt(x): return x", "sqrt(d_b)"),
        ("from cmath import sqrt", "sqrt(d_b)"),
        ("min = max", "min(d_b, 1)"),
        ("abs = float", "abs(d_b)"),
        ("from statistics import mean as max", "max(d_b, 1)"),
        ("pi = 3", "pi*d_b"),
        ("del sin", "sin(d_b)*d_b"),
        ("del pi", "pi*d_b"),
    ],
)
def test_shadowed_functions_are_refused(before: str, used: str, tmp_path: Any) -> None:
    name = used.split("(")[0].split("*")[0]
    with pytest.raises(FormulaError, match=f"f: {name} is not math's; write 'from math import {name}'"):
        defined(tmp_path, f"s = {used}", before=before)


def test_shadowed_unit_is_refused(tmp_path: Any) -> None:
    with pytest.raises(FormulaError, match="f: inch is neither an argument nor set by a line above"):
        defined(tmp_path, "s = 2*inch", before="inch = 25.4")


def test_function_shadowed_by_the_enclosing_scope_is_refused() -> None:
    min = max

    def inner(*, d_b: Length) -> Length:
        s = min(d_b, 2.0)
        return s

    refused(inner, "inner: min is not math's; write 'from math import min'")


def test_global_numbers_are_no_symbols() -> None:
    def outside(*, d_b: Length) -> Length:
        s = width * d_b
        return s

    def renamed(*, d_b: Length) -> Length:
        s = round_off(d_b)
        return s

    refused(outside, "outside: width is neither an argument nor set by a line above")
    refused(renamed, r"not allowed in a formula: 'round_off\(d_b\)'")


def test_functions_of_math_and_pi_are_taken() -> None:
    @own
    def ring(*, d_b: Length, turn: Angle, n: Count) -> Length:
        s = ceil(n) * pi * d_b * sin(turn) * sqrt(n) + min(d_b, 1 * inch)
        return s

    assert ring(d_b=2.0, turn=0.0, n=4.0) == 1.0


def test_source_that_cannot_be_read_is_refused() -> None:
    scope: dict[str, Any] = {"Length": Length}
    exec("def f(*, d_b: Length) -> Length:\n    s = d_b\n    return s", scope)
    refused(scope["f"], "f: its source cannot be read; define it in a file or a cell")


def test_dimensioned_constants() -> None:
    assert (inch, psi, lb) == (1.0, 1.0, 1.0)
    found = {
        text: unit_constant(expression.parse(text)) for text in ("12*inch", "2.5*psi", "3*lb", "inch*12", "a*inch")
    }
    assert found == {"12*inch": (12, "in"), "2.5*psi": (2.5, "psi"), "3*lb": (3, "lb"), "inch*12": None, "a*inch": None}
    assert unit_constant(expression.parse("12*feet")) is None


def test_without_units_leaves_the_original_alone() -> None:
    node = expression.parse("max(d_b, 1*inch) + 4000*psi/f_c")
    assert expression.infix(without_units(node)) == "max(d_b, 1) + 4000 / f_c"
    assert expression.infix(node) == "max(d_b, 1 * inch) + 4000 * psi / f_c"


@pytest.mark.parametrize(
    ("test", "other"),
    [
        ("a < b", "a >= b"),
        ("a <= b", "a > b"),
        ("a > b", "a <= b"),
        ("a >= b", "a < b"),
        ("a == b", "a != b"),
        ("a != b", "a == b"),
        ("a < b and b < c", "a >= b or b >= c"),
        ("a < b or b < c", "a >= b and b >= c"),
        ("a < b < c", "a >= b or b >= c"),
        ("a < b and (b < c or c < a)", "a >= b or (b >= c and c >= a)"),
        ("a < b <= c and c != a", "(a >= b or b > c) or c == a"),
    ],
)
def test_opposite_by_de_morgan(test: str, other: str) -> None:
    assert ast.unparse(opposite(expression.parse(test, condition=True))) == other


def test_opposite_of_a_value_is_refused() -> None:
    with pytest.raises(FormulaError, match=r"not a condition: a \+ b"):
        opposite(expression.parse("a + b"))


RELATION = st.tuples(
    st.sampled_from("abc"), st.sampled_from(["<", "<=", ">", ">=", "==", "!="]), st.sampled_from("abc1")
)
TESTS = st.recursive(
    RELATION.map(" ".join),
    lambda inner: st.tuples(inner, st.sampled_from(["and", "or"]), inner).map(lambda part: f"({' '.join(part)})"),
    max_leaves=6,
)


@given(TESTS, st.fixed_dictionaries({name: st.sampled_from([0.0, 1.0, 2.0]) for name in "abc"}))
def test_exactly_one_of_a_condition_and_its_opposite_holds(text: str, values: dict[str, float]) -> None:
    node = expression.parse(text, condition=True)
    truths = [expression.evaluate(ast.unparse(one), values, condition=True) for one in (node, opposite(node))]
    assert sorted(truths) == [0.0, 1.0]


def key_of(folder: Any, statement: str, **more: str) -> str:
    return defined(folder, statement, **more).key


def test_key_ignores_words_and_spacing(tmp_path: Any) -> None:
    plain = key_of(tmp_path, "s = 2*d_b + 1")
    assert key_of(tmp_path, '"""Words."""\ns = 2*d_b + 1') == plain
    assert key_of(tmp_path, '"""Other words."""\ns = 2*d_b + 1  # why') == plain
    assert key_of(tmp_path, "s = (2*d_b\n     + 1)") == plain
    assert len(plain) == 24


def test_key_changes_with_the_source(tmp_path: Any) -> None:
    sources = [
        "s = 2*d_b + 1",
        "s = 1 + 2*d_b",
        "s = 2.0*d_b + 1",
        "s = 2*d_b - 1",
        "s = 2*(d_b + 1)",
        "s: Length = 2*d_b + 1",
        "c_c = 2*d_b\ns = c_c + 1",
        "if d_b > 1:\n    s = 1\nelse:\n    s = 2",
        "if d_b >= 1:\n    s = 1\nelse:\n    s = 2",
    ]
    keys = [key_of(tmp_path, source) for source in sources]
    assert len(set(keys)) == len(keys)


def test_key_changes_with_the_dimension_of_an_argument(tmp_path: Any) -> None:
    assert key_of(tmp_path, "s = 2*d_b") != key_of(tmp_path, "s = 2*d_b", arguments="d_b: Stress")


def test_unit_constants_are_the_coherent_units() -> None:
    from calcpack.units import factor

    assert {name: factor(unit) for name, unit in formula_source.UNIT_CONSTANTS.items()} == dict.fromkeys(
        ("inch", "psi", "lb"), 1.0
    )


@own
def forces(*, P_u: Force, A_g: Area) -> Stress:
    """A quotient."""
    q_u = P_u / A_g
    return q_u


def test_result_of_a_quotient() -> None:
    assert forces.result == STRESS
    assert forces(P_u=-10.0, A_g=4.0) == -2.5
    assert math.isclose(forces.record(P_u=-10.0, A_g=4.0).value, -2.5)
