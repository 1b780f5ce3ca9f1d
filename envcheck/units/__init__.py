"""Units: text with a unit in, SI out, and back for the printed page.

Inside everything is SI: m, m2, W, K, kg, J and what follows from them. Two readings are not
strict SI, since nobody in the trade uses the strict one: an absolute temperature is in degrees
Celsius, an angle in degrees. A share is a fraction 0..1. ``length``, ``thickness`` and ``run``
read alike and differ in the unit that is printed: m and in (as formulas need it), mm and in, m
and ft.
"""

from __future__ import annotations

from envcheck.units.spelling import known_unit, unit_key
from envcheck.units.table import FAHRENHEIT, FREEZING_F, KELVIN_ZERO, UNITS, Quantity
from envcheck.units.text import UnitError, absolute, parse, states_range

__all__ = [
    "UNITS", "Quantity", "UnitError", "convert", "in_system", "label", "parse", "quantity_of",
    "states_range", "to_si",
]  # fmt: skip


def quantity_of(unit: str) -> str:
    """Name the first quantity that a unit can stand for; empty for an unknown spelling."""
    known = known_unit(unit)
    return known[1][0] if known else ""


def _known(unit: str) -> float:
    known = known_unit(unit)
    if known is None:
        raise UnitError("unknown-unit", unit, "a known unit", "use a spelling of the units table")
    return known[0]


def to_si(value: float, unit: str, quantity: str = "") -> float:
    """Convert a number in ``unit`` to SI.

    A lone degree is an absolute temperature unless ``quantity`` says otherwise.
    """
    return absolute(value, unit, _known(unit), quantity or quantity_of(unit))


def convert(value_si: float, unit: str, quantity: str = "") -> float:
    """Convert an SI number to ``unit``, the inverse of :func:`to_si`."""
    factor = _known(unit)
    if (quantity or quantity_of(unit)) != "temperature":
        return value_si / factor
    atom = (unit_key(unit) or (("",), ()))[0][0]
    if atom == "degF":
        return value_si / FAHRENHEIT + FREEZING_F
    return value_si - KELVIN_ZERO if atom == "K" else value_si


def label(quantity: str, system: str) -> str:
    """Give the unit as printed for ``system`` ``SI`` or ``IP``; empty for plain numbers."""
    entry = UNITS[quantity]
    return entry.ip if system == "IP" else entry.si


def in_system(value: float, quantity: str, system: str) -> float:
    """Express an SI number in the printed unit of ``system`` (:func:`label`)."""
    unit = label(quantity, system)
    return convert(value, unit, quantity) if unit else value
