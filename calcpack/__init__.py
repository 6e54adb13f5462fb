"""calcpack: calculations for reinforced concrete, typeset line by line and traceable to their sources."""

from __future__ import annotations

from importlib import import_module
from typing import TYPE_CHECKING

if TYPE_CHECKING:
    from calcpack.sheet import Sheet
    from calcpack.value import Value

__all__ = ["Sheet", "Value"]

_WHERE = {"Sheet": "calcpack.sheet", "Value": "calcpack.value"}


def __getattr__(name: str) -> object:
    """Load a name when it is first asked for, so that the package imports at once."""
    if name not in _WHERE:
        raise AttributeError(f"module 'calcpack' has no attribute {name!r}")
    return getattr(import_module(_WHERE[name]), name)


def __dir__() -> list[str]:
    return sorted(__all__)
