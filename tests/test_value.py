"""A value as an author holds it, and how values are shown."""

from __future__ import annotations

import operator
from collections.abc import Callable
from typing import Any

import pytest

from calcpack import Value
from calcpack.errors import SheetError
from calcpack.ledger import Entry
from calcpack.units import LENGTH, RATIO, STRESS
from calcpack.value import ratio_text, shown_text


@pytest.fixture
def span() -> Value:
    entry = Entry("C-01/L_1", "given", "L_1", "span", 60.0, "in", "5 ft", "C-01", source="S-1", status="confirmed")
    return Value(entry, LENGTH, "C-01")


def test_a_value_reads_as_its_symbol_and_number(span: Value) -> None:
    assert str(span) == "L_1 = 5 ft"
    assert float(span) == 60.0


REFUSED = [
    operator.add, operator.sub, operator.mul, operator.truediv, operator.pow, operator.lt, operator.le, operator.gt,
    operator.ge,
]  # fmt: skip


@pytest.mark.parametrize("operation", REFUSED)
@pytest.mark.parametrize("turned", [False, True])
def test_arithmetic_is_refused_with_the_remedy(span: Value, operation: Callable[..., Any], turned: bool) -> None:
    for other in (span, 2.0):
        sides = (other, span) if turned else (span, other)
        if operation is operator.pow and turned and other == 2.0:
            continue
        with pytest.raises(SheetError, match=r"L_1: arithmetic between values would not stand on the page\n") as caught:
            operation(*sides)
        (problem,) = caught.value.problems
        assert problem.remedy == "write a small @formula and sheet.work(...) it; float(value) reads it"


def test_a_number_to_the_power_of_a_value_is_refused_too(span: Value) -> None:
    with pytest.raises(SheetError, match="arithmetic between values"):
        2.0**span  # type: ignore[operator]


@pytest.mark.parametrize("operation", [operator.neg, abs, round, operator.pos])
def test_so_is_arithmetic_on_one_value(span: Value, operation: Callable[..., Any]) -> None:
    with pytest.raises(SheetError, match="arithmetic between values"):
        operation(span)


def test_values_are_compared_by_what_they_are(span: Value) -> None:
    assert span == Value(span.entry, LENGTH, "C-01")
    assert span != Value(span.entry, LENGTH, "C-02")


def test_a_value_at_the_end_of_a_cell_shows_nothing_again(span: Value, capsys: pytest.CaptureFixture[str]) -> None:
    span._ipython_display_()
    assert capsys.readouterr().out == ""


@pytest.mark.parametrize(
    ("value", "dimension", "unit", "text"),
    [
        (60.0, LENGTH, "", "60 in"),
        (60.0, LENGTH, "ft", "5 ft"),  # 12 in to the foot
        (4000.0, STRESS, "ksi", "4 ksi"),
        (0.75, RATIO, "", "0.75"),
    ],
)
def test_a_given_is_shown_in_the_unit_asked_for(value: float, dimension: Any, unit: str, text: str) -> None:
    assert shown_text(value, dimension, unit) == text


@pytest.mark.parametrize(
    ("ratio", "text"),
    [
        (0.0, "0.00"), (0.9999, "1.00"), (1.0, "1.00"), (1.0 + 1e-10, "1.00"), (1.0004, "1.0004"), (1.005, "1.005"),
        (1.01, "1.01"), (1.3, "1.30"), (1.0000004, "1.000000400"), (12.345, "12.35"),
    ],
)  # fmt: skip
def test_a_ratio_shows_on_which_side_of_one_it_is(ratio: float, text: str) -> None:
    assert ratio_text(ratio) == text
