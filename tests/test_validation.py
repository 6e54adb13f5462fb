"""Every published case as a test of its own, and the table of them."""

from __future__ import annotations

from pathlib import Path

import pytest

from calcpack import validation
from calcpack.errors import RefusedError
from calcpack.validation import CaseResult, cases, published_folder, run, table

RESULTS = run()


@pytest.mark.parametrize("result", RESULTS, ids=[case.name for case in cases()])
def test_case(result: CaseResult) -> None:
    found = f"{result.computed:g} {result.unit} for {result.expected:g}, {result.deviation:+.2f} %: {result.source}"
    assert abs(result.deviation) <= result.tolerance, found


def test_names_of_cases_are_unique() -> None:
    names = [case.name for case in cases()]
    assert len(names) == len(set(names))


def test_every_case_has_a_source_and_a_known_provenance() -> None:
    for case in cases():
        assert len(case.source) > 20
        assert case.kind in validation.KINDS
        assert case.edition in ("ACI 318-14", "ACI 318-19")


def test_tolerances_are_those_of_printed_digits() -> None:
    # A whole number of inches allows half an inch, or one where the source rounds up; AB-DC-01 prints 9 in for 8.2.
    for case in cases():
        assert 0 < case.tolerance <= 9.2


def test_a_wrong_number_does_not_hold() -> None:
    assert not CaseResult("X", "s", "published", "ACI 318-19", "l_d", 10.0, 10.2, "in", 2.0, 1.9).holds
    assert CaseResult("X", "s", "published", "ACI 318-19", "l_d", 10.0, 9.8, "in", -2.0, 2.0).holds


def test_table_has_a_line_for_each_case_and_a_total() -> None:
    lines = table().splitlines()
    assert len(lines) == len(RESULTS) + 3
    assert lines[0].split()[:3] == ["case", "quantity", "edition"]
    holding = sum(result.holds for result in RESULTS)
    assert lines[-1].startswith(f"{holding} of {len(RESULTS)} hold; ")
    assert "published" in lines[-1]
    assert "from memory" in lines[-1]


def test_cases_are_found_in_the_source_tree_or_in_the_package() -> None:
    assert published_folder().name in ("published", "_published")


def test_missing_cases_are_said(tmp_path: Path, monkeypatch: pytest.MonkeyPatch) -> None:
    monkeypatch.setattr(validation, "__file__", str(tmp_path / "calcpack" / "validation.py"))
    with pytest.raises(RefusedError, match="the published cases are not installed"):
        published_folder()
    packed = tmp_path / "calcpack" / "_published"
    packed.mkdir(parents=True)
    assert published_folder() == packed
