"""From the drawn blocks of a wall to a section."""

from __future__ import annotations

from collections.abc import Iterator, Sequence

from envcheck.model.layers import MasonryLayer, SectionLayer, TaperedLayer
from envcheck.model.solved import Block, Resistor
from envcheck.solve.field.section import Section
from envcheck.solve.registry import Wall
from envcheck.solve.wiring import align

THIN = 1e-3
"""W/(m K) of the thin layer that stands for a resistance without a thickness: it hardly conducts
sideways, as nobody says that it does."""

MOST_CELLS = 20_000
"""Cells before any refinement; more would make the solution slow before it is bounded."""


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
    patterns = {block.pattern for block in patterned}
    if not all(block.repeat for block in patterned):
        raise NotDrawn(_not_to_scale(wall))
    if len(patterns) > len({pattern.partition("@")[0] for pattern in patterns}):
        raise NotDrawn("members run the same way at spacings that share no repeat")
    if len(patterns) > 1:
        raise NotDrawn("layers that cross each other need three dimensions")
    widths = patterned[0].widths
    if len(widths) * sum(len(block.depths) for block in blocks) > MOST_CELLS:
        raise NotDrawn(f"the edges of its pieces make more than {MOST_CELLS} cells")
    rows = list(piece_rows(blocks))
    return Section(
        tuple(widths),
        tuple(depth for _, depth, _ in rows),
        tuple(tuple(depth / cell.value for cell in cells) for _, depth, cells in rows),
        wall.outside.value,
        wall.inside.value,
        not any(isinstance(layer, SectionLayer) and layer.symmetric for layer in wall.layers),
    )


def piece_rows(blocks: Sequence[Block]) -> Iterator[tuple[Block, float, tuple[Resistor, ...]]]:
    """Rows of aligned blocks as the section has them: block, depth (m), and a cell per column.

    Rows of no resistance are left out.
    """
    columns = max(len(block.widths) for block in blocks)
    for block in blocks:
        for depth, row in zip(block.depths, block.cells, strict=True):
            if any(cell.value for cell in row):
                drawn = depth if depth > 0 else THIN * row[0].value
                yield block, drawn, row * columns if len(row) == 1 else row


def _not_to_scale(wall: Wall) -> str:
    """Why some layer is known by its shares of the area only."""
    for layer, block in zip(wall.layers, wall.blocks, strict=True):
        if isinstance(layer, MasonryLayer) and block.pattern and not block.repeat:
            if layer.length is None:
                return f"the length of the units of {layer.title!r} is not stated"
            return f"which cells of {layer.title!r} are grouted is not drawn"
    return "the spacing of the members is not stated"
