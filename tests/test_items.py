"""What a cell shows: Markdown and plain text of every kind of item, with any text in them printed as it is."""

from __future__ import annotations

import re
from html.parser import HTMLParser
from pathlib import Path
from types import SimpleNamespace
from typing import Any

import pytest
from job_samples import Shown, axial, casting, make_job, twice
from nbconvert.filters.markdown_mistune import markdown2html_mistune

from calcpack import Sheet
from calcpack.items import MIME, bundle, lines, markdown, plain

NASTY = (
    "say \"quoted\" & 'so' <script>alert(1)</script> <!-- c --> # h $x^2$ $$y$$ `code` ```f``` | pipe | *b* __i__ "
    "~~s~~ [a](javascript:alert(1)) ![i](x.png) \\(z\\) \\[w\\] \\begin{align} <b onclick=x> &lt; &#60; 🧪 é 1. 2) "
    "+ - = > ^ {%raw%}"
)
LINES = "first\nsecond\r\n# third\n\n- fourth\n    fifth\n---\n<script>\n</script>"


class Page(HTMLParser):
    """Tags and words of rendered Markdown."""

    def __init__(self, text: str) -> None:
        super().__init__(convert_charrefs=True)
        self.tags: list[str] = []
        self.words: list[str] = []
        self.feed(markdown2html_mistune(text))
        self.close()

    def handle_starttag(self, tag: str, attrs: list[tuple[str, str | None]]) -> None:
        self.tags.append(tag)

    def handle_data(self, data: str) -> None:
        self.words.append(data)

    def handle_comment(self, data: str) -> None:
        self.tags.append("comment")

    @property
    def text(self) -> str:
        return "".join(self.words)


def squeezed(text: str) -> str:
    return "".join(text.split())


@pytest.fixture
def shown(monkeypatch: pytest.MonkeyPatch) -> Shown:
    return Shown(monkeypatch)


def everything(root: Path, text: str) -> Sheet:
    """A sheet with one item of every kind, `text` wherever an author may write."""
    sheet = Sheet("C-01", text, job=make_job(root))
    f_c = sheet.given("f_c", "4 ksi", means=text, source=text, status="assumed")
    for symbol, value in (("f_y", "60 ksi"), ("A_g", "256 in^2"), ("A_st", "6.32 in^2"), ("h_below", "15 in")):
        sheet.given(symbol, value, source=text)
    strength = sheet.work(axial)
    sheet.work(casting)
    load = sheet.given("P_u", "1300 kip", source=text)
    sheet.verify(text, demand=load, capacity=strength, clause=text)
    sheet.note(text, f_c, text)
    sheet.conclude(text)
    sheet.heading(text)
    sheet.table([text, "b"], [[text, f_c]], caption=text)
    figure: Any = SimpleNamespace(svg="<svg/>", caption=text, alt=text, width=1.0)
    sheet.figure(figure, text)
    return sheet


@pytest.mark.parametrize("text", [NASTY, LINES], ids=["signs", "lines"])
def test_no_text_becomes_markup(tmp_path: Path, shown: Shown, text: str) -> None:
    everything(tmp_path / "job", text)
    printed = 0
    for item in shown.items:
        if item["type"] in ("work", "figure"):
            continue
        page = Page(markdown(item))
        allowed = {"p", "em", "strong", "h2", "h3", "table", "thead", "tbody", "tr", "th", "td", "span"}
        assert set(page.tags) <= allowed | {"a"}, item["type"]
        # What a page would typeset as mathematics is a pair of delimiters in one run of text: ours, at the start.
        runs = [re.sub(r"^\$[^$]+\$ = ", "", words) for words in page.words]
        assert not any(re.search(r"\$.*\$|\\[(\[]|\\begin", words) for words in runs), item["type"]
        found = squeezed(page.text).replace("¶", "")
        printed += found.count(squeezed(text))
        tags = [tag for tag in page.tags if tag in ("h2", "h3", "em", "strong", "a")]
        heading = {"sheet": ["h2", "a"], "heading": ["h3", "a"]}.get(item["type"], [])
        expected = heading + ["em"] * (item.get("status") == "assumed") + ["strong"] * (item["type"] == "verdict")
        assert tags == expected, item["type"]
    assert printed == 15


def test_plain_text_says_the_same(tmp_path: Path, shown: Shown) -> None:
    everything(tmp_path / "job", "Words")
    texts = [plain(item) for item in shown.items]
    assert texts[0] == "C-01  Words"
    assert texts[1] == "f′c = 4 ksi  Words (assumed)  [Words]"
    assert "  Po = 0.85 f′c (Ag − Ast) + fy Ast" in texts[6]
    assert texts[6].endswith("= 1,228 kip")
    assert "since 15 in > 12 in" in texts[7]
    assert texts[9] == "Words: 1,300 kip against 1,228 kip → 1.06 NG"  # 1,300/1,228.112 = 1.0585
    assert texts[10:13] == ["Words4 ksiWords", "Words", "Words"]
    assert texts[13] == "Words  b\nWords  4 ksi"
    assert texts[14] == "[figure] Words"


def test_markdown_of_every_kind(tmp_path: Path, shown: Shown) -> None:
    everything(tmp_path / "job", "Words")
    texts = [markdown(item) for item in shown.items]
    assert texts[0] == "## C\\-01 · Words"
    assert texts[1] == "$f'_{c}$ = 4 ksi — Words *(assumed)* · Words"
    assert texts[6].startswith(
        "*Nominal axial strength at zero eccentricity* · 22\\.4\\.2\\.2\n\n$$\\begin{aligned} P_{o} &="
    )
    assert texts[6].endswith("&= \\mathbf{1{,}228\\ \\mathrm{kip}} \\end{aligned}$$")
    assert "\\text{since }" in texts[7]
    assert texts[9] == "Words: 1,300 kip against 1,228 kip → **1.06 NG**"
    assert texts[13] == "| Words | b |\n| --- | --- |\n| Words | 4 ksi |"
    assert texts[12] == "### Words"


def test_a_working_shows_every_line_with_its_result(tmp_path: Path, shown: Shown) -> None:
    sheet = Sheet("C-01", "Spans", job=make_job(tmp_path / "job"))
    sheet.given("L_1", "5 ft", "span", source="S-1")
    sheet.work(twice)
    text = markdown(shown.last)
    assert text.count("\\begin{aligned}") == text.count("\\end{aligned}") == 2
    assert [line.symbol for line in lines(shown.last)] == ["L_2", "L_3"]
    assert text.count("$$") == 4
    assert text.count("{") == text.count("}")


def test_a_figure_is_shown_as_a_picture(tmp_path: Path, shown: Shown) -> None:
    everything(tmp_path / "job", "Words")
    (figure,) = (bundle(item) for item in shown.of("figure"))
    assert set(figure) == {MIME, "text/plain", "image/svg+xml"}
    assert figure["image/svg+xml"] == "<svg/>"
    (note, _) = (bundle(item) for item in shown.of("note"))
    assert set(note) == {MIME, "text/plain", "text/markdown"}
    assert note[MIME] == shown.of("note")[0]


def test_an_item_of_a_later_release_is_harmless() -> None:
    assert plain({"type": "hologram"}) == ""
    assert markdown({"type": "hologram"}) == ""


@pytest.mark.parametrize("start", ["    four spaces", "\ttab", "   > quote"])
def test_space_at_the_start_of_a_text_starts_no_block(tmp_path: Path, shown: Shown, start: str) -> None:
    Sheet("C-01", "Notes", job=make_job(tmp_path / "job")).note(start)
    page = Page(markdown(shown.last))
    assert page.tags == ["p"]
    assert page.text.split() == start.split()
