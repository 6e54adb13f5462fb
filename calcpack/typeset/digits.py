"""Numbers as printed: enough figures that a calculator fed with the printed line gives the printed result.

Common practice of three figures, four where the first is a one; a value that is short as it stands is printed
whole. A line that needs more figures shows more (`honest`).
"""

from __future__ import annotations

import re
from collections.abc import Callable, Sequence
from decimal import ROUND_HALF_EVEN, Decimal
from itertools import chain, repeat

__all__ = ["constant_text", "honest", "last_place", "number_text", "parse_number", "rounded", "stated_text"]

_EXACT = 4  # a result of at most so many significant digits is printed whole
_STATED = 6  # a given is printed as it was stated, up to so many
_MOST = 13
_SUPERSCRIPT = str.maketrans("0123456789-", "⁰¹²³⁴⁵⁶⁷⁸⁹⁻")
_PLAIN_DIGITS = str.maketrans("⁰¹²³⁴⁵⁶⁷⁸⁹⁻", "0123456789-")


def stated_text(value: float) -> str:
    """A given as printed: whole, where it was stated with no more than six figures."""
    return number_text(value, exact=_STATED)


def number_text(value: float, extra: int = 0, exact: int = _EXACT) -> str:
    """The value as printed, with `extra` figures beyond the usual; whole where it has no more than `exact` figures.

    Examples
    --------
    >>> number_text(33.0925), number_text(4000.0), number_text(1323.2417), number_text(8.4138e9)
    ('33.1', '4,000', '1,323', '8.41×10⁹')
    """
    clean = _clean(value)
    if clean.is_zero():
        return "0"
    if _figures(clean) <= exact and -4 <= clean.adjusted() < 8:
        return _plain(clean)
    return rounded(value, max(_usual(clean) + extra, clean.adjusted() + 1 if clean.adjusted() < 8 else 0))


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
    evaluate: Callable[[Sequence[float]], float], values: Sequence[float], result: float, first: Sequence[str] = ()
) -> tuple[tuple[str, ...], str]:
    """Texts for the values and the result of a line, such that the printed line gives the printed result.

    Parameters
    ----------
    evaluate : the line as a function of its values, in the units it is printed in
    values, result : unrounded, in those units
    first : texts to try before any others, such as those printed where the values were set

    Returns
    -------
    the texts of the values and of the result; the values carry more figures than usual where the line needs them
    """
    text = number_text(result)
    tolerance = last_place(text) * (1 + 1e-9)
    origin = tuple(first) or ("",) * len(values)
    attempts = (tuple(map(_more, values, origin, repeat(extra))) for extra in range(_MOST))
    for texts in chain([origin] if first else [], attempts):
        try:
            printed = evaluate([parse_number(value) for value in texts])
        except (ArithmeticError, ValueError):
            continue
        if abs(printed - parse_number(text)) <= tolerance:
            return texts, text
    return texts, text


def _more(value: float, first: str, extra: int) -> str:
    """The value with more figures; as it was first tried where that is the whole of it: 1.0 stays 1.0."""
    whole = first and _clean(parse_number(first)) == _clean(value)
    return first if whole else number_text(value, extra)


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
