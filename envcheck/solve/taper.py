"""Counts a tapered layer on top of a wall that holds it at its least thickness."""

from __future__ import annotations

from envcheck.model.layers import TaperedLayer, TaperedPiece
from envcheck.model.ruleset import Conventions
from envcheck.model.solved import Beside, Operand, Step
from envcheck.solve.methods.tapered import SHAPES, SOURCE, Way, mean_thickness
from envcheck.solve.methods.tapered_pieces import pieces_way
from envcheck.solve.registry import Decision, NotDecided

STEEPEST = 0.05
"""ISO 6946: slope up to which the formulas hold."""
EXACT = "by the areas of equal thickness"
SLOPE = "slope of the tapered layer taken as 5 % or less (ISO 6946, annex E)"


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
    if name == "integral":
        refuse_steep(layer)
    exact = exact_way(layer, rest, added)
    ways = _ways(layer, rest, added, exact)
    way = ways.pop(name)
    beside = (Beside(w.beside, w.value, f"tapered layer counted {w.words}") for w in ways.values())
    return decision._replace(
        value=way.value,
        steps=(
            *decision.steps,
            rest_step(decision.value),
            *(exact.before if way is exact else (_taper_step(layer, added),)),
            _closing(way),
        ),
        beside=(*decision.beside, *beside),
        assumptions=(*decision.assumptions, *_assumptions(name, layer, conventions)),
    )


def refuse_steep(layer: TaperedLayer) -> None:
    """Refuse a stated run over which the layer rises too steeply. Errors: NotDecided."""
    parts: tuple[TaperedLayer | TaperedPiece, ...] = layer.pieces or (layer,)
    for part in parts:
        rise = part.greatest - part.least
        if part.run is not None and rise > STEEPEST * part.run * (1.0 + 1e-9):
            raise NotDecided(
                f"a slope of at most 5 % of {layer.title!r}: ISO 6946 holds no further, and "
                f"{rise:.4g} m over {part.run:.4g} m is {100 * rise / part.run:.3g} %"
            )


def exact_way(layer: TaperedLayer, rest: float, added: float) -> Way:
    """The mean of U over the area, of one shape or of pieces."""
    if layer.pieces:
        return pieces_way(layer, rest)
    shape = SHAPES[layer.shape]
    way = Way("integral", EXACT, shape.expression, shape.u_factor(rest, added))
    operands = (Operand("R_rest", rest, "resistance"), Operand("R_taper", added, "resistance"))
    return way._replace(operands=operands, before=(_taper_step(layer, added),))


def _ways(layer: TaperedLayer, rest: float, added: float, exact: Way) -> dict[str, Way]:
    mean = mean_thickness(layer) - layer.least
    operands = [Operand("R_rest", rest, "resistance"), Operand("R_taper", added, "resistance")]
    if layer.pieces:
        operands.append(Operand("part", mean / (layer.greatest - layer.least), "number"))
        fraction = "{part}"
    else:
        fraction = {1 / 2: "1 / 2", 1 / 3: "1 / 3", 2 / 3: "2 / 3"}[SHAPES[layer.shape].mean]
    middle = f"1 / ({{R_rest}} + {{R_taper}} * {fraction})"
    value = 1 / (rest + mean / layer.material.conductivity)
    return {
        "integral": exact,
        "mean": Way("mean_thickness", "at its mean thickness", middle, value, tuple(operands)),
        "minimum": Way(
            "least_thickness", "at its least thickness", "1 / {R_rest}", 1 / rest, (operands[0],)
        ),
    }


def rest_step(u_least: float) -> Step:
    """R0: everything but the taper."""
    return Step(
        "R_rest", "whole assembly with the tapered layer at its least thickness", "1 / {U}",
        (Operand("U", u_least, "u_factor"),), 1.0 / u_least, "resistance",
    )  # fmt: skip


def _taper_step(layer: TaperedLayer, added: float) -> Step:
    thicknesses = (
        Operand("d_greatest", layer.greatest, "length"),
        Operand("d_least", layer.least, "length"),
        Operand("k", layer.material.conductivity, "conductivity"),
    )
    return Step(
        "R_taper", f"{layer.title}, greatest beyond least thickness",
        "({d_greatest} - {d_least}) / {k}", thicknesses, added, "resistance",
    )  # fmt: skip


def _closing(way: Way) -> Step:
    source = SOURCE if way.beside == "integral" else ""
    title = f"U-factor, tapered layer counted {way.words}"
    return Step("U_tapered", title, way.expression, way.operands, way.value, "u_factor", source)


def _assumptions(way: str, layer: TaperedLayer, conventions: Conventions) -> tuple[str, ...]:
    if way == "integral":
        return (SLOPE,)
    if conventions.tapered == "integral":
        varies = f"{layer.greatest - layer.least:.4g} m"
        return (f"{layer.title} varies by {varies}: the rule set lets its mean thickness count",)
    words = "mean" if way == "mean" else "least"
    return (f"{layer.title} is counted at its {words} thickness, as the rule set says",)
