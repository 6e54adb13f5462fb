"""A value traced as a tree: down to the givens it rests on with their sources, and up to what it goes into."""

from __future__ import annotations

from collections.abc import Iterator

from calcpack.errors import LedgerError
from calcpack.ledger import Entry, Ledger

__all__ = ["trace"]


def trace(ledger: Ledger, name: str) -> str:
    """The trace of a value by id (``A-03/l_d``) or symbol.

    Raises
    ------
    LedgerError : no value of that name; close names are listed
    """
    found = ledger.find(name)
    if not found:
        raise LedgerError(_unknown(ledger, name))
    return "\n\n".join("\n".join(_whole(ledger, entry)) for entry in found)


def _unknown(ledger: Ledger, name: str) -> str:
    from difflib import get_close_matches

    names = [*(entry.id for entry in ledger), *dict.fromkeys(entry.symbol for entry in ledger)]
    near = get_close_matches(name, names, n=5, cutoff=0.5)
    return (
        f"no value called {name!r} in this job; {'close: ' + ', '.join(near) if near else 'ledger.json lists all ids'}"
    )


def _whole(ledger: Ledger, entry: Entry) -> Iterator[str]:
    seen: set[str] = set()
    yield from _tree(ledger, entry, "", "", seen)
    users = [ledger[identifier] for identifier in ledger.users(entry.id)]
    if users:
        yield "goes into:"
        for user in users:
            yield f"  {user.id} = {user.shown}  {user.means}"
    else:
        yield "goes into: nothing"


def _tree(ledger: Ledger, entry: Entry, first: str, rest: str, seen: set[str]) -> Iterator[str]:
    again = entry.id in seen and entry.rests_on()
    yield f"{first}{entry.id} = {entry.shown}  {entry.means}{'  (above)' if again else ''}"
    if again:
        return
    seen.add(entry.id)
    yield from (f"{rest}   {line}" for line in _origin(entry))
    below = [ledger[identifier] for identifier in entry.rests_on()]
    for index, item in enumerate(below):
        last = index == len(below) - 1
        corner, bar = ("└─ ", "   ") if last else ("├─ ", "│  ")
        yield from _tree(ledger, item, rest + corner, rest + bar, seen)


def _origin(entry: Entry) -> Iterator[str]:
    clause = f"[{' '.join(filter(None, (entry.edition, entry.clause)))}]"
    if entry.kind == "given":
        yield f"given: {entry.source}{' (assumed)' if entry.status == 'assumed' else ''}"
    elif entry.kind == "worked":
        since = f"  since {entry.condition}" if entry.condition else ""
        yield f"= {entry.expression}{since}  {clause}"
    elif entry.kind == "solved":
        by = f"; confirmed by {', '.join(entry.confirmed_by)}" if entry.confirmed_by else ""
        yield f"solved: {entry.method}{by}  {clause}"
    else:
        yield f"{entry.verdict}: demand over capacity{f'  {clause}' if clause != '[]' else ''}"
