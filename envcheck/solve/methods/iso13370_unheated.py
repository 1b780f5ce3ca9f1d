"""Unheated basements by ISO 13370: the floor above, and what the basement loses outwards."""

from __future__ import annotations

from typing import NamedTuple

from envcheck.model.ground import Basement
from envcheck.model.project import Assembly
from envcheck.model.ruleset import Conventions
from envcheck.model.solved import Operand, Setting, Step
from envcheck.solve.methods.iso13370_basement import basement_steps, parts_of
from envcheck.solve.methods.iso13370_suspended import floor_between
from envcheck.solve.registry import Decision, Method, NotDecided

SOURCE = "ISO 13370:2007, 9.4"
AIR = 0.33
"""Heat capacity of air by volume, Wh/(m3 K), as ISO 13370 prints it."""
CHANGES = 0.3
"""1/h: air changes of an unheated basement where nothing else is known; ISO 13370, from memory."""
HOUR = 3600.0
"""s"""
WITHIN = ("B", "d_tz", "U_bf", "d_s", "U_bw")
"""Steps of a heated basement that an unheated one shares."""


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
    volume: float | None = None
    """V of its air, m3; None = A (h + z)"""


def unheated_basement_u(of: UnheatedBasement) -> float:
    """U between a building and the outside by an unheated basement, W/(m2 K).

    1/U = 1/Uf + A / (A Ubf + z P Ubw + h P Uw + 0.33 n V), V = A (h + z) where it
    is not stated. Source: ISO 13370:2007,
    9.4.
    """
    volume = of.area * (of.height + of.depth) if of.volume is None else of.volume
    walls = of.perimeter * (of.depth * of.wall_below + of.height * of.wall_above)
    outwards = of.area * of.floor + walls + AIR * of.changes * volume
    return 1.0 / (1.0 / of.ground_floor + of.area / outwards)


def unheated_steps(of: UnheatedBasement) -> tuple[Step, ...]:
    """Worksheet to ``U`` of an unheated basement. Floats."""
    volume = of.area * (of.height + of.depth) if of.volume is None else of.volume
    area, perimeter = Operand("A", of.area, "area"), Operand("P", of.perimeter, "run")
    depth, height = Operand("z", of.depth, "run"), Operand("h", of.height, "run")
    value = unheated_basement_u(of)
    outwards = 1.0 / (1.0 / value - 1.0 / of.ground_floor)
    walls = (
        Operand("U_bf", of.floor, "u_factor"), Operand("U_bw", of.wall_below, "u_factor"),
        Operand("U_w", of.wall_above, "u_factor"),
    )  # fmt: skip
    air = (Operand("n", of.changes, "number"), Operand("V", volume, "volume"))
    steps = []
    if of.volume is None:
        title = "air of the basement"
        expression = "{A} * ({h} + {z})"
        steps.append(Step("V", title, expression, (area, height, depth), volume, "volume", SOURCE))
    steps.append(
        Step(
            "U_out", "from the basement outwards, by its floor, walls and air change (n in 1/h)",
            "({A} * {U_bf} + {z} * {P} * {U_bw} + {h} * {P} * {U_w} + 0.33 * {n} * {V}) / {A}",
            (area, perimeter, depth, height, *walls, *air), outwards, "u_factor", SOURCE, True,
        )
    )  # fmt: skip
    operands = (Operand("U_f", of.ground_floor, "u_factor"), Operand("U_out", outwards, "u_factor"))
    closing = "U-factor between the building and the outside, by the basement"
    expression = "1 / (1 / {U_f} + 1 / {U_out})"
    steps.append(Step("U", closing, expression, operands, value, "u_factor", SOURCE))
    return tuple(steps)


def solve_unheated(assembly: Assembly, setting: Setting, conventions: Conventions) -> Decision:
    """Solve an unheated basement; the layers of the assembly are the floor above it.

    Errors: NotDecided with everything that is missing.
    """
    basement = assembly.basement
    if basement is None:
        raise NotDecided("the depth, the walls and the ground of the basement")
    parts = parts_of(assembly, basement.floor, setting, conventions)
    _complete(basement)
    floor = floor_between(assembly, setting, conventions)
    below = {s.symbol: s for s in basement_steps(parts.of) if s.symbol in WITHIN}
    of = UnheatedBasement(
        area=parts.of.area,
        perimeter=parts.of.perimeter,
        depth=parts.of.depth,
        height=basement.height or 0.0,
        ground_floor=floor.value or 0.0,
        floor=below["U_bf"].value,
        wall_below=below["U_bw"].value,
        wall_above=basement.wall_u or 0.0,
        changes=CHANGES if basement.air_changes is None else basement.air_changes * HOUR,
        volume=basement.volume,
    )
    steps = (*floor.steps, *parts.steps, *below.values(), *unheated_steps(of))
    return Decision(
        steps[-1].value,
        steps=steps,
        layer_steps=floor.layer_steps,
        assumptions=(*parts.assumptions, *floor.assumptions, *_said(basement)),
    )


def _complete(basement: Basement) -> None:
    needed = {
        "the height of the floor above the ground outside (height)": basement.height,
        "the U-factor of the basement's walls above ground (wall_u_factor)": basement.wall_u,
    }
    missing = [words for words, value in needed.items() if value is None]
    if missing:
        raise NotDecided("; ".join(missing))


def _said(basement: Basement) -> list[str]:
    said = []
    if not basement.floor:
        said.append("floor of the basement taken as bare ground: no layers are stated")
    if basement.air_changes is None:
        said.append(f"{CHANGES:g} air changes per hour in the basement (ISO 13370, from memory)")
    if basement.volume is None:
        said.append("air of the basement taken as its area by its height")
    return said


METHODS = (
    Method(
        name="iso13370_unheated",
        title="Unheated basement below a heated building",
        formula="1/U = 1/Uf + A / (A Ubf + z P Ubw + h P Uw + 0.33 n V)",
        source=SOURCE,
        valid="ground of one conductivity, one depth all round, no part of the basement heated; "
        "homogeneous layers against the ground",
        solves=(("unheated-basement", solve_unheated),),
        assumed=False,
    ),
)
