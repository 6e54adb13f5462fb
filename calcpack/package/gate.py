"""What stands between a package and its issue: open items, and whether they block."""

from __future__ import annotations

import re
from collections.abc import Iterator, Sequence
from dataclasses import dataclass

from calcpack.job import Job
from calcpack.package.collect import Content, SheetContent
from calcpack.package.members import JobChecks
from calcpack.units import plain_unit

__all__ = ["Open", "is_final", "open_items"]

# Purposes under which a package is relied on; any other is a preliminary issue (package requirement D7).
_FINAL = re.compile(r"\b(construction|permit|final|record|as[- ]built)\b", re.IGNORECASE)


@dataclass(frozen=True)
class Open:
    """Something not settled.

    Attributes
    ----------
    kind : ``assumed``, ``ratio``, ``not checked`` or ``output``
    what : in words
    where : sheet or file
    blocks : whether a final issue is refused for it
    """

    kind: str
    what: str
    where: str
    blocks: bool = True


def is_final(purpose: str) -> bool:
    """Whether a package of that purpose is relied on: construction, permit, final, record, as built."""
    return bool(_FINAL.search(purpose)) and not re.search(r"\b(not for|prelim)", purpose, re.IGNORECASE)


def open_items(job: Job, content: Content | None, checks: JobChecks) -> list[Open]:
    """Everything open, in the order a reader meets it; `content` is ``None`` where the sheets did not run."""
    found = list(_assumed(job, content))
    if content is not None:
        found += _failed(content)
        found += _foreign(content)
        found += _unconfirmed(content)
    found += [Open("ratio", f"{result.mark}: {result.check} NG", checks.where(result)) for result in checks.failed()]
    found += [Open("not checked", text, where) for text, where in checks.owed]
    return found


def _assumed(job: Job, content: Content | None) -> Iterator[Open]:
    listed = {row.symbol for row in job.givens if row.status == "assumed"}
    for row in job.givens:
        if row.symbol in listed:
            yield Open("assumed", f"{row.means} = {plain_unit(row.text)}", "inputs/givens.toml")
    for entry in content.ledger if content else ():
        if entry.kind == "given" and entry.status == "assumed" and entry.symbol not in listed:
            yield Open("assumed", f"{entry.means} = {entry.shown}", f"sheet {entry.sheet}")


def _failed(content: Content) -> Iterator[Open]:
    for entry in content.ledger:
        if entry.kind == "verdict" and entry.verdict != "OK":
            yield Open("ratio", f"{entry.means}: ratio {entry.shown} {entry.verdict}", f"sheet {entry.sheet}")


def _unconfirmed(content: Content) -> Iterator[Open]:
    for entry in content.ledger:
        if entry.kind == "solved" and not entry.confirmed_by:
            yield Open("output", f"{entry.id} = {entry.shown}, found by iteration, is not confirmed", entry.sheet)


def _foreign(content: Content) -> Sequence[Open]:
    from calcpack.package.blocks import foreign_outputs

    return [
        Open("output", f"{_cell(sheet, index)} shows {words}: not of the sheet, not printed", sheet.path, False)
        for sheet in content.sheets
        for index, words in foreign_outputs(sheet.notebook)
    ]


def _cell(sheet: SheetContent, index: int) -> str:
    return f"cell [{sheet.notebook['cells'][index]['execution_count']}]"
