"""What a member owes: its checks, its governing case, its coverage."""

from __future__ import annotations

import importlib
from typing import Any

__all__ = ["anchorage", "column", "pad", "results"]


def __getattr__(name: str) -> Any:
    if name in __all__:
        return importlib.import_module(f"calcpack.members.{name}")
    raise AttributeError(f"calcpack.members has no {name!r}; it has {', '.join(__all__)}")
