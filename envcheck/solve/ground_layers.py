"""The layers of an assembly that lies against the ground: no films, no soil."""

from __future__ import annotations

from envcheck.model.project import Assembly, Layer
from envcheck.model.ruleset import Conventions
from envcheck.model.solved import Block, Resistor, Setting
from envcheck.solve.registry import Context, NotDecided, Wall, drawers


def bare_wall(assembly: Assembly, setting: Setting, conventions: Conventions) -> Wall:
    """Draw an assembly between films of no resistance.

    Layers are named R1, R2 ... from outside to inside. A well-ventilated air space, and a layer
    of varying thickness, have no place in the ground. Errors: NotDecided.
    """
    if not assembly.layers:
        raise NotDecided("the layers of the assembly")
    draw = drawers()
    blocks = []
    for number, layer in enumerate(assembly.layers, 1):
        _refuse(layer)
        blocks.append(draw[layer.kind](layer, Context(f"R{number}", setting, conventions)))
    none = Resistor("R_no_film", "no film", 0.0)
    return Wall(assembly, setting, conventions, none, none, tuple(blocks), assembly.layers)


def bridged(blocks: tuple[Block, ...]) -> list[str]:
    """Titles of the blocks that members or webs bridge."""
    return [block.title for block in blocks if block.pattern]


def _refuse(layer: Layer) -> None:
    if layer.kind == "air-space" and getattr(layer, "ventilation", "") == "well":
        raise NotDecided(f"an assembly against the ground without the vented space {layer.title!r}")
    if layer.kind == "tapered":
        raise NotDecided(f"one thickness for the layer {layer.title!r} against the ground")
