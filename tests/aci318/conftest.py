"""Every formula of calcpack.aci318, as the parameter of tests that hold for all of them."""

from __future__ import annotations

import importlib

import pytest

from calcpack import aci318
from calcpack.formula import Formula

MODULES = (
    *("development", "factors", "hooks", "heads", "compression", "laps", "columns", "ties", "slenderness", "stiffness"),
    *("stress_block", "compatibility", "bending", "shear", "special_frames", "lateral_support"),
    *("bundles", "continuity", "dowels", "splices"),
)


def all_formulas() -> list[tuple[str, Formula]]:
    found = []
    for module in MODULES:
        scope = vars(importlib.import_module(f"calcpack.aci318.{module}"))
        found += [(f"{module}.{name}", one) for name, one in scope.items() if isinstance(one, Formula)]
    return found


def pytest_generate_tests(metafunc: pytest.Metafunc) -> None:
    formulas = all_formulas()
    if "any_formula" in metafunc.fixturenames:
        metafunc.parametrize("any_formula", [one for _, one in formulas], ids=[name for name, _ in formulas])
    if "homogeneous" in metafunc.fixturenames:
        chosen = [(name, one) for name, one in formulas if not one.empirical]
        metafunc.parametrize("homogeneous", [one for _, one in chosen], ids=[name for name, _ in chosen])


@pytest.fixture
def formula_names() -> dict[str, list[str]]:
    """Names of the formulas each module holds."""
    return {
        module: [
            name
            for name, one in vars(importlib.import_module(f"calcpack.aci318.{module}")).items()
            if isinstance(one, Formula)
        ]
        for module in aci318.__all__
        if module in MODULES
    }
