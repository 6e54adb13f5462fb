"""Run a job's notebooks, each in a kernel of its own, from clean state; unchanged ones are taken from the last run.

A notebook runs again when its code changed, when a row, given or value it read changed, when a file it opened
changed, or when the program did. Each run says why. A notebook that takes a value from a sheet that has not run yet
is put back until that sheet is done; notebooks that wait for each other are a circular reference.
"""

from __future__ import annotations

import contextlib
import hashlib
import json
import os
import shutil
from collections.abc import Callable, Sequence
from concurrent.futures import FIRST_COMPLETED, Future, ThreadPoolExecutor, wait
from dataclasses import dataclass, field
from pathlib import Path
from typing import Any

from calcpack.carrying import leave, results_folder
from calcpack.errors import LedgerError, Problem, SheetError
from calcpack.items import stored_items
from calcpack.job import Job
from calcpack.ledger import Entry, Ledger
from calcpack.package.execute import Outcome, execute
from calcpack.package.reads import Inputs, file_digest
from calcpack.package.release import release_key

__all__ = ["Executed", "run_sheets", "sheet_id"]

_WORKERS = 2


@dataclass(frozen=True)
class Executed:
    """A notebook after its run.

    Attributes
    ----------
    path : of the notebook, relative to the job
    notebook : the executed notebook (nbformat), with its outputs
    reason : why it ran, or an empty string where the last run still holds
    """

    path: str
    notebook: Any
    reason: str

    @property
    def id(self) -> str:
        """The sheet's id."""
        return sheet_id(self.notebook)


def sheet_id(notebook: Any) -> str:
    """The id of the sheet a notebook makes; empty where it makes none."""
    return next((str(item["id"]) for item in stored_items(notebook) if item["type"] == "sheet"), "")


def run_sheets(job: Job, progress: Callable[[str], None] = lambda _: None) -> list[Executed]:
    """Run what has to run.

    Returns
    -------
    one record for each notebook, in package order

    Raises
    ------
    SheetError : cells that failed, in all notebooks at once; notebooks that make no sheet, or wait for each other
    """
    run = _Run(job, progress)
    run.everything()
    return [run.done[path] for path in run.paths]


@dataclass
class _Run:
    """One run over a job's notebooks; mutable, because it is a schedule being worked off."""

    job: Job
    progress: Callable[[str], None]
    done: dict[Path, Executed] = field(default_factory=dict)
    ledgers: dict[str, Ledger] = field(default_factory=dict)
    failures: list[Problem] = field(default_factory=list)
    records: dict[Path, dict[str, Any] | None] = field(default_factory=dict)
    begun: dict[Path, str] = field(default_factory=dict)
    reasons: dict[Path, str] = field(default_factory=dict)
    _last: tuple[int, int] = (-1, -1)

    def __post_init__(self) -> None:
        self.paths = self.job.sheets()
        self.cache = self.job.root / ".calcpack" / "runs"
        # Results of this run alone: another run of the same job at the same time must not reach them.
        self.results = results_folder(self.job.root.absolute()).with_name(f"results.{os.getpid()}")
        self.inputs = Inputs(self.job)
        self.waiting: dict[Path, str] = {}

    def everything(self) -> None:
        """Run what has to run, in a results folder of this run alone."""
        shutil.rmtree(self.results, ignore_errors=True)
        self.results.mkdir(parents=True)
        try:
            self.work_off()
        finally:
            kept = results_folder(self.job.root)
            shutil.rmtree(kept, ignore_errors=True)
            with contextlib.suppress(OSError):
                self.results.rename(kept)
            shutil.rmtree(self.results, ignore_errors=True)

    def work_off(self) -> None:
        """Start what is ready, take in what is finished, until nothing is left or nothing moves."""
        todo, running = list(self.paths), dict[Future[Any], Path]()
        with ThreadPoolExecutor(_WORKERS) as pool:
            while todo or running:
                for path in [path for path in todo if self.ready(path)]:
                    todo.remove(path)
                    reason = self.stale(path)
                    if reason == _LATER:
                        todo.append(path)
                    elif reason:
                        running[pool.submit(execute, self.results, path)] = path
                        self.progress(f"running {path.name}: {reason}")
                        self.reasons[path] = reason
                if not running:
                    if self.progressed(todo):
                        continue
                    break
                finished, _ = wait(running, return_when=FIRST_COMPLETED)
                for future in finished:
                    path = running.pop(future)
                    if needed := self.finish(path, future.result()):
                        self.waiting[path] = needed
                        todo.append(path)
        if todo and not self.failures:
            raise self.circular(sorted(todo))
        if self.failures:
            raise SheetError(
                f"{len(self.failures)} of {len(self.paths)} notebooks failed", sorted(self.failures, key=str)
            )

    def progressed(self, todo: Sequence[Path]) -> bool:
        """Whether anything moved since the last look; without that, what is left waits for itself."""
        state = (len(todo), len(self.done))
        moved, self._last = state != self._last, state
        return bool(todo) and moved

    def ready(self, path: Path) -> bool:
        """Whether the sheet that a notebook waits for is done."""
        return self.waiting.get(path, "") in {"", *self.ledgers}

    def stale(self, path: Path) -> str:
        """Why the notebook has to run, `_LATER` where a sheet it reads is not done, empty where the last run holds."""
        kept = self.kept(path)
        if kept is None:
            return "first run" if path not in self.waiting else f"took a value from sheet {self.waiting[path]}"
        if kept["source"] != _source_key(path):
            return "its code changed"
        if kept["release"] != release_key():
            return "the program changed"
        for name in kept["opened"]:
            if file_digest(self.job.root / name) != kept["opened"][name]:
                return f"{name} changed"
        for key, digest in kept["reads"]:
            if key.startswith("sheet "):
                sheet, identifier = key.split(" ", 2)[1:]
                if sheet not in self.ledgers:
                    return _LATER if self.may_come(sheet, path) else f"sheet {sheet} is gone"
                found = self.ledgers[sheet].hash(identifier) if identifier in self.ledgers[sheet] else ""
                if found != digest:
                    return f"{identifier} changed"
            elif self.inputs.digest(key) != digest:
                return f"{key} changed"
        self.settle(path, kept["notebook"], "")
        return ""

    def may_come(self, sheet: str, path: Path) -> bool:
        """Whether a notebook still to run may make the sheet."""
        others = [other for other in self.paths if other not in self.done and other != path]
        return any((self.kept(other) or {}).get("sheet") in (sheet, None) for other in others)

    def kept(self, path: Path) -> dict[str, Any] | None:
        """The record of the last run of a notebook."""
        if path not in self.records:
            try:
                record = json.loads((self.cache / f"{path.stem}.json").read_text("utf-8"))
            except (OSError, ValueError):
                record = None
            self.records[path] = record if isinstance(record, dict) and set(_RECORD) <= set(record) else None
        return self.records[path]

    def finish(self, path: Path, outcome: Outcome) -> str:
        """Take in the outcome of a run; returns the sheet that has to run first, if any."""
        if outcome.needs and self.waiting.get(path) != outcome.needs:
            self.begun[path] = sheet_id(outcome.notebook)
            return outcome.needs
        name = f"sheets/{path.name}"
        if outcome.needs:
            problem = Problem(f"needs sheet {outcome.needs}", "a sheet that left its results", "run again", name)
            self.failures.append(problem)
            return ""
        if outcome.failure:
            self.failures.append(outcome.failure)
            self.progress(f"failed  {path.name}")
            return ""
        made = [item["id"] for item in stored_items(outcome.notebook) if item["type"] == "sheet"]
        if len(made) != 1:
            found = f"{len(made)} sheets: {', '.join(made)}" if made else "no sheet"
            problem = Problem(found, "one Sheet(id, subject) in each notebook", "sheet = Sheet('C-01', '…')", name)
            self.failures.append(problem)
            return ""
        self.settle(path, outcome.notebook, self.reasons.get(path, ""))
        record = {
            "source": _source_key(path), "release": release_key(), "sheet": self.done[path].id,
            "reads": _reads(self.done[path].notebook),
            "opened": {file: file_digest(self.job.root / file) for file in outcome.opened},
            "notebook": outcome.notebook,
        }  # fmt: skip
        self.cache.mkdir(parents=True, exist_ok=True)
        _replace(self.cache / f"{path.stem}.json", json.dumps(record, ensure_ascii=False))
        self.progress(f"done    {path.name}")
        return ""

    def settle(self, path: Path, notebook: Any, reason: str) -> None:
        """Take in an executed notebook."""
        import nbformat

        node = nbformat.from_dict(notebook)
        executed = Executed(f"sheets/{path.name}", node, reason)
        if executed.id in self.ledgers:
            other = next(item.path for item in self.done.values() if item.id == executed.id)
            problem = Problem(
                f"sheet id {executed.id} twice", "an id of its own for each sheet", f"see {other}", executed.path
            )
            self.failures.append(problem)
        self.done[path] = executed
        ledger, entries = Ledger(), []
        for item in stored_items(node):
            for key, digest in item.get("reads", ()):
                if key.startswith("sheet "):
                    ledger.admit(key.split(" ", 2)[2], digest)
            for data in item["entries"]:
                entries.append(Entry.from_json(data))
                ledger.add(entries[-1])
        self.ledgers[executed.id] = ledger
        leave(self.results, executed.id, ledger, entries)

    def circular(self, todo: Sequence[Path]) -> SheetError | LedgerError:
        """Why nothing moves: a sheet that is not there, or else sheets that wait for each other in a ring."""
        named = {self.begun.get(path) or (self.kept(path) or {}).get("sheet", ""): path for path in todo}
        wants = {path: self.wanted(path) for path in todo}
        words = {path: f"{path.name} takes a value from sheet {sheet}" for path, sheet in wants.items()}
        lost = [path for path in todo if wants[path] not in named]
        if lost:
            have = f"sheets that ran: {', '.join(sorted(self.ledgers)) or 'none'}"
            return SheetError("a sheet that is not there", [Problem(words[path], have) for path in lost])
        ring = [todo[0]]
        while (after := named[wants[ring[-1]]]) not in ring:
            ring.append(after)
        chain = "; ".join(words[path] for path in ring[ring.index(after) :])
        return LedgerError(f"circular reference between sheets: {chain}")

    def wanted(self, path: Path) -> str:
        """The sheet a notebook waits for: the one its last attempt asked for, or one that its kept run read."""
        read = [key.split(" ", 2)[1] for key, _ in (self.kept(path) or {"reads": []})["reads"] if key[:6] == "sheet "]
        return self.waiting.get(path) or next(sheet for sheet in read if sheet not in self.ledgers)


_LATER = "later"
_RECORD = ("source", "release", "sheet", "reads", "opened", "notebook")


def _reads(notebook: Any) -> list[list[str]]:
    return [list(read) for item in stored_items(notebook) for read in item.get("reads", ())]


def _source_key(path: Path) -> str:
    try:
        cells = json.loads(path.read_bytes())["cells"]
        kept = json.dumps([[cell["cell_type"], "".join(cell["source"])] for cell in cells]).encode()
    except (ValueError, LookupError, TypeError):
        kept = path.read_bytes()  # no notebook; said when it is to run
    return hashlib.sha256(kept).hexdigest()


def _replace(path: Path, text: str) -> None:
    partial = path.with_name(f".{path.name}.{os.getpid()}")
    partial.write_text(text, "utf-8")
    partial.replace(path)
