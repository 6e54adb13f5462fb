"""From a job folder to the files of a package: run, collect, gate, assemble, typeset, write."""

from __future__ import annotations

import time
from collections.abc import Callable, Sequence
from dataclasses import dataclass, field
from datetime import UTC, datetime
from pathlib import Path
from typing import Any

from calcpack.errors import LedgerError, Problem, RefusedError, TableError
from calcpack.job import Job
from calcpack.ledger import replay
from calcpack.package.assemble import assemble, ledger_bytes
from calcpack.package.collect import Content, collect
from calcpack.package.gate import Open, is_final, open_items
from calcpack.package.members import check_members
from calcpack.package.release import release
from calcpack.package.run import run_sheets
from calcpack.package.write import clear_remains, manifest, replace_draft, write_issue

__all__ = ["Built", "build", "draft", "issue", "ledger_of"]

Progress = Callable[[str], None]


@dataclass(frozen=True)
class Built:
    """A package before it is written.

    Attributes
    ----------
    files : name to bytes
    open : what is not settled
    seconds : how long each stage took; for the person at the terminal, never part of a file
    """

    content: Content
    files: dict[str, bytes]
    open: tuple[Open, ...]
    seconds: dict[str, float] = field(default_factory=dict)


class _Clock:
    """Times the stages of a build."""

    def __init__(self) -> None:
        self.seconds: dict[str, float] = {}
        self.last = time.perf_counter()

    def lap(self, stage: str) -> None:
        """End a stage."""
        now = time.perf_counter()
        self.seconds[stage] = now - self.last
        self.last = now


def build(job: Job, state: str, progress: Progress = lambda _: None) -> Built:
    """Make the files of a package; nothing is written but the kept runs and layouts in ``.calcpack``.

    Parameters
    ----------
    state : ``draft`` or ``issue``

    Raises
    ------
    SheetError, TableError, LedgerError : the job is not fit to be typeset
    """
    clock = _Clock()
    if not job.sheets():
        problem = Problem("no notebook in sheets/", "at least one sheet", "calcpack start makes a job with one")
        raise TableError(f"{job.number}: nothing to typeset", [problem])
    checks = check_members(job)
    clock.lap("schedules")
    content = collect(run_sheets(job, progress))
    clock.lap("notebooks")
    _replayed(content)
    found = open_items(job, content, checks)
    if state == "issue":
        state = _gated(job, found)
    model = assemble(job, content, found, state)
    notebooks = [sheet.notebook for sheet in content.sheets]
    ledger = ledger_bytes(content.ledger)
    clock.lap("assembly")
    progress("typesetting HTML")
    files = {"ledger.json": ledger, "package.html": _html(model, notebooks)}
    clock.lap("HTML")
    progress("typesetting PDF")
    files["package.pdf"] = _pdf(job, model, notebooks, ledger)
    clock.lap("PDF")
    sheets = {sheet.id: content.sheet_hash(sheet.id) for sheet in content.sheets}
    files["manifest.json"] = manifest(model, files, sheets, release())
    return Built(content, files, tuple(found), clock.seconds)


def draft(job: Job, progress: Progress = lambda _: None) -> tuple[Built, Path]:
    """Build the package as it stands and put it in ``draft/``."""
    clear_remains(job.root)
    built = build(job, "draft", progress)
    return built, replace_draft(job.root, built.files)


def issue(job: Job, progress: Progress = lambda _: None) -> tuple[Built, Path, bool]:
    """Build the newest revision and put it in ``record/issued/``.

    Returns
    -------
    what was built, its folder, and whether it was written (``False``: issued already, with the same content)

    Raises
    ------
    RefusedError : no revision in job.toml, open items under a final purpose, or an issued letter with other content
    """
    clear_remains(job.root)
    if job.newest is None:
        raise RefusedError("job.toml has no [[revision]]: add letter, date, purpose and description, then issue it")
    built = build(job, "issue", progress)
    folder, written = write_issue(job.root, job.newest.letter, built.files)
    return built, folder, written


def ledger_of(job: Job, progress: Progress = lambda _: None) -> Content:
    """The content of a job as it stands, without typesetting."""
    return collect(run_sheets(job, progress))


def _gated(job: Job, found: Sequence[Open]) -> str:
    assert job.newest is not None
    if not is_final(job.newest.purpose):
        return "preliminary"
    blocks = [item for item in found if item.blocks]
    if blocks:
        lines = "\n".join(f"  {item.kind}: {item.what}  [{item.where}]" for item in blocks)
        raise RefusedError(
            f"revision {job.newest.letter} is for {job.newest.purpose!r}, and {len(blocks)} items are open:\n{lines}\n"
            "settle them, or issue under a preliminary purpose such as 'Plan review'"
        )
    return "final"


def _replayed(content: Content) -> None:
    """Work every printed line again from the ledger alone; a package that does not replay is not made."""
    wrong = [line for line in replay(content.ledger.to_json()) if not line.agrees]
    if wrong:
        lines = "\n".join(f"  {line.id}: states {line.stated!r}, {line.what} gives {line.replayed!r}" for line in wrong)
        raise LedgerError(f"{len(wrong)} lines do not replay from the ledger:\n{lines}")


def _html(model: dict[str, Any], notebooks: Sequence[Any]) -> bytes:
    from calcpack.package.page import build_html

    return build_html(model, list(notebooks)).encode()


def _pdf(job: Job, model: dict[str, Any], notebooks: Sequence[Any], ledger: bytes) -> bytes:
    from calcpack.package.pdf import Attachment, build_pdf

    attachments = [Attachment("ledger.json", ledger, "application/json", "every value of the package, for replay")]
    for item in model["inputs"]:
        path = job.root / item["name"]
        attachments.append(Attachment(path.name, path.read_bytes(), _mime(path), f"input of the job: {item['name']}"))
    day = job.newest.date if job.newest else None
    stamp = datetime(day.year, day.month, day.day, tzinfo=UTC) if day else datetime(2000, 1, 1, tzinfo=UTC)
    return build_pdf(model, list(notebooks), attachments, stamp)


_MIMES = {".csv": "text/csv", ".toml": "application/toml", ".json": "application/json"}
_SPREADSHEET = "application/vnd.openxmlformats-officedocument.spreadsheetml.sheet"


def _mime(path: Path) -> str:
    return _SPREADSHEET if path.suffix == ".xlsx" else _MIMES.get(path.suffix, "application/octet-stream")
