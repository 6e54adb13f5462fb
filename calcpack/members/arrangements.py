"""Arrangements of longitudinal bars that would satisfy every check of a column, for the engineer to choose from.

Bars of one size, in the section, with the ties and the concrete of the schedule. Nothing here changes a column. The
list is not offered on a sheet: what a sheet prints is traced to its sources, and these are alternatives that nobody has
chosen; the one that is chosen stands in the schedule and is worked on the sheet from there.
"""

from __future__ import annotations

from collections import Counter
from collections.abc import Callable, Iterable, Iterator, Mapping, Sequence
from dataclasses import dataclass, field, replace
from itertools import chain, count, groupby, takewhile
from typing import Any, cast

from calcpack.aci318 import columns
from calcpack.aci318.bars import BARS, bar
from calcpack.aci318.editions import Edition
from calcpack.errors import Problem, RangeError
from calcpack.ledger import passes
from calcpack.members.column import Context, check, owed
from calcpack.members.column_axial import axial_check
from calcpack.members.column_forces import ForceValues
from calcpack.members.column_like import BarsLike, ColumnLike, ForceLike
from calcpack.members.column_rules import ColumnWorking
from calcpack.members.column_section import Bars
from calcpack.members.interaction import CHECK as BENDING
from calcpack.members.pad import FloatPad
from calcpack.members.results import CheckResult
from calcpack.members.working import Choice
from calcpack.typeset.digits import number_text

__all__ = ["SIZES", "STRENGTH", "Arrangement", "Arrangements", "arrangements"]

SIZES = tuple(size for size in BARS if size >= 5)
# Checks of strength: rules of detailing are often met to the letter and say nothing of how much the column carries.
STRENGTH = frozenset(
    (BENDING, "stability", "second-order moment", "axial strength", "shear", "shear, x", "shear, y", "biaxial shear")
)
_TIE_SIZE = "tie size"
_FLOATS = FloatPad()


@dataclass(frozen=True)
class Arrangement:
    """Bars of one size in a column, and how its checks come out with them.

    Attributes
    ----------
    bars : as the schedule writes them: ``8-#9 (3x3)``, ``10-#8``
    n_x, n_y : along each face parallel to x and to y, corners included; None on a circle
    A_st : total area, in^2
    rho_g : share of the gross section
    governing : the check of strength with the largest ratio, empty where none has one
    ratio : its ratio
    bending : largest ratio of axial force with bending
    present : whether the schedule has it
    failed : checks that are not OK
    undecided : checks without a verdict, and why
    """

    bars: str
    size: int
    count: int
    n_x: int | None
    n_y: int | None
    A_st: float
    rho_g: float
    governing: str
    ratio: float | None
    bending: float | None
    present: bool
    failed: tuple[str, ...] = ()
    undecided: Mapping[str, str] = field(default_factory=dict)


@dataclass(frozen=True)
class Arrangements:
    """The arrangements found for a column, the lightest first.

    Attributes
    ----------
    present : that of the schedule
    found : every check is OK or without a verdict; of equal area fewer bars first, then the smaller ratio of bending
    fitting : how many fit within the ties
    tried : how many of these were checked, the lightest first
    rejected : how many each check refused; one that several refuse counts for the first
    notes : what a reader has to know beside the numbers
    """

    mark: str
    present: Arrangement
    found: tuple[Arrangement, ...]
    fitting: int
    tried: int
    rejected: Mapping[str, int]
    notes: tuple[str, ...] = ()


def arrangements(column: ColumnLike, forces: Iterable[ForceLike], context: Context, most: int = 10) -> Arrangements:
    """The lightest arrangements of one bar size, #5 to #18, that satisfy every check of a column and fit.

    Parameters
    ----------
    column : its own bars are the present arrangement
    forces : of its combinations
    most : how many to list

    Raises
    ------
    RangeError : everything that is wrong with the column, at once; a list of less than one
    """
    if most < 1:
        raise RangeError("list of arrangements", [Problem(f"{most:,} arrangements", "1 or more")])
    search = _Search(column, list(forces), context)
    present = search.seen(column.bars, check(column, search.forces, context))
    listed = sorted(_fitting(column, context.edition), key=_weight)
    found: list[Arrangement] = []
    for _, alike in groupby(listed, _weight):
        found += sorted(filter(None, map(search.satisfying, alike)), key=_spare)
        if len(found) >= most:
            break
    shown = tuple(found[:most])
    notes = tuple(dict.fromkeys(search.notes([present, *shown])))
    return Arrangements(column.mark, present, shown, len(listed), search.tried, dict(search.rejected), notes)


def _weight(bars: Bars) -> tuple[float, int]:
    return round(_area(bars), 6), bars.count


def _spare(one: Arrangement) -> tuple[float, int, int]:
    """Rounded, so that of layouts as strong as each other the first is always the same."""
    return round(one.bending or 0.0, 6), one.n_x or 0, one.n_y or 0


def _area(bars: BarsLike) -> float:
    return bars.count * bar(bars.size).A_b


def _with(column: ColumnLike, bars: Bars) -> ColumnLike:
    changed: ColumnLike = replace(cast(Any, column), bars=bars)
    return changed


def _fitting(column: ColumnLike, edition: Edition) -> Iterator[Bars]:
    """Every arrangement that leaves the least clear spacing between its bars."""
    for size in SIZES:
        work = ColumnWorking(_FLOATS, _with(column, Bars(4, size, 2, 2)), edition)
        if column.b is None:
            fewest = int(work.value("n_min"))
            yield from (Bars(around, size) for around in _room(work, fewest, _around(work)))
        else:
            along = [list(_room(work, 2, face)) for face in (_along_x(work), _along_y(work))]
            yield from (Bars(2 * (n_x + n_y) - 4, size, n_x, n_y) for n_x in along[0] for n_y in along[1])


Clear = Callable[[float], float]


def _along_x(work: ColumnWorking[float]) -> Clear:
    return lambda n_face: work.work(Choice(columns.bar_spacing_face), n_face=n_face)


def _along_y(work: ColumnWorking[float]) -> Clear:
    return lambda n_face: work.work(Choice(columns.bar_spacing_side), n_face=n_face)


def _around(work: ColumnWorking[float]) -> Clear:
    if work.value("D_s") <= 0:
        return lambda _: 0.0
    return lambda n_bars: work.work(Choice(columns.bar_spacing_circular), n_bars=n_bars)


def _room(work: ColumnWorking[float], fewest: int, clear: Clear) -> Iterator[int]:
    """Numbers of bars along a face or around a circle, from the fewest up to as many as there is room for."""
    known = work.column.aggregate is not None
    least = work.work(Choice(columns.bar_spacing_minimum_aggregate if known else columns.bar_spacing_minimum))

    def fits(number: int) -> bool:
        """Whether so many leave the least clear spacing."""
        s_clear = clear(float(number))
        return s_clear > 0 and passes(least / s_clear)

    return takewhile(fits, count(fewest))


class _Search:
    """One column, checked with one arrangement after the other."""

    def __init__(self, column: ColumnLike, forces: Sequence[ForceLike], context: Context) -> None:
        self.column, self.forces, self.context = column, forces, context
        self.tried = 0
        self.rejected: Counter[str] = Counter()
        self._ties_too_small: dict[int, CheckResult] = {}
        self._telling: Sequence[ForceLike] = ()

    def satisfying(self, bars: Bars) -> Arrangement | None:
        """The arrangement as it comes out; None where a check is not OK."""
        self.tried += 1
        results: Sequence[CheckResult] = ()
        for results in self._from_the_cheapest(_with(self.column, bars)):
            failed = [one for one in results if one.verdict == "NG"]
            if failed:
                self._reject(bars, failed)
                return None
        return self.seen(bars, results)

    def _from_the_cheapest(self, column: ColumnLike) -> Iterator[Sequence[CheckResult]]:
        """The checks under none of the forces, under few and under all: what few refuse, all of them refuse as well."""
        work = ColumnWorking(_FLOATS, column, self.context.edition)
        yield check(column, (), self.context)
        yield [axial_check(work, self.forces, ForceValues(work))]
        if self._telling:
            yield check(column, self._telling, self.context)
        yield check(column, self.forces, self.context)

    def _reject(self, bars: Bars, failed: Sequence[CheckResult]) -> None:
        """Keep which check refused, and the combinations that told: lighter and heavier bars mostly share them."""
        self.rejected[failed[0].check] += 1
        for one in failed:
            if one.check == _TIE_SIZE:
                self._ties_too_small[bars.size] = one
        names = {one.combination for one in failed if one.combination}
        self._telling = [force for force in self.forces if force.combination in names] or self._telling

    def seen(self, bars: BarsLike, results: Sequence[CheckResult]) -> Arrangement:
        """An arrangement with what its checks say."""
        of = {one.check: one for one in results}
        strength = [one for one in results if one.check in STRENGTH and one.ratio is not None]
        worst = max(strength, key=lambda one: one.ratio or 0.0, default=None)
        return Arrangement(
            bars=_text(bars), size=bars.size, count=bars.count, n_x=bars.n_x, n_y=bars.n_y, A_st=_area(bars),
            rho_g=of["reinforcement ratio"].values["rho_g"][0] or 0.0,
            governing=worst.check if worst else "", ratio=worst.ratio if worst else None, bending=of[BENDING].ratio,
            present=_text(bars) == _text(self.column.bars),
            failed=tuple(one.check for one in results if one.verdict == "NG"),
            undecided={one.check: " ".join(one.notes) for one in results if not one.verdict},
        )  # fmt: skip

    def notes(self, shown: Sequence[Arrangement]) -> Iterator[str]:
        """What to know beside the numbers of the arrangements shown."""
        for name, why in chain.from_iterable(one.undecided.items() for one in shown):
            yield f"No verdict on {name}: {why}" if why else f"No verdict on {name}."
        if self._ties_too_small:
            yield self._larger_ties()
        for name in owed(self.column, self.forces):
            yield f"Not covered by the checks: {name}."

    def _larger_ties(self) -> str:
        sizes, one = sorted(self._ties_too_small), next(iter(self._ties_too_small.values()))
        least, unit = one.values["d_bt_min"]
        bars = ", ".join(f"#{size}" for size in sizes)
        ties = f"ties of {number_text(least or 0.0)} {unit} in diameter and larger ({one.clause})"
        return f"Bars of {bars} ask for {ties}; the ties are #{self.column.ties.size}: none of them is listed."


def _text(bars: BarsLike) -> str:
    text = f"{bars.count}-#{bars.size}"
    return text if bars.n_x is None else f"{text} ({bars.n_x}x{bars.n_y})"
