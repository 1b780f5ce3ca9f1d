"""From the drawn blocks of a wall whose members cross, or that clips interrupt, to a box."""

from __future__ import annotations

from collections.abc import Sequence
from itertools import accumulate, pairwise
from typing import NamedTuple

from envcheck.model.layers import DrawnPoint, SectionLayer, TaperedLayer
from envcheck.model.solved import Block
from envcheck.solve.box import Box
from envcheck.solve.field.drawing import NotDrawn, piece_rows
from envcheck.solve.registry import Wall
from envcheck.solve.wiring import align

WAYS = ("vertical", "horizontal")
"""Upright members cut the box along the wall, level ones up it."""


class _Cell(NamedTuple):
    """A block of metal, or what, within the box; m from its sides and its outer face."""

    along: tuple[float, float]
    up: tuple[float, float]
    through: tuple[float, float]
    conductivity: float


def crosses(wall: Wall) -> bool:
    """Whether members of the wall run in two directions."""
    return len({block.pattern for block in wall.blocks if block.pattern}) > 1


def box_of(wall: Wall, points: Sequence[DrawnPoint] = ()) -> Box:
    """Draw a wall as a box that repeats along the wall and up it.

    points: clips and brackets, all on one repeat area, which stand at the axes of the members.
    Errors: NotDrawn where a spacing is not stated, a layer is tapered, members that run the same
    way have no common repeat, or that of the points is no multiple of it.
    """
    if any(isinstance(layer, TaperedLayer) for layer in wall.layers):
        raise NotDrawn("a tapered layer is no box")
    blocks = align(wall.blocks)
    patterned = {block.pattern: block for block in blocks if block.pattern}
    if not patterned and not points:
        raise NotDrawn("the layers are homogeneous")
    if not all(block.repeat for block in patterned.values()):
        raise NotDrawn("the spacing of the members is not stated")
    members: dict[str, tuple[float, ...]] = {}
    for pattern, block in patterned.items():
        way = pattern.partition("@")[0]
        if way not in WAYS or way in members:
            raise NotDrawn("members run the same way at spacings that share no repeat")
        members[way] = tuple(block.widths)
    first = points[0] if points else None
    if len({(point.along, point.up) for point in points}) > 1:
        raise NotDrawn("the drawn points repeat on different areas")
    widths = _tiled(members.get("vertical"), first.along if first else None)
    heights = _tiled(members.get("horizontal"), first.up if first else None)
    depths: list[float] = []
    planes = []
    starts: dict[int, float] = {}
    for block, depth, cells in piece_rows(blocks):
        starts.setdefault(id(block), sum(depths))
        depths.append(depth)
        way = block.pattern.partition("@")[0]
        here = [depth / cell.value for cell in cells]
        planes.append(
            tuple(
                tuple(_at(here, way, course, column) for column in range(len(widths)))
                for course in range(len(heights))
            )
        )
    box = Box(
        tuple(widths),
        tuple(heights),
        tuple(depths),
        tuple(planes),
        wall.outside.value,
        wall.inside.value,
        *_repeats(wall),
    )
    axes = [
        sum(members.get(way, sizes)) / 2
        for way, sizes in zip(WAYS, (box.widths, box.heights), strict=True)
    ]
    found = [
        image
        for point in points
        for cell in _cells(wall, blocks, starts, point, axes)
        for image in _images(cell, sum(widths), sum(heights))
    ]
    return _with_cells(box, found) if found else box


def _repeats(wall: Wall) -> tuple[bool, bool]:
    """Whether the box repeats along the wall and up it; not where a drawing is symmetric."""
    halves = {
        layer.orientation
        for layer in wall.layers
        if isinstance(layer, SectionLayer) and layer.symmetric
    }
    return WAYS[0] not in halves, WAYS[1] not in halves


def _tiled(own: tuple[float, ...] | None, repeat: float | None) -> list[float]:
    """Widths of the members' bay, as often as the repeat of the points asks for."""
    if own is None:
        return [repeat if repeat is not None else 1.0]
    bay = sum(own)
    times = 1 if repeat is None else max(1, round(repeat / bay))
    if repeat is not None and abs(times * bay - repeat) > 1e-6:
        raise NotDrawn(
            f"the points repeat at {repeat * 1000:.4g} mm, which is no multiple of the spacing of "
            f"the members, {bay * 1000:.4g} mm"
        )
    return list(own) * times


def _at(row: Sequence[float], way: str, course: int, column: int) -> float:
    place = {"vertical": column, "horizontal": course}.get(way, 0)
    return row[place % len(row)]


def _cells(
    wall: Wall,
    blocks: Sequence[Block],
    starts: dict[int, float],
    point: DrawnPoint,
    axes: Sequence[float],
) -> list[_Cell]:
    """The boxes of a point where they lie in the wall."""
    titles = [layer.title for layer in wall.layers]
    if point.layer not in titles:
        raise NotDrawn(f"the points lie in {point.layer!r}, outside a well-ventilated cavity")
    face = starts[id(blocks[titles.index(point.layer)])]
    return [
        _Cell(
            (axes[0] + box.along[0], axes[0] + box.along[1]),
            (axes[1] + box.up[0], axes[1] + box.up[1]),
            (face + box.through[0], face + box.through[1]),
            box.material.conductivity,
        )
        for box in point.boxes
    ]


def _images(cell: _Cell, width: float, height: float) -> list[_Cell]:
    """A cell and its neighbours' parts that reach into the repeat area."""
    found = []
    for along in (-width, 0.0, width):
        for up in (-height, 0.0, height):
            moved = cell._replace(
                along=(cell.along[0] + along, cell.along[1] + along),
                up=(cell.up[0] + up, cell.up[1] + up),
            )
            if _reaches(moved.along, width) and _reaches(moved.up, height):
                found.append(moved)
    return found


def _reaches(span: tuple[float, float], size: float) -> bool:
    return span[0] < size - 1e-9 and span[1] > 1e-9


def _with_cells(box: Box, cells: Sequence[_Cell]) -> Box:
    """Cut a box at the faces of the cells and lay them over it, later ones on top."""
    along = _cut(box.widths, [end for cell in cells for end in cell.along])
    up = _cut(box.heights, [end for cell in cells for end in cell.up])
    through = _cut(box.depths, [end for cell in cells for end in cell.through])

    def conductivity(row: _Slice, course: _Slice, column: _Slice) -> float:
        for cell in reversed(cells):
            if row.within(cell.through) and course.within(cell.up) and column.within(cell.along):
                return cell.conductivity
        return box.conductivities[row.of][course.of][column.of]

    return box._replace(
        widths=tuple(column.size for column in along),
        heights=tuple(course.size for course in up),
        depths=tuple(row.size for row in through),
        conductivities=tuple(
            tuple(tuple(conductivity(row, course, column) for column in along) for course in up)
            for row in through
        ),
    )


class _Slice(NamedTuple):
    """A part of a size after cutting."""

    start: float
    end: float
    of: int
    """Which size it is a part of."""

    @property
    def size(self) -> float:
        return self.end - self.start

    def within(self, span: tuple[float, float]) -> bool:
        return span[0] < (self.start + self.end) / 2 < span[1]


def _cut(sizes: Sequence[float], edges: Sequence[float]) -> list[_Slice]:
    """Cut sizes at edges; edges closer than a nanometre to another are that one."""
    ends = [0.0, *accumulate(sizes)]
    found = []
    for number, (start, end) in enumerate(pairwise(ends)):
        inside = sorted({round(edge, 9) for edge in edges if start + 1e-9 < edge < end - 1e-9})
        found += [_Slice(a, b, number) for a, b in pairwise([start, *inside, end])]
    return found
