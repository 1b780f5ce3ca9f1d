"""Tapered layers: one shape, or the pieces of a roof drained by several slopes."""

from __future__ import annotations

from envcheck.model.layers import Layer, TaperedLayer, TaperedPiece
from envcheck.read.context import NAN, Context
from envcheck.read.yaml_reader import Entry


def read_tapered(context: Context, entry: Entry) -> Layer:
    """Read insulation of varying thickness."""
    material = context.material(entry)
    pieces = _pieces(context, entry)
    if pieces:
        least, greatest = min(p.least for p in pieces), max(p.greatest for p in pieces)
    else:
        least, greatest = _thicknesses(context, entry)
    return TaperedLayer(
        "tapered",
        entry.get("title") or material.title,
        entry.line,
        material,
        least,
        greatest,
        entry.get("shape", "rectangle"),
        context.optional(entry, "run", "length"),
        pieces,
    )


def _thicknesses(context: Context, entry: Entry, *, level: bool = False) -> tuple[float, float]:
    """Least and greatest thickness; ``level`` lets them be equal."""
    for key in ("least", "greatest"):
        if key not in entry:
            where, hint = "the tapered layer", ", or its pieces"
            context.add("missing-key", entry.line, key=key, where=where, hint=hint)
            return NAN, NAN
    least = context.not_negative(entry, "least", "length")
    greatest = context.positive(entry, "greatest", "length")
    if least > greatest or (least == greatest and not level):
        limit = "the greatest thickness"
        found = f"{entry['least']} against {entry['greatest']}"
        context.add("too-thick", entry.lines["least"], found=found, key="least", limit=limit)
    return least, greatest


def _pieces(context: Context, entry: Entry) -> tuple[TaperedPiece, ...]:
    if "pieces" not in entry:
        return ()
    where, hint = "a tapered layer in pieces", "it belongs to each of the pieces"
    context.out_of_place(entry, ("least", "greatest", "shape", "run"), where, hint)
    return tuple(_piece(context, piece) for piece in entry["pieces"])


def _piece(context: Context, entry: Entry) -> TaperedPiece:
    least, greatest = _thicknesses(context, entry, level=True)
    triangle = entry["shape"] == "triangle"
    middle = context.optional(entry, "middle", "length") if triangle else None
    if not triangle:
        context.out_of_place(entry, ("middle",), f"a {entry['shape']}", "use shape 'triangle'")
    elif "middle" not in entry:
        where, hint = "the triangle", ", the thickness at its middle corner"
        context.add("missing-key", entry.line, key="middle", where=where, hint=hint)
    elif middle is not None and not least < middle < greatest and middle == middle:
        context.out_of_range(
            entry,
            "middle",
            "a thickness between the least and the greatest",
            "with two corners alike use triangle_thickest_apex or triangle_thinnest_apex",
        )
    return TaperedPiece(
        entry["shape"],
        context.positive(entry, "area", "area"),
        least,
        greatest,
        middle,
        context.optional(entry, "run", "length"),
    )
