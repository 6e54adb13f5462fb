"""Arrows point one way, downward; and what is heavy is loaded only where it is used."""

from __future__ import annotations

import ast
import subprocess
import sys
from collections.abc import Iterator
from pathlib import Path

import pytest

import calcpack

ROOT = Path(calcpack.__file__).parent

# Lowest first. A room imports from itself and from rooms below it, never from one beside or above it.
LAYERS: list[set[str]] = [
    {"calcpack"},
    {"errors", "fonts"},
    {"units", "expression", "figures"},
    {"notation"},
    {"symbols", "ledger"},
    {"formula_source"},
    {"formula"},
    {"typeset", "aci318", "mechanics", "loads", "tabulation"},
    {"members"},
    {"items", "job"},
    {"notebook"},
    {"value"},
    {"carrying", "book", "validation_sections"},
    {"validation"},
    {"solving", "tabulating"},
    {"scheduled", "folding"},
    {"anchorage_sheets", "column_sheets", "length_sheets"},
    {"sheet"},
    {"package"},
    {"cli"},
]
LEVEL = {room: level for level, rooms in enumerate(LAYERS) for room in rooms}
TYPESET_KNOWS = {"typeset", "formula", "formula_source", "ledger", "expression", "symbols", "units", "errors"}
HEAVY = (
    "pint",
    "matplotlib",
    "nbconvert",
    "nbformat",
    "nbclient",
    "typst",
    "openpyxl",
    "IPython",
    "handcalcs",
    "pyhanko",
)


def modules() -> Iterator[tuple[str, Path]]:
    """Every module of the package by its dotted name."""
    for path in sorted(ROOT.rglob("*.py")):
        parts = path.relative_to(ROOT).with_suffix("").parts
        yield ".".join(("calcpack", *parts)).removesuffix(".__init__"), path


MODULES = dict(modules())


def room(module: str) -> str:
    """The room of a module: its folder, or its name where it stands alone; sheet_tables belongs to sheet."""
    name = [*module.split("."), "calcpack"][1]
    return "sheet" if name.startswith("sheet_") else "calcpack" if module == "calcpack" else name


def imported(path: Path, everywhere: bool = True) -> Iterator[str]:
    """Modules that a file imports, at its top or anywhere; those for type checking alone left out."""
    waiting: list[ast.AST] = [ast.parse(path.read_text("utf-8"))]
    while waiting:
        node = waiting.pop()
        if isinstance(node, ast.If) and ast.unparse(node.test) in ("TYPE_CHECKING", "typing.TYPE_CHECKING"):
            waiting.extend(node.orelse)
            continue
        if isinstance(node, (ast.FunctionDef, ast.AsyncFunctionDef)) and not everywhere:
            continue
        if isinstance(node, ast.Import):
            yield from (alias.name for alias in node.names)
        elif isinstance(node, ast.ImportFrom):
            assert node.level == 0, f"{path}: imports are written in full"
            yield from from_module(str(node.module), [alias.name for alias in node.names])
        waiting.extend(ast.iter_child_nodes(node))


def from_module(module: str, names: list[str]) -> Iterator[str]:
    """``from calcpack import formula`` imports a module, ``from calcpack.formula import Line`` a name of one."""
    for name in names:
        yield f"{module}.{name}" if f"{module}.{name}" in MODULES else module


@pytest.mark.parametrize("module", MODULES)
def test_every_module_has_its_room(module: str) -> None:
    assert room(module) in LEVEL, f"{module}: say in LAYERS of this test where it stands"


@pytest.mark.parametrize("module", MODULES)
def test_arrows_point_downward(module: str) -> None:
    own = room(module)
    inside = [name for name in imported(MODULES[module]) if name.split(".")[0] == "calcpack"]
    wrong = [name for name in inside if room(name) != own and LEVEL[room(name)] >= LEVEL[own]]
    assert wrong == [], f"{module} imports upward or sideways"


@pytest.mark.parametrize("module", [name for name in MODULES if room(name) == "typeset"])
def test_typeset_knows_formula_and_ledger_and_nothing_else(module: str) -> None:
    inside = {room(name) for name in imported(MODULES[module]) if name.split(".")[0] == "calcpack"}
    assert inside <= TYPESET_KNOWS | {"calcpack"}


@pytest.mark.parametrize("module", [name for name in MODULES if room(name) == "aci318"])
def test_provisions_print_nothing(module: str) -> None:
    inside = {room(name) for name in imported(MODULES[module])} if module != "calcpack.aci318" else set()
    assert not inside & {"typeset", "ledger", "sheet", "package"}


@pytest.mark.parametrize("module", MODULES)
def test_heavy_libraries_are_imported_where_they_are_used(module: str) -> None:
    at_top = {name.split(".")[0] for name in imported(MODULES[module], everywhere=False)}
    allowed = {"calcpack.package.exporters": {"nbconvert"}}.get(module, set())
    assert at_top & set(HEAVY) <= allowed


def loaded_after(statement: str) -> set[str]:
    """Top-level modules that a fresh interpreter holds after a statement."""
    code = f"{statement}\nimport sys\nprint(' '.join(sorted({{name.split('.')[0] for name in sys.modules}})))"
    found = subprocess.run([sys.executable, "-c", code], capture_output=True, text=True, check=True, timeout=60)
    return set(found.stdout.split())


@pytest.mark.parametrize(
    "statement",
    [
        "import calcpack",
        "import calcpack.sheet",
        "import calcpack.formula, calcpack.ledger, calcpack.typeset.line, calcpack.typeset.store",
        "import calcpack.cli",
        "import calcpack.job",
    ],
)
def test_importing_loads_nothing_heavy(statement: str) -> None:
    assert loaded_after(statement) & set(HEAVY) == set()


def test_replay_needs_no_formula() -> None:
    code = "import calcpack.ledger, sys\nprint(*[name for name in sys.modules if name.startswith('calcpack')])"
    found = subprocess.run([sys.executable, "-c", code], capture_output=True, text=True, check=True, timeout=60)
    assert set(found.stdout.split()) == {"calcpack", "calcpack.errors", "calcpack.expression", "calcpack.ledger"}


def test_the_rule_sees_what_breaks_it(tmp_path: Path) -> None:
    path = tmp_path / "x.py"
    path.write_text(
        "from typing import TYPE_CHECKING\nif TYPE_CHECKING:\n    import pint\n"
        "from calcpack import formula\nfrom calcpack.sheet import Sheet\ndef f():\n    import matplotlib.pyplot\n",
        "utf-8",
    )
    assert set(imported(path)) == {"typing", "calcpack.formula", "calcpack.sheet", "matplotlib.pyplot"}
    assert set(imported(path, everywhere=False)) == {"typing", "calcpack.formula", "calcpack.sheet"}
    assert [room(name) for name in ("calcpack", "calcpack.sheet_tables", "calcpack.typeset.emit")] == [
        "calcpack", "sheet", "typeset",
    ]  # fmt: skip


def test_modules_stay_readable_in_one_sitting() -> None:
    long = {
        name: length for name, path in MODULES.items() if (length := len(path.read_text("utf-8").splitlines())) > 400
    }
    assert long == {}
