"""What a change that cures one line makes worse elsewhere, in words."""

from __future__ import annotations

from collections.abc import Iterable, Iterator, Mapping
from typing import NamedTuple

from envcheck.advise.levers import Lever
from envcheck.model.judged import Line
from envcheck.model.layers import FramedLayer
from envcheck.model.project import Assembly, Project
from envcheck.units import convert

Key = tuple[str, str, str]
"""Rule set, element, metric."""


class Before(NamedTuple):
    """What was before any change."""

    lines: Mapping[Key, Line]
    least: float
    """Conductivity under which no insulation of the class lies, W/(m K)."""


def breaks(
    project: Project, lever: Lever, assembly: Assembly, after: Iterable[Line], before: Before
) -> tuple[str, ...]:
    """Say what a change makes worse: other lines, other rule sets, paths, cavities, assemblies."""
    after = tuple(after)
    return (
        *_lines(after, before.lines),
        *_paths(after, before.lines),
        *_cavities(lever, assembly, before.least),
        *_elsewhere(project, lever, assembly),
    )


def _lines(after: Iterable[Line], before: Mapping[Key, Line]) -> Iterator[str]:
    """Lines that passed and no longer do, of whatever rule set."""
    for line in after:
        known = before.get((line.ruleset, line.element, line.metric))
        if known is not None and known.verdict == "pass" and line.verdict != "pass":
            yield f"{line.element} by {line.ruleset}: {line.verdict.replace('_', ' ')}"


def _paths(after: Iterable[Line], before: Mapping[Key, Line]) -> Iterator[str]:
    """R-value paths that passed and no longer do."""
    for line in after:
        known = before.get((line.ruleset, line.element, line.metric))
        if known is None or not _by_labels(known) or _by_labels(line):
            continue
        yield f"{line.element} by {line.ruleset}: the R-value path no longer passes"


def _by_labels(line: Line) -> bool:
    return any(path.path == "insulation" and path.state == "pass" for path in line.paths)


def implied_conductivity(depth: float, resistance: float) -> float:
    """Conductivity that a labelled resistance asks for in a cavity: k = d / R.

    depth: of the cavity, m. resistance: m2 K/W. Any shape. Returns W/(m K).
    Source: definition of thermal resistance, ISO 6946:2017, 6.7.1.
    """
    return depth / resistance


def _cavities(lever: Lever, assembly: Assembly, least: float) -> Iterator[str]:
    """A label that no insulation of its class could have within its cavity, or one that is thicker
    than its cavity."""
    if lever.kind != "label":
        return
    for layer in assembly.layers:
        if not isinstance(layer, FramedLayer) or layer.title != lever.what:
            continue
        label = layer.fill.label
        if label and implied_conductivity(layer.thickness, label) < least:
            needs = least * label
            yield (
                f"cavity of {layer.title}: {_inches(layer.thickness)} deep; this label would need "
                f"{_inches(needs)} of the best insulation of its class"
            )


def _inches(length: float) -> str:
    return f"{1000.0 * length:.0f} mm ({convert(length, 'in'):.2f} in)"


def _elsewhere(project: Project, lever: Lever, assembly: Assembly) -> Iterator[str]:
    """Other assemblies in which a changed material stands."""
    if lever.kind != "conductivity" or lever.material is None:
        return
    others = [
        each.id
        for each in project.assemblies.values()
        if each.id != assembly.id and _uses(each, lever.material.id)
    ]
    if others:
        yield f"the material also stands in {', '.join(others)}"


def _uses(assembly: Assembly, material: str) -> bool:
    for layer in assembly.layers:
        fill = getattr(layer, "fill", None)
        for own in (getattr(layer, "material", None), getattr(fill, "material", None)):
            if own is not None and own.id == material:
                return True
    return False
