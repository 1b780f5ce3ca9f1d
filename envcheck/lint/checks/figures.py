"""Figures by themselves: outside the range of their metric, or apart from their neighbours."""

from __future__ import annotations

from collections.abc import Iterator

from envcheck.lint import Check, Sheets, remark
from envcheck.lint.runs import Step, runs
from envcheck.model.patterns import closeness, matches
from envcheck.model.typed import Fault, Range, TypedCell

APART = 2.6
"""Factor from both zone neighbours, or between alternatives of one cell: common practice, no
source. Printed tables step by less, but for single cells of the warmest and the coldest zone."""
CHECK_FIGURE = (
    "compare the cell with the printed page; if it is printed so, confirm it with a reason"
)


def out_of_range(sheets: Sheets) -> Iterator[Fault]:
    """A lost decimal mark, a factor of ten, another unit, an R in a U column."""
    known: dict[tuple[str, str, tuple[str, ...]], tuple[float, float] | None] = {}
    for cell in sheets.cells():
        key = (cell.metric, cell.unit, cell.categories)
        if key not in known:
            known[key] = _range(cell, sheets.ranges)
        bounds = known[key]
        if bounds is None or cell.text in ("<", "^"):
            continue
        low, high = bounds
        for value in (v for reading in cell.printed for v in reading.sums):
            asks_nothing = value == 0 and cell.sense == "min"
            if not low <= value <= high and not asks_nothing:
                unit = f" {cell.unit}" if cell.unit else ""
                what = f"{value:g}{unit} is no usual {cell.metric} of such an element"
                expected = f"{low:g} to {high:g}{unit}"
                yield remark("L04", cell, what, CHECK_FIGURE, expected=expected)
                break


def _range(cell: TypedCell, ranges: tuple[Range, ...]) -> tuple[float, float] | None:
    """The range of the metric for its categories, each by its closest entry; None if unknown."""
    own = [r for r in ranges if r.metric == cell.metric and r.unit == cell.unit]
    found = []
    for category in cell.categories:
        fitting = [r for r in own if r.category == "*" or matches(r.category, category)]
        if fitting:
            found.append(max(fitting, key=lambda r: closeness(r.category, category)))
    if not found:
        return None
    return min(r.low for r in found), max(r.high for r in found)


def apart(sheets: Sheets) -> Iterator[Fault]:
    """A figure that stands alone among those of the neighbouring zones."""
    for run in runs(sheets):
        steps = [step for step in run if step.value]
        alone = [bool(_beside(steps, i)) and _alone(steps, i) for i in range(len(steps))]
        for i, step in enumerate(steps):
            beside = _beside(steps, i)
            if not alone[i] or (len(steps) == 2 and i == 0):
                continue  # of two, the second says it
            if len(beside) == 1 and len(steps) > 2 and alone[1 if i == 0 else i - 1]:
                continue  # its one neighbour stands alone itself, and is told
            near = " and ".join(f"{s.cell.text} in {s.cell.zone}" for s in beside)
            what = f"more than a factor {APART:g} from {near}"
            yield remark("L05", step.cell, what, CHECK_FIGURE)


def _beside(steps: list[Step], i: int) -> list[Step]:
    return [*steps[max(0, i - 1) : i], *steps[i + 1 : i + 2]]


def _alone(steps: list[Step], i: int) -> bool:
    return all(_far(steps[i], other) for other in _beside(steps, i))


def _far(a: Step, b: Step) -> bool:
    assert a.value and b.value
    return max(a.value / b.value, b.value / a.value) > APART


def alternatives(sheets: Sheets) -> Iterator[Fault]:
    """Alternatives of one cell ask for about the same."""
    for cell in sheets.cells():
        for reading in cell.printed:
            sums = [v for v in reading.sums if v > 0]
            if cell.text not in ("<", "^") and sums and max(sums) / min(sums) > APART:
                what = f"alternatives of one cell differ by more than a factor {APART:g}"
                yield remark("L05", cell, what, CHECK_FIGURE)
                break


CHECKS = (
    Check("L04", "Outside the plausible range of metric and unit", out_of_range),
    Check("L05", "Far from its zone neighbours", apart),
    Check("L05", "Alternatives of one cell far apart", alternatives),
)
