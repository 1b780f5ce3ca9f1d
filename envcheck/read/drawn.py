"""Drawn sections: layers over the whole width, and pieces drawn over them."""

from __future__ import annotations

from typing import Any

from envcheck.model.project import (
    AirSpaceLayer,
    Layer,
    Material,
    MaterialLayer,
    ResistanceLayer,
    SectionLayer,
    SectionPiece,
)
from envcheck.read.context import MATCHES, NAN, Context
from envcheck.read.drawn_checks import check_drawing, check_outline
from envcheck.read.fills import emittances
from envcheck.read.yaml_reader import Entry

THINNEST = 1e-5
"""m; a piece thinner than a foil (ten micrometres) is a slip of the unit."""
WIDEST = 100.0
"""m; a wider drawing is a slip of the unit, and its proportions would ruin the solution."""
GASES = ("air", "argon", "krypton", "xenon", "void", "gap", "cavity", "air_gap", "air_space")
"""Ids under which still gas is typed for a void; it conducts less than the void does."""


def read_section(context: Context, entry: Entry, ground: tuple[Layer, ...]) -> SectionLayer:
    """Read a drawing.

    ground: its layers over the whole width, outside first; empty where every piece is drawn.
    """
    before = len(context.problems)
    repeat = context.positive(entry, "repeat", "length")
    if repeat > WIDEST:
        context.out_of_range(entry, "repeat", f"{WIDEST:g} m at most", "check number and unit")
        repeat = NAN
    laid, depth = _laid(context, ground, repeat)
    typed = [each for each in entry.get("pieces", ()) if each is not None]
    spans = [_spans(context, each) for each in typed]
    if not ground:
        depth = max((y[1] for _, y in spans if y is not None), default=NAN)
        if depth != depth:
            hint = ", or give the pieces their depth by 'y'"
            context.add(
                "missing-key", entry.line, key="layers", where="the drawn section", hint=hint
            )
    drawn = [
        _piece(context, each, x or (0.0, repeat), y or (0.0, depth))
        for each, (x, y) in zip(typed, spans, strict=True)
    ]
    section = SectionLayer(
        kind="section",
        title=entry.get("title", "drawn section"),
        line=entry.line,
        thickness=depth,
        repeat=repeat,
        symmetric=entry.get("sides", "periodic") == "symmetric",
        orientation=entry.get("orientation", "vertical"),
        pieces=(*laid, *drawn),
    )
    check_outline(context, section)
    if len(context.problems) == before:
        check_drawing(context, section)
    return section


def _laid(
    context: Context, layers: tuple[Layer, ...], repeat: float
) -> tuple[list[SectionPiece], float]:
    """The layers as pieces over the whole width, and how deep they are together."""
    found: list[SectionPiece] = []
    depth = 0.0
    for layer in layers:
        material, air = None, None
        if getattr(layer, "span", None) is not None:
            context.add("not-drawn", layer.line, found="a range of thickness or resistance")
            continue
        if getattr(layer, "removable", False):
            context.add("not-drawn", layer.line, found="a layer that can be lifted")
            continue
        if isinstance(layer, MaterialLayer):
            material = layer.material
        elif isinstance(layer, AirSpaceLayer) and layer.ventilation != "well":
            air = layer
        elif isinstance(layer, ResistanceLayer) and layer.thickness > 0 and layer.resistance > 0:
            material = _as_material(layer)
        else:
            context.add("not-drawn", layer.line, found=_what(layer))
            continue
        inner = depth + layer.thickness
        found.append(
            SectionPiece(layer.title, layer.line, 0.0, repeat, depth, inner, material, air)
        )
        depth = inner
    return found, depth


def _what(layer: Layer) -> str:
    if isinstance(layer, AirSpaceLayer):
        return "a well-ventilated air space"
    if isinstance(layer, ResistanceLayer):
        return "a resistance without a thickness"
    return f"a layer of kind {layer.kind!r}"


def _as_material(layer: ResistanceLayer) -> Material:
    """A stated resistance as the material that has it over the thickness of the layer."""
    known = layer.material or Material("", layer.title, NAN)
    conductivity = layer.thickness / layer.resistance
    return known._replace(
        title=layer.title, conductivity=conductivity, source=layer.source, evidence=layer.evidence
    )


_Span = tuple[float, float]


def _spans(context: Context, entry: Entry) -> tuple[_Span | None, _Span | None]:
    return _span(context, entry, "x"), _span(context, entry, "y")


def _span(context: Context, entry: Entry, key: str) -> _Span | None:
    """From where to where a piece reaches, m; None where it is left out."""
    if key not in entry:
        return None
    ends: Any = entry[key]
    here = Entry(entry.lines[key])
    for name, text in zip(("from", "to"), ends, strict=True):
        here[name] = text
        here.lines[name] = entry.lines[key]
    start, end = (context.number(here, name, "length") for name in ("from", "to"))
    title, found = _title(entry), f"{key}: [{ends[0]}, {ends[1]}]"
    line = entry.lines[key]
    if start < 0:
        way = "left" if key == "x" else "outer"
        expected = f"at least 0 mm, the {way} side of the drawing"
        context.add("piece-outside", line, found=found, expected=expected, title=title)
        return NAN, NAN
    if end <= start + MATCHES / 1000:
        fix = "exchange the two" if end < start else ""
        context.add("piece-without-size", line, found=found, title=title, key=key, fix=fix)
        return NAN, NAN
    if end - start < THINNEST:
        context.add("piece-too-thin", line, found=found, title=title)
        return NAN, NAN
    return start, end


def _title(entry: Entry) -> str:
    return str(entry.get("title") or entry.get("material") or "the piece")


def _piece(context: Context, entry: Entry, x: _Span, y: _Span) -> SectionPiece:
    where = f"the piece {_title(entry)!r}"
    keys = ("material", "conductivity", "air_space")
    if not any(key in entry for key in keys):
        context.add("void-piece", entry.line, title=_title(entry))
        kind = ""
    else:
        kind = context.exactly_one(entry, keys, where)
    if kind != "conductivity":
        context.out_of_place(entry, ("source",), where, "it belongs beside 'conductivity'")
    material, air = None, None
    title = entry.get("title", "")
    if kind == "material":
        if _is_gas(context, entry["material"]):
            context.add(
                "void-piece", entry.lines["material"], found=entry["material"], title=_title(entry)
            )
        else:
            material = context.material(entry)
            title = title or material.title
    elif kind == "conductivity":
        title = title or "piece"
        k = context.conductivity(entry, "conductivity")
        material = Material("", title, k, source=entry.get("source", "assumed"))
    elif kind == "air_space":
        title = title or "air"
        faces = emittances(context, entry["air_space"])
        air = AirSpaceLayer("air-space", title, entry.line, y[1] - y[0], "unventilated", faces)
    return SectionPiece(title, entry.line, *x, *y, material, air)


def _is_gas(context: Context, name: str) -> bool:
    return name.lower() in GASES and name not in context.own_ids
