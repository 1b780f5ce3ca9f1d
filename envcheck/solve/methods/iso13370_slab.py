"""Slab on ground by ISO 13370: the ground counts as an equivalent thickness of soil."""

from __future__ import annotations

from math import pi

from envcheck.model.project import Assembly, Slab
from envcheck.model.ruleset import Conventions
from envcheck.model.solved import Operand, Setting, Step
from envcheck.solve.elementary import ln_of_one_plus
from envcheck.solve.ground_layers import (
    GroundNumbers,
    bare_wall,
    ground_numbers,
    measured_said,
    plain_layers,
)
from envcheck.solve.methods.iso13370_edge import Edge, edge_steps, slab_with_edge
from envcheck.solve.network import series
from envcheck.solve.registry import Decision, Method, NotDecided

SOURCE = "ISO 13370:2017, 7.1 and 7.2"
GROUND_FILM = 0.04
"""m2 K/W: outside surface resistance of the ground; ISO 13370 takes that of ISO 6946."""
FILM_SAID = (
    "the ground's own surface is counted with 0.04 m2 K/W (ISO 13370), the room's with the film of "
    "the rule set"
)
EDGE_COUNTED = (
    "edge insulation of the slab is counted: linear transmittances of the junction of wall and "
    "floor must then be those without it"
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
    """Solve a slab on ground of homogeneous layers, with insulation along its edge.

    Errors: NotDecided with everything that is missing: perimeter, area, soil, wall thickness.
    """
    slab = assembly.slab
    if slab is None:
        raise NotDecided("perimeter, area, wall thickness and soil of the slab")
    given = ground_numbers(slab.ground, conventions, "slab")
    layers = plain_layers(bare_wall(assembly, setting, conventions), "R_f", "floor")
    thickness = thickness_step("d_t", given, setting.inside_film, layers[-1])
    size = dimension_step(given)
    edge = edge_of(slab)
    closing = _closing_step(given.soil, size.value, thickness.value, "U_0" if edge else "U")
    steps = (*layers, size, thickness, closing)
    if edge:
        steps += edge_steps(edge, given.soil, thickness.value)
        steps += (_with_edge(closing, steps[-1], size),)
    said = _assumptions(slab, measured_said(slab.ground, conventions))
    value = steps[-1].value
    return Decision(value, steps=steps, layer_steps=len(layers) - 1, assumptions=said)


def edge_of(slab: Slab) -> Edge | None:
    """The insulation along the edge, where it can be counted.

    Errors: NotDecided where it resists no more than the soil that it displaces.
    """
    if slab.insulation not in ("vertical", "horizontal") or slab.resistance <= 0:
        return None
    if slab.thickness is None:
        return None
    if slab.soil_conductivity and slab.resistance <= slab.thickness / slab.soil_conductivity:
        raise NotDecided("edge insulation that resists more than the soil that it displaces")
    return Edge(slab.insulation == "vertical", slab.extent, slab.resistance, slab.thickness)


def dimension_step(given: GroundNumbers) -> Step:
    """The step to B'."""
    return Step(
        "B", "characteristic dimension of the floor", "{A} / (0.5 * {P})", given.size,
        characteristic_dimension(given.area, given.perimeter), "run", SOURCE,
    )  # fmt: skip


def thickness_step(symbol: str, given: GroundNumbers, film: float, floor: Step) -> Step:
    """The step to an equivalent thickness. film: Rsi, m2 K/W. floor: the step to Rf."""
    operands = (
        Operand("w", given.wall, "length"),
        Operand("k", given.soil, "conductivity"),
        Operand("R_si", film, "resistance"),
        Operand(floor.symbol, floor.value, "resistance"),
        Operand("R_se", GROUND_FILM, "resistance"),
    )
    expression = f"{{w}} + {{k}} * ({{R_si}} + {{{floor.symbol}}} + {{R_se}})"
    value = equivalent_thickness(given.wall, given.soil, film, floor.value)
    return Step(symbol, "equivalent thickness", expression, operands, value, "length", SOURCE)


def _with_edge(bare: Step, psi: Step, size: Step) -> Step:
    operands = (
        Operand(bare.symbol, bare.value, "u_factor"),
        Operand(psi.symbol, psi.value, "linear_transmittance"),
        Operand(size.symbol, size.value, "run"),
    )
    value = slab_with_edge(bare.value, psi.value, size.value)
    title = "U-factor of the slab with its edge insulation"
    return Step("U", title, "{U_0} + 2 * {psi} / {B}", operands, value, "u_factor", psi.source)


def _closing_step(soil: float, dimension: float, thickness: float, symbol: str) -> Step:
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
    value = slab_u(soil, dimension, thickness)
    return Step(symbol, title, expression, operands, value, "u_factor", SOURCE, True)


def _assumptions(slab: Slab, measured: str) -> tuple[str, ...]:
    said = [FILM_SAID, measured]
    if slab.insulation in ("vertical", "horizontal") and slab.resistance > 0:
        said.append(EDGE_SAID if slab.thickness is None else EDGE_COUNTED)
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
        "counts as soil; no ground water",
        solves=(("slab-on-grade", solve_slab),),
        assumed=False,
    ),
)
