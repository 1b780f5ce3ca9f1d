"""Temperatures and flows of a solved detail or section, for reading and drawing.

None of them is bounded: the proven interval is that of the heat flow as a whole. Temperatures are
factors, 0 for outdoor and 1 for indoor air.
"""

from __future__ import annotations

from typing import NamedTuple

import numpy as np
import numpy.typing as npt

from envcheck.solve.field.bound import Bounds
from envcheck.solve.field.outline import Cells, Outline
from envcheck.solve.field.outline_bound import OutlineBounds
from envcheck.solve.field.section import Array, Section


class Spot(NamedTuple):
    """A place and its temperature factor."""

    x: float
    """m from the left side of the drawing"""
    y: float
    """m from the start of its rows"""
    factor: float
    """(T - Te) / (Ti - Te); at the inner face f_Rsi. Not bounded."""


class Flux(NamedTuple):
    """Heat flow density at the middles of the cells, per kelvin between both airs."""

    x: Array
    """(m,) middles of the columns, m"""
    y: Array
    """(n,) middles of the rows, m"""
    along: Array
    """(n, m) W/(m2 K) towards larger x; 0 where nothing solid is"""
    across: Array
    """(n, m) towards larger y"""


def with_still_air(outline: Outline, film: float) -> Outline:
    """The outline with that resistance at every inside surface."""
    kinds = tuple(k._replace(film=film) if k.indoors else k for k in outline.kinds)
    return outline._replace(kinds=kinds)


def section_with_still_air(section: Section, film: float) -> Section:
    """The section with that resistance at its inside surface."""
    return section._replace(inside=film)


def coldest_inside(found: OutlineBounds) -> Spot:
    """Coldest place of the surfaces that face indoor air.

    Source: ISO 10211:2017, temperature factor f_Rsi = (Tsi - Te) / (Ti - Te).
    """
    cells, field = found.cells, found.above.temperatures
    level = (cells.film_y > 0) & (cells.air_y == 1.0)
    upright = (cells.film_x > 0) & (cells.air_x == 1.0)
    inside = np.zeros(field.shape, dtype=bool)
    inside[:, :-1] |= level
    inside[:, 1:] |= level
    inside[:-1] |= upright
    inside[1:] |= upright
    row, column = np.unravel_index(np.argmin(np.where(inside, field, np.inf)), field.shape)
    x, y = lines(cells.hx), lines(cells.hy)
    return Spot(float(x[column]), float(y[row]), float(field[row, column]))


def coldest_of_section(found: Bounds) -> Spot:
    """Coldest place of the inner face of a section."""
    inner = found.temperatures[-1]
    column = int(np.argmin(inner))
    depth = float(found.grid.hy.sum())
    return Spot(float(lines(found.grid.hx)[column]), depth, float(inner[column]))


def lines(sizes: Array) -> Array:
    """Places of the grid lines, m."""
    return np.concatenate([[0.0], np.cumsum(sizes)])


def temperature_at(found: OutlineBounds, x: float, y: float) -> float:
    """Temperature factor at a point of a solid or of its surface, interpolated in its cell.

    x, y: m. Not bounded. Errors: ValueError where nothing solid is.
    """
    cells = found.cells
    grid = lines(cells.hx), lines(cells.hy)
    return _interpolated(*grid, found.above.temperatures, cells.k > 0, x, y)


def temperature_in_section(found: Bounds, x: float, y: float) -> float:
    """Temperature factor at a point of a section, y from its outer face, interpolated.

    x, y: m. Not bounded. Errors: ValueError outside the section.
    """
    grid = lines(found.grid.hx), lines(found.grid.hy)
    solid = np.ones((len(found.grid.hy), len(found.grid.hx)), dtype=bool)
    return _interpolated(*grid, found.temperatures, solid, x, y)


def _interpolated(
    across: Array, up: Array, field: Array, solid: npt.NDArray[np.bool_], x: float, y: float
) -> float:
    """Bilinear between the nodes of a solid cell that holds the point or has it on its edge."""
    near = 1e-9
    for row in _touching(up, y, near):
        for column in _touching(across, x, near):
            if solid[row, column]:
                right = (x - across[column]) / (across[column + 1] - across[column])
                top = (y - up[row]) / (up[row + 1] - up[row])
                right, top = min(max(right, 0.0), 1.0), min(max(top, 0.0), 1.0)
                low = field[row, column : column + 2] @ (1.0 - right, right)
                high = field[row + 1, column : column + 2] @ (1.0 - right, right)
                return float(low * (1.0 - top) + high * top)
    raise ValueError(f"nothing solid at x = {x:g} m, y = {y:g} m")


def _touching(places: Array, at: float, near: float) -> list[int]:
    """Cells between lines that a place lies in or on the edge of."""
    return [int(i) for i in np.flatnonzero((places[:-1] <= at + near) & (at - near <= places[1:]))]


def flow_through(found: OutlineBounds, *, x: tuple[float, float], y: tuple[float, float]) -> float:
    """Heat flow through a straight line of the drawing, W/(m K), towards larger x or y.

    x, y: where the line starts and ends, m; one of both pairs is one place, which must lie on a
    line of the drawing. Not bounded. Errors: ValueError for a line that is neither upright nor
    level, or lies on no line of the drawing.
    """
    cells, below = found.cells, found.below
    if x[0] == x[1]:
        return -_through(lines(cells.hx), lines(cells.hy), below.flow_x.T, x[0], y)
    if y[0] == y[1]:
        return -_through(lines(cells.hy), lines(cells.hx), below.flow_y, y[0], x)
    raise ValueError("the line is neither upright nor level")


def _through(
    across: Array, along: Array, flow: Array, at: float, ends: tuple[float, float]
) -> float:
    place = int(np.argmin(np.abs(across - at)))
    if abs(across[place] - at) > 1e-9:
        raise ValueError(f"no line of the drawing at {at:g} m")
    start, end = min(ends), max(ends)
    covered = np.clip(np.minimum(along[1:], end) - np.maximum(along[:-1], start), 0.0, None)
    return float((flow[place] * covered / np.diff(along)).sum())


def flux(found: OutlineBounds) -> Flux:
    """Flow densities of the cells, for drawing flow paths; not bounded."""
    cells: Cells = found.cells
    x, y = lines(cells.hx), lines(cells.hy)
    mean_x = (found.below.flow_x[:, :-1] + found.below.flow_x[:, 1:]) / 2.0
    mean_y = (found.below.flow_y[:-1] + found.below.flow_y[1:]) / 2.0
    return Flux(
        (x[:-1] + x[1:]) / 2.0,
        (y[:-1] + y[1:]) / 2.0,
        np.where(cells.k > 0, -mean_x / cells.hy[:, None], 0.0),
        np.where(cells.k > 0, -mean_y / cells.hx, 0.0),
    )
