"""nbconvert exporters: a sheet as HTML or as Typst, alone or as a part of a package.

``jupyter nbconvert --to calcpack_html sheet.ipynb`` writes a document that stands alone. A template escapes by
default: what it prints is text unless it is `Markup`, so no text of an author can become source.
"""

from __future__ import annotations

from collections.abc import Mapping, Sequence
from itertools import chain
from typing import Any

from jinja2 import pass_context
from markupsafe import Markup
from nbconvert.exporters.exporter import Exporter
from nbconvert.exporters.templateexporter import TemplateExporter
from traitlets import Bool, default

from calcpack import fonts
from calcpack.package import templates
from calcpack.package.blocks import anchors, blocks
from calcpack.package.text import literal, printable

__all__ = ["CalcpackHtml", "CalcpackTypst", "fragments"]


class _CalcpackExporter(TemplateExporter):
    """What both exporters share: templates found without installing them, blocks in place of raw cells."""

    target = ""
    isolated = Bool(False, help="Use calcpack's own templates only, whatever this machine has installed.")

    def get_prefix_root_dirs(self) -> list[str]:
        """Where else nbconvert looks for templates."""
        parent: Any = super()
        return [] if self.isolated else list(parent.get_prefix_root_dirs())

    @default("template_name")
    def _template_name_default(self) -> str:
        return f"calcpack_{self.target}"

    @default("extra_template_basedirs")
    def _extra_template_basedirs_default(self) -> list[str]:
        own = str(templates.folder())
        return [own] if self.isolated else [*super()._default_extra_template_basedirs(), own]

    def _create_environment(self) -> Any:
        parent: Any = super()
        environment = parent._create_environment()
        environment.autoescape = True
        environment.trim_blocks = environment.lstrip_blocks = True
        return environment

    def from_notebook_node(self, nb: Any, resources: Any = None, **kw: Any) -> tuple[Any, Any]:
        """Export a notebook.

        Parameters
        ----------
        known : ids of the package the sheet is a part of; the sheet alone is a document of its own
        page : what the title block states, as in the package's model; also only for a part of a package
        """
        known, page = kw.pop("known", None), kw.pop("page", None)
        nb, resources = Exporter.from_notebook_node(self, nb, resources, **kw)
        made = blocks(nb, self.target, known)
        sheet = next((block for block in made if block["kind"] == "sheet"), _untitled(resources))
        output = self.template.render(
            nb=nb, resources=resources, blocks=made, sheet=sheet, fragment=page is not None, page=page, **self.parts()
        )
        return output, resources

    def parts(self) -> dict[str, Any]:
        """What the template of a document that stands alone includes."""
        return {}


def _untitled(resources: Mapping[str, Any]) -> dict[str, Any]:
    name = printable(resources.get("metadata", {}).get("name", "sheet"))
    return {"kind": "sheet", "anchor": "", "id": "", "subject": name, "concrete": ""}


@pass_context
def _as_code(_: Any, value: object) -> Markup:
    # Asking for the context has Jinja leave constants of a template to this function too.
    return literal(value)


class CalcpackHtml(_CalcpackExporter):
    """A sheet as HTML with MathML; one file, no script, nothing fetched."""

    export_from_notebook = "Calculation sheet (HTML)"
    output_mimetype = "text/html"
    target = "html"

    @default("file_extension")
    def _file_extension_default(self) -> str:
        return ".html"

    @default("template_extension")
    def _template_extension_default(self) -> str:
        return ".html.j2"

    def parts(self) -> dict[str, Any]:
        """The style sheet and the faces."""
        return {"style": Markup(templates.read("calcpack_html/style.css")), "faces": Markup(fonts.css())}


class CalcpackTypst(_CalcpackExporter):
    """A sheet as Typst, ready to compile with the faces of `calcpack.fonts`."""

    export_from_notebook = "Calculation sheet (Typst)"
    output_mimetype = "text/x-typst"
    target = "typst"

    @default("file_extension")
    def _file_extension_default(self) -> str:
        return ".typ"

    @default("template_extension")
    def _template_extension_default(self) -> str:
        return ".typ.j2"

    def _create_environment(self) -> Any:
        environment = super()._create_environment()
        environment.finalize = _as_code
        return environment

    def parts(self) -> dict[str, Any]:
        """The house file."""
        return {"house": Markup(templates.read("calcpack_typst/house.typ"))}


_EXPORTERS: dict[str, Any] = {"html": CalcpackHtml, "typst": CalcpackTypst}


def fragments(sheets: Sequence[Any], target: str, page: Mapping[str, Any]) -> list[str]:
    """Each sheet of a package as a part of its document, linked across all of them.

    Parameters
    ----------
    sheets : executed notebooks, in package order
    target : ``html`` or ``typst``
    page : what the title block states, as in the package's model
    """
    exporter = _EXPORTERS[target](isolated=True)
    known = frozenset(chain.from_iterable(anchors(nb) for nb in sheets))
    return [str(exporter.from_notebook_node(nb, known=known, page=page)[0]) for nb in sheets]
