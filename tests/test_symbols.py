"""The notation table, and how names that it does not hold are set."""

from __future__ import annotations

import re

import pytest

from calcpack import notation, symbols
from calcpack.symbols import NOTATION, Symbol, is_known, lookup, typeset_name
from calcpack.typeset.names import GREEK
from calcpack.units import ANGLE, AREA, COUNT, FORCE, LENGTH, MOMENT, RATIO, STRESS, Dimension

ALL = pytest.mark.parametrize("symbol", NOTATION.values(), ids=NOTATION)


@ALL
def test_row_is_whole(symbol: Symbol) -> None:
    assert symbol.name.isidentifier()
    assert symbol.latex.strip() == symbol.latex != ""
    assert symbol.meaning[0].islower()
    assert not symbol.meaning.endswith(".")
    assert symbol.sign in ("positive", "nonnegative", "any")


def test_no_symbol_stands_twice() -> None:
    names = [row[0] for row in notation.ROWS]
    assert sorted(names) == sorted(set(names))


def test_no_two_symbols_look_the_same() -> None:
    forms = [symbol.latex for symbol in NOTATION.values()]
    assert [form for form in forms if forms.count(form) > 1] == []


# published: ACI 318-19, chapter 2 notation; the dimension is that of the quantity defined there.
@pytest.mark.parametrize(
    ("name", "latex", "dimension"),
    [
        ("f_c", "f'_c", STRESS),
        ("f_y", "f_y", STRESS),
        ("f_yt", "f_{yt}", STRESS),
        ("A_g", "A_g", AREA),
        ("A_st", "A_{st}", AREA),
        ("A_tr", "A_{tr}", AREA),
        ("d_b", "d_b", LENGTH),
        ("l_d", r"\ell_d", LENGTH),
        ("l_dh", r"\ell_{dh}", LENGTH),
        ("l_dc", r"\ell_{dc}", LENGTH),
        ("K_tr", "K_{tr}", LENGTH),
        ("P_o", "P_o", FORCE),
        ("phi_P_n_max", r"\phi P_{n,max}", FORCE),
        ("M_u", "M_u", MOMENT),
        ("psi_t", r"\psi_t", RATIO),
        ("psi_e", r"\psi_e", RATIO),
        ("lamb", r"\lambda", RATIO),
        ("phi", r"\phi", RATIO),
        ("beta_1", r"\beta_1", RATIO),
        ("rho_s", r"\rho_s", RATIO),
        ("n", "n", COUNT),
        ("theta", r"\theta", ANGLE),
    ],
)
def test_symbols_of_the_code(name: str, latex: str, dimension: Dimension) -> None:
    symbol = lookup(name)
    assert (symbol.latex, symbol.dimension) == (latex, dimension)
    assert typeset_name(name) == latex


def test_forces_and_moments_may_have_either_sign_and_strengths_not() -> None:
    assert {lookup(name).sign for name in ("P_u", "M_u", "V_u")} == {"any"}
    assert {lookup(name).sign for name in ("f_c", "f_y", "d_b", "A_g", "P_o")} == {"positive"}
    assert {lookup(name).sign for name in ("K_tr", "A_s", "A_tr", "h_below")} == {"nonnegative"}


def test_known_and_unknown() -> None:
    assert is_known("f_c")
    assert not is_known("fc1")
    with pytest.raises(KeyError, match="fc1"):
        lookup("fc1")


# from memory: how these names are set in the trade
@pytest.mark.parametrize(
    ("name", "latex"),
    [
        ("x", "x"),
        ("w_footing", "w_{footing}"),
        ("w_u_max", "w_{u,max}"),
        ("delta_s", r"\delta_{s}"),
        ("Delta_max", r"\Delta_{max}"),
        ("sigma", r"\sigma"),
        ("M_delta", r"M_{\delta}"),
        ("ell_x", r"\ell_{x}"),
        ("lamb_x", r"\lambda_{x}"),
        ("phi_M_n", r"\phi M_n"),
        ("phi_V_n", r"\phi V_{n}"),
        ("phi_s", r"\phi_{s}"),
        ("P1", "P_{1}"),
        ("x_12", "x_{12}"),
        ("w_u2", "w_{u,2}"),
        ("a__b", "a_{b}"),
        ("span", "span"),
    ],
)
def test_names_outside_the_table(name: str, latex: str) -> None:
    assert typeset_name(name) == latex


def test_every_greek_letter_of_a_name_can_be_set() -> None:
    assert set(GREEK) >= symbols._GREEK


@ALL
def test_latex_is_of_the_small_kind(symbol: Symbol) -> None:
    commands = set(re.findall(r"\\([A-Za-z]+)", symbol.latex))
    assert commands <= set(GREEK) | {"frac", "sqrt"}
    assert symbol.latex.count("{") == symbol.latex.count("}")
