"""An SVG drawing made fit to stand inside a page: nothing that runs, nothing fetched, ids of its own."""

from __future__ import annotations

import re
from xml.etree import ElementTree

from calcpack.errors import Problem, SheetError
from calcpack.package.text import printable

__all__ = ["safe_svg"]

_SVG, _XLINK = "http://www.w3.org/2000/svg", "http://www.w3.org/1999/xlink"
_ELEMENTS = frozenset(
    (
        "svg", "g", "defs", "symbol", "use", "path", "rect", "circle", "ellipse", "line", "polyline", "polygon", "text",
        "tspan", "textPath", "title", "desc", "clipPath", "mask", "pattern", "marker", "linearGradient",
        "radialGradient", "stop", "image",
    )
)  # fmt: skip
_INLINE_IMAGE = re.compile(r"data:image/(?:png|jpeg);base64,[A-Za-z0-9+/=\s]*")
_LOCAL = re.compile(r"url\(\s*['\"]?#([^)'\"]*)['\"]?\s*\)")
_DOCTYPE = re.compile(r"<!DOCTYPE[^>\[]*>")


def safe_svg(source: str, prefix: str) -> str:
    """The drawing with drawing elements only; ids start with `prefix`, so that two drawings never share one.

    Raises
    ------
    SheetError : text that is no SVG
    """
    plain = _DOCTYPE.sub("", source, count=1)
    try:
        if "<!DOCTYPE" in plain or "<!ENTITY" in plain:
            raise ElementTree.ParseError("a document type with declarations of its own")
        root = ElementTree.fromstring(plain)
    except ElementTree.ParseError as error:
        raise SheetError("figure", [Problem(f"svg: {error}", "one svg element", "draw it anew")]) from None
    if root.tag != f"{{{_SVG}}}svg":
        raise SheetError("figure", [Problem(f"svg: the outermost element is {root.tag}", "svg", "draw it anew")])
    _clean(root, prefix)
    ElementTree.register_namespace("", _SVG)
    ElementTree.register_namespace("xlink", _XLINK)
    return ElementTree.tostring(root, encoding="unicode")


def _clean(node: ElementTree.Element, prefix: str) -> None:
    for child in list(node):
        name = child.tag.rpartition("}")[2] if isinstance(child.tag, str) else ""
        if name not in _ELEMENTS or not child.tag.startswith(f"{{{_SVG}}}"):
            _drop(node, child)
        else:
            _clean(child, prefix)
    node.text, node.tail = _shown(node.text), _shown(node.tail)
    for key, value in list(node.attrib.items()):
        kept = _attribute(key.rpartition("}")[2], value, prefix)
        if kept is None:
            del node.attrib[key]
        else:
            node.attrib[key] = kept


def _drop(node: ElementTree.Element, child: ElementTree.Element) -> None:
    at = list(node).index(child)
    if child.tail and at:
        node[at - 1].tail = (node[at - 1].tail or "") + child.tail
    elif child.tail:
        node.text = (node.text or "") + child.tail
    node.remove(child)


def _shown(text: str | None) -> str | None:
    return printable(text) if text else text


def _attribute(name: str, value: str, prefix: str) -> str | None:
    if name.lower().startswith("on") or "javascript:" in value.lower() or "@import" in value.lower():
        return None
    if name == "id":
        return f"{prefix}-{value}"
    if name == "href":
        if value.startswith("#"):
            return f"#{prefix}-{value[1:]}"
        return value if _INLINE_IMAGE.fullmatch(value) else None
    renamed = _LOCAL.sub(lambda match: f"url(#{prefix}-{match.group(1)})", value)
    return None if "url(" in _LOCAL.sub("", renamed) else renamed
