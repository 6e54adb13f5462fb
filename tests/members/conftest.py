"""Rows and a pad that keeps its steps."""

from __future__ import annotations

from typing import Any

import pytest

from calcpack.aci318.editions import Edition, edition
from calcpack.formula import Formula
from calcpack.members.termination import Termination


class Steps:
    """A pad that keeps what was stated, worked and said, in order."""

    def __init__(self) -> None:
        self.steps: list[tuple[str, str]] = []
        self.values: dict[str, float] = {}
        self.clauses: list[tuple[str, Formula]] = []

    def given(self, symbol: str, value: float, means: str, source: str) -> float:
        assert means
        assert source
        self.steps.append(("given", symbol))
        self.values[symbol] = value
        return value

    def work(self, formula: Formula, **values: float) -> float:
        recording = formula.record(**values)
        for recorded in recording.lines:
            self.steps.append(("worked", recorded.line.target))
            self.values[recorded.line.target] = recorded.value
        self.clauses.append((recording.lines[-1].line.target, formula))
        return recording.value

    def number(self, value: float) -> float:
        return value

    def reason(self, text: str) -> None:
        self.steps.append(("reason", text))

    @property
    def reasons(self) -> list[str]:
        return [text for kind, text in self.steps if kind == "reason"]


@pytest.fixture
def steps() -> Steps:
    return Steps()


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
