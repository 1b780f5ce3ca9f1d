"""The building as a whole: area ratios, means and sums, and whether areas close."""

from __future__ import annotations

from typing import NamedTuple

from envcheck import units
from envcheck.model.judged import Closing, Judged, Ratio
from envcheck.model.project import Project
from envcheck.report import groups, numbers, wording
from envcheck.report.groups import GroupView
from envcheck.report.inert import clean


class RatioView(NamedTuple):
    """An area ratio with its parts."""

    name: str
    sum: str
    """``2704 / 10720 ft2 = 25.22 %``; empty where a part is missing."""
    cap: str
    state: str
    missing: tuple[str, ...]


class ClosingView(NamedTuple):
    """Gross = net + openings of one surface."""

    surface: str
    sheet: str
    sum: str
    state: str


class Building(NamedTuple):
    """Everything about the building as a whole."""

    ratios: tuple[RatioView, ...]
    groups: tuple[GroupView, ...]
    closings: tuple[ClosingView, ...]


MOST_PARTS = 40


def build(judged: Judged, project: Project, system: str) -> Building:
    """Write the sums of the building."""
    return Building(
        tuple(_ratio(ratio, system) for ratio in judged.ratios),
        groups.build(judged.groups, project, system),
        tuple(_closing(closing, system) for closing in judged.closings),
    )


def _ratio(ratio: Ratio, system: str) -> RatioView:
    cap = f"at most {numbers.percent(ratio.most)}" if ratio.most is not None else "no cap"
    if ratio.missing:
        state = "not decided"
    elif ratio.most is None:
        state = "for information"
    else:
        state = "cap passed" if ratio.passed else "within the cap"
    return RatioView(
        name=clean(wording.RATIOS.get(ratio.name, wording.plain(ratio.name))),
        sum="" if ratio.missing else _division(ratio, system),
        cap=clean(f"{cap}, {ratio.clause}" if ratio.clause else cap),
        state=state,
        missing=tuple(map(clean, ratio.missing)),
    )


def _division(ratio: Ratio, system: str) -> str:
    """Write the division with as many digits as its result takes."""
    parts = ratio.numerator, ratio.denominator
    result = numbers.percent(ratio.value, 2)
    top, bottom = (numbers.area(area, system) for area in parts)
    if not float(bottom) or numbers.percent(float(top) / float(bottom), 2) != result:
        shown = (numbers.in_system(area, "area", system) for area in parts)
        top, bottom = (numbers.significant(area, 9) for area in shown)
    return f"{top} / {bottom} {units.label('area', system)} = {result}"


def _closing(closing: Closing, system: str) -> ClosingView:
    unit = units.label("area", system)
    parts = [f"{numbers.area(area, system)} {clean(name)}" for name, area in closing.parts]
    if len(parts) > MOST_PARTS:
        parts = [*parts[:MOST_PARTS], f"... ({len(closing.parts)} parts in all)"]
    total = numbers.area(sum(area for _, area in closing.parts), system)
    share = closing.missing / closing.gross if closing.gross else 0.0
    if closing.closes:
        state = "closes"
    else:
        word = "not accounted for" if closing.missing > 0 else "too much"
        area = numbers.area(abs(closing.missing), system)
        state = f"{area} {unit} ({numbers.percent(abs(share))}) {word}"
    return ClosingView(
        surface=clean(closing.surface),
        sheet=clean(closing.sheet),
        sum=f"{' + '.join(parts) or '0'} = {total} of gross "
        f"{numbers.area(closing.gross, system)} {unit}",
        state=state,
    )
