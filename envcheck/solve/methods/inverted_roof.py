"""Inverted roofs: what rain between insulation and waterproofing carries off (ISO 6946)."""

from __future__ import annotations

from envcheck.model.project import Assembly
from envcheck.model.ruleset import Conventions
from envcheck.model.solved import Operand, Step
from envcheck.solve.methods.fasteners import Correction, resistance_of, total_at_mean
from envcheck.solve.registry import Method

SOURCE = "ISO 6946:2017, annex F"
DRAINED = 0.04
"""f x, W d/(m2 K mm): one layer of butted boards, open covering such as gravel."""
DRAINED_SAID = (
    "f x = 0.04 W d/(m2 K mm): one layer of butted boards under an open covering such as gravel "
    "(ISO 6946)"
)
MM = 1000.0
"""mm in one m"""


def rain_correction(
    precipitation: float, r1: float, r_total: float, drained: float = DRAINED
) -> float:
    """Addition to U for rain on an inverted roof: dUr = p f x (R1 / RT)^2.

    precipitation: p, mean over the heating season, mm/day. r1: of the insulation above the
    waterproofing, r_total: RT of the roof without corrections, m2 K/W. drained: f x, share of the
    rain that reaches the waterproofing by the loss that it causes, W d/(m2 K mm). Any shape.
    Returns W/(m2 K). Source: ISO 6946:2017, annex F (2007: D.4).
    """
    return precipitation * drained * (r1 / r_total) ** 2


def rain_steps(
    precipitation: float, r1: float, r_total: float, drained: float = DRAINED
) -> tuple[Step, ...]:
    """Worksheet to the addend ``dU_r``. Floats."""
    operands = (
        Operand("p", precipitation, "number"),
        Operand("fx", drained, "number"),
        Operand("R_1", r1, "resistance"),
        Operand("R_T", r_total, "resistance"),
    )
    value = rain_correction(precipitation, r1, r_total, drained)
    title = "rain on the inverted roof (p in mm/day)"
    expression = "{p} * {fx} * ({R_1} / {R_T}) ** 2"
    return (Step("dU_r", title, expression, operands, value, "u_factor", SOURCE, True),)


def correct_for_rain(
    assembly: Assembly, r_total: float, conventions: Conventions, outside: int = 0
) -> Correction:
    """Correct for rain on an inverted roof, by the rule set's convention.

    r_total, outside: as of :func:`correct_for_fasteners`.
    """
    inverted = assembly.inverted
    if inverted is None:
        return Correction(0.0)
    if conventions.inverted_roofs == "ignored":
        said = f"rain on {inverted.layer} is not counted, as the rule set says or leaves open"
        return Correction(0.0, assumptions=(said,))
    drawn = assembly.layers[outside:]
    at_mean, assumptions = total_at_mean(drawn, r_total, "rain")
    resistance = resistance_of(drawn, inverted.layer)
    if resistance is None:
        need = f"resistance of {inverted.layer!r} by itself, above the waterproofing"
        return Correction(0.0, missing=(need,))
    drained = DRAINED
    if inverted.drainage is not None and inverted.heat_loss is not None:
        drained = inverted.drainage * inverted.heat_loss
    else:
        assumptions.append(DRAINED_SAID)
    steps = rain_steps(inverted.precipitation * MM, resistance, at_mean, drained)
    return Correction(steps[0].value, steps, assumptions=tuple(assumptions))


METHODS = (
    Method(
        name="inverted_roof",
        title="Rain on an inverted roof",
        formula="dUr = p f x (R1 / RT)^2, f x = 0.04 W d/(m2 K mm) where nothing better is known",
        source=SOURCE,
        valid="insulation above the waterproofing, heated buildings",
    ),
)
