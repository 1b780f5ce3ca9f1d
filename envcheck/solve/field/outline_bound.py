"""Both bounds of a drawn detail, and the fields that led to them."""

from __future__ import annotations

from typing import NamedTuple

import numpy as np

from envcheck.solve.field.bound import (
    MOST_NODES,
    MOST_ROUNDS,
    TOLERANCE,
    Scores,
    Solution,
    refine,
)
from envcheck.solve.field.outline import Cells, Outline, cells_of, check_outline, first_outline_grid
from envcheck.solve.field.outline_networks import Lower, Upper, indicators, lower, upper
from envcheck.solve.field.section import Grid, ModelError


class OutlineBounds(NamedTuple):
    """The proven interval of the conductance between indoors and outdoors."""

    low: float
    """L, W/(m K): heat flow per metre of the detail and kelvin"""
    high: float
    rounds: int
    nodes: int
    stopped_by: str
    """``tolerance``, ``rounds`` or ``nodes``"""
    cells: Cells
    """The last grid."""
    above: Upper
    """Its nodal temperatures; not bounded."""
    below: Lower
    """Its flows; not bounded."""
    imbalance: float
    """Share of the heat flow by which what enters misses what leaves, the worse of both."""

    @property
    def gap(self) -> float:
        """Width of the interval as a share of its low end."""
        return self.high / self.low - 1.0


def bound_outline(
    outline: Outline,
    tolerance: float = TOLERANCE,
    most_rounds: int = MOST_ROUNDS,
    most_nodes: int = MOST_NODES,
) -> OutlineBounds:
    """Bound the conductance L between indoor and outdoor air from both sides, W/(m K).

    Refines until the gap is at most ``tolerance`` or a cap is met; the interval is proven either
    way. Source: Dirichlet's and Thomson's principles; the model is that of ISO 10211:2017 (L2D).
    Errors: ModelError for a detail that cannot be meant, SolveError where a balance does not close.
    """
    check_outline(outline)
    drawn = first_outline_grid(outline)
    if drawn.nodes > most_nodes:
        raise ModelError(
            f"the lines of the drawing cross in {drawn.nodes} nodes, more than {most_nodes}: line "
            "up edges that are meant to lie on one line"
        )

    def solve(grid: Grid) -> Solution[Upper, Lower]:
        cells = cells_of(outline, grid)
        above, below = upper(cells), lower(cells)

        def scores() -> Scores:
            solid = cells.k > 0
            costs = np.maximum(solid.sum(axis=0), 1), np.maximum(solid.sum(axis=1), 1)
            return (*indicators(cells, above, below), *costs)

        return Solution(above, below, scores)

    end = refine(drawn, solve, tolerance, most_rounds, most_nodes)
    return OutlineBounds(
        end.low,
        end.high,
        end.rounds,
        end.grid.nodes,
        end.stopped_by,
        cells_of(outline, end.grid),
        end.above,
        end.below,
        max(end.above.imbalance, end.below.imbalance),
    )
