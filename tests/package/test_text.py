from __future__ import annotations

import io

import pypdf
import pytest
import typst
from markupsafe import Markup
from package_samples import NASTY, Parsed, squeezed

from calcpack import fonts
from calcpack.package import templates, text


def typeset(expression: str) -> str:
    """The text of a PDF/A page that shows a Typst expression; a missing glyph would be refused."""
    source = f"{templates.read('calcpack_typst/house.typ')}\n#show: pages.with((:))\n#prose({expression})"
    pdf = typst.compile(
        source.encode(),
        font_paths=[str(fonts.folder())],
        ignore_system_fonts=True,
        format="pdf",
        pdf_standards=["a-3b"],
        timestamp=0,
    )
    return "\n".join(page.extract_text() for page in pypdf.PdfReader(io.BytesIO(pdf)).pages)


@pytest.mark.parametrize(
    ("identifier", "expected"),
    [("C-01", "C-01"), ("A-03/l_d.2", "A-03:l_d.2"), ("A-03/é x", "A-03:-xe9--x20-x"), ('a"#<', "a-x22--x23--x3c-")],
)
def test_anchor(identifier: str, expected: str) -> None:
    assert text.anchor(identifier) == expected


@pytest.mark.parametrize(
    ("given", "shown"),
    [
        ("4,000 psi · ℓ_d ≤ 12 in²", "4,000 psi · ℓ_d ≤ 12 in²"),
        ("🧪 👩\u200d🚀 ❤\ufe0f", "🧪 👩\u200d🚀 ❤\ufe0f"),
        ("line\r\nnext\ttab", "line\nnext tab"),
        ("bell\x07", "bell⟨U+0007⟩"),
        ("turned\u202e", "turned⟨U+202E⟩"),
        ("\u4e2d", "⟨U+4E2D⟩"),
        ("\U0001fbff", "⟨U+1FBFF⟩"),
        ("\ud800", "⟨U+D800⟩"),
    ],
)
def test_printable(given: str, shown: str) -> None:
    assert text.printable(given) == shown
    assert text.printable(shown) == shown


def test_a_long_word_gets_places_to_break_and_a_short_one_none() -> None:
    assert text.breakable("W" * 24) == "W" * 24
    assert text.breakable("0f" * 32) == "0f" * 32
    assert text.breakable("W" * 25) == f"{'W' * 12}\u200b{'W' * 12}\u200bW"
    assert text.breakable(("W" * 20 + " ") * 3) == ("W" * 20 + " ") * 3


@pytest.mark.parametrize(
    ("value", "code"),
    [
        ('a "b" \\ #c\n', '"a \\"b\\" \\\\ #c\\n"'),
        (Markup("frac(1, 2)"), "frac(1, 2)"),
        (None, "none"),
        (True, "true"),
        (3, "3"),
        (0.75, "0.75"),
        (float("inf"), '"inf"'),
        ([1], "(1,)"),
        ([], "()"),
        ({"a": "b"}, '("a": "b")'),
        ({}, "(:)"),
    ],
)
def test_literal(value: object, code: str) -> None:
    assert text.literal(value) == code


def test_a_literal_is_read_by_typst_as_it_was_given() -> None:
    assert squeezed(NASTY) in squeezed(typeset(f"text({text.literal(NASTY)})"))


MARKDOWN = """para *em* **strong** ~~gone~~ `co<de>`
soft\x20\x20
hard

- one
  - inner
- two

4. four

> quoted

    indented

| h | i |
|---|---|
| 1 | **2** |

---
"""


def test_markdown_as_html() -> None:
    html = text.html_text(text.parse(MARKDOWN))
    assert str(html) == (
        "<p>para <em>em</em> <strong>strong</strong> <del>gone</del> <code>co&lt;de&gt;</code> soft<br>hard</p>"
        "<ul><li><div>one</div><ul><li><div>inner</div></li></ul></li><li><div>two</div></li></ul>"
        '<ol start="4"><li><div>four</div></li></ol><blockquote><p>quoted</p></blockquote><pre>indented</pre>'
        '<table><thead><tr><th scope="col">h</th><th scope="col">i</th></tr></thead>'
        "<tbody><tr><td>1</td><td><strong>2</strong></td></tr></tbody></table><hr>"
    )


def test_markdown_as_typst_shows_the_same_words() -> None:
    tokens = text.parse(MARKDOWN)
    words = Parsed(str(text.html_text(tokens))).text
    shown = squeezed(typeset(text.typst_text(tokens)))
    assert "4." in shown
    for word in ("em", "strong", "gone", "co<de>", "soft", "hard", "one", "inner", "two", "quoted", "indented", "2"):
        assert word in shown
        assert word in words


@pytest.mark.parametrize(
    ("source", "words"),
    [
        ("[a](javascript:alert(1))", "a (javascript:alert(1))"),
        ("<http://example.org/x>", "http://example.org/x"),
        ("![plan](http://example.org/p.png)", "[picture: plan]"),
        ("![](p.png)", "[picture: p.png]"),
        ("<img src=x onerror=alert(1)>", "<img src=x onerror=alert(1)>"),
        ("<script>alert(1)</script>", "<script>alert(1)</script>"),
        ("a <b onclick=x>b</b>", "a <b onclick=x>b</b>"),
        ("&lt; &#x2060;", "&lt; &#x2060;"),
        ("$f'_c$ and #set", "$f'_c$ and #set"),
    ],
)
def test_nothing_in_markdown_runs_or_points_outside(source: str, words: str) -> None:
    tokens = text.parse(source)
    parsed = Parsed(str(text.html_text(tokens)))
    assert parsed.text == words
    assert {tag for tag, _ in parsed.elements} <= {"p", "pre"}
    assert not any(attrs for _, attrs in parsed.elements)
    assert squeezed(words) in squeezed(typeset(text.typst_text(tokens)))


def test_no_markdown_is_no_content() -> None:
    assert text.parse("\n\n") == []
    assert text.html_text([]) == ""
    assert text.typst_text([]) == "[]"


def test_plain_text_of_a_heading() -> None:
    (heading,) = text.parse("# Bars *at* `x`\n")
    assert text.plain_text(heading) == "Bars at x"
