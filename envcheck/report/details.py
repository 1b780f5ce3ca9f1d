"""Assemblies in drawing order: layers with their sources, method, bounds, values beside."""

from __future__ import annotations

from collections.abc import Iterable
from typing import NamedTuple

from envcheck import units
from envcheck.model.judged import Line
from envcheck.model.project import Assembly, Project
from envcheck.model.solved import Beside, Counted, RangedInput, Solved
from envcheck.report import layers, numbers, wording, workings
from envcheck.report.inert import clean
from envcheck.report.layers import LayerView
from envcheck.report.workings import Workings


class BesideView(NamedTuple):
    """A value by another route."""

    name: str
    value: str
    distance: str
    """From the value that decides, in per cent with sign."""
    note: str


class AssemblyView(NamedTuple):
    """One assembly solved under one setting."""

    assembly: str
    title: str
    sheet: str
    elements: tuple[str, ...]
    declared: str
    metric: str
    symbol: str
    method: str
    method_from: str
    value: str
    unrounded: float | None
    """In the unit of the value."""
    unit: str
    missing: tuple[str, ...]
    bracket: str
    ranges: str
    """What stated ranges of its inputs make of the value; empty without any."""
    beside: tuple[BesideView, ...]
    films: tuple[str, ...]
    layers: tuple[LayerView, ...]
    conductivity_unit: str
    resistance_unit: str
    assumptions: tuple[str, ...]
    rule_sets: tuple[str, ...] = ()
    """Those by whose conventions it was solved so."""
    workings: Workings | None = None
    """Where they are asked for."""


def build(
    project: Project, lines: Iterable[Line], system: str, worked: bool = False
) -> tuple[AssemblyView, ...]:
    """Every assembly that was solved, in drawing order, once per setting; ``worked`` adds ladder,
    paths and worksheet."""
    found: dict[str, dict[int, list[Line]]] = {}
    for line in lines:
        if line.solved is not None:
            found.setdefault(line.solved.assembly, {}).setdefault(id(line.solved), []).append(line)
    return tuple(
        _view(project, assembly, of_one, system, worked)
        for assembly in project.assemblies.values()
        for of_one in found.get(assembly.id, {}).values()
    )


def _view(
    project: Project, assembly: Assembly, lines: list[Line], system: str, worked: bool
) -> AssemblyView:
    solved = lines[0].solved
    assert solved is not None
    view = assembly_view(assembly, solved, dict.fromkeys(x.element for x in lines), system)
    made = workings.build(project.site, solved, lines, system) if worked else None
    return view._replace(
        rule_sets=tuple(dict.fromkeys(clean(x.ruleset) for x in lines)), workings=made
    )


def assembly_view(
    assembly: Assembly, solved: Solved, tags: Iterable[str], system: str
) -> AssemblyView:
    """Write one solved assembly."""
    setting = solved.setting
    metric = setting.metric
    method = wording.METHODS.get(setting.method, wording.plain(setting.method))
    return AssemblyView(
        assembly=clean(assembly.id),
        title=clean(assembly.title),
        sheet=clean(assembly.sheet),
        elements=tuple(map(clean, tags)),
        declared=_declared(assembly),
        metric=wording.METRICS.get(metric, metric),
        symbol=numbers.symbol(metric),
        method=method,
        method_from=clean(setting.method_from),
        value="" if solved.value is None else shown(solved.value, metric, system),
        unrounded=(
            None
            if solved.value is None
            else numbers.in_system(solved.value, numbers.quantity(metric), system)
        ),
        unit=numbers.unit(metric, system),
        missing=tuple(map(clean, solved.missing)),
        bracket=bracket(solved, system),
        ranges=ranges(solved, system),
        beside=tuple(_beside(beside, solved, system) for beside in solved.beside),
        films=_films(solved, system) if assembly.layers else (),
        layers=tuple(_layers(assembly, solved, system)),
        conductivity_unit=units.label("conductivity", system),
        resistance_unit=units.label("resistance", system),
        assumptions=tuple(map(clean, solved.assumptions)),
    )


def _layers(assembly: Assembly, solved: Solved, system: str) -> Iterable[LayerView]:
    """The layers of the assembly, then those of its other parts, which are named."""
    for layer, counted in zip(assembly.layers, solved.counted, strict=True):
        yield from layers.views(layer, counted, system)
    if assembly.basement is not None:
        for name, others in assembly.basement.others:
            for layer in others:
                yield layers.view(layer, Counted(None, name), system)


def shown(value: float, metric: str, system: str) -> str:
    """A value of a metric, unrounded, without its unit."""
    converted = numbers.in_system(value, numbers.quantity(metric), system)
    return numbers.fixed(converted, numbers.decimals(metric, system))


def bracket(solved: Solved, system: str) -> str:
    """The proven bounds of the drawn model, or why there are none."""
    note = clean(solved.bracket_note)
    if solved.low is None or solved.high is None:
        return note
    metric = solved.setting.metric
    quantity = numbers.quantity(metric)
    ends = [numbers.in_system(end, quantity, system) for end in (solved.low, solved.high)]
    low, high = numbers.interval(ends[0], ends[1], numbers.decimals(metric, system))
    width = f", {numbers.percent(solved.high / solved.low - 1.0)} apart" if solved.low else ""
    return f"{low} to {high}{width}" + (f"; {note}" if note else "")


def ranges(solved: Solved, system: str) -> str:
    """The interval that follows from stated ranges, and which these are."""
    found = solved.ranged
    if found is None:
        return ""
    metric = solved.setting.metric
    quantity = numbers.quantity(metric)
    ends = [numbers.in_system(end, quantity, system) for end in (found.low, found.high)]
    low, high = numbers.interval(ends[0], ends[1], numbers.decimals(metric, system))
    inputs = "; ".join(_input(each, system) for each in found.inputs)
    proven = "" if found.proven else f"; {wording.NOT_PROVEN}"
    return clean(f"{low} to {high} for {inputs}{proven}")


def _input(each: RangedInput, system: str) -> str:
    quantity = "thickness" if each.quantity == "length" else each.quantity
    word, unit = wording.plain(quantity), units.label(quantity, system)
    ends = (numbers.in_system(end, quantity, system) for end in (each.low, each.high))
    low, high = (numbers.significant(end, 4) for end in ends)
    return f"{word} of {each.title} {low} to {high} {unit}"


def _declared(assembly: Assembly) -> str:
    declared = assembly.declared
    if declared is None:
        return ""
    return clean(f"{declared.text} on {declared.sheet}" if declared.sheet else declared.text)


def _beside(beside: Beside, solved: Solved, system: str) -> BesideView:
    metric = solved.setting.metric
    value = shown(beside.value, metric, system)
    distance = ""
    if solved.value:
        distance = f"{numbers.signed(100.0 * (beside.value / solved.value - 1.0), 1)} %"
    name = wording.METHODS.get(beside.name, wording.plain(beside.name))
    return BesideView(clean(name), value, distance, clean(beside.note))


def _films(solved: Solved, system: str) -> tuple[str, ...]:
    setting, unit = solved.setting, units.label("resistance", system)
    if setting.metric != "U_assembly":
        return ()
    counted = {step.symbol: (step.value, step.source) for step in solved.steps}
    pairs = (
        ("outside", *counted.get("Ro", (setting.outside_film, setting.outside_film_from))),
        ("inside", *counted.get("Ri", (setting.inside_film, setting.inside_film_from))),
    )
    return tuple(
        clean(f"{side} film {numbers.resistance(value, system)} {unit} ({where})")
        for side, value, where in pairs
    )
