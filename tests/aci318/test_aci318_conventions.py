"""What holds for every formula: notation, clauses, docstrings, lines that fit the page."""

from __future__ import annotations

import ast
import importlib
import re
from math import inf

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


# What no clause states, and how a sheet cites it.
NO_CLAUSE = {
    "geometry of the section",
    "ratio on a ray",
    "reciprocal load method, B. Bresler, ACI Journal 57, 1960",
}


def test_every_formula_cites_an_edition_or_the_geometry(any_formula: Formula) -> None:
    for clause in any_formula.clauses:
        if clause.standard is None:
            assert clause.number in NO_CLAUSE
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
        # Roots of ratios and of squares are homogeneous.
        assert "sqrt(f_c" not in text
        assert "sqrt(min(f_c" not in text


def test_each_module_lists_its_formulas(formula_names: dict[str, list[str]]) -> None:
    assert len(formula_names) == 20
    for module, names in formula_names.items():
        listed = importlib.import_module(f"calcpack.aci318.{module}").__all__
        public = {name for name in listed if not name.startswith("_")} - {"cited_in"}
        assert public == set(names), module


def test_the_package_is_a_table_of_contents() -> None:
    assert aci318.__all__ == sorted(aci318.__all__)
    assert aci318.hooks is importlib.import_module("calcpack.aci318.hooks")
    with pytest.raises(AttributeError, match=r"calcpack.aci318 has no 'hook'; it has bars, bending, bundles, columns"):
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
        E_c 3604997, E_s 29000000, I_g 46298.25, I_se 512.34, EI_eff 44511234567, beta_dns 0.6, k 0.85528, l_u 156
        r 8.55, slenderness 25.13, M_bottom -456000, M_top 1132800, M_1 456000, M_2 1132800, M_2_min 562310
        M_c 1324567, M_c_max 1585920, M_u 1132800, M_ns 812000, M_s 320800, C_m 0.439, delta_ns 1.1474, delta_s 1.364
        P_u 552800, P_c 4508215, P_c_reduced 3381161, stability 0.1635, P_sustained 276000, sum_P_u 2000000
        sum_P_c 10000000, sum_P_c_reduced 7500000, stability_s 0.26667, Delta_o 0.5, V_us 40000, l_c 125, Q 0.12345
        psi_A 2, psi_B 1.25, y_s 11.561, x_s 9.561
        beta_1 0.825, theta 0.9273, c 13.4567, a 11.1018, u_x 0.60123, u_y 0.79908, h_u 18.6017, q 7.4999
        x -9.561, y 11.561, x_before 12, y_before -3.4567, A_j 171.93, S_jx 1894.3, S_jy -1672.1
        A_j_sum 412.68, S_jx_sum 5123.4, S_jy_sum 14231.2, A_c 206.34, omega 1.3456, u_c 6.7891, C_c 701556
        x_c 4.1381, y_c 11.4936, eps_cu 0.003, eps_ty 0.00207, eps_t 0.0034567, eps_s -0.00123456, d_s 19.2345
        f_s -35802.2, F_s -35802.2, F_s_sum -89123.4, M_Fx -413912, M_Fx_sum 1876543, M_Fy_sum 1312345
        M_ux 1832400, M_uy -1212600, P_n 612432.6, M_nx 9939876, M_ny 4215432, R_u 561234, phi_R_n 655123
        k_u 0.85668, S_u 552800, S_n 612432.6, e_n 3.3157, e_x -2.1936, e_y 3.3148
        P_nx 808775, P_ny 1148662, P_n_recip 641830
        V_ux -38250, V_uy 21475, V_u 43875, N_u 185400, V_c 43787.6, V_s 17925.9, V_s_req 8254.3
        phi_V_nx 46234, phi_V_ny 52718, A_v 0.62, f_yt_v 60000, b_w 24, d 21.375, d_t 25.6, n_rows 1, rho_w 0.0124
        lambda_s 0.798, A_s 4.74, A_bt 0.31, n_legs 4, n_x 4, n_y 5, n_legs_x 4, n_legs_y 3, n_l 10, h_max 28.5
        h_x 7.417, s_o 6, b_c 21.375, A_sh 1.24, k_f 1.08, k_n 1.25
        n 4, n_bars 12, n_face 4, l_d_a 35.5756, l_dh_a 18.9737, l_dt_a 14.3568, l_dc_a 20.3251, l_sc_a 33.84
        l_d 35.5756, l_dh_j 14.2346, l_core 20.5
        n_bundle 3, d_be 1.2345, k_bundle 1.2, r_spliced 0.5, r_stress 0.375, l_st_s 46.2483, l_dc 20.3251, l_sc_s 33.84
        M_n 2456789, l_a 8.625, l_n 283.5, A_s_pos 4.74, A_s_neg 6.32
        l_st 46.2483, psi_t 1.3, psi_e 1.2, psi_s 0.8, psi_g 1.15, psi_c 0.867, psi_r 0.75, psi_o 1.25, psi_p 1.6
        """.strip().split("\n")
        for pair in line.strip().split(", ")
    )
}


def typical(formula: Formula) -> dict[str, float]:
    """Typical values of the arguments of a formula, within its limits."""
    highest = {limit.symbol: limit.high for limit in formula.limits}
    return {name: min(TYPICAL[name], highest.get(name, inf)) for name in formula.arguments}


def printed(formula: Formula) -> list[PrintedLine]:
    """The lines of a formula, worked on typical values."""
    recording = formula.record(**typical(formula))
    shown = {name: shown_text(value, formula.arguments[name]) for name, value in typical(formula).items()}
    origins = {name: Origin(f"C-01/{name}") for name in formula.arguments}
    targets = [Origin(f"C-01/{recorded.line.target}") for recorded in recording.lines]
    return printed_lines(recording, STORE.layout(formula), origins, shown, targets)


def test_every_formula_is_typeset_and_its_layout_proved(any_formula: Formula) -> None:
    layout = STORE.layout(any_formula)
    assert len(layout.lines) == len(list(any_formula.lines()))
    for condition in any_formula.conditions():
        assert ast.unparse(condition) in layout.conditions


# Worked for rows of a table only: its cells hold the values, so no row of such a formula is printed with them.
TABLED = {"bar_stress"}


def test_every_row_of_every_formula_fits_the_working_column(any_formula: Formula) -> None:
    for line in printed(any_formula):
        left = width(name_tree(line.symbol)) + 1
        rows = [with_symbols(line.layout), with_values(line.layout, line.values)]
        for node in rows[:1] if any_formula.name in TABLED else rows:
            for part in broken(node, COLUMN - left):
                assert left + width(part) <= COLUMN, f"{any_formula.name}: {line.symbol}"


def test_every_printed_line_gives_its_printed_result(any_formula: Formula) -> None:
    # The page itself: a calculator fed with the printed numbers gives the printed result, give or take one at its end.
    recording = any_formula.record(**typical(any_formula))
    for line, recorded in zip(printed(any_formula), recording.lines, strict=True):
        fed = {
            slot.text: parse_number(value.text)
            for slot, value in zip(line.layout.slots, line.values, strict=True)
            if slot.kind == "symbol"
        }
        result = eval(recorded.line.code, any_formula.function.__globals__, fed)
        assert abs(result - parse_number(line.line_result)) <= 1.01 * last_place(line.line_result)
