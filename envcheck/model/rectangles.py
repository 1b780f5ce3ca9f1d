"""Rectangles of a drawing put on the grid of their own edges: later ones lie on top."""

from bisect import bisect_left, bisect_right
from collections.abc import Sequence
from typing import NamedTuple

SAME = 5e-6
"""m; edges that lie closer than this are one line (a size typed in inches and in millimetres)."""


class Cut(NamedTuple):
    """A drawing cut at every edge of its rectangles."""

    columns: tuple[float, ...]
    """Lines across the width, from 0 to the width, m."""
    rows: tuple[float, ...]
    """Lines across the depth, outer face first, m."""
    top: tuple[tuple[int, ...], ...]
    """``[row][column]``: number of the rectangle that is seen there; -1 where none is."""


def cut(rectangles: Sequence[tuple[float, float, float, float]], width: float, depth: float) -> Cut:
    """Cut a drawing of ``width`` x ``depth`` at the edges of its rectangles.

    rectangles: (left, right, outer, inner), m; what lies outside of the drawing is left out.
    """
    columns = _lines([edge for each in rectangles for edge in each[:2]], width)
    rows = _lines([edge for each in rectangles for edge in each[2:]], depth)
    top = [[-1] * (len(columns) - 1) for _ in rows[1:]]
    for number, (left, right, outer, inner) in enumerate(rectangles):
        first, last = _line_at(columns, left), _line_at(columns, right)
        for row in range(_line_at(rows, outer), _line_at(rows, inner)):
            top[row][first:last] = [number] * (last - first)
    return Cut(tuple(columns), tuple(rows), tuple(map(tuple, top)))


def _lines(edges: Sequence[float], length: float) -> list[float]:
    """Sorted lines from 0 to ``length``, those of one place merged."""
    found = [0.0]
    for edge in sorted(edges):
        if found[-1] + SAME < edge < length - SAME:
            found.append(edge)
    return [*found, length]


def _line_at(lines: Sequence[float], edge: float) -> int:
    """Number of the line that an edge lies on; edges beyond the drawing lie on its sides."""
    after = min(bisect_left(lines, edge), len(lines) - 1)
    before = max(bisect_right(lines, edge) - 1, 0)
    return before if edge - lines[before] < lines[after] - edge else after
