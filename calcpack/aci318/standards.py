"""The standards that calcpack cites, each in one edition."""

from __future__ import annotations

from calcpack.formula import Standard

__all__ = ["ACI_318_14", "ACI_318_19", "ASCE_7_16", "ASCE_7_22", "ASTM_A615", "ASTM_A706"]

ACI_318_14 = Standard("ACI 318-14", "Building Code Requirements for Structural Concrete and Commentary, 2014")
ACI_318_19 = Standard("ACI 318-19", "Building Code Requirements for Structural Concrete and Commentary, 2019")
ASTM_A615 = Standard("ASTM A615", "Deformed and Plain Carbon-Steel Bars for Concrete Reinforcement")
ASTM_A706 = Standard("ASTM A706", "Deformed and Plain Low-Alloy Steel Bars for Concrete Reinforcement")
ASCE_7_16 = Standard(
    "ASCE 7-16", "Minimum Design Loads and Associated Criteria for Buildings and Other Structures, 2016"
)
ASCE_7_22 = Standard(
    "ASCE 7-22", "Minimum Design Loads and Associated Criteria for Buildings and Other Structures, 2022"
)
