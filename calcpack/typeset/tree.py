"""The layout of a line as a tree of plain tuples, so that it can be kept as JSON.

Nodes: ``("slot", i)``, ``("num", text)``, ``("neg", x)``, ``("add", ((sign, x), …))``, ``("mul", (x, …))``,
``("frac", a, b)``, ``("pow", base, exponent)``, ``("sqrt", x)``, ``("paren", x)``, ``("call", name, (x, …))``,
``("rel", op, a, b)``, ``("and", (x, …))``, ``("or", (x, …))``, and ``("next", op, x)`` for a row that goes on with an
operator.
"""

from __future__ import annotations

from collections.abc import Iterator
from typing import Any, TypeAlias

__all__ = ["Node", "freeze", "infix", "simplify", "slots"]

Node: TypeAlias = tuple[Any, ...]


def freeze(data: Any) -> Any:
    """Lists read from JSON as the tuples that were written."""
    return tuple(freeze(item) for item in data) if isinstance(data, (list, tuple)) else data


def children(node: Node) -> tuple[Node, ...]:
    """The nodes directly below a node."""
    match node[0]:
        case "slot" | "num" | "sym" | "value":
            return ()
        case "seq":
            return tuple(node[1])
        case "add":
            return tuple(term for _, term in node[1])
        case "mul" | "and" | "or":
            return tuple(node[1])
        case "call":
            return tuple(node[2])
        case "rel":
            return node[2], node[3]
        case "next":
            return (node[2],)
    return tuple(node[1:])


def rebuild(node: Node, parts: tuple[Node, ...]) -> Node:
    """The same node over other children."""
    match node[0]:
        case "slot" | "num" | "sym" | "value":
            return node
        case "add":
            return ("add", tuple((sign, part) for (sign, _), part in zip(node[1], parts, strict=True)))
        case "mul" | "and" | "or" | "seq":
            return (node[0], parts)
        case "call":
            return ("call", node[1], parts)
        case "rel" | "next":
            return (*node[:2], *parts)
    return (node[0], *parts)


def slots(node: Node) -> Iterator[int]:
    """Numbers of the slots of a tree, in reading order."""
    if node[0] == "slot":
        yield node[1]
    for child in children(node):
        yield from slots(child)


def infix(node: Node) -> str:
    """The tree as it reads on the page, as Python text: brackets only where the page shows them or a bar groups.

    Evaluating this text tests that the *printed* line means what it should, missing brackets included.
    Slot ``i`` is written ``_i``.
    """
    match node:
        case ("slot", index):
            return f"_{index}"
        case ("num", text):
            return str(text)
        case ("neg", inner):
            return f"-{infix(inner)}"
        case ("add", terms):
            text = "".join(f"{sign}{infix(term)}" for sign, term in terms)
            return text.removeprefix("+")
        case ("mul", factors):
            return "*".join(infix(factor) for factor in factors)
        case ("frac", above, below):
            return f"(({infix(above)})/({infix(below)}))"
        case ("pow", base, exponent):
            return f"{infix(base)}**({infix(exponent)})"
        case ("sqrt" | "paren", inner):
            return f"{'sqrt' if node[0] == 'sqrt' else ''}({infix(inner)})"
        case ("call", name, arguments):
            return f"{name}({','.join(infix(argument) for argument in arguments)})"
        case ("rel", operator, left, right):
            return f"{infix(left)}{operator}{infix(right)}"
        case ("and" | "or", parts):
            return f" {node[0]} ".join(infix(part) for part in parts)
    raise ValueError(f"no such node: {node[0]}")


def simplify(node: Node) -> Node:
    """Take out the brackets that the page does not need, and gather quotients of quotients into one."""
    node = rebuild(node, tuple(simplify(child) for child in children(node)))
    match node:
        case ("paren", ("paren", _) | ("slot", _) | ("num", _) | ("call", _, _) | ("sqrt", _) as inner):
            return tuple(inner)
        case ("frac", above, below):
            return ("frac", _bare(above), _bare(below))
        case ("sqrt", inner):
            return ("sqrt", _bare(inner))
        case ("pow", base, exponent):
            return ("pow", base, _bare(exponent))
        case ("call", name, arguments):
            return ("call", name, tuple(_bare(argument) for argument in arguments))
        case ("mul", factors):
            return _gather(
                tuple(
                    _bare(factor) if factor[0] == "paren" and factor[1][0] == "frac" else factor for factor in factors
                )
            )
        case ("add", ((sign, ("mul", (("paren", ("neg", inner)), *rest))), *others)) if sign == "+":
            return ("add", (("-", ("mul", (inner, *rest)) if rest else inner), *others))
        case ("add", ((sign, ("paren", ("neg", inner))), *others)) if sign == "+" and inner[0] != "add":
            return ("add", (("-", inner), *others))
    return node


def _bare(node: Node) -> Node:
    return tuple(node[1]) if node[0] == "paren" else node


def _gather(factors: tuple[Node, ...]) -> Node:
    """``a/b · 1/c`` becomes ``a/(b c)``."""
    gathered: list[Node] = []
    for factor in factors:
        if factor[0] == "frac" and factor[1] == ("num", "1") and gathered and gathered[-1][0] == "frac":
            _, above, below = gathered.pop()
            gathered.append(("frac", above, ("mul", (*_factors(below), *_factors(factor[2])))))
        else:
            gathered.append(factor)
    return gathered[0] if len(gathered) == 1 else ("mul", tuple(gathered))


def _factors(node: Node) -> tuple[Node, ...]:
    if node[0] == "mul":
        return tuple(node[1])
    return (("paren", node),) if node[0] in ("add", "neg") else (node,)
