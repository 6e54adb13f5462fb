from __future__ import annotations

import re

import pytest

from calcpack.errors import SheetError
from calcpack.package.drawings import safe_svg

HEAD = '<svg xmlns="http://www.w3.org/2000/svg" xmlns:xlink="http://www.w3.org/1999/xlink" width="10" height="10">'


def clean(body: str) -> str:
    return safe_svg(f"{HEAD}{body}</svg>", "p")


def test_a_drawing_is_kept() -> None:
    body = '<g transform="scale(2)"><path d="M0 0L1 1" style="stroke: #000"/><text x="1">18″ × 2</text></g>'
    assert clean(body).endswith(
        '<g transform="scale(2)"><path d="M0 0L1 1" style="stroke: #000" /><text x="1">18″ × 2</text></g></svg>'
    )


def test_ids_and_what_refers_to_them_get_the_prefix() -> None:
    uses = '<use xlink:href="#c"/><use href="#c"/>'
    out = clean(f'<clipPath id="c"/>{uses}<g clip-path="url(#c)" style="fill: url(#d)"/>')
    assert 'id="p-c"' in out
    assert out.count('href="#p-c"') == 2
    assert 'clip-path="url(#p-c)"' in out
    assert 'style="fill: url(#p-d)"' in out


@pytest.mark.parametrize(
    "body",
    [
        "<script>alert(1)</script>",
        '<foreignObject><body xmlns="http://www.w3.org/1999/xhtml">x</body></foreignObject>',
        "<style>* { fill: red }</style>",
        '<g onload="alert(1)"/>',
        '<g ONCLICK="alert(1)"/>',
        '<image href="http://evil.example/x.png"/>',
        '<image href="file:///etc/passwd"/>',
        '<use xlink:href="other.svg#a"/>',
        '<a href="javascript:alert(1)"><text>x</text></a>',
        '<g fill="url(http://evil.example/a)"/>',
        "<g style=\"background: url( 'http://evil.example/a' )\"/>",
        "<g style=\"@import 'a.css'\"/>",
        '<animate attributeName="href" to="javascript:alert(1)"/>',
        '<script xmlns="http://www.w3.org/1999/xhtml">alert(1)</script>',
        "<!-- alert -->",
        "<?php alert ?>",
    ],
)
def test_what_runs_or_fetches_is_dropped(body: str) -> None:
    out = clean(body)
    assert not re.search("alert|evil|passwd|other.svg|fill: red|import|foreign|xhtml", out)


def test_an_inline_picture_stays() -> None:
    assert 'href="data:image/png;base64,iVBORw0K"' in clean('<image href="data:image/png;base64,iVBORw0K"/>')


def test_words_after_a_dropped_element_stay() -> None:
    assert ">abc</text>" in clean("<text>a<script>x</script>b<!-- c -->c</text>")
    assert ">ab</text>" in clean("<text><tspan/>a<script/>b</text>")[-30:]


def test_letters_without_a_glyph_are_shown_as_code() -> None:
    assert ">⟨U+4E2D⟩</text>" in clean("<text>\u4e2d</text>")


def test_a_doctype_without_declarations_is_taken_off() -> None:
    doctype = '<?xml version="1.0"?><!DOCTYPE svg PUBLIC "-//W3C//DTD SVG 1.1//EN" "svg11.dtd">'
    assert safe_svg(f"{doctype}{HEAD}</svg>", "p").startswith("<svg")


@pytest.mark.parametrize(
    ("source", "message"),
    [
        ("no drawing", "svg: syntax error"),
        ("<svg/>", "svg: the outermost element is svg"),
        (f'<!DOCTYPE svg [<!ENTITY a "b">]>{HEAD}</svg>', "a document type with declarations of its own"),
    ],
)
def test_what_is_no_svg_is_refused(source: str, message: str) -> None:
    with pytest.raises(SheetError, match=message):
        safe_svg(source, "p")
