r"""The notation table: every symbol of ACI 318 that calcpack uses, with its meaning, dimension and typesetting.

Everything that names a symbol is made from this table. The typeset form is LaTeX of a small kind (letters, Greek,
``\ell``, primes, subscripts); it is turned into MathML, Typst, plain text and speech by `calcpack.typeset`.
Meanings follow the notation chapters of ACI 318-14 and 318-19 (chapter 2), in our words.
"""

from __future__ import annotations

import re
from dataclasses import dataclass

from calcpack.notation import ROWS
from calcpack.units import Dimension

__all__ = ["NOTATION", "Symbol", "is_known", "lookup", "typeset_name"]


@dataclass(frozen=True)
class Symbol:
    """A symbol: its name in code, typeset form, dimension, meaning, and the sign its values have."""

    name: str
    latex: str
    dimension: Dimension
    meaning: str
    sign: str = "positive"


NOTATION: dict[str, Symbol] = {row[0]: Symbol(*row) for row in ROWS}

_GREEK = frozenset(
    [
        "alpha",
        "beta",
        "gamma",
        "delta",
        "epsilon",
        "zeta",
        "eta",
        "theta",
        "kappa",
        "lambda",
        "mu",
        "nu",
        "xi",
        "rho",
        "sigma",
        "tau",
        "phi",
        "chi",
        "psi",
        "omega",
        "Gamma",
        "Delta",
        "Theta",
        "Lambda",
        "Xi",
        "Pi",
        "Sigma",
        "Phi",
        "Psi",
        "Omega",
    ]
)


def is_known(name: str) -> bool:
    """Whether the notation table holds the symbol."""
    return name in NOTATION


def lookup(name: str) -> Symbol:
    """The symbol of that name.

    Raises
    ------
    KeyError : the table does not hold it
    """
    return NOTATION[name]


def typeset_name(name: str) -> str:
    r"""LaTeX of a symbol: from the table, or made from the name (``w_u_max`` as ``w_{u,max}``, ``delta_s`` with Greek).

    An engineer's own formula may use any name; ``f_c_prime``-like spellings are not guessed at.
    """
    if name in NOTATION:
        return NOTATION[name].latex
    base, *subscripts = re.sub(r"(?<=\D)_?(\d+)$", r"_\1", name).split("_") if name[-1].isdigit() else name.split("_")
    # A length l is set as in the code book, where a plain l reads as a one.
    head = r"\ell" if base == "l" else _letter(base)
    if base in ("phi", "Phi") and len(subscripts) >= 2 and len(subscripts[0]) == 1 and subscripts[0].isupper():
        return rf"{head} {typeset_name('_'.join(subscripts))}"
    return f"{head}_{{{','.join(_letter(part) for part in subscripts if part)}}}" if any(subscripts) else head


def _letter(part: str) -> str:
    if part in _GREEK:
        return f"\\{part}"
    if part == "lamb":
        return r"\lambda"
    return r"\ell" if part == "ell" else part
