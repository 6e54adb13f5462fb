"""The front and back matter of a package as plain data: what cover, registers and records print."""

from __future__ import annotations

import hashlib
import json
import re
from collections.abc import Iterable, Mapping, Sequence
from typing import Any

from calcpack.job import Job
from calcpack.ledger import Entry, Ledger
from calcpack.package.collect import Content
from calcpack.package.gate import Open, is_final
from calcpack.package.release import release
from calcpack.package.revisions import touched

__all__ = ["DEFERENCE", "assemble", "ledger_bytes"]

DEFERENCE = (
    "This package supports the judgement of the engineer in responsible charge and does not replace it. "
    "The codes adopted where the building stands, with their local amendments, and the decisions of the authority "
    "having jurisdiction govern over anything printed here. Whoever seals the package answers for it."
)
_MATERIALS = ("f_c", "f_y", "f_yt", "E_s", "E_c", "w_c", "lamb", "q_allow")
_CONVENTIONS = (
    "Compression is positive. Forces are factored unless a line says otherwise.",
    "Lengths are in inches, forces in pounds and stresses in psi inside a line unless other units stand beside the "
    "values; a line with a root of the concrete strength holds in psi only.",
    "A ratio is demand over capacity; up to 1.00 is OK.",
    "Printed values carry enough figures that a line worked from them gives the printed result to its last digit, "
    "give or take one; results are carried on unrounded.",
    "A value in blue is a link to the line or given where it was set; a sheet id beside it names another sheet.",
)


def assemble(job: Job, content: Content, open_items: Sequence[Open], state: str) -> dict[str, Any]:
    """The model the templates print.

    Parameters
    ----------
    state : ``draft``, ``preliminary`` or ``final``
    """
    newest = job.newest
    stated = [entry for entry in content.ledger if entry.kind == "given"]
    givens = _register(stated)
    return {
        "job": {name: getattr(job, name) for name in ("number", "title", "location", "client", "firm", "document")},
        "codes": {"building": job.codes.building, "concrete": job.codes.concrete, "loads": job.codes.loads},
        "units": "in, lb, psi",
        "revision": _revision(newest),
        "state": state,
        "mark": _mark(state, newest.purpose if newest else ""),
        "people": [
            {"id": person.id, "name": person.name, "roles": list(person.roles), "licence": person.licence}
            for person in job.people
        ],
        "originators": _names(job, "originator"),
        "checkers": _names(job, "checker"),
        "log": [
            {**_revision(revision), "sheets": sheets, "words": words}
            for revision, (sheets, words) in zip(job.revisions, touched(job, content), strict=True)
        ],
        "open_count": len([item for item in open_items if item.blocks]),
        "assumed_count": len([item for item in open_items if item.kind == "assumed"]),
        "open": [{"kind": item.kind, "what": item.what, "where": item.where} for item in open_items],
        "sheets": [{"id": sheet.id, "subject": sheet.subject} for sheet in content.sheets],
        "basis": {
            "statement": list(job.statement),
            "limits": [{"name": item.name, "value": item.value, "source": item.source} for item in job.limits],
            "deferred": [{"item": item.item, "assumed": item.assumed, "by": item.by} for item in job.deferred],
            "conventions": list(_CONVENTIONS),
        },
        "standards": _standards(job, content.ledger),
        "documents": _documents(content.ledger),
        "materials": _materials(stated),
        "givens": givens,
        "assumptions": [row for row in givens if row["status"] == "assumed"],
        "ratios": [_ratio(content.ledger, entry) for entry in content.ledger if entry.kind == "verdict"],
        "validation": _validation(),
        "statement": DEFERENCE,
        "digest": hashlib.sha256(ledger_bytes(content.ledger)).hexdigest(),
        "inputs": input_digests(job),
    }


def ledger_bytes(ledger: Ledger) -> bytes:
    """The ledger as the file of the contract."""
    return (json.dumps(ledger.to_json(), indent=1, ensure_ascii=False) + "\n").encode()


def input_digests(job: Job) -> list[dict[str, str]]:
    """Name and SHA-256 of job.toml and of each input table."""
    files = [job.root / "job.toml", *sorted((job.root / "inputs").glob("*"))]
    return [
        {"name": file.relative_to(job.root).as_posix(), "sha256": hashlib.sha256(file.read_bytes()).hexdigest()}
        for file in files
        if file.is_file() and not file.name.startswith((".", "~"))
    ]


def _revision(revision: Any) -> dict[str, str]:
    if revision is None:
        return {"letter": "none", "date": "", "purpose": "none stated", "description": ""}
    return {
        "letter": revision.letter,
        "date": revision.date.isoformat(),
        "purpose": revision.purpose,
        "description": revision.description,
    }


def _mark(state: str, purpose: str) -> str:
    if state == "draft":
        return "DRAFT, not issued"
    return "" if is_final(purpose) else f"{purpose}: not for construction"


def _names(job: Job, role: str) -> str:
    # A name in a title block reads as a signature; until there is one, the block says that there is none.
    names = ", ".join(person.name for person in job.acting(role))
    return f"{names}, unsigned" if names else ""


def _register(entries: Iterable[Entry]) -> list[dict[str, Any]]:
    """Givens, the same value from the same document once, with every sheet that states it."""
    return _merged(entries, ("symbol", "means", "shown", "source", "status"))


def _materials(entries: Iterable[Entry]) -> list[dict[str, Any]]:
    """Materials, each strength once, with every document that states it."""
    found = [entry for entry in entries if entry.symbol in _MATERIALS]
    order = {name: index for index, name in enumerate(_MATERIALS)}
    rows = _merged(found, ("symbol", "means", "shown", "status"))
    return sorted(rows, key=lambda row: (order[row["symbol"]], row["means"]))


def _merged(entries: Iterable[Entry], alike: Sequence[str]) -> list[dict[str, Any]]:
    rows: dict[tuple[str, ...], dict[str, Any]] = {}
    for entry in entries:
        stated = {name: str(getattr(entry, name)) for name in ("symbol", "means", "shown", "source", "status")}
        stated["source"] = _ROW.sub("", entry.source)
        row = rows.setdefault(
            tuple(stated[name] for name in alike), {"id": entry.id, **stated, "sheets": {}, "from": {}}
        )
        row["sheets"].setdefault(entry.sheet, entry.id)
        row["from"].setdefault(stated["source"])
    return [
        {**row, "sheet": ", ".join(row["sheets"]), "sheets": list(row["sheets"]), "source": "; ".join(row.pop("from"))}
        for row in rows.values()
    ]


# The row of a table stands beside the value on its sheet; a register names the document.
_ROW = re.compile(r" \(inputs/[^()]*\)$")


def _ratio(ledger: Ledger, entry: Entry) -> dict[str, Any]:
    return {
        "id": entry.id,
        "sheet": entry.sheet,
        "what": entry.means,
        "demand": ledger[entry.demand].shown,
        "capacity": ledger[entry.capacity].shown,
        "ratio": entry.value,
        "ratio_text": entry.shown,
        "verdict": entry.verdict,
        "clause": entry.clause,
    }


def _standards(job: Job, ledger: Ledger) -> list[dict[str, Any]]:
    """Every standard that an entry cites, with its clauses, and those the job names."""
    titles = _titles()
    clauses: dict[str, set[str]] = {name: set() for name in (job.codes.building, job.codes.concrete, job.codes.loads)}
    for entry in ledger:
        if entry.edition and entry.clause:
            clauses.setdefault(entry.edition, set()).add(entry.clause)
    for entry in ledger:
        for name in titles:
            if entry.kind == "given" and name in entry.source:
                clauses.setdefault(name, set())
    return [
        {"name": name, "title": titles.get(name, ""), "clauses": sorted(found, key=_clause_order)}
        for name, found in sorted(clauses.items())
    ]


def _clause_order(clause: str) -> list[tuple[int, str]]:
    return [(int(number or 0), letters) for number, letters in re.findall(r"(\d*)([^\d.]*)\.?", clause)]


def _titles() -> Mapping[str, str]:
    from calcpack.aci318 import standards

    return {getattr(standards, name).name: getattr(standards, name).title for name in standards.__all__}


def _documents(ledger: Iterable[Entry]) -> list[dict[str, Any]]:
    """Documents that givens name as their source: what stands before the first comma."""
    found: dict[str, dict[str, None]] = {}
    for entry in ledger:
        if entry.kind == "given" and "default of the schedule" not in entry.source:
            found.setdefault(entry.source.split(",")[0].strip(), {})[entry.sheet] = None
    return [{"name": name, "sheets": list(sheets)} for name, sheets in sorted(found.items())]


def _validation() -> dict[str, Any]:
    from calcpack import validation

    groups: dict[str, list[Any]] = {}
    for case in validation.run():
        groups.setdefault(case.id, []).append(case)
    cases = [_validated(group) for group in groups.values()]
    return {"release": release(), "cases": cases}


def _validated(group: Sequence[Any]) -> dict[str, Any]:
    """One published case: how many of its values are checked, and the one that uses most of its tolerance."""
    worst = max(group, key=lambda case: abs(case.deviation) / case.tolerance if case.tolerance else abs(case.deviation))
    count = f"{len(group)} values, shown: {worst.quantity}" if len(group) > 1 else worst.quantity
    return {
        "id": worst.id,
        "what": count,
        "source": _without_addresses(worst.source),
        "kind": worst.kind,
        "edition": ", ".join(dict.fromkeys(case.edition for case in group)),
        "expected": f"{worst.expected:g}",
        "computed": f"{worst.computed:.5g}",
        "deviation": f"{worst.deviation:+.2f} %",
        "tolerance": f"{worst.tolerance:g} %",
        "holds": all(case.holds for case in group),
    }


def _without_addresses(source: str) -> str:
    """A source without web addresses: the printed record names it, the data hold the rest."""
    return re.split(
        r"[;,]?\s+(?:as (?:found|transcribed) at\s+)?\(?(?:https?:|\w+(?:[.-]\w+)*\.(?:com|gov|org)\b)", source
    )[0].strip(" .,;")
