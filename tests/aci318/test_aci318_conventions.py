"""What holds for every formula: notation, clauses, docstrings, lines that fit the page."""

from __future__ import annotations

import ast
import importlib
import re

import pytest

from calcpack import aci318, symbols
from calcpack.aci318.standards import ACI_318_14, ACI_318_19
from calcpack.formula import Formula
from calcpack.typeset.digits import last_place, parse_number
from calcpack.typeset.line import Origin, PrintedLine, printed_lines
from calcpack.typeset.names import name_tree
from calcpack.typeset.rows import COLUMN, broken, width, with_symbols, with_values
from calcpack.typeset.store import LayoutStore
from calcpack.value import shown_text


def test_every_argument_is_in_the_notation_table_with_its_dimension(any_formula: Formula) -> None:
    for name, dimension in any_formula.arguments.items():
        assert symbols.is_known(name)
        assert symbols.lookup(name).dimension.powers == dimension.powers


def quantity_of(target: str) -> symbols.Symbol:
    """The symbol of a result: its own, or that of the quantity which a least or largest value bounds."""
    name = target if symbols.is_known(target) else re.sub(r"_(min|max)$", "", target)
    return symbols.lookup(name)


def test_every_line_sets_a_symbol_of_the_notation_table(any_formula: Formula) -> None:
    for line in any_formula.lines():
        assert quantity_of(line.target).dimension.powers == line.dimension.powers


def test_every_formula_cites_an_edition_or_the_geometry(any_formula: Formula) -> None:
    for clause in any_formula.clauses:
        if clause.standard is None:
            assert clause.number == "geometry of the section"
        else:
            assert clause.standard in (ACI_318_14, ACI_318_19)
            assert re.fullmatch(r"(Table )?\d+(\.\d+)+[a-z]?(\([a-z]\))?", clause.number)


def test_every_formula_cites_each_edition_once(any_formula: Formula) -> None:
    standards = [clause.standard for clause in any_formula.clauses]
    assert len(standards) == len(set(standards))


def test_every_formula_says_what_it_gives_in_one_line(any_formula: Formula) -> None:
    first = (any_formula.__doc__ or "").split("\n")[0]
    assert first.endswith(".")
    assert len(first) < 115


def test_lines_are_short_enough_for_the_working_column(any_formula: Formula) -> None:
    # 4.5 in at 9 pt hold some 85 characters of infix text, about 60 once fractions stack.
    for line in any_formula.lines():
        assert len(f"{line.target} = {line.text}") <= 90


def test_only_roots_and_dimensioned_coefficients_are_empirical(any_formula: Formula) -> None:
    text = any_formula.source
    if any_formula.empirical:
        assert "sqrt(f_c)" in text or "0.0009" in text or "sqrt(min(f_c" in text
    else:
        assert "sqrt" not in text


def test_each_module_lists_its_formulas(formula_names: dict[str, list[str]]) -> None:
    assert len(formula_names) == 8
    for module, names in formula_names.items():
        listed = importlib.import_module(f"calcpack.aci318.{module}").__all__
        public = {name for name in listed if not name.startswith("_")} - {"cited_in"}
        assert public == set(names), module


def test_the_package_is_a_table_of_contents() -> None:
    assert aci318.__all__ == sorted(aci318.__all__)
    assert aci318.hooks is importlib.import_module("calcpack.aci318.hooks")
    with pytest.raises(AttributeError, match=r"calcpack.aci318 has no 'hook'; it has bars, columns"):
        _ = aci318.hook


# handcalcs calls names of pyparsing that are due to go.
pytestmark = pytest.mark.filterwarnings("ignore::DeprecationWarning")
STORE = LayoutStore()
# Values of an ordinary building column and its bars, with as many figures as such values have.
TYPICAL = {
    name: float(value)
    for name, _, value in (
        pair.partition(" ")
        for line in """
        f_c 4000, f_y 60000, f_yt 60000, f_y_axial 80000, lamb 0.75, phi 0.65, P_o 1523456, P_n_max 1218765
        d_b 0.875, d_bt 0.375, A_b 1.0, A_sp 0.11, A_tr 0.4, A_th 0.4, A_tt 0.3, A_hs 1.58, A_st 12.48, A_g 346.36
        A_ch 254.47, A_s_required 2.37, A_s_provided 3.16, b 24, h 28.5, h_min 24, h_below 18, c_cover 1.5, D_c 25.5
        D_s 23.622, c_c 1.875, c_b 2.439, c_side 2.75, c_tail 2.25, d_agg 0.75, s 4.875, s_clear 3.747, K_tr 0.275
        n 4, n_bars 12, n_face 4, l_d_a 35.5756, l_dh_a 18.9737, l_dt_a 14.3568, l_dc_a 20.3251, l_sc_a 33.84
        l_st 46.2483, psi_t 1.3, psi_e 1.2, psi_s 0.8, psi_g 1.15, psi_c 0.867, psi_r 0.75, psi_o 1.25, psi_p 1.6
        """.strip().split("\n")
        for pair in line.strip().split(", ")
    )
}


def printed(formula: Formula) -> list[PrintedLine]:
    """The lines of a formula, worked on typical values."""
    recording = formula.record(**{name: TYPICAL[name] for name in formula.arguments})
    shown = {name: shown_text(TYPICAL[name], dimension) for name, dimension in formula.arguments.items()}
    origins = {name: Origin(f"C-01/{name}") for name in formula.arguments}
    targets = [Origin(f"C-01/{recorded.line.target}") for recorded in recording.lines]
    return printed_lines(recording, STORE.layout(formula), origins, shown, targets)


def test_every_formula_is_typeset_and_its_layout_proved(any_formula: Formula) -> None:
    layout = STORE.layout(any_formula)
    assert len(layout.lines) == len(list(any_formula.lines()))
    for condition in any_formula.conditions():
        assert ast.unparse(condition) in layout.conditions


def test_every_row_of_every_formula_fits_the_working_column(any_formula: Formula) -> None:
    for line in printed(any_formula):
        left = width(name_tree(line.symbol)) + 1
        for node in (with_symbols(line.layout), with_values(line.layout, line.values)):
            for part in broken(node, COLUMN - left):
                assert left + width(part) <= COLUMN, f"{any_formula.name}: {line.symbol}"


def test_every_printed_line_gives_its_printed_result(any_formula: Formula) -> None:
    # The page itself: a calculator fed with the printed numbers gives the printed result, give or take one at its end.
    recording = any_formula.record(**{name: TYPICAL[name] for name in any_formula.arguments})
    for line, recorded in zip(printed(any_formula), recording.lines, strict=True):
        fed = {
            slot.text: parse_number(value.text)
            for slot, value in zip(line.layout.slots, line.values, strict=True)
            if slot.kind == "symbol"
        }
        result = eval(recorded.line.code, any_formula.function.__globals__, fed)
        assert abs(result - parse_number(line.line_result)) <= 1.01 * last_place(line.line_result)
