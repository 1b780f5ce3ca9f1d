"""What an assembly is before any method: what it stores, what frames it, what insulates it."""

from __future__ import annotations

from collections.abc import Sequence

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
from envcheck.model.ruleset import TableRow
from envcheck.model.solved import Properties
from envcheck.solve.cautions import is_insulation
from envcheck.solve.conventions import ventilated_at
from envcheck.solve.mass import Mass, mass_of, together
from envcheck.solve.methods.compressed import fill_in_place
from envcheck.solve.methods.framed import is_metal

NOT_WEIGHED = Mass(None, None)


def properties(
    assembly: Assembly, compressed: Sequence[TableRow] = (), weighed: bool = True
) -> Properties:
    """Collect the properties of a layered assembly.

    compressed: rows of the table of compressed batts. weighed: whether weight and heat capacity
    are asked for; without, they are None and nothing is missing. A well-ventilated air space and
    what lies outside of it count in the heat capacity of the whole, and in nothing else.
    """
    inner = inside_of_vent(assembly.layers)
    resistances = [insulation_resistance(layer) for layer in inner]
    whole = indoor = NOT_WEIGHED
    if weighed:
        masses = [mass_of(layer) for layer in assembly.layers]
        whole = together(masses)
        indoor = together(masses[len(masses) - indoor_count(resistances) :])
    continuous = sum([resistance or 0.0 for resistance in resistances])
    return Properties(
        heat_capacity=whole.heat_capacity,
        heat_capacity_indoor=indoor.heat_capacity,
        weight=whole.weight,
        weight_indoor=indoor.weight,
        missing=whole.missing,
        framing=framing(inner),
        cavity_resistance=_cavity_resistance(inner, compressed),
        continuous_resistance=continuous,
        crossed=_crossed(inner),
        bracketed=_bracketed(assembly) if continuous > 0 else (),
        label_sum=_label_sum(inner, resistances),
        combustible=tuple([layer.title for layer in assembly.layers if is_combustible(layer)]),
    )


def inside_of_vent(layers: tuple[Layer, ...]) -> tuple[Layer, ...]:
    """The layers indoors of the innermost well-ventilated air space; all where there is none."""
    at = ventilated_at(layers)
    return layers if at is None else layers[at + 1 :]


def indoor_count(resistances: Sequence[float | None]) -> int:
    """How many layers lie indoors of the first continuous insulation, from the indoor face.

    resistances: of the continuous insulation, layer by layer; None for other layers.
    """
    for count, resistance in enumerate(reversed(resistances)):
        if resistance is not None:
            return count
    return len(resistances)


def insulation_resistance(layer: Layer) -> float | None:
    """Resistance of a layer of continuous insulation, m2 K/W; None for any other layer.

    A tapered layer counts at its least thickness; insulation between members is not continuous.
    """
    if isinstance(layer, MaterialLayer) and is_insulation(layer.material):
        return layer.thickness / layer.material.conductivity
    if isinstance(layer, ResistanceLayer) and is_insulation(layer.material):
        return layer.resistance
    if isinstance(layer, TaperedLayer) and is_insulation(layer.material):
        return layer.least / layer.material.conductivity
    return None


def framing(layers: Sequence[Layer]) -> str:
    """What the main framing is: ``steel`` before ``wood`` before ``none``."""
    frames = [x for x in layers if isinstance(x, FramedLayer) and not x.crosses_insulation]
    if any(is_metal(layer) for layer in frames):
        return "steel"
    return "wood" if frames else "none"


def is_combustible(layer: Layer) -> bool:
    """Whether any material that the layer names is combustible."""
    if isinstance(layer, MaterialLayer):
        return layer.material.combustible
    return any(material.combustible for material in _materials(layer))


def _materials(layer: Layer) -> list[Material]:
    found: list[Material | None] = []
    if isinstance(layer, MaterialLayer | ResistanceLayer | TaperedLayer):
        found = [layer.material]
    elif isinstance(layer, FramedLayer):
        extras = [extra.material for extra in layer.extras]
        found = [layer.member.material, layer.fill.material, *extras]
    elif isinstance(layer, MasonryLayer):
        found = [layer.material, layer.fill.material, layer.mortar, layer.grout]
    elif isinstance(layer, SectionLayer):
        found = [piece.material for piece in layer.pieces]
    return [material for material in found if material is not None]


def _cavity_resistance(layers: Sequence[Layer], compressed: Sequence[TableRow]) -> float | None:
    """Insulation between the members of the main framing, in place."""
    values = [
        value
        for layer in layers
        if isinstance(layer, FramedLayer) and not layer.crosses_insulation
        for value in [_fill_resistance(layer, compressed)]
        if value is not None
    ]
    return sum(values) if values else None


def _fill_resistance(layer: FramedLayer, compressed: Sequence[TableRow]) -> float | None:
    placed = fill_in_place(layer.fill, layer.thickness, compressed)
    if placed is not None:
        return placed.resistance
    if layer.fill.material is not None and is_insulation(layer.fill.material):
        return layer.thickness / layer.fill.material.conductivity
    return None


def _crossed(layers: Sequence[Layer]) -> tuple[str, ...]:
    return tuple(
        f"{layer.title}: crossed by {layer.member.material.title}"
        for layer in layers
        if isinstance(layer, FramedLayer) and layer.crosses_insulation
    )


def _bracketed(assembly: Assembly) -> tuple[str, ...]:
    return tuple(bridge.title for bridge in assembly.bridges if bridge.kind == "point")


def _label_sum(layers: Sequence[Layer], resistances: Sequence[float | None]) -> float | None:
    """All insulation as labelled, between members or not."""
    labels = [resistance for resistance in resistances if resistance is not None]
    for layer in layers:
        if isinstance(layer, FramedLayer):
            label = layer.fill.label
            value = label if label is not None else _fill_resistance(layer, ())
            if value is not None:
                labels.append(value)
    return sum(labels) if labels else None
