"""Reading a TOML file of the job with every problem in it collected, none of them the last word."""

from __future__ import annotations

import re
import tomllib
from collections.abc import Iterator, Sequence
from datetime import date, datetime
from pathlib import Path
from typing import Any

from calcpack.errors import Problem
from calcpack.job.wording import did_you_mean, failure, hidden_character, one_of, read_text, shown

__all__ = ["Place", "TomlFile"]

_AT = re.compile(r"\s*\(at (?:line (?P<line>\d+), column (?P<column>\d+)|end of document)\)$")


class TomlFile:
    """A parsed TOML file and the problems found in it so far.

    It collects while it is read, so that its owner sees every mistake at once; `finish` raises them.
    """

    def __init__(self, path: Path, file: str) -> None:
        self.file = file
        self.problems: list[Problem] = []
        self.top = Place(self, "", self._parsed(path))

    def _parsed(self, path: Path) -> dict[str, Any]:
        text = read_text(path, self.file)
        try:
            return tomllib.loads(text)
        except RecursionError:
            problem = Problem("brackets nested too deep", "a plain list or table", "", self.file)
        except ValueError as error:
            problem = self._syntax(str(error), last=text.count("\n") + 1)
        raise failure(self.file, [problem])

    def _syntax(self, message: str, last: int) -> Problem:
        match = _AT.search(message)
        line = f", line {match['line'] or last}" if match else ""
        column = f", column {match['column']}" if match and match["column"] else ""
        return Problem(_AT.sub("", message), "TOML", "texts stand in double quotes", f"{self.file}{line}{column}")

    def finish(self) -> None:
        """Raise what was found.

        Raises
        ------
        TableError : anything at all was wrong
        """
        if self.problems:
            raise failure(self.file, self.problems)


class Place:
    """One table of a TOML file: its keys are read through it, and what is wrong is reported to the file.

    A table that is missing altogether is reported once and stays silent about its keys.
    """

    def __init__(self, file: TomlFile, name: str, keys: dict[str, Any], silent: bool = False) -> None:
        self.file = file
        self.name = name
        self.keys = keys
        self.silent = silent

    def report(self, key: str, given: str, allowed: str, remedy: str = "") -> None:
        """Add a problem at `key` of this table."""
        if self.silent:
            return
        at = " ".join(filter(None, [self.name, key]))
        self.file.problems.append(Problem(given, allowed, remedy, ", ".join(filter(None, [self.file.file, at]))))

    def only(self, *known: str) -> None:
        """Report every key that is not one of `known`."""
        for key in self.keys:
            if key not in known:
                remedy = did_you_mean(key, known) or "remove it"
                self.report("", f"unknown key {shown(key)}", one_of(known), remedy)

    def value(self, key: str, allowed: str, required: bool = True) -> Any:
        """What stands at `key`; a missing required key is reported, and ``None`` returned."""
        if key not in self.keys and required:
            self.report(key, f"{key} is missing", allowed, "add it")
        return self.keys.get(key)

    def text(self, key: str, required: bool = True) -> str:
        """The text at `key`, verbatim; an empty string where it is missing or wrong."""
        value = self.value(key, "a text in quotes", required)
        return "" if value is None else self.checked(key, value)

    def checked(self, key: str, value: object) -> str:
        """`value` where it is a text that says something and hides nothing; else reported and empty."""
        if not isinstance(value, str):
            self.report(key, f"{key} = {shown(value)}", "a text in quotes", "put it in double quotes")
        elif not value.strip():
            self.report(key, f"{key} is empty", "a text", "fill it in")
        elif hidden := hidden_character(value):
            self.report(key, f"{key} holds the control character {hidden}", "printable characters", "remove it")
        else:
            return value
        return ""

    def choice(self, key: str, allowed: Sequence[str]) -> str:
        """The text at `key`, one of `allowed`; an empty string where it is not."""
        value = self.value(key, one_of(allowed))
        return "" if value is None else self.chosen(key, value, allowed)

    def chosen(self, key: str, value: object, allowed: Sequence[str]) -> str:
        """`value` where it is one of `allowed`; else reported and empty."""
        if isinstance(value, str) and value in allowed:
            return value
        self.report(key, f"{key} = {shown(value)}", one_of(allowed), did_you_mean(str(value), allowed))
        return ""

    def date(self, key: str) -> date | None:
        """The calendar date at `key`, ``None`` where it is missing or wrong."""
        allowed = "a date without quotes, e.g. 2026-11-02"
        value = self.value(key, allowed)
        if isinstance(value, date) and not isinstance(value, datetime):
            return value
        if value is not None:
            self.report(key, f"{key} = {shown(value)}", allowed)
        return None

    def table(self, key: str, required: bool = True) -> Place:
        """The table at `key`; an empty one, whose keys are not asked for, where it is missing or no table."""
        value = self.keys.get(key)
        name = f"[{'.'.join(filter(None, [self.name.strip('[]'), key]))}]"
        if isinstance(value, dict):
            return Place(self.file, name, value)
        if value is not None:
            self.report("", f"{key} = {shown(value)}", f"a table {name}", "")
        elif required:
            self.report("", f"{name} is missing", "the table with its keys", "add it")
        return Place(self.file, name, {}, silent=True)

    def entries(self, key: str) -> Iterator[Place]:
        """The tables of an array ``[[key]]``, each named by its number from 1; what is no table is reported."""
        value = self.keys.get(key, [])
        if not isinstance(value, list):
            self.report("", f"{key} is a single value or table", f"a list of tables [[{key}]]", "double the brackets")
            return
        for number, entry in enumerate(value, 1):
            if isinstance(entry, dict):
                yield Place(self.file, f"[[{key}]] {number}", entry)
            else:
                self.report("", f"{key} = {shown(entry)}", f"a table [[{key}]]", "")
