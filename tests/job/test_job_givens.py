from __future__ import annotations

from collections.abc import Callable
from pathlib import Path

import pytest

from calcpack.errors import TableError
from calcpack.job import GivenValue, read_givens
from calcpack.units import Dimension, Measured

Put = Callable[[str, str], Path]

GOOD = """
[[given]]
symbol = "q_allow"
value = "4.0 kip/ft^2"
means = "allowable soil bearing pressure"
source = "Geotechnical report GR-112 rev 1, table 3"
status = "confirmed"
"""


def problems_of(root: Path) -> list[tuple[str, str, str, str]]:
    with pytest.raises(TableError, match=r"^inputs/givens\.toml: \d+ problems?\n") as caught:
        read_givens(root)
    return [(each.given, each.allowed, each.remedy, each.where) for each in caught.value.problems]


def test_absent_file_gives_nothing(job_root: Path) -> None:
    assert read_givens(job_root) == ()


def test_empty_file_gives_nothing(put: Put) -> None:
    assert read_givens(put("givens.toml", "")) == ()


def test_a_given_value(put: Put) -> None:
    (found,) = read_givens(put("givens.toml", GOOD))
    # 4 kip/ft^2 = 4000 lb / 144 in^2.
    assert found.value.value == pytest.approx(4000 / 144, rel=1e-12)
    assert found == GivenValue(
        "q_allow",
        Measured(found.value.value, Dimension("stress or pressure", force=1, length=-2), "kip/ft^2", 4.0),
        "4.0 kip/ft^2",
        "allowable soil bearing pressure",
        "Geotechnical report GR-112 rev 1, table 3",
        "confirmed",
        1,
        "inputs/givens.toml",
    )
    assert found.where == "inputs/givens.toml, entry 1"


@pytest.mark.parametrize(
    ("value", "text", "number"),
    [("0.35", "0.35", 0.35), ('"0.35"', "0.35", 0.35), ("2", "2", 2.0), ('"12\'-6\\""', "12'-6\"", 150.0)],
)
def test_ratios_and_feet(put: Put, value: str, text: str, number: float) -> None:
    (found,) = read_givens(put("givens.toml", GOOD.replace('"4.0 kip/ft^2"', value)))
    assert (found.text, found.value.value) == (text, number)


def test_order_is_that_of_the_file(put: Put) -> None:
    found = read_givens(put("givens.toml", GOOD + GOOD.replace("q_allow", "a_1").replace("confirmed", "assumed")))
    assert [(each.symbol, each.status, each.entry) for each in found] == [
        ("q_allow", "confirmed", 1),
        ("a_1", "assumed", 2),
    ]


@pytest.mark.parametrize(
    ("old", "new", "given", "allowed", "remedy", "key"),
    [
        ('"q_allow"', '"q allow"', "symbol = 'q allow'", "letters, digits and _, e.g. 'q_allow'", "", "symbol"),
        ('symbol = "q_allow"\n', "", "symbol is missing", "a text in quotes", "add it", "symbol"),
        (
            '"confirmed"',
            '"confirm"',
            "status = 'confirm'",
            "'confirmed' or 'assumed'",
            "did you mean 'confirmed'?",
            "status",
        ),
        ('status = "confirmed"\n', "", "status is missing", "'confirmed' or 'assumed'", "add it", "status"),
        ('"Geotechnical report GR-112 rev 1, table 3"', '""', "source is empty", "a text", "fill it in", "source"),
        ('means = "allowable soil bearing pressure"\n', "", "means is missing", "a text in quotes", "add it", "means"),
        ("4.0 kip/ft^2", "four", "value = 'four'", "a number with its unit", "write e.g. '12 in'", "value"),
        ("4.0 kip/ft^2", "4 kp/ft^2", "unit 'kp/ft^2'", "in, ft, mm,", "write the unit", "value"),
        ('"4.0 kip/ft^2"', "inf", "value = 'inf'", "a number with its unit", "write e.g. '12 in'", "value"),
        ('"4.0 kip/ft^2"', "true", "value = True", "a text in quotes", "put it in double quotes", "value"),
        ('value = "4.0 kip/ft^2"\n', "", "value is missing", "a number with its unit", "add it", "value"),
    ],
)
def test_one_mistake(put: Put, old: str, new: str, given: str, allowed: str, remedy: str, key: str) -> None:
    assert old in GOOD
    (problem,) = problems_of(put("givens.toml", GOOD.replace(old, new)))
    assert problem[0] == given
    assert problem[1].startswith(allowed)
    assert problem[2].startswith(remedy)
    assert problem[3] == f"inputs/givens.toml, [[given]] 1 {key}"


def test_unknown_keys(put: Put) -> None:
    text = GOOD.replace("status =", "stats = 1\nstatus =") + "[gives]\n"
    assert [(given, remedy, where) for given, _, remedy, where in problems_of(put("givens.toml", text))] == [
        ("unknown key 'gives'", "did you mean 'given'?", "inputs/givens.toml"),
        ("unknown key 'stats'", "did you mean 'status'?", "inputs/givens.toml, [[given]] 1"),
    ]


def test_all_mistakes_come_at_once_with_their_entries(put: Put) -> None:
    text = GOOD + GOOD.replace("4.0 kip/ft^2", "x") + GOOD.replace("q_allow", "w").replace("confirmed", "known")
    assert [(given, remedy, where) for given, _, remedy, where in problems_of(put("givens.toml", text))] == [
        ("symbol = 'q_allow'", "entry 1 has it", "inputs/givens.toml, [[given]] 2 symbol"),
        ("value = 'x'", "write e.g. '12 in'", "inputs/givens.toml, [[given]] 2 value"),
        ("status = 'known'", "", "inputs/givens.toml, [[given]] 3 status"),
    ]


def test_syntax_error_names_the_line(put: Put) -> None:
    ((*_, where),) = problems_of(put("givens.toml", "[[given]]\nsymbol = q\n"))
    assert where == "inputs/givens.toml, line 2, column 10"
