"""Reads the LaTeX that handcalcs writes for a calculation over neutral tokens."""

from __future__ import annotations

import re
from collections.abc import Iterator

from calcpack import expression
from calcpack.errors import LayoutError
from calcpack.typeset.tree import Node

__all__ = ["read_latex", "token_name", "token_number"]


def token_name(index: int) -> str:
    """A neutral name for the symbol or number of that index."""
    letters = ""
    index += 1
    while index:
        index, rest = divmod(index - 1, 26)
        letters = chr(97 + rest) + letters
    return f"q{letters}q"


def token_number(token: str) -> int:
    """The index of a neutral name."""
    index = 0
    for letter in token[1:-1]:
        index = index * 26 + ord(letter) - 96
    return index - 1


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
        """The next token."""
        return self.tokens[self.at][1] if self.at < len(self.tokens) else ""

    def take(self, *expected: str) -> tuple[str, str]:
        """Take the next token, one of those expected."""
        if self.at >= len(self.tokens) or (expected and self.peek() not in expected):
            raise LayoutError(f"cannot read the layout {self.text!r}: found {self.peek()!r}, not {expected}")
        self.at += 1
        return self.tokens[self.at - 1]

    def sum(self) -> Node:
        """Read terms."""
        terms = [("-" if self.peek() == "-" and self.take() else "+", self.product())]
        while self.peek() in ("+", "-"):
            terms.append((self.take()[1], self.product()))
        if len(terms) == 1:
            return terms[0][1] if terms[0][0] == "+" else ("neg", terms[0][1])
        return ("add", tuple(terms))

    def product(self) -> Node:
        """Read factors."""
        factors = [self.power()]
        while self.peek() == r"\cdot":
            self.take()
            factors.append(self.power())
        return factors[0] if len(factors) == 1 else ("mul", tuple(factors))

    def power(self) -> Node:
        """Read a base and its exponent."""
        base = self.atom()
        if self.peek() == "^":
            self.take()
            return ("pow", base, self.group())
        return base

    def group(self) -> Node:
        """Read a group in braces."""
        self.take("{")
        inner = self.sum()
        self.take("}")
        return inner

    def bracket(self) -> tuple[Node, ...]:
        """Read arguments in brackets."""
        self.take("(")
        parts = [self.sum()]
        while self.peek() == ",":
            self.take()
            parts.append(self.sum())
        self.take(")")
        return tuple(parts)

    def atom(self) -> Node:
        """Read a value, a quotient, a root, brackets or a function."""
        kind, text = self.take()
        if kind == "slot":
            return ("slot", token_number(text))
        if kind == "num":
            return ("num", text)
        if text == r"\frac":
            return ("frac", self.group(), self.group())
        if text == r"\sqrt":
            return ("sqrt", self.group())
        if text in (r"\lceil", r"\lfloor"):
            inner = self.sum()
            self.take(text.replace("\\l", "\\r"))
            return ("call", text[2:], (inner,))
        if text == "(":
            self.at -= 1
            return ("paren", *self.bracket())
        name, arguments = self.function(kind, text), self.bracket()
        return ("call", "atan2" if name == "atan" and len(arguments) == 2 else name, arguments)

    def function(self, kind: str, text: str) -> str:
        """Read the name of a function."""
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
        """Read the digits below a logarithm."""
        if self.peek() == "{":
            self.take()
            digits = self.take()[1]
            self.take("}")
            return digits
        return self.take()[1]


def read_latex(latex: str) -> Node:
    """The tree of a laid-out expression.

    Raises
    ------
    LayoutError : anything that is not arithmetic over tokens
    """
    reader = _Latex(latex)
    tree = reader.sum()
    if reader.at != len(reader.tokens):
        raise LayoutError(f"cannot read the layout {latex!r}: {reader.peek()!r} is left over")
    return tree
