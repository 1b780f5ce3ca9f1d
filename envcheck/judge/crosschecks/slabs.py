"""Slab edges: an open top edge, heating that two places state differently."""

from __future__ import annotations

from collections.abc import Iterator

from envcheck.judge.crosschecks import Check, Facts
from envcheck.judge.words import resistance, system
from envcheck.model.judged import CERTAIN, Finding
from envcheck.model.project import Assembly, Element


def _slabs(facts: Facts) -> Iterator[tuple[Element, Assembly]]:
    for element in facts.project.elements.values():
        assembly = facts.project.assemblies[element.assembly]
        if assembly.slab is not None:
            yield element, assembly


def top_edge_open(facts: Facts) -> Iterator[Finding]:
    """Vertical edge insulation whose top is stated as not covered."""
    units = system(facts.project, facts.rulesets)
    for element, assembly in _slabs(facts):
        slab = assembly.slab
        assert slab is not None, "only slabs are looked at"
        if slab.insulation != "vertical" or slab.top_edge_covered is not False:
            continue
        if slab.resistance > 0:
            yield Finding(
                "top-edge-open",
                "E",
                element.tag,
                assembly.sheet,
                f"{resistance(slab.resistance, units)} at the edge of {assembly.id}, its top edge "
                "not covered",
                "the heat leaves over the top edge: it counts as not insulated",
                "the detail with the top edge covered, or the slab without insulation",
            )


def heating_differs(facts: Facts) -> Iterator[Finding]:
    """A slab that is heated in one place of the file and not in another."""
    stated = next((f for f in facts.project.facts if f.name == "slab_heated"), None)
    for element, assembly in _slabs(facts):
        fact = next((f for f in element.facts if f.name == "slab_heated"), stated)
        heated = assembly.slab.heated if assembly.slab is not None else None
        if fact is None or heated is None or (fact.value == "yes") == heated:
            continue
        yield Finding(
            "slab-heating-differs",
            "E",
            element.tag,
            fact.sheet or assembly.sheet,
            f"{assembly.id} is {'heated' if heated else 'not heated'}; fact slab_heated says "
            f"{fact.value}",
            "the slab is held against the limit of another kind of slab",
            "the mechanical drawing, and both places with what it shows",
        )


CHECKS = (
    Check("top-edge-open", "Top edge of a slab not covered", top_edge_open, CERTAIN),
    Check("slab-heating-differs", "Slab heated and not heated", heating_differs, CERTAIN),
)
