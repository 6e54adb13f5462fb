"""The small arithmetic language of printed lines: parse, check, write as text, evaluate.

A line of a formula, an expression of the ledger and the proof of a layout are all in this language:
numbers, symbols, ``+ - * / **``, brackets, comparisons in conditions, and the functions of `FUNCTIONS`.
Nothing else parses, so a ledger from a stranger can be replayed without running anything of theirs.
"""

from __future__ import annotations

import ast
import math
import operator
from collections.abc import Callable, Iterator, Mapping
from functools import cache
from typing import Any

from calcpack.errors import FormulaError

__all__ = ["FUNCTIONS", "check", "evaluate", "infix", "names", "parse"]

FUNCTIONS: dict[str, Callable[..., float]] = {
    "abs": abs,
    "acos": math.acos,
    "asin": math.asin,
    "atan": math.atan,
    "atan2": math.atan2,
    "ceil": math.ceil,
    "cos": math.cos,
    "exp": math.exp,
    "floor": math.floor,
    "hypot": math.hypot,
    "log": math.log,
    "log10": math.log10,
    "max": max,
    "min": min,
    "sin": math.sin,
    "sqrt": math.sqrt,
    "tan": math.tan,
}
CONSTANTS = {"pi": math.pi}

_BINARY: dict[type[ast.operator], Callable[[Any, Any], Any]] = {
    ast.Add: operator.add,
    ast.Sub: operator.sub,
    ast.Mult: operator.mul,
    ast.Div: operator.truediv,
    ast.Pow: operator.pow,
}
_COMPARE: dict[type[ast.cmpop], Callable[[Any, Any], bool]] = {
    ast.Lt: operator.lt,
    ast.LtE: operator.le,
    ast.Gt: operator.gt,
    ast.GtE: operator.ge,
    ast.Eq: operator.eq,
    ast.NotEq: operator.ne,
}
_MAX_LENGTH = 4000
_MAX_DEPTH = 100


@cache
def parse(text: str, condition: bool = False) -> ast.expr:
    """Parse an expression, or a condition, of the language.

    Raises
    ------
    FormulaError : it is not an expression of the language; the message names what is not allowed
    """
    if len(text) > _MAX_LENGTH:
        raise FormulaError(f"expression of {len(text)} characters: at most {_MAX_LENGTH} are read")
    try:
        if "#" in text or "\\" in text:
            raise ValueError("Python would leave aside what follows, a reader would not")
        node = ast.parse(text.strip(), mode="eval").body
    except (SyntaxError, ValueError, RecursionError, MemoryError) as error:
        raise FormulaError(f"not an expression: {text!r}") from error
    _refuse_depth(node, text)
    check(node, condition)
    return node


def _refuse_depth(node: ast.expr, text: str) -> None:
    level: list[ast.AST] = [node]
    for _ in range(_MAX_DEPTH):
        level = [child for parent in level for child in ast.iter_child_nodes(parent)]
        if not level:
            return
    raise FormulaError(f"an expression nested deeper than {_MAX_DEPTH} levels is not read: {text[:60]!r}…")


def check(node: ast.expr, condition: bool = False) -> None:
    """Refuse everything that is outside the language; `condition` admits comparisons at the top."""
    if condition and isinstance(node, ast.BoolOp):
        for part in node.values:
            check(part, condition=True)
    elif condition and isinstance(node, ast.Compare):
        if any(type(op) not in _COMPARE for op in node.ops):
            raise FormulaError(f"comparison not allowed in a formula: {ast.unparse(node)}")
        for part in (node.left, *node.comparators):
            check(part)
    else:
        _check_value(node)


def _check_value(node: ast.expr) -> None:
    match node:
        case ast.Name():
            return
        case ast.Constant(value=value) if isinstance(value, (int, float)) and not isinstance(value, bool):
            return
        case ast.BinOp(left=left, op=op, right=right) if type(op) in _BINARY:
            _check_value(left)
            _check_value(right)
        case ast.UnaryOp(op=ast.USub(), operand=operand):
            _check_value(operand)
        case ast.Call(func=ast.Name(id=name), args=args, keywords=[]) if name in FUNCTIONS and args:
            for argument in args:
                _check_value(argument)
        case _:
            allowed = "numbers, symbols, + - * / **, brackets and " + " ".join(sorted(FUNCTIONS))
            raise FormulaError(f"not allowed in a formula: {ast.unparse(node)!r}; allowed are {allowed}")


def names(node: ast.expr) -> Iterator[str]:
    """Every symbol of an expression, in the order written, repeats included; functions and pi left out."""
    if isinstance(node, ast.Name):
        if node.id not in CONSTANTS:
            yield node.id
        return
    for child in ast.iter_child_nodes(node):
        if isinstance(child, ast.expr) and not (isinstance(node, ast.Call) and child is node.func):
            yield from names(child)


def infix(node: ast.expr) -> str:
    """The expression as plain infix text, brackets only where they are needed."""
    return ast.unparse(node)


def evaluate(text: str, values: Mapping[str, float], condition: bool = False) -> float:
    """Evaluate an expression of the language from its text alone.

    Raises
    ------
    FormulaError : a symbol without a value, or an operation that has no result (a root of a negative number)
    """
    try:
        value = float(_value(parse(text, condition), values))
    except KeyError as error:
        raise FormulaError(f"{text!r} needs a value for {error.args[0]}") from error
    except (ArithmeticError, ValueError, TypeError) as error:
        raise FormulaError(f"{text!r} has no value here: {error}") from error
    if not math.isfinite(value):
        raise FormulaError(f"{text!r} has no value here: it is not finite")
    return value


def _value(node: ast.expr, values: Mapping[str, float]) -> Any:
    match node:
        case ast.Constant(value=value):
            return value
        case ast.Name(id=name):
            return CONSTANTS[name] if name in CONSTANTS and name not in values else values[name]
        case ast.BinOp(left=left, op=op, right=right):
            return _power_or(op, _value(left, values), _value(right, values))
        case ast.UnaryOp(operand=operand):
            return -_value(operand, values)
        case ast.Call(func=ast.Name(id=name), args=args):
            return FUNCTIONS[name](*[_value(argument, values) for argument in args])
        case ast.BoolOp(op=op, values=parts):
            truths = [bool(_value(part, values)) for part in parts]
            return all(truths) if isinstance(op, ast.And) else any(truths)
        case ast.Compare(left=left, ops=ops, comparators=comparators):
            operands = [_value(part, values) for part in (left, *comparators)]
            return all(_COMPARE[type(op)](a, b) for op, a, b in zip(ops, operands, operands[1:], strict=False))
    raise FormulaError(f"not allowed in a formula: {ast.unparse(node)!r}")


def _power_or(op: ast.operator, left: Any, right: Any) -> Any:
    # A ledger from elsewhere must not be able to stall its reader: 9**9**9 in integers would.
    if isinstance(op, ast.Pow):
        return math.pow(left, right)
    return _BINARY[type(op)](left, right)
