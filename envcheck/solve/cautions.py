"""Which cautions an assembly triggers, and by what."""

from __future__ import annotations

from envcheck.model.project import (
    AirSpaceLayer,
    Assembly,
    FramedLayer,
    Layer,
    MasonryLayer,
    Material,
    MaterialLayer,
    ResistanceLayer,
    TaperedLayer,
)
from envcheck.model.solved import Caution
from envcheck.solve.conventions import ventilated_at

THICK_OUTSIDE = 0.05
"""m of insulation outside the structure from which attachment is worth a word; common practice,
no source."""


def cautions(assembly: Assembly) -> tuple[Caution, ...]:
    """Cautions of one assembly, each with the reason that triggered it."""
    found: list[Caution] = []
    insulated = [layer for layer in assembly.layers if insulation_of(layer)]
    if insulated:
        titles = ", ".join(layer.title for layer in insulated)
        found.append(Caution("moisture", f"{assembly.id}: insulation in {titles}"))
    vented = ventilated_at(assembly.layers)
    inner = _inside_of_masonry(assembly.layers[0 if vented is None else vented + 1 :])
    if inner is not None:
        reason = f"{assembly.id}: {inner.title} inside solid or hollow masonry"
        found.append(Caution("solid_masonry", reason))
    found += _fire(assembly)
    found += _structure(assembly)
    if assembly.kind in ("slab-on-grade", "below-grade-wall"):
        found.append(Caution("ground", f"{assembly.id}: {assembly.title}"))
    return tuple(found)


def insulation_of(layer: Layer) -> bool:
    """Whether a layer is insulation or holds insulation between its members."""
    if isinstance(layer, FramedLayer):
        fill = layer.fill
        return fill.label is not None or is_insulation(fill.material)
    if isinstance(layer, MaterialLayer | TaperedLayer | ResistanceLayer):
        return is_insulation(layer.material)
    return False


def is_insulation(material: Material | None) -> bool:
    """Whether a material belongs to an insulation class."""
    return material is not None and material.material_class.startswith("insulation")


def _inside_of_masonry(layers: tuple[Layer, ...]) -> Layer | None:
    masonry = [i for i, layer in enumerate(layers) if _is_masonry(layer)]
    if not masonry:
        return None
    inner = [layer for layer in layers[masonry[-1] + 1 :] if insulation_of(layer)]
    return inner[0] if inner else None


def _is_masonry(layer: Layer) -> bool:
    if isinstance(layer, MasonryLayer):
        return True
    material = layer.material if isinstance(layer, MaterialLayer | ResistanceLayer) else None
    return material is not None and material.material_class in ("masonry", "stone")


def _fire(assembly: Assembly) -> list[Caution]:
    found = []
    burning = [layer.title for layer in assembly.layers if is_combustible(layer)]
    if burning:
        found.append(Caution("fire", f"{assembly.id}: combustible {', '.join(burning)}"))
    if any(isinstance(x, AirSpaceLayer) and x.ventilation == "well" for x in assembly.layers):
        found.append(Caution("fire", f"{assembly.id}: ventilated cavity"))
    return found


def is_combustible(layer: Layer) -> bool:
    """Whether the insulation of a layer is marked combustible."""
    if isinstance(layer, FramedLayer):
        return layer.fill.material is not None and layer.fill.material.combustible
    material = (
        layer.material
        if isinstance(layer, MaterialLayer | TaperedLayer | ResistanceLayer)
        else None
    )
    return material is not None and material.combustible


def _structure(assembly: Assembly) -> list[Caution]:
    found = []
    for bridge in assembly.bridges:
        found.append(Caution("structure", f"{assembly.id}: {bridge.title}"))
    for layer in assembly.layers:
        if isinstance(layer, TaperedLayer):
            found.append(Caution("structure", f"{assembly.id}: roof build-up of {layer.title}"))
        elif isinstance(layer, FramedLayer) and layer.crosses_insulation:
            found.append(Caution("structure", f"{assembly.id}: {layer.title}"))
        elif (
            isinstance(layer, MaterialLayer)
            and is_insulation(layer.material)
            and layer.thickness >= THICK_OUTSIDE
            and layer is not assembly.layers[-1]
        ):
            reason = f"{assembly.id}: attachment through {layer.title}"
            found.append(Caution("structure", reason))
    return found
