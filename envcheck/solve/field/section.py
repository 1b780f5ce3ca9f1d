"""The section that the networks solve, its grid, and what cannot be solved."""

from __future__ import annotations

from typing import NamedTuple

import numpy as np
import numpy.typing as npt

Array = npt.NDArray[np.float64]

LEAST, MOST = 1e-4, 1e4
"""W/(m K) between which a conductivity can be meant; beyond, rounding would widen the bounds."""
CONTRAST = 20.0
"""Ratio of conductivities from which two conductors that meet in a corner only are refused."""
STEEPEST = 4.0
"""Most that a grid cell may be larger than its neighbour at the start."""


class ModelError(Exception):
    """A section that says something that cannot be meant; the message names the piece."""


class Section(NamedTuple):
    """A rectangle of rectangles between two films, repeated along the wall."""

    widths: tuple[float, ...]
    """Of the columns, m."""
    depths: tuple[float, ...]
    """Of the rows from outside to inside, m."""
    conductivities: tuple[tuple[float, ...], ...]
    """``[row][column]``, W/(m K)"""
    outside: float
    """Surface resistance, m2 K/W, above 0."""
    inside: float
    periodic: bool = True
    """The section repeats; else its sides are adiabatic (a declared plane of symmetry)."""


class Grid(NamedTuple):
    """Cell sizes and the piece that each cell lies in."""

    hx: Array
    """(m,) m"""
    hy: Array
    """(n,) m, outside first"""
    columns: npt.NDArray[np.intp]
    """(m,) column of the section"""
    rows: npt.NDArray[np.intp]
    """(n,) row of the section"""

    @property
    def nodes(self) -> int:
        """Number of grid nodes."""
        return (len(self.hx) + 1) * (len(self.hy) + 1)


def check(section: Section) -> None:
    """Refuse what cannot be solved. Errors: ModelError that names the row and column."""
    k = np.asarray(section.conductivities, dtype=float)
    if k.shape != (len(section.depths), len(section.widths)):
        raise ModelError("rows and columns of the section do not match its conductivities")
    if min(*section.widths, *section.depths) <= 0:
        raise ModelError("a piece of the section has no width or no depth")
    if section.outside <= 0 or section.inside <= 0:
        raise ModelError("a surface of the section has no film")
    wrong = np.argwhere(~((k >= LEAST) & (k <= MOST)))
    if len(wrong):
        row, column = wrong[0]
        raise ModelError(
            f"the piece in row {row + 1}, column {column + 1} conducts {k[row, column]:.3g} "
            f"W/(m K), outside of {LEAST:g} to {MOST:g}"
        )
    _check_corners(k, section.periodic)


def _check_corners(k: Array, periodic: bool) -> None:
    """Two good conductors that touch in a point only: the flow through it has no good value."""
    right = np.roll(k, -1, axis=1) if periodic else k[:, 1:]
    left = k if periodic else k[:, :-1]
    a, b, c, d = left[:-1], right[:-1], left[1:], right[1:]
    falling = np.minimum(a, d) / np.maximum(b, c)
    rising = np.minimum(b, c) / np.maximum(a, d)
    met = np.argwhere(np.maximum(falling, rising) > CONTRAST)
    if len(met):
        row, column = met[0]
        raise ModelError(
            f"two good conductors touch in a corner only, between rows {row + 1} and {row + 2} at "
            f"column {column + 1}: join them or part them"
        )


def first_grid(section: Section) -> Grid:
    """The material lines, with cells that grow by no more than a factor of 4."""
    hx, columns = graded(section.widths)
    hy, rows = graded(section.depths)
    return Grid(hx, hy, columns, rows)


def graded(sizes: tuple[float, ...]) -> tuple[Array, npt.NDArray[np.intp]]:
    """Cut sizes so that neighbours differ by no more than ``STEEPEST``; with the piece of each."""
    cells = [(size, piece) for piece, size in enumerate(sizes)]
    place = 0
    while place < len(cells) - 1:
        (one, left), (two, right) = cells[place], cells[place + 1]
        if two > STEEPEST * one:
            part = min(STEEPEST * one, two / 2)
            cells[place + 1 : place + 2] = [(part, right), (two - part, right)]
            place += 1
        elif one > STEEPEST * two:
            part = min(STEEPEST * two, one / 2)
            cells[place : place + 1] = [(one - part, left), (part, left)]
            place = max(place - 1, 0)
        else:
            place += 1
    return np.array([size for size, _ in cells]), np.array([piece for _, piece in cells])


def refined(grid: Grid, columns: npt.NDArray[np.bool_], rows: npt.NDArray[np.bool_]) -> Grid:
    """Halve the marked columns and rows."""
    hx, cx = halved(grid.hx, grid.columns, columns)
    hy, cy = halved(grid.hy, grid.rows, rows)
    return Grid(hx, hy, cx, cy)


def halved(
    sizes: Array, pieces: npt.NDArray[np.intp], marked: npt.NDArray[np.bool_]
) -> tuple[Array, npt.NDArray[np.intp]]:
    """Halve the marked sizes; with the piece of each."""
    times = np.where(marked, 2, 1)
    return np.repeat(sizes / times, times), np.repeat(pieces, times)
