"""A new job folder that already issues: one worked sheet, its tables, and job.toml to fill in."""

from __future__ import annotations

from collections.abc import Iterator
from importlib import resources
from importlib.resources.abc import Traversable
from pathlib import Path, PurePosixPath

from calcpack.errors import RefusedError

__all__ = ["start"]


def start(folder: Path) -> tuple[str, ...]:
    """Make a job folder.

    Returns
    -------
    the files made, relative to it

    Raises
    ------
    RefusedError : the folder is not empty, or is a file; nothing is written
    """
    if folder.exists() and not folder.is_dir():
        raise RefusedError(f"{folder} is a file; name a folder that does not exist yet, or an empty one")
    if folder.is_dir() and any(folder.iterdir()):
        raise RefusedError(f"{folder} is not empty; name a folder that does not exist yet, or an empty one")
    made = []
    for name, source in _files(resources.files("calcpack.job") / "starter", PurePosixPath()):
        target = folder / name
        target.parent.mkdir(parents=True, exist_ok=True)
        target.write_bytes(source.read_bytes())
        made.append(str(name))
    return tuple(sorted(made))


def _files(folder: Traversable, below: PurePosixPath) -> Iterator[tuple[PurePosixPath, Traversable]]:
    for item in folder.iterdir():
        if item.is_dir():
            yield from _files(item, below / item.name)
        elif not item.name.startswith((".", "__")):
            yield below / item.name, item
