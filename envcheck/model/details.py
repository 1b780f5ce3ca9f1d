"""Drawn details: where assemblies meet, between outdoor and indoor air, and what solving one gives.

x runs to the right and y upwards, both in m from the lower left corner of the drawing.
"""

import itertools
from collections.abc import Mapping, Sequence
from types import MappingProxyType
from typing import TYPE_CHECKING, NamedTuple

from envcheck.model.layers import Material
from envcheck.model.solved import Setting

if TYPE_CHECKING:
    from envcheck.model.sure import Workmanship

EDGES = ("left", "right", "bottom", "top")
"""Edges of a drawing, where the assemblies that meet are cut off."""


class Rectangle(NamedTuple):
    """A solid piece, or air."""

    title: str
    line: int
    left: float
    right: float
    bottom: float
    top: float
    material: Material | None
    """None where it is air."""
    indoors: bool = False
    film: float = 0.0
    """Of air: surface resistance of every face to it, m2 K/W."""


class Flank(NamedTuple):
    """One of the assemblies that meet."""

    assembly: str
    cut: str
    """Edge of the drawing that cuts it off, one of ``EDGES``."""
    length: float
    """m, on the measuring basis of the detail"""
    line: int


class Detail(NamedTuple):
    """A two-dimensional drawing of a junction; adiabatic at its edges."""

    id: str
    title: str
    sheet: str
    line: int
    measured: str
    """``outside`` or ``inside``: the dimensions that lengths and areas are taken by."""
    rectangles: tuple[Rectangle, ...]
    columns: tuple[float, ...]
    """Lines of the drawing, m from its left edge."""
    rows: tuple[float, ...]
    """m from its bottom edge"""
    seen: tuple[tuple[int, ...], ...]
    """``[row][column]``: which rectangle is seen there; the bottom row first."""
    flanks: tuple[Flank, ...]


class Crossing(NamedTuple):
    """The envelope where an edge of the drawing cuts it: air, solids, air."""

    first: int
    """Place of its first solid along the edge."""
    solids: tuple[tuple[int, float], ...]
    """Rectangles along the edge from one air to the other, and their thickness, m."""
    outdoors: int
    """Rectangle of the air on its outer side."""
    indoors: int
    indoors_first: bool
    """The edge runs from indoors to outdoors."""

    @property
    def last(self) -> int:
        """Place of its last solid along the edge."""
        return self.first + len(self.solids) - 1


def crossings(detail: Detail, edge: str) -> list[Crossing]:
    """Every place where an edge of the drawing cuts the envelope."""
    along, sizes = _edge(detail, edge)
    found, start = [], None
    for place, number in enumerate(along):
        if detail.rectangles[number].material is not None:
            continue
        if start is not None and start < place - 1:
            one, other = along[start], number
            warm = detail.rectangles[one].indoors
            if warm != detail.rectangles[other].indoors:
                solids = tuple((along[p], sizes[p]) for p in range(start + 1, place))
                airs = (other, one) if warm else (one, other)
                found.append(Crossing(start + 1, solids, *airs, warm))
        start = place
    return found


def _edge(detail: Detail, edge: str) -> tuple[list[int], list[float]]:
    """Rectangles along an edge and the size of each cell."""
    if edge in ("left", "right"):
        column = 0 if edge == "left" else -1
        return [row[column] for row in detail.seen], _sizes(detail.rows)
    return list(detail.seen[0 if edge == "bottom" else -1]), _sizes(detail.columns)


def _sizes(lines: Sequence[float]) -> list[float]:
    return [end - start for start, end in itertools.pairwise(lines)]


def face_lengths(detail: Detail, edge: str, crossing: Crossing) -> tuple[float, float]:
    """How far the outer and the inner face of the envelope run on from its cut, m."""
    beside = [list(row) for row in detail.seen]
    lines = detail.columns
    if edge in ("bottom", "top"):
        beside = [list(row) for row in zip(*beside, strict=True)]
        lines = detail.rows
    sizes = _sizes(lines)
    if edge in ("right", "top"):
        beside, sizes = [row[::-1] for row in beside], sizes[::-1]
    before = _run(detail, beside, crossing.first, crossing.first - 1, sizes)
    behind = _run(detail, beside, crossing.last, crossing.last + 1, sizes)
    return (behind, before) if crossing.indoors_first else (before, behind)


def _run(
    detail: Detail, beside: list[list[int]], solid: int, air: int, sizes: Sequence[float]
) -> float:
    length = 0.0
    for place, size in enumerate(sizes):
        if detail.rectangles[beside[solid][place]].material is None:
            break
        if detail.rectangles[beside[air][place]].material is not None:
            break
        length += size
    return length


# -------------------------------------------------------------------------------------- solved


class SolvedFlank(NamedTuple):
    """What one of the assemblies takes off the flow through the detail."""

    assembly: str
    cut: str
    length: float
    u_factor: float
    """Of the layers that the cut shows, between the films of the drawing, W/(m2 K)."""
    resistance: float
    """Of those layers without films, m2 K/W."""
    face_outside: float
    """How far the outer face runs on from the cut, m."""
    face_inside: float
    even: float
    """Heat flow at the cut, as a share of that of the layers alone; not bounded."""


class Coldest(NamedTuple):
    """The coldest place of the inside surfaces; not bounded."""

    factor: float
    """f_Rsi = (Tsi - Te) / (Ti - Te)"""
    x: float | None
    """m from the left edge; None where all of the surface is alike"""
    y: float | None
    """m from the bottom edge of a detail, from the outer face of a section"""
    film: float
    """Inside surface resistance that it was computed with, m2 K/W."""


class SolvedDetail(NamedTuple):
    """A detail solved in two dimensions."""

    detail: str
    low: float
    """L2D, heat flow per metre of the detail and kelvin, W/(m K): never too high"""
    high: float
    psi_low: float
    """W/(m K)"""
    psi_high: float
    flanks: tuple[SolvedFlank, ...]
    coldest: Coldest | None
    note: str
    """How the bounds were found."""


class Extras(NamedTuple):
    """What a page about one subject shows beside its lines; a text is the reason for no value."""

    details: Mapping[str, SolvedDetail | str]
    """By detail id."""
    surfaces: Mapping[tuple[str, Setting], Coldest | str]
    """By assembly id and setting."""
    workmanship: "Mapping[tuple[str, Setting], tuple[Workmanship, ...]]" = MappingProxyType({})
    """By assembly id and setting."""
