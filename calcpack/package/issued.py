"""What was issued, read back: the ledger of a folder, of a ``ledger.json`` or of a PDF, and what its manifest says.

Nothing of a package is executed, and a ledger that was changed by hand is refused.
"""

from __future__ import annotations

import hashlib
import io
import json
from collections.abc import Mapping
from dataclasses import dataclass, field
from pathlib import Path
from typing import Any, NoReturn

from calcpack.errors import InputError, LedgerError, Problem
from calcpack.ledger import Ledger

__all__ = ["Issued", "read_issued", "read_pair"]

_ALLOWED = "an issued folder, a draft folder, a package.pdf or a ledger.json"


@dataclass(frozen=True)
class Issued:
    """A package, or what of it is there.

    Attributes
    ----------
    path : as it was given
    job : number of the job, empty where it is not known
    label : revision, purpose and state in words, empty where they are not known
    sheets : id to subject; empty where there is no manifest
    digest : SHA-256 of its ledger.json
    """

    path: str
    ledger: Ledger
    job: str = ""
    label: str = ""
    sheets: Mapping[str, str] = field(default_factory=dict)
    digest: str = ""


def read_pair(old: Path, new: Path) -> tuple[Issued, Issued]:
    """Read two packages; what is wrong with either is told at once.

    Raises
    ------
    InputError : one of them is not there, carries no ledger, or was changed by hand
    """
    read, errors = [], []
    for path in (old, new):
        try:
            read.append(read_issued(path))
        except InputError as error:
            errors.append(error)
    if errors:
        raise errors[0] if len(errors) == 1 else InputError.gathered("two packages cannot be read", errors)
    return read[0], read[1]


def read_issued(path: Path) -> Issued:
    """Read a package: a folder with ``ledger.json`` or ``package.pdf``, or one of these files.

    Raises
    ------
    InputError : it is not there, carries no ledger, or was changed by hand
    """
    if not path.exists():
        _refuse(path, "not there", f"{_ALLOWED}, such as JOB/record/issued/A")
    if path.is_dir():
        return _from_folder(path)
    if not path.is_file():
        _refuse(path, "neither a folder nor a file", _ALLOWED)
    return _from_bytes(path, _bytes(path))


def _from_folder(folder: Path) -> Issued:
    files = [folder / name for name in ("ledger.json", "package.pdf") if (folder / name).is_file()]
    if not files:
        there = [*sorted(folder.glob("record/issued/[!.]*")), *folder.glob("draft")]
        remedy = f"this is a job folder; take {' or '.join(str(path) for path in there)}" if there else ""
        _refuse(folder, "a folder without ledger.json and package.pdf", _ALLOWED, remedy)
    return _from_bytes(folder, _bytes(files[0]), _manifest(folder / "manifest.json"))


def _from_bytes(path: Path, data: bytes, manifest: Mapping[str, Any] | None = None) -> Issued:
    label = ""
    if b"%PDF-" in data[:1024]:
        data, label = _embedded(path, data)
    elif data.lstrip()[:1] == b"<":
        _refuse(path, "a page for a browser, which carries no ledger", _ALLOWED, "take the package.pdf beside it")
    digest = hashlib.sha256(data).hexdigest()
    if manifest is None:
        return Issued(str(path), _ledger(path, data), label=label, digest=digest)
    if manifest["ledger"] != digest:
        _refuse(path, "its ledger is not the one that manifest.json names", "files as calcpack wrote them", _AGAIN)
    sheets = {sheet["id"]: str(sheet.get("subject", "")) for sheet in manifest["sheets"]}
    return Issued(str(path), _ledger(path, data), str(manifest["job"]), _label(manifest), sheets, digest)


_AGAIN = "take an untouched copy, or make it again with calcpack draft or issue"


def _ledger(path: Path, data: bytes) -> Ledger:
    try:
        items = json.loads(data, parse_constant=_no_number)
        if not isinstance(items, list):
            raise LedgerError("not a list of entries")
        ledger = Ledger.from_json(items)
        bare = [item["id"] for item in items if not item.get("hash")]
        if bare:
            more = f" and {len(bare) - 1} more" if bare[1:] else ""
            raise LedgerError(f"{bare[0]}{more} without a hash; the ledger was changed by hand")
    except (LedgerError, ValueError, OverflowError, RecursionError) as error:
        words = str(error) if isinstance(error, LedgerError) else f"not JSON of a ledger: {error}"
        _refuse(path, words, "a ledger as calcpack wrote it", _AGAIN)
    return ledger


def _no_number(name: str) -> NoReturn:
    raise ValueError(f"{name} is no number")


def _manifest(path: Path) -> Mapping[str, Any] | None:
    if not path.is_file():
        return None
    try:
        data = json.loads(_bytes(path))
        whole = isinstance(data["ledger"], str) and data["job"] is not None
        whole = whole and all(isinstance(sheet["id"], str) and hasattr(sheet, "get") for sheet in data["sheets"])
        _label(data)
    except (ValueError, RecursionError, LookupError, TypeError, AttributeError):
        whole = False
    if not whole:
        _refuse(path, "not a manifest that calcpack wrote", "job, revision, state, ledger and sheets", _AGAIN)
    found: Mapping[str, Any] = data
    return found


def _label(manifest: Mapping[str, Any]) -> str:
    revision = manifest["revision"]
    words = f"revision {revision['letter']}, {revision['purpose']}"
    return f"draft of {words}" if manifest["state"] == "draft" else words


def _embedded(path: Path, data: bytes) -> tuple[bytes, str]:
    """The ledger that a PDF carries, and what the PDF says it is."""
    import pypdf

    try:
        reader = pypdf.PdfReader(io.BytesIO(data))
        ledgers = [bytes(found) for found in reader.attachments.get("ledger.json", [])]
        label = (reader.metadata.subject if reader.metadata else None) or ""
    except Exception as error:
        # A broken file raises whatever its broken place leads to.
        _refuse(path, f"a PDF that cannot be read: {error or type(error).__name__}", "a whole PDF", _AGAIN)
    if not ledgers:
        _refuse(path, "a PDF that carries no ledger.json", "the PDF of a package, with its embedded files", _AGAIN)
    if len(set(ledgers)) > 1:
        _refuse(path, f"a PDF with {len(ledgers)} files called ledger.json", "one ledger", _AGAIN)
    return ledgers[0], label


def _bytes(path: Path) -> bytes:
    try:
        return path.read_bytes()
    except OSError as error:
        _refuse(path, f"cannot be read: {error.strerror}", "a file you may read")


def _refuse(path: Path, given: str, allowed: str, remedy: str = "") -> NoReturn:
    raise InputError("no package to compare", [Problem(given, allowed, remedy, str(path))])
