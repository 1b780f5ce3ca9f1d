"""What holds for the building: area ratios, surfaces that close, the area-weighted mean."""

from __future__ import annotations

from collections.abc import Mapping, Sequence

from envcheck.model.judged import Closing, Ratio
from envcheck.model.patterns import matches
from envcheck.model.project import Project, Surface
from envcheck.model.ruleset import RuleSet

RATIO_PARTS = {
    "window_wall_ratio": ("wall", "fenestration.*", "fenestration.skylight"),
    "skylight_roof_ratio": ("roof", "fenestration.skylight", ""),
}
"""Ratio -> kind of surface below the line, category above it, category left out above it."""


def closings(project: Project) -> tuple[Closing, ...]:
    """Hold the parts of each surface against its gross area."""
    found = []
    for surface in project.surfaces.values():
        parts = tuple(
            (element.tag, element.net_area)
            for element in project.elements.values()
            if element.surface == surface.name and element.net_area is not None
        )
        missing = surface.gross_area - sum(area for _, area in parts)
        found.append(Closing(surface.name, surface.sheet, surface.gross_area, parts, missing))
    return tuple(found)


def ratios(project: Project, ruleset: RuleSet, categories: Mapping[str, str]) -> tuple[Ratio, ...]:
    """Area ratios that the rule set caps, over the surfaces of the project's main space.

    categories: by tag, the class in which each element is judged.
    """
    return tuple(
        _ratio(project, categories, limit.of, limit.most, limit.clause)
        for limit in ruleset.area_limits
    )


def _ratio(
    project: Project, categories: Mapping[str, str], name: str, most: float, clause: str
) -> Ratio:
    kind, counted, left_out = RATIO_PARTS[name]
    surfaces = [s for s in project.surfaces.values() if _counts(s, kind, project)]
    names = {surface.name for surface in surfaces}
    denominator = sum(surface.gross_area - surface.below_grade_area for surface in surfaces)
    elements = [
        element
        for element in project.elements.values()
        if matches(counted, categories[element.tag])
        and categories[element.tag] != left_out
        and element.surface in names
    ]
    numerator = sum(element.net_area or 0.0 for element in elements)
    missing = [] if surfaces else [f"surfaces of kind {kind!r} with their gross area"]
    missing += [f"the area of {element.tag}" for element in elements if element.net_area is None]
    value = numerator / denominator if denominator else 0.0
    passed = value > most + 1e-9
    counted_tags = tuple(element.tag for element in elements)
    return Ratio(
        name, numerator, denominator, value, most, clause, passed, tuple(missing), counted_tags
    )


def _counts(surface: Surface, kind: str, project: Project) -> bool:
    main = next((str(f.value) for f in project.facts if f.name == "space_category"), "")
    return (
        surface.kind == kind
        and surface.adjoins == "outdoors"
        and surface.space_category in ("", main)
    )


def closed_rows(ruleset: RuleSet, found: Sequence[Ratio]) -> dict[str, Ratio]:
    """Category patterns whose rows an area cap closes, with the ratio that does so."""
    return {
        pattern: ratio
        for limit, ratio in zip(ruleset.area_limits, found, strict=True)
        if ratio.passed
        for pattern in limit.closes
    }


def area_weighted_mean(areas: Sequence[float], values: Sequence[float]) -> float:
    """Area-weighted mean U: sum of U_i A_i over sum of A_i.

    areas: m2; values: W/(m2 K). Returns W/(m2 K). Source: heat flows of parallel areas add.
    """
    return sum(a * u for a, u in zip(areas, values, strict=True)) / sum(areas)
