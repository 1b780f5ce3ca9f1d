"""What fills a cavity: a material, labelled insulation (perhaps compressed), or air."""

from __future__ import annotations

from envcheck.model.project import Fill
from envcheck.model.solved import Resistor
from envcheck.solve.cells import material_cell
from envcheck.solve.methods.air_space import draw_air_space
from envcheck.solve.methods.compressed import compressed_cell
from envcheck.solve.registry import Context, Method


def fill_resistor(fill: Fill, depth: float, context: Context) -> Resistor:
    """The resistance of a fill over the depth of its cavity, m."""
    symbol = f"{context.symbol}_fill"
    if fill.material is not None:
        return material_cell(symbol, fill.material.title, depth, fill.material)
    if fill.air is not None:
        return draw_air_space(fill.air, context._replace(symbol=symbol)).cells[0][0]
    assert fill.label is not None, "the reader asks for a material, a label or an air space"
    return compressed_cell(symbol, fill, depth, context)


METHODS = (
    Method(
        name="cavity_fill",
        title="Infill of a cavity",
        formula="R = L / k, the label at installed thickness, or the air space",
        source="the source named beside the value",
        valid="insulation that fills its cavity without gaps",
    ),
)
