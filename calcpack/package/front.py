"""The package model as its front and back matter print it: symbols typeset, links resolved, dates and words ready."""

from __future__ import annotations

from collections.abc import Collection, Mapping
from datetime import date
from typing import Any

from calcpack.package.blocks import Printer
from calcpack.package.text import anchor, printable

__all__ = ["front"]

_ROLES = ("originator", "checker", "approver")
_STATES = {
    "draft": "Draft, not issued",
    "preliminary": "Preliminary, not for construction",
    "final": "Final",
}
_MONTHS = ("Jan", "Feb", "Mar", "Apr", "May", "Jun", "Jul", "Aug", "Sep", "Oct", "Nov", "Dec")


def front(model: Mapping[str, Any], target: str, known: Collection[str]) -> dict[str, Any]:
    """What the templates of the front and back matter print.

    Parameters
    ----------
    model : the package's model
    target : ``html`` or ``typst``
    known : ids of everything in the document that a link may lead to
    """
    view = _View(Printer(target, known))
    return {**view.page(model), **view.cover(model), **view.registers(model), **view.back(model)}


class _View:
    """The model for one target."""

    def __init__(self, printer: Printer) -> None:
        self.printer = printer

    def text(self, value: object) -> str:
        """A text of the model."""
        return self.printer.text("" if value is None else f"{value:.5g}" if isinstance(value, float) else value)

    def texts(self, rows: Any) -> list[dict[str, str]]:
        """Texts of the model."""
        return [{key: self.text(value) for key, value in row.items()} for row in rows]

    def page(self, model: Mapping[str, Any]) -> dict[str, Any]:
        """What every page states."""
        job, revision = model["job"], model["revision"]
        dated = date_text(revision["date"])
        return {
            **{key: self.text(value) for key, value in job.items()},
            "originators": self.text(model["originators"]),
            "checkers": self.text(model["checkers"]),
            "concrete": self.text(model["codes"]["concrete"]),
            "units": self.text(model["units"].replace(", ", " · ")),
            "mark": self.text(model["mark"]),
            "revision_line": self.text(f"{revision['letter']} · {dated}"),
            "footer": self.text(f"{job['number']} · revision {revision['letter']} · {model['revision']['purpose']}"),
        }

    def cover(self, model: Mapping[str, Any]) -> dict[str, Any]:
        """Cover, revision log and contents."""
        job, revision = model["job"], model["revision"]
        return {
            "document_title": printable(f"{job['number']} {job['title']}: structural calculations"),
            "description": printable(f"Revision {revision['letter']}, {revision['purpose']}"),
            "revision": {**self.texts([revision])[0], "date_text": date_text(revision["date"])},
            "state_text": _STATES.get(model["state"], self.text(model["state"])),
            "codes": [[name.capitalize(), self.text(code)] for name, code in model["codes"].items()],
            "signatures": [self.signature(role, model["people"]) for role in _ROLES],
            "statement": self.text(model["statement"]),
            "digest": self.text(model["digest"]),
            "open_count": model["open_count"],
            "open": self.texts(model["open"]),
            "log": [self.revision(row) for row in model["log"]],
            "sheets": [{"link": anchor(row["id"]), **self.texts([row])[0]} for row in model["sheets"]],
        }

    def signature(self, role: str, people: Any) -> dict[str, str]:
        """A place to sign."""
        acting = [one for one in people if role in one["roles"]]
        names = ", ".join(", ".join(filter(None, (one["name"], one.get("licence")))) for one in acting)
        return {"label": f"{role.capitalize()}: signature and date", "name": self.text(names)}

    def revision(self, row: Mapping[str, Any]) -> dict[str, Any]:
        """A line of the revision log."""
        plain = {key: value for key, value in row.items() if key != "sheets"}
        return {
            **self.texts([plain])[0],
            "date_text": date_text(row["date"]),
            "sheets": [self.sheet(name) for name in row["sheets"]],
        }

    def sheet(self, name: str) -> dict[str, str]:
        """A sheet of the contents."""
        return {"text": self.text(name), "link": self.printer.link(name)}

    def registers(self, model: Mapping[str, Any]) -> dict[str, Any]:
        """Basis of design, registers, ratios."""
        basis = model["basis"]
        return {
            "basis": {
                "statement": [self.text(words) for words in basis["statement"]],
                "limits": self.texts(basis["limits"]),
                "deferred": self.texts(basis["deferred"]),
                "conventions": [self.text(words) for words in basis["conventions"]],
            },
            **{name: [self.value(row) for row in model[name]] for name in ("materials", "givens", "assumptions")},
            "ratios": [self.ratio(row) for row in model["ratios"]],
        }

    def value(self, row: Mapping[str, Any]) -> dict[str, Any]:
        """A row of a register."""
        return {
            "symbol": self.printer.symbol(row["symbol"]), "means": self.text(row["means"]),
            "shown": self.text(row["shown"]), "source": self.text(row["source"]), "sheet": self.text(row["sheet"]),
            "link": self.printer.link(row["id"]), "sheet_link": self.printer.link(row["sheet"]),
            "assumed": row["status"] == "assumed",
        }  # fmt: skip

    def ratio(self, row: Mapping[str, Any]) -> dict[str, Any]:
        """A row of the summary of ratios."""
        keys = ("sheet", "what", "demand", "capacity", "ratio_text", "verdict", "clause")
        words = {key: self.text(row[key]) for key in keys}
        return {
            **words, "ok": row["verdict"] == "OK", "fill": min(1.0, max(0.0, float(row["ratio"]))),
            "link": self.printer.link(row["id"]), "sheet_link": self.printer.link(row["sheet"]),
        }  # fmt: skip

    def back(self, model: Mapping[str, Any]) -> dict[str, Any]:
        """References and the validation record."""
        record = model["validation"]
        return {
            "standards": self.texts(
                {"name": row["name"], "title": row["title"], "clauses": ", ".join(row["clauses"])}
                for row in model["standards"]
            ),
            "documents": [
                {"name": self.text(row["name"]), "sheets": [self.sheet(name) for name in row["sheets"]]}
                for row in model["documents"]
            ],
            "inputs": self.texts(model["inputs"]),
            "validation": {
                "release": self.text(record["release"]),
                "cases": [
                    {**self.texts([row])[0], "holds": "holds" if row["holds"] else "FAILS"} for row in record["cases"]
                ],
            },
        }


def date_text(iso: str) -> str:
    """A date as printed: ``2 Nov 2026``."""
    if not iso:
        return "not dated"
    day = date.fromisoformat(iso)
    return f"{day.day} {_MONTHS[day.month - 1]} {day.year}"
