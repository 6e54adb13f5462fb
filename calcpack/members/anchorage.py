"""Development, hooks, heads and laps of one bar: the steps in an engineer's order, and the check against the detail.

A length is worked from its last line upwards: each equation names its arguments, and each argument is stated in the
schedule or worked by its own rule. Which rule serves an argument depends on the kind of anchorage and on the edition.
"""

from __future__ import annotations

from collections.abc import Iterable, Iterator, Mapping
from dataclasses import dataclass
from typing import Generic, TypeVar

from calcpack.aci318.bars import bar
from calcpack.aci318.editions import Edition
from calcpack.errors import InputError, RangeError
from calcpack.members.anchorage_rules import (
    COMPRESSION_LAP_RULES,
    COMPRESSION_RULES,
    HEAD_RULES,
    HOOK_RULES,
    LAP_RULES,
    STRAIGHT_RULES,
    Choice,
    Rule,
)
from calcpack.members.pad import FloatPad, Pad
from calcpack.members.results import CheckResult, measured, verdict_of
from calcpack.members.termination import TerminationLike, place
from calcpack.members.termination_problems import refuse_problems, requirements
from calcpack.symbols import lookup

__all__ = ["Required", "check", "check_all", "required_length"]

T = TypeVar("T")


@dataclass(frozen=True)
class Required(Generic[T]):
    """A required length: its symbol, its value, and the clause of the equation it comes from."""

    symbol: str
    value: T
    clause: str


@dataclass(frozen=True)
class _Kind:
    """The symbol a kind of anchorage asks for, the symbol whose equation it cites, and the rules of its arguments."""

    symbol: str
    cited: str
    rules: Mapping[str, Rule]


_KINDS = {
    "straight tension": _Kind("l_d", "l_d_a", STRAIGHT_RULES),
    "hook 90": _Kind("l_dh", "l_dh_a", HOOK_RULES),
    "hook 180": _Kind("l_dh", "l_dh_a", HOOK_RULES),
    "headed": _Kind("l_dt", "l_dt_a", HEAD_RULES),
    "straight compression": _Kind("l_dc", "l_dc_a", COMPRESSION_RULES),
    "lap tension": _Kind("l_st", "l_st", LAP_RULES),
    "lap compression": _Kind("l_sc", "l_sc_a", COMPRESSION_LAP_RULES),
}

# Symbols that the schedule states, by the name of the column.
_STATED = {
    "f_c": "f_c",
    "f_y": "f_y",
    "lamb": "lamb",
    "c_b": "c_b",
    "c_c": "clear_cover",
    "s_clear": "clear_spacing",
    "K_tr": "K_tr",
    "c_side": "side_cover",
    "c_tail": "tail_cover",
    "s": "spacing",
    "A_s_required": "A_s_required",
    "A_s_provided": "A_s_provided",
}


class _Working(Generic[T]):
    """One row being worked on one pad; every symbol is stated or worked once."""

    def __init__(self, pad: Pad[T], row: TerminationLike, edition: Edition) -> None:
        self.pad = pad
        self.row = row
        self.edition = edition
        self.rules = _KINDS[row.kind].rules
        self.values: dict[str, T] = {}

    def value(self, symbol: str) -> T:
        """The value of a symbol, worked or stated when it is first asked for."""
        if symbol not in self.values:
            choice = self.choice(symbol)
            self.values[symbol] = self.stated(symbol) if choice is None else self.worked(choice)
        return self.values[symbol]

    def choice(self, symbol: str) -> Choice | None:
        rule = self.rules.get(symbol)
        return rule(self.row, self.edition) if rule else None

    def worked(self, choice: Choice) -> T:
        values = {symbol: self.value(symbol) for symbol in choice.formula.arguments}
        if choice.reason:
            self.pad.reason(choice.reason)
        return self.pad.work(choice.formula, **values)

    def stated(self, symbol: str) -> T:
        means = lookup(symbol).meaning
        if symbol == "d_b":
            one = bar(self.row.bar)
            return self.pad.given("d_b", one.d_b, f"{means}, {one}", "ASTM A615 and A706, nominal dimensions")
        return self.pad.given(symbol, getattr(self.row, _STATED[symbol]), means, place(self.row))


def required_length(pad: Pad[T], row: TerminationLike, edition: Edition) -> Required[T]:
    """Work the length that a row requires, minima included, step by step on a pad.

    Raises
    ------
    RangeError : everything that is wrong with the row, at once
    """
    refuse_problems(row, edition)
    kind = _KINDS[row.kind]
    working = _Working(pad, row, edition)
    value = working.value(kind.symbol)
    for text in notes(row, edition):
        pad.reason(text)
    return Required(kind.symbol, value, cited_clause(row, edition))


def cited_clause(row: TerminationLike, edition: Edition) -> str:
    """The clause of the equation that a row's length comes from."""
    kind = _KINDS[row.kind]
    choice = kind.rules[kind.cited](row, edition)
    return choice.formula.clause(edition.standard).number if choice else ""


def notes(row: TerminationLike, edition: Edition) -> Iterator[str]:
    """What a reader has to know beside the length: conditions, and a reduction that is not taken."""
    for requirement in requirements(row, edition):
        yield str(requirement) if requirement.met else f"Not met: {requirement}"
    if row.A_s_required is not None and not _reduces(row, edition):
        yield "No reduction for excess reinforcement: not permitted for this kind (25.4.10.1)"


def _reduces(row: TerminationLike, edition: Edition) -> bool:
    choice = _KINDS[row.kind].rules[_KINDS[row.kind].symbol](row, edition)
    return choice is not None and "A_s_required" in choice.formula.arguments


_FLOATS = FloatPad()


def check(row: TerminationLike, edition: Edition) -> CheckResult:
    """Check one row: the required length against the length the detail offers.

    Raises
    ------
    RangeError : everything that is wrong with the row, at once
    """
    required = required_length(_FLOATS, row, edition)
    ratio = None if row.available is None else required.value / row.available
    met = all(requirement.met for requirement in requirements(row, edition))
    return CheckResult(
        mark=row.mark,
        check=row.kind,
        clause=required.clause,
        combination="",
        ratio=ratio,
        verdict=verdict_of(ratio, met),
        values={required.symbol: measured(required.symbol, required.value)},
        notes=tuple(notes(row, edition)),
    )


def check_all(rows: Iterable[TerminationLike], edition: Edition) -> list[CheckResult]:
    """Check every row of a schedule.

    Raises
    ------
    RangeError : everything that is wrong with any of the rows, at once
    """
    results, errors = [], []
    for row in rows:
        try:
            results.append(check(row, edition))
        except InputError as error:
            errors.append(error)
    if errors:
        raise RangeError.gathered(f"anchorage schedule: {len(errors)} rows cannot be checked", errors)
    return results
