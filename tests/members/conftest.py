"""Rows and a pad that keeps its steps."""

from __future__ import annotations

from collections.abc import Callable, Mapping, Sequence
from dataclasses import dataclass
from typing import Any

import pytest

from calcpack.aci318.editions import Edition, edition
from calcpack.formula import Formula
from calcpack.ledger import passes
from calcpack.members.termination import Termination
from calcpack.tabulation import FloatBench, Row, Tabulated, Tabulation, tabulate


@dataclass(frozen=True)
class Given:
    """A value as it was stated."""

    symbol: str
    value: float
    means: str
    source: str


@dataclass(frozen=True)
class Solved:
    """A value as it was found by iteration."""

    symbol: str
    value: float
    solved_from: tuple[float, ...]


@dataclass(frozen=True)
class Table:
    """A table as it was worked."""

    table: Tabulation
    made: Tabulated[float]


@dataclass(frozen=True)
class Verdict:
    """A comparison as it was made."""

    what: str
    demand: float
    capacity: float
    clause: str
    ratio: float

    @property
    def word(self) -> str:
        """As the ledger has it."""
        return "OK" if passes(self.ratio) else "NG"


class RecordingPad:
    """A pad that keeps what was stated, worked, said and verified, in order, and refuses what a sheet refuses."""

    def __init__(self) -> None:
        self.steps: list[tuple[str, str]] = []
        self.values: dict[str, float] = {}
        self.clauses: list[tuple[str, Formula]] = []
        self.givens: list[Given] = []
        self.verdicts: list[Verdict] = []
        self.solutions: list[Solved] = []
        self.confirmed: list[float] = []
        self.tables: list[Table] = []
        self.drawings: list[Callable[[], object]] = []

    def given(self, symbol: str, value: float, means: str, source: str) -> float:
        assert means.strip()
        assert source.strip()
        assert isinstance(value, float)
        self.steps.append(("given", symbol))
        self.values[symbol] = value
        self.givens.append(Given(symbol, value, means, source))
        return value

    def work(self, formula: Formula, **values: float) -> float:
        recording = formula.record(**values)
        for recorded in recording.lines:
            assert isinstance(recorded.value, float | int)
            self.steps.append(("worked", recorded.line.target))
            self.values[recorded.line.target] = recorded.value
        self.clauses.append((recording.lines[-1].line.target, formula))
        return recording.value

    def tabulate(self, table: Tabulation, rows: Sequence[Row[float]], shared: Mapping[str, float]) -> Tabulated[float]:
        made = tabulate(table, rows, shared, FloatBench())
        self.steps.append(("table", table.title))
        self.clauses += [(formula.result_name, formula) for formula in table.formulas]
        self.tables.append(Table(table, made))
        return made

    def solved(
        self, symbol: str, value: float, means: str, method: str, clause: str, solved_from: Sequence[float]
    ) -> float:
        assert means.strip()
        assert method.strip()
        assert clause.strip()
        assert solved_from
        self.steps.append(("solved", symbol))
        self.values[symbol] = value
        self.solutions.append(Solved(symbol, value, tuple(solved_from)))
        return value

    def confirm(self, solved: Sequence[float], by: Sequence[float]) -> None:
        assert solved
        assert by
        assert max(map(abs, by)) <= 1e-6
        self.steps.append(("confirmed", f"{len(solved)} by {len(by)}"))
        self.confirmed += by

    def figure(self, draw: Callable[[], object]) -> None:
        self.steps.append(("figure", ""))
        self.drawings.append(draw)

    def number(self, value: float) -> float:
        return value

    def reason(self, text: str) -> None:
        assert text.strip()
        self.steps.append(("reason", text))

    def verify(self, what: str, demand: float, capacity: float, clause: str) -> float:
        assert capacity > 0
        assert clause
        self.steps.append(("verdict", what))
        self.verdicts.append(Verdict(what, demand, capacity, clause, demand / capacity))
        return demand / capacity

    def heading(self, text: str) -> None:
        self.steps.append(("heading", text))

    def told(self, kind: str) -> list[str]:
        """The steps of one kind, in order."""
        return [text for step, text in self.steps if step == kind]

    def under(self, heading: str) -> list[tuple[str, str]]:
        """The steps from a heading to the next one."""
        start = self.steps.index(("heading", heading)) + 1
        ends = [place for place, (kind, _) in enumerate(self.steps) if kind == "heading" and place >= start]
        return self.steps[start : ends[0] if ends else None]

    @property
    def reasons(self) -> list[str]:
        return self.told("reason")

    @property
    def words(self) -> list[str]:
        """OK or NG of every comparison."""
        return [verdict.word for verdict in self.verdicts]

    def source(self, symbol: str) -> str:
        """The source of a symbol that was stated once."""
        (found,) = [one.source for one in self.givens if one.symbol == symbol]
        return found


@pytest.fixture
def steps() -> RecordingPad:
    return RecordingPad()


@pytest.fixture
def recording() -> type[RecordingPad]:
    """For tests that need a new pad for every example."""
    return RecordingPad


@pytest.fixture(params=["ACI 318-14", "ACI 318-19"])
def each(request: pytest.FixtureRequest) -> Edition:
    return edition(request.param)


@pytest.fixture
def e14() -> Edition:
    return edition("ACI 318-14")


@pytest.fixture
def e19() -> Edition:
    return edition("ACI 318-19")


@pytest.fixture
def row() -> Any:
    def make(kind: str = "straight tension", **changes: Any) -> Termination:
        plain: dict[str, Any] = {"mark": "T1", "bar": 8, "f_c": 4_000.0, "f_y": 60_000.0}
        return Termination(kind=kind, **{**plain, **changes})

    return make
