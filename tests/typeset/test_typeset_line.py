"""Recorded evaluations as printed lines: units, honest digits, links, conditions."""

from __future__ import annotations

import json
import re
from math import cos, exp, pi, sqrt
from typing import Any

import page_reading
import pytest
from hypothesis import given
from hypothesis import strategies as st

from calcpack.formula import Formula, formula, inch, psi
from calcpack.typeset.digits import last_place
from calcpack.typeset.emit import MATHML, PLAIN
from calcpack.typeset.line import Origin, PrintedLine, printed_lines, with_unit
from calcpack.typeset.rows import condition_row, equation
from calcpack.typeset.store import LayoutStore
from calcpack.units import Angle, Area, Count, Force, Length, LineLoad, Moment, Ratio, Stress, read


@formula("empirical", empirical=True)
def development(*, f_y: Stress, f_c: Stress, psi_t: Ratio, c_b: Length, K_tr: Length, d_b: Length) -> Length:
    """A root of a stress: psi throughout."""
    confinement = min((c_b + K_tr) / d_b, 2.5)
    l_d = 3 / 40 * f_y / min(sqrt(f_c), 100) * psi_t / confinement * d_b
    return l_d


@formula("homogeneous")
def axial(*, f_c: Stress, f_y: Stress, A_g: Area, A_st: Area) -> Force:
    """Forces: kip and ksi."""
    P_o = 0.85 * f_c * (A_g - A_st) + f_y * A_st
    return P_o


@formula("homogeneous")
def span_moment(*, w_u: LineLoad, L: Length) -> Moment:
    """Loads and spans: kip and feet where they are read in feet."""
    M_u = w_u * L**2 / 8
    return M_u


@formula("homogeneous")
def pressure(*, P_u: Force, b: Length, h: Length) -> Stress:
    """A stress of forces."""
    q_u = P_u / (b * h)
    return q_u


@formula("rule")
def casting(*, h_below: Length) -> Ratio:
    """A condition with a dimensioned number."""
    if h_below > 12 * inch:
        psi_t = 1.3
    else:
        psi_t = 1.0
    return psi_t


@formula("rule")
def strength_rule(*, f_c: Stress, P_u: Force) -> Force:
    """A condition in psi on a line of forces."""
    if f_c > 6000 * psi:
        P_D = 0.9 * P_u
    else:
        P_D = 1.0 * P_u
    return P_D


@formula("rule")
def grade(*, f_y: Stress, n: Count) -> Ratio:
    """Compound conditions, both sides."""
    if (f_y > 80_000 * psi and n >= 4) or n == 2:
        psi_g = 1.3
    elif f_y > 60_000 * psi:
        psi_g = 1.15
    else:
        psi_g = 1.0
    return psi_g


@formula("own")
def leaning(*, L: Length, theta: Angle, n: Count) -> Length:
    """Angles, pi, and a line that needs many figures."""
    h: Length = L * cos(theta)
    s = (L - h) * exp(n / 10) / pi
    return s


def lines(one: Formula, store: LayoutStore, **written: str) -> list[PrintedLine]:
    """A formula's printed lines for values as an author writes them."""
    values = {name: read(text, one.arguments[name]).value for name, text in written.items()}
    recording = one.record(**values)
    origins = {name: Origin(f"S/{name}", "F-01" if name == "f_c" else "") for name in values}
    targets = [Origin(f"S/{recorded.line.target}") for recorded in recording.lines]
    return printed_lines(recording, store.layout(one), origins, written, targets)


def number_and_unit(text: str) -> tuple[float, str]:
    number, _, unit = text.partition(" ")
    return page_reading.printed_number(number), unit


def worked_from_page(line: PrintedLine) -> float:
    """The substituted row as the MathML shows it, worked by the independent reader."""
    rows = equation(line.symbol, line.layout, line.values, MATHML)
    tokens = [token for _, right in rows for token in page_reading.mathml(right)]
    return page_reading.worked(page_reading.split_at_equals(tokens)[-1])


def assert_honest(line: PrintedLine) -> None:
    number = line.line_result.partition(" ")[0]
    printed = page_reading.printed_number(number)
    assert abs(worked_from_page(line) - printed) <= last_place(number) * (1 + 1e-6), line
    for layout, values in line.conditions:
        assert page_reading.holds(page_reading.mathml(condition_row(layout, values, MATHML)[1])), line
    assert_second_unit_agrees(line)


# By definition: 12 in to the foot, 1000 lb to the kip; the coherent systems follow.
_TO_LB_IN = {
    "": 1.0, "in": 1.0, "ft": 12.0, "lb": 1.0, "kip": 1e3, "kip·in": 1e3, "kip·ft": 12e3, "lb·in": 1.0, "lb·ft": 12.0,
    "psi": 1.0, "ksi": 1e3, "psf": 1 / 144, "ksf": 1000 / 144, "lb/in": 1.0, "lb/ft": 1 / 12, "kip/ft": 1000 / 12,
    "kip/in": 1e3, "in²": 1.0, "ft²": 144.0, "rad": 1.0, "deg": 0.017453292519943295,
}  # fmt: skip


def assert_second_unit_agrees(line: PrintedLine) -> None:
    sizes = []
    room = 0.0
    for text in (line.line_result, line.shown):
        number, unit = number_and_unit(text)
        sizes.append(number * _TO_LB_IN[unit])
        room += last_place(text.partition(" ")[0]) * _TO_LB_IN[unit]
    assert abs(sizes[0] - sizes[1]) <= room


def page(line: PrintedLine) -> str:
    rows = equation(line.symbol, line.layout, line.values, PLAIN)
    return "".join(right for _, right in rows).strip()


def test_an_empirical_line_is_printed_in_psi(store: LayoutStore) -> None:
    confinement, l_d = lines(
        development, store, f_y="60 ksi", f_c="4 ksi", psi_t="1.3", c_b="2.5 in", K_tr="0 in", d_b="1 in"
    )
    assert "60,000 psi" in page(l_d)
    assert "√(4,000 psi)" in page(l_d)
    assert confinement.line_result == confinement.shown == "2.5"
    # By hand: 3/40 * 60000/63.2456 * 1.3/2.5 = 36.9986 in.
    assert number_and_unit(l_d.shown)[0] == pytest.approx(37.0, abs=0.05)
    assert l_d.line_result == l_d.shown
    assert l_d.shown.endswith(" in")


def test_a_line_of_forces_is_printed_in_kip_and_ksi(store: LayoutStore) -> None:
    (line,) = lines(axial, store, f_c="4000 psi", f_y="60000 psi", A_g="400 in^2", A_st="8 in^2")
    # By hand: 0.85*4*392 + 60*8 = 1812.8 kip.
    assert line.shown == line.line_result == "1,813 kip"
    assert page(line).endswith("0.85 · 4 ksi · (400 in² − 8 in²) + 60 ksi · 8 in²")


def test_a_moment_of_feet_is_printed_in_feet(store: LayoutStore) -> None:
    (line,) = lines(span_moment, store, w_u="2.5 kip/ft", L="24 ft")
    # By hand: 2.5*24^2/8 = 180 kip ft.
    assert line.line_result == line.shown == "180 kip·ft"
    assert page(line).endswith("(2.5 kip/ft · (24 ft)^2)/8")


def test_a_moment_of_inches_is_shown_in_feet_beside_the_line(store: LayoutStore) -> None:
    (line,) = lines(span_moment, store, w_u="0.25 kip/in", L="288 in")
    # By hand: 0.25*288^2/8 = 2592 kip in = 216 kip ft.
    assert (line.line_result, line.shown) == ("2,592 kip·in", "216 kip·ft")


def test_a_pressure_of_feet_and_kips(store: LayoutStore) -> None:
    (feet,) = lines(pressure, store, P_u="200 kip", b="8 ft", h="8 ft")
    assert feet.line_result == feet.shown == "3.125 ksf"  # 200/64
    (inches,) = lines(pressure, store, P_u="200 kip", b="20 in", h="20 in")
    assert inches.line_result == inches.shown == "0.5 ksi"  # 200/400
    (equal,) = lines(pressure, store, P_u="200 kip", b="20 ft", h="20 in")
    assert equal.line_result.endswith(" ksi")


@pytest.mark.parametrize(
    ("h_below", "value", "condition"),
    [
        ("18 in", "1.3", "18 in > 12 in"),
        ("12 in", "1.0", "12 in ≤ 12 in"),
        ("11 in", "1.0", "11 in ≤ 12 in"),
        ("1.5 ft", "1.3", "18 in > 12 in"),
        ("1 ft", "1.0", "12 in ≤ 12 in"),
        ("12.0004 in", "1.3", "12.0004 in > 12 in"),
        ("12.000049 in", "1.3", "12.000049 in > 12 in"),
        ("4 ft", "1.3", "48 in > 12 in"),
    ],
)
def test_a_condition_is_printed_in_the_unit_of_its_number(
    h_below: str, value: str, condition: str, store: LayoutStore
) -> None:
    (line,) = lines(casting, store, h_below=h_below)
    ((layout, values),) = line.conditions
    assert line.shown == value
    assert condition_row(layout, values, PLAIN)[1] == condition
    assert_honest(line)


@pytest.mark.parametrize(("f_c", "factor"), [("5 ksi", 1.0), ("6 ksi", 1.0), ("6.001 ksi", 0.9), ("8 ksi", 0.9)])
def test_a_condition_in_psi_holds_the_line_to_pounds(f_c: str, factor: float, store: LayoutStore) -> None:
    (line,) = lines(strength_rule, store, f_c=f_c, P_u="100 kip")
    assert number_and_unit(line.line_result) == (factor * 100_000.0, "lb")
    assert number_and_unit(line.shown) == (factor * 100.0, "kip")
    assert_honest(line)


def test_an_angle_is_worked_in_radians_and_kept_honest(store: LayoutStore) -> None:
    h, s = lines(leaning, store, L="20 ft", theta="5 deg", n="3")
    assert " rad)" in page(h)
    for line in (h, s):
        assert_honest(line)
    assert re.search(r"π", page(s))


def test_values_link_to_where_they_were_set(store: LayoutStore) -> None:
    confinement, l_d = lines(
        development, store, f_y="60 ksi", f_c="4 ksi", psi_t="1.3", c_b="2.5 in", K_tr="0 in", d_b="1 in"
    )
    links = {value.text: (value.link, value.sheet) for value in l_d.values if value.link}
    assert links["60,000 psi"] == ("S/f_y", "")
    assert links["4,000 psi"] == ("S/f_c", "F-01")
    assert links["2.5"] == ("S/confinement", "")
    assert [value.link for value in confinement.values if value.text == "2.5"] == [""]


def test_a_constant_has_no_link_and_its_unit(store: LayoutStore) -> None:
    (line,) = lines(casting, store, h_below="18 in")
    ((_, values),) = line.conditions
    assert [(value.text, value.link) for value in values] == [("18 in", "S/h_below"), ("12 in", "")]


def test_printed_line_survives_json(store: LayoutStore) -> None:
    for line in (*lines(casting, store, h_below="18 in"), *lines(span_moment, store, w_u="0.25 kip/in", L="288 in")):
        assert PrintedLine.from_json(json.loads(json.dumps(line.to_json()))) == line


def test_with_unit() -> None:
    assert (with_unit("5", "kip*ft"), with_unit("5", "in^2"), with_unit("5", "")) == ("5 kip·ft", "5 in²", "5")


def text_of(low: float, high: float, unit: str) -> st.SearchStrategy[str]:
    """Values as authors write them: round ones, and ones an analysis exports with all their figures."""
    exact = st.floats(low, high).map(lambda value: f"{value!r} {unit}")
    return exact | st.floats(low, high).map(lambda value: f"{value:.3g} {unit}".replace("e+0", "e"))


@given(
    st.fixed_dictionaries(
        {
            "f_y": text_of(40, 100, "ksi"),
            "f_c": text_of(2500, 12000, "psi") | text_of(2.5, 12, "ksi"),
            "psi_t": text_of(1.0, 1.3, ""),
            "c_b": text_of(0.5, 6, "in"),
            "K_tr": text_of(0, 3, "in"),
            "d_b": text_of(0.375, 2.257, "in"),
        }
    )
)
def test_empirical_lines_are_honest(store: LayoutStore, written: dict[str, str]) -> None:
    for line in lines(development, store, **written):
        assert_honest(line)


@given(
    st.fixed_dictionaries(
        {
            "f_c": text_of(2.5, 12, "ksi"),
            "f_y": text_of(40_000, 100_000, "psi"),
            "A_g": text_of(64, 4000, "in^2"),
            "A_st": text_of(0.5, 60, "in^2"),
        }
    )
)
def test_lines_of_forces_are_honest(store: LayoutStore, written: dict[str, str]) -> None:
    for line in lines(axial, store, **written):
        assert_honest(line)


@given(
    text_of(0.1, 20, "kip/ft") | text_of(10, 900, "lb/in") | text_of(5, 90, "kN/m"),
    text_of(4, 60, "ft") | text_of(50, 700, "in") | text_of(2, 20, "m"),
)
def test_moments_are_honest_in_both_units(store: LayoutStore, w_u: str, L: str) -> None:
    for line in lines(span_moment, store, w_u=w_u, L=L):
        assert_honest(line)


@given(
    text_of(1, 900, "kip") | text_of(-900_000, -1000, "lb"),
    text_of(1, 20, "ft") | text_of(8, 90, "in"),
    text_of(1, 20, "ft") | text_of(8, 90, "in"),
)
def test_pressures_are_honest(store: LayoutStore, P_u: str, b: str, h: str) -> None:
    for line in lines(pressure, store, P_u=P_u, b=b, h=h):
        assert_honest(line)


@given(text_of(0, 24, "in") | text_of(0, 2, "ft") | st.sampled_from(["12 in", "1 ft", "12.00001 in", "11.99999 in"]))
def test_conditions_hold_as_printed(store: LayoutStore, h_below: str) -> None:
    for line in lines(casting, store, h_below=h_below):
        assert_honest(line)


@given(
    text_of(40, 100, "ksi") | st.sampled_from(["60 ksi", "80 ksi", "60000.001 psi", "79999.9999 psi"]),
    st.sampled_from(["2", "3", "4", "8"]),
)
def test_compound_conditions_hold_as_printed(store: LayoutStore, f_y: str, n: str) -> None:
    for line in lines(grade, store, f_y=f_y, n=n):
        assert_honest(line)


@given(text_of(1, 60, "ft") | text_of(12, 700, "in"), text_of(1, 80, "deg"), st.sampled_from(["1", "3", "8"]))
def test_own_lines_are_honest(store: LayoutStore, L: str, theta: str, n: str) -> None:
    written: dict[str, Any] = {"L": L, "theta": theta, "n": n}
    for line in lines(leaning, store, **written):
        assert_honest(line)
