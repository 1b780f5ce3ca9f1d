"""Framed layers: members at a spacing, infill between them, plates and headers as a share."""

from __future__ import annotations

from typing import NamedTuple

from envcheck.model.project import FramedLayer
from envcheck.model.solved import Block, Resistor
from envcheck.solve.cells import material_cell, part_of
from envcheck.solve.elementary import greatest
from envcheck.solve.methods.fills import fill_resistor
from envcheck.solve.registry import Context, Method, NotDecided
from envcheck.solve.section import grid, profile_pieces


class Shares(NamedTuple):
    """Shares of the wall area, 0..1; they sum to 1."""

    cavity: float
    member: float
    extras: tuple[float, ...]


def area_shares(layer: FramedLayer) -> Shares:
    """Shares of cavity, members and extras of a framed layer.

    The members' share is the stated one, or width / spacing of what plates and headers leave.
    """
    extras = tuple(extra.share for extra in layer.extras)
    rest = 1.0 - sum(extras)
    if layer.share is not None:
        member = layer.share
    else:
        assert layer.member.spacing is not None, "the reader asks for a spacing or a share"
        member = layer.member.width / layer.member.spacing * rest
    return Shares(rest - member, member, extras)


def draw_framed(layer: FramedLayer, context: Context) -> Block:
    """Draw members and cavities as columns; a steel profile with web, flanges and lips."""
    fill = fill_resistor(layer.fill, layer.thickness, context)
    if layer.member.profile is not None:
        return _draw_profile(layer, fill, context)
    shares = area_shares(layer)
    repeat = layer.member.spacing or 1.0
    left = (1.0 - shares.member) / 2  # centred, as the members of every other layer
    left = left if left < shares.cavity else shares.cavity / 2
    title = f"members of {layer.title}"
    member = material_cell(
        f"{context.symbol}_member", title, layer.thickness, layer.member.material
    )
    widths = [left * repeat, shares.member * repeat, (shares.cavity - left) * repeat]
    cells = [fill, member, fill]
    for number, (extra, share) in enumerate(zip(layer.extras, shares.extras, strict=True), 1):
        widths.append(share * repeat)
        symbol = f"{context.symbol}_extra{number}"
        cells.append(material_cell(symbol, extra.title, extra.thickness, extra.material))
    return Block(
        context.symbol,
        layer.title,
        tuple(widths),
        (layer.thickness,),
        (tuple(cells),),
        pattern_of(layer, context.symbol),
        layer.member.spacing is not None,
    )


def pattern_of(layer: FramedLayer, symbol: str) -> str:
    """Layers that run the same way at the same spacing stand in line; all others cross."""
    if layer.member.spacing is None:
        return symbol
    return f"{layer.orientation}@{layer.member.spacing:.6f}"


def _draw_profile(layer: FramedLayer, fill: Resistor, context: Context) -> Block:
    profile, spacing = layer.member.profile, layer.member.spacing
    assert profile is not None and spacing is not None, "the reader asks for both"
    if layer.extras or layer.share is not None:
        raise NotDecided(
            f"{layer.title!r} without shares of area: a steel profile stands at a spacing; "
            "state tracks and plates as linear bridges"
        )
    pieces = profile_pieces(profile, layer.thickness, spacing)
    widths, depths, covered = grid(pieces, spacing, layer.thickness)
    rows = []
    for number, (depth, row) in enumerate(zip(depths, covered, strict=True), 1):
        steel = material_cell(
            f"{context.symbol}_steel{number}",
            f"steel of {layer.title}",
            depth,
            layer.member.material,
        )
        cavity = part_of(fill, depth, layer.thickness, f"{context.symbol}_cavity{number}")
        rows.append(tuple(steel if is_steel else cavity for is_steel in row))
    return Block(
        context.symbol,
        layer.title,
        tuple(widths),
        tuple(depths),
        tuple(rows),
        pattern_of(layer, context.symbol),
        True,
    )


def is_metal(layer: FramedLayer) -> bool:
    """Whether the members conduct like metal (above 1 W/(m K), more than any wood)."""
    return layer.member.profile is not None or greatest(layer.member.material.conductivity) > METAL


METAL = 1.0
"""W/(m K); between the most conductive wood and the least conductive metal."""

METHODS = (
    Method(
        name="framed_layer",
        title="Framed layer: members, infill, plates and headers as shares",
        formula="share of members = width / spacing of what plates and headers leave; R = L / k",
        source="ISO 6946:2017, 6.7.2.1 (sections a, b, c ...); geometry of the drawn profile",
        valid="members of one layer parallel to each other",
        draws=(("framed", draw_framed),),
    ),
)
