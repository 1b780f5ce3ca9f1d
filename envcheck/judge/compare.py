"""The one place where a value is held against a printed number."""

from __future__ import annotations

from decimal import ROUND_HALF_UP, Decimal
from functools import cache

from envcheck.model.judged import Comparison
from envcheck.model.ruleset import Limit, RuleSet, Term
from envcheck.units import convert

SIGNIFICANT = 12
"""Digits kept before decimal arithmetic, so that binary noise never turns a tie."""


def compare(value: float, term: Term, limit: Limit, ruleset: RuleSet) -> Comparison:
    """Hold a value (SI) against one printed number, by the rule set's rounding.

    The value is converted to the printed unit, kept to 12 significant digits, and rounded half-up
    to the decimals of the printed limit unless the rule set compares unrounded (or to two
    decimals). A value equal to the limit is within it.
    """
    printed = convert(value, limit.unit) if limit.unit else value
    exact = exact_decimal(printed)
    compared = _rounded(exact, decimals_of(term, ruleset))
    bound = _printed(term.text)
    within = compared <= bound if limit.sense == "max" else compared >= bound
    within_exactly = exact <= bound if limit.sense == "max" else exact >= bound
    margin = bound - exact if limit.sense == "max" else exact - bound
    return Comparison(
        value=printed,
        compared=float(compared),
        limit=term.number,
        decimals=term.decimals,
        unit=limit.unit,
        sense=limit.sense,
        within=within,
        by_rounding=within and not within_exactly,
        margin=float(margin),
    )


def own_term(limit: Limit) -> Term:
    """The number of a cell that speaks of the row's own metric; of several the easiest.

    A cell may offer others beside it (``0.30 or ER 34``): those are never compared with it. The
    reader makes sure that there is one.
    """
    own = [
        alternative[0]
        for alternative in limit.alternatives
        if len(alternative) == 1 and alternative[0].metric in ("", limit.metric)
    ]
    if not own:
        raise ValueError(f"{limit.id}: {limit.cell!r} holds no number of its own metric")
    if len(own) == 1:
        return own[0]
    easiest = max if limit.sense == "max" else min
    return easiest(own, key=lambda term: term.number)


@cache
def _printed(text: str) -> Decimal:
    return Decimal(text)


def decimals_of(term: Term, ruleset: RuleSet) -> int | None:
    """Decimals to which a computed value is rounded before comparison; None = not rounded."""
    if ruleset.compare == "unrounded":
        return None
    return 2 if ruleset.compare == "rounded_2dp" else term.decimals


def exact_decimal(value: float) -> Decimal:
    """A float as a decimal of 12 significant digits."""
    return Decimal(f"{value:.{SIGNIFICANT - 1}e}")


def rounded(value: float, decimals: int | None) -> Decimal:
    """Round half-up to decimals, or not at all."""
    return _rounded(exact_decimal(value), decimals)


def _rounded(exact: Decimal, decimals: int | None) -> Decimal:
    return exact if decimals is None else exact.quantize(_place(decimals), ROUND_HALF_UP)


@cache
def _place(decimals: int) -> Decimal:
    return Decimal(1).scaleb(-decimals)
