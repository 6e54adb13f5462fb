"""All files or none, and never over an issued letter."""

from __future__ import annotations

import errno
import json
import os
import random
import signal
import subprocess
import sys
import time
from pathlib import Path
from typing import Any

import pytest

from calcpack.errors import RefusedError, TableError
from calcpack.ledger import Entry, Ledger
from calcpack.package import write
from calcpack.package.assemble import ledger_bytes
from calcpack.package.write import clear_remains, manifest, replace_draft, write_issue


def ledger(value: float = 4000.0, source: str = "S-001", extra: str = "") -> bytes:
    entries = [
        Entry(
            "C-01/f_c", "given", "f_c", "strength", value, "psi", f"{value:g} psi", "C-01", source=source,
            status="confirmed",
        ),
        Entry(
            "C-01/x", "worked", "x", "twice", 1.0, "psi", "1 psi", "C-01", clause="statics", expression="f_c/f_c",
            where={"f_c": "C-01/f_c"},
        ),
    ]  # fmt: skip
    if extra:
        entries.append(
            Entry(f"C-01/{extra}", "given", extra, "more", 1.0, "", "1", "C-01", source="S", status="confirmed")
        )
    return ledger_bytes(Ledger(entries))


FILES = {"ledger.json": ledger(), "package.html": b"<html>", "package.pdf": b"%PDF", "manifest.json": b"{}"}


def contents(folder: Path) -> dict[str, bytes]:
    return {path.name: path.read_bytes() for path in folder.iterdir()}


def stamps(folder: Path) -> list[tuple[str, int]]:
    return sorted((str(path), path.stat().st_mtime_ns) for path in [folder, *folder.rglob("*")])


# Issues


def test_an_issue_is_written_once(tmp_path: Path) -> None:
    folder, written = write_issue(tmp_path, "A", FILES)
    assert (folder, written) == (tmp_path / "record" / "issued" / "A", True)
    assert contents(folder) == FILES
    assert [path.name for path in folder.parent.iterdir()] == ["A"]


def test_the_same_content_again_writes_nothing(tmp_path: Path) -> None:
    write_issue(tmp_path, "A", FILES)
    before = stamps(tmp_path)
    folder, written = write_issue(tmp_path, "A", dict(FILES))
    assert not written
    assert stamps(tmp_path) == before
    assert contents(folder) == FILES


def refused(root: Path, **files: bytes) -> str:
    before = stamps(root)
    changed = {**FILES, **{name.replace("_", "."): data for name, data in files.items()}}
    with pytest.raises(RefusedError, match=r"^revision A is issued already, and the job differs from it:\n") as caught:
        write_issue(root, "A", changed)
    assert stamps(root) == before
    assert str(caught.value).endswith("\nadd a [[revision]] to job.toml and issue that")
    return str(caught.value)


def test_a_difference_is_refused_with_what_differs(tmp_path: Path) -> None:
    write_issue(tmp_path, "A", FILES)
    text = refused(tmp_path, ledger_json=ledger(5000.0), package_pdf=b"%PDF-2")
    assert "\n  C-01/f_c: 4000 psi issued, 5000 psi now\n" in text
    assert "\n  C-01/x: 1 psi, but what it rests on differs\n" in text
    assert "\n  package.pdf differs\n" in text
    assert "package.html" not in text


def test_a_changed_source_is_named(tmp_path: Path) -> None:
    write_issue(tmp_path, "A", FILES)
    assert "C-01/f_c: source S-001 issued, S-002 now" in refused(tmp_path, ledger_json=ledger(source="S-002"))


def test_new_and_dropped_entries_are_named(tmp_path: Path) -> None:
    write_issue(tmp_path, "A", FILES)
    assert "\n  C-01/w is new\n" in refused(tmp_path, ledger_json=ledger(extra="w"))
    write_issue(tmp_path, "B", {**FILES, "ledger.json": ledger(extra="w")})
    with pytest.raises(RefusedError, match="C-01/w is gone"):
        write_issue(tmp_path, "B", FILES)


def test_a_file_that_was_taken_away_is_named(tmp_path: Path) -> None:
    folder, _ = write_issue(tmp_path, "A", FILES)
    (folder / "package.pdf").unlink()
    assert "\n  package.pdf is missing from the issue\n" in refused(tmp_path)


def test_a_ledger_that_differs_in_form_alone(tmp_path: Path) -> None:
    write_issue(tmp_path, "A", FILES)
    assert "\n  ledger.json differs\n" in refused(tmp_path, ledger_json=ledger() + b"\n")


def test_letters_do_not_disturb_each_other(tmp_path: Path) -> None:
    write_issue(tmp_path, "A", FILES)
    before = stamps(tmp_path / "record" / "issued" / "A")
    write_issue(tmp_path, "B", {**FILES, "package.pdf": b"other"})
    assert stamps(tmp_path / "record" / "issued" / "A") == before


# Drafts


def test_a_draft_replaces_the_last_one(tmp_path: Path) -> None:
    replace_draft(tmp_path, {**FILES, "old.txt": b"old"})
    assert contents(replace_draft(tmp_path, FILES)) == FILES
    assert [path.name for path in tmp_path.iterdir()] == ["draft"]


# A disk that is full, a folder that may not be written to


class Disk:
    """Makes one call of the operating system fail."""

    def __init__(self, patch: pytest.MonkeyPatch) -> None:
        self.patch = patch

    def fails(self, owner: Any, name: str, code: int, after: int = 0) -> None:
        real, count = getattr(owner, name), [0]

        def call(*arguments: Any, **options: Any) -> Any:
            count[0] += 1
            if count[0] > after:
                raise OSError(code, os.strerror(code), str(arguments[0]))
            return real(*arguments, **options)

        self.patch.setattr(owner, name, call)


@pytest.fixture
def disk(monkeypatch: pytest.MonkeyPatch) -> Disk:
    return Disk(monkeypatch)


@pytest.mark.parametrize(("owner", "name"), [(os, "fsync"), (Path, "mkdir")])
@pytest.mark.parametrize("code", [errno.ENOSPC, errno.EACCES, errno.EROFS])
def test_a_disk_that_refuses_leaves_nothing_half_written(
    tmp_path: Path, disk: Disk, owner: Any, name: str, code: int
) -> None:
    replace_draft(tmp_path, FILES)
    (tmp_path / "record" / "issued").mkdir(parents=True)
    disk.fails(owner, name, code)
    newer = {**FILES, "package.pdf": b"newer"}
    with pytest.raises((TableError, OSError), match=os.strerror(code)):
        write_issue(tmp_path, "A", newer)
    with pytest.raises((TableError, OSError), match=os.strerror(code)):
        replace_draft(tmp_path, newer)
    assert contents(tmp_path / "draft") == FILES
    assert [path.name for path in (tmp_path / "record" / "issued").iterdir()] == []
    assert sorted(path.name for path in tmp_path.iterdir()) == ["draft", "record"]


def test_the_message_says_where_and_what_to_do(tmp_path: Path, disk: Disk) -> None:
    disk.fails(os, "fsync", errno.ENOSPC, after=2)
    with pytest.raises(TableError, match=r"^nothing was written\n  cannot write .*No space left.* with room"):
        replace_draft(tmp_path, FILES)


def test_a_draft_that_cannot_take_its_place_leaves_the_last_one(tmp_path: Path, disk: Disk) -> None:
    replace_draft(tmp_path, FILES)
    real, count = Path.rename, [0]

    def rename(self: Path, target: Path) -> Path:
        count[0] += 1
        if count[0] == 2:
            raise OSError(errno.EIO, os.strerror(errno.EIO), str(self))
        return real(self, target)

    disk.patch.setattr(Path, "rename", rename)
    with pytest.raises(OSError, match=os.strerror(errno.EIO)):
        replace_draft(tmp_path, {**FILES, "package.pdf": b"newer"})
    assert contents(tmp_path / "draft") == FILES
    assert [path.name for path in tmp_path.iterdir()] == ["draft"]


# A run that is killed

_WRITER = """
import sys
from pathlib import Path
from calcpack.package.write import clear_remains, replace_draft, write_issue
root = Path(sys.argv[1])
clear_remains(root)
print("ready", flush=True)
for number in range(1, 100000):
    names = ("ledger.json", "package.pdf", "package.html", "manifest.json")
    files = {name: f"{number} ".encode() * 3000 for name in names}
    replace_draft(root, files)
    write_issue(root, f"A{number}"[:4] if number < 1000 else "Z", files if number < 1000 else {})
"""
NAMES = {"ledger.json", "package.pdf", "package.html", "manifest.json"}


def whole(folder: Path) -> bool:
    """Whether every file of a package is there, and all are of one writing."""
    found = contents(folder)
    return set(found) == NAMES and len(set(found.values())) == 1 and len({len(data) for data in found.values()}) == 1


def dead_process() -> int:
    ended = subprocess.Popen([sys.executable, "-c", ""])
    ended.wait()
    return ended.pid


@pytest.mark.slow
def test_a_killed_run_leaves_whole_packages(tmp_path: Path) -> None:
    chance, landed = random.Random(26), 0
    for _ in range(12):
        writer = subprocess.Popen([sys.executable, "-c", _WRITER, str(tmp_path)], stdout=subprocess.PIPE)
        assert writer.stdout is not None
        assert writer.stdout.readline() == b"ready\n"
        time.sleep(chance.uniform(0.0, 0.12))
        writer.send_signal(signal.SIGKILL)
        writer.wait()
        writer.stdout.close()
        issued = tmp_path / "record" / "issued"
        kept = [path for path in issued.glob("*") if not path.name.startswith(".")] if issued.exists() else []
        assert all(whole(path) for path in kept)
        left = [path.name for path in [*tmp_path.glob(".draft*"), *issued.glob(".*")]]
        landed += bool(left)
        had_draft = (tmp_path / "draft").exists() or any(name.startswith(".draft.old") for name in left)
        clear_remains(tmp_path)
        assert not [*tmp_path.glob(".draft*"), *issued.glob(".*")]
        if had_draft:
            assert whole(tmp_path / "draft")
        for path in kept:  # the letters are free again for the next round
            for file in path.iterdir():
                file.unlink()
            path.rmdir()
    assert landed >= 3  # it was killed in the middle of writing, and not only between


def test_what_a_dead_run_left_is_cleared(tmp_path: Path) -> None:
    dead = dead_process()
    names = [
        f".draft.{dead}", f"record/issued/.A.{dead}", f".calcpack/results.{dead}", f".calcpack/runs/.01.json.{dead}",
        f".calcpack/layouts.json.{dead}",
    ]  # fmt: skip
    for name in names:
        path = tmp_path / name
        path.parent.mkdir(parents=True, exist_ok=True)
        if "json" in name:
            path.write_text("half", "utf-8")
        else:
            path.mkdir()
            (path / "package.pdf").write_text("half", "utf-8")
    clear_remains(tmp_path)
    assert [path for path in tmp_path.rglob("*") if str(dead) in path.name] == []


def test_a_draft_set_aside_by_a_dead_run_is_put_back(tmp_path: Path) -> None:
    replace_draft(tmp_path, FILES)
    (tmp_path / "draft").rename(tmp_path / f".draft.old.{dead_process()}")
    clear_remains(tmp_path)
    assert contents(tmp_path / "draft") == FILES


def test_a_newer_draft_is_not_undone(tmp_path: Path) -> None:
    replace_draft(tmp_path, {"a": b"old"})
    (tmp_path / "draft").rename(tmp_path / f".draft.old.{dead_process()}")
    replace_draft(tmp_path, FILES)
    clear_remains(tmp_path)
    assert contents(tmp_path / "draft") == FILES
    assert not list(tmp_path.glob(".draft*"))


def test_what_a_running_process_works_on_is_left_alone(tmp_path: Path) -> None:
    running = subprocess.Popen([sys.executable, "-c", "input()"], stdin=subprocess.PIPE)
    try:
        (tmp_path / f".draft.{running.pid}").mkdir()
        clear_remains(tmp_path)
        assert (tmp_path / f".draft.{running.pid}").is_dir()
    finally:
        running.communicate(b"\n")


@pytest.mark.parametrize("name", [".git", ".DS_Store", ".gitkeep", ".A.notes"])
def test_what_the_tool_did_not_write_is_left_alone(tmp_path: Path, name: str) -> None:
    path = tmp_path / "record" / "issued" / name
    path.mkdir(parents=True)
    clear_remains(tmp_path)
    assert path.is_dir()


# The manifest


def test_the_manifest_names_every_file_by_its_digest() -> None:
    model = {
        "job": {"number": "26-044", "title": "Cold store"}, "codes": {}, "revision": {"letter": "A"}, "state": "final",
        "digest": "d", "inputs": [], "open": [],
    }  # fmt: skip
    data = json.loads(manifest(model, {"b": b"", "a": b"abc"}, {"C-01": "h"}, "0.1.0"))
    # published: FIPS 180-4, examples: the digests of "abc" and of the empty message
    assert data["files"] == {
        "a": "ba7816bf8f01cfea414140de5dae2223b00361a396177a9cb410ff61f20015ad",
        "b": "e3b0c44298fc1c149afbf4c8996fb92427ae41e4649b934ca495991b7852b855",
    }
    assert list(data["files"]) == ["a", "b"]
    assert (data["job"], data["release"], data["sheets"]) == ("26-044", "0.1.0", [{"id": "C-01", "content": "h"}])


def test_all_names_are_there() -> None:
    assert all(hasattr(write, name) for name in write.__all__)
