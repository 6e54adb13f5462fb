"""The gate: every form of text and quantity, what is refused and how, and the coherent systems."""

from __future__ import annotations

import math
import time
from fractions import Fraction

import numpy as np
import pytest
from hypothesis import given
from hypothesis import strategies as st

from calcpack import units
from calcpack.errors import UnitError
from calcpack.units import (
    ANGLE,
    AREA,
    COUNT,
    FORCE,
    LENGTH,
    LINE_LOAD,
    MOMENT,
    RATIO,
    SI,
    STRESS,
    TIME,
    UNIT_WEIGHT,
    US,
    US_FT,
    US_KIP,
    US_KIP_FT,
    Dimension,
    coherent_unit,
    convert,
    dimension_of,
    display_unit,
    factor,
    plain_unit,
    quantity,
    read,
    registry,
    split_header,
)

# published: NIST Special Publication 811 (2008), appendix B.8, factors to SI, to the digits printed there.
# The exact ones (inch, foot, yard, kilogram-force) are stated there in bold; the rest have seven significant digits.
NIST_811 = [
    ("in", "m", 2.54e-2, 0.0),
    ("ft", "m", 3.048e-1, 0.0),
    ("yd", "m", 9.144e-1, 0.0),
    ("lb", "N", 4.448222, 5e-7),
    ("kip", "N", 4.448222e3, 5e-4),
    ("kgf", "N", 9.80665, 0.0),
    ("psi", "Pa", 6.894757e3, 5e-4),
    ("ksi", "Pa", 6.894757e6, 5e-1),
    ("psf", "Pa", 4.788026e1, 5e-6),
    ("plf", "N/m", 1.459390e1, 5e-6),
    ("lb/in", "N/m", 1.751268e2, 5e-5),
    ("lb*ft", "N*m", 1.355818, 5e-7),
    ("lb*in", "N*m", 1.129848e-1, 5e-8),
    ("in^2", "m^2", 6.4516e-4, 0.0),
    ("ft^2", "m^2", 9.290304e-2, 0.0),
    ("in^3", "m^3", 1.638706e-5, 5e-12),
    ("ft^3", "m^3", 2.831685e-2, 5e-9),
    ("in^4", "m^4", 4.162314e-7, 5e-14),
    ("deg", "rad", 1.745329e-2, 5e-9),
    ("min", "s", 60.0, 0.0),
    ("hr", "s", 3600.0, 0.0),
    ("day", "s", 86400.0, 0.0),
]
# By definition of the unit: 1 ton (short) is 2000 lb, 1 kip 1000 lb, 1 percent 0.01; NIST SP 811, B.8 and 7.10.2.
DEFINED = [
    ("ton", "lb", 2000.0),
    ("tonf", "lb", 2000.0),
    ("kip", "lb", 1000.0),
    ("kips", "lb", 1000.0),
    ("lbf", "lb", 1.0),
    ("ksi", "psi", 1000.0),
    ("ksf", "psf", 1000.0),
    ("klf", "plf", 1000.0),
    ("kcf", "pcf", 1000.0),
    ("pci", "pcf", 1728.0),
    ("foot", "inch", 12.0),
    ("yard", "foot", 3.0),
    ("tf", "kgf", 1000.0),
    ("MPa", "N/mm^2", 1.0),
    ("GPa", "MPa", 1000.0),
    ("kN", "N", 1000.0),
    ("cm", "mm", 10.0),
    ("metre", "m", 1.0),
    ("hour", "minute", 60.0),
    ("degree", "deg", 1.0),
]


def size(unit: str, other: str) -> float:
    """How many `other` make one `unit`, through the coherent unit."""
    return factor(unit) / factor(other)


@pytest.mark.parametrize(("unit", "si", "published", "half"), NIST_811)
def test_unit_has_the_published_size(unit: str, si: str, published: float, half: float) -> None:
    assert size(unit, si) == pytest.approx(published, rel=1e-13, abs=half)


@pytest.mark.parametrize(("unit", "other", "count"), DEFINED)
def test_unit_is_defined_by_another(unit: str, other: str, count: float) -> None:
    assert size(unit, other) == pytest.approx(count, rel=1e-14)


def test_pound_is_exact() -> None:
    # published: NIST SP 811 (2008), appendix B.8 note 22: 1 lbf = 4.448 221 615 260 5 N exactly.
    assert size("lb", "N") == pytest.approx(4.4482216152605, rel=1e-15)


def test_every_unit_of_the_file_is_checked() -> None:
    checked = {unit for row in (*NIST_811, *DEFINED) for unit in row[:2]} | {"percent", "rad"}
    spelled = {str(registry().Unit(unit.split("/")[0].split("*")[0].split("^")[0])) for unit in checked}
    stated = set()
    for line in (units.resources.files("calcpack") / "units.txt").read_text("utf-8").splitlines():
        if "=" in line and not line.startswith("#") and not line.split("=")[0].strip().endswith("-"):
            stated.add(str(registry().Unit(line.split("=")[0].strip())))
    assert stated <= spelled | {"pascal", "newton", "meter"}


# The right column follows from the factors above and the sizes 1 ft = 12 in, 1 kip = 1000 lb.
TEXTS = [
    ("12 in", LENGTH, 12.0),
    ("12in", LENGTH, 12.0),
    ("  12   in  ", LENGTH, 12.0),
    ("12.5 in", LENGTH, 12.5),
    (".5 in", LENGTH, 0.5),
    ("5. in", LENGTH, 5.0),
    ("+5 in", LENGTH, 5.0),
    ("-5 in", LENGTH, -5.0),
    ("1e3 psi", STRESS, 1000.0),
    ("2.5E-3 ksi", STRESS, 2.5),
    ("4,000 psi", STRESS, 4000.0),
    ("1,234,567.5 lb", FORCE, 1234567.5),
    ("12,000,000 lb", FORCE, 12e6),
    ("29000 ksi", STRESS, 29e6),
    ("1/2 in", LENGTH, 0.5),
    ("-1/2 in", LENGTH, -0.5),
    ("2 1/2 in", LENGTH, 2.5),
    ("2-1/2 in", LENGTH, 2.5),
    ("-2 1/2 in", LENGTH, -2.5),
    ("12'", LENGTH, 144.0),
    ("12' ", LENGTH, 144.0),
    ("12'-6\"", LENGTH, 150.0),
    ("12' - 6\"", LENGTH, 150.0),
    ("12'6\"", LENGTH, 150.0),
    ("12' 6\"", LENGTH, 150.0),
    ("12'-6.25\"", LENGTH, 150.25),
    ("12'-.25\"", LENGTH, 144.25),
    ("12'-1/2\"", LENGTH, 144.5),
    ("12'-6 1/2\"", LENGTH, 150.5),
    ("12'-6-1/2\"", LENGTH, 150.5),
    ("12' 6 1/2\"", LENGTH, 150.5),
    ("0'-6\"", LENGTH, 6.0),
    ("3 in^2", AREA, 3.0),
    ("3 in**2", AREA, 3.0),
    ("3 in²", AREA, 3.0),
    ("3 in ^ 2", AREA, 3.0),
    ("3 in*in", AREA, 3.0),
    ("2 ft²", AREA, 288.0),
    ("100 kip*ft", MOMENT, 1.2e6),
    ("100 kip·ft", MOMENT, 1.2e6),
    ("100 kip-ft", MOMENT, 1.2e6),
    ("100 kip ft", MOMENT, 1.2e6),
    ("100 ft*kip", MOMENT, 1.2e6),
    ("1.2 kip/ft", LINE_LOAD, 100.0),
    ("1.2 klf", LINE_LOAD, 100.0),
    ("144 psf", STRESS, 1.0),
    ("144 lb/ft^2", STRESS, 1.0),
    ("144 lb/(ft*ft)", STRESS, 1.0),
    ("144 lb/ft/ft", STRESS, 1.0),
    ("172.8 pcf", UNIT_WEIGHT, 0.1),
    ("8 %", RATIO, 0.08),
    ("8%", RATIO, 0.08),
    ("8 percent", RATIO, 0.08),
    ("0.75", RATIO, 0.75),
    ("1/4", RATIO, 0.25),
    ("3 3/4", RATIO, 3.75),
    ("12", COUNT, 12.0),
    ("180 deg", ANGLE, math.pi),
    ("1 rad", ANGLE, 1.0),
    ("2 hr", TIME, 7200.0),
]


@pytest.mark.parametrize(("text", "dimension", "value"), TEXTS)
def test_text_passes_the_gate(text: str, dimension: Dimension, value: float) -> None:
    measured = read(text, dimension)
    assert measured.value == pytest.approx(value, rel=1e-14)
    assert measured.dimension == dimension


def test_text_keeps_number_and_unit_as_written() -> None:
    measured = read("2 1/2 ft", LENGTH)
    assert (measured.number, measured.unit, measured.value) == (2.5, "ft", 30.0)
    assert read("12'-6\"", LENGTH).unit == "in"
    assert read("0.9", RATIO).unit == ""


def test_the_unit_decides_where_no_dimension_is_asked_for() -> None:
    assert read("4 ksi", None).dimension == STRESS
    assert read("4", None).dimension == RATIO
    assert read("30 deg", None).dimension == ANGLE


@pytest.mark.parametrize("text", ["", "   ", "in", "x in", "nan in", "inf psi", "−5 in", "٣ in", "$4000", "'6\""])
def test_text_without_a_number_is_refused(text: str) -> None:
    with pytest.raises(UnitError, match=r"a number with its unit: write e\.g\. '12 in'"):
        read(text, LENGTH, "l_d")


@pytest.mark.parametrize(
    "text",
    [
        "1,2 in",
        "1,00 in",
        "1,0000 in",
        "1.5.5 in",
        "4 2 in",
        "1/0 in",
        "1/2in",
        "1.5/2 in",
        "12'--6\"",
        "12'6 7\"",
        "12'6/\"",
        "12'6.5.5\"",
        "12'-6",
        "-12'-6\"",
        "5 IN",
        "5 Kip",
        "5 in.",
        "5 #",
        "5 furlong",
        "5 ft-6 in",
        "0x10 in",
        "5 in;6 in",
        "5 in^(1/2)",
        "5 in^2.5",
        "5 deg*in",
        "5 kip/deg",
    ],
)
def test_unknown_unit_is_refused_with_those_known(text: str) -> None:
    with pytest.raises(UnitError, match=r"unit .* in, ft, mm, m, lb, kip.*write the unit as in calcpack/units\.txt"):
        read(text, None, "x")


@pytest.mark.parametrize(
    "text",
    [
        "5 __import__('os').system('true')",
        "5 in.__class__",
        "5 in; import os",
        "5 lambda: 0",
        "5 [in]",
        "5 {in}",
        "5 in\x00",
        "5 in'or'1",
        "5 <script>",
        "5 in^9^9^9",
        "5 in^99999999999",
        "5 9^9^9^9*in",
        "5 9**9**9**9 in",
        "5 in^-9^9^9",
        "5 " + "in*" * 3000 + "in",
        "5 " + "(" * 500 + "in" + ")" * 500,
    ],
)
def test_hostile_unit_text_is_refused_at_once(text: str) -> None:
    start = time.perf_counter()
    with pytest.raises(UnitError, match="unknown unit"):
        read(text, None)
    assert time.perf_counter() - start < 1.0


@pytest.mark.parametrize(
    ("given_", "dimension", "message"),
    [
        ("12", LENGTH, r"l_d = 12 \(no unit\)\s+a length: add the unit, e\.g\. in$"),
        (12, LENGTH, r"l_d = 12 \(no unit\)\s+a length: add the unit, e\.g\. in$"),
        (12.5, AREA, r"l_d = 12\.5 \(no unit\)\s+an area: add the unit, e\.g\. in\^2$"),
        ("12", FORCE, r"a force: add the unit, e\.g\. lb or kip$"),
        ("4 psi", LENGTH, r"l_d = 4 psi \(stress or pressure\)\s+a length: write it in in$"),
        ("4 in", FORCE, r"l_d = 4 in \(length\)\s+a force: write it in lb or kip$"),
        ("4 in", RATIO, r"l_d = 4 in \(length\)\s+a number without a unit: remove the unit$"),
        ("4 in", COUNT, r"a number without a unit: remove the unit$"),
        ("30 deg", RATIO, r"l_d = 30 deg \(angle\)\s+a number without a unit: remove the unit$"),
        ("30 deg", LENGTH, r"l_d = 30 deg \(angle\)\s+a length: write it in in$"),
        (0.5, ANGLE, r"l_d = 0\.5 \(no unit\)\s+an angle: add the unit, e\.g\. rad or deg$"),
        ("0.5", ANGLE, r"an angle: add the unit, e\.g\. rad or deg$"),
        ("5 in", ANGLE, r"l_d = 5 in \(length\)\s+an angle: write it in rad or deg$"),
        ("5 kip*in^3", MOMENT, r"\(force\^1 length\^3 time\^0\)\s+a moment: write it in lb\*in or kip\*ft$"),
    ],
)
def test_wrong_or_missing_dimension_says_what_to_do(given_: object, dimension: Dimension, message: str) -> None:
    with pytest.raises(UnitError, match=message):
        read(given_, dimension, "l_d")


@pytest.mark.parametrize("given_", [math.nan, math.inf, -math.inf, "1e400 in", np.float64("nan")])
def test_not_finite_is_refused(given_: object) -> None:
    with pytest.raises(UnitError, match=r"x = .*a finite number: correct the value"):
        read(given_, None, "x")


@pytest.mark.parametrize("given_", [True, False, None])
def test_truth_and_nothing_are_no_numbers(given_: object) -> None:
    with pytest.raises(UnitError, match=rf"x = {given_}\s+a number with its unit"):
        read(given_, RATIO, "x")


@pytest.mark.parametrize("given_", [[5], (1, 2), {"a": 1}, b"5 in", 5j, object, np.bool_(True)])
def test_other_objects_are_refused_with_examples(given_: object) -> None:
    with pytest.raises(UnitError, match=r"text such as '12 in', or a quantity such as 12\*inch"):
        read(given_, None, "x")


def test_an_integer_beyond_floats_is_refused() -> None:
    with pytest.raises(UnitError, match="one finite number: correct the value"):
        read(10**400, None, "x")


def test_an_array_of_lengths_is_refused() -> None:
    with pytest.raises(UnitError, match="one finite number: correct the value"):
        read(np.array([1.0, 2.0]) * registry().inch, LENGTH, "x")


@pytest.mark.parametrize("number", [np.int64(8), np.float32(8), np.float64(8), Fraction(8), 8])
def test_numbers_of_other_libraries_pass(number: object) -> None:
    assert read(number, COUNT).value == 8.0


def test_quantities_pass_the_gate() -> None:
    assert read(4 * units.ksi, STRESS).value == 4000.0
    assert read(units.inch * 12, LENGTH).value == 12.0
    assert read(2 * units.feet, LENGTH).value == 24.0
    assert read(100 * units.kip * units.ft, MOMENT).value == pytest.approx(1.2e6, rel=1e-14)
    assert read(30 * units.degree, ANGLE).value == pytest.approx(math.pi / 6, rel=1e-14)
    assert read(5 * units.percent, RATIO).value == pytest.approx(0.05, rel=1e-14)
    assert read(units.inch, LENGTH).value == 1.0
    assert read(registry().Quantity(0.5, ""), RATIO).value == 0.5


def test_a_quantity_keeps_its_unit_as_text_that_can_be_read_again() -> None:
    measured = read(3 * units.kip / units.ft**2, STRESS)
    assert read(f"{measured.number} {measured.unit}", STRESS).value == measured.value


def test_a_quantity_of_the_wrong_dimension_is_refused() -> None:
    with pytest.raises(UnitError, match=r"x = 4\.0 kilopound_force|x = 4 .*\(stress or pressure\)\s+a length"):
        read(4 * units.ksi, LENGTH, "x")


def test_an_unknown_unit_by_name_says_where_they_stand() -> None:
    with pytest.raises(AttributeError, match=r"no unit 'furlong'; the units known stand in calcpack/units\.txt"):
        _ = units.furlong
    with pytest.raises(AttributeError, match="no unit '_private'"):
        _ = units._private


# From the definition of a coherent system: base units multiplied, no factor.
COHERENT = [
    (RATIO, US, ""),
    (COUNT, US, ""),
    (ANGLE, US, "rad"),
    (ANGLE, SI, "rad"),
    (LENGTH, US, "in"),
    (AREA, US, "in^2"),
    (units.VOLUME, US, "in^3"),
    (units.SECOND_MOMENT, SI, "mm^4"),
    (FORCE, US, "lb"),
    (STRESS, US, "psi"),
    (STRESS, SI, "MPa"),
    (STRESS, US_KIP, "ksi"),
    (STRESS, US_FT, "psf"),
    (STRESS, US_KIP_FT, "ksf"),
    (MOMENT, US, "lb*in"),
    (MOMENT, US_KIP, "kip*in"),
    (MOMENT, SI, "N*mm"),
    (MOMENT, US_KIP_FT, "kip*ft"),
    (LINE_LOAD, US, "lb/in"),
    (LINE_LOAD, US_FT, "lb/ft"),
    (UNIT_WEIGHT, US, "lb/in^3"),
    (UNIT_WEIGHT, US_FT, "lb/ft^3"),
    (units.RIGIDITY, US, "lb*in^2"),
    (TIME, US, "s"),
    (Dimension("curvature", length=-1), US, "1/in"),
    (Dimension("creep rate", length=-1, time=-2), US, "1/(in*s^2)"),
    (Dimension("power", force=1, length=1, time=-1), SI, "N*mm/s"),
    (Dimension("stress rate", force=1, length=-2, time=-1), US, "psi/s"),
    (Dimension("compliance", force=-1, length=2), US, "in^2/lb"),
]


@pytest.mark.parametrize(("dimension", "system", "unit"), COHERENT)
def test_coherent_unit(dimension: Dimension, system: units.System, unit: str) -> None:
    assert coherent_unit(dimension, system) == unit


@pytest.mark.parametrize(("dimension", "system", "unit"), [row for row in COHERENT if row[2]])
def test_coherent_unit_has_its_dimension_and_factor_one(dimension: Dimension, system: units.System, unit: str) -> None:
    assert dimension_of(unit).powers == dimension.powers
    assert factor(unit, system) == pytest.approx(1.0, rel=1e-14)


@pytest.mark.parametrize("system", [US, SI, US_KIP, US_FT, US_KIP_FT])
def test_systems_are_coherent(system: units.System) -> None:
    stress = factor(system.stress) * factor(system.length) ** 2
    assert stress == pytest.approx(factor(system.force), rel=1e-13)


@pytest.mark.parametrize(
    ("dimension", "us", "si"),
    [
        (FORCE, "kip", "kN"),
        (MOMENT, "kip*ft", "kN*m"),
        (LINE_LOAD, "kip/ft", "kN/m"),
        (UNIT_WEIGHT, "lb/ft^3", "kN/m^3"),
        (ANGLE, "deg", "deg"),
        (LENGTH, "in", "mm"),
        (STRESS, "psi", "MPa"),
        (RATIO, "", ""),
    ],
)
def test_display_unit(dimension: Dimension, us: str, si: str) -> None:
    # common practice in US offices
    assert (display_unit(dimension), display_unit(dimension, SI)) == (us, si)


def test_dimension_of_units_nobody_named() -> None:
    found = dimension_of("kip*in^3")
    assert (found.name, found.powers) == ("force^1 length^3 time^0", (1, 3, 0))
    assert dimension_of("1/in").powers == (0, -1, 0)


def test_dimension_phrase_has_its_article() -> None:
    assert [one.phrase for one in (LENGTH, AREA, ANGLE, FORCE)] == ["a length", "an area", "an angle", "a force"]


def test_same_units_convert_exactly() -> None:
    assert [factor(unit) for unit in ("in", "lb", "psi", "in^2", "lb*in", "")] == [1.0] * 6
    assert (factor("ft"), factor("kip"), factor("kip*ft")) == (12.0, 1000.0, 12000.0)
    assert convert(12000.0, "kip*ft") == 1.0
    assert convert(5.0, "") == 5.0


def test_quantity_of_a_coherent_float() -> None:
    assert quantity(24.0, LENGTH).m_as("ft") == pytest.approx(2.0, rel=1e-14)
    assert quantity(1.0, STRESS, SI).m_as("Pa") == pytest.approx(1e6, rel=1e-14)


@pytest.mark.parametrize(
    ("unit", "plain"),
    [
        ("kip*ft", "kip·ft"),
        ("in^2", "in²"),
        ("in**2", "in²"),
        ("kip/ft^2", "kip/ft²"),
        ("s^-12", "s⁻¹²"),
        ("psi", "psi"),
    ],
)
def test_plain_unit_reads_as_the_trade_writes_it(unit: str, plain: str) -> None:
    assert plain_unit(unit) == plain


@pytest.mark.parametrize(
    ("header", "parts"),
    [
        ("f_c [psi]", ("f_c", "psi")),
        ("f_c[psi]", ("f_c", "psi")),
        ("  f_c  [ psi ]  ", ("f_c", "psi")),
        ("mark", ("mark", "")),
        ("q [kip/ft^2]", ("q", "kip/ft^2")),
        ("b []", ("b", "")),
        ("", ("", "")),
    ],
)
def test_split_header(header: str, parts: tuple[str, str]) -> None:
    assert split_header(header) == parts


@pytest.mark.parametrize("header", ["f_c [psi", "f_c psi]", "f_c [[psi]]", "f_c [psi] x", "[psi] [in]"])
def test_header_with_open_bracket_is_refused(header: str) -> None:
    with pytest.raises(UnitError, match=r"'symbol \[unit\]', e\.g\. 'f_c \[psi\]': close the bracket"):
        split_header(header)


UNITS = ["in", "ft", "mm", "m", "lb", "kip", "N", "kN", "psi", "ksi", "psf", "ksf", "MPa", "pcf", "kip*ft", "kip/ft^2"]
NUMBERS = st.floats(-1e9, 1e9).filter(lambda value: value == 0 or abs(value) > 1e-9)


@given(NUMBERS, st.sampled_from(UNITS))
def test_text_survives_the_gate_and_back(number: float, unit: str) -> None:
    measured = read(f"{number!r} {unit}", None)
    assert measured.number == number
    assert convert(measured.value, unit) == pytest.approx(number, rel=1e-12, abs=1e-300)


@given(NUMBERS, st.sampled_from(UNITS))
def test_text_and_quantity_agree(number: float, unit: str) -> None:
    spelled = registry().Quantity(number, registry().parse_units(unit.replace("^", "**")))
    assert read(spelled, None).value == pytest.approx(read(f"{number!r} {unit}", None).value, rel=1e-12, abs=1e-300)


@given(st.integers(0, 99_999_999_999), st.sampled_from(UNITS))
def test_thousands_separators_change_nothing(number: int, unit: str) -> None:
    assert read(f"{number:,} {unit}", None).value == read(f"{number} {unit}", None).value


@given(st.integers(0, 500), st.integers(0, 11), st.integers(0, 15))
def test_feet_and_inches_add_up(feet: int, inches: int, sixteenths: int) -> None:
    assert read(f"{feet}'-{inches} {sixteenths}/16\"", LENGTH).value == 12 * feet + inches + sixteenths / 16


# NIST SP 811: one inch is 25.4 mm exactly.
@pytest.mark.parametrize(("text", "inches"), [("25.4 mm", 1.0), ("50.8 mm", 2.0), ("304.8 mm", 12.0), ("76.2 mm", 3.0)])
def test_round_millimetres_are_round_inches(text: str, inches: float) -> None:
    assert read(text, LENGTH).value == inches


@given(st.floats(-360, 360))
def test_degrees_become_radians(angle: float) -> None:
    assert read(f"{angle!r} deg", ANGLE).value == pytest.approx(math.radians(angle), rel=1e-13, abs=1e-300)
    assert read(f"{math.radians(angle)!r} rad", ANGLE).value == math.radians(angle)


@given(st.floats(0, 1000))
def test_percent_is_a_hundredth(share: float) -> None:
    assert read(f"{share!r} %", RATIO).value == pytest.approx(share / 100, rel=1e-13)


@given(st.text(max_size=30))
def test_any_text_is_read_or_refused_by_the_gate(text: str) -> None:
    try:
        measured = read(text, None)
    except UnitError:
        return
    assert math.isfinite(measured.value)
