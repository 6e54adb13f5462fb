"""The job folder: what the job is, which codes rule it, who acts in which role, and what was issued when.

All of it stands in ``job.toml``; :func:`load` reads it, or names everything that is wrong with it at once.
"""

from __future__ import annotations

import re
from dataclasses import dataclass
from datetime import date
from functools import cached_property
from pathlib import Path

from calcpack.errors import Problem, TableError
from calcpack.job.givens import GivenValue, read_givens
from calcpack.job.length_settings import AS_DEFAULT, LengthSettings, length_settings
from calcpack.job.settings import AS_USUAL, ColumnSettings, column_settings, load_settings
from calcpack.job.toml import Place, TomlFile
from calcpack.loads.combinations import AS_CODE, Settings

__all__ = ["ROLES", "Codes", "Deferred", "Job", "Limit", "Person", "Revision", "find", "load"]

ROLES = ("originator", "checker", "approver")
CONCRETE = ("ACI 318-14", "ACI 318-19")
LOADS = ("ASCE 7-16", "ASCE 7-22")
_FILE = "job.toml"
# Ids and letters become names of files and folders, on any operating system.
_ID = re.compile(r"[A-Za-z0-9][A-Za-z0-9_-]{0,31}")
_LETTER = re.compile(r"[A-Za-z0-9]{1,4}")


@dataclass(frozen=True)
class Codes:
    """The codes that rule the job, each with its edition."""

    building: str
    concrete: str
    loads: str


@dataclass(frozen=True)
class Person:
    """Someone who acts on the job; `licence` is empty where none is stated."""

    id: str
    name: str
    roles: tuple[str, ...]
    licence: str = ""


@dataclass(frozen=True)
class Revision:
    """One line of the revision log."""

    letter: str
    date: date
    purpose: str
    description: str


@dataclass(frozen=True)
class Limit:
    """A design limit stated in the basis of design, e.g. a deflection or drift limit, and who asks for it."""

    name: str
    value: str
    source: str


@dataclass(frozen=True)
class Deferred:
    """An item designed by others: what was assumed for it, and who is in charge."""

    item: str
    assumed: str
    by: str


@dataclass(frozen=True)
class Job:
    """A job folder, as job.toml describes it.

    Attributes
    ----------
    root : the folder that holds job.toml
    number, title, location, client, firm : texts, verbatim
    document : the document number of the package, empty where none is stated
    codes : building code, concrete standard and loads standard, with their editions
    system : the system of units, ``US``
    people : in file order
    revisions : in file order, which is date order
    statement : the paragraphs of the basis of design
    limits, deferred : what the basis of design lists
    combining : settings of the load combinations
    live_basis : why a companion live load is reduced, where it is
    columns : settings of the column sheets
    lengths : settings of the development and lap schedule
    """

    root: Path
    number: str
    title: str
    location: str
    client: str
    firm: str
    codes: Codes
    system: str
    people: tuple[Person, ...] = ()
    revisions: tuple[Revision, ...] = ()
    document: str = ""
    statement: tuple[str, ...] = ()
    limits: tuple[Limit, ...] = ()
    deferred: tuple[Deferred, ...] = ()
    combining: Settings = AS_CODE
    live_basis: str = ""
    columns: ColumnSettings = AS_USUAL
    lengths: LengthSettings = AS_DEFAULT

    @cached_property
    def givens(self) -> tuple[GivenValue, ...]:
        """The values of inputs/givens.toml, read when first asked for."""
        return read_givens(self.root)

    @property
    def newest(self) -> Revision | None:
        """The revision an issue would carry: the last of the log, ``None`` while there is none."""
        return self.revisions[-1] if self.revisions else None

    def acting(self, role: str) -> tuple[Person, ...]:
        """The people who may act as `role`, in file order."""
        return tuple(person for person in self.people if role in person.roles)

    def sheets(self) -> tuple[Path, ...]:
        """The notebooks of sheets/, in package order: by file name."""
        found = (self.root / "sheets").glob("*.ipynb")
        return tuple(sorted(path for path in found if path.is_file() and not path.name.startswith((".", "~"))))


def find(start: Path) -> Path:
    """The job folder around `start`: the nearest folder, from `start` upward, that holds job.toml.

    Raises
    ------
    TableError : there is none
    """
    here = start.absolute()
    for folder in (here, *here.parents):
        if (folder / _FILE).is_file():
            return folder
    raise _no_job(start, "neither in it nor in a folder above it")


def _no_job(folder: Path, where: str) -> TableError:
    problem = Problem(
        f"{folder} is not in a job folder" if "above" in where else f"{folder} is not a job folder",
        f"a folder with {_FILE} ({where})",
        "make one with: calcpack start FOLDER",
    )
    return TableError("no job folder", [problem])


def load(path: Path) -> Job:
    """Read the job folder at `path`.

    Raises
    ------
    TableError : no job.toml, a TOML syntax error with its line, or everything that is wrong in the file at once
    """
    if not (path / _FILE).is_file():
        raise _no_job(path, "there is none")
    file = TomlFile(path / _FILE, _FILE)
    top = file.top
    top.only("job", "codes", "units", "loads", "columns", "lengths", "people", "revision", "basis", "limit", "deferred")
    texts, codes = _job(top.table("job")), _codes(top.table("codes"))
    loads = top.table("loads", required=False)
    job = Job(
        path,
        **texts,
        codes=codes,
        system=_system(top.table("units")),
        people=_people(top.table("people", required=False)),
        revisions=_revisions(top),
        statement=_statement(top.table("basis", required=False)),
        limits=tuple(Limit(**_texts(place, "name", "value", "source")) for place in top.entries("limit")),
        deferred=tuple(Deferred(**_texts(place, "item", "assumed", "by")) for place in top.entries("deferred")),
        combining=load_settings(loads),
        live_basis=loads.text("live_companion_basis", required=False),
        columns=column_settings(top.table("columns", required=False)),
        lengths=length_settings(top.table("lengths", required=False), codes.concrete),
    )
    file.finish()
    return job


def _texts(place: Place, *required: str) -> dict[str, str]:
    place.only(*required)
    return {key: place.text(key) for key in required}


def _job(place: Place) -> dict[str, str]:
    required = ("number", "title", "location", "client", "firm")
    place.only(*required, "document")
    return {key: place.text(key) for key in required} | {"document": place.text("document", required=False)}


def _codes(place: Place) -> Codes:
    place.only("building", "concrete", "loads")
    return Codes(place.text("building"), place.choice("concrete", CONCRETE), place.choice("loads", LOADS))


def _system(place: Place) -> str:
    place.only("system")
    if place.keys.get("system") == "SI":
        place.report(
            "system",
            "system = 'SI'",
            "'US'",
            "SI is not available yet; the tables may be in mm, MPa and kN, and are converted to inches and pounds",
        )
        return ""
    return place.choice("system", ("US",))


def _people(people: Place) -> tuple[Person, ...]:
    found: list[Person] = []
    for key in people.keys:
        place = people.table(key)
        place.only("name", "role", "licence")
        if not _ID.fullmatch(key):
            place.report("", f"id {key!r}", "1 to 32 letters, digits, - and _", "the id is used in file names")
        if key.casefold() in {person.id.casefold() for person in found}:
            place.report("", f"id {key!r} differs from another only in case", "an id of its own", "rename one")
        found.append(Person(key, place.text("name"), _roles(place), place.text("licence", required=False)))
    return tuple(found)


def _roles(place: Place) -> tuple[str, ...]:
    value = place.value("role", "'originator', 'checker' or 'approver', or a list of them")
    if value is None:
        return ()
    listed = value if isinstance(value, list) else [value]
    if not listed:
        place.report("role", "role is an empty list", "at least one role")
    roles = tuple(place.chosen("role", role, ROLES) for role in listed)
    for role in sorted({role for role in roles if role and roles.count(role) > 1}):
        place.report("role", f"role names {role!r} twice", "each role once", "remove one")
    return roles


def _revisions(top: Place) -> tuple[Revision, ...]:
    found: list[Revision] = []
    for place in top.entries("revision"):
        place.only("letter", "date", "purpose", "description")
        letter, day = _letter(place, {each.letter.casefold() for each in found}), place.date("date")
        before = found[-1] if found else None
        if day and before and day < before.date:
            place.report(
                "date",
                f"date = {day}",
                f"{before.date} or later, as revision {before.letter!r} stands before it",
                "list the revisions in the order of their dates",
            )
        found.append(Revision(letter, day or date.min, place.text("purpose"), place.text("description")))
    return tuple(found)


def _letter(place: Place, used: set[str]) -> str:
    letter = place.text("letter")
    if letter and not _LETTER.fullmatch(letter):
        place.report("letter", f"letter = {letter!r}", "1 to 4 letters and digits", "it names the folder of the issue")
    if letter and letter.casefold() in used:
        place.report("letter", f"letter = {letter!r} is used before", "a letter of its own", "give it the next letter")
    return letter


def _statement(place: Place) -> tuple[str, ...]:
    place.only("statement")
    value = place.keys.get("statement")
    if value is None:
        return ()
    # A text over several lines is set as running text, an empty line starts a new paragraph.
    split = re.split(r"\n[ \t]*\n", value.strip()) if isinstance(value, str) else value
    paragraphs = [_joined(text) for text in (split if isinstance(split, list) else [split])]
    if not paragraphs:
        place.report("statement", "statement is an empty list", "at least one paragraph")
    return tuple(place.checked("statement", text) for text in paragraphs)


def _joined(text: object) -> object:
    return re.sub(r"\s*\n\s*", " ", text.strip()) if isinstance(text, str) else text
