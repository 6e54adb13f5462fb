"""Every dimensionally homogeneous formula, run on quantities with units."""

from __future__ import annotations

import math
import random
import types
from typing import Any

import pytest

from calcpack.aci318.bars import BARS
from calcpack.formula import Formula
from calcpack.units import COUNT, LENGTH, RATIO, STRESS, Dimension, coherent_unit, quantity, registry

DRAWS = 20

# Written units other than the coherent ones: a formula that hides a unit gives another number in them.
_OTHER = {
    "in": "ft", "in^2": "ft^2", "in^3": "ft^3", "in^4": "ft^4",
    "psi": "ksi", "lb": "kip", "lb*in": "kip*ft", "lb*in^2": "kip*ft^2",
}  # fmt: skip


def _sqrt(value: Any) -> Any:
    return value**0.5


def with_units(formula: Formula) -> types.FunctionType:
    """The formula's own code, with names that work on quantities."""
    function = formula.function
    assert isinstance(function, types.FunctionType)
    scope = {**function.__globals__, "inch": quantity(1.0, LENGTH), "psi": quantity(1.0, STRESS), "sqrt": _sqrt}
    copy = types.FunctionType(function.__code__, scope, function.__name__)
    copy.__kwdefaults__ = function.__kwdefaults__
    return copy


def draw(name: str, dimension: Dimension, source: random.Random) -> float:
    if name == "d_b":
        return source.choice([bar.d_b for bar in BARS.values()])
    if dimension == COUNT:
        return float(source.randint(3, 12))
    if dimension.powers == STRESS.powers:
        return source.uniform(2500.0, 100_000.0)
    if name in ("h", "b"):
        return source.uniform(12.0, 60.0)
    return source.uniform(0.1, 20.0)


def in_another_unit(value: float, dimension: Dimension) -> Any:
    unit = coherent_unit(dimension)
    if dimension.powers == RATIO.powers:
        return value
    return quantity(value, dimension).to(registry().parse_units(_OTHER[unit].replace("^", "**")))


def test_formula_holds_in_any_unit(homogeneous: Formula) -> None:
    source = random.Random(homogeneous.name)
    for _ in range(DRAWS):
        one_draw(homogeneous, source)


def one_draw(homogeneous: Formula, source: random.Random) -> None:
    values = {name: draw(name, dimension, source) for name, dimension in homogeneous.arguments.items()}
    expected = homogeneous.function(**values)
    arguments = {name: in_another_unit(value, homogeneous.arguments[name]) for name, value in values.items()}
    found = with_units(homogeneous)(**arguments)
    if homogeneous.result.powers == RATIO.powers:
        found = float(found)
    else:
        assert found.dimensionality == quantity(1.0, homogeneous.result).dimensionality
        found = found.m_as(quantity(1.0, homogeneous.result).units)
    assert math.isclose(found, expected, rel_tol=1e-9, abs_tol=1e-9)


def test_a_hidden_unit_is_found() -> None:
    """The test above fails on a formula with a bare length in it."""

    def hidden(*, d_b: float) -> float:
        return max(8 * d_b, 6)

    with pytest.raises(ValueError, match="Cannot compare PlainQuantity"):
        hidden(d_b=quantity(1.0, LENGTH))
