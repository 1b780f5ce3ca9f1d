"""Outlines for the tests of the bounds: corners, rooms, and shapes drawn at random."""

from __future__ import annotations

from collections.abc import Iterator

import numpy as np

from envcheck.solve.field.outline import NOTHING, Air, Outline, check_outline
from envcheck.solve.field.section import ModelError, Section

OUT, IN, GAP = "out", "in", "gap"
Cell = float | str


def outline(
    widths: list[float],
    heights: list[float],
    cells: list[list[Cell]],
    outside: float = 0.04,
    inside: float = 0.13,
) -> Outline:
    """Widths and heights in m; a cell is a conductivity, W/(m K), ``OUT``, ``IN`` or ``GAP``."""
    kinds = {OUT: 0, IN: 1}
    return Outline(
        tuple(widths),
        tuple(heights),
        tuple(tuple(0.0 if isinstance(c, str) else c for c in row) for row in cells),
        tuple(tuple(kinds.get(str(c), NOTHING) for c in row) for row in cells),
        (Air(False, outside), Air(True, inside)),
    )


def of_section(of: Section) -> Outline:
    """A section with adiabatic sides, air drawn before both faces."""
    count = len(of.widths)
    rows: list[list[Cell]] = [[OUT] * count, *map(list, of.conductivities), [IN] * count]
    depths = [0.1, *of.depths, 0.2]
    return outline(list(of.widths), depths, rows, of.outside, of.inside)


def corner(
    thickness: float, leg: float, k: float = 1.0, outside: float = 1e-9, inside: float = 1e-9
) -> Outline:
    """Two walls of one thickness whose inner faces are ``leg`` long; outdoors left and below."""
    return outline(
        [0.1, thickness, leg],
        [0.1, thickness, leg],
        [[GAP, OUT, OUT], [OUT, k, k], [OUT, k, IN]],
        outside,
        inside,
    )


def insulated_corner(legs: tuple[float, float] = (1.0, 1.2), *, slab: bool = False) -> Outline:
    """Outer insulation of 100 mm before 200 mm of masonry; ``slab``: a balcony cuts it."""
    wool: Cell = 2.0 if slab else 0.035
    return outline(
        [0.3, 0.1, 0.2, legs[0]],
        [0.3, 0.1, 0.2, 0.3, 0.2, legs[1]],
        [
            [OUT, OUT, OUT, OUT],
            [OUT, 0.035, 0.035, 0.035],
            [OUT, 0.035, 0.8, 0.8],
            [OUT, 0.035, 0.8, IN],
            [2.0 if slab else OUT, wool, 0.8, IN],
            [OUT, 0.035, 0.8, IN],
        ],
    )


def transposed(of: Outline) -> Outline:
    return of._replace(
        widths=of.heights,
        heights=of.widths,
        conductivities=tuple(zip(*of.conductivities, strict=True)),
        airs=tuple(zip(*of.airs, strict=True)),
    )


def mirrored(of: Outline) -> Outline:
    return of._replace(
        widths=of.widths[::-1],
        conductivities=tuple(row[::-1] for row in of.conductivities),
        airs=tuple(row[::-1] for row in of.airs),
    )


def random_outline(rng: np.random.Generator) -> Outline:
    n, m = rng.integers(2, 6, 2)
    what = rng.choice(4, size=(n, m), p=[0.66, 0.14, 0.14, 0.06])
    k = 10.0 ** rng.uniform(-1.7, 1.7, (n, m))
    return Outline(
        tuple(rng.uniform(0.01, 0.4, m)),
        tuple(rng.uniform(0.01, 0.4, n)),
        tuple(map(tuple, np.where(what == 0, k, 0.0).tolist())),
        tuple(map(tuple, np.array([NOTHING, 0, 1, NOTHING])[what].tolist())),
        (Air(False, float(rng.uniform(0.01, 0.1))), Air(True, float(rng.uniform(0.05, 0.25)))),
    )


def random_outlines(rng: np.random.Generator, count: int) -> Iterator[Outline]:
    """Draw until so many can be meant: no holes, no pieces in the air, no contact in a corner."""
    while count:
        of = random_outline(rng)
        try:
            check_outline(of)
        except ModelError:
            continue
        count -= 1
        yield of
