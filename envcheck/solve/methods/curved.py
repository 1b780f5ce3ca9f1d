"""Cylinders and spheres: every resistance referred to the area of one face.

Heat through a bent layer passes a growing area. Referred to the area of a face of radius r, a
resistance keeps the form of a plane wall's, so that one sum gives U of that face; per metre of a
cylinder the conductance is 2 pi r U, of a whole sphere 4 pi r2 U. Assumptions: steady, radial
flow, no heat generated inside.
"""

from __future__ import annotations

from math import pi
from typing import NamedTuple

from envcheck.model.additions import Curved
from envcheck.model.project import Assembly, ContactLayer, Layer, MaterialLayer, ResistanceLayer
from envcheck.model.ruleset import Conventions
from envcheck.model.solved import Counted, Operand, Resistor, Series, Setting, Step
from envcheck.solve.elementary import ln_of_one_plus
from envcheck.solve.network import in_series
from envcheck.solve.registry import Decision, Method, NotDecided
from envcheck.solve.wiring import u_step

SOURCE = "Incropera and DeWitt, Fundamentals of Heat and Mass Transfer, 3.3"
FILMS = "films of plane surfaces are used on the bent faces, unless they are stated"


def cylinder_layer(face: float, inner: float, outer: float, conductivity: float) -> float:
    """Resistance of a cylindrical shell by the area of a face: R = r ln(r2/r1) / k.

    face: r, inner: r1, outer: r2, m, 0 < r1 <= r2. conductivity: k, W/(m K). Any shape. Returns
    m2 K/W. Source: Incropera and DeWitt, 3.3.1: R = ln(r2/r1) / (2 pi k L), times 2 pi r L.
    """
    return face * ln_of_one_plus((outer - inner) / inner) / conductivity


def sphere_layer(face: float, inner: float, outer: float, conductivity: float) -> float:
    """Resistance of a spherical shell by the area of a face: R = r2 (1/r1 - 1/r2) / k.

    face: r, inner: r1, outer: r2, m, 0 < r1 <= r2. conductivity: k, W/(m K). Any shape. Returns
    m2 K/W. Source: Incropera and DeWitt, 3.3.2: R = (1/r1 - 1/r2) / (4 pi k), times 4 pi r2.
    """
    return face**2 * (1.0 / inner - 1.0 / outer) / conductivity


def at_radius(resistance: float, face: float, radius: float, power: int = 1) -> float:
    """A film or contact at another radius by the area of a face: R (r/ri)^n.

    resistance: per area at ``radius``, m2 K/W. face: r, radius: ri, m. power: n, 1 for a
    cylinder, 2 for a sphere. Any shape. Returns m2 K/W.
    """
    return resistance * (face / radius) ** power


def critical(conductivity: float, film: float, power: int = 1) -> float:
    """Radius at which insulation lets the most heat through: k Rs (cylinder), 2 k Rs (sphere).

    conductivity: k, W/(m K). film: Rs outside, m2 K/W. Any shape. Returns m.
    Source: Incropera and DeWitt, Example 3.5, with h = 1/Rs.
    """
    return power * conductivity * film


class _Bent(NamedTuple):
    """What stays the same for every layer."""

    curved: Curved
    face: Operand
    """r_f, radius of the face that U is of"""
    power: int


def solve_curved(assembly: Assembly, setting: Setting, conventions: Conventions) -> Decision:
    """Solve a cylinder or sphere, per area of the face that the project names.

    Errors: NotDecided for a layer that is not bent here, or no resistance at all.
    """
    curved = assembly.curved
    if curved is None:
        raise NotDecided("shape and radius of the curved assembly")
    faces, radii = _radii(assembly.layers, curved)
    radius = faces[0 if curved.face == "outer" else -1]
    bent = _Bent(curved, Operand(radius.symbol, radius.value, "length"), 1 if _round(curved) else 2)
    parts = [_ring("Ro", "outside film", setting.outside_film, setting.outside_film_from,
                   faces[0], bent)]  # fmt: skip
    for number, layer in enumerate(assembly.layers, 1):
        parts.append(_layer(f"R{number}", layer, faces[number - 1], faces[number], bent))
    parts.append(
        _ring("Ri", "inside film", setting.inside_film, setting.inside_film_from, faces[-1], bent)
    )
    tree = in_series(f"{curved.shape}, by the area of its {curved.face} face", parts)
    if tree.value <= 0:
        raise NotDecided("a resistance: films and layers are stated as none at all")
    steps = (
        *radii,
        *(step for part in parts for step in part.steps),
        _sum(tree),
        *_per_metre(tree.value, bent),
        *_critical(assembly.layers, setting, bent),
        u_step(tree.value),
    )
    last = len(radii) + sum(len(part.steps) for part in parts)
    counted = tuple(Counted(part.value, "by the area of the face") for part in parts[1:-1])
    said = (FILMS, *_beyond(steps, faces[0].value))
    value = 1.0 / tree.value
    return Decision(value, tree, steps, last, assumptions=said, counted=counted)


def _round(curved: Curved) -> bool:
    return curved.shape == "cylinder"


def _radii(layers: tuple[Layer, ...], curved: Curved) -> tuple[list[Step], list[Step]]:
    """The faces from the outermost to the innermost, and the steps to them in order."""
    depths = [_depth(layer) for layer in layers]
    faces = range(len(depths) + 1)
    if curved.by_inner:
        names = [*(f"R{place + 1}_outer" for place in faces[:-1]), "r_inner"]
    else:
        names = ["r_outer", *(f"R{place}_inner" for place in faces[1:])]
    values = [curved.outer_radius]
    for depth in depths:
        values.append(values[-1] - depth)
    known = len(depths) if curved.by_inner else 0
    values[known] = curved.inner_radius if curved.by_inner else curved.outer_radius
    order = range(known - 1, -1, -1) if curved.by_inner else range(1, len(names))
    title = f"radius of the {'inner' if curved.by_inner else 'outer'} face, as drawn"
    found = {known: Step(names[known], title, "", (), values[known], "length", "project")}
    for place in order:
        before, sign = (place + 1, "+") if curved.by_inner else (place - 1, "-")
        depth = depths[place if curved.by_inner else place - 1]
        value = found[before].value + depth if curved.by_inner else found[before].value - depth
        operands = (
            Operand(names[before], found[before].value, "length"),
            Operand("L", depth, "length"),
        )
        expression = f"{{{names[before]}}} {sign} {{L}}"
        words = "radius of the next face"
        found[place] = Step(names[place], words, expression, operands, value, "length")
    return [found[place] for place in range(len(names))], list(found.values())


def _depth(layer: Layer) -> float:
    if isinstance(layer, MaterialLayer | ResistanceLayer):
        return layer.thickness
    if isinstance(layer, ContactLayer):
        return 0.0
    raise NotDecided(f"a bent layer in place of {layer.title!r}")


def _ring(symbol: str, title: str, value: float, source: str, face: Step, bent: _Bent) -> Resistor:
    """A film or contact at a face."""
    at = Operand(face.symbol, face.value, "length")
    expression = f"{{R_s}} * {{{bent.face.name}}} / {{{at.name}}}"
    if bent.power == 2:
        expression = f"{{R_s}} * ({{{bent.face.name}}} / {{{at.name}}}) ** 2"
    found = at_radius(value, bent.face.value, face.value, bent.power)
    operands = (Operand("R_s", value, "resistance"), bent.face, at)
    step = Step(symbol, title, expression, operands, found, "resistance", source)
    return Resistor(symbol, title, found, (step,))


def _layer(symbol: str, layer: Layer, outer: Step, inner: Step, bent: _Bent) -> Resistor:
    if isinstance(layer, MaterialLayer):
        k, source = layer.material.conductivity, layer.material.source
    elif isinstance(layer, ResistanceLayer) and layer.thickness > 0 and layer.resistance > 0:
        k, source = layer.thickness / layer.resistance, layer.source
    elif isinstance(layer, ResistanceLayer | ContactLayer):
        return _ring(symbol, layer.title, layer.resistance, layer.source, outer, bent)
    else:
        raise NotDecided(f"a bent layer in place of {layer.title!r}")
    face, radii = bent.face.name, (inner.symbol, outer.symbol)
    expression = f"{{{face}}} * ln({{{radii[1]}}} / {{{radii[0]}}}) / {{k}}"
    formula = cylinder_layer
    if bent.power == 2:
        expression = f"{{{face}}} ** 2 * (1 / {{{radii[0]}}} - 1 / {{{radii[1]}}}) / {{k}}"
        formula = sphere_layer
    value = formula(bent.face.value, inner.value, outer.value, k)
    operands = {
        operand.name: operand
        for operand in (
            bent.face,
            Operand(radii[0], inner.value, "length"),
            Operand(radii[1], outer.value, "length"),
            Operand("k", k, "conductivity"),
        )
    }
    used = tuple(operands.values())
    step = Step(symbol, layer.title, expression, used, value, "resistance", source or SOURCE)
    return Resistor(symbol, layer.title, value, (step,))


def _sum(tree: Series) -> Step:
    parts = [part for part in tree.parts if isinstance(part, Resistor)]
    operands = tuple(Operand(part.symbol, part.value, "resistance") for part in parts)
    expression = " + ".join(f"{{{operand.name}}}" for operand in operands)
    title = "sum of resistances, film to film, by the area of the face"
    return Step("R", title, expression, operands, tree.value, "resistance")


def _per_metre(total: float, bent: _Bent) -> tuple[Step, ...]:
    """The conductance of a metre of a cylinder, or of a whole sphere."""
    face, resistance = bent.face, Operand("R", total, "resistance")
    if bent.power == 1:
        value = 2.0 * pi * face.value / total
        expression = f"2 * 3.14159265 * {{{face.name}}} / {{R}}"
        return (Step("U_length", "heat flow by metre of the cylinder and kelvin", expression,
                     (face, resistance), value, "linear_transmittance", SOURCE, True),)  # fmt: skip
    value = 4.0 * pi * face.value**2 / total
    expression = f"4 * 3.14159265 * {{{face.name}}} ** 2 / {{R}}"
    return (Step("U_sphere", "heat flow of the whole sphere by kelvin", expression,
                 (face, resistance), value, "point_transmittance", SOURCE, True),)  # fmt: skip


def _critical(layers: tuple[Layer, ...], setting: Setting, bent: _Bent) -> tuple[Step, ...]:
    outermost = layers[0]
    if not isinstance(outermost, MaterialLayer) or setting.outside_film <= 0:
        return ()
    k = outermost.material.conductivity
    operands = (
        Operand("k", k, "conductivity"),
        Operand("R_se", setting.outside_film, "resistance"),
    )
    expression = "{k} * {R_se}" if bent.power == 1 else "2 * {k} * {R_se}"
    value = critical(k, setting.outside_film, bent.power)
    title = f"critical radius of {outermost.title} (information)"
    return (Step("r_cr", title, expression, operands, value, "length", SOURCE),)


def _beyond(steps: tuple[Step, ...], outer: float) -> tuple[str, ...]:
    found = [step.value for step in steps if step.symbol == "r_cr"]
    if not found or outer >= found[0]:
        return ()
    return ("the outer face lies within the critical radius: more of its layer lets more heat out",)


METHODS = (
    Method(
        name="curved",
        title="Cylinder or sphere",
        formula="cylinder: R = Rse r/ro + sum of r ln(r2/r1) / k + sum of Rc r/rc + Rsi r/ri; "
        "sphere: R = Rse (r/ro)^2 + sum of r^2 (1/r1 - 1/r2) / k + ...; U = 1 / R by the area of "
        "the face of radius r; critical radius k Rse, of a sphere 2 k Rse",
        source=SOURCE,
        valid="radial flow through homogeneous layers; films and contacts as of plane surfaces",
        solves=(("curved", solve_curved),),
    ),
)
