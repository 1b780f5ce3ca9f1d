"""Assemblies that nothing uses."""

from __future__ import annotations

from collections.abc import Iterator

from envcheck.judge.crosschecks import Check, Facts
from envcheck.model.judged import LIKELY, Finding


def assembly_unused(facts: Facts) -> Iterator[Finding]:
    """An assembly that no element is made of and no surface shows."""
    project = facts.project
    used = {element.assembly for element in project.elements.values()}
    used |= {mark.tag for surface in project.surfaces.values() for mark in surface.shows}
    for assembly in project.assemblies.values():
        if assembly.id in used:
            continue
        yield Finding(
            "assembly-unused",
            "W",
            assembly.id,
            assembly.sheet,
            f"{assembly.title or assembly.id} is described, no element and no surface names it",
            "it is left from an earlier scheme, or its element is left out",
            "the element that it belongs to, or the file without it",
        )


CHECKS = (Check("assembly-unused", "Assembly that nothing uses", assembly_unused, LIKELY),)
