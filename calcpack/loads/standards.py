"""The load standards that calcpack cites, each in one edition."""

from __future__ import annotations

from calcpack.formula import Standard

__all__ = ["ASCE_7_16", "ASCE_7_22"]

_TITLE = "Minimum Design Loads and Associated Criteria for Buildings and Other Structures"
ASCE_7_16 = Standard("ASCE 7-16", f"{_TITLE}, 2016")
ASCE_7_22 = Standard("ASCE 7-22", f"{_TITLE}, 2022")
