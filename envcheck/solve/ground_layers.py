"""What lies against the ground: its layers without films and soil, and the numbers around it."""

from __future__ import annotations

from typing import NamedTuple

from envcheck.model.ground import Ground
from envcheck.model.project import Assembly, Layer
from envcheck.model.ruleset import Conventions
from envcheck.model.solved import Block, Operand, Resistor, Setting, Step
from envcheck.solve.registry import Context, NotDecided, Wall, drawers


def bare_wall(
    assembly: Assembly, setting: Setting, conventions: Conventions, prefix: str = "R"
) -> Wall:
    """Draw an assembly between films of no resistance.

    Layers are named R1, R2 ... (or by another prefix) from outside to inside. A well-ventilated
    air space, and a layer of varying thickness, have no place in the ground. Errors: NotDecided.
    """
    if not assembly.layers:
        raise NotDecided("the layers of the assembly")
    draw = drawers()
    blocks = []
    for number, layer in enumerate(assembly.layers, 1):
        _refuse(layer)
        context = Context(f"{prefix}{number}", setting, conventions)
        blocks.append(draw[layer.kind](layer, context))
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


def plain_layers(wall: Wall, symbol: str, what: str) -> tuple[Step, ...]:
    """The steps of homogeneous layers, the last of which is their sum, called ``symbol``.

    what: that the layers are of, in words (``floor``). Errors: NotDecided for a bridged layer.
    """
    crossed = bridged(wall.blocks)
    if crossed:
        raise NotDecided(f"a {what} without the bridged layer {crossed[0]!r}")
    cells = [block.cells[0][0] for block in wall.blocks]
    operands = tuple(Operand(cell.symbol, cell.value, "resistance") for cell in cells)
    expression = " + ".join(f"{{{operand.name}}}" for operand in operands)
    value = sum(cell.value for cell in cells)
    total = Step(symbol, f"layers of the {what}", expression, operands, value, "resistance")
    return (*(step for cell in cells for step in cell.steps), total)


class GroundNumbers(NamedTuple):
    """Size and soil, all of it stated. Floats."""

    perimeter: float
    """P, exposed, m"""
    area: float
    """A, m2"""
    wall: float
    """w, m"""
    soil: float
    """k, W/(m K)"""

    @property
    def size(self) -> tuple[Operand, Operand]:
        """A and P for a worksheet."""
        return Operand("A", self.area, "area"), Operand("P", self.perimeter, "run")


def ground_numbers(
    ground: Ground, conventions: Conventions, what: str, **others: tuple[str, float | None]
) -> GroundNumbers:
    """The numbers that ISO 13370 asks for.

    what: that they are of, in words. others: more that must be stated, key: (words, value).
    Errors: NotDecided with everything that is missing, or where perimeter and area were measured
    another way than the rule set asks.
    """
    needed = {
        f"the exposed perimeter of the {what} (perimeter)": ground.perimeter,
        f"the area of the {what} (area)": ground.area,
        "the full thickness of the external wall (wall_thickness)": ground.wall_thickness,
        "the conductivity of the soil (soil_conductivity)": ground.soil_conductivity,
        **{f"{words} ({key})": value for key, (words, value) in others.items()},
    }
    missing = [name for name, value in needed.items() if value is None]
    asked = conventions.dimensions_measured
    if ground.measured and asked and ground.measured != asked:
        missing.append(
            f"perimeter and area of the {what} by {asked} dimensions, as the rule set measures: "
            f"they are stated by {ground.measured} dimensions"
        )
    if missing:
        raise NotDecided("; ".join(missing))
    perimeter, area, wall, soil = (value or 0.0 for value in list(needed.values())[:4])
    return GroundNumbers(perimeter, area, wall, soil)


def measured_said(ground: Ground, conventions: Conventions) -> str:
    """The measuring basis of perimeter and area, in words."""
    if ground.measured:
        return f"perimeter and area by {ground.measured} dimensions"
    asked = conventions.dimensions_measured
    if asked:
        return f"perimeter and area taken as by {asked} dimensions, as the rule set measures"
    return "whether perimeter and area are by inside or outside dimensions is not stated"
