"""The equivalent rectangular stress block: what a line cuts from the concrete, exactly, for many lines at once.

A direction theta points from the centroid towards the compressed face, counterclockwise from +x. Along it runs u,
square to it v, both from the centroid. The block is the part of the section beyond the line u = q. Arrays have one
column a line.
"""

from __future__ import annotations

from dataclasses import dataclass

import numpy as np

from calcpack.mechanics.outlines import Floats
from calcpack.mechanics.section import Section

__all__ = ["Block", "Frame", "block", "compression_block", "frame"]


@dataclass(frozen=True)
class Frame:
    """A section seen along directions theta.

    Attributes
    ----------
    n_x, n_y : unit vector of u; that of v is (-n_y, n_x)
    u, v : vertices of the loops, (vertices, n); empty for a circle
    h, h_slope : u of the extreme compression fibre, and its change with theta
    depth : of the section along u
    """

    theta: Floats
    n_x: Floats
    n_y: Floats
    u: Floats
    v: Floats
    h: Floats
    h_slope: Floats
    depth: Floats


@dataclass(frozen=True)
class Block:
    """Area of the block and its first moments about the centroid, and moments of the chord that bounds it.

    Attributes
    ----------
    area, S_u, S_v : integrals of 1, u and v over the block
    chord, chord_v, chord_vv : integrals of 1, v and v^2 along the line: how the block changes as it moves and turns
    """

    area: Floats
    S_u: Floats
    S_v: Floats
    chord: Floats
    chord_v: Floats
    chord_vv: Floats


def frame(section: Section, theta: Floats) -> Frame:
    """The section seen along directions theta (n,)."""
    n_x, n_y = _exact(np.cos(theta)), _exact(np.sin(theta))
    if section.diameter is not None:
        radius = np.full(theta.shape, section.diameter / 2)
        none = np.empty((0, *theta.shape))
        return Frame(theta, n_x, n_y, none, none, radius, np.zeros(theta.shape), 2 * radius)
    x, y = section.edges[0].T[..., None]
    u, v = x * n_x + y * n_y, y * n_x - x * n_y
    extreme = u.argmax(axis=0)
    lines = np.arange(theta.size)
    h = u[extreme, lines]
    return Frame(theta, n_x, n_y, u, v, h, v[extreme, lines], h - u.min(axis=0))


def _exact(component: Floats) -> Floats:
    # A quarter turn has components 0 and 1, so that rows of bars parallel to a face enter the block together.
    return np.where(np.abs(component) < 1e-15, 0.0, component)


def block(section: Section, seen: Frame, q: Floats) -> Block:
    """The block beyond u = q (n,)."""
    return _segment(seen, q) if section.diameter is not None else _clipped(section, seen, q)


def compression_block(section: Section, theta: Floats, a: Floats) -> tuple[Floats, Floats, Floats]:
    """Area and first moments about y and x (integrals of x and of y), in^2 and in^3, of a block of depth a."""
    seen = frame(section, theta)
    cut = block(section, seen, seen.h - np.minimum(a, 1.5 * seen.depth))
    return cut.area, cut.S_u * seen.n_x - cut.S_v * seen.n_y, cut.S_u * seen.n_y + cut.S_v * seen.n_x


def _segment(seen: Frame, q: Floats) -> Block:
    radius = seen.h
    cosine = np.clip(q / radius, -1.0, 1.0)
    sine = np.sqrt((1 - cosine) * (1 + cosine))
    zero = np.zeros(q.shape)
    area = radius**2 * (np.arccos(cosine) - sine * cosine)
    half = radius * sine
    return Block(area, 2 / 3 * half**3, zero, 2 * half, zero, 2 / 3 * half**3)


def _clipped(section: Section, seen: Frame, q: Floats) -> Block:
    """By Green's theorem over the sides beyond the line; on the line itself u - q is 0, so the chord adds nothing."""
    after = section.following
    u_0, v_0 = seen.u - q, seen.v
    u_1, v_1 = u_0[after], v_0[after]
    rise = u_1 - u_0
    slope = np.divide(v_1 - v_0, rise, out=np.zeros_like(rise), where=(u_0 > 0) != (u_1 > 0))
    on_line = v_0 - u_0 * slope
    a = np.where(u_0 > 0, v_0, np.where(u_1 > 0, on_line, 0.0))
    b = np.where(u_1 > 0, v_1, np.where(u_0 > 0, on_line, 0.0))
    u_a, u_b = np.maximum(u_0, 0.0), np.maximum(u_1, 0.0)
    run = b - a
    area = (run * (u_a + u_b)).sum(axis=0) / 2
    S_u = (run * (u_a * u_a + u_a * u_b + u_b * u_b)).sum(axis=0) / 6
    S_v = (run * (u_a * (2 * a + b) + u_b * (2 * b + a))).sum(axis=0) / 6
    squares = a * a + a * b + b * b
    chord_v, chord_vv = (run * (a + b)).sum(axis=0) / 2, (run * squares).sum(axis=0) / 3
    return Block(area, S_u + q * area, S_v, run.sum(axis=0), chord_v, chord_vv)
