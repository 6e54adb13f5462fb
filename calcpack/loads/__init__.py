"""Strength combinations of ASCE 7, and the equations that apply them."""

from __future__ import annotations

import importlib
from typing import Any

__all__ = ["combinations", "equations", "standards"]


def __getattr__(name: str) -> Any:
    if name in __all__:
        return importlib.import_module(f"calcpack.loads.{name}")
    raise AttributeError(f"calcpack.loads has no {name!r}; it has {', '.join(__all__)}")
