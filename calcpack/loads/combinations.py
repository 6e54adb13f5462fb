"""Combinations of factored loads for strength design, ASCE 7-16 and 7-22 2.3.1 and 2.3.6.

A standard is a record of rules. A rule is applied to the loads that a member has: every choice that it leaves open
(which roof load, which companion, the sign of wind and earthquake) becomes a combination of its own. A companion load
is also left out, and in 2 to 4 the principal load, since loads that do not act have to be looked at (2.3.1).
"""

from __future__ import annotations

from collections.abc import Collection, Iterable, Iterator, Mapping
from dataclasses import dataclass
from functools import cache
from itertools import chain, product
from typing import TypeAlias

from calcpack.errors import Problem, RangeError
from calcpack.formula import Clause, Standard
from calcpack.loads.standards import ASCE_7_16, ASCE_7_22

__all__ = [
    "ALTERNATIVE",
    "AS_CODE",
    "LATERAL",
    "LOADS",
    "STANDARDS",
    "SUSTAINED",
    "Combination",
    "LoadStandard",
    "Rule",
    "Settings",
    "Terms",
    "combinations",
    "factor_text",
    "load_standard",
    "name_of",
]

Terms: TypeAlias = tuple[tuple[str, float], ...]

LOADS = ("D", "F", "L", "Lr", "S", "R", "W", "E", "H", "T")
# Several cases of one of these act one at a time: directions of wind, patterns of live load.
ALTERNATIVE = ("L", "Lr", "S", "R", "W", "E")
SUSTAINED = ("D", "F", "H")
LATERAL = ("W", "E")

_LIVE_COMPANION = (1.0, 0.5)
_RHO = (1.0, 1.3)
# Above any mapped value; a percentage of g written as a number is not taken for g.
_S_DS_MAX = 4.0
_EARTH = 1.6


@dataclass(frozen=True)
class Settings:
    """What a job decides about its combinations.

    Attributes
    ----------
    live_companion : factor of L where it is a companion: 1.0, or 0.5 where the exception of 2.3.1 applies
    S_DS : design spectral acceleration, in g; with it E is Q_E, without it E is the whole effect
    rho : redundancy factor on Q_E

    Raises
    ------
    RangeError : every setting that is not allowed
    """

    live_companion: float = 1.0
    S_DS: float | None = None
    rho: float = 1.0

    def __post_init__(self) -> None:
        problems = list(self._problems())
        if problems:
            raise RangeError("settings of the load combinations", problems)

    def _problems(self) -> Iterator[Problem]:
        if self.live_companion not in _LIVE_COMPANION:
            allowed = "1.0, or 0.5 (ASCE 7 2.3.1, exception 1; ACI 318 5.3.3)"
            yield Problem(f"live_companion = {self.live_companion:g}", allowed)
        if self.S_DS is not None and not 0 < self.S_DS <= _S_DS_MAX:
            yield Problem(f"S_DS = {self.S_DS:g}", f"above 0, up to {_S_DS_MAX:g}, in g (ASCE 7 11.4)")
        if self.rho not in _RHO:
            yield Problem(f"rho = {self.rho:g}", "1.0 or 1.3 (ASCE 7 12.3.4)")
        elif self.S_DS is None and self.rho != 1.0:
            allowed = "1.0 where S_DS is not stated, since E is the whole effect then"
            yield Problem(f"rho = {self.rho:g}", allowed, "state S_DS, or apply rho to the rows of E")


AS_CODE = Settings()


@dataclass(frozen=True)
class Rule:
    """A combination as the standard lists it.

    Attributes
    ----------
    dead : factor of D
    principal : factors of the principal loads, one of which acts; empty where D is the principal load
    companions : groups of companion loads; of each group one acts, or none
    fluid : F acts with the factor of D
    vertical : sign of the vertical earthquake effect E_v, 0 where there is none
    may_rest : the principal load may be out while a companion acts; without wind or earthquake as principal load of
        5 to 7 nothing is left of them
    """

    number: str
    clause: Clause
    dead: float
    principal: Terms
    companions: tuple[Terms, ...] = ()
    fluid: bool = True
    vertical: float = 0.0
    may_rest: bool = False


@dataclass(frozen=True)
class LoadStandard:
    """A load standard: its name and its rules for strength design."""

    standard: Standard
    rules: tuple[Rule, ...]

    @property
    def name(self) -> str:
        """As a job names it: ``ASCE 7-16``."""
        return self.standard.name


@dataclass(frozen=True)
class Combination:
    """A combination with every choice made.

    Attributes
    ----------
    number : of the combination in the standard
    terms : each load that acts, with its factor, in the order of the label
    label : as engineers write it: ``4: 1.2D-1.0W+1.0L+0.5Lr``
    dead : factor of D that is sustained: without E_v, which passes with the earthquake
    reasons : how a factor that the standard does not print is made
    """

    number: str
    clause: Clause
    terms: Terms
    label: str
    dead: float
    reasons: tuple[str, ...] = ()


def _rules(standard: Standard, snow: float, snow_companion: float, snow_seismic: float) -> LoadStandard:
    basic, seismic = standard("2.3.1"), standard("2.3.6")
    roof = (("Lr", 0.5), ("S", snow_companion), ("R", 0.5))
    roof_principal = (("Lr", 1.6), ("S", snow), ("R", 1.6))
    live, wind, earthquake = (("L", 1.0),), (("W", 1.0),), (("E", 1.0),)
    rules = (
        Rule("1", basic, 1.4, ()),
        Rule("2", basic, 1.2, (("L", 1.6),), (roof,), may_rest=True),
        Rule("3", basic, 1.2, roof_principal, ((*live, ("W", 0.5)),), may_rest=True),
        Rule("4", basic, 1.2, wind, (live, roof), may_rest=True),
        Rule("5", basic, 0.9, wind, fluid=False),
        Rule("6", seismic, 1.2, earthquake, (live, (("S", snow_seismic),)), vertical=1.0),
        Rule("7", seismic, 0.9, earthquake, vertical=-1.0),
    )
    return LoadStandard(standard, rules)


# Snow is a load of strength level since 7-22, as wind is since 7-10.
STANDARDS: Mapping[str, LoadStandard] = {
    made.name: made for made in (_rules(ASCE_7_16, 1.6, 0.5, 0.2), _rules(ASCE_7_22, 1.0, 0.3, 0.15))
}


def load_standard(name: str) -> LoadStandard:
    """The load standard of that name.

    Raises
    ------
    RangeError : not a standard whose combinations are formed
    """
    if name not in STANDARDS:
        raise RangeError("load combinations", [Problem(f"loads = {name!r}", f"one of {', '.join(STANDARDS)}")])
    return STANDARDS[name]


def combinations(standard_name: str, loads: Collection[str], settings: Settings = AS_CODE) -> tuple[Combination, ...]:
    """Every strength combination of the loads that a member has, in the order of the standard.

    In 2 to 4 the principal load is also out while a companion acts; combinations of equal factors stand once. H acts
    with 1.6, or not at all; T with 1.0, or not at all (2.3.1, 2.3.4); W and E act in both directions.

    >>> [one.label for one in combinations("ASCE 7-16", ["D", "L"])]
    ['1: 1.4D', '2: 1.2D+1.6L', '3: 1.2D+1.0L']

    Raises
    ------
    RangeError : an unknown standard, unknown loads, or no dead load
    """
    standard = load_standard(standard_name)
    listed = sorted(set(loads))
    problems = [Problem(f"load {load!r}", f"one of {', '.join(LOADS)}") for load in listed if load not in LOADS]
    if "D" not in loads:
        given = f"loads {', '.join(listed) or 'none'}"
        problems.append(Problem(given, "D among them: it acts in every combination", "add the dead load"))
    if problems:
        raise RangeError("load combinations", problems)
    return _formed(standard.name, frozenset(loads), settings)


@cache
def _formed(standard_name: str, loads: frozenset[str], settings: Settings) -> tuple[Combination, ...]:
    formed: dict[Terms, Combination] = {}
    for rule in STANDARDS[standard_name].rules:
        for terms in _terms(rule, loads, settings):
            formed.setdefault(terms, _combination(standard_name, rule, terms, settings))
    return tuple(formed.values())


def _combination(standard_name: str, rule: Rule, terms: Terms, settings: Settings) -> Combination:
    reasons = tuple(_reasons(standard_name, rule, terms, settings))
    return Combination(rule.number, rule.clause, terms, name_of(rule.number, terms), rule.dead, reasons)


def _terms(rule: Rule, loads: frozenset[str], settings: Settings) -> Iterator[Terms]:
    """Every choice that a rule leaves open among these loads."""
    dead: Terms = (("D", _dead(rule, settings)),)
    if rule.fluid and "F" in loads:
        dead += (("F", rule.dead),)
    choices: list[list[Terms]] = [[dead]]
    if rule.principal:
        choices.append(list(_one_of(rule.principal, loads, settings)))
        if rule.may_rest:
            choices[-1].append(())
    for group in rule.companions:
        reduced = tuple((load, factor * settings.live_companion if load == "L" else factor) for load, factor in group)
        choices.append([(), *_one_of(reduced, loads, settings)])
    for load, factor in (("H", _EARTH), ("T", 1.0)):
        if load in loads:
            choices.append([(), ((load, factor),)])
    for parts in product(*choices):
        # Dead load alone is not what a rule with a principal load is for: 1.4 D holds it.
        if not rule.principal or any(parts[1 : 2 + len(rule.companions)]):
            yield tuple(chain.from_iterable(parts))


def _one_of(group: Terms, loads: frozenset[str], settings: Settings) -> Iterator[Terms]:
    """Each load of a group that the member has, by itself, in both directions where it can reverse."""
    for load, factor in group:
        if load in loads:
            size = settings.rho * factor if load == "E" else factor
            yield ((load, size),)
            if load in LATERAL:
                yield ((load, -size),)


def _dead(rule: Rule, settings: Settings) -> float:
    """The factor of D; E_v is 0.2 S_DS D and is added to it."""
    if settings.S_DS is None:
        return rule.dead
    # Ten figures clear the noise of the sum, so that the printed factor is the one that is used.
    return float(f"{rule.dead + rule.vertical * 0.2 * settings.S_DS:.10g}")


def _reasons(standard_name: str, rule: Rule, terms: Terms, settings: Settings) -> Iterator[str]:
    if rule.vertical and settings.S_DS is not None:
        sign = "+" if rule.vertical > 0 else "-"
        made = f"{rule.dead:g} {sign} 0.2 S_DS = {rule.dead:g} {sign} 0.2 ({settings.S_DS:g})"
        yield f"D with E_v = 0.2 S_DS D: {made} = {_dead(rule, settings):.10g} ({standard_name} 12.4.2.2)."
        yield f"E is Q_E; E_h = rho Q_E with rho = {settings.rho:.1f} ({standard_name} 12.4.2.1)."
    if ("L", 0.5) in terms:
        yield f"L is a companion with 0.5 instead of 1.0 ({rule.clause}, exception for L)."


def name_of(number: str, terms: Iterable[tuple[str, float]]) -> str:
    """A combination as engineers write it: ``2: 1.2D+1.6L+0.5S``; a load may carry its case, ``W(+x)``."""
    written = "".join(f"{factor_text(factor)}{load}" for load, factor in terms)
    return f"{number}: {written.removeprefix('+')}"


def factor_text(factor: float) -> str:
    """A factor with its sign and at least one decimal: ``+1.0``, ``-0.5``, ``+1.366``."""
    text = f"{factor:+.10g}"
    return text if "." in text else f"{text}.0"
