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
    shares = column_shares(layer)
    columns = [name for name in middle if shares[name] > 0]
    faces = tuple(outer[name] for name in columns)
    return Block(
        symbol,
        layer.title,
        tuple(shares[name] for name in columns),
        (layer.shell, core, layer.shell),
        (faces, tuple(middle[name] for name in columns), faces),
        symbol,
    )


def _draw_solid(layer: MasonryLayer, context: Context) -> Block:
    symbol, depth, joints = context.symbol, layer.thickness, layer.joint_share
    if layer.mortar is None or joints == 0:
        return homogeneous(material_cell(symbol, layer.title, depth, layer.material), depth)
    unit = material_cell(f"{symbol}_unit", "solid units", depth, layer.material)
    joint = material_cell(f"{symbol}_joint", "joints", depth, layer.mortar)
    return Block(symbol, layer.title, (1.0 - joints, joints), (depth,), ((unit, joint),), symbol)


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
        valid="units with two face shells; partly grouted walls by area",
        draws=(("masonry", draw_masonry),),
    ),
)
