"""Two ways to wire drawn blocks: parallel paths and isothermal planes.

Both wire the same pieces. Cutting every lateral connection (adiabatic planes between the columns)
can only raise the resistance, shorting every plane between rows (isothermal planes) can only
lower it (Rayleigh's monotonicity law for resistor networks), so for the drawn rectangles

    U(parallel paths) <= U <= U(isothermal planes).

Source: ISO 6946:2017, 6.7.2 (upper and lower limit of the total thermal resistance); the handbook
names "parallel path" and "isothermal planes" are those of ASHRAE Handbook - Fundamentals.

The resistances may be numpy arrays of any shape that broadcast (a million variants of one wall);
the widths along the wall are the same for all.
"""

from __future__ import annotations

from collections.abc import Sequence
from functools import lru_cache
from itertools import product
from math import prod
from typing import NamedTuple

from envcheck.model.solved import Block, Node, Operand, Resistor, Series, Step
from envcheck.solve.network import in_parallel, in_series, is_nothing
from envcheck.solve.registry import Wall

FILM_TO_FILM = "sum of resistances, film to film"


def align(blocks: Sequence[Block]) -> Sequence[Block]:
    """Cut the columns of blocks that share a pattern at each other's edges.

    Blocks of one pattern have the same repeat width and stand in line. Returns the blocks in the
    same order, those of one pattern with equal ``widths``.
    """
    patterns = [block.pattern for block in blocks if block.pattern]
    if len(set(patterns)) == len(patterns):
        return blocks
    edges: dict[str, set[float]] = {}
    for block in blocks:
        if block.pattern:
            edges.setdefault(block.pattern, set()).update(_edges(block.widths))
    return [
        _cut(block, sorted(edges[block.pattern])) if block.pattern else block for block in blocks
    ]


def _edges(widths: Sequence[float]) -> list[float]:
    position = 0.0
    found = []
    for width in widths:
        position += width
        found.append(round(position, 9))
    return found


def _cut(block: Block, edges: list[float]) -> Block:
    own = _edges(block.widths)
    if own == edges:
        return block
    starts = [0.0, *edges[:-1]]
    widths = [end - start for start, end in zip(starts, edges, strict=True)]
    last = len(own) - 1
    column = [next((i for i, end in enumerate(own) if edge <= end), last) for edge in edges]
    cells = tuple(tuple(row[i] for i in column) for row in block.cells)
    return block._replace(widths=tuple(widths), cells=cells)


class Wired(NamedTuple):
    """A wiring's answer: the tree, and the steps from the layers' resistances to the total."""

    tree: Node
    steps: tuple[Step, ...]
    """The last one gives the total resistance."""

    @property
    def resistance(self) -> float:
        """m2 K/W"""
        return self.tree.value

    @property
    def u_factor(self) -> float:
        """W/(m2 K)"""
        return 1.0 / self.tree.value


class _Column(NamedTuple):
    """A column of all blocks of one pattern, merged with its equals."""

    title: str
    share: float
    first: int
    """Number of the first such column."""


def parallel_paths(wall: Wall, symbol: str = "R") -> Wired:
    """Wire by adiabatic planes: every path from film to film is a series of its own.

    1/R = sum over paths of f/R_path. Blocks of different patterns cross, so that a path takes one
    column of each pattern and its share is the product of theirs. ``symbol`` names the total in
    the worksheet.
    """
    blocks = align(wall.blocks)
    patterns = _patterns(blocks)
    paths: list[tuple[float, Series]] = []
    for columns in product(*patterns.values()):
        chosen = {name: column.first for name, column in zip(patterns, columns, strict=True)}
        parts: list[Node] = [wall.outside]
        for block in blocks:
            column = chosen[block.pattern] if block.pattern else 0
            if len(block.cells) == 1:
                parts.append(block.cells[0][column])
            else:
                parts += [row[column] for row in block.cells]
        parts.append(wall.inside)
        title = " and ".join(column.title for column in columns)
        paths.append((prod(column.share for column in columns), in_series(title, parts)))
    if len(paths) == 1:
        return Wired(paths[0][1], (_sum_step(symbol, FILM_TO_FILM, paths[0][1]),))
    tree = in_parallel("parallel paths", paths)
    known: dict[str, Operand] = {}
    steps = [
        _sum_step(f"{symbol}_path{n}", f"path {n}: {path.title}", path, known)
        for n, (_, path) in enumerate(paths, 1)
    ]
    named = [(f"{symbol}_path{n}", share, path.value) for n, (share, path) in enumerate(paths, 1)]
    steps.append(_beside_step(symbol, "all paths side by side", named, tree.value))
    return Wired(tree, tuple(steps))


def isothermal_planes(wall: Wall, symbol: str = "R") -> Wired:
    """Wire by isothermal planes: each row of each block is one resistance, all rows in series."""
    parts: list[Node] = [wall.outside]
    summed: list[Node] = [wall.outside]
    steps = []
    for block in wall.blocks:
        for number, row in enumerate(block.cells, 1):
            columns = _merged_row(block, row)
            if len(columns) == 1:
                parts.append(columns[0][1])
                summed.append(columns[0][1])
                continue
            name = f"{block.symbol}_plane{number}" if len(block.cells) > 1 else block.symbol
            plane = in_parallel(block.title, columns)
            titles = " beside ".join(resistor.title for _, resistor in columns)
            named = [(resistor.symbol, share, resistor.value) for share, resistor in columns]
            steps.append(_beside_step(name, f"{block.title}: {titles}", named, plane.value))
            parts.append(plane)
            summed.append(Resistor(name, block.title, plane.value))
    parts.append(wall.inside)
    summed.append(wall.inside)
    tree = in_series("isothermal planes", parts)
    closing = _sum_step(symbol, FILM_TO_FILM, tree._replace(parts=tuple(summed)))
    return Wired(tree, (*steps, closing))


def u_step(resistance: float, symbol: str = "R") -> Step:
    """The step U = 1/R."""
    operand = Operand(symbol, resistance, "resistance")
    return Step("U", "U-factor", f"1 / {{{symbol}}}", (operand,), 1.0 / resistance, "u_factor")


def bounds(wall: Wall) -> tuple[float, float]:
    """U by parallel paths and by isothermal planes, W/(m2 K): numbers only, no worksheet."""
    blocks = align(wall.blocks)
    common = wall.outside.value + wall.inside.value
    planes = common
    columns: dict[str, list[float]] = {}
    shares: dict[str, list[float]] = {}
    for block in blocks:
        if not block.pattern:
            total = sum(row[0].value for row in block.cells)
            common = common + total
            planes = planes + total
            continue
        width = sum(block.widths)
        fractions = [w / width for w in block.widths]
        shares[block.pattern] = fractions
        sums = columns.setdefault(block.pattern, [0.0] * len(fractions))
        for row in block.cells:
            conductance = 0.0
            for column, cell in enumerate(row):
                sums[column] = sums[column] + cell.value
                conductance = conductance + fractions[column] / cell.value
            planes = planes + 1.0 / conductance
    pairs = [list(zip(shares[name], columns[name], strict=True)) for name in columns]
    low = sum(
        prod(share for share, _ in path) / (common + sum(value for _, value in path))
        for path in product(*pairs)
    )
    return low, 1.0 / planes


def layer_steps(wall: Wall) -> list[Step]:
    """The steps that lead to every resistor of the wall, each once, outside first."""
    steps = {step.symbol: step for step in wall.outside.steps}
    for block in wall.blocks:
        for row in block.cells:
            for cell in row:
                for step in cell.steps:
                    steps.setdefault(step.symbol, step)
    for step in wall.inside.steps:
        steps.setdefault(step.symbol, step)
    return list(steps.values())


def _patterns(blocks: Sequence[Block]) -> dict[str, list[_Column]]:
    """For each pattern its distinct columns with their shares."""
    members: dict[str, list[Block]] = {}
    for block in blocks:
        if block.pattern:
            members.setdefault(block.pattern, []).append(block)
    return {pattern: _columns(of_one) for pattern, of_one in members.items()}


def _columns(blocks: list[Block]) -> list[_Column]:
    """Columns of blocks that stand in line; those of the same pieces are one."""
    widths = blocks[0].widths
    total = sum(widths)
    found: dict[tuple[str, ...], _Column] = {}
    for index, width in enumerate(widths):
        cells = [row[index] for block in blocks for row in block.cells]
        key = tuple([cell.symbol for cell in cells])
        known = found.get(key)
        if known is None:
            title = " and ".join(dict.fromkeys(cell.title for cell in cells))
            found[key] = _Column(title, width / total, index)
        else:
            found[key] = known._replace(share=known.share + width / total)
    return list(found.values())


def _merged_row(block: Block, row: Sequence[Resistor]) -> list[tuple[float, Resistor]]:
    """Resistors of one row with their shares, equal ones merged."""
    total = sum(block.widths)
    found: dict[str, tuple[float, Resistor]] = {}
    for width, resistor in zip(block.widths, row, strict=True):
        share = found[resistor.symbol][0] if resistor.symbol in found else 0.0
        found[resistor.symbol] = (share + width / total, resistor)
    return list(found.values())


def _sum_step(
    symbol: str, title: str, tree: Series, known: dict[str, Operand] | None = None
) -> Step:
    """One step that adds the parts of a series; parts of no resistance are left out.

    known: operands by symbol, shared by the paths of one wall.
    """
    known = {} if known is None else known
    operands = []
    for part in tree.parts:
        if not isinstance(part, Resistor):
            continue
        operand = known.get(part.symbol)
        if operand is None:
            if is_nothing(part.value):
                continue
            operand = known[part.symbol] = Operand(part.symbol, part.value, "resistance")
        operands.append(operand)
    expression = _sum_of(tuple([operand[0] for operand in operands]))
    return Step(symbol, title, expression, tuple(operands), tree.value, "resistance")


@lru_cache(maxsize=1024)
def _sum_of(symbols: tuple[str, ...]) -> str:
    return " + ".join([f"{{{symbol}}}" for symbol in symbols])


def _beside_step(
    symbol: str, title: str, columns: Sequence[tuple[str, float, float]], value: float
) -> Step:
    """One step for branches side by side; columns are (symbol, share, resistance)."""
    operands = []
    terms = []
    for number, (name, share, resistance) in enumerate(columns, 1):
        operands += [
            Operand(f"f{number}", share, "number"),
            Operand(name, resistance, "resistance"),
        ]
        terms.append(f"{{f{number}}} / {{{name}}}")
    expression = f"1 / ({' + '.join(terms)})"
    return Step(symbol, title, expression, tuple(operands), value, "resistance")
