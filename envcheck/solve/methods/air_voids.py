"""Air voids in insulation: the correction dUg of ISO 6946."""

from __future__ import annotations

from envcheck.model.project import Assembly
from envcheck.model.ruleset import Conventions
from envcheck.model.solved import Operand, Step
from envcheck.solve.methods.fasteners import Correction, resistance_of, total_at_mean
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


def void_steps(level: int, r1: float, r_total: float, number: str = "") -> tuple[Step, ...]:
    """Worksheet to the addend ``dU_g`` of a level of voids, a key of LEVELS. Floats.

    number: behind the symbol, where several layers have voids.
    """
    operands = (
        Operand("dU_level", LEVELS[level], "u_factor"),
        Operand("R_1", r1, "resistance"),
        Operand("R_T", r_total, "resistance"),
    )
    value = void_correction(LEVELS[level], r1, r_total)
    expression = "{dU_level} * ({R_1} / {R_T}) ** 2"
    title = f"air voids of level {level}"
    return (Step(f"dU_g{number}", title, expression, operands, value, "u_factor", SOURCE),)


def correct_for_voids(
    assembly: Assembly, r_total: float, conventions: Conventions, outside: int = 0
) -> Correction:
    """Correct for the air voids that an assembly states, by the rule set's convention.

    r_total, outside: as of :func:`correct_for_fasteners`.
    """
    if not assembly.voids:
        return Correction(0.0)
    if conventions.air_voids == "ignored":
        titles = ", ".join(one.layer for one in assembly.voids)
        said = f"air voids in {titles} are not counted, as the rule set says or leaves open"
        return Correction(0.0, assumptions=(said,))
    drawn = assembly.layers[outside:]
    at_mean, assumptions = total_at_mean(drawn, r_total, "void")
    steps: list[Step] = []
    missing: list[str] = []
    for number, one in enumerate(assembly.voids, 1):
        resistance = resistance_of(drawn, one.layer)
        if all(one.layer != layer.title for layer in drawn):
            assumptions.append(f"air voids in {one.layer} lie outside of what counts")
        elif resistance is None:
            missing.append(f"resistance of {one.layer!r} by itself, which has air voids")
        else:
            several = str(number) if len(assembly.voids) > 1 else ""
            steps += void_steps(one.level, resistance, at_mean, several)
    value = sum(step.value for step in steps)
    return Correction(value, tuple(steps), tuple(missing), tuple(assumptions))


METHODS = (
    Method(
        name="air_voids",
        title="Air voids in insulation",
        formula="dUg = dU'' (R1 / RT)^2",
        source=SOURCE,
        valid="levels 0 to 2; homogeneous layers of insulation",
    ),
)
