"""Numbers as printed, and lines whose printed numbers give the printed result."""

from __future__ import annotations

import math
from collections.abc import Sequence

import page_reading
import pytest
from hypothesis import assume, given
from hypothesis import strategies as st

from calcpack.typeset.digits import constant_text, honest, last_place, number_text, parse_number, rounded, stated_text

VALUES = st.floats(-1e12, 1e12).filter(lambda value: value == 0 or abs(value) > 1e-12)


# common practice: three figures, four where the first is a one; a short value whole; separators of thousands.
@pytest.mark.parametrize(
    ("value", "text"),
    [
        (0.0, "0"),
        (-0.0, "0"),
        (1.0, "1"),
        (4000.0, "4,000"),
        (60_000.0, "60,000"),
        (29_000_000.0, "29,000,000"),
        (33.0925, "33.1"),
        (33.09251, "33.1"),
        (1323.2417, "1,323"),
        (1.2345678, "1.235"),
        (9.2345678, "9.23"),
        (99.96789, "100.0"),
        (9999.6789, "10,000"),
        (123_456.789, "123,457"),
        (12_345_678.9, "12,345,679"),
        (0.1 + 0.2, "0.3"),
        (2 / 3, "0.667"),
        (1 / 3, "0.333"),
        (0.0001234567, "0.0001235"),
        (0.00001234567, "1.235×10⁻⁵"),
        (0.00002, "2.00×10⁻⁵"),
        (8.4138e9, "8.41×10⁹"),
        (-8.4138e9, "−8.41×10⁹"),
        (-2.5, "−2.5"),
        (-1234.56789, "−1,235"),
        (1e8, "1.000×10⁸"),
        (63.245553, "63.2"),
    ],
)
def test_number_as_printed(value: float, text: str) -> None:
    assert number_text(value) == text


@pytest.mark.parametrize(
    ("value", "text"),
    [(33.0925, "33.0925"), (0.0246875, "0.0246875"), (0.8125, "0.8125"), (1.2345678, "1.235"), (60000.0, "60,000")],
)
def test_a_given_is_printed_as_it_was_stated(value: float, text: str) -> None:
    assert stated_text(value) == text


def test_texts_of_the_origin_come_first() -> None:
    texts, text = honest(lambda v: v[0] * 2, [16.54631], 33.09262, ["16.55"])
    assert (texts, text) == (("16.55",), "33.1")
    # 17 * 2 = 34 is not 33.1: the text of the origin is too coarse for this line.
    texts, text = honest(lambda v: v[0] * 2, [16.54631], 33.09262, ["17"])
    assert (texts, text) == (("16.55",), "33.1")


def test_a_text_that_is_whole_is_kept_where_others_get_more_figures() -> None:
    texts, text = honest(lambda v: v[0] * v[1], [16.54631, 1.0], 16.54631, ["17", "1.0"])
    assert (texts, text) == (("16.55", "1.0"), "16.55")


def test_more_figures_where_asked_for() -> None:
    assert [number_text(math.pi, extra) for extra in range(4)] == ["3.14", "3.142", "3.1416", "3.14159"]
    assert number_text(4000.0, 5) == "4,000"


@pytest.mark.parametrize(
    ("value", "figures", "text"),
    [
        (math.pi, 1, "3"),
        (math.pi, 4, "3.142"),
        (9.996, 3, "10.00"),
        (123_456.0, 3, "123,000"),
        (0.0, 3, "0"),
        (0.00009999, 2, "0.000100"),
        (2.5, 1, "2"),
        (3.5, 1, "4"),
    ],
)
def test_rounded_to_figures(value: float, figures: int, text: str) -> None:
    assert rounded(value, figures) == text


@pytest.mark.parametrize(
    ("value", "text"),
    [
        (3, "3"),
        (0.85, "0.85"),
        (0.0003, "0.0003"),
        (4000, "4,000"),
        (29e6, "29,000,000"),
        (1.0, "1"),
        (0.017453292519943, "0.0174532925199"),
        (5.6e-7, "5.6×10⁻⁷"),
        (6.5e10, "6.5×10¹⁰"),
        (-2.0, "−2"),
    ],
)
def test_constants_are_printed_whole(value: float, text: str) -> None:
    assert constant_text(value) == text


@given(st.integers(-99_999, 99_999), st.integers(0, 4))
def test_a_short_constant_loses_nothing(digits: int, places: int) -> None:
    value = digits / 10**places
    assert page_reading.printed_number(constant_text(value)) == value


@given(VALUES, st.integers(0, 10))
def test_printed_number_reads_back_within_half_its_last_place(value: float, extra: int) -> None:
    text = number_text(value, extra)
    assert abs(parse_number(text) - value) <= 0.5000001 * last_place(text) + abs(value) * 1e-11
    assert parse_number(text) == page_reading.printed_number(text)


@given(VALUES)
def test_printing_what_was_printed_changes_nothing(value: float) -> None:
    text = number_text(value)
    assert parse_number(number_text(parse_number(text))) == parse_number(text)


@given(VALUES)
def test_sign_and_size_are_apart(value: float) -> None:
    assert number_text(-value).removeprefix("−") == number_text(value).removeprefix("−")


@given(st.floats(1e-3, 1e7), st.integers(0, 8))
def test_more_figures_are_never_worse(value: float, extra: int) -> None:
    near = abs(parse_number(number_text(value, extra)) - value)
    nearer = abs(parse_number(number_text(value, extra + 1)) - value)
    assert nearer <= near + 1e-11 * value


@pytest.mark.parametrize(
    ("text", "value"),
    [
        ("4,000 psi", 4000.0),
        ("−2.5 kip·ft", -2.5),
        ("8.41×10⁹", 8.41e9),
        ("2.00×10⁻⁵ in²", 2e-5),
        (".5", 0.5),
        ("0", 0.0),
    ],
)
def test_parse_number_leaves_the_unit_aside(text: str, value: float) -> None:
    assert parse_number(text) == value


@pytest.mark.parametrize("text", ["", "psi", "−", "x 5", "×10⁹"])
def test_no_printed_number_is_refused(text: str) -> None:
    with pytest.raises(ValueError, match="no printed number"):
        parse_number(text)


@pytest.mark.parametrize(
    ("text", "place"),
    [("4,000", 1.0), ("33.1", 0.1), ("0.0001235", 1e-7), ("8.41×10⁹", 1e7), ("−2.00×10⁻⁵", 1e-7), ("5", 1.0)],
)
def test_last_place(text: str, place: float) -> None:
    assert last_place(text) == pytest.approx(place, rel=1e-12)


LINES = {
    "product": lambda v: v[0] * v[1] * v[2],
    "quotient": lambda v: v[0] / v[1] + v[2],
    "difference": lambda v: v[0] - v[1] * 0.999,
    "near cancellation": lambda v: (v[0] + 1000.0) - v[0] * 1.0001 - 1000.0 + v[1],
    "root": lambda v: math.sqrt(v[0]) * v[1] / v[2],
    "power": lambda v: v[0] ** 2.5 / v[1] ** 0.3,
    "steep": lambda v: math.exp(v[0] / 100.0) - v[1],
    "capped": lambda v: min(v[0] / v[1], 2.5) * v[2],
}


@pytest.mark.parametrize("name", LINES)
@given(values=st.lists(st.floats(0.01, 5000.0), min_size=3, max_size=3))
def test_printed_numbers_give_the_printed_result(name: str, values: list[float]) -> None:
    line = LINES[name]
    result = line(values)
    assume(1e-6 < abs(result) < 1e12)
    texts, text = honest(line, values, result)
    assert len(texts) == 3
    found = line([page_reading.printed_number(one) for one in texts])
    assert abs(found - page_reading.printed_number(text)) <= last_place(text) * (1 + 1e-6)


def test_a_line_that_needs_more_figures_shows_more() -> None:
    # 1000.4567 - 999.4321 = 1.0246: with four figures 1000 - 999 = 1, off by more than the last digit of 1.025.
    texts, text = honest(lambda v: v[0] - v[1], [1000.45678, 999.43211], 1.02467)
    assert text == "1.025"
    assert texts == ("1,000.457", "999.432")
    plain, _ = honest(lambda v: v[0] * v[1], [33.09251, 2.0], 66.18502)
    assert plain == ("33.1", "2")


def test_a_cap_that_fewer_figures_would_cross_is_respected() -> None:
    # 2.4996 prints as 2.5 with three figures, where another rule would hold.
    def line(values: Sequence[float]) -> float:
        (value,) = values
        if value >= 2.5:
            raise ValueError("the condition does not hold")
        return 1.0

    texts, _ = honest(line, [2.4996123], 1.0)
    assert page_reading.printed_number(texts[0]) < 2.5


def test_a_line_without_a_value_for_few_figures_takes_more() -> None:
    texts, text = honest(lambda v: 1 / (v[0] - 1000.0), [1000.0004321], 1 / 0.0004321)
    assert page_reading.printed_number(texts[0]) != 1000.0
    assert text == "2,314"


@given(st.floats(1e6, 99_999_999.0))
def test_large_results_are_printed_to_the_unit(value: float) -> None:
    text = number_text(value)
    assert abs(page_reading.printed_number(text) - value) <= 0.5 or "×" in text
