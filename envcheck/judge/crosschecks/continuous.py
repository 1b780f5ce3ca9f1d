"""Outer insulation that metal members cross: it is continuous in name only."""

from __future__ import annotations

from collections.abc import Iterator, Sequence

from envcheck.judge.crosschecks import Check, Facts
from envcheck.judge.readings import fill_resistance
from envcheck.judge.words import length, lines_by_assembly, method, resistance, system, u_factor
from envcheck.model.judged import CERTAIN, Finding, Line
from envcheck.model.project import Assembly, FramedLayer
from envcheck.model.solved import Solved

METAL = 1.0
"""W/(m K); between the most conductive wood and the least conductive metal."""
COUNTS = {
    "zero": "it counts 0",
    "counted": "it counts in full",
    "two_dimensional": "it counts only by a test or a two-dimensional solution",
}
"""Convention for crossed insulation, in words."""


def continuous_crossed(facts: Facts) -> Iterator[Finding]:
    """Insulation outside the framing between metal members."""
    lines = lines_by_assembly(facts.lines, facts.project)
    units = system(facts.project, facts.rulesets)
    for assembly in facts.project.assemblies.values():
        for layer in assembly.layers:
            if isinstance(layer, FramedLayer) and layer.crosses_insulation and is_metal(layer):
                resting = lines.get(assembly.id, ())
                yield _finding(facts, assembly, layer, resting, units)


def is_metal(layer: FramedLayer) -> bool:
    """Whether the members conduct like metal."""
    return layer.member.profile is not None or layer.member.material.conductivity > METAL


def left_between_planes(layer: FramedLayer, full: float) -> float | None:
    """Resistance of the crossed layer alone between isothermal planes, m2 K/W.

    R = 1 / (f k_m/d + (1 - f)/R_full), with f the members' share of the area: of a profile, its
    web over the spacing. Source: ISO 6946:2017, 6.7.2.4; a lower bound of what the layer leaves.
    """
    member = layer.member
    if layer.share is not None:
        share = layer.share
    elif member.spacing:
        width = member.profile.thickness if member.profile is not None else member.width
        share = width / member.spacing
    else:
        return None
    through = layer.thickness / member.material.conductivity
    return 1.0 / (share / through + (1.0 - share) / full)


def _finding(
    facts: Facts, assembly: Assembly, layer: FramedLayer, lines: Sequence[Line], units: str
) -> Finding:
    full = fill_resistance(layer.fill, layer.thickness)
    spacing = layer.member.spacing
    seen = f"{layer.title}" + (f" ({resistance(full, units)})" if full else "")
    seen += f" is crossed by metal members ({layer.member.material.title})"
    seen += f" every {length(spacing, units)}" if spacing else ""
    words = ["it is not continuous insulation, whatever its label", *_counted(facts, lines)]
    left = left_between_planes(layer, full) if full else None
    if left is not None and full:
        share = f"{left / full * 100:.0f} %"
        words.append(f"between isothermal planes {resistance(left, units)} of it is left ({share})")
    solved = lines[0].solved if lines else facts.solved.get(assembly.id)
    words += _bracket(solved, units)
    relied_on = any(line.verdict not in ("pass", "no_requirement") for line in lines)
    return Finding(
        "continuous-crossed",
        "E" if relied_on else "W",
        assembly.id,
        assembly.sheet,
        seen,
        "; ".join(words),
        "fixings that do not cross it in lines, a test, or a two-dimensional solution that the "
        "official accepts",
    )


def _counted(facts: Facts, lines: Sequence[Line]) -> list[str]:
    """What the deciding rule set counts of it."""
    if not lines:
        return []
    ruleset, solved = facts.rulesets[lines[0].ruleset], lines[0].solved
    if solved is not None and solved.setting.method == "two_dimensional":
        return [f"it counts as {method('two_dimensional')} of the whole gives it"]
    conventions = ruleset.conventions
    whence = conventions.where.get("crossed_insulation", "")
    return [COUNTS[conventions.crossed_insulation] + (f" ({whence})" if whence else "")]


def _bracket(solved: Solved | None, units: str) -> list[str]:
    if solved is None or solved.low is None or solved.high is None or solved.low == solved.high:
        return []
    ends = f"{u_factor(solved.low, units)} and {u_factor(solved.high, units)}"
    return [f"the whole as drawn lies between {ends}"]


CHECKS = (
    Check("continuous-crossed", "Metal crosses continuous insulation", continuous_crossed, CERTAIN),
)
