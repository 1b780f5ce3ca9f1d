"""Plane layers: a thickness of a material, or a stated resistance."""

from __future__ import annotations

from envcheck.model.project import ContactLayer, MaterialLayer, ResistanceLayer
from envcheck.model.solved import Block
from envcheck.solve.cells import homogeneous, material_cell, stated_cell
from envcheck.solve.registry import Context, Method


def draw_material(layer: MaterialLayer, context: Context) -> Block:
    """Draw a homogeneous layer: R = L/k."""
    cell = material_cell(context.symbol, layer.title, layer.thickness, layer.material)
    return homogeneous(cell, layer.thickness)


def draw_resistance(layer: ResistanceLayer, context: Context) -> Block:
    """Draw a layer whose resistance is stated."""
    cell = stated_cell(context.symbol, layer.title, layer.resistance, layer.source)
    return homogeneous(cell, layer.thickness)


def draw_contact(layer: ContactLayer, context: Context) -> Block:
    """Draw a contact resistance: a layer without thickness."""
    cell = stated_cell(context.symbol, layer.title, layer.resistance, layer.source)
    return homogeneous(cell, 0.0)


METHODS = (
    Method(
        name="plane_layer",
        title="Plane layer of a homogeneous material",
        formula="R = L / k",
        source="ISO 6946:2017, 6.7.1.1",
        valid="one-dimensional flow, steady state, no heat source in the layer",
        draws=(("material", draw_material),),
    ),
    Method(
        name="stated_resistance",
        title="Layer of stated resistance",
        formula="R as stated by a label, table or test",
        source="the source named beside the value",
        valid="the thickness and temperature for which the value was stated",
        draws=(("resistance", draw_resistance),),
    ),
    Method(
        name="contact",
        title="Contact resistance between two faces",
        formula="R = Rc",
        source="Incropera and DeWitt, Fundamentals of Heat and Mass Transfer, 3.1.4",
        valid="the pressure and roughness for which the value was measured",
        draws=(("contact", draw_contact),),
    ),
)
