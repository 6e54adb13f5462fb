"""Layouts kept between runs: made once, read back, remade where the file is damaged."""

from __future__ import annotations

import json
import multiprocessing
from math import sqrt
from pathlib import Path
from typing import Any, NoReturn

import pytest

from calcpack.errors import LayoutError
from calcpack.formula import Formula, formula, inch
from calcpack.typeset import layout as layout_module
from calcpack.typeset import store as store_module
from calcpack.typeset.store import FormulaLayout, LayoutStore
from calcpack.typeset.tree import infix
from calcpack.units import Length, Ratio, Stress


@formula("x", empirical=True)
def anchored(*, f_c: Stress, d_b: Length) -> Length:
    """Lines and a branch."""
    root_f_c = min(sqrt(f_c), 100)
    if d_b > 1 * inch and f_c < 5000:
        l_d = 50 * d_b / root_f_c
    else:
        l_d = 40 * d_b / root_f_c
    return l_d


@formula("x")
def doubled(*, d_b: Length) -> Length:
    """One line."""
    s = 2 * d_b
    return s


def refuse(*_: object) -> NoReturn:
    raise AssertionError("the layout was made again")


@pytest.fixture
def kept(tmp_path: Path) -> Path:
    path = tmp_path / "cache" / "layouts.json"
    store = LayoutStore(path)
    store.layout(anchored)
    store.save()
    return path


def test_layout_holds_lines_and_both_sides_of_conditions() -> None:
    found = LayoutStore().layout(anchored)
    assert sorted(found.lines) == [1, 2, 3]
    assert {text: infix(one.tree) for text, one in found.conditions.items()} == {
        "d_b > 1 * inch and f_c < 5000": "_0>_1 and _2<_3",
        "d_b <= 1 * inch or f_c >= 5000": "_0<=_1 or _2>=_3",
    }


def test_second_store_makes_nothing_again(kept: Path, monkeypatch: pytest.MonkeyPatch) -> None:
    expected = LayoutStore().layout(anchored)
    monkeypatch.setattr(layout_module, "_handcalcs", refuse)
    monkeypatch.setattr(store_module, "lay_out", refuse)
    assert LayoutStore(kept).layout(anchored) == expected


def test_the_same_store_makes_a_layout_once(monkeypatch: pytest.MonkeyPatch) -> None:
    store = LayoutStore()
    first = store.layout(anchored)
    monkeypatch.setattr(store_module, "lay_out", refuse)
    assert store.layout(anchored) is first


def test_a_formula_not_kept_is_made_and_added(kept: Path) -> None:
    store = LayoutStore(kept)
    store.layout(doubled)
    store.save()
    assert len(json.loads(kept.read_text("utf-8"))) == 2


def test_nothing_new_writes_nothing(kept: Path) -> None:
    kept.write_bytes(kept.read_bytes() + b"\n")
    before = kept.read_bytes()
    store = LayoutStore(kept)
    store.layout(anchored)
    store.save()
    assert kept.read_bytes() == before


def test_a_store_without_a_file_saves_nothing(tmp_path: Path) -> None:
    store = LayoutStore()
    store.layout(doubled)
    store.save()
    assert list(tmp_path.iterdir()) == []


@pytest.mark.parametrize("text", ["", "{", "[]", "5", "null", '"x"', "\x00", "{}"])
def test_a_damaged_file_is_set_aside_and_written_anew(text: str, kept: Path) -> None:
    good = kept.read_text("utf-8")
    kept.write_text(text, "utf-8")
    store = LayoutStore(kept)
    assert sorted(store.layout(anchored).lines) == [1, 2, 3]
    store.save()
    assert kept.read_text("utf-8") == good


def test_bytes_that_are_no_text_are_set_aside(kept: Path) -> None:
    kept.write_bytes(b"\xff\xfe\x00bad")
    assert sorted(LayoutStore(kept).layout(anchored).lines) == [1, 2, 3]


@pytest.mark.parametrize(
    "damaged",
    [
        5,
        None,
        [],
        {},
        {"lines": 5, "conditions": {}},
        {"lines": {}, "conditions": {}},
        {"lines": {"one": {}}, "conditions": {}},
        {"lines": {"1": {"tree": ["slot", 0]}}, "conditions": {}},
        {"lines": {"1": {"tree": ["slot", 0], "slots": [["symbol"]]}}, "conditions": {}},
        {"lines": {"1": {"tree": ["slot", 0], "slots": 3}}, "conditions": None},
    ],
)
def test_a_damaged_entry_is_made_again(damaged: Any, kept: Path) -> None:
    good = kept.read_text("utf-8")
    data = json.loads(good)
    kept.write_text(json.dumps(dict.fromkeys(data, damaged)), "utf-8")
    store = LayoutStore(kept)
    assert store.layout(anchored) == LayoutStore().layout(anchored)
    store.save()
    assert kept.read_text("utf-8") == good


def test_another_version_of_handcalcs_is_another_key(kept: Path, monkeypatch: pytest.MonkeyPatch) -> None:
    monkeypatch.setattr(store_module, "_handcalcs_version", lambda: "0.0")
    store = LayoutStore(kept)
    store.layout(anchored)
    store.save()
    assert len(json.loads(kept.read_text("utf-8"))) == 2


def test_a_line_that_cannot_be_proved_is_not_kept(tmp_path: Path, monkeypatch: pytest.MonkeyPatch) -> None:
    def falsified(text: str) -> str:
        return layout_handcalcs(text).replace(r"\cdot", "+", 1)

    layout_handcalcs = layout_module._handcalcs
    monkeypatch.setattr(layout_module, "_handcalcs", falsified)
    store = LayoutStore(tmp_path / "layouts.json")
    with pytest.raises(LayoutError, match=r"the layout of '2 \* d_b' computes .* write it as two lines"):
        store.layout(doubled)
    store.save()
    assert not (tmp_path / "layouts.json").exists()


def test_saving_leaves_no_partial_file(kept: Path) -> None:
    assert [path.name for path in kept.parent.iterdir()] == ["layouts.json"]


def _save_many(path: Path, one: Formula, times: int) -> None:
    for _ in range(times):
        store = LayoutStore(path)
        store._kept.clear()
        store.layout(one)
        store._changed = True
        store.save()


def test_two_processes_saving_at_once_leave_a_readable_file(tmp_path: Path) -> None:
    path = tmp_path / "layouts.json"
    context = multiprocessing.get_context("fork")
    workers = [context.Process(target=_save_many, args=(path, one, 25)) for one in (anchored, doubled)]
    for worker in workers:
        worker.start()
    for worker in workers:
        worker.join(60)
    assert [worker.exitcode for worker in workers] == [0, 0]
    store = LayoutStore(path)
    assert isinstance(store.layout(doubled), FormulaLayout)
    assert isinstance(json.loads(path.read_text("utf-8")), dict)
    assert [item.name for item in tmp_path.iterdir()] == ["layouts.json"]


def test_kept_file_is_the_same_for_the_same_formulas(tmp_path: Path) -> None:
    files = []
    for order in ((anchored, doubled), (doubled, anchored)):
        store = LayoutStore(tmp_path / f"{order[0].name}.json")
        for one in order:
            store.layout(one)
        store.save()
        files.append((tmp_path / f"{order[0].name}.json").read_bytes())
    assert files[0] == files[1]


def test_layout_of_a_ratio(tmp_path: Path) -> None:
    @formula("own")
    def share(*, part: Length, whole: Length) -> Ratio:
        alpha = part / whole
        return alpha

    (line,) = LayoutStore(tmp_path / "x.json").layout(share).lines.values()
    assert infix(line.tree) == "((_0)/(_1))"
