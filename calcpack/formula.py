"""Published equations as plain functions of floats, and what is read from their source.

A formula is written once, as a function whose body is the equation, one statement a printed line::

    @formula(ACI_318_14("25.4.9.2"), ACI_318_19("25.4.9.2"), empirical=True)
    def compression(*, f_y: Stress, f_c: Stress, lamb: Ratio, d_b: Length) -> Length:
        l_dc = f_y/(50*lamb*sqrt(f_c))*d_b
        return l_dc

Calling it evaluates the body on floats of the coherent system, after a check of the arguments' ranges.
`Formula.record` evaluates the same statements one by one and keeps each line and the branch taken.
"""

from __future__ import annotations

import ast
import hashlib
import math
import typing
from collections.abc import Callable, Iterable, Iterator, Mapping
from dataclasses import dataclass
from functools import cached_property

from calcpack import expression, symbols
from calcpack.errors import FormulaError, Problem, RangeError
from calcpack.formula_source import Branch, Line, flatten, inch, opposite, psi, read_body, read_signature, without_units
from calcpack.units import Dimension, coherent_unit

__all__ = [
    "Branch",
    "Clause",
    "Formula",
    "Limit",
    "Line",
    "Recorded",
    "Recording",
    "Standard",
    "formula",
    "inch",
    "psi",
]


@dataclass(frozen=True)
class Standard:
    """A standard in one edition, e.g. ``Standard("ACI 318-19", "Building Code Requirements …")``."""

    name: str
    title: str = ""

    def __call__(self, number: str) -> Clause:
        """A clause of this standard."""
        return Clause(number, self)


@dataclass(frozen=True)
class Clause:
    """Where an equation comes from: a clause of a standard, or a source in words."""

    number: str
    standard: Standard | None = None

    def __str__(self) -> str:
        return f"{self.standard.name} {self.number}" if self.standard else self.number


@dataclass(frozen=True)
class Limit:
    """The range a clause allows for one argument, in coherent units, ends included."""

    symbol: str
    source: str
    low: float = -math.inf
    high: float = math.inf
    values: tuple[float, ...] = ()
    natural: bool = False

    def holds(self, value: float) -> bool:
        """Whether the value is allowed; NaN and infinity never are."""
        return max(self.low, -_LARGEST) <= value <= min(self.high, _LARGEST) and (
            not self.values or value in self.values
        )

    def words(self, unit: str) -> str:
        """The range in words, with its source."""
        low, high = f"{self.low:,g} {unit}".strip(), f"{self.high:,g} {unit}".strip()
        if self.natural:
            return f"has to be {self.source}"
        if self.values:
            text = "one of " + ", ".join(f"{value:,g}" for value in self.values) + f" {unit}"
        elif math.isinf(self.high):
            text = f"allowed {low} and up"
        elif math.isinf(self.low):
            text = f"allowed up to {high}"
        else:
            text = f"allowed {low} to {high}"
        return f"{text.strip()} ({self.source})"


@dataclass(frozen=True)
class Recorded:
    """A line as it ran: its value, and the conditions that led to it as (condition, held) pairs."""

    line: Line
    value: float
    conditions: tuple[tuple[ast.expr, bool], ...] = ()

    @cached_property
    def condition(self) -> str:
        """What held for this line to run, as infix text; empty where no rule chose it."""
        parts = [without_units(test if held else opposite(test)) for test, held in self.conditions]
        return expression.infix(ast.BoolOp(ast.And(), parts) if len(parts) > 1 else parts[0]) if parts else ""


@dataclass(frozen=True)
class Recording:
    """A recorded evaluation: the arguments, every line that ran, and the result."""

    formula: Formula
    arguments: Mapping[str, float]
    lines: tuple[Recorded, ...]

    @property
    def value(self) -> float:
        """The result, in the coherent unit of the formula's return annotation."""
        return self.lines[-1].value


class Formula:
    """A function whose body is an equation; made by `formula`.

    Attributes
    ----------
    function : the plain function of floats, without checks
    clauses : where the equation stands, one for each edition that has it
    empirical : it holds in the coherent units of its standard only (a root of a stress)
    arguments : dimension of each argument, in order
    body : its lines and branches
    limits : ranges of its arguments that a clause sets
    """

    def __init__(
        self, function: Callable[..., float], clauses: tuple[Clause, ...], empirical: bool, limits: tuple[Limit, ...]
    ) -> None:
        self.function = function
        self.clauses = clauses
        self.empirical = empirical
        self.limits = limits
        self.name = self.__name__ = function.__name__
        self.__doc__ = function.__doc__
        self.__module__ = function.__module__
        self.__wrapped__ = function
        self.arguments, self.result = read_signature(function)
        self.source, self.body, self.result_name = read_body(function, self.arguments, self.result)
        self._checks = (*_sign_limits(self.arguments, limits), *limits)
        self._bounds = tuple(
            (limit.symbol, max(limit.low, -_LARGEST), min(limit.high, _LARGEST)) for limit in self._checks
        )
        self._lists = tuple(limit for limit in limits if limit.values)
        unknown = [limit.symbol for limit in limits if limit.symbol not in self.arguments]
        if unknown:
            raise FormulaError(f"{self.name}: limits on {', '.join(unknown)}, which are not arguments")

    def __repr__(self) -> str:
        return f"<formula {self.name}: {'; '.join(map(str, self.clauses))}>"

    def __call__(self, **arguments: float) -> float:
        """Evaluate on floats of the coherent system.

        Raises
        ------
        RangeError : arguments outside the range that the clause or their nature allows, all at once
        """
        for name, low, high in self._bounds:
            if not (name in arguments and low <= arguments[name] <= high):
                self._refuse(arguments)
        for limit in self._lists:
            if not limit.holds(arguments[limit.symbol]):
                self._refuse(arguments)
        try:
            return self.function(**arguments)
        except (ArithmeticError, ValueError) as error:
            raise self._no_result(arguments, error) from error

    def clause(self, standard: Standard | None = None) -> Clause:
        """The clause in one edition; the first where none is asked for.

        Raises
        ------
        FormulaError : the edition does not hold this formula
        """
        if standard is None:
            return self.clauses[0]
        for clause in self.clauses:
            if clause.standard in (standard, None):
                return clause
        raise FormulaError(f"{self.name} is not in {standard.name}; it stands in {', '.join(map(str, self.clauses))}")

    def record(self, **arguments: float) -> Recording:
        """Evaluate line by line, keeping every line and the branch taken.

        Raises
        ------
        RangeError : as for a call
        FormulaError : a line without a finite real value; a result that is not the function's own (never expected)
        """
        result = self(**arguments)
        environment = dict(arguments)
        lines = tuple(self._run(self.body, environment, ()))
        for recorded in lines:
            if isinstance(recorded.value, complex) or not math.isfinite(recorded.value):
                raise FormulaError(
                    f"{self.name}: {recorded.line.target} = {recorded.value} is not a finite real number"
                )
        if not lines or lines[-1].value != result or lines[-1].line.target != self.result_name:
            raise FormulaError(f"{self.name}: the recorded lines give {lines[-1:]}, the function {result!r}")
        return Recording(self, dict(arguments), lines)

    @cached_property
    def key(self) -> str:
        """A digest of the normalised source: the key under which its layouts are kept."""
        return hashlib.sha256(self.source.encode()).hexdigest()[:24]

    def lines(self) -> Iterator[Line]:
        """Every line of the body, whatever the branch."""
        yield from (item for item in flatten(self.body) if isinstance(item, Line))

    def conditions(self) -> Iterator[ast.expr]:
        """Every condition of the body."""
        yield from (item.condition for item in flatten(self.body) if isinstance(item, Branch))

    def _run(
        self, body: Iterable[Line | Branch], environment: dict[str, float], held: tuple[tuple[ast.expr, bool], ...]
    ) -> Iterator[Recorded]:
        scope = self.function.__globals__
        for item in body:
            if isinstance(item, Line):
                environment[item.target] = value = eval(item.code, scope, environment)
                yield Recorded(item, value, held)
            else:
                truth = bool(eval(item.code, scope, environment))
                side = item.then if truth else item.otherwise
                yield from self._run(side, environment, (*held, (item.condition, truth)))

    def _no_result(self, arguments: Mapping[str, float], error: Exception) -> RangeError:
        given = [f"{name} = {arguments[name]:,.10g} {coherent_unit(self.arguments[name])}" for name in self.arguments]
        problem = Problem(", ".join(map(str.strip, given)), f"arguments for which the equation has a value ({error})")
        return RangeError(f"{self.name}: no result", [problem])

    def _refuse(self, arguments: Mapping[str, float]) -> typing.NoReturn:
        missing = [name for name in self.arguments if name not in arguments]
        if missing:
            raise TypeError(f"{self.name}: missing {', '.join(missing)}")
        problems: dict[str, Problem] = {}
        for limit in self._checks:
            value, unit = arguments[limit.symbol], coherent_unit(self.arguments[limit.symbol])
            if not limit.holds(value):
                given = f"{limit.symbol} = {value:,.10g} {unit}".strip()
                problems[limit.symbol] = Problem(given, limit.words(unit), _guess(limit, value, unit))
        count = f"{len(problems)} argument{'s' if len(problems) > 1 else ''} out of range"
        raise RangeError(f"{self.name}: {count}", problems.values())


def formula(
    *clauses: Clause | str, empirical: bool = False, limits: tuple[Limit, ...] = ()
) -> Callable[[Callable[..., float]], Formula]:
    """Make a function of floats into a formula.

    Parameters
    ----------
    clauses : where it stands, ``ACI_318_19("25.4.2.4a")``, one for each edition; or a source in words
    empirical : it holds only in the units of its standard
    limits : ranges of arguments, each with the clause that sets it

    Raises
    ------
    FormulaError : no source, an argument without a dimension, or a body that is not plain lines
    """
    if not clauses or any(not str(clause).strip() for clause in clauses):
        raise FormulaError("a formula states where it comes from: @formula(ACI_318_19('25.4.2.4a'))")
    sources = tuple(Clause(clause) if isinstance(clause, str) else clause for clause in clauses)
    return lambda function: Formula(function, sources, empirical, limits)


def _sign_limits(arguments: Mapping[str, Dimension], limits: tuple[Limit, ...]) -> Iterator[Limit]:
    set_by_clause = {limit.symbol for limit in limits if limit.low > 0 or limit.values}
    for name, dimension in arguments.items():
        sign = symbols.lookup(name).sign if symbols.is_known(name) else "any"
        if name in set_by_clause:
            continue
        low, words = _SIGNS[sign]
        yield Limit(name, words.format(dimension.phrase), low, _LARGEST, natural=True)


_LARGEST = 1e30
_SIGNS = {
    "positive": (math.ulp(0.0), "{} above zero"),
    "nonnegative": (0.0, "{}, zero or more"),
    "any": (-_LARGEST, "{}, a finite number"),
}


def _guess(limit: Limit, value: float, unit: str) -> str:
    for scale in (100.0, 1000.0):
        if unit == "psi" and value > 0 and limit.low < math.inf and limit.holds(value * scale):
            return f"was this meant to be {value * scale:,g} psi?"
    return ""
