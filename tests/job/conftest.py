from __future__ import annotations

from collections.abc import Callable, Sequence
from pathlib import Path

import pytest

JOB = """
[job]
number = "26-031"
title = "Harbour Row, block B"
location = "Quay 7, Port Ellery"
client = "Ellery Dock Trust"
firm = "Northgate Structures"

[codes]
building = "IBC 2021"
concrete = "ACI 318-19"
loads = "ASCE 7-16"

[units]
system = "US"

[people.amr]
name = "A. M. Reyes"
role = "originator"
licence = "PE 00000, ST"

[people.jkl]
name = "J. K. Lund"
role = ["checker", "approver"]

[[revision]]
letter = "A"
date = 2026-11-02
purpose = "Plan review"
description = "First issue"

[[revision]]
letter = "B"
date = 2026-11-20
purpose = "Plan review"
description = "Comments answered"
"""


@pytest.fixture
def job_root(tmp_path: Path) -> Path:
    """A job folder that is right in every key."""
    (tmp_path / "job.toml").write_text(JOB, encoding="utf-8")
    (tmp_path / "inputs").mkdir()
    return tmp_path


@pytest.fixture
def edit(job_root: Path) -> Callable[..., Path]:
    """Change texts of the good job.toml: edit((old, new), ...)."""

    def change(*pairs: tuple[str, str]) -> Path:
        text = JOB
        for old, new in pairs:
            assert old in text
            text = text.replace(old, new, 1)
        (job_root / "job.toml").write_text(text, encoding="utf-8")
        return job_root

    return change


@pytest.fixture
def put(job_root: Path) -> Callable[[str, str], Path]:
    """Write a text below inputs/ and return the job folder."""

    def write(name: str, text: str) -> Path:
        (job_root / "inputs" / name).write_text(text, encoding="utf-8")
        return job_root

    return write


@pytest.fixture
def put_xlsx(job_root: Path) -> Callable[[str, Sequence[Sequence[object]]], Path]:
    """Write rows as the first worksheet of inputs/NAME and return the job folder."""

    def write(name: str, rows: Sequence[Sequence[object]]) -> Path:
        from openpyxl import Workbook

        book = Workbook()
        for row in rows:
            book.worksheets[0].append(list(row))
        book.create_sheet("notes").append(["not read"])
        book.save(job_root / "inputs" / name)
        return job_root

    return write
