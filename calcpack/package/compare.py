"""What differs between two ledgers: what was changed, what only follows from it, what was added and dropped.

A value is *changed* where its own content differs: its value where it is a given, its source, its expression, what it
rests on. It *follows* where nothing of its own differs but something below it does.
"""

from __future__ import annotations

import math
from collections.abc import Callable, Iterator, Mapping
from dataclasses import dataclass, replace

from calcpack.ledger import Entry, Ledger
from calcpack.package.matching import TEXTS, Side, match, placeless, sides

__all__ = ["Change", "Comparison", "SheetChange", "compare"]

# Two results that differ by the noise of binary arithmetic are the same number; so are residuals that vanish.
_NOISE, _NOTHING = 1e-12, 1e-9


@dataclass(frozen=True)
class Change:
    """A value or verdict that is in both ledgers and is not the same.

    Attributes
    ----------
    old, new : the entry in each
    differs : what of its own content differs, by the entry's field names; empty where it only follows
    verdicts : ids of the new verdicts that rest on it
    """

    old: Entry
    new: Entry
    differs: tuple[str, ...] = ()
    verdicts: tuple[str, ...] = ()

    @property
    def moved(self) -> bool:
        """Whether its value is another number, or its verdict another word."""
        return self.turned or not math.isclose(self.old.value, self.new.value, rel_tol=_NOISE, abs_tol=_NOTHING)

    @property
    def turned(self) -> bool:
        """Whether its verdict is another word."""
        return self.old.verdict != self.new.verdict

    @property
    def change(self) -> float | None:
        """New value less old, in the coherent unit; nothing where the units differ."""
        return _finite(self.new.value - self.old.value) if self.old.unit == self.new.unit else None

    @property
    def percent(self) -> float | None:
        """The change in per cent of the size of the old value; nothing where that is zero."""
        if self.change is None or not self.old.value:
            return None
        return _finite(100 * (self.change / abs(self.old.value)))


def _finite(number: float) -> float | None:
    return number if math.isfinite(number) else None


@dataclass(frozen=True)
class SheetChange:
    """A sheet that is ``added``, ``dropped`` or ``changed``; a subject that is not known is empty."""

    id: str
    state: str
    old_subject: str = ""
    new_subject: str = ""


@dataclass(frozen=True)
class Comparison:
    """Two ledgers compared; everything in order of appearance.

    Attributes
    ----------
    changed : values and verdicts whose own content differs
    followed : those that differ only because something below them does
    added, dropped : entries of the new and of the old ledger alone
    shifted : givens of the new ledger that only stand in another row of their table
    sheets : those added, dropped and changed
    count : how many entries the new ledger holds
    """

    changed: tuple[Change, ...]
    followed: tuple[Change, ...]
    added: tuple[Entry, ...]
    dropped: tuple[Entry, ...]
    shifted: tuple[Entry, ...]
    sheets: tuple[SheetChange, ...]
    count: int

    @property
    def is_empty(self) -> bool:
        """Whether nothing differs."""
        return not (self.changed or self.followed or self.added or self.dropped or self.sheets)

    @property
    def turned(self) -> tuple[Change, ...]:
        """Verdicts that went from OK to NG or back."""
        return tuple(change for change in (*self.changed, *self.followed) if change.turned)

    @property
    def failing(self) -> tuple[Entry, ...]:
        """Verdicts that are not OK in the new ledger and were OK or absent in the old one."""
        entries = (*(change.new for change in self.turned), *self.added)
        return tuple(entry for entry in entries if entry.kind == "verdict" and entry.verdict != "OK")


def compare(
    old: Ledger,
    new: Ledger,
    old_sheets: Mapping[str, str] | None = None,
    new_sheets: Mapping[str, str] | None = None,
) -> Comparison:
    """Compare two whole ledgers.

    Parameters
    ----------
    old_sheets, new_sheets : sheet id to subject, where that is known; an unknown subject is empty
    """
    before, after = sides(old, new)
    found = match(before, after)
    changes = list(_changes(before, after, found))
    resting = _resting(new)
    changed = [replace(change, verdicts=resting(change.new.id)) for change in changes if change.differs]
    taken = set(found.values())
    added = tuple(entry for entry in new if entry.id not in found)
    dropped = tuple(entry for entry in old if entry.id not in taken)
    touched = {entry.sheet for entry in (*(change.new for change in changes), *added, *dropped)}
    return Comparison(
        changed=tuple(changed),
        followed=tuple(change for change in changes if not change.differs),
        added=added,
        dropped=dropped,
        shifted=tuple(_shifted(before, after, found)),
        sheets=tuple(_sheets(_named(old, old_sheets, new_sheets), _named(new, new_sheets, old_sheets), touched)),
        count=len(new),
    )


def _changes(old: Side, new: Side, found: Mapping[str, str]) -> Iterator[Change]:
    taken = set(found.values())
    for entry in new.ledger:
        was = found.get(entry.id)
        if was is not None and old.contents[was] != new.contents[entry.id]:
            before = old.ledger[was]
            rewired, moved = _below(old, new, found, taken, before, entry)
            yield Change(before, entry, tuple(_differs(before, entry, rewired, moved)))


def _below(
    old: Side, new: Side, found: Mapping[str, str], taken: set[str], before: Entry, after: Entry
) -> tuple[bool, bool]:
    """Whether an entry rests on other values than before, and whether what it rests on has other content."""
    was, now = old.wires[before.id], new.wires[after.id]
    if was.keys() != now.keys():
        return True, True
    rewired = moved = False
    for part, identifier in now.items():
        if old.contents[was[part]] != new.contents[identifier]:
            moved = True
            # What rests on a value that was dropped, or on one that was added for it, only follows.
            known = identifier in found and was[part] in taken
            rewired = rewired or (known and found[identifier] != was[part])
    return rewired, moved


def _differs(before: Entry, after: Entry, rewired: bool, moved: bool) -> list[str]:
    names = [name for name in TEXTS if _own(before, name) != _own(after, name)]
    if rewired and before.expression == after.expression:
        names.append("rests_on")
    # A result is of its own only where nothing else tells why it is another.
    stated = before.kind == after.kind == "given" or not (names or moved)
    if stated and (before.value, before.ratio, before.verdict) != (after.value, after.ratio, after.verdict):
        names.append("value")
    return names


def _own(entry: Entry, name: str) -> str:
    return placeless(entry.source) if name == "source" else str(getattr(entry, name))


def _shifted(old: Side, new: Side, found: Mapping[str, str]) -> Iterator[Entry]:
    for entry in new.ledger:
        was = found.get(entry.id)
        same = was is not None and old.contents[was] == new.contents[entry.id]
        if was is not None and same and old.ledger[was].source != entry.source:
            yield entry


def _resting(ledger: Ledger) -> Callable[[str], tuple[str, ...]]:
    """What gives the ids of the verdicts that rest on an entry; the ledger is gone through once, from its end."""
    entries = list(ledger)
    verdicts = [entry.id for entry in entries if entry.kind == "verdict"]
    above = {identifier: 1 << index for index, identifier in enumerate(verdicts)}
    for entry in reversed(entries):
        bits = above.get(entry.id, 0)
        for identifier in entry.rests_on() if bits else ():
            above[identifier] = above.get(identifier, 0) | bits

    def of(identifier: str) -> tuple[str, ...]:
        """The verdicts that rest on it."""
        bits = f"{above.get(identifier, 0):b}"[::-1]
        return tuple(verdict for verdict, bit in zip(verdicts, bits, strict=False) if bit == "1")

    return of


def _named(ledger: Ledger, own: Mapping[str, str] | None, other: Mapping[str, str] | None) -> dict[str, str]:
    """The sheets of a ledger; one without any value counts only where both sides list their sheets."""
    named = dict(own or {}) if own and other else {}
    for entry in ledger:
        if entry.sheet not in named:
            named[entry.sheet] = (own or {}).get(entry.sheet, "")
    return named


def _sheets(old: Mapping[str, str], new: Mapping[str, str], touched: set[str]) -> Iterator[SheetChange]:
    for sheet, subject in new.items():
        was = old.get(sheet, "")
        if sheet not in old:
            yield SheetChange(sheet, "added", "", subject)
        elif sheet in touched or (was and subject and was != subject):
            yield SheetChange(sheet, "changed", was, subject)
    for sheet, subject in old.items():
        if sheet not in new:
            yield SheetChange(sheet, "dropped", subject, "")
