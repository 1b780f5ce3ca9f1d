"""The number that a limit speaks of: of a solution, of a product, or one over a U-factor."""

from __future__ import annotations

from envcheck.model.metrics import METRICS
from envcheck.model.project import Assembly
from envcheck.model.solved import Solved


def of_metric(metric: str, u_factor: float) -> float:
    """Express a U-factor in W/(m2 K) as the metric has it: a total R-value is one over it."""
    return 1.0 / u_factor if METRICS[metric].reciprocal else u_factor


def value_of(metric: str, assembly: Assembly, solved: Solved | None) -> float | None:
    """Give the value in SI; None where nobody states or computes it."""
    rated, window = assembly.rated, assembly.window
    shgc = rated.shgc if rated is not None else assembly.shgc
    light = rated.visible_transmittance if rated is not None else None
    if metric == "SHGC":
        return shgc
    if metric == "VT":
        return light
    if metric == "VT_per_SHGC":
        return light / shgc if light is not None and shgc else None
    if metric == "U_glazing":
        if rated is not None and rated.basis == "centre_of_glass":
            return rated.u_factor
        return window.u_glass if window is not None else None
    if solved is None or solved.value is None or not METRICS[metric].solved_as:
        return None
    per_area = solved.setting.metric in ("U_assembly", "U_product")
    if METRICS[metric].solved_as == "heat_flow" and not (per_area and solved.value):
        return None
    return of_metric(metric, solved.value)
