"""Layers of an assembly: one function per kind, found by the kind's name."""

from __future__ import annotations

from collections.abc import Callable
from typing import Any

from envcheck.model.project import (
    ContactLayer,
    Fill,
    FramedLayer,
    Layer,
    MasonryLayer,
    Material,
    MaterialLayer,
    ResistanceLayer,
)
from envcheck.read.context import Context
from envcheck.read.fills import read_air_space, read_cell
from envcheck.read.framing import read_framed, with_crossed_insulation
from envcheck.read.tapered import read_tapered
from envcheck.read.yaml_reader import Entry
from envcheck.units import states_range


def read_layers(context: Context, entries: list[Any]) -> tuple[Layer, ...]:
    """Read layers from outside to inside; those that the schema refused are None."""
    layers = [_layer(context, entry) for entry in entries if entry is not None]
    if any(layer.kind == "section" for layer in layers):
        from envcheck.read.drawn_checks import check_beside  # few projects draw sections

        check_beside(context, layers)
    if any(isinstance(layer, FramedLayer) for layer in layers):
        return with_crossed_insulation(layers)
    return tuple(layers)


def _layer(context: Context, entry: Entry) -> Layer:
    layer = _KINDS[entry["kind"]](context, entry)
    if "sd" in entry:
        return layer._replace(sd=context.positive(entry, "sd", "length"))
    return layer


def _material(context: Context, entry: Entry) -> Layer:
    material = context.material(entry)
    thickness, span = context.ranged(entry, "thickness", "length")
    title = entry.get("title") or material.title
    return MaterialLayer(
        "material", title, entry.line, material, thickness, span, entry.get("removable", False)
    )


def _resistance(context: Context, entry: Entry) -> Layer:
    material = context.material(entry) if "material" in entry else None
    if states_range(entry["resistance"]):
        resistance, span = context.ranged(entry, "resistance", "resistance")
    else:
        resistance, span = context.not_negative(entry, "resistance", "resistance"), None
    return ResistanceLayer(
        "resistance",
        entry.get("title") or (material.title if material else "stated resistance"),
        entry.line,
        resistance,
        context.optional(entry, "thickness", "length") or 0.0,
        material,
        entry.get("source", ""),
        context.evidence(entry),
        span,
        entry.get("value_basis", ""),
        entry.get("removable", False),
    )


def _contact(context: Context, entry: Entry) -> Layer:
    resistance, span = context.ranged(entry, "resistance", "resistance")
    return ContactLayer(
        "contact",
        entry.get("title", "contact"),
        entry.line,
        resistance,
        entry.get("source", ""),
        span,
    )


# ------------------------------------------------------------------------------------- masonry


def _masonry(context: Context, entry: Entry) -> Layer:
    material = context.material(entry)
    thickness = context.positive(entry, "thickness", "length")
    hollow = "cell" in entry
    for key in ("shell", "web_share", "cell"):
        if (key in entry) != hollow:
            hint = ", or leave out shell, web_share and cell for solid units"
            context.add("missing-key" , entry.line, key=key if key not in entry else "cell",
                        where="the masonry layer", hint=hint)  # fmt: skip
            break
    shell = context.positive(entry, "shell", "length") if "shell" in entry else thickness / 2
    if hollow and "shell" in entry and 2 * shell >= thickness:
        found = f"twice {entry.get('shell')} against {entry['thickness']}"
        limit = "half the thickness of the unit"
        context.add("too-thick", entry.lines["shell"], found=found, key="shell", limit=limit)
    fill, cell = read_cell(context, entry["cell"]) if hollow else (Fill(material=material), None)
    mortar, joints = _part(context, entry, "mortar")
    grout, grouted = _part(context, entry, "grouted")
    return MasonryLayer(
        "masonry",
        entry.get("title") or material.title,
        entry.line,
        thickness,
        material,
        shell,
        context.share(entry, "web_share") if "web_share" in entry else 1.0,
        fill,
        mortar,
        joints,
        grouted,
        grout,
        cell,
        context.optional(entry, "weight", "area_weight"),
        context.optional(entry, "length", "length"),
        entry.get("cells", 2),
    )


def _section(context: Context, entry: Entry) -> Layer:
    from envcheck.read.drawn import read_section

    return read_section(context, entry, read_layers(context, entry.get("layers", [])))


def _part(context: Context, entry: Entry, key: str) -> tuple[Material | None, float]:
    if key not in entry:
        return None, 0.0
    part = entry[key]
    return context.material(part), context.share(part, "share", whole=key == "grouted")


_KINDS: dict[str, Callable[[Context, Entry], Layer]] = {
    "material": _material,
    "resistance": _resistance,
    "contact": _contact,
    "air-space": read_air_space,
    "framed": read_framed,
    "masonry": _masonry,
    "section": _section,
    "tapered": read_tapered,
}
