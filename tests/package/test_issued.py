"""Packages read back: folders, ledgers and PDFs, and what is refused (package requirement E9: nothing is executed)."""

from __future__ import annotations

import hashlib
import io
import json
from collections.abc import Callable
from pathlib import Path
from typing import Any

import pypdf
import pytest
from comparison_samples import Book, beam

from calcpack.errors import InputError
from calcpack.package.issued import Issued, read_issued, read_pair

REVISION = {"letter": "A", "date": "2026-11-02", "purpose": "Plan review", "description": "First issue"}


def ledger_file(h: float = 20.0) -> bytes:
    return json.dumps(beam(Book(), h).to_json(), indent=1, ensure_ascii=False).encode()


def manifest(data: bytes, **more: Any) -> bytes:
    made = {
        "job": "26-044", "revision": REVISION, "state": "preliminary",
        "ledger": hashlib.sha256(data).hexdigest(), "sheets": [{"id": "C-01", "content": "ab"}], **more,
    }  # fmt: skip
    return json.dumps(made).encode()


def pdf(*attached: tuple[str, bytes], subject: str = "Revision A, Plan review") -> bytes:
    writer = pypdf.PdfWriter()
    writer.add_blank_page(612, 792)
    writer.add_metadata({"/Subject": subject} if subject else {})
    for name, data in attached:
        writer.add_attachment(name, data)
    file = io.BytesIO()
    writer.write(file)
    return file.getvalue()


def folder(root: Path, **files: bytes) -> Path:
    """A folder; `ledger_json` is the file ledger.json."""
    root.mkdir(parents=True)
    for name, data in files.items():
        (root / name.replace("_", ".")).write_bytes(data)
    return root


def test_an_issued_folder(tmp_path: Path) -> None:
    data = ledger_file()
    sheets = [{"id": "C-01", "content": "ab", "subject": "Beams"}, {"id": "G-01", "content": "cd"}]
    root = folder(tmp_path / "A", ledger_json=data, manifest_json=manifest(data, sheets=sheets), package_pdf=b"other")
    issued = read_issued(root)
    assert (issued.path, issued.job, issued.label) == (str(root), "26-044", "revision A, Plan review")
    assert issued.sheets == {"C-01": "Beams", "G-01": ""}
    assert issued.digest == hashlib.sha256(data).hexdigest()
    assert issued.ledger.to_json() == json.loads(data)


def test_a_draft_says_so(tmp_path: Path) -> None:
    data = ledger_file()
    root = folder(tmp_path / "draft", ledger_json=data, manifest_json=manifest(data, state="draft"))
    assert read_issued(root).label == "draft of revision A, Plan review"


def test_a_folder_without_a_manifest(tmp_path: Path) -> None:
    data = ledger_file()
    root = folder(tmp_path / "A", ledger_json=data)
    found = read_issued(root)
    assert (found.job, found.label, found.sheets, len(found.ledger)) == ("", "", {}, 6)


def test_a_ledger_alone(tmp_path: Path) -> None:
    path = tmp_path / "any name"
    path.write_bytes(ledger_file())
    assert [entry.id for entry in read_issued(path).ledger][:2] == ["C-01/h", "C-01/w"]


def test_a_pdf_alone_and_in_a_folder(tmp_path: Path) -> None:
    data = ledger_file()
    file = pdf(("columns.csv", b"mark\n"), ("ledger.json", data))
    for path in (folder(tmp_path / "A", package_pdf=file), tmp_path / "A" / "package.pdf"):
        found = read_issued(path)
        assert found.ledger.to_json() == json.loads(data)
        assert (found.label, found.digest) == ("Revision A, Plan review", hashlib.sha256(data).hexdigest())


def test_a_pdf_that_does_not_say_what_it_is(tmp_path: Path) -> None:
    path = tmp_path / "p.pdf"
    path.write_bytes(pdf(("ledger.json", ledger_file()), subject=""))
    assert read_issued(path).label == ""


def test_a_pdf_with_the_same_ledger_twice(tmp_path: Path) -> None:
    path = tmp_path / "p.pdf"
    path.write_bytes(pdf(("ledger.json", ledger_file()), ("ledger.json", ledger_file())))
    assert len(read_issued(path).ledger) == 6


# Refused


def refused(path: Path, *words: str) -> None:
    for word in words:
        with pytest.raises(InputError, match=word):
            read_issued(path)
    with pytest.raises(InputError) as caught:
        read_issued(path)
    assert str(path) in str(caught.value)


def test_what_is_not_there(tmp_path: Path) -> None:
    refused(tmp_path / "B", "not there", r"package\.pdf or a ledger\.json, such as JOB/record/issued/A")


def test_a_folder_that_holds_no_package(tmp_path: Path) -> None:
    refused(folder(tmp_path / "x", notes_txt=b""), r"a folder without ledger\.json and package\.pdf")


def test_a_job_folder_is_told_which_packages_it_has(tmp_path: Path) -> None:
    for name in ("record/issued/A", "record/issued/B", "record/issued/.C.12", "draft"):
        (tmp_path / name).mkdir(parents=True)
    with pytest.raises(InputError, match="this is a job folder; take ") as caught:
        read_issued(tmp_path)
    told = str(caught.value)
    assert all(str(tmp_path / name) in told for name in ("record/issued/A", "record/issued/B", "draft"))
    assert ".C.12" not in told


def test_a_page_for_a_browser_carries_no_ledger(tmp_path: Path) -> None:
    path = tmp_path / "package.html"
    path.write_bytes(b"\n<!doctype html><title>x</title>")
    refused(path, "carries no ledger.*take the package.pdf beside it")


def test_a_place_that_is_no_file(tmp_path: Path) -> None:
    import os

    os.mkfifo(tmp_path / "pipe")
    refused(tmp_path / "pipe", "neither a folder nor a file")


def test_a_file_that_may_not_be_read(tmp_path: Path, monkeypatch: pytest.MonkeyPatch) -> None:
    (tmp_path / "ledger.json").write_bytes(ledger_file())

    def refuse(_: Path) -> bytes:
        raise PermissionError(13, "Permission denied")

    monkeypatch.setattr(Path, "read_bytes", refuse)
    refused(tmp_path, "cannot be read: Permission denied")
    refused(tmp_path / "ledger.json", "cannot be read: Permission denied")


def by_hand(edit: Callable[[list[dict[str, Any]]], Any]) -> bytes:
    items = json.loads(ledger_file())
    edit(items)
    return json.dumps(items).encode()


@pytest.mark.parametrize(
    ("data", "message"),
    [
        (by_hand(lambda items: items[0].update(value=24.0)), "C-01/h: its hash does not fit its content"),
        (by_hand(lambda items: items[0].update(source="S-999")), "changed by hand"),
        (by_hand(lambda items: items[2].update(expression="h - 2")), "C-01/d: its hash does not fit"),
        (by_hand(lambda items: items[5].update(verdict="NG")), "C-01/verdict: its hash does not fit"),
        (by_hand(lambda items: items[0].pop("hash")), "C-01/h without a hash; the ledger was changed by hand"),
        (by_hand(lambda items: [item.update(hash="") for item in items[:3]]), "hash"),
        (by_hand(lambda items: [item.update(hash=None) for item in items]), "C-01/h and 5 more without a hash"),
        (by_hand(lambda items: items.pop(0)), "rests on C-01/h, which the ledger does not hold"),
        (by_hand(lambda items: items.append(items[0])), "holds an id twice"),
        (by_hand(lambda items: items[0].pop("source")), "no source"),
        (by_hand(lambda items: items[0].update(value="20")), "is not what a ledger holds there"),
        (by_hand(lambda items: items[0].update(value=10**400)), "not JSON of a ledger"),
        (b"[1]", "not an object"),
        (b"{}", "not a list of entries"),
        (b"", "not JSON of a ledger"),
        (b"\xff\xfe\xfa", "not JSON of a ledger"),
        (b"[" * 100_000, "not JSON of a ledger"),
        (b'[{"id": "a", "kind": "given", "value": NaN}]', "NaN is no number"),
        (b'[{"value": ' + b"9" * 5000 + b"}]", "not JSON of a ledger"),
    ],
)
def test_a_ledger_that_is_not_as_it_was_written(tmp_path: Path, data: bytes, message: str) -> None:
    path = tmp_path / "ledger.json"
    path.write_bytes(data)
    refused(path, message, "take an untouched copy, or make it again with calcpack draft or issue")
    attached = tmp_path / "package.pdf"
    attached.write_bytes(pdf(("ledger.json", data)))
    refused(attached, message)


def test_a_printed_value_changed_by_hand_is_found_by_the_manifest(tmp_path: Path) -> None:
    """The hash of an entry does not cover how it is printed; the manifest covers the whole file."""
    data = by_hand(lambda items: items[0].update(shown="24 in"))
    root = folder(tmp_path / "A", ledger_json=data, manifest_json=manifest(ledger_file()))
    refused(root, "its ledger is not the one that manifest.json names")
    (root / "manifest.json").unlink()
    assert read_issued(root).ledger["C-01/h"].shown == "24 in"


@pytest.mark.parametrize(
    "data",
    [
        b"",
        b"[]",
        b"7",
        b"[" * 100_000,
        b"{}",
        manifest(b"", sheets=[{"id": 1}]),
        manifest(b"", sheets=["C-01"]),
        manifest(b"", sheets=7),
        manifest(b"", revision="A"),
        manifest(b"", ledger=1),
        b"\xff",
    ],
)
def test_a_manifest_that_calcpack_did_not_write(tmp_path: Path, data: bytes) -> None:
    refused(folder(tmp_path / "A", ledger_json=ledger_file(), manifest_json=data), "not a manifest that calcpack wrote")


@pytest.mark.parametrize(
    ("data", "message"),
    [
        (pdf(), r"a PDF that carries no ledger\.json"),
        (pdf(("columns.csv", b"mark\n")), r"a PDF that carries no ledger\.json"),
        (b"%PDF-1.7\n" + b"x" * 100, "a PDF that cannot be read"),
        (pdf(("ledger.json", ledger_file()))[:600], "a PDF that cannot be read"),
        (
            pdf(("ledger.json", ledger_file()), ("ledger.json", ledger_file(24.0))),
            r"a PDF with 2 files called ledger\.json",
        ),
    ],
)
def test_a_pdf_without_one_ledger(tmp_path: Path, data: bytes, message: str) -> None:
    path = tmp_path / "package.pdf"
    path.write_bytes(data)
    refused(path, message)


@pytest.mark.parametrize("cut", range(100, 1400, 130))
def test_a_pdf_cut_anywhere_is_refused_in_words(tmp_path: Path, cut: int) -> None:
    path = tmp_path / "package.pdf"
    path.write_bytes(pdf(("ledger.json", ledger_file()))[:cut])
    refused(path, "PDF")


# Two


def test_a_pair(tmp_path: Path) -> None:
    paths = [tmp_path / name for name in ("a.json", "b.json")]
    for path, h in zip(paths, (20.0, 24.0), strict=True):
        path.write_bytes(ledger_file(h))
    old, new = read_pair(*paths)
    assert isinstance(old, Issued)
    assert (old.ledger["C-01/h"].value, new.ledger["C-01/h"].value) == (20.0, 24.0)


def test_what_is_wrong_with_both_is_told_at_once(tmp_path: Path) -> None:
    (tmp_path / "b.json").write_bytes(b"{}")
    with pytest.raises(InputError) as caught:
        read_pair(tmp_path / "a", tmp_path / "b.json")
    told = str(caught.value)
    assert told.startswith("two packages cannot be read\n  not there ")
    assert f"[{tmp_path / 'a'}]" in told
    assert "not a list of entries" in told
    assert f"[{tmp_path / 'b.json'}]" in told


@pytest.mark.parametrize("wrong", [0, 1])
def test_what_is_wrong_with_one_is_told_alone(tmp_path: Path, wrong: int) -> None:
    (tmp_path / "a.json").write_bytes(ledger_file())
    paths = [tmp_path / "a.json", tmp_path / "a.json"]
    paths[wrong] = tmp_path / "missing"
    with pytest.raises(InputError, match="no package to compare\n  not there"):
        read_pair(*paths)
