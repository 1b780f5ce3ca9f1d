"""The same heat counted twice: values that hold framing, films or air, with these beside them."""

from __future__ import annotations

from collections.abc import Iterator

from envcheck.judge.crosschecks import Check, Facts
from envcheck.model.judged import CERTAIN, LIKELY, Finding
from envcheck.model.layers import AirSpaceLayer, Bridge, FramedLayer, ResistanceLayer
from envcheck.model.project import Assembly


def counted_twice(facts: Facts) -> Iterator[Finding]:
    """Stated values whose basis overlaps with another layer of the assembly."""
    for assembly in facts.project.assemblies.values():
        for number, layer in enumerate(assembly.layers):
            if isinstance(layer, FramedLayer) and layer.fill.value_basis == "includes_framing":
                seen = f"the fill of {layer.title} holds the framing, and stands between members"
                yield _finding(assembly, seen, CERTAIN)
            if isinstance(layer, FramedLayer) and layer.fill.value_basis == "includes_films":
                seen = f"the fill of {layer.title} holds surface films"
                yield _finding(assembly, seen, CERTAIN)
            if isinstance(layer, ResistanceLayer):
                found = _overlap(assembly, number, layer)
                if found is not None:
                    yield _finding(assembly, *found)


def _overlap(assembly: Assembly, number: int, layer: ResistanceLayer) -> tuple[str, str] | None:
    """What a layer counts again, and how sure that is."""
    if layer.value_basis == "includes_films":
        below = assembly.kind == "below-grade-wall"
        counted = "a C-factor leaves films out" if below else "films are counted besides"
        return f"the value of {layer.title} holds surface films, and {counted}", CERTAIN
    near = assembly.layers[max(number - 1, 0) : number + 2]
    air = next((x.title for x in near if isinstance(x, AirSpaceLayer)), "")
    if layer.value_basis == "includes_air_space" and air:
        return f"the value of {layer.title} holds its air space, and {air} is a layer", CERTAIN
    framed = next((x.title for x in assembly.layers if isinstance(x, FramedLayer)), "")
    if layer.value_basis == "includes_framing" and framed:
        seen = f"the value of {layer.title} holds framing, and {framed} is a layer"
        return seen, LIKELY
    return None


def _finding(assembly: Assembly, seen: str, sure: str) -> Finding:
    return Finding(
        "counted-twice",
        "E",
        assembly.id,
        assembly.sheet,
        seen,
        "one part of the wall is counted twice",
        "the bare value of the layer, or the assembly without what the value holds",
        sure=sure,
    )


def bridge_twice(facts: Facts) -> Iterator[Finding]:
    """A bridge of an element that its assembly holds already."""
    for element in facts.project.elements.values():
        assembly = facts.project.assemblies[element.assembly]
        spread = {_same(bridge) for bridge in assembly.bridges}
        for bridge in element.bridges:
            if _same(bridge) in spread:
                yield Finding(
                    "bridge-twice",
                    "W",
                    element.tag,
                    element.sheet,
                    f"{bridge.title} is a bridge of {element.tag} and of {assembly.id}",
                    "its heat is counted twice",
                    f"the bridge in one place: {assembly.id} per area, or {element.tag} by length",
                )


def _same(bridge: Bridge) -> tuple[str, str]:
    return bridge.kind, bridge.title.casefold()


CHECKS = (
    Check("counted-twice", "Counted twice", counted_twice, CERTAIN),
    Check("bridge-twice", "Bridge of an element and of its assembly", bridge_twice, LIKELY),
)
