"""The ledger: every value a package states, where it comes from, and what it goes into.

An entry is a *given* (a value with its source), a *worked* value (an expression over other entries), a *solved*
value (found by iteration from other entries, and confirmed by worked entries that come after it) or a *verdict*.
Entries form an acyclic graph: a solved value rests on what it was solved from, and what confirms it rests on it. The
hash of an entry covers its own content, without its id, sheet and printed form, and the hashes of the entries it rests
on, so a change shows in exactly the entries that depend on it.
"""

from __future__ import annotations

import hashlib
import json
import math
from collections.abc import Iterable, Iterator, Mapping
from dataclasses import dataclass, field, fields, replace
from typing import Any

from calcpack import expression
from calcpack.errors import FormulaError, LedgerError

__all__ = ["KINDS", "Entry", "Ledger", "Replayed", "passes", "replay"]

KINDS = ("given", "worked", "solved", "verdict")
_OF_KIND: dict[str, tuple[str, ...]] = {
    "given": ("source", "status"),
    "worked": ("clause", "edition", "expression", "where", "condition", "formula"),
    "solved": ("clause", "edition", "method", "solved_from", "confirmed_by"),
    "verdict": ("clause", "edition", "demand", "capacity", "ratio", "verdict"),
}
_COMMON = ("id", "kind", "symbol", "means", "value", "unit", "shown", "sheet")
_OPTIONAL = ("condition", "formula", "edition")
_LISTS = ("solved_from", "confirmed_by")
_HASHED_AS_TEXT = (
    "kind",
    "symbol",
    "means",
    "unit",
    "source",
    "status",
    "clause",
    "edition",
    "expression",
    "condition",
)
_TOLERANCE = 1e-9
# A ratio that exceeds 1 by the noise of binary arithmetic alone is not a failure.
_SLACK = 1e-9
# A difference that confirms a solved value, as a ratio, is at most this.
_VANISHES = 1e-6


@dataclass(frozen=True)
class Entry:
    """One entry; which fields hold something depends on its kind. Values are in the coherent unit `unit`."""

    id: str
    kind: str
    symbol: str
    means: str
    value: float
    unit: str
    shown: str
    sheet: str
    source: str = ""
    status: str = ""
    clause: str = ""
    edition: str = ""
    expression: str = ""
    where: Mapping[str, str] = field(default_factory=dict)
    condition: str = ""
    formula: str = ""
    method: str = ""
    solved_from: tuple[str, ...] = ()
    confirmed_by: tuple[str, ...] = ()
    demand: str = ""
    capacity: str = ""
    ratio: float | None = None
    verdict: str = ""

    def rests_on(self) -> tuple[str, ...]:
        """Ids of the entries this one was made from, each once, in order."""
        ids = [*self.where.values(), *self.solved_from, *filter(None, (self.demand, self.capacity))]
        return tuple(dict.fromkeys(ids))

    def to_json(self) -> dict[str, Any]:
        """The entry as plain data, with the fields of its kind."""
        data: dict[str, Any] = {name: getattr(self, name) for name in (*_COMMON, *_OF_KIND[self.kind])}
        data = {name: value for name, value in data.items() if value or name not in _OPTIONAL}
        for name in ("where", *_LISTS):
            if name in data:
                data[name] = dict(data[name]) if name == "where" else list(data[name])
        return data

    @classmethod
    def from_json(cls, data: Mapping[str, Any]) -> Entry:
        """The entry that `to_json` wrote.

        Raises
        ------
        LedgerError : a key is missing or holds something else than it should, or the kind is unknown
        """
        if not isinstance(data, Mapping):
            raise LedgerError(f"an entry of the ledger is {data!r}, not an object")
        if data.get("kind") not in KINDS:
            raise LedgerError(f"entry {data.get('id')!r}: kind {data.get('kind')!r}, allowed {', '.join(KINDS)}")
        missing = [name for name in (*_COMMON, *_OF_KIND[data["kind"]]) if name not in data and name not in _OPTIONAL]
        if missing:
            raise LedgerError(f"entry {data.get('id')!r}: no {', '.join(missing)}")
        known = {item.name for item in fields(cls)}
        values = {name: value for name, value in data.items() if name in known}
        wrong = [f"{name} = {value!r}" for name, value in values.items() if not _fits(name, value)]
        if wrong:
            raise LedgerError(f"entry {data.get('id')!r}: {', '.join(wrong)} is not what a ledger holds there")
        return cls(**{**values, **{name: tuple(values.get(name, ())) for name in _LISTS}})


def _fits(name: str, value: Any) -> bool:
    if name in ("value", "ratio"):
        return (isinstance(value, (int, float)) and not isinstance(value, bool)) or (name == "ratio" and value is None)
    if name == "where":
        return isinstance(value, Mapping) and all(isinstance(item, str) for item in value.values())
    if name in _LISTS:
        return isinstance(value, (list, tuple)) and all(isinstance(item, str) for item in value)
    return isinstance(value, str)


class Ledger:
    """Entries in order of appearance, each with its hash; an entry may rest only on entries before it."""

    def __init__(self, entries: Iterable[Entry] = ()) -> None:
        self._entries: dict[str, Entry] = {}
        self._hashes: dict[str, str] = {}
        self._users: dict[str, list[str]] = {}
        for entry in entries:
            self.add(entry)

    def __iter__(self) -> Iterator[Entry]:
        return iter(self._entries.values())

    def __len__(self) -> int:
        return len(self._entries)

    def __contains__(self, identifier: object) -> bool:
        return identifier in self._entries

    def __getitem__(self, identifier: str) -> Entry:
        if identifier not in self._entries:
            raise LedgerError(f"no entry {identifier!r} in the ledger")
        return self._entries[identifier]

    def add(self, entry: Entry) -> None:
        """Append an entry.

        Raises
        ------
        LedgerError : its id is taken, it rests on an entry that is not there, it has no source, or it is no number
        """
        if entry.id in self._entries:
            raise LedgerError(f"{entry.id} is in the ledger already")
        missing = [identifier for identifier in entry.rests_on() if identifier not in self._hashes]
        if missing:
            raise LedgerError(f"{entry.id} rests on {', '.join(missing)}, which the ledger does not hold before it")
        if entry.kind == "given" and not entry.source.strip():
            raise LedgerError(
                f"{entry.id}: a given has a source (drawing and revision, report, clause); write source='…'"
            )
        if not math.isfinite(entry.value):
            raise LedgerError(f"{entry.id} = {entry.value} is not a finite number")
        self._entries[entry.id] = entry
        self._hashes[entry.id] = self._hash(entry)
        for identifier in entry.rests_on():
            self._users.setdefault(identifier, []).append(entry.id)

    def confirm(self, identifier: str, by: Iterable[str]) -> Entry:
        """Note the entries by which a hand confirms a solved value, and return the entry that says so.

        Raises
        ------
        LedgerError : it is no solved value, or an entry does not rest on it, so that it cannot confirm it
        """
        entry = self[identifier]
        if entry.kind != "solved":
            raise LedgerError(f"{identifier} is {entry.kind}: only a solved value is confirmed by others")
        confirmed = replace(entry, confirmed_by=tuple(dict.fromkeys((*entry.confirmed_by, *by))))
        _refuse_unconfirming(self, confirmed)
        self._entries[identifier] = confirmed
        return confirmed

    def admit(self, identifier: str, digest: str) -> None:
        """Let entries rest on an entry of another sheet, known by its hash alone."""
        self._hashes[identifier] = digest

    def admit_all(self, other: Ledger) -> None:
        """Admit what another ledger admitted."""
        for identifier, digest in other._hashes.items():
            if identifier not in other:
                self.admit(identifier, digest)

    def hash(self, identifier: str) -> str:
        """The content hash of an entry."""
        return self._hashes[identifier]

    def users(self, identifier: str) -> tuple[str, ...]:
        """Ids of the entries that rest directly on this one."""
        return tuple(self._users.get(identifier, ()))

    def below(self, identifier: str) -> frozenset[str]:
        """Ids of everything an entry rests on, at any depth."""
        return self._reach(identifier, lambda found: self[found].rests_on())

    def above(self, identifier: str) -> frozenset[str]:
        """Ids of everything that rests on an entry, at any depth."""
        return self._reach(identifier, self.users)

    def find(self, name: str) -> tuple[Entry, ...]:
        """Entries called `name`: by id, by ``sheet/symbol``, or by symbol on any sheet."""
        if name in self._entries:
            return (self._entries[name],)
        return tuple(entry for entry in self if entry.symbol == name)

    def to_json(self) -> list[dict[str, Any]]:
        """The entries as plain data, each with its hash."""
        return [{**entry.to_json(), "hash": self.hash(entry.id)} for entry in self]

    @classmethod
    def from_json(cls, data: Iterable[Mapping[str, Any]]) -> Ledger:
        """Read a ledger, in any order, and check its hashes.

        Raises
        ------
        LedgerError : a circular reference (named in full), a missing entry, or a hash that does not fit the content
        """
        data = list(data)
        entries = {item.id: item for item in map(Entry.from_json, data)}
        if len(entries) != len(data):
            raise LedgerError("the ledger holds an id twice")
        _refuse_cycles(entries)
        ledger = cls(_in_order(entries))
        for entry in ledger:
            _refuse_unconfirming(ledger, entry)
        for item in data:
            if item.get("hash") not in (None, ledger.hash(item["id"])):
                raise LedgerError(f"{item['id']}: its hash does not fit its content; the ledger was changed by hand")
        return ledger

    def _reach(self, start: str, step: Any) -> frozenset[str]:
        found: set[str] = set()
        waiting = list(step(start))
        while waiting:
            identifier = waiting.pop()
            if identifier not in found:
                found.add(identifier)
                waiting.extend(step(identifier))
        return frozenset(found)

    def _hash(self, entry: Entry) -> str:
        content: dict[str, Any] = {name: getattr(entry, name) for name in (*_HASHED_AS_TEXT, "method", "verdict")}
        content["value"] = repr(float(entry.value))
        content["ratio"] = repr(entry.ratio)
        content["where"] = {symbol: self._hashes[identifier] for symbol, identifier in sorted(entry.where.items())}
        content["rests_on"] = [self._hashes[identifier] for identifier in entry.rests_on()]
        text = json.dumps(content, sort_keys=True, separators=(",", ":"), ensure_ascii=False)
        return hashlib.sha256(text.encode()).hexdigest()


def passes(ratio: float) -> bool:
    """Whether a ratio of demand to capacity is at most 1."""
    return ratio <= 1.0 + _SLACK


def _refuse_unconfirming(ledger: Ledger, entry: Entry) -> None:
    for identifier in entry.confirmed_by:
        if identifier not in ledger or entry.id not in ledger.below(identifier):
            raise LedgerError(f"{entry.id} is confirmed by {identifier}, which does not rest on it")


def _refuse_cycles(entries: Mapping[str, Entry]) -> None:
    done: set[str] = set()
    for start in entries:
        path: dict[str, None] = {}
        stack: list[tuple[str, bool]] = [(start, False)]
        while stack:
            identifier, leaving = stack.pop()
            if leaving:
                path.pop(identifier, None)
                done.add(identifier)
                continue
            if identifier in path:
                chain = [*path, identifier][list(path).index(identifier) :]
                raise LedgerError(f"circular reference: {' rests on '.join(chain)}")
            if identifier in done or identifier not in entries:
                continue
            path[identifier] = None
            stack.append((identifier, True))
            stack.extend((below, False) for below in entries[identifier].rests_on())


def _in_order(entries: Mapping[str, Entry]) -> list[Entry]:
    """The entries as they stand, each moved behind what it rests on only where it has to be."""
    ordered: dict[str, Entry] = {}
    for start in entries:
        stack = [start]
        while stack:
            entry = entries.get(stack[-1])
            waiting = [item for item in entry.rests_on() if item in entries and item not in ordered] if entry else []
            if waiting:
                stack.extend(reversed(waiting))
            else:
                if entry:
                    ordered.setdefault(stack[-1], entry)
                stack.pop()
    return list(ordered.values())


@dataclass(frozen=True)
class Replayed:
    """One worked value, condition or verdict worked again from the file: what it states, what comes out."""

    id: str
    what: str
    stated: float
    replayed: float

    @property
    def agrees(self) -> bool:
        """Whether both are the same number."""
        return math.isclose(self.stated, self.replayed, rel_tol=_TOLERANCE, abs_tol=1e-12)


def replay(data: Iterable[Mapping[str, Any]]) -> list[Replayed]:
    """Work every line of a ledger again from its printed expressions alone, without any formula of calcpack.

    Each line is evaluated from the values that its own inputs *replay* to, so one wrong number shows in everything
    above it. Verdicts are compared with the quotient of their demand and capacity; a difference that confirms a solved
    value has to vanish.

    Raises
    ------
    LedgerError : an expression is not arithmetic, or refers to something that is not there
    """
    ledger = Ledger.from_json({**item, "hash": None} for item in data)
    values: dict[str, float] = {}
    done: list[Replayed] = []
    for entry in ledger:
        values[entry.id] = entry.value
        try:
            done += _replayed(entry, values)
        except FormulaError as error:
            raise LedgerError(f"{entry.id}: {error}") from error
    return [*done, *_confirmed(ledger, values)]


def _confirmed(ledger: Ledger, values: Mapping[str, float]) -> Iterator[Replayed]:
    for entry in ledger:
        for identifier in entry.confirmed_by:
            if ledger[identifier].unit == "":
                vanishes = abs(values[identifier]) <= _VANISHES
                yield Replayed(entry.id, f"confirmed by {identifier}", 1.0, float(vanishes))


def _replayed(entry: Entry, values: dict[str, float]) -> Iterator[Replayed]:
    symbols = {symbol: values[identifier] for symbol, identifier in entry.where.items()}
    if entry.kind == "worked":
        values[entry.id] = expression.evaluate(entry.expression, symbols)
        yield Replayed(entry.id, entry.expression, entry.value, values[entry.id])
        if entry.condition:
            yield Replayed(
                entry.id, entry.condition, 1.0, expression.evaluate(entry.condition, symbols, condition=True)
            )
    elif entry.kind == "verdict":
        ratio = values[entry.demand] / values[entry.capacity] if values[entry.capacity] else math.inf
        yield Replayed(entry.id, "demand / capacity", entry.value, ratio)
        if entry.ratio is not None:
            yield Replayed(entry.id, "ratio", entry.ratio, ratio)
        yield Replayed(
            entry.id, f"verdict {entry.verdict}", 1.0, float(entry.verdict == ("OK" if passes(ratio) else "NG"))
        )
