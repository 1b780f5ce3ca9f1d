"""The one rule for every method that weights the two wirings."""

from __future__ import annotations

from envcheck.model.layers import FramedLayer
from envcheck.model.solved import Operand, Step
from envcheck.solve.methods.framed import is_metal
from envcheck.solve.registry import Decision, Method, NotDecided, Wall
from envcheck.solve.wiring import isothermal_planes, layer_steps, parallel_paths, u_step

HIGHEST_RATIO = 1.5
"""ISO 6946:2017, 6.7.2.1: the combined method is not for R_upper / R_lower above this."""


def weighted(weight: float, upper: float, lower: float) -> float:
    """Weighted resistance between the two wirings: R = p R_upper + (1 - p) R_lower.

    weight: p, 0..1. upper: R by parallel paths, lower: R by isothermal planes, m2 K/W, any shape.
    Returns m2 K/W.
    Source: ISO 6946:2017, 6.7.2.2 with p = 0.5; other codes publish other weights.
    """
    return weight * upper + (1.0 - weight) * lower


def decide_weighted(wall: Wall) -> Decision:
    """Wire both ways and weight the two resistances.

    Errors: NotDecided for metal members where the rule set states no weight of its own, since
    ISO 6946 excludes insulation bridged by metal.
    """
    for layer, block in zip(wall.layers, wall.blocks, strict=True):
        metal = isinstance(layer, FramedLayer) and is_metal(layer) and block.pattern
        if metal and wall.setting.weight is None:
            raise NotDecided(
                f"a method for metal members ({layer.title!r}): ISO 6946 excludes them from the "
                "combined method, and the rule set states no weight of its own"
            )
    upper, lower = parallel_paths(wall, "R_upper"), isothermal_planes(wall, "R_lower")
    weight = 0.5 if wall.setting.weight is None else wall.setting.weight
    resistance = weighted(weight, upper.resistance, lower.resistance)
    closing = Step(
        "R",
        f"weighted with p = {weight:g}",
        "{p} * {R_upper} + (1 - {p}) * {R_lower}",
        (
            Operand("p", weight, "number"),
            Operand("R_upper", upper.resistance, "resistance"),
            Operand("R_lower", lower.resistance, "resistance"),
        ),
        resistance,
        "resistance",
    )
    layers = layer_steps(wall)
    steps = (*layers, *upper.steps, *lower.steps, closing, u_step(resistance))
    ratio = upper.resistance / lower.resistance
    assumptions: tuple[str, ...] = ()
    if ratio > HIGHEST_RATIO:
        assumptions = (
            f"the ratio of the two wirings is {ratio:.2f}: ISO 6946 excludes the combined method "
            f"above {HIGHEST_RATIO}",
        )
    return Decision(1.0 / resistance, lower.tree, steps, len(layers), assumptions=assumptions)


METHODS = (
    Method(
        name="weighted",
        title="Weighted rule between the two wirings",
        formula="R = p R_upper + (1 - p) R_lower;  U = 1 / R",
        source="ISO 6946:2017, 6.7.2.2 with p = 0.5",
        valid="ISO 6946 excludes R_upper / R_lower above 1.5 and insulation bridged by metal",
        decides=decide_weighted,
    ),
)
