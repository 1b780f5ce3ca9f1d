"""The one rule for every method that weights the two wirings."""

from __future__ import annotations

from collections.abc import Callable

from envcheck.model.layers import FramedLayer
from envcheck.model.solved import Operand, Step
from envcheck.solve.cautions import is_insulation
from envcheck.solve.elementary import greatest
from envcheck.solve.methods.framed import is_metal
from envcheck.solve.registry import Decision, Method, NotDecided, Wall
from envcheck.solve.wiring import isothermal_planes, layer_steps, parallel_paths, u_step

HIGHEST_RATIO = 1.5
"""ISO 6946:2017, 6.7.2.1: the combined method is not for R_upper / R_lower above this."""
ISO_WEIGHT = 0.5
NOMINAL = 0.002
"""m by which a spacing may miss the printed one (16 in and 400 mm are not the same)."""


def weighted(weight: float, upper: float, lower: float) -> float:
    """Weighted resistance between the two wirings: R = p R_upper + (1 - p) R_lower.

    weight: p, 0..1. upper: R by parallel paths, lower: R by isothermal planes, m2 K/W, any shape.
    Returns m2 K/W.
    Source: ISO 6946:2017, 6.7.2.2 with p = 0.5; other codes publish other weights.
    """
    return weight * upper + (1.0 - weight) * lower


def bre_weight(ratio: float, flange: float, spacing: float, depth: float) -> float:
    """Weight of the upper limit: p = 0.8 Rmin/Rmax + 0.44 - 0.1 w/40 - 0.2 600/s - 0.04 d/100.

    ratio: Rmin/Rmax, of both limits. flange: w, spacing: s, depth of the stud: d, m (the formula
    has mm). Any shape. Dimensionless.
    Source: BRE Digest 465 (2002), steel frames with insulation between the studs; from memory.
    """
    return 0.8 * ratio + 0.44 - 0.1 * flange / 0.040 - 0.2 * 0.600 / spacing - 0.04 * depth / 0.100


def weight_step(wall: Wall, upper: float, lower: float) -> Step | None:
    """The weight by the formula or table that the rule set names; None for a stated number.

    Errors: NotDecided where the assembly is not of the kind that the formula is for, where the
    formula leaves 0..1, or where no row of the table fits.
    """
    name = wall.setting.weight
    return WEIGHTS[name](wall, upper, lower) if isinstance(name, str) else None


def _by_bre_465(wall: Wall, upper: float, lower: float) -> Step:
    layer, spacing = _studs(wall, "the weight by BRE Digest 465")
    profile = layer.member.profile
    flange = layer.member.width if profile is None else profile.flange
    depth = layer.thickness if profile is None else profile.web
    value = bre_weight(lower / upper, flange, spacing, depth)
    if not 0.0 <= value <= 1.0:
        raise NotDecided(
            f"a method for {layer.title!r}: the weight by BRE Digest 465 is {value:.2f}, which is "
            "no weight between 0 and 1"
        )
    return Step(
        "p",
        "weight of the upper limit",
        "0.8 * {R_lower} / {R_upper} + 0.44 - 0.1 * {w_f} / 0.040 - 0.2 * 0.600 / {s} "
        "- 0.04 * {d} / 0.100",
        (
            Operand("R_lower", lower, "resistance"),
            Operand("R_upper", upper, "resistance"),
            Operand("w_f", flange, "length"),
            Operand("s", spacing, "length"),
            Operand("d", depth, "length"),
        ),
        value,
        "number",
        "BRE Digest 465 (2002); from memory",
        si_only=True,
    )


def _by_table(wall: Wall, upper: float, lower: float) -> Step:
    """Row of the rule set's table for the spacing, with or without continuous insulation."""
    layer, spacing = _studs(wall, "the weight by the rule set's table")
    clear = any(
        block.pattern == "" and is_insulation(getattr(other, "material", None))
        for other, block in zip(wall.layers, wall.blocks, strict=True)
    )
    has = "yes" if clear else "no"
    for row in wall.conventions.tables.get("weights", ()):
        over, up_to = row.keys.get("spacing_over"), row.keys.get("spacing_up_to")
        fits = (over is None or spacing > float(over) + NOMINAL) and (
            up_to is None or spacing <= float(up_to) + NOMINAL
        )
        if fits and row.keys["continuous_insulation"] in (has, "*"):
            return Step("p", "weight of the upper limit", "", (), row.value, "number", row.source)
    raise NotDecided(
        f"a row of the rule set's weights for {layer.title!r} (spacing {spacing * 1000:.0f} mm, "
        f"{'with' if clear else 'without'} continuous insulation)"
    )


def _studs(wall: Wall, what: str) -> tuple[FramedLayer, float]:
    """The one metal-framed layer and its spacing, m."""
    framed = [
        layer
        for layer in wall.layers
        if isinstance(layer, FramedLayer) and is_metal(layer) and not layer.crosses_insulation
    ]
    if len(framed) != 1 or framed[0].member.spacing is None:
        raise NotDecided(f"one layer of steel studs at a spacing, for {what}")
    return framed[0], framed[0].member.spacing


WEIGHTS: dict[str, Callable[[Wall, float, float], Step]] = {
    "bre_465": _by_bre_465,
    "table": _by_table,
}
"""What a rule set may name instead of a number."""


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
    found = weight_step(wall, upper.resistance, lower.resistance)
    weight = found.value if found is not None else ISO_WEIGHT
    if found is None and isinstance(wall.setting.weight, float | int):
        weight = wall.setting.weight
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
    named = () if found is None else (found,)
    steps = (*layers, *upper.steps, *lower.steps, *named, closing, u_step(resistance))
    ratio = greatest(upper.resistance / lower.resistance)
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
        source="ISO 6946:2017, 6.7.2.2 with p = 0.5; steel: BRE Digest 465 (p = 0.8 Rmin/Rmax + "
        "0.44 - 0.1 w/40 - 0.2 600/s - 0.04 d/100, mm; from memory), or weights of the rule set",
        valid="ISO 6946 excludes R_upper / R_lower above 1.5 and insulation bridged by metal; a "
        "formula or table of weights holds for one layer of steel studs at a spacing",
        decides=decide_weighted,
    ),
)
