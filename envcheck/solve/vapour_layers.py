"""Layers as vapour meets them along the clear field: sd, faces, and saturation at each face."""

from __future__ import annotations

from collections.abc import Iterable, Sequence
from typing import NamedTuple

from envcheck.model.layers import (
    AirSpaceLayer,
    ContactLayer,
    FramedLayer,
    Layer,
    MasonryLayer,
    Material,
    MaterialLayer,
    ResistanceLayer,
)
from envcheck.model.moisture import Month, Sheet
from envcheck.model.solved import Block, Operand, Step
from envcheck.model.vapour import saturation_pressure
from envcheck.solve.methods.iso13788_condensation import Point, parts_of
from envcheck.solve.network import parallel
from envcheck.solve.registry import Wall

AIR_LAYER = 0.01
"""sd of an air layer of any thickness, m. Source: ISO 13788:2012 (from memory)."""
AIR_SOURCE = "air layer, ISO 13788:2012; from memory"


class Face(NamedTuple):
    """A face between layers, or between the parts of a thick one."""

    title: str
    diffusion: float
    """sd from the outer surface, m"""
    resistance: float
    """From the air outside, film included, m2 K/W."""


class NoVapour(Exception):
    """Which layer has no vapour resistance, in words that complete "missing: ..."."""


def sheets_of(wall: Wall) -> tuple[tuple[Sheet, ...], tuple[str, ...]]:
    """Layers along the clear field, outside first; and the layers without vapour resistance."""
    found, missing = [], []
    for layer, block in zip(wall.layers, wall.blocks, strict=True):
        try:
            found.append(_vapour(layer)._replace(resistance=clear_resistance(layer, block)))
        except NoVapour as need:
            missing.append(str(need))
    return tuple(found), tuple(missing)


def clear_resistance(layer: Layer, block: Block) -> float:
    """Resistance along the infill of a framed layer; of units side by side, by planes. m2 K/W."""
    total = 0.0
    for row in block.cells:
        if isinstance(layer, FramedLayer):
            marks = tuple(f"{block.symbol}_{kind}" for kind in ("member", "steel", "extra"))
            total += next(cell.value for cell in row if not cell.symbol.startswith(marks))
        else:
            whole = sum(block.widths)
            shares = [width / whole for width in block.widths]
            total += parallel(shares, [c.value for c in row]) if len(row) > 1 else row[0].value
    return total


def _vapour(layer: Layer) -> Sheet:
    """sd of a layer. Errors: NoVapour where nothing states it."""
    if layer.kind == "section":
        raise NoVapour(f"a clear field of {layer.title!r} (line {layer.line}), which is drawn")
    if layer.sd is not None:
        return Sheet(layer.title, 0.0, layer.sd, "stated with the layer")
    match layer:
        case MaterialLayer() | ResistanceLayer() if layer.material and layer.thickness:
            return _by_mu(layer, layer.material, layer.thickness)
        case ContactLayer():
            return Sheet(layer.title, 0.0, 0.0, "a contact holds no vapour back")
        case AirSpaceLayer():
            return Sheet(layer.title, 0.0, AIR_LAYER, AIR_SOURCE)
        case FramedLayer() if layer.fill.air is not None:
            return Sheet(layer.title, 0.0, AIR_LAYER, AIR_SOURCE)
        case FramedLayer() if layer.fill.material is not None:
            return _by_mu(layer, layer.fill.material, layer.thickness)
        case MasonryLayer() if layer.web_share == 1.0:
            return _by_mu(layer, layer.material, layer.thickness)
    where = f"{layer.title!r} (line {layer.line})"
    if layer.kind == "tapered":
        raise NoVapour(f"one thickness for {where}, which is tapered")
    raise NoVapour(f"sd of layer {where}")


def _by_mu(layer: Layer, material: Material, thickness: float) -> Sheet:
    if material.mu is None:
        raise NoVapour(
            f"mu of material {material.id!r}, or sd of layer {layer.title!r} (line {layer.line})"
        )
    sd = material.mu * thickness
    return Sheet(layer.title, 0.0, sd, material.mu_source, float(material.mu), thickness)


def faces_of(sheets: Sequence[Sheet], outside: float) -> tuple[Face, ...]:
    """Both surfaces and every face between, outside first; thick layers are cut."""
    found = [Face("outer surface", 0.0, outside)]
    for number, sheet in enumerate(sheets):
        parts = parts_of(sheet.resistance)
        _, sd, resistance = found[-1]
        for part in range(1, parts + 1):
            share = part / parts
            title = f"within {sheet.title}, at {part} of {parts} parts from outside"
            if part == parts:
                last = number + 1 == len(sheets)
                title = "inner surface" if last else f"{sheet.title} / {sheets[number + 1].title}"
            found.append(
                Face(title, sd + share * sheet.diffusion, resistance + share * sheet.resistance)
            )
    return tuple(found)


def points_of(
    faces: Sequence[Face], total: float, month: Month
) -> tuple[tuple[Point, ...], tuple[int, ...]]:
    """Vapour pressures that no face can exceed, sd rising, and the face of each.

    total: resistance from air to air, m2 K/W. Faces without vapour resistance between count as
    one, the colder. Both ends are the air beside, at most saturated at the surface.
    """
    points: list[Point] = []
    names: list[int] = []
    for number, face in enumerate(faces):
        warm = month.indoor_temperature - month.outdoor_temperature
        here = month.outdoor_temperature + warm * face.resistance / total
        saturated = saturation_pressure(here)
        if number == 0:
            saturated = min(saturated, month.outdoor_pressure)
        elif number + 1 == len(faces):
            saturated = min(saturated, month.indoor_pressure)
        if points and face.diffusion <= points[-1][0]:
            if saturated < points[-1][1]:
                points[-1], names[-1] = (points[-1][0], saturated), number
        else:
            points.append((face.diffusion, saturated))
            names.append(number)
    return tuple(points), tuple(names)


def sheet_steps(sheets: Iterable[Sheet]) -> Iterable[Step]:
    """The step to the sd of each layer, outside first."""
    for number, sheet in enumerate(sheets, 1):
        title = f"sd of {sheet.title}"
        if sheet.ratio is None:
            yield Step(f"s{number}", title, "", (), sheet.diffusion, "length", sheet.source)
        else:
            operands = (
                Operand("mu", sheet.ratio, "number"),
                Operand("d", sheet.thickness, "length"),
            )
            yield Step(
                f"s{number}", title, "{mu} * {d}", operands, sheet.diffusion, "length",
                sheet.source,
            )  # fmt: skip
