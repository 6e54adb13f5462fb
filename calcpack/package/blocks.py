"""An executed notebook as the blocks a template loops over: every text ready to print, nothing left to compute.

A block is a plain dict with a ``kind``: ``sheet``, ``heading``, ``text``, ``given``, ``work``, ``verdict``, ``note``,
``table``, ``tabulated`` or ``figure``. A `Markup` in it is source of the target (an equation, Markdown); a str is text
to be escaped. Consecutive givens make one block. Links lead only to what the document holds.
"""

from __future__ import annotations

import re
from collections.abc import Collection, Iterable, Iterator, Mapping, Sequence
from dataclasses import dataclass, field
from typing import Any

from markupsafe import Markup

from calcpack.errors import LayoutError
from calcpack.items import MIME
from calcpack.package import text
from calcpack.package.drawings import safe_svg
from calcpack.typeset import emit
from calcpack.typeset.general import GeneralLine
from calcpack.typeset.layout import Layout
from calcpack.typeset.line import PrintedLine
from calcpack.typeset.names import name_tree
from calcpack.typeset.rows import (
    COLUMN,
    Printed,
    broken,
    condition_row,
    equation,
    spoken,
    symbol_text,
    width,
    with_symbols,
    with_values,
)

__all__ = ["Printer", "anchors", "blocks", "foreign_outputs"]

Block = dict[str, Any]

_TARGETS = {"html": emit.MATHML, "typst": emit.TYPST}
_KINDS = ("sheet", "heading", "given", "work", "verdict", "note", "table", "tabulated", "figure")
_SHORT = 90  # letters of a condition, in words, that stand beside an equation
_NUMERIC = re.compile(r"[-+−±≤≥<>=\s]*[\d.,]*\d(?:\s?×\s?10\S*)?(?:\s?%|\s[^\W\d]\S{0,11})?|[-–—]?")


def anchors(nb: Any) -> frozenset[str]:
    """Ids of everything in a notebook that a link may lead to."""
    return frozenset(text.anchor(identifier) for item in _items(nb) for identifier in _identifiers(item))


def _items(nb: Any) -> Iterator[Mapping[str, Any]]:
    for cell in nb.cells:
        yield from _items_of(cell)


def _items_of(cell: Any) -> Iterator[Mapping[str, Any]]:
    yield from (output["data"][MIME] for output in cell.get("outputs", ()) if not _foreign(output))


def _foreign(output: Any) -> str:
    """What an output is that is no item, in words; empty for an item."""
    data = output.get("data", {})
    if MIME in data:
        kind = data[MIME]["type"]
        return "" if kind in _KINDS else f"item ({kind})"
    kinds = ", ".join(data) or str(output.get("name", ""))
    return f"{output['output_type']} ({kinds})" if kinds else str(output["output_type"])


def _identifiers(item: Mapping[str, Any]) -> Iterator[str]:
    if item["type"] in ("sheet", "given", "verdict") and item["id"]:
        yield item["id"]
    if item["type"] == "work":
        yield from (line["id"] for line in item["lines"])
    if item["type"] == "tabulated":
        cells = [*(cell for row in item["rows"] for cell in row["cells"]), *item["totals"]]
        yield from (cell["id"] for cell in cells if cell and cell["id"])


def foreign_outputs(nb: Any) -> list[tuple[int, str]]:
    """Outputs that are no items and so are not printed: the number of the cell, and what the output is."""
    return [
        (number, words)
        for number, cell in enumerate(nb.cells)
        for words in map(_foreign, cell.get("outputs", ()))
        if words
    ]


def blocks(nb: Any, target: str, known: Collection[str] | None = None) -> list[Block]:
    """The blocks of a notebook.

    Parameters
    ----------
    nb : executed notebook
    target : ``html`` or ``typst``
    known : ids of the whole document that holds the sheet; those of the notebook where it stands alone
    """
    maker = _Maker(Printer(target, anchors(nb) if known is None else known))
    for cell in nb.cells:
        if cell.cell_type == "markdown":
            maker.markdown("".join(cell.source))  # a notebook as read from JSON may keep its lines apart
        for item in _items_of(cell):
            maker.item(item)
    # Words that stand above the cell that opens the sheet belong on it, below its heading.
    return sorted(maker.made, key=lambda block: block["kind"] != "sheet")


@dataclass(frozen=True)
class Printer:
    """How texts, symbols and links are written for one target."""

    target: str
    known: Collection[str]

    @property
    def emitter(self) -> emit.Target:
        """The writer of expressions."""
        return _TARGETS[self.target]

    def text(self, value: object) -> str:
        """A text as the page can show it."""
        shown = text.printable(value)
        return text.breakable(shown) if self.target == "typst" else shown

    def link(self, identifier: str) -> str:
        """The id to link to; empty where the document does not hold it."""
        found = text.anchor(identifier) if identifier else ""
        return found if found in self.known else ""

    def symbol(self, name: str) -> Block:
        """A symbol: its source, and how it is spoken; a name that is no symbol stays text."""
        try:
            return {
                "math": Markup(symbol_text(name, self.emitter)),
                "spoken": symbol_text(name, emit.SPOKEN).strip(),
                "words": "",
            }
        except LayoutError:
            return {"math": Markup(""), "spoken": text.printable(name), "words": self.text(name)}

    def part(self, part: Mapping[str, Any]) -> Block:
        """A piece of a sentence or a cell, with the link it carries."""
        shown = self.text(part["text"])
        symbol = self.symbol(part["symbol"]) if part.get("symbol") else {"math": Markup(""), "spoken": ""}
        math = Markup(f"${symbol['math']}$") if self.target == "typst" and symbol["math"] else symbol["math"]
        return {
            "math": math or "",
            "spoken": symbol["spoken"],
            # A value keeps its unit on its line.
            "text": shown.replace(" ", "\u00a0") if part.get("link") else shown,
            "link": self.link(part.get("link", "")),
            "sheet": text.printable(part.get("sheet", "")),
        }

    def linked(self, values: Iterable[Printed]) -> list[Printed]:
        """Values of an equation with links the document can follow."""
        return [
            Printed(text.printable(value.text), self.link(value.link), text.printable(value.sheet)) for value in values
        ]


@dataclass
class _Maker:
    """Collects the blocks of one sheet; mutable, as each item may go on with the block before it."""

    printer: Printer
    made: list[Block] = field(default_factory=list)
    _taken: set[str] = field(default_factory=set)
    _concrete: str = ""
    _sheet_anchor: str = ""
    _level: int = 1

    def anchor(self, identifier: str) -> str:
        """The id an entry stands under, once: a second appearance gets none."""
        found = text.anchor(identifier) if identifier else ""
        if found in self._taken:
            return ""
        self._taken.add(found)
        return found

    def markdown(self, source: str) -> None:
        """Take in a Markdown cell."""
        tokens: list[Mapping[str, Any]] = []
        for token in text.parse(source):
            if token["type"] == "heading":
                self._prose(tokens)
                tokens = []
                self._heading(text.plain_text(token), int(token["attrs"]["level"]))
            else:
                tokens.append(token)
        self._prose(tokens)

    def _prose(self, tokens: Sequence[Mapping[str, Any]]) -> None:
        if tokens:
            write = text.typst_text if self.printer.target == "typst" else text.html_text
            self.made.append({"kind": "text", "body": write(tokens)})

    def _heading(self, words: str, wanted: int) -> None:
        # A heading must not skip a level; the sheet's own is the first.
        self._level = 2 if wanted <= 2 else min(3, self._level + 1)
        if words.strip():
            self.made.append({"kind": "heading", "level": self._level, "text": self.printer.text(words)})

    def item(self, item: Mapping[str, Any]) -> None:
        """Take in an item of a code cell."""
        if item["type"] == "heading":
            self._heading(item["text"], int(item.get("level", 2)))
            return
        makers = {
            "sheet": self._sheet, "given": self._given, "work": self._work, "verdict": self._verdict,
            "note": self._note, "table": self._table, "tabulated": self._tabulated, "figure": self._figure,
        }  # fmt: skip
        made = makers[item["type"]](item)
        if made is not None:
            self.made.append(made)

    def _sheet(self, item: Mapping[str, Any]) -> Block:
        self._concrete, self._sheet_anchor = item["concrete"], text.anchor(item["id"])
        return {
            "kind": "sheet", "anchor": self.anchor(item["id"]), "id": item["id"],
            "subject": self.printer.text(item["subject"]), "concrete": self.printer.text(item["concrete"]),
        }  # fmt: skip

    def _given(self, item: Mapping[str, Any]) -> Block | None:
        row = {
            "anchor": self.anchor(item["id"]), "symbol": self.printer.symbol(item["symbol"]),
            "means": self.printer.text(item["means"]), "source": self.printer.text(item["source"]),
            "assumed": item["status"] == "assumed",
            **self.printer.part({"text": item["shown"], "link": item.get("link", "")}),
        }  # fmt: skip
        if self.made and self.made[-1]["kind"] == "given":
            self.made[-1]["rows"].append(row)
            self.made[-1]["headed"] |= len(self.made[-1]["rows"]) > 2
            return None
        # A value stated between workings needs no heads of columns; a sheet's first ones, and any list, do.
        return {"kind": "given", "rows": [row], "headed": all(made["kind"] != "given" for made in self.made)}

    def _work(self, item: Mapping[str, Any]) -> Block:
        edition = item["edition"] if item["edition"] != self._concrete else ""
        return {
            "kind": "work", "title": self.printer.text(item["title"]), "clause": self.printer.text(item["clause"]),
            "edition": self.printer.text(edition), "lines": [self._line(line) for line in item["lines"]],
        }  # fmt: skip

    def _line(self, data: Mapping[str, Any]) -> Block:
        line, printer = PrintedLine.from_json(data), self.printer
        values = printer.linked(line.values)
        written = equation(line.symbol, line.layout, values, printer.emitter)
        words = equation(line.symbol, line.layout, values, emit.SPOKEN)
        differs = line.line_result != line.shown
        return {
            "anchor": self.anchor(data["id"]),
            "rows": [
                {
                    "left": Markup(left),
                    "right": Markup(right),
                    "spoken": " ".join(f"{said[0]} {said[1]}".split()),
                    # A row that goes on with the expression of the row before has no sign of its own.
                    "goes_on": not said[1].strip().startswith("equals"),
                }
                for (left, right), said in zip(written, words, strict=True)
            ],
            "wide": _too_wide(line),
            "opening": "since",
            "joint": "; since ",
            "conditions": [self._condition(layout, fills) for layout, fills in line.conditions],
            "symbol": printer.symbol(line.symbol),
            "line_result": printer.text(line.line_result) if differs else "",
            "shown": printer.text(line.shown),
            "spoken": " ".join(spoken(line.symbol, line.layout, values, line.shown).split()),
        }

    def _condition(self, layout: Layout, fills: Sequence[Printed] | None = None) -> Block:
        # Parts of a condition stand as equations of their own, so that a long one wraps between them.
        word = layout.tree[0] if layout.tree[0] in ("and", "or") else ""
        trees = layout.tree[1] if word else (layout.tree,)
        values = self.printer.linked(fills) if fills is not None else None
        parts = [self._test(Layout(tree, layout.slots), values) for tree in trees]
        said = any(part["spoken"] != part["spoken_values"] for part in parts)
        words = sum(len(part["spoken"]) + (len(part["spoken_values"]) if values is not None else 0) for part in parts)
        return {"word": word, "parts": parts, "with_values": said, "short": words <= _SHORT}

    def _test(self, layout: Layout, values: Sequence[Printed] | None) -> Block:
        """A condition; without values its symbols stand alone."""
        if values is None:
            symbols = filled = emit.emit(with_symbols(layout), self.printer.emitter)
            spoken_symbols = spoken_values = emit.emit(with_symbols(layout), emit.SPOKEN)
        else:
            symbols, filled = condition_row(layout, values, self.printer.emitter)
            spoken_symbols, spoken_values = condition_row(layout, values, emit.SPOKEN)
        return {
            "symbols": Markup(symbols), "values": Markup(filled),
            "spoken": " ".join(spoken_symbols.split()), "spoken_values": " ".join(spoken_values.split()),
        }  # fmt: skip

    def _verdict(self, item: Mapping[str, Any]) -> Block:
        sides = {
            side: {"symbol": self.printer.symbol(item[side]["symbol"]), **self.printer.part(item[side])}
            for side in ("demand", "capacity")
        }
        ok = item["verdict"] == "OK"
        return {
            "kind": "verdict", "anchor": self.anchor(item["id"]), "what": self.printer.text(item["what"]),
            "clause": self.printer.text(item["clause"]), "ratio": item["ratio_text"], "ok": ok,
            "fill": min(1.0, max(0.0, float(item["ratio"]))), "word": item["verdict"],
            "sign": "≤" if ok else ">", **sides,
        }  # fmt: skip

    def _note(self, item: Mapping[str, Any]) -> Block:
        return {"kind": "note", "style": item["style"], "parts": [self.printer.part(part) for part in item["parts"]]}

    def _table(self, item: Mapping[str, Any]) -> Block:
        columns = zip(*item["rows"], strict=True) if item["rows"] else ([],) * len(item["head"])
        numeric = [all(_NUMERIC.fullmatch(cell["text"].strip()) for cell in column) for column in columns]
        return {
            "kind": "table", "caption": self.printer.text(item["caption"]), "numeric": numeric,
            "head": [self.printer.part(cell) for cell in item["head"]],
            "rows": [[self.printer.part(cell) for cell in row] for row in item["rows"]],
        }  # fmt: skip

    def _tabulated(self, item: Mapping[str, Any]) -> Block:
        lines, before = [], ("", "")
        for data in item["equations"]:
            edition = data["edition"] if data["edition"] != self._concrete else ""
            cited = self.printer.text(edition), self.printer.text(data["clause"])
            # A clause stands once beside the lines that follow from it.
            stated = dict(zip(("edition", "clause"), ("", "") if cited == before else cited, strict=True))
            lines.append({**self._general(GeneralLine.from_json(data)), **stated})
            before = cited
        return {
            "kind": "tabulated", "title": self.printer.text(item["title"]), "lines": lines,
            "caption": self.printer.text(item["caption"]), "label": self.printer.text(item["label"]),
            "columns": [
                {"symbol": self.printer.symbol(column["symbol"]), "unit": self.printer.text(column["unit"])}
                for column in item["columns"]
            ],
            "rows": [
                {"label": self.printer.text(row["label"]), "cells": [self._cell(cell) for cell in row["cells"]]}
                for row in item["rows"]
            ],
            "totals": [
                {**self._cell(cell), "symbol": self.printer.symbol(cell["symbol"]), "room": cell["room"]}
                if cell
                else {**self._cell(cell), "symbol": None, "room": ""}
                for cell in item["totals"]
            ],
        }  # fmt: skip

    def _cell(self, cell: Mapping[str, Any] | None) -> Block:
        return {"anchor": self.anchor(cell["id"] if cell else ""), **self.printer.part(cell or {"text": ""})}

    def _general(self, line: GeneralLine) -> Block:
        """A line in symbols, in the form of a worked one without a result."""
        printer = self.printer
        written, words = line.rows(printer.emitter), line.rows(emit.SPOKEN)
        return {
            "anchor": "", "wide": line.wide, "opening": "where", "joint": ", and ",
            "line_result": "", "shown": "", "spoken": "", "symbol": printer.symbol(line.symbol),
            "rows": [
                {
                    "left": Markup(left), "right": Markup(right), "goes_on": index > 0,
                    "spoken": " ".join(f"{said[0]} {said[1]}".split()),
                }
                for index, ((left, right), said) in enumerate(zip(written, words, strict=True))
            ],
            "conditions": [self._condition(layout) for layout in line.conditions],
        }  # fmt: skip

    def _figure(self, item: Mapping[str, Any]) -> Block:
        return {
            "kind": "figure", "svg": self._drawing(item["svg"]), "width": float(item["width"]),
            "caption": self.printer.text(item["caption"]), "alt": text.printable(item["alt"]),
        }  # fmt: skip

    def _drawing(self, svg: str) -> str:
        safe = safe_svg(svg, f"{self._sheet_anchor}-f{len(self.made)}")
        return Markup(safe) if self.printer.target == "html" else safe


def _too_wide(line: PrintedLine) -> bool:
    """Whether a row stays wider than its column where it is broken as far as it can be."""
    limit = COLUMN - width(name_tree(line.symbol)) - 1
    trees = (with_symbols(line.layout), with_values(line.layout, line.values))
    return any(width(part) > limit for tree in trees for part in broken(tree, limit))
