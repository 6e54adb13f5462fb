"""Texts of the author, made fit for a page: characters the shipped faces lack, Markdown, and literals of Typst.

Everything an author types is printed as typed and stays text: HTML in a Markdown cell shows its angle brackets, an
address stays words, and a picture is replaced by its description, because a package points at nothing outside itself.
"""

from __future__ import annotations

import math
import re
from collections.abc import Mapping, Sequence
from functools import cache
from typing import Any

from markupsafe import Markup, escape

from calcpack import fonts

__all__ = ["anchor", "breakable", "html_text", "literal", "parse", "plain_text", "printable", "typst_text"]

Token = Mapping[str, Any]

_DIGEST = re.compile(r"[0-9a-f]{64}")
_LONG = re.compile(r"[^\s\u200b/-]{25,}")
_PIECE = 12
_KEPT = re.compile(r"[A-Za-z0-9_.:-]")
# Joiners and selectors only shape their neighbours, so a face needs no glyph for them.
_SHAPING = frozenset({0x200B, 0x200C, 0x200D, 0xFE0E, 0xFE0F})


def anchor(identifier: str) -> str:
    """The id under which an entry, or a sheet, stands in a document.

    >>> anchor("A-03/l_d.2")
    'A-03:l_d.2'
    """
    text = identifier.replace("/", ":")
    return "".join(char if _KEPT.match(char) else f"-x{ord(char):x}-" for char in text)


def printable(text: object) -> str:
    """The text with every character that no shipped face can show replaced by its code point.

    >>> printable("f\\x07\\u0627")
    'f⟨U+0007⟩⟨U+0627⟩'
    """
    written = str(text).replace("\r\n", "\n").replace("\t", " ")
    return written if written.isascii() and written.isprintable() else "".join(map(_shown, written))


@cache
def _shown(char: str) -> str:
    point = ord(char)
    if char == "\n" or point in _SHAPING or (point in fonts.covered() and (char.isprintable() or char.isspace())):
        return char
    return f"⟨U+{point:04X}⟩"


def breakable(text: str) -> str:
    """The text with places to break in words too long for a column; digests have room and stay whole.

    A break has no glyph of its own: readers of a PDF find it behind every glyph that it follows somewhere.
    """
    return _LONG.sub(lambda match: match[0] if _DIGEST.fullmatch(match[0]) else "\u200b".join(_pieces(match[0])), text)


def _pieces(word: str) -> list[str]:
    return [word[start : start + _PIECE] for start in range(0, len(word), _PIECE)]


def literal(value: object) -> Markup:
    """A value as Typst code: text as a string literal, whatever it holds; `Markup` is code already."""
    match value:
        case Markup():
            return value
        case None:
            return Markup("none")
        case bool():
            return Markup("true" if value else "false")
        case int():
            return Markup(str(value))
        case float() if math.isfinite(value):
            return Markup(repr(value))
        case Mapping():
            pairs = ", ".join(f"{_quoted(str(key))}: {literal(item)}" for key, item in value.items())
            return Markup(f"({pairs})" if pairs else "(:)")
        case list() | tuple():
            return Markup("(" + "".join(f"{literal(item)}, " for item in value).rstrip() + ")")
    return Markup(_quoted(str(value)))


def _quoted(text: str) -> str:
    escaped = text.replace("\\", "\\\\").replace('"', '\\"').replace("\n", "\\n")
    return f'"{escaped}"'


@cache
def _parser() -> Any:
    import mistune

    return mistune.create_markdown(renderer=None, plugins=["table", "strikethrough"])


def parse(source: str) -> list[dict[str, Any]]:
    """The tokens of a Markdown text, blank lines left out."""
    return [token for token in _parser()(printable(source)) if token["type"] != "blank_line"]


def plain_text(token: Token) -> str:
    """The words of a token, without its markup."""
    if "raw" in token:
        return str(token["raw"])
    if token["type"] in ("softbreak", "linebreak"):
        return " "
    return "".join(plain_text(child) for child in token.get("children", ()))


def _unloaded(token: Token) -> str:
    # What a link or picture points at, written out: nothing outside the package is fetched or followed.
    words = "".join(plain_text(child) for child in token.get("children", ()))
    address = str(token["attrs"]["url"])
    if token["type"] == "image":
        return f"[picture: {words or address}]"
    return words if words == address else f"{words} ({address})"


def html_text(tokens: Sequence[Token]) -> Markup:
    """Tokens as HTML that holds no script, no link and no picture."""
    return Markup("").join(_html(token) for token in tokens)


_HTML_TAGS = {
    "paragraph": "p", "block_text": "div", "emphasis": "em", "strong": "strong", "strikethrough": "del",
    "block_quote": "blockquote", "list_item": "li", "table": "table", "table_body": "tbody",
}  # fmt: skip


def _html(token: Token) -> Markup:
    kind = token["type"]
    inner = html_text(token.get("children", ()))
    match kind:
        case "text" | "inline_html":
            return escape(token["raw"])
        case "codespan":
            return Markup("<code>{}</code>").format(token["raw"])
        case "block_code" | "block_html":
            return Markup("<pre>{}</pre>").format(token["raw"].rstrip("\n"))
        case "softbreak":
            return Markup(" ")
        case "linebreak":
            return Markup("<br>")
        case "thematic_break":
            return Markup("<hr>")
        case "link" | "image":
            return escape(_unloaded(token))
        case "list":
            return _html_list(token, inner)
        case "table_head":
            return Markup("<thead><tr>{}</tr></thead>").format(inner)
        case "table_row":
            return Markup("<tr>{}</tr>").format(inner)
        case "table_cell":
            return Markup('<th scope="col">{}</th>' if token["attrs"]["head"] else "<td>{}</td>").format(inner)
    tag = _HTML_TAGS.get(kind, "p")
    return Markup(f"<{tag}>{{}}</{tag}>").format(inner)


def _html_list(token: Token, inner: Markup) -> Markup:
    if not token["attrs"]["ordered"]:
        return Markup("<ul>{}</ul>").format(inner)
    return Markup('<ol start="{}">{}</ol>').format(int(token["attrs"].get("start", 1)), inner)


def typst_text(tokens: Sequence[Token]) -> Markup:
    """Tokens as one Typst expression: content, in which every word is a string literal."""
    parts = [_typst(token) for token in tokens]
    return Markup(" + ").join(parts) if parts else Markup("[]")


_TYPST_CALLS = {"emphasis": "emph", "strong": "strong", "strikethrough": "strike", "block_quote": "quotation"}


def _typst(token: Token) -> Markup:
    kind = token["type"]
    match kind:
        case "text" | "inline_html":
            return _words(token["raw"])
        case "codespan" | "block_code" | "block_html":
            call = "code-words" if kind == "codespan" else "code-lines"
            return Markup(f"{call}({literal(breakable(token['raw'].rstrip(chr(10))))})")
        case "softbreak":
            return Markup("[ ]")
        case "linebreak":
            return Markup("linebreak()")
        case "thematic_break":
            return Markup("hairline()")
        case "link" | "image":
            return _words(_unloaded(token))
        case "list":
            return _typst_list(token)
        case "table":
            return _typst_table(token)
    inner = typst_text(token.get("children", ()))
    return Markup(f"{_TYPST_CALLS.get(kind, 'block' if kind == 'block_text' else 'paragraph')}({inner})")


def _words(text: str) -> Markup:
    return Markup(f"text({literal(breakable(text))})")


def _typst_list(token: Token) -> Markup:
    items = ", ".join(typst_text(item["children"]) for item in token["children"])
    if not token["attrs"]["ordered"]:
        return Markup(f"list({items})")
    return Markup(f"enum(start: {int(token['attrs'].get('start', 1))}, {items})")


def _typst_table(token: Token) -> Markup:
    head, *bodies = token["children"]
    rows = [row for body in bodies for row in body["children"]]
    cells = [[typst_text(cell["children"]) for cell in row["children"]] for row in [head, *rows]]
    return Markup(f"prose-table({literal(cells[0])}, {literal(cells[1:])})")
