"""The PDF as a reader program sees it: pages, links, outline, tags, attachments, claims."""

from __future__ import annotations

import io
import re
from collections.abc import Iterator
from datetime import UTC, datetime
from pathlib import Path
from typing import Any

import pypdf
import pytest
from package_samples import NASTY, columns_sheet, model, squeezed
from pypdf.generic import DictionaryObject

from calcpack.package.pdf import Attachment, build_pdf

WHEN = datetime(2026, 11, 20, 12, tzinfo=UTC)
ATTACHED = [
    Attachment("ledger.json", b'{"entries": []}', "application/json", "The ledger of every value"),
    Attachment("inputs/columns.csv", b"mark\nC1\n", "text/csv", "The column schedule", "source"),
]
POINTS = 72 / 25.4
# Letter paper is 279.4 mm high; the title block stands in the top margin of 37 mm.
BODY_TOP = (279.4 - 37) * POINTS


@pytest.fixture(scope="module")
def pdf(sheets: list[Any]) -> bytes:
    return build_pdf(model(sheets), sheets, ATTACHED, WHEN)


@pytest.fixture(scope="module")
def reader(pdf: bytes) -> pypdf.PdfReader:
    return pypdf.PdfReader(io.BytesIO(pdf))


def header(page: Any) -> str:
    """The words in the top margin of a page."""
    found: list[str] = []

    def visit(text: str, cm: Any, tm: Any, *_: Any) -> None:
        if cm[3] * tm[5] + cm[5] > BODY_TOP:
            found.append(text)

    page.extract_text(visitor_text=visit)
    return " ".join("".join(found).split())


def starts(reader: pypdf.PdfReader) -> dict[str, int]:
    """Page of each bookmark."""
    return {item.title: reader.get_destination_page_number(item) for item in reader.outline}


def links(page: Any) -> Iterator[DictionaryObject]:
    for annotation in page.get("/Annots", ()):
        if annotation.get_object()["/Subtype"] == "/Link":
            yield annotation.get_object()


def test_bookmarks_are_the_sections_in_order(reader: pypdf.PdfReader) -> None:
    assert list(starts(reader)) == [
        "Bus depot", "Revisions", "Contents", "Basis of design", "Materials", "Assumptions", "Given values",
        "Summary of ratios", "Open items", "C-01 Columns, levels 1 to 3", "A-03 Top bars at the canopy",
        "References", "Validation record",
    ]  # fmt: skip


def test_every_page_names_its_own_sheet(reader: pypdf.PdfReader) -> None:
    begin = starts(reader)
    bounds = [begin["C-01 Columns, levels 1 to 3"], begin["A-03 Top bars at the canopy"], begin["References"]]
    assert bounds[2] - bounds[1] >= 3, "the sample has to run over pages"
    for number, page in enumerate(reader.pages):
        words = header(page)
        if number == 0:
            assert "Originator" not in words
            continue
        sheet, subject = next(
            (
                named
                for named, first, end in (
                    (("C-01", "Columns, levels 1 to 3"), bounds[0], bounds[1]),
                    (("A-03", "Top bars at the canopy"), bounds[1], bounds[2]),
                    (("Front", ""), 1, bounds[0]),
                    (("Back", "References and validation record"), bounds[2], len(reader.pages)),
                )
                if first <= number < end
            )
        )
        assert re.search(rf"Sheet {sheet}\b", words), (number, words)
        assert subject in words
        others = {"C-01", "A-03", "Front", "Back"} - {sheet}
        assert not any(re.search(rf"Sheet {other}\b", words) for other in others)


def test_every_page_states_number_total_revision_job_and_mark(reader: pypdf.PdfReader) -> None:
    total = len(reader.pages)
    for number, page in enumerate(reader.pages, 1):
        words = " ".join(page.extract_text().split())
        assert "DRAFT, not issued" in words
        if number > 1:
            top = header(page)
            for text in (f"Page {number} of {total}", "B · 20 Nov 2026", "26-031", "Bus depot", "A. Rowe", "S. Tanaka"):
                assert text in top
    assert reader.page_labels == [str(number) for number in range(1, total + 1)]


def test_no_mark_where_there_is_none(sheets: list[Any]) -> None:
    final = {**model(sheets), "mark": "", "state": "final"}
    made = pypdf.PdfReader(io.BytesIO(build_pdf(final, sheets, [], WHEN)))
    assert not any("DRAFT" in page.extract_text() for page in made.pages)


def test_a_value_links_to_where_it_was_set(reader: pypdf.PdfReader) -> None:
    begin = starts(reader)
    first, second = begin["C-01 Columns, levels 1 to 3"], begin["A-03 Top bars at the canopy"]
    targets = [target_page(reader, link) for link in links(reader.pages[second])]
    # f'c comes from the other sheet: once as a given, once in the equation.
    assert targets.count(first) == 2
    assert targets.count(second) >= 6


def target_page(reader: pypdf.PdfReader, link: DictionaryObject) -> int:
    place = link["/A"]["/D"] if "/A" in link else link["/Dest"]
    if isinstance(place, str):
        return reader.get_destination_page_number(reader.named_destinations[place])
    return [page.indirect_reference for page in reader.pages].index(place[0].indirect_reference)


def test_every_link_leads_to_a_page_and_none_leaves(reader: pypdf.PdfReader) -> None:
    found = [link for page in reader.pages for link in links(page)]
    assert len(found) > 40
    for link in found:
        assert "/URI" not in link.get("/A", {})
        assert 0 <= target_page(reader, link) < len(reader.pages)


def test_the_contents_and_the_summary_print_the_pages_they_link_to(reader: pypdf.PdfReader) -> None:
    begin = starts(reader)
    contents = " ".join(reader.pages[begin["Contents"]].extract_text().split())
    for name in ("C-01 Columns, levels 1 to 3", "A-03 Top bars at the canopy", "Validation record"):
        words = re.escape(name.split(" ", 1)[1] if "-0" in name else name)
        assert re.search(rf"{words}[ .]*{begin[name] + 1}\b", contents), name
    assert re.search(r"Axial strength ?\d", contents)
    summary = " ".join(reader.pages[begin["Summary of ratios"]].extract_text().split())
    assert re.search(rf"C3 carries its load .*OK {begin['C-01 Columns, levels 1 to 3'] + 1}\b", summary)


def test_a_sheet_can_be_opened_by_its_id(reader: pypdf.PdfReader) -> None:
    begin = starts(reader)
    for sheet, title in (("C-01", "C-01 Columns, levels 1 to 3"), ("A-03", "A-03 Top bars at the canopy")):
        assert reader.get_destination_page_number(reader.named_destinations[sheet]) == begin[title]


def test_claims_and_what_they_ask_for(reader: pypdf.PdfReader) -> None:
    root = reader.trailer["/Root"]
    xmp = root["/Metadata"].get_data().decode()
    assert "<pdfaid:part>3</pdfaid:part>" in xmp
    assert "<pdfaid:conformance>A</pdfaid:conformance>" in xmp
    assert "<pdfuaid:part>1</pdfuaid:part>" in xmp
    assert root["/MarkInfo"]["/Marked"]
    assert root["/Lang"].startswith("en")
    assert root["/ViewerPreferences"]["/DisplayDocTitle"]
    assert "/OutputIntents" in root
    assert "/Encrypt" not in reader.trailer
    assert reader.metadata is not None
    assert reader.metadata.title == "26-031 Bus depot: structural calculations"


def tags(node: Any) -> Iterator[DictionaryObject]:
    node = node.get_object()
    if isinstance(node, DictionaryObject):
        yield node
        children = node.get("/K", [])
        for child in children if isinstance(children, list) else [children]:
            yield from tags(child)


def test_tags_are_those_of_a_calculation(reader: pypdf.PdfReader) -> None:
    found = [tag for tag in tags(reader.trailer["/Root"]["/StructTreeRoot"]) if "/S" in tag]
    kinds = [tag["/S"] for tag in found]
    assert {"/H1", "/H2", "/Table", "/TH", "/TOC", "/Formula", "/Figure", "/Link"} <= set(kinds)
    for tag in found:
        if tag["/S"] in ("/Formula", "/Figure"):
            assert len(tag["/Alt"].strip()) > 0
    spoken = [tag["/Alt"] for tag in found if tag["/S"] == "/Formula"]
    assert any(words.startswith("P o equals 1,554") for words in spoken)
    assert [tag["/Alt"] for tag in found if tag["/S"] == "/Figure"] == ["A rectangle"]


def test_attachments_ride_with_type_relation_and_description(reader: pypdf.PdfReader) -> None:
    assert {name: data[0] for name, data in reader.attachments.items()} == {
        "ledger.json": b'{"entries": []}', "inputs/columns.csv": b"mark\nC1\n",
    }  # fmt: skip
    files = {spec.get_object()["/UF"]: spec.get_object() for spec in reader.trailer["/Root"]["/AF"]}
    assert files["ledger.json"]["/AFRelationship"] == "/Data"
    assert files["inputs/columns.csv"]["/AFRelationship"] == "/Source"
    assert files["ledger.json"]["/Desc"] == "The ledger of every value"
    assert files["inputs/columns.csv"]["/EF"]["/F"].get_object()["/Subtype"] == "/text/csv"


def test_the_same_package_gives_the_same_bytes(pdf: bytes, sheets: list[Any]) -> None:
    assert build_pdf(model(sheets), sheets, ATTACHED, WHEN) == pdf


def test_the_date_is_the_one_given(reader: pypdf.PdfReader) -> None:
    assert reader.metadata is not None
    assert reader.metadata.creation_date == WHEN


def test_all_fonts_are_embedded(reader: pypdf.PdfReader) -> None:
    names = set()
    for page in reader.pages:
        for font in page["/Resources"].get("/Font", {}).values():
            for inner in font.get_object().get("/DescendantFonts", [font]):
                descriptor = inner.get_object()["/FontDescriptor"]
                assert {"/FontFile2", "/FontFile3"} & set(descriptor)
                names.add(descriptor["/FontName"].split("+")[-1].split("-")[0])
    assert {"IBMPlexSansCond", "LibertinusSerif", "STIXTwoMath"} <= names


def test_a_ratio_above_one_is_said_in_words(reader: pypdf.PdfReader) -> None:
    text = " ".join(page.extract_text() for page in reader.pages)
    assert re.search(r"1\.32\s+NG", text)
    assert re.search(r"0\.39\s+OK", text)


def test_any_text_is_printed_as_it_is(job: Path, monkeypatch: pytest.MonkeyPatch) -> None:
    def say(text: str) -> str:
        return f"{text} {NASTY} \u4e2d\x07"

    sheet = columns_sheet(job, monkeypatch, say)
    made = pypdf.PdfReader(io.BytesIO(build_pdf(model([sheet], say), [sheet], ATTACHED, WHEN)))
    shown = squeezed("".join(page.extract_text() for page in made.pages))
    # Title blocks and footers cut a text of this length; it stands in full elsewhere.
    for start in ("Columns, levels 1 to 3", "S-001, note 4", "Combinations", "C3 is adequate:",
                  "Bus depot", "Local codes govern.", "L/360", "A frame braced by walls."):  # fmt: skip
        assert squeezed(f"{start} {NASTY}⟨U+4E2D⟩⟨U+0007⟩") in shown, start
    assert not any("/URI" in link.get("/A", {}) for page in made.pages for link in links(page))


def lefts(page: Any) -> list[float]:
    """Where each run of words starts."""
    places: list[float] = []

    def visit(text: str, cm: Any, tm: Any, *_: Any) -> None:
        if text.strip():
            places.append(cm[0] * tm[4] + cm[4])

    page.extract_text(visitor_text=visit)
    return places


def test_nothing_stands_outside_the_page(job: Path, monkeypatch: pytest.MonkeyPatch) -> None:
    sheet = columns_sheet(job, monkeypatch, lambda text: f"{text} {NASTY}")
    made = pypdf.PdfReader(io.BytesIO(build_pdf(model([sheet]), [sheet], [], WHEN)))
    for page in made.pages:
        # Letter paper is 612 points wide, with margins of 19 and 15 mm.
        assert all(19 * POINTS - 1 <= x <= 612 - 15 * POINTS for x in lefts(page))


def test_a_package_without_sheets_or_entries() -> None:
    empty = {**model([]), "ratios": [], "open": [], "open_count": 0, "people": [], "standards": [], "documents": []}
    made = pypdf.PdfReader(io.BytesIO(build_pdf(empty, [], [], WHEN)))
    assert "No check is made." in " ".join(page.extract_text() for page in made.pages)
