"""Development, hooks, heads and laps of one bar: the steps in an engineer's order, and the check against the detail.

A length is worked from its last line upwards: each equation names its arguments, and each argument is stated in the
schedule or worked by its own rule. Which rule serves an argument depends on the kind of anchorage and on the edition.
"""

from __future__ import annotations

from collections.abc import Iterable, Mapping
from dataclasses import dataclass
from typing import Generic, TypeVar

from calcpack.aci318 import splices
from calcpack.aci318.bars import bar
from calcpack.aci318.editions import Edition
from calcpack.errors import InputError, RangeError
from calcpack.formula import Formula
from calcpack.members.anchorage_conditions import requirements
from calcpack.members.anchorage_excess import no_reduction
from calcpack.members.anchorage_rules import (
    COMPRESSION_RULES,
    HEAD_RULES,
    HOOK_RULES,
    JOINT_RULES,
    STRAIGHT_RULES,
    Rule,
)
from calcpack.members.anchorage_splices import COMPRESSION_LAP_RULES, LAP_RULES, MECHANICAL_RULES
from calcpack.members.pad import FloatPad, Pad
from calcpack.members.results import CheckResult, Requirement, measured, verdict_of
from calcpack.members.sources import NOMINAL
from calcpack.members.termination import TerminationLike, place, termination_of
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
    "mechanical splice": _Kind("P_splice", "P_splice", MECHANICAL_RULES, "mechanical splice of #{} bar"),
}


@dataclass(frozen=True)
class _OfSizes:
    """A lap of bars of two sizes: how the larger is developed, the symbols of both parts, and what takes the larger."""

    developed: str
    l_larger: str
    l_smaller: str
    formula: Formula


_OF_SIZES = {
    "lap tension": _OfSizes("straight tension", "l_d", "l_st_s", splices.lap_tension_of_sizes),
    "lap compression": _OfSizes("straight compression", "l_dc", "l_sc_s", splices.lap_compression_of_sizes),
}


def _rules(row: TerminationLike) -> Mapping[str, Rule]:
    """The rules of the arguments, by kind and place."""
    rules = _KINDS[row.kind].rules
    return {**rules, **JOINT_RULES[row.kind]} if row.joint else rules


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
    "n_bundle": "bundle",
    "r_spliced": "spliced",
    "r_stress": "bar_stress",
    "M_n": "M_n",
    "V_u": "V_u",
    "l_a": "l_a",
}

# What the standard of the bar states.
_NOMINAL = {"d_b": "d_b", "A_b": "A_b"}

# What is taken where the schedule states nothing does not come from the schedule.
_DEFAULTS = {
    "lamb": (1.0, "normalweight concrete, default of the schedule"),
    "K_tr": (0.0, "no transverse reinforcement counted, default of the schedule"),
    "l_a": (None, "no embedment counted, default of the schedule"),
}


@dataclass(frozen=True)
class _RowRules:
    """The rules of a row's kind and edition, and what the row states."""

    row: TerminationLike
    edition: Edition

    def choice(self, symbol: str) -> Choice | None:
        """The formula that serves a symbol for this row; None where the row states it."""
        rule = _rules(self.row).get(symbol)
        return rule(self.row, self.edition) if rule else None

    def stated(self, symbol: str) -> Stated:
        """What the row, its defaults or the bar standard state."""
        means = lookup(symbol).meaning
        if symbol in _NOMINAL:
            return Stated(getattr(bar(self.row.bar), _NOMINAL[symbol]), f"{means}, #{self.row.bar}", NOMINAL)
        if symbol == "c_side" and self.row.kind == "headed":
            means = "side cover of the headed bar"
        value = getattr(self.row, _STATED[symbol])
        default, source = _DEFAULTS.get(symbol, (None, ""))
        return Stated(value or 0.0, means, source if value == default else place(self.row))


def required_length(pad: Pad[T], row: TerminationLike, edition: Edition, verified: bool = True) -> Required[T]:
    """Work the length that a row requires, minima included, and verify the conditions beside it, step by step on a pad.

    Parameters
    ----------
    verified : without, the conditions are left out, for what is compared and not chosen

    Raises
    ------
    RangeError : everything that is wrong with the row, at once
    """
    refuse_problems(row, edition)
    if row.other_bar is not None and row.other_bar != row.bar:
        return _lap_of_sizes(pad, row, edition, _OF_SIZES[row.kind], verified)
    symbol = _KINDS[row.kind].symbol
    working = Working(pad, _RowRules(row, edition))
    working.state(symbol)
    value = working.value(symbol)
    notes = [*_notes(row, edition)]
    for text in notes:
        pad.reason(f"{text}.")
    asked = requirements(working, row, edition) if verified else ()
    return Required(symbol, value, cited_clause(row, edition), asked, (*_said(asked), *notes))


def _lap_of_sizes(pad: Pad[T], row: TerminationLike, edition: Edition, sizes: _OfSizes, verified: bool) -> Required[T]:
    """The greater of the development of the larger bar and the lap of the smaller one."""
    smaller, larger = sorted([row.bar, row.other_bar or row.bar])
    # The ties of a lap are not those of development in compression; a lap takes no reduction for excess reinforcement.
    alone = {"other_bar": None, "available": None}
    plain = {"confining_ties": row.kind == "lap tension" and row.confining_ties, "lap_class": None, "spliced": None}
    areas = {"A_s_required": None, "A_s_provided": None, "bar_stress": None}
    one = termination_of(row, kind=sizes.developed, bar=larger, **alone, **plain, **areas)
    other = termination_of(row, bar=smaller, **alone)
    working, second = Working(pad, _RowRules(one, edition)), Working(pad, _RowRules(other, edition))
    pad.reason(f"Larger bar, #{larger}: developed.")
    working.state(sizes.l_larger)
    parts = {sizes.l_larger: working.value(sizes.l_larger)}
    second.values.update({symbol: value for symbol, value in working.values.items() if symbol in _STATED})
    pad.reason(f"Smaller bar, #{smaller}: lapped.")
    symbol = _KINDS[row.kind].symbol
    second.state(symbol)
    parts[sizes.l_smaller] = second.value(symbol)
    value = pad.work(sizes.formula, **parts)
    notes = [*_notes(row, edition)]
    for text in notes:
        pad.reason(f"{text}.")
    asked = requirements(second, other, edition) if verified else ()
    clause = sizes.formula.clause(edition.standard).number
    return Required(symbol, value, clause, asked, (*_said(asked), *notes))


def _said(asked: Iterable[Requirement]) -> list[str]:
    return [str(one) if one.met else f"Not met: {one}" for one in asked]


def _notes(row: TerminationLike, edition: Edition) -> Iterable[str]:
    """What a reader has to know beside the length."""
    reason = no_reduction(row, edition) if row.A_s_required is not None else ""
    if reason:
        yield f"No reduction for excess reinforcement: {reason}"
    if row.bundle > 1:
        yield f"Bundle of {row.bundle}: enclosed within transverse reinforcement (25.6.1.2)"
        if row.kind in _OF_SIZES:
            yield "Bars of a bundle are lapped one by one; their laps do not overlap (25.6.1.7)"
    if row.joint and row.kind == "straight tension":
        yield "A part of the bar outside the confined core counts 1/1.6 of its length (18.8.5.4)"
    staggered = row.bar_stress is not None and row.spliced is not None
    if row.kind == "lap tension" and staggered and "Class A" in _lap_reason(row, edition):
        yield "Laps of class A in adjacent column bars are staggered by l_d (Table 10.7.5.2.2)"


def _lap_reason(row: TerminationLike, edition: Edition) -> str:
    choice = LAP_RULES["l_st"](row, edition)
    return choice.reason if choice else ""


def cited_clause(row: TerminationLike, edition: Edition) -> str:
    """The clause of the equation that a row's length comes from."""
    cited = "l_dh_j" if row.joint else _KINDS[row.kind].cited
    choice = _rules(row)[cited](row, edition)
    return choice.formula.clause(edition.standard).number if choice else ""


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
        size = row.bar if row.other_bar in (None, row.bar) else f"{row.bar} and #{row.other_bar}"
        what = f"{row.mark}: {_KINDS[row.kind].words.format(size)} within the length available"
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
