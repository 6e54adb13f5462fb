"""The demo package as a reviewer meets it: replayed from the PDF alone, every printed line worked, every link followed.

The ids in brackets are rows of the project's list of what a calculation package owes.
"""

from __future__ import annotations

import hashlib
import json
import re
import sys
from collections.abc import Iterator
from html import unescape
from pathlib import Path
from typing import Any

import pypdf
import pytest
from job_samples import issued_demo

from calcpack.items import lines, stored_items
from calcpack.ledger import Ledger, replay
from calcpack.typeset.digits import last_place, parse_number
from calcpack.typeset.emit import MATHML
from calcpack.typeset.rows import condition_row, equation

sys.path.insert(0, str(Path(__file__).parent / "typeset"))

import page_reading

pytestmark = pytest.mark.slow


@pytest.fixture(scope="module")
def root(tmp_path_factory: pytest.TempPathFactory) -> Path:
    return issued_demo(tmp_path_factory)


@pytest.fixture(scope="module")
def issued(root: Path) -> Path:
    return root / "record" / "issued" / "A"


@pytest.fixture(scope="module")
def pdf(issued: Path) -> pypdf.PdfReader:
    return pypdf.PdfReader(issued / "package.pdf")


def plain(text: str) -> str:
    """A page's text without places to break."""
    return text.replace("\u200b", "").replace("\u00ad", "").replace("\u00a0", " ").replace("\u202f", " ")


@pytest.fixture(scope="module")
def pages(pdf: pypdf.PdfReader) -> list[str]:
    return [plain(page.extract_text()) for page in pdf.pages]


@pytest.fixture(scope="module")
def ledger(pdf: pypdf.PdfReader) -> list[dict[str, Any]]:
    """As embedded in the PDF, the one file that leaves the office."""
    found: list[dict[str, Any]] = json.loads(pdf.attachments["ledger.json"][0])
    return found


@pytest.fixture(scope="module")
def sections(issued: Path) -> dict[str, str]:
    """The body of each sheet in the HTML, by sheet id."""
    text = (issued / "package.html").read_text("utf-8")
    found = re.findall(r'<section class="sheet" aria-label="(\S+)[^"]*">(.*?)</section>', text, re.DOTALL)
    return {sheet: body.split('<div class="flow">')[1] for sheet, body in found if "-0" in sheet}


@pytest.fixture(scope="module")
def notebooks(root: Path) -> list[dict[str, Any]]:
    """The notebooks as executed."""
    return [
        json.loads(path.read_text("utf-8"))["notebook"] for path in sorted((root / ".calcpack" / "runs").glob("*.json"))
    ]


def block(page: str, name: str) -> str:
    """An entry of a page's title block."""
    match = re.search(rf"(?:^|\n){name}\n(.*)\n", page)
    return match[1].strip() if match else ""


# Size and title blocks


def test_it_is_a_package_worth_reading(pages: list[str], sections: dict[str, str]) -> None:
    assert len(sections) >= 6
    assert len(pages) >= 25


def test_every_page_names_its_sheet_its_revision_and_its_number(pages: list[str], sections: dict[str, str]) -> None:
    """A18, A19: sheet, "n of N", revision and date, job number and title, originator and checker, on every page."""
    order: list[str] = []
    for number, page in enumerate(pages[1:], 2):
        assert block(page, "Page") == f"{number} of {len(pages)}"
        assert block(page, "Job") == "26-117"
        assert block(page, "Title") == "Osier Bank Boatworks: workshop and loft"
        assert block(page, "Revision") == "A · 20 Nov 2026"
        assert (block(page, "Originator"), block(page, "Checker")) == (
            "M. K. Verhaal, unsigned", "T. S. Orrin, unsigned",
        )  # fmt: skip
        sheet, subject = block(page, "Sheet"), block(page, "Subject")
        assert sheet
        assert subject
        order.append(sheet)
    kept = [sheet for index, sheet in enumerate(order) if not index or order[index - 1] != sheet]
    assert kept == ["Front", *sections, "Back"]  # each sheet in one piece, in package order


def test_the_cover_says_what_the_job_is(pages: list[str]) -> None:
    """A1, B5, D7: title, place, number, people, purpose, open items, and that it is preliminary."""
    for text in (
        "Osier Bank Boatworks: workshop and loft", "Lot 7, Osier Bank", "26-117", "Osier Bank Harbour Trust",
        "Calder Finch Structural", "M. K. Verhaal", "T. S. Orrin", "PE 00000 (invented)", "Plan review", "IBC 2021",
        "ACI 318-19", "ASCE 7-16", f"{len(pages)} pages", "Open items 2",
    ):  # fmt: skip
        assert text in pages[0], text
    assert all("Plan review: not for construction" in page for page in pages)


def test_the_contents_lead_to_the_page_they_name(pages: list[str], sections: dict[str, str]) -> None:
    """A2: the page that the contents name begins with that sheet."""
    contents = next(page for page in pages if "\nContents\n" in page)
    for sheet in sections:
        match = re.search(rf"^{sheet} .*?(?:\. |\s)+(\d+)$", contents, re.MULTILINE)
        assert match, sheet
        number = int(match[1])
        assert block(pages[number - 1], "Sheet") == sheet
        assert block(pages[number - 2], "Sheet") != sheet
        assert re.search(rf"\n{sheet} ", pages[number - 1])


def test_bookmarks_name_every_sheet(pdf: pypdf.PdfReader, sections: dict[str, str]) -> None:
    """F9."""
    titles = [str(item["/Title"]) for item in pdf.outline if not isinstance(item, list)]
    assert [title.split(" ")[0] for title in titles if re.match(r"[A-Z]-\d\d ", title)] == list(sections)


# The ledger


def test_every_worked_value_is_reproduced_from_the_pdf_alone(ledger: list[dict[str, Any]]) -> None:
    """B6, B9: an independent evaluator, with the embedded expressions and givens alone, finds every result."""
    done = replay(ledger)
    assert [item for item in done if not item.agrees] == []
    worked = {item["id"] for item in ledger if item["kind"] == "worked"}
    checked = {item["id"] for item in ledger if item["kind"] in ("verdict", "solved")}
    assert {item.id for item in done} == worked | checked
    assert len(worked) > 100


def test_the_embedded_ledger_is_the_one_that_was_issued(
    pdf: pypdf.PdfReader, issued: Path, ledger: list[dict[str, Any]]
) -> None:
    """F5: ledger and inputs ride in the file, with the digests that the manifest states; hashes fit the content."""
    assert pdf.attachments["ledger.json"][0] == (issued / "ledger.json").read_bytes()
    manifest = json.loads((issued / "manifest.json").read_text("utf-8"))
    assert manifest["ledger"] == hashlib.sha256(pdf.attachments["ledger.json"][0]).hexdigest()
    for item in manifest["inputs"]:
        data = pdf.attachments[Path(item["name"]).name][0]
        assert hashlib.sha256(data).hexdigest() == item["sha256"], item["name"]
    for name, digest in manifest["files"].items():
        assert hashlib.sha256((issued / name).read_bytes()).hexdigest() == digest, name
    assert len(Ledger.from_json(ledger)) == len(ledger)


def test_embedded_files_are_associated_files(pdf: pypdf.PdfReader) -> None:
    """F4: each embedded file has a relationship and a type, and is listed as associated."""
    associated: Any = pdf.trailer["/Root"]["/AF"]  # type: ignore[index]
    specifications = [item.get_object() for item in associated]
    assert {str(item["/UF"]) for item in specifications} == set(pdf.attachments)
    for item in specifications:
        assert item["/AFRelationship"] == "/Data"
        assert item["/EF"]["/F"].get_object()["/Subtype"]
        assert str(item["/Desc"]).strip()


def test_every_line_cites_its_source(ledger: list[dict[str, Any]]) -> None:
    """B3: each worked line cites a clause or says where it comes from; where it is the code, in the job's edition."""
    for item in ledger:
        if item["kind"] == "worked":
            assert item["clause"].strip(), item["id"]
            assert item.get("edition", "") in ("", "ACI 318-19", "ASCE 7-16") or item["edition"].startswith("ASTM")
    assert sum(item.get("edition") == "ACI 318-19" for item in ledger) > 60


def test_every_given_names_a_document(ledger: list[dict[str, Any]]) -> None:
    """B4: no given without a source; drawings and reports with their revision."""
    for item in ledger:
        if item["kind"] == "given":
            assert item["source"].strip(), item["id"]
            if re.match(r"S-\d|Geotechnical", item["source"]):
                assert re.search(r"rev \d", item["source"]), item


def test_the_summary_of_ratios_is_what_the_ledger_gives(pages: list[str], ledger: list[dict[str, Any]]) -> None:
    """A15: every verdict stands in the summary with the ratio that demand and capacity give."""
    summary = "\n".join(page for page in pages if block(page, "Subject").startswith("Summary of ratios"))
    values = {item["id"]: item["value"] for item in ledger}
    verdicts = [item for item in ledger if item["kind"] == "verdict"]
    assert len(verdicts) > 20
    flat = re.sub(r"\s+", "", summary)
    for item in verdicts:
        ratio = values[item["demand"]] / values[item["capacity"]]
        assert item["verdict"] == ("OK" if ratio <= 1.0 + 1e-9 else "NG")
        assert abs(float(item["shown"]) - ratio) <= 0.5000001 * last_place(item["shown"]), item["id"]
        assert re.sub(r"\s+", "", item["means"]) in flat, item["means"]
        assert f"{item['shown']}{item['verdict']}" in flat


# Printed lines, worked


def close(value: float, text: str) -> bool:
    """Whether a value is what is printed, to the last digit give or take one."""
    return abs(value - page_reading.printed_number(text)) <= last_place(text) * (1 + 1e-9)


def test_every_printed_line_gives_its_printed_result(notebooks: list[dict[str, Any]]) -> None:
    """B6, B7: whoever works a line from its printed numbers gets the printed result."""
    count = 0
    for notebook in notebooks:
        for item in stored_items(notebook):
            for line in lines(item) if item["type"] == "work" else ():
                rows = equation(line.symbol, line.layout, line.values, MATHML)
                tokens = [token for _, right in rows for token in page_reading.mathml(right)]
                value = page_reading.worked(page_reading.split_at_equals(tokens)[-1])
                assert close(value, line.line_result), (line.symbol, value, line.line_result)
                for layout, values in line.conditions:
                    assert page_reading.holds(page_reading.mathml(condition_row(layout, values, MATHML)[1]))
                count += 1
    assert count > 100


_ROW = re.compile(r'<span class="right[^"]*"><math[^>]*>(.*?)</math>', re.DOTALL)
_RESULT = re.compile(r'<span class="result"><span id="[^"]+"><math[^>]*>(.*?)</math>', re.DOTALL)
_SINCE = re.compile(r", that is (.*?)(?:; since|</span>(?!</))", re.DOTALL)


def printed_lines(body: str) -> Iterator[tuple[list[list[page_reading.Token]], str, str]]:
    """Worked lines of a sheet's HTML: the parts between the equals signs, the result, and the source of the line."""
    for line in re.split(r'<div class="line(?: wide)?">', body)[1:]:
        if not _RESULT.search(line):
            continue  # an equation in symbols, above a table of its results
        tokens = [token for right in _ROW.findall(line) for token in page_reading.mathml(right)]
        result = page_reading.split_at_equals(page_reading.mathml(_RESULT.findall(line)[0]))[-1]
        assert len(result) == 1
        yield page_reading.split_at_equals(tokens), plain(str(result[0][1])), line


def test_every_line_of_the_page_gives_its_result(sections: dict[str, str], notebooks: list[dict[str, Any]]) -> None:
    """B6, B7: the same, read from the HTML as it was issued."""
    count = conditions = 0
    for body in sections.values():
        for parts, result, source in printed_lines(body):
            last = parts[-1]
            if len(parts) > 1 and len(last) == 1 and last[0][0] == "number" and len(parts[-2]) > 1:
                # The result in the unit of the line stands at its end, where it is read in another one.
                text = plain(str(last[0][1]))
                if not close(page_reading.worked(parts[-2]), text):
                    text = ""
                value = page_reading.worked(parts[-2] if text else last)
                assert close(value, text or result), source
            else:
                assert close(page_reading.worked(last), result), source
            for said in _SINCE.findall(source):
                for condition in re.findall(r"<math[^>]*>(.*?)</math>", said, re.DOTALL):
                    assert page_reading.holds(page_reading.mathml(condition)), condition
                    conditions += 1
            count += 1
    shown = [item for notebook in notebooks for item in stored_items(notebook) if item["type"] == "work"]
    assert count == sum(len(item["lines"]) for item in shown) > 400
    assert conditions > 20


def test_every_cell_of_a_worked_table_states_its_entry(
    notebooks: list[dict[str, Any]], ledger: list[dict[str, Any]]
) -> None:
    """B7: what a cell shows is the value of its entry, to the last digit."""
    entries = {item["id"]: item for item in ledger}
    count = 0
    for notebook in notebooks:
        for item in stored_items(notebook):
            for data in item["entries"] if item["type"] == "tabulated" else ():
                entry = entries[data["id"]]
                number, unit = entry["shown"].partition(" ")[::2]
                scale = {"kip": 1e3, "kip·ft": 12e3, "ksi": 1e3}.get(unit, 1.0)
                assert abs(parse_number(number) * scale - entry["value"]) <= last_place(number) * scale * 0.5001
                count += 1
    assert count > 200


# Links


def test_every_link_of_the_html_has_its_target(issued: Path) -> None:
    """A12, B1: nothing outside the file is needed to follow a value."""
    text = (issued / "package.html").read_text("utf-8")
    ids = re.findall(r'\sid="([^"]+)"', text)
    links = re.findall(r'href="([^"]+)"', text)
    assert len(ids) == len(set(ids))
    assert len(links) > 500
    assert all(link.startswith("#") and unescape(link[1:]) in ids for link in links)


def unprinted(notebooks: list[dict[str, Any]]) -> set[str]:
    """Entries of workings that are told in one line, or in one cell of a table: the ledger alone holds them."""
    found: set[str] = set()
    for item in (item for notebook in notebooks for item in stored_items(notebook)):
        if item["type"] in ("note", "tabulated"):
            cells = [*(cell for row in item.get("rows", ()) for cell in row["cells"]), *item.get("totals", ())]
            found |= {entry["id"] for entry in item["entries"]} - {cell["id"] for cell in cells if cell}
    return found


def test_every_printed_value_of_the_ledger_can_be_linked_to(
    issued: Path, ledger: list[dict[str, Any]], notebooks: list[dict[str, Any]]
) -> None:
    ids = set(re.findall(r'\sid="([^"]+)"', (issued / "package.html").read_text("utf-8")))
    printed = {item["id"] for item in ledger} - unprinted(notebooks)
    assert {identifier.replace("/", ":") for identifier in printed} <= ids
    assert len(printed) > 800


def targets(pdf: pypdf.PdfReader, pages: list[str]) -> dict[str, list[tuple[int, float, float]]]:
    """Links of each sheet of the PDF in reading order: page and place that they lead to."""
    numbers = {page.indirect_reference.idnum: index for index, page in enumerate(pdf.pages) if page.indirect_reference}
    found: dict[str, list[tuple[int, float, float]]] = {}
    for page, text in zip(pdf.pages, pages, strict=True):
        for reference in page.get("/Annots", ()):
            annotation = reference.get_object()
            if annotation["/Subtype"] == "/Link":
                place = annotation["/Dest"].get_object()
                if isinstance(place, str):
                    place = pdf.named_destinations[place].dest_array
                target = (numbers[place[0].idnum], float(place[2]), float(place[3]))
                found.setdefault(block(text, "Sheet"), []).append(target)
    return found


def test_every_substituted_value_of_the_pdf_leads_to_its_origin(
    pdf: pypdf.PdfReader,
    pages: list[str],
    sections: dict[str, str],
    ledger: list[dict[str, Any]],
    notebooks: list[dict[str, Any]],
) -> None:
    """B1: each link lands on the page that holds the value's line, on the sheet where it was set."""
    found = targets(pdf, pages)
    tables = [item for notebook in notebooks for item in stored_items(notebook) if item["type"] == "tabulated"]
    cells = {entry["id"] for item in tables for entry in item["entries"]}
    entries = {item["id"]: item for item in ledger}
    places: dict[str, set[tuple[int, float, float]]] = {}
    for sheet, body in sections.items():
        wanted = [unescape(link) for link in re.findall(r'href="#([^"]+)"', body)]
        assert len(found[sheet]) == len(wanted), sheet
        for identifier, place in zip(wanted, found[sheet], strict=True):
            places.setdefault(identifier.replace(":", "/"), set()).add(place)
    assert sum(len(found[sheet]) for sheet in sections) > 400
    for identifier, spots in places.items():
        assert len(spots) == 1, identifier  # a value has one origin
        ((page, _, _),) = spots
        entry = entries[identifier]
        assert block(pages[page], "Sheet") == entry["sheet"], identifier
        # The unit of a cell stands in the head of its column.
        text = entry["shown"].partition(" ")[0] if identifier in cells else entry["shown"]
        assert re.sub(r"\s", "", text) in re.sub(r"\s", "", pages[page]), identifier
    everywhere = [next(iter(spots)) for spots in places.values()]
    assert len(set(everywhere)) == len(everywhere)  # and two values never share one


def test_values_of_other_sheets_name_them(sections: dict[str, str]) -> None:
    """B1: beside a value carried from another sheet stands that sheet's id."""
    for sheet, body in sections.items():
        for link, beside in re.findall(
            r'<a href="#([^":]+):[^"]*">[^<]*</a>(?:<span class="from">([^<]*)</span>)?', body
        ):
            if link != sheet:
                assert beside in (link, ""), (sheet, link)
    assert '<span class="from">L-01</span>' in sections["F-01"]
    assert '<span class="from">L-02</span>' in sections["F-01"]


def test_figures_are_drawn_and_described(sections: dict[str, str]) -> None:
    """A13, F7: figures to scale with words for whoever cannot see them."""
    figures = re.findall(r'<div role="img" aria-label="([^"]*)"', "".join(sections.values()))
    assert len(figures) >= 6
    assert all(len(words) > 20 for words in figures)


def test_the_sheets_of_the_manifest(issued: Path, sections: dict[str, str]) -> None:
    manifest = json.loads((issued / "manifest.json").read_text("utf-8"))
    assert [item["id"] for item in manifest["sheets"]] == list(sections)
    assert len({item["content"] for item in manifest["sheets"]}) == len(sections)
    assert manifest["state"] == "preliminary"
