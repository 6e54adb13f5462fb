"""Where the templates are: inside an installed package, or beside it in a source tree."""

from __future__ import annotations

from functools import cache
from pathlib import Path

__all__ = ["folder", "read"]

_PACKAGE = Path(__file__).resolve().parent.parent


@cache
def folder() -> Path:
    """The folder that holds ``calcpack_html`` and ``calcpack_typst``.

    Raises
    ------
    FileNotFoundError : an installation without its templates
    """
    for place in (_PACKAGE / "_report_templates", _PACKAGE.parent / "report_templates"):
        if (place / "calcpack_html" / "conf.json").is_file():
            return place
    raise FileNotFoundError(f"no templates in {_PACKAGE / '_report_templates'}: install calcpack again")


def read(name: str) -> str:
    """The text of a template file, e.g. ``calcpack_typst/house.typ``."""
    return (folder() / name).read_text("utf-8")
