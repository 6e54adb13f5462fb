"""The published cases that this release is validated against, run and compared.

A case stands as data, with its source and a tolerance drawn from the digits its source prints. What it asks for is
worked through the same functions that serve a package.
"""

from __future__ import annotations

import importlib
import tomllib
from collections.abc import Callable, Iterator, Mapping
from dataclasses import dataclass
from pathlib import Path
from typing import Any

from calcpack.aci318 import columns
from calcpack.aci318.bars import bar
from calcpack.aci318.editions import edition
from calcpack.errors import RefusedError
from calcpack.formula import Formula
from calcpack.members.anchorage import required_length
from calcpack.members.pad import FloatPad
from calcpack.members.termination import Termination
from calcpack.validation_sections import section_value

__all__ = ["Case", "CaseResult", "cases", "published_folder", "run", "table"]

KINDS = ("published", "from memory", "common practice")


@dataclass(frozen=True)
class Case:
    """One quantity of one reference case, in one edition.

    Attributes
    ----------
    id : of the reference case; `quantity` names the number in it
    kind : ``published``, ``from memory`` or ``common practice``
    by : which adapter works it
    expected : the number of the source, in `unit`; `tolerance` is per cent of it
    """

    id: str
    source: str
    kind: str
    edition: str
    quantity: str
    by: str
    inputs: Mapping[str, Any]
    expected: float
    unit: str
    tolerance: float
    note: str = ""

    @property
    def name(self) -> str:
        """A name for tests and tables: ``AB-LD-01 l_d No. 3, ACI 318-14``."""
        return f"{self.id} {self.quantity}, {self.edition}"


@dataclass(frozen=True)
class CaseResult:
    """A case as it came out: `deviation` and `tolerance` in per cent of the expected number."""

    id: str
    source: str
    kind: str
    edition: str
    quantity: str
    expected: float
    computed: float
    unit: str
    deviation: float
    tolerance: float

    @property
    def holds(self) -> bool:
        """Whether the deviation is within the tolerance of the printed digits."""
        return abs(self.deviation) <= self.tolerance


def published_folder() -> Path:
    """The folder of the cases: inside an installed package, or ``tests/published`` of a source tree.

    Raises
    ------
    RefusedError : neither is there
    """
    package = Path(__file__).parent
    for folder in (package / "_published", package.parent / "tests" / "published"):
        if folder.is_dir():
            return folder
    raise RefusedError("the published cases are not installed: neither calcpack/_published nor tests/published exists")


def cases() -> list[Case]:
    """Every case, in the order of the files and of the cases in them."""
    found = []
    for path in sorted(published_folder().glob("*.toml")):
        with path.open("rb") as file:
            found += [case for record in tomllib.load(file)["case"] for case in _expand(record)]
    return found


def _expand(record: Mapping[str, Any]) -> Iterator[Case]:
    for check in record["check"]:
        for name in check.get("editions", record["editions"]):
            yield Case(
                id=record["id"],
                source=record["source"],
                kind=record["source_kind"],
                edition=name,
                quantity=check["quantity"],
                by=check.get("by", record["by"]),
                inputs={**record.get("inputs", {}), **check.get("inputs", {})},
                expected=check["expected"],
                unit=check["unit"],
                tolerance=check["tolerance"],
                note=record.get("note", ""),
            )


def run() -> list[CaseResult]:
    """Work every case."""
    return [_worked(case) for case in cases()]


def _worked(case: Case) -> CaseResult:
    computed = _ADAPTERS[case.by](case)
    deviation = 100 * (computed / case.expected - 1)
    return CaseResult(
        case.id,
        case.source,
        case.kind,
        case.edition,
        case.quantity,
        case.expected,
        computed,
        case.unit,
        deviation,
        case.tolerance,
    )


def _anchorage(case: Case) -> float:
    """A row of the anchorage schedule, worked as `check` works it."""
    row = Termination(mark=case.id, **case.inputs)
    return required_length(FloatPad(), row, edition(case.edition)).value


def _formula(case: Case) -> float:
    """One formula, named as ``module.function``; `line` asks for one of its lines, `per` divides by an argument."""
    inputs = dict(case.inputs)
    module, name = inputs.pop("formula").split(".")
    line, per = inputs.pop("line", None), inputs.pop("per", None)
    formula: Formula = getattr(importlib.import_module(f"calcpack.aci318.{module}"), name)
    formula.clause(edition(case.edition).standard)
    recording = formula.record(**{symbol: float(value) for symbol, value in inputs.items()})
    values = {recorded.line.target: recorded.value for recorded in recording.lines}
    value = recording.value if line is None else values[line]
    return value / inputs[per] if per else value


def _bar(case: Case) -> float:
    """A nominal dimension of a bar."""
    return float(getattr(bar(case.inputs["bar"]), case.inputs["property"]))


def _axial(case: Case) -> float:
    """Axial strength from areas as the source states them, in kip; `take` is P_o or phi_P_n_max."""
    inputs = dict(case.inputs)
    take, spiral = inputs.pop("take"), inputs.pop("spiral", False)
    P_o = columns.axial_strength(**inputs)
    if take == "P_o":
        return P_o / 1000
    maximum = columns.axial_strength_maximum_spiral if spiral else columns.axial_strength_maximum_tied
    phi = columns.phi_spiral() if spiral else columns.phi_tied()
    return columns.design_axial_strength(phi=phi, P_n_max=maximum(P_o=P_o)) / 1000


def _section(case: Case) -> float:
    """A section under axial force and bending, in the unit its source prints."""
    return section_value(case.inputs, case.quantity)


_ADAPTERS: dict[str, Callable[[Case], float]] = {
    "anchorage": _anchorage,
    "axial": _axial,
    "bar": _bar,
    "formula": _formula,
    "section": _section,
}


def table() -> str:
    """The cases as a table in plain text, with a line of totals."""
    results = run()
    header = ("case", "quantity", "edition", "provenance", "expected", "computed", "deviation", "tolerance", "")
    rows = [header, *map(_row, results)]
    widths = [max(len(row[column]) for row in rows) for column in range(len(header))]
    lines = ["  ".join(cell.ljust(width) for cell, width in zip(row, widths, strict=True)).rstrip() for row in rows]
    count = sum(result.holds for result in results)
    return "\n".join([*lines, "", f"{count} of {len(results)} hold; {_by_kind(results)}"])


def _row(result: CaseResult) -> tuple[str, ...]:
    return (
        result.id,
        result.quantity,
        result.edition,
        result.kind,
        f"{result.expected:g} {result.unit}".strip(),
        f"{result.computed:.5g} {result.unit}".strip(),
        f"{result.deviation:+.2f} %",
        f"{result.tolerance:g} %",
        "holds" if result.holds else "DOES NOT HOLD",
    )


def _by_kind(results: list[CaseResult]) -> str:
    counts = {kind: sum(result.kind == kind for result in results) for kind in KINDS}
    return ", ".join(f"{count} {kind}" for kind, count in counts.items())
