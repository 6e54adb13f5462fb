"""Worked tables: the same formulas worked for many rows, the bars of a section or the vertices of a stress block.

A row states its own values; the formulas are then worked in order, each result becoming a value of the row. The
procedure stands here once and is run on a bench: on floats for checks in bulk, on entries of the ledger for a sheet.
"""

from __future__ import annotations

from collections.abc import Iterator, Mapping, Sequence
from dataclasses import dataclass, field
from typing import Any, Generic, Protocol, TypeVar

from calcpack import expression
from calcpack.errors import FormulaError, InputError, Problem
from calcpack.formula import Formula

__all__ = [
    "Above",
    "Bench",
    "Column",
    "FloatBench",
    "Row",
    "Tabulated",
    "Tabulation",
    "Worked",
    "tabulate",
    "targets",
    "total_expression",
]

T = TypeVar("T")
T_co = TypeVar("T_co", covariant=True)
MOST_DECIMALS = 9
MOST_TERMS = 90  # the language of expressions reads no sum that is nested deeper than 100 levels


@dataclass(frozen=True)
class Column:
    """A printed column: a symbol, its fixed decimals, and its unit where it is not the display unit."""

    symbol: str
    decimals: int
    unit: str = ""


@dataclass(frozen=True)
class Tabulation:
    """What a table works and prints.

    Attributes
    ----------
    title : what is worked, e.g. ``Bars at the neutral axis``
    label : head of the first column, e.g. ``bar``
    formulas : worked in order for each row; what they give becomes a value of the row
    columns : printed, in order: values of the rows and results
    totals : for symbols of columns, the symbol of the sum over the rows
    caption : printed above the table
    """

    title: str
    label: str
    formulas: tuple[Formula, ...]
    columns: tuple[Column, ...]
    totals: Mapping[str, str] = field(default_factory=dict)
    caption: str = ""


@dataclass(frozen=True)
class Worked(Generic[T_co]):
    """A row's own value that is plain arithmetic: an expression, and the value of each symbol in it."""

    expression: str
    where: Mapping[str, T_co]


@dataclass(frozen=True)
class Above:
    """The value of a symbol in the row above; unset where that row has none."""

    symbol: str


Row = tuple[str, Mapping[str, T | Worked[T] | Above]]


@dataclass(frozen=True)
class Tabulated(Generic[T_co]):
    """A worked table: the values of each row by symbol, and the totals by their own symbols."""

    rows: tuple[Mapping[str, T_co], ...]
    totals: Mapping[str, T_co]


class Bench(Protocol[T]):
    """What works the cells of a table."""

    def formula(self, formula: Formula, arguments: Mapping[str, T], row: str) -> Mapping[str, T]:
        """Work a formula for a row; every line it works, by symbol."""
        ...

    def plain(self, symbol: str, worked: Worked[T], row: str) -> T:
        """Work a row's own value."""
        ...

    def total(self, symbol: str, column: str, parts: Sequence[T]) -> T:
        """Add the values of a column."""
        ...


class FloatBench:
    """Works on floats and keeps nothing."""

    def formula(self, formula: Formula, arguments: Mapping[str, float], row: str) -> Mapping[str, float]:
        """The results of a formula."""
        del row
        if len(targets(formula)) == 1:
            return {formula.result_name: formula(**arguments)}
        return {recorded.line.target: recorded.value for recorded in formula.record(**arguments).lines}

    def plain(self, symbol: str, worked: Worked[float], row: str) -> float:
        """The value of the expression."""
        del symbol, row
        return expression.evaluate(worked.expression, worked.where)

    def total(self, symbol: str, column: str, parts: Sequence[float]) -> float:
        """The sum, added in the order in which its printed expression adds."""
        del symbol, column
        total = parts[0]
        for part in parts[1:]:
            total += part
        return total


def total_expression(column: str, parts: Sequence[T]) -> tuple[str, Mapping[str, T]]:
    """The sum over a column as an expression: ``F_s_1 + F_s_2 + …``, and the value of each symbol in it."""
    where = {f"{column}_{number}": part for number, part in enumerate(parts, 1)}
    return " + ".join(where), where


def targets(formula: Formula) -> tuple[str, ...]:
    """Every symbol that a formula's lines set."""
    return tuple(dict.fromkeys(line.target for line in formula.lines()))


def tabulate(table: Tabulation, rows: Sequence[Row[T]], shared: Mapping[str, T], bench: Bench[T]) -> Tabulated[T]:
    """Work a table.

    An argument of a formula is looked for among the values of the row, then in `shared`. A formula that lacks an
    argument in a row is left out there, and totals run over the rows that have the value.

    Parameters
    ----------
    table : what is worked
    rows : the label and the own values of each row
    shared : values that all rows use
    bench : what works the cells

    Raises
    ------
    InputError : the table and its rows do not fit together, or a value outside its range; all that is wrong
    """
    _refuse(table, [*_table_problems(table, rows)])
    made: list[Mapping[str, T]] = []
    errors: list[InputError] = []
    for label, own in rows:
        try:
            made.append(_row(table, label, own, shared, made[-1] if made else {}, bench))
        except InputError as error:
            errors.append(error.at(f"{table.label} {label}".strip()))
            made.append({})
    if errors:
        raise type(errors[0]).gathered(_subject(table), errors)
    _refuse(table, [*_empty(table, made, shared)])
    totals = {symbol: bench.total(symbol, column, _column(made, column)) for column, symbol in table.totals.items()}
    return Tabulated(tuple(made), totals)


def _subject(table: Tabulation) -> str:
    return f"table {table.title!r}"


def _refuse(table: Tabulation, problems: Sequence[Problem]) -> None:
    if problems:
        raise InputError(_subject(table), problems)


def _column(made: Sequence[Mapping[str, T]], symbol: str) -> list[T]:
    return [values[symbol] for values in made if symbol in values]


def _row(
    table: Tabulation,
    label: str,
    own: Mapping[str, T | Worked[T] | Above],
    shared: Mapping[str, T],
    above: Mapping[str, T],
    bench: Bench[T],
) -> Mapping[str, T]:
    values: dict[str, T] = {}
    for symbol, stated in own.items():
        if isinstance(stated, Above):
            if stated.symbol in above:
                values[symbol] = above[stated.symbol]
        else:
            values[symbol] = _plain(symbol, stated, label, bench) if isinstance(stated, Worked) else stated
    for formula in table.formulas:
        arguments = {
            name: values[name] if name in values else shared[name]
            for name in formula.arguments
            if name in values or name in shared
        }
        if len(arguments) == len(formula.arguments):
            _set(values, bench.formula(formula, arguments, label), formula)
    return values


def _plain(symbol: str, worked: Worked[T], label: str, bench: Bench[T]) -> T:
    try:
        missing = [name for name in expression.names(expression.parse(worked.expression)) if name not in worked.where]
        if missing:
            problem = Problem(
                f"{symbol} = {worked.expression!r}", "a value for every symbol in it",
                f"add {', '.join(dict.fromkeys(missing))} to where",
            )  # fmt: skip
            raise InputError(symbol, [problem])
        return bench.plain(symbol, worked, label)
    except FormulaError as error:
        raise InputError(
            symbol, [Problem(f"{symbol} = {worked.expression!r}", f"plain arithmetic ({error})")]
        ) from error


def _set(values: dict[str, T], results: Mapping[str, T], formula: Formula) -> None:
    twice = [symbol for symbol in results if symbol in values]
    if twice:
        problems = [Problem(f"{symbol} is set before {formula.name} sets it", "one value a row") for symbol in twice]
        raise InputError(formula.name, problems)
    values.update(results)


def _table_problems(table: Tabulation, rows: Sequence[Row[Any]]) -> Iterator[Problem]:
    if not table.title.strip():
        yield Problem("a table without a title", "what is worked, in words", "title='…'")
    if not rows:
        yield Problem("no rows", "one row or more", "state what the table is worked for")
    if not table.columns:
        yield Problem("no columns", "one column or more", "columns=(Column('F_s', 1, 'kip'), …)")
    loose = [formula for formula in table.formulas if not isinstance(formula, Formula)]
    if loose:
        yield Problem(f"{loose[0]!r}", "a formula", "put @formula('where it comes from') above the function")
    elif table.columns:
        yield from _column_problems(table, rows)
    if table.totals and len(rows) > MOST_TERMS:
        yield Problem(f"totals over {len(rows)} rows", f"at most {MOST_TERMS}", "make two tables, and add their totals")


def _column_problems(table: Tabulation, rows: Sequence[Row[Any]]) -> Iterator[Problem]:
    columns = [column.symbol for column in table.columns]
    results = dict.fromkeys(symbol for formula in table.formulas for symbol in targets(formula))
    own = dict.fromkeys(symbol for _, stated in rows for symbol in stated)
    worked = [name for name in own if any(isinstance(stated.get(name), Worked) for _, stated in rows)]
    for column in table.columns:
        symbol, decimals = column.symbol, column.decimals
        if columns.count(symbol) > 1:
            yield Problem(f"column {symbol} stands {columns.count(symbol)} times", "once")
        if rows and symbol not in own and symbol not in results:
            yield Problem(f"column {symbol}", f"a value of the rows or a result: {', '.join([*own, *results])}")
        if isinstance(decimals, bool) or not isinstance(decimals, int) or not 0 <= decimals <= MOST_DECIMALS:
            yield Problem(f"column {symbol}: {decimals!r} decimals", f"a whole number from 0 to {MOST_DECIMALS}")
    # What is worked stands on the page: nobody could follow a line that rests on a value unseen.
    for symbol in dict.fromkeys([*worked, *results]):
        if symbol not in columns:
            yield Problem(f"{symbol} is worked and not printed", "a column for every worked value", f"add {symbol}")
    for symbol, total in table.totals.items():
        if symbol not in columns:
            yield Problem(f"total {total} of {symbol}", f"the symbol of a column: {', '.join(columns)}")
        if not total.isidentifier():
            yield Problem(f"total {total!r} of {symbol}", "letters, digits and _, as in code", "e.g. 'P_s'")


def _empty(table: Tabulation, made: Sequence[Mapping[str, Any]], shared: Mapping[str, Any]) -> Iterator[Problem]:
    """What no row has: the results of a formula that lacks an argument everywhere, a column of own values."""
    empty = [column.symbol for column in table.columns if not _column(made, column.symbol)]
    for formula in table.formulas:
        if formula.result_name in empty:
            missing = [name for name in formula.arguments if name not in shared and not _column(made, name)]
            if missing:
                found = f"{formula.name} lacks {', '.join(missing)}"
                yield Problem(found, "a value in a row, or shared by all", "state it")
            else:
                yield Problem(f"{formula.name} lacks an argument in every row", "all of them in one row or more")
            empty.remove(formula.result_name)
    for symbol in empty:
        if not any(symbol in targets(formula) for formula in table.formulas):
            yield Problem(f"column {symbol} has no value in any row", "a value in one row or more")
