"""From warm to cold a limit grows no weaker."""

from __future__ import annotations

from collections.abc import Iterator
from itertools import pairwise

from envcheck.lint import Check, Sheets, remark
from envcheck.lint.runs import Step, runs, strictness
from envcheck.model.typed import Fault

THERMAL = ("U_", "C_", "F_", "K_", "R_", "RSI_")
"""Metrics that ask for more toward the cold; those of sun and light follow the sun."""
FIX = (
    "compare the cell with the printed page; if it is printed so, confirm it with a reason, or "
    "say `monotone: none` for the row"
)


def weaker_in_the_cold(sheets: Sheets) -> Iterator[Fault]:
    """Swapped zones or digits, a cell of the neighbouring row, NR after a limit."""
    if not sheets.set.coldness:
        return
    for run in runs(sheets):
        steps = [s for s in run if s.cell.monotone and s.cell.metric.startswith(THERMAL)]
        steps = [s for s in steps if s.reading.kind != "not_covered"]
        for warm, cold in pairwise(steps):
            if _weaker(warm, cold):
                before = f"{warm.cell.text} in {warm.cell.zone}"
                what = f"weaker than {before}, which is the warmer zone"
                yield remark("L06", cold.cell, what, FIX)


def _weaker(warm: Step, cold: Step) -> bool:
    if warm.reading.kind == "number" and cold.reading.kind == "no_requirement":
        return True
    if warm.value is None or cold.value is None or warm.reading.roles != cold.reading.roles:
        return False  # 13 in the cavity and 10 over it are no weaker and no stricter
    return cold.value < warm.value if cold.cell.sense == "min" else cold.value > warm.value


def milder_than_its_threshold(sheets: Sheets) -> Iterator[Fault]:
    """A target that is no stricter than the threshold from which it counts."""
    for cell in sheets.cells():
        value = strictness(cell.printed[0], cell.sense) if cell.printed else None
        if value is None or cell.threshold is None or value == cell.threshold:
            continue
        if (value > cell.threshold) == (cell.sense == "max"):
            what = f"milder than its threshold, {cell.threshold:g}"
            yield remark("L06", cell, what, FIX)


CHECKS = (
    Check("L06", "Target milder than its threshold", milder_than_its_threshold),
    Check("L06", "Weaker in a colder zone", weaker_in_the_cold),
)
