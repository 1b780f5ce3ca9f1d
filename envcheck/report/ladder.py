"""The resistance ladder of an assembly: a strip per path, as long as its R, with the limit on the
same ruler. What it says stands here; ``drawing.py`` draws it."""

from __future__ import annotations

from typing import NamedTuple

from envcheck import units
from envcheck.model.solved import Node, Parallel, Resistor, Series, Solved
from envcheck.report import numbers
from envcheck.report.inert import clean


class Rung(NamedTuple):
    """One piece along a path."""

    title: str
    length: float
    """R in the units of the page."""
    resistance: str
    behind: str
    """Temperature behind the piece, or the share of the drop that lies before it."""


class Strip(NamedTuple):
    """One path from outside to inside; ``share`` is empty for the whole."""

    title: str
    share: str
    length: float
    resistance: str
    rungs: tuple[Rung, ...]


class Tick(NamedTuple):
    """A limit on the ruler."""

    length: float
    text: str


class Ladder(NamedTuple):
    """Strips on one ruler."""

    strips: tuple[Strip, ...]
    ticks: tuple[Tick, ...]
    unit: str
    outdoor: str
    """Outdoor air: a temperature, or ``0 %``."""
    note: str


MOST_STRIPS = 8
SHARES = "figures at the rungs: share of the temperature difference that lies outside of them"
STEADY = "figures at the rungs: temperatures in steady state"


def build(
    solved: Solved, air: tuple[float, float] | None, limits: tuple[float, ...], system: str
) -> Ladder | None:
    """Lay a solved assembly out as strips; None where it has no resistances.

    air: outdoor and indoor air, degrees C, where the project states them. limits: U or C limits
    that it is held against, SI.
    """
    tree = solved.tree
    if tree is None or solved.setting.metric not in ("U_assembly", "C_factor") or not tree.value:
        return None
    paths = strips(tree, air, system)
    if len(paths) > MOST_STRIPS:
        return None
    return Ladder(
        strips=(*paths, *_whole(solved, tree, system, len(paths))),
        ticks=tuple(_tick(limit, solved.setting.metric, system) for limit in limits if limit > 0.0),
        unit=units.label("resistance", system),
        outdoor="0 %" if air is None else numbers.temperature(air[0], system),
        note=SHARES if air is None else STEADY,
    )


def strips(tree: Node, air: tuple[float, float] | None, system: str) -> tuple[Strip, ...]:
    """Every path through a network, outside first, with the figure behind each piece.

    The drop over a piece is its share of the path's resistance.
    """
    branches: tuple[tuple[str, Node], ...] = (("", tree),)
    if isinstance(tree, Parallel):
        pairs = zip(tree.shares, tree.branches, strict=True)
        branches = tuple((numbers.percent(share, 2), branch) for share, branch in pairs)
    return tuple(_strip(share, branch, air, system) for share, branch in branches if branch.value)


def _strip(share: str, path: Node, air: tuple[float, float] | None, system: str) -> Strip:
    rungs = []
    passed = 0.0
    for part in path.parts if isinstance(path, Series) else (path,):
        passed += part.value
        rungs.append(
            Rung(
                title=clean(part.title or (part.symbol if isinstance(part, Resistor) else "part")),
                length=_in_units(part.value, system),
                resistance=numbers.resistance(part.value, system),
                behind=_behind(passed / path.value, air, system),
            )
        )
    title = clean(path.title) or "through all layers"
    length = _in_units(path.value, system)
    return Strip(title, share, length, numbers.resistance(path.value, system), tuple(rungs))


def _behind(share: float, air: tuple[float, float] | None, system: str) -> str:
    if air is None:
        return f"{numbers.fixed(100.0 * share, 0)} %"
    return numbers.temperature(air[0] + (air[1] - air[0]) * share, system)


def _whole(solved: Solved, tree: Node, system: str, paths: int) -> list[Strip]:
    """The assembly as a whole, where it is not the one path itself."""
    if not solved.value:
        return []
    whole = 1.0 / solved.value
    if paths == 1 and abs(whole - tree.value) <= 1e-6 * whole:
        return []
    letter = numbers.symbol(solved.setting.metric)
    title = f"the whole, 1 / {letter}"
    return [Strip(title, "", _in_units(whole, system), numbers.resistance(whole, system), ())]


def _tick(limit: float, metric: str, system: str) -> Tick:
    shown = numbers.in_system(limit, numbers.quantity(metric), system)
    text = f"limit {numbers.symbol(metric)} {numbers.significant(shown, 6)}"
    resistance = 1.0 / limit
    return Tick(
        _in_units(resistance, system), f"{text}: R {numbers.resistance(resistance, system)}"
    )


def _in_units(resistance: float, system: str) -> float:
    return numbers.in_system(resistance, "resistance", system)
