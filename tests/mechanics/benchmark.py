"""How fast the ratios of a whole schedule are: 500 columns by 200 combinations of biaxial bending, on one core.

Run by hand: ``python tests/mechanics/benchmark.py``. The plain search beside it takes one load at a time over the same
section code, from a coarse grid of neutral axes to scipy's root finder, for a sample of the loads.
"""

from __future__ import annotations

import platform
import resource
import sys
from dataclasses import dataclass
from time import perf_counter

import numpy as np
from mechanics_samples import around, random_loads, ring
from scipy.optimize import root

from calcpack.mechanics import Section, Surface, circle, nominal, rectangle, rule_318_19
from calcpack.mechanics.targets import scale_of


@dataclass(frozen=True)
class Timing:
    """What a run took and found."""

    seconds: float
    loads: int
    ratios: list[np.ndarray]


def schedule(count: int, seed: int = 1) -> list[Section]:
    """Columns as a building has them: 12 to 36 in, 4 to 16 bars, one in five round."""
    rng = np.random.default_rng(seed)
    return [_column(rng) for _ in range(count)]


def _column(rng: np.random.Generator) -> Section:
    materials = {"f_c": float(rng.choice([4000, 5000, 6000, 8000])), "f_y": float(rng.choice([60_000, 80_000]))}
    b, h = 2.0 * rng.integers(6, 19, 2)
    if rng.random() < 0.2:
        return circle(max(b, 16), ring(max(b, 16) / 2 - 2.75, int(rng.integers(6, 13)), 0.79), **materials)
    n_x, n_y = rng.integers(2, 6, 2)
    return rectangle(b, h, around(b, h, int(n_x), int(n_y), float(rng.choice([0.79, 1.0, 1.27]))), **materials)


def combinations(section: Section, count: int, seed: int) -> np.ndarray:
    """Factored loads in all directions, from some tension to beyond the compression strength."""
    P, Mx, My = random_loads(section, count, seed)
    return np.stack([np.where(P < 0, 0.2 * P, P), Mx / 2, My / 2])


def run(columns: int, loads: int, every_moment_ratio: bool = False) -> Timing:
    """Ratios and governing cases; the moment ratio of the governing case, or of every one."""
    sections = schedule(columns)
    given = [combinations(section, loads, place) for place, section in enumerate(sections)]
    ratios = []
    start = perf_counter()
    for section, forces in zip(sections, given, strict=True):
        design = Surface(section, rule_318_19(f_y=section.f_y, spiral=False))
        checked = design.check(*forces)
        design.moment_ratio(*(forces if every_moment_ratio else forces[:, checked.governing]))
        ratios.append(checked.ratio)
    return Timing(perf_counter() - start, columns * loads, ratios)


def run_plain(columns: int, loads: int, sample: int) -> tuple[float, float]:
    """Seconds a load of a plain search, and its largest difference from the surface's ratios, in per cent."""
    quick = run(columns, loads)
    seconds, worst, count = 0.0, 0.0, 0
    for place, section in enumerate(schedule(columns)):
        forces = combinations(section, loads, place)
        for which in range(sample):
            start = perf_counter()
            ratio = plain_ratio(section, forces[:, which])
            seconds, count = seconds + perf_counter() - start, count + 1
            worst = max(worst, 100 * abs(ratio / quick.ratios[place][which] - 1))
    return seconds / count, worst


def plain_ratio(section: Section, forces: np.ndarray) -> float:
    """One load: the best of a grid of neutral axes, then a root search, from several starts; the smallest strength."""
    rule, scale = rule_318_19(f_y=section.f_y, spiral=False), scale_of(section)[:, 0]
    wanted = forces / scale
    length = np.linalg.norm(wanted)
    wanted /= length

    def strength(at: np.ndarray) -> np.ndarray:
        point = nominal(section, at[0], np.exp(at[1]))
        return np.array([point.P[0], point.Mx[0], point.My[0]]) / scale

    def off(at: np.ndarray) -> np.ndarray:
        found = strength(at)
        return (found - (found @ wanted) * wanted)[np.argsort(np.abs(wanted))[:2]]

    grid = [(theta, depth) for theta in np.arange(24) * np.pi / 12 for depth in np.log(np.geomspace(1, 80, 12))]
    apart = [_apart(strength(np.array(at)), wanted) for at in grid]
    strengths = []
    for start in np.argsort(apart)[:6]:
        solution = root(off, grid[start], tol=1e-10)
        along = strength(solution.x) @ wanted
        if np.abs(off(solution.x)).max() < 1e-8 and along > 0:
            strengths.append(along * float(rule.phi(nominal(section, solution.x[0], np.exp(solution.x[1])).eps_t)[0]))
    cap = forces[0] / (rule.phi_c * rule.alpha * section.P_o)
    return max(cap, length / min(strengths)) if strengths else cap


def _apart(found: np.ndarray, wanted: np.ndarray) -> float:
    return -float(found @ wanted / np.linalg.norm(found))


def main(columns: int = 500, loads: int = 200) -> None:
    """Print the timings."""
    print(f"Python {platform.python_version()}, NumPy {np.__version__}, {platform.machine()}")
    one, every = run(columns, loads), run(columns, loads, every_moment_ratio=True)
    per_load = one.seconds / one.loads
    print(f"{columns} columns x {loads} loads, ratios and governing cases: {one.seconds:.2f} s")
    print(f"the same with the ratio at constant P of every load: {every.seconds:.2f} s")
    for count in (50, 200, 1000, 5000):
        timing = run(10, count)
        print(f"  10 columns x {count} loads: {timing.seconds / timing.loads * 1e6:.0f} us a load")
    plain, worst = run_plain(20, loads, 2)
    print(f"plain search: {plain * 1e3:.1f} ms a load, {plain / per_load:.0f} times slower, difference {worst:.4f} %")
    print(f"peak memory {resource.getrusage(resource.RUSAGE_SELF).ru_maxrss / 1024:.0f} MB")


if __name__ == "__main__":
    main(*map(int, sys.argv[1:]))
