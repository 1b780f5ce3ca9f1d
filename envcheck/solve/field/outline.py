"""A drawn detail that is no plain rectangle: solids, outdoor air and indoor air on one grid.

Two environments are enough: outdoors at 0 and indoors at 1. Every face between a solid and air has
a film; the edges of the drawing, and what neither solid nor air covers, are adiabatic.
"""

from __future__ import annotations

from typing import NamedTuple

import numpy as np
import numpy.typing as npt
from scipy.ndimage import label

from envcheck.solve.field.section import (
    CONTRAST,
    LEAST,
    MOST,
    Array,
    Grid,
    ModelError,
    graded,
)

NOTHING = -1
"""In ``Outline.airs``: no air here."""


class Air(NamedTuple):
    """One kind of air that faces solids."""

    indoors: bool
    film: float
    """Surface resistance of every face to it, m2 K/W, above 0."""


class Outline(NamedTuple):
    """Rectangles on a grid; x to the right along the columns, y along the rows."""

    widths: tuple[float, ...]
    """Of the columns, m."""
    heights: tuple[float, ...]
    """Of the rows, m."""
    conductivities: tuple[tuple[float, ...], ...]
    """``[row][column]``, W/(m K); 0 where nothing solid is."""
    airs: tuple[tuple[int, ...], ...]
    """``[row][column]``, place in ``kinds``; ``NOTHING`` where no air is."""
    kinds: tuple[Air, ...]


class Cells(NamedTuple):
    """An outline on a grid."""

    hx: Array
    """(m,) m"""
    hy: Array
    """(n,) m"""
    k: Array
    """(n, m) W/(m K), 0 where nothing solid is"""
    film_x: Array
    """(n, m + 1) film resistance of the upright faces, m2 K/W; 0 where no film is"""
    film_y: Array
    """(n + 1, m) of the level faces"""
    air_x: Array
    """(n, m + 1) temperature of the air before those faces, 0 or 1"""
    air_y: Array
    """(n + 1, m)"""


def cells_of(outline: Outline, grid: Grid) -> Cells:
    """Lay an outline on a grid."""
    place = np.ix_(grid.rows, grid.columns)
    k = np.asarray(outline.conductivities, dtype=float)[place]
    airs = np.asarray(outline.airs)[place]
    film = np.array([*(kind.film for kind in outline.kinds), 0.0])[airs]
    warm = np.array([*(float(kind.indoors) for kind in outline.kinds), 0.0])[airs]
    film_y, air_y = _faces(k, film, warm)
    film_x, air_x = (faces.T for faces in _faces(k.T, film.T, warm.T))
    return Cells(grid.hx, grid.hy, k, film_x, film_y, air_x, air_y)


def _faces(k: Array, film: Array, warm: Array) -> tuple[Array, Array]:
    """Film and air temperature of the faces between rows: one side solid, the other air."""
    around = np.zeros((1, k.shape[1]))
    solid = np.vstack([around, k, around]) > 0
    film, warm = np.vstack([around, film, around]), np.vstack([around, warm, around])
    low = solid[:-1] & ~solid[1:]
    high = solid[1:] & ~solid[:-1]
    return (
        np.where(low, film[1:], np.where(high, film[:-1], 0.0)),
        np.where(low, warm[1:], np.where(high, warm[:-1], 0.0)),
    )


def first_outline_grid(outline: Outline) -> Grid:
    """The lines of the drawing, with cells that grow by no more than a factor of 4."""
    hx, columns = graded(outline.widths)
    hy, rows = graded(outline.heights)
    return Grid(hx, hy, columns, rows)


# ------------------------------------------------------------------------------------ checks


def check_outline(outline: Outline) -> None:
    """Refuse what cannot be solved. Errors: ModelError that names the place."""
    k, airs = np.asarray(outline.conductivities, dtype=float), np.asarray(outline.airs)
    shape = (len(outline.heights), len(outline.widths))
    if k.shape != shape or airs.shape != shape:
        raise ModelError("rows and columns of the detail do not match its cells")
    if min(*outline.widths, *outline.heights) <= 0:
        raise ModelError("a piece of the detail has no width or no height")
    if any(kind.film <= 0 for kind in outline.kinds):
        raise ModelError("a surface of the detail has no film")
    both = np.argwhere((k > 0) & (airs != NOTHING))
    if len(both):
        raise ModelError(f"solid and air in one place, at {_place(outline, *both[0])}")
    wrong = np.argwhere((k != 0) & ~((k >= LEAST) & (k <= MOST)))
    if len(wrong):
        raise ModelError(
            f"the piece at {_place(outline, *wrong[0])} conducts {k[tuple(wrong[0])]:.3g} "
            f"W/(m K), outside of {LEAST:g} to {MOST:g}"
        )
    _check_air(outline, airs)
    _check_contacts(outline, k)
    _check_path(outline, k)


def _place(outline: Outline, row: int, column: int) -> str:
    """Where a cell starts, in words."""
    x, y = sum(outline.widths[:column]) * 1e3, sum(outline.heights[:row]) * 1e3
    return f"x = {x:.4g} mm, y = {y:.4g} mm"


def _check_air(outline: Outline, airs: npt.NDArray[np.intp]) -> None:
    """Outdoor and indoor air with nothing between them would be a hole in the envelope."""
    side = np.array([*(1 if kind.indoors else -1 for kind in outline.kinds), 0])[airs]
    for one, other, step in (
        (side[:, :-1], side[:, 1:], (0, 1)),
        (side[:-1], side[1:], (1, 0)),
    ):
        met = np.argwhere(one * other < 0)
        if len(met):
            row, column = met[0] + step
            raise ModelError(
                "outdoor and indoor air meet with nothing between them at "
                f"{_place(outline, row, column)}"
            )


def _check_contacts(outline: Outline, k: Array) -> None:
    """Conductors that touch in a point only: the flow through it has no good value."""
    a, b, c, d = k[:-1, :-1], k[:-1, 1:], k[1:, :-1], k[1:, 1:]
    least = 1e-300
    falling = np.minimum(a, d) / np.maximum(np.maximum(b, c), least)
    rising = np.minimum(b, c) / np.maximum(np.maximum(a, d), least)
    met = np.argwhere(np.maximum(falling, rising) > CONTRAST)
    if len(met):
        row, column = met[0] + 1
        raise ModelError(
            f"two pieces touch in a corner only, at {_place(outline, row, column)}: "
            "join them or part them"
        )


def _check_path(outline: Outline, k: Array) -> None:
    """Every solid must face some air, and one at least both."""
    cells = cells_of(outline, _as_drawn(outline))
    solids, count = label(k > 0)
    through = False
    for number in range(1, count + 1):
        solid = solids == number
        warm, cold = _touches(solid, cells, 1.0), _touches(solid, cells, 0.0)
        if not (warm or cold):
            row, column = np.argwhere(solid)[0]
            raise ModelError(f"the piece at {_place(outline, row, column)} faces no air")
        through = through or (warm and cold)
    if not through:
        raise ModelError("no solid reaches from indoor to outdoor air")


def _as_drawn(outline: Outline) -> Grid:
    n, m = len(outline.heights), len(outline.widths)
    return Grid(np.array(outline.widths), np.array(outline.heights), np.arange(m), np.arange(n))


def _touches(solid: npt.NDArray[np.bool_], cells: Cells, temperature: float) -> bool:
    """Whether a solid has a film to air of that temperature."""
    x = (cells.film_x > 0) & (cells.air_x == temperature)
    y = (cells.film_y > 0) & (cells.air_y == temperature)
    faces = x[:, :-1] | x[:, 1:] | y[:-1] | y[1:]
    return bool((faces & solid).any())
