"""Figures that stand beside each other from zone to zone."""

from __future__ import annotations

from collections import defaultdict
from collections.abc import Iterator
from typing import NamedTuple

from envcheck.lint import Sheets
from envcheck.model.typed import Printed, TypedCell

Key = tuple[object, ...]


class Step(NamedTuple):
    """One zone of a run."""

    cell: TypedCell
    reading: Printed
    value: float | None
    """The strictest alternative, in the printed unit; None where there is no figure."""


def strictness(reading: Printed, sense: str) -> float | None:
    """The figure that stands for a reading: the strictest alternative."""
    if reading.kind != "number" or not reading.sums:
        return None
    return max(reading.sums) if sense == "min" else min(reading.sums)


def runs(sheets: Sheets) -> Iterator[list[Step]]:
    """Cells of the same row and heads by zone, warm to cold; each side of a slash for itself."""
    order = {zone: i for i, zone in enumerate(sheets.set.zones)}
    groups: dict[Key, list[TypedCell]] = defaultdict(list)
    for table in sheets.set.tables:
        for row in table.rows:
            for cell in row:
                if cell.zone in order and cell.printed and cell.text not in ("<", "^"):
                    groups[_key(cell)].append(cell)
    for cells in groups.values():
        cells.sort(key=lambda cell: order[cell.zone])
        sides = {len(cell.printed) for cell in cells}
        for side in range(max(sides)):
            own = [c for c in cells if len(c.printed) > side]
            yield [Step(c, c.printed[side], strictness(c.printed[side], c.sense)) for c in own]


def _key(cell: TypedCell) -> Key:
    """What cells of one run share; where each zone has its sheet, the sheets are one run."""
    row = "" if cell.row == cell.zone else cell.row
    table = cell.table if cell.zone in (*cell.heads, cell.row) else ""
    return (table, row, cell.when, cell.beside, cell.metric, cell.unit)
