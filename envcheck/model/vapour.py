"""Water vapour in air: saturation and the excess of dwellings and other rooms, numbers SI."""

from __future__ import annotations

from math import exp, log
from typing import NamedTuple

TRIPLE = 610.5
"""Pa at 0 degC, in the formulas of ISO 13788."""
OVER_WATER = (17.269, 237.3)
OVER_ICE = (21.875, 265.5)
WARM = 20.0
"""degC outdoors from which rooms hold no more vapour than the air outside."""


class IndoorAir(NamedTuple):
    """Air of the rooms, month by month from January."""

    source: str
    temperatures: tuple[float, ...]
    """degC; twelve"""
    humidities: tuple[float, ...] = ()
    """Relative, 0..1; twelve, or none where a humidity class is stated."""
    humidity_class: int | None = None
    excess: float = 0.0
    """Of the class over the vapour pressure outdoors at 0 degC and below, Pa."""
    excess_source: str = ""


def saturation_pressure(temperature: float) -> float:
    """Pressure of saturated vapour: p = 610.5 exp(17.269 T / (237.3 + T)), from 0 degC up;
    p = 610.5 exp(21.875 T / (265.5 + T)) below.

    temperature: T, degC, above -100. Returns Pa.
    Source: ISO 13788:2012, annex E (formulas E.7 and E.8; from memory).
    """
    factor, offset = OVER_WATER if temperature >= 0.0 else OVER_ICE
    return TRIPLE * exp(factor * temperature / (offset + temperature))


def saturation_temperature(pressure: float) -> float:
    """Temperature at which a vapour pressure saturates: the inverse of
    :func:`saturation_pressure`, T = b x / (a - x) with x = ln(p / 610.5).

    pressure: p, Pa, more than 0. Returns degC.
    Source: ISO 13788:2012, annex E (formulas E.9 and E.10; from memory).
    """
    factor, offset = OVER_WATER if pressure >= TRIPLE else OVER_ICE
    ratio = log(pressure / TRIPLE)
    return offset * ratio / (factor - ratio)


def excess_at(excess: float, outdoors: float) -> float:
    """Excess of a humidity class: whole at 0 degC outdoors and below, none from 20 degC, a
    straight line between.

    excess: at 0 degC, Pa. outdoors: monthly mean, degC. Returns Pa.
    Source: ISO 13788:2012, annex A, diagram of internal humidity classes (from memory).
    """
    return excess * min(max(1.0 - outdoors / WARM, 0.0), 1.0)
