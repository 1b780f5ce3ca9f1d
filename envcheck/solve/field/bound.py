"""Both bounds on one grid, refined where the gap sits until it is small enough."""

from __future__ import annotations

from typing import NamedTuple

import numpy as np

from envcheck.solve.field.networks import indicators, lower, upper
from envcheck.solve.field.section import Array, Grid, Section, check, first_grid, refined

TOLERANCE = 1e-3
"""Gap between the bounds, as a share of the value."""
CLOSE = 1e-4
"""Gap where a deciding bracket still holds the limit."""
MOST_ROUNDS = 20
MOST_NODES = 150_000
MARKED = 0.6
"""Share of the gap whose columns and rows are split in one round."""
ROUNDING = 1e-11
"""Relative widening of both bounds for rounding."""


class Bounds(NamedTuple):
    """The proven interval of U of the drawn section."""

    low: float
    """W/(m2 K)"""
    high: float
    rounds: int
    nodes: int
    stopped_by: str
    """``tolerance``, ``rounds`` or ``nodes``"""
    grid: Grid
    temperatures: Array
    """(n + 1, m + 1) at the nodes, 0 outdoors and 1 indoors; not bounded."""

    @property
    def gap(self) -> float:
        """Width of the interval as a share of its low end."""
        return self.high / self.low - 1.0


def bound(
    section: Section,
    tolerance: float = TOLERANCE,
    most_rounds: int = MOST_ROUNDS,
    most_nodes: int = MOST_NODES,
) -> Bounds:
    """Bound the U-factor of a section from both sides.

    Refines until the gap is at most ``tolerance`` or a cap is met; the interval is proven either
    way. Source: Dirichlet's and Thomson's principles for steady conduction; the model is that of
    ISO 10211:2017. Errors: ModelError for a section that cannot be meant, SolveError where a
    heat balance does not close.
    """
    check(section)
    conductivities = np.asarray(section.conductivities, dtype=float)
    width = sum(section.widths)
    grid = first_grid(section)
    low, high = 0.0, np.inf
    rounds = 0
    while True:
        rounds += 1
        k = conductivities[np.ix_(grid.rows, grid.columns)]
        above, below = upper(section, grid, k), lower(section, grid, k)
        low = max(low, below.conductance / width * (1.0 - ROUNDING))
        high = min(high, above.conductance / width * (1.0 + ROUNDING))
        if high <= low * (1.0 + tolerance):
            return Bounds(low, high, rounds, grid.nodes, "tolerance", grid, above.temperatures)
        if rounds >= most_rounds:
            return Bounds(low, high, rounds, grid.nodes, "rounds", grid, above.temperatures)
        finer = _marked(grid, *indicators(section, grid, k, above, below))
        if finer.nodes > most_nodes:
            return Bounds(low, high, rounds, grid.nodes, "nodes", grid, above.temperatures)
        grid = finer


def _marked(grid: Grid, columns: Array, rows: Array) -> Grid:
    """Split the columns and rows that hold most of the gap for the nodes that they cost."""
    scores = np.concatenate([columns, rows])
    costs = np.concatenate([np.full(len(columns), len(rows)), np.full(len(rows), len(columns))])
    order = np.argsort(-scores / costs)
    needed = np.searchsorted(np.cumsum(scores[order]), MARKED * scores.sum()) + 1
    marked = np.zeros(len(scores), dtype=bool)
    marked[order[:needed]] = True
    return refined(grid, marked[: len(columns)], marked[len(columns) :])
