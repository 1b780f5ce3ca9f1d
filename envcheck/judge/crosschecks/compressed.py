"""Batts thicker than the cavity they are pressed into."""

from __future__ import annotations

from collections.abc import Iterator

from envcheck.judge.crosschecks import Check, Facts
from envcheck.judge.readings import full_label
from envcheck.judge.words import length, resistance, system, u_factor
from envcheck.model.judged import CERTAIN, Finding
from envcheck.model.project import Assembly, FramedLayer
from envcheck.model.solved import Solved

SAME_LENGTH = 0.002
"""m; 140 mm is 5-1/2 in."""


def batt_compressed(facts: Facts) -> Iterator[Finding]:
    """Insulation whose product thickness is more than the depth of its cavity."""
    units = system(facts.project, facts.rulesets)
    for assembly in facts.project.assemblies.values():
        for number, layer in enumerate(assembly.layers, 1):
            if not isinstance(layer, FramedLayer):
                continue
            thickness = layer.fill.product_thickness or 0.0
            if layer.fill.label is not None and thickness > layer.thickness + SAME_LENGTH:
                yield _finding(facts, assembly, layer, number, units)


def _finding(
    facts: Facts, assembly: Assembly, layer: FramedLayer, number: int, units: str
) -> Finding:
    label, thickness = layer.fill.label, layer.fill.product_thickness
    assert label is not None and thickness is not None, "only labelled batts are looked at"
    solved = facts.solved.get(assembly.id)
    placed = _in_place(layer, number, solved)
    suggests = "the full label does not hold when it is pressed together"
    if placed is not None:
        suggests = f"in place it counts {resistance(placed, units)}, not {resistance(label, units)}"
    full = full_label(assembly, solved) if solved is not None else None
    if full is not None and solved is not None and solved.value is not None:
        suggests += (
            f"; the assembly has {u_factor(solved.value, units)}, with the full label it would "
            f"have {u_factor(full, units)}"
        )
    return Finding(
        "batt-compressed",
        "W",
        assembly.id,
        assembly.sheet,
        f"{layer.title}: {resistance(label, units)} of {length(thickness, units)} in a cavity of "
        f"{length(layer.thickness, units)}",
        suggests,
        "the maker's resistance at the thickness in place, or a product that fits the cavity",
    )


def _in_place(layer: FramedLayer, number: int, solved: Solved | None) -> float | None:
    """Resistance as counted, m2 K/W: the worksheet's, else the maker's."""
    if solved is not None:
        for step in solved.steps:
            if step.symbol == f"R{number}_fill":
                return step.value
    return layer.fill.installed_label


CHECKS = (Check("batt-compressed", "Insulation thicker than its cavity", batt_compressed, CERTAIN),)
