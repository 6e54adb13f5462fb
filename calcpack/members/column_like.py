"""What the checks of columns ask of a row of the column schedule, of forces and of stories."""

from __future__ import annotations

from typing import Protocol

__all__ = ["BarsLike", "ColumnLike", "ForceLike", "StoryLike", "TiesLike"]


class BarsLike(Protocol):
    """The longitudinal bars of a column."""

    @property
    def count(self) -> int:
        """How many."""
        ...

    @property
    def size(self) -> int:
        """Designation number."""
        ...

    @property
    def n_x(self) -> int | None:
        """Along each face parallel to x, corners included; None on a circle."""
        ...

    @property
    def n_y(self) -> int | None:
        """Along each face parallel to y, corners included; None on a circle."""
        ...


class TiesLike(Protocol):
    """The ties or the spiral of a column."""

    @property
    def kind(self) -> str:
        """``ties`` or ``spiral``."""
        ...

    @property
    def size(self) -> int:
        """Designation number."""
        ...

    @property
    def spacing(self) -> float:
        """Centre to centre, or pitch, in."""
        ...


class ColumnLike(Protocol):
    """A column of the schedule, in coherent units."""

    @property
    def mark(self) -> str:
        """Mark of the column."""
        ...

    @property
    def b(self) -> float | None:
        """Width along x, in; None in a circular column."""
        ...

    @property
    def h(self) -> float:
        """Depth along y, or diameter, in."""
        ...

    @property
    def bars(self) -> BarsLike:
        """Longitudinal bars."""
        ...

    @property
    def ties(self) -> TiesLike:
        """Ties or spiral."""
        ...

    @property
    def cover(self) -> float:
        """Clear, to ties or spiral, in."""
        ...

    @property
    def f_c(self) -> float:
        """In psi."""
        ...

    @property
    def f_y(self) -> float:
        """In psi."""
        ...

    @property
    def f_yt(self) -> float | None:
        """In psi; None where it is f_y."""
        ...

    @property
    def aggregate(self) -> float | None:
        """Nominal maximum size, in."""
        ...

    @property
    def l_u(self) -> float | None:
        """Unsupported length, in."""
        ...

    @property
    def k_x(self) -> float | None:
        """Effective length factor for bending about x; None where it is not stated."""
        ...

    @property
    def k_y(self) -> float | None:
        """Effective length factor for bending about y; None where it is not stated."""
        ...

    @property
    def frame(self) -> str | None:
        """``nonsway``, ``sway``, or None where it is not stated."""
        ...

    @property
    def lamb(self) -> float:
        """Factor for lightweight concrete."""
        ...

    @property
    def psi_x_bottom(self) -> float | None:
        """Stiffness of columns over that of beams at the bottom, for bending about x."""
        ...

    @property
    def psi_x_top(self) -> float | None:
        """The same at the top."""
        ...

    @property
    def psi_y_bottom(self) -> float | None:
        """The same at the bottom, for bending about y."""
        ...

    @property
    def psi_y_top(self) -> float | None:
        """The same at the top, for bending about y."""
        ...

    @property
    def beta_dns(self) -> float | None:
        """Sustained share of the factored axial force."""
        ...

    @property
    def delta_s(self) -> float | None:
        """Sway moment magnifier from an analysis of the frame."""
        ...

    @property
    def story(self) -> str:
        """Name of its story; may be empty."""
        ...

    @property
    def seismic(self) -> str:
        """``special`` in a special moment frame, else ``none``."""
        ...

    @property
    def legs_x(self) -> int:
        """Legs of ties parallel to x, hoops and crossties together."""
        ...

    @property
    def legs_y(self) -> int:
        """Legs of ties parallel to y."""
        ...

    @property
    def legs_stated(self) -> bool:
        """Whether the row states legs; where it does not, crossties may be on the drawing all the same."""
        ...

    @property
    def ties_beyond(self) -> TiesLike | None:
        """Ties outside the length l_o of a column of a special moment frame."""
        ...

    @property
    def group(self) -> str:
        """Group of columns that are shown by one; may be empty."""
        ...

    @property
    def source(self) -> str:
        """Drawing and revision that the row states; may be empty."""
        ...

    @property
    def file(self) -> str:
        """Where the row stands."""
        ...

    @property
    def row(self) -> int:
        """Its number in the file."""
        ...


class ForceLike(Protocol):
    """Factored forces of one combination, in lb and lb*in, compression positive."""

    @property
    def combination(self) -> str | None:
        """Name of the combination."""
        ...

    @property
    def P(self) -> float:
        """Axial force."""
        ...

    @property
    def Mx(self) -> float | None:
        """Moment about x; None where it is given by its ends."""
        ...

    @property
    def My(self) -> float | None:
        """Moment about y; None where it is given by its ends."""
        ...

    @property
    def Mx_bottom(self) -> float | None:
        """Moment about x at the bottom; None where one moment is given. Equal signs are single curvature."""
        ...

    @property
    def Mx_top(self) -> float | None:
        """Moment about x at the top."""
        ...

    @property
    def My_bottom(self) -> float | None:
        """Moment about y at the bottom."""
        ...

    @property
    def My_top(self) -> float | None:
        """Moment about y at the top."""
        ...

    @property
    def Vx(self) -> float:
        """Shear along x."""
        ...

    @property
    def Vy(self) -> float:
        """Shear along y."""
        ...

    @property
    def T(self) -> float:
        """Torsion."""
        ...

    @property
    def file(self) -> str:
        """Where the row stands."""
        ...

    @property
    def row(self) -> int:
        """Its number in the file."""
        ...


class StoryLike(Protocol):
    """A story of a sway frame, lb and in."""

    @property
    def story(self) -> str:
        """Its name."""
        ...

    @property
    def combination(self) -> str:
        """The combination it is stated for; empty for every one."""
        ...

    @property
    def sum_P_u(self) -> float:
        """Total factored vertical load."""
        ...

    @property
    def V_us(self) -> float:
        """Factored horizontal story shear."""
        ...

    @property
    def Delta_o(self) -> float:
        """First-order lateral deflection of the story due to V_us."""
        ...

    @property
    def l_c(self) -> float:
        """Story height, centre to centre of joints."""
        ...

    @property
    def sum_P_c(self) -> float | None:
        """Total critical load of the columns that resist sway."""
        ...

    @property
    def source(self) -> str:
        """Report and revision that the row states; may be empty."""
        ...

    @property
    def file(self) -> str:
        """Where the row stands."""
        ...

    @property
    def row(self) -> int:
        """Its number in the file."""
        ...
