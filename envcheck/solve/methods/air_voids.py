"""Air voids in insulation: the correction dUg of ISO 6946."""

from __future__ import annotations

from envcheck.solve.registry import Method

LEVELS = {0: 0.0, 1: 0.01, 2: 0.04}
"""dU'' by level of voids, W/(m2 K); ISO 6946:2017, annex F; from memory."""


def void_correction(level_correction: float, r1: float, r_total: float) -> float:
    """Addition to U for air voids: dUg = dU'' (R1 / RT)^2.

    level_correction: dU'' of the level, W/(m2 K). r1: of the layer that has voids. r_total: RT of
    the component without corrections, m2 K/W. Any shape. Returns W/(m2 K).
    Source: ISO 6946:2017, annex F.
    """
    return level_correction * (r1 / r_total) ** 2


METHODS = (
    Method(
        name="air_voids",
        title="Air voids in insulation",
        formula="dUg = dU'' (R1 / RT)^2",
        source="ISO 6946:2017, annex F",
        valid="levels 0 to 2; not yet asked for by a project",
    ),
)
