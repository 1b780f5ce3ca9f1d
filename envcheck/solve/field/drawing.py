"""From the drawn blocks of a wall to a section."""

from __future__ import annotations

from envcheck.model.layers import TaperedLayer
from envcheck.model.solved import Block
from envcheck.solve.field.section import Section
from envcheck.solve.registry import Wall
from envcheck.solve.wiring import align

THIN = 1e-3
"""W/(m K) of the thin layer that stands for a resistance without a thickness: it hardly conducts
sideways, as nobody says that it does."""


class NotDrawn(Exception):
    """Why a wall is no section, in words that complete "not solved in two dimensions: "."""


def section_of(wall: Wall) -> Section:
    """Draw a wall as a section, periodic along the wall.

    A labelled infill and an air space conduct like their resistance over their depth. Errors:
    NotDrawn where layers cross, a spacing is not stated, or a layer is tapered.
    """
    if any(isinstance(layer, TaperedLayer) for layer in wall.layers):
        raise NotDrawn("a tapered layer is no rectangle")
    blocks = align(wall.blocks)
    patterned = [block for block in blocks if block.pattern]
    if not patterned:
        raise NotDrawn("the layers are homogeneous")
    if len({block.pattern for block in patterned}) > 1:
        raise NotDrawn("layers that cross each other need three dimensions")
    if not all(block.repeat for block in patterned):
        raise NotDrawn("the spacing of the members is not stated")
    widths = patterned[0].widths
    rows = [row for block in blocks for row in _rows(block, len(widths))]
    return Section(
        tuple(widths),
        tuple(depth for depth, _ in rows),
        tuple(conductivities for _, conductivities in rows),
        wall.outside.value,
        wall.inside.value,
    )


def _rows(block: Block, columns: int) -> list[tuple[float, tuple[float, ...]]]:
    """Depth and conductivities of the rows of a block; rows of no resistance are left out."""
    found = []
    for depth, row in zip(block.depths, block.cells, strict=True):
        if all(cell.value == 0 for cell in row):
            continue
        drawn = depth if depth > 0 else THIN * row[0].value
        conductivities = tuple(drawn / cell.value for cell in row)
        found.append((drawn, conductivities * columns if len(row) == 1 else conductivities))
    return found
