"""Floors and walls of heated basements, and what edge insulation adds to a slab."""

from __future__ import annotations

from math import pi

from envcheck.solve.elementary import ln_of_one_plus
from envcheck.solve.registry import Method


def wall_thickness(soil: float, inside: float, wall: float, outside: float) -> float:
    """Equivalent thickness of a basement wall: dw = k (Rsi + Rw + Rse), m.

    soil: k, W/(m K). inside, wall, outside: m2 K/W. Source: ISO 13370:2017, 7.3.
    """
    return soil * (inside + wall + outside)


def basement_wall_u(depth: float, wall: float, floor: float, soil: float) -> float:
    """U of a basement wall: 2 k / (pi z) (1 + 0.5 dt / (dt + z)) ln(z / dw + 1).

    depth: z of the floor below ground, m. wall: dw; floor: dt, the equivalent thickness of the
    floor, m; where dw is less than dt it takes the place of dt. soil: k, W/(m K). Floats.
    Returns W/(m2 K). Source: ISO 13370:2017, 7.3.
    """
    slab = min(wall, floor)
    factor = 2.0 * soil / (pi * depth)
    return factor * (1.0 + 0.5 * slab / (slab + depth)) * ln_of_one_plus(depth / wall)


def edge_thickness(resistance: float, thickness: float, soil: float) -> float:
    """Additional equivalent thickness of edge insulation: d' = (Rn - dn / k) k, m.

    resistance: Rn of the insulation, m2 K/W. thickness: dn, m. soil: k, W/(m K).
    Source: ISO 13370:2017, annex B.
    """
    return (resistance - thickness / soil) * soil


def edge_psi(soil: float, reach: float, floor: float, added: float) -> float:
    """Linear transmittance of edge insulation, negative: it lowers the heat flow.

    psi = - k / pi (ln(D / dt + 1) - ln(D / (dt + d') + 1)).

    soil: k, W/(m K). reach: D, the width of horizontal insulation or twice the depth of vertical
    insulation, m. floor: dt, m. added: d', m. Any shape. Returns W/(m K).
    Source: ISO 13370:2017, annex B.
    """
    return -soil / pi * (ln_of_one_plus(reach / floor) - ln_of_one_plus(reach / (floor + added)))


METHODS = (
    Method(
        name="iso13370_basement",
        title="Walls of a heated basement, and edge insulation of a slab",
        formula="Ubw = 2 k / (pi z) (1 + 0.5 dt / (dt + z)) ln(z / dw + 1);  "
        "psi = - k / pi (ln(D / dt + 1) - ln(D / (dt + d') + 1))",
        source="ISO 13370:2017, 7.3 and annex B",
        valid="ground of one conductivity; not yet joined to an assembly",
    ),
)
