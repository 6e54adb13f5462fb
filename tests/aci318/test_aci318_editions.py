"""Editions as records of functions."""

from __future__ import annotations

import dataclasses

import pytest

from calcpack.aci318.editions import EDITIONS, Edition, edition
from calcpack.errors import InputError
from calcpack.formula import Formula


def test_editions_by_name() -> None:
    assert edition("ACI 318-14").name == "ACI 318-14"
    assert edition("ACI 318-19").hook.name == "hook_19"


@pytest.mark.parametrize("name", ["ACI 318-11", "318-19", "aci 318-19", ""])
def test_unknown_editions_are_refused(name: str) -> None:
    with pytest.raises(InputError, match=rf"concrete = '{name}' +'ACI 318-14' or 'ACI 318-19': correct \[codes\]"):
        edition(name)


@pytest.mark.parametrize("one", EDITIONS.values(), ids=lambda one: one.name)
def test_every_function_of_an_edition_stands_in_it(one: Edition) -> None:
    roles = {field.name: getattr(one, field.name) for field in dataclasses.fields(one)}
    formulas = {role: value for role, value in roles.items() if isinstance(value, Formula)}
    assert len(formulas) >= 5
    for value in formulas.values():
        assert value.clause(roles["standard"]).standard is roles["standard"]


def test_what_318_19_dropped_and_added() -> None:
    # From memory, ACI 318-19 25.4.10.1, 25.4.4.1 and Table 25.4.2.5.
    old, new = edition("ACI 318-14"), edition("ACI 318-19")
    assert old.hook_reduced is not None
    assert new.hook_reduced is None
    assert (old.head_f_y_max, new.head_f_y_max) == (60_000.0, 100_000.0)
    assert old.grade_factor is None
    assert new.grade_factor is not None
