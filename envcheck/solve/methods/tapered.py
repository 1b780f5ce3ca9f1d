"""Tapered layers: exact means of U over the three basic shapes of ISO 6946.

R0 is the resistance of everything else, films and the layer's least thickness included; R1 is
that of the greatest thickness beyond the least. Assumption: slope of at most 5 %.
"""

from __future__ import annotations

from collections.abc import Callable
from typing import NamedTuple

from envcheck.model.project import TaperedLayer
from envcheck.model.ruleset import Conventions
from envcheck.model.solved import Beside, Block, Operand, Step
from envcheck.solve.cells import homogeneous, material_cell
from envcheck.solve.elementary import ln_of_one_plus
from envcheck.solve.registry import Context, Decision, Method

SOURCE = "ISO 6946:2017, annex E"
SLOPE = "slope of the tapered layer taken as 5 % or less (ISO 6946, annex E)"


def tapered_rectangle(r0: float, r1: float) -> float:
    """U of a rectangle that rises from one side: U = ln(1 + R1/R0) / R1.

    r0, r1: R0 and R1, m2 K/W, both above 0, any shape. Returns W/(m2 K).
    Source: ISO 6946:2017, annex E (2007: annex C): the mean of 1/R over the area.
    """
    return ln_of_one_plus(r1 / r0) / r1


def tapered_triangle_thickest_apex(r0: float, r1: float) -> float:
    """U of a triangle thickest at its apex: U = 2/R1 ((1 + R0/R1) ln(1 + R1/R0) - 1).

    r0, r1: R0 and R1, m2 K/W, both above 0, any shape. Returns W/(m2 K).
    Source: ISO 6946:2017, annex E.
    """
    return 2.0 / r1 * ((1.0 + r0 / r1) * ln_of_one_plus(r1 / r0) - 1.0)


def tapered_triangle_thinnest_apex(r0: float, r1: float) -> float:
    """U of a triangle thinnest at its apex: U = 2/R1 (1 - R0/R1 ln(1 + R1/R0)).

    r0, r1: R0 and R1, m2 K/W, both above 0, any shape. Returns W/(m2 K).
    Source: ISO 6946:2017, annex E.
    """
    return 2.0 / r1 * (1.0 - r0 / r1 * ln_of_one_plus(r1 / r0))


class Shape(NamedTuple):
    """A basic shape of a tapered area."""

    u_factor: Callable[[float, float], float]
    expression: str
    """The same for the worksheet."""
    mean: float
    """Where the mean thickness lies between the least (0) and the greatest (1)."""


SHAPES = {
    "rectangle": Shape(tapered_rectangle, "ln(1 + {R_taper} / {R_rest}) / {R_taper}", 1 / 2),
    "triangle_thickest_apex": Shape(
        tapered_triangle_thickest_apex,
        "2 / {R_taper} * ((1 + {R_rest} / {R_taper}) * ln(1 + {R_taper} / {R_rest}) - 1)",
        1 / 3,
    ),
    "triangle_thinnest_apex": Shape(
        tapered_triangle_thinnest_apex,
        "2 / {R_taper} * (1 - {R_rest} / {R_taper} * ln(1 + {R_taper} / {R_rest}))",
        2 / 3,
    ),
}


class Way(NamedTuple):
    """A way of counting a tapered layer and what it gives."""

    beside: str
    """Name beside the value that decides."""
    words: str
    expression: str
    value: float


def mean_thickness(layer: TaperedLayer) -> float:
    """Mean thickness by volume, m: 1/2, 1/3 or 2/3 of the way from least to greatest."""
    return layer.least + SHAPES[layer.shape].mean * (layer.greatest - layer.least)


def draw_tapered(layer: TaperedLayer, context: Context) -> Block:
    """Draw the layer at its least thickness; :func:`taper` counts the rest."""
    title = f"{layer.title}, least thickness"
    cell = material_cell(context.symbol, title, layer.least, layer.material)
    return homogeneous(cell, layer.least)


def way_of_counting(layer: TaperedLayer, conventions: Conventions) -> str:
    """``integral``, ``mean`` or ``minimum``; the mean also where the variation is small enough."""
    within = conventions.tapered_mean_within
    varies = layer.greatest - layer.least
    if conventions.tapered == "integral" and within is not None and varies <= within + 1e-9:
        return "mean"
    return conventions.tapered


def taper(decision: Decision, layer: TaperedLayer, conventions: Conventions) -> Decision:
    """Count the layer's taper on top of a U that holds it at its least thickness.

    decision: of the whole assembly, films included. Returns it with the U of the convention, its
    steps (the last is ``U_tapered``), and the two other ways beside. A decision without a value,
    or a layer of one thickness, changes nothing.
    """
    if decision.value is None or layer.greatest <= layer.least:
        return decision
    rest = 1.0 / decision.value
    added = (layer.greatest - layer.least) / layer.material.conductivity
    name = way_of_counting(layer, conventions)
    ways = _ways(layer, rest, added)
    way = ways.pop(name)
    beside = (Beside(w.beside, w.value, f"tapered layer counted {w.words}") for w in ways.values())
    return decision._replace(
        value=way.value,
        steps=(*decision.steps, *_steps(decision.value, layer, way, rest, added)),
        beside=(*decision.beside, *beside),
        assumptions=(*decision.assumptions, *_assumptions(name, layer, conventions)),
    )


def _ways(layer: TaperedLayer, rest: float, added: float) -> dict[str, Way]:
    shape = SHAPES[layer.shape]
    exact = shape.u_factor(rest, added)
    mean = 1.0 / (rest + shape.mean * added)
    fraction = {1 / 2: "1 / 2", 1 / 3: "1 / 3", 2 / 3: "2 / 3"}[shape.mean]
    middle = f"1 / ({{R_rest}} + {{R_taper}} * {fraction})"
    return {
        "integral": Way("integral", "by the areas of equal thickness", shape.expression, exact),
        "mean": Way("mean_thickness", "at its mean thickness", middle, mean),
        "minimum": Way("least_thickness", "at its least thickness", "1 / {R_rest}", 1.0 / rest),
    }


def _steps(
    u_least: float, layer: TaperedLayer, way: Way, rest: float, added: float
) -> tuple[Step, ...]:
    thicknesses = (
        Operand("d_greatest", layer.greatest, "length"),
        Operand("d_least", layer.least, "length"),
        Operand("k", layer.material.conductivity, "conductivity"),
    )
    known = {"R_rest": rest, "R_taper": added}
    used = tuple(
        Operand(name, value, "resistance")
        for name, value in known.items()
        if f"{{{name}}}" in way.expression
    )
    return (
        Step(
            "R_rest", "whole assembly with the tapered layer at its least thickness", "1 / {U}",
            (Operand("U", u_least, "u_factor"),), rest, "resistance",
        ),
        Step(
            "R_taper", f"{layer.title}, greatest beyond least thickness",
            "({d_greatest} - {d_least}) / {k}", thicknesses, added, "resistance",
        ),
        Step(
            "U_tapered", f"U-factor, tapered layer counted {way.words}", way.expression, used,
            way.value, "u_factor", SOURCE if way.beside == "integral" else "",
        ),
    )  # fmt: skip


def _assumptions(way: str, layer: TaperedLayer, conventions: Conventions) -> tuple[str, ...]:
    if way == "integral":
        return (SLOPE,)
    if conventions.tapered == "integral":
        varies = f"{layer.greatest - layer.least:.4g} m"
        return (f"{layer.title} varies by {varies}: the rule set lets its mean thickness count",)
    words = "mean" if way == "mean" else "least"
    return (f"{layer.title} is counted at its {words} thickness, as the rule set says",)


METHODS = (
    Method(
        name="tapered",
        title="Tapered layer",
        formula="U = ln(1 + R1/R0) / R1 for a rectangle, and its like for two triangles",
        source=SOURCE,
        valid="slope of at most 5 %; one tapered layer in an assembly",
        draws=(("tapered", draw_tapered),),
    ),
)
