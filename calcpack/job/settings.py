"""What job.toml decides about load combinations and about the column sheets."""

from __future__ import annotations

from dataclasses import dataclass

from calcpack.errors import RangeError
from calcpack.job.toml import Place
from calcpack.job.wording import shown
from calcpack.loads.combinations import AS_CODE, Settings

__all__ = ["AS_USUAL", "STIFFNESS", "WORKED", "ColumnSettings", "column_settings", "load_settings"]

WORKED = ("every column", "one of a group")
STIFFNESS = ("a", "b")


@dataclass(frozen=True)
class ColumnSettings:
    """How the column sheets are made.

    Attributes
    ----------
    worked : which columns `Sheet.columns` works in full
    stiffness : (EI)_eff by ACI 318 6.6.4.4.4 (a) or (b)
    """

    worked: str = WORKED[0]
    stiffness: str = STIFFNESS[0]


AS_USUAL = ColumnSettings()


def load_settings(place: Place) -> Settings:
    """The table ``[loads]``: the factor of a companion live load, and what earthquake combinations need."""
    place.only("live_companion", "live_companion_basis", "S_DS", "rho")
    given = {key: _number(place, key) for key in ("live_companion", "S_DS", "rho") if key in place.keys}
    settings = {key: value for key, value in given.items() if value is not None}
    if settings.get("live_companion", 1.0) != 1.0:
        basis = "why the reduction is permitted, e.g. 'L_o up to 100 psf, no garage or assembly'"
        place.value("live_companion_basis", basis)
    try:
        return Settings(**settings)
    except RangeError as error:
        for problem in error.problems:
            place.report("", problem.given, problem.allowed, problem.remedy)
        return AS_CODE


def column_settings(place: Place) -> ColumnSettings:
    """The table ``[columns]``: which columns are worked in full, and the stiffness of slender ones."""
    place.only("worked", "stiffness")
    asked = {"worked": WORKED, "stiffness": STIFFNESS}
    chosen = {key: place.choice(key, allowed) for key, allowed in asked.items() if key in place.keys}
    return ColumnSettings(**{key: value for key, value in chosen.items() if value})


def _number(place: Place, key: str) -> float | None:
    value = place.keys[key]
    if isinstance(value, (int, float)) and not isinstance(value, bool):
        return float(value)
    place.report(key, f"{key} = {shown(value)}", "a number without quotes")
    return None
