"""What job.toml decides about the development and lap schedule, and what the schedules of the job ask of it."""

from __future__ import annotations

from collections.abc import Callable, Iterator
from dataclasses import dataclass
from itertools import product
from typing import TYPE_CHECKING, Any

from calcpack.errors import Problem, TableError, UnitError
from calcpack.job.bars import BAR_SIZES, bar_size
from calcpack.job.records import ColumnRow, Termination
from calcpack.job.schedules import COATINGS, read_columns, read_terminations
from calcpack.job.toml import Place
from calcpack.job.wording import shown
from calcpack.members.length_basis import Basis, EndConditions, Extent, Strengths
from calcpack.units import LENGTH, STRESS, Dimension, read

if TYPE_CHECKING:
    from calcpack.job.folder import Job

__all__ = ["AS_DEFAULT", "EQUATIONS", "LengthSettings", "Lengths", "length_settings", "lengths_of"]

EQUATIONS = ("table", "general")
_PLAIN = Basis()
_SOURCE = "job.toml, [lengths]"
_STRONGEST = 20_000.0
_LARGEST_STEP = 12.0
_USUAL = 8
_KEYS = (
    "concrete", "grade", "coating", "lambda", "increment", "sizes", "equation", "clear_cover", "clear_spacing",
    "worked", "hooks", "heads", "compression",
)  # fmt: skip


@dataclass(frozen=True)
class LengthSettings:
    """The table ``[lengths]``.

    Attributes
    ----------
    basis : what the lengths hold for
    strengths : what there is a table for; empty where the schedules of the job decide
    worked : the bar size worked in full on the sheet
    """

    basis: Basis = _PLAIN
    strengths: tuple[Strengths, ...] = ()
    worked: int = _USUAL


AS_DEFAULT = LengthSettings()


@dataclass(frozen=True)
class Lengths:
    """A schedule to be worked: one table for each of the strengths."""

    basis: Basis
    strengths: tuple[Strengths, ...]
    worked: int


def length_settings(place: Place, concrete: str) -> LengthSettings:
    """The table ``[lengths]``; `concrete` is the concrete standard of the job, empty where it is not known."""
    place.only(*_KEYS)
    sizes = _list(place, "sizes", lambda key, value: _size_of(place, key, value)) or BAR_SIZES
    return LengthSettings(_basis(place, sizes), _strengths(place, concrete), _worked(place, sizes))


def lengths_of(job: Job) -> Lengths:
    """The schedule of a job: for the strengths of ``[lengths]``, or those that columns.csv and anchorage.csv use.

    Raises
    ------
    TableError : neither names a concrete and a grade, or a table that cannot be read
    """
    settings = job.lengths
    strengths = settings.strengths or tuple(_used(job))
    if not strengths:
        problem = Problem(
            "no concrete and no grade to make it for", "those of [lengths], of columns.csv or of anchorage.csv",
            'add to job.toml: [lengths] concrete = ["4000 psi"], grade = ["60 ksi"]',
        )  # fmt: skip
        raise TableError("development and lap schedule", [problem])
    return Lengths(settings.basis, strengths, settings.worked)


def _used(job: Job) -> Iterator[Strengths]:
    """Strengths that occur together in the tables, weakest concrete first; the file that names them is the source."""
    found: dict[tuple[float, float, int, float], dict[str, None]] = {}
    rows: list[ColumnRow | Termination] = [*read_columns(job.root), *read_terminations(job.root)]
    for row in rows:
        key = (row.f_c, row.f_y, COATINGS.index(getattr(row, "coating", "none")), row.lamb)
        found.setdefault(key, {})[row.file] = None
    for (f_c, f_y, coating, lamb), files in sorted(found.items(), key=lambda one: one[0]):
        yield Strengths(f_c, f_y, COATINGS[coating], lamb, " and ".join(files))


def _strengths(place: Place, concrete: str) -> tuple[Strengths, ...]:
    coatings = _list(place, "coating", lambda key, value: place.chosen(key, value, COATINGS)) or ("none",)
    lamb = _lamb(place)
    for key, other, example in (("concrete", "grade", '["4000 psi"]'), ("grade", "concrete", '["60 ksi"]')):
        if key not in place.keys and other in place.keys:
            place.report(key, f"{key} is missing, {other} is stated", "both or neither", f"add {key} = {example}")
    for key in ("coating", "lambda"):
        if key in place.keys and "concrete" not in place.keys:
            place.report(key, f"{key} without concrete and grade", "all of them, or none", "state concrete and grade")
    strong = _list(place, "concrete", lambda key, value: _concrete(place, key, value))
    grades = _list(place, "grade", lambda key, value: _grade(place, key, value, concrete))
    return tuple(Strengths(f_c, f_y, coating, lamb, _SOURCE) for f_c, f_y, coating in product(strong, grades, coatings))


def _basis(place: Place, sizes: tuple[int, ...]) -> Basis:
    general = "equation" in place.keys and place.choice("equation", EQUATIONS) == "general"
    cover, spacing = (_extent(place, key) for key in ("clear_cover", "clear_spacing"))
    stated = [key for key in ("clear_cover", "clear_spacing") if key in place.keys]
    if len(stated) == 1 or (general and not stated):
        why = "the general equation asks for both" if general else "both or neither"
        found = f"{stated[0]} alone" if stated else "equation = 'general' without clear_cover and clear_spacing"
        place.report("", found, f"clear_cover and clear_spacing ({why})", "e.g. '1 d_b' and '2 d_b'")
    compression = place.table("compression", required=False)
    compression.only("confined", "lap_ties")
    return Basis(
        increment=_increment(place), general=general, clear_cover=cover, clear_spacing=spacing,
        hooks=_ends(place.table("hooks", required=False), "tail_cover"),
        heads=_ends(place.table("heads", required=False)),
        confined=_flag(compression, "confined"), lap_ties=_flag(compression, "lap_ties"),
        sizes=sizes, source=_SOURCE,
    )  # fmt: skip


def _ends(place: Place, *more: str) -> EndConditions:
    place.only("side_cover", *more, "ties", "in_column_core")
    extents = {key: _extent(place, key) for key in ("side_cover", *more)}
    return EndConditions(**extents, ties=_flag(place, "ties"), in_column_core=_flag(place, "in_column_core"))


def _worked(place: Place, sizes: tuple[int, ...]) -> int:
    if "worked" in place.keys:
        worked = _size_of(place, "worked", place.keys["worked"])
        if worked and worked not in sizes:
            allowed = f"one of the sizes listed: {', '.join(f'#{size}' for size in sizes)}"
            place.report("worked", f"worked = {shown(place.keys['worked'])}", allowed)
        if worked:
            return worked
    return max((size for size in sizes if size <= _USUAL), default=min(sizes))


# Single values. What is wrong is reported and left out.


def _list(place: Place, key: str, reader: Callable[[str, Any], Any]) -> tuple[Any, ...]:
    """The values of a list, or of a single value, each once; in the order of the file."""
    if key not in place.keys:
        return ()
    value = place.keys[key]
    listed = value if isinstance(value, list) else [value]
    if not listed:
        place.report(key, f"{key} is an empty list", "at least one value", "fill it in, or remove it")
    found = [read_one for read_one in (reader(key, each) for each in listed) if read_one]
    for twice in sorted({each for each in found if found.count(each) > 1}):
        place.report(key, f"{key} lists {_plain(key, twice)} twice", "each value once", "remove one")
    return tuple(dict.fromkeys(found))


def _plain(key: str, value: object) -> str:
    return f"#{value}" if key == "sizes" else f"{value:,g} psi" if isinstance(value, float) else repr(value)


def _size_of(place: Place, key: str, value: Any) -> int:
    try:
        return bar_size(value)
    except (TypeError, ValueError):
        sizes = ", ".join(f"#{size}" for size in BAR_SIZES)
        place.report(key, f"{key} = {shown(value)}", f"a bar size in quotes: {sizes}")
        return 0


def _measured(place: Place, key: str, value: Any, dimension: Dimension) -> float | None:
    """A value above zero with its unit, in the coherent unit; None where it is none, which is reported."""
    try:
        found = read(value, dimension, key).value
    except UnitError as error:
        for problem in error.problems:
            place.report(key, problem.given, problem.allowed, problem.remedy)
        return None
    if found > 0:
        return found
    place.report(key, f"{key} = {shown(value)}", f"{dimension.phrase} above zero")
    return None


def _concrete(place: Place, key: str, value: Any) -> float | None:
    f_c = _measured(place, key, value, STRESS)
    if f_c is None or 2500 <= f_c <= _STRONGEST:
        return f_c
    guess = f"was this meant to be {f_c * 1000:,g} psi?" if 2500 <= f_c * 1000 <= _STRONGEST else ""
    low = "2,500 psi (ACI 318 Table 19.2.1.1)"
    place.report(key, f"{key} = {shown(value)}", f"{low} to {_STRONGEST:,g} psi, beyond any concrete in use", guess)
    return None


def _grade(place: Place, key: str, value: Any, concrete: str) -> float | None:
    from calcpack.aci318.bars import GRADES
    from calcpack.aci318.editions import EDITIONS

    f_y = _measured(place, key, value, STRESS)
    if f_y is None:
        return None
    grades = sorted({grade for listed in GRADES.values() for grade in listed})
    if f_y not in grades:
        allowed = f"a grade of ASTM A615 or A706: {', '.join(f'{grade / 1000:g} ksi' for grade in grades)}"
        place.report(key, f"{key} = {shown(value)}", allowed)
        return None
    if concrete in EDITIONS and f_y > EDITIONS[concrete].f_y_max:
        allowed = f"up to {EDITIONS[concrete].f_y_max / 1000:g} ksi ({concrete} Table 20.2.2.4a)"
        place.report(key, f"{key} = {shown(value)}", allowed)
        return None
    return f_y


def _lamb(place: Place) -> float:
    value = place.keys.get("lambda", 1.0)
    if isinstance(value, (int, float)) and not isinstance(value, bool) and 0.75 <= value <= 1:
        return float(value)
    place.report("lambda", f"lambda = {shown(value)}", "a number from 0.75 to 1.0 (ACI 318 19.2.4)")
    return 1.0


def _increment(place: Place) -> float:
    if "increment" not in place.keys:
        return _PLAIN.increment
    step = _measured(place, "increment", place.keys["increment"], LENGTH)
    if step is not None and ((4 * step) % 1 or step > _LARGEST_STEP):
        found = f"increment = {shown(place.keys['increment'])}"
        place.report("increment", found, f"a multiple of 1/4 in, up to {_LARGEST_STEP:g} in", "e.g. '1 in'")
        return _PLAIN.increment
    return step or _PLAIN.increment


def _extent(place: Place, key: str) -> Extent | None:
    """A length, or a number of bar diameters: ``"2 in"`` or ``"1.5 d_b"``."""
    if key not in place.keys:
        return None
    value = place.keys[key]
    text = value.strip() if isinstance(value, str) else ""
    if not text.endswith("d_b"):
        found = _measured(place, key, value, LENGTH)
        return None if found is None else Extent(found)
    try:
        number = float(text.removesuffix("d_b"))
    except ValueError:
        number = 0.0
    if 0 < number < 1000:
        return Extent(number, in_diameters=True)
    place.report(key, f"{key} = {shown(value)}", "a length, or a number of bar diameters", "e.g. '2 in' or '1.5 d_b'")
    return None


def _flag(place: Place, key: str) -> bool:
    value = place.keys.get(key, False)
    if not isinstance(value, bool):
        place.report(key, f"{key} = {shown(value)}", "true or false, without quotes")
    return value is True
