"""Sums over several lines: what a mean and a trade-off share."""

from __future__ import annotations

from typing import NamedTuple

from envcheck.judge.compare import own_term
from envcheck.model.judged import Comparison, Group, Line, Part
from envcheck.model.metrics import METRICS
from envcheck.model.project import Element, Project
from envcheck.units import to_si

COMPARED = ("pass", "fail")
"""Verdicts that a comparison gives, and that a group may replace."""
BY_LENGTH = "F_factor"
OVER_R = tuple(name for name, metric in METRICS.items() if metric.reciprocal)
"""Metrics that are one over a U-factor: their lines enter sums by it."""
HEAT_FLOW = ("U_assembly", "U_product", "C_factor", "F_factor", "R_insulation", *OVER_R)
"""Metrics of lines that a sum of heat flows must speak of."""


class Taken(NamedTuple):
    """A group with the lines that may carry its verdict."""

    group: Group
    members: tuple[Line, ...]
    comparison: Comparison | None
    """The group's; None where something stands in the way."""
    reasons: tuple[str, ...]


def by_itself(line: Line) -> bool:
    """Whether a limit holds at any point, whatever a mean or a sum makes of the element."""
    return line.limit is not None and line.limit.applies_to in ("any_point", "whole_envelope")


def amount(element: Element, metric: str) -> float | None:
    """What a value is multiplied by: perimeter in m of an F-factor, else net area in m2."""
    return element.perimeter if metric == BY_LENGTH else element.net_area


def deciding_value(line: Line) -> float | None:
    """The value that decides, unrounded, SI: of a bracket that decides its high end, likewise of
    the interval from stated ranges."""
    solved = line.solved
    if solved is not None and solved.ranged is not None:
        return solved.ranged.high
    if solved is not None:
        return solved.high if solved.decided_by_bracket else solved.value
    own = line.comparison
    return own.value if own is not None and not own.unit else None


def lacks(line: Line, project: Project) -> str:
    """What a sum waits for of one line; empty where it can enter."""
    element = project.elements[line.element]
    if deciding_value(line) is None:
        return f"the value of {line.element}"
    if amount(element, line.metric) is None:
        what = "perimeter" if line.metric == BY_LENGTH else "area"
        return f"the {what} of {line.element}"
    return "" if line.verdict in COMPARED else f"the decision on {line.element}"


def part(line: Line, project: Project) -> Part:
    """A decided line as a part of a sum; a total R-value enters as one over it."""
    element, limit = project.elements[line.element], line.limit
    value, size = deciding_value(line), amount(element, line.metric)
    assert limit is not None and value is not None and size is not None
    term = own_term(limit)
    number = to_si(term.number, limit.unit) if limit.unit else term.number
    printed = Part(
        line.element,
        element.assembly,
        line.metric,
        size,
        value,
        number,
        line.verdict,
        term.text,
        limit.unit,
    )
    if line.metric not in OVER_R:
        return printed
    return printed._replace(metric="U_assembly", limit=1.0 / number, printed="", unit="")
