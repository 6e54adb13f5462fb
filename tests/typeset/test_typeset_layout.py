"""Layouts: every construct laid out right or refused, and the proof that tells the difference."""

from __future__ import annotations

import random
from dataclasses import replace
from typing import Any

import pytest
from expressions import SYMBOLS, random_expression

from calcpack import expression
from calcpack.errors import FormulaError, LayoutError
from calcpack.typeset.layout import Layout, Slot, lay_out, prove
from calcpack.typeset.tree import Node, children, freeze, infix, rebuild, simplify, slots

SEED = 20261102


def laid(text: str, condition: bool = False) -> Layout:
    return lay_out(expression.parse(text, condition))


# What handcalcs is known to lose or change in silence, and how each has to read on the page instead.
CONSTRUCTS = [
    ("a/b/c", "((_0)/(_1*_2))"),
    ("a/(b/c)", "((_0)/(((_1)/(_2))))"),
    ("a*b/c*d", "((_0*_1)/(_2))*_3"),
    ("a*(b + c)", "_0*(_1+_2)"),
    ("a - (b - c)", "_0-(_1-_2)"),
    ("a - b - c", "_0-_1-_2"),
    ("a**2", "_0**(_1)"),
    ("a**(1/3)", "_0**(((_1)/(_2)))"),
    ("(a + b)**2", "(_0+_1)**(_2)"),
    ("(a/b)**2", "(((_0)/(_1)))**(_2)"),
    ("(a*b)**2", "(_0*_1)**(_2)"),
    ("a**b**c", "_0**(_1**(_2))"),
    ("(a**b)**c", "(_0**(_1))**(_2)"),
    ("a**(-b)", "_0**(-_1)"),
    ("sqrt(a + b)", "sqrt(_0+_1)"),
    ("sqrt(a)**3", "sqrt(_0)**(_1)"),
    ("min(max(a, b), c)", "min(max(_0,_1),_2)"),
    ("sin(a)", "sin(_0)"),
    ("exp(a)", "exp(_0)"),
    ("log(a)", "log(_0)"),
    ("log10(a)", "log10(_0)"),
    ("atan(a)", "atan(_0)"),
    ("atan2(a, b)", "atan2(_0,_1)"),
    ("asin(a/10)", "asin(((_0)/(_1)))"),
    ("hypot(a, b)", "hypot(_0,_1)"),
    ("ceil(a/b)", "ceil(((_0)/(_1)))"),
    ("floor(a)*b", "floor(_0)*_1"),
    ("abs(a - b)", "abs(_0-_1)"),
    ("(-a)*b", "(-_0)*_1"),
    ("a*(-b)", "_0*(-_1)"),
    ("-(a + b)", "-(_0+_1)"),
    ("-a", "-_0"),
    ("-a**2", "-_0**(_1)"),
    ("(-a)**2", "(-_0)**(_1)"),
    ("--a", "-(-_0)"),
    ("-a + b", "-_0+_1"),
    ("-a*b + c", "-_0*_1+_2"),
    ("(a*b)", "_0*_1"),
    ("a", "_0"),
    ("4", "_0"),
    ("1_000*a", "_0*_1"),
    ("1e-7*a", "_0*_1"),
    ("pi*a**2/4", "_0*((_1**(_2))/(_3))"),
]


@pytest.mark.parametrize(("text", "page"), CONSTRUCTS)
def test_construct_reads_on_the_page_as_it_should(text: str, page: str) -> None:
    assert infix(laid(text).tree) == page


@pytest.mark.parametrize(
    ("text", "page"),
    [
        ("a <= b", "_0<=_1"),
        ("a <= b and c > d", "_0<=_1 and _2>_3"),
        ("a < b or c < d", "_0<_1 or _2<_3"),
        ("a == b", "_0==_1"),
        ("a != b", "_0!=_1"),
        ("a < b < c", "_0<_1<_2"),
        ("(a < b or b < c) and c < d", "(_0<_1 or _2<_3) and _4<_5"),
        ("a < b and b < c or c < d", "_0<_1 and _2<_3 or _4<_5"),
        ("a + b > 2*c", "_0+_1>_2*_3"),
        ("-a < b", "-_0<_1"),
        ("a/b >= sqrt(c)", "((_0)/(_1))>=sqrt(_2)"),
    ],
)
def test_condition_reads_on_the_page_as_it_should(text: str, page: str) -> None:
    assert infix(laid(text, condition=True).tree) == page


@pytest.mark.parametrize(
    ("text", "message"),
    [
        ("log(a, b)", r"cannot read the layout .*unknown 'logslot'"),
        ("min(a)", "has no value at any of 120 trial points, so its layout is not proved"),
        ("sqrt(-a)", "has no value at any of 120 trial points"),
        ("a/(b - b)", "has no value at any of 120 trial points"),
        ("acos(a + 2)", "has no value at any of 120 trial points"),
    ],
)
def test_what_cannot_be_proved_is_refused(text: str, message: str) -> None:
    with pytest.raises(LayoutError, match=message):
        laid(text)


@pytest.mark.parametrize(
    "text", ["a if b > c else d", "sum([a, b])", "a[0]", "a.to('psi')*b", "math.sqrt(a)", "foo(a, b)", "a % b", "'x'"]
)
def test_what_handcalcs_drops_in_silence_never_reaches_it(text: str) -> None:
    with pytest.raises(FormulaError, match="not allowed in a formula"):
        laid(text)


@pytest.mark.parametrize(
    "name",
    [
        "phi_M_n",
        "l_dh",
        "lamb",
        "ell",
        "f_prime_c",
        "V_s__max",
        "A_s_min",
        "delta_def",
        "return_period",
        "x",
        "qaq",
        "zz",
        "slot",
    ],
)
def test_no_spelling_of_a_symbol_changes_the_layout(name: str) -> None:
    layout = laid(f"3*{name}**2/sqrt({name}_0 + l_d)")
    assert infix(layout.tree) == infix(laid("3*a**2/sqrt(b + c)").tree)
    assert [slot.text for slot in layout.slots if slot.kind == "symbol"] == [name, f"{name}_0", "l_d"]


def test_slots_say_what_stands_where() -> None:
    layout = laid("max(12*inch, pi*d_b) + 0.5*f_c/(4000*psi)")
    assert layout.slots == (
        Slot("number", "12", "in"),
        Slot("const", "pi"),
        Slot("symbol", "d_b"),
        Slot("number", "0.5"),
        Slot("symbol", "f_c"),
        Slot("number", "4000", "psi"),
    )


def test_layout_survives_json() -> None:
    import json

    layout = laid("3/40*f_y/(lamb*min(sqrt(f_c), 100))*d_b")
    assert Layout.from_json(json.loads(json.dumps(layout.to_json()))) == layout


def test_a_line_of_many_symbols_is_laid_out() -> None:
    names = [f"v_{index}" for index in range(60)]
    layout = laid(" + ".join(names))
    assert [slot.text for slot in layout.slots] == names


def test_random_expressions_are_proved_or_refused() -> None:
    source = random.Random(SEED)
    refused = []
    total = 400
    for _ in range(total):
        text = random_expression(source)
        try:
            layout = laid(text)
        except LayoutError as error:
            refused.append((text, str(error)))
            continue
        assert_same(text, layout, source)
    without_value = [text for text, why in refused if "has no value at any of 120 trial points" in why]
    assert len(without_value) < 0.1 * total
    assert len(refused) - len(without_value) <= 0.05 * total, refused


def assert_same(text: str, layout: Layout, source: random.Random) -> None:
    """The page, read as Python, is the line at points that `prove` did not choose."""
    for _ in range(4):
        values = {name: source.uniform(0.3, 40.0) for name in SYMBOLS}
        filled = {f"_{place}": values.get(slot.text, 0.0) for place, slot in enumerate(layout.slots)}
        filled |= {f"_{place}": float(slot.text) for place, slot in enumerate(layout.slots) if slot.kind == "number"}
        try:
            expected = expression.evaluate(text, values)
        except FormulaError:
            continue
        found = expression.evaluate(infix(layout.tree), filled)
        assert found == pytest.approx(expected, rel=1e-9, abs=1e-9), text


# The proof itself: a layout that was tampered with does not pass it.

LINES = [
    "a*(b + c)",
    "a - (b + c)",
    "(a + b)**2",
    "a/b - c",
    "min(a, b)*c - d",
    "sqrt(a*b + c)",
    "-(a - b)",
    "(a/b)**c",
    "2*a + 3/b",
]


def variants(node: Node) -> list[Node]:
    """The tree with one thing changed: a bracket dropped, a sign turned, a quotient or a root taken away."""
    found: list[Node] = []
    parts = children(node)
    for place, part in enumerate(parts):
        found += [rebuild(node, (*parts[:place], changed, *parts[place + 1 :])) for changed in variants(part)]
    match node:
        case ("paren", ("frac", _, _)):
            pass  # the bar of a fraction groups as a bracket does
        case ("paren" | "neg" | "sqrt", inner):
            found.append(inner)
        case ("add", terms):
            turned = {"+": "-", "-": "+"}
            for place, (sign, term) in enumerate(terms):
                found.append(("add", (*terms[:place], (turned[sign], term), *terms[place + 1 :])))
        case ("frac", above, below):
            found += [("mul", (above, below)), ("frac", below, above)]
        case ("pow", base, exponent):
            found += [("mul", (base, exponent)), ("pow", base, ("neg", exponent))]
        case ("call", "min", arguments):
            found.append(("call", "max", arguments))
    return found


@pytest.mark.parametrize("text", LINES)
def test_falsified_layouts_are_caught(text: str) -> None:
    layout = laid(text)
    node = expression.parse(text)
    changed = variants(layout.tree)
    assert changed
    for tree in changed:
        with pytest.raises(LayoutError, match=r"computes .* where the line computes|lost or moved a term"):
            prove(replace(layout, tree=tree), node)


@pytest.mark.parametrize("text", LINES)
def test_a_lost_or_moved_slot_is_caught(text: str) -> None:
    layout = laid(text)
    node = expression.parse(text)
    with pytest.raises(LayoutError, match="lost or moved a term"):
        prove(replace(layout, slots=layout.slots[:-1]), node)
    with pytest.raises(LayoutError, match="lost or moved a term"):
        prove(replace(layout, tree=swapped(layout.tree)), node)


@pytest.mark.parametrize(
    ("text", "place"),
    [
        ("a - b", 0),
        ("a/b", 0),
        ("a**b", 0),
        ("atan2(a, b)", 0),
        ("(a + b)/c", 1),
        ("a*b + c*d", 1),
        ("2*a + b", 1),
        ("a + b*c", 0),
    ],
)
def test_two_values_changed_over_are_caught(text: str, place: int) -> None:
    layout = laid(text)
    changed = list(layout.slots)
    changed[place], changed[place + 1] = changed[place + 1], changed[place]
    with pytest.raises(LayoutError, match="where the line computes"):
        prove(replace(layout, slots=tuple(changed)), expression.parse(text))


def swapped(node: Node) -> Node:
    """The tree with its first two slots changed over."""
    if node[0] == "slot":
        return ("slot", {0: 1, 1: 0}.get(node[1], node[1]))
    return rebuild(node, tuple(swapped(part) for part in children(node)))


def test_a_changed_number_is_caught() -> None:
    layout = laid("0.85*a + b")
    changed = (replace(layout.slots[0], text="0.86"), *layout.slots[1:])
    with pytest.raises(LayoutError, match=r"where the line computes .*; write it as two lines"):
        prove(replace(layout, slots=changed), expression.parse("0.85*a + b"))


@pytest.mark.parametrize(
    ("text", "tree"),
    [
        ("a < b and b < c", ("or", (("rel", "<", ("slot", 0), ("slot", 1)), ("rel", "<", ("slot", 2), ("slot", 3))))),
        ("a < b", ("rel", ">", ("slot", 0), ("slot", 1))),
        ("a > 5000*psi", ("rel", "<", ("slot", 0), ("slot", 1))),
        ("a == b", ("rel", "!=", ("slot", 0), ("slot", 1))),
    ],
)
def test_a_falsified_condition_is_caught(text: str, tree: Node) -> None:
    layout = laid(text, condition=True)
    with pytest.raises(LayoutError, match="where the line computes"):
        prove(replace(layout, tree=tree), expression.parse(text, condition=True))


@pytest.mark.parametrize("text", ["min(a, 100)", "max(a, 4000)", "min(sqrt(a), 100) + b"])
def test_the_proof_reaches_both_sides_of_a_cap(text: str) -> None:
    layout = laid(text)
    for other in ("101", "99"):
        changed = tuple(replace(slot, text=other) if slot.kind == "number" else slot for slot in layout.slots)
        with pytest.raises(LayoutError, match="where the line computes"):
            prove(replace(layout, slots=changed), expression.parse(text))


# The tree


@pytest.mark.parametrize(
    ("node", "simple"),
    [
        (("paren", ("slot", 0)), ("slot", 0)),
        (("paren", ("paren", ("slot", 0))), ("slot", 0)),
        (("paren", ("num", "2")), ("num", "2")),
        (("paren", ("call", "min", (("slot", 0),))), ("call", "min", (("slot", 0),))),
        (("paren", ("sqrt", ("slot", 0))), ("sqrt", ("slot", 0))),
        (("sqrt", ("paren", ("neg", ("slot", 0)))), ("sqrt", ("neg", ("slot", 0)))),
        (("frac", ("paren", ("neg", ("slot", 0))), ("slot", 1)), ("frac", ("neg", ("slot", 0)), ("slot", 1))),
        (
            ("mul", (("frac", ("slot", 0), ("slot", 1)), ("frac", ("num", "1"), ("slot", 2)))),
            ("frac", ("slot", 0), ("mul", (("slot", 1), ("slot", 2)))),
        ),
        (
            ("add", (("+", ("paren", ("neg", ("slot", 0)))), ("+", ("slot", 1)))),
            ("add", (("-", ("slot", 0)), ("+", ("slot", 1)))),
        ),
    ],
)
def test_brackets_that_the_page_does_not_need_are_taken_out(node: Node, simple: Node) -> None:
    assert simplify(node) == simple


@pytest.mark.parametrize(
    "node",
    [
        ("pow", ("paren", ("add", (("+", ("slot", 0)), ("+", ("slot", 1))))), ("slot", 2)),
        ("pow", ("paren", ("neg", ("slot", 0))), ("slot", 1)),
        ("mul", (("slot", 0), ("paren", ("add", (("+", ("slot", 1)), ("-", ("slot", 2))))))),
        ("add", (("+", ("slot", 0)), ("-", ("paren", ("add", (("+", ("slot", 1)), ("+", ("slot", 2)))))))),
    ],
)
def test_brackets_that_carry_meaning_stay(node: Node) -> None:
    assert simplify(node) == node


def random_tree(source: random.Random, depth: int, count: list[int]) -> Node:
    if depth == 0 or source.random() < 0.2:
        count[0] += 1
        return ("slot", count[0] - 1)
    kind = source.choice(["add", "mul", "frac", "pow", "sqrt", "neg", "min"])
    one, two = (("paren", random_tree(source, depth - 1, count)) for _ in range(2))
    trees: dict[str, Node] = {
        "add": ("add", (("+", one), (source.choice("+-"), two))),
        "mul": ("mul", (one, two)),
        "frac": ("frac", one, two),
        "pow": ("pow", one, two),
        "sqrt": ("sqrt", one),
        "neg": ("paren", ("neg", one)),
        "min": ("call", "min", (one, two)),
    }
    return trees[kind]


def test_taking_out_brackets_keeps_the_meaning() -> None:
    source = random.Random(SEED)
    compared = 0
    for _ in range(400):
        tree = random_tree(source, 3, [0])
        values = {f"_{place}": source.uniform(0.5, 3.0) for place in slots(tree)}
        try:
            expected = expression.evaluate(infix(tree), values)
        except FormulaError:
            continue
        compared += 1
        assert expression.evaluate(infix(simplify(tree)), values) == pytest.approx(expected, rel=1e-9)
        assert sorted(slots(simplify(tree))) == sorted(slots(tree))
    assert compared > 300


def test_unknown_nodes_are_refused() -> None:
    with pytest.raises(ValueError, match="no such node: curve"):
        infix(("curve", ("slot", 0)))


def test_freeze_gives_back_tuples() -> None:
    data: Any = ["add", [["+", ["slot", 0]], ["-", ["num", "2"]]]]
    assert freeze(data) == ("add", (("+", ("slot", 0)), ("-", ("num", "2"))))


def test_slots_in_reading_order() -> None:
    assert list(slots(laid("a*(b + c)/sqrt(d) - min(h, s)").tree)) == [0, 1, 2, 3, 4, 5]
