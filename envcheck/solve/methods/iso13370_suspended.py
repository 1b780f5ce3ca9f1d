"""Suspended floors by ISO 13370: through the floor, then by the ground and by the outside air."""

from __future__ import annotations

from typing import NamedTuple

from envcheck.model.ground import Suspended
from envcheck.model.project import Assembly
from envcheck.model.ruleset import Conventions
from envcheck.model.solved import Operand, Setting, Step
from envcheck.solve.cells import stated_cell
from envcheck.solve.ground_layers import (
    GroundNumbers,
    bare_wall,
    bridged,
    ground_numbers,
    measured_said,
)
from envcheck.solve.methods.iso13370_slab import (
    bare_ground_u,
    dimension_step,
    thickness_step,
)
from envcheck.solve.methods.weighted import decide_weighted
from envcheck.solve.methods.wirings import decide_series
from envcheck.solve.registry import Decision, Method, NotDecided
from envcheck.solve.renaming import renamed

SOURCE = "ISO 13370:2007, 9.2"
SHIELDING = {"sheltered": 0.02, "average": 0.05, "exposed": 0.10}
"""fw of the wind by the surroundings: city centre, suburb, open country; ISO 13370, from memory."""
AIR = 1450.0
"""J/(m3 K), the constant that ISO 13370 prints for air that the wind drives through openings."""


DEEPEST = 0.5
"""m; ISO 13370: how far the ground of the space may lie below the ground outside."""
BELOW = "room film on both faces of the floor: the heat flows down into still air (ISO 13370)"


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
    size = Operand("B", of.dimension, "run")
    below = (Operand("k", of.soil, "conductivity"), size, Operand("d_g", of.ground, "length"))
    around = (
        Operand("h", of.height, "length"), Operand("U_w", of.wall, "u_factor"),
        Operand("e", of.openings, "openings_per_length"), Operand("v", of.wind, "speed"),
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
            "U_x", "from the space below the floor by its walls and openings",
            "(2 * {h} * {U_w} + 1450 * {e} * {v} * {f_w}) / {B}",
            around, air, "u_factor", SOURCE, True,
        ),
        Step(
            "U", "U-factor of the suspended floor", "1 / (1 / {U_f} + 1 / ({U_g} + {U_x}))",
            (Operand("U_f", of.floor, "u_factor"), u_ground, u_air),
            suspended_u(of), "u_factor", SOURCE,
        ),
    )  # fmt: skip


def solve_suspended(assembly: Assembly, setting: Setting, conventions: Conventions) -> Decision:
    """Solve a suspended floor: its layers, the ground below, the wind through its openings.

    Errors: NotDecided with everything that is missing, or where the ground lies too deep.
    """
    below = assembly.suspended
    if below is None:
        raise NotDecided("the space below the suspended floor")
    given = _numbers(below, conventions)
    if below.depth > DEEPEST:
        raise NotDecided(
            f"ground at most {DEEPEST:g} m below the ground outside: this formula of ISO 13370 "
            f"holds no further, and {below.depth:.4g} m are stated"
        )
    floor = floor_between(assembly, setting, conventions)
    size = dimension_step(given)
    ground = stated_cell("R_g", "insulation on the ground", below.ground_resistance, "project")
    d_g = thickness_step("d_g", given, setting.inside_film, ground.steps[0])
    of = SuspendedFloor(
        dimension=size.value,
        floor=floor.value or 0.0,
        soil=given.soil,
        ground=d_g.value,
        height=below.height or 0.0,
        wall=below.wall_u or 0.0,
        openings=below.openings or 0.0,
        wind=below.wind or 0.0,
        shielding=SHIELDING[below.shielding],
    )
    steps = (*floor.steps, size, *ground.steps, d_g, *suspended_steps(of))
    said = (BELOW, measured_said(below.ground, conventions), *floor.assumptions, _wind(below))
    return Decision(suspended_u(of), steps=steps, layer_steps=floor.layer_steps, assumptions=said)


def _numbers(below: Suspended, conventions: Conventions) -> GroundNumbers:
    shielding = SHIELDING.get(below.shielding)
    return ground_numbers(
        below.ground,
        conventions,
        "floor",
        height=("the height of the floor above the ground outside", below.height),
        wall_u_factor=("the U-factor of the walls of the space below", below.wall_u),
        openings_per_length=("the ventilation openings of the space below", below.openings),
        wind_speed=("the mean speed of the wind", below.wind),
        shielding=("how the openings are shielded from the wind", shielding),
    )


def floor_between(assembly: Assembly, setting: Setting, conventions: Conventions) -> Decision:
    """The floor between room and space: its last steps are R_fl and U_f."""
    wall = bare_wall(assembly, setting, conventions)
    film, where = setting.inside_film, setting.inside_film_from
    outside = film if assembly.outside_film is None else assembly.outside_film
    stated = where if assembly.outside_film is None else "stated in the project"
    wall = wall._replace(
        outside=stated_cell("Ro", "film below the floor", outside, stated),
        inside=stated_cell("Ri", "inside film", film, where),
    )
    decide = decide_weighted if bridged(wall.blocks) else decide_series
    decision = decide(wall)
    return decision._replace(steps=renamed(decision.steps, {"R": "R_fl", "U": "U_f"}))


def _wind(below: Suspended) -> str:
    factor = f"{SHIELDING[below.shielding]:g}"
    return f"wind shielding factor {factor} ({below.shielding}); ISO 13370, from memory"


METHODS = (
    Method(
        name="iso13370_suspended",
        title="Suspended floor over a space ventilated by outside air",
        formula="1/U = 1/Uf + 1/(Ug + Ux);  Ug = 2 k / (pi B' + dg) ln(pi B'/dg + 1);  "
        "Ux = 2 h Uw / B' + 1450 e v fw / B'",
        source=SOURCE,
        valid="spaces whose ground lies at most 0.5 m below the ground outside, ventilated by the "
        "wind; walls of the space of one U-factor",
        solves=(("suspended-floor", solve_suspended),),
        assumed=False,
    ),
)
