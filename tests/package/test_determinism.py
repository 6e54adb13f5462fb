"""The same job gives the same bytes, wherever, whenever and by whomever it is issued."""

from __future__ import annotations

import os
import re
import shutil
from pathlib import Path

import pytest
from job_samples import calcpack, copy_of_demo, issued_demo

FILES = ("ledger.json", "manifest.json", "package.html", "package.pdf")


@pytest.mark.slow
def test_two_issues_of_the_demo_are_the_same_bytes(tmp_path_factory: pytest.TempPathFactory) -> None:
    """F5: two folders, time zones, locales, hash seeds and working directories; one package."""
    first = issued_demo(tmp_path_factory)
    second = copy_of_demo(tmp_path_factory.mktemp("another place, with spaces & é") / "deeper" / "job")
    for path in second.rglob("*"):
        os.utime(path, (86_400.0, 86_400.0))
    done = calcpack(
        "issue", cwd=second, TZ="America/St_Johns", LC_ALL="C.UTF-8", LANG="tr_TR.UTF-8", PYTHONHASHSEED="4711",
        COLUMNS="40", SOURCE_DATE_EPOCH="1", USER="someone", HOSTNAME="elsewhere",
    )  # fmt: skip
    assert done.returncode == 0, done.stderr
    for name in FILES:
        one, other = (root / "record" / "issued" / "A" / name for root in (first, second))
        assert one.read_bytes() == other.read_bytes(), name


@pytest.mark.slow
def test_kept_runs_give_the_same_bytes_as_fresh_ones(tmp_path_factory: pytest.TempPathFactory) -> None:
    """An issue made from kept runs is the issue made from fresh ones."""
    first = issued_demo(tmp_path_factory)
    second = Path(shutil.copytree(first, tmp_path_factory.mktemp("kept") / "job"))
    shutil.rmtree(second / "record")
    done = calcpack("issue", second)
    assert done.returncode == 0, done.stderr
    assert re.findall(r"^  ran .*", done.stdout, re.MULTILINE) == []
    for name in FILES:
        one, other = (root / "record" / "issued" / "A" / name for root in (first, second))
        assert one.read_bytes() == other.read_bytes(), name


@pytest.mark.slow
def test_nothing_of_this_machine_is_in_the_package(tmp_path_factory: pytest.TempPathFactory) -> None:
    root = issued_demo(tmp_path_factory)
    for name in FILES:
        data = (root / "record" / "issued" / "A" / name).read_bytes()
        for trace in (str(root), str(Path.home()), os.uname().nodename):
            assert len(trace) < 6 or trace.encode() not in data, (name, trace)
