"""What a cell shows: items of plain data that the exporters typeset, with a reading copy for notebooks.

An item travels in a notebook's output under the project's own type, so the package is made from the same data that
the author saw. Beside it stand Markdown (equations as LaTeX) for JupyterLab and VS Code, and plain text.
"""

from __future__ import annotations

import html
import re
from collections.abc import Iterator, Mapping, Sequence
from typing import Any

from calcpack.typeset.emit import LATEX, PLAIN, Target, emit
from calcpack.typeset.general import GeneralLine
from calcpack.typeset.line import PrintedLine
from calcpack.typeset.rows import condition_row, equation, symbol_text, with_symbols

__all__ = ["MIME", "bundle", "markdown", "plain", "stored_items"]

MIME = "application/vnd.calcpack.item+json"

Item = Mapping[str, Any]


def bundle(item: Item) -> dict[str, Any]:
    """The item under every type a front end may choose from."""
    shown: dict[str, Any] = {MIME: dict(item), "text/markdown": markdown(item), "text/plain": plain(item)}
    if item["type"] == "figure":
        shown["image/svg+xml"] = item["svg"]
        del shown["text/markdown"]
    return shown


def stored_items(notebook: Mapping[str, Any]) -> Iterator[dict[str, Any]]:
    """Every item in the outputs of a notebook, in order."""
    for cell in notebook["cells"]:
        for output in cell.get("outputs", ()):
            if MIME in output.get("data", {}):
                yield output["data"][MIME]


def markdown(item: Item) -> str:
    """The item as Markdown with LaTeX, every text of the author escaped."""
    match item["type"]:
        case "sheet":
            return f"## {_escape(item['id'])} · {_escape(item['subject'])}"
        case "heading":
            return f"### {_escape(item['text'])}"
        case "given":
            name = f"${symbol_text(item['symbol'], LATEX).strip()}$"
            status = " *(assumed)*" if item["status"] == "assumed" else ""
            return f"{name} = {_escape(item['shown'])} — {_escape(item['means'])}{status} · {_escape(item['source'])}"
        case "work":
            return "\n\n".join(
                [f"*{_escape(item['title'])}* · {_escape(item['clause'])}", *map(_line_markdown, lines(item))]
            )
        case "verdict":
            return f"{_escape(item['what'])}: {_escape(_compared(item))} → **{item['ratio_text']} {item['verdict']}**"
        case "note":
            return _escape(_note_text(item))
        case "table":
            return _table_markdown(item)
        case "tabulated":
            return _tabulated_markdown(item)
    return _escape(plain(item))


def plain(item: Item) -> str:
    """The item as plain text."""
    match item["type"]:
        case "sheet":
            return f"{item['id']}  {item['subject']}"
        case "heading":
            return str(item["text"])
        case "given":
            status = " (assumed)" if item["status"] == "assumed" else ""
            return (
                f"{symbol_text(item['symbol'], PLAIN)} = {item['shown']}  {item['means']}{status}  [{item['source']}]"
            )
        case "work":
            return "\n".join([f"{item['title']}  [{item['clause']}]", *(_line_plain(line) for line in lines(item))])
        case "verdict":
            return f"{item['what']}: {_compared(item)} → {item['ratio_text']} {item['verdict']}"
        case "note":
            return _note_text(item)
        case "figure":
            return f"[figure] {item['caption']}"
        case "table":
            rows = [[_cell_text(cell) for cell in row] for row in [item["head"], *item["rows"]]]
            return "\n".join("  ".join(row) for row in rows)
        case "tabulated":
            return _tabulated_plain(item)
    return ""


def lines(item: Item) -> list[PrintedLine]:
    """The printed lines of a work item."""
    return [PrintedLine.from_json(line) for line in item["lines"]]


def general(item: Item) -> list[GeneralLine]:
    """The equations of a worked table, in symbols."""
    return [GeneralLine.from_json(data) for data in item["equations"]]


def _compared(item: Item) -> str:
    demand, capacity = item["demand"], item["capacity"]
    return f"{demand['shown']} against {capacity['shown']}"


def _note_text(item: Item) -> str:
    return "".join(part["text"] for part in item["parts"])


def _cell_text(cell: Any) -> str:
    return str(cell["text"])


def _table_markdown(item: Item) -> str:
    rows = [[_escape(_cell_text(cell)) for cell in row] for row in [item["head"], *item["rows"]]]
    rule = ["---"] * len(rows[0])
    return "\n".join(f"| {' | '.join(row)} |" for row in [rows[0], rule, *rows[1:]])


def _tabulated_markdown(item: Item) -> str:
    head = [
        _escape(item["label"]),
        *(_named(column, LATEX, "${}$", _escape(column["unit"])) for column in item["columns"]),
    ]
    rule = ["---", *["---:"] * len(item["columns"])]
    rows = [[_escape(text) for text in row] for row in _body(item)]
    sums = [["**Sum**", *(_sum(cell, LATEX, "${}$ = **{}**") for cell in item["totals"])]] if item["totals"] else []
    body = r" \\ ".join(
        _general(line, LATEX, r" \\ ", r" &\quad \text{where } ", r" \text{, and } ") for line in general(item)
    )
    parts = [
        f"*{_escape(item['title'])}* · {_escape(_clauses(item))}",
        f"$$\\begin{{aligned}} {body} \\end{{aligned}}$$" if body else "",
        f"**{_escape(item['caption'])}**" if item["caption"] else "",
        "\n".join(f"| {' | '.join(row)} |" for row in [head, rule, *rows, *sums]),
    ]
    return "\n\n".join(filter(None, parts))


def _tabulated_plain(item: Item) -> str:
    head = [str(item["label"]), *(_named(column, PLAIN, "{}", column["unit"]) for column in item["columns"])]
    sums = [["Sum", *(_sum(cell, PLAIN, "{} = {}") for cell in item["totals"])]] if item["totals"] else []
    rows = [head, *_body(item), *sums]
    widths = [max(map(len, column)) for column in zip(*rows, strict=True)]
    return "\n".join(
        [
            f"{item['title']}  [{_clauses(item)}]",
            *(f"  {_general(line, PLAIN, ' ', '  where ', ', and ')}" for line in general(item)),
            *([item["caption"]] if item["caption"] else []),
            *("  ".join([row[0].ljust(widths[0]), *map(str.rjust, row[1:], widths[1:])]).rstrip() for row in rows),
        ]
    )


def _body(item: Item) -> list[list[str]]:
    return [[str(row["label"]), *(cell["text"] if cell else "" for cell in row["cells"])] for row in item["rows"]]


def _named(column: Item, target: Target, form: str, unit: str) -> str:
    return f"{form.format(symbol_text(column['symbol'], target).strip())}{f', {unit}' if unit else ''}"


def _sum(cell: Item | None, target: Target, form: str) -> str:
    return form.format(symbol_text(cell["symbol"], target).strip(), cell["text"]) if cell else ""


def _general(line: GeneralLine, target: Target, joint: str, where: str, also: str) -> str:
    sign = " &" if target is LATEX else " "
    rows = joint.join(f"{left.strip()}{sign}{right.strip()}" for left, right in line.rows(target))
    tests = also.join(emit(with_symbols(layout), target).strip() for layout in line.conditions)
    return f"{rows}{where}{tests}" if tests else rows


def _clauses(item: Item) -> str:
    cited = (f"{line['edition']} {line['clause']}".strip() for line in item["equations"])
    return "; ".join(dict.fromkeys(cited)) or "arithmetic"


def _rows(line: PrintedLine, target: Target) -> list[tuple[str, str]]:
    return equation(line.symbol, line.layout, line.values, target)


def _line_markdown(line: PrintedLine) -> str:
    rows = [f"{left} &{right}" for left, right in _rows(line, LATEX)]
    since = [f"\\text{{since }} {_condition(layout, values, LATEX)}" for layout, values in line.conditions]
    body = " \\\\ ".join([*rows, *(f"&\\quad {text}" for text in since), f"&= \\mathbf{{{_latex_text(line.shown)}}}"])
    return f"$$\\begin{{aligned}} {body} \\end{{aligned}}$$"


def _line_plain(line: PrintedLine) -> str:
    text = " ".join(f"{left} {right}".strip() for left, right in _rows(line, PLAIN))
    since = "".join(f"  since {_condition(layout, values, PLAIN)}" for layout, values in line.conditions)
    results = [line.line_result] if line.line_result == line.shown else [line.line_result, line.shown]
    return f"  {text} = {' = '.join(results)}{since}" if text.split("= ")[-1] != line.shown else f"  {text}{since}"


def _condition(layout: Any, values: Sequence[Any], target: Target) -> str:
    return condition_row(layout, values, target)[1]


def _latex_text(text: str) -> str:
    number, _, unit = text.partition(" ")
    return LATEX.value(f"{number} {unit}".strip(), "", "")


def _escape(text: str) -> str:
    # One line without space at its start: neither can begin a list, a heading or a block of code.
    line = " ".join(html.escape(str(text), quote=False).split())
    line = re.sub(r"([\\`*_{}\[\]()#+.!|$~^-])", r"\\\1", line)
    # JupyterLab looks for mathematics again in the finished page, where no escape is left; never across elements.
    return re.sub(r"(\\[\\$])", r"<span>\1</span>", line)
