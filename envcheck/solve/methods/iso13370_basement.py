"""Basements by ISO 13370: floor and wall of a heated one, the whole of an unheated one."""

from __future__ import annotations

from math import pi
from typing import NamedTuple

from envcheck.model.solved import Operand, Step
from envcheck.solve.elementary import ln_of_one_plus, smaller
from envcheck.solve.methods.iso13370_slab import characteristic_dimension, slab_u
from envcheck.solve.network import series
from envcheck.solve.registry import Method

SOURCE = "ISO 13370:2007, 9.3"
AIR = 0.33
"""Heat capacity of air by volume, Wh/(m3 K), as ISO 13370 prints it."""
CHANGES = 0.3
"""1/h: air changes of an unheated basement where nothing else is known; ISO 13370, from memory."""


def wall_thickness(soil: float, inside: float, wall: float, outside: float) -> float:
    """Equivalent thickness of a basement wall: dw = k (Rsi + Rw + Rse), m.

    soil: k, W/(m K). inside, wall, outside: m2 K/W. Any shape. Source: ISO 13370:2007, 9.3.
    """
    return soil * series(inside, wall, outside)


def basement_wall_u(depth: float, wall: float, floor: float, soil: float) -> float:
    """U of a basement wall: 2 k / (pi z) (1 + 0.5 dt / (dt + z)) ln(z / dw + 1).

    depth: z of the floor below ground, m. wall: dw; floor: dt, the equivalent thickness of the
    floor, m; where dw is less than dt it takes the place of dt. soil: k, W/(m K). Any shape.
    Returns W/(m2 K). Source: ISO 13370:2007, 9.3.
    """
    slab = smaller(wall, floor)
    factor = 2.0 * soil / (pi * depth)
    return factor * (1.0 + 0.5 * slab / (slab + depth)) * ln_of_one_plus(depth / wall)


def basement_floor_u(depth: float, floor: float, dimension: float, soil: float) -> float:
    """U of a basement floor: that of a slab whose dt is larger by half the depth.

    dt + z/2 < B': U = 2 k / (pi B' + dt + z/2) ln(pi B' / (dt + z/2) + 1), else
    U = k / (0.457 B' + dt + z/2). depth: z, m. floor: dt, m. dimension: B', m. soil: k, W/(m K).
    Any shape. Returns W/(m2 K). Source: ISO 13370:2007, 9.3.
    """
    return slab_u(soil, dimension, floor + 0.5 * depth)


def basement_u(area: float, perimeter: float, depth: float, floor_u: float, wall_u: float) -> float:
    """Effective U of floor and walls of a heated basement: (A Ubf + z P Ubw) / (A + z P).

    area: A of the floor, m2. perimeter: P, depth: z, m. floor_u, wall_u: W/(m2 K). Any shape.
    Source: ISO 13370:2007, 9.3.
    """
    wall = depth * perimeter
    return (area * floor_u + wall * wall_u) / (area + wall)


class UnheatedBasement(NamedTuple):
    """An unheated basement below a heated building; floats or arrays."""

    area: float
    """A, m2"""
    perimeter: float
    """P, m"""
    depth: float
    """z of the floor below ground, m"""
    height: float
    """h of the ground floor above ground, m"""
    ground_floor: float
    """Uf between the building and the basement, W/(m2 K)"""
    floor: float
    """Ubf of the basement's floor, W/(m2 K)"""
    wall_below: float
    """Ubw of its walls below ground, W/(m2 K)"""
    wall_above: float
    """Uw of its walls above ground, W/(m2 K)"""
    changes: float = CHANGES
    """n, air changes, 1/h"""


def unheated_basement_u(of: UnheatedBasement) -> float:
    """U between a building and the outside by an unheated basement, W/(m2 K).

    1/U = 1/Uf + A / (A Ubf + z P Ubw + h P Uw + 0.33 n V), V = A (h + z). Source: ISO 13370:2007,
    9.4.
    """
    volume = of.area * (of.height + of.depth)
    walls = of.perimeter * (of.depth * of.wall_below + of.height * of.wall_above)
    outwards = of.area * of.floor + walls + AIR * of.changes * volume
    return 1.0 / (1.0 / of.ground_floor + of.area / outwards)


class HeatedBasement(NamedTuple):
    """A heated basement: its equivalent thicknesses and its size. Floats."""

    soil: float
    """k, W/(m K)"""
    depth: float
    """z, m"""
    floor: float
    """dt, m"""
    wall: float
    """dw, m"""
    area: float
    """A, m2"""
    perimeter: float
    """P, m"""


def basement_steps(of: HeatedBasement) -> tuple[Step, ...]:
    """Worksheet to ``U_bf``, ``U_bw`` and the effective ``U`` of a heated basement."""
    dimension = characteristic_dimension(of.area, of.perimeter)
    thickness = of.floor + 0.5 * of.depth
    slab = min(of.wall, of.floor)
    floor_u = basement_floor_u(of.depth, of.floor, dimension, of.soil)
    wall_u = basement_wall_u(of.depth, of.wall, of.floor, of.soil)
    k, z = Operand("k", of.soil, "conductivity"), Operand("z", of.depth, "run")
    area, perimeter = Operand("A", of.area, "area"), Operand("P", of.perimeter, "run")
    size, d_t = Operand("B", dimension, "length"), Operand("d_t", of.floor, "length")
    below = Operand("d_tz", thickness, "length")
    walls = (Operand("d_w", of.wall, "length"), Operand("d_s", slab, "length"))
    closing = (area, Operand("U_bf", floor_u, "u_factor"), z, perimeter)
    u_walls = Operand("U_bw", wall_u, "u_factor")
    long = "2 * {k} / (3.14159265 * {B} + {d_tz}) * ln(3.14159265 * {B} / {d_tz} + 1)"
    formula = long if thickness < dimension else "{k} / (0.457 * {B} + {d_tz})"
    value = basement_u(of.area, of.perimeter, of.depth, floor_u, wall_u)
    return (
        Step("B", "characteristic dimension of the floor", "{A} / (0.5 * {P})", (area, perimeter),
             dimension, "length", SOURCE, True),
        Step("d_tz", "equivalent thickness of the floor and half the depth", "{d_t} + 0.5 * {z}",
             (d_t, z), thickness, "length", SOURCE, True),
        Step("U_bf", "floor of the basement", formula, (k, size, below), floor_u, "u_factor",
             SOURCE, True),
        Step("d_s", "equivalent thickness by the wall (the smaller counts)", "min({d_w}, {d_t})",
             (walls[0], d_t), slab, "length", SOURCE),
        Step("U_bw", "walls of the basement",
             "2 * {k} / (3.14159265 * {z}) * (1 + 0.5 * {d_s} / ({d_s} + {z})) * "
             "ln({z} / {d_w} + 1)", (k, z, *walls), wall_u, "u_factor", SOURCE, True),
        Step("U", "floor and walls of the basement",
             "({A} * {U_bf} + {z} * {P} * {U_bw}) / ({A} + {z} * {P})", (*closing, u_walls),
             value, "u_factor", SOURCE),
    )  # fmt: skip


METHODS = (
    Method(
        name="iso13370_basement",
        title="Heated and unheated basements",
        formula="Ubf of a slab with dt + z/2;  Ubw = 2 k / (pi z) (1 + 0.5 dt / (dt + z)) "
        "ln(z / dw + 1);  unheated: 1/U = 1/Uf + A / (A Ubf + z P Ubw + h P Uw + 0.33 n V)",
        source="ISO 13370:2007, 9.3 and 9.4",
        valid="ground of one conductivity, one depth all round; not yet joined to an assembly",
    ),
)
