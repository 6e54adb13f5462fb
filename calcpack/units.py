"""The one gate for units: text and quantities become floats of a coherent system here, and nowhere else.

Inside, everything is a float in inch, pound and psi (`US`) or millimetre, newton and MPa (`SI`).
A dimension is a power of force, length and time; its coherent unit follows from the system.
"""

from __future__ import annotations

import math
import numbers
import re
from dataclasses import dataclass, field
from functools import cache
from importlib import resources
from typing import TYPE_CHECKING, Annotated, Any

from calcpack.errors import Problem, UnitError

if TYPE_CHECKING:
    import pint

__all__ = [
    "ANGLE",
    "AREA",
    "FORCE",
    "LENGTH",
    "MOMENT",
    "RATIO",
    "SI",
    "STRESS",
    "US",
    "US_FT",
    "US_KIP",
    "US_KIP_FT",
    "Angle",
    "Area",
    "Count",
    "Dimension",
    "Force",
    "Length",
    "LineLoad",
    "Measured",
    "Moment",
    "Ratio",
    "Rigidity",
    "SecondMoment",
    "Stress",
    "System",
    "Time",
    "UnitWeight",
    "Volume",
    "coherent_unit",
    "convert",
    "dimension_of",
    "display_unit",
    "plain_unit",
    "quantity",
    "read",
    "registry",
    "split_header",
]


@dataclass(frozen=True)
class Dimension:
    """A power of force, length and time, by the name the trade gives it."""

    name: str
    force: int = 0
    length: int = 0
    time: int = 0

    @property
    def powers(self) -> tuple[int, int, int]:
        """Exponents of force, length and time."""
        return self.force, self.length, self.time

    @property
    def phrase(self) -> str:
        """The name with its article: ``a length``, ``an area``."""
        return f"{'an' if self.name[0] in 'aeiou' else 'a'} {self.name}"


@dataclass(frozen=True)
class System:
    """A coherent system of units: a product of its base units needs no conversion factor."""

    name: str
    force: str
    length: str
    stress: str
    time: str = "s"


US = System("US", force="lb", length="in", stress="psi")
SI = System("SI", force="N", length="mm", stress="MPa")
# Homogeneous formulas hold in these as well, and lines are printed in the one that suits their values.
US_KIP = System("US kip", force="kip", length="in", stress="ksi")
US_FT = System("US ft", force="lb", length="ft", stress="psf")
US_KIP_FT = System("US kip ft", force="kip", length="ft", stress="ksf")

RATIO = Dimension("ratio")
COUNT = Dimension("count")
ANGLE = Dimension("angle")
LENGTH = Dimension("length", length=1)
AREA = Dimension("area", length=2)
VOLUME = Dimension("volume or section modulus", length=3)
SECOND_MOMENT = Dimension("second moment of area", length=4)
FORCE = Dimension("force", force=1)
STRESS = Dimension("stress or pressure", force=1, length=-2)
MOMENT = Dimension("moment", force=1, length=1)
LINE_LOAD = Dimension("load per length", force=1, length=-1)
UNIT_WEIGHT = Dimension("unit weight", force=1, length=-3)
RIGIDITY = Dimension("flexural rigidity", force=1, length=2)
TIME = Dimension("time", time=1)
_NAMED = (RATIO, LENGTH, AREA, VOLUME, SECOND_MOMENT, FORCE, STRESS, MOMENT, LINE_LOAD, UNIT_WEIGHT, RIGIDITY, TIME)

Ratio = Annotated[float, RATIO]
Count = Annotated[float, COUNT]
Angle = Annotated[float, ANGLE]
Length = Annotated[float, LENGTH]
Area = Annotated[float, AREA]
Volume = Annotated[float, VOLUME]
SecondMoment = Annotated[float, SECOND_MOMENT]
Force = Annotated[float, FORCE]
Stress = Annotated[float, STRESS]
Moment = Annotated[float, MOMENT]
LineLoad = Annotated[float, LINE_LOAD]
UnitWeight = Annotated[float, UNIT_WEIGHT]
Rigidity = Annotated[float, RIGIDITY]
Time = Annotated[float, TIME]

# Display units of results, common practice in US offices; a given keeps the unit it was written in.
_DISPLAY = {FORCE: "kip", MOMENT: "kip*ft", LINE_LOAD: "kip/ft", UNIT_WEIGHT: "lb/ft^3", ANGLE: "deg"}
_SI_DISPLAY = {FORCE: "kN", MOMENT: "kN*m", LINE_LOAD: "kN/m", UNIT_WEIGHT: "kN/m^3", ANGLE: "deg"}


@dataclass(frozen=True)
class Measured:
    """A value that passed the gate.

    Attributes
    ----------
    value : in the coherent unit of `dimension`
    dimension : what it measures
    unit : the unit it was written in
    number : the number as written, in `unit`
    written : its digits as written, empty where it came as a quantity, a fraction or in feet and inches
    """

    value: float
    dimension: Dimension
    unit: str
    number: float
    written: str = field(default="", compare=False)


@cache
def registry() -> pint.UnitRegistry[Any]:
    """The one pint registry, with the units of ``units.txt`` and no others."""
    import pint

    with resources.as_file(resources.files("calcpack") / "units.txt") as path:
        return pint.UnitRegistry(str(path), autoconvert_offset_to_baseunit=False)


def __getattr__(name: str) -> Any:
    """Units by name, so that an author writes ``4000*psi`` after ``from calcpack.units import psi``."""
    spelled = {"inch": "inch", "feet": "foot"}.get(name, name)
    if not name.startswith("_") and spelled in registry():
        return registry().Unit(spelled)
    raise AttributeError(f"calcpack.units has no unit {name!r}; the units known stand in calcpack/units.txt")


def coherent_unit(dimension: Dimension, system: System = US) -> str:
    """The unit of `dimension` in a coherent system, as plain text: ``psi``, ``lb*in``, ``in^2``, ``1/in``."""
    if dimension == ANGLE:
        return "rad"
    if (dimension.force, dimension.length) == (1, -2):
        parts = [(system.stress, 1), (system.time, dimension.time)]
    else:
        parts = [(system.force, dimension.force), (system.length, dimension.length), (system.time, dimension.time)]
    above = [_power(unit, power) for unit, power in parts if power > 0]
    below = [_power(unit, -power) for unit, power in parts if power < 0]
    if not below:
        return "*".join(above)
    bottom = below[0] if len(below) == 1 else f"({'*'.join(below)})"
    return f"{'*'.join(above) or '1'}/{bottom}"


def _power(unit: str, power: int) -> str:
    return unit if power == 1 else f"{unit}^{power}"


def display_unit(dimension: Dimension, system: System = US) -> str:
    """The unit in which a result of this dimension is shown when nobody asked for another."""
    table = _SI_DISPLAY if system is SI else _DISPLAY
    return table.get(dimension, coherent_unit(dimension, system))


@cache
def dimension_of(unit: str) -> Dimension:
    """The dimension of a unit given as text, by its trade name where it has one."""
    parsed = _parse_unit(unit)
    powers = dict(parsed.dimensionality)
    if "rad" in unit or "deg" in unit:
        if powers:
            raise _unknown_unit(unit)
        return ANGLE
    exponents = [powers.pop(key, 0) for key in ("[force]", "[length]", "[time]")]
    if powers or any(exponent != int(exponent) for exponent in exponents):
        raise _unknown_unit(unit)
    force, length, time = (int(exponent) for exponent in exponents)
    for named in _NAMED:
        if named.powers == (force, length, time):
            return named
    return Dimension(f"force^{force} length^{length} time^{time}", force, length, time)


def quantity(value: float, dimension: Dimension, system: System = US) -> pint.Quantity[Any]:
    """A coherent float as a pint quantity, for dimensional checks and for authors."""
    return registry().Quantity(value, _parse_unit(coherent_unit(dimension, system)))


@cache
def factor(unit: str, system: System = US) -> float:
    """How many coherent units make one `unit`; 1.0 exactly where they are the same."""
    if not unit:
        return 1.0
    coherent = _parse_unit(coherent_unit(dimension_of(unit), system))
    size = float(registry().Quantity(1.0, _parse_unit(unit)).m_as(coherent))
    nearest = round(size)
    # Pint multiplies through metres: 12 in come back as 12.000000000000002.
    return float(nearest) if nearest and math.isclose(size, nearest, rel_tol=1e-14) else size


def convert(value: float, unit: str, system: System = US) -> float:
    """A coherent value as a number of `unit`."""
    return value / factor(unit, system)


_NUMBER = r"[-+]?(?:[0-9]{1,3}(?:,[0-9]{3})+(?:\.[0-9]+)?|[0-9]+\.?[0-9]*|\.[0-9]+)(?:[eE][-+]?[0-9]+)?"
_FRACTION = re.compile(r"(?P<sign>-?)(?:(?P<whole>\d+)[ -])?(?P<top>\d+)/(?P<bottom>[1-9]\d*)(?P<unit>\s+\D.*|)$")
_INCHES = r"(?:\d+[ -])?\d+/[1-9]\d*|\d+(?:\.\d*)?|\.\d+"
_FEET_INCHES = re.compile(rf"(?P<feet>\d+)'(?:\s*-?\s*(?P<rest>{_INCHES})\s*\")?$")
_PLAIN = re.compile(rf"(?P<number>{_NUMBER})\s*(?P<unit>.*)$")


def read(given: object, dimension: Dimension | None, name: str = "value", system: System = US) -> Measured:
    """Pass a value through the gate.

    Parameters
    ----------
    given : text (``"4 ksi"``, ``"2 1/2 in"``, ``12'-6"``), a pint quantity (``4*ksi``), or a bare number
        where the dimension is a ratio or a count
    dimension : what it has to be; ``None`` takes whatever the unit says
    name : how an error calls it

    Raises
    ------
    UnitError : no unit, an unknown unit, the wrong dimension, or no number
    """
    number, unit = _number_and_unit(given, name)
    if not math.isfinite(number):
        raise UnitError(name, [Problem(f"{name} = {given}", "a finite number", "correct the value")])
    found = dimension_of(unit) if unit else RATIO
    if dimension is None:
        return Measured(_coherent(number, unit, system), found, unit, number, _written(given))
    if found.powers != dimension.powers or (found == ANGLE) != (dimension == ANGLE):
        raise _wrong_dimension(name, given, found, dimension, system)
    return Measured(_coherent(number, unit, system), dimension, unit, number, _written(given))


def _coherent(number: float, unit: str, system: System) -> float:
    # 25.4 mm are 1 in, not 0.9999999999999999 in: fourteen digits clear the noise of the conversion.
    size = factor(unit, system) if unit else 1.0
    return number if size == 1.0 else float(f"{number * size:.14g}")


def _written(given: object) -> str:
    match = re.match(r"\s*(-?)([0-9][0-9,]*)(\.[0-9]+)?(?=\s|$)", given) if isinstance(given, str) else None
    return f"{'−' if match[1] else ''}{int(match[2].replace(',', '')):,}{match[3] or ''}" if match else ""


def _number_and_unit(given: object, name: str) -> tuple[float, str]:
    if isinstance(given, bool) or given is None:
        raise UnitError(name, [Problem(f"{name} = {given}", "a number with its unit", "write e.g. '12 in'")])
    if isinstance(given, str):
        return _parse_text(given, name)
    if isinstance(given, numbers.Real):
        return _float(given, given, name), ""
    magnitude, units = getattr(given, "magnitude", None), getattr(given, "units", None)
    if units is None and hasattr(given, "dimensionality"):
        magnitude, units = 1.0, given
    if magnitude is None or units is None:
        raise UnitError(
            name, [Problem(f"{name} = {given!r}", "text such as '12 in', or a quantity such as 12*inch", "")]
        )
    return _float(magnitude, given, name), f"{units:~C}".replace("**", "^")


def _float(number: Any, given: object, name: str) -> float:
    try:
        return float(number)
    except (OverflowError, TypeError, ValueError) as error:
        raise UnitError(name, [Problem(f"{name} = {given}", "one finite number", "correct the value")]) from error


def _parse_text(text: str, name: str) -> tuple[float, str]:
    stripped = text.strip()
    if match := _FEET_INCHES.match(stripped):
        inches, _ = _parse_text(match["rest"], name) if match["rest"] else (0.0, "")
        return 12 * int(match["feet"]) + inches, "in"
    if match := _FRACTION.match(stripped):
        size = int(match["whole"] or 0) + int(match["top"]) / int(match["bottom"])
        return -size if match["sign"] else size, match["unit"].strip()
    match = _PLAIN.match(stripped)
    if match is None:
        raise UnitError(name, [Problem(f"{name} = {text!r}", "a number with its unit", "write e.g. '12 in'")])
    return float(match["number"].replace(",", "")), match["unit"].strip()


_LONGEST = 60
_FACTOR = r"\(?(?:1|[A-Za-z_]+(?:\^-?[0-9])?)\)?"
_UNIT = re.compile(rf"{_FACTOR}(?:[*/ -]{_FACTOR})*")


@cache
def _parse_unit(unit: str) -> Any:
    text = unit.replace("·", "*").replace("²", "^2").replace("³", "^3").replace("⁴", "^4").replace("%", "percent")
    text = re.sub(r"\s*([*/^])\s*", r"\1", text.strip().replace("**", "^"))
    # One-digit powers, and never a power of a power: no text can make the parser compute for long.
    if text and (len(text) > _LONGEST or not _UNIT.fullmatch(text)):
        raise _unknown_unit(unit)
    try:
        return registry().parse_units(re.sub(r"[ -](?=[A-Za-z(])", "*", text).replace("^", "**"))
    except Exception as error:
        raise _unknown_unit(unit) from error


def _unknown_unit(unit: str) -> UnitError:
    known = "in, ft, mm, m, lb, kip, N, kN, psi, ksi, psf, ksf, MPa, pcf and their products (kip*ft, kip/ft^2)"
    return UnitError("unknown unit", [Problem(f"unit {unit!r}", known, "write the unit as in calcpack/units.txt")])


def _wrong_dimension(name: str, given: object, found: Dimension, wanted: Dimension, system: System) -> UnitError:
    unit = coherent_unit(wanted, system)
    examples = f"{unit} or {display_unit(wanted, system)}" if display_unit(wanted, system) != unit else unit
    if found == RATIO and wanted not in (RATIO, COUNT):
        problem = Problem(f"{name} = {given} (no unit)", wanted.phrase, f"add the unit, e.g. {examples}")
    elif wanted in (RATIO, COUNT):
        problem = Problem(f"{name} = {given} ({found.name})", "a number without a unit", "remove the unit")
    else:
        problem = Problem(f"{name} = {given} ({found.name})", wanted.phrase, f"write it in {examples}")
    return UnitError(name, [problem])


_HEADER = re.compile(r"\s*(?P<symbol>[^\[\]]*?)\s*(?:\[(?P<unit>[^\[\]]*)\])?\s*$")


def split_header(text: str) -> tuple[str, str]:
    """Split a column header ``f_c [psi]`` into symbol and unit; the unit is empty where none is written.

    Raises
    ------
    UnitError : brackets that do not close
    """
    match = _HEADER.match(text)
    if match is None:
        raise UnitError(text, [Problem(f"column {text!r}", "'symbol [unit]', e.g. 'f_c [psi]'", "close the bracket")])
    return match["symbol"], (match["unit"] or "").strip()


_SUPERSCRIPTS = str.maketrans("0123456789-", "⁰¹²³⁴⁵⁶⁷⁸⁹⁻")


@cache
def plain_unit(unit: str) -> str:
    """A unit in trade style for reading: ``kip*ft`` as ``kip·ft``, ``in^2`` as ``in²``."""
    text = unit.replace("**", "^").replace("*", "·")
    return re.sub(r"\^(-?\d+)", lambda match: match[1].translate(_SUPERSCRIPTS), text)
