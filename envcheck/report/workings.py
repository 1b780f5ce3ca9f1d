"""How one assembly gets from its layers to its value: ladder, paths, worksheet, temperatures."""

from __future__ import annotations

from collections.abc import Iterable
from typing import NamedTuple

from envcheck import units
from envcheck.model.judged import Line
from envcheck.model.project import Site
from envcheck.model.solved import Solved, Step
from envcheck.report import ladder, tree
from envcheck.report import worksheet as sheet
from envcheck.report.ladder import Ladder
from envcheck.report.parts import Block, Entry, Grid, Items, Paragraph, Picture

HOW = (
    "Each result follows from the numbers printed in its line; a number that an earlier step gave "
    "stands as that step printed it."
)


class Workings(NamedTuple):
    """What leads to the value of one assembly."""

    ladder: Ladder | None
    paths: Grid | None
    worksheet: tuple[sheet.Line, ...]
    steps: tuple[Step, ...]
    """The same with all digits, SI."""


def build(site: Site, solved: Solved, lines: Iterable[Line], system: str) -> Workings:
    """Workings of a solved assembly; the ladder carries the limits of its ``lines``."""
    return Workings(
        ladder=ladder.build(solved, air(site), _limits(solved, lines), system),
        paths=tree.paths(solved.tree, system),
        worksheet=sheet.write(solved.steps, system),
        steps=solved.steps,
    )


def air(site: Site) -> tuple[float, float] | None:
    """Outdoor and indoor air, degrees C, where both are stated."""
    if site.outdoor_temperature is None or site.indoor_temperature is None:
        return None
    return site.outdoor_temperature, site.indoor_temperature


def _limits(solved: Solved, lines: Iterable[Line]) -> tuple[float, ...]:
    """Limits that the value is held against, SI, each once."""
    found: dict[float, None] = {}
    for line in lines:
        own = line.own or line.comparison
        if own is not None and line.metric == solved.setting.metric and own.sense == "max":
            found[units.to_si(own.limit, own.unit)] = None
    return tuple(found)


def blocks(each: Workings) -> tuple[Block, ...]:
    """Ladder with its key, then the worksheet."""
    made: list[Block] = []
    if each.ladder is not None:
        made += [Picture(each.ladder), key(each.ladder), Paragraph(f"{each.ladder.note}.")]
    if each.paths is not None:
        made.append(each.paths)
    if each.worksheet:
        made += [Paragraph(HOW), steps(each.worksheet)]
    return tuple(made)


def key(each: Ladder) -> Grid:
    """The numbered pieces of every strip with R and the figure behind each."""
    rows = tuple(
        (strip.title, str(number), rung.title, rung.resistance, rung.behind)
        for strip in each.strips
        for number, rung in enumerate(strip.rungs, 1)
    )
    return Grid(("path", "no.", "piece", f"R, {each.unit}", "behind it"), rows, (1, 3, 4), (2, 0))


def steps(lines: Iterable[sheet.Line]) -> Items:
    """Numbered steps, each with its formula, its operands and its sum."""
    entries = []
    for line in lines:
        source = f" [{line.source}]" if line.source else ""
        formula = f"{line.symbol} = {line.formula}" if line.formula else ""
        given = "; ".join(line.operands)
        text = "; with ".join(filter(None, (formula, given)))
        entries.append(Entry(line.title + source, (text,) if text else (), (line.text,)))
    return Items(tuple(entries), numbered=True)
