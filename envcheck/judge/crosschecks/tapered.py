"""Tapered insulation entered at one thickness, or thinner than the code allows."""

from __future__ import annotations

from collections.abc import Iterator

from envcheck.judge.crosschecks import Check, Facts
from envcheck.judge.words import length, lines_by_assembly, names, system
from envcheck.model.judged import CERTAIN, LIKELY, Finding
from envcheck.model.layers import MaterialLayer, ResistanceLayer, TaperedLayer

TAPER = ("taper", "tapered")
MEAN = ("average", "avg", "mean")


def taper_as_plain(facts: Facts) -> Iterator[Finding]:
    """A plain layer that is tapered by its name."""
    for name, lines in lines_by_assembly(facts.lines, facts.project).items():
        assembly = facts.project.assemblies[name]
        conventions = facts.rulesets[lines[0].ruleset].conventions
        permitted = conventions.tapered == "mean"
        for layer in assembly.layers:
            if not isinstance(layer, (MaterialLayer, ResistanceLayer)):
                continue
            material, mean = layer.material, names(layer.title, *MEAN)
            insulating = material is None or material.material_class == "insulation"
            if not insulating or not (mean or names(layer.title, *TAPER)):
                continue
            where = conventions.where.get("tapered", "")
            yield Finding(
                "taper-as-plain",
                "N" if permitted else "E" if mean else "W",
                name,
                assembly.sheet,
                f"{layer.title!r} is entered as a layer of one thickness",
                f"the rule set counts a taper at its mean thickness ({where})"
                if permitted
                else "a taper loses more heat than a layer of its mean thickness: the thin part "
                "weighs more",
                "the layer as tapered, with its least and greatest thickness",
            )


def taper_too_thin(facts: Facts) -> Iterator[Finding]:
    """A taper that runs out thinner than the rule set asks for."""
    units = system(facts.project, facts.rulesets)
    for name, lines in lines_by_assembly(facts.lines, facts.project).items():
        assembly = facts.project.assemblies[name]
        conventions = facts.rulesets[lines[0].ruleset].conventions
        asked = conventions.tapered_least
        for layer in assembly.layers if asked is not None else ():
            if not isinstance(layer, TaperedLayer) or layer.least > (asked or 0.0) - 1e-6:
                continue
            yield Finding(
                "taper-too-thin",
                "E",
                name,
                assembly.sheet,
                f"{layer.title} runs out at {length(layer.least, units)}, at least "
                f"{length(asked or 0.0, units)} is asked for "
                f"({conventions.where.get('tapered', '')})",
                "whatever its mean, the thinnest place is below what the code allows",
                "a thicker edge, or the official's word on it",
            )


CHECKS = (
    Check("taper-as-plain", "Taper entered at one thickness", taper_as_plain, LIKELY),
    Check("taper-too-thin", "Taper thinner than the code allows", taper_too_thin, CERTAIN),
)
