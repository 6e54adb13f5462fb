"""The equivalent rectangular stress block, ACI 318 22.2.2.4, and what it cuts from a section.

The neutral axis has a depth c from the extreme compression fibre, measured along the direction (u_x, u_y) that points
from the centroid to the compressed face.
"""

from __future__ import annotations

from math import acos, cos, sin

from calcpack.aci318.limits import CONCRETE
from calcpack.aci318.standards import ACI_318_14, ACI_318_19
from calcpack.formula import Clause, formula, psi
from calcpack.units import Angle, Area, Force, Length, Moment, Ratio, Stress, Volume

__all__ = [
    "arc_half_angle",
    "area_circular",
    "area_polygon",
    "area_x",
    "area_y",
    "beta_1",
    "block_depth",
    "block_edge",
    "centroid_segment",
    "centroid_x",
    "centroid_x_polygon",
    "centroid_x_segment",
    "centroid_y",
    "centroid_y_polygon",
    "centroid_y_segment",
    "concrete_force",
    "cross_product",
    "direction_x",
    "direction_y",
    "extreme_fibre_circular",
    "extreme_fibre_rectangular",
    "extreme_fibre_x",
    "extreme_fibre_y",
    "moment_of_vertex_x",
    "moment_of_vertex_y",
    "side_x",
    "side_y",
]

_BLOCK = (ACI_318_14("22.2.2.4.1"), ACI_318_19("22.2.2.4.1"))
_GEOMETRY = Clause("geometry of the section")


@formula(ACI_318_14("Table 22.2.2.4.3"), ACI_318_19("Table 22.2.2.4.3"), limits=(CONCRETE,))
def beta_1(*, f_c: Stress) -> Ratio:
    """Depth of the equivalent rectangular block over depth of the neutral axis.

    >>> beta_1(f_c=4_000.0), round(beta_1(f_c=6_000.0), 10), beta_1(f_c=9_000.0)
    (0.85, 0.75, 0.65)
    """
    if f_c <= 4000 * psi:
        beta_1 = 0.85
    elif f_c < 8000 * psi:
        beta_1 = 0.85 - 0.05 * (f_c - 4000 * psi) / (1000 * psi)
    else:
        beta_1 = 0.65
    return beta_1


@formula(*_BLOCK)
def block_depth(*, beta_1: Ratio, c: Length) -> Length:
    """Depth of the equivalent rectangular block."""
    a = beta_1 * c
    return a


@formula(_GEOMETRY)
def direction_x(*, theta: Angle) -> Ratio:
    """Direction of the compressed face, its share along x."""
    u_x = cos(theta)
    return u_x


@formula(_GEOMETRY)
def direction_y(*, theta: Angle) -> Ratio:
    """Direction of the compressed face, its share along y."""
    u_y = sin(theta)
    return u_y


@formula(_GEOMETRY)
def side_x(*, M_uy: Moment) -> Ratio:
    """Side of the compressed face where bending is about y alone: 1 towards +x, -1 towards -x."""
    u_x = M_uy / abs(M_uy)
    return u_x


@formula(_GEOMETRY)
def side_y(*, M_ux: Moment) -> Ratio:
    """Side of the compressed face where bending is about x alone: 1 towards +y, -1 towards -y."""
    u_y = M_ux / abs(M_ux)
    return u_y


@formula(_GEOMETRY)
def extreme_fibre_x(*, h: Length) -> Length:
    """Distance of the extreme compression fibre from the centroid, bending about x alone."""
    h_u = h / 2
    return h_u


@formula(_GEOMETRY)
def extreme_fibre_y(*, b: Length) -> Length:
    """Distance of the extreme compression fibre from the centroid, bending about y alone."""
    h_u = b / 2
    return h_u


@formula(_GEOMETRY)
def extreme_fibre_rectangular(*, b: Length, h: Length, u_x: Ratio, u_y: Ratio) -> Length:
    """Distance of the extreme compression fibre from the centroid of a rectangle."""
    h_u = b / 2 * abs(u_x) + h / 2 * abs(u_y)
    return h_u


@formula(_GEOMETRY)
def extreme_fibre_circular(*, h: Length) -> Length:
    """Distance of the extreme compression fibre from the centre of a circle."""
    h_u = h / 2
    return h_u


@formula(_GEOMETRY)
def block_edge(*, h_u: Length, a: Length) -> Length:
    """Distance of the edge of the block from the centroid, along the direction of the compressed face."""
    q = h_u - a
    return q


# A block whose edge is parallel to a face, a skew one by its vertices, and one in a circle.


@formula(_GEOMETRY)
def area_x(*, a: Length, b: Length, h: Length) -> Area:
    """Area of a block whose edge is parallel to x."""
    A_c = min(a, h) * b
    return A_c


@formula(_GEOMETRY)
def area_y(*, a: Length, b: Length, h: Length) -> Area:
    """Area of a block whose edge is parallel to y."""
    A_c = min(a, b) * h
    return A_c


@formula(_GEOMETRY)
def centroid_x(*, u_x: Ratio, a: Length, b: Length) -> Length:
    """Centroid of a block whose edge is parallel to y."""
    x_c = u_x * (b - min(a, b)) / 2
    return x_c


@formula(_GEOMETRY)
def centroid_y(*, u_y: Ratio, a: Length, h: Length) -> Length:
    """Centroid of a block whose edge is parallel to x."""
    y_c = u_y * (h - min(a, h)) / 2
    return y_c


@formula(_GEOMETRY)
def cross_product(*, x: Length, y: Length, x_before: Length, y_before: Length) -> Area:
    """Twice the area between a side of the block and the centroid, from the vertex before to this one."""
    A_j = x_before * y - x * y_before
    return A_j


@formula(_GEOMETRY)
def moment_of_vertex_x(*, A_j: Area, x: Length, x_before: Length) -> Volume:
    """Six times the first moment about y of that triangle."""
    S_jx = A_j * (x_before + x)
    return S_jx


@formula(_GEOMETRY)
def moment_of_vertex_y(*, A_j: Area, y: Length, y_before: Length) -> Volume:
    """Six times the first moment about x of that triangle."""
    S_jy = A_j * (y_before + y)
    return S_jy


@formula(_GEOMETRY)
def area_polygon(*, A_j_sum: Area) -> Area:
    """Area of the block, from its vertices counterclockwise."""
    A_c = A_j_sum / 2
    return A_c


@formula(_GEOMETRY)
def centroid_x_polygon(*, S_jx_sum: Volume, A_c: Area) -> Length:
    """Centroid of the block along x."""
    x_c = S_jx_sum / (6 * A_c)
    return x_c


@formula(_GEOMETRY)
def centroid_y_polygon(*, S_jy_sum: Volume, A_c: Area) -> Length:
    """Centroid of the block along y."""
    y_c = S_jy_sum / (6 * A_c)
    return y_c


@formula(_GEOMETRY)
def arc_half_angle(*, a: Length, h: Length) -> Ratio:
    """Half the angle of the arc that bounds the block, in radians."""
    omega = acos(max((h / 2 - a) / (h / 2), -1))
    return omega


@formula(_GEOMETRY)
def area_circular(*, h: Length, omega: Ratio) -> Area:
    """Area of a block in a circle, a segment; the angle in radians."""
    A_c = (h / 2) ** 2 * (omega - sin(omega) * cos(omega))
    return A_c


@formula(_GEOMETRY)
def centroid_segment(*, h: Length, omega: Ratio, A_c: Area) -> Length:
    """Distance of the centroid of the segment from the centre; the angle in radians."""
    u_c = 2 / 3 * (h / 2) ** 3 * sin(omega) ** 3 / A_c
    return u_c


@formula(_GEOMETRY)
def centroid_x_segment(*, u_c: Length, u_x: Ratio) -> Length:
    """Centroid of the segment along x."""
    x_c = u_c * u_x
    return x_c


@formula(_GEOMETRY)
def centroid_y_segment(*, u_c: Length, u_y: Ratio) -> Length:
    """Centroid of the segment along y."""
    y_c = u_c * u_y
    return y_c


@formula(*_BLOCK)
def concrete_force(*, f_c: Stress, A_c: Area) -> Force:
    """Compression in the concrete, bars not deducted yet."""
    C_c = 0.85 * f_c * A_c
    return C_c
