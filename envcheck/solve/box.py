"""A box of blocks between two films, and its two classical wirings: plain numbers only."""

from __future__ import annotations

from itertools import product
from typing import NamedTuple


class Box(NamedTuple):
    """A box of blocks between two films, repeated along the wall and up it.

    Blocks that conduct 0 are air: outdoors before the first solid block of a column, indoors
    behind the last one, so that parts may stand out from the wall.
    """

    widths: tuple[float, ...]
    """Of the columns along the wall, m."""
    heights: tuple[float, ...]
    """Of the courses up the wall, m."""
    depths: tuple[float, ...]
    """Of the rows from outside to inside, m."""
    conductivities: tuple[tuple[tuple[float, ...], ...], ...]
    """``[row][course][column]``, W/(m K)"""
    outside: float
    """Surface resistance, m2 K/W, above 0."""
    inside: float
    repeats_along: bool = True
    """The box repeats along the wall; else its sides there are adiabatic (declared symmetry)."""
    repeats_up: bool = True

    @property
    def area(self) -> float:
        """Of the wall that the box stands for, m2."""
        return sum(self.widths) * sum(self.heights)


def wirings(box: Box) -> tuple[float, float]:
    """U of a flush box by parallel paths and by isothermal planes, W/(m2 K).

    Rayleigh's law: the two enclose the U-factor of the box (see ``wiring``).
    """
    area, films = box.area, box.outside + box.inside
    places = list(product(range(len(box.heights)), range(len(box.widths))))
    shares = [box.heights[course] * box.widths[column] / area for course, column in places]
    paths = [films] * len(places)
    planes = films
    for depth, plane in zip(box.depths, box.conductivities, strict=True):
        mean = 0.0
        for number, (course, column) in enumerate(places):
            paths[number] += depth / plane[course][column]
            mean += shares[number] * plane[course][column]
        planes += depth / mean
    return sum(share / path for share, path in zip(shares, paths, strict=True)), 1.0 / planes
