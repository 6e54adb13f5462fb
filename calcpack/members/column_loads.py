"""The strength combinations applied to the unfactored forces of a column, in bulk and worked on a sheet."""

from __future__ import annotations

from collections.abc import Iterable, Iterator, Mapping, Sequence
from dataclasses import dataclass
from functools import lru_cache
from itertools import product
from typing import TYPE_CHECKING, Protocol, TypeAlias, TypeVar, cast

from calcpack.errors import Problem, TableError
from calcpack.loads.combinations import (
    ALTERNATIVE,
    AS_CODE,
    LATERAL,
    LOADS,
    SUSTAINED,
    Combination,
    Settings,
    Terms,
    combinations,
    name_of,
)
from calcpack.loads.equations import combination_formula
from calcpack.members.column_section import ColumnLike, Force, ForceLike, Sway, Term, force_source
from calcpack.members.pad import Pad
from calcpack.symbols import lookup

if TYPE_CHECKING:
    import numpy as np
    from numpy.typing import NDArray

    Floats: TypeAlias = NDArray[np.float64]

__all__ = ["FormedForce", "LoadRow", "LoadRowLike", "combined", "work_forces"]

T = TypeVar("T")


class LoadRowLike(ForceLike, Protocol):
    """Unfactored forces of one load; `combination` is None."""

    @property
    def load(self) -> str | None:
        """The load, by its letters in ASCE 7."""
        ...

    @property
    def case(self) -> str:
        """Names one of several rows of a load, a direction of wind or a pattern of live load; may be empty."""
        ...


@dataclass(frozen=True)
class LoadRow:
    """Unfactored forces of one load; fields as in `LoadRowLike`."""

    load: str
    P: float
    Mx: float | None = 0.0
    My: float | None = 0.0
    Mx_bottom: float | None = None
    Mx_top: float | None = None
    My_bottom: float | None = None
    My_top: float | None = None
    Vx: float = 0.0
    Vy: float = 0.0
    T: float = 0.0
    case: str = ""
    combination: str | None = None
    file: str = ""
    row: int = 0


@dataclass(frozen=True)
class FormedForce(Force):
    """Forces of a combination that was formed; `rule` is the combination, for its clause and its reasons."""

    rule: Combination | None = None


def combined(
    column: ColumnLike, rows: Sequence[ForceLike], standard: str, settings: Settings = AS_CODE
) -> list[ForceLike]:
    """Every strength combination of the unfactored rows of one column.

    Several rows of L, Lr, S, R, W or E are alternatives that act one at a time. Rows that are factored already come
    first, unchanged. A row with one moment counts with it at both ends where another row gives moments by their ends.

    Raises
    ------
    TableError : several rows of a load that acts with one value, no row of D, cases that cannot be told apart, all
        at once
    RangeError : a standard whose combinations are not formed
    """
    unfactored = [cast(LoadRowLike, row) for row in rows if getattr(row, "load", None)]
    factored = [row for row in rows if not getattr(row, "load", None)]
    if not unfactored:
        return factored
    problems = list(_problems(unfactored, column))
    if problems:
        raise TableError(f"column {column.mark}: unfactored forces", problems)
    plan = _plan(standard, tuple((str(row.load), row.case.strip()) for row in unfactored), settings)
    return [*factored, *_formed(unfactored, plan)]


def _problems(rows: Sequence[LoadRowLike], column: ColumnLike) -> Iterator[Problem]:
    of_load: dict[str, list[LoadRowLike]] = {}
    for row in rows:
        of_load.setdefault(str(row.load), []).append(row)
    for load, found in of_load.items():
        if load not in LOADS:
            yield Problem(f"load = {load!r}", f"one of {', '.join(LOADS)}", "", _places(found, column))
        elif load not in ALTERNATIVE and len(found) > 1:
            allowed = f"one row; alternatives are for {', '.join(ALTERNATIVE)}"
            remedy = "add them up in one row"
            yield Problem(f"{len(found)} rows of load {load}", allowed, remedy, _places(found, column))
        yield from _unclear_cases(load, found, column)
    if "D" not in of_load:
        given = f"rows of {', '.join(of_load)} without D"
        yield Problem(given, "a row of D: dead load acts in every combination", "add it", _places(rows, column))
    for row in rows:
        yield from _unclear_moments(row, column)


def _unclear_cases(load: str, rows: Sequence[LoadRowLike], column: ColumnLike) -> Iterator[Problem]:
    of_case: dict[str, list[LoadRowLike]] = {}
    for place, row in enumerate(rows):
        of_case.setdefault(_case(row.case.strip(), place), []).append(row)
    for case, alike in of_case.items():
        if load in ALTERNATIVE and len(alike) > 1:
            given = f"{len(alike)} rows of load {load} with case {case!r}"
            yield Problem(given, "a case of its own for each row", "rename one", _places(alike, column))


def _unclear_moments(row: LoadRowLike, column: ColumnLike) -> Iterator[Problem]:
    for axis in ("Mx", "My"):
        one, bottom, top = (getattr(row, name) is not None for name in (axis, f"{axis}_bottom", f"{axis}_top"))
        if (one, bottom, top) not in ((True, False, False), (False, True, True)):
            allowed = f"{axis}, or {axis}_bottom and {axis}_top"
            yield Problem(f"{axis} of load {row.load}", allowed, "give the one or the other", _places([row], column))


def _places(rows: Iterable[ForceLike], column: ColumnLike) -> str:
    return "; ".join(dict.fromkeys(force_source(row, column) for row in rows))


@dataclass(frozen=True)
class _Plan:
    """The combinations of rows with the same loads and cases, whatever their forces.

    Attributes
    ----------
    formed : each combination with its label and the (row, factor) of each of its terms
    rows, factors : the same as arrays, a combination a line, short ones filled up with zero times the first row
    sustained, lateral : the factors of the loads that are sustained, and of wind and earthquake; others zero
    """

    formed: tuple[tuple[Combination, str, tuple[tuple[int, float], ...]], ...]
    rows: NDArray[np.intp]
    factors: Floats
    sustained: Floats
    lateral: Floats


@lru_cache(maxsize=256)
def _plan(standard: str, keys: tuple[tuple[str, str], ...], settings: Settings) -> _Plan:
    import numpy as np

    formed = tuple(_with_rows(combinations(standard, {load for load, _ in keys}, settings), keys))
    shape = len(formed), max(len(terms) for *_, terms in formed)
    rows, factors = np.zeros(shape, np.intp), np.zeros(shape)
    for line, (*_, terms) in enumerate(formed):
        for place, (index, factor) in enumerate(terms):
            rows[line, place], factors[line, place] = index, factor
    of_load = [np.array([load in group for load, _ in keys], float)[rows] for group in (SUSTAINED, LATERAL)]
    lasting = factors.copy()
    for line, (one, *_, terms) in enumerate(formed):
        for place, (index, _) in enumerate(terms):
            lasting[line, place] = one.dead if keys[index][0] == "D" else factors[line, place]
    return _Plan(formed, rows, factors, lasting * of_load[0], factors * of_load[1])


def _with_rows(
    listed: Iterable[Combination], keys: Sequence[tuple[str, str]]
) -> Iterator[tuple[Combination, str, tuple[tuple[int, float], ...]]]:
    """Each combination once for every choice among the alternative rows of its loads."""
    of_load: dict[str, list[int]] = {}
    for index, (load, _) in enumerate(keys):
        of_load.setdefault(load, []).append(index)
    names = [_row_name(index, *keys[index], of_load) for index in range(len(keys))]
    for one in listed:
        for chosen in product(*(of_load[load] for load, _ in one.terms)):
            terms = tuple((index, factor) for index, (_, factor) in zip(chosen, one.terms, strict=True))
            yield one, name_of(one.number, ((names[index], factor) for index, factor in terms)), terms


def _row_name(index: int, load: str, case: str, of_load: Mapping[str, Sequence[int]]) -> str:
    """``W(+x)``; a row that is the only one of its load and has no case is plain ``W``."""
    rows = of_load[load]
    if load not in ALTERNATIVE or not (case or len(rows) > 1):
        return load
    return f"{load}({_case(case, rows.index(index))})"


def _case(case: str, place: int) -> str:
    """The case of a row; alternatives without one are counted."""
    return case or str(place + 1)


def _formed(rows: Sequence[LoadRowLike], plan: _Plan) -> Iterator[FormedForce]:
    import numpy as np

    values = np.array([_values(row) for row in rows])
    totals = _sums(plan.factors, plan.rows, values).tolist()
    sustained = _sums(plan.sustained, plan.rows, values[:, :1])[:, 0].tolist()
    lateral = _sums(plan.lateral, plan.rows, values[:, 1:5]).tolist()
    terms = {
        (index, factor): Term(factor, str(rows[index].load), rows[index])
        for *_, pairs in plan.formed
        for index, factor in pairs
    }
    whole = [all(getattr(row, axis) is not None for row in rows) for axis in ("Mx", "My")]
    file = next(row.file for row in rows if row.load == "D")
    for (rule, label, pairs), total, lasting, sway in zip(plan.formed, totals, sustained, lateral, strict=True):
        P, Mx_bottom, Mx_top, My_bottom, My_top, Vx, Vy, torsion = total
        Mx, Mx_bottom, Mx_top = (Mx_bottom, None, None) if whole[0] else (None, Mx_bottom, Mx_top)
        My, My_bottom, My_top = (My_bottom, None, None) if whole[1] else (None, My_bottom, My_top)
        yield FormedForce(
            label, P, Mx, My, Mx_bottom, Mx_top, My_bottom, My_top,
            terms=tuple([terms[pair] for pair in pairs]), P_sustained=lasting, sway=Sway(*sway),
            Vx=Vx, Vy=Vy, T=torsion, file=file, rule=rule,
        )  # fmt: skip


def _values(row: LoadRowLike) -> tuple[float | None, ...]:
    """The forces of a row, a single moment at both ends."""
    x = (row.Mx_bottom, row.Mx_top) if row.Mx is None else (row.Mx, row.Mx)
    y = (row.My_bottom, row.My_top) if row.My is None else (row.My, row.My)
    return (row.P, *x, *y, row.Vx, row.Vy, row.T)


def _sums(factors: Floats, rows: NDArray[np.intp], values: Floats) -> Floats:
    """Sums of factored forces, a combination a line, added in the order of the printed line."""
    total: Floats = factors[:, :1] * values[rows[:, 0]]
    for place in range(1, rows.shape[1]):
        total += factors[:, place, None] * values[rows[:, place]]
    return total


def _moments(kind: str, loads: tuple[str, ...]) -> dict[str, tuple[str, str, tuple[str, ...]]]:
    parts = [f"{axis}{end}" for axis in "xy" for end in ("", "_bottom", "_top")]
    return {f"M_{kind}{part}": (f"M{part}", f"M_{part}", loads) for part in parts}


# What a factored force is called, its field in a row, what it is called for one load, and the loads it is of.
_SYMBOLS = {
    "P_u": ("P", "P", LOADS),
    "P_sustained": ("P", "P", SUSTAINED),
    **_moments("u", LOADS),
    **_moments("s", LATERAL),
    "V_ux": ("Vx", "V_x", LOADS),
    "V_uy": ("Vy", "V_y", LOADS),
    "T_u": ("T", "T", LOADS),
}


def work_forces(pad: Pad[T], column: ColumnLike, force: ForceLike, which: Sequence[str]) -> dict[str, T]:
    """State and work the factored forces of one combination.

    A force that the table gives factored is stated. Of one that was formed, the unfactored values are stated, each
    from its row, and the factored one is worked.

    Parameters
    ----------
    which : symbols of the factored forces that are wanted: ``P_u``, ``M_ux``, ``M_ux_bottom``, ``V_uy``, ``T_u``, …;
        of a force that was formed also its sustained part ``P_sustained``, and the part of a moment that wind and
        earthquake cause, ``M_sx``, ``M_sx_bottom``, …

    Returns
    -------
    the values by these symbols; a part that no load of the combination has is left out

    Raises
    ------
    KeyError : one moment is wanted where it is given at the ends, or a part of a force that was not formed
    """
    if isinstance(force, FormedForce) and force.rule is not None:
        return _worked(pad, column, force, force.rule, which)
    source = force_source(force, column)
    parts = [symbol for symbol in which if _SYMBOLS[symbol][2] is not LOADS]
    if parts:
        raise KeyError(f"{', '.join(parts)} of {force.combination}: known only where the combination was formed")
    means = {symbol: f"{lookup(symbol).meaning}, {force.combination}" for symbol in which}
    return {symbol: pad.given(symbol, _effect(symbol, force)[1], means[symbol], source) for symbol in which}


def _worked(
    pad: Pad[T], column: ColumnLike, force: FormedForce, rule: Combination, which: Sequence[str]
) -> dict[str, T]:
    stated: dict[str, T] = {}
    sums: dict[str, Terms] = dict.fromkeys(which, ())
    for symbol in which:
        for term in force.terms:
            if term.load in _SYMBOLS[symbol][2]:
                effect, value = _effect(symbol, term.row)
                name = f"{effect}_{term.load}"
                # E_v is no sustained load, though it is worked with the factor of D.
                lasting = symbol == "P_sustained" and term.load == "D"
                sums[symbol] += ((name, rule.dead if lasting else term.factor),)
                if name not in stated:
                    stated[name] = pad.given(name, value, _meaning(name, term.row), force_source(term.row, column))
    for reason in rule.reasons:
        pad.reason(reason)
    return {
        symbol: pad.work(
            combination_formula(terms, symbol, lookup(symbol).dimension, rule.clause),
            **{name: stated[name] for name, _ in terms},
        )
        for symbol, terms in sums.items()
        if terms
    }


def _meaning(name: str, row: LoadRowLike) -> str:
    case = row.case.strip()
    return f"{lookup(name).meaning} ({case})" if case else lookup(name).meaning


def _effect(symbol: str, row: ForceLike) -> tuple[str, float]:
    """What a factored force is called for one load, and its value in a row; a single moment is that of both ends."""
    field, name, _ = _SYMBOLS[symbol]
    value: float | None = getattr(row, field)
    if value is None and field.endswith(("_bottom", "_top")):
        return _effect(f"M_u{field[1]}", row)
    if value is None:
        raise KeyError(f"{symbol} of {row.combination or 'a row'}: its moment is given at the ends")
    return name, float(value)
