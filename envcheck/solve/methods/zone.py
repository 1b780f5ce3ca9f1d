"""The handbook's zone method: metal framing acts on a zone wider than its flange.

Zone A holds the metal and is wired by isothermal planes, zone B is the rest of the bay, and both
stand side by side.
"""

from __future__ import annotations

from collections.abc import Sequence
from typing import NamedTuple

from envcheck.model.layers import FramedLayer
from envcheck.model.solved import Block, Node, Operand, Resistor, Step
from envcheck.solve.elementary import larger, smaller
from envcheck.solve.methods.framed import is_metal
from envcheck.solve.network import in_parallel, in_series, parallel
from envcheck.solve.registry import Decision, Method, NotDecided, Wall
from envcheck.solve.wiring import layer_steps

SOURCE = "ASHRAE Handbook - Fundamentals, zone method"
LEAST = 0.0127
"""m (0.5 in): least distance that counts, for the air film at a bare metal face."""


def zone_width(metal: float, distance: float) -> float:
    """Width of the zone that metal acts on: W = m + 2 d, d at least 12.7 mm.

    metal: m, width of the metal at its widest, m. distance: d from the metal to the surface of the
    assembly, the larger of both sides, m. Any shape. Returns m.
    Source: ASHRAE Handbook - Fundamentals, zone method.
    """
    return metal + 2.0 * larger(distance, LEAST)


def zone_u(width: float, spacing: float, zone: float, rest: float) -> float:
    """U of both zones side by side: U = f / RA + (1 - f) / RB, f = W / s, at most 1.

    width: W, spacing: s, m. zone, rest: RA and RB, films included, m2 K/W. Any shape. Returns
    W/(m2 K). Source: as :func:`zone_width`.
    """
    share = smaller(width / spacing, 1.0)
    return share / zone + (1.0 - share) / rest


class Framing(NamedTuple):
    """The steel of a drawn framed layer, as the zone method sees it."""

    width: float
    """m of the method, m"""
    spacing: float
    """m"""
    distance: float
    """d of the method, before its least, m"""
    rows: tuple[Row, ...]
    """Outside first."""


class Row(NamedTuple):
    """A row of a framed layer: steel beside cavity."""

    steel: Resistor | None
    cavity: Resistor
    covered: float
    """Width of the steel, m."""


def decide_zone(wall: Wall) -> Decision:
    """Wire a wall of one metal-framed layer by zones.

    Errors: NotDecided for any other wall, and where a thickness beside the metal is unknown.
    """
    index = _framed(wall)
    block = wall.blocks[index]
    framing = _framing(wall, index, block)
    width = zone_width(framing.width, framing.distance)
    share = min(width / framing.spacing, 1.0)
    before = [wall.outside, *(b.cells[0][0] for b in wall.blocks[:index])]
    after = [*(b.cells[0][0] for b in wall.blocks[index + 1 :]), wall.inside]
    zone_rows = _rows_of_zone(framing, min(width, framing.spacing), block.symbol)
    cavities = [row.cavity for row in framing.rows]
    zone: list[Node] = [*before, *zone_rows, *after]
    rest: list[Node] = [*before, *cavities, *after]
    branches = [(share, in_series("zone of the metal", zone))]
    if share < 1.0:
        branches.append((1.0 - share, in_series("rest of the bay", rest)))
    tree = in_parallel("zones", branches)
    u_factor = zone_u(width, framing.spacing, branches[0][1].value, branches[-1][1].value)
    layers = layer_steps(wall)
    steps = (
        *layers,
        *_width_steps(framing, width, share),
        *(step for row in zone_rows for step in row.steps if step.symbol == row.symbol),
        *_closing_steps(zone, rest, share, u_factor),
    )
    return Decision(u_factor, tree, _each_once(steps), len(layers))


def _framed(wall: Wall) -> int:
    bridged = [n for n, block in enumerate(wall.blocks) if block.pattern]
    if len(bridged) != 1:
        raise NotDecided(
            f"one framed layer for the zone method, which knows no other: here are {len(bridged)} "
            "bridged layers"
        )
    (index,) = bridged
    layer = wall.layers[index]
    if not (isinstance(layer, FramedLayer) and is_metal(layer)):
        raise NotDecided(f"metal framing for the zone method: {layer.title!r} has none")
    for other in wall.layers:
        if other.kind == "tapered":
            raise NotDecided(f"one thickness for {other.title!r}: the zone method needs it")
    return index


def _framing(wall: Wall, index: int, block: Block) -> Framing:
    layer = wall.layers[index]
    assert isinstance(layer, FramedLayer), "told by _framed"
    profile, spacing = layer.member.profile, layer.member.spacing
    if spacing is None or layer.extras or layer.share is not None:
        raise NotDecided(
            f"members of {layer.title!r} at a spacing, without shares of area: the zone method "
            "needs the width of its zone"
        )
    if profile is not None and profile.shape != "C":
        raise NotDecided(f"a C profile or a solid member in {layer.title!r} for the zone method")
    rows = tuple(_row(block, number) for number in range(len(block.cells)))
    bare = next((n for n, row in enumerate(rows) if row.steel is not None), 0)
    outside = sum(block.depths[:bare]) + _thickness(wall, range(index))
    inside = _thickness(wall, range(index + 1, len(wall.blocks)))
    width = layer.member.width if profile is None else profile.flange
    return Framing(width, spacing, max(outside, inside), rows)


def _row(block: Block, number: int) -> Row:
    """Cells of a row by kind: pieces of steel, and the one infill between them."""
    marks = (f"{block.symbol}_steel", f"{block.symbol}_member")
    steel, cavity, covered = None, None, 0.0
    for width, cell in zip(block.widths, block.cells[number], strict=True):
        if cell.symbol.startswith(marks):
            steel, covered = cell, covered + width
        else:
            cavity = cell
    if cavity is None:
        raise NotDecided(f"a cavity beside the metal of {block.title!r} for the zone method")
    return Row(steel, cavity, covered)


def _thickness(wall: Wall, numbers: Sequence[int]) -> float:
    """Thickness of the layers on one side. Errors: NotDecided where one is not stated."""
    for number in numbers:
        layer = wall.layers[number]
        if layer.kind == "resistance" and sum(wall.blocks[number].depths) == 0:
            raise NotDecided(
                f"the thickness of {layer.title!r}: the zone method counts how far the metal lies "
                "from the surface"
            )
    return float(sum(sum(wall.blocks[number].depths) for number in numbers))


def _rows_of_zone(framing: Framing, width: float, symbol: str) -> list[Resistor]:
    """Rows of the framed layer within the zone, steel and infill side by side."""
    found = []
    for number, row in enumerate(framing.rows, 1):
        if row.steel is None:
            found.append(row.cavity)
            continue
        share = row.covered / width
        value = parallel([share, 1.0 - share], [row.steel.value, row.cavity.value])
        operands = (
            Operand("b", row.covered, "length"),
            Operand("W_A", width, "length"),
            Operand(row.steel.symbol, row.steel.value, "resistance"),
            Operand(row.cavity.symbol, row.cavity.value, "resistance"),
        )
        expression = (
            f"1 / ({{b}} / {{W_A}} / {{{row.steel.symbol}}} + (1 - {{b}} / {{W_A}}) / "
            f"{{{row.cavity.symbol}}})"
        )
        name, title = f"{symbol}_zone{number}", "steel beside infill within the zone"
        step = Step(name, title, expression, operands, value, "resistance")
        found.append(Resistor(name, title, value, (step,)))
    return found


def _width_steps(framing: Framing, width: float, share: float) -> tuple[Step, ...]:
    metal, least = Operand("m", framing.width, "length"), Operand("d_least", LEAST, "length")
    distance = Operand("d", framing.distance, "length")
    spacing, whole = Operand("s", framing.spacing, "length"), Operand("W", width, "length")
    title = "width of the zone of the metal"
    return (
        Step(
            "W", title, "{m} + 2 * max({d}, {d_least})", (metal, distance, least), width,
            "length", SOURCE,
        ),
        Step(
            "W_A", f"{title} within one bay", "min({W}, {s})", (whole, spacing),
            min(width, framing.spacing), "length",
        ),
        Step("f_A", "share of the zone", "min({W} / {s}, 1)", (whole, spacing), share, "number"),
    )  # fmt: skip


def _closing_steps(
    zone: Sequence[Node], rest: Sequence[Node], share: float, u_factor: float
) -> tuple[Step, ...]:
    def sum_step(name: str, title: str, parts: Sequence[Node]) -> Step:
        cells = [part for part in parts if isinstance(part, Resistor)]
        operands = tuple(Operand(cell.symbol, cell.value, "resistance") for cell in cells)
        expression = " + ".join(f"{{{cell.symbol}}}" for cell in cells)
        value = sum(cell.value for cell in cells)
        return Step(name, title, expression, operands, value, "resistance", SOURCE)

    first = sum_step("R_A", "through the zone of the metal", zone)
    second = sum_step("R_B", "through the rest of the bay", rest)
    operands = (
        Operand("f_A", share, "number"),
        Operand("R_A", first.value, "resistance"),
        Operand("R_B", second.value, "resistance"),
    )
    expression = "{f_A} / {R_A} + (1 - {f_A}) / {R_B}"
    return (
        first,
        second,
        Step("U", "U-factor by zones", expression, operands, u_factor, "u_factor", SOURCE),
    )


def _each_once(steps: Sequence[Step]) -> tuple[Step, ...]:
    return tuple({step.symbol: step for step in steps}.values())


METHODS = (
    Method(
        name="zone",
        title="Zone method for metal framing",
        formula="W = m + 2 d, d at least 12.7 mm;  U = f / RA + (1 - f) / RB, f = W / spacing, at "
        "most 1",
        source=SOURCE,
        valid="one layer framed with C profiles or solid metal members at a spacing between layers "
        "of stated thickness, without plates or tracks; d is the thicker side; insulation that "
        "metal crosses counts as the rule set says, with its whole thickness in d",
        decides=decide_zone,
    ),
)
