"""What the commands print: results of checks as text and as the contract's JSON, and what a build made."""

from __future__ import annotations

from collections.abc import Sequence
from pathlib import Path
from typing import Any

from calcpack.job import Job
from calcpack.members.results import CheckResult
from calcpack.package.build import Built
from calcpack.package.gate import Open
from calcpack.package.members import JobChecks
from calcpack.typeset.digits import number_text
from calcpack.typeset.line import with_unit

__all__ = ["build_text", "check_json", "check_text"]


def check_json(job: Job, checks: JobChecks, found: Sequence[Open]) -> dict[str, Any]:
    """The object of ``calcpack check --json``; numbers are unrounded."""
    return {
        "job": job.number,
        "concrete": job.codes.concrete,
        "results": [_result(result) for result in checks.results],
        "open": [{"kind": item.kind, "what": item.what, "where": item.where} for item in found],
        "signoffs": [],
    }


def _result(result: CheckResult) -> dict[str, Any]:
    return {
        "mark": result.mark,
        "check": result.check,
        "clause": result.clause,
        "combination": result.combination,
        "ratio": result.ratio,
        "verdict": result.verdict,
        "values": {symbol: {"value": value, "unit": unit} for symbol, (value, unit) in result.values.items()},
        "notes": list(result.notes),
    }


def check_text(job: Job, checks: JobChecks, found: Sequence[Open]) -> str:
    """One line a member and check, then the open items."""
    head = f"{job.number}  {job.title}  ({job.codes.concrete})"
    rows = [_row(result) for result in checks.results]
    widths = [max((len(row[index]) for row in rows), default=0) for index in range(4)]
    lines = [head, ""]
    for *columns, rest in rows:
        mark, check, ratio, verdict = (text.ljust(width) for text, width in zip(columns, widths, strict=True))
        lines.append(f"{mark}  {check}  {ratio}  {verdict}  {rest}".rstrip())
    return "\n".join([*lines, *([] if rows else ["no schedule in inputs/"]), "", *_open_lines(found)])


def _row(result: CheckResult) -> tuple[str, str, str, str, str]:
    ratio = f"{result.ratio:.3f}" if result.ratio is not None else "-"
    values = ", ".join(
        f"{symbol} = {with_unit(number_text(value), unit)}"
        for symbol, (value, unit) in result.values.items()
        if value is not None
    )
    rest = "  ".join(filter(None, [result.combination, values, f"[{result.clause}]"]))
    return result.mark, result.check, ratio, result.verdict or "-", rest


def _open_lines(found: Sequence[Open]) -> list[str]:
    if not found:
        return ["nothing open"]
    return [f"open: {len(found)}", *(f"  {item.kind}: {item.what}  [{item.where}]" for item in found)]


def build_text(built: Built, folder: Path, what: str) -> str:
    """What a build made, where it is, how long each stage took, and what is open."""
    ran = [sheet for sheet in built.content.sheets if sheet.reason]
    stages = ", ".join(f"{stage} {seconds:.1f} s" for stage, seconds in built.seconds.items())
    lines = [f"{what}: {folder}"]
    lines += [f"  {name}  {len(data) / 1000:,.0f} kB" for name, data in built.files.items()]
    lines.append(f"{len(built.content.sheets)} sheets, {len(ran)} run, {len(built.content.ledger)} values; {stages}")
    lines += [f"  ran {sheet.id}: {sheet.reason}" for sheet in ran]
    return "\n".join([*lines, *_open_lines(built.open)])
