"""The rows of a job's tables as records, in inch, pound and psi, each knowing the row it was read from."""

from __future__ import annotations

from dataclasses import dataclass

from calcpack.job.bars import BarLayout, Transverse

__all__ = ["ColumnRow", "ForceRow", "Termination"]


class _Placed:
    """A record that knows its row."""

    file: str
    row: int

    @property
    def where(self) -> str:
        """The place it was read from: ``inputs/anchorage.csv, row 14``."""
        return f"{self.file}, row {self.row}"


@dataclass(frozen=True)
class Termination(_Placed):
    """A place where a bar is developed, hooked, headed or spliced; lengths in, stresses psi, areas in^2.

    `bar` is the bar number, `bar_text` its size as written; ``None`` is what the table left empty.
    """

    mark: str
    kind: str
    bar: int
    bar_text: str
    f_c: float
    f_y: float
    lamb: float
    top: bool
    coating: str
    c_b: float | None
    clear_cover: float | None
    clear_spacing: float | None
    spacing: float | None
    K_tr: float
    side_cover: float | None
    tail_cover: float | None
    confining_ties: bool
    in_column_core: bool
    A_s_required: float | None
    A_s_provided: float | None
    lap_class: str | None
    available: float | None
    member: str
    location: str
    source: str
    row: int
    file: str


@dataclass(frozen=True)
class ColumnRow(_Placed):
    """A column of the schedule; lengths in, stresses psi. A circular one has no `b`, and `h` is its diameter.

    `l_u` is ``None`` where only the section is checked; `frame` where the table does not say.
    """

    mark: str
    shape: str
    b: float | None
    h: float
    bars: BarLayout
    ties: Transverse
    cover: float
    f_c: float
    f_y: float
    f_yt: float | None
    l_u: float | None
    k_x: float
    k_y: float
    frame: str | None
    lamb: float
    aggregate: float | None
    source: str
    row: int
    file: str


@dataclass(frozen=True)
class ForceRow(_Placed):
    """Forces of a member; lb and lb*in, compression positive.

    Factored where `combination` names the combination, unfactored where `load` names the load. A moment is given
    as one value, or by its two ends: what is not given is ``None``.
    """

    mark: str
    combination: str | None
    load: str | None
    P: float
    Mx: float | None
    My: float | None
    Mx_bottom: float | None
    Mx_top: float | None
    My_bottom: float | None
    My_top: float | None
    Vx: float
    Vy: float
    T: float
    row: int
    file: str
