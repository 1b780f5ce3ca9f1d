"""From a declared to a design conductivity: temperature and moisture."""

from __future__ import annotations

from math import e

from envcheck.solve.registry import Method


def design_conductivity(
    declared: float,
    temperature_coefficient: float = 0.0,
    temperature_difference: float = 0.0,
    moisture_coefficient: float = 0.0,
    moisture_difference: float = 0.0,
) -> float:
    """Design conductivity: k2 = k1 exp(fT (T2 - T1)) exp(f_psi (psi2 - psi1)).

    declared: k1, W/(m K). temperature_coefficient: fT, 1/K; difference T2 - T1, K.
    moisture_coefficient: f_psi, m3/m3; difference psi2 - psi1, m3/m3 (likewise by mass). Any
    shape. Returns W/(m K). Source: ISO 10456:2007, 7.
    """
    power = (
        temperature_coefficient * temperature_difference
        + moisture_coefficient * moisture_difference
    )
    factor: float = e**power
    return declared * factor


METHODS = (
    Method(
        name="iso10456_conversion",
        title="Declared to design conductivity",
        formula="k2 = k1 exp(fT (T2 - T1)) exp(f_psi (psi2 - psi1))",
        source="ISO 10456:2007, 7",
        valid="the material and range for which the coefficients were published",
    ),
)
