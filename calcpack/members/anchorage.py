"""Development, hooks, heads and laps of one bar: the steps in an engineer's order, and the check against the detail.

A length is worked from its last line upwards: each equation names its arguments, and each argument is stated in the
schedule or worked by its own rule. Which rule serves an argument depends on the kind of anchorage and on the edition.
"""

from __future__ import annotations

from collections.abc import Iterable, Mapping
from dataclasses import dataclass
from typing import Generic, TypeVar

from calcpack.aci318.bars import bar
from calcpack.aci318.editions import Edition
from calcpack.errors import InputError, RangeError
from calcpack.members.anchorage_conditions import requirements
from calcpack.members.anchorage_rules import (
    COMPRESSION_LAP_RULES,
    COMPRESSION_RULES,
    HEAD_RULES,
    HOOK_RULES,
    LAP_RULES,
    STRAIGHT_RULES,
    Rule,
)
from calcpack.members.pad import FloatPad, Pad
from calcpack.members.results import CheckResult, Requirement, measured, verdict_of
from calcpack.members.sources import NOMINAL
from calcpack.members.termination import TerminationLike, place
from calcpack.members.termination_problems import refuse_problems
from calcpack.members.working import Choice, Stated, Working
from calcpack.symbols import lookup

__all__ = ["Required", "check", "check_all", "required_length", "work_termination"]

T = TypeVar("T")


@dataclass(frozen=True)
class Required(Generic[T]):
    """A required length: its symbol, its value, the clause of its equation, and what is asked beside it.

    Attributes
    ----------
    requirements : conditions of the provision that the row decides, or leaves to a condition
    notes : what a reader has to know beside the numbers
    """

    symbol: str
    value: T
    clause: str
    requirements: tuple[Requirement, ...] = ()
    notes: tuple[str, ...] = ()


@dataclass(frozen=True)
class _Kind:
    """The symbol a kind of anchorage asks for, the symbol whose equation it cites, the rules of its arguments.

    `words` say what has to fit the detail, with the size of the bar in place.
    """

    symbol: str
    cited: str
    rules: Mapping[str, Rule]
    words: str


_KINDS = {
    "straight tension": _Kind("l_d", "l_d_a", STRAIGHT_RULES, "#{} bar in tension developed"),
    "hook 90": _Kind("l_dh", "l_dh_a", HOOK_RULES, "90-degree hook of #{} bar developed"),
    "hook 180": _Kind("l_dh", "l_dh_a", HOOK_RULES, "180-degree hook of #{} bar developed"),
    "headed": _Kind("l_dt", "l_dt_a", HEAD_RULES, "headed #{} bar developed"),
    "straight compression": _Kind("l_dc", "l_dc_a", COMPRESSION_RULES, "#{} bar in compression developed"),
    "lap tension": _Kind("l_st", "l_st", LAP_RULES, "tension lap of #{} bars"),
    "lap compression": _Kind("l_sc", "l_sc_a", COMPRESSION_LAP_RULES, "compression lap of #{} bars"),
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

# What is taken where the schedule states nothing does not come from the schedule.
_DEFAULTS = {
    "lamb": (1.0, "normalweight concrete, default of the schedule"),
    "K_tr": (0.0, "no transverse reinforcement counted, default of the schedule"),
}


@dataclass(frozen=True)
class _RowRules:
    """The rules of a row's kind and edition, and what the row states."""

    row: TerminationLike
    edition: Edition

    def choice(self, symbol: str) -> Choice | None:
        """The formula that serves a symbol for this row; None where the row states it."""
        rule = _KINDS[self.row.kind].rules.get(symbol)
        return rule(self.row, self.edition) if rule else None

    def stated(self, symbol: str) -> Stated:
        """What the row, its defaults or the bar standard state."""
        means = lookup(symbol).meaning
        if symbol == "d_b":
            return Stated(bar(self.row.bar).d_b, f"{means}, #{self.row.bar}", NOMINAL)
        if symbol == "c_side" and self.row.kind == "headed":
            means = "side cover of the headed bar"
        value = getattr(self.row, _STATED[symbol])
        default, source = _DEFAULTS.get(symbol, (None, ""))
        return Stated(value, means, source if value == default else place(self.row))


def required_length(pad: Pad[T], row: TerminationLike, edition: Edition) -> Required[T]:
    """Work the length that a row requires, minima included, and verify the conditions beside it, step by step on a pad.

    Raises
    ------
    RangeError : everything that is wrong with the row, at once
    """
    refuse_problems(row, edition)
    symbol = _KINDS[row.kind].symbol
    working = Working(pad, _RowRules(row, edition))
    working.state(symbol)
    value = working.value(symbol)
    notes = [_NOT_REDUCED] if row.A_s_required is not None and not _reduces(row, edition) else []
    for text in notes:
        pad.reason(f"{text}.")
    asked = requirements(working, row, edition)
    said = [str(one) if one.met else f"Not met: {one}" for one in asked]
    return Required(symbol, value, cited_clause(row, edition), asked, (*said, *notes))


_NOT_REDUCED = "No reduction for excess reinforcement: not permitted for this kind (25.4.10.1)"


def cited_clause(row: TerminationLike, edition: Edition) -> str:
    """The clause of the equation that a row's length comes from."""
    kind = _KINDS[row.kind]
    choice = kind.rules[kind.cited](row, edition)
    return choice.formula.clause(edition.standard).number if choice else ""


def _reduces(row: TerminationLike, edition: Edition) -> bool:
    choice = _KINDS[row.kind].rules[_KINDS[row.kind].symbol](row, edition)
    return choice is not None and "A_s_required" in choice.formula.arguments


def work_termination(pad: Pad[T], row: TerminationLike, edition: Edition) -> tuple[T, CheckResult]:
    """Work the length that a row requires and verify it against the length that the detail offers, on a pad.

    Raises
    ------
    RangeError : everything that is wrong with the row, at once
    """
    required = required_length(pad, row, edition)
    ratio = None
    if row.available is not None:
        available = pad.given("l_available", row.available, lookup("l_available").meaning, place(row))
        what = f"{row.mark}: {_KINDS[row.kind].words.format(row.bar)} within the length available"
        ratio = pad.verify(what, required.value, available, required.clause)
    result = CheckResult(
        mark=row.mark,
        check=row.kind,
        clause=required.clause,
        combination="",
        ratio=ratio,
        verdict=verdict_of(ratio, all(one.met for one in required.requirements)),
        values={required.symbol: measured(required.symbol, pad.number(required.value))},
        notes=required.notes,
    )
    return required.value, result


_FLOATS = FloatPad()


def check(row: TerminationLike, edition: Edition) -> CheckResult:
    """Check one row: the required length against the length the detail offers.

    Raises
    ------
    RangeError : everything that is wrong with the row, at once
    """
    return work_termination(_FLOATS, row, edition)[1]


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
