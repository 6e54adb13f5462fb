"""The rows of a job's tables as records, in inch, pound and psi, each knowing the row it was read from."""

from __future__ import annotations

from dataclasses import dataclass

from calcpack.job.bars import BarLayout, Transverse

__all__ = ["ColumnRow", "ForceRow", "StoryRow", "Termination"]


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
    """A place where a bar is developed, hooked, headed or spliced; lengths in, stresses psi, areas in^2, forces lb.

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
    bundle: int
    spliced: float | None
    other_bar: int | None
    bar_stress: float | None
    spiral: bool
    M_n: float | None
    V_u: float | None
    l_a: float | None
    confined_reaction: bool
    joint: str
    excess_exclusion: str
    member: str
    location: str
    source: str
    row: int
    file: str


@dataclass(frozen=True)
class ColumnRow(_Placed):
    """A column of the schedule; lengths in, stresses psi. A circular one has no `b`, and `h` is its diameter.

    `l_u` is ``None`` where only the section is checked; ``None`` elsewhere is what the table leaves empty. `psi` are
    the stiffnesses of columns over those of beams at the ends, `legs` the legs of ties parallel to an axis.
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
    k_x: float | None
    k_y: float | None
    frame: str | None
    lamb: float
    aggregate: float | None
    psi_x_bottom: float | None
    psi_x_top: float | None
    psi_y_bottom: float | None
    psi_y_top: float | None
    beta_dns: float | None
    delta_s: float | None
    story: str
    seismic: str
    legs_x: int
    legs_y: int
    legs_stated: bool
    ties_beyond: Transverse | None
    group: str
    source: str
    row: int
    file: str


@dataclass(frozen=True)
class StoryRow(_Placed):
    """A story of a sway frame in one combination, or in every one where `combination` is empty; lb and in."""

    story: str
    combination: str
    sum_P_u: float
    V_us: float
    Delta_o: float
    l_c: float
    sum_P_c: float | None
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
    case: str
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
