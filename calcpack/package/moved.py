"""How a value that moved is printed: from, to, and the change in per cent."""

from __future__ import annotations

import re

from calcpack.errors import InputError
from calcpack.ledger import Entry
from calcpack.package.compare import Change
from calcpack.typeset.digits import last_place, parse_number, rounded
from calcpack.typeset.line import with_unit
from calcpack.units import convert

__all__ = ["from_to", "percent_text"]

_NUMBER = re.compile(r"^−?[\d,]*\.?\d+(?:×10[⁰¹²³⁴⁵⁶⁷⁸⁹⁻]+)?")


def percent_text(percent: float) -> str:
    """A change in per cent with its sign, to three figures."""
    return f"{'−' if percent < 0 else '+'}{rounded(abs(percent), 3)} %" if percent else "0 %"


def from_to(change: Change) -> tuple[str, str]:
    """Both values as printed; with more figures where those printed do not show that they differ."""
    before, after = change.old.shown, change.new.shown
    if not change.moved or not _alike(before, after):
        return before, after
    unit = _unit(after)
    values = [_in_unit(entry, unit) for entry in (change.old, change.new)]
    if None in values:
        unit, values = change.new.unit, [change.old.value, change.new.value]
    for figures in range(3, 17):
        before, after = (with_unit(rounded(float(value or 0.0), figures), unit) for value in values)
        if before != after:
            break
    return before, after


def _alike(before: str, after: str) -> bool:
    """Whether two printed values may be the same number, rounded to different figures."""
    if before == after:
        return True
    if _unit(before) != _unit(after) or not (_NUMBER.match(before) and _NUMBER.match(after)):
        return False
    return abs(parse_number(before) - parse_number(after)) < 0.4999 * max(last_place(before), last_place(after))


def _unit(shown: str) -> str:
    return _NUMBER.sub("", shown, count=1).strip()


def _in_unit(entry: Entry, unit: str) -> float | None:
    try:
        return convert(entry.value, unit)
    except InputError:
        return None
