"""One row per line: value, limit as printed, room left, verdict, and the sum to repeat by hand."""

from __future__ import annotations

from collections.abc import Iterable
from functools import lru_cache
from itertools import starmap
from typing import NamedTuple

from envcheck import units
from envcheck.model.judged import (
    Comparison,
    Difference,
    Group,
    Judged,
    Line,
    Part,
    PathResult,
    Turn,
)
from envcheck.model.metrics import METRICS
from envcheck.model.project import Element, Project
from envcheck.model.solved import Step
from envcheck.report import hand_check, numbers, said, wording
from envcheck.report.inert import clean
from envcheck.report.parts import Pair


class Figure(NamedTuple):
    """A number as printed."""

    text: str
    unit: str

    @property
    def number(self) -> float | None:
        """The printed number; None where nothing is printed."""
        return float(self.text) if self.text else None


NO_FIGURE = Figure("", "")


class PathRow(NamedTuple):
    """One of several paths of a line."""

    path: str
    state: str
    value: str
    limit: str
    why: str


class Row(NamedTuple):
    """One line of the check."""

    rule_set: str
    decides: bool
    tag: str
    sheet: str
    surface: str
    assembly: str
    built_as: str
    category: str
    metric: str
    symbol: str
    amount: Figure
    """Area, perimeter or count."""
    value: Figure
    """Unrounded, in the units of the report."""
    compared: Figure
    """After the code's rounding, in the printed unit."""
    low: Figure
    high: Figure
    """Bounds of the drawn model, in the units of the report."""
    limit: str
    """As printed, with its sense."""
    against: str
    """The number held against, with its sense."""
    limit_number: Figure
    limit_source: str
    room: Figure
    """Left to the limit, in the printed unit; negative = over."""
    room_share: str
    """The same in per cent of the limit."""
    group: str
    """Means and sums that it stands in; empty where there are none."""
    drawn: Figure
    """What it adds to their sum as drawn ..."""
    table: Figure
    """... and by the table."""
    verdict: str
    verdict_text: str
    open: bool
    elsewhere: str
    """Its verdict under other rule sets, or with one of their conventions, where that differs."""
    reasons: tuple[str, ...]
    notes: tuple[str, ...]
    paths: tuple[PathRow, ...]
    hand_check: str
    trail: tuple[Pair, ...]
    """Why this limit; empty unless details are asked for."""
    comparison: Comparison | None
    """The value's own comparison with all digits, in the printed unit."""


def build(
    lines: Iterable[Line],
    project: Project,
    system: str,
    trails: bool = True,
    judged: Judged | None = None,
) -> tuple[Row, ...]:
    """Make the rows in the order of ``lines``; ``trails`` asks why each limit was selected.

    judged: where lines stand in sums, or differ between rule sets.
    """
    written = _Written(trails, judged)
    return tuple(_row(line, project, system, written) for line in lines)


class _Written:
    """What several lines share and is written once: sums of an assembly, places of a limit.

    Assemblies of the same layers, and one assembly under rule sets of the same films, share a sum.
    """

    def __init__(self, trails: bool, judged: Judged | None) -> None:
        self.trails = trails
        self._elsewhere: dict[tuple[str, str, str], list[str]] = {}
        others: tuple[Difference | Turn, ...] = ()
        if judged is not None:
            others = (*judged.changes, *judged.turns)
        for each in others:
            known = self._elsewhere.setdefault((each.ruleset, each.element, each.metric), [])
            known.append(said.elsewhere(each))
        self._parts: dict[tuple[str, str, str], list[tuple[Group, Part]]] = {}
        for group in judged.groups if judged is not None else ():
            for part in group.parts:
                key = (group.ruleset, part.element, part.metric)
                self._parts.setdefault(key, []).append((group, part))
        self._sums: dict[tuple[float | None, str], list[tuple[tuple[Step, ...], str]]] = {}
        self._sources: dict[tuple[int, str], str] = {}

    def sum(self, line: Line, system: str, value: Figure) -> str:
        """The shortest sum whose result is the row's value; empty where there is none."""
        solved = line.solved
        if solved is None or not value.text or solved.setting.metric != line.metric:
            return ""
        key = (solved.value, value.text)
        for steps, text in self._sums.get(key, ()):
            if steps is solved.hand_check or steps == solved.hand_check:
                return text
        places = len(value.text.partition(".")[2])
        text = hand_check.shortest(solved.hand_check, system, places, value.text)
        self._sums.setdefault(key, []).append((solved.hand_check, text))
        return text

    def in_sums(self, line: Line, system: str) -> tuple[str, Figure, Figure]:
        """Groups of a line, and what it adds to their sums."""
        point = line.limit is not None and line.limit.applies_to == "any_point"
        known = METRICS.get(line.metric)
        metric = "U_assembly" if known is not None and known.reciprocal else line.metric
        found = self._parts.get((line.ruleset, line.element, metric), ()) if not point else ()
        if not found or not (flow := numbers.flow_unit(metric, system)):
            return "", NO_FIGURE, NO_FIGURE
        names = "; ".join(said.group(group.kind, group.name) for group, _ in found)
        drawn, table = (
            numbers.heat_flow(x, system) for x in (found[0][1].drawn, found[0][1].table)
        )
        return names, Figure(drawn, flow), Figure(table, flow)

    def elsewhere(self, line: Line) -> str:
        """What other rule sets, or one of their conventions, make of a line."""
        return "; ".join(self._elsewhere.get((line.ruleset, line.element, line.metric), ()))

    def source(self, line: Line) -> str:
        """Where the limit stands in print."""
        key = (id(line.limit), line.ruleset)
        if key not in self._sources:
            self._sources[key] = said.limit_source(line.limit, line.ruleset)
        return self._sources[key]


def _row(line: Line, project: Project, system: str, written: _Written) -> Row:
    element = project.elements.get(line.element)
    assembly = project.assemblies.get(element.assembly) if element else None
    own = line.own or line.comparison
    value = value_of(line, system)
    low, high = _bounds(line, system)
    group, drawn, table = written.in_sums(line, system)
    return Row(
        rule_set=line.ruleset,
        decides=line.decides,
        tag=clean(line.element),
        sheet=clean(_sheet(line, project)),
        surface=clean(element.surface) if element else "",
        assembly=clean(assembly.id) if assembly else "",
        built_as=clean(assembly.title) if assembly else "",
        category=line.category,
        metric=line.metric,
        symbol=numbers.symbol(line.metric),
        amount=amount(element, system),
        value=value,
        compared=_compared(own),
        low=low,
        high=high,
        limit=said.limit_text(line),
        against=said.against(line),
        limit_number=_limit_number(own),
        limit_source=written.source(line),
        room=_room(own, line.metric),
        room_share=_room_share(own),
        group=group,
        drawn=drawn,
        table=table,
        verdict=line.verdict,
        verdict_text=said.verdict_text(line),
        open=line.open,
        elsewhere=written.elsewhere(line),
        reasons=tuple(map(clean, line.reasons)),
        notes=(*said.notes(line), *before(element, line, system)),
        paths=tuple(path_row(path, line.metric) for path in line.paths),
        hand_check=written.sum(line, system, value),
        trail=tuple(starmap(_choice, line.trail)) if written.trails else (),
        comparison=own,
    )


def _sheet(line: Line, project: Project) -> str:
    element = project.elements.get(line.element)
    if element:
        return element.sheet
    surface = project.surfaces.get(line.element)
    return surface.sheet if surface else ""


def amount(element: Element | None, system: str) -> Figure:
    """Area, perimeter or count of an element."""
    if element is None:
        return NO_FIGURE
    area = element.net_area if element.net_area is not None else element.gross_area
    if area is not None:
        return Figure(numbers.area(area, system), units.label("area", system))
    if element.perimeter is not None:
        shown = numbers.in_system(element.perimeter, "run", system)
        return Figure(numbers.trimmed(shown, 2), units.label("run", system))
    if element.count is not None:
        return Figure(numbers.trimmed(element.count, 2), "count")
    return NO_FIGURE


def before(element: Element | None, line: Line, system: str) -> tuple[str, ...]:
    """The value before an alteration, beside that of a line on heat flow."""
    stated = element.existing if element is not None else None
    if stated is None or not numbers.flow_unit(line.metric, system):
        return ()
    letter = "" if stated.quantity == "resistance" else f"{numbers.symbol(line.metric)} "
    sheet = f" ({stated.sheet})" if stated.sheet else ""
    return (clean(f"before the work: {letter}{stated.text}{sheet}"),)


def value_of(line: Line, system: str) -> Figure:
    """The element's own value, unrounded, in the units of the report."""
    own = line.own or line.comparison
    places = numbers.decimals(line.metric, system, own.decimals if own else 0)
    unit = numbers.unit(line.metric, system)
    if own is not None:
        if numbers.system_of(own.unit) in ("", system):
            return Figure(numbers.fixed(own.value, places), unit)
        si = units.to_si(own.value, own.unit)
        shown = numbers.in_system(si, numbers.quantity(line.metric), system)
        return Figure(numbers.fixed(shown, numbers.decimals(line.metric, system)), unit)
    solved = line.solved
    if solved is None or solved.value is None or solved.setting.metric != line.metric:
        return NO_FIGURE
    shown = numbers.in_system(solved.value, numbers.quantity(line.metric), system)
    return Figure(numbers.fixed(shown, places), unit)


def _bounds(line: Line, system: str) -> tuple[Figure, Figure]:
    """Low and high end of the drawn model."""
    solved = line.solved
    if solved is None or solved.low is None or solved.high is None:
        return NO_FIGURE, NO_FIGURE
    if solved.setting.metric != line.metric:
        return NO_FIGURE, NO_FIGURE
    unit = numbers.unit(line.metric, system)
    places = numbers.decimals(line.metric, system)
    factor = numbers.factor(numbers.quantity(line.metric), system)
    low, high = numbers.interval(solved.low / factor, solved.high / factor, places)
    return Figure(low, unit), Figure(high, unit)


def _compared(comparison: Comparison | None) -> Figure:
    if comparison is None:
        return NO_FIGURE
    return Figure(said.compared(comparison), clean(comparison.unit))


def _limit_number(comparison: Comparison | None) -> Figure:
    if comparison is None:
        return NO_FIGURE
    return Figure(said.limit_number(comparison), clean(comparison.unit))


def _room(comparison: Comparison | None, metric: str) -> Figure:
    if comparison is None:
        return NO_FIGURE
    system = numbers.system_of(comparison.unit) or "SI"
    places = numbers.decimals(metric, system, comparison.decimals)
    return Figure(numbers.signed(comparison.margin, places), clean(comparison.unit))


def _room_share(comparison: Comparison | None) -> str:
    if comparison is None or not comparison.limit:
        return ""
    return f"{numbers.signed(100.0 * comparison.margin / comparison.limit, 1)} %"


@lru_cache(maxsize=4096)
def path_row(result: PathResult, metric: str) -> PathRow:
    """One path by which a line may be met, in words."""
    path = wording.path(result.path, numbers.symbol(metric))
    state = wording.STATES.get(result.state, wording.plain(result.state))
    return PathRow(path, state, clean(result.value), clean(result.limit), clean(result.why))


def _choice(step: str, chosen: str, why: str) -> Pair:
    label, text = said.choice(step, chosen, why)
    return Pair(clean(label), clean(text))
