"""A line of a formula, laid out by handcalcs once and proved to compute what the line computes.

Before handcalcs sees a line, every symbol and number in it is replaced by a neutral token, so nothing depends on
how names are spelt. What comes back is read into a tree, superfluous brackets are taken out, and the tree, read as
it will be printed, is evaluated at random points and compared with the line itself. A difference is a `LayoutError`.
"""

from __future__ import annotations

import ast
import copy
import itertools
import math
import random
import re
import warnings
from collections.abc import Iterator
from dataclasses import dataclass
from functools import cache
from typing import Any

from calcpack import expression
from calcpack.errors import FormulaError, LayoutError
from calcpack.formula_source import unit_constant, without_units
from calcpack.typeset.latex import read_latex, token_name, token_number
from calcpack.typeset.tree import Node, children, freeze, infix, rebuild, simplify, slots

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
        """A fresh token for a slot."""
        self.slots.append(slot)
        return ast.Name(token_name(len(self.slots) - 1))

    def visit_Name(self, node: ast.Name) -> ast.expr:
        """A token for a symbol."""
        return self.token(Slot("const", "pi") if node.id in expression.CONSTANTS else Slot("symbol", node.id))

    def visit_Constant(self, node: ast.Constant) -> ast.expr:
        """A token for a number."""
        return self.token(Slot("number", repr(node.value)))

    def visit_Call(self, node: ast.Call) -> ast.expr:
        """The arguments of a function."""
        node.args = [self.visit(argument) for argument in node.args]
        return node

    def visit_BinOp(self, node: ast.BinOp) -> ast.expr:
        """Both sides of an operator."""
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
    tokenised = tokens.visit(copy.deepcopy(node))
    try:
        return _proved(_arrange(tokenised), tokens.slots, node)
    except LayoutError:
        # handcalcs loses a bracket in some nested lines; its groups laid out apart come out right.
        return _proved(_in_groups(tokenised), tokens.slots, node)


def _proved(tree: Node, filled: list[Slot], node: ast.expr) -> Layout:
    layout = Layout(_numerators(simplify(tree), filled), tuple(filled))
    prove(layout, node)
    return layout


class _Groups(ast.NodeTransformer):
    """Takes out arguments of functions, and sums inside products, quotients and powers, each for a token."""

    def __init__(self) -> None:
        self.inner: dict[int, ast.expr] = {}

    def apart(self, node: ast.expr) -> ast.expr:
        """A token for a group that is laid out by itself."""
        if isinstance(node, ast.Name):
            return node
        number = _FIRST_GROUP + len(self.inner)
        self.inner[number] = node
        return ast.Name(token_name(number))

    def visit_Call(self, node: ast.Call) -> ast.expr:
        """The arguments of a function."""
        return ast.Call(node.func, [self.apart(argument) for argument in node.args], [])

    def visit_BinOp(self, node: ast.BinOp) -> ast.expr:
        """Both sides of an operator."""
        outer = isinstance(node.op, (ast.Add, ast.Sub))
        left = self.visit(node.left) if outer or not _is_sum(node.left) else self.apart(node.left)
        keep = isinstance(node.op, ast.Add) or not _is_sum(node.right)
        return ast.BinOp(left, node.op, self.visit(node.right) if keep else self.apart(node.right))


_FIRST_GROUP = 1_000_000


def _is_sum(node: ast.expr) -> bool:
    return isinstance(node, ast.UnaryOp) or (isinstance(node, ast.BinOp) and isinstance(node.op, (ast.Add, ast.Sub)))


def _in_groups(node: ast.expr) -> Node:
    groups = _Groups()
    outer = _arrange(groups.visit(copy.deepcopy(node)))
    return _put_back(outer, {number: _in_groups(inner) for number, inner in groups.inner.items()})


def _put_back(node: Node, groups: dict[int, Node]) -> Node:
    if node[0] == "slot" and node[1] in groups:
        inner = groups[node[1]]
        return ("paren", inner) if inner[0] in ("add", "neg") else inner
    return rebuild(node, tuple(_put_back(child, groups) for child in children(node)))


def _numerators(node: Node, filled: list[Slot]) -> Node:
    """``a b · c/d`` as one quotient ``a b c/d``, the way it is written; handcalcs puts only the last factor above."""
    node = rebuild(node, tuple(_numerators(child, filled) for child in children(node)))
    if node[0] != "mul":
        return node
    factors: list[Node] = []
    for factor in node[1]:
        above: list[Node] = []
        while (
            factor[0] == "frac" and factors and _is_symbol(factors[-1], filled) and factor[1][0] not in ("add", "neg")
        ):
            above.insert(0, factors.pop())
        if above:
            last = factor[1][1] if factor[1][0] == "mul" else (factor[1],) if factor[1] != ("num", "1") else ()
            product = (*above, *last)
            factor = ("frac", ("mul", product) if len(product) > 1 else product[0], factor[2])
        factors.append(factor)
    return factors[0] if len(factors) == 1 else ("mul", tuple(factors))


def _is_symbol(node: Node, filled: list[Slot]) -> bool:
    if node[0] in ("pow", "sqrt"):
        return _is_symbol(node[1], filled)
    return node[0] == "slot" and filled[node[1]].kind == "symbol"


def prove(layout: Layout, node: ast.expr, points: int = 24) -> None:
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
    trials = _trials(node, random.Random(text))
    compared = 0
    for values in itertools.islice(trials, points * 5):
        numbers = {f"_{index}": _slot_value(slot, values) for index, slot in enumerate(layout.slots)}
        try:
            expected = expression.evaluate(plain, values, condition)
        except FormulaError:
            continue
        try:
            found = expression.evaluate(printed, numbers, condition)
        except FormulaError as error:
            raise LayoutError(
                f"the layout of {text!r} computes nothing where the line computes {expected!r}"
            ) from error
        if not math.isclose(expected, found, rel_tol=1e-9, abs_tol=1e-12):
            raise LayoutError(
                f"the layout of {text!r} computes {found!r} where the line computes {expected!r}; write it as two lines"
            )
        compared += 1
        if compared == points:
            return
    if not compared:
        raise LayoutError(f"{text!r} has no value at any of {points * 5} trial points, so its layout is not proved")


def _trials(node: ast.expr, generator: random.Random) -> Iterator[dict[str, float]]:
    """Trial values of the symbols: small, large, and on both sides of the numbers of the expression."""
    names = tuple(dict.fromkeys(expression.names(without_units(node))))
    constants = [part.value for part in ast.walk(node) if isinstance(part, ast.Constant)]
    numbers = [float(value) for value in constants if isinstance(value, (int, float))]
    while True:
        yield {name: generator.uniform(0.05, 9.0) for name in names}
        yield {name: generator.uniform(0.05, 9.0) for name in names}
        yield {name: generator.choice((*numbers, 1.0)) * generator.uniform(0.5, 1.5) for name in names}
        yield {name: 10 ** generator.uniform(2.0, 5.0) for name in names}


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
            return ("slot", token_number(token))
        case ast.UnaryOp(operand=operand):
            inner = _arrange(operand)
            return ("neg", ("paren", inner) if inner[0] in ("add", "neg") else inner)
    return read_latex(_handcalcs(ast.unparse(node)))


_SIGN = {ast.Lt: "<", ast.LtE: "<=", ast.Gt: ">", ast.GtE: ">=", ast.Eq: "==", ast.NotEq: "!="}


def _chain(operands: list[Node], signs: list[str]) -> Node:
    node = ("rel", signs[0], operands[0], operands[1])
    for sign, operand in zip(signs[1:], operands[2:], strict=True):
        node = ("rel", sign, node, operand)
    return node


def _grouped(part: ast.expr, outer: ast.boolop) -> Node:
    inner = _arrange(part)
    return ("paren", inner) if isinstance(outer, ast.And) and isinstance(part, ast.BoolOp) else inner


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
    with warnings.catch_warnings():
        # handcalcs calls names of pyparsing that are due to go.
        warnings.simplefilter("ignore", DeprecationWarning)
        latex = LatexRenderer(f"zz = {text}", values, options).render(dict(global_config._config))
    parts = re.split(r"\\\\&=|&=", latex)
    if len(parts) != 4:
        raise LayoutError(f"{text!r} was not laid out as a calculation")
    return parts[2].strip()
