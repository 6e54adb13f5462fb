"""Small ledgers for the tests of comparing, written as an author writes a sheet: ids follow from the order."""

from __future__ import annotations

from collections.abc import Mapping
from typing import Any

from hypothesis import strategies as st

from calcpack import expression
from calcpack.ledger import Entry, Ledger, passes
from calcpack.typeset.digits import number_text
from calcpack.typeset.line import with_unit

Step = tuple[Any, ...]


class Book:
    """A ledger in the making; each call appends an entry and returns its id."""

    def __init__(self, sheet: str = "C-01") -> None:
        self.sheet = sheet
        self.ledger = Ledger()

    def _id(self, name: str) -> str:
        count, identifier = 1, f"{self.sheet}/{name}"
        while identifier in self.ledger:
            count += 1
            identifier = f"{self.sheet}/{name}.{count}"
        return identifier

    def _add(self, kind: str, symbol: str, value: float, name: str = "", **more: Any) -> str:
        unit = more.pop("unit", "in")
        fields = {"means": f"meaning of {symbol}", "shown": with_unit(number_text(value), unit), **more}
        entry = Entry(
            id=self._id(name or symbol), kind=kind, symbol=symbol, value=value, unit=unit, sheet=self.sheet, **fields
        )
        self.ledger.add(entry)
        return entry.id

    def given(self, symbol: str, value: float, source: str = "S-201, rev 1", **more: Any) -> str:
        return self._add("given", symbol, value, **{"source": source, "status": "confirmed", **more})

    def work(self, symbol: str, text: str, where: Mapping[str, str], **more: Any) -> str:
        value = expression.evaluate(text, {name: self.ledger[used].value for name, used in where.items()})
        stated = {"clause": "22.4.2.2", "edition": "ACI 318-19", "expression": text, "where": dict(where), **more}
        return self._add("worked", symbol, value, **stated)

    def solve(self, symbol: str, value: float, solved_from: tuple[str, ...], **more: Any) -> str:
        stated = {"clause": "22.2", "method": "bisection", "solved_from": solved_from, **more}
        return self._add("solved", symbol, value, **stated)

    def verify(self, means: str, demand: str, capacity: str, **more: Any) -> str:
        ratio = self.ledger[demand].value / self.ledger[capacity].value
        stated = {"demand": demand, "capacity": capacity, "ratio": ratio, "verdict": "OK" if passes(ratio) else "NG"}
        return self._add("verdict", "ratio", ratio, "verdict", means=means, unit="", **{**stated, **more})


def beam(book: Book, h: float = 20.0, w: float = 2.0, **given: Any) -> Ledger:
    """A sheet whose every entry is known by name: two givens, two worked values, a verdict."""
    book.given("h", h, **given)
    book.given("w", w, unit="lb/in")
    book.work("d", "h - 2.5", {"h": "C-01/h"}, means="effective depth")
    book.work("M", "w*100", {"w": "C-01/w"}, unit="lb*in", means="moment")
    book.given("d_max", 40.0)
    book.verify("depth fits", "C-01/d", "C-01/d_max")
    return book.ledger


_VALUES = st.integers(1, 5).map(float)


def _line(index: int) -> st.SearchStrategy[Step]:
    given = st.tuples(st.just("given"), st.sampled_from("abc"), _VALUES)
    if not index:
        return given
    below = st.integers(0, index - 1)
    worked = st.tuples(
        st.just("worked"), st.sampled_from("abc"), st.sampled_from(["x + y", "x*y", "min(x, y)"]), below, below
    )
    verdict = st.tuples(st.just("verdict"), st.sampled_from(["fits", "carries"]), below, below)
    return st.one_of(given, worked, verdict)


# Lines of which each rests on earlier ones, over three symbols, so that ids take suffixes.
programs = st.integers(1, 12).flatmap(lambda size: st.tuples(*map(_line, range(size))))


def run(
    program: tuple[Step, ...], edited: int = -1, front: bool = False, sourced: bool = False
) -> tuple[Book, list[str]]:
    """The ledger of a program, and the ids of its lines.

    Parameters
    ----------
    edited : line of a given that takes a value no other has
    front : put a given before everything, which shifts the ids behind it
    sourced : each given has a source of its own
    """
    book = Book("S")
    if front:
        book.given("a", 99.5, source="S-999")
    ids: list[str] = []
    for index, (kind, name, *rest) in enumerate(program):
        if kind == "given":
            source = f"S-{index}" if sourced else "S-1"
            ids.append(book.given(name, 1000.5 if index == edited else rest[0], source=source))
        elif kind == "worked":
            ids.append(book.work(name, rest[0], {"x": ids[rest[1]], "y": ids[rest[2]]}))
        else:
            ids.append(book.verify(name, ids[rest[0]], ids[rest[1]]))
    return book, ids


def givens(program: tuple[Step, ...]) -> list[int]:
    """The lines of a program that are givens."""
    return [index for index, line in enumerate(program) if line[0] == "given"]
