"""Conductivities outside the band of their class: mostly a unit or a decimal that slipped."""

from __future__ import annotations

from collections.abc import Iterator

from envcheck.judge.crosschecks import Check, Facts
from envcheck.judge.words import length, resistance, system, trimmed
from envcheck.model.judged import LIKELY, LOOK, Finding
from envcheck.model.layers import FramedLayer, Layer, ResistanceLayer, Span
from envcheck.units import in_system, label

INSULATION: Span = (0.015, 0.065)
"""W/(m K); the band of class insulation in ``data/material_classes.csv``, held by a test."""
FAR = 2.0
"""Times beyond the band from which nobody makes such a product."""
SLIPS = (
    (5.678, "a resistance in the other system of units"),
    (12.0, "inches taken for feet in a conductivity"),
    (6.933, "Btu in/(h ft2 F) taken for W/(m K)"),
    (1.7307, "Btu/(h ft F) taken for W/(m K)"),
    (10.0, "a slipped decimal"),
)
"""Factors of slips (exact definitions of the units, rounded), the likeliest first."""


def implausible(facts: Facts) -> Iterator[Finding]:
    """Own materials, and stated resistances over their thickness, against the band of a class."""
    units = system(facts.project, facts.rulesets)
    for each in facts.project.materials.values():
        if each.band is not None and _outside(each.conductivity, each.band):
            seen = f"{each.title} conducts {_shown(each.conductivity, units)}"
            yield _finding(each.id, "", seen, each.conductivity, each.band, units)
    for assembly in facts.project.assemblies.values():
        for layer in assembly.layers:
            stated = _stated(layer)
            if stated is None or not _outside(stated[1] / stated[0], stated[2]):
                continue
            value, depth, band = stated
            seen = f"{layer.title}: {resistance(value, units)} in {length(depth, units)}"
            seen += f" would conduct {_shown(depth / value, units)}"
            yield _finding(assembly.id, assembly.sheet, seen, depth / value, band, units)


def _outside(conductivity: float, band: Span) -> bool:
    return not band[0] * (1 - 1e-9) <= conductivity <= band[1] * (1 + 1e-9)


def _stated(layer: Layer) -> tuple[float, float, Span] | None:
    """A stated resistance, m2 K/W, the thickness that it is of, m, and the band of its class."""
    if isinstance(layer, ResistanceLayer):
        material = layer.material
        band = material.band if material is not None else None
        bare = layer.value_basis in ("", "bare")
        if layer.resistance > 0 and layer.thickness > 0 and band is not None and bare:
            return layer.resistance, layer.thickness, band
    if isinstance(layer, FramedLayer) and layer.fill.label is not None:
        fill = layer.fill
        as_filled = fill.installed_label == fill.label and fill.product_thickness is None
        if not as_filled:  # a resistance stated for the whole cavity may be that of air
            return layer.fill.label, fill.product_thickness or layer.thickness, INSULATION
    return None


def _finding(
    subject: str, sheet: str, seen: str, conductivity: float, band: Span, units: str
) -> Finding:
    low, high = band
    too_good, too_poor = conductivity < low / FAR, conductivity > high * FAR
    return Finding(
        "conductivity-implausible",
        "E" if too_good else "W" if too_poor else "N",
        subject,
        sheet,
        f"{seen}; {_shown(low, units)} to {_shown(high, units)} is usual in its class",
        _slip(conductivity, band),
        "the value with its unit on the data sheet, or the class of the material",
        sure=LIKELY if too_good or too_poor else LOOK,
    )


def _shown(conductivity: float, units: str) -> str:
    value = trimmed(in_system(conductivity, "conductivity", units), 4)
    return f"{value} {label('conductivity', units)}"


def _slip(conductivity: float, band: Span) -> str:
    """The slip of units that explains a conductivity, W/(m K), the likeliest first."""
    for factor, words in SLIPS:
        if not (_outside(conductivity * factor, band) and _outside(conductivity / factor, band)):
            return f"it looks like {words}"
    return "value or class is wrong"


CHECKS = (Check("conductivity-implausible", "Conductivity outside its class", implausible, LIKELY),)
