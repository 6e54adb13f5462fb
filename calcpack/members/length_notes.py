"""Notes of the development and lap schedule: why a cell holds no length, and what the lengths hold for."""

from __future__ import annotations

from collections.abc import Iterator, Sequence

from calcpack.aci318 import laps
from calcpack.aci318.editions import Edition
from calcpack.errors import InputError, Problem
from calcpack.members.length_basis import Basis, EndConditions, Strengths

__all__ = ["NoteList", "assumptions", "dash", "decimals", "table_title"]

_KIND_WORDS = {
    "straight tension": "Straight bars in tension",
    "hook 90": "Hooks",
    "hook 180": "Hooks",
    "headed": "Headed bars",
    "straight compression": "Bars in compression",
    "lap tension": "Tension laps",
    "lap compression": "Compression laps",
}
_COATING_WORDS = {
    "none": "uncoated bars",
    "epoxy": "epoxy-coated bars",
    "zinc": "zinc-coated bars",
    "dual": "zinc and epoxy dual-coated bars",
}


class NoteList:
    """Numbered notes, the same words under one number; mutable, as tables find them while they are worked."""

    def __init__(self) -> None:
        self.texts: list[str] = []

    def numbers(self, kind: str, error: InputError) -> tuple[int, ...]:
        """The numbers of the notes that say why a kind of end has no length."""
        return tuple(dict.fromkeys(self._number(_refusal(kind, problem)) for problem in error.problems))

    def _number(self, text: str) -> int:
        if text not in self.texts:
            self.texts.append(text)
        return self.texts.index(text) + 1


def _refusal(kind: str, problem: Problem) -> str:
    symbol, _, _ = problem.given.partition(" = ")
    what = "" if symbol == "bar" else f"{symbol} "
    return f"{_KIND_WORDS[kind]}: {what}{problem.allowed}."


_RAISED = str.maketrans("0123456789", "⁰¹²³⁴⁵⁶⁷⁸⁹")


def dash(notes: Sequence[int]) -> str:
    """A cell without a length, with the numbers of the notes that say why.

    >>> dash((1,)), dash((2, 13))
    ('–¹', '–² ¹³')
    """
    return "–" + " ".join(str(number).translate(_RAISED) for number in notes)


def decimals(increment: float) -> int:
    """Decimals that multiples of an increment need.

    >>> decimals(1.0), decimals(0.5), decimals(0.25), decimals(1.75)
    (0, 1, 2, 2)
    """
    return 0 if increment % 1 == 0 else 1 if increment % 0.5 == 0 else 2


def table_title(strengths: Strengths) -> str:
    """What one table is for: ``f'c = 4,000 psi, Grade 60, uncoated bars``."""
    concrete = "" if strengths.lamb == 1 else f", lightweight concrete, λ = {strengths.lamb:g}"
    grade = f"Grade {strengths.f_y / 1000:g}"
    return f"f′c = {strengths.f_c:,g} psi{concrete}, {grade}, {_COATING_WORDS[strengths.coating]}"


def assumptions(tables: Sequence[Strengths], basis: Basis, edition: Edition) -> tuple[str, ...]:
    """What the lengths hold for, a sentence or two each, in the order of the columns."""
    return tuple(
        text
        for part in (
            _general(basis, edition), _straight(tables, basis, edition), _hooks(basis.hooks, edition),
            _heads(basis.heads, edition), _compression(basis), _laps(edition),
        )
        for text in part
    )  # fmt: skip


def _general(basis: Basis, edition: Edition) -> Iterator[str]:
    yield (
        "Symbols: l_d straight bars in tension, l_dh hooks, l_dt headed bars, l_dc bars in compression, l_st tension "
        "laps of class A and B, l_sc compression laps."
    )
    yield (
        f"Lengths by {edition.name}, minima included, each rounded up to the next multiple of {basis.increment:g} in; "
        "an excess of a billionth counts as none."
    )
    yield (
        "They develop f_y: no reduction for excess reinforcement, no bundled bars, no special seismic system "
        "(25.4.10, 25.6, chapter 18)."
    )
    yield "Top: horizontal bars with more than 12 in of fresh concrete cast below them; other: all other bars."


def _straight(tables: Sequence[Strengths], basis: Basis, edition: Edition) -> Iterator[str]:
    standard = edition.standard
    table = edition.straight_tension_spaced.clause(standard).number
    cover = f"clear cover of {basis.clear_cover} or more and clear spacing of {basis.clear_spacing} or more"
    if basis.clear_cover is None:
        yield f"Straight bars and laps in tension: {table}, other cases; they hold for any permitted cover and spacing."
    elif basis.general:
        clause = edition.straight_tension.clause(standard).number
        yield f"Straight bars and laps in tension: equation {clause} with K_tr = 0, for {cover}."
    else:
        yield (
            f"Straight bars and laps in tension: {table}, for {cover}; the first row of the table where these reach "
            "d_b and 2 d_b, else its other cases."
        )
    if any(one.coating in ("epoxy", "dual") for one in tables):
        yield (
            "Epoxy and dual coating: psi_e = 1.2 where cover reaches 3 d_b and clear spacing 6 d_b by what is stated "
            "here, else 1.5; hooks and heads 1.2."
        )
    if edition.close_bars_need_ties and any(one.f_y >= 80_000 for one in tables):
        yield (
            "Grade 80 and above: bars in tension stand 6 in or more from centre to centre; closer bars need K_tr of "
            f"0.5 d_b or more ({laps.lap_close_bars.clause(standard).number}, 25.4.2.2)."
        )


def _hooks(ends: EndConditions, edition: Edition) -> Iterator[str]:
    ties = (
        "ties or stirrups at 3 d_b or closer"
        if edition.hook_by_cover
        else "ties or stirrups of A_th = 0.4 A_hs or more"
    )
    counted = edition.hook_by_cover and ends.tail_cover is not None
    tail = f", cover of {ends.tail_cover} or more on the extension of a 90° hook" if counted else ""
    yield f"Standard hooks (25.3.1, 25.4.3): {_side(ends)}{tail}; {_confinement(ends, ties)}{_core(ends, edition)}."


def _heads(ends: EndConditions, edition: Edition) -> Iterator[str]:
    cover = "clear cover of 2 d_b or more"
    spacing = f"bars {edition.head_spacing(d_b=1.0):g} d_b or more from centre to centre"
    if edition.hook_by_cover:
        counted = ""
    else:
        ties = "parallel ties of A_tt = 0.3 A_hs or more"
        counted = f"; {_side(ends)}; {_confinement(ends, ties)}{_core(ends, edition)}"
    yield (
        f"Headed bars (25.4.4): net bearing area of the head 4 A_b or more, {cover}, {spacing}, "
        f"normalweight concrete{counted}."
    )


def _side(ends: EndConditions) -> str:
    return f"side cover of {ends.side_cover} or more" if ends.side_cover else "no side cover counted"


def _confinement(ends: EndConditions, ties: str) -> str:
    return f"in {ties}, up to #11" if ends.ties else "no confining ties counted"


def _core(ends: EndConditions, edition: Edition) -> str:
    if edition.hook_by_cover:
        return ""
    return ", ends inside a column core" if ends.in_column_core else ", ends not inside a column core"


def _compression(basis: Basis) -> Iterator[str]:
    ties = "inside a spiral or close ties (25.4.9.3)" if basis.confined else "no spiral or close ties counted"
    lap = "in column ties of 0.0015 h s or more" if basis.lap_ties else "no reduction for column ties or spiral"
    yield f"Compression: straight bars, {ties}; hooks do not count. Laps: {lap} (10.7.5.2.1)."


def _laps(edition: Edition) -> Iterator[str]:
    table = laps.lap_class_a.clause(edition.standard).number
    yield (
        f"Tension laps ({table}): class A where at least twice the area required is provided and at most half of the "
        "bars are spliced within the lap length, else class B. Bars of different sizes: the larger of l_d of the "
        "larger bar and l_st of the smaller (25.5.2.2)."
    )
