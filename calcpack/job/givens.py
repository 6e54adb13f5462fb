"""inputs/givens.toml: values with no table of their own, each with what it means and where it comes from."""

from __future__ import annotations

from dataclasses import dataclass
from pathlib import Path

from calcpack.errors import UnitError
from calcpack.job.toml import Place, TomlFile
from calcpack.job.wording import shown
from calcpack.units import RATIO, Measured, read

__all__ = ["STATUSES", "GivenValue", "read_givens"]

STATUSES = ("confirmed", "assumed")
_FILE = "inputs/givens.toml"


@dataclass(frozen=True)
class GivenValue:
    """A value that somebody gave.

    Attributes
    ----------
    symbol : its name in formulas
    value : number, dimension and unit
    text : the value as written
    means, source : what it is, and the document it stands in
    status : ``confirmed``, or ``assumed``: an open item until confirmed
    entry, file : the number of its entry, from 1, and the file that holds it
    """

    symbol: str
    value: Measured
    text: str
    means: str
    source: str
    status: str
    entry: int
    file: str = _FILE

    @property
    def where(self) -> str:
        """The place of the entry: ``inputs/givens.toml, entry 3``."""
        return f"{self.file}, entry {self.entry}"


def read_givens(root: Path) -> tuple[GivenValue, ...]:
    """The given values of the job folder `root`, in file order; none where there is no givens.toml.

    Raises
    ------
    TableError : everything that is wrong in the file, each with the number of its entry
    """
    path = root / _FILE
    if not path.exists():
        return ()
    file = TomlFile(path, _FILE)
    file.top.only("given")
    found: list[GivenValue] = []
    for number, place in enumerate(file.top.entries("given"), 1):
        place.only("symbol", "value", "means", "source", "status")
        symbol = _symbol(place, found)
        value, text = _value(place)
        texts = place.text("means"), place.text("source"), place.choice("status", STATUSES)
        found.append(GivenValue(symbol, value, text, *texts, number))
    file.finish()
    return tuple(found)


def _symbol(place: Place, found: list[GivenValue]) -> str:
    symbol = place.text("symbol")
    if symbol and not symbol.isidentifier():
        place.report("symbol", f"symbol = {shown(symbol)}", "letters, digits and _, e.g. 'q_allow'")
    for earlier in found:
        if symbol and earlier.symbol == symbol:
            place.report("symbol", f"symbol = {symbol!r}", "a symbol given once", f"entry {earlier.entry} has it")
            break
    return symbol


def _value(place: Place) -> tuple[Measured, str]:
    nothing = Measured(0.0, RATIO, "", 0.0)
    written = place.value("value", "a number with its unit, e.g. '4.0 kip/ft^2'")
    if written is None:
        return nothing, ""
    text = place.checked("value", written) if not _is_number(written) else str(written)
    if not text:
        return nothing, ""
    try:
        return read(text, None, "value"), text
    except UnitError as error:
        for problem in error.problems:
            place.report("value", problem.given, problem.allowed, problem.remedy)
    return nothing, text


def _is_number(value: object) -> bool:
    return isinstance(value, (int, float)) and not isinstance(value, bool)
