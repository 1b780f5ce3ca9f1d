"""Inverted roofs: what rain between insulation and waterproofing carries off (ISO 6946)."""

from __future__ import annotations

from envcheck.model.solved import Operand, Step
from envcheck.solve.registry import Method

SOURCE = "ISO 6946:2017, annex F"
DRAINED = 0.04
"""f x, W d/(m2 K mm): one layer of butted boards, open covering such as gravel."""


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


METHODS = (
    Method(
        name="inverted_roof",
        title="Rain on an inverted roof",
        formula="dUr = p f x (R1 / RT)^2, f x = 0.04 W d/(m2 K mm) where nothing better is known",
        source=SOURCE,
        valid="insulation above the waterproofing, heated buildings; not yet asked for by a "
        "project",
    ),
)
