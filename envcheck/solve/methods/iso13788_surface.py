"""Humidity at the inner surface: the least temperature factor that keeps it below 80 %."""

from __future__ import annotations

from envcheck.model.moisture import Month
from envcheck.model.solved import Operand, Step
from envcheck.model.vapour import OVER_ICE, OVER_WATER, TRIPLE, saturation_temperature
from envcheck.solve.registry import Method
from envcheck.solve.surface import STILL

SOURCE = "ISO 13788:2012, 5"
HUMID = 0.8
"""Relative humidity of the air at a surface from which mould may grow."""


def least_surface_temperature(indoor_pressure: float, humid: float = HUMID) -> float:
    """Surface temperature at which indoor air has the relative humidity ``humid`` there:
    psat(T) = p_i / 0.8.

    indoor_pressure: p_i, Pa, more than 0. humid: 0..1. Returns degC.
    Source: ISO 13788:2012, 5.3 (from memory).
    """
    return saturation_temperature(indoor_pressure / humid)


def critical_factor(least: float, outdoors: float, indoors: float) -> float | None:
    """Least temperature factor f = (T_si,min - T_e) / (T_i - T_e).

    All in degC. Returns None where it is not colder outdoors than indoors.
    Source: ISO 13788:2012, 5.3 (from memory).
    """
    return (least - outdoors) / (indoors - outdoors) if indoors > outdoors else None


def factor_step(resistance: float, value: float) -> Step:
    """The step to the temperature factor of the plain element, from film and layers, m2 K/W."""
    operands = Operand("R", resistance, "resistance"), Operand("R_si", STILL, "resistance")
    title = "temperature factor of the plain surface"
    return Step("f_Rsi", title, "1 - {R_si} / ({R} + {R_si})", operands, value, "number", SOURCE)


def critical_steps(month: Month) -> tuple[Step, ...]:
    """From the vapour pressure of the rooms to the critical factor of one month."""
    pressure = Operand("p_i", month.indoor_pressure, "vapour_pressure")
    saturated = month.indoor_pressure / HUMID
    factor, offset = OVER_WATER if saturated >= TRIPLE else OVER_ICE
    logarithm = f"ln({{p_s}} / {TRIPLE})"
    least = Operand("T_min", month.least_surface, "temperature")
    outdoors = Operand("T_e", month.outdoor_temperature, "temperature")
    indoors = Operand("T_i", month.indoor_temperature, "temperature")
    steps = [
        Step("p_s", "saturation pressure at the surface", f"{{p_i}} / {HUMID}", (pressure,),
             saturated, "vapour_pressure", SOURCE),
        Step("T_min", "least surface temperature",
             f"{offset} * {logarithm} / ({factor} - {logarithm})",
             (Operand("p_s", saturated, "vapour_pressure"),), month.least_surface, "temperature",
             "ISO 13788:2012, annex E", True),
    ]  # fmt: skip
    if month.critical is not None:
        steps.append(
            Step("f_min", "critical temperature factor", "({T_min} - {T_e}) / ({T_i} - {T_e})",
                 (least, outdoors, indoors), month.critical, "number", SOURCE)
        )  # fmt: skip
    return tuple(steps)


METHODS = (
    Method(
        name="iso13788_surface",
        title="Humidity at the inner surface, by month (advisory)",
        formula="psat(T_si,min) = p_i / 0.8;  f_min = (T_si,min - T_e) / (T_i - T_e);  f_Rsi = 1 - "
        "R_si / R_T with R_si = 0.25 m2 K/W",
        source=SOURCE,
        valid="monthly means, the plain element: edges, corners, members and other thermal bridges "
        "are colder and not covered; never a verdict",
    ),
)
