"""The tables of a job as typed records: bar terminations, the column schedule, member forces.

Here a file is checked for what it says; whether a code allows it is decided where the clause stands.
"""

from __future__ import annotations

import re
from collections.abc import Callable, Iterable, Iterator, Sequence
from dataclasses import replace
from pathlib import Path
from typing import Any, TypeVar

from calcpack.errors import Problem, TableError
from calcpack.job.bars import Transverse, bar_size, parse_layout, parse_transverse
from calcpack.job.givens import GivenValue, read_givens
from calcpack.job.records import ColumnRow, ForceRow, StoryRow, Termination
from calcpack.job.tables import Column, Row, Rule, Table, read_table, repeated, yes_no
from calcpack.job.wording import did_you_mean, failure, shown
from calcpack.units import AREA, FORCE, LENGTH, MOMENT, RATIO, STRESS

__all__ = [
    "COATINGS",
    "EXCLUSIONS",
    "KINDS",
    "LOADS",
    "ColumnRow",
    "ForceRow",
    "GivenValue",
    "StoryRow",
    "Termination",
    "match",
    "match_stories",
    "read_columns",
    "read_forces",
    "read_givens",
    "read_stories",
    "read_terminations",
]

KINDS = (
    "straight tension",
    "hook 90",
    "hook 180",
    "headed",
    "straight compression",
    "lap tension",
    "lap compression",
    "mechanical splice",
)
COATINGS = ("none", "epoxy", "zinc", "dual")
EXCLUSIONS = ("noncontinuous support", "f_y required", "continuous bars", "seismic")
LOADS = ("D", "L", "Lr", "S", "R", "W", "E", "H", "F", "T")


def _bar(text: str) -> tuple[int, str]:
    return bar_size(text), text


def _bundle(text: str) -> int:
    if text not in ("1", "2", "3", "4"):
        raise ValueError("a bundle holds up to four bars (25.6.1.1)")
    return int(text)


def _share(text: str) -> float:
    """A share written ``50%`` or ``0.5``."""
    number = text.removesuffix("%").strip()
    if not re.fullmatch(r"[0-9]+\.?[0-9]*|\.[0-9]+", number):
        raise ValueError("write 50% or 0.5")
    share = float(number) / 100 if text.endswith("%") else float(number)
    if share > 1:
        raise ValueError(f"above all of it: was this meant to be {number}%?")
    return share


def _length(symbol: str) -> Column:
    return Column(symbol, LENGTH, above=0)


def _stress(symbol: str, required: bool = True) -> Column:
    return Column(symbol, STRESS, required, above=0)


def _yes(symbol: str) -> Column:
    return Column(symbol, default=False, parse=yes_no, allowed="yes or no")


def _legs(text: str) -> int:
    if not text.isdecimal() or int(text) < 2:
        raise ValueError("hoops and crossties together have at least the two legs of the hoop")
    return int(text)


_MARK = Column("mark", required=True)
_LAMBDA = Column("lambda", RATIO, default=1.0, above=0)
_SOURCE = Column("source", default="")

_TERMINATION = (
    _MARK,
    Column("kind", required=True, choices=KINDS),
    Column("bar", required=True, parse=_bar, allowed="a bar size, #3 to #11, #14 or #18"),
    _stress("f_c"),
    _stress("f_y"),
    _LAMBDA,
    _yes("top"),
    Column("coating", default="none", choices=COATINGS),
    *map(_length, ("c_b", "clear_cover", "clear_spacing", "spacing")),
    Column("K_tr", LENGTH, default=0.0, least=0),
    *map(_length, ("side_cover", "tail_cover")),
    _yes("confining_ties"),
    _yes("in_column_core"),
    Column("A_s_required", AREA, above=0),
    Column("A_s_provided", AREA, above=0),
    Column("lap_class", choices=("A", "B")),
    _length("available"),
    Column("bundle", default=1, parse=_bundle, allowed="the number of bars in the bundle, 1 to 4"),
    Column("spliced", parse=_share, allowed="the share of the bars spliced, e.g. '50%' or '0.5'"),
    Column("other_bar", parse=_bar, allowed="a bar size, #3 to #11, #14 or #18"),
    Column("bar_stress", parse=_share, allowed="the tensile stress over f_y, e.g. '40%' or '0.4'"),
    _yes("spiral"),
    Column("M_n", MOMENT, above=0),
    Column("V_u", FORCE, above=0),
    Column("l_a", LENGTH, least=0),
    _yes("confined_reaction"),
    Column("joint", default="", choices=("special",)),
    Column("excess_exclusion", default="", choices=EXCLUSIONS),
    Column("member", default=""),
    Column("location", default=""),
    _SOURCE,
)

_COLUMN = (
    _MARK,
    Column("shape", required=True, choices=("rectangular", "circular")),
    _length("b"),
    Column("h", LENGTH, required=True, above=0),
    Column("bars", required=True, parse=parse_layout, allowed="bars and layout, e.g. '8-#9 (3x3)' or '10-#8'"),
    Column("ties", required=True, parse=parse_transverse, allowed="ties or spiral, e.g. '#3@12' or '#4 spiral@2.25'"),
    Column("cover", LENGTH, required=True, above=0),
    _stress("f_c"),
    _stress("f_y"),
    _stress("f_yt", required=False),
    _length("l_u"),
    Column("k_x", RATIO, above=0),
    Column("k_y", RATIO, above=0),
    Column("frame", choices=("nonsway", "sway")),
    _LAMBDA,
    _length("aggregate"),
    *(Column(f"psi_{axis}_{end}", RATIO, least=0) for axis in "xy" for end in ("bottom", "top")),
    Column("beta_dns", RATIO, least=0),
    Column("delta_s", RATIO, least=1),
    Column("story", default=""),
    Column("seismic", default="none", choices=("none", "special")),
    Column("legs_x", parse=_legs, allowed="a number of legs, 2 or more"),
    Column("legs_y", parse=_legs, allowed="a number of legs, 2 or more"),
    Column("ties_beyond", parse=parse_transverse, allowed="ties beyond the length l_o, e.g. '#4@6'"),
    Column("group", default=""),
    _SOURCE,
)

_MOMENTS = ("Mx", "My", "Mx_bottom", "Mx_top", "My_bottom", "My_top")
_FORCE = (
    _MARK,
    Column("combination"),
    Column("load", choices=LOADS),
    Column("case", default=""),
    Column("P", FORCE, required=True),
    *(Column(symbol, MOMENT) for symbol in _MOMENTS),
    Column("Vx", FORCE, default=0.0),
    Column("Vy", FORCE, default=0.0),
    Column("T", MOMENT, default=0.0),
)

_Record = TypeVar("_Record", Termination, ColumnRow, ForceRow, StoryRow)


_STORY = (
    Column("story", required=True),
    Column("combination", default=""),
    Column("sum_P_u", FORCE, required=True, above=0),
    Column("V_us", FORCE, required=True, above=0),
    Column("Delta_o", LENGTH, required=True, above=0),
    Column("l_c", LENGTH, required=True, above=0),
    Column("sum_P_c", FORCE, above=0),
    _SOURCE,
)


def _record(kind: type[_Record], row: Row, **changed: Any) -> _Record:
    values = {("lamb" if symbol == "lambda" else symbol): value for symbol, value in row.values.items()}
    return kind(**(values | changed), row=row.row, file=row.file)


def _records(
    root: Path, stem: str, columns: Sequence[Column], rule: Rule, make: Callable[[Row], _Record]
) -> tuple[_Record, ...]:
    try:
        table = read_table(root, stem, columns, rule)
    except TableError as error:
        error.records = tuple(make(row) for row in error.records)
        raise
    return tuple(make(row) for row in table.rows) if table else ()


def read_terminations(job_root: Path) -> tuple[Termination, ...]:
    """The bar terminations of inputs/anchorage, in file order; none where the file is absent.

    Raises
    ------
    TableError : everything that is wrong in the file
    """
    return _records(job_root, "anchorage", _TERMINATION, _termination_rule, _termination)


def _termination(row: Row) -> Termination:
    bar, other = row.values["bar"], row.values["other_bar"]
    return _record(Termination, row, bar=bar[0], bar_text=bar[1], other_bar=other[0] if other else None)


def _termination_rule(table: Table) -> Iterator[Problem]:
    yield from repeated(table, "mark")
    for row in table.rows:
        for given, other in (("A_s_required", "A_s_provided"), ("A_s_provided", "A_s_required")):
            if row.filled(given) and row.blank(other):
                yield row.problem(f"{given} without {other}", "both areas or neither", "fill or clear the pair")


def read_columns(job_root: Path) -> tuple[ColumnRow, ...]:
    """The column schedule of inputs/columns, in file order; none where the file is absent.

    Raises
    ------
    TableError : everything that is wrong in the file
    """
    return _records(job_root, "columns", _COLUMN, _column_rule, _column)


def _column(row: Row) -> ColumnRow:
    ties: Transverse = row.values["ties"]
    beyond: Transverse | None = row.values["ties_beyond"]
    size = row.sizes["cover"]
    scaled = beyond and replace(beyond, spacing=beyond.spacing * size)
    stated = {name: row.values[name] for name in ("legs_x", "legs_y")}
    legs = {name: 2 if count is None else count for name, count in stated.items()}
    known = any(count is not None for count in stated.values())
    return _record(
        ColumnRow, row, **legs, legs_stated=known, ties=replace(ties, spacing=ties.spacing * size), ties_beyond=scaled
    )


def _column_rule(table: Table) -> Iterator[Problem]:
    yield from repeated(table, "mark")
    for row in table.rows:
        shape, bars = row.values.get("shape"), row.values.get("bars")
        if shape == "rectangular" and row.blank("b"):
            yield row.problem("b is empty", "the width of a rectangular column", "fill in b, the side along x")
        if shape == "circular" and row.filled("b"):
            yield row.problem("b is given", "no b for a circular column", "clear b: h is the diameter")
        if shape == "rectangular" and bars and bars.n_x is None:
            yield row.problem(f"bars = {bars.text!r}", "bars of a rectangle with their layout", "add e.g. (3x3)")
        if shape == "circular" and bars and bars.n_x is not None:
            yield row.problem(f"bars = {bars.text!r}", "bars of a circle without layout", "write e.g. 10-#8")


def read_forces(job_root: Path) -> tuple[ForceRow, ...]:
    """The member forces of inputs/forces, in file order; none where the file is absent.

    Raises
    ------
    TableError : everything that is wrong in the file
    """
    return _records(job_root, "forces", _FORCE, _force_rule, lambda row: _record(ForceRow, row))


def read_stories(job_root: Path) -> tuple[StoryRow, ...]:
    """The stories of inputs/stories, in file order; none where the file is absent.

    Raises
    ------
    TableError : everything that is wrong in the file
    """
    return _records(job_root, "stories", _STORY, _story_rule, lambda row: _record(StoryRow, row))


def _story_rule(table: Table) -> Iterator[Problem]:
    seen: dict[tuple[Any, Any], Row] = {}
    for row in table.rows:
        key = row.values.get("story"), row.values.get("combination")
        if key in seen:
            yield row.problem(f"story {key[0]!r} twice for one combination", "one row each", "remove one")
        seen[key] = row


def _force_rule(table: Table) -> Iterator[Problem]:
    yield from _basis_rule(table)
    for axis in ("Mx", "My"):
        yield from _moment_rule(table, axis, f"{axis}_bottom", f"{axis}_top")
    if not table.rows:
        yield table.problem("no row below the header", "the forces of every column", "add them or remove the file")


def _basis_rule(table: Table) -> Iterator[Problem]:
    """A file gives factored combinations or unfactored loads, one of the two."""
    named = [symbol for symbol in ("combination", "load") if symbol in table.symbols]
    remedy = "combination where the rows are factored, load where the tool forms the combinations"
    if len(named) == 2:
        yield table.problem("columns 'combination' and 'load'", "one of the two", remedy)
    if not named:
        yield table.problem("neither column 'combination' nor 'load'", "one of the two", remedy)
    for row in table.rows:
        if len(named) == 1 and row.blank(named[0]):
            yield row.problem(f"{named[0]} is empty", "a name in every row", "fill the cell")


def _moment_rule(table: Table, one: str, bottom: str, top: str) -> Iterator[Problem]:
    """About an axis a row gives one moment, or those at both ends."""
    allowed = f"{one}, or {bottom} and {top}"
    if not table.symbols & {one, bottom, top}:
        yield table.problem(f"column '{one} [kip*ft]' is missing", allowed, "add it")
        return
    for row in table.rows:
        if not {one, bottom, top} <= row.values.keys():
            continue
        given = [symbol for symbol in (one, bottom, top) if row.filled(symbol)]
        if given not in ([one], [bottom, top]):
            yield row.problem(f"{' and '.join(given) or 'no moment'} given", allowed, "give the one or the other")


def match(columns: Sequence[ColumnRow], forces: Sequence[ForceRow]) -> None:
    """Hold the marks of the schedule against those of the forces; nothing to hold where forces are absent.

    Raises
    ------
    TableError : a mark with forces that is not in the schedule, or a column without forces
    """
    if not forces:
        return
    problems = [*_unmatched(forces, columns, "columns"), *_unmatched(columns, forces, "forces")]
    if problems:
        raise failure("inputs: marks of columns and forces", problems)


def match_stories(columns: Sequence[ColumnRow], stories: Sequence[StoryRow]) -> None:
    """Hold the stories that columns name against those of the table.

    Raises
    ------
    TableError : a story that the table does not hold
    """
    known = list(dict.fromkeys(row.story for row in stories))
    problems = [
        Problem(
            f"story = {shown(row.story)}",
            f"a story of inputs/stories ({', '.join(known) or 'which lists none'})",
            did_you_mean(row.story, known) or "add it there or clear it here",
            row.where,
        )
        for row in columns
        if row.story and row.story not in known
    ]
    if problems:
        raise failure("inputs: stories of columns", problems)


def _unmatched(
    rows: Iterable[ColumnRow | ForceRow], others: Iterable[ColumnRow | ForceRow], table: str
) -> Iterator[Problem]:
    known = list(dict.fromkeys(other.mark for other in others))
    seen = set(known)
    for row in rows:
        if row.mark not in seen:
            seen.add(row.mark)
            remedy = did_you_mean(row.mark, known) or "add it there or remove it here"
            yield Problem(f"mark = {shown(row.mark)}", f"a mark of inputs/{table}", remedy, row.where)
