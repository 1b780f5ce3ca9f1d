"""Heated basements by ISO 13370: floor, walls, and both together."""

from __future__ import annotations

from collections.abc import Callable
from math import pi
from typing import NamedTuple

from envcheck.model.project import Assembly, Layer
from envcheck.model.ruleset import Conventions
from envcheck.model.solved import Operand, Setting, Step
from envcheck.solve.conventions import film_resistance
from envcheck.solve.elementary import ln_of_one_plus, smaller
from envcheck.solve.ground_layers import bare_wall, ground_numbers, measured_said, plain_layers
from envcheck.solve.methods.iso13370_slab import (
    FILM_SAID,
    GROUND_FILM,
    characteristic_dimension,
    slab_u,
    thickness_step,
)
from envcheck.solve.network import series
from envcheck.solve.registry import Decision, Method, NotDecided

SOURCE = "ISO 13370:2007, 9.3"
WALL_FILM = "room film of the walls by the heat flow through a wall, of the floor by that down"


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
    size, d_t = Operand("B", dimension, "run"), Operand("d_t", of.floor, "length")
    below = Operand("d_tz", thickness, "length")
    walls = (Operand("d_w", of.wall, "length"), Operand("d_s", slab, "length"))
    closing = (area, Operand("U_bf", floor_u, "u_factor"), z, perimeter)
    u_walls = Operand("U_bw", wall_u, "u_factor")
    long = "2 * {k} / (3.14159265 * {B} + {d_tz}) * ln(3.14159265 * {B} / {d_tz} + 1)"
    formula = long if thickness < dimension else "{k} / (0.457 * {B} + {d_tz})"
    value = basement_u(of.area, of.perimeter, of.depth, floor_u, wall_u)
    return (
        Step("B", "characteristic dimension of the floor", "{A} / (0.5 * {P})", (area, perimeter),
             dimension, "run", SOURCE),
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


class Parts(NamedTuple):
    """A basement read and drawn: its numbers, and the steps that lead to them."""

    of: HeatedBasement
    steps: tuple[Step, ...]
    layers: int
    """How many of the steps lead to single layers."""
    assumptions: tuple[str, ...]


def parts_of(
    assembly: Assembly, floor: tuple[Layer, ...], setting: Setting, conventions: Conventions
) -> Parts:
    """Draw the floor (none is bare ground) and the walls of a basement.

    Errors: NotDecided with everything that is missing.
    """
    basement = assembly.basement
    if basement is None:
        raise NotDecided("the depth, the walls and the ground of the basement")
    depth = ("the depth of the basement's floor below the ground outside", basement.depth)
    given = ground_numbers(basement.ground, conventions, "floor", depth=depth)
    prefix = "R" if floor == assembly.layers else "F"
    r_f = _layers(assembly, floor, setting, conventions, prefix, "R_f", "floor of the basement")
    walls = basement.walls
    r_w = _layers(assembly, walls, setting, conventions, "W", "R_w", "wall of the basement")
    stated = assembly.inside_film
    down, across = (
        setting.inside_film if film is None else film
        for film in (
            stated if stated is not None else film_resistance(conventions, "inside", way)
            for way in ("down", "horizontal")
        )
    )
    d_t = thickness_step("d_t", given, down, r_f[-1])
    d_w = _wall_step(given.soil, across, r_w[-1])
    of = HeatedBasement(
        given.soil, basement.depth or 0.0, d_t.value, d_w.value, given.area, given.perimeter
    )
    layers = (*r_f[:-1], *r_w[:-1])
    steps = (*layers, r_f[-1], r_w[-1], d_t, d_w)
    said = (FILM_SAID, WALL_FILM, measured_said(basement.ground, conventions))
    return Parts(of, steps, len(layers), said)


def _layers(
    assembly: Assembly,
    layers: tuple[Layer, ...],
    setting: Setting,
    conventions: Conventions,
    prefix: str,
    symbol: str,
    what: str,
) -> tuple[Step, ...]:
    if not layers:
        return (Step(symbol, f"{what}: bare ground", "", (), 0.0, "resistance", "project"),)
    drawn = bare_wall(assembly._replace(layers=layers), setting, conventions, prefix)
    return plain_layers(drawn, symbol, what)


def _wall_step(soil: float, film: float, wall: Step) -> Step:
    operands = (
        Operand("k", soil, "conductivity"),
        Operand("R_siw", film, "resistance"),
        Operand(wall.symbol, wall.value, "resistance"),
        Operand("R_se", GROUND_FILM, "resistance"),
    )
    value = wall_thickness(soil, film, wall.value, GROUND_FILM)
    title = "equivalent thickness of the walls"
    expression = "{k} * ({R_siw} + {R_w} + {R_se})"
    return Step("d_w", title, expression, operands, value, "length", SOURCE)


def _solver(wanted: tuple[str, ...]) -> Callable[[Assembly, Setting, Conventions], Decision]:
    """A solver whose worksheet ends with the last of the wanted symbols."""

    def solve(assembly: Assembly, setting: Setting, conventions: Conventions) -> Decision:
        parts = parts_of(assembly, assembly.layers, setting, conventions)
        closing = [step for step in basement_steps(parts.of) if step.symbol in wanted]
        steps = (*parts.steps, *closing)
        value, said = steps[-1].value, parts.assumptions
        return Decision(value, steps=steps, layer_steps=parts.layers, assumptions=said)

    return solve


FLOOR_STEPS = ("B", "d_tz", "U_bf")
WALL_STEPS = ("d_s", "U_bw")
VALID = "ground of one conductivity, one depth all round, homogeneous layers"
METHODS = (
    Method(
        name="iso13370_basement",
        title="Heated basement, floor and walls together",
        formula="U = (A Ubf + z P Ubw) / (A + z P), Ubf and Ubw of its floor and walls",
        source=SOURCE,
        valid=VALID,
        solves=(("heated-basement", _solver((*FLOOR_STEPS, *WALL_STEPS, "U"))),),
        assumed=False,
    ),
    Method(
        name="iso13370_basement_floor",
        title="Heated basement, floor",
        formula="Ubf of a slab with dt + z/2 in place of dt",
        source=SOURCE,
        valid=VALID,
        solves=(("heated-basement", _solver(FLOOR_STEPS)),),
        assumed=False,
    ),
    Method(
        name="iso13370_basement_wall",
        title="Heated basement, walls",
        formula="Ubw = 2 k / (pi z) (1 + 0.5 dt / (dt + z)) ln(z / dw + 1); where dw < dt it "
        "takes the place of dt",
        source=SOURCE,
        valid=VALID,
        solves=(("heated-basement", _solver(WALL_STEPS)),),
        assumed=False,
    ),
)
