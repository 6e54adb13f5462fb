"""What is wrong with a row of the anchorage schedule."""

from __future__ import annotations

from collections.abc import Iterator

from calcpack.aci318.bars import BARS, NO_11
from calcpack.aci318.editions import Edition
from calcpack.aci318.limits import CONCRETE, YIELD_LEAST
from calcpack.errors import Problem, RangeError
from calcpack.formula import Limit
from calcpack.members.termination import COATINGS, EXCLUSIONS, KINDS, TerminationLike, row_of
from calcpack.members.termination_claims import claims

__all__ = ["refuse_problems"]

_LARGEST = 1e30
_SMALLEST = 1e-9
_LENGTHS = ("c_b", "clear_cover", "clear_spacing", "side_cover", "tail_cover", "available", "spacing")
_NOT_NEGATIVE = {"K_tr": "25.4.2", "l_a": "9.7.3.8.3"}
_BY_TEST = ("straight tension", "lap tension", "straight compression")


def refuse_problems(row: TerminationLike, edition: Edition) -> None:
    """Raise everything that is wrong with a row, at once.

    Raises
    ------
    RangeError : a value outside the range of its clause, or one that the check needs and that is missing
    """
    problems = [*_words(row), *_sizes(row), *_materials(row, edition), *_lengths(row), *_areas(row)]
    problems += claims(row, edition)
    if problems:
        raise RangeError(f"{row.mark}: {row.kind}", problems, row_of(row))


def _words(row: TerminationLike) -> Iterator[Problem]:
    if row.kind not in KINDS:
        yield Problem(f"kind = {row.kind!r}", f"one of {', '.join(KINDS)}")
    if row.coating not in COATINGS:
        yield Problem(f"coating = {row.coating!r}", f"one of {', '.join(COATINGS)}")
    if row.lap_class not in (None, "A", "B"):
        yield Problem(f"lap_class = {row.lap_class!r}", "A, B or blank")
    if row.joint not in ("", "special"):
        yield Problem(f"joint = {row.joint!r}", "special or blank")
    if row.excess_exclusion and row.excess_exclusion not in EXCLUSIONS:
        yield Problem(f"excess_exclusion = {row.excess_exclusion!r}", f"one of {', '.join(EXCLUSIONS)} (25.4.10.2)")


def _sizes(row: TerminationLike) -> Iterator[Problem]:
    if row.bar not in BARS:
        allowed = ", ".join(f"#{size}" for size in BARS)
        yield Problem(f"bar = #{row.bar}", f"one of {allowed} (ASTM A615, A706)")
    elif row.bar > NO_11.size and row.kind in _TO_NO_11 and not _lapped_to_smaller(row):
        yield Problem(
            f"bar = #{row.bar}", f"#11 and smaller ({_TO_NO_11[row.kind]})", "use another anchorage or splice"
        )


def _lapped_to_smaller(row: TerminationLike) -> bool:
    """Whether a large bar is lapped in compression with a smaller one, 25.5.5.3."""
    return row.kind == "lap compression" and row.other_bar in BARS and (row.other_bar or 0) <= NO_11.size


_TO_NO_11 = {"headed": "25.4.4.1", "lap tension": "25.5.1.1", "lap compression": "25.5.1.1"}


def _materials(row: TerminationLike, edition: Edition) -> Iterator[Problem]:
    yield from _limited("f_c", row.f_c, "psi", CONCRETE)
    yield from _limited("f_y", row.f_y, "psi", YIELD_LEAST)
    high, clause = edition.f_y_max, "Table 20.2.2.4a"
    if row.kind == "headed":
        high, clause = edition.head_f_y_max, "25.4.4.1"
    yield from _limited("f_y", row.f_y, "psi", Limit("f_y", f"{edition.name} {clause}", high=high))
    if YIELD_LEAST.low <= row.f_y <= high and not any(abs(row.f_y / grade - 1) <= _ROUNDED for grade in _GRADES):
        allowed = f"a grade of ASTM A615, A706 or A996: {', '.join(f'{grade:,} psi' for grade in _GRADES)} (20.2.1.3)"
        yield Problem(f"f_y = {row.f_y:,g} psi", allowed, "state the grade of the bars")
    yield from _lightweight(row, edition)


# Grade 50 is one of A996, Grade 75 of A615 before 2018. Metric grades are up to 2 % off: Grade 420 is 60,916 psi.
_GRADES = (40_000, 50_000, 60_000, 75_000, 80_000, 100_000)
_ROUNDED = 0.02


def _lightweight(row: TerminationLike, edition: Edition) -> Iterator[Problem]:
    if row.kind == "headed":
        limit = Limit("lamb", f"{edition.name} 25.4.4.1, normalweight concrete", values=(1.0,))
    elif row.kind not in _LIGHTWEIGHT_TABLE:
        return
    elif (edition.lightweight_by_test and row.kind in _BY_TEST) or _lap_without_lambda(row):
        limit = Limit("lamb", f"{edition.name} 19.2.4", low=0.75, high=1.0)
    else:
        limit = Limit("lamb", f"{edition.name} {_LIGHTWEIGHT_TABLE[row.kind]}", values=(0.75, 1.0))
    yield from _limited("lambda", row.lamb, "", limit)


_LIGHTWEIGHT_TABLE = {
    "straight tension": "Table 25.4.2.5",
    "lap tension": "Table 25.4.2.5",
    "lap compression": "Table 25.4.2.5",
    "hook 90": "Table 25.4.3.2",
    "hook 180": "Table 25.4.3.2",
    "straight compression": "Table 25.4.9.3",
}


def _lap_without_lambda(row: TerminationLike) -> bool:
    """A compression lap that takes no lambda: it has to be possible all the same."""
    return row.kind == "lap compression" and not _takes_tension_lap(row)


def _takes_tension_lap(row: TerminationLike) -> bool:
    """Whether a compression lap is compared with the tension lap, 318-19 25.5.5.1(c)."""
    return row.kind == "lap compression" and row.f_y > 80_000


def _limited(name: str, value: float, unit: str, limit: Limit) -> Iterator[Problem]:
    if limit.holds(value):
        return
    scaled = [value * scale for scale in (100, 1000) if unit == "psi" and limit.low <= value * scale <= 100_000]
    guess = f"was this meant to be {scaled[0]:,g} psi?" if scaled and value < limit.low else ""
    yield Problem(f"{name} = {value:,g} {unit}".strip(), limit.words(unit), guess)


def _lengths(row: TerminationLike) -> Iterator[Problem]:
    for name in _LENGTHS:
        value = getattr(row, name)
        if value is not None and not _SMALLEST <= value <= _LARGEST:
            yield Problem(f"{name} = {value:,g} in", "a length above zero", "correct it, or leave it blank")
    for name, clause in _NOT_NEGATIVE.items():
        value = getattr(row, name)
        if value is not None and value != 0 and not _SMALLEST <= value <= _LARGEST:
            yield Problem(f"{name} = {value:,g} in", f"a length, zero or more ({clause})")
    if row.c_b is not None and row.bar in BARS and _SMALLEST <= row.c_b <= BARS[row.bar].d_b / 2:
        yield Problem(
            f"c_b = {row.c_b:,g} in", f"above d_b/2 = {BARS[row.bar].d_b / 2:,g} in: it runs to the bar centre"
        )


def _areas(row: TerminationLike) -> Iterator[Problem]:
    required, provided = row.A_s_required, row.A_s_provided
    if required is None and provided is None:
        return
    if required is None or provided is None:
        missing = "A_s_required" if required is None else "A_s_provided"
        yield Problem(f"{missing} is blank", "both areas or neither (25.4.10.1)", "state both, or leave both blank")
        return
    areas = f"A_s_required = {required:,g} in^2, A_s_provided = {provided:,g} in^2"
    if not _SMALLEST <= required <= provided <= _LARGEST:
        yield Problem(
            areas, "above zero, and not more required than provided (25.4.10.1)", "correct them, or leave blank"
        )
    elif row.kind == "lap tension" and row.lap_class == "A" and provided < 2 * required:
        yield Problem(f"lap_class = A, {areas}", "class A from twice the area required (Table 25.5.2.1)", "use class B")
