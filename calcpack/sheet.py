"""What a notebook author imports: a sheet, its givens, workings, verdicts, notes, tables and figures.

A cell is a sentence of the calculation. What it shows is what the package prints, and nothing on the page comes
from a string where a computed value belongs: a value enters as a given with its source, or by a formula.
"""

from __future__ import annotations

import re
from collections.abc import Mapping, Sequence
from dataclasses import dataclass
from pathlib import Path
from typing import TYPE_CHECKING, Any

from calcpack import notebook, symbols
from calcpack.anchorage_sheets import AnchorageSheets
from calcpack.column_sheets import ColumnSheets
from calcpack.errors import InputError, Problem, SheetError
from calcpack.formula import Clause, Formula
from calcpack.ledger import Entry, passes
from calcpack.length_sheets import LengthSheets
from calcpack.tabulating import Tabulating
from calcpack.typeset.line import Origin, printed_lines, with_unit
from calcpack.typeset.store import LayoutStore
from calcpack.units import RATIO, Measured, coherent_unit
from calcpack.value import Value, ratio_text, shown_text

if TYPE_CHECKING:
    from calcpack.figures import Figure

__all__ = ["Sheet", "Value"]

_ID = re.compile(r"[A-Za-z0-9][A-Za-z0-9.-]{0,15}")
_STATUS = ("confirmed", "assumed")


@dataclass
class Sheet(AnchorageSheets, ColumnSheets, LengthSheets, Tabulating):
    """A calculation sheet, one for each notebook.

    Parameters
    ----------
    id : stable for the life of the job, e.g. ``"C-01"``
    subject : one line for the title block
    job : the job folder; found above the notebook where it is not given

    Raises
    ------
    SheetError : an id that cannot stand in a title block, an empty subject
    TableError : no job folder, or a mistake in job.toml
    """

    job: Path | None = None

    def __post_init__(self) -> None:
        from calcpack.job import find, load

        notebook.short_errors()
        if not _ID.fullmatch(self.id) or not self.subject.strip():
            problem = Problem(f"Sheet({self.id!r}, {self.subject!r})", "an id like C-01 and a subject", "give both")
            raise SheetError("sheet", [problem], notebook.cell_name())
        self._root = find(self.job or Path.cwd())
        self._job = load(self._root)
        self._store = LayoutStore(self._root / ".calcpack" / "layouts.json")
        notebook.watch_files(self._root)
        codes = self._job.codes
        self._show(
            "sheet", id=self.id, subject=self.subject, concrete=codes.concrete, reads=[["job codes", repr(codes)]]
        )

    def given(
        self,
        symbol: str,
        value: object = None,
        means: str = "",
        source: str = "",
        status: str = "confirmed",
        unit: str = "",
    ) -> Value:
        """A value with its source; without `value`, the one of inputs/givens.toml.

        Parameters
        ----------
        symbol : as in the notation table, or one of the author's own
        value : text with a unit, a quantity, or a number for a ratio
        means : what it is; from the notation table where it is left out
        source : drawing and revision, report and table, clause, or whose assumption it is
        status : ``confirmed``, or ``assumed``: an open item until confirmed
        unit : the unit to show it in, where it is not the one it is written in

        Raises
        ------
        SheetError : no source, an unknown status, no meaning
        UnitError : a missing, unknown or dimensionally wrong unit
        """
        if value is None:
            return self._listed(symbol)
        means = means or (symbols.lookup(symbol).meaning if symbols.is_known(symbol) else "")
        self._require(symbol, means, source, status)
        return self._set_given(symbol, self._measured(symbol, value, unit), means, source, status, unit)

    def work(self, formula: Formula, **values: Value) -> Value:
        """Evaluate a formula and print it, line by line, with its values.

        An argument left out is the sheet's value of that symbol, where there is exactly one.

        Raises
        ------
        SheetError : an argument that is no value of the ledger, a missing one, or one of the wrong dimension
        RangeError : a value outside the range its clause allows
        LayoutError : a line of the author's own that cannot be printed as it runs
        """
        bound = self._bind(formula, values)
        try:
            recording = formula.record(**{name: float(value) for name, value in bound.items()})
            layouts = self._store.layout(formula)
            self._store.save()
        except InputError as error:
            raise error.at(self._place()) from None
        self._begin()
        targets = self._free_ids([recorded.line.target for recorded in recording.lines])
        origins = {name: self._origin(value) for name, value in bound.items()}
        shown = {name: value.entry.shown for name, value in bound.items()}
        printed = printed_lines(recording, layouts, origins, shown, [Origin(identifier) for identifier in targets])
        entries, known = [], {name: value.entry.id for name, value in bound.items()}
        clause = formula.clause(self._standard(formula))
        for recorded, identifier, line in zip(recording.lines, targets, printed, strict=True):
            entries.append(self._worked(formula, recorded, identifier, line.shown, known, clause))
            known[recorded.line.target] = identifier
        lines = [{"id": identifier, **line.to_json()} for identifier, line in zip(targets, printed, strict=True)]
        title = (formula.__doc__ or formula.name).strip().splitlines()[0].rstrip(".")
        values_made = [
            self._keep(entry, recorded.line.dimension) for entry, recorded in zip(entries, recording.lines, strict=True)
        ]
        self._show("work", entries, title=title, clause=clause.number, edition=_edition(clause), lines=lines)
        return values_made[-1]

    def verify(self, what: str, *, demand: Value, capacity: Value, clause: str = "") -> Value:
        """A verdict: demand over capacity, OK up to 1.0, NG above.

        For a least value that has to be provided, the least value is the demand and what is provided the capacity.

        Raises
        ------
        SheetError : a number without a source, different dimensions, or a capacity of zero or less
        """
        self._check_pair(what, demand, capacity)
        self._begin()
        ratio = float(demand) / float(capacity)
        verdict = "OK" if passes(ratio) else "NG"
        identifier = self._free_ids(["verdict"])[0]
        entry = Entry(
            identifier, "verdict", "ratio", what, ratio, "", ratio_text(ratio), self.id,
            clause=clause, demand=demand.entry.id, capacity=capacity.entry.id, ratio=ratio, verdict=verdict,
        )  # fmt: skip
        value = self._keep(entry, RATIO)
        self._show(
            "verdict", [entry], id=identifier, what=what, clause=clause, ratio=ratio, ratio_text=ratio_text(ratio),
            verdict=verdict, demand=self._side(demand), capacity=self._side(capacity),
        )  # fmt: skip
        return value

    def note(self, *parts: str | Value) -> None:
        """A paragraph; values among the parts are printed with a link to where they were set."""
        self._note("note", parts)

    def conclude(self, *parts: str | Value) -> None:
        """The conclusion of the sheet, printed as such."""
        self._note("conclusion", parts)

    def heading(self, text: str, level: int = 2) -> None:
        """A heading inside the sheet; one of level 3 stands below one of level 2 and is left out of the contents."""
        if level not in (2, 3):
            raise SheetError("heading", [Problem(f"level {level}", "2, or 3 below it", "")], self._place())
        self._show("heading", text=text, level=level)

    def figure(self, figure: Figure, caption: str = "") -> None:
        """A figure, drawn to scale by `calcpack.figures`, or any object with ``svg``, ``caption`` and ``alt``."""
        if not str(getattr(figure, "alt", None) or "").strip():
            raise SheetError(
                "figure", [Problem("a figure without alt text", "one sentence of what it shows", "")], self._place()
            )
        self._show("figure", svg=figure.svg, caption=caption or figure.caption, alt=figure.alt, width=figure.width)

    def carry(self, sheet: str, name: str) -> Value:
        """A value of another sheet; the page shows that sheet's id beside it.

        Raises
        ------
        NeedsSheet : that sheet has not run yet
        SheetError : that sheet has no value, or several, of that name
        """
        from calcpack.carrying import carried

        value, digest = carried(self._root, sheet, name, self._place())
        self.ledger.admit(value.entry.id, digest)
        entry = value.entry
        self._values[entry.id] = value
        self._show(
            "given", reads=[[f"sheet {sheet} {entry.id}", digest]], id="", symbol=entry.symbol, means=entry.means,
            shown=entry.shown, source=f"sheet {sheet}", status="confirmed", link=entry.id,
        )  # fmt: skip
        return value

    # What follows is how the above is done.

    def _listed(self, symbol: str) -> Value:
        from calcpack.job import row_digest

        with notebook.reading_inputs():
            rows = {row.symbol: row for row in self._job.givens}
        if symbol not in rows:
            allowed = f"one of inputs/givens.toml ({', '.join(rows) or 'which lists none'})"
            remedy = "list it there, or write value, means and source here"
            raise SheetError("given", [Problem(f"{symbol} without a value", allowed, remedy)], self._place())
        row = rows[symbol]
        return self._set_given(
            symbol, row.value, row.means, row.source, row.status, "", reads=[[f"givens {symbol}", row_digest(row)]]
        )

    def _set_given(
        self,
        symbol: str,
        measured: Measured,
        means: str,
        source: str,
        status: str,
        unit: str,
        reads: Sequence[Any] = (),
    ) -> Value:
        self._begin()
        written = measured.written if unit in ("", measured.unit) else ""
        shown = shown_text(measured.value, measured.dimension, unit or measured.unit)
        if written:
            shown = with_unit(written, measured.unit)
        identifier = self._free_ids([symbol])[0]
        entry = Entry(
            identifier, "given", symbol, means, measured.value, coherent_unit(measured.dimension), shown, self.id,
            source=source, status=status,
        )  # fmt: skip
        value = self._keep(entry, measured.dimension)
        self._show(
            "given", [entry], reads, id=identifier, symbol=symbol, means=means, shown=shown, source=source,
            status=status,
        )  # fmt: skip
        return value

    def _require(self, symbol: str, means: str, source: str, status: str) -> None:
        problems = []
        if not source.strip():
            problems.append(
                Problem(f"{symbol} without a source", "where it comes from", "source='S-001, note 4, rev 2'")
            )
        if not means.strip():
            problems.append(Problem(f"{symbol} without a meaning", "what it is, in words", "means='…'"))
        if status not in _STATUS:
            problems.append(Problem(f"{symbol}: status {status!r}", " or ".join(_STATUS), ""))
        if not symbol.isidentifier():
            problems.append(Problem(f"symbol {symbol!r}", "letters, digits and _, as in code", "e.g. 'w_u'"))
        if problems:
            raise SheetError("given", problems, self._place())

    def _bind(self, formula: Formula, values: Mapping[str, Value]) -> dict[str, Value]:
        if not isinstance(formula, Formula):
            problem = Problem(f"{formula!r}", "a formula", "put @formula('where it comes from') above the function")
            raise SheetError("work", [problem], self._place())
        bound, problems = {}, []
        for name in values:
            if name not in formula.arguments:
                problems.append(
                    Problem(f"{name} = {values[name]}", f"arguments are {', '.join(formula.arguments)}", "")
                )
        for name, dimension in formula.arguments.items():
            found = [values[name]] if name in values else list(self.values(name))[-1:]
            if not found:
                problems.append(
                    Problem(f"{name} is missing", dimension.phrase, f"sheet.given({name!r}, …), or pass {name}=…")
                )
            elif not isinstance(found[0], Value):
                problems.append(
                    Problem(
                        f"{name} = {found[0]!r}", "a value of the ledger", f"sheet.given({name!r}, …, source='…') first"
                    )
                )
            elif found[0].dimension.powers != dimension.powers:
                problems.append(Problem(f"{name} = {found[0].entry.shown}", dimension.phrase, ""))
            elif name not in values and len(self.values(name)) > 1:
                problems.append(
                    Problem(f"{name} is set {len(self.values(name))} times on this sheet", "one", f"pass {name}=…")
                )
            else:
                bound[name] = found[0]
        if problems:
            raise SheetError(formula.name, problems, self._place())
        return bound

    def _standard(self, formula: Formula) -> Any:
        standards = [clause.standard for clause in formula.clauses if clause.standard]
        named = [standard for standard in standards if standard.name == self._job.codes.concrete]
        if standards and not named and all(standard.name.startswith("ACI 318") for standard in standards):
            problem = Problem(
                f"{formula.name} of {formula.clauses[0]}",
                f"{self._job.codes.concrete}, the job's edition",
                "use sheet.code",
            )
            raise SheetError(formula.name, [problem], self._place())
        return named[0] if named else None

    def _worked(
        self, formula: Formula, recorded: Any, identifier: str, shown: str, known: Mapping[str, str], clause: Clause
    ) -> Entry:
        from calcpack import expression

        line = recorded.line
        condition = recorded.condition
        names = [*line.names, *(expression.names(expression.parse(condition, True)) if condition else ())]
        return Entry(
            identifier, "worked", line.target, _meaning(line.target, formula), recorded.value,
            coherent_unit(line.dimension), shown, self.id,
            clause=clause.number, edition=_edition(clause), expression=line.text,
            where={name: known[name] for name in dict.fromkeys(names)}, condition=condition, formula=formula.name,
        )  # fmt: skip

    def _check_pair(self, what: str, demand: Value, capacity: Value) -> None:
        problems = [
            Problem(f"{name} = {side!r}", "a value of the ledger", "give it a source with sheet.given(…)")
            for name, side in (("demand", demand), ("capacity", capacity))
            if not isinstance(side, Value)
        ]
        if not problems and demand.dimension.powers != capacity.dimension.powers:
            problems.append(Problem(f"demand {demand}, capacity {capacity}", "two values of one dimension", ""))
        if not problems and float(capacity) <= 0:
            problems.append(Problem(f"capacity {capacity}", "above zero", "check what is provided"))
        if problems:
            raise SheetError(f"verify {what!r}", problems, self._place())

    def _note(self, style: str, parts: Sequence[str | Value]) -> None:
        if not any(str(part).strip() for part in parts):
            raise SheetError(style, [Problem("an empty text", "a sentence", "")], self._place())
        said = [self._named(part) if isinstance(part, str) else [self._part(part)] for part in parts]
        self._show("note", style=style, parts=[piece for pieces in said for piece in pieces])


def _edition(clause: Clause) -> str:
    return clause.standard.name if clause.standard else ""


def _meaning(symbol: str, formula: Formula) -> str:
    if symbols.is_known(symbol):
        return symbols.lookup(symbol).meaning
    title = (formula.__doc__ or formula.name).strip().splitlines()[0].rstrip(".")
    return title if symbol == formula.result_name else f"step of: {title}"
