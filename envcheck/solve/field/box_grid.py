"""The grid of a box, the faces that air touches, and what cannot be solved.

Arrays run ``[row][course][column]``: axis 0 from outside to inside, axis 1 up the wall, axis 2
along it.
"""

from __future__ import annotations

from typing import NamedTuple

import numpy as np
import numpy.typing as npt

from envcheck.solve.box import Box
from envcheck.solve.field.section import (
    CONTRAST,
    LEAST,
    MOST,
    Array,
    ModelError,
    graded,
    halved,
)

Marks = npt.NDArray[np.bool_]
SOLID, OUTDOORS, INDOORS, CLOSED = range(4)
"""What lies in a cell or beyond a face; ``CLOSED`` is an adiabatic plane."""


class BoxGrid(NamedTuple):
    """Cell sizes along the three axes, m, and the block that each cell lies in."""

    sizes: tuple[Array, Array, Array]
    blocks: tuple[npt.NDArray[np.intp], npt.NDArray[np.intp], npt.NDArray[np.intp]]

    @property
    def nodes(self) -> int:
        """Number of grid nodes."""
        return int(np.prod([len(size) + 1 for size in self.sizes]))

    def along(self, axis: int) -> Array:
        """Cell sizes along one axis, shaped to meet an array of cells."""
        return self.sizes[axis].reshape([-1 if a == axis else 1 for a in range(3)])

    def across(self, axis: int) -> Array:
        """Area of the cells' faces that look along one axis, m2."""
        one, other = (a for a in range(3) if a != axis)
        area: Array = self.along(one) * self.along(other)
        return area


class Exposure(NamedTuple):
    """Cells that air touches on one of their six sides."""

    axis: int
    side: int
    """0 towards lower indices (outside), 1 towards higher."""
    cells: Marks
    resistance: float
    """Of the film, m2 K/W."""
    air: float
    """0 outdoors, 1 indoors."""


def repeats(box: Box) -> tuple[bool, bool, bool]:
    """Whether the box repeats along each axis."""
    return False, box.repeats_up, box.repeats_along


def check(box: Box) -> None:
    """Refuse what cannot be solved. Errors: ModelError that names the block."""
    k = np.asarray(box.conductivities, dtype=float)
    if k.shape != (len(box.depths), len(box.heights), len(box.widths)):
        raise ModelError("rows, courses and columns of the box do not match its conductivities")
    if min(*box.widths, *box.heights, *box.depths) <= 0:
        raise ModelError("a block of the box has no width, height or depth")
    if box.outside <= 0 or box.inside <= 0:
        raise ModelError("a surface of the box has no film")
    wrong = np.argwhere(~((k == 0) | ((k >= LEAST) & (k <= MOST))))
    if len(wrong):
        row, course, column = wrong[0]
        raise ModelError(
            f"the block in row {row + 1}, course {course + 1}, column {column + 1} conducts "
            f"{k[row, course, column]:.3g} W/(m K), outside of {LEAST:g} to {MOST:g}"
        )
    _check_columns(k, repeats(box))
    _check_edges(k, repeats(box))


def _check_columns(k: Array, periodic: tuple[bool, bool, bool]) -> None:
    """Each column is one run of solid blocks, and outdoor air never meets indoor air."""
    solid = k > 0
    starts = solid & ~np.concatenate([np.zeros_like(solid[:1]), solid[:-1]])
    wrong = np.argwhere(starts.sum(axis=0) != 1)
    if len(wrong):
        course, column = wrong[0]
        what = "several parts" if solid[:, course, column].any() else "nothing but air"
        raise ModelError(f"course {course + 1}, column {column + 1} of the box holds {what}")
    state = states(k)
    for axis in (1, 2):
        beyond = neighbours(state, axis, 1, periodic[axis])
        if ((state + beyond == OUTDOORS + INDOORS) & (state * beyond != 0)).any():
            raise ModelError("outdoor air meets indoor air beside a part that stands out")


def _check_edges(k: Array, periodic: tuple[bool, bool, bool]) -> None:
    """Two good conductors that touch along an edge only: the flow over it has no good value."""
    for one, other in ((0, 1), (0, 2), (1, 2)):
        a = k
        b, c = _next(k, one, periodic), _next(k, other, periodic)
        d = _next(_next(k, one, periodic), other, periodic)
        least = 1.0 / CONTRAST
        with np.errstate(divide="ignore", invalid="ignore"):
            falling = np.maximum(b, c) < least * np.minimum(a, d)
            rising = np.maximum(a, d) < least * np.minimum(b, c)
        met = np.argwhere(falling | rising)
        if len(met):
            row, course, column = met[0] + 1
            raise ModelError(
                f"two good conductors touch along an edge only, at row {row}, course {course}, "
                f"column {column} of the box: join them or part them"
            )


def _next(k: Array, axis: int, periodic: tuple[bool, bool, bool]) -> Array:
    """The neighbour towards higher indices; at a closed end the block itself."""
    beyond = np.roll(k, -1, axis=axis)
    if not periodic[axis]:
        last = [slice(None)] * 3
        last[axis] = slice(-1, None)
        beyond[tuple(last)] = k[tuple(last)]
    return beyond


def states(k: Array) -> npt.NDArray[np.intp]:
    """What lies in each cell: solid, outdoor air or indoor air."""
    before = np.cumsum(k > 0, axis=0) == 0
    return np.where(k > 0, SOLID, np.where(before, OUTDOORS, INDOORS))


def neighbours(
    state: npt.NDArray[np.intp], axis: int, side: int, periodic: bool
) -> npt.NDArray[np.intp]:
    """What lies beyond one side of every cell."""
    beyond = np.roll(state, 1 if side == 0 else -1, axis=axis)
    if not periodic:
        edge = [slice(None)] * 3
        edge[axis] = slice(0, 1) if side == 0 else slice(-1, None)
        beyond[tuple(edge)] = CLOSED if axis else (OUTDOORS, INDOORS)[side]
    return beyond


def exposures(box: Box, k: Array) -> list[Exposure]:
    """Every side of solid cells that air touches."""
    state, periodic = states(k), repeats(box)
    found = []
    for axis in range(3):
        for side in (0, 1):
            beyond = neighbours(state, axis, side, periodic[axis])
            for air, resistance in ((OUTDOORS, box.outside), (INDOORS, box.inside)):
                cells = (state == SOLID) & (beyond == air)
                if cells.any():
                    found.append(Exposure(axis, side, cells, resistance, float(air == INDOORS)))
    return found


def first_grid(box: Box) -> BoxGrid:
    """The material planes, with cells that grow by no more than a factor of 4."""
    (hy, rows), (hz, courses), (hx, columns) = (
        graded(sizes) for sizes in (box.depths, box.heights, box.widths)
    )
    return BoxGrid((hy, hz, hx), (rows, courses, columns))


def refined(grid: BoxGrid, marks: tuple[Marks, Marks, Marks]) -> BoxGrid:
    """Halve the marked rows, courses and columns."""
    (hy, rows), (hz, courses), (hx, columns) = (
        halved(size, block, mark)
        for size, block, mark in zip(grid.sizes, grid.blocks, marks, strict=True)
    )
    return BoxGrid((hy, hz, hx), (rows, courses, columns))


def at_nodes(values: Array, marks: tuple[Marks, Marks, Marks]) -> Array:
    """Node values on the grid of the marked rows, courses and columns halved."""
    for axis, mark in enumerate(marks):
        middle = (np.delete(values, 0, axis) + np.delete(values, -1, axis)) / 2.0
        places = np.flatnonzero(mark) + 1
        values = np.insert(values, places, np.take(middle, places - 1, axis), axis)
    return values


def at_cells(values: Array, marks: tuple[Marks, Marks, Marks]) -> Array:
    """Cell values on the grid of the marked rows, courses and columns halved."""
    for axis, mark in enumerate(marks):
        values = np.repeat(values, np.where(mark, 2, 1), axis)
    return values
