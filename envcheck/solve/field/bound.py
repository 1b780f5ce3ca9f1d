"""Both bounds on one grid, refined where the gap sits until it is small enough."""

from __future__ import annotations

from collections.abc import Callable
from typing import Generic, NamedTuple, Protocol, TypeVar

import numpy as np
import numpy.typing as npt

from envcheck.solve.field.networks import Lower, Upper, indicators, lower, upper
from envcheck.solve.field.section import Array, Grid, Section, check, first_grid, refined

TOLERANCE = 1e-3
"""Gap between the bounds, as a share of the value."""
MOST_ROUNDS = 20
MOST_NODES = 150_000
MARKED = 0.6
"""Share of the gap whose columns and rows are split in one round."""
STALLED = 0.8
"""Share of the last round's gap from which a round counts as stalled."""
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
    imbalance: float
    """Share of the heat flow by which what enters misses what leaves, the worse of both networks;
    from a millionth it is refused."""

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

    def solve(grid: Grid) -> Solution[Upper, Lower]:
        k = conductivities[np.ix_(grid.rows, grid.columns)]
        above, below = upper(section, grid, k), lower(section, grid, k)

        def scores() -> Scores:
            n, m = k.shape
            costs = np.full(m, n), np.full(n, m)
            return (*indicators(section, grid, k, above, below), *costs)

        return Solution(above, below, scores)

    end = refine(first_grid(section), solve, tolerance, most_rounds, most_nodes)
    return Bounds(
        end.low / width,
        end.high / width,
        end.rounds,
        end.grid.nodes,
        end.stopped_by,
        end.grid,
        end.above.temperatures,
        max(end.above.imbalance, end.below.imbalance),
    )


Scores = tuple[Array, Array, Array, Array]
"""Share of the gap by column and by row; nodes that splitting a column, a row, adds."""


class _Side(Protocol):
    """What either network tells of the conductance."""

    @property
    def conductance(self) -> float:
        """L, W/(m K)"""


_Above = TypeVar("_Above", bound=_Side)
_Below = TypeVar("_Below", bound=_Side)


class Solution(NamedTuple, Generic[_Above, _Below]):
    """Both networks on one grid."""

    above: _Above
    below: _Below
    scores: Callable[[], Scores]


class End(NamedTuple, Generic[_Above, _Below]):
    """Where refining ended."""

    low: float
    """L, W/(m K)"""
    high: float
    rounds: int
    stopped_by: str
    grid: Grid
    above: _Above
    below: _Below


def refine(
    grid: Grid,
    solve: Callable[[Grid], Solution[_Above, _Below]],
    tolerance: float,
    most_rounds: int,
    most_nodes: int,
) -> End[_Above, _Below]:
    """Solve and split until the gap is at most ``tolerance`` or a cap is met."""
    low, high = 0.0, np.inf
    rounds, before = 0, np.inf
    while True:
        rounds += 1
        found = solve(grid)
        low = max(low, found.below.conductance * (1.0 - ROUNDING))
        high = min(high, found.above.conductance * (1.0 + ROUNDING))
        gap = high / low - 1.0 if low > 0 else np.inf
        stopped_by = "tolerance" if gap <= tolerance else "rounds" if rounds >= most_rounds else ""
        if not stopped_by:
            mark = _marked_each_way if gap > STALLED * before else _marked
            finer = mark(grid, *found.scores())
            stopped_by = "nodes" if finer.nodes > most_nodes else ""
        if stopped_by:
            return End(low, high, rounds, stopped_by, grid, found.above, found.below)
        grid, before = finer, gap


def _marked(grid: Grid, columns: Array, rows: Array, column_costs: Array, row_costs: Array) -> Grid:
    """Split the columns and rows that hold most of the gap for the nodes that they cost."""
    costs = np.concatenate([column_costs, row_costs])
    marked = best(np.concatenate([columns, rows]), costs)
    return refined(grid, marked[: len(columns)], marked[len(columns) :])


def _marked_each_way(
    grid: Grid, columns: Array, rows: Array, column_costs: Array, row_costs: Array
) -> Grid:
    """Split most of the columns' share and most of the rows'.

    Where one way is cut far finer than the other, its lines cost so little that the first rule
    would split them for ever while the gap lies in the other.
    """
    return refined(grid, best(columns, np.ones(len(columns))), best(rows, np.ones(len(rows))))


def best(scores: Array, costs: Array, share: float = MARKED) -> npt.NDArray[np.bool_]:
    """The best scores for their costs that together hold a share of all."""
    order = np.argsort(-scores / costs)
    needed = np.searchsorted(np.cumsum(scores[order]), share * scores.sum()) + 1
    marked = np.zeros(len(scores), dtype=bool)
    marked[order[:needed]] = True
    return marked
