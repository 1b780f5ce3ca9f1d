"""Ways to wire a layered assembly that need no coefficient: series, parallel paths, planes."""

from __future__ import annotations

from envcheck.model.project import FramedLayer, MasonryLayer
from envcheck.solve.methods.framed import is_metal
from envcheck.solve.registry import Decision, Method, NotDecided, Wall
from envcheck.solve.wiring import Wired, isothermal_planes, layer_steps, parallel_paths, u_step

REFUSED = "a method other than parallel paths, which are not accepted as a result for"


def decide_series(wall: Wall) -> Decision:
    """Add the layers; a bridged layer has no series value."""
    bridged = [block.title for block in wall.blocks if block.pattern]
    if bridged:
        need = f"a method for the bridged layer {bridged[0]!r}: 'series' cannot count it"
        return Decision(None, missing=(need,))
    return decided(wall, parallel_paths(wall))


def decide_parallel_path(wall: Wall) -> Decision:
    """Wire by parallel paths; refused as a result where metal or cells make it wrong."""
    for layer, block in zip(wall.layers, wall.blocks, strict=True):
        if isinstance(layer, FramedLayer) and is_metal(layer) and block.pattern:
            raise NotDecided(f"{REFUSED} steel framing ({layer.title!r})")
        if isinstance(layer, MasonryLayer) and 0 < layer.web_share < 1:
            raise NotDecided(f"{REFUSED} masonry units with cells ({layer.title!r})")
    return decided(wall, parallel_paths(wall))


def decide_isothermal_planes(wall: Wall) -> Decision:
    """Wire by isothermal planes."""
    return decided(wall, isothermal_planes(wall))


def decided(wall: Wall, wired: Wired) -> Decision:
    """Close a wiring with U = 1/R."""
    layers = layer_steps(wall)
    steps = (*layers, *wired.steps, u_step(wired.resistance))
    return Decision(wired.u_factor, wired.tree, steps, len(layers))


METHODS = (
    Method(
        name="series",
        title="Layers in series",
        formula="R = sum of R_i;  U = 1 / R",
        source="ISO 6946:2017, 6.7.1",
        valid="homogeneous layers only",
        decides=decide_series,
    ),
    Method(
        name="parallel_path",
        title="Parallel paths (adiabatic planes between them)",
        formula="R = 1 / (sum of f / R_path);  U = 1 / R",
        source="ISO 6946:2017, 6.7.2.3; ASHRAE Handbook - Fundamentals, parallel-path method",
        valid="wood framing; refused as a result for steel framing and hollow masonry units",
        decides=decide_parallel_path,
    ),
    Method(
        name="isothermal_planes",
        title="Isothermal planes",
        formula="R = sum over planes of 1 / (sum of f / R);  U = 1 / R",
        source="ISO 6946:2017, 6.7.2.4; ASHRAE Handbook - Fundamentals, isothermal-planes method",
        valid="masonry units with cells; elsewhere an upper bound of U of the drawn pieces",
        decides=decide_isothermal_planes,
    ),
)
