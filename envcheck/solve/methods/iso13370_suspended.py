"""Suspended floors by ISO 13370: through the floor, then by the ground and by the outside air."""

from __future__ import annotations

from typing import NamedTuple

from envcheck.model.solved import Operand, Step
from envcheck.solve.methods.iso13370_slab import bare_ground_u
from envcheck.solve.registry import Method

SOURCE = "ISO 13370:2007, 9.2"
SHIELDING = {"sheltered": 0.02, "average": 0.05, "exposed": 0.10}
"""fw of the wind by the surroundings: city centre, suburb, open country; ISO 13370, from memory."""
AIR = 1450.0
"""J/(m3 K), the constant that ISO 13370 prints for air that the wind drives through openings."""


class SuspendedFloor(NamedTuple):
    """A floor over a space that outside air ventilates; floats or arrays."""

    dimension: float
    """B', m"""
    floor: float
    """Uf between the room and the space below, both films included, W/(m2 K)"""
    soil: float
    """k, W/(m K)"""
    ground: float
    """dg = w + k (Rsi + Rg + Rse), equivalent thickness of the ground, m"""
    height: float
    """h of the floor's upper face above the ground outside, m"""
    wall: float
    """Uw of the space's walls above ground, W/(m2 K)"""
    openings: float
    """e: area of the openings by length of the perimeter, m2/m"""
    wind: float
    """v: mean speed at 10 m, m/s"""
    shielding: float = SHIELDING["average"]
    """fw"""


def underfloor_air_u(of: SuspendedFloor) -> float:
    """U from the space by its walls and its openings: Ux = 2 h Uw / B' + 1450 e v fw / B'.

    Returns W/(m2 K). Source: ISO 13370:2007, 9.2.
    """
    walls = 2.0 * of.height * of.wall
    return (walls + AIR * of.openings * of.wind * of.shielding) / of.dimension


def suspended_u(of: SuspendedFloor) -> float:
    """U of a suspended floor: 1/U = 1/Uf + 1/(Ug + Ux).

    Returns W/(m2 K). Source: ISO 13370:2007, 9.2.
    """
    ground = bare_ground_u(of.soil, of.dimension, of.ground)
    return 1.0 / (1.0 / of.floor + 1.0 / (ground + underfloor_air_u(of)))


def suspended_steps(of: SuspendedFloor) -> tuple[Step, ...]:
    """Worksheet to ``U`` of a suspended floor. Floats."""
    ground, air = bare_ground_u(of.soil, of.dimension, of.ground), underfloor_air_u(of)
    size = Operand("B", of.dimension, "length")
    below = (Operand("k", of.soil, "conductivity"), size, Operand("d_g", of.ground, "length"))
    around = (
        Operand("h", of.height, "length"), Operand("U_w", of.wall, "u_factor"),
        Operand("e", of.openings, "length"), Operand("v", of.wind, "number"),
        Operand("f_w", of.shielding, "number"), size,
    )  # fmt: skip
    u_ground, u_air = Operand("U_g", ground, "u_factor"), Operand("U_x", air, "u_factor")
    return (
        Step(
            "U_g", "from the space below the floor into the ground",
            "2 * {k} / (3.14159265 * {B} + {d_g}) * ln(3.14159265 * {B} / {d_g} + 1)",
            below, ground, "u_factor", SOURCE, True,
        ),
        Step(
            "U_x", "from the space below the floor by its walls and openings (v in m/s)",
            "(2 * {h} * {U_w} + 1450 * {e} * {v} * {f_w}) / {B}",
            around, air, "u_factor", SOURCE, True,
        ),
        Step(
            "U", "U-factor of the suspended floor", "1 / (1 / {U_f} + 1 / ({U_g} + {U_x}))",
            (Operand("U_f", of.floor, "u_factor"), u_ground, u_air),
            suspended_u(of), "u_factor", SOURCE,
        ),
    )  # fmt: skip


METHODS = (
    Method(
        name="iso13370_suspended",
        title="Suspended floor over a space ventilated by outside air",
        formula="1/U = 1/Uf + 1/(Ug + Ux);  Ug = 2 k / (pi B' + dg) ln(pi B'/dg + 1);  "
        "Ux = 2 h Uw / B' + 1450 e v fw / B'",
        source=SOURCE,
        valid="spaces whose ground lies at most 0.5 m below the ground outside, ventilated by the "
        "wind; not yet joined to an assembly",
    ),
)
