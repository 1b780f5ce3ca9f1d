"""Surface films entered as layers or of another direction, and soil in a C-factor."""

from __future__ import annotations

from collections.abc import Iterator

from envcheck.judge.crosschecks import Check, Facts
from envcheck.judge.words import lines_by_assembly, names, resistance, system
from envcheck.model.judged import CERTAIN, LIKELY, Finding
from envcheck.model.layers import ContactLayer, MaterialLayer, ResistanceLayer
from envcheck.model.project import Assembly

NAMED = ("film", "films", "surface resistance", "still air", "outside air", "inside air")
LEAST, MOST = 0.02, 0.2
"""m2 K/W; between the films of a windy outer and of a sheltered inner face."""
DIRECTIONS = {"up": (0.09, 0.112), "horizontal": (0.115, 0.135), "down": (0.155, 0.18)}
"""Inside films, m2 K/W: 0.10, 0.13, 0.17 of ISO 6946:2017, Table 7; R-0.61, 0.68, 0.92 of
handbooks (from memory)."""
WORDS = {"up": "upwards", "horizontal": "sideways", "down": "downwards"}
BELOW_GRADE = "below-grade-wall"


def film_as_layer(facts: Facts) -> Iterator[Finding]:
    """A layer that is a film by its name and value, on the outer or the inner face."""
    units = system(facts.project, facts.rulesets)
    for assembly in facts.project.assemblies.values():
        layers = assembly.layers
        for layer in dict.fromkeys((*layers[:1], *layers[-1:])):
            if not isinstance(layer, ResistanceLayer | ContactLayer):
                continue
            if not LEAST <= layer.resistance <= MOST or not names(layer.title, *NAMED):
                continue
            below = assembly.kind == BELOW_GRADE
            yield Finding(
                "film-as-layer",
                "E" if below else "W",
                assembly.id,
                assembly.sheet,
                f"layer {layer.title!r} of {resistance(layer.resistance, units)} on a face",
                "a C-factor is that of the layers alone, without films"
                if below
                else "the surface films are counted already, by the rule set or as stated",
                "the layers without it"
                if below
                else "the layers without it, or outside_film and "
                "inside_film where the drawing states them",
            )


def film_direction(facts: Facts) -> Iterator[Finding]:
    """A stated inside film that belongs to another direction of heat flow, or none at all."""
    units = system(facts.project, facts.rulesets)
    for name, lines in lines_by_assembly(facts.lines, facts.project).items():
        assembly = facts.project.assemblies[name]
        film = assembly.inside_film
        solved = [x.solved for x in lines if x.solved is not None]
        flows = dict.fromkeys(s.setting.direction for s in solved)
        if film is None or not solved:
            continue
        belongs = [word for word, (low, high) in DIRECTIONS.items() if low <= film <= high]
        if film > 0 and (not belongs or belongs[0] in flows):
            continue
        seen = f"inside_film {resistance(film, units)} stated; heat flows "
        seen += " and ".join(WORDS[flow] for flow in flows)
        yield Finding(
            "film-direction",
            "W",
            name,
            assembly.sheet,
            seen,
            f"it is the film of heat flowing {WORDS[belongs[0]]}" if belongs else "it is left out",
            "the film of that direction, or no stated film: the rule set then gives it",
        )


def soil_in_c_factor(facts: Facts) -> Iterator[Finding]:
    """Ground counted as a layer of a wall below grade."""
    for assembly in facts.project.assemblies.values():
        soil = _soil(assembly)
        if assembly.kind == BELOW_GRADE and soil:
            yield Finding(
                "soil-in-c-factor",
                "E",
                assembly.id,
                assembly.sheet,
                f"layer {soil[0]!r} of a wall below grade is ground",
                "a C-factor is that of the wall alone, without soil and films",
                "the layers without it",
            )


def _soil(assembly: Assembly) -> list[str]:
    return [
        layer.title
        for layer in assembly.layers
        if isinstance(layer, (MaterialLayer, ResistanceLayer))
        and layer.material is not None
        and layer.material.material_class == "soil"
    ]


CHECKS = (
    Check("film-as-layer", "Surface film entered as a layer", film_as_layer, LIKELY),
    Check("film-direction", "Film of another direction", film_direction, LIKELY),
    Check("soil-in-c-factor", "Soil counted in a C-factor", soil_in_c_factor, CERTAIN),
)
