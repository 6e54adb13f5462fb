"""What holds for every formula: notation, clauses, docstrings, lines that fit the page."""

from __future__ import annotations

import importlib
import re

import pytest

from calcpack import aci318, symbols
from calcpack.aci318.standards import ACI_318_14, ACI_318_19
from calcpack.formula import Formula


def test_every_argument_is_in_the_notation_table_with_its_dimension(any_formula: Formula) -> None:
    for name, dimension in any_formula.arguments.items():
        assert symbols.is_known(name)
        assert symbols.lookup(name).dimension.powers == dimension.powers


def test_every_line_sets_a_symbol_of_the_notation_table(any_formula: Formula) -> None:
    for line in any_formula.lines():
        assert symbols.is_known(line.target)
        assert symbols.lookup(line.target).dimension.powers == line.dimension.powers


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
@pytest.mark.filterwarnings("ignore::DeprecationWarning")
def test_every_formula_is_typeset_and_its_layout_proved(any_formula: Formula) -> None:
    from calcpack.typeset.store import LayoutStore

    layout = LayoutStore().layout(any_formula)
    assert len(layout.lines) == len(list(any_formula.lines()))
