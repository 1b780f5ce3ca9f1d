"""Both bounds of a box on one grid, refined where the gap sits until it is small enough."""

from __future__ import annotations

from typing import NamedTuple

import numpy as np

from envcheck.solve.box import Box
from envcheck.solve.field.bound import ROUNDING, STALLED, best
from envcheck.solve.field.box_grid import (
    BoxGrid,
    Marks,
    at_cells,
    at_nodes,
    check,
    first_grid,
    refined,
)
from envcheck.solve.field.box_networks import indicators, lower, upper
from envcheck.solve.field.section import Array

TOLERANCE = 1e-2
"""Gap between the bounds, as a share of the value."""
MOST_ROUNDS = 20
MOST_NODES = 300_000
MARKED = 0.5
"""Share of the gap whose planes are split in one round: fewer than in two dimensions, as each
costs a whole plane of nodes."""


class BoxBounds(NamedTuple):
    """The proven interval of U of the drawn box."""

    low: float
    """W/(m2 K)"""
    high: float
    rounds: int
    nodes: int
    stopped_by: str
    """``tolerance``, ``rounds`` or ``nodes``"""
    grid: BoxGrid
    temperatures: Array
    """At the nodes, 0 outdoors and 1 indoors; not bounded."""
    imbalance: float
    """Share of the heat flow by which the solution missed its balance before it was mended."""

    @property
    def gap(self) -> float:
        """Width of the interval as a share of its low end."""
        return self.high / self.low - 1.0


def bound_box(
    box: Box,
    tolerance: float = TOLERANCE,
    most_rounds: int = MOST_ROUNDS,
    most_nodes: int = MOST_NODES,
) -> BoxBounds:
    """Bound the U-factor of a box from both sides.

    Refines until the gap is at most ``tolerance`` or a cap is met; the interval is proven either
    way. Source: Dirichlet's and Thomson's principles for steady conduction; the model is that of
    ISO 10211:2017. Errors: ModelError for a box that cannot be meant.
    """
    check(box)
    conductivities = np.asarray(box.conductivities, dtype=float)
    grid = first_grid(box)
    low, high, before = 0.0, np.inf, np.inf
    starts: tuple[Array | None, Array | None] = (None, None)
    rounds = 0
    while True:
        rounds += 1
        k = conductivities[np.ix_(*grid.blocks)]
        above, below = upper(box, grid, k, starts[0]), lower(box, grid, k, starts[1])
        low = max(low, below.conductance / box.area * (1.0 - ROUNDING))
        high = min(high, above.conductance / box.area * (1.0 + ROUNDING))
        gap = high / low - 1.0
        stopped_by = "tolerance" if gap <= tolerance else "rounds" if rounds >= most_rounds else ""
        if not stopped_by:
            marks = _marked(grid, indicators(box, grid, k, above, below), gap > STALLED * before)
            finer = refined(grid, marks)
            stopped_by = "nodes" if finer.nodes > most_nodes else ""
        if stopped_by:
            return BoxBounds(
                low, high, rounds, grid.nodes, stopped_by, grid, above.temperatures,
                below.imbalance,
            )  # fmt: skip
        starts = at_nodes(above.temperatures, marks), at_cells(below.temperatures, marks)
        grid, before = finer, gap


def _marked(
    grid: BoxGrid, scores: tuple[Array, Array, Array], stalled: bool
) -> tuple[Marks, Marks, Marks]:
    """The planes that hold most of the gap for the nodes that splitting them costs.

    Where refinement stalls, most of each axis' own share (see the rule in two dimensions).
    """
    counts = [len(size) for size in grid.sizes]
    if stalled:
        rows, courses, columns = (best(score, np.ones(len(score)), MARKED) for score in scores)
        return rows, courses, columns
    costs = np.concatenate([np.full(n, np.prod(counts) / n) for n in counts])
    marked = best(np.concatenate(scores), costs, MARKED)
    rows, courses, columns = np.split(marked, np.cumsum(counts)[:-1])
    return rows, courses, columns
