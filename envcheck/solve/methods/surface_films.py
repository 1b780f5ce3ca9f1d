"""Surface resistances from convection and radiation, by direction or by wind."""

from __future__ import annotations

from envcheck.solve.methods.air_space import STEFAN_BOLTZMANN
from envcheck.solve.registry import Method


def surface_resistance(convective: float, emittance: float, temperature: float) -> float:
    """Surface resistance: Rs = 1 / (hc + e 4 sigma T^3).

    convective: hc, W/(m2 K). emittance: of the surface. temperature: T, K, mean of the surface
    and its surroundings. Any shape. Returns m2 K/W. Source: ISO 6946:2017, annex C.
    """
    return 1.0 / (convective + emittance * 4.0 * STEFAN_BOLTZMANN * temperature**3)


def convection_by_wind(speed: float) -> float:
    """Convective coefficient of an outside surface: hc = 4 + 4 v.

    speed: v of the wind by the surface, m/s. Any shape. Returns W/(m2 K).
    Source: ISO 6946:2017, annex C.
    """
    return 4.0 + 4.0 * speed


METHODS = (
    Method(
        name="surface_films",
        title="Surface films",
        formula="Rs = 1 / (hc + e 4 sigma T^3);  outside hc = 4 + 4 v",
        source="ISO 6946:2017, annex C; films of a rule set or a handbook are looked up instead",
        valid="plane surfaces",
    ),
)
