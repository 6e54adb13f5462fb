"""Axial strength of one column under its largest axial force."""

from __future__ import annotations

from collections.abc import Sequence
from typing import TypeVar

from calcpack.members.column_forces import ForceValues
from calcpack.members.column_like import ForceLike
from calcpack.members.column_rules import ColumnWorking
from calcpack.members.results import CheckResult

__all__ = ["AXIAL_STEPS", "axial_check"]

T = TypeVar("T")
_AXIAL = "22.4.2"
# In the order of a hand calculation, the maximum design axial strength last.
AXIAL_STEPS = ("A_g", "A_st", "P_o", "P_n_max", "phi_P_n_max")
_UNFACTORED = "Forces are listed by load, not factored: the axial force is not verified."


def axial_check(work: ColumnWorking[T], forces: Sequence[ForceLike], values_of: ForceValues[T]) -> CheckResult:
    """The largest compression against the maximum design axial strength; without forces, the strengths alone."""
    _, _, P_o, _, capacity = [work.value(symbol) for symbol in AXIAL_STEPS]
    values = {"P_o": P_o, "phi_P_n_max": capacity}
    governing = max(forces, key=lambda force: force.P, default=None)
    if governing is None:
        work.pad.reason("No forces listed for this column: its axial strength is stated, not verified.")
        return work.result("axial strength", _AXIAL, None, values)
    if governing.combination is None:
        return work.result("axial strength", _AXIAL, None, values, work.note(_UNFACTORED))
    name = governing.combination
    work.pad.reason(_why(name, len(forces)))
    values |= values_of(governing, ["P_u"])
    if governing.P <= 0:
        # Tension is not a matter of this check: its ratio is zero, and bending takes it in.
        work.pad.reason("No combination compresses the column: its maximum axial strength is not called on.")
        return work.result("axial strength", _AXIAL, 0.0, values, combination=name)
    ratio = work.verify("axial force within the maximum axial strength", values["P_u"], capacity, _AXIAL)
    return work.result("axial strength", _AXIAL, ratio, values, combination=name)


def _why(name: str, count: int) -> str:
    listed = "the only combination listed" if count == 1 else f"the largest axial force of {count} combinations"
    return f"Governing: {name}, {listed}."
