"""Formulas in symbols: every branch with the conditions that lead to it, and rows an independent reader can work."""

from __future__ import annotations

import json
from typing import Any

import page_reading
import pytest

from calcpack.aci318.standards import ACI_318_19
from calcpack.formula import formula, inch
from calcpack.typeset.emit import LATEX, MATHML, PLAIN, SPOKEN, TYPST, Target, emit
from calcpack.typeset.general import GeneralLine, general_lines
from calcpack.typeset.rows import COLUMN, width, with_symbols
from calcpack.typeset.store import LayoutStore
from calcpack.units import Force, Length, Ratio, Stress

# handcalcs calls names of pyparsing that are due to go.
pytestmark = pytest.mark.filterwarnings("ignore::DeprecationWarning")


@formula("test")
def nested(*, d: Length, s: Length) -> Ratio:
    """A rule within a rule, a line before it and one behind it."""
    D_c = 2 * d
    if s > 12 * inch:
        if d >= s and d < 3 * s:
            psi_t = 1.3
        else:
            psi_t = 1.2
    else:
        psi_t = 1.0
    psi_e = psi_t * D_c / s
    return psi_e


@formula(ACI_318_19("22.4.2.2"))
def forces(*, P_u: Force, P_o: Force, f_c: Stress, d: Length, h: Length, b: Length) -> Force:
    """Far too many terms for one row."""
    P_n_max: Force = (
        P_u
        + 0.85 * f_c * b * h
        + 0.75 * f_c * d * h
        + 0.65 * f_c * b * d
        + P_o
        + 0.55 * f_c * d * d
        - 0.45 * f_c * b * b
    )
    return P_n_max


@pytest.fixture
def lines(store: LayoutStore) -> list[GeneralLine]:
    return general_lines(nested, store.layout(nested))


def said(layout: Any) -> str:
    return emit(with_symbols(layout), PLAIN).strip()


def test_every_line_stands_with_the_conditions_that_lead_to_it(lines: list[GeneralLine]) -> None:
    assert [(line.symbol, said(line.layout)) for line in lines] == [
        ("D_c", "2 d"), ("psi_t", "1.3"), ("psi_t", "1.2"), ("psi_t", "1"), ("psi_e", "(ψt Dc)/s"),
    ]  # fmt: skip
    assert [[said(layout) for layout in line.conditions] for line in lines] == [
        [],
        ["s > 12 in", "d ≥ s and d < 3 s"],
        ["s > 12 in", "d < s or d ≥ 3 s"],  # De Morgan
        ["s ≤ 12 in"],
        [],
    ]


def test_a_line_survives_the_notebook(lines: list[GeneralLine]) -> None:
    for line in lines:
        assert GeneralLine.from_json(json.loads(json.dumps(line.to_json()))) == line


@pytest.mark.parametrize("language", ["mathml", "typst", "plain"])
def test_a_row_works_out_to_what_the_formula_gives(lines: list[GeneralLine], language: str) -> None:
    target: Target = {"mathml": MATHML, "typst": TYPST, "plain": PLAIN}[language]
    read = {"mathml": page_reading.mathml, "typst": page_reading.typst, "plain": page_reading.plain}[language]
    ((left, right),) = lines[4].rows(target)
    (name,) = [text for kind, text in read(left) if kind == "name"]
    known = {"mathml": ("ψ_t", "D_c"), "typst": ("ψ_t", "D_c"), "plain": ("ψt", "Dc")}[language]
    values = dict(zip(known, (1.3, 8.0), strict=True)) | {"s": 13.0}
    (part,) = page_reading.split_at_equals(read(right))
    assert name in ("ψ_e", "ψe")
    # 1.3 (8)/13, by hand; and as the formula gives it for d = 4 in... with s = 13 in, where psi_t is 1.2
    assert page_reading.worked(part, values) == pytest.approx(0.8)
    assert nested(d=13.0, s=13.0) == pytest.approx(2.6)  # 1.3 (26)/13


@pytest.mark.parametrize("target", [LATEX, MATHML, TYPST, PLAIN, SPOKEN])
def test_a_long_line_is_broken_before_an_operator(store: LayoutStore, target: Target) -> None:
    (line,) = general_lines(forces, store.layout(forces))
    rows = line.rows(target)
    assert width(with_symbols(line.layout)) > COLUMN
    assert len(rows) == 2
    assert rows[0][0].strip()
    assert rows[1][0] == ""
    assert rows[0][1].startswith(f"{target.operator('=')} ")
    assert not rows[1][1].startswith(f"{target.operator('=')} ")
    assert not line.wide


def test_a_quotient_that_cannot_be_broken_is_wide(store: LayoutStore, lines: list[GeneralLine]) -> None:
    (line,) = general_lines(forces, store.layout(forces))
    from calcpack.typeset.layout import Layout

    tree = ("frac", line.layout.tree, line.layout.tree)
    assert GeneralLine(line.symbol, Layout(tree, line.layout.slots)).wide
    assert not any(one.wide for one in lines)
