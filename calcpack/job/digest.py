"""A fingerprint of a record, by which a sheet knows that a row it has read was changed."""

from __future__ import annotations

import hashlib
import json
from dataclasses import fields, is_dataclass
from datetime import date
from typing import Any

__all__ = ["row_digest"]


def row_digest(record: Any) -> str:
    """The SHA-256 of a record, as 64 hexadecimal digits: equal exactly where every field is equal.

    Parameters
    ----------
    record : a frozen dataclass of texts, numbers, dates, tuples and further records

    Raises
    ------
    TypeError : a field of another kind
    """
    text = json.dumps(_plain(record), ensure_ascii=True, allow_nan=False, sort_keys=True, separators=(",", ":"))
    return hashlib.sha256(text.encode("ascii")).hexdigest()


def _plain(value: Any) -> Any:
    if is_dataclass(value) and not isinstance(value, type):
        return [type(value).__name__, {field.name: _plain(getattr(value, field.name)) for field in fields(value)}]
    if isinstance(value, tuple):
        return [_plain(each) for each in value]
    if isinstance(value, date):
        return value.isoformat()
    # json writes a float by its repr, so it comes back as the same float.
    if value is None or isinstance(value, (str, bool, int, float)):
        return value
    raise TypeError(f"no fingerprint of a {type(value).__name__}: records hold texts, numbers, dates and tuples")
