from __future__ import annotations

import re
from collections.abc import Callable
from datetime import date
from pathlib import Path

import pytest

import calcpack.job
from calcpack.errors import TableError
from calcpack.job import Codes, Deferred, Limit, Person, Revision, find, load
from calcpack.job.settings import ColumnSettings
from calcpack.loads.combinations import Settings

Edit = Callable[..., Path]


def problem_of(root: Path) -> tuple[str, str, str, str]:
    """The one problem of a job.toml, as (given, allowed, remedy, where)."""
    with pytest.raises(TableError, match=r"^job\.toml: 1 problem\n") as caught:
        load(root)
    (problem,) = caught.value.problems
    return problem.given, problem.allowed, problem.remedy, problem.where


def test_every_key_is_read(job_root: Path) -> None:
    job = load(job_root)
    assert (job.root, job.number, job.title) == (job_root, "26-031", "Harbour Row, block B")
    assert (job.location, job.client, job.firm) == ("Quay 7, Port Ellery", "Ellery Dock Trust", "Northgate Structures")
    assert (job.codes, job.system) == (Codes("IBC 2021", "ACI 318-19", "ASCE 7-16"), "US")
    assert job.people == (
        Person("amr", "A. M. Reyes", ("originator",), "PE 00000, ST"),
        Person("jkl", "J. K. Lund", ("checker", "approver"), ""),
    )
    assert job.revisions == (
        Revision("A", date(2026, 11, 2), "Plan review", "First issue"),
        Revision("B", date(2026, 11, 20), "Plan review", "Comments answered"),
    )
    assert (job.document, job.statement, job.limits, job.deferred, job.givens) == ("", (), (), (), ())


def test_newest_revision_and_roles(job_root: Path) -> None:
    job = load(job_root)
    assert job.newest is not None
    assert job.newest.letter == "B"
    assert [person.id for person in job.acting("approver")] == ["jkl"]
    assert [person.id for person in job.acting("originator")] == ["amr"]


def test_people_and_revisions_may_come_later(edit: Edit) -> None:
    text = load_text(edit())
    root = edit((text[text.index("[people.amr]") :], ""))
    job = load(root)
    assert (job.people, job.revisions, job.newest) == ((), (), None)


def load_text(root: Path) -> str:
    return (root / "job.toml").read_text(encoding="utf-8")


@pytest.mark.parametrize("edition", ["ACI 318-14", "ACI 318-19"])
@pytest.mark.parametrize("loads", ["ASCE 7-16", "ASCE 7-22"])
def test_editions_that_are_served(edit: Edit, edition: str, loads: str) -> None:
    job = load(edit(("ACI 318-19", edition), ("ASCE 7-16", loads)))
    assert (job.codes.concrete, job.codes.loads) == (edition, loads)


def test_basis_limits_and_deferred_items(edit: Edit) -> None:
    added = """document = "NS-26-031-CALC"
[basis]
statement = ["Walls carry wind to the raft.", "Columns carry gravity load."]
[[limit]]
name = "storey drift"
value = "h/400"
source = "client brief, 4.2"
[[deferred]]
item = "stair flights"
assumed = "reaction 3 kip a landing"
by = "precast supplier"
"""
    job = load(edit(('firm = "Northgate Structures"\n', f'firm = "Northgate Structures"\n{added}')))
    assert job.document == "NS-26-031-CALC"
    assert job.statement == ("Walls carry wind to the raft.", "Columns carry gravity load.")
    assert job.limits == (Limit("storey drift", "h/400", "client brief, 4.2"),)
    assert job.deferred == (Deferred("stair flights", "reaction 3 kip a landing", "precast supplier"),)


@pytest.mark.parametrize("newline", ["\n", "\r\n"])
def test_statement_as_one_text_is_split_at_empty_lines(job_root: Path, newline: str) -> None:
    text = load_text(job_root) + '\n[basis]\nstatement = """\nWalls carry\nwind.\n\nColumns carry load.\n"""\n'
    (job_root / "job.toml").write_bytes(text.replace("\n", newline).encode())
    assert load(job_root).statement == ("Walls carry wind.", "Columns carry load.")


@pytest.mark.parametrize(
    ("statement", "given"),
    [
        ("[]", "statement is an empty list"),
        ('""', "statement is empty"),
        ("[3]", "statement = 3"),
        ("3", "statement = 3"),
    ],
)
def test_statement_that_says_nothing(edit: Edit, statement: str, given: str) -> None:
    found, _, _, where = problem_of(edit(("[units]", f"[basis]\nstatement = {statement}\n[units]")))
    assert (found, where) == (given, "job.toml, [basis] statement")


@pytest.mark.parametrize(
    "text",
    ['12" walls & "quotes"', "<script>alert(1)</script>", "#8 @ 12 $E_s$ \\alpha {x} %", "Brücke 橋 🏗️", "  padded  "],
)
def test_texts_are_kept_verbatim(edit: Edit, text: str) -> None:
    quoted = text.replace("\\", "\\\\").replace('"', '\\"')
    assert load(edit(('"Harbour Row, block B"', f'"{quoted}"'))).title == text


def test_byte_order_mark_is_no_problem(job_root: Path) -> None:
    (job_root / "job.toml").write_text(load_text(job_root), encoding="utf-8-sig")
    assert load(job_root).number == "26-031"


# One mistake each: the change, then given, allowed, remedy and place of the problem.
@pytest.mark.parametrize(
    ("old", "new", "given", "allowed", "remedy", "where"),
    [
        ('title = "Harbour Row, block B"\n', "", "title is missing", "a text in quotes", "add it", "[job] title"),
        ('"26-031"', "26", "number = 26", "a text in quotes", "put it in double quotes", "[job] number"),
        ('"26-031"', '""', "number is empty", "a text", "fill it in", "[job] number"),
        ('"26-031"', '"  "', "number is empty", "a text", "fill it in", "[job] number"),
        (
            '"26-031"',
            '"26\\u0007"',
            "number holds the control character U+0007",
            "printable characters",
            "remove it",
            "[job] number",
        ),
        (
            '"ACI 318-19"',
            '"ACI 318-08"',
            "concrete = 'ACI 318-08'",
            "'ACI 318-14' or 'ACI 318-19'",
            "did you mean",
            "[codes] concrete",
        ),
        ('"ACI 318-19"', "318", "concrete = 318", "'ACI 318-14' or 'ACI 318-19'", "", "[codes] concrete"),
        (
            '"ASCE 7-16"',
            '"ASCE 7-10"',
            "loads = 'ASCE 7-10'",
            "'ASCE 7-16' or 'ASCE 7-22'",
            "did you mean",
            "[codes] loads",
        ),
        ('"US"', '"SI"', "system = 'SI'", "'US'", "SI is not available yet", "[units] system"),
        ('"US"', '"us"', "system = 'us'", "'US'", "did you mean 'US'?", "[units] system"),
        ('[units]\nsystem = "US"\n', "", "[units] is missing", "the table with its keys", "add it", ""),
        (
            '"originator"',
            '"orginator"',
            "role = 'orginator'",
            "'originator', 'checker' or 'approver'",
            "did you mean 'originator'?",
            "[people.amr] role",
        ),
        ('"originator"', "[]", "role is an empty list", "at least one role", "", "[people.amr] role"),
        (
            '"originator"',
            '["checker", "checker"]',
            "role names 'checker' twice",
            "each role once",
            "remove one",
            "[people.amr] role",
        ),
        (
            'role = "originator"\n',
            "",
            "role is missing",
            "'originator', 'checker' or 'approver', or a list of them",
            "add it",
            "[people.amr] role",
        ),
        ('"PE 00000, ST"', '""', "licence is empty", "a text", "fill it in", "[people.amr] licence"),
        (
            "[people.jkl]",
            '[people."j/kl"]',
            "id 'j/kl'",
            "1 to 32 letters, digits, - and _",
            "the id is used in file names",
            "[people.j/kl]",
        ),
        (
            "[people.jkl]",
            "[people.AMR]",
            "id 'AMR' differs from another only in case",
            "an id of its own",
            "rename one",
            "[people.AMR]",
        ),
        (
            'letter = "B"',
            'letter = "a"',
            "letter = 'a' is used before",
            "a letter of its own",
            "give it the next letter",
            "[[revision]] 2 letter",
        ),
        (
            'letter = "B"',
            'letter = "../B"',
            "letter = '../B'",
            "1 to 4 letters and digits",
            "it names the folder of the issue",
            "[[revision]] 2 letter",
        ),
        (
            "2026-11-20",
            "2026-11-01",
            "date = 2026-11-01",
            "2026-11-02 or later, as revision 'A' stands before it",
            "list the revisions",
            "[[revision]] 2 date",
        ),
        (
            "2026-11-20",
            '"20 Nov 2026"',
            "date = '20 Nov 2026'",
            "a date without quotes, e.g. 2026-11-02",
            "",
            "[[revision]] 2 date",
        ),
        (
            "2026-11-20",
            "2026-11-20T10:00:00",
            "date = 2026-11-20 10:00:00",
            "a date without quotes, e.g. 2026-11-02",
            "",
            "[[revision]] 2 date",
        ),
        (
            "date = 2026-11-20\n",
            "",
            "date is missing",
            "a date without quotes, e.g. 2026-11-02",
            "add it",
            "[[revision]] 2 date",
        ),
        (
            "[units]",
            "[firm]\nx = 1\n[units]",
            "unknown key 'firm'",
            "'job', 'codes', 'units', 'loads', 'columns', 'lengths', 'people', 'revision', 'basis', 'limit' "
            "or 'deferred'",
            "remove it",
            "",
        ),
        ("[units]", "[unit]\n[units]", "unknown key 'unit'", "'job', 'codes', 'units',", "did you mean 'units'?", ""),
        (
            "firm =",
            "fee = 1\nfirm =",
            "unknown key 'fee'",
            "'number', 'title', 'location', 'client', 'firm' or 'document'",
            "",
            "[job]",
        ),
        ("system =", "sytem = 1\nsystem =", "unknown key 'sytem'", "'system'", "did you mean 'system'?", "[units]"),
        (
            "[units]",
            "[[limit]]\nname = 'drift'\nvalue = 'h/400'\n[units]",
            "source is missing",
            "a text in quotes",
            "add it",
            "[[limit]] 1 source",
        ),
        (
            "[units]",
            "[limit]\nname = 'drift'\n[units]",
            "limit is a single value or table",
            "a list of tables [[limit]]",
            "double the brackets",
            "",
        ),
        ("[job]", "limit = [1]\n[job]", "limit = 1", "a table [[limit]]", "", ""),
        ("[job]", "basis = 1\n[job]", "basis = 1", "a table [basis]", "", ""),
        ("[units]", "[people]\nx = 'X'\n[units]", "x = 'X'", "a table [people.x]", "", "[people]"),
    ],
)
def test_one_mistake(edit: Edit, old: str, new: str, given: str, allowed: str, remedy: str, where: str) -> None:
    found = problem_of(edit((old, new)))
    assert found[0] == given
    assert found[1].startswith(allowed)
    assert found[2].startswith(remedy)
    assert found[3] == ", ".join(filter(None, ["job.toml", where]))


def test_a_misspelled_key_is_unknown_and_the_right_one_missing(edit: Edit) -> None:
    with pytest.raises(TableError, match=r"unknown key 'clients'.*did you mean 'client'\?[\s\S]*client is missing"):
        load(edit(("client =", "clients =")))


def test_revisions_of_the_same_day_are_in_order(edit: Edit) -> None:
    assert len(load(edit(("2026-11-20", "2026-11-02"))).revisions) == 2


def test_all_mistakes_come_at_once(edit: Edit) -> None:
    root = edit(
        ('number = "26-031"\n', ""),
        ('"ACI 318-19"', '"ACI 318"'),
        ('"US"', '"SI"'),
        ('"originator"', '"designer"'),
        ("2026-11-20", "2026-10-20"),
    )
    with pytest.raises(TableError, match=r"^job\.toml: 5 problems\n") as caught:
        load(root)
    assert [problem.where.removeprefix("job.toml, ") for problem in caught.value.problems] == [
        "[job] number",
        "[codes] concrete",
        "[units] system",
        "[people.amr] role",
        "[[revision]] 2 date",
    ]


def test_missing_table_is_one_problem_not_one_for_each_key(edit: Edit) -> None:
    text = load_text(edit())
    given, *_ = problem_of(edit((text[text.index("[codes]") : text.index("[units]")], "")))
    assert given == "[codes] is missing"


@pytest.mark.parametrize(
    ("text", "where", "found"),
    [
        ('[job]\ntitle = "x\n', "job.toml, line 2, column 11", "Illegal character"),
        ("[job]\nnumber = 1\nnumber = 2\n", "job.toml, line 3, column 11", "Cannot overwrite a value"),
        ("[job]\nx = 2026-02-30\n", "job.toml, line 2", "Invalid date or datetime"),
        ("[job", "job.toml, line 1", "Expected ']'"),
        ("x = " + "[" * 5000, "job.toml", "brackets nested too deep"),
        ("x = " + "9" * 5000, "job.toml", "Exceeds the limit"),
    ],
)
def test_syntax_errors_name_the_line(job_root: Path, text: str, where: str, found: str) -> None:
    (job_root / "job.toml").write_text(text, encoding="utf-8")
    given, _, _, place = problem_of(job_root)
    assert given.startswith(found)
    assert place.startswith(where)


def test_other_encodings_are_refused(job_root: Path) -> None:
    (job_root / "job.toml").write_bytes(b'[job]\ntitle = "Br\xfccke"\n')
    with pytest.raises(TableError, match=r"byte 18 is not UTF-8  text in UTF-8: save the file again.*\[job\.toml\]"):
        load(job_root)


def test_a_folder_without_job_toml_is_no_job(tmp_path: Path) -> None:
    expected = rf"{re.escape(str(tmp_path))} is not a job folder.*make one with: calcpack start FOLDER"
    with pytest.raises(TableError, match=expected):
        load(tmp_path)


def test_find_walks_up_from_a_notebook(job_root: Path) -> None:
    sheet = job_root / "sheets" / "C-01.ipynb"
    sheet.parent.mkdir()
    sheet.touch()
    assert find(sheet) == job_root
    assert find(sheet.parent) == job_root
    assert find(job_root) == job_root


def test_find_takes_the_nearest_job(job_root: Path) -> None:
    inner = job_root / "old" / "job"
    inner.mkdir(parents=True)
    (inner / "job.toml").touch()
    assert find(inner / "sheets" / "C-01.ipynb") == inner


def test_find_above_nothing(tmp_path: Path) -> None:
    with pytest.raises(TableError, match=r"is not in a job folder.*calcpack start FOLDER"):
        find(tmp_path / "sheets" / "C-01.ipynb")


def test_sheets_stand_in_the_order_of_their_names(job_root: Path) -> None:
    folder = job_root / "sheets"
    (folder / ".ipynb_checkpoints").mkdir(parents=True)
    (folder / "folder.ipynb").mkdir()
    names = ["b.ipynb", "C-01.ipynb", "C-10.ipynb", "C-2.ipynb"]
    hidden = [".ipynb_checkpoints/b-checkpoint.ipynb", ".C-01.ipynb", "~C-01.ipynb", "notes.txt"]
    for name in [*names, *hidden]:
        (folder / name).touch()
    assert [path.name for path in load(job_root).sheets()] == ["C-01.ipynb", "C-10.ipynb", "C-2.ipynb", "b.ipynb"]


def test_a_job_without_sheets_has_none(job_root: Path) -> None:
    assert load(job_root).sheets() == ()


def test_givens_are_read_when_asked_for(job_root: Path) -> None:
    (job_root / "inputs" / "givens.toml").write_text("[[given]]\n", encoding="utf-8")
    job = load(job_root)
    with pytest.raises(TableError, match=r"inputs/givens\.toml: 5 problems"):
        _ = job.givens


def test_the_table_of_contents_is_sorted_and_true() -> None:
    assert calcpack.job.__all__ == sorted(calcpack.job.__all__)
    assert all(hasattr(calcpack.job, name) for name in calcpack.job.__all__)


# Settings of load combinations and column sheets


def test_settings_where_none_are_stated(job_root: Path) -> None:
    job = load(job_root)
    assert (job.combining, job.columns) == (Settings(), ColumnSettings("every column", "a"))


def test_settings(job_root: Path) -> None:
    with (job_root / "job.toml").open("a", encoding="utf-8") as file:
        file.write('[loads]\nlive_companion = 0.5\nlive_companion_basis = "L_o up to 100 psf"\nS_DS = 0.4\nrho = 1.3\n')
        file.write('[columns]\nworked = "one of a group"\nstiffness = "b"\n')
    job = load(job_root)
    assert job.combining == Settings(live_companion=0.5, S_DS=0.4, rho=1.3)
    assert job.live_basis == "L_o up to 100 psf"
    assert job.columns == ColumnSettings("one of a group", "b")


@pytest.mark.parametrize(
    ("text", "message"),
    [
        ("[loads]\nlive_companion = 0.5\n", r"live_companion_basis is missing +why the reduction is permitted"),
        ('[loads]\nlive_companion = 0.7\nlive_companion_basis = "x"\n', r"live_companion = 0\.7 +1\.0, or 0\.5"),
        ("[loads]\nrho = 1.3\n", r"rho = 1\.3 +1\.0 where S_DS is not stated"),
        ('[loads]\nS_DS = "0.4"\n', r"S_DS = '0\.4' +a number without quotes"),
        ("[loads]\nS_DS = true\n", r"S_DS = .* +a number without quotes"),
        ("[loads]\nsds = 1\n", r"unknown key 'sds'"),
        ('[columns]\nworked = "all"\n', r"worked = 'all' +'every column' or 'one of a group'"),
        ('[columns]\nstiffness = "c"\n', r"stiffness = 'c' +'a' or 'b'"),
    ],
)
def test_a_setting_that_is_not_allowed(job_root: Path, text: str, message: str) -> None:
    with (job_root / "job.toml").open("a", encoding="utf-8") as file:
        file.write(text)
    with pytest.raises(TableError, match=message):
        load(job_root)
