"""Framed classes without framing, and metal framing counted by a method for wood."""

from __future__ import annotations

from collections.abc import Iterator, Sequence

from envcheck.judge.crosschecks import Check, Facts
from envcheck.judge.crosschecks.continuous import is_metal
from envcheck.judge.words import lines_by_assembly, listed, method, system, u_factor
from envcheck.model.judged import CERTAIN, LIKELY, Finding, Line
from envcheck.model.layers import FramedLayer, MaterialLayer, ResistanceLayer
from envcheck.model.patterns import in_words
from envcheck.model.project import Assembly

FRAMED = ("wall.steel_frame", "wall.wood_frame", "floor.framed", "floor.steel_joist", "roof.rafter")
"""Classes with insulation between members."""
WOOD = "wall.wood_frame"
FOR_WOOD = ("parallel_path", "series")
"""Methods that overlook the heat that runs sideways into metal."""


def framing_missing(facts: Facts) -> Iterator[Finding]:
    """A framed class whose assembly has insulation and no members."""
    claimed: dict[str, list[str]] = {}
    for element in facts.project.elements.values():
        if element.category in FRAMED:
            claimed.setdefault(element.assembly, []).append(element.tag)
    for name, tags in claimed.items():
        assembly = facts.project.assemblies[name]
        if assembly.kind != "layers" or _holds_framing(assembly):
            continue
        insulation = _insulation(assembly)
        if not insulation:
            continue
        category = in_words(facts.project.elements[tags[0]].category)
        yield Finding(
            "framing-missing",
            "E",
            name,
            assembly.sheet,
            f"{listed(tags)} entered as {category}; {name} has {listed(insulation)} and no framing",
            "insulation that stands between members was entered as a whole layer; its label is not "
            "the value of the assembly",
            "the members with their spacing (where the cavity is empty, with an air space), or a "
            "class without framing",
        )


def _insulation(assembly: Assembly) -> list[str]:
    return [
        layer.title
        for layer in assembly.layers
        if isinstance(layer, (MaterialLayer, ResistanceLayer))
        and layer.material is not None
        and layer.material.material_class == "insulation"
    ]


def _holds_framing(assembly: Assembly) -> bool:
    return any(
        isinstance(layer, FramedLayer)
        or (isinstance(layer, ResistanceLayer) and layer.value_basis == "includes_framing")
        for layer in assembly.layers
    )


def metal_as_wood(facts: Facts) -> Iterator[Finding]:
    """Metal members in the class of wood, or whose value comes from plain parallel paths."""
    for name, lines in lines_by_assembly(facts.lines, facts.project).items():
        assembly = facts.project.assemblies[name]
        metal = [
            layer
            for layer in assembly.layers
            if isinstance(layer, FramedLayer) and not layer.crosses_insulation and is_metal(layer)
        ]
        asked = [line for line in lines if line.category == WOOD or _for_wood(line)]
        if metal and asked:
            yield _metal(facts, assembly, metal[0], asked)


def _for_wood(line: Line) -> bool:
    return line.solved is not None and line.solved.setting.method in FOR_WOOD


def _metal(facts: Facts, assembly: Assembly, layer: FramedLayer, lines: Sequence[Line]) -> Finding:
    line, solved = lines[0], lines[0].solved
    seen = f"metal members ({layer.title}) entered as {in_words(line.category)}"
    if solved is not None and _for_wood(line):
        seen += f", counted by {method(solved.setting.method)} ({solved.setting.method_from})"
    suggests = ["parallel paths, which serve wood, miss the heat that metal draws from the sides"]
    if solved is not None and solved.low is not None and solved.high is not None:
        units = system(facts.project, facts.rulesets)
        ends = f"{u_factor(solved.low, units)} and {u_factor(solved.high, units)}"
        suggests.append(f"the drawn pieces lie between {ends}")
        if line.low is not None and line.high is not None and line.low.within != line.high.within:
            suggests.append("the limit lies between them")
    return Finding(
        "metal-as-wood",
        "E",
        assembly.id,
        assembly.sheet,
        seen,
        "; ".join(suggests),
        "the class of a metal frame with the method that the code has for it, a table or a test",
    )


CHECKS = (
    Check("framing-missing", "Framed class without framing", framing_missing, LIKELY),
    Check("metal-as-wood", "Metal framing counted like wood", metal_as_wood, CERTAIN),
)
