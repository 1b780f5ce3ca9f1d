"""Why the value of a drawn section is what it is: heat, energy and influence of its pieces."""

from __future__ import annotations

from collections.abc import Iterator

from envcheck.model.solved import Block, Drawn, Face, Flow, Influence, Reasons, Resistor, Weight
from envcheck.solve.field.bound import Bounds
from envcheck.solve.field.drawing import piece_rows
from envcheck.solve.field.energies import Energies, energies
from envcheck.solve.field.section import Section
from envcheck.solve.registry import Wall
from envcheck.solve.why import Found, add
from envcheck.solve.wiring import align

_Row = tuple[Block, float, tuple[Resistor, ...]]


def section_reasons(wall: Wall, section: Section, found: Bounds) -> Reasons:
    """Heat through the pieces of each bridged layer, and what U of the section hangs on.

    The share of a layer in the resistance is the share of the energy that is spent in it.
    """
    rows = list(piece_rows(align(wall.blocks)))
    spent = energies(section, found)
    return Reasons(
        tuple(_flows(rows, section, spent)),
        tuple(_weights(wall, rows, spent)),
        _influences(wall, rows, spent),
        tuple(_faces(wall, rows, found)),
        _drawn(rows, section),
    )


def _drawn(rows: list[_Row], section: Section) -> Drawn:
    """The section with neighbouring columns of the same conductivities as one."""
    columns: list[tuple[float, ...]] = list(zip(*section.conductivities, strict=True))
    widths: list[float] = []
    kept: list[tuple[float, ...]] = []
    for width, column in zip(section.widths, columns, strict=True):
        if kept and all(abs(a - b) <= 1e-9 * b for a, b in zip(kept[-1], column, strict=True)):
            widths[-1] += width
        else:
            widths.append(width)
            kept.append(column)
    by_row = zip(rows, zip(*kept, strict=True), strict=True)
    return Drawn(tuple(widths), tuple((row[0].symbol, row[1], k) for row, k in by_row))


def _faces(wall: Wall, rows: list[_Row], found: Bounds) -> Iterator[Face]:
    """Least and greatest temperature behind the outer film and behind each layer."""
    field = found.temperatures
    yield Face(wall.outside.title, float(field[0].min()), float(field[0].max()))
    for block in wall.blocks:
        own = [n for n, row in enumerate(rows) if row[0].symbol == block.symbol]
        if own:
            behind = field[int((found.grid.rows <= own[-1]).sum())]
            yield Face(block.title, float(behind.min()), float(behind.max()))


def _flows(rows: list[_Row], section: Section, spent: Energies) -> Iterator[Flow]:
    """Through the middle of the deepest row of each bridged layer."""
    deepest: dict[str, int] = {}
    for number, (block, depth, _) in enumerate(rows):
        if block.pattern and depth > rows[deepest.get(block.symbol, number)][1] * (1 - 1e-9):
            deepest[block.symbol] = number
    width = sum(section.widths)
    for number in deepest.values():
        block, _, cells = rows[number]
        shares: dict[str, tuple[float, float]] = {}
        for cell, across, heat in zip(cells, section.widths, spent.flow[number], strict=True):
            area, carried = shares.get(cell.title, (0.0, 0.0))
            shares[cell.title] = (area + across / width, carried + float(heat))
        for piece, (area, carried) in shares.items():
            yield Flow(block.title, piece, area, carried)


def _weights(wall: Wall, rows: list[_Row], spent: Energies) -> Iterator[Weight]:
    yield Weight(wall.outside.symbol, wall.outside.title, spent.outside)
    by_row = (spent.along + spent.across).sum(axis=1)
    for block in wall.blocks:
        share = sum(
            float(e) for row, e in zip(rows, by_row, strict=True) if row[0].symbol == block.symbol
        )
        yield Weight(block.symbol, block.title, share)
    yield Weight(wall.inside.symbol, wall.inside.title, spent.inside)


def _influences(wall: Wall, rows: list[_Row], spent: Energies) -> tuple[Influence, ...]:
    """Of conductivities, stated resistances, films, and thicknesses of layers of materials.

    Stretching a row by 1 % makes what crosses it 1 % less and what runs along it 1 % more.
    """
    found: Found = {}
    _stated(found, wall.outside, spent.outside)
    for number, (_, _, cells) in enumerate(rows):
        share = spent.along[number] + spent.across[number]
        for cell, part in zip(cells, share, strict=True):
            _stated(found, cell, float(part))
    for block in wall.blocks:
        own = [n for n, row in enumerate(rows) if row[0].symbol == block.symbol]
        if own and all(_conductivity(cell) for n in own for cell in rows[n][2]):
            stretched = float((spent.along[own] - spent.across[own]).sum())
            depth = sum(block.depths)
            add(found, Influence(block.symbol, "", "length", depth, stretched))
    _stated(found, wall.inside, spent.inside)
    return tuple(found.values())


def _stated(found: Found, cell: Resistor, share: float) -> None:
    """The influence of the number that a cell's resistance comes from."""
    symbol = cell.symbol.partition("_")[0]
    conductivity = _conductivity(cell)
    if conductivity is not None:
        add(found, Influence(symbol, cell.title, "conductivity", conductivity, share))
    elif cell.value:
        value = cell.steps[0].value if cell.steps else cell.value
        add(found, Influence(symbol, cell.title, "resistance", value, -share))


def _conductivity(cell: Resistor) -> float | None:
    """W/(m K) of the material of a cell; None where its resistance comes from elsewhere."""
    operands = [o for step in cell.steps if step.quantity == "resistance" for o in step.operands]
    return next((o.value for o in operands if o.quantity == "conductivity"), None)
