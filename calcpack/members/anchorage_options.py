"""Straight against hooked: what each way of anchoring a bar needs, and which of them fit the length available.

An option that does not fit is no failure of the detail: nothing here is a verdict.
"""

from __future__ import annotations

from collections.abc import Mapping
from dataclasses import dataclass
from typing import Any, Generic, TypeVar

from calcpack.aci318.editions import Edition
from calcpack.errors import RangeError
from calcpack.formula import Clause, formula
from calcpack.ledger import passes
from calcpack.members.anchorage import required_length
from calcpack.members.anchorage_reductions import APPLIES, DOES_NOT, UNKNOWN, Reduction, reductions
from calcpack.members.pad import FloatPad, Pad
from calcpack.members.results import Requirement
from calcpack.members.termination import Termination, TerminationLike, place, termination_of
from calcpack.symbols import lookup
from calcpack.units import Length, Ratio

__all__ = ["HEAD", "Option", "WorkedOption", "length_over_available", "option_cells", "options", "work_options"]

T = TypeVar("T")
_TENSION = ("straight tension", "hook 90", "hook 180", "headed")
_KINDS: Mapping[str, tuple[str, ...]] = {
    **dict.fromkeys(_TENSION, _TENSION),
    # A hook or a head adds nothing in compression, 25.4.1.2.
    "straight compression": ("straight compression",),
    "lap tension": ("lap tension", "mechanical splice"),
    "lap compression": ("lap compression", "mechanical splice"),
    "mechanical splice": ("mechanical splice",),
}
# What a row says of one kind and another kind has no use for.
_OF_KIND: Mapping[str, Mapping[str, Any]] = {
    "straight tension": {"M_n": None, "V_u": None, "l_a": None, "confined_reaction": False},
    "lap tension": {"spliced": None, "other_bar": None, "bar_stress": None, "lap_class": None, "available": None},
    "lap compression": {"spliced": None, "other_bar": None, "bar_stress": None, "spiral": False, "available": None},
}


@formula(Clause("length required over length available"))
def length_over_available(*, l_required: Length, l_available: Length) -> Ratio:
    """Length that an option requires over the length that the detail offers."""
    r_length: Ratio = l_required / l_available
    return r_length


@dataclass(frozen=True)
class Option:
    """One way of anchoring the bar of a row.

    Attributes
    ----------
    kind : as in the schedule
    symbol, length : the length it needs, minima included, or the force of a mechanical splice; None where it is refused
    clause : of its equation
    fits : whether it fits the available length with every condition met; None where there is nothing to compare
    reductions : those of its provision: applied, not applied, and not known
    requirements : conditions beside the length
    length_at_best : the length if everything not known were favourable; None where all is known
    refused : why the provision does not hold for this bar, empty where it does
    """

    kind: str
    symbol: str = ""
    length: float | None = None
    clause: str = ""
    fits: bool | None = None
    reductions: tuple[Reduction, ...] = ()
    requirements: tuple[Requirement, ...] = ()
    length_at_best: float | None = None
    refused: tuple[str, ...] = ()

    def in_state(self, state: str) -> tuple[Reduction, ...]:
        """The reductions that apply, that do not, or that are not known."""
        return tuple(one for one in self.reductions if one.state == state)

    @property
    def missing(self) -> tuple[str, ...]:
        """What has to be stated to claim a further reduction."""
        return tuple(one.why for one in self.in_state(UNKNOWN))


@dataclass(frozen=True)
class WorkedOption(Generic[T]):
    """An option, and the values that stand for it on a pad: the length it needs, and that over the length available."""

    option: Option
    value: T | None = None
    ratio: T | None = None


def options(row: TerminationLike, edition: Edition) -> list[Option]:
    """Every way of anchoring or splicing the bar of a row, in the order of the schedule's kinds.

    Parameters
    ----------
    row : its own kind says whether it is anchored in tension or compression, or lapped
    edition : of ACI 318

    Raises
    ------
    RangeError : the row itself cannot be checked, everything that is wrong with it at once
    """
    required_length(_FLOATS, row, edition)
    return [one.option for one in _worked(_FLOATS, row, edition, None)]


def work_options(pad: Pad[T], row: TerminationLike, edition: Edition) -> list[WorkedOption[T]]:
    """Work the options of a row on a pad, each under a heading of its kind, with its reductions in words.

    Raises
    ------
    RangeError : the row itself cannot be checked, everything that is wrong with it at once
    """
    required_length(_FLOATS, row, edition)
    available = None
    if row.available is not None:
        available = pad.given("l_available", row.available, lookup("l_available").meaning, place(row))
    return _worked(pad, row, edition, available)


_FLOATS = FloatPad()


def _worked(pad: Pad[T], row: TerminationLike, edition: Edition, available: T | None) -> list[WorkedOption[T]]:
    kinds = _KINDS[row.kind]
    return [_one(pad, _as_kind(row, kind), row.available, edition, available) for kind in kinds]


def _as_kind(row: TerminationLike, kind: str) -> Termination:
    """The row as another kind: what it says of ties is said of the condition of its own provision."""
    if kind == row.kind:
        return termination_of(row)
    same_ties = {kind, row.kind} == {"hook 90", "hook 180"}
    ties = {"confining_ties": row.confining_ties and same_ties}
    return termination_of(row, kind=kind, **ties, **_OF_KIND.get(row.kind, {}))


def _one(pad: Pad[T], row: Termination, length: float | None, edition: Edition, available: T | None) -> WorkedOption[T]:
    try:
        asked = required_length(_FLOATS, row, edition).requirements
    except RangeError as error:
        return WorkedOption(Option(row.kind, refused=tuple(problem.line() for problem in error.problems)))
    pad.heading(f"{row.mark}: {row.kind}")
    found = tuple(reductions(row, edition))
    for state, words in _STATES.items():
        said = [str(one) for one in found if one.state == state]
        if said:
            pad.reason(f"{words}: {'; '.join(said)}.")
    required = required_length(pad, row, edition, verified=False)
    is_length = required.symbol.startswith("l_")
    number = pad.number(required.value)
    met = all(one.met for one in asked)
    fits = passes(number / length) and met if length is not None and is_length else None
    ratio = None
    if available is not None and is_length:
        ratio = pad.work(length_over_available, l_required=required.value, l_available=available)
    option = Option(
        row.kind, required.symbol, number, required.clause, fits, found, asked,
        _at_best(row, edition, found), (),
    )  # fmt: skip
    return WorkedOption(option, required.value, ratio)


_STATES = {APPLIES: "Applied", DOES_NOT: "Not applied", UNKNOWN: "Not known"}


def _at_best(row: Termination, edition: Edition, found: tuple[Reduction, ...]) -> float | None:
    """The length with every reduction that only lacks a statement."""
    changes = {name: value for one in found if one.state == UNKNOWN for name, value in one.claim.items()}
    if not changes:
        return None
    return required_length(_FLOATS, termination_of(row, **changes), edition).value


HEAD = ("Option", "Required", "Over available", "Fits", "Applied", "Not applied", "To be stated for less", "At best")


def option_cells(worked: WorkedOption[T]) -> tuple[Any, ...]:
    """The cells of an option in a table with the head `HEAD`; what is worked on the pad stands as its value."""
    one = worked.option
    if worked.value is None:
        return (one.kind, "–", "–", "not permitted", "–", "; ".join(one.refused), "–", "–")
    fits = {None: "–", True: "fits", False: "does not fit"}[one.fits]
    unmet = [str(asked) for asked in one.requirements if not asked.met]
    best = "–" if one.length_at_best is None else f"{one.length_at_best:.4g} in"
    words = [_listed(one.in_state(state)) for state in (APPLIES, DOES_NOT, UNKNOWN)]
    words[1] = "; ".join(filter(None, [*(f"not met: {text}" for text in unmet), words[1].strip("–")])) or "–"
    ratio = "–" if worked.ratio is None else worked.ratio
    return (one.kind, worked.value, ratio, fits, *words, best)


def _listed(found: tuple[Reduction, ...]) -> str:
    return "; ".join(map(str, found)) or "–"
