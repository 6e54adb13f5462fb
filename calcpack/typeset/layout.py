"""A line of a formula, laid out by handcalcs once and proved to compute what the line computes.

Before handcalcs sees a line, every symbol and number in it is replaced by a neutral token, so nothing depends on
how names are spelt. What comes back is read into a tree, superfluous brackets are taken out, and the tree, read as
it will be printed, is evaluated at random points and compared with the line itself. A difference is a `LayoutError`.
"""

from __future__ import annotations

import ast
import copy
import math
import random
import re
from collections.abc import Iterator
from dataclasses import dataclass
from functools import cache
from typing import Any

from calcpack import expression
from calcpack.errors import FormulaError, LayoutError
from calcpack.formula_source import unit_constant, without_units
from calcpack.typeset.tree import Node, freeze, infix, simplify, slots

__all__ = ["Layout", "Slot", "lay_out", "prove"]


@dataclass(frozen=True)
class Slot:
    """What stands in one place of a line: a symbol, a number, or a number with a unit."""

    kind: str
    text: str
    unit: str = ""


@dataclass(frozen=True)
class Layout:
    """The right side of a line, or a condition, as a tree over its slots."""

    tree: Node
    slots: tuple[Slot, ...]

    def to_json(self) -> dict[str, Any]:
        """Plain data, for keeping between runs and for a notebook's output."""
        return {"tree": self.tree, "slots": [[slot.kind, slot.text, slot.unit] for slot in self.slots]}

    @classmethod
    def from_json(cls, data: dict[str, Any]) -> Layout:
        """The layout that `to_json` wrote."""
        return cls(freeze(data["tree"]), tuple(Slot(*slot) for slot in data["slots"]))


class _Tokens(ast.NodeTransformer):
    """Replaces each symbol, number and dimensioned constant by a token of its own."""

    def __init__(self) -> None:
        self.slots: list[Slot] = []

    def token(self, slot: Slot) -> ast.Name:
        self.slots.append(slot)
        return ast.Name(_token(len(self.slots) - 1))

    def visit_Name(self, node: ast.Name) -> ast.expr:
        return self.token(Slot("const", "pi") if node.id in expression.CONSTANTS else Slot("symbol", node.id))

    def visit_Constant(self, node: ast.Constant) -> ast.expr:
        return self.token(Slot("number", repr(node.value)))

    def visit_Call(self, node: ast.Call) -> ast.expr:
        node.args = [self.visit(argument) for argument in node.args]
        return node

    def visit_BinOp(self, node: ast.BinOp) -> ast.expr:
        constant = unit_constant(node)
        if constant:
            return self.token(Slot("number", repr(constant[0]), constant[1]))
        node.left, node.right = self.visit(node.left), self.visit(node.right)
        return node


def lay_out(node: ast.expr) -> Layout:
    """Lay out an expression or a condition, and prove the layout.

    Raises
    ------
    LayoutError : the layout does not compute what the expression computes
    """
    tokens = _Tokens()
    tree = simplify(_arrange(tokens.visit(copy.deepcopy(node))))
    layout = Layout(tree, tuple(tokens.slots))
    prove(layout, node)
    return layout


def prove(layout: Layout, node: ast.expr, points: int = 12) -> None:
    """Evaluate the layout, read as printed, at random points and compare with the expression.

    Raises
    ------
    LayoutError : a place is missing, or the values differ
    """
    text = ast.unparse(node)
    if list(slots(layout.tree)) != list(range(len(layout.slots))):
        raise LayoutError(f"the layout of {text!r} lost or moved a term")
    plain, printed = expression.infix(without_units(node)), infix(layout.tree)
    condition = isinstance(node, (ast.Compare, ast.BoolOp))
    generator = random.Random(text)
    compared = 0
    for _ in range(points * 10):
        values = {name: generator.uniform(0.05, 9.0) for name in dict.fromkeys(expression.names(node))}
        numbers = {f"_{index}": _slot_value(slot, values) for index, slot in enumerate(layout.slots)}
        try:
            expected = expression.evaluate(plain, values, condition)
        except FormulaError:
            continue
        found = expression.evaluate(printed, numbers, condition)
        if not math.isclose(expected, found, rel_tol=1e-9, abs_tol=1e-12):
            raise LayoutError(
                f"the layout of {text!r} computes {found!r} where the line computes {expected!r}; write it as two lines"
            )
        compared += 1
        if compared == points:
            return
    if not compared:
        raise LayoutError(f"{text!r} has no value at any of {points * 10} trial points, so its layout is not proved")


def _slot_value(slot: Slot, values: dict[str, float]) -> float:
    if slot.kind == "symbol":
        return values[slot.text]
    return math.pi if slot.kind == "const" else float(slot.text)


def _arrange(node: ast.expr) -> Node:
    """The tree of a tokenised expression: conditions and plain values directly, the rest through handcalcs."""
    match node:
        case ast.Compare(left=left, ops=ops, comparators=comparators):
            operands = [_arrange(part) for part in (left, *comparators)]
            pairs = [("rel", _SIGN[type(op)], a, b) for op, a, b in zip(ops, operands, operands[1:], strict=False)]
            return pairs[0] if len(pairs) == 1 else _chain(operands, [_SIGN[type(op)] for op in ops])
        case ast.BoolOp(op=op, values=values):
            parts = tuple(_grouped(part, op) for part in values)
            return ("and" if isinstance(op, ast.And) else "or", parts)
        case ast.Name(id=token):
            return ("slot", _number(token))
        case ast.UnaryOp(operand=operand):
            inner = _arrange(operand)
            return ("neg", ("paren", inner) if inner[0] in ("add", "neg") else inner)
    return _read(_handcalcs(ast.unparse(node)))


_SIGN = {ast.Lt: "<", ast.LtE: "<=", ast.Gt: ">", ast.GtE: ">=", ast.Eq: "==", ast.NotEq: "!="}


def _chain(operands: list[Node], signs: list[str]) -> Node:
    node = ("rel", signs[0], operands[0], operands[1])
    for sign, operand in zip(signs[1:], operands[2:], strict=True):
        node = ("rel", sign, node, operand)
    return node


def _grouped(part: ast.expr, outer: ast.boolop) -> Node:
    inner = _arrange(part)
    return ("paren", inner) if isinstance(outer, ast.And) and isinstance(part, ast.BoolOp) else inner


def _token(index: int) -> str:
    letters = ""
    index += 1
    while index:
        index, rest = divmod(index - 1, 26)
        letters = chr(97 + rest) + letters
    return f"q{letters}q"


def _number(token: str) -> int:
    index = 0
    for letter in token[1:-1]:
        index = index * 26 + ord(letter) - 96
    return index - 1


class _Placeholder:
    """What handcalcs prints in place of a value: its own name between marks."""

    __slots__ = ("name",)

    def __init__(self, name: str) -> None:
        self.name = name

    def _repr_latex_(self) -> str:
        return rf"\text{{QZ{self.name}ZQ}}"

    def __str__(self) -> str:
        return "slot"


@cache
def _handcalcs(text: str) -> str:
    """The substituted row that handcalcs lays out for an expression of tokens."""
    from handcalcs import global_config
    from handcalcs.handcalcs import LatexRenderer

    tokens = set(re.findall(r"\bq[a-z]+q\b", text)) | {"zz"}
    values = {name: _Placeholder(name) for name in tokens}
    options = {"precision": 3, "sci_not": False, "override": "long"}
    latex = LatexRenderer(f"zz = {text}", values, options).render(dict(global_config._config))
    parts = re.split(r"\\\\&=|&=", latex)
    if len(parts) != 4:
        raise LayoutError(f"{text!r} was not laid out as a calculation")
    return parts[2].strip()


_TOKEN = re.compile(
    r"\\text\{QZ(?P<slot>q[a-z]+q)ZQ\}|(?P<cmd>\\[A-Za-z]+|\\.)|(?P<num>\d+(?:\.\d+)?)|(?P<word>[a-z]\w*)|(?P<sign>[-+^_{}(),])"
)
_FUNCTION_OF = {r"\ln": "log", r"\arctan": "atan", r"\arcsin": "asin", r"\arccos": "acos"}
_FUNCTION_OF |= {rf"\{name}": name for name in ("sin", "cos", "tan", "exp", "min", "max")}


class _Latex:
    """A reader of the small LaTeX that handcalcs writes for a calculation."""

    def __init__(self, text: str) -> None:
        self.text = text
        self.tokens = list(self._split(text))
        self.at = 0

    def _split(self, text: str) -> Iterator[tuple[str, str]]:
        position = 0
        while position < len(text):
            if text[position].isspace():
                position += 1
                continue
            match = _TOKEN.match(text, position)
            if match is None:
                raise LayoutError(f"cannot read the layout {text!r} at {text[position : position + 20]!r}")
            position = match.end()
            kind = str(match.lastgroup)
            if match[kind] not in (r"\ ", r"\left", r"\right"):
                yield kind, match[kind]

    def peek(self) -> str:
        return self.tokens[self.at][1] if self.at < len(self.tokens) else ""

    def take(self, *expected: str) -> tuple[str, str]:
        if self.at >= len(self.tokens) or (expected and self.peek() not in expected):
            raise LayoutError(f"cannot read the layout {self.text!r}: found {self.peek()!r}, not {expected}")
        self.at += 1
        return self.tokens[self.at - 1]

    def sum(self) -> Node:
        terms = [("-" if self.peek() == "-" and self.take() else "+", self.product())]
        while self.peek() in ("+", "-"):
            terms.append((self.take()[1], self.product()))
        if len(terms) == 1:
            return terms[0][1] if terms[0][0] == "+" else ("neg", terms[0][1])
        return ("add", tuple(terms))

    def product(self) -> Node:
        factors = [self.power()]
        while self.peek() == r"\cdot":
            self.take()
            factors.append(self.power())
        return factors[0] if len(factors) == 1 else ("mul", tuple(factors))

    def power(self) -> Node:
        base = self.atom()
        if self.peek() == "^":
            self.take()
            return ("pow", base, self.group())
        return base

    def group(self) -> Node:
        self.take("{")
        inner = self.sum()
        self.take("}")
        return inner

    def bracket(self) -> tuple[Node, ...]:
        self.take("(")
        parts = [self.sum()]
        while self.peek() == ",":
            self.take()
            parts.append(self.sum())
        self.take(")")
        return tuple(parts)

    def atom(self) -> Node:
        kind, text = self.take()
        if kind == "slot":
            return ("slot", _number(text))
        if kind == "num":
            return ("num", text)
        if text == r"\frac":
            return ("frac", self.group(), self.group())
        if text == r"\sqrt":
            return ("sqrt", self.group())
        if text == "(":
            self.at -= 1
            return ("paren", *self.bracket())
        name, arguments = self.function(kind, text), self.bracket()
        return ("call", "atan2" if name == "atan" and len(arguments) == 2 else name, arguments)

    def function(self, kind: str, text: str) -> str:
        if text in (r"\operatorname", r"\mathrm"):
            self.take("{")
            name = self.take()[1]
            self.take("}")
        elif text == r"\log":
            self.take("_")
            name = "log" + self.digits()
        else:
            name = text if kind == "word" else _FUNCTION_OF.get(text, text)
        if name not in expression.FUNCTIONS:
            raise LayoutError(f"cannot read the layout {self.text!r}: unknown {name!r}")
        return name

    def digits(self) -> str:
        if self.peek() == "{":
            self.take()
            digits = self.take()[1]
            self.take("}")
            return digits
        return self.take()[1]


def _read(latex: str) -> Node:
    reader = _Latex(latex)
    tree = reader.sum()
    if reader.at != len(reader.tokens):
        raise LayoutError(f"cannot read the layout {latex!r}: {reader.peek()!r} is left over")
    return tree
