"""Provisions of ACI 318, one module a subject, one function an equation."""

from __future__ import annotations

import importlib
from typing import Any

__all__ = [
    "bars",
    "bending",
    "bundles",
    "columns",
    "compatibility",
    "compression",
    "continuity",
    "development",
    "dowels",
    "editions",
    "effective_length",
    "factors",
    "heads",
    "hooks",
    "laps",
    "lateral_support",
    "shear",
    "slenderness",
    "special_frames",
    "splices",
    "stiffness",
    "stress_block",
    "ties",
]


def __getattr__(name: str) -> Any:
    if name in __all__:
        return importlib.import_module(f"calcpack.aci318.{name}")
    raise AttributeError(f"calcpack.aci318 has no {name!r}; it has {', '.join(__all__)}")
