"""Masonry units with shells, webs and cells, hollow or filled; joints and grouted cells by area."""

from __future__ import annotations

from envcheck.model.project import MasonryLayer
from envcheck.model.solved import Block, Resistor
from envcheck.solve.cells import homogeneous, material_cell, stated_cell
from envcheck.solve.methods.fills import fill_resistor
from envcheck.solve.registry import Context, Method


def column_shares(layer: MasonryLayer) -> dict[str, float]:
    """Shares of the wall area: webs, cells, grouted cells and mortar joints; they sum to 1."""
    units = 1.0 - layer.joint_share
    cells = units * (1.0 - layer.web_share)
    return {
        "web": units * layer.web_share,
        "cell": cells * (1.0 - layer.grouted_share),
        "grout": cells * layer.grouted_share,
        "joint": layer.joint_share,
    }


def draw_masonry(layer: MasonryLayer, context: Context) -> Block:
    """Draw two shells and the plane of webs and cells between them; solid units as one plane."""
    if layer.web_share == 1:
        return _draw_solid(layer, context)
    core = layer.thickness - 2.0 * layer.shell
    symbol, unit = context.symbol, layer.material
    shell = material_cell(f"{symbol}_shell", "face shell", layer.shell, unit)
    middle = {
        "web": material_cell(f"{symbol}_web", "webs", core, unit),
        "cell": _cell_resistor(layer, core, context),
    }
    outer = {"web": shell, "cell": shell}
    if layer.grout is not None and layer.grouted_share > 0:
        grout = layer.grout
        middle["grout"] = material_cell(f"{symbol}_grout", "grouted cells", core, grout)
        outer["grout"] = shell
    if layer.mortar is not None and layer.joint_share > 0:
        mortar = layer.mortar
        middle["joint"] = material_cell(f"{symbol}_joint", "joints", core, mortar)
        outer["joint"] = material_cell(f"{symbol}_joint_shell", "joints", layer.shell, mortar)
    columns = unit_columns(layer)
    faces = tuple(outer[name] for name, _ in columns)
    return Block(
        symbol,
        layer.title,
        tuple(width for _, width in columns),
        (layer.shell, core, layer.shell),
        (faces, tuple(middle[name] for name, _ in columns), faces),
        pattern_of(layer, symbol),
        is_to_scale(layer),
    )


def is_to_scale(layer: MasonryLayer) -> bool:
    """Whether one unit can be drawn: its length is stated, and no single cells are grouted."""
    return layer.length is not None and layer.grouted_share == 0


def pattern_of(layer: MasonryLayer, symbol: str) -> str:
    """Units drawn to scale stand in line with members of the same spacing that run upright."""
    return f"vertical@{layer.length:.6f}" if is_to_scale(layer) else symbol


def unit_columns(layer: MasonryLayer) -> list[tuple[str, float]]:
    """Columns of one unit from left to right with their widths, m; shares where not to scale.

    To scale: the joint, then webs of one width with the cells between them, so that webs, cells
    and joint have their shares of the area. Bed joints are counted in the joint beside the unit.
    """
    shares = column_shares(layer)
    if not is_to_scale(layer):
        return [(name, share) for name, share in shares.items() if share > 0]
    assert layer.length is not None, "see is_to_scale"
    web = shares["web"] * layer.length / (layer.cells + 1)
    cell = shares["cell"] * layer.length / layer.cells
    joint = shares["joint"] * layer.length
    unit = [("web", web), *[("cell", cell), ("web", web)] * layer.cells]
    return [("joint", joint), *unit] if joint > 0 else unit


def _draw_solid(layer: MasonryLayer, context: Context) -> Block:
    symbol, depth, joints = context.symbol, layer.thickness, layer.joint_share
    if layer.mortar is None or joints == 0:
        return homogeneous(material_cell(symbol, layer.title, depth, layer.material), depth)
    unit = material_cell(f"{symbol}_unit", "solid units", depth, layer.material)
    joint = material_cell(f"{symbol}_joint", "joints", depth, layer.mortar)
    whole = layer.length or 1.0
    return Block(
        symbol,
        layer.title,
        ((1.0 - joints) * whole, joints * whole),
        (depth,),
        ((unit, joint),),
        pattern_of(layer, symbol),
        is_to_scale(layer),
    )


def _cell_resistor(layer: MasonryLayer, core: float, context: Context) -> Resistor:
    if layer.cell_resistance is None:
        return fill_resistor(layer.fill, core, context)
    symbol = f"{context.symbol}_cell"
    return stated_cell(symbol, "cells", layer.cell_resistance, layer.fill.source)


METHODS = (
    Method(
        name="masonry_unit",
        title="Masonry unit: shells, webs and cells",
        formula="shells in series with the plane of webs beside cells",
        source="ASHRAE Handbook - Fundamentals, isothermal planes for concrete masonry; NCMA and "
        "ACI 122R describe the same series-parallel calculation",
        valid="units with two face shells; partly grouted walls by area; drawn to scale where the "
        "length of a unit is stated",
        draws=(("masonry", draw_masonry),),
    ),
)
