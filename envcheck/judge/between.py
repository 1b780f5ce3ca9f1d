"""A limit between two printed rows, by linear interpolation over one dimension."""

from __future__ import annotations

from collections.abc import Sequence
from decimal import ROUND_HALF_UP, Decimal
from itertools import pairwise

from envcheck.judge.compare import exact_decimal
from envcheck.judge.facts import Known, shown
from envcheck.model.ruleset import Condition, Limit, RuleSet


def interpolated_over(limits: Sequence[Limit], ruleset: RuleSet) -> str:
    """Name the dimension over which the limits are read; empty where they stand for themselves."""
    for limit in limits:
        for condition in limit.when:
            if ruleset.dimensions[condition.dimension].interpolate:
                return condition.dimension
    return ""


def interpolate(
    rows: Sequence[Limit], dimension: str, fact: Known, ruleset: RuleSet
) -> tuple[Limit | None, str]:
    """Give the limit at a value between the printed rows, or why there is none.

    Linear between the two nearest rows; beyond the first and the last the nearest figure holds,
    unless the rule set says ``outside: error``. The figure is rounded half-up to the printed
    decimals. Each row states one value of the dimension and one figure.
    """
    points = sorted(((_at(limit, dimension), limit) for limit in rows), key=lambda p: p[0])
    if any(limit.kind != "number" for _, limit in points):
        return None, f"the rows over {dimension} print no figure to interpolate"
    value = float(fact.value)  # type: ignore[arg-type]  # the reader lets only numbers pass
    (first, low), (last, high) = points[0], points[-1]
    if not first <= value <= last:
        if ruleset.dimensions[dimension].outside == "error":
            why = f"{dimension} {shown(value)} lies outside the printed {first:g} to {last:g}"
            return None, why
        return (low if value < first else high), ""
    for (a, lower), (b, upper) in pairwise(points):
        if a <= value <= b:
            return _between(a, lower, b, upper, value, dimension), ""
    return low, ""  # a single row that the value meets


def _at(limit: Limit, dimension: str) -> float:
    condition = next(c for c in limit.when if c.dimension == dimension)
    return condition.low if condition.low is not None else condition.high or 0.0


def _between(a: float, lower: Limit, b: float, upper: Limit, value: float, dimension: str) -> Limit:
    """x1 + (x2 - x1) (v - a) / (b - a), rounded half-up to the printed decimals."""
    start, end = lower.alternatives[0][0], upper.alternatives[0][0]
    share = (exact_decimal(value) - exact_decimal(a)) / (exact_decimal(b) - exact_decimal(a))
    exact = Decimal(start.text) + (Decimal(end.text) - Decimal(start.text)) * share
    decimals = max(start.decimals, end.decimals)
    text = str(exact.quantize(Decimal(1).scaleb(-decimals), ROUND_HALF_UP))
    term = start._replace(number=float(text), text=text)
    words = f"{text} (between {lower.cell} at {a:g} and {upper.cell} at {b:g})"
    held = Condition(dimension, (), a, b, True, True, f"{a:g} to {b:g}")
    when = tuple(held if c.dimension == dimension else c for c in lower.when)
    return lower._replace(
        cell=words,
        alternatives=((term,),),
        when=when,
        label=f"{lower.label}, {upper.label}",
        id=f"{lower.id} to {upper.id}",
    )
