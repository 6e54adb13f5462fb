"""Write a package: all files or none, and never over an issued letter."""

from __future__ import annotations

import hashlib
import json
import os
import shutil
from collections.abc import Mapping
from itertools import chain
from pathlib import Path
from typing import Any

from calcpack.errors import Problem, RefusedError, TableError

__all__ = ["clear_remains", "manifest", "replace_draft", "write_issue"]

_RECORD = ("record", "issued")


def manifest(model: Mapping[str, Any], files: Mapping[str, bytes], sheets: Mapping[str, str], release: str) -> bytes:
    """The manifest: what the package is, the digest of each file and of each sheet's content."""
    data = {
        "job": model["job"]["number"],
        "title": model["job"]["title"],
        "codes": model["codes"],
        "revision": model["revision"],
        "state": model["state"],
        "release": release,
        "ledger": model["digest"],
        "sheets": [{"id": sheet, "content": digest} for sheet, digest in sheets.items()],
        "inputs": model["inputs"],
        "open": model["open"],
        "files": {name: hashlib.sha256(data).hexdigest() for name, data in sorted(files.items())},
    }
    return (json.dumps(data, indent=1, ensure_ascii=False) + "\n").encode()


def replace_draft(root: Path, files: Mapping[str, bytes]) -> Path:
    """Write the draft, then put it in place of the last one; a run that is cut off leaves that one whole."""
    new, target, old = root / f".draft.{os.getpid()}", root / "draft", root / f".draft.old.{os.getpid()}"
    _write(new, files)
    try:
        if target.exists():
            target.rename(old)
        new.rename(target)
    finally:
        _put_back(old, target)
        shutil.rmtree(new, ignore_errors=True)
    return target


def _put_back(old: Path, target: Path) -> None:
    """Of the last draft and a newer one, keep the newer; the last one where there is no other."""
    if old.exists() and not target.exists():
        old.rename(target)
    shutil.rmtree(old, ignore_errors=True)


def write_issue(root: Path, letter: str, files: Mapping[str, bytes]) -> tuple[Path, bool]:
    """Write an issue.

    Returns
    -------
    its folder, and whether it was written; ``False`` where the same content is there already

    Raises
    ------
    RefusedError : the letter is issued already, with other content; the message says what differs
    """
    folder = root.joinpath(*_RECORD)
    target = folder / letter
    if target.exists():
        differences = _differences(target, files)
        if differences:
            raise RefusedError(
                f"revision {letter} is issued already, and the job differs from it:\n"
                + "\n".join(f"  {line}" for line in differences)
                + "\nadd a [[revision]] to job.toml and issue that"
            )
        return target, False
    folder.mkdir(parents=True, exist_ok=True)
    new = folder / f".{letter}.{os.getpid()}"
    _write(new, files)
    try:
        # Renaming a folder onto a name that is free is one step: there is no half-written issue.
        new.rename(target)
    finally:
        shutil.rmtree(new, ignore_errors=True)
    _sync(folder)
    return target, True


def clear_remains(root: Path) -> None:
    """Remove what a run that was cut off left behind; a draft that it had set aside is put back."""
    kept = root / ".calcpack"
    folders = [root.glob(".draft.*"), root.joinpath(*_RECORD).glob(".*"), kept.glob("results.*")]
    for path in [*chain.from_iterable(folders), *kept.glob("layouts.json.*"), *kept.glob("runs/.*")]:
        process = path.name.rsplit(".", 1)[-1]
        if not process.isdecimal() or _alive(int(process)):
            continue
        if path.name.startswith(".draft.old."):
            _put_back(path, root / "draft")
        elif path.is_dir():
            shutil.rmtree(path, ignore_errors=True)
        else:
            path.unlink(missing_ok=True)


def _alive(process: int) -> bool:
    try:
        os.kill(process, 0)
    except (OverflowError, ProcessLookupError):
        return False
    except PermissionError:
        return True
    return process != os.getpid()


def _write(folder: Path, files: Mapping[str, bytes]) -> None:
    try:
        shutil.rmtree(folder, ignore_errors=True)
        folder.mkdir()
        for name, data in files.items():
            with (folder / name).open("wb") as file:
                file.write(data)
                file.flush()
                os.fsync(file.fileno())
        _sync(folder)
    except OSError as error:
        shutil.rmtree(folder, ignore_errors=True)
        problem = Problem(f"cannot write {folder.parent}: {error.strerror}", "a folder you may write to, with room", "")
        raise TableError("nothing was written", [problem]) from error


def _sync(folder: Path) -> None:
    handle = os.open(folder, os.O_RDONLY)
    try:
        os.fsync(handle)
    finally:
        os.close(handle)


def _differences(target: Path, files: Mapping[str, bytes]) -> list[str]:
    lines = []
    for name, data in sorted(files.items()):
        issued = (target / name).read_bytes() if (target / name).is_file() else None
        if issued is None:
            lines.append(f"{name} is missing from the issue")
        elif issued != data:
            lines += _what_differs(name, issued, data)
    return lines


def _what_differs(name: str, issued: bytes, data: bytes) -> list[str]:
    if name != "ledger.json":
        return [f"{name} differs"]
    before = {item["id"]: item for item in json.loads(issued)}
    after = {item["id"]: item for item in json.loads(data)}
    lines = [f"{identifier} is new" for identifier in after if identifier not in before]
    lines += [f"{identifier} is gone" for identifier in before if identifier not in after]
    lines += [
        f"{identifier}: {_moved(before[identifier], after[identifier])}"
        for identifier in after
        if identifier in before and before[identifier]["hash"] != after[identifier]["hash"]
    ]
    return lines or [f"{name} differs"]


def _moved(before: Mapping[str, Any], after: Mapping[str, Any]) -> str:
    """What moved between two states of an entry, as it reads on the page."""
    for name in ("shown", *after):
        if name != "hash" and before.get(name) != after[name]:
            what = "" if name == "shown" else f"{name} "
            return f"{what}{before.get(name)} issued, {after[name]} now"
    return f"{after['shown']}, but what it rests on differs"
