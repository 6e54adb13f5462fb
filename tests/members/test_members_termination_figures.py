"""Which detail a row of the anchorage schedule gets, and that it says what the ledger decides. Invented rows."""

from __future__ import annotations

import math
from collections.abc import Callable
from dataclasses import dataclass
from typing import Any

import pytest

from calcpack.aci318.bars import BARS, bar
from calcpack.aci318.editions import Edition
from calcpack.errors import RangeError
from calcpack.figures import Figure
from calcpack.ledger import passes
from calcpack.members.anchorage import check, required_length
from calcpack.members.pad import FloatPad
from calcpack.members.termination import KINDS, Termination
from calcpack.members.termination_figures import DRAWN, stagger_figure, termination_figure

Row = Callable[..., Termination]
WORDS = {
    "straight tension": "straight bar in tension",
    "straight compression": "straight bar in compression",
    "hook 90": "standard 90° hook",
    "hook 180": "standard 180° hook",
    "headed": "headed bar",
    "lap tension": "tension lap",
    "lap compression": "compression lap",
}
SUBSCRIPTS = {
    "straight tension": "d",
    "straight compression": "dc",
    "hook 90": "dh",
    "hook 180": "dh",
    "headed": "dt",
    "lap tension": "st",
    "lap compression": "sc",
}
each_kind = pytest.mark.parametrize("kind", sorted(DRAWN))


@dataclass(frozen=True)
class Located(Termination):
    """A row as a job's table has it, with its place in words."""

    member: str = ""
    location: str = ""


def plain(kind: str, **changes: Any) -> Termination:
    return Located(**({"mark": "T1", "kind": kind, "bar": 8, "f_c": 4000.0, "f_y": 60000.0} | changes))


def shows(figure: Figure, text: str) -> bool:
    """Whether a text element of the drawing is just this."""
    return f">{text}</text>" in figure.svg


def test_every_kind_of_length_has_a_detail() -> None:
    assert set(KINDS) - DRAWN == {"mechanical splice"}
    with pytest.raises(
        RangeError, match=r"no detail of T1\n +kind 'mechanical splice' +one of straight tension, hook 90"
    ):
        termination_figure(plain("mechanical splice"), 40.0)


@each_kind
def test_the_symbol_and_the_caption_of_each_kind(kind: str) -> None:
    figure = termination_figure(plain(kind, available=30.0, location="beam B2 at grid 4"), 20.0)
    assert shows(figure, SUBSCRIPTS[kind])
    assert figure.caption == f"T1: {WORDS[kind]}, #8, beam B2 at grid 4"
    assert figure.alt.startswith("Elevation to scale of T1: ")


@each_kind
@pytest.mark.parametrize("available", [20.0 * (1 - 1e-6), 20.0 * (1 - 1e-10), 20.0, 20.1, 19.9])
def test_the_word_is_that_of_the_ledger(kind: str, available: float) -> None:
    figure = termination_figure(plain(kind, available=available), 20.0)
    word = "OK" if passes(20.0 / available) else "NG"
    assert shows(figure, word)
    assert not shows(figure, "NG" if word == "OK" else "OK")
    assert f"available: {word}." in figure.alt


@each_kind
def test_no_word_where_no_length_is_available(kind: str) -> None:
    figure = termination_figure(plain(kind), 20.0)
    assert not shows(figure, "OK")
    assert not shows(figure, "NG")
    assert "20.0 in is required and the length available is not stated" in figure.alt


@each_kind
def test_it_agrees_with_the_check_of_the_row(kind: str, row: Row, each: Edition) -> None:
    needed = required_length(FloatPad(), row(kind), each).value
    for available in (0.9 * needed, needed, 1.2 * needed):
        one = row(kind, available=available)
        result = check(one, each)
        figure = termination_figure(one, needed)
        # A condition beside the length may fail the row; the figure speaks of the length.
        assert shows(figure, "OK" if passes(result.ratio or 0.0) else "NG")
        assert f"{needed:.1f} in is required" in figure.alt or f"{needed:.2f} in is required" in figure.alt


@each_kind
@pytest.mark.parametrize("size", BARS)
@pytest.mark.parametrize("available", [None, 2.0, 400.0])
def test_every_size_is_drawn_however_short_the_room(kind: str, size: int, available: float | None) -> None:
    figure = termination_figure(plain(kind, bar=size, available=available), 60.0)
    assert f"{bar(size).d_b:.3f} in in diameter" in figure.alt
    assert 1.0 < figure.width < 6.5
    assert 0.8 < figure.height < 5.5


@pytest.mark.parametrize(
    ("size", "inside", "extension"), [(8, "6", "12"), (11, "11.28", "16.92"), (18, "22.57", "27.08")]
)
def test_a_90_degree_hook_has_its_standard_bend_and_extension(size: int, inside: str, extension: str) -> None:
    # ACI 318 Table 25.3.1, from memory: 6, 8 and 10 bar diameters inside; 12 bar diameters beyond the bend.
    figure = termination_figure(plain("hook 90", bar=size, available=40.0), 30.0)
    assert shows(figure, f"{inside} in inside dia.")
    assert shows(figure, f"{extension} in ext.")


@pytest.mark.parametrize(("size", "extension"), [(5, "2 1/2"), (6, "3")])
def test_a_180_degree_hook_has_its_standard_extension(size: int, extension: str) -> None:
    # ACI 318 Table 25.3.1, from memory: 4 bar diameters, 2 1/2 in at least; 4 d_b is 2.5 in for No. 5.
    figure = termination_figure(plain("hook 180", bar=size, available=14.0), 9.0)
    assert shows(figure, f"{extension} in ext.")


def test_the_head_has_the_least_bearing_area() -> None:
    from calcpack.figures import headed_detail

    # ACI 318 25.4.4.1, from memory: net bearing area of 4 A_b; the gross area of a round head is then 5 A_b.
    width = math.sqrt(5 * 0.79 * 4 / math.pi)
    figure = termination_figure(plain("headed", available=16.0), 14.0)
    label = {"bar_label": "#8", "head_label": "head, bearing area 4 bar areas", "mark": "T1"}
    assert figure.svg == headed_detail(d_b=1.0, head_width=width, l_dt=14.0, available=16.0, **label).svg


def test_covers_are_shown_where_the_row_states_them() -> None:
    stated = {"side_cover": 2.75, "tail_cover": 2.5, "clear_cover": 1.5, "available": 15.0}
    top, bottom = (termination_figure(plain("hook 90", top=top, **stated), 12.0) for top in (True, False))
    for figure in (top, bottom):
        assert '2 1/2" clear beyond it' in figure.alt
        assert '2 3/4" side cover' in figure.alt
    assert '1 1/2" clear above the bar' in top.alt
    assert "above the bar" not in bottom.alt
    bare = termination_figure(plain("hook 90", available=15.0), 12.0)
    assert "cover" not in bare.alt
    assert "clear" not in bare.alt


@pytest.mark.parametrize(("top", "side"), [(True, "top"), (False, "bottom")])
def test_the_cover_of_a_straight_bar_is_at_its_face(top: bool, side: str) -> None:
    figure = termination_figure(plain("straight tension", clear_cover=2.0, top=top, available=50.0), 40.0)
    assert f'clear cover 2" at the {side}' in figure.alt


def test_a_lap_of_two_sizes_shows_both() -> None:
    figure = termination_figure(plain("lap tension", bar=9, other_bar=6, available=50.0), 40.0)
    assert shows(figure, "#9")
    assert shows(figure, "#6")
    assert "1.128 in and 0.750 in in diameter" in figure.alt
    alike = termination_figure(plain("lap tension", bar=9, other_bar=9, available=50.0), 40.0)
    assert "tension lap of #9 bars, 1.128 in in diameter" in alike.alt


def test_what_the_caption_says_of_the_bar() -> None:
    row = plain("straight tension", bar=6, top=True, coating="epoxy", bundle=3, member="washdown deck")
    assert termination_figure(row, 40.0).caption == (
        "T1: straight bar in tension, #6 top, bundle of 3, epoxy-coated, washdown deck"
    )
    located = plain("lap tension", lap_class="B", member="deck", location="over grid 3", coating="zinc")
    assert termination_figure(located, 40.0).caption == "T1: tension lap of class B, #8, zinc-coated, over grid 3"
    # A row of the library itself has no location.
    bare = Termination(mark="T1", kind="headed", bar=8, f_c=4000.0, f_y=60000.0)
    assert termination_figure(bare, 14.0).caption == "T1: headed bar, #8"


@pytest.mark.parametrize(
    ("stated", "shown"),
    [
        ({"lap_class": "A"}, "A"),
        ({"lap_class": "B", "spliced": 0.5, "bar_stress": 0.4}, "B"),
        ({"lap_class": "A", "spliced": 1.0}, ""),
        ({"lap_class": "A", "bar_stress": 0.8}, ""),
        ({}, ""),
    ],
)
def test_the_class_is_shown_where_the_schedule_alone_decides_it(stated: dict[str, Any], shown: str) -> None:
    figure = termination_figure(plain("lap tension", **stated), 40.0)
    assert (f"class {shown}" in figure.caption) if shown else ("class" not in figure.caption)


def test_impossible_lengths_are_refused() -> None:
    with pytest.raises(RangeError, match=r"l_d = 0 in +a length above 0 in"):
        termination_figure(plain("straight tension", available=20.0), 0.0)
    with pytest.raises(RangeError, match=r"available = 0 in"):
        termination_figure(plain("hook 90", available=0.0), 12.0)
    with pytest.raises(RangeError, match=r"lap_required = nan in"):
        termination_figure(plain("lap tension", available=20.0), math.nan)


@pytest.mark.parametrize(
    ("stated", "shown"),
    [
        ({"lap_class": "A"}, "30.0 in stagger"),
        ({"lap_class": "B", "spliced": 0.5}, "30.0 in stagger"),
        ({"lap_class": "B", "spliced": 0.51}, "Class B: all bars lapped at one section"),
        ({"lap_class": "B"}, "Class B: all bars lapped at one section"),
    ],
)
def test_laps_are_staggered_by_the_lap_where_half_of_the_bars_are_spliced(stated: dict[str, Any], shown: str) -> None:
    figure = stagger_figure(plain("lap tension", spacing=8.0, location="deck", **stated), 30.0)
    assert figure is not None
    assert shows(figure, shown)
    assert figure.caption == f"T1: laps of neighbouring bars of class {stated['lap_class']}, #8, deck"


@pytest.mark.parametrize(
    "changes",
    [
        {"spacing": None},
        {"lap_class": None},
        {"kind": "lap compression"},
        {"kind": "straight tension"},
        {"spacing": 2.0},
    ],
)
def test_no_stagger_where_the_row_states_too_little(changes: dict[str, Any]) -> None:
    stated = {"kind": "lap tension", "lap_class": "B", "spacing": 8.0}
    assert stagger_figure(plain(**(stated | changes)), 30.0) is None
