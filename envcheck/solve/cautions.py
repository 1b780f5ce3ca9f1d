"""Which cautions an assembly triggers, and by what."""

from __future__ import annotations

from envcheck.model.project import (
    Assembly,
    FramedLayer,
    Layer,
    MasonryLayer,
    Material,
    MaterialLayer,
    ResistanceLayer,
    SectionLayer,
    TaperedLayer,
)
from envcheck.model.solved import Caution
from envcheck.solve.conventions import ventilated_at

THICK_OUTSIDE = 0.05
"""m of insulation outside the structure from which attachment is worth a word; common practice,
no source."""


MASONRY = ("masonry", "stone")
"""Classes of material that make a wall of masonry."""


IN_THE_GROUND = (
    "slab-on-grade", "below-grade-wall", "suspended-floor", "heated-basement", "unheated-basement",
)  # fmt: skip


def cautions(assembly: Assembly) -> tuple[Caution, ...]:
    """Cautions of one assembly, each with the reason that triggered it."""
    if assembly.basement is not None:
        own = assembly._replace(basement=None)
        stacks = [own, *(own._replace(layers=layers) for _, layers in assembly.basement.others)]
        return tuple(dict.fromkeys(caution for one in stacks for caution in cautions(one)))
    found: list[Caution] = []
    vented = ventilated_at(assembly.layers)
    insulated, burning, structural = [], [], [bridge.title for bridge in assembly.bridges]
    behind_masonry = ""
    masonry = False
    innermost = len(assembly.layers) - 1
    for number, layer in enumerate(assembly.layers):
        insulation = insulation_of(layer)
        if insulation:
            insulated.append(layer.title)
            if masonry and not behind_masonry:
                behind_masonry = layer.title
        if is_combustible(layer):
            burning.append(layer.title)
        if not masonry and (vented is None or number > vented):
            masonry = _is_masonry(layer)
        if insulation or layer.kind != "material":
            words = _attachment(layer, number == innermost)
            if words:
                structural.append(words)
    if insulated:
        found.append(Caution("moisture", f"{assembly.id}: insulation in {', '.join(insulated)}"))
    if behind_masonry:
        reason = f"{assembly.id}: {behind_masonry} inside solid or hollow masonry"
        found.append(Caution("solid_masonry", reason))
    if burning:
        found.append(Caution("fire", f"{assembly.id}: combustible {', '.join(burning)}"))
    if vented is not None:
        found.append(Caution("fire", f"{assembly.id}: ventilated cavity"))
    found += [Caution("structure", f"{assembly.id}: {words}") for words in structural]
    if assembly.kind in IN_THE_GROUND:
        found.append(Caution("ground", f"{assembly.id}: {assembly.title}"))
    return tuple(found)


def insulation_of(layer: Layer) -> bool:
    """Whether a layer is insulation or holds insulation between its members."""
    if isinstance(layer, (MaterialLayer, TaperedLayer, ResistanceLayer)):
        return is_insulation(layer.material)
    if isinstance(layer, (FramedLayer, MasonryLayer)):
        return layer.fill.label is not None or is_insulation(layer.fill.material)
    if isinstance(layer, SectionLayer):
        return any(is_insulation(piece.material) for piece in layer.pieces)
    return False


def is_insulation(material: Material | None) -> bool:
    """Whether a material belongs to an insulation class."""
    return material is not None and material.material_class.startswith("insulation")


def is_combustible(layer: Layer) -> bool:
    """Whether the material of a layer, or of its infill, is marked combustible."""
    if isinstance(layer, MaterialLayer):
        return layer.material.combustible
    if isinstance(layer, (FramedLayer, MasonryLayer)):
        return layer.fill.material is not None and layer.fill.material.combustible
    if isinstance(layer, SectionLayer):
        return any(p.material is not None and p.material.combustible for p in layer.pieces)
    if not isinstance(layer, (TaperedLayer, ResistanceLayer)) or layer.material is None:
        return False
    return layer.material.combustible


def _is_masonry(layer: Layer) -> bool:
    if isinstance(layer, (MaterialLayer, ResistanceLayer)):
        return layer.material is not None and layer.material.material_class in MASONRY
    if isinstance(layer, SectionLayer):
        return any(
            p.material is not None and p.material.material_class in MASONRY for p in layer.pieces
        )
    return isinstance(layer, MasonryLayer)


def _attachment(layer: Layer, innermost: bool) -> str:
    """What a layer loads or must be fixed through, in words, or nothing."""
    if isinstance(layer, MaterialLayer):
        thick = layer.thickness >= THICK_OUTSIDE and not innermost
        return f"attachment through {layer.title}" if thick and insulation_of(layer) else ""
    if isinstance(layer, TaperedLayer):
        return f"roof build-up of {layer.title}"
    crossed = isinstance(layer, FramedLayer) and layer.crosses_insulation
    return layer.title if crossed else ""
