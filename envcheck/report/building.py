"""The building as a whole: area ratios, means, and whether areas close."""

from __future__ import annotations

from typing import NamedTuple

from envcheck import units
from envcheck.model.judged import Closing, Judged, Mean, Ratio
from envcheck.report import numbers, wording
from envcheck.report.inert import clean


class RatioView(NamedTuple):
    """An area ratio with its parts."""

    name: str
    sum: str
    """``2704 / 10720 ft2 = 25.22 %``; empty where a part is missing."""
    cap: str
    state: str
    missing: tuple[str, ...]


class MeanView(NamedTuple):
    """An area-weighted mean."""

    rule_set: str
    group: str
    clause: str
    sum: str
    worst: str
    cap: str


class ClosingView(NamedTuple):
    """Gross = net + openings of one surface."""

    surface: str
    sheet: str
    sum: str
    state: str


class Building(NamedTuple):
    """Everything about the building as a whole."""

    ratios: tuple[RatioView, ...]
    means: tuple[MeanView, ...]
    closings: tuple[ClosingView, ...]


MOST_PARTS = 40


def build(judged: Judged, system: str) -> Building:
    """Write the sums of the building."""
    return Building(
        tuple(_ratio(ratio, system) for ratio in judged.ratios),
        tuple(_mean(mean, system) for mean in judged.means),
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


def _mean(mean: Mean, system: str) -> MeanView:
    places = numbers.DECIMALS["u_factor", system]
    value = numbers.fixed(numbers.in_system(mean.value, "u_factor", system), places)
    worst_text = clean(mean.worst)
    worst = next((u for tag, _, u in mean.members if tag == mean.worst), None)
    if worst is not None:
        shown = numbers.in_system(worst, "u_factor", system)
        worst_text += f" with U {numbers.fixed(shown, places)}"
    return MeanView(
        rule_set=clean(mean.ruleset),
        group=clean(mean.group),
        clause=clean(mean.clause),
        sum=f"{_weighted(mean, system, value, places)} = {value} {units.label('u_factor', system)}",
        worst=worst_text,
        cap=clean(mean.cap),
    )


def _weighted(mean: Mean, system: str, value: str, places: int) -> str:
    """Write sum(A U) / sum(A) with as few digits as give the printed mean."""
    text = ""
    for digits in (4, 6, 9):
        pairs = [
            (
                tag,
                numbers.significant(numbers.in_system(area, "area", system), max(digits, 6)),
                numbers.significant(numbers.in_system(u, "u_factor", system), digits),
            )
            for tag, area, u in mean.members
        ]
        total = sum(float(area) for _, area, _ in pairs)
        terms = " + ".join(f"{area} * {u} [{clean(tag)}]" for tag, area, u in pairs)
        text = f"({terms}) / {numbers.significant(total, 9)}"
        weighted = sum(float(area) * float(u) for _, area, u in pairs)
        if total and numbers.fixed(weighted / total, places) == value:
            break
    return text


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
