"""From a declared to a design conductivity: the formula and what a material states for it."""

from math import e
from typing import NamedTuple


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


class Conversion(NamedTuple):
    """What leads from a declared conductivity to that of the design."""

    declared: float
    """W/(m K)"""
    per_kelvin: float
    """fT, 1/K"""
    declared_temperature: float
    """degC"""
    temperature: float
    """Mean temperature in the design, degC."""
    per_moisture: float
    """f_psi by volume or f_u by mass, 1 per share."""
    declared_moisture: float
    """Share by volume or mass, 0..1."""
    moisture: float
    """In the design."""
    source: str
    """Of the coefficients."""

    @property
    def conductivity(self) -> float:
        """Of the design, W/(m K)."""
        return design_conductivity(
            self.declared,
            self.per_kelvin,
            self.temperature - self.declared_temperature,
            self.per_moisture,
            self.moisture - self.declared_moisture,
        )
