"""How a comparison reads: as text for a person, and as one JSON object at full precision."""

from __future__ import annotations

from collections import defaultdict
from collections.abc import Callable, Iterator, Mapping, Sequence
from dataclasses import dataclass, field
from typing import Any

from calcpack.ledger import Entry
from calcpack.package.compare import Change, Comparison, SheetChange
from calcpack.package.issued import Issued
from calcpack.package.matching import wires
from calcpack.package.moved import from_to, percent_text

__all__ = ["compare_json", "compare_text"]

_LISTED = 10
_VERDICTS = 4
# What another kind of entry states instead; told in one line.
_ORIGIN = ("kind", "source", "status", "clause", "edition", "expression", "condition", "method", "rests_on")


def compare_text(found: Comparison, old: Issued, new: Issued, everything: bool = False) -> str:
    """The comparison for a person: what turned, then sheet by sheet what was changed and what follows.

    Parameters
    ----------
    everything : list every value; else the ten of each kind and sheet that moved most, and how many more there are
    """
    width = max(len(old.path), len(new.path))
    lines = [f"{name}  {side.path:<{width}}  {_named(side)}".rstrip() for name, side in (("old", old), ("new", new))]
    lines += ["", *_summary(found)]
    listed = _Listed(None if everything else _LISTED)
    turned = {change.new.id: f" {change.old.verdict} → {change.new.verdict}" for change in found.turned}
    parts = _by_sheet(found)
    for sheet in found.sheets:
        lines += ["", *_sheet(sheet, parts[sheet.id], listed, turned)]
    if listed.hidden:
        lines += ["", "calcpack compare --all lists every value"]
    return "\n".join(lines)


class _Listed:
    """Lists so many of each kind, and remembers whether some were left out."""

    def __init__(self, most: int | None) -> None:
        self.most = most
        self.hidden = 0

    def __call__(self, title: str, blocks: Sequence[Sequence[str]], least: int = 0) -> Iterator[str]:
        """A list under its title; at least the first `least` blocks are in it."""
        if not blocks:
            return
        most = len(blocks) if self.most is None else max(self.most, least)
        yield f"  {title}"
        for block in blocks[:most]:
            yield from (f"    {line}" for line in block)
        if blocks[most:]:
            self.hidden += len(blocks) - most
            yield f"    and {len(blocks) - most:,} more"


def _named(side: Issued) -> str:
    return ", ".join(filter(None, (side.job, side.label)))


def _summary(found: Comparison) -> Iterator[str]:
    if found.is_empty:
        yield f"no difference: {_count(found.count, 'value')}"
    else:
        states = [sheet.state for sheet in found.sheets]
        yield _counted("sheets", [(states.count(state), state) for state in ("changed", "added", "dropped")])
        yield _counted("values", _counts(found, _is_value))
        yield _counted("verdicts", _counts(found, _is_verdict))
    if found.shifted:
        yield f"{_count(len(found.shifted), 'given')} otherwise the same in another row of the table"
    turned = {change.new.id for change in found.turned}
    for change in found.turned:
        yield f"{change.new.verdict} now: {_line(change)}"
    for entry in found.failing:
        if entry.id not in turned:
            yield f"{entry.verdict}, added: {_stated(entry)}"


def _counts(found: Comparison, group: Callable[[Entry], bool]) -> list[tuple[int, str]]:
    follow = [change for change in found.followed if group(change.new)]
    moved = sum(change.moved for change in follow)
    return [
        (sum(group(change.new) for change in found.changed), "changed"),
        (moved, "moved with what changed"),
        (len(follow) - moved, "rest on what changed and stand"),
        (sum(map(group, found.added)), "added"),
        (sum(map(group, found.dropped)), "dropped"),
    ]


def _is_verdict(entry: Entry) -> bool:
    return entry.kind == "verdict"


def _is_value(entry: Entry) -> bool:
    return entry.kind != "verdict"


def _count(number: int, name: str) -> str:
    return f"{number:,} {name}{'' if number == 1 else 's'}"


def _counted(name: str, counts: Sequence[tuple[int, str]]) -> str:
    told = ", ".join(f"{number:,} {words}" for number, words in counts if number)
    return f"{name + ':':<10}{told or 'none'}"


@dataclass
class _Part:
    """What of a comparison is on one sheet; it fills while the whole is gone through once."""

    changed: list[Change] = field(default_factory=list)
    followed: list[Change] = field(default_factory=list)
    added: list[Entry] = field(default_factory=list)
    dropped: list[Entry] = field(default_factory=list)


def _by_sheet(found: Comparison) -> Mapping[str, _Part]:
    parts: defaultdict[str, _Part] = defaultdict(_Part)
    for change in found.changed:
        parts[change.new.sheet].changed.append(change)
    for change in found.followed:
        parts[change.new.sheet].followed.append(change)
    for entry in found.added:
        parts[entry.sheet].added.append(entry)
    for entry in found.dropped:
        parts[entry.sheet].dropped.append(entry)
    return parts


def _sheet(sheet: SheetChange, part: _Part, listed: _Listed, turned: Mapping[str, str]) -> Iterator[str]:
    yield "  ".join(filter(None, (sheet.id, _subject(sheet), "" if sheet.state == "changed" else sheet.state)))
    if sheet.state == "changed":
        yield from _moves(part, listed, turned)
        yield from listed("added", [[_stated(entry)] for entry in part.added])
        yield from listed("dropped", [[_stated(entry)] for entry in part.dropped])
    else:
        held = [*part.added, *part.dropped]
        verdicts = sum(map(_is_verdict, held))
        yield f"  {_count(len(held) - verdicts, 'value')}, {_count(verdicts, 'verdict')}"


def _moves(part: _Part, listed: _Listed, turned: Mapping[str, str]) -> Iterator[str]:
    moved = [change for change in part.followed if change.moved]
    own = [change for change in part.changed if _is_value(change.new)]
    own.sort(key=lambda change: change.new.kind != "given")
    yield from listed("changed", [[_line(change), *_reasons(change, turned)] for change in own])
    verdicts = sorted((change for change in (*part.changed, *moved) if _is_verdict(change.new)), key=_order)
    blocks = [[_line(change), *_reasons(change, turned)] for change in verdicts]
    yield from listed("verdicts", blocks, least=sum(change.turned for change in verdicts))
    values = sorted((change for change in moved if _is_value(change.new)), key=_order)
    yield from listed("moved with what changed", [[_line(change)] for change in values])
    if len(part.followed) > len(moved):
        yield f"  {len(part.followed) - len(moved):,} more rest on what changed and stand as they were"


def _subject(sheet: SheetChange) -> str:
    if sheet.state == "changed" and sheet.old_subject and sheet.old_subject != sheet.new_subject:
        return f"{sheet.old_subject} → {sheet.new_subject}"
    return sheet.new_subject or sheet.old_subject


def _order(change: Change) -> tuple[bool, float]:
    size = abs(change.percent) if change.percent is not None else float("inf")
    return not change.turned, -size


def _line(change: Change) -> str:
    before, after = from_to(change)
    if _is_verdict(change.new):
        before, after = f"{before} {change.old.verdict}", f"{after} {change.new.verdict}"
    same = before == after and not change.moved
    values = before if same else f"{before} → {after}"
    moved = "" if same or change.percent is None else percent_text(change.percent)
    return "  ".join(filter(None, (_id(change), values, moved, change.new.means)))


def _id(change: Change) -> str:
    was = "" if change.old.id == change.new.id else f" (was {change.old.id})"
    return f"{change.new.id}{was}"


def _stated(entry: Entry) -> str:
    return f"{entry.id} = {entry.shown}{f' {entry.verdict}' if entry.verdict else ''}  {entry.means}".rstrip()


def _reasons(change: Change, turned: Mapping[str, str]) -> Iterator[str]:
    """What else of its own differs, and the verdicts that rest on it, those first that turned."""
    other = "kind" in change.differs
    if other:
        yield f"  was {_origin(change.old)}"
        yield f"  is {_origin(change.new)}"
    for name in change.differs:
        if name == "value" or (other and name in _ORIGIN):
            continue
        if name == "rests_on":
            yield from _rewired(change)
        else:
            yield f"  {name}: {getattr(change.old, name) or 'none'} → {getattr(change.new, name) or 'none'}"
    if change.verdicts and _is_value(change.new):
        named = sorted(change.verdicts, key=lambda identifier: identifier not in turned)
        first = ", ".join(f"{identifier}{turned.get(identifier, '')}" for identifier in named[:_VERDICTS])
        more = f" and {len(named) - _VERDICTS:,} more" if named[_VERDICTS:] else ""
        yield f"  {_count(len(named), 'verdict')} {'rest' if named[1:] else 'rests'} on it: {first}{more}"


def _origin(entry: Entry) -> str:
    clause = " ".join(filter(None, (entry.edition, entry.clause)))
    stated = entry.source or entry.expression or entry.method
    return f"{entry.kind}: {stated}{f' [{clause}]' if clause else ''}"


def _rewired(change: Change) -> Iterator[str]:
    was, now = wires(change.old), wires(change.new)
    for part in {**was, **now}:
        if was.get(part) != now.get(part):
            yield f"  {part} from: {was.get(part, 'none')} → {now.get(part, 'none')}"


def compare_json(found: Comparison, old: Issued, new: Issued) -> dict[str, Any]:
    """The object of ``calcpack compare --json``; numbers are unrounded and in coherent units."""
    made: dict[str, Any] = {
        name: {"path": side.path, "job": side.job, "label": side.label, "ledger": side.digest}
        for name, side in (("old", old), ("new", new))
    }
    made["same"] = found.is_empty
    made["sheets"] = {
        state: [_sheet_json(sheet) for sheet in found.sheets if sheet.state == state]
        for state in ("added", "dropped", "changed")
    }
    for name, group in (("verdicts", _is_verdict), ("values", _is_value)):
        made[name] = _group_json(found, group)
    made["shifted"] = [entry.id for entry in found.shifted]
    made["failing"] = [entry.id for entry in found.failing]
    return made


def _group_json(found: Comparison, group: Callable[[Entry], bool]) -> dict[str, Any]:
    follow = [change for change in found.followed if group(change.new)]
    changes = [change for change in (*found.changed, *follow) if group(change.new) and (change.differs or change.moved)]
    return {
        "added": [_entry_json(entry) for entry in found.added if group(entry)],
        "dropped": [_entry_json(entry) for entry in found.dropped if group(entry)],
        "changed": [_change_json(change) for change in changes],
        "unmoved": [change.new.id for change in follow if not change.moved],
    }


def _sheet_json(sheet: SheetChange) -> dict[str, Any]:
    return {"id": sheet.id, "subject": {"from": sheet.old_subject, "to": sheet.new_subject}}


def _entry_json(entry: Entry) -> dict[str, Any]:
    names = ("id", "sheet", "kind", "symbol", "means", "value", "unit", "shown", "source", "verdict")
    return {name: getattr(entry, name) for name in names if getattr(entry, name) != "" or name == "unit"}


def _change_json(change: Change) -> dict[str, Any]:
    """From, to and change of the value, in the coherent unit; `cause` says whether it is its own or from below."""
    new = change.new
    made: dict[str, Any] = {name: getattr(new, name) for name in ("id", "sheet", "kind", "symbol", "means", "unit")}
    made["was"] = change.old.id
    made["cause"] = "own" if change.differs else "below"
    made["from"], made["to"] = change.old.value, new.value
    made["change"], made["percent"] = change.change, change.percent
    made["shown"] = dict(zip(("from", "to"), from_to(change), strict=True))
    if _is_verdict(new):
        made["verdict"] = {"from": change.old.verdict, "to": new.verdict}
    made["differs"] = {name: _differs_json(change, name) for name in change.differs}
    made["verdicts"] = list(change.verdicts)
    return made


def _differs_json(change: Change, name: str) -> dict[str, Any]:
    sides = (change.old, change.new)
    return dict(
        zip(("from", "to"), (wires(side) if name == "rests_on" else getattr(side, name) for side in sides), strict=True)
    )
