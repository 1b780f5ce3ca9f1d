"""Single resistors with their worksheet step: what every drawn layer is made of."""

from __future__ import annotations

from functools import lru_cache

from envcheck.model.project import Material
from envcheck.model.solved import Block, Operand, Resistor, Step
from envcheck.solve.network import plane_wall


def material_cell(symbol: str, title: str, depth: float, material: Material) -> Resistor:
    """A depth (m) of a material: R = L/k. Numbers are worked once for all walls, arrays anew."""
    if type(depth) is float and type(material.conductivity) is float:
        return _remembered(symbol, title, depth, material)
    return _material_cell(symbol, title, depth, material)


def _material_cell(symbol: str, title: str, depth: float, material: Material) -> Resistor:
    value = plane_wall(depth, material.conductivity)
    length, name = Operand("L", depth, "length"), "k"
    before: tuple[Step, ...] = ()
    if material.conversion is not None:
        from envcheck.solve.methods.iso10456_conversion import conversion_step

        name = f"{symbol}_k"
        before = (conversion_step(name, material.title, material.conversion),)
    k = Operand(name, material.conductivity, "conductivity")
    source = material.source
    step = Step(symbol, title, f"{{L}} / {{{name}}}", (length, k), value, "resistance", source)
    return Resistor(symbol, title, value, (*before, step))


_remembered = lru_cache(maxsize=4096)(_material_cell)


def stated_cell(symbol: str, title: str, value: float, source: str) -> Resistor:
    """A resistance (m2 K/W) that a source states."""
    return Resistor(
        symbol, title, value, (Step(symbol, title, "", (), value, "resistance", source),)
    )


def part_of(cell: Resistor, depth: float, whole: float, symbol: str) -> Resistor:
    """The part of a cell that lies in ``depth`` of its ``whole`` depth, m."""
    operands = (
        Operand(cell.symbol, cell.value, "resistance"),
        Operand("d", depth, "length"),
        Operand("D", whole, "length"),
    )
    value = cell.value * depth / whole
    expression = f"{{{cell.symbol}}} * {{d}} / {{D}}"
    step = Step(symbol, f"{cell.title}, this row", expression, operands, value, "resistance")
    return Resistor(symbol, cell.title, value, (*cell.steps, step))


def homogeneous(cell: Resistor, depth: float) -> Block:
    """A block of one cell."""
    return Block(cell.symbol, cell.title, (1.0,), (depth,), ((cell,),))
