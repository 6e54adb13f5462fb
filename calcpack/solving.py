"""Values found by iteration, and the worked values by which a hand confirms them."""

from __future__ import annotations

from collections.abc import Sequence

from calcpack import symbols
from calcpack.book import SheetBook
from calcpack.errors import InputError, Problem, SheetError
from calcpack.ledger import Entry
from calcpack.typeset.digits import rounded
from calcpack.typeset.line import with_unit
from calcpack.units import Measured, coherent_unit, convert, display_unit, read
from calcpack.value import Value

__all__ = ["Solving"]

_VANISHES = 1e-6


class Solving(SheetBook):
    """What a sheet states of iterative results; `calcpack.sheet.Sheet` adds what an author writes line by line."""

    def solved(
        self, symbol: str, value: object, means: str, *, method: str, clause: str, solved_from: Sequence[Value]
    ) -> Value:
        """A value found by iteration from others; `confirm` then names what confirms it.

        Parameters
        ----------
        symbol, value, means : as of a given
        method : how it was found, in words
        clause : the assumptions it rests on
        solved_from : the values of the ledger that it was found from

        Raises
        ------
        SheetError : no method, or nothing that it was found from
        """
        loose = ", ".join(repr(item) for item in solved_from if not isinstance(item, Value))
        if not method.strip() or not solved_from or loose:
            found = f"{symbol}: method {method!r}, solved from {loose or len(solved_from)}"
            problem = Problem(found, "a method, and the values of the ledger that it was found from", "")
            raise SheetError("solved value", [problem], self._place())
        return self._set_solved(symbol, self._measured(symbol, value), means, method, clause, solved_from)

    def _set_solved(
        self,
        symbol: str,
        measured: Measured,
        means: str,
        method: str,
        clause: str,
        solved_from: Sequence[Value],
        edition: str = "",
    ) -> Value:
        self._begin()
        identifier = self._free_ids([symbol])[0]
        shown = _many_figures(measured)
        origin = tuple(dict.fromkeys(item.entry.id for item in solved_from))
        entry = Entry(
            identifier, "solved", symbol, means, measured.value, coherent_unit(measured.dimension), shown, self.id,
            clause=clause, edition=edition, method=method, solved_from=origin,
        )  # fmt: skip
        kept = self._keep(entry, measured.dimension)
        self._show(
            "given", [entry], id=identifier, symbol=symbol, means=means, shown=shown,
            source=f"{method}; confirmed below", status="confirmed",
        )  # fmt: skip
        return kept

    def confirm(self, solved: Sequence[Value], by: Sequence[Value]) -> None:
        """Name the differences, as ratios, that vanish where solved values are right.

        Raises
        ------
        SheetError : a value that was not solved, a difference that does not vanish, or that does not rest on it
        """
        problems = [
            Problem(f"{item}", "a value made by sheet.solved", "") for item in solved if item.entry.kind != "solved"
        ]
        problems += [
            Problem(f"{item} = {float(item):.3g}", f"a ratio of at most {_VANISHES:g}", "solve it again")
            for item in by
            if item.entry.unit or abs(float(item)) > _VANISHES
        ]
        problems += [
            Problem(f"{item.entry.id} does not rest on {value.entry.id}", "a difference worked from the solved value")
            for item in by
            for value in solved
            if value.entry.id not in self.ledger.below(item.entry.id)
        ]
        if problems or not by:
            given = problems or [Problem("nothing that confirms it", "differences that vanish", "work them")]
            raise SheetError("confirm", given, self._place())
        ids = [item.entry.id for item in by]
        for value in solved:
            self.ledger.confirm(value.entry.id, ids)
        said: list[dict[str, str]] = []
        for name in dict.fromkeys(item.entry.symbol for item in solved):
            said += [self._part(", ")] if said else []
            said.append({"text": name, "link": "", "sheet": "", "symbol": name})
        self._show(
            "note", style="reason", confirms=[[value.entry.id, ids] for value in solved],
            parts=[*said, self._part(" confirmed: the differences vanish.")],
        )  # fmt: skip

    def _measured(self, symbol: str, value: object, unit: str = "") -> Measured:
        dimension = symbols.lookup(symbol).dimension if symbols.is_known(symbol) else None
        try:
            measured = read(value, dimension, symbol)
            if unit:
                read(f"1 {unit}", measured.dimension, f"unit of {symbol}")
        except InputError as error:
            raise error.at(self._place()) from None
        return measured


def _many_figures(measured: Measured) -> str:
    """Figures enough that a hand, working on from the printed value, finds the differences small."""
    unit = display_unit(measured.dimension)
    return with_unit(rounded(convert(measured.value, unit), 7), unit)
