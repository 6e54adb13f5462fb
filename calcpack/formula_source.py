"""Reads the source of a formula: its arguments with their dimensions, its lines and its branches."""

from __future__ import annotations

import ast
import builtins
import copy
import inspect
import textwrap
import types
import typing
from collections.abc import Callable, Iterable, Iterator, Mapping
from dataclasses import dataclass
from functools import cached_property

from calcpack import expression, symbols
from calcpack.errors import FormulaError
from calcpack.units import Dimension

__all__ = [
    "UNIT_CONSTANTS",
    "Branch",
    "Line",
    "flatten",
    "opposite",
    "read_body",
    "read_signature",
    "unit_constant",
    "without_units",
]

# Dimensioned constants inside a formula: 12*inch is printed "12 in". They are 1.0, the coherent unit.
inch = 1.0
psi = 1.0
lb = 1.0
UNIT_CONSTANTS = {"inch": "in", "psi": "psi", "lb": "lb"}


@dataclass(frozen=True)
class Line:
    """One statement of a formula: `target` = `value`, the dimension of the target, and its place in the body."""

    target: str
    value: ast.expr
    dimension: Dimension
    index: int

    @cached_property
    def text(self) -> str:
        """The right side as infix text in which dimensioned constants are plain coherent numbers."""
        return expression.infix(without_units(self.value))

    @cached_property
    def names(self) -> tuple[str, ...]:
        """Symbols on the right side, each once, in order of appearance."""
        return tuple(dict.fromkeys(name for name in expression.names(self.value) if name not in UNIT_CONSTANTS))

    @cached_property
    def code(self) -> types.CodeType:
        """The right side, compiled."""
        return compile(ast.Expression(self.value), "<line>", "eval")


@dataclass(frozen=True)
class Branch:
    """An ``if`` of a formula: its condition and the statements of both sides."""

    condition: ast.expr
    then: tuple[Line | Branch, ...]
    otherwise: tuple[Line | Branch, ...]

    @cached_property
    def code(self) -> types.CodeType:
        """The condition, compiled."""
        return compile(ast.Expression(self.condition), "<condition>", "eval")


def read_signature(function: Callable[..., float]) -> tuple[dict[str, Dimension], Dimension]:
    """The dimension of each argument, in order, and of the result.

    Raises
    ------
    FormulaError : an argument that is not keyword-only, or has no dimension
    """
    try:
        hints = typing.get_type_hints(function, include_extras=True)
    except NameError as error:
        raise FormulaError(f"{function.__name__}: {error} where its arguments are annotated; import it") from error
    arguments = {}
    for parameter in inspect.signature(function).parameters.values():
        if parameter.kind is not parameter.KEYWORD_ONLY or parameter.default is not parameter.empty:
            raise FormulaError(f"{function.__name__}: argument {parameter.name} must be keyword-only, without default")
        arguments[parameter.name] = _dimension(hints.get(parameter.name), f"{function.__name__}: {parameter.name}")
    return arguments, _dimension(hints.get("return"), f"{function.__name__}: the result")


def _dimension(hint: object, what: str) -> Dimension:
    for extra in getattr(hint, "__metadata__", ()):
        if isinstance(extra, Dimension):
            return extra
    raise FormulaError(f"{what} has no dimension: annotate it as Length, Stress, Force, Ratio, … of calcpack.units")


def read_body(
    function: Callable[..., float], arguments: Mapping[str, Dimension], result: Dimension
) -> tuple[str, tuple[Line | Branch, ...], str]:
    """The normalised source of the body, its lines and branches, and the name of the result.

    Raises
    ------
    FormulaError : a statement that cannot be printed as it runs
    """
    try:
        tree = ast.parse(textwrap.dedent(inspect.getsource(function))).body[0]
    except OSError as error:
        raise FormulaError(f"{function.__name__}: its source cannot be read; define it in a file or a cell") from error
    assert isinstance(tree, ast.FunctionDef)
    statements = tree.body[1:] if ast.get_docstring(tree) is not None else tree.body
    if not statements or not isinstance(last := statements[-1], ast.Return) or not isinstance(last.value, ast.Name):
        raise FormulaError(f"{function.__name__}: the last statement must be 'return' and the name of the result")
    reader = _Reader(function, {**arguments}, last.value.id, result)
    for name in arguments:
        reader.refuse_reserved(name)
    body = reader.block(statements[:-1])
    if not body or last.value.id not in reader.set:
        raise FormulaError(f"{function.__name__}: {last.value.id} is returned, and not on every path set by a line")
    text = "\n".join(ast.unparse(statement) for statement in statements)
    signature = ", ".join(f"{name}: {dimension.powers}" for name, dimension in arguments.items())
    return f"({signature})\n{text}", body, last.value.id


class _Reader:
    """Reads the statements of a formula's body and refuses what cannot be printed as it runs."""

    def __init__(
        self, function: Callable[..., float], known: dict[str, Dimension], result: str, dimension: Dimension
    ) -> None:
        self.function = function
        self.known = known
        self.set = set(known)
        self.result = result
        self.dimension = dimension
        self.count = 0

    def block(self, statements: Iterable[ast.stmt]) -> tuple[Line | Branch, ...]:
        """Read statements in order."""
        return tuple(self.statement(statement) for statement in statements)

    def statement(self, statement: ast.stmt) -> Line | Branch:
        """Read one statement: a line or a branch."""
        match statement:
            case ast.Assign(targets=[ast.Name(id=target)], value=value):
                return self.line(target, value, None)
            case ast.AnnAssign(target=ast.Name(id=target), value=ast.expr() as value, annotation=annotation):
                return self.line(target, value, annotation)
            case ast.If(test=test, body=then, orelse=otherwise):
                expression.check(test, condition=True)
                opposite(test)
                self.scope(test)
                return Branch(test, *self.sides(then, otherwise))
        raise FormulaError(
            f"{self.function.__name__}: {ast.unparse(statement)!r} cannot be printed; "
            "a formula holds lines 'symbol = expression' and 'if' blocks"
        )

    def sides(
        self, then: Iterable[ast.stmt], otherwise: Iterable[ast.stmt]
    ) -> tuple[tuple[Line | Branch, ...], tuple[Line | Branch, ...]]:
        """Both sides of a branch; after it, a symbol is set where both sides set it."""
        before = set(self.set)
        first = self.block(then)
        after_first, self.set = self.set, before
        second = self.block(otherwise)
        self.set &= after_first
        return first, second

    def refuse_reserved(self, name: str) -> None:
        """Refuse a name that the language of lines keeps for itself."""
        if name in expression.FUNCTIONS or name in expression.CONSTANTS or name in UNIT_CONSTANTS:
            raise FormulaError(f"{self.function.__name__}: {name} has a meaning of its own; choose another symbol")

    def line(self, target: str, value: ast.expr, annotation: ast.expr | None) -> Line:
        """Read one line, and note what it sets."""
        self.refuse_reserved(target)
        expression.check(value)
        self.scope(value)
        dimension = self.target_dimension(target, annotation)
        self.known[target] = dimension
        self.set.add(target)
        self.count += 1
        return Line(target, value, dimension, self.count)

    def target_dimension(self, target: str, annotation: ast.expr | None) -> Dimension:
        """The dimension of what a line sets: annotated, of the result, or of the notation table."""
        if annotation is not None:
            try:
                hint = eval(compile(ast.Expression(annotation), "<annotation>", "eval"), self.function.__globals__)
            except NameError as error:
                raise FormulaError(f"{self.function.__name__}: {target}: {error}; import it") from error
            return _dimension(hint, f"{self.function.__name__}: {target}")
        if target == self.result:
            return self.dimension
        if target in self.known:
            return self.known[target]
        if symbols.is_known(target):
            return symbols.lookup(target).dimension
        raise FormulaError(
            f"{self.function.__name__}: {target} is not in the notation table; "
            f"annotate the line with its dimension, e.g. '{target}: Length = …'"
        )

    def scope(self, node: ast.expr) -> None:
        """Refuse names and functions that are not what the printed line would say."""
        scope = {**self.function.__globals__, **dict.fromkeys(self.function.__code__.co_freevars)}
        for name in dict.fromkeys(part.id for part in ast.walk(node) if isinstance(part, ast.Name)):
            wanted = expression.FUNCTIONS.get(name, expression.CONSTANTS.get(name))
            if wanted is not None and scope.get(name, getattr(builtins, name, None)) != wanted:
                raise FormulaError(f"{self.function.__name__}: {name} is not math's; write 'from math import {name}'")
            if wanted is None and name not in self.set and not (name in UNIT_CONSTANTS and scope.get(name) == 1.0):
                raise FormulaError(
                    f"{self.function.__name__}: {name} is neither an argument nor set by a line above on every path"
                )
        for name in expression.names(without_units(node)):
            if name in UNIT_CONSTANTS:
                raise FormulaError(f"{self.function.__name__}: {name} stands alone; write '12*{name}', number first")


def flatten(body: Iterable[Line | Branch]) -> Iterator[Line | Branch]:
    """Every line and branch of a body, those inside branches included."""
    for item in body:
        yield item
        if isinstance(item, Branch):
            yield from flatten(item.then)
            yield from flatten(item.otherwise)


def unit_constant(node: ast.AST) -> tuple[float, str] | None:
    """The number and unit of a dimensioned constant such as ``12*inch``; ``None`` for anything else."""
    match node:
        case ast.BinOp(left=ast.Constant(value=int() | float() as number), op=ast.Mult(), right=ast.Name(id=name)):
            if name in UNIT_CONSTANTS:
                return number, UNIT_CONSTANTS[name]
    return None


class _DropUnits(ast.NodeTransformer):
    def visit_BinOp(self, node: ast.BinOp) -> ast.expr:
        """A dimensioned constant as its number; anything else as it is."""
        constant = unit_constant(node)
        if constant:
            return ast.Constant(constant[0])
        self.generic_visit(node)
        return node


def without_units(node: ast.expr) -> ast.expr:
    """The same expression with dimensioned constants (12*inch) as plain coherent numbers (12)."""

    stripped = _DropUnits().visit(copy.deepcopy(node))
    assert isinstance(stripped, ast.expr)
    return stripped


_OPPOSITE: dict[type[ast.cmpop], ast.cmpop] = {
    ast.Lt: ast.GtE(),
    ast.LtE: ast.Gt(),
    ast.Gt: ast.LtE(),
    ast.GtE: ast.Lt(),
    ast.Eq: ast.NotEq(),
    ast.NotEq: ast.Eq(),
}


def opposite(test: ast.expr) -> ast.expr:
    """The condition that holds where `test` does not (De Morgan); chains of comparisons become 'or'."""
    match test:
        case ast.BoolOp(op=op, values=values):
            return ast.BoolOp(ast.Or() if isinstance(op, ast.And) else ast.And(), [opposite(part) for part in values])
        case ast.Compare(left=left, ops=[op], comparators=[right]):
            return ast.Compare(left, [_OPPOSITE[type(op)]], [right])
        case ast.Compare(left=left, ops=ops, comparators=comparators):
            operands = [left, *comparators]
            pairs = zip(operands, ops, comparators, strict=False)
            return ast.BoolOp(ast.Or(), [ast.Compare(a, [_OPPOSITE[type(op)]], [b]) for a, op, b in pairs])
    raise FormulaError(f"not a condition: {ast.unparse(test)}")
