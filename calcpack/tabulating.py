"""Worked tables on a sheet: every worked cell an entry of the ledger, and the table as the page prints it."""

from __future__ import annotations

from collections.abc import Callable, Iterator, Mapping, Sequence
from dataclasses import dataclass, field, replace
from decimal import Decimal
from typing import Any

from calcpack import expression, symbols
from calcpack.book import SheetBook
from calcpack.errors import InputError, Problem, SheetError
from calcpack.formula import Clause, Formula
from calcpack.ledger import Entry
from calcpack.tabulation import Above, Row, Tabulated, Tabulation, Worked, tabulate, total_expression
from calcpack.typeset.digits import parse_number
from calcpack.typeset.general import general_lines
from calcpack.typeset.line import with_unit
from calcpack.typeset.store import LayoutStore
from calcpack.units import Dimension, coherent_unit, convert, dimension_of, display_unit, plain_unit
from calcpack.value import Value

__all__ = ["Tabulating", "fixed_text"]

_ARITHMETIC = "arithmetic"
_SUM = "sum of a column"


class Tabulating(SheetBook):
    """Worked tables of a sheet; `calcpack.sheet.Sheet` adds what an author writes line by line."""

    _store: LayoutStore
    _standard: Callable[[Formula], Any]

    def tabulate(self, table: Tabulation, rows: Sequence[Row[Value]], shared: Mapping[str, Value]) -> Tabulated[Value]:
        """Work the formulas of a table for every row; the page shows them once, in symbols, above the table.

        Parameters
        ----------
        table : formulas, columns and totals
        rows : the label and the own values of each row
        shared : values that all rows use

        Returns
        -------
        the values of each row, and the totals

        Raises
        ------
        SheetError : a value that is none of the ledger, a symbol or a unit that does not fit
        InputError : the table and its rows do not fit together, or a value outside its range
        LayoutError : a line of the author's own that cannot be printed as it runs
        """
        try:
            clauses = {formula: self._clause(formula) for formula in table.formulas if isinstance(formula, Formula)}
            bench = _SheetBench(self, table, _units(table, rows, shared), clauses)
            drafted = tabulate(table, rows, shared, bench)
        except InputError as error:
            raise error.at(self._place()) from None
        equations = [line for formula, clause in clauses.items() for line in self._general(clause, formula)]
        self._store.save()
        self._begin()
        made, entries = self._kept(drafted, bench.drafts)
        page = _Page(bench.units, self._part, {entry.id for entry in entries})
        self._show(
            "tabulated", entries, title=table.title, caption=table.caption, label=table.label, equations=equations,
            columns=[{"symbol": symbol, "unit": plain_unit(unit)} for symbol, (unit, _) in bench.units.items()],
            rows=[page.row(label, values) for (label, _), values in zip(rows, made.rows, strict=True)],
            totals=page.totals(table.totals, made.totals),
        )  # fmt: skip
        return made

    def _clause(self, formula: Formula) -> Clause:
        return formula.clause(self._standard(formula))

    def _general(self, clause: Clause, formula: Formula) -> list[dict[str, Any]]:
        edition = clause.standard.name if clause.standard else ""
        lines = general_lines(formula, self._store.layout(formula))
        return [{"clause": clause.number, "edition": edition, **line.to_json()} for line in lines]

    def _kept(self, drafted: Tabulated[_Cell], drafts: Sequence[_Draft]) -> tuple[Tabulated[Value], list[Entry]]:
        """The drafts as entries of the ledger."""
        kept: dict[_Draft, Value] = {}

        def final(cell: _Cell) -> Value:
            return kept[cell] if isinstance(cell, _Draft) else cell

        for draft, identifier in zip(drafts, self._free_ids([draft.entry.symbol for draft in drafts]), strict=True):
            where = {name: final(draft.sources[name]).entry.id for name in draft.entry.where}
            kept[draft] = self._keep(replace(draft.entry, id=identifier, where=where), draft.dimension)
        made = Tabulated(
            tuple({symbol: final(cell) for symbol, cell in values.items()} for values in drafted.rows),
            {symbol: final(cell) for symbol, cell in drafted.totals.items()},
        )
        return made, [value.entry for value in kept.values()]


def fixed_text(value: float, decimals: int) -> str:
    """A number with fixed decimals, as a column prints it.

    >>> fixed_text(-1234.567, 1), fixed_text(-0.004, 2)
    ('−1,234.6', '0.00')
    """
    # Twelve figures clear the noise of binary arithmetic: 0.125 is a tie on paper too.
    text = f"{Decimal(f'{value:.12g}'):,.{decimals}f}"
    negative = text.startswith("-") and any(digit in text for digit in "123456789")
    return f"−{text[1:]}" if negative else text.removeprefix("-")


@dataclass(frozen=True, eq=False)
class _Draft:
    """An entry before it has an id; `sources` holds the value of each symbol it uses."""

    entry: Entry
    dimension: Dimension
    sources: Mapping[str, _Cell]

    def __float__(self) -> float:
        return float(self.entry.value)


_Cell = Value | _Draft


@dataclass
class _SheetBench:
    """Works cells for a sheet and drafts their entries, in order; nothing is kept before all is worked."""

    sheet: Any
    table: Tabulation
    units: Mapping[str, tuple[str, int]]
    clauses: Mapping[Formula, Clause]
    drafts: list[_Draft] = field(default_factory=list)

    def formula(self, formula: Formula, arguments: Mapping[str, _Cell], row: str) -> Mapping[str, _Cell]:
        """Record a formula."""
        _refuse_dimensions(formula, arguments)
        recording = formula.record(**{name: float(cell) for name, cell in arguments.items()})
        sources = dict(arguments)
        for recorded in recording.lines:
            symbol, dimension = recorded.line.target, recorded.line.dimension
            known = {name: name for name in sources}
            shown = self._shown(symbol, recorded.value, dimension)
            entry = self.sheet._worked(formula, recorded, "", shown, known, self.clauses[formula])
            sources[symbol] = self._draft(replace(entry, means=self._means(entry.means, row)), dimension, dict(sources))
        return {recorded.line.target: sources[recorded.line.target] for recorded in recording.lines}

    def plain(self, symbol: str, worked: Worked[_Cell], row: str) -> _Cell:
        """Work a row's own value."""
        known = symbols.lookup(symbol)
        return self._arithmetic(
            symbol, self._means(known.meaning, row), known.dimension, worked.expression, worked.where, _ARITHMETIC
        )

    def total(self, symbol: str, column: str, parts: Sequence[_Cell]) -> _Cell:
        """Add the values of a column."""
        text, where = total_expression(column, parts)
        means = symbols.lookup(symbol).meaning if symbols.is_known(symbol) else f"sum of {column}: {self.table.title}"
        return self._arithmetic(symbol, means, parts[0].dimension, text, where, _SUM, self._sum_unit(column, parts))

    def _sum_unit(self, column: str, parts: Sequence[_Cell]) -> tuple[str, int]:
        """Unit and decimals of a sum: no more than the printed cells add up to, give or take one in the last."""
        unit, decimals = self.units[column]
        values = [convert(float(part), unit) for part in parts]
        printed = sum(parse_number(fixed_text(value, decimals)) for value in values)
        while decimals and abs(parse_number(fixed_text(sum(values), decimals)) - printed) > 1.001 * 10.0**-decimals:
            decimals -= 1
        return unit, decimals

    def _arithmetic(
        self, symbol: str, means: str, dimension: Dimension, text: str, where: Mapping[str, _Cell], clause: str,
        unit: tuple[str, int] | None = None,
    ) -> _Draft:  # fmt: skip
        value = expression.evaluate(text, {name: float(cell) for name, cell in where.items()})
        parsed = expression.parse(text)
        entry = Entry(
            "", "worked", symbol, means, value, coherent_unit(dimension), self._shown(symbol, value, dimension, unit),
            self.sheet.id, clause=clause, expression=expression.infix(parsed),
            where={name: name for name in expression.names(parsed)},
        )  # fmt: skip
        return self._draft(entry, dimension, where)

    def _draft(self, entry: Entry, dimension: Dimension, sources: Mapping[str, _Cell]) -> _Draft:
        self.drafts.append(_Draft(entry, dimension, sources))
        return self.drafts[-1]

    def _means(self, meaning: str, row: str) -> str:
        return f"{meaning}, {f'{self.table.label} {row}'.strip()}"

    def _shown(self, symbol: str, value: float, dimension: Dimension, unit: tuple[str, int] | None = None) -> str:
        name, decimals = unit or self.units[symbol]
        return with_unit(fixed_text(convert(value, name), decimals), name)


@dataclass
class _Page:
    """Cells as the page prints them: an entry made here stands once, and is linked to from then on."""

    units: Mapping[str, tuple[str, int]]
    part: Callable[[Value], dict[str, str]]
    new: set[str]

    def row(self, label: str, values: Mapping[str, Value]) -> dict[str, Any]:
        """A row: its label, and a cell, or none, for each column."""
        return {"label": label, "cells": [self._cell(symbol, values.get(symbol)) for symbol in self.units]}

    def totals(self, symbols_of: Mapping[str, str], totals: Mapping[str, Value]) -> list[dict[str, Any] | None]:
        """The cell under each column, with its own symbol; empty where the table has no totals."""
        found = [(symbol, symbols_of.get(symbol, "")) for symbol in self.units] if symbols_of else []
        return [self._total(symbol, name, totals[name]) if name else None for symbol, name in found]

    def _total(self, symbol: str, name: str, value: Value) -> dict[str, Any]:
        text, _, _ = value.entry.shown.partition(" ")
        _, point, shown = text.partition(".")
        # What the column has and the sum has not keeps its room, so that the decimals stay below each other.
        missing = "0" * (self.units[symbol][1] - len(shown))
        room = missing if point or not missing else f".{missing}"
        return {**self._made(symbol, value), "text": text, "symbol": name, "room": room}

    def _cell(self, symbol: str, value: Value | None) -> dict[str, str] | None:
        return None if value is None else self._made(symbol, value)

    def _made(self, symbol: str, value: Value) -> dict[str, str]:
        unit, decimals = self.units[symbol]
        text, identifier = fixed_text(convert(float(value), unit), decimals), value.entry.id
        if identifier in self.new:
            self.new.remove(identifier)
            return {"id": identifier, "text": text, "link": "", "sheet": ""}
        return {"id": "", **self.part(value), "text": text}


def _units(table: Tabulation, rows: Sequence[Row[Value]], shared: Mapping[str, Value]) -> dict[str, tuple[str, int]]:
    """Unit and decimals of each column, after a check that what the rows state fits together."""
    problems = [*_loose(rows, shared)]
    if not problems:
        dimensions = _dimensions(table, rows)
        problems = [*_misfits(table, rows, dimensions)]
    if problems:
        raise SheetError(f"table {table.title!r}", problems)
    return {
        column.symbol: (column.unit or display_unit(dimensions[column.symbol]), column.decimals)
        for column in table.columns
        if column.symbol in dimensions
    }


def _loose(rows: Sequence[Row[Value]], shared: Mapping[str, Value]) -> Iterator[Problem]:
    """What is handed over and is no value of the ledger."""
    for place, symbol, value in _stated(rows, shared):
        if not isinstance(value, Value):
            yield Problem(
                f"{symbol} = {value!r}", "a value of the ledger", f"sheet.given({symbol!r}, …, source='…') first", place
            )


def _stated(rows: Sequence[Row[Value]], shared: Mapping[str, Value]) -> Iterator[tuple[str, str, object]]:
    yield from (("shared", symbol, value) for symbol, value in shared.items())
    for label, own in rows:
        for symbol, value in own.items():
            if isinstance(value, Worked):
                yield from ((f"row {label}", name, used) for name, used in value.where.items())
            elif not isinstance(value, Above):
                yield f"row {label}", symbol, value


def _dimensions(table: Tabulation, rows: Sequence[Row[Value]]) -> dict[str, Dimension]:
    """The dimension of every symbol a row may have, as its first appearance has it."""
    formulas = [formula for formula in table.formulas if isinstance(formula, Formula)]
    found = {line.target: line.dimension for formula in formulas for line in formula.lines()}
    for _, own in rows:
        for symbol, value in own.items():
            if isinstance(value, Value):
                found.setdefault(symbol, value.dimension)
            elif isinstance(value, Above) and value.symbol in found:
                found.setdefault(symbol, found[value.symbol])
            elif symbols.is_known(symbol):
                found.setdefault(symbol, symbols.lookup(symbol).dimension)
    return found


def _misfits(table: Tabulation, rows: Sequence[Row[Value]], dimensions: Mapping[str, Dimension]) -> Iterator[Problem]:
    for label, own in rows:
        for symbol, value in own.items():
            if isinstance(value, Worked) and not symbols.is_known(symbol):
                given = f"{symbol} = {value.expression!r}"
                yield Problem(given, "a symbol of the notation table", "it states the dimension", f"row {label}")
            elif isinstance(value, Value) and value.dimension.powers != dimensions[symbol].powers:
                yield Problem(f"{symbol} = {value.entry.shown}", dimensions[symbol].phrase, "", f"row {label}")
    for column in table.columns:
        if column.unit and column.symbol in dimensions:
            yield from _wrong_unit(f"column {column.symbol} in {column.unit}", column.unit, dimensions[column.symbol])
    for symbol, total in table.totals.items():
        if symbol in dimensions and symbols.is_known(total):
            known = symbols.lookup(total).dimension
            if known.powers != dimensions[symbol].powers:
                yield Problem(f"total {total} of {symbol}", f"{dimensions[symbol].phrase}; {total} is {known.phrase}")


def _wrong_unit(given: str, unit: str, dimension: Dimension) -> Iterator[Problem]:
    try:
        found = dimension_of(unit)
    except InputError as error:
        yield from (replace(problem, given=given) for problem in error.problems)
    else:
        if found.powers != dimension.powers:
            yield Problem(given, f"a unit of {dimension.phrase}", f"e.g. {display_unit(dimension)}")


def _refuse_dimensions(formula: Formula, arguments: Mapping[str, _Cell]) -> None:
    problems = [
        Problem(f"{name} = {cell.entry.shown}", formula.arguments[name].phrase)
        for name, cell in arguments.items()
        if cell.dimension.powers != formula.arguments[name].powers
    ]
    if problems:
        raise SheetError(formula.name, problems)
