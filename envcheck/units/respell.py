"""A number typed anew in the unit in which it stood."""

from __future__ import annotations

import re
from decimal import ROUND_CEILING, ROUND_FLOOR, Decimal

from envcheck.units.spelling import CHARACTERS, known_unit
from envcheck.units.table import R_IP
from envcheck.units.text import FRACTION, PREFIXED, QUANTITY, UnitError

DIGITS = 5
"""Significant digits of a number that is typed anew."""


def respelled(text: str, value: float, quantity: str, up: bool) -> str:
    """Type ``value`` (SI) in the unit of ``text``, rounded up or down to five digits.

    Errors: UnitError for a text that states no unit of that quantity.
    """
    plain = text.strip().translate(CHARACTERS)
    prefixed = PREFIXED.fullmatch(plain)
    if prefixed is not None and quantity == "resistance":
        factor = R_IP if prefixed[1] == "R-" else 1.0
        return prefixed[1] + number(value / factor, up)
    fraction = FRACTION.fullmatch(plain)
    match = QUANTITY.fullmatch(plain)
    unit = fraction[4] if fraction is not None else match[2] if match is not None else ""
    known = known_unit(unit) if unit else None
    if known is None or quantity not in known[1]:
        raise UnitError("wrong-unit", text, f"a unit of {quantity}", "state it with its unit")
    return f"{number(value / known[0], up)} {unit}"


def number(value: float, up: bool) -> str:
    """Write a number to five digits, never short of it: up or down as asked.

    What lies within a few parts in 10^7 of a rounder number is that number.
    """
    exact = Decimal(f"{value:.{DIGITS + 2}g}")
    place = Decimal(1).scaleb(exact.adjusted() - DIGITS + 1)
    rounded = exact.quantize(place, ROUND_CEILING if up else ROUND_FLOOR)
    text = f"{rounded:f}"
    return re.sub(r"\.?0+$", "", text) if "." in text else text
