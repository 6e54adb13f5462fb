"""How the frame of a column behaves in one combination: nonsway, or sway with a magnifier of its sway moments."""

from __future__ import annotations

from collections.abc import Iterable
from dataclasses import dataclass
from typing import Generic, TypeVar

from calcpack.aci318 import slenderness
from calcpack.errors import Problem, RangeError
from calcpack.ledger import passes
from calcpack.members.column_rules import ColumnWorking
from calcpack.members.column_section import ColumnLike, ForceLike, StoryLike, row_of, section_source
from calcpack.members.sources import position, source_text

__all__ = ["NO_FRAME", "Frame", "Frames", "Notes", "story_of"]

T = TypeVar("T")
NO_FRAME = "The schedule does not say whether the frame sways: it is taken as nonsway."
_BY_Q = 1.5
_STORY = {
    "sum_P_u": "total factored vertical load",
    "Delta_o": "first-order deflection between the ends",
    "V_us": "factored story shear",
    "l_c": "height between centres of joints",
}


@dataclass(frozen=True)
class Frame(Generic[T]):
    """A frame in one combination; a sway frame without `delta_s` has a story that buckles under `buckles`.

    Attributes
    ----------
    buckles : sum of P_u, and 0.75 of the sum of P_c
    """

    sway: bool
    delta_s: T | None = None
    buckles: tuple[T, T] | None = None


class Notes(Generic[T]):
    """What a reader has to know beside the numbers, each said once on the pad."""

    def __init__(self, work: ColumnWorking[T]) -> None:
        self.work = work
        self.texts: list[str] = []

    def say(self, text: str) -> None:
        """Say it where it was not said before."""
        if text not in self.texts:
            self.texts += self.work.note(text)


def story_of(column: ColumnLike, force: ForceLike, stories: Iterable[StoryLike]) -> StoryLike | None:
    """The row of the column's story for the combination of a force, else its row for every combination."""
    rows = {one.combination: one for one in stories if column.story and one.story == column.story}
    return rows.get(force.combination or "", rows.get(""))


class Frames(Generic[T]):
    """The frame of one column, by the rows of its story."""

    def __init__(self, work: ColumnWorking[T], notes: Notes[T]) -> None:
        self.work = work
        self.notes = notes
        self._known: dict[int, tuple[StoryLike | None, Frame[T]]] = {}

    def of(self, story: StoryLike | None) -> Frame[T]:
        """How the frame behaves with a row of its story.

        Raises
        ------
        RangeError : a sway frame of which neither a magnifier nor a story that gives one is stated
        """
        if id(story) not in self._known:
            self._known[id(story)] = story, self._behaviour(story)
        return self._known[id(story)][1]

    def _behaviour(self, story: StoryLike | None) -> Frame[T]:
        column = self.work.column
        if column.frame != "sway":
            if column.frame is None:
                self.notes.say(NO_FRAME)
            return Frame(False)
        if column.delta_s is not None:
            means = "magnifier of sway moments, from an analysis of the frame"
            delta_s = self.work.pad.given("delta_s", float(column.delta_s), means, section_source(column))
            return Frame(True, delta_s)
        if story is None:
            given = "delta_s is empty in a sway frame, and no row of its story is there"
            raise self._missing(given, "delta_s, or the row of the story in stories.csv")
        return self._of_story(story)

    def _of_story(self, story: StoryLike) -> Frame[T]:
        pad, named, source = self.work.pad, _name(story), _source(story)
        stated = {
            symbol: pad.given(symbol, float(getattr(story, symbol)), f"{means}, {named}", source)
            for symbol, means in _STORY.items()
        }
        Q = pad.work(slenderness.stability_index, **stated)
        index = pad.number(Q)
        if passes(index / pad.number(pad.work(slenderness.stability_index_limit))):
            self.notes.say(f"Q of {named} does not exceed 0.05: it is taken as nonsway, 6.6.4.3(b).")
            return Frame(False)
        if index < 1:
            delta_s = pad.work(slenderness.magnifier_sway, Q=Q)
            if passes(pad.number(delta_s) / _BY_Q):
                return Frame(True, delta_s)
        pad.reason("From Q, delta_s exceeds 1.5: the critical loads of the story give it, 6.6.4.6.2(b).")
        if story.sum_P_c is None:
            given = f"{named}: Q = {index:,.3g}, from which delta_s exceeds 1.5, and sum_P_c is empty"
            raise self._missing(given, "sum_P_c of the story, or delta_s of a second-order analysis", _place(story))
        means = f"critical loads of the columns that resist sway, {named}"
        return self._by_loads(stated["sum_P_u"], pad.given("sum_P_c", float(story.sum_P_c), means, source))

    def _by_loads(self, sum_P_u: T, sum_P_c: T) -> Frame[T]:
        pad = self.work.pad
        reduced = pad.work(slenderness.reduced_critical_load_story, sum_P_c=sum_P_c)
        stability_s = pad.work(slenderness.stability_ratio_story, sum_P_u=sum_P_u, sum_P_c_reduced=reduced)
        if pad.number(stability_s) >= 1:
            pad.reason("The loads of the story reach 0.75 of its critical loads: no magnifier exists.")
            return Frame(True, None, (sum_P_u, reduced))
        return Frame(True, pad.work(slenderness.magnifier_sway_by_loads, stability_s=stability_s))

    def _missing(self, given: str, allowed: str, where: str = "") -> RangeError:
        problem = Problem(given, f"{allowed} ({self.work.edition.name} 6.6.4.6.2)", "state one of them", where)
        return RangeError(f"column {self.work.column.mark}", [problem], row_of(self.work.column))


def _name(story: StoryLike) -> str:
    return f"story {story.story}" + (f", {story.combination}" if story.combination else "")


def _place(story: StoryLike) -> str:
    return position(story, f"story {story.story}")


def _source(story: StoryLike) -> str:
    return source_text(story.source, _place(story))
