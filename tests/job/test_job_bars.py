from __future__ import annotations

import pytest
from hypothesis import given
from hypothesis import strategies as st

from calcpack.job import BAR_SIZES, BarLayout, Transverse
from calcpack.job.bars import bar_size, parse_layout, parse_transverse


def test_sizes_that_are_made() -> None:
    # published: ASTM A615/A615M, table 1, deformed bar designations No. 3 to 11, 14 and 18 (No. 20 is not served).
    assert BAR_SIZES == (3, 4, 5, 6, 7, 8, 9, 10, 11, 14, 18)
    assert [bar_size(f"#{size}") for size in BAR_SIZES] == list(BAR_SIZES)


@pytest.mark.parametrize("text", ["#2", "#12", "#13", "#15", "#0", "#99"])
def test_sizes_that_are_not_made(text: str) -> None:
    with pytest.raises(ValueError, match=rf"{text} is not a bar of ASTM A615: #3 to #11, #14, #18"):
        bar_size(text)


@pytest.mark.parametrize("text", ["8", "No. 8", "# 8", "#8.0", "#", "#-8", "#٨", "#8 ", ""])
def test_other_ways_to_write_a_size(text: str) -> None:
    with pytest.raises(ValueError, match=r"write the size as #8"):
        bar_size(text)


@pytest.mark.parametrize(
    ("text", "expected"),
    [
        # The job contract's own examples: eight No. 9, three along each face.
        ("8-#9 (3x3)", (8, 9, 3, 3)),
        ("8-#9 (2x4)", (8, 9, 2, 4)),
        ("4-#8 (2x2)", (4, 8, 2, 2)),
        ("8-#9(3×3)", (8, 9, 3, 3)),
        ("8 - #9 ( 3 x 3 )", (8, 9, 3, 3)),
        ("10-#8", (10, 8, None, None)),
        ("3-#18", (3, 18, None, None)),
    ],
)
def test_layouts(text: str, expected: tuple[int, int, int | None, int | None]) -> None:
    assert parse_layout(text) == BarLayout(*expected, text)


@pytest.mark.parametrize(
    ("text", "found"),
    [
        ("9-#9 (3x3)", "3x3 makes 8 bars, not 9: corners count in both faces"),
        ("7-#9 (3x3)", "3x3 makes 8 bars, not 7"),
        ("6-#9 (1x4)", "each face needs at least 2 bars, the corners"),
        ("6-#9 (4x1)", "each face needs at least 2 bars, the corners"),
        ("8-#12 (3x3)", "#12 is not a bar of ASTM A615"),
        ("2-#8", "a circle needs at least 3 bars"),
        ("8#9 (3x3)", "write it as 8-#9"),
        ("8-9 (3x3)", "write it as 8-#9"),
        ("8-#9 3x3", "write it as 8-#9"),
        ("8-#9 (3x3) T", "write it as 8-#9"),
        ("-8-#9 (3x3)", "write it as 8-#9"),
    ],
)
def test_layouts_that_are_wrong(text: str, found: str) -> None:
    with pytest.raises(ValueError, match=found):
        parse_layout(text)


@given(st.integers(2, 40), st.integers(2, 40), st.integers(1, 200))
def test_only_the_count_of_the_perimeter_is_accepted(n_x: int, n_y: int, count: int) -> None:
    # Positions on the edge of an n_x by n_y grid, counted one by one.
    edge = sum(1 for i in range(n_x) for j in range(n_y) if i in (0, n_x - 1) or j in (0, n_y - 1))
    if count == edge:
        assert parse_layout(f"{count}-#8 ({n_x}x{n_y})").count == edge
    else:
        with pytest.raises(ValueError, match=f"makes {edge} bars, not {count}"):
            parse_layout(f"{count}-#8 ({n_x}x{n_y})")


@pytest.mark.parametrize(
    ("text", "kind", "size", "spacing"),
    [
        ("#3@12", "ties", 3, 12.0),
        ("#4 spiral@2.25", "spiral", 4, 2.25),
        ("#4  spiral @ .5", "spiral", 4, 0.5),
        ("#4 @ 300.", "ties", 4, 300.0),
    ],
)
def test_transverse(text: str, kind: str, size: int, spacing: float) -> None:
    assert parse_transverse(text) == Transverse(kind, size, spacing, text)


@pytest.mark.parametrize(
    ("text", "found"),
    [
        ("#3@0", "the spacing has to be above 0"),
        ("#3@-2", "write it as #3@12"),
        ("#3@12 in", "write it as #3@12"),
        ("#3", "write it as #3@12"),
        ("#3 hoop@12", "write it as #3@12"),
        ("#4spiral@2", "write it as #3@12"),
        ("#3@inf", "write it as #3@12"),
        ("#2@12", "#2 is not a bar of ASTM A615"),
    ],
)
def test_transverse_that_is_wrong(text: str, found: str) -> None:
    with pytest.raises(ValueError, match=found):
        parse_transverse(text)
