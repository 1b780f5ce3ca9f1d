"""The R-value path: labelled insulation at installed thickness, no metal through it."""

from __future__ import annotations

from typing import NamedTuple

from envcheck.judge.compare import compare
from envcheck.model.judged import PathResult
from envcheck.model.project import Assembly, Element
from envcheck.model.ruleset import Limit, RuleSet, Term
from envcheck.model.solved import Properties
from envcheck.units import convert

EXTENT_TOLERANCE = 0.005
"""m by which a printed extent (24 in) may be missed by a metric dimension."""

COUNTED = ("", "cavity", "ci")
"""Roles of a term that an element's insulation can answer to."""
CLEARLY = 1e-6
"""Printed units above a number from which no rounding can matter."""


class Insulation(NamedTuple):
    """What an element brings to the R-value path, m2 K/W and m."""

    cavity: float | None
    continuous: float | None
    """None where it is not told apart."""
    extent: float | None = None
    why_not: str = ""
    """Why the continuous part does not count, or empty."""


def insulation_of(assembly: Assembly, element: Element, properties: Properties) -> Insulation:
    """Gather the labelled insulation of an element."""
    if assembly.slab is not None:
        slab = assembly.slab
        covered = slab.top_edge_covered is not False
        return Insulation(None, slab.resistance if covered else 0.0, slab.extent)
    if assembly.basement is not None:
        return Insulation(None, None, None, "floor and walls of a basement are one assembly here")
    why_not = ""
    if properties.crossed:
        why_not = f"metal crosses the insulation ({properties.crossed[0]})"
    elif properties.bracketed:
        why_not = f"brackets are not fasteners ({properties.bracketed[0]})"
    extent = element.insulated_depth
    return Insulation(
        properties.cavity_resistance, properties.continuous_resistance, extent, why_not
    )


def insulation_path(limit: Limit, brought: Insulation, ruleset: RuleSet) -> PathResult:
    """Hold the labels against a compound cell such as ``13+9ci or 0+15ci``.

    Any one alternative is enough; all of its terms must hold, none is traded against another.
    """
    asks = any(term.role == "ci" for alt in limit.alternatives for term in alt)
    if brought.why_not and (asks or brought.continuous is None):
        return PathResult("insulation", "not_available", "", limit.cell, brought.why_not)
    value = describe(brought, limit)
    strange = [t.role for alt in limit.alternatives for t in alt if t.role not in COUNTED]
    if strange:
        why = f"insulation {strange[0]!r} is not told apart in the project"
        return PathResult("insulation", "not_available", value, limit.cell, why)
    shortest = ""
    for alternative in limit.alternatives:
        short = [
            why_short
            for term in alternative
            if (why_short := _short_of(term, limit, brought, ruleset)) is not None
        ]
        if not short:
            words = " + ".join(term.text + term.role.replace("cavity", "") for term in alternative)
            return PathResult("insulation", "pass", value, limit.cell, f"meets {words}")
        shortest = shortest or short[0]
    return PathResult("insulation", "fail", value, limit.cell, shortest)


def _short_of(term: Term, limit: Limit, brought: Insulation, ruleset: RuleSet) -> str | None:
    """Why one term does not hold, or None where it does."""
    has = _part(term, brought)
    enough = convert(has, limit.unit) >= term.number + CLEARLY
    if not enough and not (comparison := compare(has, term, limit, ruleset)).within:
        what = {"ci": "continuous", "cavity": "cavity"}.get(term.role, "labelled")
        if not has:
            return f"no {what} insulation, R-{term.text} is asked for"
        return f"{what} R-{_short(comparison.value)} is below R-{term.text}"
    if term.extent is not None:
        reaches = brought.extent or 0.0
        if reaches + EXTENT_TOLERANCE < term.extent:
            return f"insulation reaches {reach(reaches, limit)} of {reach(term.extent, limit)}"
    return None


def reach(value: float, limit: Limit) -> str:
    """Write how far insulation reaches, given in m, in the system of the printed limit."""
    if "Btu" in limit.unit:
        return f"{_short(convert(value, 'in'))} in"
    return f"{_short(value)} m"


def _part(term: Term, brought: Insulation) -> float:
    """The insulation that a term speaks of, m2 K/W; without a role, all that is labelled."""
    if term.role == "ci":
        return brought.continuous or 0.0
    if term.role == "cavity":
        return brought.cavity or 0.0
    return (brought.cavity or 0.0) + (brought.continuous or 0.0)


def describe(brought: Insulation, limit: Limit) -> str:
    """The labels as a reviewer writes them: ``13 + 7.5ci``."""
    parts = []
    if brought.cavity is not None:
        parts.append(_short(convert(brought.cavity, limit.unit)))
    if brought.continuous:
        parts.append(_short(convert(brought.continuous, limit.unit)) + "ci")
    return "R-" + " + ".join(parts) if parts else "none"


def _short(value: float) -> str:
    return f"{value:.2f}".rstrip("0").rstrip(".")
