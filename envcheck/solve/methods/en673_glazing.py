"""Glazing by EN 673: the value of the centre of the glass, which never decides alone."""

from __future__ import annotations

from collections.abc import Sequence
from typing import NamedTuple

from envcheck.solve.elementary import larger
from envcheck.solve.methods.air_space import STEFAN_BOLTZMANN
from envcheck.solve.registry import Method

MEAN = 283.0
"""K, mean temperature of the gas spaces."""
DIFFERENCE = 15.0
"""K, between the outermost and the innermost surfaces that face a gas space."""
GRAVITY = 9.81
GLASS = 1.0
"""W/(m K) of soda-lime glass."""
ROUNDS = 30
"""Of sharing the difference between several spaces; each leaves less than a third of the error."""


class Gas(NamedTuple):
    """Properties of a gas, or of a mixture, at 10 degC."""

    density: float
    """kg/m3"""
    viscosity: float
    """Pa s"""
    conductivity: float
    """W/(m K)"""
    specific_heat: float
    """J/(kg K)"""


def mixture(gas: Gas, air: Gas, share: float) -> Gas:
    """Properties of ``share`` (0..1) of a gas in air: linear. Source: EN 673:2011, 6.2."""
    return Gas(*(share * g + (1.0 - share) * a for g, a in zip(gas, air, strict=True)))


def gas_conductance(gas: Gas, gap: float, difference: float = DIFFERENCE) -> float:
    """Conductance of a vertical gas space by convection: hg = Nu k / s, Nu = 0.035 (Gr Pr)^0.38.

    gap: s, m. difference: K across the space. Any shape. Returns W/(m2 K); Nu is at least 1.
    Source: EN 673:2011, 5.3.2.
    """
    grashof = GRAVITY * gap**3 * difference * gas.density**2 / (MEAN * gas.viscosity**2)
    prandtl = gas.viscosity * gas.specific_heat / gas.conductivity
    nusselt = larger(0.035 * (grashof * prandtl) ** 0.38, 1.0)
    return nusselt * gas.conductivity / gap


def radiation_conductance(emissivity_1: float, emissivity_2: float) -> float:
    """Conductance by radiation: hr = 4 sigma Tm^3 / (1/e1 + 1/e2 - 1), W/(m2 K).

    emissivity: corrected emissivities of the two faces. Source: EN 673:2011, 5.3.1.
    """
    return 4.0 * STEFAN_BOLTZMANN * MEAN**3 / (1.0 / emissivity_1 + 1.0 / emissivity_2 - 1.0)


def glazing_u(
    panes: Sequence[float],
    gaps: Sequence[float],
    gases: Sequence[Gas],
    emissivities: Sequence[tuple[float, float]],
    h_inside: float = 7.7,
    h_outside: float = 25.0,
) -> float:
    """U of the centre of a glazing: 1/U = 1/he + sum 1/hs + sum d/k + 1/hi.

    panes: thicknesses, m. gaps, gases, emissivities: of the spaces between them, one fewer. The
    temperature difference is shared between several spaces by their resistances. Numbers of any
    shape. Returns W/(m2 K). Source: EN 673:2011, 5.2 and 7.
    """
    radiation = [radiation_conductance(*pair) for pair in emissivities]
    shares = [1.0 / len(gaps)] * len(gaps)
    resistances: list[float] = []
    for _ in range(ROUNDS if len(gaps) > 1 else 1):
        resistances = [
            1.0 / (gas_conductance(gas, gap, DIFFERENCE * share) + hr)
            for gas, gap, share, hr in zip(gases, gaps, shares, radiation, strict=True)
        ]
        total = sum(resistances)
        shares = [resistance / total for resistance in resistances]
    glass = sum(panes) / GLASS
    return 1.0 / (1.0 / h_outside + sum(resistances) + glass + 1.0 / h_inside)


METHODS = (
    Method(
        name="en673_glazing",
        title="Centre of a glazing",
        formula="1/U = 1/he + sum of 1/(hg + hr) + sum of d/k + 1/hi;  hg = Nu k / s, "
        "Nu = 0.035 (Gr Pr)^0.38, at least 1",
        source="EN 673:2011",
        valid="vertical glazing; the frame and the edge are not in it, so that it never decides "
        "alone",
    ),
)
