"""What stated levels of voids and compression leave of insulation between members: information."""

from __future__ import annotations

from collections.abc import Iterator, Mapping

from envcheck.model.layers import AirSpaceLayer, Fill, FramedLayer, Material
from envcheck.model.project import Assembly
from envcheck.model.ruleset import Conventions
from envcheck.model.solved import Setting
from envcheck.model.sure import Workmanship
from envcheck.solve.assembly import solve
from envcheck.solve.methods.air_space import draw_air_space
from envcheck.solve.methods.fills import fill_resistor
from envcheck.solve.registry import Context, NotDecided

EMITTANCE = 0.9
"""Of the faces of an empty cavity: building materials without a metal foil."""
LEAST = 0.1
"""m2 K/W below which a fill is no insulation; common practice, no source."""


def with_voids(resistance: float, share: float, empty: float) -> float:
    """Resistance of insulation with voids: R = 1 / ((1 - v) / R_full + v / R_empty).

    resistance: of the full insulation, empty: of the cavity without it, m2 K/W. share: v, of the
    area of the insulation, 0..1. Any shape. Returns m2 K/W.
    Source: paths side by side, no flow between them (ISO 6946:2017, 6.7.2.2, the upper limit).
    """
    return 1.0 / ((1.0 - share) / resistance + share / empty)


def compressed(resistance: float, share: float) -> float:
    """Resistance of compressed insulation: R = (1 - c) R_full.

    resistance: m2 K/W. share: c, of the thickness, 0..1. Any shape. Returns m2 K/W.
    Source: R = d / k with k as it was; fibre conducts less when it is denser, so that this never
    overstates, and the gap that opens counts nothing.
    """
    return (1.0 - share) * resistance


def workmanship(
    assembly: Assembly,
    setting: Setting,
    conventions: Conventions,
    levels: Mapping[str, Mapping[str, str]],
) -> tuple[Workmanship, ...]:
    """Every level in each layer of insulation between members; empty for other assemblies.

    levels: rows with ``kind`` (``void`` or ``compression``), ``share`` and ``source``. The value is
    that of the assembly with a fill of that resistance, by the prescribed method; None where the
    method gives none (such as a table by labels), or where a bracket decides.
    """
    if assembly.kind != "layers" or setting.metric != "U_assembly":
        return ()
    return tuple(_levels(assembly, setting, conventions, levels))


def _levels(
    assembly: Assembly,
    setting: Setting,
    conventions: Conventions,
    levels: Mapping[str, Mapping[str, str]],
) -> Iterator[Workmanship]:
    for place, layer in enumerate(assembly.layers):
        if not isinstance(layer, FramedLayer) or layer.fill.air is not None:
            continue
        context = Context(f"R{place + 1}", setting, conventions)
        try:
            whole = _value(assembly, setting, conventions)
            full = fill_resistor(layer.fill, layer.thickness, context).value
            empty = _empty(layer, context)
        except NotDecided:
            continue
        if full < LEAST:
            continue
        for level in levels.values():
            share = float(level["share"])
            void = level["kind"] == "void"
            left = with_voids(full, share, empty) if void else compressed(full, share)
            value = _value(_filled(assembly, place, layer, left), setting, conventions)
            yield Workmanship(
                layer.title, level["kind"], share, full, left, whole, value, level["source"]
            )


def _value(assembly: Assembly, setting: Setting, conventions: Conventions) -> float | None:
    """U by the prescribed method; None where it gives none, or where a bracket decides."""
    solved = solve(assembly, setting, conventions)
    return None if solved.decided_by_bracket else solved.value


def _empty(layer: FramedLayer, context: Context) -> float:
    """Resistance of the cavity without insulation, as the rule set counts air spaces, m2 K/W."""
    air = AirSpaceLayer(
        "air-space", f"empty cavity of {layer.title}", layer.line, layer.thickness,
        "unventilated", (EMITTANCE, EMITTANCE),
    )  # fmt: skip
    return draw_air_space(air, context).cells[0][0].value


def _filled(assembly: Assembly, place: int, layer: FramedLayer, resistance: float) -> Assembly:
    """The assembly with a fill of that resistance over the depth of the cavity."""
    material = Material(f"fill of {layer.title}", layer.title, layer.thickness / resistance)
    other = layer._replace(fill=Fill(material=material))
    layers = (*assembly.layers[:place], other, *assembly.layers[place + 1 :])
    return assembly._replace(layers=layers)
