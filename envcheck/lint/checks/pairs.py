"""The R-value path against the U-factor path of the same element."""

from __future__ import annotations

from collections import defaultdict
from collections.abc import Iterator
from typing import NamedTuple

from envcheck import units
from envcheck.lint import Check, Sheets, remark
from envcheck.model.metrics import METRICS
from envcheck.model.typed import Fault, TypedCell

WITHIN = (0.5, 2.1)
"""R x U in one table: insulation gives half to all of the resistance, and framing, metal and
compression take up to half of what is labelled; common practice, no source."""
BETWEEN = (0.35, 2.1)
"""Between two tables, whose rows may count the structure differently."""
FEW = 4
"""Rows of another table that may be meant at once; of more it is not known which one is."""
FACTORS = ("U_assembly", "U_product", "C_factor")
FIX = "compare both cells with the printed page; if they are printed so, confirm it with a reason"


class Pair(NamedTuple):
    """Cells that speak of the same element in the same zone under the same conditions."""

    zone: str
    category: str
    common: frozenset[object]


def paths_apart(sheets: Sheets) -> Iterator[Fault]:
    """An R-value and a U-factor that cannot both be meant."""
    factors: dict[Pair, dict[str, list[TypedCell]]] = defaultdict(lambda: defaultdict(list))
    same_row: dict[tuple[object, ...], list[TypedCell]] = defaultdict(list)
    insulation: list[tuple[Pair, TypedCell]] = []
    for cell in sheets.cells():
        if cell.metric != "R_insulation" and cell.metric not in FACTORS:
            continue
        for category in cell.categories:
            pair = Pair(cell.zone, category, frozenset(cell.common))
            if cell.metric == "R_insulation":
                insulation.append((pair, cell))
            else:
                factors[pair][cell.table].append(cell)
                same_row[_row_of(pair, cell)].append(cell)
    said = set()
    for pair, cell in insulation:
        others = [of for table, of in factors[pair].items() if table != cell.table]
        near = [(f, BETWEEN) for of in others if len(of) <= FEW for f in of]
        near += [(f, WITHIN) for f in same_row[_row_of(pair, cell)]]
        for factor, bounds in near:
            product = _product(cell, factor, *bounds)
            if product is not None and (cell.place, factor.place) not in said:
                said.add((cell.place, factor.place))
                what = f"R x U = {product:.2f} with {factor.text} of {factor.place}"
                expected = f"{bounds[0]:g} to {bounds[1]:g}"
                yield remark("L16", cell, what, FIX, expected=expected)


def _row_of(pair: Pair, cell: TypedCell) -> tuple[object, ...]:
    return (pair, cell.table, cell.row, cell.when)


def _product(cell: TypedCell, factor: TypedCell, low: float, high: float) -> float | None:
    """R x U (-) of the reading that lies farthest outside; None where all lie within."""
    r = [_si(v, cell) for reading in cell.printed for v in reading.sums if v > 0]
    u = [_si(v, factor) for reading in factor.printed for v in reading.sums if v > 0]
    products = [a * b for a in r for b in u]
    outside = [p for p in products if not low <= p <= high]
    return max(outside, key=lambda p: max(p / high, low / p), default=None)


def _si(value: float, cell: TypedCell) -> float:
    return units.to_si(value, cell.unit, METRICS[cell.metric].quantity) if cell.unit else value


CHECKS = (Check("L16", "R-value path against U-factor path", paths_apart),)
