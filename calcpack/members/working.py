"""Values on a pad, each stated or worked once: an equation asks for its arguments by symbol."""

from __future__ import annotations

from dataclasses import dataclass
from typing import Generic, Protocol, TypeVar

from calcpack.formula import Formula
from calcpack.members.pad import Pad

__all__ = ["Choice", "Rules", "Stated", "Working"]

T = TypeVar("T")


@dataclass(frozen=True)
class Choice:
    """The formula that serves, and why, in words for the sheet."""

    formula: Formula
    reason: str = ""


@dataclass(frozen=True)
class Stated:
    """A value that is stated: in coherent units, with what it means and where it comes from."""

    value: float
    means: str
    source: str


class Rules(Protocol):
    """Which formula works a symbol, and what is stated where none does."""

    def choice(self, symbol: str) -> Choice | None:
        """The formula that works a symbol; None where it is stated."""
        ...

    def stated(self, symbol: str) -> Stated:
        """What the schedule, or a table of the trade, states of a symbol."""
        ...


class Working(Generic[T]):
    """What stands on a pad so far, by symbol."""

    def __init__(self, pad: Pad[T], rules: Rules) -> None:
        self.pad = pad
        self.rules = rules
        self.values: dict[str, T] = {}

    def value(self, symbol: str) -> T:
        """The value of a symbol, stated or worked when it is first asked for."""
        if symbol not in self.values:
            choice = self.rules.choice(symbol)
            self.values[symbol] = self.given(symbol) if choice is None else self.work(choice)
        return self.values[symbol]

    def state(self, *symbols: str) -> None:
        """State everything that the working of the symbols will ask for, so that a sheet opens with its givens."""
        for symbol in symbols:
            choice = self.rules.choice(symbol)
            if choice is not None:
                self.state(*choice.formula.arguments)
            elif symbol not in self.values:
                self.values[symbol] = self.given(symbol)

    def given(self, symbol: str) -> T:
        """State a value as the rules have it."""
        stated = self.rules.stated(symbol)
        return self.pad.given(symbol, float(stated.value), stated.means, stated.source)

    def work(self, choice: Choice, **own: T) -> T:
        """Work an equation; `own` are arguments that are not the member's one value of their symbol."""
        values = {symbol: own[symbol] if symbol in own else self.value(symbol) for symbol in choice.formula.arguments}
        if choice.reason:
            self.pad.reason(choice.reason)
        return self.pad.work(choice.formula, **values)
