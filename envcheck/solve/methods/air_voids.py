"""Air voids in insulation: the correction dUg of ISO 6946."""

from __future__ import annotations

from envcheck.model.solved import Operand, Step
from envcheck.solve.registry import Method

SOURCE = "ISO 6946:2017, annex F"
LEVELS = {0: 0.0, 1: 0.01, 2: 0.04}
"""dU'' by level of voids, W/(m2 K); ISO 6946:2017, annex F; from memory."""


def void_correction(level_correction: float, r1: float, r_total: float) -> float:
    """Addition to U for air voids: dUg = dU'' (R1 / RT)^2.

    level_correction: dU'' of the level, W/(m2 K). r1: of the layer that has voids. r_total: RT of
    the component without corrections, m2 K/W. Any shape. Returns W/(m2 K).
    Source: ISO 6946:2017, annex F.
    """
    return level_correction * (r1 / r_total) ** 2


def void_steps(level: int, r1: float, r_total: float) -> tuple[Step, ...]:
    """Worksheet to the addend ``dU_g`` of a level of voids, a key of LEVELS. Floats."""
    operands = (
        Operand("dU_level", LEVELS[level], "u_factor"),
        Operand("R_1", r1, "resistance"),
        Operand("R_T", r_total, "resistance"),
    )
    value = void_correction(LEVELS[level], r1, r_total)
    expression = "{dU_level} * ({R_1} / {R_T}) ** 2"
    title = f"air voids of level {level}"
    return (Step("dU_g", title, expression, operands, value, "u_factor", SOURCE),)


METHODS = (
    Method(
        name="air_voids",
        title="Air voids in insulation",
        formula="dUg = dU'' (R1 / RT)^2",
        source=SOURCE,
        valid="levels 0 to 2; not yet asked for by a project",
    ),
)
