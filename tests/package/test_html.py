"""The HTML package as a browser sees it."""

from __future__ import annotations

import re
import shutil
import subprocess
from collections import Counter
from pathlib import Path
from typing import Any

import pypdf
import pytest
from package_samples import NASTY, Parsed, columns_sheet, model, squeezed

from calcpack.package.page import build_html


@pytest.fixture(scope="module")
def html(sheets: list[Any]) -> str:
    return build_html(model(sheets), sheets)


@pytest.fixture(scope="module")
def page(html: str) -> Parsed:
    return Parsed(html)


def test_every_link_has_one_target(page: Parsed) -> None:
    ids = Counter(page.values("id"))
    assert max(ids.values()) == 1
    links = page.values("href")
    assert len(links) > 40
    for link in links:
        assert link.startswith("#")
        assert ids[link[1:]] == 1, link


def test_values_sections_and_sheets_can_be_linked_to(page: Parsed) -> None:
    assert set(page.values("id")) >= {
        "C-01", "A-03", "C-01:f_c", "C-01:P_o", "C-01:verdict", "A-03:l_d", "A-03:psi_t", "_contents", "_summary",
    }  # fmt: skip
    assert page.values("href").count("#C-01:f_c") >= 3


def test_nothing_runs_and_nothing_is_fetched(html: str, page: Parsed) -> None:
    tags = {tag for tag, _ in page.elements}
    assert not tags & {"script", "iframe", "object", "embed", "link", "form", "base", "img"}
    assert not any(name.startswith("on") for _, attrs in page.elements for name in attrs)
    addresses = set(re.findall(r"https?://[^\s\"'<>)]+", html))
    assert addresses <= {"http://www.w3.org/2000/svg", "http://www.w3.org/1999/xlink"}
    assert not re.findall(r"url\((?!data:|#)", html)
    (policy,) = page.values("http-equiv")
    assert policy == "Content-Security-Policy"
    assert page.elements[[attrs.get("http-equiv") for _, attrs in page.elements].index(policy)][1]["content"] == (
        "default-src 'none'; style-src 'unsafe-inline'; font-src data:; img-src data:"
    )


def test_the_document_is_well_formed_and_in_english(page: Parsed) -> None:
    assert page.open == []
    assert page.elements[0] == ("html", {"lang": "en-US"})
    assert "26-031 Bus depot: structural calculations" in page.text


def test_faces_ride_in_the_file(html: str) -> None:
    faces = re.findall(r'@font-face \{ font-family: "([^"]+)"', html)
    assert set(faces) == {"IBM Plex Sans Condensed", "Libertinus Serif", "STIX Two Math"}


def test_each_sheet_is_a_section_with_its_title_block(html: str) -> None:
    sections = re.findall(r'<section class="sheet[^"]*" aria-label="([^"]*)">(.*?)</section>', html, re.DOTALL)
    assert [label for label, _ in sections] == [
        "Revisions and contents", "Basis of design and registers", "Summary of ratios and open items",
        "C-01 Columns, levels 1 to 3", "A-03 Top bars at the canopy", "References and validation record",
    ]  # fmt: skip
    for label, body in sections[3:5]:
        words = " ".join(Parsed(body.split('<div class="flow">')[0]).text.split())
        sheet, subject = label.split(" ", 1)
        assert f"Sheet {sheet} " in f"{words} "
        for text in (f"Subject {subject}", "Job 26-031", "Title Bus depot", "B · 20 Nov 2026", "DRAFT, not issued"):
            assert text in words


def test_equations_are_mathml_with_words(page: Parsed) -> None:
    tags = Counter(tag for tag, _ in page.elements)
    assert tags["math"] > 30
    assert tags["mfrac"] >= 4
    assert any(words.startswith("P o equals 1,554") for words in page.values("alttext"))
    shown = [attrs for tag, attrs in page.elements if tag == "math" and "displaystyle" in attrs]
    assert shown
    assert {attrs["displaystyle"] for attrs in shown} == {"true"}


def test_figures_say_what_they_show(page: Parsed) -> None:
    figures = [attrs for tag, attrs in page.elements if attrs.get("role") == "img"]
    assert [attrs["aria-label"] for attrs in figures] == ["A rectangle"]


def test_tables_have_heads(page: Parsed) -> None:
    tags = Counter(tag for tag, _ in page.elements)
    assert tags["thead"] == tags["table"]
    assert all(attrs.get("scope") == "col" for tag, attrs in page.elements if tag == "th")


def test_a_word_stands_beside_every_bar(page: Parsed) -> None:
    words = " ".join(page.text.split())
    assert re.search(r"0\.39 OK", words)
    assert re.search(r"1\.32 NG", words)


def test_the_mark_stands_where_there_is_one(sheets: list[Any], page: Parsed) -> None:
    assert page.text.count("DRAFT, not issued") == 7
    final = Parsed(build_html({**model(sheets), "mark": "", "state": "final"}, sheets))
    assert "DRAFT" not in final.text
    assert "Final" in final.text


def test_the_same_package_gives_the_same_text(html: str, sheets: list[Any]) -> None:
    assert build_html(model(sheets), sheets) == html


def test_any_text_is_printed_as_it_is(job: Path, monkeypatch: pytest.MonkeyPatch) -> None:
    def say(text: str) -> str:
        return f"{text} {NASTY} \u4e2d\x07"

    sheet = columns_sheet(job, monkeypatch, say)
    source = build_html(model([sheet], say), [sheet])
    page = Parsed(source)
    assert page.open == []
    assert not {tag for tag, _ in page.elements} & {"script", "b-", "img"}
    assert squeezed(page.text).count(squeezed(f"{NASTY}⟨U+4E2D⟩⟨U+0007⟩")) >= 40
    assert all(link.startswith("#") for link in page.values("href"))


def test_a_package_without_sheets_or_entries() -> None:
    page = Parsed(build_html({**model([]), "open": [], "open_count": 0, "people": []}, []))
    assert "No check is made." in page.text
    assert "not named" in page.text


@pytest.mark.slow
@pytest.mark.skipif(shutil.which("chromium") is None, reason="needs a browser")
def test_on_paper_every_page_carries_title_block_and_number(tmp_path: Path, html: str) -> None:
    (tmp_path / "package.html").write_text(html, "utf-8")
    command = [
        "chromium", "--headless", "--no-sandbox", "--disable-gpu", "--disable-background-networking",
        f"--user-data-dir={tmp_path / 'profile'}", "--no-pdf-header-footer", f"--print-to-pdf={tmp_path / 'p.pdf'}",
        (tmp_path / "package.html").as_uri(),
    ]  # fmt: skip
    subprocess.run(command, check=True, capture_output=True, timeout=120)
    pages = [" ".join(page.extract_text().split()) for page in pypdf.PdfReader(tmp_path / "p.pdf").pages]
    assert sum("Sheet A-03" in page for page in pages) >= 2
    for number, page in enumerate(pages, 1):
        assert f"page {number} of {len(pages)}" in page
        assert number == 1 or "B · 20 Nov 2026" in page
