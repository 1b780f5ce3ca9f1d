"""Display rounding and units: the only place where the report makes text of a number."""

from __future__ import annotations

import re
from collections.abc import Iterable
from decimal import ROUND_CEILING, ROUND_FLOOR, ROUND_HALF_UP, Decimal
from functools import lru_cache

from envcheck import units
from envcheck.model.metrics import METRICS

QUANTITIES = {name: metric.quantity for name, metric in METRICS.items()}
"""Metric -> quantity of ``units``; every other metric is a plain number."""
SYMBOLS = {name: metric.symbol or metric.words for name, metric in METRICS.items()}
DECIMALS = {
    ("u_factor", "IP"): 4,
    ("u_factor", "SI"): 3,
    ("linear_transmittance", "IP"): 4,
    ("linear_transmittance", "SI"): 3,
    ("resistance", "IP"): 2,
    ("resistance", "SI"): 3,
}
"""Of an unrounded value; plain numbers (SHGC, VT) have 3."""
SIGNIFICANT = 12
"""Digits of a binary number that mean anything; noise beyond them never decides a half."""

NEAR_HALF = 1e-3
FAR = 1e8
"""Within these no noise of a float can reach a half, and plain formatting rounds right."""


def fixed(value: float, decimals: int) -> str:
    """Round half-up to ``decimals`` places, after cutting binary noise."""
    scaled = abs(value) * 10.0**decimals
    if scaled < FAR and abs(scaled % 1.0 - 0.5) > NEAR_HALF:
        text = f"{value:.{decimals}f}"
        return text if text[0] != "-" or scaled >= 0.5 else text[1:]
    number = Decimal(f"{value:.{SIGNIFICANT}g}")
    rounded = number.quantize(Decimal(1).scaleb(-decimals), ROUND_HALF_UP)
    return f"{abs(rounded) if rounded.is_zero() else rounded:f}"


def interval(low: float, high: float, decimals: int) -> tuple[str, str]:
    """Write an interval so that it still encloses: the low end down, the high end up.

    A narrow one gets up to three more places, so that its ends can be told apart.
    """
    if high - low <= 1e-9 * high:
        return fixed(low, decimals), fixed(high, decimals)
    most = decimals + 3
    while decimals < most and high - low < 2.0 * 10.0**-decimals:
        decimals += 1
    place = Decimal(1).scaleb(-decimals)
    ends = (
        Decimal(f"{low:.{SIGNIFICANT}g}").quantize(place, ROUND_FLOOR),
        Decimal(f"{high:.{SIGNIFICANT}g}").quantize(place, ROUND_CEILING),
    )
    return f"{ends[0]:f}", f"{ends[1]:f}"


def trimmed(value: float, decimals: int) -> str:
    """Round like :func:`fixed` and cut trailing zeros behind the point."""
    text = fixed(value, decimals)
    return text.rstrip("0").rstrip(".") if "." in text else text


def significant(value: float, digits: int) -> str:
    """Round to ``digits`` significant digits, trailing zeros cut, never with an exponent."""
    text = f"{value:.{digits}g}"
    if "e" in text:
        text = f"{Decimal(text):f}"
    return text.rstrip("0").rstrip(".") if "." in text else text


def quantity(metric: str) -> str:
    """Name the quantity that a metric is measured in."""
    return QUANTITIES.get(metric, "number")


def symbol(metric: str) -> str:
    """Give the letter that stands before a value: U, C, F, R, SHGC, VT."""
    return SYMBOLS.get(metric, metric)


@lru_cache(maxsize=64)
def unit(metric: str, system: str) -> str:
    """Give the unit of a metric as printed in ``system``."""
    return units.label(quantity(metric), system)


@lru_cache(maxsize=256)
def decimals(metric: str, system: str, printed: int = 0) -> int:
    """Decimals of an unrounded value: one more than the printed limit has, at the least."""
    return max(DECIMALS.get((quantity(metric), system), 3), printed + 1)


@lru_cache(maxsize=256)
def factor(quantity: str, system: str) -> float:
    """SI value of one printed unit of a quantity; no use for absolute temperatures."""
    spelling = units.label(quantity, system)
    return units.to_si(1.0, spelling, quantity) if spelling else 1.0


def in_system(value: float, quantity: str, system: str) -> float:
    """Express an SI number in the printed unit of ``system``."""
    if quantity == "temperature":
        return units.in_system(value, quantity, system)
    return value / factor(quantity, system)


@lru_cache(maxsize=64)
def system_of(spelling: str) -> str:
    """Tell which system a printed unit belongs to: ``SI``, ``IP`` or empty for plain numbers."""
    if not spelling:
        return ""
    return "IP" if re.search(r"Btu|ft|\bin\b|F\b", spelling) else "SI"


def length(value: float, system: str) -> str:
    """Write a thickness with its unit: ``3.625 in`` or ``92.1 mm``; empty for none."""
    if not value:
        return ""
    shown = in_system(value, "thickness", system)
    return f"{trimmed(shown, 4 if system == 'IP' else 1)} {units.label('thickness', system)}"


def place(value: float, system: str) -> str:
    """Write a place on a drawing with its unit, fine enough for a sheet of metal."""
    shown = in_system(value, "thickness", system)
    return f"{trimmed(shown, 4 if system == 'IP' else 2)} {units.label('thickness', system)}"


def conductivity(value: float | None, system: str) -> str:
    """Write a conductivity without its unit, to four significant digits."""
    return "" if value is None else significant(in_system(value, "conductivity", system), 4)


def resistance(value: float | None, system: str) -> str:
    """Write an R-value without its unit, trailing zeros cut."""
    if value is None:
        return ""
    return trimmed(in_system(value, "resistance", system), 3)


def area(value: float, system: str) -> str:
    """Write an area without its unit, trailing zeros cut."""
    return trimmed(in_system(value, "area", system), 1 if system == "IP" else 2)


def flow_unit(metric: str, system: str) -> str:
    """Unit of a value times its area or length; empty where that is no heat flow."""
    flows = quantity(metric) in ("u_factor", "linear_transmittance")
    return units.label("point_transmittance", system) if flows else ""


def heat_flow(value: float, system: str) -> str:
    """Write a term of a sum, given in W/K, without its unit: to two decimals."""
    return fixed(in_system(value, "point_transmittance", system), 2)


def two_sums(drawn: float, table: float) -> tuple[str, str]:
    """Write two sums with as many digits as tell the greater from the less."""
    places = 0 if max(drawn, table) >= 1000.0 else 1 if max(drawn, table) >= 100.0 else 2
    while places < 6:
        texts = fixed(drawn, places), fixed(table, places)
        if texts[0] != texts[1] or abs(drawn - table) <= 1e-12 * table:
            return texts
        places += 1
    return fixed(drawn, places), fixed(table, places)


def total(texts: Iterable[str]) -> str:
    """Add printed numbers up as they are printed."""
    return f"{sum(map(Decimal, texts)):f}"


def percent(share: float, decimals: int = 1) -> str:
    """Write a share as per cent, trailing zeros cut."""
    return f"{trimmed(100.0 * share, decimals)} %"


def signed(value: float, decimals: int) -> str:
    """Write a difference with its sign; nothing rounds to a signed zero."""
    text = fixed(value, decimals)
    return text if text.startswith("-") or not text.strip("0.") else f"+{text}"


def temperature(value: float, system: str) -> str:
    """Write an air or interface temperature given in degrees C, with its unit."""
    shown = units.in_system(value, "temperature", system)
    return f"{fixed(shown, 1)} {units.label('temperature', system)}"
