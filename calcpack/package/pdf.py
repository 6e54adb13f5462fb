"""The package as PDF/A-3a and PDF/UA-1, through the Typst compiler that its Python package carries."""

from __future__ import annotations

import json
import shutil
import tempfile
from collections.abc import Mapping, Sequence
from dataclasses import dataclass
from datetime import datetime
from itertools import chain
from pathlib import Path
from typing import TYPE_CHECKING, Any

from calcpack import fonts
from calcpack.package import templates
from calcpack.package.blocks import anchors
from calcpack.package.front import front

if TYPE_CHECKING:
    from typst import PDFStandard

__all__ = ["Attachment", "build_pdf"]

_STANDARDS: list[PDFStandard] = ["a-3a", "ua-1"]


@dataclass(frozen=True)
class Attachment:
    """A file that rides in the PDF.

    Attributes
    ----------
    relationship : to the document: ``source``, ``data``, ``alternative`` or ``supplement``
    """

    name: str
    data: bytes
    mime: str
    description: str
    relationship: str = "data"


def build_pdf(
    model: Mapping[str, Any], sheets: Sequence[Any], attachments: Sequence[Attachment], timestamp: datetime
) -> bytes:
    """The package as one PDF; the same arguments give the same bytes.

    Parameters
    ----------
    model : what the front matter states
    sheets : executed notebooks, in package order
    attachments : files to embed
    timestamp : stands as the date of creation
    """
    import typst

    with tempfile.TemporaryDirectory(prefix="calcpack") as folder:
        root = Path(folder)
        _write(root, model, sheets, attachments)
        return bytes(
            typst.compile(
                str(root / "package.typ"),
                root=str(root),
                font_paths=[str(fonts.folder())],
                ignore_system_fonts=True,
                format="pdf",
                pdf_standards=_STANDARDS,
                timestamp=timestamp,
            )
        )


def _write(root: Path, model: Mapping[str, Any], sheets: Sequence[Any], attachments: Sequence[Attachment]) -> None:
    from calcpack.package.exporters import fragments

    for path in (templates.folder() / "calcpack_typst").glob("*.typ"):
        shutil.copyfile(path, root / path.name)
    view = front(model, "typst", frozenset(chain.from_iterable(anchors(nb) for nb in sheets)))
    view["sheet_files"] = _files(root, "sheet", [text.encode() for text in fragments(sheets, "typst", view)], ".typ")
    paths = _files(root, "attached", [attachment.data for attachment in attachments], "")
    view["attached"] = [
        {"path": path, **{key: getattr(attachment, key) for key in ("name", "mime", "description", "relationship")}}
        for path, attachment in zip(paths, attachments, strict=True)
    ]
    (root / "model.json").write_text(json.dumps(view, ensure_ascii=False), "utf-8")


def _files(root: Path, name: str, contents: Sequence[bytes], suffix: str) -> list[str]:
    names = [f"{name}-{number}{suffix}" for number in range(len(contents))]
    for file, content in zip(names, contents, strict=True):
        (root / file).write_bytes(content)
    return names
