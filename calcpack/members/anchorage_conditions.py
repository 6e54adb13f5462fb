"""Conditions that a provision sets beside the length: each worked on the pad, and verified where the row decides it."""

from __future__ import annotations

from collections.abc import Iterator
from typing import TypeVar

from calcpack.aci318 import continuity, development, heads, laps
from calcpack.aci318.bars import bar
from calcpack.aci318.editions import Edition
from calcpack.formula import Formula
from calcpack.ledger import passes
from calcpack.members.results import Requirement
from calcpack.members.termination import TerminationLike, diameter_of_bundle
from calcpack.members.working import Choice, Working

__all__ = ["requirements"]

T = TypeVar("T")
_CLOSE = 6.0
_HIGH_GRADE = 80_000.0

# The spacing below which bars of high grade need ties, and the index that they then need, by kind.
_CLOSE_BARS = {
    "straight tension": (development.close_bars, development.transverse_index_minimum),
    "lap tension": (laps.lap_close_bars, laps.lap_transverse_index_minimum),
}


def requirements(work: Working[T], row: TerminationLike, edition: Edition) -> tuple[Requirement, ...]:
    """Verify what the row shows of its provision's conditions; a condition not met is said in words as well."""
    return (
        *_close_bars(work, row, edition),
        *_stated_c_b(work, row),
        *_head_clearances(work, row, edition),
        *_at_support(work, row, edition),
    )


def _spacing(row: TerminationLike) -> float | None:
    """Centre-to-centre spacing, as stated or as the clear spacing gives it."""
    if row.spacing is not None:
        return row.spacing
    return None if row.clear_spacing is None else row.clear_spacing + diameter_of_bundle(row)


def _diameter(work: Working[T], row: TerminationLike) -> T:
    """What cover and spacing are measured from: the bar, or one bar of the bundle's area."""
    return work.value("d_b" if row.bundle == 1 else "d_be")


def _worked_spacing(work: Working[T], row: TerminationLike) -> T:
    if row.spacing is None and "s" not in work.values:
        work.values["s"] = work.work(Choice(development.centre_spacing), d_b=_diameter(work, row))
    return work.value("s")


def _verified(
    work: Working[T], row: TerminationLike, what: str, sides: tuple[T, T], clause: str, text: str
) -> Requirement:
    met = passes(work.pad.verify(f"{row.mark}: {what}", *sides, clause))
    requirement = Requirement(clause, text, met)
    if not met:
        work.pad.reason(f"Not met: {requirement}.")
    return requirement


def _clause(rule: Formula, edition: Edition) -> str:
    return rule.clause(edition.standard).number


def _close_bars(work: Working[T], row: TerminationLike, edition: Edition) -> Iterator[Requirement]:
    if row.kind not in _CLOSE_BARS or not edition.close_bars_need_ties or row.f_y < _HIGH_GRADE:
        return
    close, index = _CLOSE_BARS[row.kind]
    clause, spacing, least = _clause(index, edition), _spacing(row), 0.5 * bar(row.bar).d_b
    words = f"K_tr = {row.K_tr:,g} in, at least 0.5 d_b = {least:,g} in"
    if spacing is None:
        if row.K_tr < least:
            requirement = Requirement(clause, f"if bars stand closer than 6 in: {words}", True)
            work.pad.reason(f"Spacing of bars not stated; {requirement}.")
            yield requirement
    elif spacing < _CLOSE:
        text = f"bars at {spacing:,g} in, f_y = {row.f_y:,g} psi: {words}"
        if row.K_tr > 0:
            sides = (work.work(Choice(index)), work.value("K_tr"))
            yield _verified(work, row, "transverse reinforcement of close bars of high grade", sides, clause, text)
        else:
            # With no index counted there is nothing to compare but the spacing that needs none.
            sides = (work.work(Choice(close)), _worked_spacing(work, row))
            what = "spacing of bars of high grade without transverse reinforcement"
            yield _verified(work, row, what, sides, clause, text)


def _stated_c_b(work: Working[T], row: TerminationLike) -> Iterator[Requirement]:
    if row.c_b is None or row.kind not in ("straight tension", "lap tension"):
        return
    if row.clear_cover is not None:
        text = f"c_b = {row.c_b:,g} in, clear cover gives {row.clear_cover + diameter_of_bundle(row) / 2:,g} in"
        largest = work.work(Choice(development.c_b_by_cover), d_b=_diameter(work, row))
        yield _verified(work, row, "c_b stated, within the clear cover", (work.value("c_b"), largest), "2.2", text)
    spacing = _spacing(row)
    if spacing is not None:
        text = f"c_b = {row.c_b:,g} in, spacing of bars gives {spacing / 2:,g} in"
        largest = work.work(Choice(development.c_b_by_spacing), s=_worked_spacing(work, row))
        yield _verified(work, row, "c_b stated, within half the bar spacing", (work.value("c_b"), largest), "2.2", text)


def _head_clearances(work: Working[T], row: TerminationLike, edition: Edition) -> Iterator[Requirement]:
    if row.kind != "headed":
        return
    d_b, spacing = bar(row.bar).d_b, _spacing(row)
    if row.clear_cover is not None:
        text = f"clear cover {row.clear_cover:,g} in, at least 2 d_b = {2 * d_b:,g} in"
        sides = (work.work(Choice(heads.head_cover_minimum)), work.value("c_c"))
        yield _verified(work, row, "clear cover of headed bar", sides, _clause(heads.head_cover_minimum, edition), text)
    if spacing is not None:
        rule = edition.head_spacing
        text = f"bars at {spacing:,g} in centre to centre, at least {rule(d_b=d_b):,g} in"
        sides = (work.work(Choice(rule)), _worked_spacing(work, row))
        yield _verified(work, row, "spacing of headed bars", sides, _clause(rule, edition), text)


def _at_support(work: Working[T], row: TerminationLike, edition: Edition) -> Iterator[Requirement]:
    """Positive-moment bars at a simple support or a point of inflection."""
    if row.M_n is None or row.V_u is None:
        return
    rule, reason = continuity.development_maximum_at_support, "Ends not confined by a reaction."
    if row.confined_reaction:
        rule, reason = continuity.development_maximum_confined, "Ends confined by a compressive reaction."
    largest = work.work(Choice(rule, f"Simple support or point of inflection. {reason}"))
    number = work.pad.number
    text = f"l_d = {number(work.value('l_d')):,.4g} in, at most {number(largest):,.4g} in"
    what = "development length at simple support or point of inflection"
    yield _verified(work, row, what, (work.value("l_d"), largest), _clause(rule, edition), text)
