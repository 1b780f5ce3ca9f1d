"""Boxes with their whole geometry, for the tests of the bounds in three dimensions."""

from __future__ import annotations

from functools import partial

import numpy as np

from envcheck.solve.box import Box
from envcheck.solve.field.box_grid import check
from envcheck.solve.field.section import Section
from tests.solve.field.sections import accepted_by

MM = 1e-3
STEEL = 50.0
Blocks = tuple[tuple[tuple[float, ...], ...], ...]


def blocks(k: np.ndarray) -> Blocks:
    return tuple(tuple(tuple(map(float, line)) for line in plane) for plane in k)


def crossing(girt: float = STEEL, stud: float = STEEL) -> Box:
    """A C-stud 92 x 41 x 1.1 upright at 406 mm, a Z-girt 50 x 38 x 1.4 level at 610 mm over it.

    50 mm k .036 between the girts; 12.7 k .16; 92 k .04 between the studs; 12.7 k .16.
    """
    sheet, flange, skin, brim = 1.1, 41.0, 1.4, 38.0
    side, base = (406 - flange) / 2, (610 - brim) / 2
    widths = [side, sheet, flange - 2 * sheet, sheet, side]
    heights = [base + skin - brim, brim - skin, skin, brim - skin, 610 - base - brim]
    depths = [skin, 50 - 2 * skin, skin, 12.7, sheet, 92 - 2 * sheet, sheet, 12.7]
    k = np.empty((8, 5, 5))
    k[:3], k[3], k[4:7], k[7] = 0.036, 0.16, 0.04, 0.16
    k[0, 1:3], k[1, 2], k[2, 2:4] = girt, girt, girt
    k[4, :, 1:4], k[5, :, 1], k[6, :, 1:4] = stud, stud, stud
    return box(widths, heights, depths, k)


def battens() -> Box:
    """Two layers of battens 45 x 60 k .13 at 600 mm that cross, k .04 between; a board inside."""
    k = np.empty((3, 3, 3))
    k[:2], k[2] = 0.04, 0.25
    k[0, 1], k[1, :, 1] = 0.13, 0.13
    return box([277.5, 45, 277.5], [277.5, 45, 277.5], [60, 60, 12.5], k)


def iron_bar() -> Box:
    """ISO 10211:2017, annex C, case 4 (geometry from memory), a quarter of it.

    Insulation 1 x 1 m, 200 mm k .1; an iron bar 100 x 50 mm k 50, flush with the outer face, that
    stands 400 mm out of the inner one.
    """
    k = np.zeros((2, 2, 2))
    k[0], k[:, 0, 0] = 0.1, 50.0
    k[0, 0, 0] = 50.0
    of = box([50, 450], [25, 475], [200, 400], k, 0.1, 0.1)
    return of._replace(repeats_along=False, repeats_up=False)


def box(
    widths: list[float],
    heights: list[float],
    depths: list[float],
    k: np.ndarray,
    outside: float = 0.04,
    inside: float = 0.13,
) -> Box:
    """Sizes in mm, conductivities ``[row][course][column]`` in W/(m K), outside first."""
    along, up, through = (tuple(s * MM for s in sizes) for sizes in (widths, heights, depths))
    return Box(along, up, through, blocks(k), outside, inside)


def upright(of: Section) -> Box:
    """A section as a box that does not change with height."""
    k = np.repeat(np.asarray(of.conductivities)[:, None, :], 2, axis=1)
    return Box(of.widths, (0.3, 0.1), of.depths, blocks(k), of.outside, of.inside, of.periodic)


def level(of: Section) -> Box:
    """The same turned by a right angle."""
    k = np.repeat(np.asarray(of.conductivities)[:, :, None], 2, axis=2)
    return Box(
        (0.3, 0.1), of.widths, of.depths, blocks(k), of.outside, of.inside, True, of.periodic
    )


def turned(of: Box) -> Box:
    """Up and along exchanged."""
    k = np.asarray(of.conductivities).swapaxes(1, 2)
    return Box(of.heights, of.widths, of.depths, blocks(k), of.outside, of.inside,
               of.repeats_up, of.repeats_along)  # fmt: skip


def random_box(rng: np.random.Generator) -> Box:
    rows, courses, columns = rng.integers(1, 5, 3)
    return Box(
        tuple(map(float, rng.uniform(0.002, 0.3, columns))),
        tuple(map(float, rng.uniform(0.002, 0.3, courses))),
        tuple(map(float, rng.uniform(0.001, 0.2, rows))),
        blocks(10.0 ** rng.uniform(-2, 1.5, (rows, courses, columns))),
        float(rng.uniform(0.01, 0.2)),
        float(rng.uniform(0.01, 0.2)),
        bool(rng.integers(2)),
        bool(rng.integers(2)),
    )


accepted = partial(accepted_by, check)
