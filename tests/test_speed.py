"""How fast the spine is. Bounds are wide, for noisy machines; the measured numbers are printed with ``-s``."""

from __future__ import annotations

import re
import subprocess
import sys
import time
from collections.abc import Callable
from math import sqrt

import pytest

from calcpack.formula import Limit, formula
from calcpack.ledger import Entry, Ledger, replay
from calcpack.typeset.emit import MATHML, TYPST, Target
from calcpack.typeset.line import Origin, PrintedLine, printed_lines
from calcpack.typeset.rows import equation
from calcpack.typeset.store import LayoutStore
from calcpack.units import Length, Ratio, Stress


@formula(
    "25.4.2.4a",
    empirical=True,
    limits=(Limit("f_c", "19.2.1.1", low=2500), Limit("lamb", "19.2.4", low=0.75, high=1.0)),
)
def tension(
    *, f_y: Stress, f_c: Stress, lamb: Ratio, psi_t: Ratio, psi_s: Ratio, c_b: Length, K_tr: Length, d_b: Length
) -> Length:
    """A formula of the usual size."""
    psi_te = min(psi_t * 1.0, 1.7)
    confinement = min((c_b + K_tr) / d_b, 2.5)
    l_d = 3 / 40 * f_y / (lamb * min(sqrt(f_c), 100)) * psi_te * psi_s / confinement * d_b
    return l_d


VALUES = {"f_y": 6e4, "f_c": 4e3, "lamb": 1.0, "psi_t": 1.3, "psi_s": 0.8, "c_b": 2.4, "K_tr": 0.3, "d_b": 1.0}


def best(action: Callable[[], object], times: int, rounds: int = 7) -> float:
    """Seconds of one action: the best of several rounds, which noise can only lengthen."""
    found = []
    for _ in range(rounds):
        start = time.perf_counter()
        for _ in range(times):
            action()
        found.append((time.perf_counter() - start) / times)
    return min(found)


def stated(what: str, seconds: float, goal: float, bound: float) -> None:
    print(f"{what}: {seconds * 1e6:.1f} µs, goal {goal * 1e6:.0f}, bound {bound * 1e6:.0f}")
    assert seconds < bound


def test_a_formula_is_called_within_microseconds() -> None:
    stated("formula call", best(lambda: tension(**VALUES), 5000), 2e-6, 10e-6)


def test_the_checks_cost_less_than_ten_times_the_formula() -> None:
    plain = best(lambda: tension.function(**VALUES), 5000)
    stated("checks", best(lambda: tension(**VALUES), 5000), 4 * plain, 10 * plain)


def test_a_recording_costs_a_fraction_of_a_millisecond() -> None:
    stated("recording", best(lambda: tension.record(**VALUES), 500), 2e-5, 2e-4)


@pytest.mark.parametrize("target", [MATHML, TYPST], ids=["mathml", "typst"])
def test_a_filled_line_costs_a_fraction_of_a_millisecond(target: Target) -> None:
    store = LayoutStore()
    recording = tension.record(**VALUES)
    origins = {name: Origin(f"S/{name}") for name in VALUES}
    targets = [Origin(f"S/{line.line.target}") for line in recording.lines]
    shown = dict.fromkeys(VALUES, "1 in")

    def fill() -> list[PrintedLine]:
        return printed_lines(recording, store.layout(tension), origins, shown, targets)

    printed = fill()
    rows = best(lambda: [equation(line.symbol, line.layout, line.values, target) for line in printed], 100) / 3
    texts = best(fill, 50) / 3
    stated(f"filled line, {target.name}", rows, 2e-4, 5e-4)
    stated("texts of a line", texts, 2e-4, 1e-3)


def test_replay_of_a_thousand_lines_is_quick() -> None:
    ledger = Ledger([Entry("S/x0", "given", "x0", "x", 1.0, "", "1", "S", source="x", status="confirmed")])
    for index in range(1, 1001):
        below = f"x{index - 1}"
        ledger.add(
            Entry(
                f"S/x{index}", "worked", f"x{index}", "x", 1.0, "", "1", "S",
                clause="1", expression=f"min({below}*2, {below}) + 0*{below}", where={below: f"S/{below}"},
            )
        )  # fmt: skip
    data = ledger.to_json()
    start = time.perf_counter()
    assert all(one.agrees for one in replay(data))
    stated("replay of one line", (time.perf_counter() - start) / 1000, 1e-4, 2e-3)


def import_seconds(module: str) -> float:
    """Cumulative seconds of an import, as the interpreter itself reports them; the best of three."""
    found = []
    for _ in range(3):
        command = [sys.executable, "-X", "importtime", "-c", f"import {module}"]
        report = subprocess.run(command, capture_output=True, text=True, check=True, timeout=60).stderr
        # "import time: self [us] | cumulative | name"
        rows = re.findall(r"\|\s*(\d+) \| ( *)(\S+)$", report, re.MULTILINE)
        found.append(
            sum(int(time_) for time_, indent, name in rows if not indent and name.startswith("calcpack")) / 1e6
        )
    return min(found)


@pytest.mark.parametrize(("module", "bound"), [("calcpack", 0.3), ("calcpack.sheet", 0.6)])
def test_importing_is_light(module: str, bound: float) -> None:
    seconds = import_seconds(module)
    assert seconds > 0
    stated(f"import {module}", seconds, 0.1, bound)
