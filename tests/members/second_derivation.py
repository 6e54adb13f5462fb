"""A second derivation of anchorage lengths and column limits, from the clauses, sharing nothing with calcpack.

A row is a dictionary of plain numbers in in, psi and in^2, keyed as in anchorage.csv without the units; a key that is
absent or None is a blank cell. Everything here is common practice (ACI 318-14 and 318-19, clause named at each line).
"""

from __future__ import annotations

import math
from dataclasses import dataclass
from typing import Any

Row = dict[str, Any]

# ASTM A615, table of nominal dimensions: diameter in in, area in in^2.
SIZES = {
    3: (0.375, 0.11), 4: (0.500, 0.20), 5: (0.625, 0.31), 6: (0.750, 0.44), 7: (0.875, 0.60), 8: (1.000, 0.79),
    9: (1.128, 1.00), 10: (1.270, 1.27), 11: (1.410, 1.56), 14: (1.693, 2.25), 18: (2.257, 4.00),
}  # fmt: skip


@dataclass(frozen=True)
class Refusal:
    """A row for which the code gives no length, with every reason by name."""

    reasons: frozenset[str]


def second(row: Row, edition: str) -> float | Refusal:
    """The required length in in by `edition` ("14" or "19"), or why there is none."""
    reasons = _reasons(row, edition)
    if reasons:
        return Refusal(frozenset(reasons))
    kind = row["kind"]
    if kind == "straight tension":
        return max(_tension(row, edition) * _excess(row), 12.0)
    if kind == "lap tension":
        return _tension_lap(row, edition)
    if kind in ("hook 90", "hook 180"):
        return _hook_14(row) if edition == "14" else _hook_19(row)
    if kind == "headed":
        return _head_14(row) if edition == "14" else _head_19(row)
    if kind == "straight compression":
        return _compression(row)
    return _compression_lap(row, edition)


def _reasons(row: Row, edition: str) -> set[str]:
    kind, size = row["kind"], int(row["bar"].lstrip("#"))
    needed, given = row.get("A_s_required"), row.get("A_s_provided")
    largest = 60000 if (kind, edition) == ("headed", "14") else 80000 if edition == "14" else 100000
    found = {
        "f_c": row["f_c"] < 2500,  # 19.2.1.1
        "f_y": row["f_y"] > largest,  # 20.2.2.4, 25.4.4.1
        "size": size > 11 and (kind == "headed" or "lap" in kind),  # 25.4.4.1, 25.5.1.1
        "lightweight": _wrong_lightweight(row, edition),
        "areas": (needed is None) != (given is None) or (needed is not None and needed > given),
        "class A": (  # 25.5.2.1
            kind == "lap tension"
            and row.get("lap_class") == "A"
            and needed is not None
            and needed <= given < 2 * needed
        ),
    }
    return {name for name, wrong in found.items() if wrong}


def _by_tension(row: Row) -> bool:
    """The length is, or is compared with, one of straight bars in tension."""
    return row["kind"] in ("straight tension", "lap tension") or (
        row["kind"] == "lap compression" and row["f_y"] > 80000
    )


def _wrong_lightweight(row: Row, edition: str) -> bool:
    """Heads: normalweight only. 0.75 or 1.0 in the tables; 318-14 takes lambda by test, but not for hooks."""
    lamb, kind = _lightweight(row), row["kind"]
    if kind == "headed":
        return lamb != 1
    unused = kind == "lap compression" and not _by_tension(row)
    if unused or (edition == "14" and "hook" not in kind):
        return not 0.75 <= lamb <= 1
    return lamb not in (0.75, 1)


def unmet(row: Row, edition: str) -> set[str]:
    """Conditions beside the length that the row shows not to be met."""
    kind, diameter = row["kind"], _diameter(row)
    cover, gap = row.get("clear_cover"), row.get("clear_spacing")
    least = 4 * diameter if edition == "14" else 2 * diameter  # 318-19: 3 d_b centre to centre
    close = gap is not None and gap + diameter < 6 and (row.get("K_tr") or 0) < diameter / 2
    found = {
        "cover of head": kind == "headed" and cover is not None and cover < 2 * diameter,  # 25.4.4.1
        "spacing of heads": kind == "headed" and gap is not None and gap < least - 1e-9,
        # 25.4.2.2 of 318-19.
        "K_tr": edition == "19" and kind in ("straight tension", "lap tension") and row["f_y"] >= 80000 and close,
    }
    return {name for name, wrong in found.items() if wrong}


def _excess(row: Row) -> float:
    """25.4.10.1, for the kinds whose clause it names."""
    return float(row["A_s_required"] / row["A_s_provided"]) if row.get("A_s_required") is not None else 1.0


def _root(f_c: float) -> float:
    return min(math.sqrt(f_c), 100.0)  # 25.4.1.4


def _lightweight(row: Row) -> float:
    return float(row.get("lambda") or 1.0)


def _diameter(row: Row) -> float:
    return SIZES[int(row["bar"].lstrip("#"))][0]


def _tension(row: Row, edition: str) -> float:
    """25.4.2 without the floor of 12 in: general equation where c_b is given, table where it is not."""
    diameter = _diameter(row)
    epoxy = row.get("coating") in ("epoxy", "dual")
    cover, gap = row.get("clear_cover"), row.get("clear_spacing")
    psi_e = 1.0
    if epoxy and cover is not None and gap is not None:
        psi_e = 1.2 if cover >= 3 * diameter and gap >= 6 * diameter else 1.5
    elif epoxy and row.get("c_b") is None:
        psi_e = 1.5  # 1.2 has to be shown; without cover and spacing it is not
    elif epoxy:
        # c_b, by definition the lesser of cover + d_b/2 and half the centre spacing, is 3.5 d_b where both just hold.
        psi_e = 1.2 if row["c_b"] >= 3.5 * diameter else 1.5
    psi_t = 1.3 if row.get("top") else 1.0
    factor = min(psi_t * psi_e, 1.7)
    if edition == "19":
        factor *= 1.0 if row["f_y"] <= 60000 else 1.15 if row["f_y"] <= 80000 else 1.3
    stress = row["f_y"] / (_lightweight(row) * _root(row["f_c"]))
    small = int(row["bar"].lstrip("#")) <= 6
    if row.get("c_b") is not None:
        confinement = min((row["c_b"] + (row.get("K_tr") or 0.0)) / diameter, 2.5)
        return float(3 / 40 * stress * factor * (0.8 if small else 1.0) / confinement * diameter)
    roomy = cover is not None and gap is not None and cover >= diameter
    roomy = roomy and gap >= (1 if row.get("confining_ties") else 2) * diameter
    divisor = (25 if small else 20) if roomy else (50 / 3 if small else 40 / 3)
    return float(stress * factor / divisor * diameter)


def _tension_lap(row: Row, edition: str) -> float:
    times = 1.0 if row.get("lap_class") == "A" else 1.3
    return max(times * _tension(row, edition), 12.0)  # 25.5.2.1; no 25.4.10 in a lap


def _floor(length: float, diameter: float) -> float:
    return max(length, 8 * diameter, 6.0)


def _hook_14(row: Row) -> float:
    """25.4.3 of 318-14."""
    diameter, up_to_11 = _diameter(row), int(row["bar"].lstrip("#")) <= 11
    side, tail = row.get("side_cover"), row.get("tail_cover")
    psi_e = 1.2 if row.get("coating") in ("epoxy", "dual") else 1.0
    covered = side is not None and side >= 2.5
    if row["kind"] == "hook 90":
        covered = covered and tail is not None and tail >= 2.0
    psi_c = 0.7 if up_to_11 and covered else 1.0
    psi_r = 0.8 if up_to_11 and row.get("confining_ties") else 1.0
    length = row["f_y"] * psi_e * psi_c * psi_r / (50 * _lightweight(row) * _root(row["f_c"])) * diameter
    return _floor(length * _excess(row), diameter)


def _psi_o(row: Row) -> float:
    """Tables 25.4.3.2 and 25.4.4.3 of 318-19."""
    side, diameter = row.get("side_cover"), _diameter(row)
    if int(row["bar"].lstrip("#")) > 11 or side is None:
        return 1.25
    return 1.0 if (row.get("in_column_core") and side >= 2.5) or side >= 6 * diameter else 1.25


def _psi_ties(row: Row) -> float:
    """psi_r of hooks and psi_p of heads: enough ties, or bars at 6 d_b centre to centre or more."""
    diameter, gap = _diameter(row), row.get("clear_spacing")
    spread = gap is not None and gap + diameter >= 6 * diameter
    return 1.0 if int(row["bar"].lstrip("#")) <= 11 and (row.get("confining_ties") or spread) else 1.6


def _psi_strength(f_c: float) -> float:
    return f_c / 15000 + 0.6 if f_c < 6000 else 1.0


def _hook_19(row: Row) -> float:
    """25.4.3 of 318-19; 25.4.10 no longer names hooks."""
    diameter = _diameter(row)
    psi_e = 1.2 if row.get("coating") in ("epoxy", "dual") else 1.0
    factors = psi_e * _psi_ties(row) * _psi_o(row) * _psi_strength(row["f_c"])
    return _floor(row["f_y"] * factors / (55 * _lightweight(row) * _root(row["f_c"])) * diameter**1.5, diameter)


def _head_14(row: Row) -> float:
    diameter = _diameter(row)
    psi_e = 1.2 if row.get("coating") in ("epoxy", "dual") else 1.0
    return _floor(0.016 * row["f_y"] * psi_e / math.sqrt(min(row["f_c"], 6000)) * diameter, diameter)


def _head_19(row: Row) -> float:
    diameter = _diameter(row)
    psi_e = 1.2 if row.get("coating") in ("epoxy", "dual") else 1.0
    factors = psi_e * _psi_ties(row) * _psi_o(row) * _psi_strength(row["f_c"])
    return _floor(row["f_y"] * factors / (75 * _root(row["f_c"])) * diameter**1.5, diameter)


def _compression(row: Row) -> float:
    """25.4.9, alike in both editions."""
    psi_r = 0.75 if row.get("confining_ties") else 1.0
    by_bond = row["f_y"] * psi_r / (50 * _lightweight(row) * _root(row["f_c"])) * _diameter(row)
    by_stress = 0.0003 * row["f_y"] * psi_r * _diameter(row)
    return max(max(by_bond, by_stress) * _excess(row), 8.0)


def _compression_lap(row: Row, edition: str) -> float:
    """25.5.5.1, and 10.7.5.2.1 for the ties of a column."""
    f_y, diameter = row["f_y"], _diameter(row)
    length = max((0.0005 * f_y if f_y <= 60000 else 0.0009 * f_y - 24) * diameter, 12.0)
    if edition == "19" and f_y > 80000:
        length = max(length, _tension_lap(row, edition))
    if row["f_c"] < 3000:
        length *= 4 / 3
    return max(length * (0.83 if row.get("confining_ties") else 1.0), 12.0)


def axial_strength(column: Row) -> tuple[float, float]:
    """P_o and phi P_n,max in lb; 22.4.2 and 21.2.2, alike in both editions (f_y taken to 80,000 psi)."""
    gross = math.pi / 4 * column["h"] ** 2 if column["shape"] == "circular" else column["b"] * column["h"]
    steel = column["bars"] * SIZES[column["size"]][1]
    P_o = 0.85 * column["f_c"] * (gross - steel) + min(column["f_y"], 80000) * steel
    return P_o, (0.75 * 0.85 if column["spiral"] else 0.65 * 0.80) * P_o


def tie_spacing(column: Row) -> float:
    """25.7.2.1(b): the largest spacing of ties, centre to centre, in in."""
    least = column["h"] if column["shape"] == "circular" else min(column["b"], column["h"])
    return min(16 * SIZES[column["size"]][0], 48 * SIZES[column["tie"]][0], least)


def spiral_ratio(column: Row) -> tuple[float, float]:
    """The spiral's volume over the core's, by the length of the bar's centre line, and the least of 25.7.3.3."""
    core = column["h"] - 2 * column["cover"]
    diameter, area = SIZES[column["tie"]]
    ratio = area * math.pi * (core - diameter) / (math.pi / 4 * core**2 * column["spacing"])
    least = 0.45 * ((column["h"] / core) ** 2 - 1) * column["f_c"] / column["f_yt"]
    return ratio, least
