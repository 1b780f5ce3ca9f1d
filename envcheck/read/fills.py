"""What fills a cavity: air spaces, materials, labels."""

from __future__ import annotations

from envcheck.model.project import AirSpaceLayer, Fill
from envcheck.read.context import MATCHES, Context
from envcheck.read.yaml_reader import Entry

ORDINARY_EMITTANCE = 0.9


def read_air_space(context: Context, entry: Entry) -> AirSpaceLayer:
    """Read an air space, as a layer or within a cavity."""
    stated = entry.get("emittances")
    if stated and "emittance" in entry:
        context.exactly_one(entry, ("emittance", "emittances"), "the air space")
    both = entry.get("emittance", ORDINARY_EMITTANCE)
    outer, inner = stated or (both, both)
    return AirSpaceLayer(
        "air-space",
        entry.get("title", "air space"),
        entry.line,
        context.positive(entry, "thickness", "length"),
        entry.get("ventilation", "unventilated"),
        (float(outer), float(inner)),
    )


def read_fill(context: Context, entry: Entry, where: str, depth: float) -> Fill:
    """Read what fills a cavity of this depth, m: one of material, label, resistance, air space."""
    kind = context.exactly_one(entry, ("material", "label", "resistance", "air_space"), where)
    source, evidence = entry.get("source", ""), context.evidence(entry)
    if kind not in ("label", ""):
        product = ("product_thickness", "label_in_place")
        context.out_of_place(entry, product, f"a fill by {kind}", "it belongs beside 'label'")
    if kind == "material":
        return Fill(material=context.material(entry), source=source, evidence=evidence)
    if kind == "air_space":
        return Fill(air=_air_in_cavity(context, entry["air_space"], depth), source=source)
    if kind == "resistance":
        value = context.positive(entry, "resistance", "resistance")
        return Fill(label=value, installed_label=value, source=source, evidence=evidence)
    if kind == "label":
        return Fill(
            label=context.positive(entry, "label", "resistance"),
            product_thickness=context.optional(entry, "product_thickness", "length"),
            installed_label=context.optional(entry, "label_in_place", "resistance"),
            source=source,
            evidence=evidence,
        )
    return Fill()


def _air_in_cavity(context: Context, entry: Entry, depth: float) -> AirSpaceLayer:
    """Air that fills a cavity: as deep as the cavity, and not open to the outside."""
    space = read_air_space(context, entry)
    if abs(space.thickness - depth) > MATCHES:
        found = f"{space.thickness * 1000:.4g} mm in a cavity of {depth * 1000:.4g} mm"
        context.add("air-not-cavity", entry.lines["thickness"], found=found)
    if space.ventilation == "well":
        context.add("ventilated-fill", entry.lines["ventilation"], found="ventilation: well")
    return space


def read_cell(context: Context, entry: Entry) -> tuple[Fill, float | None]:
    """Read the cell of a masonry unit: its fill, or its stated resistance, m2 K/W."""
    kind = context.exactly_one(entry, ("resistance", "material"), "the cell")
    source, evidence = entry.get("source", ""), context.evidence(entry)
    if kind == "material":
        return Fill(material=context.material(entry), source=source, evidence=evidence), None
    if kind == "resistance":
        value = context.positive(entry, "resistance", "resistance")
        return Fill(source=source, evidence=evidence), value
    return Fill(), None
