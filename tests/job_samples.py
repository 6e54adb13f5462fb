"""Small jobs for the tests, as an author would write them, and the commands run as a user would run them."""

from __future__ import annotations

import json
import os
import subprocess
import sys
from collections.abc import Mapping, Sequence
from pathlib import Path
from typing import Any

import pytest

from calcpack import notebook
from calcpack.aci318.standards import ACI_318_14, ACI_318_19
from calcpack.formula import formula, inch
from calcpack.units import Area, Force, Length, Ratio, Stress

JOB = """
[job]
number = "26-044"
title = "Cold store at Marl Hythe"
location = "Marl Hythe"
client = "Hythe Growers"
firm = "Quill and Ashby"

[codes]
building = "IBC 2021"
concrete = "ACI 318-19"
loads = "ASCE 7-16"

[units]
system = "US"

[people.nda]
name = "N. D. Ambrey"
role = "originator"

[[revision]]
letter = "A"
date = 2026-11-20
purpose = "Plan review"
description = "First issue"
"""

GIVENS = """
[[given]]
symbol = "q_allow"
value = "4.0 kip/ft^2"
means = "allowable soil bearing pressure"
source = "Geotechnical report GR-7 rev 1, table 3"
status = "assumed"

[[given]]
symbol = "h_below"
value = "15 in"
means = "fresh concrete below the bars"
source = "S-301, section 1, rev 0"
status = "confirmed"
"""

ANCHORAGE = """mark,kind,bar,f_c [psi],f_y [psi],top,clear_cover [in],clear_spacing [in],available [in],source
T1,straight tension,#7,4000,60000,yes,2.0,5.125,72,"S-301, section 1, rev 0"
T2,straight tension,#8,4000,60000,no,2.0,5.0,60,"S-301, section 2, rev 0"
"""


@formula(ACI_318_14("22.4.2.2"), ACI_318_19("22.4.2.2"))
def axial(*, f_c: Stress, A_g: Area, A_st: Area, f_y: Stress) -> Force:
    """Nominal axial strength at zero eccentricity."""
    P_o = 0.85 * f_c * (A_g - A_st) + f_y * A_st
    return P_o


@formula("office practice")
def casting(*, h_below: Length) -> Ratio:
    """Factor for casting position."""
    if h_below > 12 * inch:
        psi_t = 1.3
    else:
        psi_t = 1.0
    return psi_t


@formula("geometry")
def twice(*, L_1: Length) -> Length:
    """Two spans, by way of one more."""
    L_2: Length = 2 * L_1
    L_3: Length = L_2 + L_1
    return L_3


def make_job(root: Path, sheets: Mapping[str, Sequence[str]] | None = None, *, toml: str = JOB, **inputs: str) -> Path:
    """A job folder; `sheets` maps file names to the sources of their code cells, `inputs` name files by stem."""
    (root / "sheets").mkdir(parents=True)
    (root / "inputs").mkdir()
    (root / "job.toml").write_text(toml, "utf-8")
    for name, cells in (sheets or {}).items():
        write_notebook(root, name, cells)
    for stem, text in inputs.items():
        (root / "inputs" / f"{stem}.{'toml' if stem == 'givens' else 'csv'}").write_text(text, "utf-8")
    return root


def write_notebook(root: Path, name: str, cells: Sequence[str]) -> Path:
    """A notebook of code cells."""
    from nbformat import v4

    made = v4.new_notebook(cells=[v4.new_code_cell(cell, id=f"c{index}") for index, cell in enumerate(cells)])
    path = root / "sheets" / name
    path.write_text(json.dumps(made), "utf-8")
    return path


def opening(sheet: str, subject: str = "A subject") -> str:
    """The first cell of a notebook."""
    return f"from calcpack import Sheet\nsheet = Sheet({sheet!r}, {subject!r})"


def given(symbol: str, value: str, source: str = "S-1, rev 0") -> str:
    """A cell that states a value."""
    return f"{symbol} = sheet.given({symbol!r}, {value!r}, 'a value', source={source!r})"


class Shown:
    """What a sheet shows, item by item."""

    def __init__(self, patch: pytest.MonkeyPatch) -> None:
        self.items: list[dict[str, Any]] = []
        patch.setattr(notebook, "show", lambda item: self.items.append(json.loads(json.dumps(item))))

    def of(self, kind: str) -> list[dict[str, Any]]:
        """The items of one type."""
        return [item for item in self.items if item["type"] == kind]

    @property
    def last(self) -> dict[str, Any]:
        """The newest item."""
        return self.items[-1]


def calcpack(
    *arguments: object, cwd: Path | None = None, timeout: int = 120, **environment: str
) -> subprocess.CompletedProcess[str]:
    """The command line in a process of its own, output in pipes."""
    return subprocess.run(
        [sys.executable, "-m", "calcpack.cli", *map(str, arguments)],
        cwd=cwd, env={**os.environ, **environment}, capture_output=True, text=True, encoding="utf-8",
        timeout=timeout, stdin=subprocess.DEVNULL, check=False,
    )  # fmt: skip


def copy_of_demo(folder: Path) -> Path:
    """The demo project without anything the tool has written."""
    import shutil

    demo = Path(__file__).parent.parent / "demo_project"
    folder.mkdir(parents=True)
    shutil.copy(demo / "job.toml", folder)
    for name in ("inputs", "sheets", "figures"):
        if (demo / name).is_dir():
            shutil.copytree(demo / name, folder / name, ignore=shutil.ignore_patterns(".*"))
    return folder


_issued: list[Path] = []


def issued_demo(factory: pytest.TempPathFactory) -> Path:
    """A copy of the demo, issued once for all tests of a run."""
    if not _issued:
        _issued.append(_issue_demo(copy_of_demo(factory.mktemp("demo") / "osier")))
    return _issued[0]


def _issue_demo(root: Path) -> Path:
    done = calcpack("issue", root, TZ="Pacific/Kiritimati", LC_ALL="C", PYTHONHASHSEED="1")
    assert done.returncode == 0, done.stderr
    return root
