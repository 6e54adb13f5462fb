"""A recorded evaluation as printed lines: texts for every slot, and the result in the units it is read in."""

from __future__ import annotations

import ast
import re
from collections.abc import Mapping, Sequence
from dataclasses import dataclass
from typing import Any

from calcpack import expression
from calcpack.formula import Formula, Recorded, Recording
from calcpack.formula_source import UNIT_CONSTANTS, Line, opposite, without_units
from calcpack.typeset.digits import constant_text, honest, number_text, stated_text
from calcpack.typeset.layout import Layout, Slot
from calcpack.typeset.rows import Printed
from calcpack.typeset.store import FormulaLayout
from calcpack.units import (
    RATIO,
    US,
    US_FT,
    US_KIP,
    US_KIP_FT,
    Dimension,
    System,
    coherent_unit,
    convert,
    display_unit,
    plain_unit,
)

__all__ = ["Origin", "PrintedLine", "printed_lines", "system_of", "with_unit"]


@dataclass(frozen=True)
class Origin:
    """Where a value was set: its entry, and the sheet of that entry where it is another one."""

    id: str
    sheet: str = ""


@dataclass(frozen=True)
class PrintedLine:
    """A line as printed: layouts with the texts of their slots, and the result.

    Attributes
    ----------
    symbol, layout, values : the line, and what fills its slots
    conditions : conditions that led to it, each with its values
    line_result : the result in the unit that the line gives
    shown : the result in the unit it is read in; the same text where the units are the same
    """

    symbol: str
    layout: Layout
    values: tuple[Printed, ...]
    conditions: tuple[tuple[Layout, tuple[Printed, ...]], ...]
    line_result: str
    shown: str

    def to_json(self) -> dict[str, Any]:
        """Plain data, for a notebook's output."""
        return {
            "symbol": self.symbol,
            "layout": self.layout.to_json(),
            "values": _texts(self.values),
            "conditions": [
                {"layout": layout.to_json(), "values": _texts(values)} for layout, values in self.conditions
            ],
            "line_result": self.line_result,
            "shown": self.shown,
        }

    @classmethod
    def from_json(cls, data: Mapping[str, Any]) -> PrintedLine:
        """The line that `to_json` wrote."""
        conditions = tuple((Layout.from_json(item["layout"]), _printed(item["values"])) for item in data["conditions"])
        layout = Layout.from_json(data["layout"])
        return cls(data["symbol"], layout, _printed(data["values"]), conditions, data["line_result"], data["shown"])


def _texts(values: Sequence[Printed]) -> list[list[str]]:
    return [[value.text, value.link, value.sheet] for value in values]


def _printed(data: Sequence[Sequence[str]]) -> tuple[Printed, ...]:
    return tuple(Printed(*item) for item in data)


def printed_lines(
    recording: Recording,
    layouts: FormulaLayout,
    origins: Mapping[str, Origin],
    shown: Mapping[str, str],
    targets: Sequence[Origin],
) -> list[PrintedLine]:
    """Print a recording.

    Parameters
    ----------
    recording : the evaluation
    layouts : the layouts of its formula
    origins : for each argument, where its value was set
    shown : for each argument, how it is shown where it was set
    targets : for each line that ran, the entry it makes
    """
    values = dict(recording.arguments)
    known = dict(origins)
    dimensions = dict(recording.formula.arguments)
    seen = dict(shown)
    lines: list[PrintedLine] = []
    for recorded, target in zip(recording.lines, targets, strict=True):
        line = _print(recorded, layouts, _Scope(recording.formula, values, dimensions, known, seen))
        lines.append(line)
        seen[line.symbol] = line.shown
        values[recorded.line.target] = recorded.value
        dimensions[recorded.line.target] = recorded.line.dimension
        known[recorded.line.target] = target
    return lines


@dataclass(frozen=True)
class _Scope:
    """What is known where a line runs: values, dimensions, origins and printed forms by symbol."""

    formula: Formula
    values: Mapping[str, float]
    dimensions: Mapping[str, Dimension]
    origins: Mapping[str, Origin]
    shown: Mapping[str, str]


def _print(recorded: Recorded, layouts: FormulaLayout, scope: _Scope) -> PrintedLine:
    line = recorded.line
    tests = [test if held else opposite(test) for test, held in recorded.conditions]
    condition_names = [name for test in tests for name in expression.names(test) if name not in UNIT_CONSTANTS]
    names = tuple(dict.fromkeys([*line.names, *condition_names]))
    system = system_of(scope.formula, names, line, scope, tests)
    scaled = [convert(scope.values[name], coherent_unit(scope.dimensions[name], system)) for name in names]
    line_unit = coherent_unit(line.dimension, system)
    result = convert(recorded.value, line_unit)

    def evaluate(values: Sequence[float]) -> float:
        """The line from printed values; refused where a printed condition does not hold."""
        given = dict(zip(names, values, strict=True))
        for test in tests:
            if not expression.evaluate(_plain(test), given, condition=True):
                raise ValueError("printed with so few figures, the condition does not hold")
        return float(eval(line.code, scope.formula.function.__globals__, given))

    units = [coherent_unit(scope.dimensions[name], system) for name in names]
    first = [_as_set(scope.shown[name], value, unit) for name, value, unit in zip(names, scaled, units, strict=True)]
    texts, text = honest(evaluate, scaled, result, first)
    if line.dimension == RATIO and re.fullmatch(r"[0-9]", text):
        text += ".0"
    fills = {
        name: Printed(with_unit(text, unit), *_link(scope.origins[name]))
        for name, text, unit in zip(names, texts, units, strict=True)
    }
    conditions = tuple(
        (layout, _fill(layout, fills)) for layout in (layouts.conditions[ast.unparse(test)] for test in tests)
    )
    layout = _as_stated(layouts.lines[line.index], text)
    line_result = with_unit(text, line_unit)
    return PrintedLine(
        line.target, layout, _fill(layout, fills), conditions, line_result, _shown(recorded, system, line_result)
    )


def _as_stated(layout: Layout, text: str) -> Layout:
    """A line that sets a plain ratio prints it as the result is printed: 1.0, not 1."""
    plain = layout.tree == ("slot", 0) and layout.slots[0].kind == "number" and text.endswith(".0")
    return Layout(layout.tree, (Slot("printed", text),)) if plain else layout


def _as_set(shown: str, value: float, unit: str) -> str:
    """The number as it is printed where it was set, if it stands there in the same unit."""
    # The commas of a number, and a unit in trade style, are as `with_unit` made them.
    number, _, shown_unit = shown.partition(" ")
    return number if shown_unit == plain_unit(unit) and _PRINTED.fullmatch(number) else stated_text(value)


def _plain(test: ast.expr) -> str:
    return expression.infix(without_units(test))


def _link(origin: Origin) -> tuple[str, str]:
    return origin.id, origin.sheet


def _fill(layout: Layout, fills: Mapping[str, Printed]) -> tuple[Printed, ...]:
    filled = []
    for slot in layout.slots:
        if slot.kind == "symbol":
            filled.append(fills[slot.text])
        elif slot.kind == "const":
            filled.append(Printed("π"))
        else:
            filled.append(Printed(with_unit(constant_text(float(slot.text)), slot.unit)))
    return tuple(filled)


def _shown(recorded: Recorded, system: System, line_result: str) -> str:
    dimension = recorded.line.dimension
    unit = coherent_unit(dimension, system)
    if system is US or (system is US_KIP and (dimension.force, dimension.length) != (1, -2)):
        unit = display_unit(dimension)
    if unit == coherent_unit(dimension, system):
        return line_result
    return with_unit(number_text(convert(recorded.value, unit)), unit)


def with_unit(number: str, unit: str) -> str:
    """A printed number with its unit in trade style."""
    return f"{number} {plain_unit(unit)}" if unit else number


def system_of(
    formula: Formula, names: Sequence[str], line: Line, scope: _Scope, tests: Sequence[ast.expr] = ()
) -> System:
    """The coherent system a line is printed in.

    An empirical formula, or a line or condition with a constant in psi, holds in lb, in and psi. Any other is printed
    in kip where it handles forces or moments, and in feet where more of its values are read in feet than in inches.
    """
    constants = {name for node in (line.value, *tests) for name in expression.names(node) if name in UNIT_CONSTANTS}
    if formula.empirical or constants & {"psi", "lb"}:
        return US
    dimensions = [*(scope.dimensions[name] for name in names), line.dimension]
    forces = any(dimension.force and dimension.length >= -1 for dimension in dimensions)
    feet = sum(bool(_FEET.search(scope.shown[name])) for name in names)
    inches = sum(bool(_INCHES.search(scope.shown[name])) for name in names)
    if feet > inches and not constants:
        return US_KIP_FT if forces else US_FT
    return US_KIP if forces else US


_PRINTED = re.compile(r"−?[0-9,]{1,10}(\.[0-9]{1,6})?")
_FEET = re.compile(r"\bft|psf|ksf|pcf|kcf|plf|klf")
_INCHES = re.compile(r"\bin|psi|ksi|pci")
