"""Bounds on time and memory with room for a slow machine; benchmark.py measures."""

from __future__ import annotations

import tracemalloc

import numpy as np
import pytest
from benchmark import combinations, plain_ratio, run, schedule

from calcpack.mechanics import Surface, rule_318_19


def test_a_load_takes_a_fraction_of_a_millisecond() -> None:
    # The goal is 500 x 200 loads in 10 s, 0.1 ms a load; five times that is allowed here.
    assert min(run(8, 200).seconds for _ in range(3)) / 1600 < 0.5e-3


def test_cost_of_a_load_does_not_grow_with_their_number() -> None:
    few = min(run(4, 200).seconds for _ in range(3)) / 800
    many = min(run(4, 2000).seconds for _ in range(3)) / 8000
    assert many < 1.5 * few


def test_memory_stays_small() -> None:
    section = schedule(1)[0]
    loads = combinations(section, 20_000, 1)
    tracemalloc.start()
    Surface(section, rule_318_19(f_y=section.f_y, spiral=False)).check(*loads)
    _, peak = tracemalloc.get_traced_memory()
    tracemalloc.stop()
    assert peak < 100e6


def test_the_plain_search_finds_the_same() -> None:
    for place, section in enumerate(schedule(4)):
        loads = combinations(section, 3, place)
        ratio = Surface(section, rule_318_19(f_y=section.f_y, spiral=False)).check(*loads).ratio
        assert ratio == pytest.approx(np.array([plain_ratio(section, load) for load in loads.T]), rel=5e-4)
