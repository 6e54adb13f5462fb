"""A worked line as rows: symbols, then the same layout with its values, broken at operators where it is long."""

from __future__ import annotations

from collections.abc import Sequence
from dataclasses import dataclass
from functools import cache

from calcpack.typeset.digits import constant_text
from calcpack.typeset.emit import SPOKEN, Target, emit
from calcpack.typeset.layout import Layout
from calcpack.typeset.names import name_tree
from calcpack.typeset.tree import Node, children, rebuild

__all__ = ["COLUMN", "Printed", "condition_row", "equation", "spoken", "symbol_text", "width"]

COLUMN = 31.0  # width of the working column in em of the mathematics
_RESULT = 5.0


@dataclass(frozen=True)
class Printed:
    """What fills one slot of a substituted row: the text with its unit, and where it was set."""

    text: str
    link: str = ""
    sheet: str = ""


def with_symbols(layout: Layout) -> Node:
    """The tree with every slot filled by its symbol or number."""
    return _filled(layout.tree, [_symbol_node(slot.kind, slot.text, slot.unit) for slot in layout.slots], guard=True)


def with_values(layout: Layout, printed: Sequence[Printed]) -> Node:
    """The tree with every slot filled by a printed value; bases of powers and negative values get brackets."""
    return _filled(layout.tree, [("value", value.text, value.link, value.sheet) for value in printed], guard=True)


def _symbol_node(kind: str, text: str, unit: str) -> Node:
    if kind == "symbol":
        return name_tree(text)
    if kind == "const":
        return ("sym", "π", "", 0)
    if kind == "printed":
        return ("num", text)
    number = _constant(text)
    return ("value", f"{number} {unit}", "", "") if unit else ("num", number)


@cache
def _constant(text: str) -> str:
    return constant_text(float(text))


def _filled(node: Node, fills: Sequence[Node], guard: bool = False, inside: str = "") -> Node:
    if node[0] == "slot":
        fill = fills[node[1]]
        return ("paren", fill) if guard and _needs_bracket(fill, inside) else fill
    if node[0] == "pow":
        return ("pow", _filled(node[1], fills, guard, "base"), _filled(node[2], fills, guard))
    if node[0] in ("add", "mul", "neg"):
        parts = [_filled(part, fills, guard, "term") for part in children(node)]
        if (
            guard
            and parts[0][0] == "paren"
            and node[0] == "add"
            and children(node)[0][0] == "slot"
            and node[1][0][0] == "+"
        ):
            parts[0] = parts[0][1]
        return rebuild(node, tuple(parts))
    return rebuild(node, tuple(_filled(part, fills, guard) for part in children(node)))


def _needs_bracket(fill: Node, inside: str) -> bool:
    if fill[0] not in ("num", "value"):
        return (inside == "base" and fill[0] in ("seq", "frac", "add")) or (inside == "term" and fill[0] == "add")
    text = str(fill[1])
    if inside == "base":
        return text.startswith("−") or " " in text or "×" in text
    return inside == "term" and text.startswith("−")


def equation(symbol: str, layout: Layout, printed: Sequence[Printed], target: Target) -> list[tuple[str, str]]:
    """The rows of a worked line as (left, right) pairs, aligned at the sign that opens the right part.

    A line whose right side holds no symbol is one row; a short one stands in one row with its substitution.
    """
    left, values = name_tree(symbol), with_values(layout, printed)
    if all(slot.kind != "symbol" for slot in layout.slots):
        return _written(left, [("=", with_symbols(layout), False)], target)
    symbols = with_symbols(layout)
    # The result in the unit of the line may follow in the same row.
    if width(left) + width(symbols) + width(values) + 3 <= COLUMN - _RESULT:
        return [(emit(left, target), f"{_head('=', symbols, target)}{_head('=', values, target, True)}")]
    limit = COLUMN - width(left) - 1
    rows = [("=" if not index else "", part, False) for index, part in enumerate(broken(symbols, limit))]
    rows += [("=" if not index else "", part, True) for index, part in enumerate(broken(values, limit))]
    return _written(left, rows, target)


def _written(left: Node, rows: Sequence[tuple[str, Node, bool]], target: Target) -> list[tuple[str, str]]:
    return [
        (emit(left, target) if not index else "", _head(sign, node, target, values))
        for index, (sign, node, values) in enumerate(rows)
    ]


def _head(sign: str, node: Node, target: Target, values: bool = False) -> str:
    body = emit(node, target, values)
    return f"{target.operator(sign)} {body} " if sign else body


def condition_row(layout: Layout, printed: Sequence[Printed], target: Target) -> tuple[str, str]:
    """A condition in symbols, and the same with its values."""
    return emit(with_symbols(layout), target), emit(with_values(layout, printed), target, values=True)


def symbol_text(symbol: str, target: Target) -> str:
    """A symbol alone."""
    return emit(name_tree(symbol), target)


def spoken(symbol: str, layout: Layout, printed: Sequence[Printed], result: str) -> str:
    """A worked line in words, the text alternative of its equation."""
    parts = [emit(name_tree(symbol), SPOKEN), emit(with_symbols(layout), SPOKEN)]
    if any(slot.kind == "symbol" for slot in layout.slots):
        parts.append(emit(with_values(layout, printed), SPOKEN, values=True))
    return " equals ".join([*parts, result] if result != parts[-1] else parts)


def broken(node: Node, limit: float) -> list[Node]:
    """A row as several, broken before operators at the top level, none wider than `limit` where that can be had."""
    if width(node) <= limit or node[0] not in ("add", "mul"):
        return [node]
    rows: list[Node] = []
    if node[0] == "add":
        for terms in _packed([(term, width(term[1]) + 1.2) for term in node[1]], limit):
            sign = "+" if terms[0][0] == "+" else "−"
            rest = (("+", terms[0][1]), *terms[1:])
            body = ("add", rest) if len(rest) > 1 else rest[0][1]
            rows.append(
                ("next", sign, body) if rows else (("add", tuple(terms)) if len(terms) > 1 or sign != "+" else body)
            )
        return rows
    for factors in _packed([(factor, width(factor) + 0.8) for factor in node[1]], limit):
        body = ("mul", tuple(factors)) if len(factors) > 1 else factors[0]
        rows.append(("next", "·", body) if rows else body)
    return rows


def _packed(items: Sequence[tuple[Node, float]], limit: float) -> list[list[Node]]:
    lines: list[list[Node]] = [[]]
    used = 0.0
    for item, size in items:
        if lines[-1] and used + size > limit:
            lines.append([])
            used = 0.0
        lines[-1].append(item)
        used += size
    return lines


def width(node: Node) -> float:
    """A rough width in em."""
    match node:
        case ("num", text):
            return 0.48 * len(str(text))
        case ("value", text, _, sheet):
            return 0.48 * len(str(text)) + 0.3 * len(str(sheet))
        case ("sym", base, subscript, primes):
            return 0.62 * len(str(base)) + 0.36 * len(str(subscript)) + 0.2 * int(primes)
        case ("frac", above, below):
            return max(width(above), width(below)) + 0.3
        case ("pow", base, exponent):
            return width(base) + 0.7 * width(exponent)
        case ("call", name, arguments):
            return 0.5 * len(name) + 0.8 + sum(width(argument) + 0.6 for argument in arguments)
        case ("add" | "mul" | "and" | "or" | "rel", *_):
            parts = children(node)
            return sum(width(part) for part in parts) + (len(parts) - 1) * (1.2 if node[0] != "mul" else 0.7)
    return 0.9 + sum(width(part) for part in children(node))
