"""What stands beside the layers of an assembly: voids, rain, and how the layers are bent."""

from __future__ import annotations

from envcheck.model.additions import Curved, Inverted, Voids
from envcheck.model.project import Layer, MaterialLayer, ResistanceLayer
from envcheck.read.context import Context
from envcheck.read.yaml_reader import Entry


def read_voids(context: Context, entry: Entry, layers: tuple[Layer, ...]) -> Voids:
    """Read the level of air voids of one layer."""
    known_layer(context, entry, layers)
    return Voids(entry["layer"], entry["level"], entry.line)


def read_inverted(context: Context, entry: Entry, layers: tuple[Layer, ...]) -> Inverted:
    """Read what rain does to insulation above the waterproofing."""
    if known_layer(context, entry, layers) and layers[-1].title == entry["layer"]:
        context.add(
            "layer-out-of-place",
            entry.lines["layer"],
            found=entry["layer"],
            expected="a layer with the waterproofing below it",
            name=entry["layer"],
            why="the innermost layer cannot lie above the waterproofing",
            hint="name the layer above the waterproofing; layers run from outside to inside",
        )
    factors = ("drainage_factor", "heat_loss_factor")
    for key, other in (factors, factors[::-1]):
        if key in entry and other not in entry:
            hint = ", or neither: f x is then 0.04"
            where = "the inverted roof"
            context.add("missing-key", entry.line, key=other, where=where, hint=hint)
    return Inverted(
        layer=entry["layer"],
        precipitation=context.not_negative(entry, "precipitation", "rain"),
        drainage=entry.get("drainage_factor"),
        heat_loss=entry.get("heat_loss_factor"),
        source=entry.get("source", ""),
        line=entry.line,
    )


def known_layer(context: Context, entry: Entry, layers: tuple[Layer, ...]) -> bool:
    """Whether the assembly has a layer of the title that the entry names."""
    titles = [layer.title for layer in layers]
    if entry["layer"] in titles:
        return True
    context.unknown("unknown-layer", entry.lines["layer"], entry["layer"], titles)
    return False


def read_curved(context: Context, entry: Entry, layers: tuple[Layer, ...]) -> Curved:
    """Read how the layers are bent; the other radius follows from their thicknesses."""
    key = context.exactly_one(entry, ("inner_radius", "outer_radius"), "the curved assembly")
    radius = context.positive(entry, key, "length") if key else float("nan")
    total = 0.0
    for layer in layers:
        total += layer.thickness if isinstance(layer, MaterialLayer | ResistanceLayer) else 0.0
        if layer.kind not in ("material", "resistance", "contact"):
            context.add(
                "layer-out-of-place",
                layer.line,
                found=f"kind: {layer.kind}",
                expected="kinds material, resistance and contact",
                name=layer.title,
                why=f"a layer of kind {layer.kind!r} is not bent",
                hint="describe it as a homogeneous layer",
            )
    by_inner = key == "inner_radius"
    inner = radius if by_inner else radius - total
    if key and not by_inner and inner <= 0:
        context.add(
            "out-of-range",
            entry.lines[key],
            found=entry[key],
            expected=f"more than {total * 1000:.4g} mm, the thickness of the layers",
            key=key,
            hint="check the radius and the thicknesses",
        )
    return Curved(entry["shape"], entry["face"], inner, inner + total, by_inner)
