"""Which reductions of an anchorage length a row claims, which it cannot, and what has to be known to claim one."""

from __future__ import annotations

from collections.abc import Iterator, Mapping
from dataclasses import dataclass, field
from typing import Any

from calcpack.aci318.bars import BARS, NO_11, bar
from calcpack.aci318.editions import Edition
from calcpack.members.anchorage_excess import no_reduction
from calcpack.members.termination import TerminationLike, diameter_of_bundle

__all__ = ["APPLIES", "DOES_NOT", "UNKNOWN", "Reduction", "reductions"]

APPLIES, DOES_NOT, UNKNOWN = "applies", "does not apply", "not known"
_SIDE_14, _TAIL_14 = 2.5, 2.0


@dataclass(frozen=True)
class Reduction:
    """One reduction of a length.

    Attributes
    ----------
    what : in words, e.g. ``covers of the hook``
    symbol : of the factor, empty where it is no factor of its own
    state : `APPLIES`, `DOES_NOT` or `UNKNOWN`
    why : the facts, with the clause; where it is not known, what has to be stated
    claim : values of the row with which it would apply
    """

    what: str
    symbol: str
    state: str
    why: str
    claim: Mapping[str, Any] = field(default_factory=dict)

    def __str__(self) -> str:
        return f"{self.what}: {self.why}"


def reductions(row: TerminationLike, edition: Edition) -> Iterator[Reduction]:
    """The reductions that the provision of the row's kind knows, in the order of its tables."""
    if row.joint:
        yield Reduction("covers and ties", "", DOES_NOT, "the length of the joint's core holds them (18.8.5.1)")
    elif row.kind == "straight tension":
        yield from _straight(row)
    elif row.kind in ("hook 90", "hook 180"):
        yield from _hook_14(row) if edition.hook_by_cover else _hook_19(row)
    elif row.kind == "headed" and not edition.hook_by_cover:
        yield from _head_19(row)
    elif row.kind in ("straight compression", "lap compression"):
        yield _compression(row)
    yield _excess(row, edition)


def _excess(row: TerminationLike, edition: Edition) -> Reduction:
    what, reason = "excess reinforcement", no_reduction(row, edition)
    if reason:
        return Reduction(what, "", DOES_NOT, reason)
    if row.A_s_required is None or row.A_s_provided is None:
        why = "state A_s_required and A_s_provided, where none of the exclusions holds (25.4.10.1, 25.4.10.2)"
        return Reduction(what, "", UNKNOWN, why)
    share = row.A_s_required / row.A_s_provided
    return Reduction(what, "", APPLIES, f"{share:.3g} of the area provided is required (25.4.10.1)")


# Straight bars


def _straight(row: TerminationLike) -> Iterator[Reduction]:
    yield _small_bar(row)
    yield _confinement(row) if row.c_b is not None else _first_row(row)
    if row.K_tr > 0 and row.c_b is not None:
        yield Reduction("transverse reinforcement", "K_tr", APPLIES, f"K_tr = {row.K_tr:,g} in (25.4.2)")
    elif row.c_b is not None:
        yield Reduction(
            "transverse reinforcement", "K_tr", UNKNOWN, "state K_tr of ties or stirrups along the bar (25.4.2)"
        )


def _small_bar(row: TerminationLike) -> Reduction:
    small = bar(row.bar).d_b <= BARS[6].d_b
    state, why = (APPLIES, "No. 6 and smaller") if small else (DOES_NOT, f"No. {row.bar} is larger than No. 6")
    return Reduction("size of bar", "psi_s", state, why)


def _confinement(row: TerminationLike) -> Reduction:
    d = diameter_of_bundle(row)
    term = ((row.c_b or 0.0) + row.K_tr) / d
    counted = f"(c_b + K_tr) over the diameter = {term:.3g}, counted up to 2.5"
    state = APPLIES if term > 1.0 else DOES_NOT
    return Reduction("cover and spacing", "c_b", state, counted)


def _first_row(row: TerminationLike) -> Reduction:
    """The first row of the simplified table against its other cases."""
    what, d = "cover and spacing", diameter_of_bundle(row)
    missing = [name for name in ("clear_cover", "clear_spacing") if getattr(row, name) is None]
    cover = d if row.clear_cover is None else row.clear_cover
    spacing = 2 * d if row.clear_spacing is None else row.clear_spacing
    spaced = cover >= d and spacing >= 2 * d
    tied = cover >= d and spacing >= d
    if spaced and missing:
        claim = {"clear_cover": cover, "clear_spacing": spacing}
        why = f"state {' and '.join(missing)}: with d_b of cover and 2 d_b between bars it is a third shorter"
        return Reduction(what, "", UNKNOWN, why, claim)
    if spaced or (tied and row.confining_ties and not missing):
        return Reduction(what, "", APPLIES, "first row of the table")
    if tied:
        claim = {"clear_cover": cover, "clear_spacing": spacing, "confining_ties": True}
        return Reduction(what, "", UNKNOWN, "state confining_ties: the least ties or stirrups along the bar", claim)
    return Reduction(
        what, "", DOES_NOT, f"cover {cover:,g} in or clear spacing {spacing:,g} in below d_b = {d:,.4g} in"
    )


# Hooks and heads


def _large(row: TerminationLike, what: str, symbol: str) -> Reduction | None:
    if row.bar <= NO_11.size:
        return None
    return Reduction(what, symbol, DOES_NOT, f"No. {row.bar} is larger than No. {NO_11.size}")


def _hook_14(row: TerminationLike) -> Iterator[Reduction]:
    yield _covers_14(row)
    what = "ties or stirrups at 3 d_b or closer"
    yield _large(row, what, "psi_r") or _ties(row, what, "psi_r", "Table 25.4.3.2")


def _covers_14(row: TerminationLike) -> Reduction:
    needs = {"side_cover": _SIDE_14, **({"tail_cover": _TAIL_14} if row.kind == "hook 90" else {})}
    what, words = "covers of the hook", " and ".join(f"{name} of {least:g} in" for name, least in needs.items())
    large = _large(row, what, "psi_c")
    if large:
        return large
    stated = {name: getattr(row, name) for name in needs}
    short = [f"{name} = {value:g} in" for name, value in stated.items() if value is not None and value < needs[name]]
    if short:
        return Reduction(what, "psi_c", DOES_NOT, f"{' and '.join(short)}; it takes {words} (Table 25.4.3.2)")
    missing = {name: least for name, least in needs.items() if stated[name] is None}
    if missing:
        return Reduction(what, "psi_c", UNKNOWN, f"state {' and '.join(missing)}; it takes {words}", missing)
    return Reduction(what, "psi_c", APPLIES, f"{words} or more (Table 25.4.3.2)")


def _ties(row: TerminationLike, what: str, symbol: str, clause: str) -> Reduction:
    if row.confining_ties:
        return Reduction(what, symbol, APPLIES, f"as scheduled ({clause})")
    return Reduction(
        what, symbol, UNKNOWN, f"state confining_ties where they are there ({clause})", {"confining_ties": True}
    )


def _hook_19(row: TerminationLike) -> Iterator[Reduction]:
    yield from _confined_19(row, "ties of 0.4 A_hs or spacing of 6 d_b", "psi_r", "Table 25.4.3.2")


def _head_19(row: TerminationLike) -> Iterator[Reduction]:
    yield from _confined_19(row, "parallel ties of 0.3 A_hs or spacing of 6 d_b", "psi_p", "Table 25.4.4.3")


def _confined_19(row: TerminationLike, what: str, symbol: str, clause: str) -> Iterator[Reduction]:
    d_b = bar(row.bar).d_b
    spacing = row.spacing if row.spacing is not None or row.clear_spacing is None else row.clear_spacing + d_b
    if large := _large(row, what, symbol):
        yield large
    elif spacing is not None and spacing >= 6 * d_b and not row.confining_ties:
        yield Reduction(what, symbol, APPLIES, f"spacing of {spacing:,.4g} in ({clause})")
    elif spacing is None and not row.confining_ties:
        why = f"state confining_ties, or the spacing ({clause})"
        yield Reduction(what, symbol, UNKNOWN, why, {"confining_ties": True})
    else:
        yield _ties(row, what, symbol, clause)
    yield _location_19(row, clause)
    yield _strength_19(row, clause)


def _location_19(row: TerminationLike, clause: str) -> Reduction:
    d_b = bar(row.bar).d_b
    least, where = (min(2.5, 6 * d_b), "inside") if row.in_column_core else (6 * d_b, "outside")
    what = f"side cover, {where} a column core"
    large = _large(row, what, "psi_o")
    if large:
        return large
    if row.side_cover is None:
        why = f"state side_cover: {least:,.4g} in or more ({clause})"
        return Reduction(what, "psi_o", UNKNOWN, why, {"side_cover": least})
    state = APPLIES if row.side_cover >= least else DOES_NOT
    word = "at least" if state == APPLIES else "below"
    return Reduction(what, "psi_o", state, f"{row.side_cover:,g} in, {word} {least:,.4g} in ({clause})")


def _strength_19(row: TerminationLike, clause: str) -> Reduction:
    if row.f_c < 6000:
        return Reduction("concrete strength", "psi_c", APPLIES, f"f_c = {row.f_c:,g} psi, below 6,000 psi ({clause})")
    return Reduction("concrete strength", "psi_c", DOES_NOT, f"f_c = {row.f_c:,g} psi, 6,000 psi or more ({clause})")


# Compression


def _compression(row: TerminationLike) -> Reduction:
    lap = row.kind == "lap compression"
    clause = "10.7.5.2.1" if lap else "Table 25.4.9.3"
    what = "column ties of 0.0015 h s or a spiral" if lap else "a spiral or close ties"
    if row.spiral:
        return Reduction(what, "" if lap else "psi_r", APPLIES, f"spiral, as scheduled ({clause})")
    return _ties(row, what, "" if lap else "psi_r", clause)
