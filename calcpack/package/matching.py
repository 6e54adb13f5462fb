"""Which value of one ledger is which value of another, though lines, rows and values have moved.

Ids are given in order of appearance (``C-01/h``, ``C-01/h.2``), so a line that is inserted shifts the ids behind it.
What is the same in both is therefore matched by content first; what remains, by what it is and what it was made from,
then by where it stands; an id alone makes no match, unless the symbol stands once on the sheet.
"""

from __future__ import annotations

import re
from collections import Counter, defaultdict, deque
from collections.abc import Callable, Hashable, Iterable, Mapping
from dataclasses import dataclass, field, replace

from calcpack.ledger import Entry, Ledger

__all__ = ["TEXTS", "Side", "match", "placeless", "sides", "wires"]

TEXTS = (
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
    "method",
)
_ROW = re.compile(r"(\binputs/[^,()]+), row \d+")


@dataclass(frozen=True)
class Side:
    """One ledger, with what its entries are matched by. A number stands for equal things in both ledgers.

    Attributes
    ----------
    texts : id to the entry's own texts
    shapes : id to its texts and those of everything it rests on, values aside
    contents : id to all of that with the values; the row of a table is no content
    wires : id to what it rests on, by part
    alone : ids of entries whose symbol stands once on its sheet
    gaps : id to the entry before it on its sheet that is the same in both ledgers, by its id in the old one
    """

    ledger: Ledger
    texts: Mapping[str, int]
    shapes: Mapping[str, int]
    contents: Mapping[str, int]
    wires: Mapping[str, Mapping[str, str]]
    alone: frozenset[str]
    gaps: Mapping[str, str] = field(default_factory=dict)


_Key = Callable[[Side, Entry], Hashable]
_Of = Callable[[Entry], Hashable]
_Test = Callable[[Side, Entry], bool]


def placeless(source: str) -> str:
    """A source without the row of the table: a row that is inserted above does not make another source."""
    return _ROW.sub(r"\1", source)


def wires(entry: Entry) -> dict[str, str]:
    """Ids of what an entry rests on, by the symbol or the part they play in it."""
    parts = {"demand": entry.demand, "capacity": entry.capacity}
    from_ = {f"input {index}": identifier for index, identifier in enumerate(entry.solved_from, 1)}
    return {**entry.where, **from_, **{part: identifier for part, identifier in parts.items() if identifier}}


def sides(old: Ledger, new: Ledger) -> tuple[Side, Side]:
    """Both ledgers, made ready to be matched."""
    numbers: dict[Hashable, int] = {}
    return _side(old, numbers), _side(new, numbers)


def _side(ledger: Ledger, numbers: dict[Hashable, int]) -> Side:
    texts: dict[str, int] = {}
    shapes: dict[str, int] = {}
    contents: dict[str, int] = {}
    made_from = {entry.id: wires(entry) for entry in ledger}
    for entry in ledger:
        below = sorted(made_from[entry.id].items())
        words = tuple(placeless(entry.source) if name == "source" else getattr(entry, name) for name in TEXTS)
        text = numbers.setdefault(words, len(numbers))
        shape = (text, *((part, shapes[identifier]) for part, identifier in below))
        stated = (float(entry.value), entry.ratio, entry.verdict)
        content = (stated, text, *((part, contents[identifier]) for part, identifier in below))
        texts[entry.id] = text
        shapes[entry.id] = numbers.setdefault(("shape", shape), len(numbers))
        contents[entry.id] = numbers.setdefault(("content", content), len(numbers))
    count = Counter(map(_family, ledger))
    alone = frozenset(entry.id for entry in ledger if count[_family(entry)] == 1)
    return Side(ledger, texts, shapes, contents, made_from, alone)


def match(old: Side, new: Side) -> dict[str, str]:
    """Id in the new ledger to id in the old one, for all that both hold.

    Only values of one symbol on one sheet match, and verdicts of one sheet.
    """
    found: dict[str, str] = {}
    for place in (_by_id, _anywhere):
        _join(found, old, new, _both(_content, place))
    old = replace(old, gaps=_gaps(old.ledger, {identifier: identifier for identifier in found.values()}))
    new = replace(new, gaps=_gaps(new.ledger, found))
    for key in (*_KEYS, *_REWORDED):
        _join(found, old, new, key, _is_given)
    _follow(found, old, new, _text)
    for key in _KEYS:
        _join(found, old, new, key)
        _follow(found, old, new, _text)
    _follow(found, old, new, _kind)
    _join(found, old, new, _anywhere, _is_alone)
    _follow(found, old, new, _text)
    return found


def _is_any(_: Side, __: Entry) -> bool:
    return True


def _is_given(_: Side, entry: Entry) -> bool:
    return entry.kind == "given"


def _is_made(side: Side, entry: Entry) -> bool:
    return bool(side.wires[entry.id])


def _is_alone(side: Side, entry: Entry) -> bool:
    return entry.id in side.alone


def _join(found: dict[str, str], old: Side, new: Side, key: _Key, among: _Test = _is_any) -> None:
    """Match what has the same key, in order of appearance."""
    _pair(found, old, new, lambda entry: key(old, entry), lambda entry: key(new, entry), among)


def _follow(found: dict[str, str], old: Side, new: Side, what: _Key) -> None:
    """Match what was made from the same values, from the givens upward: one match leads to the next."""

    def was(entry: Entry) -> Hashable:
        """What it was made from."""
        return what(old, entry), frozenset(old.wires[entry.id].items())

    def now(entry: Entry) -> Hashable:
        """What it is made from, by the ids of before."""
        below = new.wires[entry.id].items()
        return what(new, entry), frozenset((part, found.get(identifier, "")) for part, identifier in below)

    _pair(found, old, new, was, now, _is_made)


def _pair(found: dict[str, str], old: Side, new: Side, was: _Of, now: _Of, among: _Test) -> None:
    waiting: defaultdict[Hashable, deque[str]] = defaultdict(deque)
    open_ = [entry for entry in new.ledger if entry.id not in found and among(new, entry)]
    taken = set(found.values()) if open_ else set()
    for entry in old.ledger if open_ else ():
        if entry.id not in taken and among(old, entry):
            waiting[_family(entry), was(entry)].append(entry.id)
    for entry in open_ if waiting else ():
        queue = waiting.get((_family(entry), now(entry)))
        if queue:
            found[entry.id] = queue.popleft()


def _gaps(entries: Iterable[Entry], anchors: Mapping[str, str]) -> dict[str, str]:
    last: dict[str, str] = {}
    gaps: dict[str, str] = {}
    for entry in entries:
        gaps[entry.id] = last.get(entry.sheet, "")
        last[entry.sheet] = anchors.get(entry.id, gaps[entry.id])
    return gaps


def _family(entry: Entry) -> tuple[str, str, bool]:
    return entry.sheet, entry.symbol, entry.kind == "verdict"


def _content(side: Side, entry: Entry) -> Hashable:
    return side.contents[entry.id]


def _shape(side: Side, entry: Entry) -> Hashable:
    return side.shapes[entry.id]


def _text(side: Side, entry: Entry) -> Hashable:
    return side.texts[entry.id]


def _means(_: Side, entry: Entry) -> Hashable:
    return entry.means


def _in_gap(side: Side, entry: Entry) -> Hashable:
    return side.gaps[entry.id]


def _by_id(_: Side, entry: Entry) -> Hashable:
    return entry.id


def _kind(_: Side, entry: Entry) -> Hashable:
    return entry.kind


def _source(_: Side, entry: Entry) -> Hashable:
    return placeless(entry.source)


def _value(_: Side, entry: Entry) -> Hashable:
    return float(entry.value)


def _anywhere(_: Side, __: Entry) -> Hashable:
    return None


def _both(what: _Key, place: _Key) -> _Key:
    return lambda side, entry: (what(side, entry), place(side, entry))


# From what says most about a value to what says least.
_KEYS: tuple[_Key, ...] = tuple(
    _both(what, place) for what in (_shape, _text, _means) for place in (_in_gap, _by_id, _anywhere)
)
# A given under the same id whose words alone are others.
_REWORDED = (_both(_source, _by_id), _both(_value, _by_id))
