"""Paths through a solved network, their share of the heat, and temperatures between parts."""

from __future__ import annotations

from collections.abc import Iterable, Sequence

from envcheck import units
from envcheck.model.solved import Face, Node, Parallel, Series
from envcheck.report import numbers
from envcheck.report.inert import clean
from envcheck.report.ladder import Strip, strips
from envcheck.report.parts import Grid


def paths(tree: Node | None, system: str) -> Grid | None:
    """Every set of branches with its shares of area and heat; None where there is one path."""
    found = [
        (
            clean(node.title),
            clean(branch.title),
            numbers.percent(share, 2),
            numbers.resistance(branch.value, system),
            numbers.percent(share / branch.value * node.value) if branch.value else "",
        )
        for node in _parallels(tree)
        for share, branch in zip(node.shares, node.branches, strict=True)
    ]
    if not found:
        return None
    unit = units.label("resistance", system)
    heads = ("side by side in", "path", "area", f"R, {unit}", "heat")
    return Grid(heads, tuple(found), (2, 3, 4), (1, 0))


def _parallels(tree: Node | None) -> Iterable[Parallel]:
    if isinstance(tree, Parallel):
        yield tree
        for branch in tree.branches:
            yield from _parallels(branch)
    elif isinstance(tree, Series):
        for part in tree.parts:
            yield from _parallels(part)


def temperatures(tree: Node, outside: float, inside: float, system: str) -> list[Grid]:
    """One table per path of the temperatures behind each part, outside first.

    outside, inside: air temperatures in degrees C.
    """
    outdoor = numbers.temperature(outside, system)
    return [_behind(strip, outdoor, system) for strip in strips(tree, (outside, inside), system)]


def _behind(strip: Strip, outdoor: str, system: str) -> Grid:
    rows = (
        ("outdoor air", "", outdoor),
        *((f"behind {rung.title}", rung.resistance, rung.behind) for rung in strip.rungs),
    )
    unit = units.label("resistance", system)
    return Grid((strip.title, f"R, {unit}", "temperature"), rows, (1, 2), (0,))


def face_temperatures(faces: Sequence[Face], outside: float, inside: float, system: str) -> Grid:
    """Coldest and warmest point behind each layer of a drawn section, outside first."""

    def shown(part: float) -> str:
        return numbers.temperature(outside + (inside - outside) * part, system)

    rows = tuple((f"behind {clean(f.title)}", shown(f.least), shown(f.greatest)) for f in faces)
    return Grid(("drawn section", "coldest", "warmest"), rows, (1, 2), (0,))
