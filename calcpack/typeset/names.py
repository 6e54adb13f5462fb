r"""Symbols as trees: the LaTeX of the notation table read once, for every target.

Nodes beside those of `tree`: ``("sym", base, subscript, primes)`` and ``("seq", (x, …))`` for symbols side by side.
"""

from __future__ import annotations

import re
from functools import cache

from calcpack import symbols
from calcpack.errors import LayoutError
from calcpack.typeset.tree import Node

__all__ = ["GREEK", "name_tree", "read_symbol"]

GREEK = {
    "alpha": "α", "beta": "β", "gamma": "γ", "delta": "δ", "epsilon": "ε", "zeta": "ζ", "eta": "η", "theta": "θ",
    "kappa": "κ", "lambda": "λ", "mu": "μ", "nu": "ν", "xi": "ξ", "rho": "ρ", "sigma": "σ", "tau": "τ", "phi": "φ",
    "chi": "χ", "psi": "ψ", "omega": "ω", "Gamma": "Γ", "Delta": "Δ", "Theta": "Θ", "Lambda": "Λ", "Xi": "Ξ",
    "Pi": "Π", "Sigma": "Σ", "Phi": "Φ", "Psi": "Ψ", "Omega": "Ω", "ell": "ℓ", "pi": "π",
}  # fmt: skip

_TOKEN = re.compile(r"\\([A-Za-z]+)|([A-Za-z]+|\d+)|([_{}'+,])")


@cache
def name_tree(name: str) -> Node:
    """The tree of a symbol by its name in code."""
    return read_symbol(symbols.typeset_name(name))


@cache
def read_symbol(latex: str) -> Node:
    """The tree of a symbol written in the small LaTeX of the notation table.

    Raises
    ------
    LayoutError : something else than letters, Greek, primes, subscripts, ``\\frac`` and ``\\sqrt``
    """
    tokens = _TOKEN.findall(latex)
    if "".join(f"\\{command}" if command else word or sign for command, word, sign in tokens) != latex.replace(" ", ""):
        raise LayoutError(f"cannot set the symbol {latex!r}")
    node, rest = _sequence([(f"\\{command}" if command else word or sign) for command, word, sign in tokens])
    if rest:
        raise LayoutError(f"cannot set the symbol {latex!r}")
    return node


def _sequence(tokens: list[str]) -> tuple[Node, list[str]]:
    terms: list[Node] = []
    items: list[Node] = []
    while tokens and tokens[0] != "}":
        if tokens[0] == "+":
            terms.append(_joined(items))
            items, tokens = [], tokens[1:]
            continue
        item, tokens = _atom(tokens)
        items.append(item)
    terms.append(_joined(items))
    return (terms[0] if len(terms) == 1 else ("add", tuple(("+", term) for term in terms))), tokens


def _joined(items: list[Node]) -> Node:
    return items[0] if len(items) == 1 else ("seq", tuple(items))


def _group(tokens: list[str]) -> tuple[Node, list[str]]:
    if not tokens or tokens[0] != "{":
        raise LayoutError(f"cannot set a symbol: expected a group before {tokens}")
    node, rest = _sequence(tokens[1:])
    return node, rest[1:]


def _atom(tokens: list[str]) -> tuple[Node, list[str]]:
    head, rest = tokens[0], tokens[1:]
    if head == r"\frac":
        above, rest = _group(rest)
        below, rest = _group(rest)
        return ("frac", above, below), rest
    if head == r"\sqrt":
        inner, rest = _group(rest)
        return ("sqrt", inner), rest
    base = GREEK.get(head[1:], "") if head.startswith("\\") else head
    if not base or not base[0].isalnum():
        raise LayoutError(f"cannot set a symbol: {head!r}")
    primes, subscript = 0, ""
    while rest and rest[0] in ("'", "_"):
        if rest[0] == "'":
            primes, rest = primes + 1, rest[1:]
        else:
            subscript, rest = _subscript(rest[1:])
    return ("sym", base, subscript, primes), rest


def _subscript(tokens: list[str]) -> tuple[str, list[str]]:
    if tokens[0] != "{":
        return _letters(tokens[0]), tokens[1:]
    end = tokens.index("}")
    return "".join(_letters(token) for token in tokens[1:end]), tokens[end + 1 :]


def _letters(token: str) -> str:
    return GREEK[token[1:]] if token.startswith("\\") else token
