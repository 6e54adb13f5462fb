"""Which sheets each revision touched, computed from the content of the issues in the record, never typed."""

from __future__ import annotations

import json
from collections.abc import Mapping
from typing import Any

from calcpack.job import Job
from calcpack.package.collect import Content

__all__ = ["touched"]


def touched(job: Job, content: Content) -> list[tuple[list[str], str]]:
    """For each revision of the log, the sheets it touched, or words where a list would not be true.

    A revision is compared with the one before it, by the digest of each sheet's content. The newest is what the job
    holds now; an older one is read from its manifest in the record.
    """
    now = {sheet.id: content.sheet_hash(sheet.id) for sheet in content.sheets}
    states = [now if revision is job.newest else _issued(job, revision.letter) for revision in job.revisions]
    rows: list[tuple[list[str], str]] = []
    for index, state in enumerate(states):
        before = states[index - 1] if index else None
        if not index:
            rows.append(([], "all"))
        elif state is None or before is None:
            missing = job.revisions[index if state is None else index - 1].letter
            rows.append(([], f"not known: revision {missing} is not in the record"))
        else:
            changed = [sheet for sheet in {**before, **state} if before.get(sheet) != state.get(sheet)]
            rows.append((changed, "" if changed else "none"))
    return rows


def _issued(job: Job, letter: str) -> Mapping[str, str] | None:
    path = job.root / "record" / "issued" / letter / "manifest.json"
    if not path.is_file():
        return None
    data: dict[str, Any] = json.loads(path.read_text("utf-8"))
    return {sheet["id"]: sheet["content"] for sheet in data["sheets"]}
