"""A small package for the tests: notebooks whose outputs the real sheet makes, and the model that goes with them.

The building, the firm and its people are invented.
"""

from __future__ import annotations

import json
from collections.abc import Callable
from html.parser import HTMLParser
from pathlib import Path
from types import SimpleNamespace
from typing import Any

from nbformat import v4

from calcpack import notebook
from calcpack.aci318.standards import ACI_318_19
from calcpack.formula import Standard, formula, inch
from calcpack.items import MIME, bundle
from calcpack.sheet import Sheet
from calcpack.units import Area, Force, Length, LineLoad, Ratio, Stress

# Signs that mean something to HTML, Typst, Jinja, Markdown or a font: each must come out as it went in.
NASTY = (
    "say \"quoted\" & 'so' <script>alert(1)</script> <!-- c --> #set page() $x$ @ref \\ \\u{41} `code` *b* _i_ ~ "
    "[a](http://evil.example/x) {{ 7*7 }} {% raw %} /* c */ // d 🧪 =end=  " + "W" * 90
)

JOB = """
[job]
number = "26-031"
title = "Bus depot"
location = "Eastfield"
client = "Transit district"
firm = "Firm"
[codes]
building = "IBC 2021"
concrete = "ACI 318-19"
loads = "ASCE 7-16"
[units]
system = "US"
"""


@formula(ACI_318_19("22.4.2.2"))
def axial(*, f_c: Stress, A_g: Area, A_st: Area, f_y: Stress) -> Force:
    """Nominal axial strength at zero eccentricity."""
    P_o = 0.85 * f_c * (A_g - A_st) + f_y * A_st
    return P_o


@formula(ACI_318_19("25.4.2.5"), empirical=True)
def casting(*, h_below: Length) -> Ratio:
    """Factor for casting position."""
    if h_below > 12 * inch:
        psi_t = 1.3
    else:
        psi_t = 1.0
    return psi_t


@formula(ACI_318_19("25.4.2.4a"), empirical=True)
def development(*, f_y: Stress, f_c: Stress, psi_t: Ratio, d_b: Length) -> Length:
    """Development length, a short form."""
    l_d = 3 / 40 * f_y / f_c**0.5 * psi_t / 2.5 * d_b
    return l_d


@formula(Standard("ASCE 7-16")("2.3.1"))
def factored(*, w_D: LineLoad, w_L: LineLoad) -> LineLoad:
    """Factored load per length."""
    w_u = 1.2 * w_D + 1.6 * w_L
    return w_u


class Recorder:
    """Collects what a sheet shows, as the cells of an executed notebook."""

    def __init__(self, patch: Any) -> None:
        self.cells: list[Any] = []
        patch.setattr(notebook, "show", self._show)

    def _show(self, item: Any) -> None:
        # Through JSON, as a notebook on disk would have it.
        data = json.loads(json.dumps(bundle(item)))
        self.cells.append(v4.new_code_cell("…", outputs=[v4.new_output("display_data", data=data)]))

    def markdown(self, source: str) -> None:
        self.cells.append(v4.new_markdown_cell(source))

    def notebook(self) -> Any:
        return v4.new_notebook(cells=self.cells)


SVG = (
    '<svg xmlns="http://www.w3.org/2000/svg" width="144" height="72" viewBox="0 0 144 72"><defs><clipPath id="c">'
    '<rect width="144" height="72"/></clipPath></defs><rect id="box" clip-path="url(#c)" x="2" y="2" width="140" '
    'height="68" fill="none" stroke="#000"/><text x="10" y="40" font-family="IBM Plex Sans">18 in</text></svg>'
)


def figure(caption: str = "Section", alt: str = "A rectangle") -> Any:
    return SimpleNamespace(svg=SVG, caption=caption, alt=alt, width=2.0)


def columns_sheet(root: Path, patch: Any, say: Callable[[str], str] = lambda text: text) -> Any:
    """Sheet C-01; `say` makes every text of the author."""
    recorder = Recorder(patch)
    sheet = Sheet("C-01", say("Columns, levels 1 to 3"), job=root)
    table = "| a | b |\n|---|---|\n| 1 | 2 |"
    recorder.markdown(f"## {say('Given')}\n\n{say('As on the drawings.')}\n\n- {say('one')}\n\n{table}")
    sheet.given("f_c", "4 ksi", means=say("concrete strength"), source=say("S-001, note 4"))
    f_y = sheet.given("f_y", "60 ksi", source=say("S-001, note 7"))
    sheet.given("A_g", "324 in^2", source=say("S-201"))
    sheet.given("A_st", "8 in^2", source=say("S-201"))
    demand = sheet.given("P_u", "610 kip", means=say("axial force"), source=say("run 14"), status="assumed")
    sheet.heading(say("Axial strength"))
    capacity = sheet.work(axial)
    sheet.verify(say("C3 carries its load"), demand=demand, capacity=capacity, clause="22.4.2.1")
    sheet.table(
        [say("Case"), "P_u"], [[say("1.2D + 1.6L"), demand], [say("0.9D + W"), "−31 kip"]], caption=say("Combinations")
    )
    sheet.figure(figure(), caption=say("Section of C3"))
    sheet.note(say("A note about "), f_y, say("."))
    sheet.conclude(say("C3 is adequate: "), demand, " against ", capacity)
    _leave(root, sheet)
    return recorder.notebook()


def bars_sheet(root: Path, patch: Any, rows: int = 0) -> Any:
    """Sheet A-03, which takes f'c from C-01; `rows` lengthens it over several pages."""
    recorder = Recorder(patch)
    sheet = Sheet("A-03", "Top bars at the canopy", job=root)
    f_c = sheet.carry("C-01", "f_c")
    f_y = sheet.given("f_y", "60 ksi", source="S-001, note 7")
    sheet.given("d_b", "1 in", source="ASTM A615")
    sheet.given("h_below", "16 in", source="S-311")
    sheet.given("w_D", "2 kip/ft", source="S-311")
    sheet.given("w_L", "1 kip/ft", source="S-311")
    sheet.work(factored)
    psi_t = sheet.work(casting)
    l_d = sheet.work(development, f_c=f_c, f_y=f_y, psi_t=psi_t)
    for number in range(rows):
        sheet.note(f"Remark {number + 1}.")
    available = sheet.given("l_available", "28 in", means="length offered", source="S-311")
    sheet.verify("Top bars fit", demand=l_d, capacity=available)
    _leave(root, sheet)
    return recorder.notebook()


def _leave(root: Path, sheet: Sheet) -> None:
    from calcpack.carrying import leave, results_folder

    leave(results_folder(root), sheet.id, sheet.ledger, list(sheet.ledger))


def job_folder(root: Path) -> Path:
    (root / "sheets").mkdir(parents=True)
    (root / "job.toml").write_text(JOB, "utf-8")
    return root


def revision(letter: str, date: str, purpose: str, description: str, sheets: list[str], words: str) -> dict[str, Any]:
    """A line of a revision log."""
    stated = {"letter": letter, "date": date, "purpose": purpose, "description": description}
    return {**stated, "sheets": sheets, "words": words}


def model(sheets: list[Any], say: Callable[[str], str] = lambda text: text) -> dict[str, Any]:
    """The package model of these sheets; `say` makes every free text in it."""
    made: dict[str, Any] = {
        "job": {
            "number": "26-031", "title": say("Bus depot"), "location": say("Eastfield"), "client": say("District"),
            "firm": say("Firm"), "document": "26-031-S-01",
        },
        "codes": {"building": "IBC 2021", "concrete": "ACI 318-19", "loads": "ASCE 7-16"},
        "units": "in, lb, psi",
        "revision": {"letter": "B", "date": "2026-11-20", "purpose": say("Plan review"), "description": say("Bars")},
        "state": "draft",
        "mark": "DRAFT, not issued",
        "people": [{"id": "amr", "name": say("A. Rowe"), "roles": ["originator"], "licence": say("PE 00000")}],
        "originators": say("A. Rowe"),
        "checkers": say("S. Tanaka"),
        "log": [
            revision("A", "2026-11-02", say("Plan review"), "First", [], "all"),
            revision("B", "2026-11-20", "Plan review", "Bars", ["C-01"], ""),
        ],
        "open_count": 1,
        "open": [{"kind": say("assumed"), "what": say("P_u"), "where": say("sheet C-01")}],
        "sheets": [],
        "basis": {
            "statement": [say("A frame braced by walls.")],
            "limits": [{"name": say("Deflection"), "value": say("L/360"), "source": say("IBC")}],
            "deferred": [{"item": say("Canopy"), "assumed": say("3 kip/ft"), "by": say("supplier")}],
            "conventions": [say("Compression is positive.")],
        },
        "standards": [{"name": "ACI 318-19", "title": say("Building code"), "clauses": ["22.4.2.2", "25.4.2.4a"]}],
        "documents": [{"name": say("S-001"), "sheets": ["C-01"]}],
        "materials": [], "givens": [], "assumptions": [], "ratios": [],
        "validation": {
            "release": "0.1.0",
            "cases": [
                {
                    "id": "V-1", "what": say("No. 8 bar"), "source": say("design guide"), "kind": "published",
                    "edition": "ACI 318-19", "expected": 47.4, "computed": 47.43, "deviation": "0.06 %",
                    "tolerance": "0.5 %", "holds": True,
                }
            ],
        },
        "statement": say("Local codes govern."),
        "digest": "3f1c" * 16,
        "inputs": [{"name": say("givens.toml"), "sha256": "ab" * 32}],
    }  # fmt: skip
    for nb in sheets:
        _register(made, nb)
    return made


def _register(made: dict[str, Any], nb: Any) -> None:
    items = [output["data"][MIME] for cell in nb.cells for output in cell.get("outputs", ())]
    sheet = items[0]["id"]
    made["sheets"].append({"id": sheet, "subject": items[0]["subject"]})
    for item in items:
        if item["type"] == "given" and item["id"]:
            row = {**{key: item[key] for key in ("id", "symbol", "means", "shown", "source", "status")}, "sheet": sheet}
            made["givens"].append(row)
            made["materials"] += [row] * (item["symbol"] in ("f_c", "f_y"))
            made["assumptions"] += [row] * (item["status"] == "assumed")
        if item["type"] == "verdict":
            made["ratios"].append(
                {
                    **{key: item[key] for key in ("id", "what", "ratio", "ratio_text", "verdict", "clause")},
                    "sheet": sheet, "demand": item["demand"]["shown"], "capacity": item["capacity"]["shown"],
                }
            )  # fmt: skip


class Parsed(HTMLParser):
    """What a browser would see of an HTML text: elements, ids, links and words."""

    VOID = frozenset({"meta", "br", "hr", "img", "link", "input"})

    def __init__(self, source: str) -> None:
        super().__init__(convert_charrefs=True)
        self.elements: list[tuple[str, dict[str, str | None]]] = []
        self.open: list[str] = []
        self.words: list[str] = []
        self.feed(source)
        self.close()

    def handle_starttag(self, tag: str, attrs: list[tuple[str, str | None]]) -> None:
        self.elements.append((tag, dict(attrs)))
        if tag not in self.VOID:
            self.open.append(tag)

    def handle_startendtag(self, tag: str, attrs: list[tuple[str, str | None]]) -> None:
        self.elements.append((tag, dict(attrs)))

    def handle_endtag(self, tag: str) -> None:
        assert self.open.pop() == tag, f"</{tag}> closes another element"

    def handle_data(self, data: str) -> None:
        if "style" not in self.open:
            self.words.append(data)

    def values(self, attribute: str) -> list[str]:
        return [attrs[attribute] or "" for _, attrs in self.elements if attribute in attrs]

    @property
    def text(self) -> str:
        return "".join(self.words)


def squeezed(text: str) -> str:
    """The text without spaces and places to break, to compare what is set in lines with what was given."""
    return "".join(char for char in text if not char.isspace() and char not in "\u200b\u00ad")
