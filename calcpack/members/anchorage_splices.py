"""Which equation serves a lap or a mechanical splice: class by areas or bar stress, column reductions, bundles."""

from __future__ import annotations

from collections.abc import Mapping

from calcpack.aci318 import bundles, laps, splices
from calcpack.aci318.editions import Edition
from calcpack.members.anchorage_rules import STRAIGHT_RULES, Rule, bundled
from calcpack.members.termination import TerminationLike
from calcpack.members.working import Choice

__all__ = [
    "COMPRESSION_LAP_RULES",
    "HALF",
    "LAP_RULES",
    "MECHANICAL_RULES",
    "TWICE",
    "class_by_area",
    "class_by_bar_stress",
    "column_splice",
]

# Class A: the bars stressed to half of f_y or less, and half of them or fewer spliced at one place.
HALF = 0.5
TWICE = 2.0


def class_by_area(A_s_required: float, A_s_provided: float, spliced: float) -> str:
    """Class of a tension lap, Table 25.5.2.1; `spliced` is the share of the bars spliced within the lap length.

    >>> class_by_area(1.0, 2.1, 0.5), class_by_area(1.0, 2.1, 1.0)
    ('A', 'B')
    """
    return "A" if A_s_provided >= TWICE * A_s_required and spliced <= HALF else "B"


def class_by_bar_stress(bar_stress: float, spliced: float | None) -> str:
    """Class of a tension lap of column bars, Table 10.7.5.2.2; the laps of class A are staggered by l_d.

    Parameters
    ----------
    bar_stress : tensile stress of the bars under factored loads, over f_y
    spliced : share of the bars spliced at one section, or None where it is not known
    """
    return "A" if bar_stress <= HALF and spliced is not None and spliced <= HALF else "B"


def column_splice(bar_stress: float, spliced: float | None = None) -> str:
    """The lap that column bars need by their stress under factored loads, 10.7.5.2.

    Parameters
    ----------
    bar_stress : largest tensile stress of a spliced bar over f_y, from every combination; zero or less in compression
    spliced : share of the bars spliced at one section, or None where it is not known

    Returns
    -------
    ``compression lap``, ``tension lap, class A`` or ``tension lap, class B``

    >>> column_splice(-0.4), column_splice(0.3, 0.5), column_splice(0.3), column_splice(0.6, 0.5)
    ('compression lap', 'tension lap, class A', 'tension lap, class B', 'tension lap, class B')
    """
    if bar_stress <= 0:
        return "compression lap"
    return f"tension lap, class {class_by_bar_stress(bar_stress, spliced)}"


# Tension laps


def _lap_length(row: TerminationLike, _edition: Edition) -> Choice:
    letter, reason = _class_of(row)
    if bundled(row):
        return Choice(bundles.bundled_lap_class_a if letter == "A" else bundles.bundled_lap_class_b, reason)
    if row.lap_class != "B" and row.spliced is not None:
        if row.bar_stress is not None:
            return Choice(splices.lap_by_bar_stress, reason)
        if row.A_s_required is not None:
            return Choice(splices.lap_by_area, reason)
    return Choice(laps.lap_class_a if letter == "A" else laps.lap_class_b, reason)


def _class_of(row: TerminationLike) -> tuple[str, str]:
    """The class of a tension lap, and why."""
    if row.lap_class == "B":
        return "B", "Class B, as scheduled."
    if row.bar_stress is not None and (row.spliced is not None or row.lap_class is None):
        letter = class_by_bar_stress(row.bar_stress, row.spliced)
        return letter, f"Class {letter} by the bar stress, {row.bar_stress:g} f_y in tension, {_spliced(row)}."
    if row.A_s_required is not None and row.A_s_provided is not None and row.spliced is not None:
        letter = class_by_area(row.A_s_required, row.A_s_provided, row.spliced)
        times = row.A_s_provided / row.A_s_required
        return letter, f"Class {letter}: {times:.4g} times the area required, {_spliced(row)}."
    if row.lap_class == "A" and row.bar_stress is not None:
        return (
            "A",
            f"Class A, as scheduled: {row.bar_stress:g} f_y in tension, at most half the bars spliced, staggered.",
        )
    if row.lap_class == "A":
        return "A", "Class A, as scheduled: twice the area required, at most half the bars spliced."
    return "B", "Class B: class not stated."


def _spliced(row: TerminationLike) -> str:
    return "share of bars spliced not stated" if row.spliced is None else f"{row.spliced:.4g} of the bars spliced"


LAP_RULES: Mapping[str, Rule] = {**STRAIGHT_RULES, "l_st": _lap_length}


# Compression laps


def _lap_compression_length(row: TerminationLike, _edition: Edition) -> Choice:
    many = bundled(row)
    if row.spiral:
        return Choice(bundles.bundled_lap_in_spiral if many else laps.lap_in_spiral, "Inside a spiral, as scheduled.")
    if row.confining_ties:
        reason = "Column ties of 0.0015 h s or more in both directions, as scheduled."
        return Choice(bundles.bundled_lap_in_ties if many else laps.lap_in_ties, reason)
    formula = bundles.bundled_lap_compression if many else laps.lap_without_reduction
    return Choice(formula, "No reduction for column ties or spiral.")


def _lap_compression_equation(row: TerminationLike, _edition: Edition) -> Choice:
    return Choice(laps.lap_compression_high_grade if row.f_y > 80_000 else laps.lap_compression)


def _lap_of_single_bar(_row: TerminationLike, _edition: Edition) -> Choice:
    """The tension lap that a compression lap is compared with: the increase for bundles follows it."""
    return Choice(laps.lap_class_b, "Class B: class not stated.")


def _lap_compared(row: TerminationLike, edition: Edition) -> Choice:
    return _lap_of_single_bar(row, edition) if bundled(row) else _lap_length(row, edition)


COMPRESSION_LAP_RULES: Mapping[str, Rule] = {
    **LAP_RULES,
    "l_st": _lap_compared,
    "l_sc": _lap_compression_length,
    "l_sc_a": _lap_compression_equation,
}


# Mechanical splices


def _mechanical(_row: TerminationLike, _edition: Edition) -> Choice:
    return Choice(splices.mechanical_splice)


MECHANICAL_RULES: Mapping[str, Rule] = {"P_splice": _mechanical}
