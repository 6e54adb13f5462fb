from __future__ import annotations

import hashlib
from dataclasses import dataclass, replace
from datetime import date

import pytest
from hypothesis import given
from hypothesis import strategies as st

from calcpack.job import BarLayout, Revision, row_digest


@dataclass(frozen=True)
class Sample:
    mark: str
    f_c: float
    top: bool
    c_b: float | None
    bars: BarLayout
    roles: tuple[str, ...] = ()


@dataclass(frozen=True)
class Other:
    mark: object


@dataclass(frozen=True)
class Another:
    mark: object


GOOD = Sample("C1", 4000.0, False, None, BarLayout(8, 9, 3, 3, "8-#9 (3x3)"), ("checker",))


def test_the_digest_is_sha256_of_canonical_json() -> None:
    text = '["Revision",{"date":"2026-11-02","description":"br\\u00fc","letter":"A","purpose":"p"}]'
    expected = hashlib.sha256(text.encode()).hexdigest()
    assert row_digest(Revision("A", date(2026, 11, 2), "p", "brü")) == expected


def test_equal_records_have_equal_digests() -> None:
    assert row_digest(GOOD) == row_digest(replace(GOOD))


@pytest.mark.parametrize(
    "changed",
    [
        replace(GOOD, mark="C2"),
        replace(GOOD, f_c=4000.0000000000005),
        replace(GOOD, top=True),
        replace(GOOD, c_b=0.0),
        replace(GOOD, bars=BarLayout(8, 9, 2, 4, "8-#9 (3x3)")),
        replace(GOOD, roles=("checker", "checker")),
    ],
)
def test_any_changed_field_changes_the_digest(changed: Sample) -> None:
    assert row_digest(changed) != row_digest(GOOD)


@given(st.floats(allow_nan=False, allow_infinity=False), st.floats(allow_nan=False, allow_infinity=False))
def test_floats_count_to_their_last_bit(a: float, b: float) -> None:
    same = row_digest(replace(GOOD, f_c=a)) == row_digest(replace(GOOD, f_c=b))
    assert same == (a.hex() == b.hex())


def test_the_kind_of_record_counts() -> None:
    assert row_digest(Other("C1")) != row_digest(Another("C1"))


@pytest.mark.parametrize("value", [object(), {"a": 1}, Other])
def test_what_has_no_digest(value: object) -> None:
    with pytest.raises(TypeError, match=r"no fingerprint of a .*: records hold texts, numbers, dates and tuples"):
        row_digest(Other(value))


def test_no_digest_of_a_value_that_is_not_finite() -> None:
    with pytest.raises(ValueError, match="not JSON compliant"):
        row_digest(replace(GOOD, f_c=float("nan")))
