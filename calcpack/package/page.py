"""The package as one HTML file: no script, nothing fetched, equations as MathML, legible on screen and on paper."""

from __future__ import annotations

from collections.abc import Mapping, Sequence
from itertools import chain
from typing import Any

from markupsafe import Markup

from calcpack import fonts
from calcpack.package import templates
from calcpack.package.blocks import anchors
from calcpack.package.front import front

__all__ = ["build_html"]


def build_html(model: Mapping[str, Any], sheets: Sequence[Any]) -> str:
    """The package as HTML; the same arguments give the same text.

    Parameters
    ----------
    model : what the front matter states
    sheets : executed notebooks, in package order
    """
    import jinja2

    from calcpack.package.exporters import fragments

    view = front(model, "html", frozenset(chain.from_iterable(anchors(nb) for nb in sheets)))
    total = len(view["sheets"])
    view["places"] = {sheet["id"]: f"sheet {number} of {total}" for number, sheet in enumerate(view["sheets"], 1)}
    environment = jinja2.Environment(
        loader=jinja2.FileSystemLoader(templates.folder() / "calcpack_html"),
        autoescape=True,
        trim_blocks=True,
        lstrip_blocks=True,
        undefined=jinja2.StrictUndefined,
    )
    return environment.get_template("package.html.j2").render(
        d=view,
        sheets=[Markup(text) for text in fragments(sheets, "html", view)],
        style=Markup(templates.read("calcpack_html/style.css")),
        faces=Markup(fonts.css()),
    )
