"""A load combination as an equation: the line that is printed is the function that runs."""

from __future__ import annotations

import linecache
from collections.abc import Callable
from functools import cache
from typing import Annotated, Any

from calcpack.formula import Clause, Formula, formula
from calcpack.symbols import lookup
from calcpack.units import Dimension

__all__ = ["combination_formula"]


@cache
def combination_formula(
    terms: tuple[tuple[str, float], ...], result_symbol: str, dimension: Dimension, clause: Clause
) -> Formula:
    """The equation of a factored force: ``P_u = 1.2*P_D + 1.6*P_L``, a factor of 1.0 left out.

    Parameters
    ----------
    terms : each argument's symbol with its factor, in the order they are added; a symbol stands once
    result_symbol : what the equation gives, of the notation table
    dimension : of the arguments and of the result
    clause : where the combination stands
    """
    name = f"combined_{result_symbol}"
    text = _source(name, terms, result_symbol)
    # Reading a formula takes its source by the file name of its code, as it does for the cells of a notebook.
    file = f"<{name}: {_expression(terms)}>"
    linecache.cache[file] = (len(text), None, text.splitlines(keepends=True), file)
    scope: dict[str, Any] = {"Quantity": Annotated[float, dimension]}
    exec(compile(text, file, "exec", dont_inherit=True), scope)
    function: Callable[..., float] = scope[name]
    return formula(clause)(function)


def _source(name: str, terms: tuple[tuple[str, float], ...], result: str) -> str:
    arguments = ", ".join(f"{symbol}: Quantity" for symbol, _ in terms)
    meaning = lookup(result).meaning
    return (
        f"def {name}(*, {arguments}) -> Quantity:\n"
        f'    """{meaning[0].upper()}{meaning[1:]}."""\n'
        f"    {result} = {_expression(terms)}\n"
        f"    return {result}\n"
    )


def _expression(terms: tuple[tuple[str, float], ...]) -> str:
    if len(terms) == 1 and terms[0][1] < 0:
        # Bracketed, so that the sign stands before the product on the page.
        return f"-({_product(*terms[0])})"
    text = "".join(f" {'-' if factor < 0 else '+'} {_product(symbol, factor)}" for symbol, factor in terms)
    return text.removeprefix(" + ").strip()


def _product(symbol: str, factor: float) -> str:
    return symbol if abs(factor) == 1.0 else f"{abs(factor)!r}*{symbol}"
