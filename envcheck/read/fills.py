"""What fills a cavity: air spaces, materials, labels."""

from __future__ import annotations

from envcheck.model.project import AirSpaceLayer, Fill
from envcheck.read.context import MATCHES, Context
from envcheck.read.yaml_reader import Entry

ORDINARY_EMITTANCE = 0.9
SLIGHTLY_ABOVE, WELL_FROM = 500e-6, 1500e-6
"""m2 of openings per m of an upright space, or per m2 of a level one: where an air space begins to
be slightly and well ventilated; ISO 6946:2017, 6.9, from memory."""


def read_air_space(context: Context, entry: Entry) -> AirSpaceLayer:
    """Read an air space, as a layer or within a cavity."""
    openings, per = _openings(context, entry)
    ventilation = entry.get("ventilation", "unventilated")
    if openings is not None:
        ventilation = _by_openings(context, entry, openings, f"openings_per_{per}")
    return AirSpaceLayer(
        "air-space",
        entry.get("title", "air space"),
        entry.line,
        context.positive(entry, "thickness", "length"),
        ventilation,
        emittances(context, entry),
        openings,
        per,
    )


def _openings(context: Context, entry: Entry) -> tuple[float | None, str]:
    """The area of openings and what it is per; None where nothing is stated."""
    keys = ("openings_per_length", "openings_per_area")
    there = [key for key in keys if key in entry]
    if not there:
        return None, ""
    key = context.exactly_one(entry, keys, "the air space") or there[0]
    return context.not_negative(entry, key, key), key.removeprefix("openings_per_")


def _by_openings(context: Context, entry: Entry, openings: float, key: str) -> str:
    """The class of ventilation that the openings make; a stated one must agree."""
    found = "slightly" if SLIGHTLY_ABOVE < openings < WELL_FROM else "unventilated"
    found = "well" if openings >= WELL_FROM else found
    stated = entry.get("ventilation", found)
    if stated != found and openings == openings:
        context.add(
            "contradicts",
            entry.lines[key],
            found=f"{entry[key]} with ventilation: {stated}",
            expected=f"{found}: above 500 up to 1500 mm2 is slightly ventilated (ISO 6946)",
            key=key,
            other="ventilation",
            hint="leave out 'ventilation': it follows from the openings",
        )
    return found


def emittances(context: Context, entry: Entry) -> tuple[float, float]:
    """Emittances of the outer and the inner face of an air space."""
    stated = entry.get("emittances")
    if stated and "emittance" in entry:
        context.exactly_one(entry, ("emittance", "emittances"), "the air space")
    both = entry.get("emittance", ORDINARY_EMITTANCE)
    outer, inner = stated or (both, both)
    return float(outer), float(inner)


def read_fill(context: Context, entry: Entry, where: str, depth: float) -> Fill:
    """Read what fills a cavity of this depth, m: one of material, label, resistance, air space."""
    kind = context.exactly_one(entry, ("material", "label", "resistance", "air_space"), where)
    source, evidence = entry.get("source", ""), context.evidence(entry)
    basis = entry.get("value_basis", "")
    if kind not in ("label", "resistance", ""):
        hint = "it belongs beside 'label' or 'resistance'"
        context.out_of_place(entry, ("value_basis",), f"a fill by {kind}", hint)
    if kind not in ("label", ""):
        product = ("product_thickness", "label_in_place")
        context.out_of_place(entry, product, f"a fill by {kind}", "it belongs beside 'label'")
    if kind == "material":
        return Fill(material=context.material(entry), source=source, evidence=evidence)
    if kind == "air_space":
        return Fill(air=_air_in_cavity(context, entry["air_space"], depth), source=source)
    if kind == "resistance":
        value = context.positive(entry, "resistance", "resistance")
        return Fill(
            label=value,
            installed_label=value,
            source=source,
            evidence=evidence,
            value_basis=basis,
        )
    if kind == "label":
        return Fill(
            label=context.positive(entry, "label", "resistance"),
            product_thickness=context.optional(entry, "product_thickness", "length"),
            installed_label=context.optional(entry, "label_in_place", "resistance"),
            source=source,
            evidence=evidence,
            value_basis=basis,
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
