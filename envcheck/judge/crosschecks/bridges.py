"""Junctions that nothing counts, and psi outside what is usual for their kind."""

from __future__ import annotations

from collections.abc import Iterator

from envcheck.judge.crosschecks import Check, Facts
from envcheck.judge.words import system, trimmed
from envcheck.model.judged import CERTAIN, LIKELY, LOOK, Finding
from envcheck.model.project import Bridge, Junction, Project
from envcheck.units import in_system, label

ANY = (-0.3, 1.5)
"""W/(m K); about the span of the default values of ISO 14683:2017 (from memory)."""


def not_counted(facts: Facts) -> Iterator[Finding]:
    """Junctions of the building's list that no bridge counts."""
    units = system(facts.project, facts.rulesets)
    for junction in facts.project.junctions:
        if junction.counted_as:
            continue
        along = f", {length_of(junction, units)}" if junction.length is not None else ""
        low, high = (_psi(end, units) for end in junction.band)
        yield Finding(
            "junction-not-counted",
            "W",
            junction.id,
            junction.sheet,
            f"{junction.title}{along}: no bridge counts it"
            + (f" ({junction.reason})" if junction.reason else ""),
            f"the U-factors leave its heat out; psi of its kind is mostly {low} to {high}"
            + _heat(junction, units),
            "a bridge with its psi and source, or the clause by which it need not count",
        )


def length_of(junction: Junction, units: str) -> str:
    """The length of a junction in words."""
    shown = trimmed(in_system(junction.length or 0.0, "run", units), 1)
    return f"{shown} {label('run', units)}"


def _heat(junction: Junction, units: str) -> str:
    if junction.length is None:
        return ""
    most = in_system(junction.band[1] * junction.length, "point_transmittance", units)
    return f", up to {most:.3g} {label('point_transmittance', units)}"


def _psi(value: float, units: str) -> str:
    shown = trimmed(in_system(value, "linear_transmittance", units), 3)
    return f"{shown} {label('linear_transmittance', units)}"


def psi_unusual(facts: Facts) -> Iterator[Finding]:
    """A psi outside the band of its kind, or of any kind where the kind is not listed."""
    units = system(facts.project, facts.rulesets)
    kinds = {j.counted_as: j for j in facts.project.junctions if j.counted_as}
    for owner, sheet, bridge in _lines(facts.project):
        kind = kinds.get(bridge.title)
        low, high = kind.band if kind is not None else ANY
        if low <= bridge.value <= high:
            continue
        slipped = low <= bridge.value / 10 <= high or low <= bridge.value * 10 <= high
        slipped = slipped and bridge.value > 0
        what = kind.title.casefold() if kind is not None else "any junction"
        yield Finding(
            "psi-unusual",
            "W",
            owner,
            sheet,
            f"{bridge.title}: psi {_psi(bridge.value, units)}; {_psi(low, units)} to "
            f"{_psi(high, units)} is usual for {what}",
            "it looks like a slipped decimal" if slipped else "value, unit or kind may be wrong",
            f"the source of the value ({bridge.source or 'none is named'})",
            sure=LIKELY if slipped else LOOK,
        )


def _lines(project: Project) -> Iterator[tuple[str, str, Bridge]]:
    """Linear bridges with a stated psi, each with its owner and sheet."""
    for assembly in project.assemblies.values():
        for bridge in assembly.bridges:
            if bridge.kind == "line" and bridge.detail is None:
                yield assembly.id, assembly.sheet, bridge
    for element in project.elements.values():
        for bridge in element.bridges:
            if bridge.kind == "line" and bridge.detail is None:
                yield element.tag, element.sheet, bridge


CHECKS = (
    Check("junction-not-counted", "Junction that no bridge counts", not_counted, CERTAIN),
    Check("psi-unusual", "Unusual psi", psi_unusual, LIKELY),
)
