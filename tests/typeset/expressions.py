"""Random expressions of the language, of a kind an engineer writes."""

from __future__ import annotations

import random

SYMBOLS = ("a", "b", "c", "d", "h", "s")
_NUMBERS = ("2", "3", "0.5", "1.7", "0.85", "40", "12", "1", "4")


def random_expression(source: random.Random, depth: int = 4) -> str:
    """An expression of the language, of a kind an engineer writes."""
    if depth == 0 or source.random() < 0.12:
        return source.choice(SYMBOLS) if source.random() < 0.75 else source.choice(_NUMBERS)
    inner = [random_expression(source, depth - 1) for _ in range(2)]
    kind = source.random()
    if kind < 0.55:
        left, right = (f"({part})" if source.random() < 0.5 else part for part in inner)
        return f"{left} {source.choice('+-*/*/')} {right}"
    if kind < 0.65:
        return f"({inner[0]})**{source.choice(['2', '3', '0.5', '(1/3)', '1.5', '(-1)'])}"
    if kind < 0.72:
        return f"-({inner[0]})" if source.random() < 0.5 else f"-{source.choice(SYMBOLS)}"
    if kind < 0.82:
        return f"sqrt({inner[0]})"
    if kind < 0.92:
        return f"{source.choice(['min', 'max', 'hypot'])}({inner[0]}, {inner[1]})"
    return f"{source.choice(['abs', 'sin', 'cos', 'atan', 'exp', 'ceil', 'floor'])}({inner[0]})"
