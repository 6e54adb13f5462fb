"""A value of the ledger as a notebook author holds it, and how values are shown."""

from __future__ import annotations

from dataclasses import dataclass
from typing import NoReturn

from calcpack import notebook
from calcpack.errors import Problem, SheetError
from calcpack.ledger import Entry, passes
from calcpack.typeset.digits import stated_text
from calcpack.typeset.line import with_unit
from calcpack.units import RATIO, Dimension, convert, display_unit

__all__ = ["Value", "ratio_text", "shown_text"]


@dataclass(frozen=True)
class Value:
    """A value of the ledger, to hand to formulas, verdicts, notes and tables."""

    entry: Entry
    dimension: Dimension
    sheet: str

    def __float__(self) -> float:
        return float(self.entry.value)

    def __str__(self) -> str:
        return f"{self.entry.symbol} = {self.entry.shown}"

    def _ipython_display_(self) -> None:
        """Nothing: the value was shown when it was made."""

    def _refuse(self, _: object = None) -> NoReturn:
        raise SheetError(
            f"{self.entry.symbol}: arithmetic between values would not stand on the page",
            [
                Problem(
                    "value + value", "a formula", "write a small @formula and sheet.work(...) it; float(value) reads it"
                )
            ],
            notebook.cell_name(),
        )

    __add__ = __radd__ = __sub__ = __rsub__ = __mul__ = __rmul__ = __truediv__ = __rtruediv__ = _refuse
    __pow__ = __rpow__ = __floordiv__ = __rfloordiv__ = __mod__ = __rmod__ = _refuse
    __neg__ = __pos__ = __abs__ = __round__ = __lt__ = __le__ = __gt__ = __ge__ = _refuse


def shown_text(value: float, dimension: Dimension, unit: str = "") -> str:
    """A given, from its coherent value, as shown in `unit` or in the display unit of its dimension."""
    unit = unit or display_unit(dimension)
    number = stated_text(convert(value, unit))
    return with_unit(f"{number}.0" if dimension == RATIO and len(number) == 1 else number, unit)


def ratio_text(ratio: float) -> str:
    """A ratio with two decimals, more where two would hide that it exceeds 1."""
    for places in (2, 3, 4, 5, 6):
        text = f"{ratio:.{places}f}"
        if passes(ratio) or float(text) > 1.0:
            return text
    return f"{ratio:.9f}"
