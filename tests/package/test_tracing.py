"""A value traced down to its sources and up to what it goes into."""

from __future__ import annotations

import pytest

from calcpack.errors import LedgerError
from calcpack.ledger import Entry, Ledger
from calcpack.package.tracing import trace


def given(identifier: str, source: str, status: str = "confirmed") -> Entry:
    sheet, symbol = identifier.split("/")
    return Entry(identifier, "given", symbol, "a given", 2.0, "in", "2 in", sheet, source=source, status=status)


def worked(identifier: str, expression: str, condition: str = "", **where: str) -> Entry:
    sheet, symbol = identifier.split("/")
    return Entry(
        identifier, "worked", symbol, "a length", 4.0, "in", "4 in", sheet, clause="25.4", edition="ACI 318-19",
        expression=expression, where=where, condition=condition,
    )  # fmt: skip


@pytest.fixture
def ledger() -> Ledger:
    return Ledger(
        [
            given("L-01/a", "S-301, detail 2, rev 2"),
            given("C-01/q", "Geotechnical report GR-1", "assumed"),
            worked("C-01/b", "2 * a", a="L-01/a"),
            worked("C-01/l", "a + b", "a > 1", a="L-01/a", b="C-01/b"),
            worked("C-01/m", "b * l", b="C-01/b", l="C-01/l"),
            Entry(
                "C-01/c", "solved", "c", "a depth", 1.0, "in", "1 in", "C-01", clause="22.2", method="bisection",
                solved_from=("C-01/m",),
            ),
            Entry(
                "C-01/v", "verdict", "ratio", "fits", 2.0, "", "2.00", "C-01", demand="C-01/l", capacity="L-01/a",
                ratio=2.0, verdict="NG",
            ),
        ]
    )  # fmt: skip


def test_the_whole_tree(ledger: Ledger) -> None:
    assert trace(ledger, "C-01/l").split("\n") == [
        "C-01/l = 4 in  a length",
        "   = a + b  since a > 1  [ACI 318-19 25.4]",
        "├─ L-01/a = 2 in  a given",
        "│     given: S-301, detail 2, rev 2",
        "└─ C-01/b = 4 in  a length",
        "      = 2 * a  [ACI 318-19 25.4]",
        "   └─ L-01/a = 2 in  a given",
        "         given: S-301, detail 2, rev 2",
        "goes into:",
        "  C-01/m = 4 in  a length",
        "  C-01/v = 2.00  fits",
    ]


def test_what_was_shown_above_is_not_shown_again(ledger: Ledger) -> None:
    text = trace(ledger, "C-01/m")
    assert text.count("C-01/b = 4 in  a length  (above)") == 1
    assert text.count("= 2 * a") == 1


def test_verdicts_and_solved_values(ledger: Ledger) -> None:
    assert "\n   NG: demand over capacity\n" in trace(ledger, "C-01/v")
    assert "\n   solved: bisection  [22.2]\n" in trace(ledger, "C-01/c")
    assert trace(ledger, "C-01/v").endswith("goes into: nothing")


def test_an_assumption_is_called_one(ledger: Ledger) -> None:
    assert "given: Geotechnical report GR-1 (assumed)" in trace(ledger, "q")


def test_a_symbol_finds_every_value_of_that_name() -> None:
    two = Ledger([given("A-01/d", "S-1"), given("A-02/d", "S-2")])
    assert [line for line in trace(two, "d").split("\n") if "given:" in line] == ["   given: S-1", "   given: S-2"]
    assert "S-1" not in trace(two, "A-02/d")


def test_a_name_that_is_not_there(ledger: Ledger) -> None:
    with pytest.raises(LedgerError, match=r"no value called 'C-01/bb' in this job; close: C-01/b"):
        trace(ledger, "C-01/bb")
    with pytest.raises(LedgerError, match=r"'zzzzzz' in this job; ledger\.json lists all ids"):
        trace(ledger, "zzzzzz")


def test_what_confirms_a_solved_value_is_named(ledger: Ledger) -> None:
    ledger.add(worked("C-01/e", "c - 1", c="C-01/c"))
    ledger.confirm("C-01/c", ["C-01/e"])
    assert "\n   solved: bisection; confirmed by C-01/e  [22.2]\n" in trace(ledger, "C-01/c")
