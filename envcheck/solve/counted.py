"""What each layer counts in the value, and what was assumed while drawing the wall."""

from __future__ import annotations

from collections.abc import Mapping

from envcheck.model.layers import FramedLayer, Layer, MasonryLayer, SectionLayer
from envcheck.model.solved import Block, Counted
from envcheck.solve.methods.framed import area_shares
from envcheck.solve.registry import Wall

OUTSIDE_OF_VENT = Counted(None, "outside a well-ventilated cavity: counts 0")


def counted_layers(wall: Wall, notes: Mapping[int, str], outside: int) -> tuple[Counted, ...]:
    """One entry for each layer of the assembly, outside first.

    notes: index of a layer of the wall -> what the method counts in its place. outside: how many
    layers lie outside a well-ventilated cavity.
    """
    found = [OUTSIDE_OF_VENT] * outside
    for index, (layer, block) in enumerate(zip(wall.layers, wall.blocks, strict=True)):
        note = notes.get(index, "")
        if block.pattern:
            words = (described(layer), note)
            found.append(Counted(None, "; ".join(part for part in words if part)))
        else:
            value = block.cells[0][0].value
            for row in block.cells[1:]:
                value += row[0].value
            found.append(Counted(value, note))
    return tuple(found)


def _in_a_longer_repeat(layer: Layer, block: Block) -> bool:
    if not block.repeat or not isinstance(layer, FramedLayer) or layer.member.spacing is None:
        return False
    return sum(block.widths) > 1.5 * layer.member.spacing


def _unit_drawn(layer: MasonryLayer) -> str:
    cells = f"{layer.cells} cells and {layer.cells + 1} webs of one width"
    unit = "a solid unit" if layer.web_share == 1 else f"a unit of {cells}"
    joint = ", with all joints as one beside it" if layer.joint_share > 0 else ""
    return f"{layer.title}: drawn as {unit}{joint}"


def described(layer: Layer) -> str:
    """How a bridged layer is made up, in words without units that a report would convert."""
    if isinstance(layer, SectionLayer):
        sides = "symmetric sides" if layer.symmetric else "periodic"
        return f"{len(layer.pieces)} pieces, {sides}"
    if isinstance(layer, MasonryLayer):
        solid = layer.web_share == 1
        what, share = ("joints", layer.joint_share) if solid else ("webs", layer.web_share)
        return f"{what} {share * 100:.3g} % of the area"
    if not isinstance(layer, FramedLayer):
        return ""
    if layer.member.profile is not None:
        return f"steel profile {layer.member.profile.id}"
    shares = area_shares(layer)
    words = f"members {shares.member * 100:.3g} % of the area"
    for extra, share in zip(layer.extras, shares.extras, strict=True):
        words += f", {extra.title} {share * 100:.3g} %"
    return words


def drawing_assumptions(wall: Wall) -> tuple[str, ...]:
    """What was assumed to draw the wall as rectangles."""
    found = []
    for layer, block in zip(wall.layers, wall.blocks, strict=True):
        if block.repeat and isinstance(layer, MasonryLayer):
            found.append(_unit_drawn(layer))
        if _in_a_longer_repeat(layer, block):
            found.append(
                f"{layer.title}: stands in line with members of another spacing that run the same "
                "way, over their common repeat; the first of each is centred in its bay"
            )
        if block.repeat and isinstance(layer, FramedLayer):
            titles = " and ".join(extra.title for extra in layer.extras)
            if titles:
                found.append(f"{layer.title}: {titles} drawn as members of share x spacing")
        if not isinstance(layer, FramedLayer) or layer.share is None or layer.member.profile:
            continue
        whose = layer.share_from or "the project"
        words = f"{layer.title}: framing share {layer.share * 100:.3g} % (from {whose})"
        if layer.member.spacing is not None:
            words += ", drawn as one member of share x spacing"
        found.append(words)
    patterns = {block.pattern for block in wall.blocks if block.pattern}
    if len(patterns) > 1:
        found.append("layers of members that run differently are taken to cross each other")
    return tuple(found)
