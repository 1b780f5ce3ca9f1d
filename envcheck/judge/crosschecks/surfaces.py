"""Surfaces that do not close, surfaces without elements and elements without a surface."""

from __future__ import annotations

from collections.abc import Iterator

from envcheck.judge.crosschecks import Check, Facts
from envcheck.judge.words import MOST_TAGS, area, listed, system
from envcheck.model.judged import CERTAIN, LOOK, Closing, Finding
from envcheck.model.project import Element, Project


def surface_of(element: Element, project: Project) -> str:
    """Surface of an element: its own, or that of the element it is cut from."""
    host = project.elements.get(element.host)
    return element.surface or (host.surface if host is not None else "")


def does_not_close(facts: Facts) -> Iterator[Finding]:
    """Parts that miss the gross area of their surface by more than 0.5 %."""
    units = system(facts.project, facts.rulesets)
    for closing in facts.closings:
        if closing.parts and not closing.closes:
            yield _open_surface(closing, units)


def _open_surface(closing: Closing, units: str) -> Finding:
    entered = sum(value for _, value in closing.parts)
    off = abs(closing.missing)
    what = "missing" if closing.missing > 0 else "too much"
    parts = ", ".join(f"{tag} {area(value, units)}" for tag, value in closing.parts[:MOST_TAGS])
    more = len(closing.parts) - MOST_TAGS
    parts += f" and {more} more" if more > 0 else ""
    suggests = (
        "a piece of the surface is not entered, or an area is entered too small"
        if closing.missing > 0
        else "a piece is entered twice, an area too large, or gross where net is meant"
    )
    return Finding(
        "surface-does-not-close",
        "E",
        closing.surface,
        closing.sheet,
        f"gross {area(closing.gross, units)}{_on(closing.sheet)}, entered {area(entered, units)} "
        f"({parts}): {area(off, units)} ({off / closing.gross * 100:.1f} %) {what}",
        suggests,
        "elements whose net areas add up to the gross area on the sheet",
    )


def _on(sheet: str) -> str:
    return f" on {sheet}" if sheet else ""


def without_element(facts: Facts) -> Iterator[Finding]:
    """A drawn surface to which nothing is entered."""
    project = facts.project
    used = {surface_of(element, project) for element in project.elements.values()}
    units = system(project, facts.rulesets)
    for surface in project.surfaces.values():
        if surface.name in used:
            continue
        marks = listed([f"{mark.tag} x {mark.count:g}" for mark in surface.shows])
        yield Finding(
            "surface-without-element",
            "E",
            surface.name,
            surface.sheet,
            f"{area(surface.gross_area, units)} are drawn{_on(surface.sheet)}, no element is "
            "entered" + (f"; it shows {marks}" if marks else ""),
            "the surface was left out of the file",
            "its elements with their areas",
        )


MOST_OF_IT = 2
"""Kinds of surfaces from which on a whole building seems to be described."""
KINDS = {"roof": "roof", "floor": "floor", "slab": "floor"}
"""First word of a category -> kind of the surface it lies in; any other lies in a wall."""


def _kind(category: str) -> str:
    if category == "fenestration.skylight":
        return "roof"
    return KINDS.get(category.partition(".")[0], "wall")


def without_surface(facts: Facts) -> Iterator[Finding]:
    """An element with an area that belongs to no surface, where surfaces of its kind are drawn."""
    project = facts.project
    drawn = {surface.kind for surface in project.surfaces.values()}
    units = system(project, facts.rulesets)
    for element in project.elements.values():
        if element.net_area is None or surface_of(element, project):
            continue
        if _kind(element.category) not in drawn:
            continue
        yield Finding(
            "element-without-surface",
            "N",
            element.tag,
            element.sheet,
            f"{area(element.net_area, units)} on no surface",
            "its area is in no sum of a surface and in no area ratio",
            "the surface that it belongs to",
        )


PARTS = {"wall": ("wall.",), "roof": ("roof.",), "floor or slab": ("floor.", "slab.")}
"""Parts that every building has -> starts of their categories."""


def part_missing(facts: Facts) -> Iterator[Finding]:
    """A part of the envelope without an element, where most of a new building is drawn."""
    project = facts.project
    kinds = {surface.kind for surface in project.surfaces.values()}
    if project.scope != "new" or len(kinds) < MOST_OF_IT:
        return
    categories = [element.category for element in project.elements.values()]
    for part, starts in PARTS.items():
        if not any(category.startswith(starts) for category in categories):
            yield Finding(
                "part-missing",
                "N",
                part,
                "",
                f"surfaces of kind {listed(sorted(kinds))} are drawn, no element is a {part}",
                "that part of the envelope was left out, or the project is a part of a building",
                "its elements, or a word in the title that says what is submitted",
            )


RATIO_OF = {"window_wall_ratio": "windows to walls", "skylight_roof_ratio": "skylights to roofs"}


def area_cap_unknown(facts: Facts) -> Iterator[Finding]:
    """An area cap that could not be checked while openings of its kind are entered."""
    categories = {element.category for element in facts.project.elements.values()}
    skylights = "fenestration.skylight" in categories
    windows = any(c.startswith("fenestration.") for c in categories - {"fenestration.skylight"})
    for ratio in facts.ratios:
        asked = skylights if ratio.name == "skylight_roof_ratio" else windows
        if not ratio.missing or not asked:
            continue
        yield Finding(
            "area-cap-unknown",
            "E" if facts.project.surfaces else "W",
            RATIO_OF.get(ratio.name, ratio.name),
            "",
            f"the cap of {ratio.clause} ({ratio.most or 0:.0%}) was not checked: missing "
            f"{ratio.missing[0]}",
            "above the cap the rows of these openings would not apply",
            "the facades and roofs under surfaces, with their gross areas",
        )


CHECKS = (
    Check("area-cap-unknown", "Area cap that could not be checked", area_cap_unknown, CERTAIN),
    Check("surface-does-not-close", "Areas do not add up to the surface", does_not_close, CERTAIN),
    Check("surface-without-element", "Surface without elements", without_element, CERTAIN),
    Check("part-missing", "Part of the envelope missing", part_missing, LOOK),
    Check("element-without-surface", "Element on no surface", without_surface, LOOK),
)
