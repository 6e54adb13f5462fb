"""Trees as LaTeX, MathML, Typst, plain text and speech: the grammar, which asks a target for each part."""

from __future__ import annotations

from itertools import pairwise
from typing import Protocol

from calcpack.typeset.targets import LATEX, MATHML, PLAIN, SPOKEN, TARGETS, TYPST
from calcpack.typeset.tree import Node

__all__ = ["LATEX", "MATHML", "PLAIN", "SPOKEN", "TARGETS", "TYPST", "Target", "emit"]

_RELATIONS = {"<=": "≤", ">=": "≥", "<": "<", ">": ">", "==": "=", "!=": "≠", "=": "="}


class Target(Protocol):
    """How one kind of document writes the parts of an expression."""

    name: str

    def number(self, text: str) -> str:
        """A number."""

    def value(self, text: str, link: str, sheet: str) -> str:
        """A substituted value, linked to the entry where it was set; `sheet` names another sheet it comes from."""

    def symbol(self, base: str, subscript: str, primes: int) -> str:
        """A symbol with its subscript and primes."""

    def sequence(self, parts: list[str]) -> str:
        """Parts side by side."""

    def fraction(self, above: str, below: str) -> str:
        """A quotient."""

    def root(self, inner: str) -> str:
        """A square root."""

    def power(self, base: str, exponent: str) -> str:
        """A power."""

    def bracket(self, inner: str) -> str:
        """Round brackets."""

    def function(self, name: str, arguments: list[str]) -> str:
        """A function of arguments."""

    def operator(self, sign: str) -> str:
        """An operator or relation."""

    def continued(self, sign: str) -> str:
        """An operator that opens a row and belongs to the row before."""

    def word(self, text: str) -> str:
        """A word between conditions."""


def emit(node: Node, target: Target, values: bool = False) -> str:
    """The expression in the language of a target. With `values`, products get a visible dot throughout."""
    match node:
        case ("num", text):
            return target.number(str(text))
        case ("value", text, link, sheet):
            return target.value(text, link, sheet)
        case ("sym", base, subscript, primes):
            return target.symbol(base, subscript, primes)
        case ("seq", parts):
            return target.sequence([emit(part, target, values) for part in parts])
        case ("neg", inner):
            return target.sequence([target.operator("−"), emit(inner, target, values)])
        case ("add", terms):
            return _sum(terms, target, values)
        case ("mul", factors):
            return _product(factors, target, values)
        case ("frac", above, below):
            return target.fraction(emit(above, target, values), emit(below, target, values))
        case ("sqrt", inner):
            return target.root(emit(inner, target, values))
        case ("pow", base, exponent):
            return target.power(emit(base, target, values), emit(exponent, target, values))
        case ("paren", inner):
            return target.bracket(emit(inner, target, values))
        case ("call", name, arguments):
            return target.function(name, [emit(argument, target, values) for argument in arguments])
        case ("rel", sign, left, right):
            parts = [emit(left, target, values), target.operator(_RELATIONS[sign]), emit(right, target, values)]
            return target.sequence(parts)
        case ("and" | "or" as word, parts):
            written = [emit(part, target, values) for part in parts]
            joined = [written[0]]
            for part in written[1:]:
                joined += [target.word(word), part]
            return target.sequence(joined)
        case ("next", sign, inner):
            return target.sequence([target.continued(sign), emit(inner, target, values)])
    raise ValueError(f"no such node: {node[0]}")


def _sum(terms: tuple[tuple[str, Node], ...], target: Target, values: bool) -> str:
    parts = []
    for index, (sign, term) in enumerate(terms):
        if index or sign == "-":
            parts.append(target.operator("+" if sign == "+" else "−"))
        parts.append(emit(term, target, values))
    return target.sequence(parts)


def _product(factors: tuple[Node, ...], target: Target, values: bool) -> str:
    parts = [emit(factors[0], target, values)]
    for left, right in pairwise(factors):
        parts += [target.operator("·" if values or _dotted(left, right) else "juxtaposed"), emit(right, target, values)]
    return target.sequence(parts)


def _dotted(left: Node, right: Node) -> bool:
    # Symbols stand side by side, as in the code book; quotients and numbers are kept apart by a dot.
    return left[0] in ("frac", "call") or right[0] in ("frac", "num", "call")
