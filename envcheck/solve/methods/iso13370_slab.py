"""Slab on ground by ISO 13370: the ground counts as an equivalent thickness of soil."""

from __future__ import annotations

from math import pi

from envcheck.model.project import Assembly, Slab
from envcheck.model.ruleset import Conventions
from envcheck.model.solved import Operand, Resistor, Setting, Step
from envcheck.solve.elementary import ln_of_one_plus
from envcheck.solve.ground_layers import bare_wall, bridged
from envcheck.solve.network import series
from envcheck.solve.registry import Decision, Method, NotDecided

SOURCE = "ISO 13370:2017, 7.1 and 7.2"
GROUND_FILM = 0.04
"""m2 K/W: outside surface resistance of the ground; ISO 13370 takes that of ISO 6946."""
FILM_SAID = (
    "the ground's own surface is counted with 0.04 m2 K/W (ISO 13370), the room's with the film of "
    "the rule set"
)
EDGE_SAID = (
    "edge insulation of the slab is not counted, which can only raise U: ISO 13370 asks for its "
    "thickness, which is not stated"
)


def characteristic_dimension(area: float, perimeter: float) -> float:
    """Characteristic dimension of the floor: B' = A / (P/2).

    area: of the floor, m2. perimeter: exposed, m, any shape. Returns m.
    Source: ISO 13370:2017, 7.1.
    """
    return area / (0.5 * perimeter)


def equivalent_thickness(
    wall_thickness: float,
    soil_conductivity: float,
    inside_film: float,
    floor: float,
    outside_film: float = GROUND_FILM,
) -> float:
    """Thickness of soil that resists as much as the floor: dt = w + k (Rsi + Rf + Rse).

    wall_thickness: w of the external wall, m. soil_conductivity: k, W/(m K). inside_film, floor,
    outside_film: Rsi, Rf, Rse, m2 K/W. Any shape. Returns m.
    Source: ISO 13370:2017, 7.2.
    """
    return wall_thickness + soil_conductivity * series(inside_film, floor, outside_film)


def bare_ground_u(soil_conductivity: float, dimension: float, thickness: float) -> float:
    """U into the ground below a floor: U = 2 k / (pi B' + d) ln(pi B'/d + 1).

    soil_conductivity: k, W/(m K). dimension: B', m. thickness: d, the equivalent thickness, m. Any
    shape. Returns W/(m2 K). Source: ISO 13370:2017, 7.2 (2007: 9.1, 9.2).
    """
    width = pi * dimension
    return 2.0 * soil_conductivity / (width + thickness) * ln_of_one_plus(width / thickness)


def slab_u(soil_conductivity: float, dimension: float, thickness: float) -> float:
    """U of a slab on ground, soil included.

    dt < B': U = 2 k / (pi B' + dt) ln(pi B'/dt + 1); dt >= B' (well insulated):
    U = k / (0.457 B' + dt). soil_conductivity: k, W/(m K). dimension: B', m. thickness: dt, m.
    Any shape. Returns W/(m2 K).
    Source: ISO 13370:2017, 7.2.
    """
    uninsulated = bare_ground_u(soil_conductivity, dimension, thickness)
    insulated = soil_conductivity / (0.457 * dimension + thickness)
    thick = thickness >= dimension
    return insulated * thick + uninsulated * (1 - thick)


def solve_slab(assembly: Assembly, setting: Setting, conventions: Conventions) -> Decision:
    """Solve a slab on ground of homogeneous layers.

    Errors: NotDecided with everything that is missing: perimeter, area, soil, wall thickness.
    """
    slab = assembly.slab
    if slab is None:
        raise NotDecided("perimeter, area, wall thickness and soil of the slab")
    perimeter, area, wall_thickness, soil = _numbers(slab)
    wall = bare_wall(assembly, setting, conventions)
    crossed = bridged(wall.blocks)
    if crossed:
        raise NotDecided(f"a slab without the bridged layer {crossed[0]!r}")
    cells = [block.cells[0][0] for block in wall.blocks]
    floor = sum(cell.value for cell in cells)
    dimension = characteristic_dimension(area, perimeter)
    thickness = equivalent_thickness(wall_thickness, soil, setting.inside_film, floor)
    value = slab_u(soil, dimension, thickness)
    operands = (Operand("A", area, "area"), Operand("P", perimeter, "run"))
    layers = tuple(step for cell in cells for step in cell.steps)
    steps = (
        *layers,
        _floor_step(cells, floor),
        Step(
            "B", "characteristic dimension of the floor", "{A} / (0.5 * {P})", operands,
            dimension, "run", SOURCE,
        ),
        _thickness_step(wall_thickness, soil, setting.inside_film, floor, thickness),
        _closing_step(soil, dimension, thickness, value),
    )  # fmt: skip
    return Decision(value, steps=steps, layer_steps=len(layers), assumptions=_assumptions(slab))


def _floor_step(cells: list[Resistor], floor: float) -> Step:
    operands = tuple(Operand(cell.symbol, cell.value, "resistance") for cell in cells)
    expression = " + ".join(f"{{{operand.name}}}" for operand in operands)
    return Step("R_f", "layers of the floor", expression, operands, floor, "resistance")


def _thickness_step(wall: float, soil: float, film: float, floor: float, value: float) -> Step:
    operands = (
        Operand("w", wall, "length"),
        Operand("k", soil, "conductivity"),
        Operand("R_si", film, "resistance"),
        Operand("R_f", floor, "resistance"),
        Operand("R_se", GROUND_FILM, "resistance"),
    )
    expression = "{w} + {k} * ({R_si} + {R_f} + {R_se})"
    return Step("d_t", "equivalent thickness", expression, operands, value, "length", SOURCE)


def _numbers(slab: Slab) -> tuple[float, float, float, float]:
    needed = {
        "the exposed perimeter of the slab (perimeter)": slab.perimeter,
        "the area of the slab (area)": slab.area,
        "the full thickness of the external wall (wall_thickness)": slab.wall_thickness,
        "the conductivity of the soil (soil_conductivity)": slab.soil_conductivity,
    }
    missing = [name for name, value in needed.items() if value is None]
    if missing:
        raise NotDecided("; ".join(missing))
    perimeter, area, wall_thickness, soil = (value or 0.0 for value in needed.values())
    return perimeter, area, wall_thickness, soil


def _closing_step(soil: float, dimension: float, thickness: float, value: float) -> Step:
    operands = (
        Operand("k", soil, "conductivity"),
        Operand("B", dimension, "run"),
        Operand("d_t", thickness, "length"),
    )
    if thickness >= dimension:
        title = "U-factor of the slab (well insulated: dt is not below B')"
        expression = "{k} / (0.457 * {B} + {d_t})"
    else:
        title = "U-factor of the slab (dt below B')"
        expression = "2 * {k} / (3.14159265 * {B} + {d_t}) * ln(3.14159265 * {B} / {d_t} + 1)"
    return Step("U", title, expression, operands, value, "u_factor", SOURCE, True)


def _assumptions(slab: Slab) -> tuple[str, ...]:
    said = [FILM_SAID]
    if slab.insulation in ("vertical", "horizontal") and slab.resistance > 0:
        said.append(EDGE_SAID)
    if slab.insulation == "under":
        said.append("insulation under the slab counts as the layers list it")
    return tuple(said)


METHODS = (
    Method(
        name="iso13370_slab",
        title="Slab on ground, U with the soil",
        formula="dt < B': U = 2 k / (pi B' + dt) ln(pi B'/dt + 1); else U = k / (0.457 B' + dt)",
        source=SOURCE,
        valid="slab at about ground level, homogeneous layers over its whole area; hardcore below "
        "counts as soil; no ground water, no edge insulation",
        solves=(("slab-on-grade", solve_slab),),
    ),
)
