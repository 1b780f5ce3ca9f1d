"""What would bring lines within their limit: each change solved, then judged as a check would.

A change is found on the prescribed method: false position on R = 1/U, which is straight or nearly
so in a thickness. Structural choices are stated as far as they would do, never proposed.
"""

from __future__ import annotations

from collections.abc import Iterable, Mapping, Sequence
from typing import NamedTuple

from envcheck.advise.bench import Bench
from envcheck.advise.levers import Lever, levers, turned
from envcheck.advise.roots import root
from envcheck.judge.compare import decimals_of, own_term
from envcheck.model.advised import Advice, Change, Refused, Structural
from envcheck.model.judged import Line
from envcheck.model.project import Assembly, Project
from envcheck.units import to_si

SHY = 1e-9
"""Share by which a solved value is moved to the safe side of a limit."""


SHORT_OF_HALF = 0.999
"""Share of half the last printed place by which a value may lie above a limit; half is over it."""


class Target(NamedTuple):
    """A value that a line must not exceed, SI."""

    line: Line
    value: float


def advise(bench: Bench, lines: Sequence[Line]) -> tuple[Advice, ...]:
    """Advise on every assembly that has a deciding line over its limit or too close to it."""
    wanted: dict[str, list[Line]] = {}
    for line in lines:
        element = bench.project.elements.get(line.element)
        if element is not None and line.decides and line.verdict in ("fail", "too_close"):
            wanted.setdefault(element.assembly, []).append(line)
    return tuple(
        _of_assembly(bench, bench.project.assemblies[name], own, lines)
        for name, own in wanted.items()
    )


def _of_assembly(
    bench: Bench, assembly: Assembly, own: Sequence[Line], lines: Iterable[Line]
) -> Advice:
    to_limit = _targets(bench, own, by_rounding=False)
    if not to_limit:
        return Advice(assembly.id, tuple(own), (), (), (), (), None)
    to_rounding = _targets(bench, own, by_rounding=True)
    before = {(x.ruleset, x.element, x.metric): x.verdict for x in lines}
    changes: list[Change] = []
    refused: list[Refused] = []
    structural: list[Structural] = []
    for lever in levers(assembly, bench.project.materials):
        value = _solved_for(bench, lever, to_limit)
        if isinstance(value, Refused):
            if not lever.structural:
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


def _targets(bench: Bench, lines: Iterable[Line], by_rounding: bool) -> tuple[Target, ...]:
    """Limits of the lines, SI, and the assembly's own solution each is held against."""
    found = {}
    for line in lines:
        own = line.own or line.comparison or line.high
        if own is None or line.limit is None or line.solved is None or own.sense != "max":
            continue
        ruleset = bench.rulesets[line.ruleset]
        limit = own.limit
        places = decimals_of(own_term(line.limit), ruleset)
        if by_rounding and places is not None:
            limit += 0.5 * 10.0**-places * SHORT_OF_HALF
        found[id(line.solved), limit] = Target(line, to_si(limit, own.unit))
    return tuple(found.values())


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
    """The value of a lever at which one line meets its target, found on R = 1/U."""

    def short(x: float) -> float:
        value = bench.value(target.line, lever.applied(x))
        if value is None or value <= 0.0:
            raise _NoValue
        return 1.0 / target.value - 1.0 / value

    try:
        if short(lever.most) > 0.0:
            return _not_enough(bench, lever, target)
        if short(lever.now) <= 0.0:
            return lever.now
        found = root(short, lever.now, lever.most, max(abs(lever.now), 1e-3))
        return _on_the_safe_side(short, found, lever)
    except _NoValue:
        return Refused(lever.kind, lever.what, "no value", None)


class _NoValue(Exception):
    """The method does not decide the changed assembly."""


def _on_the_safe_side(short: object, found: float, lever: Lever) -> float:
    assert callable(short)
    step = SHY * max(abs(found), 1e-6) * (1.0 if lever.more else -1.0)
    for _ in range(40):
        if short(found) <= 0.0:
            break
        found += step
        step *= 2.0
    return found


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
    before: Mapping[tuple[str, str, str], str],
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


def _change(
    bench: Bench,
    lever: Lever,
    x: float,
    basis: str,
    targets: Sequence[Target],
    before: Mapping[tuple[str, str, str], str],
) -> Change | None:
    """Judge a change; None where the lines are not settled by it."""
    assembly = lever.applied(x)
    after = bench.judged(assembly)
    settled = {(t.line.ruleset, t.line.element, t.line.metric) for t in targets}
    verdicts = {(line.ruleset, line.element, line.metric): line for line in after}
    if any(verdicts[key].verdict != "pass" for key in settled if key in verdicts):
        return None
    values = [bench.value(target.line, assembly) for target in targets]
    return Change(
        lever=lever.kind,
        what=lever.what,
        before=lever.now,
        after=x,
        quantity=lever.quantity,
        resistance=lever.resistance(x),
        basis=basis,
        value=max(value for value in values if value is not None),
        edits=lever.edits(x),
        verdicts=tuple((line.ruleset, line.element, line.verdict) for line in after),
        breaks=_breaks(bench.project, lever, assembly, after, before),
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


def _breaks(
    project: Project,
    lever: Lever,
    assembly: Assembly,
    after: Iterable[Line],
    before: Mapping[tuple[str, str, str], str],
) -> tuple[str, ...]:
    """What a change makes worse elsewhere."""
    found = [
        f"{line.element} by {line.ruleset}: {line.verdict.replace('_', ' ')}"
        for line in after
        if line.verdict != "pass"
        and before.get((line.ruleset, line.element, line.metric)) == "pass"
    ]
    if lever.kind == "conductivity" and lever.material is not None:
        others = [
            each.id
            for each in project.assemblies.values()
            if each.id != assembly.id and _uses(each, lever.material.id)
        ]
        if others:
            found.append(f"the material also stands in {', '.join(others)}")
    return tuple(found)


def _uses(assembly: Assembly, material: str) -> bool:
    for layer in assembly.layers:
        fill = getattr(layer, "fill", None)
        for own in (getattr(layer, "material", None), getattr(fill, "material", None)):
            if own is not None and own.id == material:
                return True
    return False


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
