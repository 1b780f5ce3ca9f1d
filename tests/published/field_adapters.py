"""The two-dimensional reference cases of ISO 10211, solved as they are drawn."""

from __future__ import annotations

from functools import cache
from typing import Any

from envcheck.solve.field.outline_bound import OutlineBounds, bound_outline
from envcheck.solve.field.surfaces import temperature_at
from tests.solve.field.outlines import GAP, IN, OUT, of_section, outline
from tests.solve.field.sections import section

AIR = 0.1
"""m of air drawn before the first face."""


@cache
def column() -> OutlineBounds:
    """Half a square of side 1 on an even grid: refining would go for ever to the corner in which
    two given temperatures meet. Surfaces at given temperatures: films that hardly count.
    """
    cells = [[GAP, *[IN] * 16], *[[OUT, *[1.0] * 16] for _ in range(32)], [GAP, *[OUT] * 16]]
    sizes = [AIR, *[1 / 32] * 16], [AIR, *[1 / 32] * 32, AIR]
    return bound_outline(outline(*sizes, cells, outside=1e-9, inside=1e-9), most_rounds=1)


def iso10211_case_1(inputs: dict[str, Any], units: dict[str, str]) -> dict[str, float]:
    factor = temperature_at(column(), AIR + inputs["x"], AIR + inputs["y"])
    return {"T": inputs["cold"] + factor * (inputs["hot"] - inputs["cold"])}


@cache
def web(
    widths: tuple[float, ...], depths: tuple[float, ...], k: tuple[tuple[float, ...], ...],
    outside: float, inside: float,
) -> OutlineBounds:  # fmt: skip
    rows = [list(row) for row in k]
    return bound_outline(
        of_section(section(list(widths), list(depths), rows, outside, inside, periodic=False))
    )


def iso10211_case_2(inputs: dict[str, Any], units: dict[str, str]) -> dict[str, float]:
    """Temperatures in the grid; as flow the end of the proven interval that is further off 9.5."""
    found = web(
        tuple(inputs["widths_mm"]),
        tuple(inputs["depths_mm"]),
        tuple(map(tuple, inputs["conductivities"])),
        inputs["outside"],
        inputs["inside"],
    )
    factor = temperature_at(found, inputs["x_mm"] / 1e3, AIR + inputs["y_mm"] / 1e3)
    flow = max(found.low, found.high, key=lambda end: abs(end * inputs["warm"] - 9.5))
    return {"T": factor * inputs["warm"], "Q": flow * inputs["warm"]}


ADAPTERS = {"iso10211_case_1": iso10211_case_1, "iso10211_case_2": iso10211_case_2}
