"""Reflective air spaces that lie just behind a cladding."""

from __future__ import annotations

from collections.abc import Iterator

from envcheck.judge.crosschecks import Check, Facts
from envcheck.model.judged import LOOK, Finding
from envcheck.model.layers import AirSpaceLayer, FramedLayer, Layer

REFLECTIVE = 0.5
"""Emittance below which a face makes a space reflective; ordinary faces have about 0.9."""


def behind_cladding(facts: Facts) -> Iterator[Finding]:
    """A reflective space with nothing but cladding outside of it."""
    for assembly in facts.project.assemblies.values():
        for number, layer in enumerate(assembly.layers):
            if not isinstance(layer, AirSpaceLayer) or layer.ventilation == "well":
                continue
            outside = assembly.layers[:number]
            if not outside or min(layer.emittances) >= REFLECTIVE or any(map(_tight, outside)):
                continue
            yield Finding(
                "reflective-behind-cladding",
                "W",
                assembly.id,
                assembly.sheet,
                f"{layer.title} with an emittance of {min(layer.emittances):g} lies behind "
                f"{outside[-1].title}, {_state(layer)}",
                "behind a cladding that air passes it keeps a part of its value at best; codes ask "
                "that it be enclosed and inside the air barrier",
                "the air barrier outside of it on the drawing, 'ventilation: well', or an ordinary "
                "emittance",
            )


def _tight(layer: Layer) -> bool:
    """Whether a layer is part of the wall proper: framed, or an insulation."""
    material = getattr(layer, "material", None)
    insulating = material is not None and material.material_class == "insulation"
    return isinstance(layer, FramedLayer) or insulating


def _state(layer: AirSpaceLayer) -> str:
    return "slightly ventilated" if layer.ventilation == "slightly" else "entered as unventilated"


CHECKS = (
    Check(
        "reflective-behind-cladding", "Reflective space behind a cladding", behind_cladding, LOOK
    ),
)
