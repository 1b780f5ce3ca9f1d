"""What would bring lines within their limit: each change solved, then judged as a check would.

A change is found on the prescribed method: false position on R = 1/U, which is straight or nearly
so in a thickness. Structural choices are stated as far as they would do, never proposed.
"""

from __future__ import annotations

from collections.abc import Iterable, Sequence

from envcheck.advise.bench import Bench
from envcheck.advise.breaks import Before, breaks
from envcheck.advise.levers import Lever, levers, turned
from envcheck.advise.targets import (
    NoValue,
    Target,
    has_target,
    labels_in_tables,
    met,
    short_of,
    targets_of,
)
from envcheck.model.advised import Advice, Change, Refused, Structural
from envcheck.model.judged import Line
from envcheck.model.project import Assembly, Project

SAME = 0.01
"""Share within which two labels are the same."""


def advise(
    bench: Bench, lines: Sequence[Line], least_conductivity: float = 0.0
) -> tuple[Advice, ...]:
    """Advise on every assembly that has a deciding line over its limit or too close to it.

    least_conductivity: under which no insulation lies, W/(m K).
    """
    before = Before({(x.ruleset, x.element, x.metric): x for x in lines}, least_conductivity)
    wanted: dict[str, list[Line]] = {}
    for line in lines:
        element = bench.project.elements.get(line.element)
        if element is not None and line.decides and line.verdict in ("fail", "too_close"):
            wanted.setdefault(element.assembly, []).append(line)
    return tuple(
        _of_assembly(bench, bench.project.assemblies[name], own, before)
        for name, own in wanted.items()
    )


def _of_assembly(bench: Bench, assembly: Assembly, own: Sequence[Line], before: Before) -> Advice:
    to_limit = targets_of(bench, own, by_rounding=False)
    refused = _without_target(own)
    if not to_limit:
        return Advice(assembly.id, tuple(own), (), (), tuple(refused), (), None)
    to_rounding = targets_of(bench, own, by_rounding=True)
    changes: list[Change] = []
    structural: list[Structural] = []
    for lever in levers(assembly, bench.project.materials):
        value = _solved_for(bench, lever, to_limit)
        if isinstance(value, Refused):
            rows = _rows(bench, lever, to_limit, before) if value.why == "no value" else []
            changes += rows
            if not lever.structural and not rows:
                refused.append(value)
        elif lever.structural:
            structural.append(Structural(lever.kind, lever.what, lever.now, value, lever.quantity))
        else:
            changes += _changes(bench, lever, value, to_limit, to_rounding, before)
    structural += _structural(bench, assembly, to_limit)
    return Advice(
        assembly.id, tuple(own), _dominant(own[0], assembly), _ranked(changes), tuple(refused),
        tuple(structural), _added(bench, assembly, to_limit),
    )  # fmt: skip


def _without_target(lines: Iterable[Line]) -> list[Refused]:
    """Lines that no change of an assembly's parts can settle, since the figure is stated."""
    return [
        Refused("line", f"{line.element}, {line.metric}", "stated", None)
        for line in lines
        if not has_target(line)
    ]


# -------------------------------------------------------------------------------------- solving


def _solved_for(bench: Bench, lever: Lever, targets: Iterable[Target]) -> float | Refused:
    """The value of a lever that meets every target, or why there is none."""
    values: list[float] = []
    for target in targets:
        found = _solved_for_one(bench, lever, target)
        if isinstance(found, Refused):
            return found
        values.append(found)
    return max(values) if lever.more else min(values)


def _solved_for_one(bench: Bench, lever: Lever, target: Target) -> float | Refused:
    """The value of a lever at which one line meets its target."""
    short = short_of(bench, lever, target)
    try:
        if short(lever.most) > 0.0:
            return _not_enough(bench, lever, target)
        if short(lever.now) <= 0.0:
            return lever.now
        return met(short, lever, lever.most, target)
    except NoValue:
        return Refused(lever.kind, lever.what, "no value", None)


def _not_enough(bench: Bench, lever: Lever, target: Target) -> Refused:
    best = bench.value(target.line, lever.applied(lever.most))
    return Refused(lever.kind, lever.what, "not enough", best)


# -------------------------------------------------------------------------------------- changes


def _changes(
    bench: Bench,
    lever: Lever,
    value: float,
    to_limit: Sequence[Target],
    to_rounding: Sequence[Target],
    before: Before,
) -> list[Change]:
    """The change to the printed limit, that by the code's rounding, and the next stock size."""
    wanted = [("limit", value)]
    rounded = _solved_for(bench, lever, to_rounding)
    if isinstance(rounded, float) and abs(rounded - value) > 1e-6 * abs(value):
        wanted.append(("rounding", rounded))
    stock = _next_in_stock(bench.project, lever, rounded if isinstance(rounded, float) else value)
    if stock is not None:
        wanted.append(("stock", stock))
    found = [_change(bench, lever, x, basis, to_limit, before) for basis, x in wanted]
    return [change for change in found if change is not None]


def _rows(bench: Bench, lever: Lever, targets: Sequence[Target], before: Before) -> list[Change]:
    """The least other label among the rows of the rule sets' tables that brings the lines within.

    A method by table has no value between its rows, so that each row is tried.
    """
    if lever.kind != "label":
        return []
    for label in labels_in_tables(bench, targets):
        if label > lever.now * (1.0 + SAME):
            change = _change(bench, lever, label, "table", targets, before)
            if change is not None:
                return [change]
    return []


def _change(
    bench: Bench,
    lever: Lever,
    x: float,
    basis: str,
    targets: Sequence[Target],
    before: Before,
) -> Change | None:
    """Judge a change; None where the lines are not settled by it."""
    assembly = lever.applied(x)
    after = bench.judged(assembly)
    settled = {(t.line.ruleset, t.line.element, t.line.metric) for t in targets}
    verdicts = {(line.ruleset, line.element, line.metric): line for line in after}
    if any(verdicts[key].verdict != "pass" for key in settled if key in verdicts):
        return None
    values = [bench.value(target.line, assembly) for target in targets]
    known = [value for value in values if value is not None]
    if not known:
        return None
    return Change(
        lever=lever.kind,
        what=lever.what,
        before=lever.now,
        after=x,
        quantity=lever.quantity,
        resistance=lever.resistance(x),
        basis=basis,
        value=max(known),
        edits=lever.edits(x),
        verdicts=tuple((line.ruleset, line.element, line.verdict) for line in after),
        breaks=breaks(bench.project, lever, assembly, after, before),
        cost=_cost(bench.project, lever, assembly.id, x),
    )


def _cost(project: Project, lever: Lever, assembly: str, size: float) -> float | None:
    """What a size in stock costs beyond the drawn one, over all elements of the assembly."""
    if lever.kind != "thickness" or lever.material is None:
        return None
    sizes = dict(project.options.stock).get(lever.material.id, ())
    costs = dict(project.options.costs).get(lever.material.id, ())
    by_size = {round(each, 6): cost for each, cost in zip(sizes, costs, strict=False)}
    before, after = by_size.get(round(lever.now, 6)), by_size.get(round(size, 6))
    areas = [x.net_area for x in project.elements.values() if x.assembly == assembly]
    if before is None or after is None or not all(areas):
        return None
    return (after - before) * sum(area for area in areas if area is not None)


def _next_in_stock(project: Project, lever: Lever, least: float) -> float | None:
    """The least thickness in stock that is enough."""
    if lever.kind != "thickness" or lever.material is None:
        return None
    sizes = dict(project.options.stock).get(lever.material.id, ())
    return min((size for size in sizes if size >= least * (1.0 - 1e-9)), default=None)


def _ranked(changes: Iterable[Change]) -> tuple[Change, ...]:
    """The strongest lever first: that of the least relative change; its bases in a fixed order.

    Another material stands behind what concerns this assembly alone.
    """
    by_lever: dict[tuple[str, str], list[Change]] = {}
    for change in changes:
        by_lever.setdefault((change.lever, change.what), []).append(change)
    groups = sorted(
        by_lever.values(),
        key=lambda group: (group[0].lever == "conductivity", min(map(_relative, group))),
    )
    return tuple(change for group in groups for change in group)


def _relative(change: Change) -> float:
    return abs(change.after - change.before) / max(abs(change.before), 1e-9)


# ------------------------------------------------------------------------- what else can be said


def _structural(bench: Bench, assembly: Assembly, targets: Iterable[Target]) -> list[Structural]:
    """Fasteners and bridges: up to where they would do, if they alone were changed."""
    found = []
    for lever in turned(assembly):
        value = _solved_for(bench, lever, targets)
        if isinstance(value, float):
            found.append(Structural(lever.kind, lever.what, lever.now, value, lever.quantity))
    return found


def _dominant(line: Line, assembly: Assembly) -> tuple[tuple[str, float], ...]:
    """Layers by their share of the resistance that is counted, the largest first."""
    solved = line.solved
    if solved is None or not assembly.layers:
        return ()
    pairs = [
        (layer.title, counted.resistance)
        for layer, counted in zip(assembly.layers, solved.counted, strict=True)
        if counted.resistance
    ]
    total = sum(resistance for _, resistance in pairs)
    ranked = sorted(pairs, key=lambda pair: -pair[1])
    return tuple((title, resistance / total) for title, resistance in ranked)


def _added(bench: Bench, assembly: Assembly, targets: Iterable[Target]) -> float | None:
    """Resistance of added insulation, crossed by nothing, that brings a layered assembly within
    its limits; m2 K/W, None where it has no layers or no value."""
    if not assembly.layers:
        return None
    needed = []
    for target in targets:
        value = bench.value(target.line, assembly)
        if value:
            needed.append(1.0 / target.value - 1.0 / value)
    return max(needed, default=None)
