"""What makes a run of one program differ from a run of another: its own source and the libraries it typesets with."""

from __future__ import annotations

import hashlib
from functools import cache
from importlib import metadata
from pathlib import Path

__all__ = ["release", "release_key"]

_LIBRARIES = ("handcalcs", "matplotlib", "nbconvert", "numpy", "pint", "typst")


@cache
def release() -> str:
    """The version of calcpack, as printed on a package."""
    return metadata.version("calcpack")


@cache
def release_key() -> str:
    """A digest over calcpack's source and the versions of the libraries results are made with."""
    digest = hashlib.sha256()
    folder = Path(__file__).resolve().parent.parent
    for path in sorted(folder.rglob("*.py")):
        digest.update(path.relative_to(folder).as_posix().encode())
        digest.update(path.read_bytes())
    for name in _LIBRARIES:
        digest.update(f"{name} {metadata.version(name)}".encode())
    return digest.hexdigest()
