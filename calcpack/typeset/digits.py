"""Numbers as printed: enough figures that a calculator fed with the printed line gives the printed result.

Common practice of three figures, four where the first is a one; a value that is short as it stands is printed
whole. A line that needs more figures shows more (`honest`).
"""

from __future__ import annotations

import re
from collections.abc import Callable, Sequence
from decimal import ROUND_HALF_EVEN, Decimal

__all__ = ["constant_text", "honest", "last_place", "number_text", "parse_number", "rounded"]

_EXACT = 6  # a value of at most so many significant digits is printed whole
_MOST = 13
_SUPERSCRIPT = str.maketrans("0123456789-", "⁰¹²³⁴⁵⁶⁷⁸⁹⁻")
_PLAIN_DIGITS = str.maketrans("⁰¹²³⁴⁵⁶⁷⁸⁹⁻", "0123456789-")


def number_text(value: float, extra: int = 0) -> str:
    """The value as printed, with `extra` figures beyond the usual; a short value is printed whole.

    Examples
    --------
    >>> number_text(33.0925), number_text(4000.0), number_text(1323.2417), number_text(8.4138e9)
    ('33.1', '4,000', '1,323', '8.41×10⁹')
    """
    exact = _clean(value)
    if exact.is_zero():
        return "0"
    if _figures(exact) <= _EXACT and -4 <= exact.adjusted() < 8:
        return _plain(exact)
    return rounded(value, max(_usual(exact) + extra, exact.adjusted() + 1 if exact.adjusted() < 8 else 0))


def constant_text(value: float) -> str:
    """A constant of a line, printed whole."""
    return rounded(value, max(1, _figures(_clean(value))))


def rounded(value: float, figures: int) -> str:
    """The value rounded to so many significant figures; in powers of ten where it is far from 1."""
    exact = _clean(value)
    if exact.is_zero():
        return "0"
    short = _round(exact, figures)
    if -4 <= short.adjusted() < 8:
        return _plain(short)
    power = short.adjusted()
    return f"{_plain(short.scaleb(-power))}×10{str(power).translate(_SUPERSCRIPT)}"


def parse_number(text: str) -> float:
    """The number that a printed text stands for; a unit after it is left aside.

    Raises
    ------
    ValueError : the text does not begin with a printed number
    """
    match = re.match(r"(−?)([\d,]*\.?\d+)(?:×10([⁰¹²³⁴⁵⁶⁷⁸⁹⁻]+))?", text)
    if match is None:
        raise ValueError(f"no printed number: {text!r}")
    power = int(match[3].translate(_PLAIN_DIGITS)) if match[3] else 0
    size = float(Decimal(match[2].replace(",", "")).scaleb(power))
    return -size if match[1] else size


def last_place(text: str) -> float:
    """The size of one unit in the last printed digit."""
    match = re.match(r"−?([\d,]*)(?:\.(\d+))?(?:×10([⁰¹²³⁴⁵⁶⁷⁸⁹⁻]+))?", text)
    assert match is not None
    power = int(match[3].translate(_PLAIN_DIGITS)) if match[3] else 0
    return float(Decimal(1).scaleb(power - len(match[2] or "")))


def honest(
    evaluate: Callable[[Sequence[float]], float], values: Sequence[float], result: float
) -> tuple[tuple[str, ...], str]:
    """Texts for the values and the result of a line, such that the printed line gives the printed result.

    Parameters
    ----------
    evaluate : the line as a function of its values, in the units it is printed in
    values, result : unrounded, in those units

    Returns
    -------
    the texts of the values and of the result; the values carry more figures than usual where the line needs them
    """
    text = number_text(result)
    tolerance = last_place(text) * (1 + 1e-9)
    for extra in range(_MOST):
        texts = tuple(number_text(value, extra) for value in values)
        try:
            printed = evaluate([parse_number(value) for value in texts])
        except (ArithmeticError, ValueError):
            continue
        if abs(printed - parse_number(text)) <= tolerance:
            return texts, text
    return texts, text


def _clean(value: float) -> Decimal:
    # Twelve figures clear the noise of binary arithmetic: 0.1 + 0.2 is 0.3 on paper.
    return Decimal(f"{value:.12g}").normalize()


def _figures(value: Decimal) -> int:
    return len(value.as_tuple().digits)


def _usual(value: Decimal) -> int:
    return 4 if value.as_tuple().digits[0] == 1 else 3


def _round(value: Decimal, figures: int) -> Decimal:
    return value.quantize(Decimal(1).scaleb(value.adjusted() - figures + 1), rounding=ROUND_HALF_EVEN)


def _plain(value: Decimal) -> str:
    places = max(0, -int(value.as_tuple().exponent))
    text = f"{abs(value):,.{places}f}"
    return f"−{text}" if value < 0 else text
