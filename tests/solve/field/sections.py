"""Sections with their whole geometry, for the tests of the bounds."""

from __future__ import annotations

from collections.abc import Callable, Iterator
from functools import partial
from typing import Any

import numpy as np

from envcheck.solve.field.section import ModelError, Section, check

MM = 1e-3
STEEL = 50.0


def section(
    widths: list[float],
    depths: list[float],
    rows: list[list[float]],
    outside: float = 0.04,
    inside: float = 0.13,
    periodic: bool = True,
) -> Section:
    """Widths and depths in mm, conductivities in W/(m K), outside first."""
    return Section(
        tuple(w * MM for w in widths),
        tuple(d * MM for d in depths),
        tuple(map(tuple, rows)),
        outside,
        inside,
        periodic,
    )


def c_stud(*, outer: bool = False, lip: float = 0.0, steel: float = STEEL) -> Section:
    """11 k .13; 92 k .04 with a C of 1.1 mm, flanges of 41, at 406; 12.7 k .16."""
    sheet, flange, depth, fill = 1.1, 41.0, 92.0, 0.04
    side = (406.0 - flange) / 2
    face, web = [fill, steel, steel, steel, fill], [fill, steel, fill, fill, fill]
    depths, rows = [sheet, depth - 2 * sheet, sheet], [face, web, face]
    if lip:
        lips = [fill, steel, fill, steel, fill]
        depths = [sheet, lip - sheet, depth - 2 * lip, lip - sheet, sheet]
        rows = [face, lips, web, lips, face]
    depths, rows = [11.0, *depths, 12.7], [[0.13] * 5, *rows, [0.16] * 5]
    if outer:
        depths, rows = [38.0, *depths], [[0.034] * 5, *rows]
    return section([side, sheet, flange - 2 * sheet, sheet, side], depths, rows)


WOOD = section([184, 38, 184], [11, 140, 12.7], [[0.13] * 3, [0.04, 0.12, 0.04], [0.16] * 3])
CHEEK = section(
    [275, 1, 48, 1, 275],
    [60, 12, 1, 98, 1, 12.5],
    [
        [0.043] * 5,
        [0.13] * 5,
        [0.035, STEEL, STEEL, STEEL, 0.035],
        [0.035, STEEL, 0.035, 0.035, 0.035],
        [0.035, STEEL, STEEL, STEEL, 0.035],
        [0.25] * 5,
    ],
    0.13,
    0.13,
)
BLOCK = section(
    [30, 155, 30, 155, 30], [30, 140, 30], [[1.0] * 5, [1.0, 0.05, 1.0, 0.05, 1.0], [1.0] * 5]
)


def random_section(rng: np.random.Generator) -> Section:
    n, m = rng.integers(1, 6, 2)
    k = 10.0 ** rng.uniform(-2, 2.5, (n, m))
    return Section(
        tuple(rng.uniform(0.002, 0.3, m)),
        tuple(rng.uniform(0.001, 0.2, n)),
        tuple(map(tuple, k)),
        float(rng.uniform(0.01, 0.2)),
        float(rng.uniform(0.01, 0.2)),
        bool(rng.integers(2)),
    )


def accepted_by(
    check: Callable[[Any], None],
    draw: Callable[[np.random.Generator], Any],
    rng: np.random.Generator,
    count: int,
) -> Iterator[Any]:
    """Draw until so many are accepted; conductors that barely meet are refused."""
    while count:
        of = draw(rng)
        try:
            check(of)
        except ModelError:
            continue
        count -= 1
        yield of


accepted = partial(accepted_by, check)
