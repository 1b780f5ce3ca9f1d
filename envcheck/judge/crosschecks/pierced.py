"""Fasteners through continuous insulation against the share of metal that a code allows."""

from __future__ import annotations

from collections.abc import Iterator
from math import pi

from envcheck.judge.crosschecks import Check, Facts
from envcheck.judge.crosschecks.continuous import METAL
from envcheck.judge.words import lines_by_assembly
from envcheck.model.judged import CERTAIN, Finding
from envcheck.model.project import Assembly
from envcheck.model.ruleset import RuleSet


def insulation_pierced(facts: Facts) -> Iterator[Finding]:
    """Layers that more metal crosses than the deciding rule set allows."""
    for name, lines in lines_by_assembly(facts.lines, facts.project).items():
        assembly = facts.project.assemblies[name]
        for ruleset in {line.ruleset: facts.rulesets[line.ruleset] for line in lines}.values():
            cap = ruleset.conventions.penetration_cap
            for layer, share in metal_shares(assembly).items() if cap is not None else ():
                if cap is not None and share > cap * (1 + 1e-9):
                    yield _finding(assembly, layer, share, cap, ruleset)


def metal_shares(assembly: Assembly) -> dict[str, float]:
    """Share of the area that metal fasteners take, by layer: n pi d2 / 4.

    n: number per area, 1/m2; d: diameter, m. Source: area of a circle.
    """
    found: dict[str, float] = {}
    for each in assembly.fasteners:
        if each.material.conductivity > METAL:
            area = each.density * pi * each.diameter**2 / 4.0
            found[each.layer] = found.get(each.layer, 0.0) + area
    return found


def _finding(assembly: Assembly, layer: str, share: float, cap: float, ruleset: RuleSet) -> Finding:
    clause = ruleset.conventions.where.get("penetration_cap", ruleset.title)
    return Finding(
        "insulation-pierced",
        "E",
        assembly.id,
        assembly.sheet,
        f"metal fasteners take {share * 100:.3g} % of the area of {layer}, more than "
        f"{cap * 100:.3g} % ({clause})",
        "by that clause the layer is not continuous insulation",
        "fewer or thinner fasteners, or a value in which they are counted",
    )


CHECKS = (
    Check(
        "insulation-pierced", "Too much metal through the insulation", insulation_pierced, CERTAIN
    ),
)
