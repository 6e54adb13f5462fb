"""What the page shows, read and worked by an independent reader, in every language it is set in."""

from __future__ import annotations

import random
import re
from collections.abc import Callable
from typing import Any
from xml.etree import ElementTree

import page_reading
import pytest
from expressions import SYMBOLS, random_expression

from calcpack import expression
from calcpack.errors import FormulaError, LayoutError
from calcpack.symbols import NOTATION
from calcpack.typeset.digits import stated_text
from calcpack.typeset.emit import LATEX, MATHML, PLAIN, SPOKEN, TARGETS, TYPST, Target, emit
from calcpack.typeset.layout import Layout, lay_out
from calcpack.typeset.names import name_tree, read_symbol
from calcpack.typeset.rows import (
    COLUMN,
    Printed,
    broken,
    condition_row,
    equation,
    spoken,
    symbol_text,
    width,
    with_values,
)
from calcpack.typeset.tree import Node

SEED = 40_711
READERS: dict[str, Callable[[str], list[page_reading.Token]]] = {
    "mathml": page_reading.mathml,
    "typst": page_reading.typst,
    "plain": page_reading.plain,
}


def laid(text: str, condition: bool = False) -> Layout:
    return lay_out(expression.parse(text, condition))


def printed(layout: Layout, values: dict[str, float], unit: str = "") -> list[Printed]:
    """Values as a page prints them, each with a link; constants as they stand."""
    from calcpack.typeset.digits import constant_text

    filled = []
    for slot in layout.slots:
        if slot.kind == "symbol":
            filled.append(Printed(f"{stated_text(values[slot.text])} {unit}".strip(), f"S/{slot.text}", ""))
        else:
            filled.append(Printed("π" if slot.kind == "const" else constant_text(float(slot.text))))
    return filled


def reading(rows: list[tuple[str, str]], language: str, known: dict[str, float]) -> tuple[float | None, float]:
    """The values of the symbol part and of the substituted part, rows joined as a reader joins them."""
    tokens = [token for _, right in rows for token in READERS[language](right)]
    parts = page_reading.split_at_equals(tokens)
    values = page_reading.worked(parts[-1])
    return (page_reading.worked(parts[0], known) if len(parts) == 2 else None), values


def cases(count: int, signs: bool = True) -> list[tuple[str, Layout, dict[str, float], float]]:
    """Random lines with values, and the result of the line from the printed values."""
    source = random.Random(SEED)
    found = []
    while len(found) < count:
        text = random_expression(source)
        try:
            layout = laid(text)
        except LayoutError:
            continue
        values = {name: round(source.uniform(0.2, 30.0), source.choice([0, 1, 3])) or 1.0 for name in SYMBOLS}
        if signs and source.random() < 0.4:
            values = {name: value if source.random() < 0.6 else -value for name, value in values.items()}
        try:
            found.append((text, layout, values, expression.evaluate(text, values)))
        except FormulaError:
            continue
    return found


@pytest.mark.parametrize(
    ("language", "unit"), [("mathml", ""), ("mathml", "in"), ("typst", ""), ("typst", "ksi"), ("plain", "")]
)
def test_substituted_lines_work_out_to_the_result(language: str, unit: str) -> None:
    for text, layout, values, result in cases(250):
        rows = equation("x", layout, printed(layout, values, unit), TARGETS[language])
        symbols, substituted = reading(rows, language, values)
        assert substituted == pytest.approx(result, rel=1e-9, abs=1e-9), (text, rows)
        if symbols is not None:
            assert symbols == pytest.approx(result, rel=1e-9, abs=1e-9), (text, rows)


@pytest.mark.parametrize("language", ["mathml", "typst"])
def test_broken_lines_mean_the_same_and_keep_the_width(language: str) -> None:
    source = random.Random(SEED)
    many = 0
    for _ in range(60):
        terms = [random_expression(source, 2) for _ in range(source.randint(6, 12))]
        sign = source.choice([" + ", " - ", " * "])
        text = sign.join(f"({term})" if sign != " + " else term for term in terms)
        values = {name: source.uniform(1.0, 99.0) for name in SYMBOLS}
        try:
            layout = laid(text)
            result = expression.evaluate(
                text, {name: page_reading.printed_number(stated_text(value)) for name, value in values.items()}
            )
        except FormulaError:
            continue
        filled = with_values(layout, printed(layout, values))
        rows = broken(filled, 20.0)
        many += len(rows) > 1
        tokens = [token for row in rows for token in READERS[language](emit(row, TARGETS[language], values=True))]
        assert page_reading.worked(tokens) == pytest.approx(result, rel=1e-9, abs=1e-6)
        for row in rows:
            single = row[2] if row[0] == "next" else row
            assert width(row) <= 20.0 + 2.5 or single[0] not in ("add", "mul"), text
    assert many > 30


def test_the_sign_of_a_first_term_alone_in_its_row_is_kept() -> None:
    layout = laid("-(a + b) + c*d")
    rows = broken(with_values(layout, [Printed(text) for text in ("11,111", "22,222", "33,333", "44,444")]), 8.0)
    assert [emit(row, PLAIN, values=True) for row in rows] == ["− (11,111 + 22,222)", "+ 33,333 · 44,444"]


def test_a_line_that_fits_is_not_broken() -> None:
    node = with_values(laid("a + b*c"), [Printed("1"), Printed("2"), Printed("3")])
    assert broken(node, 100.0) == [node]
    assert broken(("frac", node, node), 0.1) == [("frac", node, node)]


def test_continuation_rows_start_with_their_operator() -> None:
    layout = laid("a - b - c + d")
    rows = broken(with_values(layout, [Printed(text) for text in ("11,111", "22,222", "33,333", "44,444")]), 6.0)
    assert [emit(row, PLAIN, values=True) for row in rows] == ["11,111", "− 22,222", "− 33,333", "+ 44,444"]
    product = laid("a * b * c")
    rows = broken(with_values(product, [Printed("1,111,111")] * 3), 6.0)
    assert [emit(row, PLAIN, values=True) for row in rows] == ["1,111,111", "· 1,111,111", "· 1,111,111"]


# Rows of an equation


def rows_of(text: str, *values: str, target: Target = PLAIN, symbol: str = "x") -> list[tuple[str, str]]:
    return equation(symbol, laid(text), [Printed(value) for value in values], target)


def test_a_short_line_is_one_row() -> None:
    assert rows_of("a + b", "2", "3") == [("x", "= a + b = 2 + 3 ")]


def test_a_line_of_numbers_alone_is_printed_once() -> None:
    assert rows_of("1.3", "1.3") == [("x", "= 1.3 ")]
    assert rows_of("2*3", "2", "3") == [("x", "= 2 · 3 ")]


def test_two_short_fractions_stand_in_one_row() -> None:
    assert rows_of("a/b", "2", "3") == [("x", "= a/b = 2/3 ")]


def test_two_long_fractions_stand_in_two_rows() -> None:
    text = " + ".join(["a/b"] * 5)
    rows = rows_of(text, *["1,234.5 kip", "2,345.6 ft"] * 5)
    assert [right[0] for _, right in rows].count("=") == len([left for left, _ in rows if left]) + 1 == 2


def test_a_long_line_is_broken_into_rows_that_fit() -> None:
    text = " + ".join(["a*b"] * 9)
    rows = rows_of(text, *["1,234.5 kip", "2,345.6 ft"] * 9)
    assert len(rows) > 3
    assert [left for left, _ in rows] == ["x", *[""] * (len(rows) - 1)]
    heads = [right[0] for _, right in rows]
    assert heads.count("=") == 2
    assert set(heads) == {"=", "+"}
    assert all(len(right) * 0.48 < COLUMN + 4 for _, right in rows)


# Expected forms, by hand: brackets where a reader needs them and nowhere else.
@pytest.mark.parametrize(
    ("text", "values", "page"),
    [
        ("a**2", ["5 in"], "(5 in)^2"),
        ("a**2", ["5"], "5^2"),
        ("a**2", ["−5"], "(−5)^2"),
        ("a**2", ["1.5×10⁹"], "(1.5×10⁹)^2"),
        ("a - b", ["5", "−3"], "5 − (−3)"),
        ("a + b", ["−5", "3"], "−5 + 3"),
        ("a*b", ["2", "−3"], "2 · (−3)"),
        ("-a", ["−3"], "− (−3)"),
        ("a/b", ["−3", "−4"], "(−3)/(−4)"),
        ("min(a, b)", ["−3", "4 in"], "min(−3, 4 in)"),
        ("sqrt(a)", ["4,000 psi"], "√(4,000 psi)"),
        ("a/(b*c)", ["1", "2", "3"], "1/(2 · 3)"),
        ("a/(b/c)", ["1", "2", "3"], "1/(2/3)"),
        ("(a + b)*(c + d)/h", ["1", "2", "3", "4", "5"], None),
        ("a/((b + c)*(d + h))", ["1", "2", "3", "4", "5"], "1/((2 + 3) · (4 + 5))"),
        ("a**(b/c)", ["2", "1", "3"], "2^(1/3)"),
        ("sqrt(a/b)", ["1", "4"], "√(1/4)"),
        ("abs(a - b)", ["1", "4"], "|1 − 4|"),
        ("log(a) + log10(b)", ["1", "4"], "ln(1) + log₁₀(4)"),
    ],
)
def test_plain_text_of_substituted_values(text: str, values: list[str], page: str | None) -> None:
    layout = laid(text)
    filled = [Printed(value) for value in values]
    for place, slot in enumerate(layout.slots):
        if slot.kind == "number":
            filled.insert(place, Printed(slot.text))
    found = emit(with_values(layout, filled), PLAIN, values=True)
    if page is not None:
        assert found == page
    assert found.count("(") == found.count(")")


@pytest.mark.parametrize(
    ("text", "page"),
    [
        ("psi_te**2", "(ψt ψe)^2"),
        ("confinement**2", "((cb + Ktr)/db)^2"),
        ("root_f_c**2", "√f′c^2"),
        ("phi_P_n_max*2", "φ Pn,max · 2"),
        ("h - confinement", "h − (cb + Ktr)/db"),
    ],
)
def test_compound_symbols_keep_their_meaning_in_a_power(text: str, page: str) -> None:
    layout = laid(text)
    row = equation("x", layout, [Printed("1.5")] * len(layout.slots), PLAIN)[0][1]
    assert row.removeprefix("= ").split(" = ")[0].strip() == page


def test_latex_of_a_primed_base_is_no_double_superscript() -> None:
    row = equation("x", laid("f_c**0.5"), [Printed("4,000 psi"), Printed("0.5")], LATEX)[0][1]
    assert "{f'_{c}}^{0.5}" in row
    assert r"{\left(4{,}000\ \mathrm{psi}\right)}^{0.5}" in row


def test_values_link_to_their_origin_and_name_another_sheet() -> None:
    value: Node = ("value", "4,000 psi", "S/f_c", "F-01")
    found = [emit(value, MATHML), emit(value, TYPST), emit(("value", "12 in", "", ""), MATHML)]
    assert [re.sub("[\xa0\u202f]", "~", text) for text in found] == [
        '<mn><a href="#S/f_c">4,000~psi</a><span class="from">F-01</span></mn>',
        '#v("S/f_c", "4,000~psi", "F-01")',
        "<mn>12~in</mn>",
    ]
    assert page_reading.typst(emit(("value", "12 in", "S/a", ""), TYPST))[0][0] == "number"
    assert emit(value, LATEX) == r"4{,}000\ \mathrm{psi}"


def test_hostile_text_is_harmless() -> None:
    value: Node = ("value", '<script>"#\\', 'S/"><b>', "<i>")
    row = emit(value, MATHML)
    assert "<script>" not in row
    assert "<b>" not in row
    assert "<i>" not in row
    ElementTree.fromstring(row)
    assert r"\"" in emit(("value", 'a"b', "", ""), TYPST)


CONDITIONS = [
    "a <= b",
    "a < b and c > d",
    "a < b or c < d and a < d",
    "(a < b or c < d) and a < d",
    "a < b < c",
    "a != b",
    "a == b",
    "sqrt(a) + b >= 2*c",
]


@pytest.mark.parametrize("language", ["mathml", "typst", "plain"])
@pytest.mark.parametrize("text", CONDITIONS)
def test_conditions_hold_as_they_read(text: str, language: str) -> None:
    source = random.Random(text)
    layout = laid(text, condition=True)
    truths = set()
    for _ in range(60):
        values = {name: float(source.randint(1, 4)) for name in SYMBOLS}
        symbols, substituted = condition_row(layout, printed(layout, values), TARGETS[language])
        expected = bool(expression.evaluate(text, values, condition=True))
        truths.add(expected)
        assert page_reading.holds(READERS[language](substituted)) is expected
        assert page_reading.holds(READERS[language](symbols), values) is expected
    assert truths == {True, False}


# Symbols


@pytest.mark.parametrize("target", TARGETS.values(), ids=TARGETS)
@pytest.mark.parametrize("name", NOTATION)
def test_every_symbol_of_the_table_is_set(name: str, target: Target) -> None:
    text = symbol_text(name, target)
    assert text.strip()
    if target is MATHML:
        ElementTree.fromstring(text)
    if target is TYPST:
        assert page_reading.typst(text)
    if target in (PLAIN, SPOKEN):
        assert "\\" not in text
        assert "_" not in text


# common practice: the code book's own forms
@pytest.mark.parametrize(
    ("name", "plain", "mathml", "typst", "latex"),
    [
        ("f_c", "f′c", "<msubsup><mi>f</mi><mi>c</mi><mo>′</mo></msubsup>", "f'_c", "f'_{c}"),
        ("f_y", "fy", "<msub><mi>f</mi><mi>y</mi></msub>", "f_y", "f_{y}"),
        ("l_dh", "ℓdh", "<msub><mi>ℓ</mi><mi>dh</mi></msub>", 'ℓ_"dh"', r"\ell_{\mathrm{dh}}"),
        ("psi_t", "ψt", "<msub><mi>ψ</mi><mi>t</mi></msub>", "ψ_t", r"\psi_{t}"),
        ("lamb", "λ", "<mi>λ</mi>", "λ", r"\lambda "),
        ("b", "b", "<mi>b</mi>", "b", "b "),
        (
            "phi_P_n_max",
            "φ Pn,max",
            "<mrow><mi>φ</mi><msub><mi>P</mi><mi>n,max</mi></msub></mrow>",
            'φ P_"n,max"',
            r"\phi  P_{\mathrm{n,max}}",
        ),
    ],
)
def test_symbols_as_the_code_book_sets_them(name: str, plain: str, mathml: str, typst: str, latex: str) -> None:
    found = [symbol_text(name, target) for target in (PLAIN, MATHML, TYPST, LATEX)]
    assert found == [plain, mathml, typst, latex]


@pytest.mark.parametrize(
    ("name", "words"),
    [
        ("f_c", "f prime c"),
        ("l_d", "ell d"),
        ("psi_t", "psi t"),
        ("phi_P_n_max", "phi P n max"),
        ("b", "b"),
        ("beta_1", "beta 1"),
    ],
)
def test_symbols_in_words(name: str, words: str) -> None:
    assert symbol_text(name, SPOKEN) == words


def test_names_outside_the_table_are_set() -> None:
    assert [symbol_text(name, PLAIN) for name in ("w_footing", "delta_s", "phi_M_n", "P1")] == [
        "wfooting",
        "δs",
        "φ Mn",
        "P1",
    ]
    assert symbol_text("offset", TYPST) == '"offset"'


@pytest.mark.parametrize("latex", [r"\frac{a}", r"\unknown", "a^2", "a}", r"\frac a b", "{a", "$x$", "_a", "é"])
def test_symbols_outside_the_small_latex_are_refused(latex: str) -> None:
    with pytest.raises(LayoutError, match="cannot set"):
        read_symbol(latex)


def test_symbol_trees() -> None:
    assert name_tree("f_c") == ("sym", "f", "c", 1)
    assert read_symbol("a + b") == ("add", (("+", ("sym", "a", "", 0)), ("+", ("sym", "b", "", 0))))
    assert read_symbol("x''_{max}") == ("sym", "x", "max", 2)
    assert name_tree("root_f_c") == ("sqrt", ("sym", "f", "c", 1))


# Speech


def test_a_line_in_words() -> None:
    layout = laid("3/40*f_y/sqrt(f_c)*d_b")
    values = [Printed(text) for text in ("3", "40", "60,000 psi", "4,000 psi", "1 in")]
    words = spoken("l_d", layout, values, "71.2 in")
    assert words.startswith("ell d equals ")
    assert words.endswith(" equals 71.2 in")
    assert words.count(" equals ") == 3
    for word in ("root of", "f prime c", "over", "times", "60,000 psi"):
        assert word in words
    assert not re.search(r"[_\\^√·−]", words)


def test_numbers_alone_are_spoken_once() -> None:
    assert spoken("psi_t", laid("1.3"), [Printed("1.3")], "1.3") == "psi t equals 1.3"


@pytest.mark.parametrize(
    ("text", "words"),
    [
        ("a < b and c >= d", "a less than b and c at least d"),
        ("min(a, b)", "the lesser of a and b"),
        ("max(a, b)", "the greater of a and b"),
        ("abs(a)", "the size of a"),
        ("a**2", "a to the power 2"),
        ("-(a + b)", "minus bracket a plus b close"),
        ("a/(b + c)", "a over the quantity b plus c,"),
        ("sin(a)", "sin of a"),
    ],
)
def test_constructs_in_words(text: str, words: str) -> None:
    layout = laid(text, condition="<" in text)
    assert condition_row(layout, [Printed("1")] * len(layout.slots), SPOKEN)[0] == words


@pytest.mark.parametrize("target", TARGETS.values(), ids=TARGETS)
def test_unknown_nodes_are_refused(target: Target) -> None:
    with pytest.raises(ValueError, match="no such node: curve"):
        emit(("curve",), target)


@pytest.mark.parametrize("target", TARGETS.values(), ids=TARGETS)
def test_every_construct_is_written_in_every_language(target: Target) -> None:
    constructs: list[tuple[Any, bool]] = [
        ("-(a + b)/sqrt(c)**2*min(a, abs(b))*pi - 12*inch", False),
        ("a < b and c != d or a == b", True),
    ]
    for text, condition in constructs:
        layout = laid(text, condition)
        for row in condition_row(layout, printed(layout, dict.fromkeys(SYMBOLS, 2.0)), target):
            assert row.strip()
            assert target is not MATHML or ElementTree.fromstring(row) is not None
