"""Insulation on ceiling tiles that can be lifted."""

from __future__ import annotations

from collections.abc import Iterator

from envcheck.judge.crosschecks import Check, Facts
from envcheck.judge.readings import recomputed
from envcheck.judge.words import names, system, u_factor
from envcheck.model.judged import LIKELY, LOOK, Finding
from envcheck.model.layers import MaterialLayer, ResistanceLayer
from envcheck.model.project import Assembly
from envcheck.model.solved import Solved

TILES = ("ceiling tile", "ceiling tiles")
CEILINGS = ("suspended ceiling", "drop ceiling", "dropped ceiling", "lay in")


def on_tiles(facts: Facts) -> Iterator[Finding]:
    """Layers that are said to lie on tiles, and insulation just above what is named like tiles."""
    for assembly in facts.project.assemblies.values():
        said = [
            (number, layer.title)
            for number, layer in enumerate(assembly.layers, 1)
            if isinstance(layer, (MaterialLayer, ResistanceLayer)) and layer.removable
        ]
        if said:
            yield _said(facts, assembly, said)
        elif (pair := _above_tiles(assembly)) is not None:
            yield Finding(
                "on-removable-tiles",
                "W",
                assembly.id,
                assembly.sheet,
                f"{pair[0]} lies on {pair[1]}",
                "insulation on tiles that can be lifted does not stay in place; many codes count "
                "nothing for it",
                "'removable: true' on the layer, or how it is held without the tiles",
                sure=LOOK,
            )


def _above_tiles(assembly: Assembly) -> tuple[str, str] | None:
    for upper, lower in zip(assembly.layers, assembly.layers[1:], strict=False):
        material = getattr(upper, "material", None)
        insulating = material is not None and material.material_class == "insulation"
        if insulating and names(lower.title, *TILES, *CEILINGS):
            return upper.title, lower.title
    return None


def _said(facts: Facts, assembly: Assembly, layers: list[tuple[int, str]]) -> Finding:
    suggests = "many codes count nothing for insulation that is moved with the tiles"
    solved = facts.solved.get(assembly.id)
    without = _without(solved, [number for number, _ in layers]) if solved is not None else None
    if without is not None and solved is not None and solved.value is not None:
        units = system(facts.project, facts.rulesets)
        suggests += f"; without it U is {u_factor(without, units)}, with it "
        suggests += u_factor(solved.value, units)
    return Finding(
        "on-removable-tiles",
        "E",
        assembly.id,
        assembly.sheet,
        f"{' and '.join(title for _, title in layers)} on ceiling tiles that can be lifted",
        suggests,
        "insulation that is fixed at the deck, or the clause that counts it on tiles",
    )


def _without(solved: Solved, numbers: list[int]) -> float | None:
    """U without some layers, W/(m2 K); None where the worksheet does not tell."""
    if solved.tree is None or solved.clear is None or solved.value is None:
        return None
    left = recomputed(solved.tree, {f"R{number}": 0.0 for number in numbers})
    return 1.0 / left + solved.value - solved.clear if left > 0 else None


CHECKS = (Check("on-removable-tiles", "Insulation on removable ceiling tiles", on_tiles, LIKELY),)
