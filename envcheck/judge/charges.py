"""What a trade-off charges for openings above the allowance of an area cap."""

from __future__ import annotations

from collections.abc import Mapping, Sequence
from math import fsum

from envcheck.judge.building import RATIO_PARTS
from envcheck.model.judged import Charge, Part, Ratio
from envcheck.model.patterns import matches
from envcheck.model.ruleset import TradeOff


def uncounted(
    rule: TradeOff, parts: Sequence[Part], categories: Mapping[str, str], measured: Sequence[Ratio]
) -> list[str]:
    """What a rule charges by and nobody can tell."""
    if not rule.charges or not parts:
        return []
    waits = [f"the ratio of areas: {ratio.missing[0]}" for ratio in measured if ratio.missing]
    for ratio in measured:
        openings, opaque = _sides(parts, categories, ratio)
        if ratio.passed and openings and not opaque:
            waits.append(f"what the openings of {openings[0].element} stand in")
    return waits


def charges(
    rule: TradeOff, parts: Sequence[Part], categories: Mapping[str, str], measured: Sequence[Ratio]
) -> list[Charge]:
    """Charges of the ratios that are passed.

    categories: by tag, the class in which each part is judged.
    """
    if not rule.charges:
        return []
    found = [_charge(rule, parts, categories, ratio) for ratio in measured if ratio.passed]
    return [charge for charge in found if charge is not None]


def _sides(
    parts: Sequence[Part], categories: Mapping[str, str], ratio: Ratio
) -> tuple[list[Part], list[Part]]:
    """The openings that a ratio counts, and the opaque parts that they stand in."""
    surface, _, _ = RATIO_PARTS[ratio.name]
    flows = [part for part in parts if part.metric.startswith("U_")]
    return (
        [part for part in flows if part.element in ratio.counted],
        [part for part in flows if matches(f"{surface}.*", categories[part.element])],
    )


def _charge(
    rule: TradeOff, parts: Sequence[Part], categories: Mapping[str, str], ratio: Ratio
) -> Charge | None:
    """The charge of one ratio, by the area above its allowance.

    ``at_allowance``: the table's sum has that area as the opaque part instead, A (U_o - U_g) of
    the limits. ``excess_added``: the design's sum has A (U_g - U_o) of the drawn values added, not
    less than 0 (the excess glazing terms of component performance in the model energy code for
    commercial buildings, C402.1.5, from memory).
    """
    openings, opaque = _sides(parts, categories, ratio)
    if ratio.most is None or not openings or not opaque:
        return None
    excess = ratio.numerator - ratio.most * ratio.denominator
    by_table = rule.glazing == "at_allowance"
    glazing, wall = _mean(openings, by_table), _mean(opaque, by_table)
    if by_table:
        return Charge(ratio.name, excess, glazing, wall, excess * (wall - glazing), "table")
    added = max(0.0, excess * (glazing - wall))
    return Charge(ratio.name, excess, glazing, wall, added, "drawn")


def _mean(parts: Sequence[Part], by_table: bool) -> float:
    """Area-weighted mean U as drawn or by the table, W/(m2 K)."""
    flows = fsum(part.table if by_table else part.drawn for part in parts)
    return flows / fsum(part.amount for part in parts)
