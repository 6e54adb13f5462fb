"""Two printed values show that they differ, and the change is given in per cent."""

from __future__ import annotations

from dataclasses import replace

import pytest
from comparison_samples import Book, beam
from hypothesis import given
from hypothesis import strategies as st

from calcpack.package.compare import Change
from calcpack.package.moved import from_to, percent_text
from calcpack.typeset.digits import number_text


def change(before: float, after: float, shown: tuple[str, str], unit: str = "lb") -> Change:
    entry = replace(beam(Book())["C-01/h"], unit=unit)
    return Change(replace(entry, value=before, shown=shown[0]), replace(entry, value=after, shown=shown[1]))


@pytest.mark.parametrize(
    ("before", "after", "shown", "unit", "expected"),
    [
        # As printed, where that shows it.
        (4000.0, 3500.0, ("4,000 psi", "3,500 psi"), "psi", ("4,000 psi", "3,500 psi")),
        (12.0, 12.0, ("12 in", "1 ft"), "in", ("12 in", "1 ft")),
        (12.0, 18.0, ("12 in", "1.5 ft"), "in", ("12 in", "1.5 ft")),
        # 434,120 lb and 434,270 lb are both 434 kip.
        (434120.0, 434270.0, ("434 kip", "434 kip"), "lb", ("434.1 kip", "434.3 kip")),
        (1200.0, 1201.0, ("0.1 kip·ft", "0.1 kip·ft"), "lb*in", ("0.1000 kip·ft", "0.1001 kip·ft")),
        # One printed with more figures than the other: 16.04 may be the same as 16.0369.
        (16.0369, 16.0371, ("16.0369 in", "16.04 in"), "in", ("16.0369 in", "16.0371 in")),
        (0.97241, 0.97236, ("0.97", "0.97"), "", ("0.97241", "0.97236")),
        # The same as printed and in truth.
        (434120.0, 434120.0, ("434 kip", "434 kip"), "lb", ("434 kip", "434 kip")),
        # A unit that the gate does not know gives way to the coherent one.
        (434120.0, 434270.0, ("434 knots", "434 knots"), "lb", ("434,100 lb", "434,300 lb")),
        (-434120.0, -434270.0, ("−434 kip", "−434 kip"), "lb", ("−434.1 kip", "−434.3 kip")),
        (1.0, 2.0, ("see note", "see note"), "lb", ("1.00 lb", "2.00 lb")),
        (1.0, 2.0, ("see note", "see other note"), "lb", ("see note", "see other note")),
    ],
)
def test_from_and_to(before: float, after: float, shown: tuple[str, str], unit: str, expected: tuple[str, str]) -> None:
    assert from_to(change(before, after, shown, unit)) == expected


def test_a_value_that_is_printed_in_another_way_stays_as_printed() -> None:
    assert from_to(change(12.0, 12.0, ("12 in", "12.0 in"), "in")) == ("12 in", "12.0 in")


@given(
    st.floats(0.001, 1e7), st.floats(1e-9, 10.0).map(lambda part: 1 + part),
)  # fmt: skip
def test_what_moved_is_seen_to_move(value: float, part: float) -> None:
    texts = (f"{number_text(value)} lb", f"{number_text(value * part)} lb")
    before, after = from_to(change(value, value * part, texts))
    assert before != after


@pytest.mark.parametrize(
    ("percent", "text"),
    [
        (-12.5, "−12.5 %"),
        (25.0, "+25.0 %"),
        (1.4067, "+1.41 %"),
        (0.0, "0 %"),
        (-0.08664, "−0.0866 %"),
        (0.1234, "+0.123 %"),
        (1250.4, "+1,250 %"),
        (9.996, "+10.00 %"),
        (3e12, "+3.00×10¹² %"),
    ],
)
def test_per_cent_as_text(percent: float, text: str) -> None:
    assert percent_text(percent) == text
