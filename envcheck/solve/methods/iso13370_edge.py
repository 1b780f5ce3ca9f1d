"""Edge insulation of a slab on ground: what it takes off the heat flow along the perimeter."""

from __future__ import annotations

from math import pi
from typing import NamedTuple

from envcheck.model.solved import Operand, Step
from envcheck.solve.elementary import ln_of_one_plus
from envcheck.solve.registry import Method

SOURCE = "ISO 13370:2017, annex B"


def edge_thickness(resistance: float, thickness: float, soil: float) -> float:
    """Additional equivalent thickness of edge insulation: d' = (Rn - dn / k) k, m.

    resistance: Rn of the insulation, m2 K/W. thickness: dn, m: the soil that it displaces. soil:
    k, W/(m K). Any shape. Source: ISO 13370:2017, annex B.
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


def slab_with_edge(u_factor: float, psi: float, dimension: float) -> float:
    """U of a slab with edge insulation: U = U0 + 2 psi / B'.

    u_factor: U0 of the slab without it, W/(m2 K). psi: W/(m K). dimension: B', m. Any shape.
    Source: ISO 13370:2017, annex B.
    """
    return u_factor + 2.0 * psi / dimension


class Edge(NamedTuple):
    """Insulation along the edge of a slab."""

    vertical: bool
    size: float
    """Depth of vertical, width of horizontal insulation, m."""
    resistance: float
    """m2 K/W"""
    thickness: float
    """m"""


def edge_steps(edge: Edge, soil: float, floor: float) -> tuple[Step, ...]:
    """Worksheet to ``psi`` of the edge; soil: k, W/(m K); floor: dt, m. Floats."""
    reach = 2.0 * edge.size if edge.vertical else edge.size
    added = edge_thickness(edge.resistance, edge.thickness, soil)
    conductivity, d_t = Operand("k", soil, "conductivity"), Operand("d_t", floor, "length")
    size = Operand("D_n", edge.size, "length")
    resistance = Operand("R_n", edge.resistance, "resistance")
    thickness = Operand("d_n", edge.thickness, "length")
    return (
        Step(
            "D", "reach of the edge insulation" + (", twice its depth" if edge.vertical else ""),
            "2 * {D_n}" if edge.vertical else "{D_n}", (size,), reach, "length", SOURCE,
        ),
        Step(
            "d_edge", "additional equivalent thickness", "({R_n} - {d_n} / {k}) * {k}",
            (resistance, thickness, conductivity), added, "length", SOURCE,
        ),
        Step(
            "psi", "linear transmittance of the edge insulation",
            "-{k} / 3.14159265 * (ln({D} / {d_t} + 1) - ln({D} / ({d_t} + {d_edge}) + 1))",
            (conductivity, Operand("D", reach, "length"), d_t, Operand("d_edge", added, "length")),
            edge_psi(soil, reach, floor, added), "linear_transmittance", SOURCE, True,
        ),
    )  # fmt: skip


METHODS = (
    Method(
        name="iso13370_edge",
        title="Edge insulation of a slab on ground",
        formula="psi = - k / pi (ln(D / dt + 1) - ln(D / (dt + d') + 1)), d' = (Rn - dn / k) k;  "
        "U = U0 + 2 psi / B'",
        source=SOURCE,
        valid="insulation or low-density foundations along the edge, thinner than they are deep or "
        "wide; of vertical and horizontal insulation only the better one counts",
    ),
)
